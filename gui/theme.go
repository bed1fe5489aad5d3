package gui

import (
	"image/color"
	"sync/atomic"

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

// Theme is the look of the window: the tokens, a variant and a text size. Both can be
// changed in place: for another theme the toolkit reads its fonts anew, and keeps
// those of the last ten or so.
type Theme struct {
	wears atomic.Pointer[look]
}

var _ fyne.Theme = (*Theme)(nil)

// NewTheme returns the look for a variant and a text scale, 1 being 100 %. A
// scale outside 0.5 to 3 is moved to the nearer of the two.
func NewTheme(v Variant, scale float32) *Theme {
	t := &Theme{}
	t.wear(look{v, scale})
	return t
}

// wear changes the look. What is drawn has to be refreshed.
func (t *Theme) wear(l look) {
	l.Scale = min(max(l.Scale, 0.5), 3)
	t.wears.Store(&l)
}

// Variant returns the variant asked for.
func (t *Theme) Variant() Variant { return t.wears.Load().Variant }

// Scale returns the text scale.
func (t *Theme) Scale() float32 { return t.wears.Load().Scale }

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
	switch t.Variant() {
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

// Icon returns the built-in icons. The toolkit keeps their drawings by name, so the
// name says the variant.
func (t *Theme) Icon(name fyne.ThemeIconName) fyne.Resource {
	icon := theme.DefaultTheme().Icon(name)
	if themed, ok := icon.(fyne.ThemedResource); ok {
		return &variantIcon{themed, t}
	}
	return icon
}

// variantIcon is an icon in the colours of the present variant.
type variantIcon struct {
	fyne.ThemedResource
	theme *Theme
}

// Name tells the icons of the variants apart.
func (i *variantIcon) Name() string {
	return string(i.theme.Variant()) + "-" + i.ThemedResource.Name()
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
		return v * t.Scale()
	}
	return theme.DefaultTheme().Size(name) * t.Scale()
}

// tint is the present colour of a name.
func tint(name fyne.ThemeColorName) color.Color { return theme.Color(name) }

// px scales a size at 100 % text to the present text size.
func px(size float32) float32 { return size * textScale() }

// textScale is the present text size relative to 100 %.
func textScale() float32 { return theme.TextSize() / textBody }
