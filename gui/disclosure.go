package gui

import (
	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/widget"
)

// Disclosure is a part of a page that is shown on demand: a button, and below it the
// part.
type Disclosure struct {
	widget.BaseWidget
	title string
	head  *Button
	body  fyne.CanvasObject
	open  bool
	on    func() // it was opened or shut
}

// NewDisclosure returns a part that is not shown yet; on runs when it is opened or
// shut.
func NewDisclosure(title string, body fyne.CanvasObject, key func(*fyne.KeyEvent), on func()) *Disclosure {
	d := &Disclosure{title: title, body: body, on: on}
	d.head = NewButton("", d.Toggle)
	d.head.OnKey = key
	d.ExtendBaseWidget(d)
	d.set(false)
	return d
}

// Toggle shows the part, or hides it.
func (d *Disclosure) Toggle() {
	d.set(!d.open)
	d.on()
}

func (d *Disclosure) set(open bool) {
	d.open = open
	show(d.body, open)
	verb := "Show: "
	if open {
		verb = "Hide: "
	}
	d.head.SetText(verb + d.title)
	d.Refresh()
}

// headWidth has room for both words.
func (d *Disclosure) headWidth() float32 {
	return NewProse("Show: "+d.title, textBody, 1).Width() + 2*px(space12)
}

// HeightFor is the height in a width.
func (d *Disclosure) HeightFor(width float32) float32 {
	if !d.open {
		return px(rowHeight)
	}
	return px(rowHeight) + px(space8) + heightFor(d.body, width)
}

// CreateRenderer implements [fyne.Widget].
func (d *Disclosure) CreateRenderer() fyne.WidgetRenderer {
	d.ExtendBaseWidget(d)
	return newPainting(d)
}

func (d *Disclosure) least() fyne.Size { return fyne.NewSize(0, d.HeightFor(d.Size().Width)) }

func (d *Disclosure) paint(size fyne.Size) []fyne.CanvasObject {
	put(d.head, 0, 0, min(d.headWidth(), size.Width), px(rowHeight))
	put(d.body, 0, px(rowHeight+space8), size.Width, size.Height-px(rowHeight+space8))
	return []fyne.CanvasObject{d.head, d.body}
}
