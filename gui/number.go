package gui

import (
	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/driver/desktop"
)

// Number is a number that explains itself: a click, Space or Enter opens the strip
// with its formula, a right click its menu.
type Number struct {
	control
	OnExplain func(topic string)

	text  *Prose
	topic string
}

var (
	_ fyne.Widget        = (*Number)(nil)
	_ fyne.Tappable      = (*Number)(nil)
	_ fyne.Focusable     = (*Number)(nil)
	_ desktop.Cursorable = (*Number)(nil)

	_ fyne.SecondaryTappable = (*Number)(nil)
)

// NewNumber returns a number without a value.
func NewNumber(explain func(string), key func(*fyne.KeyEvent)) *Number {
	n := &Number{OnExplain: explain, text: NewProse("", textBody, 1).right()}
	n.OnKey = key
	n.ExtendBaseWidget(n)
	return n
}

// Set shows a number; topic is what the strip explains of it.
func (n *Number) Set(text, topic string) {
	n.text.Text, n.topic = text, topic
	n.Refresh()
}

// Tapped opens the strip.
func (n *Number) Tapped(*fyne.PointEvent) { n.OnExplain(n.topic) }

// TappedSecondary takes the focus and does what the menu key does.
func (n *Number) TappedSecondary(*fyne.PointEvent) {
	takeFocus(n)
	n.unused(&fyne.KeyEvent{Name: desktop.KeyMenu})
}

// TypedKey opens the strip with Space or Enter.
func (n *Number) TypedKey(e *fyne.KeyEvent) {
	switch e.Name {
	case fyne.KeySpace, fyne.KeyReturn, fyne.KeyEnter:
		n.Tapped(nil)
	default:
		n.unused(e)
	}
}

// CreateRenderer implements [fyne.Widget].
func (n *Number) CreateRenderer() fyne.WidgetRenderer {
	n.ExtendBaseWidget(n)
	return newPainting(n)
}

func (n *Number) least() fyne.Size {
	return n.text.MinSize().AddWidthHeight(2*px(space4), px(space8))
}

func (n *Number) paint(size fyne.Size) []fyne.CanvasObject {
	n.text.Move(fyne.NewPos(px(space4), (size.Height-n.text.lineHeight())/2))
	n.text.Resize(fyne.NewSize(size.Width-2*px(space4), n.text.lineHeight()))
	parts := []fyne.CanvasObject{n.text}
	if n.focused {
		parts = append(parts, ring(fyne.Position{}, size)...)
	}
	return parts
}
