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
//
// What looks as before stays the object that it was: the toolkit keeps the drawing of
// a text by its object, for a minute after it is gone.
type painting struct {
	of      painted
	objects []fyne.CanvasObject
	changed bool // by the last layout
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

func (p *painting) Layout(size fyne.Size) {
	before := p.objects
	p.objects = slices.Clone(p.of.paint(size))
	p.changed = len(before) != len(p.objects)
	for i, o := range p.objects {
		if i < len(before) && before[i] != o && alike(before[i], o) {
			p.objects[i] = inPlaceOf(before[i], o)
		}
		p.changed = p.changed || i >= len(before) || before[i] != p.objects[i]
	}
	for _, o := range before {
		if !slices.Contains(p.objects, o) {
			canvas.Refresh(o) // frees its drawing
		}
	}
}

// Refresh also refreshes the children that stay; new ones are as they should be.
func (p *painting) Refresh() {
	before := p.objects
	p.Layout(p.of.Size())
	for _, o := range p.objects {
		if _, child := o.(fyne.Widget); child && slices.Contains(before, o) {
			o.Refresh()
		}
	}
	if p.changed {
		canvas.Refresh(p.of)
	}
}

// inPlaceOf moves an object to the place of another.
func inPlaceOf(o, to fyne.CanvasObject) fyne.CanvasObject {
	if o.Position() != to.Position() {
		o.Move(to.Position())
	}
	if o.Size() != to.Size() {
		o.Resize(to.Size())
	}
	return o
}

// alike reports whether two objects that were made for one painting each look the
// same but for their place.
func alike(a, b fyne.CanvasObject) bool {
	switch a := a.(type) {
	case *canvas.Text:
		b, ok := b.(*canvas.Text)
		return ok && a.Text == b.Text && a.TextSize == b.TextSize && a.TextStyle == b.TextStyle && a.Color == b.Color
	case *canvas.Rectangle:
		b, ok := b.(*canvas.Rectangle)
		return ok && a.FillColor == b.FillColor && a.StrokeColor == b.StrokeColor && a.StrokeWidth == b.StrokeWidth && a.CornerRadius == b.CornerRadius
	case *canvas.Line:
		b, ok := b.(*canvas.Line)
		return ok && a.StrokeColor == b.StrokeColor && a.StrokeWidth == b.StrokeWidth && a.Position1 == b.Position1 && a.Position2 == b.Position2
	case *Prose:
		b, ok := b.(*Prose)
		return ok && a.passing && b.passing && a.Text == b.Text && a.TextSize == b.TextSize && a.Color == b.Color &&
			a.Bold == b.Bold && a.Lines == b.Lines && a.Align == b.Align
	}
	return false
}
