package gui

import (
	"strings"

	"hilltop/gui/session"
)

// criterionNames are the names of criteria as they stand on the screen.
var criterionNames = map[string]string{
	"interaction": "Interaction",
	"trap_x":      "Trap along x",
	"trap_y":      "Trap along y",
	"trap_z":      "Trap along z",
	"tilt":        "Tilt",
	"one_band":    "One band suffices",
	"layers":      "Layers keep apart",
	"held":        "Cloud is held",
	"edge":        "Edge of the beams",
	"energy":      "Above infinite T",
	"lifetime":    "Lifetime",
	"kinetic":     "Kinetic",
	"total":       "Total",
}

// screenName is a name of the report as it stands on the screen.
func screenName(name string) string {
	if words, ok := criterionNames[name]; ok {
		return words
	}
	return strings.ReplaceAll(name, "_", " ")
}

// unitNames are the units of margins that have a printed form of their own.
var unitNames = map[string]string{"Hz/site2": "Hz/site²", "": ""}

// quantity is a number with its sign and unit. Digits are lost before the unit.
func quantity(v float64, unit string) string {
	text := session.Digits(v, 4)
	if v > 0 {
		text = "+" + text
	}
	if printed, ok := unitNames[unit]; ok {
		unit = printed
	}
	return strings.TrimSpace(text + " " + unit)
}

// minusSigns puts a true minus sign before every number of a text that has a
// hyphen there, and prints its units.
func minusSigns(text string) string {
	text = strings.ReplaceAll(text, "Hz/site2", unitNames["Hz/site2"])
	var b strings.Builder
	previous := ' '
	runes := []rune(text)
	for i, r := range runes {
		if r == '-' && i+1 < len(runes) && runes[i+1] >= '0' && runes[i+1] <= '9' && strings.ContainsRune(" (=", previous) {
			r = '−'
		}
		b.WriteRune(r)
		previous = r
	}
	return b.String()
}
