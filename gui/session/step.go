package session

import (
	"time"

	"hilltop/bosehubbard/plan"
)

// stepRun joins the steps of a key that is held into one edit.
type stepRun struct {
	field    string
	base     *plan.Document
	last     time.Time
	recorded bool // it has an entry in the history
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
