package session

import (
	"math"

	"hilltop/bosehubbard/plan"
)

// drag is a slider under the hand. All its steps are one entry of the history.
type drag struct {
	entry entry
	base  *plan.Document // the plan when the hand took hold
	value float64        // in the unit of the document
}

// BeginDrag takes hold of a field's slider.
func (s *Session) BeginDrag(id string) {
	s.mu.Lock()
	defer s.mu.Unlock()
	s.endDrag(false)
	e, ok := s.entry(id)
	if !ok || e.Kind != NumberField {
		return
	}
	s.work.preview = previewTrial{}
	s.unpend(id)
	s.run = stepRun{}
	s.drag = &drag{entry: e, base: s.doc.now, value: e.value}
	s.changed(patient)
}

// Drag moves the slider to a value in the shown unit, rounded to a thousandth of
// its range. A value that the plan refuses is left out.
func (s *Session) Drag(value float64) {
	s.mu.Lock()
	defer s.mu.Unlock()
	d := s.drag
	if d == nil || math.IsNaN(value) || math.IsInf(value, 0) {
		return
	}
	e := d.entry
	if e.Slider {
		value = roundTo(min(max(value, e.Min), e.Max), (e.Max-e.Min)/1000)
	}
	q, err := e.measure.Parse(shortest(value), e.Unit)
	if err != nil {
		return
	}
	next, err := d.base.Apply(e.edits(q.Value)...)
	if err != nil {
		return
	}
	d.value = q.Value
	s.move(next)
}

// EndDrag lets go; the plan keeps the last value as one edit.
func (s *Session) EndDrag() {
	s.mu.Lock()
	defer s.mu.Unlock()
	s.endDrag(false)
}

// CancelDrag lets go; the plan is as it was before the drag.
func (s *Session) CancelDrag() {
	s.mu.Lock()
	defer s.mu.Unlock()
	s.endDrag(true)
}

// endDrag ends a drag if there is one. The caller holds mu.
func (s *Session) endDrag(cancel bool) {
	d := s.drag
	if d == nil {
		return
	}
	s.drag = nil
	last := s.doc.now
	switch {
	case cancel:
		s.move(d.base)
	case last != d.base:
		s.record(s.editName(d.entry, d.value, d.entry.Unit), d.entry.ID, d.base, last)
	}
	s.afterEdit(d.entry.ID)
	if s.work.reported == s.work.version {
		s.startAdvice()
	}
	wake(s.wakes.judge)
	s.changed(urgent)
}

// roundTo rounds x to a multiple of the power of ten that is not above step.
func roundTo(x, step float64) float64 {
	if !(step > 0) || math.IsInf(step, 1) {
		return x
	}
	exponent := math.Floor(math.Log10(step))
	if exponent < 0 {
		scale := math.Pow(10, -exponent)
		return math.Round(x*scale) / scale
	}
	scale := math.Pow(10, exponent)
	return math.Round(x/scale) * scale
}
