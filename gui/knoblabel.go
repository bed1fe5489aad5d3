package gui

import (
	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/widget"
)

// KnobLabel is the name of a value with a soft line below it that says where the
// value comes from, or its sign in words. A click leads to the field, a double
// click resets it, a right click opens its menu.
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
		name: NewProse("", textBody, 1), origin: NewProse("", textAxis, 1).soft()}
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
	return fyne.NewSize(max(l.name.Width(), l.origin.Width()), l.name.lineHeight()+l.origin.lineHeight())
}

// paint centres the lines; an empty second one takes no room.
func (l *KnobLabel) paint(size fyne.Size) []fyne.CanvasObject {
	name, origin := l.name, l.origin
	total := name.lineHeight()
	if origin.Text != "" {
		total += origin.lineHeight()
	}
	top := (size.Height - total) / 2
	name.Move(fyne.NewPos(0, top))
	name.Resize(fyne.NewSize(size.Width, name.lineHeight()))
	origin.Move(fyne.NewPos(0, top+name.lineHeight()))
	origin.Resize(fyne.NewSize(size.Width, origin.lineHeight()))
	return []fyne.CanvasObject{name, origin}
}
