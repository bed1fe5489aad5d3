package figure

import (
	"math"

	"hilltop/bosehubbard/report"
)

// Sizes of the pieces in px.
const (
	barWidth   = 28.0
	totalWidth = 40.0
	trapWidth  = 10.0
	trapGap    = 3.0
	stillHigh  = 28.0
	overhang   = 8.0
	trapOver   = 2.0
	cutShort   = 6.0 // how far a cut bar stops before the sky
	thinnest   = 6.0 // a thinner bar becomes a pair of lids
)

// drainedBy says which terms a broken leaky criterion drains, besides the total.
var drainedBy = map[string][]string{
	"one_band": {"kinetic"},
	"held":     {"trap_x", "trap_y", "trap_z"},
	"edge":     {"trap_x", "trap_y", "trap_z"},
}

// bars places the terms in four columns: kinetic, interaction, trap, total.
func (b *builder) bars() {
	g := b.g
	pitch := g.Terms.Width() / 4
	column := func(i int) float64 { return g.Terms.X0 + (float64(i)+0.5)*pitch }
	drained := b.drained()
	traps := 0
	for _, t := range b.report.Ceiling.Terms {
		if axisOf(t.Term) != "" {
			traps++
		}
	}
	trapLeft := column(2) - (float64(traps)*trapWidth+float64(traps-1)*trapGap)/2
	for _, t := range b.report.Ceiling.Terms {
		centre, width, over := column(1), barWidth, overhang
		switch {
		case t.Term == "kinetic":
			centre = column(0)
		case axisOf(t.Term) != "":
			centre, width, over = trapLeft+trapWidth/2, trapWidth, trapOver
			trapLeft += trapWidth + trapGap
		}
		bar := b.bar(t.Term, t.Bounds, centre, width)
		bar.Overhang = over
		if t.Reason != "" {
			zero := g.Scale.zero()
			bar.Still, bar.Reason = true, t.Reason
			bar.Upper.Y, bar.Lower.Y = zero-stillHigh/2, zero+stillHigh/2
		}
		bar.drain(drained[t.Term])
		g.Bars = append(g.Bars, bar)
	}
	g.Total = b.bar("total", b.report.Ceiling.Total, column(3), totalWidth)
	g.Total.Overhang = overhang
	g.Total.drain(drained["total"])
	g.Open = g.Total.Fill == Unbounded
	b.exact()
}

// drained lists what leaks.
func (b *builder) drained() map[string]bool {
	out := map[string]bool{}
	for _, c := range b.report.Ceiling.Criteria {
		if c.Passed || c.Breaks != "leaky" {
			continue
		}
		out["total"] = true
		for _, term := range drainedBy[c.Name] {
			out[term] = true
		}
	}
	return out
}

// drain marks a bounded bar as drained.
func (b *Bar) drain(leaks bool) {
	if leaks && b.Fill == Bounded && !b.Still {
		b.Fill = Drained
	}
}

func (b *builder) bar(term string, bounds report.Bounds, centre, width float64) Bar {
	bar := Bar{Term: term, X0: centre - width/2, X1: centre + width/2}
	bar.Upper, bar.Lower = b.end(bounds.Ceiling), b.end(bounds.Floor)
	bar.Upper.Counts, bar.Lower.Counts = b.g.Upwards, !b.g.Upwards
	if bar.Counting().Kind == Strips {
		bar.Fill = Unbounded
	}
	bounded := bar.Upper.Kind != Strips && bar.Lower.Kind != Strips
	bar.Pair = bounded && math.Abs(bar.Lower.Y-bar.Upper.Y) < thinnest
	return bar
}

// end places a bound: at its height, at the sky or ground where there is none, and
// short of them where it lies beyond the range.
func (b *builder) end(bound report.Bound) End {
	s := b.g.Scale
	end := End{Hz: bound.Hz}
	switch {
	case bound.Unbounded() && bound.Hz > 0:
		end.Kind, end.Y = Strips, b.g.Sky.Y1
	case bound.Unbounded():
		end.Kind, end.Y = Strips, b.g.Ground.Y0
	case bound.Hz > s.HalfRange:
		end.Kind, end.Y = Cut, b.g.Sky.Y1+cutShort
	case bound.Hz < -s.HalfRange:
		end.Kind, end.Y = Cut, b.g.Ground.Y0-cutShort
	default:
		end.Y = s.Y(bound.Hz)
	}
	return end
}

