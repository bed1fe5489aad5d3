package figure

import (
	"math"

	"gonum.org/v1/plot/vg"
)

// affine is the map x' = ax + cy + e, y' = bx + dy + f.
type affine struct{ a, b, c, d, e, f float64 }

func (m affine) apply(x, y float64) Point {
	return Point{m.a*x + m.c*y + m.e, m.b*x + m.d*y + m.f}
}

// before returns the map that applies n first and m then.
func (m affine) before(n affine) affine {
	return affine{
		a: m.a*n.a + m.c*n.b, b: m.b*n.a + m.d*n.b,
		c: m.a*n.c + m.c*n.d, d: m.b*n.c + m.d*n.d,
		e: m.a*n.e + m.c*n.f + m.e, f: m.b*n.e + m.d*n.f + m.f,
	}
}

func rotation(rad float64) affine {
	sin, cos := math.Sincos(rad)
	return affine{cos, sin, -sin, cos, 0, 0}
}

// stretch is the factor by which the map enlarges lengths, on average.
func (m affine) stretch() float64 { return math.Sqrt(math.Abs(m.a*m.d - m.b*m.c)) }

// trace is a path cut into straight pieces.
type trace struct {
	points []Point
	closed bool
}

// flatten maps a path and replaces its curves by straight pieces that stay within
// a tenth of a pixel. It reuses dst.
func flatten(dst []trace, path vg.Path, m affine) []trace {
	dst = dst[:0]
	begin := func(p Point) {
		if len(dst) < cap(dst) {
			dst = dst[:len(dst)+1]
			dst[len(dst)-1].points = append(dst[len(dst)-1].points[:0], p)
			dst[len(dst)-1].closed = false
			return
		}
		dst = append(dst, trace{points: []Point{p}})
	}
	add := func(p Point) {
		if len(dst) == 0 {
			begin(p)
			return
		}
		last := &dst[len(dst)-1]
		if last.closed { // a new piece starts where the closed one began
			begin(last.points[0])
			last = &dst[len(dst)-1]
		}
		last.points = append(last.points, p)
	}
	var at vg.Point
	for _, part := range path {
		switch part.Type {
		case vg.MoveComp:
			begin(m.apply(float64(part.Pos.X), float64(part.Pos.Y)))
		case vg.LineComp:
			add(m.apply(float64(part.Pos.X), float64(part.Pos.Y)))
		case vg.ArcComp:
			arc(part, m, add)
		case vg.CurveComp:
			curve(at, part, m, add)
		case vg.CloseComp:
			if len(dst) > 0 {
				dst[len(dst)-1].closed = true
			}
		}
		at = part.Pos
	}
	return dst
}

// arc adds an arc of a circle.
func arc(part vg.PathComp, m affine, add func(Point)) {
	const tolerance = 0.1
	radius := float64(part.Radius) * m.stretch()
	step := math.Pi / 4
	if radius > tolerance {
		step = min(step, 2*math.Acos(1-tolerance/radius))
	}
	n := max(1, int(math.Ceil(math.Abs(part.Angle)/step)))
	for i := 0; i <= n; i++ {
		sin, cos := math.Sincos(part.Start + part.Angle*float64(i)/float64(n))
		add(m.apply(float64(part.Pos.X)+float64(part.Radius)*cos, float64(part.Pos.Y)+float64(part.Radius)*sin))
	}
}

// curve adds a Bezier curve with one or two control points.
func curve(from vg.Point, part vg.PathComp, m affine, add func(Point)) {
	const pieces = 16
	control := append(append([]vg.Point{from}, part.Control...), part.Pos)
	var level [4]vg.Point
	for i := 1; i <= pieces; i++ {
		t := vg.Length(i) / pieces
		n := copy(level[:], control)
		for ; n > 1; n-- {
			for k := 0; k < n-1; k++ {
				level[k] = level[k].Scale(1 - t).Add(level[k+1].Scale(t))
			}
		}
		add(m.apply(float64(level[0].X), float64(level[0].Y)))
	}
}
