package session

import (
	"errors"
	"fmt"
	"strings"
	"time"

	"hilltop/bosehubbard/fock"
	"hilltop/bosehubbard/plan"
)

// state builds the State of the moment. The caller holds mu.
func (s *Session) state() State {
	s.number++
	w := &s.work
	st := State{
		Number: s.number, Broken: s.broken, Stage: s.stage, Touched: s.touched, Notice: s.notice,
		Undo: s.undoName(), Redo: s.redoName(), Dragging: s.drag != nil,
		Recoveries: s.keep.offers(), Recent: s.recent, Jobs: s.jobStates(),
	}
	if s.doc == nil {
		return st
	}
	p := s.doc.now.Plan()
	st.Name, st.Path, st.Dirty, st.Plan = s.doc.name, s.doc.path, s.doc.dirty(), p
	st.OnDisk = s.doc.disk.state
	st.Rail = rail(p)
	st.Knobs, st.Groups = s.fields()
	st.Report, st.Judged = w.report, w.judged
	st.Stale = w.report != nil && w.reported != w.version
	st.Fading = st.Stale && !w.superseded.IsZero() && time.Since(w.superseded) >= fadeAfter
	st.Busy = w.busy()
	st.Failure = w.failure
	if st.Busy {
		st.Progress.Text = "judging"
	}
	if w.report != nil {
		st.Rows = stageRows(w.report)
		st.Verdict = s.verdict()
		st.Keys = pageKeys(w.report, s.reported())
	}
	st.Entropy = s.entropy(st.Jobs[EntropyJob])
	st.Unapplied = s.unapplied()
	st.Preview, st.Track = w.preview.shown, w.track.track
	return st
}

// unapplied counts the fields whose text was refused.
func (s *Session) unapplied() int {
	n := 0
	for _, p := range s.pending {
		if p.reason != "" {
			n++
		}
	}
	return n
}

func rail(p *plan.Plan) []Stop {
	out := []Stop{{StartStage, "start"}}
	for i, stage := range p.Stages {
		out = append(out, Stop{i, stage.Name})
	}
	return out
}

// failureOf puts an error of the judgement into words. The caller holds mu.
func (s *Session) failureOf(err error) *Failure {
	f := &Failure{Reason: strings.TrimPrefix(err.Error(), "plan: ")}
	if large, ok := errors.AsType[*fock.TooLargeError](err); ok {
		f.Cure = fmt.Sprintf("Give at most %d sites, or fewer atoms.", large.LargestSites)
		return f
	}
	var all plan.Errors
	if !errors.As(err, &all) || len(all) == 0 {
		f.Cure = "Undo takes back the last edit; Retry tries again."
		return f
	}
	f.Path, f.Field = all[0].Path, s.fieldAt(all[0].Path)
	f.Reason = s.placeOfPath(all[0].Path) + ": " + valueAnd(all[0])
	f.Cure = "Change the value, or undo."
	for _, one := range all {
		f.Details = append(f.Details, one.Error())
	}
	return f
}

func valueAnd(e *plan.FieldError) string {
	if e.Value == "" {
		return withNearest(e)
	}
	return e.Value + ": " + withNearest(e)
}
