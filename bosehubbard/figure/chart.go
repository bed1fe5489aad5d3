package figure

import (
	"math"

	"gonum.org/v1/plot"
	"gonum.org/v1/plot/vg"
	"gonum.org/v1/plot/vg/draw"
)

// Curve is a line through data. A NaN parts it.
type Curve struct {
	Name  string // stands at its end
	X, Y  []float64
	Dash  Dash
	Width float64 // px; 0 counts as 2.5
	Soft  bool    // in soft ink
}

// Rule is an upright line across a chart.
type Rule struct {
	Name string
	X    float64
	Dash Dash
}

// Mark is a point with a name.
type Mark struct {
	Name string
	X, Y float64
	Open bool // a circle, not a disc
}

// Bracket spans a distance along y, as a gap does.
type Bracket struct {
	Name         string
	X, Low, High float64
}

// Chart is a picture with two axes.
type Chart struct {
	Name     string // for files
	Title    string
	X, Y     Axis
	Curves   []Curve
	Rules    []Rule
	Marks    []Mark
	Brackets []Bracket
	Pinned   []Curve // before a change: dashed, soft
	View     View

	under func(*pen, Area) // drawn below the curves
	over  func(*pen, Area) // drawn above them
	rows  func() Table     // in place of the curves
	head  bool             // leave a line above the area
}

var _ Picture = (*Chart)(nil)

// Stem returns the name for files.
func (c *Chart) Stem() string { return c.Name }

// Shown returns the ranges that are shown.
func (c *Chart) Shown() View {
	v := c.View
	if !v.X.valid(c.X.Kind) {
		v.X = c.X.Range
	}
	if !v.Y.valid(c.Y.Kind) {
		v.Y = c.Y.Range
	}
	if !v.X.valid(c.X.Kind) {
		v.X = around(c.X.Kind, 0, c.column(func(u Curve) []float64 { return u.X })...)
	}
	if !v.Y.valid(c.Y.Kind) {
		v.Y = around(c.Y.Kind, 0.05, c.column(func(u Curve) []float64 { return u.Y })...)
	}
	return v
}

func (c *Chart) column(of func(Curve) []float64) [][]float64 {
	var list [][]float64
	for _, u := range c.Curves {
		list = append(list, of(u))
	}
	return list
}

// Draw draws the chart.
func (c *Chart) Draw(to vg.Canvas, f Frame, s Style) {
	l := c.layout(f, s)
	p := newPen(to, f, s)
	p.fill(f.rect(), s.Palette.Paper)
	l.plot.Add(content{chart: c, pen: p, area: l.area})
	l.plot.Draw(draw.Canvas{Canvas: to, Rectangle: l.outer})
	if c.Title != "" {
		p.text(bold, s.Palette.Ink, Point{l.area.X0, 4 + ascent*bold.size*s.text()}, c.Title)
	}
}

// content draws what is inside the axes, as a plotter of gonum's plot.
type content struct {
	chart *Chart
	pen   *pen
	area  Area
}

// Plot implements plot.Plotter.
func (d content) Plot(draw.Canvas, *plot.Plot) {
	c, p, a := d.chart, d.pen, d.area
	if c.under != nil {
		c.under(p, a)
	}
	c.drawRules(p, a)
	for _, u := range c.Pinned {
		u.draw(p, a, stroke{width: 1.5, color: p.style.Palette.Soft, dash: dashes[Pinned]})
	}
	for _, u := range c.Curves {
		u.draw(p, a, u.stroke(p.style))
	}
	place := placer{style: p.style, bounds: p.bounds(a)}
	c.keepCurvesFree(a, &place)
	c.drawBrackets(p, a, &place)
	c.drawMarks(p, a, &place)
	c.nameRules(p, a, &place)
	c.nameCurves(p, a, &place)
	if c.over != nil {
		c.over(p, a)
	}
	p.drawLabels(place.labels)
}

// bounds is where labels may stand: left of or below the axes they would hide
// numbers.
func (p *pen) bounds(a Area) Rect { return Rect{a.X0, 0, p.width, a.Y1} }

// Table lists all curves point by point, then marks, lines and brackets.
func (c *Chart) Table() Table {
	if c.rows != nil {
		return c.rows()
	}
	t := Table{Columns: []Column{{"series", ""}, {c.X.Label, c.X.Unit}, {c.Y.Label, c.Y.Unit}}}
	for _, u := range c.Curves {
		for i := range u.X {
			t.row(u.Name, u.X[i], u.Y[i])
		}
	}
	for _, u := range c.Pinned {
		for i := range u.X {
			t.row("pinned "+u.Name, u.X[i], u.Y[i])
		}
	}
	for _, m := range c.Marks {
		t.row("mark "+m.Name, m.X, m.Y)
	}
	for _, r := range c.Rules {
		t.row("line "+r.Name, r.X, math.NaN())
	}
	for _, b := range c.Brackets {
		t.row("from "+b.Name, b.X, b.Low)
		t.row("to "+b.Name, b.X, b.High)
	}
	return t
}
