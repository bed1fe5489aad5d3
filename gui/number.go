package gui

import (
	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/canvas"
	"fyne.io/fyne/v2/driver/desktop"
	"fyne.io/fyne/v2/widget"
)

// Number is a number that explains itself: a click, Space or Enter opens the strip
// with its formula.
type Number struct {
	widget.BaseWidget
	OnExplain func(topic string)
	OnKey     func(*fyne.KeyEvent) // keys that are not the number's

	text    *Prose
	topic   string
	focused bool
}

var (
	_ fyne.Widget        = (*Number)(nil)
	_ fyne.Tappable      = (*Number)(nil)
	_ fyne.Focusable     = (*Number)(nil)
	_ desktop.Cursorable = (*Number)(nil)
)

// NewNumber returns a number without a value.
func NewNumber(explain func(string), key func(*fyne.KeyEvent)) *Number {
	n := &Number{OnExplain: explain, OnKey: key, text: NewProse("", textBody, 1).right()}
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

// TypedKey opens the strip with Space or Enter.
func (n *Number) TypedKey(e *fyne.KeyEvent) {
	switch e.Name {
	case fyne.KeySpace, fyne.KeyReturn, fyne.KeyEnter:
		n.Tapped(nil)
	default:
		n.OnKey(e)
	}
}

// TypedRune does nothing.
func (n *Number) TypedRune(rune) {}

// FocusGained shows the focus.
func (n *Number) FocusGained() {
	n.focused = true
	n.Refresh()
}

// FocusLost hides the focus.
func (n *Number) FocusLost() {
	n.focused = false
	n.Refresh()
}

// Cursor is a hand.
func (n *Number) Cursor() desktop.Cursor { return desktop.PointerCursor }

// CreateRenderer implements [fyne.Widget].
func (n *Number) CreateRenderer() fyne.WidgetRenderer {
	n.ExtendBaseWidget(n)
	r := &numberRenderer{number: n}
	r.Layout(n.Size())
	return r
}

type numberRenderer struct {
	number *Number
	parts  []fyne.CanvasObject
}

var _ fyne.WidgetRenderer = (*numberRenderer)(nil)

func (r *numberRenderer) Destroy()                     {}
func (r *numberRenderer) Objects() []fyne.CanvasObject { return r.parts }

func (r *numberRenderer) MinSize() fyne.Size {
	return r.number.text.MinSize().AddWidthHeight(2*px(space4), px(space8))
}

func (r *numberRenderer) Refresh() {
	r.Layout(r.number.Size())
	r.number.text.Refresh()
	canvas.Refresh(r.number)
}

func (r *numberRenderer) Layout(size fyne.Size) {
	n := r.number
	n.text.Move(fyne.NewPos(px(space4), (size.Height-n.text.lineHeight())/2))
	n.text.Resize(fyne.NewSize(size.Width-2*px(space4), n.text.lineHeight()))
	r.parts = []fyne.CanvasObject{n.text}
	if n.focused {
		r.parts = append(r.parts, ring(fyne.Position{}, size)...)
	}
}
