package session

import (
	"errors"
	"slices"

	"hilltop/bosehubbard/plan"
)

// ErrNoField says that there is no field with an ID, or no document.
var ErrNoField = errors.New("session: no such field")

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
