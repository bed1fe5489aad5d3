package gui

import (
	"image/color"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/theme"
)

// Variant says which of the two sets of colours the window uses.
type Variant string

// The variants. FollowSystem takes what the desktop prefers.
const (
	FollowSystem Variant = "system"
	Light        Variant = "light"
	Dark         Variant = "dark"
)

// Theme is the look of the window: the tokens, a variant and a text size.
type Theme struct {
	variant Variant
	scale   float32 // of text and everything measured by it; 1 is 100 %
}

var _ fyne.Theme = (*Theme)(nil)

// NewTheme returns the look for a variant and a text scale, 1 being 100 %. A
// scale outside 0.5 to 3 is moved to the nearer of the two.
func NewTheme(v Variant, scale float32) *Theme {
	return &Theme{variant: v, scale: min(max(scale, 0.5), 3)}
}

// Variant returns the variant asked for.
func (t *Theme) Variant() Variant { return t.variant }

// Scale returns the text scale.
func (t *Theme) Scale() float32 { return t.scale }

// Color returns a colour of the window or of the toolkit.
func (t *Theme) Color(name fyne.ThemeColorName, system fyne.ThemeVariant) color.Color {
	if name == theme.ColorNameShadow {
		return shade
	}
	if ours, ok := aliases[name]; ok {
		name = ours
	}
	p, ok := palette[name]
	if !ok {
		if p, ok = washes[name]; !ok {
			return theme.DefaultTheme().Color(name, t.resolve(system))
		}
	}
	if t.resolve(system) == theme.VariantDark {
		return p.dark
	}
	return p.light
}

func (t *Theme) resolve(system fyne.ThemeVariant) fyne.ThemeVariant {
	switch t.variant {
	case Light:
		return theme.VariantLight
	case Dark:
		return theme.VariantDark
	}
	return system
}

// Font returns the built-in fonts.
func (t *Theme) Font(style fyne.TextStyle) fyne.Resource {
	return theme.DefaultTheme().Font(style)
}

// Icon returns the built-in icons.
func (t *Theme) Icon(name fyne.ThemeIconName) fyne.Resource {
	return theme.DefaultTheme().Icon(name)
}

// sizes are the toolkit's sizes that the tokens fix, at 100 %.
var sizes = map[fyne.ThemeSizeName]float32{
	theme.SizeNameText:            textBody,
	theme.SizeNameCaptionText:     textAxis,
	theme.SizeNameSubHeadingText:  textSentence,
	theme.SizeNameHeadingText:     textVerdict,
	theme.SizeNamePadding:         space4,
	theme.SizeNameInnerPadding:    space8,
	theme.SizeNameInputBorder:     lineThin,
	theme.SizeNameInputRadius:     radius,
	theme.SizeNameSelectionRadius: radius,
	theme.SizeNameButtonRadius:    radius,
	theme.SizeNameCardRadius:      radius,
	theme.SizeNameDialogRadius:    radius,
	theme.SizeNamePopupRadius:     radius,
	theme.SizeNameMenuRadius:      radius,
	theme.SizeNameScrollBarRadius: radius,
	theme.SizeNameModalBlurRadius: 0,
}

// Size returns a size of the toolkit, scaled with the text.
func (t *Theme) Size(name fyne.ThemeSizeName) float32 {
	if v, ok := sizes[name]; ok {
		return v * t.scale
	}
	return theme.DefaultTheme().Size(name) * t.scale
}

// tint is the present colour of a name.
func tint(name fyne.ThemeColorName) color.Color { return theme.Color(name) }

// px scales a size at 100 % text to the present text size.
func px(size float32) float32 { return size * textScale() }

// textScale is the present text size relative to 100 %.
func textScale() float32 { return theme.TextSize() / textBody }
