package main

import (
	"fmt"
	"io"
	"strings"
	"text/tabwriter"
	"unicode"

	"hilltop/bosehubbard/num/digits"
	"hilltop/bosehubbard/report"
)

// sheet is a report for people on its way to the output.
type sheet struct {
	strings.Builder
	table *tabwriter.Writer
}

// writeReport prints a report for people.
func writeReport(w io.Writer, r *report.Report) error {
	var s sheet
	s.table = tabwriter.NewWriter(&s, 0, 0, 2, ' ', 0)
	if r.Title != "" {
		fmt.Fprintf(&s, "%.200s\n", plain(r.Title))
	}
	fmt.Fprintln(&s, plain(r.Sentence))
	if r.Levels != nil {
		s.levels(r.Levels)
	} else {
		s.stages(r)
	}
	s.bounds(r)
	s.criteria(r)
	if len(r.Cautions) > 0 {
		fmt.Fprintf(&s, "\nCautions\n")
	}
	for _, c := range r.Cautions {
		fmt.Fprintf(&s, "- %s\n", plain(c.Text))
	}
	_, err := io.WriteString(w, s.String())
	return err
}

// row adds cells to the table; done prints it.
func (s *sheet) row(cells ...string) { fmt.Fprintln(s.table, strings.Join(cells, "\t")) }

func (s *sheet) done() { s.table.Flush() }

// stages prints the Hamiltonian at the start and at every stage's end. A model has
// no beams and no field.
func (s *sheet) stages(r *report.Report) {
	fmt.Fprintf(s, "\nStart and end of each stage (E/h in Hz; V per site squared)\n")
	apparatus := r.Start.TrapHz != nil
	heads := []string{"stage", "J", "U", "V x, y, z"}
	if apparatus {
		heads = append(heads, "trap x, y, z", "a/a0", "crosses")
	}
	s.row(heads...)
	for _, at := range append([]report.Stage{*r.Start}, r.Stages...) {
		cells := []string{plain(at.Name), list(at.TunnellingHz), optional(at.InteractionHz), list(at.CurvatureHz)}
		if apparatus {
			cells = append(cells, list(at.TrapHz), optional(at.ScatteringLengthA0), crossings(at.Crosses))
		}
		s.row(cells...)
	}
	s.done()
}

func (s *sheet) levels(l *report.Levels) {
	beta, kelvin := "infinite", "infinite"
	if l.BetaPerHz != nil {
		beta = figure(*l.BetaPerHz) + " per Hz"
		if *l.BetaPerHz != 0 {
			kelvin = figure(float64(l.Temperature)) + " K"
		}
	} else {
		kelvin = "0 K"
	}
	fmt.Fprintf(s, "\nPer body: energy %s Hz, beta %s, T %s, S %s kB; window %s ms, %s inner times\n",
		figure(l.EnergyHz), beta, kelvin, figure(l.EntropyKB), figure(l.WindowMS), figure(l.TimeRatio))
}

func (s *sheet) bounds(r *report.Report) {
	fmt.Fprintf(s, "\nBounds per atom (Hz)\n")
	for _, t := range r.Ceiling.Terms {
		if t.Reason != "" {
			s.row(t.Term, t.Reason)
			continue
		}
		s.row(t.Term, bound(t.Floor)+" to "+bound(t.Ceiling))
	}
	s.row("total", bound(r.Ceiling.Total.Floor)+" to "+bound(r.Ceiling.Total.Ceiling))
	s.done()
}

func (s *sheet) criteria(r *report.Report) {
	fmt.Fprintf(s, "\nCriteria\n")
	for _, c := range r.Ceiling.Criteria {
		state := "holds"
		if !c.Passed {
			state = "BROKEN, " + c.Breaks
		}
		s.row(c.Name, state, "margin "+figure(c.Margin)+" "+c.Unit, plain(c.Detail))
		switch {
		case c.Advice != nil:
			s.row("", "->", plain(sets(c.Advice.Set)), plain(c.Advice.Text))
		case !c.Passed:
			s.row("", "->", "", "no turn of the knobs within their limits mends this")
		}
	}
	s.done()
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
