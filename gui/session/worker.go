package session

import (
	"context"
	"fmt"
	"time"

	"hilltop/bosehubbard/plan"
	"hilltop/bosehubbard/report"
)

// workState is what the background goroutine works on. It is guarded by
// Session.mu. Versions count the changes of the plan.
type workState struct {
	version uint64 // of the present plan, 0 where none is open
	settled uint64 // the version that was last judged, with success or not

	report     *report.Report
	reported   uint64    // version of report
	judged     uint64    // counts reports
	superseded time.Time // when a plan newer than report appeared; zero where report is the newest
	fadeShown  bool
	failure    *Failure

	running  context.CancelFunc // of the judgement or trial that runs, nil for none
	judging  uint64             // version of the running judgement, 0 for a trial
	started  time.Time
	overtook time.Time // when a newer version than judging appeared

	trials
}

func (w *workState) busy() bool { return w.version != w.settled }

func (w *workState) stop() {
	if w.running != nil {
		w.running()
	}
}

// forget drops results that belong to another document.
func (w *workState) forget() {
	w.report, w.failure = nil, nil
	w.superseded = time.Time{}
	w.trials = trials{}
	w.stop()
}

// overtake notes a new version of the plan: trials give way at once, a judgement
// when it has had its time.
func (s *Session) overtake() {
	w := &s.work
	w.version++
	w.advice = adviceTrial{}
	now := time.Now()
	if w.superseded.IsZero() && w.report != nil {
		w.superseded, w.fadeShown = now, false
	}
	switch {
	case w.running == nil:
	case w.judging == 0:
		w.running()
	case w.overtook.IsZero():
		w.overtook = now
		stop := w.running
		time.AfterFunc(patience-now.Sub(w.started), stop)
	}
	wake(s.wakes.judge)
}

// judgeAll takes one task after the other: the judgement of the newest plan, then
// the trials. It ends when the session is closed.
func (s *Session) judgeAll() {
	defer s.wait.Done()
	for {
		task := s.nextTask()
		if task != nil {
			task()
			continue
		}
		select {
		case <-s.ctx.Done():
			return
		case <-s.wakes.judge:
		}
	}
}

// nextTask returns what to do next, or nil.
func (s *Session) nextTask() func() {
	s.mu.Lock()
	defer s.mu.Unlock()
	if s.ctx.Err() != nil || s.doc == nil {
		return nil
	}
	if s.work.busy() {
		ctx := s.begin(s.work.version)
		version, p := s.work.version, s.doc.now.Plan()
		return func() {
			r, err := s.judge(ctx, p)
			s.finish(ctx, version, r, err)
		}
	}
	return s.nextTrial()
}

// begin prepares the context of a judgement, or of a trial where version is 0.
func (s *Session) begin(version uint64) context.Context {
	ctx, cancel := context.WithCancel(s.ctx)
	s.work.running, s.work.judging = cancel, version
	s.work.started, s.work.overtook = time.Now(), time.Time{}
	return ctx
}

// end releases the context of the task that ran.
func (w *workState) end() {
	w.running()
	w.running, w.judging = nil, 0
}

// judge calls Options.Judge. A panic in there must not take the unsaved plan with
// it.
func (s *Session) judge(ctx context.Context, p *plan.Plan) (r *report.Report, err error) {
	defer func() {
		if cause := recover(); cause != nil {
			r, err = nil, fmt.Errorf("session: the judgement broke off: %v", cause)
		}
	}()
	r, err = s.opt.Judge(ctx, p)
	if err == nil && r == nil {
		err = fmt.Errorf("session: the judgement gave no report")
	}
	return r, err
}

// finish takes the outcome of a judgement. One that was stopped leaves nothing.
func (s *Session) finish(ctx context.Context, version uint64, r *report.Report, err error) {
	s.mu.Lock()
	defer s.mu.Unlock()
	w := &s.work
	overtook, stopped := w.overtook, err != nil && ctx.Err() != nil
	w.end()
	if stopped || s.doc == nil || version < s.doc.first {
		return
	}
	w.settled = max(w.settled, version)
	if err != nil {
		if version == w.version {
			w.failure = s.failureOf(err)
			s.changed(urgent)
		}
		return
	}
	w.report, w.reported, w.failure = r, version, nil
	w.judged++
	w.superseded, w.fadeShown = time.Time{}, false
	if version != w.version {
		w.superseded = overtook
	}
	s.startAdvice()
	s.changed(urgent)
}

// Stop ends the running judgement. The last good report stays, as stale, until
// Retry or the next edit.
func (s *Session) Stop() {
	s.mu.Lock()
	defer s.mu.Unlock()
	if !s.work.busy() {
		return
	}
	s.work.settled = s.work.version
	s.work.failure = &Failure{Reason: "Stopped.", Cure: "Retry judges the plan as it is now.", Stopped: true}
	s.work.stop()
	s.changed(urgent)
}

// Retry judges the plan again.
func (s *Session) Retry() {
	s.mu.Lock()
	defer s.mu.Unlock()
	if s.doc == nil {
		return
	}
	s.work.failure = nil
	s.overtake()
	s.changed(urgent)
}
