package session

import (
	"encoding/json"
	"errors"
	"fmt"
	"slices"
	"strconv"
	"strings"

	"hilltop/bosehubbard/plan"
)

// AddStage puts a hold of 1 ms behind a stage, StartStage for the beginning, and
// selects it.
//
// It returns the plan's errors, or one that says why stages cannot be moved.
func (s *Session) AddStage(after int) error {
	s.mu.Lock()
	defer s.mu.Unlock()
	list, err := s.stageTexts()
	if err != nil {
		return err
	}
	if after < StartStage || after >= len(list) {
		return fmt.Errorf("session: stage %d, want one from -1 to %d", after, len(list)-1)
	}
	name := s.freeName()
	text, err := json.Marshal(map[string]any{"name": name, "duration_ms": 1, "shape": plan.Hold})
	if err != nil {
		return fmt.Errorf("session: new stage: %w", err)
	}
	return s.setStages("add stage '"+name+"'", slices.Insert(list, after+1, json.RawMessage(text)), after+1)
}

// RemoveStage takes a stage out; what it set is gone for the stages after it.
//
// It returns the plan's errors, for the plan may not make sense without the stage.
func (s *Session) RemoveStage(stage int) error {
	s.mu.Lock()
	defer s.mu.Unlock()
	list, err := s.stageTexts()
	if err != nil {
		return err
	}
	if stage < 0 || stage >= len(list) {
		return fmt.Errorf("session: stage %d, want one from 0 to %d", stage, len(list)-1)
	}
	return s.setStages("remove stage '"+s.stageName(stage)+"'", slices.Delete(list, stage, stage+1), stage-1)
}

// MoveStage moves a stage by some places, later for by > 0, as far as it goes.
//
// It returns the plan's errors.
func (s *Session) MoveStage(stage, by int) error {
	s.mu.Lock()
	defer s.mu.Unlock()
	list, err := s.stageTexts()
	if err != nil {
		return err
	}
	if stage < 0 || stage >= len(list) {
		return fmt.Errorf("session: stage %d, want one from 0 to %d", stage, len(list)-1)
	}
	to := min(max(stage+by, 0), len(list)-1)
	text, name := list[stage], s.stageName(stage)
	return s.setStages("move stage '"+name+"'", slices.Insert(slices.Delete(list, stage, stage+1), to, text), to)
}

// stageTexts returns the stages as they are written. The caller holds mu.
func (s *Session) stageTexts() ([]json.RawMessage, error) {
	if s.doc == nil {
		return nil, ErrNoField
	}
	s.endDrag(false)
	p := s.doc.now.Plan()
	if p.Kind() == plan.LevelsKind {
		return nil, errors.New("session: a plan of levels has no stages")
	}
	if path := numberedStage(p); path != "" {
		return nil, fmt.Errorf("session: measured, limits or uncertainty names a stage by its number (%s), want those removed before stages are added or moved", path)
	}
	list := make([]json.RawMessage, len(p.Stages))
	for i := range list {
		list[i], _ = s.doc.now.Value("/stages/" + strconv.Itoa(i))
	}
	return list, nil
}

// numberedStage returns a key of the plan that would mean another stage after a
// change of their order, or "".
func numberedStage(p *plan.Plan) string {
	const begin = "/stages/"
	for path := range p.Limits {
		if strings.HasPrefix(path, begin) {
			return path
		}
	}
	for path := range p.Measured {
		if strings.HasPrefix(path, begin) {
			return path
		}
	}
	for path := range p.Uncertainty {
		if strings.HasPrefix(path, begin) {
			return path
		}
	}
	return ""
}

func (s *Session) setStages(name string, list []json.RawMessage, selected int) error {
	before := s.doc.now
	next, err := before.With("/stages", list)
	if err != nil {
		return err
	}
	s.run = stepRun{}
	s.pending = slices.DeleteFunc(s.pending, func(p pendingText) bool { return p.stage != StartStage })
	s.record(name, "", before, next)
	s.stage = min(max(selected, StartStage), len(list)-1)
	s.afterEdit("")
	s.changed(urgent)
	return nil
}

// freeName returns a stage name that is not taken.
func (s *Session) freeName() string {
	for i := len(s.doc.now.Plan().Stages) + 1; ; i++ {
		name := "stage " + strconv.Itoa(i)
		if !slices.ContainsFunc(s.doc.now.Plan().Stages, func(one plan.Stage) bool { return one.Name == name }) {
			return name
		}
	}
}
