package figure

import (
	"image/color"
	"math"

	"gonum.org/v1/plot/vg"
)

// Draw draws what the geometry holds.
func (g *Geometry) Draw(c vg.Canvas, f Frame, s Style) {
	p := newPen(c, f, s)
	ink := s.Palette
	p.fill(g.Frame, ink.Paper)
	p.fill(g.Sky, ink.Panel)
	p.fill(g.Ground, ink.Panel)
	g.drawAxis(p)
	g.drawHill(p)
	g.drawEntropy(p)
	bars := append(append([]Bar(nil), g.Bars...), g.Total)
	for i := range bars {
		g.drawBody(p, &bars[i])
	}
	p.line(stroke{width: 1.5, color: ink.Ink, dash: dashes[Dashed]}, g.Carry...)
	if g.Ceiling.X1 > g.Ceiling.X0 {
		p.line(stroke{width: 2, color: ink.Ink}, Point{g.Ceiling.X0, g.Ceiling.Y}, Point{g.Ceiling.X1, g.Ceiling.Y})
	}
	for i := range bars {
		g.drawEnds(p, &bars[i])
	}
	for _, t := range g.Exact {
		p.line(stroke{width: 1.5, color: ink.Ink}, Point{g.Total.X1, t.Y}, Point{g.Total.X1 + 6, t.Y})
	}
	for _, r := range g.Pinned {
		p.frame(stroke{width: 1, color: ink.Soft, dash: dashes[Pinned]}, r)
	}
	g.drawState(p)
	g.drawTangent(p)
	g.drawSizes(p)
	p.drawLabels(g.Labels)
}

// drawAxis draws zero across the plot, the ticks at its left, and the ruler.
func (g *Geometry) drawAxis(p *pen) {
	ink := p.style.Palette
	p.line(stroke{width: 1, color: ink.Edge}, Point{g.Plot.X0, g.Scale.zero()}, Point{g.Plot.X1, g.Scale.zero()})
	edge := stroke{width: 1, color: ink.Edge}
	p.line(edge, Point{g.Plot.X0, g.Sky.Y1}, Point{g.Plot.X0, g.Ground.Y0})
	for _, t := range g.Ticks {
		p.line(edge, Point{g.Plot.X0 - 4, t.Y}, Point{g.Plot.X0, t.Y})
	}
	g.drawRuler(p)
}

// drawBody draws the bar between its ends and the strips beyond them.
func (g *Geometry) drawBody(p *pen, b *Bar) {
	ink := p.style.Palette
	body := b.Body()
	if b.Term == "total" && g.Rungs != nil {
		g.drawLadder(p)
		return
	}
	if b.Still {
		p.frame(stroke{width: 1.5, color: ink.Soft}, body)
		return
	}
	if !b.Pair {
		p.fill(body, ink.of(b.Fill))
		side := stroke{width: 1.5, color: ink.Ink}
		p.line(side, Point{b.X0 + 0.75, body.Y0}, Point{b.X0 + 0.75, body.Y1})
		p.line(side, Point{b.X1 - 0.75, body.Y0}, Point{b.X1 - 0.75, body.Y1})
	}
	for _, end := range [...]End{b.Upper, b.Lower} {
		if end.Kind != Strips {
			continue
		}
		shade := ink.Soft
		if end.Counts {
			shade = ink.of(b.Fill)
		}
		g.drawStrips(p, b, end.Hz > 0, shade)
	}
}

// drawStrips draws strips that thin out to the edge of the frame.
func (g *Geometry) drawStrips(p *pen, b *Bar, up bool, shade color.Color) {
	y, far, sign := g.Sky.Y1, g.Sky.Y0, -1.0
	if !up {
		y, far, sign = g.Ground.Y0, g.Ground.Y1, 1
	}
	room := math.Abs(far - y)
	// Seven strips of 7 to 1 px, gaps of 2 to 8, stretched where there is room.
	const wanted = 7 + 6 + 5 + 4 + 3 + 2 + 1 + 2 + 3 + 4 + 5 + 6 + 7 + 8
	unit := math.Max(1, room/wanted)
	for i := range 7 {
		y += sign * float64(2+i) * unit
		high := float64(7-i) * unit
		next := y + sign*high
		top, bottom := math.Max(math.Min(y, next), g.Plot.Y0), math.Min(math.Max(y, next), g.Plot.Y1)
		if bottom > top {
			p.fill(Rect{b.X0, top, b.X1, bottom}, shade)
		}
		y = next
	}
}

