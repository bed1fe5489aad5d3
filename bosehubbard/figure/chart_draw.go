package figure

import (
	"math"
	"sort"
)

func (u *Curve) stroke(s Style) stroke {
	out := stroke{width: u.Width, color: s.Palette.Ink, dash: dashes[u.Dash]}
	if out.width == 0 {
		out.width = 2.5
	}
	if u.Soft {
		out.color = s.Palette.Soft
	}
	return out
}

// draw draws the part of the curve inside the area.
func (u *Curve) draw(p *pen, a Area, s stroke) {
	clip(len(u.X), func(i int) Point { return a.Pixel(u.X[i], u.Y[i]) }, a.Rect, func(points []Point) { p.line(s, points...) })
}

// clip hands the parts of a polyline inside a rectangle to use; NaN parts it.
func clip(n int, at func(int) Point, r Rect, use func([]Point)) {
	part := make([]Point, 0, n)
	flush := func() {
		if len(part) > 1 {
			use(part)
		}
		part = part[:0]
	}
	if n == 0 {
		return
	}
	p := at(0)
	for i := 1; i < n; i++ {
		q := at(i)
		from, to, ok := cutPiece(p, q, r)
		p = q
		if !ok {
			flush()
			continue
		}
		if len(part) == 0 || part[len(part)-1] != from {
			flush()
			part = append(part, from)
		}
		part = append(part, to)
	}
	flush()
}

// cutPiece cuts a piece at the borders of a rectangle; ok is false where nothing
// is left.
//
// Source: Liang and Barsky, ACM Trans. Graphics 3, 1 (1984), from memory.
func cutPiece(p, q Point, r Rect) (from, to Point, ok bool) {
	enter, leave := 0.0, 1.0
	dx, dy := q.X-p.X, q.Y-p.Y
	if math.IsNaN(dx + dy) {
		return p, q, false
	}
	for _, side := range [...][2]float64{{-dx, p.X - r.X0}, {dx, r.X1 - p.X}, {-dy, p.Y - r.Y0}, {dy, r.Y1 - p.Y}} {
		switch t := side[1] / side[0]; {
		case side[0] == 0 && side[1] < 0:
			return p, q, false
		case side[0] < 0:
			enter = math.Max(enter, t)
		case side[0] > 0:
			leave = math.Min(leave, t)
		}
	}
	if !(enter <= leave) {
		return p, q, false
	}
	from, to = p, q
	if enter > 0 {
		from = between(p, q, enter)
	}
	if leave < 1 {
		to = between(p, q, leave)
	}
	return from, to, true
}

// keepCurvesFree keeps names off the curves.
func (c *Chart) keepCurvesFree(a Area, place *placer) {
	for i := range c.Curves {
		u := &c.Curves[i]
		half := u.stroke(place.style).width/2 + 1
		clip(len(u.X), func(i int) Point { return a.Pixel(u.X[i], u.Y[i]) }, a.Rect, func(points []Point) {
			for k := 0; k+1 < len(points); k++ {
				place.taken = append(place.taken, boxOf(points[k], points[k+1], half))
			}
		})
	}
}

// boxOf is the box of a piece of a line.
func boxOf(p, q Point, half float64) Rect {
	return Rect{min(p.X, q.X) - half, min(p.Y, q.Y) - half, max(p.X, q.X) + half, max(p.Y, q.Y) + half}
}

func (c *Chart) drawRules(p *pen, a Area) {
	for _, r := range c.Rules {
		if x := a.Pixel(r.X, a.Y.Low).X; x >= a.X0 && x <= a.X1 {
			p.line(stroke{width: 1, color: p.style.Palette.Edge, dash: dashes[r.Dash]}, Point{x, a.Y0}, Point{x, a.Y1})
		}
	}
}

// nameRules writes the names of lines above the area, nearest to their line.
func (c *Chart) nameRules(p *pen, a Area, place *placer) {
	for _, r := range c.Rules {
		x := a.Pixel(r.X, a.Y.Low).X
		if r.Name == "" || x < a.X0 || x > a.X1 {
			continue
		}
		width, _ := place.box(Word, r.Name)
		anchors := []anchor{{Point{x, a.Y0 - 2}, 0.5, 1}}
		for _, shift := range [...]float64{0.5, -0.5} {
			anchors = append(anchors, anchor{Point{x + shift*(width-8), a.Y0 - 2}, 0.5, 1})
		}
		anchors = append(anchors, anchor{Point{x + 4, a.Y0 + 4}, 0, 0}, anchor{Point{x - 4, a.Y0 + 4}, 1, 0},
			anchor{Point{x + 4, a.Y0 + 20}, 0, 0}, anchor{Point{x - 4, a.Y0 + 20}, 1, 0})
		place.put(Word, r.Name, anchors...)
	}
}

