package gui

import (
	"slices"
	"strings"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/dialog"

	"hilltop/gui/session"
)

// answer is a button of a question.
type answer struct {
	label string
	do    func()
}

func nothing() {}

// ask asks a question; a last button takes it back, and so does Escape.
func (w *Window) ask(title, text string, answers ...answer) {
	w.dialog(title, text, append(answers, answer{"Cancel", nothing}))
}

// tell shows a text until it is dismissed.
func (w *Window) tell(title, text string) { w.dialog(title, text, []answer{{"Close", nothing}}) }

func (w *Window) dialog(title, text string, answers []answer) {
	column := NewColumn(space8, 0)
	for _, paragraph := range strings.Split(text, "\n") {
		column.Objects = append(column.Objects, NewProse(paragraph, textBody, 0))
	}
	d := dialog.NewCustomWithoutButtons(title, NewScroller(column), w.window)
	var buttons []fyne.CanvasObject
	for _, a := range answers {
		button := NewButton(a.label, func() {
			d.Hide()
			a.do()
		})
		button.OnKey = func(e *fyne.KeyEvent) {
			if e.Name == fyne.KeyEscape {
				d.Hide()
				answers[len(answers)-1].do()
			}
		}
		buttons = append(buttons, button)
	}
	d.SetButtons(buttons)
	room := w.window.Canvas().Size()
	width := min(px(560), room.Width*0.9)
	height := d.MinSize().Height + column.HeightFor(width-px(2*space16)) + px(space8)
	d.Resize(fyne.NewSize(width, min(height, room.Height*0.9)))
	d.Show()
	if focus, ok := buttons[0].(fyne.Focusable); ok {
		w.window.Canvas().Focus(focus)
	}
}

// answers remembers which questions of the session were put already.
type answers struct {
	broken     *session.Broken
	recoveries bool
	disk       session.DiskState
}

// answer puts what a state asks, once.
func (w *Window) answer(s session.State) {
	if s.Broken != nil && s.Broken != w.answers.broken {
		w.tellBroken(s.Broken)
	}
	w.answers.broken = s.Broken
	if len(s.Recoveries) > 0 && !w.answers.recoveries {
		w.answers.recoveries = true
		w.offer(s.Recoveries)
	}
	if s.OnDisk == session.Changed && w.answers.disk != session.Changed {
		w.askAboutDisk(s)
	}
	w.answers.disk = s.OnDisk
}

// tellBroken says why a plan was not opened, with every mistake in it.
func (w *Window) tellBroken(b *session.Broken) {
	lines := append([]string{b.Reason}, b.Mistakes...)
	w.tell("'"+b.Name+"' was not opened", strings.Join(lines, "\n"))
}

// tellFailure says why the plan has no report, leads to the value at fault, or
// tries again.
func (w *Window) tellFailure() {
	f := w.state.Failure
	if f == nil {
		return
	}
	lines := append([]string{f.Reason, f.Cure}, f.Details...)
	answers := []answer{{"Judge again", w.retry}, {"Close", nothing}}
	if f.Field != "" {
		answers = slices.Insert(answers, 1, answer{"Go to the value", func() { w.reveal(f.Field) }})
	}
	w.dialog("The plan could not be judged", strings.Join(lines, "\n"), answers)
}

func (w *Window) retry() {
	w.desk.Retry()
	w.Echo()
}

// offer offers the work that an earlier run left behind, one after the other.
func (w *Window) offer(list []session.Recovery) {
	if len(list) == 0 {
		return
	}
	r := list[0]
	w.dialog("Unsaved work was found", "'"+r.Name+"' was being edited "+r.Age+" when the program ended.", []answer{
		{"Recover it", func() { w.did(w.desk.Recover(r.ID)) }},
		{"Discard it", func() { w.desk.DropRecovery(r.ID); w.offer(list[1:]) }},
		{"Ask at the next start", nothing},
	})
}

func (w *Window) askAboutDisk(s session.State) {
	w.ask("The file was changed by another program", "'"+s.Name+"' on disk differs from the plan in the window.",
		answer{"Load the file", func() { w.did(w.desk.Reload()) }},
		answer{"Keep what is here", func() { w.desk.KeepMine(); w.Echo() }})
}
