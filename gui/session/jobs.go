package session

import (
	"context"
	"fmt"
	"math"
	"time"

	"hilltop/bosehubbard/plan"
)

// Work is a page's own computation on a plan. It runs on a goroutine of its own,
// polls ctx and may report how far it is.
type Work func(ctx context.Context, p *plan.Plan, progress func(done, total int)) (any, error)

// job is one computation and its last result.
type job struct {
	cancel      context.CancelFunc
	ended       chan struct{}
	running     bool
	version     uint64 // of the plan that result belongs to
	began       time.Time
	done, total int
	result      any
	err         error
}

// Start runs work on the present plan under a key. Work that still runs under the
// key is stopped first; its result is dropped.
func (s *Session) Start(key string, work Work) {
	s.mu.Lock()
	defer s.mu.Unlock()
	s.start(key, work)
}

// start is Start for a caller that holds mu.
func (s *Session) start(key string, work Work) {
	if s.doc == nil || s.ctx.Err() != nil {
		return
	}
	next := &job{running: true, version: s.work.version, began: time.Now(), ended: make(chan struct{})}
	var before <-chan struct{}
	if old := s.jobs[key]; old != nil {
		old.cancel()
		before = old.ended
		next.result, next.version = old.result, old.version
	}
	var ctx context.Context
	ctx, next.cancel = context.WithCancel(s.ctx)
	s.jobs[key] = next
	version, p := s.work.version, s.doc.now.Plan()
	s.wait.Add(1)
	go func() {
		defer s.wait.Done()
		defer close(next.ended)
		defer next.cancel()
		if before != nil {
			<-before
		}
		result, err := s.runJob(ctx, p, next, work)
		s.endJob(ctx, next, version, result, err)
	}()
	s.changed(patient)
}

func (s *Session) runJob(ctx context.Context, p *plan.Plan, j *job, work Work) (result any, err error) {
	if ctx.Err() != nil {
		return nil, ctx.Err()
	}
	defer func() {
		if cause := recover(); cause != nil {
			result, err = nil, fmt.Errorf("session: the computation broke off: %v", cause)
		}
	}()
	return work(ctx, p, func(done, total int) {
		s.mu.Lock()
		defer s.mu.Unlock()
		j.done, j.total = done, total
		s.changed(patient)
	})
}

func (s *Session) endJob(ctx context.Context, j *job, version uint64, result any, err error) {
	s.mu.Lock()
	defer s.mu.Unlock()
	j.running = false
	switch {
	case err != nil && ctx.Err() != nil:
	case err != nil:
		j.err = err
	default:
		j.result, j.version = result, version
	}
	s.changed(urgent)
}

// StopJob stops the work that runs under a key.
func (s *Session) StopJob(key string) {
	s.mu.Lock()
	defer s.mu.Unlock()
	if j := s.jobs[key]; j != nil {
		j.cancel()
	}
}

// jobStates returns what a view shows of the jobs. The caller holds mu.
func (s *Session) jobStates() map[string]Job {
	out := make(map[string]Job, len(s.jobs))
	for key, j := range s.jobs {
		shown := Job{Running: j.running, Result: j.result, Err: j.err}
		shown.Stale = j.result != nil && j.version != s.work.version
		shown.Progress = Progress{Done: j.done, Total: j.total, Text: progressText(j.done, j.total, time.Since(j.began))}
		out[key] = shown
	}
	return out
}

// progressText words how far a computation is: "63 %, about 4 s".
func progressText(done, total int, since time.Duration) string {
	if total <= 0 || done <= 0 || done > total {
		return ""
	}
	share := float64(done) / float64(total)
	left := since.Seconds() * (1 - share) / share
	text := fmt.Sprintf("%.0f %%", math.Floor(100*share))
	switch {
	case done == total || since < 500*time.Millisecond:
		return text
	case left < 90:
		return text + fmt.Sprintf(", about %.0f s", math.Ceil(left))
	}
	return text + fmt.Sprintf(", about %.0f min", math.Ceil(left/60))
}
