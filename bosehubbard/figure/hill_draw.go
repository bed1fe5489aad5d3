package figure

// hillEdge is the end of the kinetic band that counts, Hz.
func (g *Geometry) hillEdge() float64 {
	if g.Upwards {
		return g.Slope.Ceiling
	}
	return g.Slope.Floor
}

// hillEdges are the upper and the lower edge of the band.
func (g *Geometry) hillEdges() (upper, lower []Point) {
	const pieces = 96
	s := g.Slope
	upper, lower = make([]Point, 0, pieces+1), make([]Point, 0, pieces+1)
	for i := range pieces + 1 {
		x := s.Box.X0 + s.Box.Width()*float64(i)/pieces
		site := s.Site(x)
		upper = append(upper, Point{x, g.Scale.Y(s.edge(site, s.Ceiling))})
		lower = append(lower, Point{x, g.Scale.Y(s.edge(site, s.Floor))})
	}
	return upper, lower
}

// drawHill draws the band V x^2 + floor ... V x^2 + ceiling: a grey strip with
// edges that break into dashes where they leave the linear part.
func (g *Geometry) drawHill(p *pen) {
	s := g.Slope
	if s == nil {
		return
	}
	ink := p.style.Palette
	top, bottom := g.Sky.Y1, g.Ground.Y0
	upper, lower := g.hillEdges()
	strip := make([]Point, 0, 2*len(upper))
	clamp := func(q Point) Point { return Point{q.X, min(max(q.Y, top), bottom)} }
	for _, q := range upper {
		strip = append(strip, clamp(q))
	}
	for i := len(lower) - 1; i >= 0; i-- {
		strip = append(strip, clamp(lower[i]))
	}
	p.area(ink.grey(), strip...)
	solid := stroke{width: 2.5, color: ink.Ink}
	broken := stroke{width: 2.5, color: ink.Ink, dash: []float64{5, 5}}
	for _, edge := range [...][]Point{upper, lower} {
		bands(edge, top, bottom, func(q []Point) { p.line(solid, q...) })
		bands(edge, g.Plot.Y0, top, func(q []Point) { p.line(broken, q...) })
		bands(edge, bottom, g.Plot.Y1, func(q []Point) { p.line(broken, q...) })
	}
	g.drawHillTicks(p)
}

// drawHillTicks marks the ends and the middle of the x scale, and where |V| x^2 is
// the width of the band.
func (g *Geometry) drawHillTicks(p *pen) {
	s, ink := g.Slope, p.style.Palette
	edge := stroke{width: 1, color: ink.Edge}
	for _, site := range [...]float64{-s.Reach, -s.Reach / 2, 0, s.Reach / 2, s.Reach} {
		x := s.X(site)
		p.line(edge, Point{x, g.Plot.Y1 - 4}, Point{x, g.Plot.Y1})
	}
	if s.Turn == 0 {
		return
	}
	for _, site := range [...]float64{-s.Turn, s.Turn} {
		y := g.Scale.Y(s.edge(site, g.hillEdge()))
		if y >= g.Plot.Y0+6 && y <= g.Plot.Y1-6 {
			p.line(stroke{width: 1.5, color: ink.Ink}, Point{s.X(site), y - 6}, Point{s.X(site), y + 6})
		}
	}
}

// bands hands the parts of a polyline between two heights to use.
func bands(points []Point, top, bottom float64, use func([]Point)) {
	var part []Point
	flush := func() {
		if len(part) > 1 {
			use(part)
		}
		part = part[:0]
	}
	for i := 0; i+1 < len(points); i++ {
		p, q, ok := cutBetween(points[i], points[i+1], top, bottom)
		if !ok {
			flush()
			continue
		}
		if len(part) == 0 || part[len(part)-1] != p {
			flush()
			part = append(part, p)
		}
		part = append(part, q)
	}
	flush()
}

// cutBetween cuts a piece at two heights; ok is false where nothing is left.
func cutBetween(p, q Point, top, bottom float64) (a, b Point, ok bool) {
	cut := func(y float64) Point {
		if p.Y == q.Y {
			return Point{p.X, y}
		}
		return Point{p.X + (q.X-p.X)*(y-p.Y)/(q.Y-p.Y), y}
	}
	if p.Y < top && q.Y < top || p.Y > bottom && q.Y > bottom {
		return p, q, false
	}
	limit := func(r Point) Point {
		switch {
		case r.Y < top:
			return cut(top)
		case r.Y > bottom:
			return cut(bottom)
		}
		return r
	}
	return limit(p), limit(q), true
}
