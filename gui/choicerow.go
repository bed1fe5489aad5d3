package gui

import (
	"slices"

	"fyne.io/fyne/v2"

	"hilltop/gui/session"
)

// choiceRow is a value of the plan that is one of a few words: a label over the
// words.
type choiceRow struct {
	*Column
	label *Prose
	words *Segmented
}

// newChoiceRow returns a row; chosen takes the word, key the keys that choose
// nothing.
func newChoiceRow(chosen func(word string), key func(*fyne.KeyEvent)) *choiceRow {
	r := &choiceRow{label: NewProse("", textBody, 1)}
	r.words = NewSegmented(func(i int) { chosen(r.words.Cells[i]) })
	r.words.OnKey = key
	r.Column = NewColumn(space4, 0, r.label, r.words)
	return r
}

// set shows a field.
func (r *choiceRow) set(f session.Field) {
	r.label.SetText(f.Label)
	r.words.Set(f.Choices, slices.Index(f.Choices, f.Text))
}
