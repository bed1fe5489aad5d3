package gui

import (
	"unicode"
	"unicode/utf8"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/canvas"
)

const (
	fieldInset = space8 // between the outline and the text
	longInset  = 6      // the same above and below a long text
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
func (f *ValueField) unitText() *Prose { return NewProse(f.Unit, textAxis, 1).soft().once() }

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
func (f *ValueField) placeAt(at fyne.Position) int {
	if f.Long {
		lines := f.lines(f.Size().Width)
		i := min(max(int((at.Y-px(longInset))/f.lineHeight()), 0), len(lines)-1)
		return lastOf(lines, i, int((at.X-px(fieldInset))/f.runeWidth()+0.5))
	}
	_, high := f.window()
	back := (f.rightEdge() - at.X) / f.runeWidth()
	return f.line.inside(high - int(back+0.5))
}

// CreateRenderer implements [fyne.Widget].
func (f *ValueField) CreateRenderer() fyne.WidgetRenderer {
	f.ExtendBaseWidget(f)
	return newPainting(f)
}

// least has room for six characters.
func (f *ValueField) least() fyne.Size {
	if f.Long {
		return fyne.NewSize(6*f.runeWidth()+2*px(fieldInset), f.HeightFor(f.Size().Width))
	}
	width := 6*f.runeWidth() + 2*px(fieldInset) + px(unitGap) + f.unitWidth()
	return fyne.NewSize(width, px(rowHeight))
}

func (f *ValueField) paint(size fyne.Size) []fyne.CanvasObject {
	edge, stroke := ColorEdge, float32(lineThin)
	if f.focused && !f.Refused {
		edge, stroke = ColorInk, lineFocus
	}
	parts := framed(fyne.Position{}, size, ColorField, stroke, edge)
	if f.Long {
		parts = append(parts, f.paintLines(size)...)
	} else {
		parts = append(parts, f.paintSelection(size)...)
		parts = append(parts, f.paintText(size)...)
	}
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
	low, high := f.window()
	number := canvas.NewText(string(f.line.text[low:high]), tint(f.ink()))
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

// ink is the colour of the text: soft for a value of another stage.
func (f *ValueField) ink() fyne.ThemeColorName {
	if f.Inherited && !f.Edited() {
		return ColorSoftInk
	}
	return ColorInk
}

// paintLines draws a long text from the left, with the selection and the cursor.
func (f *ValueField) paintLines(size fyne.Size) []fyne.CanvasObject {
	var grounds, texts []fyne.CanvasObject
	lines, high, wide := f.lines(size.Width), f.lineHeight(), f.runeWidth()
	from, to := f.line.selection()
	cursorLine := lineOf(lines, f.line.cursor)
	for i, line := range lines {
		at := fyne.NewPos(px(fieldInset), px(longInset)+float32(i)*high)
		if low, top := max(from, line.low), min(to, line.high); f.focused && low < top {
			grounds = append(grounds, filled(at.AddXY(float32(low-line.low)*wide, 0), fyne.NewSize(float32(top-low)*wide, high), selectionColor))
		}
		if f.focused && i == cursorLine {
			x := float32(f.line.cursor-line.low)*wide - lineNormal/2
			texts = append(texts, filled(at.AddXY(x, 0), fyne.NewSize(lineNormal, high), ColorInk))
		}
		text := canvas.NewText(string(f.line.text[line.low:line.high]), tint(f.ink()))
		text.TextSize, text.TextStyle = px(textBody), monospace
		text.Resize(text.MinSize())
		text.Move(at)
		texts = append(texts, text)
	}
	return append(grounds, texts...)
}
