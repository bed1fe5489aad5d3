package gui

import (
	"unicode"
	"unicode/utf8"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/canvas"
)

const (
	fieldInset = space8 // between the outline and the text
	unitGap    = 6      // between the number and its unit
)

var monospace = fyne.TextStyle{Monospace: true}

// runeWidth is the width of one digit of the field.
func (f *ValueField) runeWidth() float32 {
	size, _ := measure("0", px(textBody), monospace)
	return size.Width
}

// rightEdge is where the number ends.
func (f *ValueField) rightEdge() float32 {
	edge := f.Size().Width - px(fieldInset)
	if f.hasOwnUnit() {
		return edge
	}
	return edge - f.unitWidth() - px(unitGap)
}

// hasOwnUnit reports whether no unit is to be drawn: there is none, or one is being
// typed.
func (f *ValueField) hasOwnUnit() bool {
	last, _ := utf8.DecodeLastRuneInString(f.line.String())
	return f.Unit == "" || f.Edited() && (unicode.IsLetter(last) || last == '%')
}

func (f *ValueField) unitWidth() float32 { return f.unitText().Width() }

// unitText is the unit, in soft ink.
func (f *ValueField) unitText() *Prose { return NewProse(f.Unit, textAxis, 1).soft() }

// window returns the stretch of runes that is drawn: all of them, or as many as
// fit around the cursor.
func (f *ValueField) window() (low, high int) {
	n, fits := len(f.line.text), max(0, int((f.rightEdge()-px(space4))/f.runeWidth()))
	if n <= fits {
		f.first = 0
		return 0, n
	}
	f.first = min(max(f.first, f.line.cursor-fits), f.line.cursor, n-fits)
	return f.first, f.first + fits
}

// x is where the rune at a place begins.
func (f *ValueField) x(place int) float32 {
	low, high := f.window()
	return f.rightEdge() - float32(high-min(max(place, low), high))*f.runeWidth()
}

// placeAt is the place between two runes nearest to a position.
func (f *ValueField) placeAt(x float32) int {
	_, high := f.window()
	back := (f.rightEdge() - x) / f.runeWidth()
	return f.line.inside(high - int(back+0.5))
}

// CreateRenderer implements [fyne.Widget].
func (f *ValueField) CreateRenderer() fyne.WidgetRenderer {
	f.ExtendBaseWidget(f)
	return newPainting(f)
}

// least has room for six characters.
func (f *ValueField) least() fyne.Size {
	width := 6*f.runeWidth() + 2*px(fieldInset) + px(unitGap) + f.unitWidth()
	return fyne.NewSize(width, px(rowHeight))
}

func (f *ValueField) paint(size fyne.Size) []fyne.CanvasObject {
	edge, stroke := ColorEdge, float32(lineThin)
	if f.focused && !f.Refused {
		edge, stroke = ColorInk, lineFocus
	}
	parts := framed(fyne.Position{}, size, ColorField, stroke, edge)
	parts = append(parts, f.paintSelection(size)...)
	parts = append(parts, f.paintText(size)...)
	if f.Refused {
		parts = append(parts, dashed(fyne.Position{}, size, lineFocus, 6, 4, ColorInk)...)
	}
	return parts
}

// paintSelection draws what is selected, and the cursor.
func (f *ValueField) paintSelection(size fyne.Size) []fyne.CanvasObject {
	if !f.focused {
		return nil
	}
	var parts []fyne.CanvasObject
	inset := px(7)
	low, high := f.line.selection()
	if low < high {
		left, right := f.x(low), f.x(high)
		parts = append(parts, filled(fyne.NewPos(left, inset), fyne.NewSize(right-left, size.Height-2*inset), selectionColor))
	}
	return append(parts, filled(fyne.NewPos(f.x(f.line.cursor)-lineNormal/2, inset), fyne.NewSize(lineNormal, size.Height-2*inset), ColorInk))
}

// paintText draws the number and the unit on one baseline.
func (f *ValueField) paintText(size fyne.Size) []fyne.CanvasObject {
	ink := ColorInk
	if f.Inherited && !f.Edited() {
		ink = ColorSoftInk
	}
	low, high := f.window()
	number := canvas.NewText(string(f.line.text[low:high]), tint(ink))
	number.TextSize, number.TextStyle = px(textBody), monospace
	box, baseline := measure(number.Text, number.TextSize, monospace)
	top := (size.Height - box.Height) / 2
	number.Resize(box)
	number.Move(fyne.NewPos(f.x(low), top))
	if f.hasOwnUnit() {
		return []fyne.CanvasObject{number}
	}
	unit := f.unitText()
	unit.Resize(unit.MinSize())
	_, drop := measure(f.Unit, px(textAxis), unit.style(f.Unit))
	unit.Move(fyne.NewPos(size.Width-px(fieldInset)-f.unitWidth(), top+baseline-drop))
	return []fyne.CanvasObject{number, unit}
}
