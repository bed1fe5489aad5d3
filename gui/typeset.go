package gui

import (
	"strings"
	"unicode"
	"unicode/utf8"

	"fyne.io/fyne/v2"
)

// sansLacks are the signs that we use and the built-in sans does not have.
const sansLacks = "−∞≤≥→←≈√∏∂∑∫⟨⟩"

// needsMono reports whether a word is a number, with or without a mark before it,
// or has a sign that the built-in sans lacks.
func needsMono(word string) bool {
	if strings.ContainsAny(word, sansLacks) {
		return true
	}
	for _, r := range word {
		if unicode.IsDigit(r) {
			return true
		}
		if unicode.IsLetter(r) || r == '\'' {
			return false
		}
	}
	return false
}

// measure returns the size of a text and how far below its top the baseline is.
func measure(text string, size float32, style fyne.TextStyle) (fyne.Size, float32) {
	return fyne.CurrentApp().Driver().RenderedTextSize(text, size, style, nil)
}

// run is a stretch of a line in one font.
type run struct {
	text  string
	style fyne.TextStyle
}

// runsOf splits a line where the font changes. The space between two runs stands in
// the sans, where it is narrower.
func runsOf(line string, styleOf func(word string) fyne.TextStyle) []run {
	var list []run
	for i, word := range strings.Split(line, " ") {
		style := styleOf(word)
		n := len(list)
		switch {
		case i == 0:
			list = append(list, run{word, style})
		case list[n-1].style == style:
			list[n-1].text += " " + word
		case style.Monospace:
			list[n-1].text += " "
			list = append(list, run{word, style})
		default:
			list = append(list, run{" " + word, style})
		}
	}
	return list
}

// pieces splits a text at its spaces, but keeps a number and its unit together.
func pieces(text string) []string {
	var list []string
	number := false
	for _, word := range strings.Split(text, " ") {
		if number && isUnit(word) {
			list[len(list)-1] += " " + word
			number = false
			continue
		}
		list = append(list, word)
		last, _ := utf8.DecodeLastRuneInString(word)
		number = unicode.IsDigit(last)
	}
	return list
}

// isUnit reports whether a word, without the marks around it, is a unit.
func isUnit(word string) bool {
	switch strings.Trim(word, ".,;:()") {
	case "Hz", "kHz", "MHz", "Er", "W", "mW", "µW", "kW", "G", "mG", "T", "mT", "ms", "s", "µs",
		"nm", "µm", "mm", "a0", "nK", "µK", "kB", "ħ/J", "%", "Hz/site²":
		return true
	}
	return false
}
