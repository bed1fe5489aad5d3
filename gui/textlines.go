package gui

import "unicode"

// stretchOfText is one line of a wrapped text: its runes from low up to high.
type stretchOfText struct{ low, high int }

// wrapRunes breaks a text into lines of at most the given number of runes, behind
// spaces where it can. Every rune stands on one line; there is at least one line.
func wrapRunes(text []rune, most int) []stretchOfText {
	most = max(most, 1)
	var lines []stretchOfText
	low := 0
	for len(text)-low > most {
		high := low + most
		for cut := high; cut > low; cut-- {
			if unicode.IsSpace(text[cut-1]) {
				high = cut
				break
			}
		}
		lines = append(lines, stretchOfText{low, high})
		low = high
	}
	return append(lines, stretchOfText{low, len(text)})
}

// lineOf returns the line that a place between two runes is drawn on: the later one
// of two that meet there.
func lineOf(lines []stretchOfText, place int) int {
	for i, line := range lines {
		if place < line.high {
			return i
		}
	}
	return len(lines) - 1
}

// lines are those of the field: one for a number, as many as it takes for a long
// text.
func (f *ValueField) lines(width float32) []stretchOfText {
	return wrapRunes(f.line.text, int((width-2*px(fieldInset))/f.runeWidth()))
}

// lineHeight is that of one line of a long text.
func (f *ValueField) lineHeight() float32 {
	size, _ := measure("0", px(textBody), monospace)
	return size.Height
}

// HeightFor is the height in a width: that of a row, or of all lines of a long text.
func (f *ValueField) HeightFor(width float32) float32 {
	if !f.Long {
		return px(rowHeight)
	}
	return max(px(rowHeight), float32(len(f.lines(width)))*f.lineHeight()+px(longInset)*2)
}

// moveLine moves the cursor of a long text up or down.
func (f *ValueField) moveLine(by int, extend extendSelection) {
	lines := f.lines(f.Size().Width)
	at := lineOf(lines, f.line.cursor)
	to := at + by
	if to < 0 || to >= len(lines) {
		return
	}
	f.line.moveTo(lastOf(lines, to, f.line.cursor-lines[at].low), extend)
}

// lastOf is the place in a column of a line, or the last one that is drawn on it.
func lastOf(lines []stretchOfText, i, column int) int {
	last := lines[i].high
	if i < len(lines)-1 {
		last-- // behind it the next line begins
	}
	return min(max(lines[i].low+column, lines[i].low), last)
}
