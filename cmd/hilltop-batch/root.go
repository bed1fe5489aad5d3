package main

import (
	"context"
	"encoding/json"
	"fmt"
	"io"

	"github.com/spf13/cobra"
)

// version is what --version prints; FyneApp.toml carries the same.
const version = "0.1.0"

// program holds what the verbs share.
type program struct {
	stdout, stderr io.Writer
	json           bool
}

// run executes one command line and returns the exit code: 0 done, 1 computation,
// file or stop failed, 2 command line or document refused.
func run(ctx context.Context, args []string, stdout, stderr io.Writer) int {
	p := &program{stdout: stdout, stderr: stderr}
	root := p.root()
	root.SetArgs(args)
	root.SetOut(stdout)
	root.SetErr(stderr)
	err := root.ExecuteContext(ctx)
	if err == nil {
		return 0
	}
	f := failureOf(err)
	if p.json || wantsJSON(args) {
		if err := p.print(map[string]failure{"error": f}); err != nil {
			fmt.Fprintln(stderr, "hilltop-batch:", err)
		}
	} else {
		fmt.Fprintln(stderr, "hilltop-batch: "+f.Message)
		if f.Kind == usage {
			fmt.Fprintln(stderr, "hilltop-batch --help lists the verbs, hilltop-batch VERB --help the flags")
		}
	}
	return f.code()
}

// wantsJSON finds --json where the command line could not be read to its end.
func wantsJSON(args []string) bool {
	for _, a := range args {
		if a == "--json" || a == "--json=true" {
			return true
		}
	}
	return false
}

func (p *program) root() *cobra.Command {
	root := &cobra.Command{
		Use:           "hilltop-batch VERB",
		Short:         "Plan negative-temperature states of lattice bosons without a screen",
		Version:       version,
		SilenceUsage:  true,
		SilenceErrors: true,
		Args:          cobra.NoArgs,
		RunE: func(cmd *cobra.Command, _ []string) error {
			return usageError{fmt.Errorf("no verb given; want one of: bands, exact, judge, simulate")}
		},
	}
	root.PersistentFlags().BoolVar(&p.json, "json", false, "print one JSON object on standard output and nothing else")
	root.SetFlagErrorFunc(func(_ *cobra.Command, err error) error { return usageError{err} })
	root.AddCommand(p.judge(), p.bands(), p.exact(), p.simulate())
	return root
}

// args wraps a check of the arguments, so that its error counts as one of usage.
func args(check cobra.PositionalArgs) cobra.PositionalArgs {
	return func(cmd *cobra.Command, given []string) error {
		if err := check(cmd, given); err != nil {
			return usageError{fmt.Errorf("%s: %w", cmd.Name(), err)}
		}
		return nil
	}
}

// print writes one indented JSON object, or says why that failed; values that
// JSON cannot hold are a programmer's mistake.
func (p *program) print(value any) error {
	text, err := json.MarshalIndent(value, "", "  ")
	if err != nil {
		panic(fmt.Sprintf("hilltop-batch: %v", err))
	}
	if _, err := fmt.Fprintf(p.stdout, "%s\n", text); err != nil {
		return fileError{fmt.Errorf("standard output: %w", err)}
	}
	return nil
}
