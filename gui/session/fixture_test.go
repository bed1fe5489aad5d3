package session

import (
	"context"
	"errors"
	"fmt"
	"os"
	"path/filepath"
	"runtime"
	"sync"
	"testing"
	"time"

	"hilltop/assets"
	"hilltop/bosehubbard/plan"
	"hilltop/bosehubbard/report"
)

// screen is a view for tests: it keeps every State it was shown.
type screen struct {
	mu     sync.Mutex
	states []State
	times  []time.Time
}

func (v *screen) show(s State) {
	v.mu.Lock()
	defer v.mu.Unlock()
	v.states = append(v.states, s)
	v.times = append(v.times, time.Now())
}

func (v *screen) all() ([]State, []time.Time) {
	v.mu.Lock()
	defer v.mu.Unlock()
	return append([]State(nil), v.states...), append([]time.Time(nil), v.times...)
}

func (v *screen) last() State {
	v.mu.Lock()
	defer v.mu.Unlock()
	if len(v.states) == 0 {
		return State{}
	}
	return v.states[len(v.states)-1]
}

// powerLimit is where the fake judge stops calling a plan sealed, W of "sheet".
const powerLimit = 0.05

// fakeJudge seals a plan whose last power of "sheet" is small; for the rest it
// gives an advice. It is as fast as a lookup.
func fakeJudge(_ context.Context, p *plan.Plan) (*report.Report, error) {
	rows := p.Rows()
	last := rows[len(rows)-1]
	r := &report.Report{Title: p.Title, AimSign: p.AimSign, Verdict: "sealed", Sentence: "Sealed: bounded above."}
	power := last.Value("power_w/sheet")
	c := report.Criterion{Name: "trap_x", Passed: power <= powerLimit, Margin: powerLimit - power, Unit: "Hz", Breaks: "open"}
	if !c.Passed {
		r.Verdict, r.Sentence = "open", "Open: trap still confines along x."
		c.Advice = &report.Advice{Text: "Lower 'sheet'.", Set: []report.Set{{Path: p.Source(len(p.Stages)-1, "power_w/sheet"), Value: 0.031}}}
	}
	r.Ceiling.Criteria = []report.Criterion{c}
	u := -984.0
	for i, row := range rows[1:] {
		r.Stages = append(r.Stages, report.Stage{Name: row.Name, EndMS: float64(i + 1), InteractionHz: &u,
			TunnellingHz: []float64{467, 467, 16.4}, CurvatureHz: []float64{-0.48, -0.48, 0.1}})
	}
	return r, nil
}

// newTest starts a session with a screen and the demo, and closes it in the end.
func newTest(t testing.TB, opt Options) (*Session, *screen) {
	t.Helper()
	v := &screen{}
	if opt.Judge == nil {
		opt.Judge = fakeJudge
	}
	opt.Show = v.show
	s := New(opt)
	t.Cleanup(s.Close)
	if err := s.OpenBytes("demo", demo(t)); err != nil {
		t.Fatal(err)
	}
	return s, v
}

func demo(t testing.TB) []byte {
	t.Helper()
	data, err := assets.Plan("skerry-demo")
	if err != nil {
		t.Fatal(err)
	}
	return data
}

// settle waits until the plan is judged and the view has seen it.
func settle(t testing.TB, s *Session, v *screen) State {
	t.Helper()
	waitFor(t, v, "a settled state", func(st State) bool {
		s.mu.Lock()
		defer s.mu.Unlock()
		return !st.Busy && !s.view.dirty && !s.view.posted && !s.work.busy() && s.work.running == nil &&
			s.work.advice.next == nil && s.work.preview.next == nil && len(s.work.track.order) == 0
	})
	return v.last()
}

// waitFor waits for the newest State to satisfy a condition.
func waitFor(t testing.TB, v *screen, what string, ok func(State) bool) State {
	t.Helper()
	deadline := time.Now().Add(10 * time.Second)
	for time.Now().Before(deadline) {
		if st := v.last(); st.Number > 0 && ok(st) {
			return st
		}
		time.Sleep(time.Millisecond)
	}
	t.Fatalf("waited 10 s for %s; last state: %+v", what, v.last())
	return State{}
}

func field(t testing.TB, st State, id string) Field {
	t.Helper()
	f, ok := st.Field(id)
	if !ok {
		t.Fatalf("no field %s", id)
	}
	return f
}

// stageNamed returns the index of a stage.
func stageNamed(t testing.TB, st State, name string) int {
	t.Helper()
	for _, stop := range st.Rail {
		if stop.Name == name {
			return stop.Stage
		}
	}
	t.Fatalf("no stage %q in %v", name, st.Rail)
	return 0
}

func bytesOf(s *Session) string {
	s.mu.Lock()
	defer s.mu.Unlock()
	return string(s.doc.now.Bytes())
}

// goroutinesBelow waits until at most n goroutines run and returns how many do.
func goroutinesBelow(n int) int {
	for range 500 {
		if runtime.NumGoroutine() <= n {
			break
		}
		time.Sleep(2 * time.Millisecond)
	}
	return runtime.NumGoroutine()
}

func writeFile(t testing.TB, name string, data []byte) string {
	t.Helper()
	path := filepath.Join(t.TempDir(), name)
	if err := os.WriteFile(path, data, 0o666); err != nil {
		t.Fatal(err)
	}
	return path
}

var errTest = errors.New("the judge had a bad day")

func mustBe[T comparable](t testing.TB, what string, got, want T) {
	t.Helper()
	if got != want {
		t.Errorf("%s: got %v, want %v", what, fmt.Sprint(got), fmt.Sprint(want))
	}
}
