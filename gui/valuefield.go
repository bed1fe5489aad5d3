package gui

import (
	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/driver/desktop"
	"fyne.io/fyne/v2/widget"

	"hilltop/gui/session"
)

// ValueField is a box with a right-aligned number and its unit, edited in place.
//
// Enter and Tab commit, Escape restores, Up and Down step the last digit, with
// Shift a tenth of it, Page Up and Page Down ten; Delete on an empty field clears
// the value, so that it is inherited again. Text that was refused stays, with a
// dashed outline.
//
// A field of words has no steps. A long one wraps its text over several lines, from
// the left, and Up and Down move between them.
type ValueField struct {
	widget.BaseWidget

	Name      string // for those who cannot see the label beside it
	Unit      string
	Inherited bool // the value is drawn soft
	Refused   bool // the text is not in the plan
	Words     bool // a text, not a number
	Long      bool // a text that may take several lines
	On        FieldEvents

	line    editLine
	shown   string // the text without edits
	focused bool
	shift   bool
	first   int // of the runes that are drawn, where not all fit
}

// FieldEvents are what a value field tells of. None may be nil.
type FieldEvents struct {
	Changed func(text string)
	Commit  func(text string)
	Restore func()
	Clear   func()
	Step    func(n int, size session.StepSize) // of a field without edits
	Focus   func(focused bool)
	Leave   func(direction int) // Tab: +1, with Shift -1
	Menu    func(at fyne.Position)
	Scroll  func(*fyne.ScrollEvent) // the wheel over a field without the focus
	Key     func(*fyne.KeyEvent)    // keys that are not the field's
}

var (
	_ fyne.Widget            = (*ValueField)(nil)
	_ fyne.Focusable         = (*ValueField)(nil)
	_ fyne.Tabbable          = (*ValueField)(nil)
	_ fyne.Shortcutable      = (*ValueField)(nil)
	_ fyne.DoubleTappable    = (*ValueField)(nil)
	_ fyne.SecondaryTappable = (*ValueField)(nil)
	_ fyne.Draggable         = (*ValueField)(nil)
	_ fyne.Scrollable        = (*ValueField)(nil)
	_ fyne.Accessible        = (*ValueField)(nil)
	_ desktop.Keyable        = (*ValueField)(nil)
	_ desktop.Mouseable      = (*ValueField)(nil)
	_ desktop.Cursorable     = (*ValueField)(nil)
)

// NewValueField returns an empty field.
func NewValueField(events FieldEvents) *ValueField {
	f := &ValueField{On: events}
	f.ExtendBaseWidget(f)
	return f
}

// Set shows a value of the plan, unless the field holds edits. A refused text
// stands in the value's place.
func (f *ValueField) Set(v session.Field) {
	f.Name, f.Unit, f.Inherited = v.Label, session.Symbol(v.Unit), v.Inherited
	f.Refused = v.Reason != ""
	f.Words, f.Long = v.Kind != session.NumberField, v.Long
	edited := f.Edited()
	f.shown = v.Text
	switch {
	case f.focused && edited:
	case f.Refused:
		f.put(v.Pending)
	default:
		f.put(v.Text)
	}
	f.Refresh()
}

// put replaces the text; a field with the focus selects it, so that typing
// replaces it.
func (f *ValueField) put(text string) {
	if f.line.String() == text {
		return
	}
	f.line.set(text)
	if f.focused {
		f.line.selectAll()
	}
}

// Edited reports whether the text differs from the value.
func (f *ValueField) Edited() bool { return f.line.String() != f.shown }

// Text is what stands in the field.
func (f *ValueField) Text() string { return f.line.String() }

// Drop forgets the edits.
func (f *ValueField) Drop() {
	f.Refused = false
	f.put(f.shown)
	f.Refresh()
}

// Focused reports whether keys go to the field.
func (f *ValueField) Focused() bool { return f.focused }

// AcceptsTab makes Tab arrive as a key, which commits before it moves on.
func (f *ValueField) AcceptsTab() bool { return true }

// FocusGained selects the text.
func (f *ValueField) FocusGained() {
	f.focused, f.shift = true, false
	f.line.selectAll()
	f.On.Focus(true)
	f.Refresh()
}

// FocusLost commits the edits.
func (f *ValueField) FocusLost() {
	f.focused, f.shift = false, false
	f.line.moveTo(len(f.line.text), false)
	f.commit()
	f.On.Focus(false)
	f.Refresh()
}

// commit hands the edits on. What comes back through Set, the value as it is
// written or the refused text, takes the place of what was typed.
func (f *ValueField) commit() {
	if f.Edited() {
		f.shown = f.line.String()
		f.On.Commit(f.shown)
	}
}

// Cursor is that over text.
func (f *ValueField) Cursor() desktop.Cursor { return desktop.TextCursor }

// MouseDown takes the focus and puts the cursor where the pointer is.
func (f *ValueField) MouseDown(e *desktop.MouseEvent) {
	gained := !f.focused
	f.takeFocus()
	if e.Button == desktop.MouseButtonPrimary && !gained {
		f.line.moveTo(f.placeAt(e.Position), extendSelection(f.shift))
		f.Refresh()
	}
}

// MouseUp does nothing.
func (f *ValueField) MouseUp(*desktop.MouseEvent) {}

func (f *ValueField) takeFocus() { takeFocus(f) }

// Dragged selects text.
func (f *ValueField) Dragged(e *fyne.DragEvent) {
	f.line.moveTo(f.placeAt(e.Position), true)
	f.Refresh()
}

// DragEnd does nothing.
func (f *ValueField) DragEnd() {}

// DoubleTapped selects the word under the pointer.
func (f *ValueField) DoubleTapped(e *fyne.PointEvent) {
	f.line.selectWord(f.placeAt(e.Position))
	f.Refresh()
}

// TappedSecondary opens the field's menu.
func (f *ValueField) TappedSecondary(e *fyne.PointEvent) { f.On.Menu(e.AbsolutePosition) }

// Scrolled steps the value of a field that has the focus; else it scrolls what
// the field stands in.
func (f *ValueField) Scrolled(e *fyne.ScrollEvent) {
	switch {
	case !f.focused || f.Words:
		f.On.Scroll(e)
	case e.Scrolled.DY > 0:
		f.step(+1, session.LastDigit)
	case e.Scrolled.DY < 0:
		f.step(-1, session.LastDigit)
	}
}

// AccessibilityLabel is the name, the value and the unit.
func (f *ValueField) AccessibilityLabel() string {
	return f.Name + " " + f.line.String() + " " + f.Unit
}

// AccessibilityRole is text.
func (f *ValueField) AccessibilityRole() fyne.AccessibleRole { return fyne.AccessibleRoleText }
