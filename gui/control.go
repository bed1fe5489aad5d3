package gui

import (
	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/driver/desktop"
	"fyne.io/fyne/v2/widget"
)

// control is what the widgets share that take the focus, but no text.
type control struct {
	widget.BaseWidget
	OnKey   func(*fyne.KeyEvent) // takes the keys that the widget does not use; may be nil
	OnFocus func()               // the widget has got the focus; may be nil

	focused bool
}

// TypedRune does nothing.
func (c *control) TypedRune(rune) {}

// FocusGained shows the focus.
func (c *control) FocusGained() {
	c.focused = true
	c.Refresh()
	if c.OnFocus != nil {
		c.OnFocus()
	}
}

// FocusLost hides the focus.
func (c *control) FocusLost() {
	c.focused = false
	c.Refresh()
}

// Cursor is a hand.
func (c *control) Cursor() desktop.Cursor { return desktop.PointerCursor }

// AccessibilityRole is button.
func (c *control) AccessibilityRole() fyne.AccessibleRole { return fyne.AccessibleRoleButton }

// unused hands on a key that the widget does not use.
func (c *control) unused(e *fyne.KeyEvent) {
	if c.OnKey != nil {
		c.OnKey(e)
	}
}
