package gui

import (
	"math/rand/v2"
	"testing"
)

func TestEditLine(t *testing.T) {
	for _, tc := range []struct {
		name string
		do   func(e *editLine)
		want string
	}{
		{"type at end", func(e *editLine) { e.insert("5") }, "12.55"},
		{"backspace", func(e *editLine) { e.erase(-1) }, "12."},
		{"delete at end", func(e *editLine) { e.erase(+1) }, "12.5"},
		{"delete at start", func(e *editLine) { e.moveTo(0, false); e.erase(+1) }, "2.5"},
		{"replace all", func(e *editLine) { e.selectAll(); e.insert("−3") }, "−3"},
		{"erase selection", func(e *editLine) { e.moveTo(1, false); e.moveTo(3, true); e.erase(-1) }, "15"},
		{"paste newline", func(e *editLine) { e.insert("\n1\t2") }, "12.5 1 2"},
		{"step collapses left", func(e *editLine) { e.selectAll(); e.step(-1, false); e.insert("9") }, "912.5"},
		{"step collapses right", func(e *editLine) { e.selectAll(); e.step(+1, false); e.insert("9") }, "12.59"},
		{"extend by step", func(e *editLine) { e.step(-1, true); e.insert("9") }, "12.9"},
	} {
		e := &editLine{}
		e.set("12.5")
		tc.do(e)
		if got := e.String(); got != tc.want {
			t.Errorf("%s: got %q, want %q", tc.name, got, tc.want)
		}
	}
}

func TestEditLineSelectsWord(t *testing.T) {
	e := &editLine{}
	e.set("2*1.3 mW")
	for _, tc := range []struct {
		place int
		want  string
	}{{0, "2*1.3"}, {4, "2*1.3"}, {7, "mW"}, {99, "mW"}} {
		e.selectWord(tc.place)
		if got := e.selected(); got != tc.want {
			t.Errorf("word at %d: got %q, want %q", tc.place, got, tc.want)
		}
	}
}

// Random actions never leave the cursor or the anchor outside the text.
func TestEditLineStaysInside(t *testing.T) {
	rng := rand.New(rand.NewPCG(1, 2))
	e := &editLine{}
	for range 5000 {
		switch rng.IntN(7) {
		case 0:
			e.insert(string(rune('0' + rng.IntN(10))))
		case 1:
			e.erase(2*rng.IntN(2) - 1)
		case 2:
			e.moveTo(rng.IntN(20)-5, extendSelection(rng.IntN(2) == 0))
		case 3:
			e.step(2*rng.IntN(2)-1, extendSelection(rng.IntN(2) == 0))
		case 4:
			e.selectWord(rng.IntN(20) - 5)
		case 5:
			e.selectAll()
		case 6:
			e.set("−1.5 G")
		}
		if n := len(e.text); e.cursor < 0 || e.cursor > n || e.anchor < 0 || e.anchor > n {
			t.Fatalf("cursor %d, anchor %d outside a text of %d runes", e.cursor, e.anchor, n)
		}
	}
}
