package figure

import (
	"image"
	"image/color"
	"math"
)

// coverage collects shapes as the signed area that their edges cut off in every
// pixel, then paints them in one colour. Pieces that turn the same way may overlap:
// what they cover is cut at one.
//
// An edge adds to each pixel of a row how much of that pixel and of all pixels to
// its right lies beyond it; the running sum along the row is the coverage.
type coverage struct {
	width, height int
	sum           []float32
	low, high     []int // columns touched in each row
	top, bottom   int   // rows touched
}

// resize makes room for an image; all sums are zero.
func (c *coverage) resize(width, height int) {
	if width == c.width && height == c.height {
		return
	}
	c.width, c.height = width, height
	// Two more columns take what falls on and beyond the right border.
	if need := (width + 2) * height; cap(c.sum) < need {
		c.sum = make([]float32, need)
	} else {
		c.sum = c.sum[:need]
	}
	if cap(c.low) < height {
		c.low, c.high = make([]int, height), make([]int, height)
	}
	c.low, c.high = c.low[:height], c.high[:height]
	for i := range c.low {
		c.low[i], c.high[i] = width+2, -1
	}
	c.top, c.bottom = height, 0
}

// edge adds a directed edge. Parts left of the image count as its left border.
func (c *coverage) edge(p, q Point) {
	if p.Y == q.Y {
		return
	}
	direction := 1.0
	if p.Y > q.Y {
		p, q, direction = q, p, -1
	}
	if q.Y <= 0 || p.Y >= float64(c.height) {
		return
	}
	slope := (q.X - p.X) / (q.Y - p.Y)
	p, q = cutRows(p, q, slope, float64(c.height))
	// Cut at both vertical borders, so that inside no edge leaves the image.
	borders := [...]float64{0, float64(c.width)}
	if slope < 0 {
		borders[0], borders[1] = borders[1], borders[0]
	}
	for _, border := range borders {
		if (p.X < border) != (q.X < border) && slope != 0 {
			y := p.Y + (border-p.X)/slope
			if y > p.Y && y < q.Y {
				middle := Point{border, y}
				c.piece(p, middle, direction)
				p = middle
			}
		}
	}
	c.piece(p, q, direction)
}

// cutRows cuts an edge at the upper and lower border.
func cutRows(p, q Point, slope, height float64) (Point, Point) {
	if p.Y < 0 {
		p.X -= p.Y * slope
		p.Y = 0
	}
	if q.Y > height {
		q.X -= (q.Y - height) * slope
		q.Y = height
	}
	return p, q
}

// piece adds a downward edge that crosses no vertical border.
func (c *coverage) piece(p, q Point, direction float64) {
	right := float64(c.width)
	if p.X >= right && q.X >= right { // what it closes reaches to the border
		for row := int(p.Y); row < min(int(math.Ceil(q.Y)), c.height); row++ {
			c.high[row] = c.width
		}
		return
	}
	p.X, q.X = min(max(p.X, 0), right), min(max(q.X, 0), right)
	if !(q.Y > p.Y) {
		return
	}
	slope := (q.X - p.X) / (q.Y - p.Y)
	first, last := int(p.Y), min(int(math.Ceil(q.Y)), c.height)
	c.top, c.bottom = min(c.top, first), max(c.bottom, last)
	x := p.X
	for row := first; row < last; row++ {
		dy := min(float64(row+1), q.Y) - max(float64(row), p.Y)
		next := min(max(x+slope*dy, 0), right)
		c.row(row, min(x, next), max(x, next), direction*dy)
		x = next
	}
}

// row adds an edge between two columns of one row; height is its signed height.
func (c *coverage) row(row int, x0, x1, height float64) {
	first, last := int(x0), int(math.Ceil(x1))
	line := c.sum[row*(c.width+2) : (row+1)*(c.width+2)]
	c.low[row] = min(c.low[row], first)
	c.high[row] = max(c.high[row], max(last, first+1))
	if last <= first+1 {
		beyond := 0.5*(x0+x1) - float64(first)
		line[first] += float32(height - height*beyond)
		line[first+1] += float32(height * beyond)
		return
	}
	perColumn := 1 / (x1 - x0)
	head := 1 - (x0 - float64(first))
	tail := x1 - float64(last-1)
	first0 := 0.5 * perColumn * head * head
	last0 := 0.5 * perColumn * tail * tail
	line[first] += float32(height * first0)
	if last == first+2 {
		line[first+1] += float32(height * (1 - first0 - last0))
	} else {
		next := perColumn * (1.5 - (x0 - float64(first)))
		line[first+1] += float32(height * (next - first0))
		for i := first + 2; i < last-1; i++ {
			line[i] += float32(height * perColumn)
		}
		before := next + float64(last-first-3)*perColumn
		line[last-1] += float32(height * (1 - before - last0))
	}
	line[last] += float32(height * last0)
}

// convex adds a convex polygon as one that turns the usual way.
func (c *coverage) convex(points ...Point) {
	area := 0.0
	for i, p := range points {
		q := points[(i+1)%len(points)]
		area += p.X*q.Y - q.X*p.Y
	}
	for i, p := range points {
		q := points[(i+1)%len(points)]
		if area < 0 {
			p, q = q, p
		}
		c.edge(p, q)
	}
}

// polygon adds a closed polygon as it turns.
func (c *coverage) polygon(points []Point) {
	for i, p := range points {
		c.edge(p, points[(i+1)%len(points)])
	}
}

// take hands every touched row with its coverages, 0 to 1, to use and clears it.
func (c *coverage) take(use func(row, low int, covered []float32)) {
	for row := c.top; row < c.bottom; row++ {
		low, high := c.low[row], min(c.high[row]+1, c.width+2)
		if low >= high {
			continue
		}
		line := c.sum[row*(c.width+2)+low : row*(c.width+2)+high]
		total := float32(0)
		for i, s := range line {
			total += s
			line[i] = min(max(total, -total), 1)
		}
		use(row, low, line[:max(0, min(len(line), c.width-low))])
		clear(line)
		c.low[row], c.high[row] = c.width+2, -1
	}
	c.top, c.bottom = c.height, 0
}

// paint draws what was collected over an opaque image.
func (c *coverage) paint(dst *image.RGBA, ink color.RGBA) {
	c.take(func(row, low int, covered []float32) {
		line := dst.Pix[row*dst.Stride+4*low:]
		for i, part := range covered {
			if alpha := uint32(part*255 + 0.5); alpha != 0 {
				cover(line[4*i:4*i+4:4*i+4], ink, alpha)
			}
		}
	})
}

// cover lays ink with an alpha of 0 to 255 over one opaque pixel.
func cover(pixel []uint8, ink color.RGBA, alpha uint32) {
	if alpha >= 255 {
		pixel[0], pixel[1], pixel[2], pixel[3] = ink.R, ink.G, ink.B, 255
		return
	}
	rest := 255 - alpha
	pixel[0] = uint8((uint32(ink.R)*alpha + uint32(pixel[0])*rest + 127) / 255)
	pixel[1] = uint8((uint32(ink.G)*alpha + uint32(pixel[1])*rest + 127) / 255)
	pixel[2] = uint8((uint32(ink.B)*alpha + uint32(pixel[2])*rest + 127) / 255)
	pixel[3] = 255
}
