package gui

import (
	"os"
	"path/filepath"
	"strings"
	"testing"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/driver/desktop"
	"fyne.io/fyne/v2/test"

	"hilltop/gui/session"
)

// item finds a menu item by the beginning of its label.
func (b *bench) item(label string) *fyne.MenuItem {
	b.Helper()
	for _, menu := range b.window.menu.bar.Items {
		for _, item := range menu.Items {
			if strings.HasPrefix(item.Label, label) {
				return item
			}
		}
	}
	b.Fatalf("there is no menu item %q", label)
	return nil
}

// question returns the buttons of the dialog in front, by their labels.
func (b *bench) question() map[string]*Button {
	found := map[string]*Button{}
	for _, overlay := range b.canvas().Overlays().List() {
		for _, o := range test.LaidOutObjects(overlay) {
			if button, ok := o.(*Button); ok {
				found[button.text.Text] = button
			}
		}
	}
	return found
}

func TestUndoNamesTheEditAndGoesThere(t *testing.T) {
	b := newBench(t, setup{})
	if !b.item("Undo").Disabled || !b.item("Redo").Disabled {
		t.Error("there is something to undo or redo in a fresh plan")
	}
	b.enter(depthX, "7.5")
	undo := b.item("Undo")
	if undo.Disabled || !strings.Contains(strings.ToLower(undo.Label), "depth x") {
		t.Errorf("the menu says %q, want the edit named", undo.Label)
	}
	b.canvas().Focus(b.field(sheet))
	undo.Action()
	b.settle()
	if text, _, _, _ := b.knob(depthX); text != "6" {
		t.Errorf("after undo: %q, want 6", text)
	}
	if b.canvas().Focused() != b.field(depthX) {
		t.Error("undo does not lead to the field it changed")
	}
	b.item("Redo").Action()
	b.settle()
	if text, _, _, _ := b.knob(depthX); text != "7.5" {
		t.Errorf("after redo: %q, want 7.5", text)
	}
}

func TestRailSelectsTheStage(t *testing.T) {
	b := newBench(t, setup{})
	rail := b.window.column.rail
	if got := rail.AccessibilityLabel(); got != "lower" {
		t.Errorf("the window begins with stage %q, want lower", got)
	}
	b.press(rail, fyne.KeyHome)
	if got := b.window.column.heading.Text; got != "Knobs at the start" {
		t.Errorf("at the start the heading says %q", got)
	}
	b.item("Next stage").Action()
	if got := b.window.column.heading.Text; got != "Knobs at the end of 'load'" {
		t.Errorf("one stage on the heading says %q", got)
	}
	if origin := b.window.column.rows[sheet].label.origin.Text; origin != "from start" {
		t.Errorf("the power of the sheet comes %q, want from start", origin)
	}
}

func TestAdviceIsAppliedAndLedTo(t *testing.T) {
	b := newBench(t, setup{plan: "skerry-trapped"})
	if b.window.state.Verdict.Word != "Open" || !b.window.bar.button.Visible() {
		t.Fatalf("verdict %q, button shown: %v", b.window.state.Verdict.Word, b.window.bar.button.Visible())
	}
	test.Tap(b.window.bar.button)
	b.settle()
	if b.window.state.Verdict.Word != "Sealed" || b.window.bar.button.Visible() {
		t.Errorf("after the advice: verdict %q, button shown: %v", b.window.state.Verdict.Word, b.window.bar.button.Visible())
	}
	if focused, ok := b.canvas().Focused().(*ValueField); !ok || focused != b.field("power_w/cross") {
		t.Errorf("the focus is on %T, want the field that the advice changed", b.canvas().Focused())
	}
}

func TestSliderDragIsOneEdit(t *testing.T) {
	b := newBench(t, setup{})
	b.canvas().Focus(b.field(sheet))
	slider := b.window.column.rows[sheet].slider
	if !slider.Visible() {
		t.Fatal("the focused knob shows no slider")
	}
	left, right := slider.ends()
	at := func(part float32) fyne.PointEvent {
		return fyne.PointEvent{Position: fyne.NewPos(left+part*(right-left), 10)}
	}
	slider.MouseDown(&desktop.MouseEvent{PointEvent: at(0.1), Button: desktop.MouseButtonPrimary})
	for _, part := range []float32{0.2, 0.3, 0.5} {
		slider.Dragged(&fyne.DragEvent{PointEvent: at(part)})
	}
	slider.DragEnd()
	slider.MouseUp(nil)
	b.settle()
	f, _ := b.window.state.Field(sheet)
	if want := f.Min + 0.5*(f.Max-f.Min); f.Value < 0.97*want || f.Value > 1.03*want {
		t.Errorf("dragged to the middle: %g, want about %g", f.Value, want)
	}
	if b.window.state.Verdict.Word != "Open" {
		t.Errorf("the sheet at %s %s leaves the verdict %q, want Open", f.Text, f.Unit, b.window.state.Verdict.Word)
	}
	b.window.undo()
	b.settle()
	if b.window.state.Undo != "" || b.window.state.Dirty {
		t.Errorf("one undo leaves %q to undo", b.window.state.Undo)
	}
}

func TestStripExplains(t *testing.T) {
	b := newBench(t, setup{})
	page := b.ceilingPage()
	number := page.rows[0].margin
	b.press(number, fyne.KeySpace)
	if !b.window.strip.Visible() || b.window.strip.formula.Text == "" {
		t.Fatal("Space on a number opens no strip")
	}
	height := b.window.sheet.Size().Height
	b.window.key(&fyne.KeyEvent{Name: fyne.KeyEscape})
	if b.window.strip.Visible() || b.window.sheet.Size().Height <= height {
		t.Error("Escape does not shut the strip")
	}
	test.Tap(number)
	test.Tap(number)
	if b.window.strip.Visible() {
		t.Error("a second click does not shut the strip")
	}
	for _, topic := range page.stageTopics {
		if topic == "" {
			continue
		}
		if _, ok := b.window.desk.Explain(topic); !ok {
			t.Errorf("nothing explains %q", topic)
		}
	}
	for _, topic := range page.termIDs {
		if _, ok := b.window.desk.Explain(topic); !ok {
			t.Errorf("nothing explains %q", topic)
		}
	}
}

