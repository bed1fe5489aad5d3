package figure

import (
	"image"
	"image/color"
	"math"

	xdraw "golang.org/x/image/draw"
	"gonum.org/v1/plot/font"
	"gonum.org/v1/plot/vg"
)

// canvas draws on an opaque image. It implements vg.Canvas.
//
// Upright lines and rectangles are moved by at most half a pixel to lie on whole
// pixels, so that they stay sharp.
type canvas struct {
	dst    *image.RGBA
	brush  *brush
	size   vg.Point
	state  state
	kept   []state
	traces []trace
}

// brush is the scratch of canvases: one per goroutine.
type brush struct {
	shape   coverage
	letters letters
}

// state is what Push keeps.
type state struct {
	m      affine
	ink    color.RGBA
	width  vg.Length
	dash   []float64 // pixels
	offset float64
}

var _ vg.CanvasSizer = (*canvas)(nil)

// newCanvas returns a canvas for an image whose pixels are 1/scale px wide, filled
// with a colour. dst must start at (0, 0).
func newCanvas(dst *image.RGBA, b *brush, f Frame, ground color.RGBA) *canvas {
	bounds := dst.Bounds()
	b.shape.resize(bounds.Dx(), bounds.Dy())
	scale := f.scale() / float64(px)
	c := &canvas{dst: dst, brush: b, size: vg.Point{X: vg.Length(f.Width) * px, Y: vg.Length(f.Height) * px}}
	c.state.m = affine{a: scale, d: -scale, f: scale * float64(c.size.Y)}
	vg.Initialize(c)
	c.state.ink = ground
	c.block(Point{}, Point{float64(bounds.Dx()), float64(bounds.Dy())})
	c.state.ink = color.RGBA{A: 255}
	return c
}

// Size returns the size of the picture.
func (c *canvas) Size() (w, h vg.Length) { return c.size.X, c.size.Y }

// SetLineWidth sets the width of lines.
func (c *canvas) SetLineWidth(w vg.Length) { c.state.width = w }

// SetLineDash sets the lengths of dashes and gaps.
func (c *canvas) SetLineDash(pattern []vg.Length, offset vg.Length) {
	stretch := c.state.m.stretch()
	c.state.dash = nil
	for _, p := range pattern {
		c.state.dash = append(c.state.dash, float64(p)*stretch)
	}
	c.state.offset = float64(offset) * stretch
}

// SetColor sets the colour of lines, areas and text; nil is black.
func (c *canvas) SetColor(ink color.Color) {
	if ink == nil {
		ink = color.Black
	}
	c.state.ink = color.RGBAModel.Convert(ink).(color.RGBA)
}

// Rotate turns what is drawn next about the origin.
func (c *canvas) Rotate(rad float64) { c.state.m = c.state.m.before(rotation(rad)) }

// Translate moves the origin.
func (c *canvas) Translate(p vg.Point) {
	c.state.m = c.state.m.before(affine{a: 1, d: 1, e: float64(p.X), f: float64(p.Y)})
}

// Scale stretches what is drawn next.
func (c *canvas) Scale(x, y float64) { c.state.m = c.state.m.before(affine{a: x, d: y}) }

// Push keeps the state for Pop.
func (c *canvas) Push() { c.kept = append(c.kept, c.state) }

// Pop brings back the last state kept.
func (c *canvas) Pop() {
	c.state = c.kept[len(c.kept)-1]
	c.kept = c.kept[:len(c.kept)-1]
}

// Fill paints the inside of a path.
func (c *canvas) Fill(path vg.Path) {
	c.traces = flatten(c.traces, path, c.state.m)
	for _, t := range c.traces {
		if !upright(t.points, true) {
			c.brush.shape.polygon(t.points)
			continue
		}
		for i, p := range t.points {
			t.points[i] = Point{math.Round(p.X), math.Round(p.Y)}
		}
		if len(t.points) == 4 { // a rectangle of whole pixels
			c.block(t.points[0], t.points[2])
		} else {
			c.brush.shape.polygon(t.points)
		}
	}
	c.brush.shape.paint(c.dst, c.state.ink)
}

// block paints the whole pixels between two corners.
func (c *canvas) block(p, q Point) {
	size := c.dst.Bounds()
	limit := func(v float64, most int) int { return int(min(max(v, 0), float64(most))) }
	x0, x1 := limit(min(p.X, q.X), size.Dx()), limit(max(p.X, q.X), size.Dx())
	y0, y1 := limit(min(p.Y, q.Y), size.Dy()), limit(max(p.Y, q.Y), size.Dy())
	if x0 >= x1 || y0 >= y1 {
		return
	}
	row := func(y int) []uint8 { return c.dst.Pix[y*c.dst.Stride+4*x0 : y*c.dst.Stride+4*x1] }
	first, ink := row(y0), c.state.ink
	first[0], first[1], first[2], first[3] = ink.R, ink.G, ink.B, 255
	for done := 4; done < len(first); done *= 2 {
		copy(first[done:], first[:done])
	}
	for y := y0 + 1; y < y1; y++ {
		copy(row(y), first)
	}
}

// Stroke paints a line along a path.
func (c *canvas) Stroke(path vg.Path) {
	width := float64(c.state.width) * c.state.m.stretch()
	if !(width > 0) {
		return
	}
	c.traces = flatten(c.traces, path, c.state.m)
	for _, t := range c.traces {
		if len(t.points) < 2 {
			continue
		}
		half := width / 2
		if upright(t.points, t.closed) {
			half = sharpen(t.points, width)
		}
		if len(c.state.dash) == 0 {
			c.brush.shape.line(t.points, t.closed, half)
			continue
		}
		dashed(t.points, t.closed, c.state.dash, c.state.offset, func(p []Point) {
			c.brush.shape.line(p, false, half)
		})
	}
	c.brush.shape.paint(c.dst, c.state.ink)
}

// sharpen moves upright lines onto whole pixels and returns half their width.
func sharpen(points []Point, width float64) (half float64) {
	whole := math.Max(1, math.Round(width))
	shift := 0.0
	if math.Mod(whole, 2) == 1 {
		shift = 0.5
	}
	for i, p := range points {
		points[i] = Point{math.Round(p.X-shift) + shift, math.Round(p.Y-shift) + shift}
	}
	return whole / 2
}

// FillString draws a text; pt is the left end of its base line.
func (c *canvas) FillString(f font.Face, pt vg.Point, text string) {
	size := float64(f.Font.Size)
	if size == 0 || f.Face == nil {
		return
	}
	m := c.state.m.before(affine{a: size, d: size, e: float64(pt.X), f: float64(pt.Y)})
	const tiny = 1e-9 // of a quarter turn that rounding left over
	if math.Abs(m.a) < tiny {
		m.a, m.d = 0, 0
	}
	if math.Abs(m.b) < tiny {
		m.b, m.c = 0, 0
	}
	c.brush.letters.draw(c.dst, f.Face, text, m, c.state.ink)
}

// DrawImage draws an image, stretched to an upright rectangle.
func (c *canvas) DrawImage(rect vg.Rectangle, img image.Image) {
	p := c.state.m.apply(float64(rect.Min.X), float64(rect.Max.Y))
	q := c.state.m.apply(float64(rect.Max.X), float64(rect.Min.Y))
	to := image.Rect(int(math.Round(p.X)), int(math.Round(p.Y)), int(math.Round(q.X)), int(math.Round(q.Y)))
	xdraw.NearestNeighbor.Scale(c.dst, to, img, img.Bounds(), xdraw.Over, nil)
}
