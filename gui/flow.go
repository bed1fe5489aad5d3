package gui

import (
	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/widget"
)

// Flow sets objects side by side, each as wide as it needs, in as many rows as that
// takes.
type Flow struct {
	widget.BaseWidget
	Objects []fyne.CanvasObject
	gap     float32 // at 100 % text, between objects and between rows
}

var _ fyne.Widget = (*Flow)(nil)

// NewFlow returns objects with a gap between them, at 100 % text.
func NewFlow(gap float32, objects ...fyne.CanvasObject) *Flow {
	f := &Flow{Objects: objects, gap: gap}
	f.ExtendBaseWidget(f)
	return f
}

// boxes places the visible objects; the others have no box.
func (f *Flow) boxes(width float32) map[fyne.CanvasObject]box {
	places := map[fyne.CanvasObject]box{}
	at, high := fyne.Position{}, float32(0)
	for _, o := range f.Objects {
		if !o.Visible() {
			continue
		}
		size := o.MinSize()
		size.Width = min(size.Width, width)
		if at.X > 0 && at.X+size.Width > width {
			at = fyne.NewPos(0, at.Y+high+px(f.gap))
			high = 0
		}
		places[o] = box{at, size}
		at.X += size.Width + px(f.gap)
		high = max(high, size.Height)
	}
	return places
}

// HeightFor is that of the rows.
func (f *Flow) HeightFor(width float32) float32 {
	high := float32(0)
	for _, b := range f.boxes(width) {
		high = max(high, b.at.Y+b.size.Height)
	}
	return high
}

// CreateRenderer implements [fyne.Widget].
func (f *Flow) CreateRenderer() fyne.WidgetRenderer {
	f.ExtendBaseWidget(f)
	return newPainting(f)
}

func (f *Flow) least() fyne.Size { return fyne.NewSize(0, f.HeightFor(f.Size().Width)) }

func (f *Flow) paint(size fyne.Size) []fyne.CanvasObject {
	for o, b := range f.boxes(size.Width) {
		o.Move(b.at)
		o.Resize(b.size)
	}
	return f.Objects
}