// drawEnds draws lids, split lids and cuts.
func (g *Geometry) drawEnds(p *pen, b *Bar) {
	if b.Still {
		return
	}
	if g.Rungs != nil {
		g.drawLids(p, *b)
		return
	}
	g.drawEnd(p, b, b.Upper, 1)
	g.drawEnd(p, b, b.Lower, -1)
}

// drawEnd draws one end; inward is +1 where the bar lies below it.
func (g *Geometry) drawEnd(p *pen, b *Bar, end End, inward float64) {
	ink := p.style.Palette
	if end.Kind == Strips {
		return
	}
	if end.Kind == Cut {
		g.drawCuts(p, b, end.Y, inward)
	}
	if !end.Counts {
		p.line(stroke{width: 2, color: ink.Ink}, Point{b.X0, end.Y}, Point{b.X1, end.Y})
		return
	}
	left, right := b.X0-b.Overhang, b.X1+b.Overhang
	lid := stroke{width: 4, color: ink.Ink}
	turned := stroke{width: 2, color: ink.Ink}
	if b.Overhang < overhang {
		turned.width = 1
	}
	p.line(turned, Point{left + turned.width/2, end.Y}, Point{left + turned.width/2, end.Y + 8*inward})
	p.line(turned, Point{right - turned.width/2, end.Y}, Point{right - turned.width/2, end.Y + 8*inward})
	if b.Fill != Drained {
		p.line(lid, Point{left, end.Y}, Point{right, end.Y})
		return
	}
	gap := math.Min(12, 0.45*(right-left))
	middle := b.Centre()
	p.line(lid, Point{left, end.Y}, Point{middle - gap/2, end.Y})
	p.line(lid, Point{middle + gap/2, end.Y}, Point{right, end.Y})
	g.drawDrain(p, Point{middle, end.Y}, inward)
}

// stemHigh is how far the arrow of a drained lid rises.
const stemHigh = 24.0

// drawDrain draws the stem through a split lid and its open arrow.
func (g *Geometry) drawDrain(p *pen, at Point, inward float64) {
	s := stroke{width: 2, color: p.style.Palette.Ink}
	tip := Point{at.X, at.Y - stemHigh*inward}
	p.line(s, at, tip)
	p.line(s, Point{tip.X - 5, tip.Y + 6*inward}, tip, Point{tip.X + 5, tip.Y + 6*inward})
}

// drawCuts draws two slanted cuts through a bar that ends beyond the range.
func (g *Geometry) drawCuts(p *pen, b *Bar, y, inward float64) {
	ink := p.style.Palette
	for _, d := range [...]float64{12, 18} {
		left, right := Point{b.X0 - 3, y + (d+3)*inward}, Point{b.X1 + 3, y + (d-3)*inward}
		p.line(stroke{width: 3, color: ink.Paper}, left, right)
	}
	for _, d := range [...]float64{10.5, 19.5} {
		left, right := Point{b.X0 - 3, y + (d+3)*inward}, Point{b.X1 + 3, y + (d-3)*inward}
		p.line(stroke{width: 1.5, color: ink.Ink}, left, right)
	}
}

// drawState draws the line through the state and its marks.
func (g *Geometry) drawState(p *pen) {
	if g.State == nil {
		return
	}
	p.line(stroke{width: 2, color: p.style.Palette.Ink, dash: dashes[Dotted]},
		Point{g.State.X0, g.State.Y}, Point{g.State.X1, g.State.Y})
	p.diamond(Point{g.Total.Centre(), g.State.Y}, 12)
	p.diamond(Point{g.State.X1, g.State.Y}, 12)
	if g.Slope == nil || g.Slope.Curvature == 0 {
		return
	}
	if square := (g.State.Hz - g.hillEdge()) / g.Slope.Curvature; square >= 0 {
		if x := g.Slope.X(math.Sqrt(square)); x <= g.Slope.Box.X1 {
			p.diamond(Point{x, g.State.Y}, 12)
		}
	}
}

// drawSizes draws the log line of sizes.
func (g *Geometry) drawSizes(p *pen) {
	ink, line := p.style.Palette, &g.Size
	if len(line.Marks)+len(line.Zero) == 0 {
		return
	}
	edge := stroke{width: 1, color: ink.Edge}
	p.line(edge, Point{line.X0, line.Y}, Point{line.X1, line.Y})
	for d := line.Low; d <= line.High; d++ {
		x := line.X0 + (d-line.Low)/(line.High-line.Low)*(line.X1-line.X0)
		p.line(edge, Point{x, line.Y - 3}, Point{x, line.Y + 3})
	}
	for _, m := range line.Marks {
		p.line(stroke{width: 2.5, color: ink.Ink}, Point{m.X, line.Y - 5}, Point{m.X, line.Y + 5})
	}
}
