package gui

import (
	"fmt"
	"slices"
	"strings"
	"testing"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/driver/desktop"
	"fyne.io/fyne/v2/test"
)

// openAll shows every value of the plan.
func (b *bench) openAll() {
	b.Helper()
	if b.window.metrics.Fold == drawerFold && !b.window.drawerOpen {
		b.window.toggleDrawer()
	}
	b.window.column.ToggleAll()
	for _, g := range b.window.state.Groups {
		if !b.window.column.section(g.Name).open {
			b.Fatalf("group %q stays shut", g.Name)
		}
	}
}

// ids are those of all fields of the plan.
func (b *bench) ids() []string {
	var list []string
	for _, f := range b.window.state.Knobs {
		list = append(list, f.ID)
	}
	for _, g := range b.window.state.Groups {
		for _, f := range g.Fields {
			list = append(list, f.ID)
		}
	}
	return list
}

// Every value of a plan stands in the column once its group is open, in every fold,
// without a label that is cut. The windows are high enough to see all of it.
func TestEveryValueIsShown(t *testing.T) {
	for _, look := range looks() {
		for _, plan := range []string{"skerry-demo", "model-chain"} {
			look.plan, look.height = plan, 3200*look.scale
			b := newBench(t, look)
			b.openAll()
			for _, id := range b.ids() {
				if !slices.Contains(b.window.column.order, id) {
					t.Errorf("%s, %s: %s is not shown", look, plan, id)
				}
			}
			b.checkLayout(look.String() + " " + plan)
			b.keep("values-" + look.String() + "-" + plan)
		}
	}
}

func TestGroupsAreShutAtFirst(t *testing.T) {
	b := newBench(t, setup{})
	for name, c := range b.window.column.sections {
		if c.open {
			t.Errorf("group %q is open", name)
		}
	}
	head := b.window.column.sections["Lattice"].head
	if got := head.AccessibilityLabel(); got != "Lattice, shut: 740 nm, 150 µm" {
		t.Errorf("the heading says %q", got)
	}
	test.Tap(head)
	if !slices.Contains(b.window.column.order, "/lattice/axes/0/wavelength_nm") {
		t.Error("a click on the heading does not show the wavelength")
	}
	b.press(head, fyne.KeyLeft)
	if slices.Contains(b.window.column.order, "/lattice/axes/0/wavelength_nm") {
		t.Error("the arrow to the left does not shut the group")
	}
}

// All of it works from the keyboard: open a group, reach a value, change it, add a
// beam and take it out, and take everything back.
func TestValuesByKeyboard(t *testing.T) {
	b := newBench(t, setup{})
	first := b.window.state.Plan
	b.canvas().Focus(b.window.column.sections["Beams"].head)
	b.press(b.canvas().Focused(), fyne.KeySpace)
	b.canvas().FocusNext() // the button that takes the first beam out
	if _, ok := b.canvas().Focused().(*Button); !ok {
		t.Fatalf("behind the heading the focus is on %T, want the button of the part", b.canvas().Focused())
	}
	b.canvas().FocusNext()
	b.retype(b.canvas().Focused().(*ValueField), "plate")
	if name := b.window.state.Plan.Beams[0].Name; name != "plate" {
		t.Errorf("the beam is called %q, want plate", name)
	}
	b.item("Add a beam").Action()
	b.settle()
	if n := len(b.window.state.Plan.Beams); n != 3 {
		t.Fatalf("%d beams, want 3", n)
	}
	field, ok := b.canvas().Focused().(*ValueField)
	if !ok || field.Text() != "beam 3" {
		t.Errorf("the focus is on %T, want the name of the new beam", b.canvas().Focused())
	}
	b.item("Remove the beam").Action()
	b.settle()
	if n := len(b.window.state.Plan.Beams); n != 2 {
		t.Errorf("%d beams, want 2", n)
	}
	if b.canvas().Focused() != b.window.column.sections["Beams"].head {
		t.Errorf("the focus is on %T, want the heading", b.canvas().Focused())
	}
	for b.window.state.Undo != "" {
		b.window.undo()
		b.settle()
	}
	if b.window.state.Dirty || fmt.Sprint(b.window.state.Plan.Beams) != fmt.Sprint(first.Beams) {
		t.Errorf("undo leaves the beams %+v", b.window.state.Plan.Beams)
	}
}

