package gui

import (
	"errors"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/container"

	"hilltop/assets"
	"hilltop/gui/session"
)

// Options of a window. The zero value opens the demo plan, in what the desktop
// prefers.
type Options struct {
	Path      string // of the plan to open; "" for the demo
	Size      fyne.Size
	Variant   Variant      // "" for what was chosen last
	TextScale float32      // 0 for what was chosen last
	Page      string       // name of the page to begin with; "" for Ceiling
	Folder    string       // for recovery and recent files; "" for none
	Post      func(func()) // nil for [Post]
}

// DemoPlan is the template that a window without a plan opens.
const DemoPlan = "skerry-demo"

// Window is the one window of the program. Its methods run on the toolkit's
// goroutine.
type Window struct {
	app     fyne.App
	window  fyne.Window
	desk    *session.Session
	folder  string // for the look; "" for none
	state   session.State
	look    look
	metrics Metrics
	answers answers

	bar        *VerdictBar
	column     *KnobColumn
	drawer     *Button
	drawerOpen bool
	pages      []Page
	page       int
	places     *PageSwitch
	sheet      *fyne.Container
	strip      *Strip
	status     *StatusLine
	content    *fyne.Container
	menu       menus
	easel      *easel
	atHand     *Plot // the plot that had the focus last; nil for none
}

// New opens a window of an application and shows a plan. Run the application, and
// then [Window.Close].
func New(app fyne.App, opt Options) *Window {
	w := &Window{app: app, window: app.NewWindow("Hilltop"), folder: opt.Folder}
	w.wear(firstLook(opt))
	if opt.Post == nil {
		opt.Post = Post
	}
	w.easel = newEasel(opt.Post)
	w.desk = session.New(session.Options{Post: opt.Post, Show: w.Show, Folder: opt.Folder})
	w.build()
	w.window.SetIcon(fyne.NewStaticResource("icon.png", assets.Icon()))
	w.window.SetPadded(false)
	w.window.SetContent(w.content)
	w.buildMenu()
	w.window.Canvas().SetOnTypedKey(w.key)
	w.window.SetCloseIntercept(w.askToClose)
	w.window.SetOnDropped(w.dropped)
	if opt.Size.IsZero() {
		opt.Size = fyne.NewSize(1280, 800)
	}
	w.window.Resize(opt.Size)
	w.openFirst(opt.Path)
	w.choosePage(w.pageNamed(opt.Page))
	w.Echo()
	return w
}

// build makes the parts.
func (w *Window) build() {
	w.bar = NewVerdictBar(w.apply, w.tellFailure, w.askToOpen, w.key)
	w.column = NewKnobColumn(w.desk, ColumnEvents{Echo: w.Echo, Leave: w.leave, Menu: w.fieldMenu, Key: w.key, Failed: w.say})
	w.drawer = NewButton("Knobs (F2)", w.toggleDrawer)
	w.drawer.OnKey = w.key
	w.strip = NewStrip(w.arrange)
	w.status = NewStatusLine(func() { w.desk.Stop(); w.Echo() })
	tools := pageTools{desk: w.desk, explain: w.explain, apply: w.apply, echo: w.Echo, key: w.key,
		turnTo: func(page string) { w.choosePage(w.pageNamed(page)) }, goTo: w.goTo,
		plots: plotTools{easel: w.easel, key: w.key, focus: w.window.Canvas().Focus, chosen: func(p *Plot) { w.atHand = p }, save: w.savePlot}}
	w.pages = []Page{newBenchPage(tools), newLatticePage(tools), newCeilingPage(tools)}
	w.places = NewPageSwitch(w.choosePage, w.key)
	w.sheet = container.NewStack(newGround())
	for _, p := range w.pages {
		w.sheet.Add(p.Object())
	}
	w.content = container.New(&frame{w}, w.bar, w.column, w.drawer, w.places, w.sheet, w.strip, w.status)
}

// Show shows a state, unless a newer one is shown already.
func (w *Window) Show(s session.State) {
	if s.Number < w.state.Number {
		return
	}
	w.state = s
	w.bar.Set(s)
	w.column.Set(s)
	w.status.Set(s)
	w.showPages()
	w.window.SetTitle(title(s))
	w.refreshMenu()
	w.answer(s)
}

// Echo shows what an action of the user has made of the state, in this frame.
func (w *Window) Echo() { w.Show(w.desk.State()) }

// title is that of the window: the document first, since lists of windows cut the
// end.
func title(s session.State) string {
	if s.Plan == nil {
		return "Hilltop"
	}
	mark := ""
	if s.Dirty {
		mark = " (edited)"
	}
	return s.Name + mark + " - Hilltop"
}

func (w *Window) showPages() {
	cells := make([]PageCell, len(w.pages))
	for i, p := range w.pages {
		cells[i] = PageCell{p.Name(), p.KeyNumber(w.state)}
	}
	w.places.Set(cells, w.page)
	w.pages[w.page].Show(w.state)
}

// choosePage turns to a page.
func (w *Window) choosePage(i int) {
	w.page = i
	for k, p := range w.pages {
		show(p.Object(), k == i)
	}
	w.showPages()
}

// pageNamed returns the index of a page, that of Ceiling for a name that no page
// has.
func (w *Window) pageNamed(name string) int {
	ceiling := 0
	for i, p := range w.pages {
		switch p.Name() {
		case name:
			return i
		case "Ceiling":
			ceiling = i
		}
	}
	return ceiling
}

// goTo leads to a knob.
func (w *Window) goTo(stage int, field string) {
	w.desk.SelectStage(stage)
	w.Echo()
	w.showColumn()
	w.column.Reveal(field)
}

// apply takes an advice and leads to the field it changes.
func (w *Window) apply(a session.Advice) {
	w.did(w.desk.Apply(a))
	w.reveal(w.state.Touched)
}

// did shows what became of an action: the new state, and why it was refused. A
// refused text needs no word in the status line, since it has its reason below it.
func (w *Window) did(err error) {
	w.column.Drop()
	w.Echo()
	w.say(err)
}

// say puts an error into the status line, or clears it after an action that went
// well.
func (w *Window) say(err error) {
	var input *session.InputError
	if err == nil || errors.As(err, &input) {
		w.status.Say("")
		return
	}
	w.status.Say(err.Error())
}

// explain opens the strip on a topic, if there is something to say about it.
func (w *Window) explain(topic string) {
	if e, ok := w.desk.Explain(topic); ok {
		w.strip.Explain(topic, e)
		w.arrange()
	}
}

// Native returns the toolkit's window.
func (w *Window) Native() fyne.Window { return w.window }

// Close ends the work behind the window, and waits for it.
func (w *Window) Close() {
	w.easel.close()
	w.desk.Close()
}
