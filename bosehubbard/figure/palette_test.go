package figure

import (
	"image/color"
	"math"
	"testing"
)

// luminance is the relative luminance of WCAG 2.1, from memory.
func luminance(c color.RGBA) float64 {
	part := func(v uint8) float64 {
		x := float64(v) / 255
		if x <= 0.04045 {
			return x / 12.92
		}
		return math.Pow((x+0.055)/1.055, 2.4)
	}
	return 0.2126*part(c.R) + 0.7152*part(c.G) + 0.0722*part(c.B)
}

func contrast(a, b color.RGBA) float64 {
	x, y := luminance(a), luminance(b)
	return (math.Max(x, y) + 0.05) / (math.Min(x, y) + 0.05)
}

func TestContrast(t *testing.T) {
	for _, p := range []Palette{Light(), Dark()} {
		for _, ground := range []color.RGBA{p.Paper, p.Panel} {
			for _, tc := range []struct {
				name string
				ink  color.RGBA
				want float64
			}{
				{"ink", p.Ink, 4.5}, {"soft ink", p.Soft, 4.5}, {"edge", p.Edge, 3}, {"blue", p.Blue, 3}, {"red", p.Red, 3},
			} {
				if got := contrast(tc.ink, ground); got < tc.want {
					t.Errorf("%s: %s on %v has contrast %.2f, want %.1f", p.Name, tc.name, ground, got, tc.want)
				}
			}
		}
		for name, got := range map[string]float64{
			"text on yellow": contrast(p.OnYellow, p.Yellow), "text on blue": contrast(p.Paper, p.Blue),
			"text on red": contrast(p.Paper, p.Red), "flag": contrast(p.Paper, p.Ink),
		} {
			if got < 4.5 {
				t.Errorf("%s: %s has contrast %.2f, want 4.5", p.Name, name, got)
			}
		}
		// Yellow or the outline around it stands out.
		if got := math.Max(contrast(p.Yellow, p.Paper), contrast(p.Ink, p.Paper)); got < 3 {
			t.Errorf("%s: outlined yellow has contrast %.2f, want 3", p.Name, got)
		}
	}
}

func TestNumbers(t *testing.T) {
	for _, tc := range []struct {
		v      float64
		digits int
		want   string
	}{
		{0, 3, "0"}, {-983.7, 3, "−984"}, {1974.6, 4, "1,975"}, {27100, 3, "27,100"}, {0.316, 3, "0.316"},
		{-0.0125, 3, "−0.0125"}, {1234567, 3, "1,230,000"}, {1e7, 3, "1e7"}, {-2.5e-5, 3, "−2.5e−5"},
		{9.9999, 3, "10"}, {999.96, 4, "1,000"}, {math.Inf(1), 3, "∞"}, {math.Inf(-1), 3, "−∞"}, {100, 4, "100"},
	} {
		if got := Number(tc.v, tc.digits); got != tc.want {
			t.Errorf("Number(%g, %d) = %q, want %q", tc.v, tc.digits, got, tc.want)
		}
	}
	if got := Signed(12.4, 3); got != "+12.4" {
		t.Errorf("Signed(12.4, 3) = %q", got)
	}
}
