package main

import (
	"context"
	"fmt"
	"slices"
	"strings"

	"github.com/spf13/cobra"

	"hilltop/bosehubbard"
	"hilltop/bosehubbard/exact"
	"hilltop/bosehubbard/lattice"
	"hilltop/bosehubbard/passage"
	"hilltop/bosehubbard/plan"
	"hilltop/bosehubbard/sequence"
)

// simulateFlags are the flags of the verb simulate.
type simulateFlags struct {
	from        string
	samples     int
	tolerance   float64
	temperature bool
	overlap     bool
}

func (p *program) simulate() *cobra.Command {
	var f simulateFlags
	cmd := &cobra.Command{
		Use:   "simulate PLAN",
		Short: "The passage of a model through its stages, and what becomes of it",
		Long: `Simulate carries the state of a model plan through its stages, exactly, and finds
the temperature that it would relax to. It starts from the atoms per site of the
plan ("fock") or else from the end of the spectrum of the wanted sign at the
values before the first stage.

--from begins with a later stage, from the values at which that stage starts and
a state of the same kind, as if all had been frozen until then.`,
		Args: args(cobra.ExactArgs(1)),
		RunE: func(cmd *cobra.Command, given []string) error { return p.runSimulate(cmd.Context(), given[0], f) },
	}
	flags := cmd.Flags()
	flags.StringVar(&f.from, "from", "", "name of the stage to begin with")
	flags.IntVar(&f.samples, "samples", 60, "points of the trace, about")
	flags.Float64Var(&f.tolerance, "tolerance", exact.DefaultTolerance, "estimated error of the state, from steps in time")
	flags.BoolVar(&f.temperature, "temperature", true, "find temperature and entropy by matching the energy")
	flags.BoolVar(&f.overlap, "overlap", false, "find the weight of the wanted end of the spectrum at the end of each stage")
	return cmd
}

func (p *program) runSimulate(ctx context.Context, path string, f simulateFlags) error {
	document, err := plan.Load(path)
	if err != nil {
		return fileError{err}
	}
	s, opt, err := f.sequence(document.Plan())
	if err != nil {
		return err
	}
	bar := newBar(p.stderr)
	defer bar.clear()
	opt.Progress = bar.progress("passage")
	r, err := passage.Simulate(ctx, s, opt)
	if err != nil {
		return err
	}
	answer := passageAnswer(document.Plan(), &s, r)
	if f.temperature {
		if err := answer.match(ctx, &s, r, bar.progress("temperature")); err != nil {
			return err
		}
	}
	bar.clear()
	if p.json {
		return p.print(answer)
	}
	return answer.write(p.stdout)
}

// sequence turns a model plan into SI and applies the flags.
func (f simulateFlags) sequence(p *plan.Plan) (s passage.Sequence, opt passage.Options, err error) {
	if f.samples < 1 || f.samples > 100_000 {
		return s, opt, usageError{fmt.Errorf("--samples %d: want 1 to 100000", f.samples)}
	}
	if !(f.tolerance >= 1e-9 && f.tolerance <= 0.1) {
		return s, opt, usageError{fmt.Errorf("--tolerance %g: want 1e-9 to 0.1", f.tolerance)}
	}
	if p.Kind() != plan.ModelKind {
		return s, opt, plan.Errors{{Path: "/" + string(p.Kind()), Reason: "only plans with a model can be simulated yet"}}
	}
	opt = passage.Options{Samples: f.samples, Tolerance: f.tolerance, Overlaps: f.overlap}
	sites := 1
	for _, n := range p.Model.Sites {
		sites *= n
	}
	if err := passage.CheckSize(sites, p.Model.Atoms, opt); err != nil {
		return s, opt, err
	}
	if s, err = sequenceOf(p); err != nil {
		return s, opt, err
	}
	if f.from != "" {
		names := make([]string, len(p.Stages))
		for i, stage := range p.Stages {
			names[i] = stage.Name
		}
		at := slices.Index(names, f.from)
		if at < 0 {
			return s, opt, usageError{fmt.Errorf("--from %q: want the name of a stage, one of: %s", f.from, strings.Join(names, ", "))}
		}
		s = s.From(at)
	}
	return s, opt, nil
}

// sequenceOf reads the model and its stages.
func sequenceOf(p *plan.Plan) (passage.Sequence, error) {
	m := p.Model
	box, err := lattice.Box(m.Sites, m.Periodicity())
	if err != nil {
		return passage.Sequence{}, err
	}
	rows := p.Rows()
	s := passage.Sequence{
		Lattice: box, Periodic: m.Periodicity(), Atoms: m.Atoms, Fock: m.Fock, End: exact.Ceiling, Start: rowModel(rows[0]),
	}
	if p.AimSign == plan.Positive {
		s.End = exact.Floor
	}
	for _, row := range rows[1:] {
		s.Stages = append(s.Stages, passage.Stage{
			Name: row.Name, Duration: row.DurationMS * 1e-3, Shape: sequence.Shape(row.Shape), End: rowModel(row),
		})
	}
	return s, nil
}

func rowModel(row plan.Row) bosehubbard.Model {
	m := bosehubbard.Model{Interaction: row.InteractionHz}
	for a, j := range row.TunnellingHz {
		m.Axes = append(m.Axes, bosehubbard.AxisTerms{Tunnelling: j, Curvature: row.CurvatureHz[a]})
	}
	return m
}
