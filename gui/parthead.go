package gui

import (
	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/widget"

	"hilltop/gui/session"
)

// partHead is the heading of one of several things in a group, such as one beam,
// with a button that takes it out.
type partHead struct {
	widget.BaseWidget
	name   *Prose
	remove *Button
	action string
}

var _ fyne.Widget = (*partHead)(nil)

// newPartHead returns a heading; do carries out the action of its button, and focus
// tells that the button has the focus.
func newPartHead(do func(action string), focus func(*partHead), key func(*fyne.KeyEvent)) *partHead {
	h := &partHead{name: NewProse("", textBody, 2).bold()}
	h.remove = NewButton("", func() { do(h.action) })
	h.remove.OnKey, h.remove.OnFocus = key, func() { focus(h) }
	h.ExtendBaseWidget(h)
	return h
}

func (h *partHead) set(p session.Part) {
	h.name.Text = p.Name
	show(h.remove, p.Remove != nil)
	if p.Remove != nil {
		h.action = p.Remove.ID
		h.remove.SetText(p.Remove.Label)
	}
	h.Refresh()
}

// nameWidth is the room for the name.
func (h *partHead) nameWidth(width float32) float32 {
	if h.remove.Visible() {
		width -= h.remove.MinSize().Width + px(space8)
	}
	return width
}

// HeightFor is that of the name or of the button.
func (h *partHead) HeightFor(width float32) float32 {
	high := h.name.HeightFor(h.nameWidth(width))
	if h.remove.Visible() {
		high = max(high, px(rowHeight))
	}
	return high
}

// CreateRenderer implements [fyne.Widget].
func (h *partHead) CreateRenderer() fyne.WidgetRenderer {
	h.ExtendBaseWidget(h)
	return newPainting(h)
}

func (h *partHead) least() fyne.Size {
	return fyne.NewSize(h.name.least().Width, h.HeightFor(h.Size().Width))
}

func (h *partHead) paint(size fyne.Size) []fyne.CanvasObject {
	width := h.nameWidth(size.Width)
	high := h.name.HeightFor(width)
	put(h.name, 0, (size.Height-high)/2, width, high)
	button := h.remove.MinSize()
	put(h.remove, size.Width-button.Width, (size.Height-button.Height)/2, button.Width, button.Height)
	return []fyne.CanvasObject{h.name, h.remove}
}
