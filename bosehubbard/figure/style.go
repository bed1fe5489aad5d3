package figure

import (
	"image/color"

	xfont "golang.org/x/image/font"
	"gonum.org/v1/plot/font"
	"gonum.org/v1/plot/vg"
)

// px is one pixel at 100 %, 1/96 inch.
const px = vg.Inch / 96

// Style says how pictures look: their colours and the size of their text.
type Style struct {
	Palette Palette
	Text    float64 // size of the text, 1 for 100 %; 0 counts as 1
}

// Frame is the size of a picture, px at 100 %.
type Frame struct {
	Width, Height float64
	Scale         float64 // pixels of an image per px; 0 counts as 1
}

// Point is a position in px, y downwards.
type Point struct{ X, Y float64 }

// Rect is an upright rectangle in px, y downwards.
type Rect struct{ X0, Y0, X1, Y1 float64 }

// Width returns the horizontal extent.
func (r Rect) Width() float64 { return r.X1 - r.X0 }

// Height returns the vertical extent.
func (r Rect) Height() float64 { return r.Y1 - r.Y0 }

// Contains reports whether p lies in r, its border included.
func (r Rect) Contains(p Point) bool {
	return p.X >= r.X0 && p.X <= r.X1 && p.Y >= r.Y0 && p.Y <= r.Y1
}

// Within reports whether r lies in outer, up to a hundredth of a px.
func (r Rect) Within(outer Rect) bool {
	const slack = 0.01
	return r.X0 >= outer.X0-slack && r.X1 <= outer.X1+slack && r.Y0 >= outer.Y0-slack && r.Y1 <= outer.Y1+slack
}

// Overlaps reports whether r and s share more than a border.
func (r Rect) Overlaps(s Rect) bool {
	return r.X0 < s.X1 && s.X0 < r.X1 && r.Y0 < s.Y1 && s.Y0 < r.Y1
}

// rect is the whole frame.
func (f Frame) rect() Rect { return Rect{0, 0, f.Width, f.Height} }

func (f Frame) scale() float64 {
	if !(f.Scale > 0) {
		return 1
	}
	return f.Scale
}

// text is the factor of text sizes.
func (s Style) text() float64 {
	if !(s.Text > 0) {
		return 1
	}
	return s.Text
}

// typeface is a font and a size in px at 100 %.
type typeface struct {
	font font.Font
	size float64
}

// The typefaces: words in the sans, numbers in the mono.
var (
	words   = typeface{font.Font{Typeface: "Liberation", Variant: "Sans"}, 12}
	bold    = typeface{font.Font{Typeface: "Liberation", Variant: "Sans", Weight: xfont.WeightBold}, 12}
	numbers = typeface{font.Font{Typeface: "Liberation", Variant: "Mono"}, 12}
)

// at returns the font in the size of a style.
func (t typeface) at(s Style) font.Font {
	return font.From(t.font, vg.Length(t.size*s.text())*px)
}

// stroke is how a line is drawn, in px.
type stroke struct {
	width float64
	color color.Color
	dash  []float64
}

// Dash is a kind of line.
type Dash int

// The lines of the axes x, y, z, and that of a pinned reference.
const (
	Solid Dash = iota
	Dashed
	Dotted
	Pinned
)

var dashes = [...][]float64{Solid: nil, Dashed: {8, 4}, Dotted: {2, 3}, Pinned: {3, 3}}

// AxisDash returns the line of an axis: x solid, y dashed, z dotted.
func AxisDash(axis int) Dash { return Dash(axis % 3) }