// retype replaces what stands in a field and commits it.
func (b *bench) retype(f *ValueField, text string) {
	b.Helper()
	b.canvas().Focus(f)
	f.TypedShortcut(&fyne.ShortcutSelectAll{})
	b.press(f, fyne.KeyBackspace)
	b.typeInto(f, text)
	b.press(f, fyne.KeyReturn)
	b.settle()
}

// Undo of a value in a shut group opens it, in the drawer too.
func TestUndoOpensTheGroup(t *testing.T) {
	b := newBench(t, setup{width: 1024, height: 648, scale: 1.5})
	b.window.reveal("/cloud/atoms")
	b.enter("/cloud/atoms", "70000")
	b.window.toggleDrawer()
	b.window.column.toggle(b.window.column.section("Cloud"))
	b.item("Undo").Action()
	b.settle()
	if !b.window.column.Visible() || b.canvas().Focused() != b.field("/cloud/atoms") {
		t.Errorf("undo does not lead to the value: drawer open %v, focus on %T", b.window.drawerOpen, b.canvas().Focused())
	}
	if got := b.window.status.left.Text; !strings.HasPrefix(got, "Undone: Atoms: ") {
		t.Errorf("the status line says %q", got)
	}
}

func TestStagesFromTheColumn(t *testing.T) {
	b := newBench(t, setup{})
	c := b.window.column.sections["Stage"]
	test.Tap(c.head)
	press := func(label string) {
		t.Helper()
		for _, button := range c.buttons {
			if button.Visible() && button.text.Text == label {
				test.Tap(button)
				b.settle()
				return
			}
		}
		t.Fatalf("there is no button %q", label)
	}
	before := len(b.window.state.Plan.Stages)
	press("Add a stage")
	press("Move later")
	press("Move earlier")
	press("Remove stage")
	if n := len(b.window.state.Plan.Stages); n != before {
		t.Errorf("%d stages, want %d", n, before)
	}
	for b.window.state.Undo != "" {
		b.window.undo()
		b.settle()
	}
	if b.window.state.Dirty {
		t.Error("undo does not bring the stages back")
	}
}

// What is taken out while it has the focus loses it.
func TestFocusLeavesWhatIsGone(t *testing.T) {
	b := newBench(t, setup{})
	b.window.reveal("/beams/1/name")
	b.typeInto(b.field("/beams/1/name"), "half a na")
	b.window.column.toggle(b.window.column.section("Beams"))
	if focused := b.canvas().Focused(); focused != nil {
		t.Errorf("the focus stays on %T in a shut group", focused)
	}
	if b.window.state.Plan.Beams[1].Name != "cross" {
		t.Errorf("shutting the group renamed the beam to %q", b.window.state.Plan.Beams[1].Name)
	}
}

// A long text wraps, and the cursor moves between its lines.
func TestLongTextWraps(t *testing.T) {
	b := newBench(t, setup{})
	b.window.reveal("/note")
	f := b.field("/note")
	lines := f.lines(f.Size().Width)
	if len(lines) < 4 || f.Size().Height < float32(len(lines))*f.lineHeight() {
		t.Fatalf("the note has %d lines in a height of %g", len(lines), f.Size().Height)
	}
	f.line.moveTo(lines[1].low+3, false)
	b.press(f, fyne.KeyUp)
	if f.line.cursor != 3 {
		t.Errorf("Up leads to place %d, want 3", f.line.cursor)
	}
	b.press(f, fyne.KeyDown, fyne.KeyDown)
	if want := lines[2].low + 3; f.line.cursor != want {
		t.Errorf("Down twice leads to place %d, want %d", f.line.cursor, want)
	}
	at := fyne.NewPos(px(fieldInset)+5*f.runeWidth(), px(longInset)+1.5*f.lineHeight())
	f.MouseDown(&desktop.MouseEvent{PointEvent: fyne.PointEvent{Position: at}, Button: desktop.MouseButtonPrimary})
	if want := lines[1].low + 5; f.line.cursor != want {
		t.Errorf("a click on the second line leads to place %d, want %d", f.line.cursor, want)
	}
	b.retype(f, "short")
	if b.window.state.Plan.Note != "short" {
		t.Errorf("the note is %q", b.window.state.Plan.Note)
	}
	if got := f.HeightFor(f.Size().Width); got != px(rowHeight) {
		t.Errorf("a short note is %g high, want a row", got)
	}
}

