package figure

import (
	"fmt"
	"math"

	"hilltop/bosehubbard/band"
	"hilltop/bosehubbard/report"
)

// DepthCurves shows J, |U| and |J2| against the depth of an axis.
type DepthCurves struct {
	Axes        string    // the axes whose depths go together, such as "x, y"
	Recoil      float64   // Er/h, Hz
	Depths      []float64 // Er
	Tunnelling  []float64 // J, Hz
	Next        []float64 // |J2|, Hz
	Interaction []float64 // |U|, Hz; nil where there is none
	Attractive  bool      // U < 0
	Plan        []PlanDepth
}

// PlanDepth is a depth that the plan uses, and at the ends of which stages.
type PlanDepth struct {
	Depth  float64
	Stages []string
}

// DepthOptions choose what NewDepthCurves draws. The zero value works.
type DepthOptions struct {
	Axis        int      // of lattice.axes; axes that end at the same depth go with it
	Low, High   float64  // Er; 0 is 1 and 30 or a little more than the plan uses
	Points      int      // 0 counts as 60
	LatticeAxes []string // names of lattice.axes; nil is x, y, z
}

// NewDepthCurves computes the curves for an apparatus plan from its report: the
// chosen axis and those that end at the same depth change together, the others
// stay as at the end of the last stage.
//
//	U(s) = U_end prod_a I4(s)/I4(s_end)
//
// It returns an error if the report has no depths or a depth is out of range.
func NewDepthCurves(w *band.Workspace, r *report.Report, o DepthOptions) (*DepthCurves, error) {
	end := last(r)
	if end == nil || o.Axis < 0 || o.Axis >= len(end.DepthEr) || o.Axis >= len(end.RecoilHz) {
		return nil, fmt.Errorf("figure: the report has no depth along axis %d", o.Axis)
	}
	now, recoil := end.DepthEr[o.Axis], end.RecoilHz[o.Axis]
	together := 0
	for _, depth := range end.DepthEr {
		if depth == now {
			together++
		}
	}
	d := &DepthCurves{Axes: axesNamed(end.DepthEr, now, o.LatticeAxes), Recoil: recoil, Plan: planDepths(r, o.Axis)}
	low, high, points := o.limits(d.Plan)
	at, err := w.Solve(now)
	if err != nil {
		return nil, fmt.Errorf("figure: depth %g Er: %w", now, err)
	}
	for i := range points {
		depth := low + (high-low)*float64(i)/float64(points-1)
		b, err := w.Solve(depth)
		if err != nil {
			return nil, fmt.Errorf("figure: depth %g Er: %w", depth, err)
		}
		d.Depths = append(d.Depths, depth)
		d.Tunnelling = append(d.Tunnelling, b.Tunnelling[0]*recoil)
		d.Next = append(d.Next, math.Abs(b.Tunnelling[1])*recoil)
		if end.InteractionHz != nil {
			ratio := math.Pow(b.WannierFourthMoment/at.WannierFourthMoment, float64(together))
			d.Interaction = append(d.Interaction, math.Abs(*end.InteractionHz)*ratio)
			d.Attractive = *end.InteractionHz < 0
		}
	}
	return d, nil
}

// limits are the depths to draw: from 1 Er to a little more than the plan uses.
func (o DepthOptions) limits(plan []PlanDepth) (low, high float64, points int) {
	low, high, points = 1, 30, 60
	for _, p := range plan {
		if 1.2*p.Depth > high {
			high = math.Min(1.2*p.Depth, band.MaxDepth)
		}
	}
	if o.Low > 0 {
		low = o.Low
	}
	if o.High > low {
		high = o.High
	}
	if o.Points > 1 {
		points = o.Points
	}
	return low, high, points
}

// axesNamed joins the names of the axes at a depth.
func axesNamed(depths []float64, depth float64, names []string) string {
	var list []string
	for k, d := range depths {
		switch {
		case d != depth:
		case k < len(names):
			list = append(list, names[k])
		case k < 3:
			list = append(list, "xyz"[k:k+1])
		}
	}
	return join(list)
}

// planDepths lists the depths at the ends of stages along an axis, 0 left out.
func planDepths(r *report.Report, axis int) []PlanDepth {
	var list []PlanDepth
	add := func(s *report.Stage) {
		if s == nil || axis >= len(s.DepthEr) || s.DepthEr[axis] == 0 {
			return
		}
		for i := range list {
			if list[i].Depth == s.DepthEr[axis] {
				list[i].Stages = append(list[i].Stages, s.Name)
				return
			}
		}
		list = append(list, PlanDepth{Depth: s.DepthEr[axis], Stages: []string{s.Name}})
	}
	add(r.Start)
	for i := range r.Stages {
		add(&r.Stages[i])
	}
	return list
}

// Chart draws the curves on a log axis, in Hz, Er or nK, with the plan's depths as
// lines.
func (d *DepthCurves) Chart(u Unit) *Chart {
	m := u.ofRecoil(d.Recoil, 1e3) // the numbers span decades: no prefix
	c := &Chart{
		Name:  "depth",
		Title: "Against the depth along " + d.Axes,
		X:     Axis{Label: "depth", Unit: "Er", Range: around(Linear, 0, d.Depths)},
		Y:     Axis{Label: "energy", Unit: m.name, Kind: Log},
	}
	c.Curves = append(c.Curves, Curve{Name: "J", X: d.Depths, Y: m.list(d.Tunnelling)})
	if d.Interaction != nil {
		name := "|U|, repulsive"
		if d.Attractive {
			name = "|U|, attractive"
		}
		c.Curves = append(c.Curves, Curve{Name: name, X: d.Depths, Y: m.list(d.Interaction), Dash: Dashed})
	}
	c.Curves = append(c.Curves, Curve{Name: "|J2|", X: d.Depths, Y: m.list(d.Next), Dash: Dotted})
	for _, p := range d.Plan {
		c.Rules = append(c.Rules, Rule{Name: stagesName(p.Stages), X: p.Depth, Dash: Pinned})
	}
	return c
}

// stagesName joins the names of stages, the middle ones left out of a long row.
func stagesName(names []string) string {
	if len(names) > 3 {
		return names[0] + " … " + names[len(names)-1]
	}
	return join(names)
}
