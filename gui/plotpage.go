package gui

import (
	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/container"

	"hilltop/gui/session"
)

// plotPage is what the pages with pictures share: a sentence on top, plots, and
// parts on demand, in a column that scrolls.
type plotPage struct {
	tools    pageTools
	sentence *Prose
	none     *Column // in place of the rest where there is nothing to show
	reason   *Prose
	shown    []fyne.CanvasObject // the rest
	scroller *Scroller
	plotList []*Plot
	details  []*Disclosure
	again    func() // shows the last state once more
	state    session.State
}

// begin prepares the page; again shows the last state once more.
func (p *plotPage) begin(tools pageTools, again func()) {
	p.tools, p.again = tools, again
	p.sentence = NewProse("", textSentence, 0).bold()
	p.reason = NewProse("", textBody, 0)
	button := NewButton("Go to page Ceiling", func() { tools.turnTo("Ceiling") })
	button.OnKey = tools.key
	p.none = NewColumn(space8, 0, p.reason, container.NewHBox(button))
	p.scroller = NewScroller(NewColumn(space12, space12))
}

// assemble puts the page together.
func (p *plotPage) assemble(shown ...fyne.CanvasObject) {
	p.shown = shown
	p.scroller.Column.Objects = append([]fyne.CanvasObject{p.sentence, p.none}, shown...)
}

// plot makes a plot of the page whose picture has the height of high.
func (p *plotPage) plot(name string, high func(width float32) float32) *Plot {
	tools := p.tools.plots
	tools.scroll = func(e *fyne.ScrollEvent) { p.scroller.Scrolled(e) }
	plot := NewPlot(name, tools)
	plot.high = high
	plot.sheet.OnFocus = func() {
		if !plot.sheet.held {
			p.scroller.Reveal(plot)
		}
	}
	for _, b := range []*Button{plot.unit, plot.scale, plot.pin, plot.whole, plot.save} {
		p.follow(&b.control, b)
	}
	p.plotList = append(p.plotList, plot)
	return plot
}

// follow scrolls to a control of the page when it gets the focus.
func (p *plotPage) follow(c *control, o fyne.CanvasObject) {
	c.OnFocus = func() { p.scroller.Reveal(o) }
}

// grid makes a table of the page.
func (p *plotPage) grid(cell func(row, column int)) *Grid {
	g := NewGrid(cell)
	g.OnKey = p.tools.key
	p.follow(&g.control, g)
	return g
}

// detail makes a part on demand.
func (p *plotPage) detail(title string, body fyne.CanvasObject) *Disclosure {
	var d *Disclosure
	d = NewDisclosure(title, body, p.tools.key, func() {
		p.again()
		if d.open {
			p.scroller.Begin(d)
		}
	})
	p.follow(&d.head.control, d.head)
	p.details = append(p.details, d)
	return d
}

// plots are those in sight, the first one first.
func (p *plotPage) plots() []*Plot { return p.plotList }

// parts are those on demand.
func (p *plotPage) parts() []*Disclosure { return p.details }

// Object is the page.
func (p *plotPage) Object() fyne.CanvasObject { return p.scroller }

// roomInSight is the height of the page that is in sight.
func (p *plotPage) roomInSight() float32 { return p.scroller.Size().Height }

// say puts a sentence on top, soft where it is of before.
func (p *plotPage) say(s session.State, text string) {
	ink := ColorInk
	if s.Fading {
		ink = ColorSoftInk
	}
	if p.sentence.Color != ink {
		p.sentence.Color = ink
		p.sentence.Refresh()
	}
	p.sentence.SetText(text)
}

// empty shows why there is nothing to show; "" shows the rest of the page.
func (p *plotPage) empty(why string) {
	p.reason.SetText(why)
	show(p.none, why != "")
	for _, o := range p.shown {
		show(o, why == "")
	}
}

// prepare tells the plots how the state stands.
func (p *plotPage) prepare(s session.State) {
	p.state = s
	stale := ""
	if s.Fading && s.Report != nil {
		if stale = s.Undo; stale == "" {
			stale = "the last plan that could be judged"
		}
	}
	for _, plot := range p.plotList {
		plot.Hasten(s.Dragging)
		plot.Age(stale)
		if s.Name != plot.document {
			plot.document = s.Name
			plot.view = view{unit: plot.view.unit}
			plot.label()
		}
	}
}

// fit lays the page out anew, with the padding of its width.
func (p *plotPage) fit() {
	p.scroller.Column.layout.pad = space12
	if p.scroller.Size().Width >= px(widePage) {
		p.scroller.Column.layout.pad = space16
	}
	p.scroller.Fit()
}

// widePage is from where on a page is that of the full window, at 100 % text.
const widePage = 900

// whenOf says which moment the selected stage stands for: "At the end of 'load'".
func whenOf(s session.State) string {
	stage := session.StageAt(s.Report, s.Stage)
	if stage == nil || stage == s.Report.Start {
		return "At the start"
	}
	return "At the end of '" + stage.Name + "'"
}

// rowOf is the row of the selected stage.
func rowOf(s session.State) session.StageRow {
	for _, r := range s.Rows {
		if r.Stage == s.Stage {
			return r
		}
	}
	if len(s.Rows) > 0 {
		return s.Rows[len(s.Rows)-1]
	}
	return session.StageRow{}
}
