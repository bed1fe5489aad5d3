package gutzwiller

import (
	"context"
	"errors"
	"fmt"
	"math"
	"slices"
	"strings"
	"testing"
	"time"
)

// ramp changes every term smoothly.
func ramp(shapes int) Drive {
	return func(seconds float64, at *Terms) {
		at.Tunnelling = [3]float64{math.Exp(-3 * seconds), 0.5 + seconds, 0.3}
		at.Interaction = 8 - 30*seconds + 10*math.Sin(7*seconds)
		for k := range at.Weights {
			at.Weights[k] = (0.3 - seconds*seconds) / float64(k+1)
		}
	}
}

// The result has the same bits for any number of workers, and with the plain
// kernels on machines that have both.
func TestWorkersChangeNothing(t *testing.T) {
	for _, shape := range shapes {
		g := mustGrid(t, shape.sites, shape.periodic)
		s := mustSystem(t, g, 5, g.Squares(0))
		state := scramble(t, s, 2)
		want, report := mustAdvance(t, state, ramp(1), 0.2, Options{Workers: 1, TopLimit: 1})
		for _, workers := range []int{2, 3, 0} {
			got, again := mustAdvance(t, state, ramp(1), 0.2, Options{Workers: workers, TopLimit: 1})
			if !slices.Equal(got.amplitudes, want.amplitudes) || again != report {
				t.Errorf("%v: %d workers change the result: %+v, %+v", shape.sites, workers, again, report)
			}
		}
	}
}

// A tolerance ten times smaller leaves an error some ten times smaller, and the error
// is about what the estimates of the steps add up to.
func TestToleranceIsMet(t *testing.T) {
	g := mustGrid(t, []int{8, 9}, []bool{true, false})
	s := mustSystem(t, g, 6, g.Squares(1))
	state := scramble(t, s, 3)
	want, _ := mustAdvance(t, state, ramp(1), 0.5, Options{Tolerance: 1e-13, TopLimit: 1})
	last := math.Inf(1)
	for _, tolerance := range []float64{1e-4, 1e-6, 1e-8, 1e-10} {
		got, report := mustAdvance(t, state, ramp(1), 0.5, Options{Tolerance: tolerance, TopLimit: 1})
		_, d := distance(got, want)
		t.Logf("tolerance %g: %d steps, %d rejected, error %.2g", tolerance, report.Steps, report.Rejected, d)
		if bound := 10 * float64(report.Steps) * tolerance; d > bound || d > last/5 {
			t.Errorf("tolerance %g: error %.3g, want below %.3g and well below %.3g", tolerance, d, bound, last)
		}
		if report.LargestError > tolerance || report.NumberDefect > 1e-10 {
			t.Errorf("tolerance %g: %+v", tolerance, report)
		}
		// A rejected step must leave nothing wrong behind that the next one meets again.
		if report.Rejected < 0 || report.Rejected > report.Steps/3 {
			t.Errorf("tolerance %g: %d steps and %d rejected", tolerance, report.Steps, report.Rejected)
		}
		last = d
	}
}

// stepping takes equal steps, whatever their error.
func stepping(t *testing.T, state *State, steps int, duration float64) *State {
	t.Helper()
	e := mustEngine(t, state.System, Options{Tolerance: 0.1, TopLimit: 1})
	out := state.Clone()
	for i := range steps {
		e.proposed = 1.1 * duration / float64(steps)
		from, to := duration*float64(i)/float64(steps), duration*float64(i+1)/float64(steps)
		if r, err := e.Advance(context.Background(), out, ramp(1), from, to); err != nil || r.Steps != 1 {
			t.Fatalf("%+v, %v, want one step", r, err)
		}
	}
	return out
}

