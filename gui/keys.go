package gui

import (
	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/driver/desktop"
)

// key takes the keys that nothing else in the window uses. Those that belong to a
// menu item have no modifier, which the toolkit's menus do not look for.
func (w *Window) key(e *fyne.KeyEvent) {
	switch e.Name {
	case fyne.KeyF1:
		w.showCautions()
	case fyne.KeyF2:
		w.toggleDrawer()
	case fyne.KeyF6:
		w.readPicture()
	case desktop.KeyMenu:
		w.menuAtHand()
	case fyne.KeyEscape:
		w.escape()
	}
}

// escape ends the first of what can be ended: a drag, the strip, the drawer.
func (w *Window) escape() {
	switch {
	case w.state.Dragging:
		w.desk.CancelDrag()
		w.Echo()
	case w.strip.Visible():
		w.strip.Hide()
		w.arrange()
	case w.metrics.Fold == drawerFold && w.drawerOpen:
		w.toggleDrawer()
	}
}

// leave moves the focus on from a field.
func (w *Window) leave(direction int) {
	if direction > 0 {
		w.window.Canvas().FocusNext()
	} else {
		w.window.Canvas().FocusPrevious()
	}
}
