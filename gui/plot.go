package gui

import (
	"time"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/widget"

	"hilltop/bosehubbard/figure"
)

// Plot shows a picture, says in a line below it what it reads, and has buttons for
// what can be done with it.
type Plot struct {
	widget.BaseWidget

	name     string
	high     func(width float32) float32 // of the picture
	document string                      // that the view belongs to
	tools    plotTools
	key      any    // of the data that are wanted
	source   source // nil for none
	view     view
	dragging bool    // a knob is being dragged
	coarse   bool    // draw coarsely
	frozen   float64 // the half-range during a drag, 0 for none
	stale    string  // why the picture is of before; "" where it is not
	fault    string  // why the last drawing failed; "" where it did not
	rest     *time.Timer

	sheet   *pictureSheet
	readout *Prose
	failure *Fault
	unit    *Button
	scale   *Button
	pin     *Button
	whole   *Button
	save    *Button
}

// plotTools are what plots use of the window.
type plotTools struct {
	easel  *easel
	key    func(*fyne.KeyEvent)
	focus  func(fyne.Focusable)
	chosen func(*Plot)                // the plot has got the focus
	save   func(*Plot, fyne.Position) // asks how to save the picture
	scroll func(*fyne.ScrollEvent)    // scrolls the page
}

// NewPlot returns a plot without a picture.
func NewPlot(name string, tools plotTools) *Plot {
	p := &Plot{name: name, tools: tools, readout: NewProse("", textAxis, 2), failure: NewFault("", textAxis, 2)}
	p.sheet = newSheet(p)
	p.sheet.OnKey = tools.key
	p.unit = p.button("Hz", p.nextUnit)
	p.scale = p.button("Range: all", p.nextScale)
	p.pin = p.button("Pin", p.togglePin)
	p.whole = p.button("Reset", func() { p.look(p.view.reset()) })
	p.save = p.button("Save", p.askToSave)
	p.ExtendBaseWidget(p)
	p.readOut()
	return p
}

func (p *Plot) button(text string, do func()) *Button {
	b := NewButton(text, do)
	b.text.TextSize = textAxis
	b.OnKey = p.tools.key
	return b
}

// Draw shows the picture of some data. Equal keys stand for equal data.
func (p *Plot) Draw(key any, make source) {
	if p.key != key {
		p.key, p.source = key, make
	}
	p.sheet.order()
}

// Clear takes the picture away, say because there are no data.
func (p *Plot) Clear() {
	p.key, p.source, p.fault = nil, nil, ""
	p.view.pinned = nil
	p.sheet.forget()
	p.Refresh()
}

// restAfter is how long after a drag the picture is drawn in full.
const restAfter = 150 * time.Millisecond

// Hasten says whether a knob is being dragged: then the picture is drawn coarsely,
// until the hand has rested, and energies keep their range.
func (p *Plot) Hasten(dragging bool) {
	if dragging == p.dragging {
		return
	}
	p.dragging = dragging
	if !dragging {
		p.frozen = 0
		p.rest = time.AfterFunc(restAfter, func() { p.tools.easel.later(p.rested) })
		return
	}
	if p.rest != nil {
		p.rest.Stop()
	}
	p.coarse = true
	if terms, ok := p.guide().(*termGuide); ok {
		p.frozen = terms.half
	}
}

// rested draws in full.
func (p *Plot) rested() {
	p.coarse = p.dragging
	p.sheet.order()
}

// Age says why the picture is of before, "" where it is not.
func (p *Plot) Age(stale string) {
	if p.stale != stale {
		p.stale = stale
		p.readOut()
		p.sheet.Refresh()
	}
}

// guide is that of the last drawing, nil before it.
func (p *Plot) guide() guide {
	if p.sheet.drawn == nil {
		return nil
	}
	return p.sheet.drawn.guide
}

// took notes what became of an order.
func (p *Plot) took(d *drawing) {
	fault := ""
	if d.err != nil {
		fault = d.err.Error()
	}
	if fault != p.fault {
		p.fault = fault
		p.Refresh()
	}
	p.readOut()
	p.label()
}

// look changes how the picture is looked at.
func (p *Plot) look(v view) {
	p.view = v
	p.label()
	p.sheet.order()
}

// nextUnit shows the picture in the next unit that it has.
func (p *Plot) nextUnit() {
	if p.sheet.drawn == nil {
		return
	}
	v := p.view.reset() // ranges are in the unit
	v.unit = following(p.sheet.drawn.subject.units(), p.view.unit)
	p.look(v)
}

// nextScale chooses the range for the next term.
func (p *Plot) nextScale() {
	if p.sheet.drawn != nil {
		p.scaleTo(following(p.sheet.drawn.subject.scales(), p.view.scale))
	}
}

func (p *Plot) scaleTo(term string) {
	v := p.view.reset()
	v.scale = term
	p.look(v)
}

// following is the entry after one, the first after the last; the entry itself where
// the list is empty.
func following[T comparable](list []T, now T) T {
	for i, v := range list {
		if v == now {
			return list[(i+1)%len(list)]
		}
	}
	if len(list) == 0 {
		return now
	}
	return list[0]
}

// togglePin keeps the present picture as a reference behind the next ones, or lets
// it go.
func (p *Plot) togglePin() {
	if p.sheet.drawn == nil {
		return
	}
	v := p.view
	if v.pinned != nil {
		v.pinned = nil
	} else {
		v.pinned = p.sheet.drawn.subject
	}
	p.look(v)
	p.readOut()
}

func (p *Plot) askToSave() {
	p.tools.save(p, fyne.CurrentApp().Driver().AbsolutePositionForObject(p.save))
}

func (p *Plot) focus()  { p.tools.focus(p.sheet) }
func (p *Plot) chosen() { p.tools.chosen(p) }

// picture is what was drawn last, as it is looked at; nil before that.
func (p *Plot) picture() (figure.Picture, figure.Frame) {
	if p.sheet.drawn == nil {
		return nil, figure.Frame{}
	}
	f := p.sheet.drawn.frame
	f.Scale = 0
	return p.sheet.drawn.picture, f
}
