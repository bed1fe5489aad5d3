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
	return &columnRenderer{column: c}
}

type columnRenderer struct{ column *Column }

var _ fyne.WidgetRenderer = (*columnRenderer)(nil)

func (r *columnRenderer) Destroy()                     {}
func (r *columnRenderer) Objects() []fyne.CanvasObject { return r.column.Objects }
func (r *columnRenderer) MinSize() fyne.Size           { return r.column.layout.MinSize(r.column.Objects) }
func (r *columnRenderer) Layout(size fyne.Size)        { r.column.layout.Layout(r.column.Objects, size) }

func (r *columnRenderer) Refresh() {
	r.Layout(r.column.Size())
	for _, o := range r.column.Objects {
		o.Refresh()
	}
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

// Fit lays the column out anew after its height has changed.
func (s *Scroller) Fit() {
	s.Column.layout.width = s.Size().Width
	s.Column.Resize(fyne.NewSize(s.Size().Width, max(s.Size().Height, s.Column.HeightFor(s.Size().Width))))
	s.Column.layout.Layout(s.Column.Objects, s.Column.Size())
	s.scroll.Refresh()
}

// Reveal scrolls so that an object of the column is in sight.
func (s *Scroller) Reveal(o fyne.CanvasObject) {
	driver := fyne.CurrentApp().Driver()
	top := driver.AbsolutePositionForObject(o).Y - driver.AbsolutePositionForObject(s.Column).Y
	bottom := top + o.Size().Height
	offset := s.scroll.Offset
	switch {
	case top < offset.Y:
		offset.Y = top
	case bottom > offset.Y+s.scroll.Size().Height:
		offset.Y = bottom - s.scroll.Size().Height
	default:
		return
	}
	s.scroll.ScrollToOffset(offset)
}

// CreateRenderer implements [fyne.Widget].
func (s *Scroller) CreateRenderer() fyne.WidgetRenderer {
	s.ExtendBaseWidget(s)
	return &scrollerRenderer{scroller: s}
}

type scrollerRenderer struct{ scroller *Scroller }

var _ fyne.WidgetRenderer = (*scrollerRenderer)(nil)

func (r *scrollerRenderer) Destroy() {}
func (r *scrollerRenderer) Objects() []fyne.CanvasObject {
	return []fyne.CanvasObject{r.scroller.scroll}
}
func (r *scrollerRenderer) MinSize() fyne.Size { return fyne.Size{} }

func (r *scrollerRenderer) Layout(size fyne.Size) {
	r.scroller.Column.layout.width = size.Width
	r.scroller.scroll.Resize(size)
	r.scroller.Fit()
}

func (r *scrollerRenderer) Refresh() {
	r.scroller.Fit()
}
