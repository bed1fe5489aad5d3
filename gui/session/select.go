package session

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
