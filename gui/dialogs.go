package gui

import (
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

// ask asks a question; the last button takes it back.
func (w *Window) ask(title, text string, answers ...answer) {
	w.dialog(title, text, "Cancel", answers)
}

// tell shows a text until it is dismissed.
func (w *Window) tell(title, text string) { w.dialog(title, text, "Close", nil) }

func (w *Window) dialog(title, text, last string, answers []answer) {
	prose := NewProse(text, textBody, 0)
	d := dialog.NewCustomWithoutButtons(title, NewScroller(NewColumn(space8, space8, prose)), w.window)
	var buttons []fyne.CanvasObject
	for _, a := range append(answers, answer{last, func() {}}) {
		buttons = append(buttons, NewButton(a.label, func() {
			d.Hide()
			a.do()
		}))
	}
	d.SetButtons(buttons)
	room := w.window.Canvas().Size()
	width := min(px(560), room.Width*0.9)
	height := d.MinSize().Height + prose.HeightFor(width-px(2*space24)) + px(space24)
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

// offer offers the work that an earlier run left behind, one after the other.
func (w *Window) offer(list []session.Recovery) {
	if len(list) == 0 {
		return
	}
	r := list[0]
	w.ask("Unsaved work was found", "'"+r.Name+"' was being edited "+r.Age+" when the program ended.",
		answer{"Recover it", func() { w.did(w.desk.Recover(r.ID)) }},
		answer{"Discard it", func() { w.desk.DropRecovery(r.ID); w.offer(list[1:]) }})
}

func (w *Window) askAboutDisk(s session.State) {
	w.ask("The file was changed by another program", "'"+s.Name+"' on disk differs from the plan in the window.",
		answer{"Load the file", func() { w.did(w.desk.Reload()) }},
		answer{"Keep what is here", func() { w.desk.KeepMine(); w.Echo() }})
}