// exact places the ends of growing systems that lie within the range.
func (b *builder) exact() {
	for _, e := range b.report.Ceiling.Exact {
		hz := e.Ceiling
		if !b.g.Upwards {
			hz = e.Floor
		}
		if b.g.Scale.Holds(hz) {
			b.g.Exact = append(b.g.Exact, Tick{Hz: hz, Y: b.g.Scale.Y(hz)})
		}
	}
}

// carry draws the sum of the ends that count from bar to bar.
func (b *builder) carry() {
	g := b.g
	if len(g.Bars) == 0 || g.Bars[0].Still {
		return
	}
	first := &g.Bars[0]
	sum := first.Counting().Hz
	if math.IsInf(sum, 0) {
		return
	}
	y := b.within(sum)
	g.Carry = []Point{{first.X1 + first.Overhang, y}}
	for i := 1; i < len(g.Bars); i++ {
		bar := &g.Bars[i]
		if bar.Still {
			continue
		}
		end := bar.Counting()
		if end.Kind == Strips {
			turn := math.Max(b.groupLeft(i)-5, g.Carry[len(g.Carry)-1].X)
			g.Carry = append(g.Carry, Point{turn, y}, Point{turn, b.beyond()})
			return
		}
		sum += end.Hz
		if next := b.within(sum); next != y {
			g.Carry = append(g.Carry, Point{bar.Centre(), y}, Point{bar.Centre(), next})
			y = next
		}
	}
	g.Carry = append(g.Carry, Point{g.Total.X0 - g.Total.Overhang, y})
}

// groupLeft is the left edge of a bar and of the bars close to it.
func (b *builder) groupLeft(i int) float64 {
	for i > 0 && b.g.Bars[i].X0-b.g.Bars[i-1].X1 < 2*trapGap {
		i--
	}
	return b.g.Bars[i].X0 - b.g.Bars[i].Overhang
}

// within is the height of a sum, stopped short of the sky and the ground.
func (b *builder) within(hz float64) float64 {
	return b.end(report.Bound{Known: true, Hz: hz}).Y
}

// beyond is the edge of the frame on the side that counts.
func (b *builder) beyond() float64 {
	if b.g.Upwards {
		return b.g.Sky.Y0
	}
	return b.g.Ground.Y1
}

// ceiling draws the line from the total's lid to the ruler, and the state.
func (b *builder) ceiling() {
	g := b.g
	if end := g.Total.Counting(); end.Kind != Strips {
		g.Ceiling = Line{Hz: end.Hz, X0: g.Total.X1 + g.Total.Overhang, X1: g.Ruler.X0, Y: end.Y}
	}
	if s := b.options.State; s != nil && !g.Open && g.Scale.Holds(*s) {
		g.State = &Line{Hz: *s, X0: g.Plot.X0, X1: g.Ruler.X0, Y: g.Scale.Y(*s)}
	}
}

// pinned outlines the bars of another report on the same scale.
func (b *builder) pinned() {
	p := b.options.Pinned
	if p == nil {
		return
	}
	outline := func(bounds report.Bounds, bar *Bar) {
		upper, lower := b.end(bounds.Ceiling), b.end(bounds.Floor)
		b.g.Pinned = append(b.g.Pinned, Rect{bar.X0 - 3, upper.Y, bar.X1 + 3, lower.Y})
	}
	for _, t := range p.Ceiling.Terms {
		for i := range b.g.Bars {
			if bar := &b.g.Bars[i]; bar.Term == t.Term && t.Reason == "" {
				outline(t.Bounds, bar)
			}
		}
	}
	outline(p.Ceiling.Total, &b.g.Total)
}
