package gui

import (
	"slices"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/widget"

	"hilltop/gui/session"
)

// fieldMenu opens the menu of a field.
func (w *Window) fieldMenu(f session.Field, at fyne.Position) {
	source := "Given at " + f.Path
	if f.Path == "" {
		source = "A default, not given in the plan"
	}
	where := fyne.NewMenuItem(source, nil)
	where.Disabled = true
	explain := item("Source and formula", fyne.KeyE, ctrl, func() { w.explain(f.ID) })
	copied := item("Copy the value", fyne.KeyC, ctrl|fyne.KeyModifierShift, func() { w.copyField(f.ID) })
	inherit := item("Inherit again", fyne.KeyBackspace, ctrl, func() { w.did(w.desk.Clear(f.ID)) })
	inherit.Disabled = !f.Clearable
	reset := item("Back to the saved value", fyne.KeyBackspace, ctrl|fyne.KeyModifierShift, func() { w.did(w.desk.Reset(f.ID)) })
	items := []*fyne.MenuItem{where, explain, copied, inherit, reset}
	if len(f.Units) > 1 {
		items = append(items, fyne.NewMenuItemSeparator())
	}
	for _, unit := range f.Units {
		choose := fyne.NewMenuItem("In "+session.Symbol(unit), func() { w.desk.SetUnit(f.ID, unit); w.Echo() })
		choose.Checked = unit == f.Unit
		items = append(items, choose)
	}
	widget.ShowPopUpMenuAtPosition(fyne.NewMenu("", items...), w.window.Canvas(), at)
}

// numberMenu opens the menu of a number that was computed.
func (w *Window) numberMenu(n *Number, at fyne.Position) {
	widget.ShowPopUpMenuAtPosition(fyne.NewMenu("",
		item("Source and formula", fyne.KeyE, ctrl, func() { w.explain(n.topic) }),
		item("Copy the value", fyne.KeyC, ctrl|fyne.KeyModifierShift, func() { w.copyNumber(n) }),
	), w.window.Canvas(), at)
}

// menuAtHand opens the menu of what has the focus, below it.
func (w *Window) menuAtHand() {
	canvas := w.window.Canvas()
	below := func(o fyne.CanvasObject) fyne.Position {
		return fyne.CurrentApp().Driver().AbsolutePositionForObject(o).AddXY(0, o.Size().Height)
	}
	switch o := canvas.Focused().(type) {
	case *Number:
		w.numberMenu(o, below(o))
	case *ValueField, *Segmented:
		if f, ok := w.state.Field(w.column.atHand); ok {
			w.fieldMenu(f, below(o.(fyne.CanvasObject)))
		}
	}
}

// explainFocused opens the strip on the value at hand.
func (w *Window) explainFocused() {
	if n, ok := w.window.Canvas().Focused().(*Number); ok {
		w.explain(n.topic)
		return
	}
	w.explain(w.column.atHand)
}

// copyFocused copies the value at hand.
func (w *Window) copyFocused() {
	if n, ok := w.window.Canvas().Focused().(*Number); ok {
		w.copyNumber(n)
		return
	}
	w.copyField(w.column.atHand)
}

// copyField copies a value of the plan with its unit; text that was not applied is
// no part of the plan.
func (w *Window) copyField(id string) {
	f, ok := w.state.Field(id)
	if !ok {
		return
	}
	text := f.Text
	if f.Unit != "" {
		text += " " + session.Symbol(f.Unit)
	}
	w.copyText(text)
}

// copyNumber copies a computed number. One that belongs to an older plan says so.
func (w *Window) copyNumber(n *Number) {
	text := n.text.Text
	if w.state.Stale {
		text += " (stale)"
	}
	w.copyText(text)
}

func (w *Window) copyText(text string) {
	w.app.Clipboard().SetContent(text)
	w.status.Say("Copied: " + text)
}

// onFocused does something with the field at hand.
func (w *Window) onFocused(do func(id string) error) {
	if id := w.column.atHand; id != "" {
		w.did(do(id))
	}
}

// nextUnit shows a field in the next of its units.
func (w *Window) nextUnit(id string) error {
	if f, ok := w.state.Field(id); ok && len(f.Units) > 1 {
		i := slices.Index(f.Units, f.Unit)
		w.desk.SetUnit(id, f.Units[(i+1)%len(f.Units)])
	}
	return nil
}
