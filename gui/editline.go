package gui

import (
	"strings"
	"unicode"
)

// editLine is one line of text under a cursor. The selection runs from the anchor
// to the cursor; both count runes and lie in 0 to the length.
type editLine struct {
	text           []rune
	cursor, anchor int
}

func (e *editLine) String() string { return string(e.text) }

// set replaces the text and puts the cursor behind it.
func (e *editLine) set(text string) {
	e.text = []rune(oneLine(text))
	e.cursor = len(e.text)
	e.anchor = e.cursor
}

// oneLine turns every control character, such as a pasted newline, into a space.
func oneLine(text string) string {
	return strings.Map(func(r rune) rune {
		if unicode.IsControl(r) {
			return ' '
		}
		return r
	}, text)
}

// selection returns the selected stretch, low <= high.
func (e *editLine) selection() (low, high int) {
	return min(e.anchor, e.cursor), max(e.anchor, e.cursor)
}

func (e *editLine) selected() string {
	low, high := e.selection()
	return string(e.text[low:high])
}

func (e *editLine) selectAll() { e.anchor, e.cursor = 0, len(e.text) }

// insert puts text in place of the selection.
func (e *editLine) insert(text string) {
	low, high := e.selection()
	added := []rune(oneLine(text))
	e.text = append(append(append([]rune{}, e.text[:low]...), added...), e.text[high:]...)
	e.cursor = low + len(added)
	e.anchor = e.cursor
}

// erase deletes the selection, or else the rune before (-1) or behind (+1) the
// cursor.
func (e *editLine) erase(direction int) {
	if e.anchor == e.cursor {
		e.cursor = e.inside(e.cursor + direction)
	}
	e.insert("")
}

// moveTo puts the cursor at a place, drawing the selection along where extend is
// set.
func (e *editLine) moveTo(place int, extend extendSelection) {
	e.cursor = e.inside(place)
	if !extend {
		e.anchor = e.cursor
	}
}

// extendSelection says that a movement keeps the anchor.
type extendSelection bool

// step moves by one rune; without extend a selection first collapses to the end on
// that side.
func (e *editLine) step(direction int, extend extendSelection) {
	low, high := e.selection()
	switch {
	case bool(extend) || low == high:
		e.moveTo(e.cursor+direction, extend)
	case direction < 0:
		e.moveTo(low, false)
	default:
		e.moveTo(high, false)
	}
}

// selectWord selects the word at a place.
func (e *editLine) selectWord(place int) {
	place = e.inside(place)
	low, high := place, place
	for low > 0 && !unicode.IsSpace(e.text[low-1]) {
		low--
	}
	for high < len(e.text) && !unicode.IsSpace(e.text[high]) {
		high++
	}
	e.anchor, e.cursor = low, high
}

func (e *editLine) inside(place int) int { return min(max(place, 0), len(e.text)) }
