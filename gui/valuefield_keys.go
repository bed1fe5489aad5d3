package gui

import (
	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/driver/desktop"

	"hilltop/gui/session"
)

// KeyDown notes that Shift is held.
func (f *ValueField) KeyDown(e *fyne.KeyEvent) {
	if isShift(e) {
		f.shift = true
	}
}

// KeyUp notes that Shift is let go.
func (f *ValueField) KeyUp(e *fyne.KeyEvent) {
	if isShift(e) {
		f.shift = false
	}
}

func isShift(e *fyne.KeyEvent) bool {
	return e.Name == desktop.KeyShiftLeft || e.Name == desktop.KeyShiftRight
}

// TypedRune types a character over the selection.
func (f *ValueField) TypedRune(r rune) {
	f.line.insert(string(r))
	f.changed()
}

// TypedKey edits, steps, commits or restores.
func (f *ValueField) TypedKey(e *fyne.KeyEvent) {
	extend := extendSelection(f.shift)
	switch e.Name {
	case fyne.KeyLeft:
		f.line.step(-1, extend)
	case fyne.KeyRight:
		f.line.step(+1, extend)
	case fyne.KeyHome:
		f.line.moveTo(0, extend)
	case fyne.KeyEnd:
		f.line.moveTo(len(f.line.text), extend)
	case fyne.KeyBackspace:
		f.erase(-1)
	case fyne.KeyDelete:
		f.erase(+1)
	default:
		f.actionKey(e)
		return
	}
	f.Refresh()
}

// actionKey handles the keys that do more than move the cursor.
func (f *ValueField) actionKey(e *fyne.KeyEvent) {
	switch e.Name {
	case fyne.KeyReturn, fyne.KeyEnter:
		f.commit()
		f.line.selectAll()
		f.Refresh()
	case fyne.KeyEscape:
		f.On.Restore()
		f.Drop()
	case fyne.KeyTab:
		direction := +1
		if f.shift {
			direction = -1
		}
		f.On.Leave(direction)
	default:
		f.stepKey(e)
	}
}

// stepKey handles the keys that step a number; in words they move the cursor.
func (f *ValueField) stepKey(e *fyne.KeyEvent) {
	step, known := map[fyne.KeyName]struct {
		n    int
		size session.StepSize
	}{
		fyne.KeyUp: {+1, f.finer()}, fyne.KeyDown: {-1, f.finer()},
		fyne.KeyPageUp: {+1, session.TenDigits}, fyne.KeyPageDown: {-1, session.TenDigits},
	}[e.Name]
	switch {
	case !known:
		f.On.Key(e)
	case !f.Words:
		f.step(step.n, step.size)
	case f.Long:
		f.moveLine(-step.n, extendSelection(f.shift))
		f.Refresh()
	}
}

// finer is the step of the arrow keys.
func (f *ValueField) finer() session.StepSize {
	if f.shift {
		return session.TenthOfDigit
	}
	return session.LastDigit
}

// erase deletes; Delete on an empty field clears the value.
func (f *ValueField) erase(direction int) {
	if len(f.line.text) == 0 {
		if direction > 0 {
			f.On.Clear()
		}
		return
	}
	f.line.erase(direction)
	f.changed()
}

// step moves the number, in the text where there are edits, else in the plan.
func (f *ValueField) step(n int, size session.StepSize) {
	if !f.Edited() {
		f.On.Step(n, size)
		return
	}
	f.line.set(session.StepText(f.line.String(), n, size))
	f.line.selectAll()
	f.changed()
}

func (f *ValueField) changed() {
	f.On.Changed(f.line.String())
	f.Refresh()
}

// TypedShortcut copies, cuts, pastes or selects.
func (f *ValueField) TypedShortcut(s fyne.Shortcut) {
	switch s := s.(type) {
	case *fyne.ShortcutCopy:
		f.copyTo(s.Clipboard)
	case *fyne.ShortcutCut:
		f.copyTo(s.Clipboard)
		f.line.insert("")
		f.changed()
	case *fyne.ShortcutPaste:
		f.line.insert(s.Clipboard.Content())
		f.changed()
	case *fyne.ShortcutSelectAll:
		f.line.selectAll()
		f.Refresh()
	}
}

func (f *ValueField) copyTo(clipboard fyne.Clipboard) {
	if text := f.line.selected(); text != "" {
		clipboard.SetContent(text)
	}
}
