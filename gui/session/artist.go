package session

import (
	"errors"
	"slices"

	"hilltop/bosehubbard/apparatus"
	"hilltop/bosehubbard/band"
	"hilltop/bosehubbard/figure"
	"hilltop/bosehubbard/plan"
	"hilltop/bosehubbard/report"
)

// ErrNoBench says that a plan has no beams, coils and lattice to be drawn.
var ErrNoBench = errors.New("a model plan gives J, U and V directly, so it has no beams, bands or depths")

// Artist computes what the pictures of the pages show, from the plan and the report
// of a State. It belongs to one goroutine.
type Artist struct {
	bands *band.Workspace
	bench *apparatus.Workspace
}

// NewArtist returns an Artist.
func NewArtist() *Artist {
	w := apparatus.NewWorkspace()
	return &Artist{bands: w.Band(), bench: w}
}

// StageAt returns what a report says of a stage: the last one for an index beyond
// it, the start for [StartStage]; nil where the report has none.
func StageAt(r *report.Report, stage int) *report.Stage {
	switch {
	case r == nil:
		return nil
	case stage < 0 || len(r.Stages) == 0:
		return r.Start
	}
	return &r.Stages[min(stage, len(r.Stages)-1)]
}

// LatticeAxes names the entries of lattice.axes of a plan.
func LatticeAxes(p *plan.Plan) []string {
	if p == nil || p.Lattice == nil {
		return nil
	}
	names := make([]string, len(p.Lattice.Axes))
	for i, axis := range p.Lattice.Axes {
		names[i] = axis.Axis
	}
	return names
}

// FastestAxis returns the index in lattice.axes of the axis with the largest J at
// a stage.
func FastestAxis(r *report.Report, stage int) int {
	s := StageAt(r, stage)
	if s == nil || len(s.TunnellingHz) == 0 {
		return 0
	}
	fastest := 0
	for i, j := range s.TunnellingHz {
		if max(j, -j) > max(s.TunnellingHz[fastest], -s.TunnellingHz[fastest]) {
			fastest = i
		}
	}
	return fastest
}

// Budget returns who adds what to the trap at the end of a stage.
//
// It returns ErrNoBench for a model plan.
func (a *Artist) Budget(r *report.Report, stage int) (*figure.Budget, error) {
	b, ok := figure.NewBudget(r, stage)
	if !ok {
		return nil, ErrNoBench
	}
	return b, nil
}

// Scattering returns a(B) with the path of the sequence.
//
// It returns ErrNoBench for a model plan, and the errors of plan.Apparatus.
func (a *Artist) Scattering(p *plan.Plan, r *report.Report) (*figure.Scattering, error) {
	if p.Lattice == nil {
		return nil, ErrNoBench
	}
	bench, err := p.Apparatus()
	if err != nil {
		return nil, err
	}
	return figure.NewScattering(bench.Scattering, r), nil
}

// bandCount is how many bands a picture shows.
const bandCount = 3

// Bands returns the bands of one lattice axis at the end of a stage.
//
// It returns ErrNoBench for a model plan, and the error of the band solver.
func (a *Artist) Bands(p *plan.Plan, r *report.Report, stage, axis int) (*figure.Bands, error) {
	s, names := StageAt(r, stage), LatticeAxes(p)
	if s == nil || axis >= len(s.DepthEr) || axis >= len(names) {
		return nil, ErrNoBench
	}
	return figure.NewBands(a.bands, names[axis], s.DepthEr[axis], s.RecoilHz[axis], bandCount)
}

// Depths returns J, U and J2 against the depth of one lattice axis, the others as
// they are at the end of a stage, with the depths of all stages.
//
// It returns ErrNoBench for a model plan, and the error of the band solver.
func (a *Artist) Depths(p *plan.Plan, r *report.Report, stage, axis int) (*figure.DepthCurves, error) {
	s := StageAt(r, stage)
	if s == nil || axis >= len(s.DepthEr) {
		return nil, ErrNoBench
	}
	options := figure.DepthOptions{Axis: axis, Points: 2, LatticeAxes: LatticeAxes(p)}
	whole, err := figure.NewDepthCurves(a.bands, r, options)
	if err != nil {
		return nil, err
	}
	options.Points, options.Low, options.High = 0, whole.Depths[0], whole.Depths[len(whole.Depths)-1]
	curves, err := figure.NewDepthCurves(a.bands, upTo(r, stage), options)
	if err != nil {
		return nil, err
	}
	curves.Plan = whole.Plan
	return curves, nil
}

// upTo is a report that ends with a stage.
func upTo(r *report.Report, stage int) *report.Report {
	cut := *r
	if stage < len(r.Stages) {
		cut.Stages = r.Stages[:max(stage+1, 0)]
	}
	return &cut
}

// Wannier returns the Wannier functions of all lattice axes at the end of a stage.
//
// It returns ErrNoBench for a model plan, and the error of the band solver.
func (a *Artist) Wannier(p *plan.Plan, r *report.Report, stage int) (*figure.Wannier, error) {
	s, names := StageAt(r, stage), LatticeAxes(p)
	if s == nil || len(s.DepthEr) == 0 || len(s.DepthEr) != len(names) {
		return nil, ErrNoBench
	}
	return figure.NewWannier(a.bands, names, slices.Clone(s.DepthEr))
}
