package gui

import (
	"math"
	"slices"

	"hilltop/bosehubbard/figure"
	"hilltop/gui/session"
)

// ceilingSubject is the Ceiling picture, read term by term.
type ceilingSubject struct {
	report  *session.Report
	axes    []string             // of the lattice
	entropy *figure.EntropyCurve // nil where there is none
	ladder  *figure.Ladder       // of levels
	state   *float64             // energy per atom, Hz; nil where it is not known
}

var _ subject = (*ceilingSubject)(nil)

func (c *ceilingSubject) units() []figure.Unit { return figure.Units(c.report) }

// scales are the terms with a bound; the first choice is everything.
func (c *ceilingSubject) scales() []string {
	list := []string{""}
	for _, t := range c.report.Ceiling.Terms {
		if bound := max(finite(t.Floor), finite(t.Ceiling)); bound > 0 {
			list = append(list, t.Term)
		}
	}
	return list
}

// finite is the size of a bound, 0 where there is none.
func finite(b session.Bound) float64 {
	if !b.Known || b.Unbounded() {
		return 0
	}
	return math.Abs(b.Hz)
}

func (c *ceilingSubject) picture(v view) figure.Picture {
	o := figure.CeilingOptions{Unit: v.unit, ScaleTo: v.scale, HalfRange: v.half, LatticeAxes: c.axes, Entropy: c.entropy, Ladder: c.ladder, State: c.state}
	if before, ok := v.pinned.(*ceilingSubject); ok {
		o.Pinned = before.report
	}
	return &figure.Ceiling{Report: c.report, Options: o}
}

func (c *ceilingSubject) guide(p figure.Picture, f figure.Frame, s figure.Style) guide {
	picture := p.(*figure.Ceiling)
	g := &termGuide{geometry: picture.Geometry(f, s)}
	g.half = g.geometry.HalfRange(c.report, picture.Options.Unit)
	g.stops = g.places()
	return g
}

// termGuide reads the Ceiling picture: the pointer the energy where it is, the keys
// the ends of the bars, then the hill, then the line of sizes.
type termGuide struct {
	stopGuide
	geometry *figure.Geometry
	half     float64 // the half-range in the unit that is shown
}

func (g *termGuide) area() figure.Rect { return g.geometry.Plot }

func (g *termGuide) read(p figure.Point) (reading, bool) {
	r, ok := g.geometry.Read(p)
	if !ok {
		return reading{}, false
	}
	if term := g.geometry.At(p); term != "" {
		r.Text = screenName(term) + ": " + r.Text
	}
	return reading{at: p, text: r.Text, curve: -1}, true
}

func (g *termGuide) again(r reading) (reading, bool) {
	if r.curve < 0 {
		return g.read(r.at)
	}
	return g.at(r.curve, r.point)
}

func (g *termGuide) places() [][]stop {
	var list [][]stop
	for _, bar := range append(slices.Clone(g.geometry.Bars), g.geometry.Total) {
		list = append(list, g.bar(bar))
	}
	if s := g.geometry.Slope; s != nil {
		list = append(list, g.hill(s)...)
	}
	list = append(list, g.rungs()...)
	list = append(list, g.entropy()...)
	size := &g.geometry.Size
	for _, m := range size.Marks {
		list = append(list, []stop{{figure.Point{X: m.X, Y: size.Y}, "Size of " + m.Name + ": " + figure.Number(m.Hz, 4) + " Hz"}})
	}
	return list
}

// bar has two stops: its ceiling and its floor.
func (g *termGuide) bar(bar figure.Bar) []stop {
	name := screenName(bar.Term)
	if bar.Still {
		middle := (bar.Upper.Y + bar.Lower.Y) / 2
		return []stop{{figure.Point{X: bar.Centre(), Y: middle}, name + ": " + minusSigns(bar.Reason)}}
	}
	end := func(word string, e figure.End) stop {
		at := figure.Point{X: bar.Centre(), Y: e.Y}
		text := name + ", " + word + ": "
		switch r, ok := g.geometry.Read(at); {
		case e.Kind == figure.Strips:
			text += "unbounded"
		case e.Kind == figure.Cut || !ok:
			text += figure.Signed(e.Hz, 4) + " Hz, beyond the range"
		default:
			text += r.Text
		}
		return stop{at, text}
	}
	return []stop{end("ceiling", bar.Upper), end("floor", bar.Lower)}
}

// hillSteps is how many places the keys lead through on each side of the summit.
const hillSteps = 10

// hill has two stops at each of some sites: the upper and the lower edge of the
// band, where they are in the range.
func (g *termGuide) hill(s *figure.Slope) [][]stop {
	var list [][]stop
	for i := -hillSteps; i <= hillSteps; i++ {
		site := s.Reach * float64(i) / (hillSteps + 1)
		var edges []stop
		for _, edge := range []struct {
			word string
			hz   float64
		}{{"Hill, top of the band", s.Ceiling}, {"Hill, bottom of the band", s.Floor}} {
			at := figure.Point{X: s.X(site), Y: g.geometry.Scale.Y(s.Curvature*site*site + edge.hz)}
			if r, ok := g.geometry.Read(at); ok {
				edges = append(edges, stop{at, edge.word + ": " + r.Text})
			}
		}
		if len(edges) > 0 {
			list = append(list, edges)
		}
	}
	return list
}

// zoom steps the half-range through 1, 2, 5 x 10^n.
func (g *termGuide) zoom(v view, _ figure.Point, by float64) view {
	v.scale = ""
	if v.half == 0 {
		v.half = g.half
	}
	v.half = nextNice(v.half, by < 1)
	return v
}

// nextNice is the next larger or smaller of 1, 2, 5 x 10^n.
func nextNice(x float64, larger bool) float64 {
	const slack = 1e-6
	power := math.Pow(10, math.Floor(math.Log10(x)))
	steps := []float64{0.1, 0.2, 0.5, 1, 2, 5, 10, 20}
	if larger {
		for _, s := range steps {
			if s*power > x*(1+slack) {
				return s * power
			}
		}
	}
	for _, s := range slices.Backward(steps) {
		if s*power < x*(1-slack) {
			return s * power
		}
	}
	return x
}

// pan and box leave the picture as it is: its zero stays in the middle.
func (g *termGuide) pan(v view, _, _ float64) view  { return v }
func (g *termGuide) box(v view, _ figure.Rect) view { return v }