// Halving the step divides the error by 2^8, with all terms changing in time; by 2^4
// with the plain method.
func TestOrderOfConvergence(t *testing.T) {
	g := mustGrid(t, []int{10}, []bool{true})
	s := mustSystem(t, g, 5, g.Squares(0))
	state := scramble(t, s, 5)
	want := stepping(t, state, 64, 0.2)
	_, first := distance(stepping(t, state, 8, 0.2), want)
	_, second := distance(stepping(t, state, 16, 0.2), want)
	if order := math.Log2(first / second); !(order > 7.3 && order < 9.7) {
		t.Errorf("errors %.3g and %.3g: order %.2f, want 8", first, second, order)
	}
	plain := func(steps float64) float64 {
		got, _ := mustAdvance(t, state, ramp(1), 0.2, Options{PlainStep: 0.2 / steps, TopLimit: 1})
		_, d := distance(got, want)
		return d
	}
	first, second = plain(100), plain(200)
	if order := math.Log2(first / second); !(order > 3.8 && order < 4.2) {
		t.Errorf("plain method, errors %.3g and %.3g: order %.2f, want 4", first, second, order)
	}
}

// A run may be cut into pieces; the pieces only change where the steps end.
func TestPieces(t *testing.T) {
	g := mustGrid(t, []int{70}, []bool{false})
	s := mustSystem(t, g, 4, g.Squares(0))
	state := scramble(t, s, 6)
	whole, one := mustAdvance(t, state, ramp(1), 0.3, Options{Tolerance: 1e-10, TopLimit: 1})
	e := mustEngine(t, s, Options{Tolerance: 1e-10, TopLimit: 1})
	var sum Report
	for i := range 10 {
		r, err := e.Advance(context.Background(), state, ramp(1), 0.03*float64(i), 0.03*float64(i+1))
		if err != nil {
			t.Fatal(err)
		}
		sum.Add(r)
	}
	if _, d := distance(state, whole); d > 1e-8 {
		t.Errorf("ten pieces are %.3g from one", d)
	}
	if sum.Steps < one.Steps || sum.TopWeight < 0.5*one.TopWeight || sum.LargestError > 1e-10 {
		t.Errorf("pieces %+v, one %+v", sum, one)
	}
	before := state.Clone()
	if r, err := e.Advance(context.Background(), state, ramp(1), 1, 1); err != nil || r.Steps != 0 || !slices.Equal(before.amplitudes, state.amplitudes) {
		t.Errorf("no time at all: %+v, %v, want nothing done", r, err)
	}
}

// Number and norm hold to rounding, whatever the tolerance; the plain method leaves
// them to its error.
func TestNumberHolds(t *testing.T) {
	state, terms := antiTrap(t, 24)
	before, err := state.Measure(terms)
	if err != nil {
		t.Fatal(err)
	}
	for _, tolerance := range []float64{1e-4, 1e-8} {
		out, report := mustAdvance(t, state, Constant(terms), 5, Options{Tolerance: tolerance, TopLimit: 1})
		after, err := out.Measure(terms)
		if err != nil {
			t.Fatal(err)
		}
		near(t, "atoms", after.Atoms, before.Atoms, 2e-11*before.Atoms)
		near(t, "sum of the shares", after.SiteShares[0]+after.SiteShares[1]+after.SiteShares[2]+after.SiteShares[3], 1, 1e-13)
		if report.NumberDrift == 0 || report.NormDrift == 0 || report.NumberDrift > 1e3*tolerance {
			t.Errorf("tolerance %g: drifts %+v, want them told", tolerance, report)
		}
	}
}

// Energy is not set right by anything, so it measures the error.
func TestEnergyHolds(t *testing.T) {
	state, terms := antiTrap(t, 24)
	before, err := state.Measure(terms)
	if err != nil {
		t.Fatal(err)
	}
	out, _ := mustAdvance(t, state, Constant(terms), 10, Options{Tolerance: 1e-10, TopLimit: 1})
	after, err := out.Measure(terms)
	if err != nil {
		t.Fatal(err)
	}
	scale := math.Abs(before.Kinetic) + math.Abs(before.Potential)
	near(t, "energy per atom", after.Energy(), before.Energy(), 1e-8*scale)
	if math.Abs(after.Kinetic-before.Kinetic) < 0.05*scale {
		t.Error("nothing happened")
	}
}