func (c *Chart) hasRuleNames() bool {
	for _, r := range c.Rules {
		if r.Name != "" {
			return true
		}
	}
	return false
}

// drawMarks draws points and writes their names beside them.
func (c *Chart) drawMarks(p *pen, a Area, place *placer) {
	ink := p.style.Palette
	for _, m := range c.Marks {
		at := a.Pixel(m.X, m.Y)
		if !a.Contains(at) {
			continue
		}
		if m.Open {
			p.circle(at, 4.5, stroke{width: 2, color: ink.Ink})
		} else {
			p.disc(at, 4.5)
		}
		place.taken = append(place.taken, Rect{at.X - 6, at.Y - 6, at.X + 6, at.Y + 6})
	}
	for _, m := range c.Marks {
		at := a.Pixel(m.X, m.Y)
		if !a.Contains(at) {
			continue
		}
		var anchors []anchor
		for _, d := range [...]float64{11, 18, 28, 40} {
			anchors = append(anchors, anchor{Point{at.X + d, at.Y - d}, 0, 0.5}, anchor{Point{at.X + d, at.Y + d}, 0, 0.5},
				anchor{Point{at.X - d, at.Y - d}, 1, 0.5}, anchor{Point{at.X - d, at.Y + d}, 1, 0.5})
		}
		place.put(Word, m.Name, anchors...)
	}
}

// drawBrackets draws spans along y with their names left of them.
func (c *Chart) drawBrackets(p *pen, a Area, place *placer) {
	s := stroke{width: 1.5, color: p.style.Palette.Ink}
	for _, b := range c.Brackets {
		low, high := a.Pixel(b.X, b.Low), a.Pixel(b.X, b.High)
		x := math.Min(low.X, a.X1-2) - 6
		if low.X < a.X0 || low.X > a.X1+0.5 || high.Y > a.Y1 || low.Y < a.Y0 {
			continue
		}
		top, bottom := math.Max(high.Y, a.Y0), math.Min(low.Y, a.Y1)
		p.line(s, Point{x + 5, top}, Point{x, top}, Point{x, bottom}, Point{x + 5, bottom})
		place.put(Quantity, b.Name, near(Point{x - 6, (top + bottom) / 2}, 1, 8, 40)...)
	}
}

// namesWidth is the room right of the area for the names of curves.
func (c *Chart) namesWidth(s Style) float64 {
	widest := 0.0
	for _, u := range c.Curves {
		widest = math.Max(widest, words.measure(s, u.Name))
	}
	return widest
}

// nameCurves writes the name of every curve where it ends, moved apart where they
// come close.
func (c *Chart) nameCurves(p *pen, a Area, place *placer) {
	type end struct {
		name string
		at   Point
	}
	var ends []end
	for i := range c.Curves {
		u := &c.Curves[i]
		if at, ok := u.end(a); ok && u.Name != "" {
			ends = append(ends, end{u.Name, at})
		}
	}
	sort.SliceStable(ends, func(i, j int) bool { return ends[i].at.Y < ends[j].at.Y })
	row := words.height(p.style)
	free := math.Inf(-1)
	for i, e := range ends {
		// Leave room for those below.
		y := math.Min(math.Max(e.at.Y, free), a.Y1-row*(float64(len(ends)-i)-0.5))
		free = y + row
		at := anchor{Point{e.at.X + 6, y}, 0, 0.5}
		if math.Abs(y-e.at.Y) > 3 {
			p.line(stroke{width: 1, color: p.style.Palette.Edge}, Point{e.at.X + 1, e.at.Y}, Point{e.at.X + 5, y})
		}
		place.put(Word, e.name, append([]anchor{at}, near(Point{e.at.X + 6, y}, 0, row/2, 4*row)...)...)
	}
}

// end is the last place of the curve inside the area.
func (u *Curve) end(a Area) (at Point, ok bool) {
	clip(len(u.X), func(i int) Point { return a.Pixel(u.X[i], u.Y[i]) }, a.Rect, func(points []Point) {
		for _, p := range points {
			if !ok || p.X >= at.X {
				at, ok = p, true
			}
		}
	})
	return at, ok
}
