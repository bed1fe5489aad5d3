package gui

import (
	"path/filepath"

	"fyne.io/fyne/v2"

	"hilltop/gui/session"
)

// menus are the items whose words or state follow the session.
type menus struct {
	bar        *fyne.MainMenu
	undo, redo *fyne.MenuItem
	apply      *fyne.MenuItem
	plan       []*fyne.MenuItem // one for each of planItems
	recent     *fyne.MenuItem
	shown      *menuWords // nil before the first
}

// menuWords is what the items say; the bar is built anew only where it changed.
type menuWords struct {
	undo, redo string
	advice     bool
	recent     string
	plan       string
}

// buildMenu makes the menu bar. Every action of the window has an item, so that a
// field with the focus cannot swallow its shortcut.
func (w *Window) buildMenu() {
	w.menu.bar = fyne.NewMainMenu(w.fileMenu(), w.editMenu(), w.viewMenu(), w.planMenu(), w.stageMenu(), w.pictureMenu(), w.helpMenu())
	w.window.SetMainMenu(w.menu.bar)
}

func (w *Window) fileMenu() *fyne.Menu {
	fresh := fyne.NewMenuItem("New from template", nil)
	var templates []*fyne.MenuItem
	for i, t := range session.Templates() {
		templates = append(templates, item(t.Title, digitKey(i), ctrl|fyne.KeyModifierAlt, func() { w.newFrom(t.Name) }))
	}
	fresh.ChildMenu = fyne.NewMenu("", templates...)
	w.menu.recent = fyne.NewMenuItem("Open recent", nil)
	w.menu.recent.ChildMenu = fyne.NewMenu("")
	quit := item("Quit", fyne.KeyQ, ctrl, w.askToClose)
	quit.IsQuit = true
	return fyne.NewMenu("File",
		fresh,
		item("Open...", fyne.KeyO, ctrl, w.askToOpen),
		w.menu.recent,
		fyne.NewMenuItemSeparator(),
		item("Save", fyne.KeyS, ctrl, func() { w.save(nothing) }),
		item("Save as...", fyne.KeyS, ctrl|fyne.KeyModifierShift, func() { w.saveAs(nothing) }),
		fyne.NewMenuItemSeparator(),
		quit)
}

// digitKey is the key of the first, second, ... entry of a list.
func digitKey(i int) fyne.KeyName {
	return fyne.KeyName(string(rune('1' + min(i, 8))))
}

func (w *Window) editMenu() *fyne.Menu {
	w.menu.undo = shortcut("Undo", &fyne.ShortcutUndo{}, w.undo)
	w.menu.redo = shortcut("Redo", &fyne.ShortcutRedo{}, w.redo)
	w.menu.apply = item("Apply the advice", fyne.KeyReturn, ctrl, w.applyAdvice)
	clipboard := w.app.Clipboard()
	return fyne.NewMenu("Edit",
		w.menu.undo, w.menu.redo,
		fyne.NewMenuItemSeparator(),
		shortcut("Cut", &fyne.ShortcutCut{}, func() { w.forward(&fyne.ShortcutCut{Clipboard: clipboard}) }),
		shortcut("Copy", &fyne.ShortcutCopy{}, func() { w.forward(&fyne.ShortcutCopy{Clipboard: clipboard}) }),
		shortcut("Paste", &fyne.ShortcutPaste{}, func() { w.forward(&fyne.ShortcutPaste{Clipboard: clipboard}) }),
		shortcut("Select all", &fyne.ShortcutSelectAll{}, func() { w.forward(&fyne.ShortcutSelectAll{}) }),
		fyne.NewMenuItemSeparator(),
		item("Inherit the value again", fyne.KeyBackspace, ctrl, func() { w.onFocused(w.desk.Clear) }),
		item("Back to the saved value", fyne.KeyBackspace, ctrl|fyne.KeyModifierShift, func() { w.onFocused(w.desk.Reset) }),
		item("Next unit", fyne.KeyU, ctrl, func() { w.onFocused(w.nextUnit) }),
		item("Source and formula of the value", fyne.KeyE, ctrl, w.explainFocused),
		item("Copy the value", fyne.KeyC, ctrl|fyne.KeyModifierShift, w.copyFocused),
		item("Menu of the value", fyne.KeyM, ctrl, w.menuAtHand),
		fyne.NewMenuItemSeparator(),
		w.menu.apply,
		item("Judge again", fyne.KeyR, ctrl, w.retry),
		item("Stop judging", fyne.KeyPeriod, ctrl, func() { w.desk.Stop(); w.Echo() }))
}

// forward hands a shortcut to what has the focus.
func (w *Window) forward(s fyne.Shortcut) {
	if focused, ok := w.window.Canvas().Focused().(fyne.Shortcutable); ok {
		focused.TypedShortcut(s)
	}
}

