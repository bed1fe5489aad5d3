package figure

import "math"

// drawEntropy draws S(E), its peak and the scale below it.
func (g *Geometry) drawEntropy(p *pen) {
	e := g.Entropy
	if e == nil {
		return
	}
	ink := p.style.Palette
	edge := stroke{width: 1, color: ink.Edge}
	p.line(edge, Point{e.Box.X0, g.Sky.Y1}, Point{e.Box.X0, g.Ground.Y0})
	for _, s := range [...]float64{0, e.Largest} {
		p.line(edge, Point{e.X(s), g.Plot.Y1 - 4}, Point{e.X(s), g.Plot.Y1})
	}
	curve := stroke{width: 2.5, color: ink.Ink}
	if e.Stale {
		curve = stroke{width: 1.5, color: ink.Soft, dash: dashes[Pinned]}
	}
	bands(e.line(), g.Sky.Y1, g.Ground.Y0, func(q []Point) { p.line(curve, q...) })
	if !e.Stale && g.Scale.Holds(e.Peak.Hz) {
		p.circle(e.Peak.At, 4.5, stroke{width: 1.5, color: ink.Ink})
	}
}

// line is S(E) as a polyline.
func (e *EntropyPanel) line() []Point {
	line := make([]Point, len(e.Points))
	for i, p := range e.Points {
		line[i] = p.At
	}
	return line
}

// drawTangent draws the tangent at the state and the state's mark on the curve.
func (g *Geometry) drawTangent(p *pen) {
	if g.Entropy == nil || g.Entropy.State == nil {
		return
	}
	p.line(stroke{width: 1.5, color: p.style.Palette.Ink}, g.Entropy.Tangent[:]...)
	p.diamond(g.Entropy.State.At, 12)
}

// drawRuler draws the line of -1/T where it is single-valued, with its ticks.
func (g *Geometry) drawRuler(p *pen) {
	edge := stroke{width: 1, color: p.style.Palette.Edge}
	x, e := g.Ruler.X0, g.Entropy
	if e == nil {
		p.line(edge, Point{x, g.Sky.Y1}, Point{x, g.Ground.Y0})
		return
	}
	for _, span := range e.Spans {
		top, bottom := math.Max(g.Scale.Y(span[1]), g.Sky.Y1), math.Min(g.Scale.Y(span[0]), g.Ground.Y0)
		if bottom > top {
			p.line(edge, Point{x, top}, Point{x, bottom})
		}
	}
	for _, t := range e.Ticks {
		p.line(edge, Point{x, t.Y}, Point{x + 6, t.Y})
	}
}
