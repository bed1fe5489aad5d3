package gui

import (
	"slices"
	"testing"

	"fyne.io/fyne/v2/test"
)

func TestNumbersStandInTheMono(t *testing.T) {
	for word, want := range map[string]bool{
		"12.4": true, "(+12.4": true, "−984": true, "39K": true, "2zJ": true, "≤": true, "→": true, "∞": true, "|U|≤3": true,
		"trap": false, "'sheet'": false, "(F2)": false, "x,": false, "Hz": false, "trap_x": false, "": false, "ħ/J).": false,
	} {
		if got := needsMono(word); got != want {
			t.Errorf("%q in the mono: got %v, want %v", word, got, want)
		}
	}
}

func TestNumberAndUnitStayTogether(t *testing.T) {
	for text, want := range map[string][]string{
		"Lower to 31 mW to seal.":    {"Lower", "to", "31 mW", "to", "seal."},
		"(+12.4 Hz). Next":           {"(+12.4 Hz).", "Next"},
		"1 field not applied":        {"1", "field", "not", "applied"},
		"467, 467, 16.4 Hz":          {"467,", "467,", "16.4 Hz"},
		"2 Er Er":                    {"2 Er", "Er"},
		"U = −984 Hz, attractive":    {"U", "=", "−984 Hz,", "attractive"},
		"from 45 % to 50 %, then on": {"from", "45 %", "to", "50 %,", "then", "on"},
	} {
		if got := pieces(text); !slices.Equal(got, want) {
			t.Errorf("%q: got %q, want %q", text, got, want)
		}
	}
}

// The runs of a line are the line.
func TestRunsKeepTheText(t *testing.T) {
	p := NewProse("", textBody, 0)
	for _, line := range []string{"", "word", "12", "a 12 b 13 14 c", "12 a", "  a  12  "} {
		joined := ""
		for _, r := range runsOf(line, p.style) {
			joined += r.text
		}
		if joined != line {
			t.Errorf("%q: the runs are %q", line, joined)
		}
	}
}

func TestProseWraps(t *testing.T) {
	test.NewApp().Settings().SetTheme(NewTheme(Light, 1))
	p := NewProse("Raise depth x at 'lower': 2 → 4 Er, sealed", textBody, 0)
	for _, width := range []float32{60, 100, 150, 200, 1000} {
		for _, line := range p.wrap(width) {
			if got := p.lineWidth(line); got > width+slack && len(pieces(line)) > 1 {
				t.Errorf("width %g: line %q is %g wide", width, line, got)
			}
		}
	}
	one := NewProse(p.Text, textBody, 1)
	if lines := one.wrap(150); len(lines) != 1 || one.lineWidth(lines[0]) > 150 {
		t.Errorf("one line of 150: got %q", lines)
	}
}
