package gui

import (
	"slices"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/canvas"
)

// painted is a widget that puts itself together anew whenever it changes or gets
// another size.
type painted interface {
	fyne.Widget
	paint(size fyne.Size) []fyne.CanvasObject // places what it returns
	least() fyne.Size
}

// painting is the renderer of every painted widget.
type painting struct {
	of      painted
	objects []fyne.CanvasObject
}

var _ fyne.WidgetRenderer = (*painting)(nil)

func newPainting(of painted) *painting {
	p := &painting{of: of}
	p.Layout(of.Size())
	return p
}

func (p *painting) Destroy()                     {}
func (p *painting) Objects() []fyne.CanvasObject { return p.objects }
func (p *painting) MinSize() fyne.Size           { return p.of.least() }
func (p *painting) Layout(size fyne.Size)        { p.objects = p.of.paint(size) }

// Refresh also refreshes the children that stay; new ones are as they should be.
func (p *painting) Refresh() {
	before := p.objects
	p.Layout(p.of.Size())
	for _, o := range p.objects {
		if slices.Contains(before, o) {
			o.Refresh()
		}
	}
	canvas.Refresh(p.of)
}
