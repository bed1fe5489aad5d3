package gui

import (
	"image/color"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/theme"
)

// Names of the colours of the window, beside those of the toolkit.
//
// Blue, red and yellow are the medium-contrast set of Paul Tol, "Colour Schemes",
// SRON/EPS/TN/09-002, issue 3.2 (2021), a set of light-dark pairs. The neutral
// colours are ours.
const (
	ColorPaper    fyne.ThemeColorName = "hilltop-paper"     // ground of a page
	ColorPanel    fyne.ThemeColorName = "hilltop-panel"     // ground of bars and columns
	ColorField    fyne.ThemeColorName = "hilltop-field"     // ground of a value field
	ColorInk      fyne.ThemeColorName = "hilltop-ink"       // text, curves, controls
	ColorSoftInk  fyne.ThemeColorName = "hilltop-soft-ink"  // inherited, stale
	ColorEdge     fyne.ThemeColorName = "hilltop-edge"      // borders
	ColorBlue     fyne.ThemeColorName = "hilltop-blue"      // bounded; twin: lid, solid
	ColorRed      fyne.ThemeColorName = "hilltop-red"       // unbounded; twin: strips, no lid
	ColorYellow   fyne.ThemeColorName = "hilltop-yellow"    // drained; twin: split lid, ink outline
	ColorOnYellow fyne.ThemeColorName = "hilltop-on-yellow" // text on yellow
)

// pair is one colour in both variants.
type pair struct{ light, dark color.NRGBA }

func rgb(hex uint32) color.NRGBA {
	return color.NRGBA{R: uint8(hex >> 16), G: uint8(hex >> 8), B: uint8(hex), A: 0xff}
}

// palette holds the colours of the window, and the toolkit's own names mapped to
// them: primary, error, warning and success are all ink.
var palette = map[fyne.ThemeColorName]pair{
	ColorPaper:    {rgb(0xFAFAF7), rgb(0x14181C)},
	ColorPanel:    {rgb(0xEFEEE9), rgb(0x1C2127)},
	ColorField:    {rgb(0xFFFFFF), rgb(0x0E1114)},
	ColorInk:      {rgb(0x1A1D21), rgb(0xE0E3E6)},
	ColorSoftInk:  {rgb(0x4A5159), rgb(0xA9B1B8)},
	ColorEdge:     {rgb(0x666C73), rgb(0x8A939C)},
	ColorBlue:     {rgb(0x004488), rgb(0x6699CC)},
	ColorRed:      {rgb(0x994455), rgb(0xEE99AA)},
	ColorYellow:   {rgb(0xEECC66), rgb(0xEECC66)},
	ColorOnYellow: {rgb(0x1A1D21), rgb(0x1A1D21)},
}

// aliases maps the toolkit's names to ours.
var aliases = map[fyne.ThemeColorName]fyne.ThemeColorName{
	theme.ColorNameBackground:                ColorPaper,
	theme.ColorNameButton:                    ColorPanel,
	theme.ColorNameDisabled:                  ColorSoftInk,
	theme.ColorNameDisabledButton:            ColorPanel,
	theme.ColorNameError:                     ColorInk,
	theme.ColorNameForeground:                ColorInk,
	theme.ColorNameForegroundOnError:         ColorPaper,
	theme.ColorNameForegroundOnPrimary:       ColorPaper,
	theme.ColorNameForegroundOnSuccess:       ColorPaper,
	theme.ColorNameForegroundOnWarning:       ColorPaper,
	theme.ColorNameHeaderBackground:          ColorPanel,
	theme.ColorNameHyperlink:                 ColorInk,
	theme.ColorNameInnerWindowBorder:         ColorPanel,
	theme.ColorNameInnerWindowBorderInactive: ColorPanel,
	theme.ColorNameInputBackground:           ColorField,
	theme.ColorNameInputBorder:               ColorEdge,
	theme.ColorNameMenuBackground:            ColorPanel,
	theme.ColorNameOverlayBackground:         ColorPaper,
	theme.ColorNamePlaceHolder:               ColorSoftInk,
	theme.ColorNamePrimary:                   ColorInk,
	theme.ColorNameScrollBar:                 ColorEdge,
	theme.ColorNameScrollBarBackground:       ColorPanel,
	theme.ColorNameSeparator:                 ColorEdge,
	theme.ColorNameSuccess:                   ColorInk,
	theme.ColorNameWarning:                   ColorInk,
}

// washes are the grounds under a row that is pointed at, pressed or selected;
// text on them stays ink.
var washes = map[fyne.ThemeColorName]pair{
	theme.ColorNameHover:     {rgb(0xDDDCD5), rgb(0x2A313A)},
	theme.ColorNamePressed:   {rgb(0xCFCEC6), rgb(0x343D48)},
	theme.ColorNameSelection: {rgb(0xC9D3DE), rgb(0x2E4257)},
	theme.ColorNameFocus:     {rgb(0xC9D3DE), rgb(0x2E4257)},
}

// hoverColor lies under what is pointed at.
const hoverColor = theme.ColorNameHover

// shade lies over what waits behind a question, and marks where a column goes on.
var shade = color.NRGBA{A: 0x66}

// selectionColor lies under selected text.
const selectionColor = theme.ColorNameSelection

// Text sizes at 100 %.
const (
	textAxis     = 12 // axes, labels under numbers
	textBody     = 14
	textSentence = 16 // bold: the sentence on top of a page
	textVerdict  = 26 // bold
	textVerdictC = 22 // bold, in the compact window
)

// Spacing at 100 %.
const (
	space4  = 4
	space8  = 8
	space12 = 12
	space16 = 16
	space24 = 24

	rowHeight = 32
	radius    = 2
)

// Line widths.
const (
	lineThin   = 1
	lineNormal = 1.5
	lineCurve  = 2.5
	lineLid    = 4
	lineFocus  = 3
)