func TestWrapRunes(t *testing.T) {
	for _, tc := range []struct {
		text string
		most int
		want []string
	}{
		{"", 5, []string{""}},
		{"one two", 7, []string{"one two"}},
		{"one two three", 7, []string{"one ", "two ", "three"}},
		{"abcdefghij", 4, []string{"abcd", "efgh", "ij"}},
		{"a bcdefgh", 4, []string{"a ", "bcde", "fgh"}},
		{"ab", 0, []string{"a", "b"}},
	} {
		var got []string
		for _, line := range wrapRunes([]rune(tc.text), tc.most) {
			got = append(got, tc.text[line.low:line.high])
		}
		if !slices.Equal(got, tc.want) {
			t.Errorf("%q in %d: got %q, want %q", tc.text, tc.most, got, tc.want)
		}
	}
}

// A choice that the plan refuses says why.
func TestRefusedChoiceSaysWhy(t *testing.T) {
	b := newBench(t, setup{})
	b.window.reveal("/stages/3/shape")
	words := b.window.column.choices["/stages/3/shape"].words
	b.press(words, fyne.KeyHome) // a hold that moves a knob
	b.settle()
	row := b.window.column.choices["/stages/3/shape"]
	if !row.fault.Visible() || !strings.Contains(row.fault.prose.Text, "hold") {
		t.Errorf("below the choice stands %q", row.fault.prose.Text)
	}
	b.checkLayout("with a refused choice")
	b.window.undo()
	b.settle()
	if row.fault.Visible() {
		t.Error("undo does not clear the refused choice")
	}
}

func TestModelValues(t *testing.T) {
	b := newBench(t, setup{plan: "model-chain"})
	for _, id := range []string{"tunnelling_hz/0", "interaction_hz", "curvature_hz/0"} {
		if !slices.Contains(b.window.column.order, id) {
			t.Errorf("the model does not show %s", id)
		}
	}
	b.openAll()
	b.enter("/model/sites/0", "6")
	b.enter("/model/atoms", "6")
	b.enter("/model/fock", "1 1 1 1 1 1")
	b.enter("interaction_hz", "+2")
	choice := b.window.column.choices["/model/periodic/0"]
	b.press(choice.words, fyne.KeyEnd)
	b.settle()
	m := b.window.state.Plan.Model
	if m.Sites[0] != 6 || m.Atoms != 6 || len(m.Fock) != 6 || m.InteractionHz != 2 || !m.Periodicity()[0] {
		t.Errorf("the model is %+v", m)
	}
	b.item("Add an axis").Action()
	b.settle()
	if len(b.window.state.Plan.Model.Sites) != 2 {
		t.Error("there is no second axis")
	}
	b.checkLayout("with two axes")
}

// What a state costs to show with every group open.
func BenchmarkShowAllValues(b *testing.B) {
	bench := newBench(&testing.T{}, setup{})
	bench.openAll()
	state := bench.window.state
	b.ReportAllocs()
	for b.Loop() {
		state.Number++
		bench.window.Show(state)
	}
}

// Whatever gets the focus by Tab is in sight, all through the column.
func TestFocusIsInSight(t *testing.T) {
	for _, look := range []setup{{width: 1280, height: 768}, {width: 1024, height: 648, scale: 1.5}} {
		b := newBench(t, look)
		b.openAll()
		k := b.window.column
		driver := fyne.CurrentApp().Driver()
		b.canvas().Focus(k.rail)
		seen := 0
		for range 200 {
			b.canvas().FocusNext()
			o, ok := b.canvas().Focused().(fyne.CanvasObject)
			if !ok || o == fyne.CanvasObject(b.window.places) || o == fyne.CanvasObject(b.window.drawer) {
				break
			}
			seen++
			top := driver.AbsolutePositionForObject(o).Y - driver.AbsolutePositionForObject(k.scroller).Y
			if top < 0 || top+o.Size().Height > k.scroller.Size().Height {
				t.Errorf("%v: %T at %g to %g has the focus out of sight, in a column of %g", look, o, top, top+o.Size().Height, k.scroller.Size().Height)
			}
		}
		if seen < 50 {
			t.Errorf("%v: Tab reached %d places, want every value", look, seen)
		}
	}
}
