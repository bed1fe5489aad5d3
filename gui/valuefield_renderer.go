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
	r := &valueFieldRenderer{field: f}
	r.Layout(f.Size())
	return r
}

type valueFieldRenderer struct {
	field *ValueField
	parts []fyne.CanvasObject
}

var _ fyne.WidgetRenderer = (*valueFieldRenderer)(nil)

func (r *valueFieldRenderer) Destroy() {}

func (r *valueFieldRenderer) Objects() []fyne.CanvasObject { return r.parts }

// MinSize has room for six characters.
func (r *valueFieldRenderer) MinSize() fyne.Size {
	width := 6*r.field.runeWidth() + 2*px(fieldInset) + px(unitGap) + r.field.unitWidth()
	return fyne.NewSize(width, px(rowHeight))
}

func (r *valueFieldRenderer) Refresh() {
	r.Layout(r.field.Size())
	canvas.Refresh(r.field)
}

func (r *valueFieldRenderer) Layout(size fyne.Size) {
	f := r.field
	edge, stroke := ColorEdge, float32(lineThin)
	if f.focused && !f.Refused {
		edge, stroke = ColorInk, lineFocus
	}
	r.parts = framed(fyne.Position{}, size, ColorField, stroke, edge)
	r.selection(size)
	r.text(size)
	if f.Refused {
		r.parts = append(r.parts, dashed(fyne.Position{}, size, lineFocus, 6, 4, ColorInk)...)
	}
}

// selection draws what is selected, and the cursor.
func (r *valueFieldRenderer) selection(size fyne.Size) {
	f := r.field
	if !f.focused {
		return
	}
	inset := px(7)
	low, high := f.line.selection()
	if low < high {
		left, right := f.x(low), f.x(high)
		r.parts = append(r.parts, filled(fyne.NewPos(left, inset), fyne.NewSize(right-left, size.Height-2*inset), selectionColor))
	}
	r.parts = append(r.parts, filled(fyne.NewPos(f.x(f.line.cursor)-lineNormal/2, inset), fyne.NewSize(lineNormal, size.Height-2*inset), ColorInk))
}

// text draws the number and the unit on one baseline.
func (r *valueFieldRenderer) text(size fyne.Size) {
	f := r.field
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
	r.parts = append(r.parts, number)
	if f.hasOwnUnit() {
		return
	}
	unit := f.unitText()
	unit.Resize(unit.MinSize())
	_, drop := measure(f.Unit, px(textAxis), unit.style(f.Unit))
	unit.Move(fyne.NewPos(size.Width-px(fieldInset)-f.unitWidth(), top+baseline-drop))
	r.parts = append(r.parts, unit)
}