func TestStepsAllocateNothing(t *testing.T) {
	state, terms := antiTrap(t, 24)
	for _, workers := range []int{1, 2} {
		e := mustEngine(t, state.System, Options{Workers: workers, TopLimit: 1})
		drive := Constant(terms)
		count := func(seconds float64) float64 {
			return testing.AllocsPerRun(3, func() {
				if _, err := e.Advance(context.Background(), state, drive, 0, seconds); err != nil {
					t.Fatal(err)
				}
			})
		}
		few, many := count(0.1), count(2)
		if many > few+3 { // the first wait of a goroutine makes a timer
			t.Errorf("%d workers: %g allocations in a short run, %g in one of many steps", workers, few, many)
		}
	}
}

func TestProgress(t *testing.T) {
	state, terms := antiTrap(t, 16)
	last, calls := 0, 0
	_, _ = mustAdvance(t, state, Constant(terms), 1, Options{TopLimit: 1, Progress: func(done, total int) {
		if done < last || done > total || total != 1000 {
			t.Errorf("progress %d of %d after %d", done, total, last)
		}
		last = done
		calls++
	}})
	if last != 1000 || calls < 3 {
		t.Errorf("last progress %d after %d calls, want 1000", last, calls)
	}
}

// A stop takes under 50 ms and leaves the last good step; the best of three, since
// the machine may be busy.
func TestStops(t *testing.T) {
	if testing.Short() {
		t.Skip("needs a second")
	}
	g := mustGrid(t, []int{60, 60, 20}, []bool{false, false, false})
	s := mustSystem(t, g, 6)
	state := scramble(t, s, 1)
	e := mustEngine(t, s, Options{TopLimit: 1})
	best := time.Hour
	for range 3 {
		ctx, cancel := context.WithCancel(context.Background())
		var begin time.Time
		time.AfterFunc(100*time.Millisecond, func() { begin = time.Now(); cancel() })
		_, err := e.Advance(ctx, state, ramp(0), 0, 100)
		if !errors.Is(err, context.Canceled) {
			t.Fatalf("got %v, want context.Canceled", err)
		}
		best = min(best, time.Since(begin))
	}
	if best > 50*time.Millisecond {
		t.Errorf("a stop took %v, want under 50 ms", best)
	}
	m, err := state.Measure(Terms{})
	if err != nil {
		t.Fatal(err)
	}
	near(t, "sum of the shares after a stop", m.SiteShares[0]+m.SiteShares[1]+m.SiteShares[2]+m.SiteShares[3], 1, 1e-12)
}

func TestEngineRefuses(t *testing.T) {
	s := mustSystem(t, mustGrid(t, []int{4}, []bool{false}), 4)
	for _, tc := range []struct {
		opt  Options
		want string
	}{
		{Options{Tolerance: 1e-15}, "tolerance 1e-15"},
		{Options{Tolerance: math.NaN()}, "tolerance NaN"},
		{Options{TopLimit: 2}, "limit 2"},
		{Options{TopLimit: -1}, "limit -1"},
		{Options{PlainStep: -1}, "step -1"},
		{Options{PlainStep: math.Inf(1)}, "step +Inf"},
		{Options{MemoryBytes: 1000}, "1000 are available"},
	} {
		if _, err := NewEngine(s, tc.opt); err == nil || !strings.Contains(err.Error(), tc.want) {
			t.Errorf("%+v: got %v, want an error with %q", tc.opt, err, tc.want)
		}
	}
}

func TestAdvanceRefuses(t *testing.T) {
	g := mustGrid(t, []int{4}, []bool{false})
	s := mustSystem(t, g, 4, g.Squares(0))
	state := scramble(t, s, 1)
	e := mustEngine(t, s, Options{TopLimit: 1})
	good := Terms{Tunnelling: [3]float64{1}, Interaction: 1, Weights: []float64{1}}
	for _, tc := range []struct {
		from, to float64
		drive    Drive
		want     string
	}{
		{1, 0, Constant(good), "duration"},
		{0, math.NaN(), Constant(good), "duration"},
		{0, math.Inf(1), Constant(good), "duration"},
		{math.Inf(-1), 0, Constant(good), "duration"},
		{0, 1, func(_ float64, at *Terms) { at.Interaction = math.NaN() }, "interaction NaN"},
		{0, 1, func(_ float64, at *Terms) { at.Tunnelling[0] = math.Inf(1) }, "finite"},
		{0, 1, func(_ float64, at *Terms) { at.Weights[0] = math.NaN() }, "finite"},
		{0, 1, func(_ float64, at *Terms) { at.Weights = nil }, "0 weights for 1"},
		{0, 1, func(s float64, at *Terms) { at.Interaction = math.Log(0.5 - s) }, "NaN"},
	} {
		e := mustEngine(t, s, Options{TopLimit: 1})
		if _, err := e.Advance(context.Background(), state, tc.drive, tc.from, tc.to); err == nil || !strings.Contains(err.Error(), tc.want) {
			t.Errorf("%g to %g: got %v, want an error with %q", tc.from, tc.to, err, tc.want)
		}
	}
	defer func() {
		if recover() == nil {
			t.Error("the state of another system: want a panic")
		}
	}()
	other := NewState(mustSystem(t, g, 4))
	_, _ = e.Advance(context.Background(), other, Constant(good), 0, 1)
}

