package gui

import (
	"slices"
	"strconv"
	"strings"
	"testing"

	"fyne.io/fyne/v2"

	"hilltop/gui/session"
)

// nonsense is what no number field takes; a newline can only be pasted.
var nonsense = []struct{ name, text, says string }{
	{"nothing", "", "empty"},
	{"letters", "letters", "does not begin with a number"},
	{"another unit", "5 kg", "is a mass"},
	{"an unknown unit", "5 furlongs", "unknown unit"},
	{"too large", "1e400", "too large"},
	{"not a number", "NaN", "is not a number"},
	{"infinity", "∞", "not finite"},
	{"pasted lines", "7\n8", "two numbers"},
	{"an ambiguous comma", "1,200", "two ways"},
	{"mixed marks", "1.234,5", "mixes marks"},
	{"a bare J", "5 J", ""},
	{"an open product", "2*", "ends where"},
}

// replace puts a text in place of what stands in a field, by pasting it, and
// commits it.
func (b *bench) replace(id, text string) *ValueField {
	b.Helper()
	b.window.reveal(id)
	f := b.field(id)
	f.TypedShortcut(&fyne.ShortcutSelectAll{})
	b.app.Clipboard().SetContent(text)
	f.TypedShortcut(&fyne.ShortcutPaste{Clipboard: b.app.Clipboard()})
	b.press(f, fyne.KeyReturn)
	return f
}

// Every number field of the demo and of the model refuses nonsense with a reason,
// keeps it as typed, and leaves the plan alone.
func TestEveryNumberRefusesNonsense(t *testing.T) {
	b := newBench(t, setup{})
	for _, plan := range []string{DemoPlan, "model-chain"} {
		b.present(plan)
		first := b.window.state.Plan
		for _, id := range b.ids() {
			if f, _ := b.window.state.Field(id); f.Kind != session.NumberField {
				continue
			}
			for _, tc := range nonsense {
				f := b.replace(id, tc.text)
				typed := oneLine(tc.text)
				_, _, pending, reason := b.knob(id)
				if reason == "" || !strings.Contains(reason, tc.says) {
					t.Errorf("%s: %s, %q: the reason is %q, want %q in it", id, tc.name, tc.text, reason, tc.says)
				}
				if pending != typed || f.Text() != typed || !f.Refused || !b.window.column.rows[id].fault.Visible() {
					t.Errorf("%s: %s, %q: pending %q, the field shows %q, refused %v", id, tc.name, tc.text, pending, f.Text(), f.Refused)
				}
			}
			b.window.undo()
			if f := b.field(id); f.Refused || f.Edited() {
				t.Errorf("%s: undo leaves %q in the field", id, f.Text())
			}
		}
		if b.window.state.Plan != first || b.window.state.Undo != "" {
			t.Errorf("%s: nonsense changed the plan: %s", plan, b.window.state.Undo)
		}
	}
}

// present opens a template.
func (b *bench) present(template string) {
	b.Helper()
	if err := b.window.desk.NewFrom(template); err != nil {
		b.Fatal(err)
	}
	b.window.did(nil)
	b.settle()
}

// Every number field takes half of its value with a decimal comma, and undo brings
// the value back. Whole numbers say that they are.
func TestEveryNumberTakesADecimalComma(t *testing.T) {
	b := newBench(t, setup{})
	for _, plan := range []string{DemoPlan, "model-chain"} {
		b.present(plan)
		for _, id := range b.ids() {
			before, _ := b.window.state.Field(id)
			if before.Kind != session.NumberField {
				continue
			}
			want := before.Value / 2
			if want == 0 {
				want = 0.5
			}
			whole := strings.HasSuffix(id, "atoms") || strings.HasPrefix(id, "/model/sites")
			if whole {
				want += 0.5
			}
			text := strconv.FormatFloat(want, 'f', -1, 64)
			if !strings.Contains(text, ".") {
				text += ".0"
			}
			b.replace(id, strings.Replace(text, ".", ",", 1))
			after, _ := b.window.state.Field(id)
			switch {
			case whole && !strings.Contains(after.Reason, "no whole number"):
				t.Errorf("%s: %q is taken as %s; the reason is %q", id, text, after.Text, after.Reason)
			case !whole && (after.Reason != "" || after.Value < 0.999999*want || after.Value > 1.000001*want) && want > 0:
				t.Errorf("%s: %q with a comma: got %s, reason %q", id, text, after.Text, after.Reason)
			}
			b.window.undo()
			if again, _ := b.window.state.Field(id); again.Text != before.Text || again.Reason != "" {
				t.Errorf("%s: undo leaves %s, want %s", id, again.Text, before.Text)
			}
		}
	}
}

// Texts take everything but what the plan refuses: names that are empty or taken,
// and lists that are none. Pasted lines become one.
func TestEveryTextField(t *testing.T) {
	b := newBench(t, setup{})
	refuses := map[string][]string{
		"/stages/3/name": {"", "load"},
		"/beams/0/name":  {"", "cross"},
		"/beams/1/name":  {""},
		"/model/fock":    {"letters", "1e400", "NaN", "1,200", "5 kg", "7\n8"},
	}
	seen := 0
	for _, plan := range []string{DemoPlan, "model-chain"} {
		b.present(plan)
		for _, id := range b.ids() {
			before, _ := b.window.state.Field(id)
			if before.Kind != session.TextField {
				continue
			}
			seen++
			for _, text := range []string{"", "letters", "5 kg", "1e400", "NaN", "7\n8", "1,200", "load", "cross", "\"\\ <b> µ −"} {
				refused := slices.Contains(refuses[id], text) || id == "/model/fock" && text != ""
				b.replace(id, text)
				after, _ := b.window.state.Field(id)
				if (after.Reason != "") != refused || !refused && after.Text != oneLine(text) {
					t.Errorf("%s: %q gives %q, reason %q, want it refused: %v", id, text, after.Text, after.Reason, refused)
				}
				if again, _ := b.window.state.Field(id); again.Text != before.Text || again.Reason != "" {
					b.window.undo()
				}
				if again, _ := b.window.state.Field(id); again.Text != before.Text {
					t.Fatalf("%s: undo leaves %q, want %q", id, again.Text, before.Text)
				}
			}
		}
	}
	if seen < 8 {
		t.Errorf("found %d texts, want all of both plans", seen)
	}
}

// Letters that are typed at a choice choose nothing.
func TestChoicesIgnoreLetters(t *testing.T) {
	b := newBench(t, setup{})
	b.present(DemoPlan)
	for _, id := range b.ids() {
		f, _ := b.window.state.Field(id)
		if f.Kind != session.ChoiceField {
			continue
		}
		b.window.reveal(id)
		words := b.window.column.choices[id].words
		for _, r := range "y1e400" {
			words.TypedRune(r)
		}
		if b.window.state.Undo != "" {
			t.Fatalf("%s: letters changed the plan: %s", id, b.window.state.Undo)
		}
	}
}
