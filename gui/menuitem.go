package gui

import (
	"runtime"
	"strings"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/driver/desktop"
)

const ctrl = fyne.KeyModifierShortcutDefault

// item is a menu item with its shortcut.
func item(label string, key fyne.KeyName, modifier fyne.KeyModifier, action func()) *fyne.MenuItem {
	return shortcut(label, &desktop.CustomShortcut{KeyName: key, Modifier: modifier}, action)
}

// shortcut is a menu item with any shortcut.
func shortcut(label string, keys fyne.KeyboardShortcut, action func()) *fyne.MenuItem {
	i := fyne.NewMenuItem(withKeys(label, keys), action)
	i.Shortcut = keys
	if !systemMenu {
		i.Shortcut = unseen(keys.ShortcutName())
	}
	return i
}

// systemMenu says that the system draws the menu, with the shortcuts in it.
const systemMenu = runtime.GOOS == "darwin"

// unseen is a shortcut that works but is not drawn: the toolkit draws shortcuts at
// a fifth of the ink, which nobody can read. They stand in the labels instead.
type unseen string

// ShortcutName is what the toolkit knows a shortcut by.
func (u unseen) ShortcutName() string { return string(u) }

// withKeys puts the keys of a shortcut behind a label.
func withKeys(label string, keys fyne.KeyboardShortcut) string {
	if systemMenu {
		return label
	}
	var parts []string
	for _, m := range []struct {
		modifier fyne.KeyModifier
		name     string
	}{
		{fyne.KeyModifierControl, "Ctrl"}, {fyne.KeyModifierAlt, "Alt"}, {fyne.KeyModifierShift, "Shift"}, {fyne.KeyModifierSuper, "Super"},
	} {
		if keys.Mod()&m.modifier != 0 {
			parts = append(parts, m.name)
		}
	}
	return label + " (" + strings.Join(append(parts, keyName(keys.Key())), "+") + ")"
}

// keyName is a key as it is printed on keyboards.
func keyName(key fyne.KeyName) string {
	switch key {
	case fyne.KeyPageUp:
		return "Page Up"
	case fyne.KeyPageDown:
		return "Page Down"
	case fyne.KeyReturn:
		return "Enter"
	case fyne.KeyBackspace:
		return "Backspace"
	}
	return string(key)
}