func TestEveryMenuItemHasAShortcut(t *testing.T) {
	b := newBench(t, setup{})
	seen := map[string]string{}
	var walk func(items []*fyne.MenuItem)
	walk = func(items []*fyne.MenuItem) {
		for _, item := range items {
			switch {
			case item.IsSeparator:
			case item.ChildMenu != nil:
				walk(item.ChildMenu.Items)
			case item.Shortcut == nil:
				t.Errorf("%q has no shortcut", item.Label)
			default:
				name := item.Shortcut.ShortcutName()
				if other, taken := seen[name]; taken {
					t.Errorf("%q and %q share the shortcut %s", other, item.Label, name)
				}
				seen[name] = item.Label
			}
		}
	}
	for _, menu := range b.window.menu.bar.Items {
		walk(menu.Items)
	}
	if len(seen) < 20 {
		t.Errorf("found %d items, want the whole menu", len(seen))
	}
}

func TestTextSizeAndColoursAreKept(t *testing.T) {
	folder := t.TempDir()
	w := &Window{app: test.NewApp(), folder: folder}
	if got := firstLook(Options{Folder: folder}); got != (look{FollowSystem, 1}) {
		t.Errorf("without a file: %+v", got)
	}
	if err := (look{Dark, 1.25}).keep(w.folder); err != nil {
		t.Fatal(err)
	}
	if got := firstLook(Options{Folder: folder}); got != (look{Dark, 1.25}) {
		t.Errorf("kept: %+v", got)
	}
	if got := firstLook(Options{Folder: folder, Variant: Light, TextScale: 2}); got != (look{Light, 2}) {
		t.Errorf("options do not go first: %+v", got)
	}
	if err := os.WriteFile(filepath.Join(folder, lookFile), []byte("{"), 0o600); err != nil {
		t.Fatal(err)
	}
	if got := firstLook(Options{Folder: folder}); got != (look{FollowSystem, 1}) {
		t.Errorf("with a broken file: %+v", got)
	}
}

func TestTextSizeChangesTheFold(t *testing.T) {
	b := newBench(t, setup{width: 1280, height: 768})
	for range 4 {
		b.item("Larger text").Action()
	}
	if b.window.metrics.Fold != drawerFold || b.window.look.Scale != 1.75 {
		t.Errorf("text at %g: fold %d, want the drawer", b.window.look.Scale, b.window.metrics.Fold)
	}
	b.item("Text at 100 %").Action()
	if b.window.metrics.Fold != fullFold {
		t.Errorf("text at %g: fold %d, want the full window", b.window.look.Scale, b.window.metrics.Fold)
	}
	b.checkLayout("after changes of the text size")
}

func TestOldStatesAreNotShown(t *testing.T) {
	b := newBench(t, setup{})
	old := b.window.state
	b.enter(depthX, "7.5")
	b.window.Show(old)
	if text, _, _, _ := b.knob(depthX); text != "7.5" {
		t.Error("an older state took the place of a newer one")
	}
}

func TestUnitIsChosen(t *testing.T) {
	b := newBench(t, setup{})
	b.canvas().Focus(b.field(sheet))
	_, before, _, _ := b.knob(sheet)
	b.item("Next unit").Action()
	text, unit, _, _ := b.knob(sheet)
	if unit == before || b.field(sheet).Unit == before {
		t.Errorf("the sheet still shows %s %s", text, unit)
	}
	if b.window.state.Dirty {
		t.Error("another unit changes the plan")
	}
}

// A failure of any length fits the bar, and all of it can be read.
func TestFailureIsTold(t *testing.T) {
	for _, look := range looks() {
		b := newBench(t, look)
		s := b.window.state
		s.Number++
		s.Fading, s.Unapplied = true, 2
		s.Failure = &session.Failure{
			Reason: "Bias field at 'flip': 402.5 G lies on a pole of the scattering length, where it has no value; the next field that can be judged is 402.6 G",
			Cure:   "Change the value, or undo.", Field: depthX, Details: []string{"/stages/1/field_g: on a pole"},
		}
		b.window.Show(s)
		b.keep("failure-" + look.String())
		if !b.window.bar.button.Visible() || b.window.bar.sentence.Visible() {
			t.Errorf("%s: the bar offers no way on", look)
		}
		bar := rectOf(fyne.Position{}, b.window.bar.Size())
		for _, o := range []fyne.CanvasObject{b.window.bar.fault, b.window.bar.unapplied, b.window.bar.button} {
			if out := rectOf(o.Position(), o.Size()).beyond(bar); out > layoutSlack {
				t.Errorf("%s: %T reaches out of the bar by %.1f", look, o, out)
			}
		}
		test.Tap(b.window.bar.button)
		b.keep("failure-told-" + look.String())
		for _, want := range []string{"Judge again", "Go to the value", "Close"} {
			if b.question()[want] == nil {
				t.Errorf("%s: the failure offers no %q", look, want)
			}
		}
	}
}

func TestWithoutAPlan(t *testing.T) {
	b := newBench(t, setup{})
	b.window.Show(session.State{Number: 1 << 60})
	if got := b.window.bar.word.Text; got != "No plan" {
		t.Errorf("without a plan the bar says %q", got)
	}
	b.keep("empty")
	b.checkLayout("without a plan")
}
