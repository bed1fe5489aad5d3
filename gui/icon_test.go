package gui

import (
	"bytes"
	"flag"
	"image"
	"image/png"
	"math"
	"os"
	"path/filepath"
	"testing"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/canvas"
	"fyne.io/fyne/v2/driver/software"
	"fyne.io/fyne/v2/test"

	"hilltop/assets"
)

var update = flag.Bool("update", false, "write the golden pictures anew")

// The icon's pixels are what the toolkit makes of its drawing.
func TestIconIsDrawnFromItsSVG(t *testing.T) {
	test.NewApp()
	const side = 512
	drawing, err := os.ReadFile(filepath.Join("..", "assets", "icon.svg"))
	if err != nil {
		t.Fatal(err)
	}
	picture := canvas.NewImageFromResource(fyne.NewStaticResource("icon.svg", drawing))
	c := software.NewTransparentCanvas()
	c.SetPadded(false)
	c.SetContent(picture)
	c.Resize(fyne.NewSquareSize(side))
	want := c.Capture()
	path := filepath.Join("..", "assets", "icon.png")
	if *update {
		writePNG(t, path, want)
		return
	}
	got, err := png.Decode(bytes.NewReader(assets.Icon()))
	if err != nil {
		t.Fatalf("%s: %v; write it with -update", path, err)
	}
	if got.Bounds().Dx() != side || got.Bounds().Dy() != side {
		t.Fatalf("%s: got %v, want %d x %d", path, got.Bounds(), side, side)
	}
	if part := differing(got, want); part > 0.002 {
		t.Errorf("%s differs from icon.svg in %.2f %% of its pixels; write it with -update", path, 100*part)
	}
}

func writePNG(t *testing.T, path string, picture image.Image) {
	t.Helper()
	var b bytes.Buffer
	if err := png.Encode(&b, picture); err != nil {
		t.Fatal(err)
	}
	if err := os.WriteFile(path, b.Bytes(), 0o644); err != nil {
		t.Fatal(err)
	}
}

// differing is the part of the pixels of two pictures that differ by more than an
// eighth of full scale in some channel: smoothing at edges stays below.
func differing(a, b image.Image) float64 {
	if a.Bounds() != b.Bounds() {
		return 1
	}
	const step = 0xffff / 8
	n, bounds := 0, a.Bounds()
	for y := bounds.Min.Y; y < bounds.Max.Y; y++ {
		for x := bounds.Min.X; x < bounds.Max.X; x++ {
			r1, g1, b1, a1 := a.At(x, y).RGBA()
			r2, g2, b2, a2 := b.At(x, y).RGBA()
			for _, d := range [][2]uint32{{r1, r2}, {g1, g2}, {b1, b2}, {a1, a2}} {
				if math.Abs(float64(d[0])-float64(d[1])) > step {
					n++
					break
				}
			}
		}
	}
	return float64(n) / float64(bounds.Dx()*bounds.Dy())
}
