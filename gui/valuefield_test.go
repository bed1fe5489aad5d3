package gui

import (
	"strings"
	"testing"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/driver/desktop"
)

const (
	depthX = "depth_er/0"
	sheet  = "power_w/sheet"
)

// knob is a field of the state.
func (b *bench) knob(id string) (text, unit, pending, reason string) {
	b.Helper()
	f, ok := b.window.state.Field(id)
	if !ok {
		b.Fatalf("the state has no field %q", id)
	}
	return f.Text, f.Unit, f.Pending, f.Reason
}

func (b *bench) typeInto(f *ValueField, text string) {
	b.canvas().Focus(f)
	for _, r := range text {
		f.TypedRune(r)
	}
}

func TestFieldCommits(t *testing.T) {
	for _, tc := range []struct {
		name, typed string
		key         fyne.KeyName
		want, unit  string
	}{
		{"Enter", "7.5", fyne.KeyReturn, "7.5", "Er"},
		{"keypad Enter", "8", fyne.KeyEnter, "8", "Er"},
		{"Tab", "9", fyne.KeyTab, "9", "Er"},
		{"a product", "2*4.5", fyne.KeyReturn, "9", "Er"},
		{"a decimal comma", "7,5", fyne.KeyReturn, "7.5", "Er"},
	} {
		b := newBench(t, setup{})
		f := b.field(depthX)
		b.typeInto(f, tc.typed)
		b.press(f, tc.key)
		b.settle()
		if text, unit, _, _ := b.knob(depthX); text != tc.want || unit != tc.unit {
			t.Errorf("%s: typed %q, got %s %s, want %s %s", tc.name, tc.typed, text, unit, tc.want, tc.unit)
		}
		if f.Text() != tc.want {
			t.Errorf("%s: the field shows %q, want %q", tc.name, f.Text(), tc.want)
		}
		if moved := b.canvas().Focused() != f; moved != (tc.key == fyne.KeyTab) {
			t.Errorf("%s: the focus has moved: %v", tc.name, moved)
		}
		if b.window.state.Undo == "" {
			t.Errorf("%s: nothing to undo", tc.name)
		}
	}
}

func TestFieldPreviews(t *testing.T) {
	b := newBench(t, setup{})
	b.typeInto(b.field(sheet), "2*1.3 mW")
	row := b.window.column.rows[sheet]
	if !row.note.Visible() || !strings.HasPrefix(row.note.Text, "= 2.6 mW") {
		t.Errorf("below the field stands %q, want = 2.6 mW", row.note.Text)
	}
	if row.fault.Visible() {
		t.Error("a reason is shown while typing")
	}
}

func TestEscapeRestores(t *testing.T) {
	b := newBench(t, setup{})
	f := b.field(depthX)
	before, _, _, _ := b.knob(depthX)
	b.typeInto(f, "99")
	b.press(f, fyne.KeyEscape)
	b.settle()
	if f.Text() != before || f.Edited() || b.window.state.Undo != "" {
		t.Errorf("after Escape the field shows %q and undo is %q, want %q and none", f.Text(), b.window.state.Undo, before)
	}
}

// Every nonsense is kept as typed, with a reason, and leaves the plan alone.
func TestFieldKeepsWhatItRefuses(t *testing.T) {
	b := newBench(t, setup{})
	f := b.field(depthX)
	before, _, _, _ := b.knob(depthX)
	for _, typed := range []string{"", "letters", "22 mW", "1e400", "NaN", "1,200", "5 J", "-3", "1 2", "∞"} {
		b.canvas().Focus(f)
		f.TypedShortcut(&fyne.ShortcutSelectAll{})
		b.press(f, fyne.KeyBackspace)
		b.typeInto(f, typed)
		b.press(f, fyne.KeyReturn)
		b.settle()
		text, _, pending, reason := b.knob(depthX)
		if text != before || reason == "" {
			t.Errorf("typed %q: value %q, pending %q, reason %q; want %q and a reason", typed, text, pending, reason, before)
		}
		if f.Text() != typed || !f.Refused || !b.window.column.rows[depthX].fault.Visible() {
			t.Errorf("typed %q: the field shows %q, refused %v", typed, f.Text(), f.Refused)
		}
		if b.window.bar.unapplied.prose.Text != "1 field not applied" || !b.window.bar.unapplied.Visible() {
			t.Errorf("typed %q: the verdict bar says %q", typed, b.window.bar.unapplied.prose.Text)
		}
		b.window.undo()
		b.settle()
		if f.Text() != before || f.Refused || b.window.bar.unapplied.Visible() {
			t.Errorf("typed %q: after undo the field shows %q, refused %v", typed, f.Text(), f.Refused)
		}
	}
}

