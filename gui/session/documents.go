package session

import (
	"errors"
	"fmt"
	"os"
	"path/filepath"
	"strings"

	"hilltop/assets"
	"hilltop/bosehubbard/plan"
)

// ErrNoPath says that the document was never saved and needs a name.
var ErrNoPath = errors.New("session: the plan has no file yet, want a name for it")

// ChangedError says that the file was changed by another program since it was
// read. KeepMine lets the next Save replace it, Reload takes it.
type ChangedError struct{ Path string }

// Error names the file.
func (e *ChangedError) Error() string {
	return fmt.Sprintf("session: %s was changed by another program, want a choice between the two", e.Path)
}

// Template is a plan to begin with.
type Template struct {
	Name  string // for New
	Title string
}

// Templates returns the plans that ship with the program.
func Templates() []Template {
	var out []Template
	for _, name := range assets.PlanNames() {
		t := Template{Name: name, Title: name}
		if data, err := assets.Plan(name); err == nil {
			if p, err := plan.Parse(data); err == nil && p.Title != "" {
				t.Title = p.Title
			}
		}
		out = append(out, t)
	}
	return out
}

// NewFrom begins a plan from a template.
//
// It returns an error if there is no such template; the present plan then stays.
func (s *Session) NewFrom(template string) error {
	data, err := assets.Plan(template)
	if err != nil {
		return err
	}
	return s.OpenBytes(template, data)
}

// OpenFile opens the plan in a file.
//
// It returns the errors of plan.Load, and State.Broken lists the mistakes; the
// present plan then stays.
func (s *Session) OpenFile(path string) error {
	if full, err := filepath.Abs(path); err == nil {
		path = full
	}
	doc, err := plan.Load(path)
	if err != nil {
		return s.refuse(filepath.Base(path), err)
	}
	s.mu.Lock()
	defer s.mu.Unlock()
	s.open(&document{name: filepath.Base(path), path: path, now: doc, saved: doc.Bytes(), disk: stampOf(path, doc.Bytes())})
	s.remember(path)
	return nil
}

// OpenBytes opens a plan that has no file, under a name.
//
// It returns the errors of plan.Open; the present plan then stays.
func (s *Session) OpenBytes(name string, data []byte) error {
	doc, err := plan.Open(data)
	if err != nil {
		return s.refuse(name, err)
	}
	s.mu.Lock()
	defer s.mu.Unlock()
	s.open(&document{name: name, now: doc, saved: doc.Bytes()})
	return nil
}

// refuse notes why a document could not be opened.
func (s *Session) refuse(name string, err error) error {
	s.mu.Lock()
	defer s.mu.Unlock()
	s.broken = &Broken{Name: name, Reason: err.Error()}
	if all, ok := errors.AsType[plan.Errors](err); ok {
		s.broken.Reason = fmt.Sprintf("%d mistakes", len(all))
		if len(all) == 1 {
			s.broken.Reason = "1 mistake"
		}
		for _, one := range all {
			s.broken.Mistakes = append(s.broken.Mistakes, one.Error())
		}
	}
	s.changed(urgent)
	return err
}

// open makes d the present document and selects its last stage. The caller holds
// mu.
func (s *Session) open(d *document) {
	s.forget()
	s.doc, s.broken, s.notice = d, nil, ""
	s.stage = firstShown(d.now.Plan())
	s.overtake()
	d.first = s.work.version
	s.choosePowerUnits()
	s.keepSoon()
	s.changed(urgent)
}

// firstShown is the stage a fresh document shows: the last one that moves a knob,
// for the verdict is about its end and a hold moves none.
func firstShown(p *plan.Plan) int {
	for i := len(p.Stages) - 1; i >= 0; i-- {
		if p.Stages[i].Shape != plan.Hold {
			return i
		}
	}
	return StartStage
}

// choosePowerUnits shows powers in mW where no beam of the plan reaches 1 W.
func (s *Session) choosePowerUnits() {
	most := 0.0
	for _, row := range s.doc.now.Plan().Rows() {
		for _, power := range row.PowerW {
			most = max(most, power)
		}
	}
	if most >= 1 {
		return
	}
	for name := range s.doc.now.Plan().Rows()[0].PowerW {
		s.units["power_w/"+name] = "mW"
	}
}

