package figure

import (
	"image"
	"math"

	"gonum.org/v1/plot/vg"
)

// Picture is something that can be drawn, on screen and in print, and whose
// numbers can be written as a table.
type Picture interface {
	// Stem is a name for files, such as "ceiling".
	Stem() string
	// Draw draws the picture, its lower left corner at the origin of the canvas.
	// It paints its own ground.
	Draw(c vg.Canvas, f Frame, s Style)
	// Table returns the numbers that are shown.
	Table() Table
}

// Renderer makes images of pictures and keeps the shapes of the letters it has
// drawn. It belongs to one goroutine.
type Renderer struct{ brush brush }

// NewRenderer returns a Renderer.
func NewRenderer() *Renderer { return new(Renderer) }

// Image draws a picture on a new image of Width x Height x Scale^2 pixels.
//
// It panics if the frame has no area or more than 1e8 pixels.
func (r *Renderer) Image(p Picture, f Frame, s Style) *image.RGBA {
	width, height := f.Pixels()
	if width <= 0 || height <= 0 || width > 1e8/height {
		panic("figure: a frame without area or beyond 1e8 pixels")
	}
	dst := image.NewRGBA(image.Rect(0, 0, width, height))
	r.draw(dst, p, f, s)
	return dst
}

// ImageTo draws a picture on dst, whose bounds must be those that Image gives.
// Nothing of the size of the image is allocated.
func (r *Renderer) ImageTo(dst *image.RGBA, p Picture, f Frame, s Style) {
	width, height := f.Pixels()
	if dst.Bounds() != image.Rect(0, 0, width, height) {
		panic("figure: the image has not the size of the frame")
	}
	r.draw(dst, p, f, s)
}

func (r *Renderer) draw(dst *image.RGBA, p Picture, f Frame, s Style) {
	p.Draw(newCanvas(dst, &r.brush, f, s.Palette.Paper), f, s)
}

// Pixels returns the size of an image of the frame.
func (f Frame) Pixels() (width, height int) {
	return int(math.Round(f.Width * f.scale())), int(math.Round(f.Height * f.scale()))
}
