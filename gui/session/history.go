package session

import (
	"bytes"
	"fmt"
	"slices"

	"hilltop/bosehubbard/plan"
)

// document is the open plan with the way it came about.
type document struct {
	name  string
	path  string // absolute; "" where it was never saved
	now   *plan.Document
	saved []byte // the text in the file or of the template; nil where there is none
	first uint64 // the version it was opened with

	undo, redo []change // the last one at the end
	disk       diskStamp
}

// change is one entry of the history. It holds the bytes that differ, so that a
// long history stays small.
type change struct {
	name  string
	at    int
	old   []byte
	new   []byte
	stage int    // selected when it was made
	field string // it belongs to, "" for none
}

// difference returns the change between two texts: one run of bytes.
func difference(before, after []byte) change {
	most := min(len(before), len(after))
	head := 0
	for head < most && before[head] == after[head] {
		head++
	}
	tail := 0
	for tail < most-head && before[len(before)-1-tail] == after[len(after)-1-tail] {
		tail++
	}
	return change{
		at:  head,
		old: slices.Clone(before[head : len(before)-tail]),
		new: slices.Clone(after[head : len(after)-tail]),
	}
}

// back returns the text before the change, forth the one after it.
func (c change) back(text []byte) []byte {
	return slices.Concat(text[:c.at], c.old, text[c.at+len(c.new):])
}

func (c change) forth(text []byte) []byte {
	return slices.Concat(text[:c.at], c.new, text[c.at+len(c.old):])
}

// dirty reports whether the text differs from what was saved.
func (d *document) dirty() bool { return !bytes.Equal(d.now.Bytes(), d.saved) }

// record makes next the present plan and adds the step from before to the
// history; it returns whether there was a difference. The caller holds mu.
func (s *Session) record(name, field string, before, next *plan.Document) bool {
	step := difference(before.Bytes(), next.Bytes())
	s.move(next)
	if len(step.old) == 0 && len(step.new) == 0 {
		return false
	}
	step.name, step.stage, step.field = name, s.stage, field
	s.doc.undo = append(s.doc.undo, step)
	s.doc.redo = nil
	return true
}

// move makes next the present plan. The caller holds mu.
func (s *Session) move(next *plan.Document) {
	if next == s.doc.now {
		return
	}
	s.doc.now, s.notice = next, ""
	s.stage = min(s.stage, len(next.Plan().Stages)-1)
	s.overtake()
	s.keepSoon()
	s.changed(patient)
}

// Undo takes back what was typed and not committed, or else the last edit, and
// selects the stage it was made in.
func (s *Session) Undo() {
	s.mu.Lock()
	defer s.mu.Unlock()
	if s.doc == nil {
		return
	}
	s.endDrag(false)
	if n := len(s.pending); n > 0 {
		s.stage = s.pending[n-1].stage
		s.pending = s.pending[:n-1]
		s.changed(urgent)
		return
	}
	if n := len(s.doc.undo); n > 0 {
		step := s.doc.undo[n-1]
		if s.travel(step, step.back) {
			s.doc.undo = s.doc.undo[:n-1]
			s.doc.redo = append(s.doc.redo, step)
		}
	}
}

// Redo repeats the edit that Undo took back last.
func (s *Session) Redo() {
	s.mu.Lock()
	defer s.mu.Unlock()
	if s.doc == nil {
		return
	}
	s.endDrag(false)
	if n := len(s.doc.redo); n > 0 {
		step := s.doc.redo[n-1]
		if s.travel(step, step.forth) {
			s.doc.redo = s.doc.redo[:n-1]
			s.doc.undo = append(s.doc.undo, step)
		}
	}
}

// travel moves through the history. The text was a valid plan once, so it is one
// now; should that fail, everything stays and the notice says so.
func (s *Session) travel(step change, direction func([]byte) []byte) bool {
	next, err := plan.Open(direction(s.doc.now.Bytes()))
	if err != nil {
		s.notice = fmt.Sprintf("%s cannot be taken back: %v", step.name, err)
		s.changed(urgent)
		return false
	}
	s.run = stepRun{}
	s.stage = step.stage
	s.move(next)
	s.touched = step.field
	s.afterEdit(step.field)
	s.changed(patient)
	return true
}

// undoName and redoName are what the menu says.
func (s *Session) undoName() string {
	if n := len(s.pending); n > 0 {
		return "text in " + s.placeOf(s.pending[n-1].field)
	}
	if s.doc == nil || len(s.doc.undo) == 0 {
		return ""
	}
	return s.doc.undo[len(s.doc.undo)-1].name
}

func (s *Session) redoName() string {
	if s.doc == nil || len(s.doc.redo) == 0 {
		return ""
	}
	return s.doc.redo[len(s.doc.redo)-1].name
}
