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
	explain := fyne.NewMenuItem("Explain", func() { w.explain(f.ID) })
	inherit := fyne.NewMenuItem("Inherit again", func() { w.did(w.desk.Clear(f.ID)) })
	inherit.Disabled = !f.Clearable
	reset := fyne.NewMenuItem("Back to the saved value", func() { w.did(w.desk.Reset(f.ID)) })
	items := []*fyne.MenuItem{where, explain, inherit, reset}
	for _, unit := range f.Units {
		choose := fyne.NewMenuItem("In "+session.Symbol(unit), func() { w.desk.SetUnit(f.ID, unit); w.Echo() })
		choose.Checked = unit == f.Unit
		items = append(items, choose)
	}
	widget.ShowPopUpMenuAtPosition(fyne.NewMenu("", items...), w.window.Canvas(), at)
}

// explainFocused opens the strip on the value at hand.
func (w *Window) explainFocused() {
	if n, ok := w.window.Canvas().Focused().(*Number); ok {
		w.explain(n.topic)
		return
	}
	w.explain(w.column.atHand)
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
