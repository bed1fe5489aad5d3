package figure

import (
	"image"
	"image/color"
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/plot/font"
	"gonum.org/v1/plot/vg"

	"hilltop/bosehubbard/report"
)

// textCanvas keeps the boxes of all texts, px.
type textCanvas struct {
	f     Frame
	m     affine
	kept  []affine
	texts []Label
}

func (c *textCanvas) SetLineWidth(vg.Length)              {}
func (c *textCanvas) SetLineDash([]vg.Length, vg.Length)  {}
func (c *textCanvas) SetColor(color.Color)                {}
func (c *textCanvas) Rotate(rad float64)                  { c.m = c.m.before(rotation(rad)) }
func (c *textCanvas) Scale(x, y float64)                  { c.m = c.m.before(affine{a: x, d: y}) }
func (c *textCanvas) Push()                               { c.kept = append(c.kept, c.m) }
func (c *textCanvas) Stroke(vg.Path)                      {}
func (c *textCanvas) Fill(vg.Path)                        {}
func (c *textCanvas) DrawImage(vg.Rectangle, image.Image) {}
func (c *textCanvas) Translate(p vg.Point) {
	c.m = c.m.before(affine{a: 1, d: 1, e: float64(p.X), f: float64(p.Y)})
}

func (c *textCanvas) Pop() {
	c.m = c.kept[len(c.kept)-1]
	c.kept = c.kept[:len(c.kept)-1]
}

// FillString keeps the box from the top of capitals to below the base line.
func (c *textCanvas) FillString(f font.Face, pt vg.Point, text string) {
	width, size := float64(f.Width(text)), float64(f.Font.Size)
	box := Rect{math.Inf(1), math.Inf(1), math.Inf(-1), math.Inf(-1)}
	for _, corner := range [...][2]float64{{0, -0.21}, {width / size, -0.21}, {0, 0.73}, {width / size, 0.73}} {
		p := c.m.apply(float64(pt.X)+corner[0]*size, float64(pt.Y)+corner[1]*size)
		x, y := p.X/float64(px), c.f.Height-p.Y/float64(px)
		box = Rect{math.Min(box.X0, x), math.Min(box.Y0, y), math.Max(box.X1, x), math.Max(box.Y1, y)}
	}
	c.texts = append(c.texts, Label{Text: text, Box: box})
}

// checkTexts reports texts of a picture that overlap or leave the frame.
func checkTexts(t *testing.T, p Picture, f Frame, s Style) {
	t.Helper()
	c := &textCanvas{f: f, m: affine{a: 1, d: 1}}
	p.Draw(c, f, s)
	for i, l := range c.texts {
		if !l.Box.Within(f.rect()) {
			t.Errorf("%s at %+v, text %g: %q at %+v is cut", p.Stem(), f, s.text(), l.Text, l.Box)
		}
		for _, m := range c.texts[:i] {
			if l.Box.Overlaps(m.Box) {
				t.Errorf("%s at %+v, text %g: %q at %+v and %q at %+v overlap", p.Stem(), f, s.text(), l.Text, l.Box, m.Text, m.Box)
			}
		}
	}
	if len(c.texts) < 3 {
		t.Errorf("%s at %+v: %d texts", p.Stem(), f, len(c.texts))
	}
}

func TestNoTextIsCutOrOverlaps(t *testing.T) {
	for _, p := range gallery(t) {
		for _, f := range []Frame{{Width: 976, Height: 372}, {Width: 976, Height: 628}, {Width: 480, Height: 300}, {Width: 744, Height: 372}} {
			for _, size := range []float64{1, 1.5} {
				checkTexts(t, p, f, Style{Palette: Light(), Text: size})
			}
		}
	}
}

func TestNoTextOfTheCeilingIsCutOrOverlaps(t *testing.T) {
	eachGeometry(t, func(t *testing.T, r *report.Report, g *Geometry) {
		checkTexts(t, &Ceiling{Report: r}, Frame{Width: g.Frame.X1, Height: g.Frame.Y1}, Style{Palette: Light(), Text: g.text})
	})
}

// Charts of invented data: any range, zoomed and moved.
func TestNoTextOfAZoomedChartOverlaps(t *testing.T) {
	rng := rand.New(rand.NewPCG(4, 4))
	for range 60 {
		c := &Chart{Name: "random", Title: "Random", X: Axis{Label: "x", Unit: "G"}, Y: Axis{Label: "y", Unit: "Hz", Kind: ScaleKind(rng.IntN(3))}}
		scale := math.Pow(10, 6*rng.Float64()-3)
		for _, name := range []string{"one", "two", "three"} {
			u := Curve{Name: name}
			for i := range 40 {
				u.X = append(u.X, float64(i)*scale)
				u.Y = append(u.Y, scale*math.Exp(2*rng.NormFloat64()))
			}
			c.Curves = append(c.Curves, u)
		}
		c.Rules = []Rule{{Name: "first line", X: 10 * scale}, {Name: "second line", X: 10.5 * scale}}
		c.Marks = []Mark{{Name: "here", X: 20 * scale, Y: scale}}
		f, s := Frame{Width: 560, Height: 320}, Style{Palette: Dark(), Text: []float64{1, 1.5}[rng.IntN(2)]}
		checkTexts(t, c, f, s)
		a := c.Area(f, s)
		c.View = a.Zoom(Point{a.X0 + rng.Float64()*a.Width(), a.Y0 + rng.Float64()*a.Height()}, math.Pow(10, 3*rng.Float64()))
		checkTexts(t, c, f, s)
	}
}
