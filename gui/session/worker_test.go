package session

import (
	"context"
	"runtime"
	"strings"
	"sync/atomic"
	"testing"
	"time"

	"hilltop/bosehubbard/plan"
	"hilltop/bosehubbard/report"
)

// TestLatestWins starts many edits while a judgement runs: only the last is judged
// after it, and its report is the one that is shown.
func TestLatestWins(t *testing.T) {
	var calls atomic.Int32
	gate := make(chan struct{})
	s, v := newTest(t, Options{Judge: func(ctx context.Context, p *plan.Plan) (*report.Report, error) {
		calls.Add(1)
		select {
		case <-gate:
		case <-ctx.Done():
			return nil, ctx.Err()
		}
		return &report.Report{Title: p.Title, Verdict: "sealed"}, nil
	}})
	begin := time.Now()
	for i := range 50 {
		if err := s.Edit("title", "/title", strings.Repeat("x", i+1)); err != nil {
			t.Fatal(err)
		}
	}
	close(gate)
	st := waitFor(t, v, "the last report", func(st State) bool { return st.Report != nil && !st.Busy })
	mustBe(t, "title of the report", len(st.Report.Title), 50)
	mustBe(t, "stale", st.Stale, false)
	// One at the start, one at the end, and one for every time that the patience ran
	// out while the edits were made.
	if n, most := int(calls.Load()), 3+int(time.Since(begin)/patience); n > most {
		t.Errorf("%d judgements for 50 edits during one, want at most %d", n, most)
	}
}

// TestSlowJudgementGivesWay has a judge that would take forever: a newer plan stops
// it after the patience.
func TestSlowJudgementGivesWay(t *testing.T) {
	var calls, stopped atomic.Int32
	s, v := newTest(t, Options{Judge: func(ctx context.Context, p *plan.Plan) (*report.Report, error) {
		if calls.Add(1) == 1 {
			<-ctx.Done()
			stopped.Add(1)
			return nil, ctx.Err()
		}
		return &report.Report{Title: p.Title, Verdict: "sealed"}, nil
	}})
	for calls.Load() == 0 {
		time.Sleep(time.Millisecond)
	}
	begin := time.Now()
	if err := s.Edit("title", "/title", "new"); err != nil {
		t.Fatal(err)
	}
	st := settle(t, s, v)
	mustBe(t, "stopped judgements", stopped.Load(), 1)
	mustBe(t, "title of the report", st.Report.Title, "new")
	if st.Failure != nil {
		t.Errorf("failure %v after a judgement gave way, want none", st.Failure)
	}
	if waited := time.Since(begin); waited > 5*time.Second {
		t.Errorf("waited %v, want about %v", waited, patience)
	}
}

func TestFailureKeepsTheLastReport(t *testing.T) {
	fail := atomic.Bool{}
	s, v := newTest(t, Options{Judge: func(ctx context.Context, p *plan.Plan) (*report.Report, error) {
		if fail.Load() {
			return nil, errTest
		}
		return fakeJudge(ctx, p)
	}})
	good := settle(t, s, v).Report
	fail.Store(true)
	if err := s.Edit("title", "/title", "new"); err != nil {
		t.Fatal(err)
	}
	st := waitFor(t, v, "a failure", func(st State) bool { return st.Failure != nil })
	mustBe(t, "report", st.Report, good)
	mustBe(t, "stale", st.Stale, true)
	mustBe(t, "busy", st.Busy, false)
	mustBe(t, "reason", st.Failure.Reason, errTest.Error())
	waitFor(t, v, "fading", func(st State) bool { return st.Fading })
	fail.Store(false)
	s.Retry()
	st = waitFor(t, v, "a new report", func(st State) bool { return st.Failure == nil && !st.Stale })
	mustBe(t, "title of the report", st.Report.Title, "new")
}

func TestFailureNamesTheField(t *testing.T) {
	s, v := newTest(t, Options{Judge: func(_ context.Context, p *plan.Plan) (*report.Report, error) {
		return nil, plan.Errors{{Path: "/stages/1/field_g", Value: "402.5", Reason: "the field stands on a pole"}}
	}})
	st := waitFor(t, v, "a failure", func(st State) bool { return st.Failure != nil })
	mustBe(t, "field", st.Failure.Field, "field_g")
	mustBe(t, "details", len(st.Failure.Details), 1)
	if st.Verdict.Word != "" || st.Report != nil {
		t.Errorf("verdict %q, report %v without a judgement", st.Verdict.Word, st.Report)
	}
	s.Undo() // nothing to undo, nothing lost
	mustBe(t, "plan", bytesOf(s), string(demo(t)))
}

func TestPanicOfTheJudgeIsAFailure(t *testing.T) {
	s, v := newTest(t, Options{Judge: func(context.Context, *plan.Plan) (*report.Report, error) { panic("slip") }})
	st := waitFor(t, v, "a failure", func(st State) bool { return st.Failure != nil })
	if !strings.Contains(st.Failure.Reason, "slip") {
		t.Errorf("reason %q, want the cause", st.Failure.Reason)
	}
	mustBe(t, "plan", bytesOf(s), string(demo(t)))
}

