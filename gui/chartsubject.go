package gui

import (
	"math"
	"slices"
	"strings"

	"hilltop/bosehubbard/figure"
)

// chartSubject is a chart that is read along its curves.
type chartSubject struct {
	choice []figure.Unit
	chart  func(figure.Unit) *figure.Chart
}

var _ subject = (*chartSubject)(nil)

func (c *chartSubject) units() []figure.Unit { return c.choice }
func (c *chartSubject) scales() []string     { return nil }

func (c *chartSubject) picture(v view) figure.Picture {
	chart := c.chart(v.unit)
	chart.View = v.chart
	if before, ok := v.pinned.(*chartSubject); ok {
		chart.Pin(before.chart(v.unit))
	}
	return chart
}

func (c *chartSubject) guide(p figure.Picture, f figure.Frame, s figure.Style) guide {
	chart := p.(*figure.Chart)
	return &curveGuide{viewOf(chart, f, s), chart}
}

// chartView zooms a chart.
type chartView struct {
	figure.Area
	whole figure.View
}

func viewOf(c *figure.Chart, f figure.Frame, s figure.Style) chartView {
	whole := *c
	whole.View = figure.View{}
	return chartView{c.Area(f, s), whole.Shown()}
}

func (a chartView) area() figure.Rect { return a.Rect }

// under is the area of a view that may not have been drawn yet.
func (a chartView) under(v view) figure.Area {
	area := a.Area
	area.X, area.Y = v.chart.X, v.chart.Y
	if area.X.IsZero() {
		area.X = a.whole.X
	}
	if area.Y.IsZero() {
		area.Y = a.whole.Y
	}
	return area
}

func (a chartView) zoom(v view, p figure.Point, by float64) view {
	v.chart = a.under(v).Zoom(p, by)
	return v
}

func (a chartView) pan(v view, dx, dy float64) view {
	v.chart = a.under(v).Pan(dx, dy)
	return v
}

func (a chartView) box(v view, r figure.Rect) view {
	area := a.under(v)
	low, high := figure.Point{X: r.X0, Y: r.Y1}, figure.Point{X: r.X1, Y: r.Y0}
	v.chart.X.Low, v.chart.Y.Low = area.Data(low)
	v.chart.X.High, v.chart.Y.High = area.Data(high)
	return v
}

// curveGuide reads curves: the pointer takes the nearest one, the keys lead along
// one from point to point and from one to the other.
type curveGuide struct {
	chartView
	chart *figure.Chart
}

// reach is how far from a curve the pointer may be.
const reach = 24

func (g *curveGuide) read(p figure.Point) (reading, bool) {
	if !g.Contains(p) {
		return reading{}, false
	}
	if r, ok := g.chart.Nearest(g.Area, p, reach); ok {
		return reading{at: r.At, text: named(r), curve: -1}, true
	}
	r := g.Read(p)
	return reading{at: r.At, text: r.Text, curve: -1}, true
}

// at reads a point of a curve, if it is in sight.
func (g *curveGuide) at(curve, point int) (reading, bool) {
	if curve < 0 || curve >= len(g.chart.Curves) {
		return reading{}, false
	}
	u := g.chart.Curves[curve]
	if point < 0 || point >= len(u.X) || math.IsNaN(u.Y[point]) {
		return reading{}, false
	}
	p := g.Pixel(u.X[point], u.Y[point])
	if !g.Contains(p) {
		return reading{}, false
	}
	alone := *g.chart
	alone.Curves = g.chart.Curves[curve : curve+1]
	r, ok := alone.Nearest(g.Area, p, 1)
	return reading{at: p, text: named(r), curve: curve, point: point}, ok
}

// named puts a colon behind the name of the curve.
func named(r figure.Reading) string {
	if text, ok := strings.CutPrefix(r.Text, r.Curve+" "); ok && r.Curve != "" {
		return r.Curve + ": " + text
	}
	return r.Text
}

// led lists the curves that the keys lead along: those with a name, for the others
// lie on one of them.
func (g *curveGuide) led() []int {
	var list []int
	for i, u := range g.chart.Curves {
		if u.Name != "" {
			list = append(list, i)
		}
	}
	return list
}

func (g *curveGuide) first() (reading, bool) {
	for _, curve := range g.led() {
		if r, ok := g.nearest(curve, (g.X0+g.X1)/2); ok {
			return r, true
		}
	}
	return reading{}, false
}

// nearest is the point of a curve in sight that is nearest to a place along x.
func (g *curveGuide) nearest(curve int, x float64) (best reading, ok bool) {
	distance := math.Inf(1)
	for i := range g.chart.Curves[curve].X {
		d := math.Abs(g.Pixel(g.chart.Curves[curve].X[i], g.Y.Low).X - x)
		if d >= distance {
			continue
		}
		if r, seen := g.at(curve, i); seen {
			best, ok, distance = r, true, d
		}
	}
	return best, ok
}

func (g *curveGuide) again(r reading) (reading, bool) {
	if r.curve < 0 {
		return g.read(r.at)
	}
	return g.at(r.curve, r.point)
}

// step goes on to the next point in sight, or to the next curve above or below.
func (g *curveGuide) step(from reading, right, up int) reading {
	if from.curve < 0 {
		if r, ok := g.onCurve(from); ok {
			return r
		}
		return from
	}
	if up != 0 {
		return g.switchCurve(from, up)
	}
	last, way := from, 1
	if right < 0 {
		way = -1
	}
	for i, left := from.point+way, way*right; left > 0 && i >= 0 && i < len(g.chart.Curves[from.curve].X); i += way {
		if r, ok := g.at(from.curve, i); ok {
			last = r
			left--
		}
	}
	return last
}

// onCurve goes from where the pointer was to the nearest curve.
func (g *curveGuide) onCurve(from reading) (best reading, ok bool) {
	distance := math.Inf(1)
	for _, curve := range g.led() {
		r, seen := g.nearest(curve, from.at.X)
		if d := math.Abs(r.at.Y - from.at.Y); seen && d < distance {
			best, ok, distance = r, true, d
		}
	}
	return best, ok
}

// switchCurve goes to the curve that runs next above (up > 0) or below.
func (g *curveGuide) switchCurve(from reading, up int) reading {
	var others []reading
	for _, curve := range g.led() {
		if r, ok := g.nearest(curve, from.at.X); ok {
			others = append(others, r)
		}
	}
	slices.SortStableFunc(others, func(a, b reading) int {
		switch {
		case a.at.Y > b.at.Y:
			return -1
		case a.at.Y < b.at.Y:
			return 1
		}
		return 0
	})
	i := slices.IndexFunc(others, func(r reading) bool { return r.curve == from.curve })
	if i += up; i < 0 || i >= len(others) {
		return from
	}
	return others[i]
}
