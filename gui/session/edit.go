package session

import (
	"errors"
	"fmt"
	"slices"
	"strings"
	"time"

	"hilltop/bosehubbard/plan"
)

// ErrNoField says that there is no field with an ID, or no document.
var ErrNoField = errors.New("session: no such field")

// stepRun joins the steps of a key that is held into one edit.
type stepRun struct {
	field    string
	base     *plan.Document
	last     time.Time
	recorded bool // it has an entry in the history
}

// SelectStage chooses the stage that the knobs show and set; StartStage is the
// start.
func (s *Session) SelectStage(stage int) {
	s.mu.Lock()
	defer s.mu.Unlock()
	if s.doc == nil || stage < StartStage || stage >= len(s.doc.now.Plan().Stages) || stage == s.stage {
		return
	}
	s.endDrag(false)
	s.stage = stage
	s.run = stepRun{}
	s.afterEdit("")
	s.changed(urgent)
}

// Focus says which field has the keyboard, "" for none. For a knob the verdict
// along its slider is computed.
func (s *Session) Focus(id string) {
	s.mu.Lock()
	defer s.mu.Unlock()
	if id == s.focus {
		return
	}
	s.focus = id
	s.run = stepRun{}
	s.work.preview = previewTrial{}
	e, _ := s.entry(id)
	s.startTrack(e)
	s.changed(urgent)
}

// SetUnit chooses the unit a field is shown in. Units that it does not take are
// ignored.
func (s *Session) SetUnit(id, unit string) {
	s.mu.Lock()
	defer s.mu.Unlock()
	e, ok := s.entry(id)
	if !ok || e.measure.size(unit) == nil {
		return
	}
	s.units[id] = unit
	if id == s.focus {
		e, _ = s.entry(id)
		s.startTrack(e)
	}
	s.changed(urgent)
}

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

// Step moves the number of a field by n units of its last shown digit, a tenth or
// ten of them. Steps that follow within a second are one edit.
func (s *Session) Step(id string, n int, size StepSize) error {
	s.mu.Lock()
	defer s.mu.Unlock()
	e, ok := s.entry(id)
	if !ok {
		return ErrNoField
	}
	if e.Kind != NumberField || s.drag != nil {
		return nil
	}
	q, err := e.measure.Parse(StepText(e.Text, n, size), e.Unit)
	if err != nil {
		return s.inputError(e, e.Text, err)
	}
	joined := s.run.field == id && time.Since(s.run.last) < stepPause
	base := s.doc.now
	if joined {
		base = s.run.base
	}
	next, err := base.Apply(e.edits(q.Value)...)
	if err != nil {
		return s.inputError(e, e.measure.Format(q.Value, e.Unit), err)
	}
	before := e
	if joined {
		before.value = s.valueIn(base, e)
	}
	if joined && s.run.recorded {
		s.doc.undo = s.doc.undo[:len(s.doc.undo)-1]
	}
	recorded := s.record(s.editName(before, q.Value, e.Unit), id, base, next)
	s.run = stepRun{field: id, base: base, last: time.Now(), recorded: recorded}
	s.afterEdit(id)
	s.changed(patient)
	return nil
}

// valueIn returns the value of an entry in another document.
func (s *Session) valueIn(doc *plan.Document, e entry) float64 {
	value := e.value
	s.catalogueOf(doc.Plan(), s.stage).all(func(o *entry) {
		if o.ID == e.ID {
			value = o.value
		}
	})
	return value
}

// Edit changes any value of the plan under a name for the history; path is RFC
// 6901, and a nil value removes what is there.
//
// It returns the errors of plan.Document.With; the plan then stays as it is.
func (s *Session) Edit(name, path string, value any) error {
	return s.EditAll(name, plan.Edit{Path: path, Value: value})
}

// EditAll makes several changes as one entry of the history.
func (s *Session) EditAll(name string, edits ...plan.Edit) error {
	s.mu.Lock()
	defer s.mu.Unlock()
	if s.doc == nil {
		return ErrNoField
	}
	s.endDrag(false)
	before := s.doc.now
	next, err := before.Apply(edits...)
	if err != nil {
		return err
	}
	s.run = stepRun{}
	field := ""
	if len(edits) > 0 {
		field = s.fieldAt(edits[0].Path)
	}
	s.record(name, field, before, next)
	s.afterEdit(field)
	s.changed(urgent)
	return nil
}

// Apply makes the change of an advice and selects the stage it changes.
func (s *Session) Apply(a Advice) error {
	if len(a.Set) == 0 {
		return nil
	}
	if err := s.EditAll(a.Text, editsOf(a.Set)...); err != nil {
		return err
	}
	s.mu.Lock()
	defer s.mu.Unlock()
	s.touched = knobAt(a.Set[0].Path)
	if stage, ok := stageOf(a.Set[0].Path); ok && s.doc != nil && stage < len(s.doc.now.Plan().Stages) {
		s.stage = stage
	}
	s.changed(urgent)
	return nil
}

// pend keeps an uncommitted text; unpend drops it. The caller holds mu.
func (s *Session) pend(field, text, reason string) {
	s.unpend(field)
	s.pending = append(s.pending, pendingText{field, s.stage, text, reason})
}

func (s *Session) unpend(field string) {
	s.pending = slices.DeleteFunc(s.pending, func(p pendingText) bool { return p.field == field && p.stage == s.stage })
}

// afterEdit brings what hangs on the plan up to date after an edit of a field, or,
// where field is "", of something else. The track of the edited knob stays: it
// does not depend on where the knob stands. The caller holds mu.
func (s *Session) afterEdit(field string) {
	s.touched = field
	s.work.preview = previewTrial{}
	if s.focus == "" {
		return
	}
	e, _ := s.entry(s.focus)
	t := s.work.track.track
	old := s.work.track.entry
	if field == s.focus && t != nil && old.SetPath == e.SetPath && t.Min == e.Min && t.Max == e.Max && t.Unit == e.Unit {
		return
	}
	s.startTrack(e)
}