// NeedsSaving reports whether closing would lose edits.
func (s *Session) NeedsSaving() bool {
	s.mu.Lock()
	defer s.mu.Unlock()
	return s.doc != nil && s.doc.dirty()
}

// SuggestedName is a file name for SaveAs.
func (s *Session) SuggestedName() string {
	s.mu.Lock()
	defer s.mu.Unlock()
	if s.doc == nil {
		return "plan.json"
	}
	name := strings.TrimSuffix(s.doc.name, ".json")
	if title := s.doc.now.Plan().Title; s.doc.path == "" && title != "" {
		name = title
	}
	name = strings.Map(func(r rune) rune {
		if strings.ContainsRune(`/\:*?"<>|`, r) || r < ' ' {
			return '-'
		}
		return r
	}, name)
	return strings.TrimSpace(name) + ".json"
}

// Save writes the plan to its file.
//
// It returns ErrNoPath if it has none, a *ChangedError if the file was changed by
// another program, and the error of plan.Save if it cannot be written; the plan
// then stays unsaved.
func (s *Session) Save() error {
	s.mu.Lock()
	defer s.mu.Unlock()
	if s.doc == nil || s.doc.path == "" {
		return ErrNoPath
	}
	s.endDrag(false)
	s.doc.disk.look(s.doc.path)
	if s.doc.disk.state == Changed {
		s.changed(urgent)
		return &ChangedError{s.doc.path}
	}
	return s.save(s.doc.path)
}

// SaveAs writes the plan to a file and stays with that file.
//
// It returns the error of plan.Save if the file cannot be written.
func (s *Session) SaveAs(path string) error {
	s.mu.Lock()
	defer s.mu.Unlock()
	if s.doc == nil {
		return ErrNoPath
	}
	s.endDrag(false)
	full, err := filepath.Abs(path)
	if err != nil {
		return fmt.Errorf("session: file name %q: %w", path, err)
	}
	return s.save(full)
}

// save writes the plan. The caller holds mu.
func (s *Session) save(path string) error {
	text := s.doc.now.Bytes()
	if err := plan.Save(path, text); err != nil {
		s.notice = err.Error()
		s.changed(urgent)
		return err
	}
	s.doc.path, s.doc.name, s.doc.saved = path, filepath.Base(path), text
	s.doc.disk = stampOf(path, text)
	s.notice = "Saved " + s.doc.name + "."
	s.remember(path)
	s.keepSoon()
	s.changed(urgent)
	return nil
}

// Reload takes the file as it is now. The present plan can be had back with Undo.
//
// It returns the errors of plan.Load; the present plan then stays.
func (s *Session) Reload() error {
	s.mu.Lock()
	path := ""
	if s.doc != nil {
		path = s.doc.path
	}
	s.mu.Unlock()
	if path == "" {
		return ErrNoPath
	}
	next, err := plan.Load(path)
	if err != nil {
		return s.refuse(filepath.Base(path), err)
	}
	s.mu.Lock()
	defer s.mu.Unlock()
	if s.doc == nil || s.doc.path != path {
		return nil
	}
	s.endDrag(false)
	s.run = stepRun{}
	s.pending = nil
	s.doc.saved, s.doc.disk, s.broken = next.Bytes(), stampOf(path, next.Bytes()), nil
	s.record("reload "+s.doc.name, "", s.doc.now, next)
	s.afterEdit("")
	s.changed(urgent)
	return nil
}

// KeepMine answers a change on the disk: the next Save replaces the file.
func (s *Session) KeepMine() {
	s.mu.Lock()
	defer s.mu.Unlock()
	if s.doc == nil || s.doc.path == "" {
		return
	}
	data, err := os.ReadFile(s.doc.path)
	if err == nil {
		s.doc.disk = stampOf(s.doc.path, data)
		s.doc.saved = data
	}
	s.changed(urgent)
}
