package figure

import (
	"image"
	"image/color"
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/plot/vg"
	"gonum.org/v1/plot/vg/vgimg"
)

// The coverage of a polygon sums up to its area: exact but for float32 sums, of
// which a row of 60 columns loses at most some 60 x 6e-8.
func TestCoverageSumsToTheArea(t *testing.T) {
	rng := rand.New(rand.NewPCG(1, 2))
	var c coverage
	c.resize(60, 40)
	for range 200 {
		var corners [3]Point
		for i := range corners {
			corners[i] = Point{60 * rng.Float64(), 40 * rng.Float64()}
		}
		a, b, d := corners[0], corners[1], corners[2]
		want := math.Abs((b.X-a.X)*(d.Y-a.Y)-(d.X-a.X)*(b.Y-a.Y)) / 2
		c.convex(corners[:]...)
		got := 0.0
		c.take(func(_, _ int, covered []float32) {
			for _, part := range covered {
				got += float64(part)
			}
		})
		if math.Abs(got-want) > 40*60*6e-8 {
			t.Errorf("triangle %v: covers %g px, want %g", corners, got, want)
		}
	}
}

// A polygon that reaches beyond the image covers what lies inside.
func TestCoverageIsCutAtTheBorder(t *testing.T) {
	var c coverage
	c.resize(20, 10)
	for _, tc := range []struct {
		name    string
		polygon []Point
		want    float64
	}{
		{"all around", []Point{{-50, -30}, {90, -30}, {90, 70}, {-50, 70}}, 200},
		{"left half", []Point{{-50, -30}, {10, -30}, {10, 70}, {-50, 70}}, 100},
		{"diagonal", []Point{{-20, -10}, {40, 20}, {-20, 20}}, 100},
		{"outside right", []Point{{30, 2}, {40, 2}, {40, 8}}, 0},
		{"outside left", []Point{{-30, 2}, {-40, 2}, {-40, 8}}, 0},
		{"falling diagonal", []Point{{40, -10}, {-20, 20}, {40, 20}}, 100},
	} {
		c.convex(tc.polygon...)
		got := 0.0
		c.take(func(_, _ int, covered []float32) {
			for _, part := range covered {
				got += float64(part)
			}
		})
		if math.Abs(got-tc.want) > 1e-3 {
			t.Errorf("%s: covers %g px, want %g", tc.name, got, tc.want)
		}
	}
}

// sample draws lines, areas and text on any canvas.
func sample(c vg.Canvas) {
	c.SetColor(color.RGBA{0, 68, 136, 255})
	var p vg.Path
	p.Move(vg.Point{X: 20, Y: 15})
	for i := 1; i < 60; i++ {
		p.Line(vg.Point{X: vg.Length(20 + 3*i), Y: vg.Length(60 + 50*math.Sin(float64(i)/6))})
	}
	c.SetLineWidth(2)
	c.Stroke(p)
	c.SetColor(color.RGBA{153, 68, 85, 255})
	p = p[:0]
	p.Move(vg.Point{X: 150, Y: 60})
	p.Arc(vg.Point{X: 120, Y: 60}, 30, 0, 2*math.Pi)
	p.Close()
	c.Fill(p)
	p = p[:0]
	p.Move(vg.Point{X: 30, Y: 100})
	p.CubeTo(vg.Point{X: 60, Y: 20}, vg.Point{X: 100, Y: 140}, vg.Point{X: 190, Y: 90})
	c.SetLineDash([]vg.Length{9, 4}, 2)
	c.Stroke(p)
	c.SetLineDash(nil, 0)
	c.SetColor(color.Black)
	face := faces().Lookup(words.font, 14)
	c.FillString(face, vg.Point{X: 20, Y: 120}, "bounded ≤ ∞ − ħ")
	c.Push()
	c.Rotate(math.Pi / 2)
	c.FillString(face, vg.Point{X: 30, Y: -210}, "depth (Er)")
	c.Pop()
}

// Our canvas draws what gonum's image canvas draws: edges differ by their
// smoothing only, which moves the mean by a few grey levels of 255.
func TestCanvasAgreesWithVgimg(t *testing.T) {
	const scale = 2
	f := Frame{Width: 300, Height: 180, Scale: scale}
	width, height := f.Pixels()
	ours := image.NewRGBA(image.Rect(0, 0, width, height))
	var b brush
	sample(newCanvas(ours, &b, f, color.RGBA{255, 255, 255, 255}))
	theirs := vgimg.NewWith(vgimg.UseWH(300*px, 180*px), vgimg.UseDPI(96*scale))
	sample(theirs)
	mean, worst := difference(ours, theirs.Image())
	t.Logf("mean difference %.3g, share of pixels that differ by half: %.3g", mean, worst)
	if mean > 1.5 || worst > 0.004 {
		t.Errorf("mean difference %.3g of 255, want below 1.5; %.3g of the pixels differ by more than half, want below 0.004", mean, worst)
	}
}

// difference returns the mean difference of two images in grey levels, and the
// share of pixels that differ by more than half the range.
func difference(a, b image.Image) (mean, worst float64) {
	bounds := a.Bounds()
	n := 0.0
	for y := bounds.Min.Y; y < bounds.Max.Y; y++ {
		for x := bounds.Min.X; x < bounds.Max.X; x++ {
			r0, g0, b0, _ := a.At(x, y).RGBA()
			r1, g1, b1, _ := b.At(x, y).RGBA()
			d := (math.Abs(float64(r0)-float64(r1)) + math.Abs(float64(g0)-float64(g1)) + math.Abs(float64(b0)-float64(b1))) / 3 / 257
			mean += d
			n++
			if d > 127 {
				worst++
			}
		}
	}
	return mean / n, worst / n
}

// Upright lines are sharp: a line of 1 px is one full row of pixels.
func TestUprightLinesAreSharp(t *testing.T) {
	f := Frame{Width: 40, Height: 20}
	dst := image.NewRGBA(image.Rect(0, 0, 40, 20))
	var b brush
	p := newPen(newCanvas(dst, &b, f, color.RGBA{255, 255, 255, 255}), f, Style{Palette: Light()})
	p.line(stroke{width: 1, color: color.Black}, Point{5, 10.3}, Point{35, 10.3})
	for y := range 20 {
		got := dst.RGBAAt(20, y).R
		want := uint8(255)
		if y == 10 {
			want = 0
		}
		if got != want {
			t.Errorf("row %d: grey %d, want %d", y, got, want)
		}
	}
}

func TestDashesAddUp(t *testing.T) {
	points := []Point{{0, 0}, {10, 0}, {10, 30}}
	total := 0.0
	count := 0
	dashed(points, false, []float64{3, 2}, 1, func(p []Point) {
		count++
		for i := 0; i+1 < len(p); i++ {
			total += math.Hypot(p[i+1].X-p[i].X, p[i+1].Y-p[i].Y)
		}
	})
	// Offset 1: a dash of 2, then from 4 on dashes of 3 every 5, up to 40.
	if want := 2.0 + 3*7 + 1; math.Abs(total-want) > 1e-9 || count != 9 {
		t.Errorf("%d dashes of %g in all, want 9 of %g", count, total, want)
	}
}

func TestLettersAreThere(t *testing.T) {
	var l letters
	for _, face := range []typeface{words, bold, numbers} {
		f := faces().Lookup(face.font, 12)
		for _, r := range "−∞≤≥ħβ²µ×·→π√½±" {
			glyph, err := f.Face.GlyphIndex(&l.buffer, r)
			if err != nil || glyph == 0 {
				t.Errorf("%s lacks %q", f.Name(), r)
			}
		}
	}
}
