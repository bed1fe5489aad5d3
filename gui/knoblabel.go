package gui

import (
	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/widget"
)

// KnobLabel is the name of a value, on up to two lines, with a soft text below it
// that says where the value comes from, or its sign in words. A click leads to the
// field, a double click resets it, a right click opens its menu.
type KnobLabel struct {
	widget.BaseWidget
	OnTapped, OnDoubleTapped func()
	OnMenu                   func(at fyne.Position)

	name, origin *Prose
}

var (
	_ fyne.Widget            = (*KnobLabel)(nil)
	_ fyne.Tappable          = (*KnobLabel)(nil)
	_ fyne.DoubleTappable    = (*KnobLabel)(nil)
	_ fyne.SecondaryTappable = (*KnobLabel)(nil)
)

// NewKnobLabel returns an empty label.
func NewKnobLabel(tapped, doubleTapped func(), menu func(fyne.Position)) *KnobLabel {
	l := &KnobLabel{OnTapped: tapped, OnDoubleTapped: doubleTapped, OnMenu: menu,
		name: NewProse("", textBody, 2), origin: NewProse("", textAxis, 2).soft()}
	l.ExtendBaseWidget(l)
	return l
}

// Set changes both lines.
func (l *KnobLabel) Set(name, origin string) {
	if l.name.Text != name || l.origin.Text != origin {
		l.name.Text, l.origin.Text = name, origin
		l.Refresh()
	}
}

// Tapped leads to the field.
func (l *KnobLabel) Tapped(*fyne.PointEvent) { l.OnTapped() }

// DoubleTapped resets the field.
func (l *KnobLabel) DoubleTapped(*fyne.PointEvent) { l.OnDoubleTapped() }

// TappedSecondary opens the menu of the field.
func (l *KnobLabel) TappedSecondary(e *fyne.PointEvent) { l.OnMenu(e.AbsolutePosition) }

// CreateRenderer implements [fyne.Widget].
func (l *KnobLabel) CreateRenderer() fyne.WidgetRenderer {
	l.ExtendBaseWidget(l)
	return newPainting(l)
}

func (l *KnobLabel) least() fyne.Size {
	return fyne.NewSize(max(l.name.least().Width, l.origin.least().Width), l.HeightFor(l.Size().Width))
}

// HeightFor is that of the lines in a width; no second text takes no room.
func (l *KnobLabel) HeightFor(width float32) float32 {
	if l.origin.Text == "" {
		return l.name.HeightFor(width)
	}
	return l.name.HeightFor(width) + l.origin.HeightFor(width)
}

// paint centres the lines.
func (l *KnobLabel) paint(size fyne.Size) []fyne.CanvasObject {
	top := max(0, (size.Height-l.HeightFor(size.Width))/2)
	high := l.name.HeightFor(size.Width)
	put(l.name, 0, top, size.Width, high)
	put(l.origin, 0, top+high, size.Width, l.origin.HeightFor(size.Width))
	return []fyne.CanvasObject{l.name, l.origin}
}
