package figure

import (
	"image/color"
	"math"
	"sync"

	xfont "golang.org/x/image/font"
	"golang.org/x/image/font/sfnt"
	"golang.org/x/image/math/fixed"
	"gonum.org/v1/plot/font"
	"gonum.org/v1/plot/font/liberation"
	"gonum.org/v1/plot/vg"
)

// pen draws on a canvas in px, y downwards.
type pen struct {
	canvas vg.Canvas
	width  float64 // of the picture, px
	height float64
	style  Style
	path   vg.Path
	dash   []vg.Length
}

func newPen(c vg.Canvas, f Frame, s Style) *pen {
	return &pen{canvas: c, width: f.Width, height: f.Height, style: s}
}

func (p *pen) at(x, y float64) vg.Point {
	return vg.Point{X: vg.Length(x) * px, Y: vg.Length(p.height-y) * px}
}

// fill paints a rectangle.
func (p *pen) fill(r Rect, ink color.Color) {
	p.area(ink, Point{r.X0, r.Y0}, Point{r.X1, r.Y0}, Point{r.X1, r.Y1}, Point{r.X0, r.Y1})
}

// area paints a polygon.
func (p *pen) area(ink color.Color, points ...Point) {
	p.outline(points)
	p.path.Close()
	p.canvas.SetColor(ink)
	p.canvas.Fill(p.path)
}

func (p *pen) outline(points []Point) {
	p.path = p.path[:0]
	for i, at := range points {
		if i == 0 {
			p.path.Move(p.at(at.X, at.Y))
		} else {
			p.path.Line(p.at(at.X, at.Y))
		}
	}
}

func (p *pen) set(s stroke) {
	p.canvas.SetColor(s.color)
	p.canvas.SetLineWidth(vg.Length(s.width) * px)
	p.dash = p.dash[:0]
	for _, d := range s.dash {
		p.dash = append(p.dash, vg.Length(d)*px)
	}
	p.canvas.SetLineDash(p.dash, 0)
}

// line draws a polyline.
func (p *pen) line(s stroke, points ...Point) {
	if len(points) < 2 {
		return
	}
	p.set(s)
	p.outline(points)
	p.canvas.Stroke(p.path)
}

// frame draws the border of a rectangle, the line inside it.
func (p *pen) frame(s stroke, r Rect) {
	h := s.width / 2
	p.set(s)
	p.outline([]Point{{r.X0 + h, r.Y0 + h}, {r.X1 - h, r.Y0 + h}, {r.X1 - h, r.Y1 - h}, {r.X0 + h, r.Y1 - h}})
	p.path.Close()
	p.canvas.Stroke(p.path)
}

// diamond draws the mark of a state: paper inside, ink around.
func (p *pen) diamond(at Point, size float64) {
	h := size / 2
	corners := []Point{{at.X, at.Y - h}, {at.X + h, at.Y}, {at.X, at.Y + h}, {at.X - h, at.Y}}
	p.area(p.style.Palette.Paper, corners...)
	p.set(stroke{width: 2, color: p.style.Palette.Ink})
	p.outline(corners)
	p.path.Close()
	p.canvas.Stroke(p.path)
}

// circle draws an open circle.
func (p *pen) circle(at Point, radius float64, s stroke) {
	p.path = p.path[:0]
	p.path.Move(p.at(at.X+radius, at.Y))
	p.path.Arc(p.at(at.X, at.Y), vg.Length(radius)*px, 0, 2*math.Pi)
	p.path.Close()
	p.canvas.SetColor(p.style.Palette.Paper)
	p.canvas.Fill(p.path)
	p.set(s)
	p.canvas.Stroke(p.path)
}

// disc draws a full circle in ink.
func (p *pen) disc(at Point, radius float64) {
	p.path = p.path[:0]
	p.path.Move(p.at(at.X+radius, at.Y))
	p.path.Arc(p.at(at.X, at.Y), vg.Length(radius)*px, 0, 2*math.Pi)
	p.path.Close()
	p.canvas.SetColor(p.style.Palette.Ink)
	p.canvas.Fill(p.path)
}

// text draws a text with its left end and base line at a point.
func (p *pen) text(t typeface, ink color.Color, at Point, text string) {
	p.canvas.SetColor(ink)
	p.canvas.FillString(faces().Lookup(t.font, t.at(p.style).Size), p.at(at.X, at.Y), text)
}

// Parts of the size of a font, rounded up over the Liberation fonts.
const (
	ascent  = 0.92
	descent = 0.22
	leading = 1.25 // from line to line
)

// measure returns the width of a text in px, kerning left out.
func (t typeface) measure(s Style, text string) float64 {
	wide := 0.0
	table := advances()[t.font]
	for _, r := range text {
		if w, ok := table[r]; ok {
			wide += w
		} else {
			wide += 0.61 // wider than any digit
		}
	}
	return wide * t.size * s.text()
}

// height is the room a line of text takes, px.
func (t typeface) height(s Style) float64 { return math.Ceil((ascent + descent) * t.size * s.text()) }

// faces holds the fonts.
var faces = sync.OnceValue(func() *font.Cache { return font.NewCache(liberation.Collection()) })

// advances holds the widths in em of the letters that pictures use.
var advances = sync.OnceValue(func() map[font.Font]map[rune]float64 {
	var buffer sfnt.Buffer
	out := map[font.Font]map[rune]float64{}
	for _, face := range liberation.Collection() {
		em := fixed.Int26_6(face.Face.UnitsPerEm())
		table := map[rune]float64{}
		add := func(r rune) {
			glyph, err := face.Face.GlyphIndex(&buffer, r)
			if err != nil {
				return
			}
			if w, err := face.Face.GlyphAdvance(&buffer, glyph, em, xfont.HintingNone); err == nil {
				table[r] = float64(w) / float64(em)
			}
		}
		for r := rune(0x20); r < 0x180; r++ {
			add(r)
		}
		for _, r := range "−∞≤≥βπω√→–…≈½₁₂" {
			add(r)
		}
		out[face.Font] = table
	}
	return out
})
