package session

import "time"

// urgency says whether a change waits for the report that follows it.
type urgency bool

const (
	urgent  urgency = true
	patient urgency = false
)

// viewState is what the publisher knows. It is guarded by Session.mu.
type viewState struct {
	dirty  bool // something changed since the last State was handed out
	urgent bool
	edited time.Time // of the first edit that waits to be shown
	shown  time.Time // when the last State was handed out
	posted bool      // a function waits in the view's queue
}

// changed notes that the view is old. The caller holds mu.
func (s *Session) changed(u urgency) {
	if !s.view.dirty {
		s.view.edited = time.Now()
	}
	s.view.dirty = true
	s.view.urgent = s.view.urgent || bool(u)
	wake(s.wakes.publish)
}

// publishAll posts States until the session is closed: never more than one at a
// time in the view's queue, never closer than the interval, the last one always.
func (s *Session) publishAll() {
	defer s.wait.Done()
	timer := time.NewTimer(0)
	defer timer.Stop()
	for {
		delay, ok := s.nextPost()
		switch {
		case ok && delay <= 0:
			s.opt.Post(s.show)
			continue
		case ok:
			timer.Reset(delay)
		default:
			timer.Stop()
		}
		select {
		case <-s.ctx.Done():
			return
		case <-s.wakes.publish:
		case <-timer.C:
		}
	}
}

// nextPost returns how long to wait before the next State, or false if none is
// due. Where the time has come it marks the State as posted.
func (s *Session) nextPost() (time.Duration, bool) {
	s.mu.Lock()
	defer s.mu.Unlock()
	if s.ctx.Err() != nil || s.view.posted {
		return 0, false
	}
	now := time.Now()
	if !s.view.dirty {
		return s.untilFading(now)
	}
	due := s.view.shown.Add(s.opt.Interval)
	if waits := s.view.edited.Add(grace); !s.view.urgent && s.work.busy() && waits.After(due) {
		due = waits
	}
	if delay := due.Sub(now); delay > 0 {
		return delay, true
	}
	s.view.posted = true
	return 0, true
}

// untilFading returns when a report that was shown as fresh begins to fade.
func (s *Session) untilFading(now time.Time) (time.Duration, bool) {
	if s.work.superseded.IsZero() || s.work.fadeShown {
		return 0, false
	}
	delay := s.work.superseded.Add(fadeAfter).Sub(now)
	if delay <= 0 {
		s.work.fadeShown = true
		s.view.posted = true
	}
	return delay, true
}

// show runs on the view's goroutine and hands out the newest State. The next one is
// posted only after the view is done with it.
func (s *Session) show() {
	s.mu.Lock()
	open := s.ctx.Err() == nil
	s.view.dirty, s.view.urgent = false, false
	s.view.shown = time.Now()
	var state State
	if open {
		state = s.state()
	}
	s.mu.Unlock()
	if open {
		s.opt.Show(state)
	}
	s.mu.Lock()
	s.view.posted = false
	s.mu.Unlock()
	wake(s.wakes.publish)
}
