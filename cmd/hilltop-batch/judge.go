package main

import (
	"context"
	"fmt"

	"github.com/spf13/cobra"

	"hilltop/bosehubbard/plan"
	"hilltop/bosehubbard/report"
)

func (p *program) judge() *cobra.Command {
	return &cobra.Command{
		Use:   "judge PLAN",
		Short: "Assess a plan: J, U, V at every stage, bounds, criteria, verdict",
		Long: `Judge reads a plan, computes J, U and V at the end of every stage, bounds the
energy, judges every criterion and gives the verdict: sealed, leaky, astray or
open. An open verdict is an answer, not a failure: the exit code is 0.`,
		Args: args(cobra.ExactArgs(1)),
		RunE: func(cmd *cobra.Command, given []string) error {
			document, err := load(cmd.Context(), given[0])
			if err != nil {
				return err
			}
			r, err := report.Of(cmd.Context(), document.Plan())
			if err != nil {
				return fmt.Errorf("%s: %w", given[0], err)
			}
			if p.json {
				return p.print(r)
			}
			return writeReport(p.stdout, r)
		},
	}
}

// load reads a plan; a stop ends it even where the file is a pipe that says
// nothing.
func load(ctx context.Context, path string) (*plan.Document, error) {
	type answer struct {
		document *plan.Document
		err      error
	}
	done := make(chan answer, 1)
	go func() {
		document, err := plan.Load(path)
		done <- answer{document, err}
	}()
	select {
	case <-ctx.Done():
		return nil, ctx.Err()
	case a := <-done:
		if a.err != nil {
			return nil, fileError{a.err}
		}
		return a.document, nil
	}
}