func TestPastedNewlineIsRefused(t *testing.T) {
	b := newBench(t, setup{})
	f := b.field(depthX)
	b.canvas().Focus(f)
	b.app.Clipboard().SetContent("7\n8")
	f.TypedShortcut(&fyne.ShortcutPaste{Clipboard: b.app.Clipboard()})
	b.press(f, fyne.KeyReturn)
	b.settle()
	if _, _, pending, reason := b.knob(depthX); pending != "7 8" || reason == "" {
		t.Errorf("pasted: pending %q, reason %q", pending, reason)
	}
}

func TestKeysStepTheValue(t *testing.T) {
	b := newBench(t, setup{})
	f := b.field(depthX)
	b.enter(depthX, "7.5")
	for _, tc := range []struct {
		keys  []fyne.KeyName
		shift bool
		want  string
	}{
		{[]fyne.KeyName{fyne.KeyUp}, false, "7.6"},
		{[]fyne.KeyName{fyne.KeyDown, fyne.KeyDown}, false, "7.4"},
		{[]fyne.KeyName{fyne.KeyUp}, true, "7.41"},
		{[]fyne.KeyName{fyne.KeyDown}, false, "7.4"},
		{[]fyne.KeyName{fyne.KeyPageUp}, false, "8.4"},
	} {
		if tc.shift {
			f.KeyDown(&fyne.KeyEvent{Name: desktop.KeyShiftLeft})
		}
		b.press(f, tc.keys...)
		f.KeyUp(&fyne.KeyEvent{Name: desktop.KeyShiftLeft})
		b.settle()
		if f.Text() != tc.want {
			t.Errorf("keys %v, shift %v: got %q, want %q", tc.keys, tc.shift, f.Text(), tc.want)
		}
	}
}

func TestDeleteInheritsAgain(t *testing.T) {
	b := newBench(t, setup{})
	b.enter(sheet, "30")
	f, row := b.field(sheet), b.window.column.rows[sheet]
	if f.Inherited {
		t.Fatal("the edit did not set the value in this stage")
	}
	f.TypedShortcut(&fyne.ShortcutSelectAll{})
	b.press(f, fyne.KeyBackspace, fyne.KeyDelete)
	b.settle()
	if !f.Inherited || f.Text() != "20" || row.label.origin.Text != "from release" {
		t.Errorf("after Delete: %q, inherited %v, %q", f.Text(), f.Inherited, row.label.origin.Text)
	}
}

// The wheel over a field without the focus scrolls the column.
func TestWheelStepsOnlyAFocusedField(t *testing.T) {
	b := newBench(t, setup{})
	f := b.field(depthX)
	wheel := &fyne.ScrollEvent{Scrolled: fyne.NewDelta(0, 10)}
	f.Scrolled(wheel)
	b.settle()
	if b.window.state.Undo != "" {
		t.Error("the wheel turned a knob without the focus")
	}
	b.canvas().Focus(f)
	f.Scrolled(wheel)
	b.settle()
	if text, _, _, _ := b.knob(depthX); text != "7" {
		t.Errorf("the wheel over the focused field: got %q, want 7", text)
	}
}

func TestPointerPlacesTheCursor(t *testing.T) {
	b := newBench(t, setup{})
	f := b.field(depthX)
	b.canvas().Focus(f)
	f.put("123456")
	for place := 0; place <= 6; place++ {
		f.MouseDown(&desktop.MouseEvent{PointEvent: fyne.PointEvent{Position: fyne.NewPos(f.x(place), 10)}, Button: desktop.MouseButtonPrimary})
		if f.line.cursor != place {
			t.Errorf("pressed before rune %d: cursor at %d", place, f.line.cursor)
		}
	}
	f.Dragged(&fyne.DragEvent{PointEvent: fyne.PointEvent{Position: fyne.NewPos(f.x(2), 10)}})
	if got := f.line.selected(); got != "3456" {
		t.Errorf("dragged over %q, want 3456", got)
	}
	f.DoubleTapped(&fyne.PointEvent{Position: fyne.NewPos(f.x(2), 10)})
	if got := f.line.selected(); got != "123456" {
		t.Errorf("double tap selects %q", got)
	}
}

// A text longer than the field scrolls so that the cursor stays in sight.
func TestLongTextScrolls(t *testing.T) {
	b := newBench(t, setup{})
	f := b.field(depthX)
	b.typeInto(f, strings.Repeat("1234567890", 4))
	low, high := f.window()
	if high != 40 || low == 0 || f.x(low) < 0 {
		t.Errorf("at the end runes %d to %d are drawn, from x = %g", low, high, f.x(low))
	}
	b.press(f, fyne.KeyHome)
	if low, _ := f.window(); low != 0 {
		t.Errorf("at the beginning the first rune drawn is %d", low)
	}
}
