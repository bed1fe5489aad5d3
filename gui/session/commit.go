package session

import (
	"errors"
	"fmt"
	"strings"

	"hilltop/bosehubbard/plan"
)

// Preview says what a text that stands in a field means, and keeps it as
// uncommitted. The verdict follows in State.Preview.
func (s *Session) Preview(id, text string) PreviewResult {
	s.mu.Lock()
	defer s.mu.Unlock()
	e, ok := s.entry(id)
	if !ok {
		return PreviewResult{Err: ErrNoField}
	}
	s.work.preview = previewTrial{}
	s.unpend(id)
	s.changed(patient)
	if text == e.Text {
		return PreviewResult{Value: e.value, Unit: e.Unit}
	}
	s.pend(id, text, "")
	value, unit, edits, err := s.read(e, text)
	if err != nil {
		return PreviewResult{Err: err}
	}
	result := PreviewResult{Unit: unit}
	if e.Kind == NumberField {
		result.Value = value.(float64)
		result.Text = "= " + e.measure.Format(result.Value, unit)
	}
	next, err := s.doc.now.Apply(edits...)
	if err != nil {
		result.Err = s.inputError(e, typedAs(e, text, unit), err)
		return result
	}
	s.work.preview = previewTrial{shown: &Preview{Field: id, Text: result.Text}, next: next}
	wake(s.wakes.judge)
	return result
}

// read turns the text of a field into a value for the document and the edits that
// set it.
func (s *Session) read(e entry, text string) (value any, unit string, edits []plan.Edit, err error) {
	switch {
	case e.Kind == NumberField:
		q, parseErr := e.measure.Parse(text, e.Unit)
		if parseErr != nil {
			return nil, "", nil, s.inputError(e, text, parseErr)
		}
		value, unit = q.Value, q.Unit
	case strings.ContainsAny(text, "\r\n"):
		return nil, "", nil, s.inputError(e, text, errors.New("more than one line; give one"))
	case e.encode != nil:
		if value, err = e.encode(text); err != nil {
			return nil, "", nil, s.inputError(e, text, fmt.Errorf("%s %w", shorten(text), err))
		}
	default:
		value = text
	}
	return value, unit, e.edits(value), nil
}

// typedAs repeats a typed number with the unit it was read in.
func typedAs(e entry, text, unit string) string {
	if q, err := e.measure.Parse(text, e.Unit); err == nil && e.Kind == NumberField {
		return e.measure.Format(q.Value, unit)
	}
	return shorten(strings.TrimSpace(text))
}

// Commit puts the text of a field into the plan; a typed unit stays the shown one.
// A text that is as shown changes nothing.
//
// It returns an *InputError, and keeps the text as uncommitted with its reason, if
// the text is refused.
func (s *Session) Commit(id, text string) error {
	s.mu.Lock()
	defer s.mu.Unlock()
	e, ok := s.entry(id)
	if !ok {
		return ErrNoField
	}
	s.endDrag(false)
	s.work.preview = previewTrial{}
	s.unpend(id)
	s.changed(urgent)
	if text == e.Text {
		return nil
	}
	value, unit, edits, err := s.read(e, text)
	if err == nil {
		err = s.commit(e, value, unit, typedAs(e, text, unit), edits)
	}
	if err != nil {
		s.pend(id, text, err.Error())
	}
	return err
}

// commit makes edits of one field. The caller holds mu.
func (s *Session) commit(e entry, value any, unit, typed string, edits []plan.Edit) error {
	before := s.doc.now
	next, err := before.Apply(edits...)
	if err != nil {
		return s.inputError(e, typed, err)
	}
	if e.Kind == NumberField {
		s.units[e.ID] = unit
	}
	if value == e.value && !e.Inherited && e.Kind == NumberField {
		return nil
	}
	s.run = stepRun{}
	s.record(s.editName(e, value, unit), e.ID, before, next)
	s.afterEdit(e.ID)
	return nil
}

// editName is the name in the history: "Depth x at 'lower': 22 → 6.1 Er".
func (s *Session) editName(e entry, value any, unit string) string {
	if x, ok := value.(float64); ok && e.Kind == NumberField {
		return s.placeOf(e.ID) + ": " + e.measure.FormatNumber(e.value, unit) + " → " + e.measure.Format(x, unit)
	}
	if value == nil {
		return s.placeOf(e.ID) + ": none"
	}
	return s.placeOf(e.ID) + ": " + shorten(fmt.Sprint(value))
}

// Revert drops the uncommitted text of a field.
func (s *Session) Revert(id string) {
	s.mu.Lock()
	defer s.mu.Unlock()
	s.work.preview = previewTrial{}
	s.unpend(id)
	s.changed(urgent)
}

// Clear removes the value from the selected stage, so that it is inherited again.
// A field that cannot be cleared stays as it is.
func (s *Session) Clear(id string) error {
	s.mu.Lock()
	defer s.mu.Unlock()
	e, ok := s.entry(id)
	if !ok {
		return ErrNoField
	}
	s.endDrag(false)
	s.unpend(id)
	s.changed(urgent)
	if !e.Clearable {
		return nil
	}
	before := s.doc.now
	next, err := before.Apply(e.clear...)
	if err != nil {
		return s.inputError(e, "inherited", err)
	}
	s.run = stepRun{}
	s.record(s.placeOf(id)+": inherited", id, before, next)
	s.afterEdit(id)
	return nil
}

// Reset gives a field the value it has in the file, or in the template.
func (s *Session) Reset(id string) error {
	s.mu.Lock()
	defer s.mu.Unlock()
	e, ok := s.entry(id)
	if !ok {
		return ErrNoField
	}
	s.endDrag(false)
	s.unpend(id)
	s.changed(urgent)
	saved, err := plan.Open(s.doc.saved)
	if err != nil {
		return nil
	}
	var old *entry
	s.catalogueOf(saved.Plan(), min(s.stage, len(saved.Plan().Stages)-1)).all(func(o *entry) {
		if o.ID == id {
			old = o
		}
	})
	switch {
	case old == nil:
		return nil
	case old.Inherited && e.Clearable:
		return s.commit(e, old.value, e.Unit, "the saved value", e.clear)
	case e.Kind == NumberField && old.value != e.value:
		return s.commit(e, old.value, e.Unit, "the saved value", e.edits(old.value))
	case e.Kind != NumberField && old.Text != e.Text:
		return s.commit(e, old.Text, "", old.Text, e.edits(old.Text))
	}
	return nil
}
