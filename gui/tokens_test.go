package gui

import (
	"image/color"
	"math"
	"testing"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/theme"
)

// luminance is the relative luminance of WCAG 2.1, section "relative luminance".
func luminance(c color.Color) float64 {
	r, g, b, _ := c.RGBA()
	linear := func(v uint32) float64 {
		s := float64(v) / 0xffff
		if s <= 0.04045 {
			return s / 12.92
		}
		return math.Pow((s+0.055)/1.055, 2.4)
	}
	return 0.2126*linear(r) + 0.7152*linear(g) + 0.0722*linear(b)
}

// contrast is the contrast ratio of WCAG 2.1, 1 to 21.
func contrast(a, b color.Color) float64 {
	la, lb := luminance(a), luminance(b)
	if la < lb {
		la, lb = lb, la
	}
	return (la + 0.05) / (lb + 0.05)
}

func TestContrastFormula(t *testing.T) {
	if got := contrast(color.Black, color.White); math.Abs(got-21) > 1e-9 {
		t.Errorf("black on white: got %g, want 21 (WCAG 2.1)", got)
	}
	if got := contrast(rgb(0x777777), color.White); math.Abs(got-4.48) > 0.01 {
		t.Errorf("#777 on white: got %g, want 4.48 (WCAG 2.1 worked example)", got)
	}
}

var variants = []Variant{Light, Dark}

func TestTextStandsOut(t *testing.T) {
	const want = 4.5 // WCAG 2.1, 1.4.3
	for _, v := range variants {
		th := NewTheme(v, 1)
		at := func(n fyne.ThemeColorName) color.Color { return th.Color(n, theme.VariantLight) }
		check := func(text, ground fyne.ThemeColorName) {
			t.Helper()
			if got := contrast(at(text), at(ground)); got < want {
				t.Errorf("%s: %s on %s has contrast %.2f, want at least %.1f", v, text, ground, got, want)
			}
		}
		for _, ground := range []fyne.ThemeColorName{ColorPaper, ColorPanel, ColorField} {
			for _, text := range []fyne.ThemeColorName{ColorInk, ColorSoftInk, ColorBlue, ColorRed} {
				check(text, ground)
			}
		}
		for ground := range washes {
			check(ColorInk, ground)
		}
		check(ColorOnYellow, ColorYellow)
		check(ColorPaper, ColorBlue)
		check(ColorPaper, ColorRed)
		check(ColorPaper, ColorInk)
		for _, name := range []fyne.ThemeColorName{theme.ColorNamePrimary, theme.ColorNameError, theme.ColorNameHyperlink, theme.ColorNameDisabled, theme.ColorNamePlaceHolder} {
			check(name, theme.ColorNameBackground)
			check(name, theme.ColorNameMenuBackground)
		}
	}
}

func TestMarksStandOut(t *testing.T) {
	const want = 3 // WCAG 2.1, 1.4.11
	for _, v := range variants {
		th := NewTheme(v, 1)
		at := func(n fyne.ThemeColorName) color.Color { return th.Color(n, theme.VariantLight) }
		for _, ground := range []fyne.ThemeColorName{ColorPaper, ColorPanel, ColorField} {
			// Yellow marks carry an ink outline, so the outline counts.
			for _, mark := range []fyne.ThemeColorName{ColorInk, ColorEdge, ColorBlue, ColorRed} {
				if got := contrast(at(mark), at(ground)); got < want {
					t.Errorf("%s: mark %s on %s has contrast %.2f, want at least %d", v, mark, ground, got, want)
				}
			}
		}
		if got := contrast(at(ColorOnYellow), at(ColorYellow)); got < want {
			t.Errorf("%s: ink on yellow has contrast %.2f, want at least %d", v, got, want)
		}
	}
}

func TestThemeCoversToolkitColours(t *testing.T) {
	for name, ours := range aliases {
		if _, ok := palette[ours]; !ok {
			t.Errorf("%s maps to %s, which is not in the palette", name, ours)
		}
	}
	for _, v := range variants {
		th := NewTheme(v, 1)
		for _, name := range []fyne.ThemeColorName{theme.ColorNamePrimary, theme.ColorNameError, theme.ColorNameWarning, theme.ColorNameSuccess} {
			if th.Color(name, theme.VariantLight) != th.Color(ColorInk, theme.VariantLight) {
				t.Errorf("%s: %s is not ink", v, name)
			}
		}
	}
}

func TestThemeFollowsSystem(t *testing.T) {
	th := NewTheme(FollowSystem, 1)
	for _, tc := range []struct {
		system fyne.ThemeVariant
		want   color.Color
	}{{theme.VariantLight, rgb(0xFAFAF7)}, {theme.VariantDark, rgb(0x14181C)}} {
		if got := th.Color(ColorPaper, tc.system); got != tc.want {
			t.Errorf("paper for system variant %v: got %v, want %v", tc.system, got, tc.want)
		}
	}
}

func TestThemeScale(t *testing.T) {
	for _, tc := range []struct{ scale, want float32 }{{1, 14}, {1.5, 21}, {0.1, 7}, {9, 42}} {
		if got := NewTheme(Light, tc.scale).Size(theme.SizeNameText); got != tc.want {
			t.Errorf("text at scale %g: got %g, want %g", tc.scale, got, tc.want)
		}
	}
}
