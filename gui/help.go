package gui

import (
	"strings"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/widget"

	"hilltop/gui/session"
)

// standingCautions hold for every plan.
const standingCautions = "Lasers of class 4, coils that carry high currents and store energy, alkali metals and ovens, vacuum: take the usual care. " +
	"Local rules and licensed practice decide.\n" +
	"The parameter set is a proposal. It arms nothing and replaces no interlock. Values beyond your stated limits are refused, not clipped."

// showCautions lists the cautions of the plan, then those that always hold.
func (w *Window) showCautions() {
	var lines []string
	if w.state.Report != nil {
		for _, c := range w.state.Report.Cautions {
			lines = append(lines, c.Text)
		}
	}
	w.tell("Cautions", strings.Join(append(lines, standingCautions), "\n"))
}

// showAbout says what the program is.
func (w *Window) showAbout() {
	version := w.app.Metadata().Version
	if version == "" {
		version = "development"
	}
	w.tell("Hilltop "+version, "A planner for bosons in an optical lattice at a negative absolute temperature of their motion: "+
		"whether a planned flip bounds the energy from above, and which knob mends it where it does not.\n"+
		"BSD 3-clause licence. Colours: Paul Tol, medium-contrast set.")
}

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
