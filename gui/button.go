package gui

import (
	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/driver/desktop"
)

// Button is pressed by a click, Space or Enter. Its text wraps to two lines.
type Button struct {
	control

	OnTapped func()

	text     *Prose
	pointed  bool
	disabled bool
}

var (
	_ fyne.Widget        = (*Button)(nil)
	_ fyne.Tappable      = (*Button)(nil)
	_ fyne.Focusable     = (*Button)(nil)
	_ fyne.Disableable   = (*Button)(nil)
	_ fyne.Accessible    = (*Button)(nil)
	_ desktop.Hoverable  = (*Button)(nil)
	_ desktop.Cursorable = (*Button)(nil)
)

// NewButton returns a button.
func NewButton(text string, tapped func()) *Button {
	b := &Button{OnTapped: tapped, text: NewProse(text, textBody, 2)}
	b.text.Align = fyne.TextAlignCenter
	b.ExtendBaseWidget(b)
	return b
}

// SetText changes what stands on the button.
func (b *Button) SetText(text string) {
	if b.text.Text != text {
		b.text.Text = text
		b.Refresh()
	}
}

// Tapped presses the button.
func (b *Button) Tapped(*fyne.PointEvent) {
	if !b.disabled {
		b.OnTapped()
	}
}

// TypedKey presses the button with Space or Enter.
func (b *Button) TypedKey(e *fyne.KeyEvent) {
	switch e.Name {
	case fyne.KeySpace, fyne.KeyReturn, fyne.KeyEnter:
		b.Tapped(nil)
	default:
		b.unused(e)
	}
}

// MouseIn darkens the ground.
func (b *Button) MouseIn(*desktop.MouseEvent) {
	b.pointed = true
	b.Refresh()
}

// MouseMoved does nothing.
func (b *Button) MouseMoved(*desktop.MouseEvent) {}

// MouseOut restores the ground.
func (b *Button) MouseOut() {
	b.pointed = false
	b.Refresh()
}

// Enable makes the button work.
func (b *Button) Enable() { b.setDisabled(false) }

// Disable makes the button dead.
func (b *Button) Disable() { b.setDisabled(true) }

// Disabled reports whether the button is dead.
func (b *Button) Disabled() bool { return b.disabled }

func (b *Button) setDisabled(disabled bool) {
	if b.disabled != disabled {
		b.disabled = disabled
		b.Refresh()
	}
}

// AccessibilityLabel is the text.
func (b *Button) AccessibilityLabel() string { return b.text.Text }

// HeightFor is that of a row, or of two lines of text.
func (b *Button) HeightFor(width float32) float32 {
	return max(px(rowHeight), b.text.HeightFor(width-2*px(space8))+px(space8))
}

// CreateRenderer implements [fyne.Widget].
func (b *Button) CreateRenderer() fyne.WidgetRenderer {
	b.ExtendBaseWidget(b)
	return newPainting(b)
}

func (b *Button) least() fyne.Size {
	return fyne.NewSize(b.text.Width()+2*px(space12), px(rowHeight))
}

func (b *Button) paint(size fyne.Size) []fyne.CanvasObject {
	ground, stroke, ink := ColorPanel, float32(lineNormal), ColorInk
	switch {
	case b.disabled:
		ink = ColorSoftInk
	case b.pointed:
		ground = hoverColor
	}
	if b.focused {
		stroke = lineFocus
	}
	b.text.Color = ink
	height := b.text.HeightFor(size.Width - 2*px(space8))
	b.text.Resize(fyne.NewSize(size.Width-2*px(space8), height))
	b.text.Move(fyne.NewPos(px(space8), (size.Height-height)/2))
	return append(framed(fyne.Position{}, size, ground, stroke, ink), b.text)
}
