package gui

import (
	"strings"
	"testing"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/canvas"
	"fyne.io/fyne/v2/driver/desktop"
	"fyne.io/fyne/v2/test"
)

func TestCopyTheValue(t *testing.T) {
	b := newBench(t, setup{})
	b.canvas().Focus(b.field(sheet))
	b.item("Copy the value").Action()
	if got := b.app.Clipboard().Content(); got != "20 mW" {
		t.Errorf("copied %q, want 20 mW", got)
	}
	if got := b.window.status.left.Text; got != "Copied: 20 mW" {
		t.Errorf("the status line says %q", got)
	}
	number := b.margin()
	b.canvas().Focus(number)
	b.item("Copy the value").Action()
	if got := b.app.Clipboard().Content(); got != number.text.Text || got == "" {
		t.Errorf("copied %q, want %q", got, number.text.Text)
	}
	b.window.state.Stale = true
	b.item("Copy the value").Action()
	if got := b.app.Clipboard().Content(); got != number.text.Text+" (stale)" {
		t.Errorf("copied %q, want it called stale", got)
	}
}

// margin is the number of the first criterion of the page Ceiling.
func (b *bench) margin() *Number {
	b.Helper()
	for _, p := range b.window.pages {
		if page, ok := p.(*CeilingPage); ok {
			return page.rows[0].margin
		}
	}
	b.Fatal("there is no page Ceiling")
	return nil
}

// The menu of a value opens by a right click, by the menu key and by its own item,
// at a field, at a choice and at a number.
func TestMenuOfTheValue(t *testing.T) {
	b := newBench(t, setup{})
	b.window.reveal("/stages/3/shape")
	choice := b.window.column.choices["/stages/3/shape"]
	row := b.window.column.rows[depthX]
	for name, open := range map[string]func(){
		"right click on a field":  func() { test.TapSecondary(row.field) },
		"right click on a label":  func() { test.TapSecondary(row.label) },
		"menu key":                func() { b.canvas().Focus(row.field); b.press(row.field, desktop.KeyMenu) },
		"menu item":               func() { b.canvas().Focus(row.field); b.item("Menu of the value").Action() },
		"menu key on a choice":    func() { b.canvas().Focus(choice.words); b.press(choice.words, desktop.KeyMenu) },
		"right click on a choice": func() { test.TapSecondary(choice.label) },
		"right click on a number": func() { test.TapSecondary(b.margin()) },
		"menu key on a number":    func() { b.canvas().Focus(b.margin()); b.press(b.margin(), desktop.KeyMenu) },
	} {
		open()
		overlay := b.canvas().Overlays().Top()
		if overlay == nil {
			t.Errorf("%s: no menu", name)
			continue
		}
		said := strings.Join(texts(overlay), "; ")
		for _, want := range []string{"Source and formula", "Copy the value"} {
			if !strings.Contains(said, want) {
				t.Errorf("%s: the menu says %q, want %q", name, said, want)
			}
		}
		b.canvas().Overlays().Remove(overlay)
	}
}

// texts are the words that can be read in an object.
func texts(root fyne.CanvasObject) []string {
	var list []string
	for _, o := range test.LaidOutObjects(root) {
		if o, ok := o.(*canvas.Text); ok && o.Text != "" {
			list = append(list, o.Text)
		}
	}
	return list
}

// A double click on a label brings the saved value back.
func TestDoubleClickResets(t *testing.T) {
	b := newBench(t, setup{})
	b.enter(depthX, "9")
	test.DoubleTap(b.window.column.rows[depthX].label)
	b.settle()
	if text, _, _, _ := b.knob(depthX); text != "6" || b.window.state.Dirty {
		t.Errorf("after a double click: %q, edited %v", text, b.window.state.Dirty)
	}
	b.enter(depthX, "letters")
	test.DoubleTap(b.window.column.rows[depthX].label)
	if b.field(depthX).Text() != "6" || b.field(depthX).Refused {
		t.Errorf("a double click leaves %q", b.field(depthX).Text())
	}
	b.window.reveal("/stages/3/shape")
	shape := b.window.column.choices["/stages/3/shape"]
	b.press(shape.words, fyne.KeyEnd)
	b.settle()
	test.DoubleTap(shape.label)
	b.settle()
	if f, _ := b.window.state.Field("/stages/3/shape"); f.Text != "linear" {
		t.Errorf("a double click on the label of the shape: %q, want linear", f.Text)
	}
}

func TestExplainAField(t *testing.T) {
	b := newBench(t, setup{})
	b.canvas().Focus(b.field(sheet))
	b.item("Source and formula").Action()
	if !b.window.strip.Visible() || !strings.Contains(b.window.strip.formula.Text, "Power 'sheet'") || !strings.Contains(b.window.strip.inputs.Text, "release") {
		t.Errorf("the strip says %q, %q", b.window.strip.formula.Text, b.window.strip.inputs.Text)
	}
}