func TestStopAndRetry(t *testing.T) {
	var slow atomic.Bool
	slow.Store(true)
	s, v := newTest(t, Options{Judge: func(ctx context.Context, p *plan.Plan) (*report.Report, error) {
		if slow.Load() {
			<-ctx.Done()
			return nil, ctx.Err()
		}
		return fakeJudge(ctx, p)
	}})
	waitFor(t, v, "work", func(st State) bool { return st.Busy })
	s.Stop()
	st := waitFor(t, v, "a stop", func(st State) bool { return st.Failure != nil })
	if !st.Failure.Stopped || st.Busy {
		t.Errorf("failure %+v, busy %v; want stopped and idle", st.Failure, st.Busy)
	}
	slow.Store(false)
	s.Retry()
	st = settle(t, s, v)
	if st.Failure != nil || st.Report == nil {
		t.Errorf("failure %v, report %v after a retry", st.Failure, st.Report)
	}
}

// TestCloseWaits counts goroutines before and after sessions that are closed in
// the middle of everything.
func TestCloseWaits(t *testing.T) {
	before := runtime.NumGoroutine()
	for range 20 {
		s := New(Options{Folder: t.TempDir(), Judge: func(ctx context.Context, p *plan.Plan) (*report.Report, error) {
			select {
			case <-ctx.Done():
				return nil, ctx.Err()
			case <-time.After(3 * time.Millisecond):
			}
			return fakeJudge(ctx, p)
		}})
		if err := s.OpenBytes("demo", demo(t)); err != nil {
			t.Fatal(err)
		}
		s.Focus("power_w/sheet")
		s.Preview("power_w/sheet", "30 mW")
		s.Start("page", func(ctx context.Context, _ *plan.Plan, progress func(int, int)) (any, error) {
			progress(1, 2)
			<-ctx.Done()
			return nil, ctx.Err()
		})
		s.BeginDrag("power_w/sheet")
		s.Drag(22)
		s.Close()
	}
	if after := goroutinesBelow(before); after > before {
		t.Errorf("%d goroutines before, %d after closing", before, after)
	}
}

// TestNothingIsShownAfterClose posts through a queue that is emptied after Close.
func TestNothingIsShownAfterClose(t *testing.T) {
	queue := make(chan func(), 100)
	shown := 0
	s := New(Options{Judge: fakeJudge, Post: func(f func()) { queue <- f }, Show: func(State) { shown++ }})
	if err := s.OpenBytes("demo", demo(t)); err != nil {
		t.Fatal(err)
	}
	time.Sleep(20 * time.Millisecond)
	s.Close()
	close(queue)
	for f := range queue {
		f()
	}
	mustBe(t, "states shown", shown, 0)
}

// TestJobs runs a page's computation: progress, result, stale after an edit,
// replaced by a newer one.
func TestJobs(t *testing.T) {
	s, v := newTest(t, Options{})
	s.Start("map", func(_ context.Context, p *plan.Plan, progress func(int, int)) (any, error) {
		progress(1, 4)
		return p.Title, nil
	})
	st := waitFor(t, v, "a result", func(st State) bool { return st.Jobs["map"].Result != nil })
	mustBe(t, "result", st.Jobs["map"].Result, any(st.Plan.Title))
	if err := s.Edit("title", "/title", "new"); err != nil {
		t.Fatal(err)
	}
	waitFor(t, v, "a stale result", func(st State) bool { return st.Jobs["map"].Stale })
	s.Start("map", func(ctx context.Context, _ *plan.Plan, _ func(int, int)) (any, error) {
		<-ctx.Done()
		return nil, ctx.Err()
	})
	s.Start("map", func(context.Context, *plan.Plan, func(int, int)) (any, error) { return "second", nil })
	st = waitFor(t, v, "the second result", func(st State) bool { return st.Jobs["map"].Result == "second" })
	if st.Jobs["map"].Running || st.Jobs["map"].Stale || st.Jobs["map"].Err != nil {
		t.Errorf("job %+v, want it done and fresh", st.Jobs["map"])
	}
	s.Start("map", func(context.Context, *plan.Plan, func(int, int)) (any, error) { return nil, errTest })
	st = waitFor(t, v, "an error", func(st State) bool { return st.Jobs["map"].Err != nil })
	mustBe(t, "last good result", st.Jobs["map"].Result, any("second"))
}

func TestProgressText(t *testing.T) {
	for _, tc := range []struct {
		done, total int
		since       time.Duration
		want        string
	}{
		{0, 10, time.Second, ""}, {63, 100, 6800 * time.Millisecond, "63 %, about 4 s"}, {10, 10, time.Second, "100 %"},
		{1, 10, 100 * time.Millisecond, "10 %"}, {1, 100, 10 * time.Second, "1 %, about 17 min"}, {5, 0, time.Second, ""},
	} {
		if got := progressText(tc.done, tc.total, tc.since); got != tc.want {
			t.Errorf("%d of %d after %v: got %q, want %q", tc.done, tc.total, tc.since, got, tc.want)
		}
	}
}
