package main

import (
	"image"
	"reflect"
	"testing"
	"time"
)

// part is the part of a picture where the page stands.
func part(shot image.Image) image.Image {
	b := shot.Bounds()
	return shot.(interface {
		SubImage(image.Rectangle) image.Image
	}).SubImage(image.Rect(b.Min.X+b.Dx()/3, b.Min.Y+b.Dy()/4, b.Max.X, b.Max.Y-b.Dy()/20))
}

// same reports whether two pictures show the same page.
func same(a, b image.Image) bool {
	a, b = part(a), part(b)
	for y := a.Bounds().Min.Y; y < a.Bounds().Max.Y; y++ {
		for x := a.Bounds().Min.X; x < a.Bounds().Max.X; x++ {
			if !reflect.DeepEqual(a.At(x, y), b.At(x, y)) {
				return false
			}
		}
	}
	return true
}

// Every page in every fold, light and dark: the keys read its first picture, zoom it
// and show it whole again, and open its parts.
func TestPagesOnADisplay(t *testing.T) {
	needScreen(t)
	for _, page := range []string{"Bench", "Lattice", "Ceiling"} {
		for _, look := range []struct{ size, variant, scale string }{
			{"1280x800", "light", "1"}, {"1280x800", "dark", "1"},
			{"1024x680", "light", "1"}, {"1024x680", "dark", "1"},
			{"1024x680", "light", "1.5"}, {"1024x680", "dark", "1.5"},
		} {
			name := page + "-" + look.size + "-" + look.scale + "-" + look.variant
			if testing.Short() && look.variant == "dark" {
				continue
			}
			t.Run(name, func(t *testing.T) {
				s := start(t, "skerry-demo", "--page", page, "--size", look.size, "--variant", look.variant, "--text-scale", look.scale)
				s.do("xdotool", "mousemove", "1400", "880") // off the window
				s.picture(name)
				time.Sleep(2 * time.Second) // for all that is drawn and computed behind
				s.keys("F6", "Escape")      // which drops what the pointer read
				whole := s.picture(name + "-focus")
				s.keys("Right", "Right")
				s.waitFor("crosshair", func() bool { return !same(s.picture(name+"-read"), whole) })
				s.keys("Escape", "plus", "plus")
				s.waitFor("zoom", func() bool { return !same(s.picture(name+"-zoomed"), whole) })
				s.keys("0")
				s.waitFor("whole picture after 0", func() bool { return same(s.picture(name+"-whole"), whole) })
				s.keys("p", "u", "alt+1", "alt+2")
				s.picture(name + "-parts")
				s.quit()
			})
		}
	}
}
