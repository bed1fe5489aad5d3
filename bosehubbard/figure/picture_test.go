package figure

import (
	"image"
	"image/color"
	"sync"
	"testing"
)

// Renderers on different goroutines share only the fonts.
func TestRenderersDrawAtOnce(t *testing.T) {
	pictures := gallery(t)
	f, s := Frame{Width: 480, Height: 300}, Style{Palette: Light()}
	want := NewRenderer().Image(pictures[0], f, s)
	var group sync.WaitGroup
	for range 4 {
		group.Go(func() {
			r := NewRenderer()
			for _, p := range append(pictures, pictures[0]) {
				img := r.Image(p, f, s)
				if p == pictures[0] && string(img.Pix) != string(want.Pix) {
					t.Error("the same picture comes out different")
				}
			}
		})
	}
	group.Wait()
}

func TestImageToDrawsOnWhatItIsGiven(t *testing.T) {
	p, r := gallery(t)[0], NewRenderer()
	f, s := Frame{Width: 480, Height: 300, Scale: 1.25}, Style{Palette: Dark()}
	width, height := f.Pixels()
	if width != 600 || height != 375 {
		t.Errorf("%dx%d pixels, want 600x375", width, height)
	}
	dst := image.NewRGBA(image.Rect(0, 0, width, height))
	for i := range dst.Pix {
		dst.Pix[i] = 77
	}
	r.ImageTo(dst, p, f, s)
	if want := r.Image(p, f, s); string(dst.Pix) != string(want.Pix) {
		t.Error("a used image shows through")
	}
	for name, draw := range map[string]func(){
		"wrong size": func() { r.ImageTo(dst, p, Frame{Width: 10, Height: 10}, s) },
		"no area":    func() { r.Image(p, Frame{}, s) },
	} {
		func() {
			defer func() {
				if recover() == nil {
					t.Errorf("%s: no panic", name)
				}
			}()
			draw()
		}()
	}
}

func TestPaintingDoesNotAllocate(t *testing.T) {
	var c coverage
	c.resize(200, 100)
	dst := image.NewRGBA(image.Rect(0, 0, 200, 100))
	line := []Point{{10, 10}, {100, 90}, {190, 20}}
	if n := testing.AllocsPerRun(50, func() {
		c.line(line, false, 1.5)
		c.paint(dst, color.RGBA{1, 2, 3, 255})
	}); n != 0 {
		t.Errorf("%g allocations to paint a line, want none", n)
	}
}
