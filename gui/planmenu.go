package gui

import (
	"strings"

	"fyne.io/fyne/v2"

	"hilltop/gui/session"
)

// planItem is a menu item for an action that a group of the column may offer.
type planItem struct {
	label  string
	key    fyne.KeyName
	action string
}

var planItems = []planItem{
	{"Add a beam", fyne.KeyB, "add /beams"},
	{"Add a resonance", fyne.KeyR, "add /scattering/resonances"},
	{"Give a(B) in the plan", fyne.KeyG, "add /scattering"},
	{"Take a(B) of the species file", fyne.KeyF, "remove /scattering"},
	{"Add an axis of the model", fyne.KeyX, "add /model/sites"},
}

// planMenu changes the shape of the plan.
func (w *Window) planMenu() *fyne.Menu {
	var items []*fyne.MenuItem
	w.menu.plan = nil
	for _, p := range planItems {
		i := item(p.label, p.key, ctrl|fyne.KeyModifierAlt, func() { w.onPlan(p.action) })
		w.menu.plan = append(w.menu.plan, i)
		items = append(items, i)
	}
	return fyne.NewMenu("Plan", append(items,
		fyne.NewMenuItemSeparator(),
		item("Remove the beam, resonance or axis at hand", fyne.KeyBackspace, fyne.KeyModifierAlt, w.removeAtHand),
		fyne.NewMenuItemSeparator(),
		item("Show or hide all values", fyne.KeyG, ctrl, func() { w.showColumn(); w.column.ToggleAll() }))...)
}

// offered lists the actions that the groups of a state offer.
func offered(s session.State) map[string]bool {
	list := map[string]bool{}
	for _, g := range s.Groups {
		for _, a := range g.Actions {
			list[a.ID] = true
		}
	}
	return list
}

// planWords is what the plan menu depends on.
func planWords(s session.State) string {
	var words []string
	for i, p := range planItems {
		if offered(s)[p.action] {
			words = append(words, planItems[i].action)
		}
	}
	return strings.Join(words, ", ")
}

// refreshPlan disables what the plan has no place for.
func (w *Window) refreshPlan() {
	for i, p := range planItems {
		w.menu.plan[i].Disabled = !offered(w.state)[p.action]
	}
}

// onPlan carries out an action of a group, if it is offered.
func (w *Window) onPlan(action string) {
	if !offered(w.state)[action] {
		return
	}
	w.showColumn()
	for _, g := range w.state.Groups {
		for _, a := range g.Actions {
			if a.ID == action {
				w.column.act(w.column.section(g.Name), action)
			}
		}
	}
}

// removeAtHand takes out the beam, resonance or axis that the field at hand belongs
// to.
func (w *Window) removeAtHand() {
	f, ok := w.state.Field(w.column.atHand)
	if !ok || f.Part == "" {
		w.status.Say("Nothing to remove: choose a value of a beam, a resonance or an axis first.")
		return
	}
	for _, g := range w.state.Groups {
		for _, p := range g.Parts {
			if p.Name == f.Part && p.Remove != nil {
				w.column.act(w.column.section(g.Name), p.Remove.ID)
				return
			}
		}
	}
	w.status.Say(f.Part + " cannot be removed: a lattice has three.")
}

// showColumn brings the values into sight where they are a drawer.
func (w *Window) showColumn() {
	if w.metrics.Fold == drawerFold && !w.drawerOpen {
		w.toggleDrawer()
	}
}

// reveal leads to a field.
func (w *Window) reveal(field string) {
	if field != "" {
		w.showColumn()
		w.column.Reveal(field)
	}
}
