package figure

import "math"

// Area is the part of a chart inside its axes: the link between pixels and data.
type Area struct {
	Rect
	X, Y         Range
	KindX, KindY ScaleKind
	xName, yName Axis
}

// Pixel returns where a value stands, px from the upper left corner of the
// picture.
func (a Area) Pixel(x, y float64) Point {
	return Point{
		a.X0 + a.KindX.Normalize(a.X.Low, a.X.High, x)*a.Width(),
		a.Y1 - a.KindY.Normalize(a.Y.Low, a.Y.High, y)*a.Height(),
	}
}

// Data returns the values at a place.
func (a Area) Data(p Point) (x, y float64) {
	return inverse(a.KindX, a.X, (p.X-a.X0)/a.Width()), inverse(a.KindY, a.Y, (a.Y1-p.Y)/a.Height())
}

// inverse is the value at a part of the way along an axis.
func inverse(k ScaleKind, r Range, part float64) float64 {
	low, high := k.forward(r.Low), k.forward(r.High)
	return k.back(low + part*(high-low))
}

// View is the part of the data that is shown; a zero range leaves the choice to
// the picture.
type View struct{ X, Y Range }

// Zoom returns the view in which everything is factor times as large and the
// place p stays where it is.
func (a Area) Zoom(p Point, factor float64) View {
	fx, fy := (p.X-a.X0)/a.Width(), (a.Y1-p.Y)/a.Height()
	return View{
		X: part(a.KindX, a.X, fx-fx/factor, fx+(1-fx)/factor),
		Y: part(a.KindY, a.Y, fy-fy/factor, fy+(1-fy)/factor),
	}
}

// Pan returns the view after a drag by dx, dy px: the data follow the hand.
func (a Area) Pan(dx, dy float64) View {
	fx, fy := dx/a.Width(), dy/a.Height()
	return View{X: part(a.KindX, a.X, -fx, 1-fx), Y: part(a.KindY, a.Y, fy, 1+fy)}
}

// part is the range between two parts of the way; the whole one where that cannot
// be shown.
func part(k ScaleKind, r Range, low, high float64) Range {
	out := Range{inverse(k, r, low), inverse(k, r, high)}
	if !out.valid(k) {
		return r
	}
	return out
}

// Reading is what a chart says at a place.
type Reading struct {
	Curve string // empty for a place off all curves
	X, Y  float64
	At    Point
	Text  string
}

// Read gives the values at a place, for a crosshair.
func (a Area) Read(p Point) Reading {
	x, y := a.Data(p)
	return Reading{X: x, Y: y, At: p, Text: quantity(a.xName, x) + ", " + quantity(a.yName, y)}
}

// quantity writes a value of an axis with its name and unit.
func quantity(axis Axis, v float64) string {
	text := axis.Label + " " + Number(v, 4)
	if axis.Label == "" {
		text = Number(v, 4)
	}
	if axis.Unit != "" {
		text += " " + axis.Unit
	}
	return text
}

// Nearest returns the point of the curves nearest to p; ok is false where none
// comes within reach px.
func (c *Chart) Nearest(a Area, p Point, reach float64) (r Reading, ok bool) {
	best := reach
	for i := range c.Curves {
		curve := &c.Curves[i]
		for k := 0; k+1 < len(curve.X); k++ {
			q := a.Pixel(curve.X[k], curve.Y[k])
			s := a.Pixel(curve.X[k+1], curve.Y[k+1])
			at := closest(p, q, s)
			d := math.Hypot(at.X-p.X, at.Y-p.Y)
			if !(d < best) || !a.Contains(at) {
				continue
			}
			best, ok = d, true
			r = Reading{Curve: curve.Name, At: at}
			r.X, r.Y = a.Data(at)
		}
	}
	if ok {
		named := c.Y
		named.Label = r.Curve
		r.Text = quantity(named, r.Y) + " at " + quantity(c.X, r.X)
	}
	return r, ok
}

// closest is the point of the piece q to s that is nearest to p.
func closest(p, q, s Point) Point {
	dx, dy := s.X-q.X, s.Y-q.Y
	length := dx*dx + dy*dy
	if !(length > 0) {
		return q
	}
	t := ((p.X-q.X)*dx + (p.Y-q.Y)*dy) / length
	return between(q, s, math.Min(math.Max(t, 0), 1))
}
