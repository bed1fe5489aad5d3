package gui

import (
	"fyne.io/fyne/v2"

	"hilltop/gui/session"
)

// newRow makes the row of one field and ties its parts to the session.
func (k *KnobColumn) newRow(id string) *KnobRow {
	var row *KnobRow
	field := NewValueField(FieldEvents{
		Changed: func(text string) { k.typed(row, id, text) },
		Commit:  func(text string) { k.did(k.desk.Commit(id, text)) },
		Restore: func() { k.desk.Revert(id); k.On.Echo() },
		Clear:   func() { row.field.Drop(); k.did(k.desk.Clear(id)) },
		Step:    func(n int, size session.StepSize) { k.did(k.desk.Step(id, n, size)) },
		Focus:   func(focused bool) { k.focused(row, id, focused) },
		Leave:   k.On.Leave,
		Menu:    func(at fyne.Position) { k.menu(id, at) },
		Scroll:  k.scroller.Scrolled,
		Key:     k.On.Key,
	})
	label := NewKnobLabel(field.takeFocus, func() { row.field.Drop(); k.did(k.desk.Reset(id)) }, func(at fyne.Position) { k.menu(id, at) })
	slider := NewKnobSlider(SliderEvents{
		Begin: func() { k.desk.BeginDrag(id) },
		Drag:  func(value float64) { k.desk.Drag(value); k.On.Echo() },
		End:   func() { k.desk.EndDrag(); k.On.Echo(); field.takeFocus() },
	})
	row = NewKnobRow(label, field, slider)
	return row
}

// newChoice makes the row of a field of a few words.
func (k *KnobColumn) newChoice(id string) *choiceRow {
	var row *choiceRow
	row = newChoiceRow(choiceEvents{
		Chosen: func(word string) { k.did(k.desk.Commit(id, word)) },
		Reset:  func() { k.did(k.desk.Reset(id)) },
		Focus:  func() { k.reached(row, id) },
		Menu:   func(at fyne.Position) { k.menu(id, at) },
		Key:    k.On.Key,
	})
	return row
}

// did shows what became of an action.
func (k *KnobColumn) did(err error) {
	k.On.Echo()
	k.On.Failed(err)
}

// typed shows what the text in a field means.
func (k *KnobColumn) typed(row *KnobRow, id, text string) {
	row.SetNote(k.desk.Preview(id, text).Text)
	k.scroller.Fit()
	k.scroller.Reveal(row)
}

// focused tells that a row has got the focus, or has lost it.
func (k *KnobColumn) focused(row *KnobRow, id string, focused bool) {
	if focused {
		k.reached(row, id)
	}
}

// reached opens the slider of the field that gets the focus. It stays open until
// another field does.
func (k *KnobColumn) reached(row fyne.CanvasObject, id string) {
	if k.atHand != id {
		k.atHand = id
		k.desk.Focus(id)
		k.On.Echo()
	}
	k.scroller.Reveal(row)
}

func (k *KnobColumn) menu(id string, at fyne.Position) {
	state := k.desk.State()
	if f, ok := state.Field(id); ok {
		k.On.Menu(f, at)
	}
}
