package gui

import (
	"testing"

	"fyne.io/fyne/v2/theme"
)

// A theme changes in place, and its icons with it.
func TestThemeChangesInPlace(t *testing.T) {
	b := newBench(t, setup{})
	worn := b.app.Settings().Theme()
	icon := worn.Icon(theme.IconNameFolder)
	light, ink := icon.Name(), worn.Color(ColorInk, theme.VariantLight)
	b.window.chooseVariant(Dark)
	b.window.stepText(+1)
	if b.app.Settings().Theme() != worn {
		t.Error("the window wears another theme, for which the toolkit reads its fonts anew")
	}
	if icon.Name() == light || worn.Color(ColorInk, theme.VariantLight) == ink {
		t.Errorf("icon %q and ink stay those of the light window", icon.Name())
	}
	if got := worn.Size(theme.SizeNameText); got < 1.09*textBody || got > 1.11*textBody {
		t.Errorf("the text is %g, want %g", got, 1.1*textBody)
	}
}
