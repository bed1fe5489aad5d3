package main

import (
	"context"
	"fmt"
	"io"
	"strings"
	"text/tabwriter"
	"unicode"

	"github.com/spf13/cobra"

	"hilltop/bosehubbard/num/digits"
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

// plain is text without control characters, which could drive a terminal.
func plain(text string) string {
	return strings.Map(func(r rune) rune {
		if unicode.IsControl(r) {
			return '\uFFFD'
		}
		return r
	}, text)
}

// writeReport prints a report for people.
func writeReport(w io.Writer, r *report.Report) error {
	var text strings.Builder
	if r.Title != "" {
		fmt.Fprintf(&text, "%.200s\n", plain(r.Title))
	}
	fmt.Fprintf(&text, "%s\n\nStart and end of each stage (E/h in Hz; V per site squared)\n", plain(r.Sentence))
	table := tabwriter.NewWriter(&text, 0, 0, 2, ' ', 0)
	fmt.Fprintln(table, "stage\tJ\tU\tV x, y, z\ttrap x, y, z\ta/a0\tcrosses")
	for _, s := range append([]report.Stage{*r.Start}, r.Stages...) {
		fmt.Fprintf(table, "%s\t%s\t%s\t%s\t%s\t%s\t%s\n", plain(s.Name), list(s.TunnellingHz), optional(s.InteractionHz),
			list(s.CurvatureHz), list(s.TrapHz), optional(s.ScatteringLengthA0), crossings(s.Crosses))
	}
	table.Flush()
	fmt.Fprintf(&text, "\nBounds per atom (Hz)\n")
	for _, t := range r.Ceiling.Terms {
		if t.Reason != "" {
			fmt.Fprintf(table, "%s\t%s\n", t.Term, t.Reason)
			continue
		}
		fmt.Fprintf(table, "%s\t%s to %s\n", t.Term, bound(t.Floor), bound(t.Ceiling))
	}
	fmt.Fprintf(table, "total\t%s to %s\n", bound(r.Ceiling.Total.Floor), bound(r.Ceiling.Total.Ceiling))
	table.Flush()
	fmt.Fprintf(&text, "\nCriteria\n")
	for _, c := range r.Ceiling.Criteria {
		state := "holds"
		if !c.Passed {
			state = "BROKEN, " + c.Breaks
		}
		fmt.Fprintf(table, "%s\t%s\tmargin %s %s\t%s\n", c.Name, state, figure(c.Margin), c.Unit, c.Detail)
		if c.Advice != nil {
			fmt.Fprintf(table, "\t->\t%s\t%s\n", plain(sets(c.Advice.Set)), plain(c.Advice.Text))
		} else if !c.Passed {
			fmt.Fprintf(table, "\t->\t\tno turn of the knobs within their limits mends this\n")
		}
	}
	table.Flush()
	if len(r.Cautions) > 0 {
		fmt.Fprintf(&text, "\nCautions\n")
	}
	for _, c := range r.Cautions {
		fmt.Fprintf(&text, "- %s\n", plain(c.Text))
	}
	_, err := io.WriteString(w, text.String())
	return err
}

func figure(v float64) string { return digits.Format(v, 4) }

func list(values []float64) string {
	if len(values) == 0 {
		return "-"
	}
	words := make([]string, len(values))
	for i, v := range values {
		words[i] = figure(v)
	}
	return strings.Join(words, ", ")
}

func optional(v *float64) string {
	if v == nil {
		return "-"
	}
	return figure(*v)
}

func bound(b report.Bound) string {
	if b.Unbounded() {
		return "unbounded"
	}
	return figure(b.Hz)
}

func crossings(list []report.Crossing) string {
	words := make([]string, len(list))
	for i, c := range list {
		words[i] = fmt.Sprintf("%s %s G", c.Kind, digits.Format(c.FieldG, 5))
	}
	return strings.Join(words, ", ")
}

func sets(list []report.Set) string {
	words := make([]string, len(list))
	for i, s := range list {
		words[i] = fmt.Sprintf("%s = %v", s.Path, s.Value)
	}
	return strings.Join(words, ", ")
}
