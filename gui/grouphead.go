package gui

import (
	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/driver/desktop"

	"hilltop/gui/session"
)

// GroupHead is the heading of a group of values: its name with a sign that says
// whether it is open, and what the group holds in a few words. A click, Space or
// Enter opens and shuts the group, the arrows to the right and to the left do one of
// both.
type GroupHead struct {
	control
	OnToggle func()

	name, summary *Prose
	open          bool
	pointed       bool
}

var (
	_ fyne.Widget        = (*GroupHead)(nil)
	_ fyne.Tappable      = (*GroupHead)(nil)
	_ fyne.Focusable     = (*GroupHead)(nil)
	_ fyne.Accessible    = (*GroupHead)(nil)
	_ desktop.Hoverable  = (*GroupHead)(nil)
	_ desktop.Cursorable = (*GroupHead)(nil)
)

// NewGroupHead returns a heading without a name; toggle opens or shuts the group.
func NewGroupHead(toggle, focus func(), key func(*fyne.KeyEvent)) *GroupHead {
	h := &GroupHead{OnToggle: toggle,
		name: NewProse("", textBody, 1).bold(), summary: NewProse("", textAxis, 0).soft()}
	h.OnKey, h.OnFocus = key, focus
	h.ExtendBaseWidget(h)
	return h
}

// set shows a group.
func (h *GroupHead) set(g session.Group, open bool) {
	h.name.Text, h.summary.Text, h.open = g.Name, g.Summary, open
	h.Refresh()
}

// Tapped opens or shuts the group.
func (h *GroupHead) Tapped(*fyne.PointEvent) { h.OnToggle() }

// TypedKey opens or shuts the group.
func (h *GroupHead) TypedKey(e *fyne.KeyEvent) {
	switch e.Name {
	case fyne.KeySpace, fyne.KeyReturn, fyne.KeyEnter:
		h.OnToggle()
	case fyne.KeyRight:
		h.turn(true)
	case fyne.KeyLeft:
		h.turn(false)
	default:
		h.unused(e)
	}
}

// turn makes the group open or not.
func (h *GroupHead) turn(open bool) {
	if h.open != open {
		h.OnToggle()
	}
}

// MouseIn darkens the ground.
func (h *GroupHead) MouseIn(*desktop.MouseEvent) {
	h.pointed = true
	h.Refresh()
}

// MouseMoved does nothing.
func (h *GroupHead) MouseMoved(*desktop.MouseEvent) {}

// MouseOut restores the ground.
func (h *GroupHead) MouseOut() {
	h.pointed = false
	h.Refresh()
}

// AccessibilityLabel is the name, the state and the summary.
func (h *GroupHead) AccessibilityLabel() string {
	state := "shut"
	if h.open {
		state = "open"
	}
	return h.name.Text + ", " + state + ": " + h.summary.Text
}

const (
	signRoom = 20 // for the sign before the name
	nameRoom = 60 // for the name, so that the summaries line up
)

// summaryLeft is where the summary begins.
func (h *GroupHead) summaryLeft() float32 {
	return px(signRoom) + max(px(nameRoom), h.name.Width()+px(space8))
}

// HeightFor is that of a row, or of a longer summary.
func (h *GroupHead) HeightFor(width float32) float32 {
	return max(px(knobHigh), h.summary.HeightFor(width-h.summaryLeft()-px(space4))+px(space8))
}

// CreateRenderer implements [fyne.Widget].
func (h *GroupHead) CreateRenderer() fyne.WidgetRenderer {
	h.ExtendBaseWidget(h)
	return newPainting(h)
}

func (h *GroupHead) least() fyne.Size {
	return fyne.NewSize(h.summaryLeft()+h.summary.least().Width, h.HeightFor(h.Size().Width))
}

// paint draws a line above, the sign, the name and the summary on one baseline.
func (h *GroupHead) paint(size fyne.Size) []fyne.CanvasObject {
	ground := ColorPanel
	if h.pointed {
		ground = hoverColor
	}
	parts := []fyne.CanvasObject{
		filled(fyne.Position{}, size, ground),
		filled(fyne.Position{}, fyne.NewSize(size.Width, lineThin), ColorEdge),
	}
	sign := NewProse("+", textBody, 1).once()
	if h.open {
		sign.Text = "−"
	}
	left := h.summaryLeft()
	width := size.Width - left - px(space4)
	high := h.summary.HeightFor(width)
	top := (size.Height - high) / 2
	drop := top + h.summary.ascent(h.summary.Text) - h.name.ascent(h.name.Text)
	if high > h.summary.lineHeight() {
		drop = (size.Height - h.name.lineHeight()) / 2
	}
	put(sign, px(space4), drop, px(signRoom), sign.lineHeight())
	put(h.name, px(signRoom), drop, h.name.Width(), h.name.lineHeight())
	put(h.summary, left, top, width, high)
	parts = append(parts, sign, h.name, h.summary)
	if h.focused {
		parts = append(parts, ring(fyne.Position{}, size)...)
	}
	return parts
}
