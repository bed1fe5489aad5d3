package figure

import (
	"bytes"
	"fmt"
	"image"
	"image/color"
	"image/png"
	"io"
	"math"

	"codeberg.org/go-pdf/fpdf"
	"gonum.org/v1/plot/font"
	"gonum.org/v1/plot/vg"
)

// pdfCanvas draws on one page of a PDF with the fonts embedded and their letters
// addressed by Unicode, since the usual 8-bit code page lacks −, ∞, ħ and β. It
// implements vg.Canvas. Positions are mapped here; the page counts y downwards.
type pdfCanvas struct {
	doc   *fpdf.Fpdf
	size  vg.Point
	state state
	kept  []state
	fonts map[string]bool
	image int
}

var _ vg.CanvasSizer = (*pdfCanvas)(nil)

func newPDF(f Frame, title string) *pdfCanvas {
	size := vg.Point{X: vg.Length(f.Width) * px, Y: vg.Length(f.Height) * px}
	doc := fpdf.NewCustom(&fpdf.InitType{
		UnitStr: "pt", Size: fpdf.SizeType{Wd: size.X.Points(), Ht: size.Y.Points()},
	})
	doc.SetMargins(0, 0, 0)
	doc.SetAutoPageBreak(false, 0)
	doc.SetTitle(title, true)
	doc.SetCreator("Hilltop", true)
	doc.AddPage()
	c := &pdfCanvas{doc: doc, size: size, fonts: map[string]bool{}}
	c.state.m = affine{a: 1, d: -1, f: float64(size.Y)}
	vg.Initialize(c)
	return c
}

// Size returns the size of the page.
func (c *pdfCanvas) Size() (w, h vg.Length) { return c.size.X, c.size.Y }

// SetLineWidth sets the width of lines.
func (c *pdfCanvas) SetLineWidth(w vg.Length) { c.state.width = w }

// SetLineDash sets the lengths of dashes and gaps.
func (c *pdfCanvas) SetLineDash(pattern []vg.Length, offset vg.Length) {
	stretch := c.state.m.stretch()
	c.state.dash = nil
	for _, p := range pattern {
		c.state.dash = append(c.state.dash, float64(p)*stretch)
	}
	c.state.offset = float64(offset) * stretch
}

// SetColor sets the colour of lines, areas and text; nil is black.
func (c *pdfCanvas) SetColor(ink color.Color) {
	if ink == nil {
		ink = color.Black
	}
	c.state.ink = color.RGBAModel.Convert(ink).(color.RGBA)
}

// Rotate turns what is drawn next about the origin.
func (c *pdfCanvas) Rotate(rad float64) { c.state.m = c.state.m.before(rotation(rad)) }

// Translate moves the origin.
func (c *pdfCanvas) Translate(p vg.Point) {
	c.state.m = c.state.m.before(affine{a: 1, d: 1, e: float64(p.X), f: float64(p.Y)})
}

// Scale stretches what is drawn next.
func (c *pdfCanvas) Scale(x, y float64) { c.state.m = c.state.m.before(affine{a: x, d: y}) }

// Push keeps the state for Pop.
func (c *pdfCanvas) Push() { c.kept = append(c.kept, c.state) }

// Pop brings back the last state kept.
func (c *pdfCanvas) Pop() {
	c.state = c.kept[len(c.kept)-1]
	c.kept = c.kept[:len(c.kept)-1]
}

// Fill paints the inside of a path.
func (c *pdfCanvas) Fill(path vg.Path) { c.draw(path, "F") }

// Stroke paints a line along a path.
func (c *pdfCanvas) Stroke(path vg.Path) {
	if c.state.width > 0 {
		c.draw(path, "D")
	}
}

func (c *pdfCanvas) draw(path vg.Path, how string) {
	ink := c.state.ink
	c.doc.SetFillColor(int(ink.R), int(ink.G), int(ink.B))
	c.doc.SetDrawColor(int(ink.R), int(ink.G), int(ink.B))
	c.doc.SetLineWidth(float64(c.state.width) * c.state.m.stretch())
	c.doc.SetDashPattern(c.state.dash, c.state.offset)
	for _, t := range flatten(nil, path, c.state.m) {
		c.doc.MoveTo(t.points[0].X, t.points[0].Y)
		for _, p := range t.points[1:] {
			c.doc.LineTo(p.X, p.Y)
		}
		if t.closed {
			c.doc.ClosePath()
		}
	}
	c.doc.DrawPath(how)
}

// FillString draws a text; pt is the left end of its base line.
func (c *pdfCanvas) FillString(f font.Face, pt vg.Point, text string) {
	if f.Font.Size == 0 || text == "" {
		return
	}
	c.use(f)
	ink := c.state.ink
	c.doc.SetTextColor(int(ink.R), int(ink.G), int(ink.B))
	c.doc.SetFont(f.Name(), "", float64(f.Font.Size)*c.state.m.stretch())
	at := c.state.m.apply(float64(pt.X), float64(pt.Y))
	angle := math.Atan2(-c.state.m.b, c.state.m.a) * 180 / math.Pi
	if math.Abs(angle) < 1e-9 {
		c.doc.Text(at.X, at.Y, text)
		return
	}
	c.doc.TransformBegin()
	c.doc.TransformRotate(angle, at.X, at.Y)
	c.doc.Text(at.X, at.Y, text)
	c.doc.TransformEnd()
}

// use embeds a font the first time it is needed.
func (c *pdfCanvas) use(f font.Face) {
	name := f.Name()
	if c.fonts[name] {
		return
	}
	c.fonts[name] = true
	var source bytes.Buffer
	if _, err := f.Face.WriteSourceTo(nil, &source); err != nil {
		c.doc.SetError(fmt.Errorf("font %s: %w", name, err))
		return
	}
	c.doc.AddUTF8FontFromBytes(name, "", source.Bytes())
}

// DrawImage draws an image, stretched to an upright rectangle.
func (c *pdfCanvas) DrawImage(rect vg.Rectangle, img image.Image) {
	var data bytes.Buffer
	if err := png.Encode(&data, img); err != nil {
		c.doc.SetError(err)
		return
	}
	c.image++
	name := fmt.Sprintf("image%d", c.image)
	options := fpdf.ImageOptions{ImageType: "png"}
	c.doc.RegisterImageOptionsReader(name, options, &data)
	p := c.state.m.apply(float64(rect.Min.X), float64(rect.Max.Y))
	q := c.state.m.apply(float64(rect.Max.X), float64(rect.Min.Y))
	c.doc.ImageOptions(name, p.X, p.Y, q.X-p.X, q.Y-p.Y, false, options, 0, "")
}

// writeTo finishes the page.
func (c *pdfCanvas) writeTo(w io.Writer) error { return c.doc.Output(w) }
