package figure

import "math"

// miterLimit is the longest pointed corner, in widths of the line.
const miterLimit = 4

// line adds a stroked polyline: a quadrangle per piece and a wedge per corner.
// half is half its width. Ends are cut square.
func (c *coverage) line(points []Point, closed bool, half float64) {
	n := len(points)
	if n < 2 {
		return
	}
	pieces := n - 1
	if closed {
		pieces = n
	}
	var first, before Point // directions
	started := false
	for i := range pieces {
		p, q := points[i], points[(i+1)%n]
		length := math.Hypot(q.X-p.X, q.Y-p.Y)
		if length == 0 {
			continue
		}
		along := Point{(q.X - p.X) / length, (q.Y - p.Y) / length}
		across := Point{-along.Y * half, along.X * half}
		c.convex(Point{p.X + across.X, p.Y + across.Y}, Point{q.X + across.X, q.Y + across.Y},
			Point{q.X - across.X, q.Y - across.Y}, Point{p.X - across.X, p.Y - across.Y})
		if started {
			c.corner(p, before, along, half)
		} else {
			first, started = along, true
		}
		before = along
	}
	if closed && started {
		c.corner(points[0], before, first, half)
	}
}

// corner fills the outer wedge between two pieces that meet at p.
func (c *coverage) corner(p, before, after Point, half float64) {
	turn := before.X*after.Y - before.Y*after.X
	along := before.X*after.X + before.Y*after.Y
	if math.Abs(turn) < 1e-9 {
		return
	}
	side := -half
	if turn < 0 {
		side = half
	}
	m := Point{p.X - before.Y*side, p.Y + before.X*side}
	n := Point{p.X - after.Y*side, p.Y + after.X*side}
	// The point of the corner is at (m + n)/2 stretched by 2/(1 + cos).
	if 2/(1+along) > miterLimit*miterLimit {
		c.convex(p, m, n)
		return
	}
	reach := side / (1 + along)
	c.convex(p, m, Point{p.X - (before.Y+after.Y)*reach, p.Y + (before.X+after.X)*reach}, n)
}

// dashed cuts a polyline into dashes and hands each to use. The pattern gives the
// lengths of dashes and gaps in turn and starts at offset.
func dashed(points []Point, closed bool, pattern []float64, offset float64, use func([]Point)) {
	total := 0.0
	for _, p := range pattern {
		total += p
	}
	if !(total > 0) {
		use(points)
		return
	}
	index, left := start(pattern, math.Mod(math.Mod(offset, total)+total, total))
	n := len(points)
	pieces := n - 1
	if closed {
		pieces = n
	}
	dash := []Point{points[0]}
	for i := range pieces {
		p, q := points[i], points[(i+1)%n]
		length := math.Hypot(q.X-p.X, q.Y-p.Y)
		done := 0.0
		for length-done > left {
			done += left
			at := Point{p.X + (q.X-p.X)*done/length, p.Y + (q.Y-p.Y)*done/length}
			if index%2 == 0 {
				use(append(dash, at))
			}
			dash = append(dash[:0], at)
			index = (index + 1) % len(pattern)
			left = pattern[index]
		}
		left -= length - done
		dash = append(dash, q)
	}
	if index%2 == 0 && len(dash) > 1 {
		use(dash)
	}
}

// start finds where in a pattern an offset lies: the entry and what is left of it.
func start(pattern []float64, offset float64) (index int, left float64) {
	for offset >= pattern[index] {
		offset -= pattern[index]
		index = (index + 1) % len(pattern)
	}
	return index, pattern[index] - offset
}

// upright reports whether every piece is horizontal or vertical.
func upright(points []Point, closed bool) bool {
	const slack = 1e-6
	n := len(points)
	pieces := n - 1
	if closed {
		pieces = n
	}
	for i := range pieces {
		p, q := points[i], points[(i+1)%n]
		if math.Abs(p.X-q.X) > slack && math.Abs(p.Y-q.Y) > slack {
			return false
		}
	}
	return pieces > 0
}
