package gui

import (
	"slices"

	"fyne.io/fyne/v2"

	"hilltop/gui/session"
)

// choiceRow is a value of the plan that is one of a few words: a label over the
// words, and below them why a word was refused.
type choiceRow struct {
	*Column
	label *KnobLabel
	words *Segmented
	fault *Fault
}

// choiceEvents are what a choice tells of. None may be nil.
type choiceEvents struct {
	Chosen func(word string)
	Reset  func()
	Focus  func()
	Menu   func(at fyne.Position)
	Key    func(*fyne.KeyEvent) // keys that choose nothing
}

func newChoiceRow(on choiceEvents) *choiceRow {
	r := &choiceRow{fault: NewFault("", textAxis, 0)}
	r.words = NewSegmented(func(i int) { on.Chosen(r.words.Cells[i]) })
	r.words.OnKey, r.words.OnFocus = on.Key, on.Focus
	r.label = NewKnobLabel(func() { takeFocus(r.words) }, on.Reset, on.Menu)
	r.fault.Hide()
	r.Column = NewColumn(space4, 0, r.label, r.words, r.fault)
	return r
}

// takeFocus gives the focus to a widget that is in a window.
func takeFocus(o interface {
	fyne.CanvasObject
	fyne.Focusable
}) {
	if c := fyne.CurrentApp().Driver().CanvasForObject(o); c != nil && c.Focused() != o {
		c.Focus(o)
	}
}

// set shows a field.
func (r *choiceRow) set(f session.Field) {
	r.label.Set(f.Short, "")
	r.words.Set(f.Choices, slices.Index(f.Choices, f.Text))
	r.fault.SetText(f.Reason)
	show(r.fault, f.Reason != "")
}