func (w *Window) viewMenu() *fyne.Menu {
	both := ctrl | fyne.KeyModifierShift
	return fyne.NewMenu("View",
		item("Light", fyne.KeyL, both, func() { w.chooseVariant(Light) }),
		item("Dark", fyne.KeyD, both, func() { w.chooseVariant(Dark) }),
		item("As the system", fyne.KeyY, both, func() { w.chooseVariant(FollowSystem) }),
		fyne.NewMenuItemSeparator(),
		item("Larger text", fyne.KeyEqual, ctrl, func() { w.stepText(+1) }),
		item("Smaller text", fyne.KeyMinus, ctrl, func() { w.stepText(-1) }),
		item("Text at 100 %", fyne.Key0, ctrl, func() { w.stepText(0) }),
		fyne.NewMenuItemSeparator(),
		item("Next page", fyne.KeyPageDown, ctrl, func() { w.nextPage(+1) }),
		item("Previous page", fyne.KeyPageUp, ctrl, func() { w.nextPage(-1) }),
		item("Knobs in a narrow window", fyne.KeyF2, 0, w.toggleDrawer))
}

func (w *Window) stageMenu() *fyne.Menu {
	return fyne.NewMenu("Stage",
		item("Next stage", fyne.KeyDown, fyne.KeyModifierAlt, func() { w.nextStage(+1) }),
		item("Previous stage", fyne.KeyUp, fyne.KeyModifierAlt, func() { w.nextStage(-1) }),
		fyne.NewMenuItemSeparator(),
		item("Add a stage after this one", fyne.KeyInsert, fyne.KeyModifierAlt, func() { w.did(w.desk.AddStage(w.state.Stage)) }),
		item("Move the stage later", fyne.KeyDown, fyne.KeyModifierAlt|fyne.KeyModifierShift, func() { w.did(w.desk.MoveStage(w.state.Stage, +1)) }),
		item("Move the stage earlier", fyne.KeyUp, fyne.KeyModifierAlt|fyne.KeyModifierShift, func() { w.did(w.desk.MoveStage(w.state.Stage, -1)) }),
		item("Remove the stage", fyne.KeyDelete, fyne.KeyModifierAlt, func() { w.did(w.desk.RemoveStage(w.state.Stage)) }))
}

func (w *Window) helpMenu() *fyne.Menu {
	return fyne.NewMenu("Help",
		item("Cautions", fyne.KeyF1, 0, w.showCautions),
		item("About Hilltop", fyne.KeyF1, ctrl, w.showAbout))
}

// refreshMenu names the edits that can be taken back, and the recent files.
func (w *Window) refreshMenu() {
	s := w.state
	words := menuWords{undo: s.Undo, redo: s.Redo, advice: w.bar.advice != nil, plan: planWords(s)}
	for _, path := range s.Recent {
		words.recent += path + "\n"
	}
	if w.menu.bar == nil || w.menu.shown != nil && words == *w.menu.shown {
		return
	}
	w.menu.shown = &words
	nameEdit(w.menu.undo, "Undo", s.Undo, &fyne.ShortcutUndo{})
	nameEdit(w.menu.redo, "Redo", s.Redo, &fyne.ShortcutRedo{})
	w.menu.apply.Disabled = !words.advice
	w.refreshPlan()
	var items []*fyne.MenuItem
	for i, path := range s.Recent {
		items = append(items, item(filepath.Base(path), digitKey(i), ctrl, func() { w.ifSaved("opening another plan", func() { w.open(path) }) }))
	}
	w.menu.recent.ChildMenu.Items = items
	w.menu.recent.Disabled = len(items) == 0
	w.menu.bar.Refresh()
}

// nameEdit makes an item name an edit, or disables it where there is none.
func nameEdit(i *fyne.MenuItem, verb, edit string, keys fyne.KeyboardShortcut) {
	i.Disabled = edit == ""
	if edit != "" {
		verb += ": " + edit
	}
	i.Label = withKeys(verb, keys)
}

func (w *Window) undo() {
	edit := w.state.Undo
	w.desk.Undo()
	w.afterHistory("Undone: ", edit)
}

func (w *Window) redo() {
	edit := w.state.Redo
	w.desk.Redo()
	w.afterHistory("Done again: ", edit)
}

// afterHistory says which edit was taken back or done again, and leads to the field
// that changed.
func (w *Window) afterHistory(verb, edit string) {
	w.column.Drop()
	w.Echo()
	if edit != "" {
		w.status.Say(verb + edit)
	}
	w.reveal(w.state.Touched)
}

func (w *Window) applyAdvice() {
	if w.bar.advice != nil {
		w.apply(*w.bar.advice)
	}
}
