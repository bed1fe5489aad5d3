package gui

import (
	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/container"
	"fyne.io/fyne/v2/widget"
)

// tall is an object whose height depends on its width.
type tall interface {
	HeightFor(width float32) float32
}

// heightFor is the height an object needs in a width.
func heightFor(o fyne.CanvasObject, width float32) float32 {
	if t, ok := o.(tall); ok {
		return t.HeightFor(width)
	}
	return o.MinSize().Height
}

// columnLayout stacks objects over the whole width, with a gap in pixels at 100 %
// text between those that are visible.
type columnLayout struct {
	gap, pad float32
	width    float32 // the last one, for the height that MinSize reports
}

var _ fyne.Layout = (*columnLayout)(nil)

func (l *columnLayout) Layout(objects []fyne.CanvasObject, size fyne.Size) {
	l.width = size.Width
	y := px(l.pad)
	for _, o := range objects {
		if !o.Visible() {
			continue
		}
		width := size.Width - 2*px(l.pad)
		height := heightFor(o, width)
		o.Move(fyne.NewPos(px(l.pad), y))
		o.Resize(fyne.NewSize(width, height))
		y += height + px(l.gap)
	}
}

func (l *columnLayout) heightFor(objects []fyne.CanvasObject, width float32) float32 {
	total, gap := 2*px(l.pad), float32(0)
	for _, o := range objects {
		if o.Visible() {
			total += gap + heightFor(o, width-2*px(l.pad))
			gap = px(l.gap)
		}
	}
	return total
}

// MinSize asks for the height in the last width, and for no width.
func (l *columnLayout) MinSize(objects []fyne.CanvasObject) fyne.Size {
	return fyne.NewSize(0, l.heightFor(objects, l.width))
}

// Column stacks objects over its width; their heights may depend on it.
type Column struct {
	widget.BaseWidget
	Objects []fyne.CanvasObject
	layout  *columnLayout
}

// NewColumn returns a column with a gap between its objects and padding around
// them, at 100 % text.
func NewColumn(gap, pad float32, objects ...fyne.CanvasObject) *Column {
	c := &Column{Objects: objects, layout: &columnLayout{gap: gap, pad: pad}}
	c.ExtendBaseWidget(c)
	return c
}

// HeightFor is the height of the column in a width.
func (c *Column) HeightFor(width float32) float32 { return c.layout.heightFor(c.Objects, width) }

// CreateRenderer implements [fyne.Widget].
func (c *Column) CreateRenderer() fyne.WidgetRenderer {
	c.ExtendBaseWidget(c)
	return newPainting(c)
}

func (c *Column) least() fyne.Size { return c.layout.MinSize(c.Objects) }

func (c *Column) paint(size fyne.Size) []fyne.CanvasObject {
	c.layout.Layout(c.Objects, size)
	return c.Objects
}

// Scroller shows a column that may be higher than the place for it.
type Scroller struct {
	widget.BaseWidget
	Column *Column
	scroll *container.Scroll
}

// NewScroller returns a place in which the column scrolls up and down.
func NewScroller(column *Column) *Scroller {
	s := &Scroller{Column: column, scroll: container.NewVScroll(column)}
	s.ExtendBaseWidget(s)
	return s
}

// Scrolled moves the content, as the wheel over it does.
func (s *Scroller) Scrolled(e *fyne.ScrollEvent) { s.scroll.Scrolled(e) }

// Fit lays the column out anew after something in it has changed. What stays as high
// as it was is not drawn anew.
func (s *Scroller) Fit() {
	before := s.Column.Size()
	s.Column.layout.width = s.Size().Width
	s.Column.Resize(fyne.NewSize(s.Size().Width, max(s.Size().Height, s.Column.HeightFor(s.Size().Width))))
	s.Column.layout.Layout(s.Column.Objects, s.Column.Size())
	if s.Column.Size() != before {
		s.scroll.Refresh()
	}
}

// Reveal scrolls so that an object of the column is in sight, with some room around
// it for the outline of the focus.
func (s *Scroller) Reveal(o fyne.CanvasObject) {
	driver := fyne.CurrentApp().Driver()
	top := driver.AbsolutePositionForObject(o).Y - driver.AbsolutePositionForObject(s.Column).Y
	bottom := top + o.Size().Height
	room, offset := px(space8), s.scroll.Offset
	switch {
	case top < offset.Y:
		offset.Y = top - room
	case bottom > offset.Y+s.scroll.Size().Height:
		offset.Y = bottom + room - s.scroll.Size().Height
	default:
		return
	}
	offset.Y = min(max(offset.Y, 0), s.lowest())
	s.scroll.ScrollToOffset(offset)
}

// lowest is how far the column can be scrolled.
func (s *Scroller) lowest() float32 {
	return max(s.Column.Size().Height-s.scroll.Size().Height, 0)
}

// Begin scrolls so that an object of the column stands on top, as far as that goes.
func (s *Scroller) Begin(o fyne.CanvasObject) {
	s.scroll.ScrollToOffset(fyne.NewPos(0, min(max(o.Position().Y-px(s.Column.layout.pad), 0), s.lowest())))
}

// CreateRenderer implements [fyne.Widget].
func (s *Scroller) CreateRenderer() fyne.WidgetRenderer {
	s.ExtendBaseWidget(s)
	return newPainting(s)
}

func (s *Scroller) least() fyne.Size { return fyne.Size{} }

func (s *Scroller) paint(size fyne.Size) []fyne.CanvasObject {
	s.Column.layout.width = size.Width
	s.scroll.Resize(size)
	s.Fit()
	return []fyne.CanvasObject{s.scroll}
}
