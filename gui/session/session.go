package session

import (
	"context"
	"sync"
	"time"

	"hilltop/bosehubbard/plan"
	"hilltop/bosehubbard/report"
)

// Options of a Session. The zero value judges and keeps nothing on disk.
type Options struct {
	Post   func(func()) // runs a function on the view's goroutine, without waiting for it; nil runs it where it is
	Show   func(State)  // takes the newest State; called through Post only
	Judge  func(context.Context, *plan.Plan) (*report.Report, error)
	Folder string // for recovery and recent files; "" for none

	Interval time.Duration // least time between two States; 0 is 40 ms
	Autosave time.Duration // longest time a change waits for its copy; 0 is 1 s
	Watch    time.Duration // between looks at the file; 0 is 1 s
}

const (
	patience   = 100 * time.Millisecond // a judgement that ran longer is stopped by a newer plan
	grace      = 30 * time.Millisecond  // an edit waits so long to be shown together with its report
	fadeAfter  = 150 * time.Millisecond // a report older than the plan for so long fades
	stepPause  = time.Second            // steps closer than this are one edit
	trackCount = 61                     // points on a slider's track
)

// Session is the state behind one window. Its methods may be called from any
// goroutine. Use [New].
type Session struct {
	opt    Options
	ctx    context.Context
	cancel context.CancelFunc
	wait   sync.WaitGroup
	wakes  struct{ judge, publish, keep chan struct{} }

	mu      sync.Mutex
	number  uint64
	doc     *document
	stage   int
	focus   string
	units   map[string]string     // shown units, by field
	ranges  map[string][2]float64 // of sliders, in document units
	pending []pendingText         // the last touched one at the end
	drag    *drag
	run     stepRun
	touched string
	notice  string
	broken  *Broken
	entries entryCache
	facts   facts

	work   workState
	view   viewState
	keep   keepState
	jobs   map[string]*job
	small  smallState
	recent []string
}

// pendingText is what stands in a field and not in the plan.
type pendingText struct {
	field        string
	stage        int // selected when it was typed
	text, reason string
}

// New starts a session without a document. Close ends it.
func New(opt Options) *Session {
	if opt.Post == nil {
		opt.Post = func(f func()) { f() }
	}
	if opt.Show == nil {
		opt.Show = func(State) {}
	}
	if opt.Judge == nil {
		opt.Judge = report.NewJudge().Judge
	}
	opt.Interval = positive(opt.Interval, 40*time.Millisecond)
	opt.Autosave = positive(opt.Autosave, time.Second)
	opt.Watch = positive(opt.Watch, time.Second)
	s := &Session{opt: opt, stage: StartStage, jobs: map[string]*job{}}
	s.ctx, s.cancel = context.WithCancel(context.Background())
	s.wakes.judge = make(chan struct{}, 1)
	s.wakes.publish = make(chan struct{}, 1)
	s.wakes.keep = make(chan struct{}, 1)
	s.forget()
	s.beginKeeping()
	s.wait.Add(3)
	go s.judgeAll()
	go s.publishAll()
	go s.keepAll()
	s.mu.Lock()
	s.changed(urgent)
	s.mu.Unlock()
	return s
}

func positive(given, otherwise time.Duration) time.Duration {
	if given > 0 {
		return given
	}
	return otherwise
}

// Close stops all work, waits for it, and removes the recovery copy: whoever
// closes has asked about unsaved work. Nothing is shown afterwards.
func (s *Session) Close() {
	s.mu.Lock()
	s.work.stop()
	for _, j := range s.jobs {
		j.cancel()
	}
	s.mu.Unlock()
	s.cancel()
	s.wait.Wait()
	s.endKeeping()
}

// State returns the present state.
func (s *Session) State() State {
	s.mu.Lock()
	defer s.mu.Unlock()
	return s.state()
}

// forget drops all that belongs to the document before the present one.
func (s *Session) forget() {
	s.units = map[string]string{}
	s.ranges = map[string][2]float64{}
	s.pending = nil
	s.drag = nil
	s.run = stepRun{}
	s.touched = ""
	s.focus = ""
	s.entries = entryCache{}
	s.work.forget()
	s.small.forget()
}

func wake(channel chan struct{}) {
	select {
	case channel <- struct{}{}:
	default:
	}
}