// A cut-off that is too small ends the run with what was reached, at the start and
// on the way.
func TestCutoff(t *testing.T) {
	s := mustSystem(t, mustGrid(t, []int{6, 6}, []bool{true, true}), 3)
	state := NewState(s)
	for site := range 36 {
		if err := state.SetSite(site, []complex128{0.6, 0.8}); err != nil {
			t.Fatal(err)
		}
	}
	drive := Constant(Terms{Tunnelling: [3]float64{1, 1}, Interaction: 0.1})
	report, err := mustEngine(t, s, Options{}).Advance(context.Background(), state, drive, 0, 10)
	var cut *CutoffError
	if !errors.As(err, &cut) || cut.Levels != 3 || !(cut.Weight > cut.Limit) || cut.Limit != 1e-4 || !(cut.Seconds > 0 && cut.Seconds < 1) {
		t.Fatalf("got %v, want a *CutoffError soon", err)
	}
	if report.Steps == 0 || report.TopWeight != cut.Weight || !strings.Contains(cut.Error(), "3 levels are too few") {
		t.Errorf("%+v after %v", report, err)
	}
	report, err = mustEngine(t, s, Options{}).Advance(context.Background(), state, drive, cut.Seconds, 10)
	if !errors.As(err, &cut) || report.Steps != 0 {
		t.Errorf("once more: %+v, %v, want the same error at once", report, err)
	}
}

// A jump inside a run that the step is seen to reach over takes many small steps.
// What can hide is 0.4 % of a step at its ends: 2 pi 5 Hz 0.004 0.03 s = 4e-3 rad.
// A drive that no step can follow ends the run.
func TestJump(t *testing.T) {
	s := mustSystem(t, mustGrid(t, []int{8}, []bool{true}), 5)
	state := scramble(t, s, 8)
	const at = 0.123456
	jump := func(height float64) Drive {
		return func(seconds float64, terms *Terms) {
			*terms = Terms{Tunnelling: [3]float64{1}, Weights: terms.Weights}
			if seconds > at {
				terms.Interaction = height
			}
		}
	}
	whole, report := mustAdvance(t, state, jump(5), 1, Options{TopLimit: 1})
	pieces, e := state.Clone(), mustEngine(t, s, Options{TopLimit: 1})
	steps := 0
	for _, piece := range [][2]float64{{0, at}, {at, 1}} {
		r, err := e.Advance(context.Background(), pieces, jump(5), piece[0], piece[1])
		if err != nil {
			t.Fatal(err)
		}
		steps += r.Steps
	}
	if _, d := distance(whole, pieces); d > 4e-3 || report.Steps <= steps {
		t.Errorf("%.3g between %d steps over the jump and %d steps in two runs", d, report.Steps, steps)
	}
	wild := func(seconds float64, terms *Terms) {
		*terms = Terms{Interaction: 1e8 * math.Sin(1e20*seconds), Weights: terms.Weights}
	}
	report, err := mustEngine(t, s, Options{TopLimit: 1}).Advance(context.Background(), state, wild, 0, 1)
	var step *StepError
	if !errors.As(err, &step) || report.Steps != 0 || !strings.Contains(fmt.Sprint(step), "jump") {
		t.Errorf("got %+v, %v, want a *StepError at once", report, err)
	}
}
