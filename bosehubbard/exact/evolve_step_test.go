package exact

import (
	"context"
	"errors"
	"math"
	"strings"
	"testing"
	"time"

	"hilltop/bosehubbard"
	"hilltop/bosehubbard/fock"
	"hilltop/bosehubbard/lattice"
)

// sweeps change one, some or all of the couplings.
func sweeps(duration float64) map[string]func(*bosehubbard.Model, float64) {
	from := uniform(1, 0.4, 5, 0.2)
	changed := func(j, u, v float64) bosehubbard.Model { return uniform(1, 0.4*j, 5*u, 0.2*v) }
	return map[string]func(*bosehubbard.Model, float64){
		"U":             path(from, changed(1, -0.4, 1), duration, linear),
		"U smooth":      path(from, changed(1, -0.4, 1), duration, smooth),
		"V":             path(from, changed(1, 1, -3), duration, linear),
		"J exponential": path(from, changed(2.5, 1, 1), duration, exponential),
		"all":           path(from, changed(2, -0.5, -2), duration, smooth),
	}
}

// steps carries a fresh state through a sweep in a number of equal steps, with
// exponentials exact to 1e-12, and returns it with the estimate in its budget.
func steps(t *testing.T, drive func(*bosehubbard.Model, float64), duration float64, count int) *Evolution {
	t.Helper()
	ctx := context.Background()
	e := evolution(t, box(t, []int{5}), uniform(1, 0.4, 5, 0.2), []int{1, 1, 1, 1, 1}, EvolutionOptions{})
	r := &run{Evolution: e, Segment: &Segment{Duration: duration, Drive: drive, Tolerance: 1}}
	r.model.Axes = make([]bosehubbard.AxisTerms, 1)
	h := duration / float64(count)
	for k := range count {
		at := h * float64(k)
		if err := r.prepare(at, h); err != nil {
			t.Fatal(err)
		}
		if !r.tools.proportional() {
			t.Fatal("hops out of proportion on a single axis")
		}
		if err := e.hamiltonian.tune(ctx, r.tools.first); err != nil {
			t.Fatal(err)
		}
		if _, _, err := e.propagator.Build(ctx, e.psi, math.Pi*h, 1e-12, e.hamiltonian.product); err != nil {
			t.Fatal(err)
		}
		d, err := r.estimated(ctx, h)
		if err != nil {
			t.Fatal(err)
		}
		r.account(h, d)
		if err := r.plain(ctx, at, h, 1e-12); err != nil {
			t.Fatal(err)
		}
	}
	return e
}

// Twice as many steps leave a sixteenth of the error.
func TestStepsAreOfFourthOrder(t *testing.T) {
	const duration = 0.3
	for name, drive := range sweeps(duration) {
		reference, coarse, fine := steps(t, drive, duration, 200), steps(t, drive, duration, 30), steps(t, drive, duration, 60)
		first, second := coarse.gap(reference), fine.gap(reference)
		if order := math.Log2(first / second); order < 3.7 || order > 4.4 {
			t.Errorf("%s: errors %.3g and %.3g, order %.2f, want 4", name, first, second, order)
		}
	}
}

// The estimate covers the error of few steps and of many, and is not far above it.
func TestEstimateCoversTheError(t *testing.T) {
	loosest := 0.0
	durations := []float64{0.01, 0.1, 0.3, 1}
	if testing.Short() {
		durations = durations[1:2]
	}
	for _, duration := range durations {
		for name, drive := range sweeps(duration) {
			reference := steps(t, drive, duration, 400)
			for _, count := range []int{4, 10, 40} {
				if duration/float64(count) > 0.05 {
					continue
				}
				e := steps(t, drive, duration, count)
				got, estimate := e.gap(reference), e.Errors().Ordering
				if got < 1e-9 {
					continue
				}
				if loosest = max(loosest, estimate/got); got > estimate {
					t.Errorf("%s, %d steps in %g s: error %.3g, estimate %.3g", name, count, duration, got, estimate)
				}
			}
		}
	}
	if loosest > 50 {
		t.Errorf("the estimate is %.3g times the error, want at most 50", loosest)
	}
}

// Axes whose J do not change in proportion, and a J that goes through 0, take the
// other estimate, and keep to the budget too.
func TestStepsWithoutProportion(t *testing.T) {
	const duration = 0.4
	l := box(t, []int{3, 2})
	from, to := uniform(2, 0.2, 6, 0.1), uniform(2, 1, -2, -0.1)
	to.Axes[1].Tunnelling = -0.5
	drive := path(from, to, duration, smooth)
	state := []int{1, 1, 0, 1, 1, 1}
	var runs [2]*Evolution
	for k, tolerance := range []float64{1e-3, 1e-7} {
		runs[k] = evolution(t, l, from, state, EvolutionOptions{})
		runs[k].must(t, Segment{Duration: duration, Tolerance: tolerance, Drive: drive})
	}
	budget := runs[0].Errors()
	if got := runs[0].gap(runs[1]); got > budget.Sum() || budget.Ordering > 1e-3 || budget.Ordering == 0 {
		t.Errorf("distance %.3g with a budget of %+v", got, budget)
	}
}

// A drive that jumps in the middle of a segment is refused; one that starts with a
// jump is a quench.
func TestStepsAtAJump(t *testing.T) {
	l := box(t, []int{4})
	m := uniform(1, 1, 4, 0)
	e := evolution(t, l, m, []int{1, 1, 1, 1}, EvolutionOptions{})
	_, err := e.Run(context.Background(), Segment{Duration: 0.5, Tolerance: 1e-3, Drive: func(m *bosehubbard.Model, t float64) {
		if m.Interaction = 4; t > 0.2345 {
			m.Interaction = -4
		}
		m.Axes[0].Tunnelling = 1
	}})
	if err == nil || !strings.Contains(err.Error(), "not smooth") || math.Abs(e.Time()-0.2345) > 1e-3 {
		t.Errorf("a jump at 0.2345 s: %v at %g s, want an error there", err, e.Time())
	}
	e = evolution(t, l, m, []int{1, 1, 1, 1}, EvolutionOptions{})
	other := evolution(t, l, uniform(1, 0.5, -7, 0.1), []int{1, 1, 1, 1}, EvolutionOptions{})
	e.must(t, Segment{Duration: 0.3, Drive: func(m *bosehubbard.Model, _ float64) { *m = uniform(1, 0.5, -7, 0.1) }})
	other.must(t, Segment{Duration: 0.3})
	if got := e.gap(other); got > 1e-4 || e.Errors().Ordering != 0 {
		t.Errorf("a quench: off by %.3g, %+v", got, e.Errors())
	}
}

// Ends of the spectrum are at rest, and a slow sweep stays at the end, at either
// side.
func TestEvolutionFromTheEnds(t *testing.T) {
	ctx := context.Background()
	for _, tc := range []struct {
		name     string
		l        *lattice.Lattice
		atoms    int
		from, to bosehubbard.Model
		end      End
	}{
		{"floor of a trapped chain", box(t, []int{5}), 5, uniform(1, 1, 8, 0.3), uniform(1, 1, 4, 0.2), Floor},
		{"ceiling of an anti-trapped chain", box(t, []int{5}), 5, uniform(1, 1, -8, -0.3), uniform(1, 1, -4, -0.2), Ceiling},
		{"ceiling in the odd sector", box(t, []int{4}), 3, uniform(1, 1, -2, -0.1), uniform(1, 1, -3, -0.1), Ceiling},
		{"tilted chain", box(t, []int{4}), 3, tilted(0.5), tilted(0.8), Floor},
	} {
		e, err := NewEvolutionFromEnd(ctx, tc.l, tc.from, tc.atoms, tc.end, EvolutionOptions{})
		if err != nil {
			t.Fatalf("%s: %v", tc.name, err)
		}
		ends, err := Solve(ctx, tc.l, tc.from, tc.atoms, Options{})
		if err != nil {
			t.Fatal(err)
		}
		want := ends.Floor
		if tc.end == Ceiling {
			want = ends.Ceiling
		}
		s := e.must(t, Segment{Duration: 1, Times: []float64{0, 1}, Tolerance: 1e-8})
		for _, s := range s {
			if math.Abs(s.Energy-want) > 1e-7*math.Abs(want) {
				t.Errorf("%s: energy %.10g at %g s, want %.10g", tc.name, s.Energy, s.Time, want)
			}
		}
		e.must(t, Segment{Duration: 10, Drive: path(tc.from, tc.to, 10, smooth)})
		o, err := e.Overlap(ctx, tc.end)
		if err != nil || o.Weight < 0.999 || o.Weight > 1+1e-9 {
			t.Errorf("%s: weight %.6g of the end after a slow sweep, want about 1; %v", tc.name, o.Weight, err)
		}
		if ends, err = Solve(ctx, tc.l, tc.to, tc.atoms, Options{}); err != nil {
			t.Fatal(err)
		}
		want = map[End]float64{Floor: ends.Floor, Ceiling: ends.Ceiling}[tc.end]
		if math.Abs(o.Energy-want) > 1e-8*math.Abs(want) {
			t.Errorf("%s: end at %.10g, want %.10g", tc.name, o.Energy, want)
		}
	}
}

func tilted(f float64) bosehubbard.Model {
	m := uniform(1, 1, 3, 0)
	m.Axes[0].Tilt = f
	return m
}

// A number state has a flat n(q), a quarter of it at the corner per axis; all atoms
// at the top of the band of a ring are there; n(q) adds up to the atoms.
func TestCornerFraction(t *testing.T) {
	ctx := context.Background()
	for _, tc := range []struct {
		l        *lattice.Lattice
		periodic []bool
		state    []int
		want     float64
	}{
		{box(t, []int{5}), nil, []int{1, 1, 1, 1, 1}, 0.25},
		{box(t, []int{3, 2}), nil, []int{1, 1, 0, 1, 2, 1}, 0.0625},
		{box(t, []int{8}, true), []bool{true}, []int{1, 0, 1, 1, 1, 1, 2, 1}, 3. / 8},
	} {
		e := evolution(t, tc.l, uniform(tc.l.Axes, 1, 1, 0), tc.state, EvolutionOptions{})
		c, err := e.Correlations(ctx)
		if err != nil {
			t.Fatal(err)
		}
		if got := CornerFraction(tc.l, tc.periodic, c); math.Abs(got-tc.want) > 1e-12 {
			t.Errorf("%v: %.12g at the corner, want %g", tc.state, got, tc.want)
		}
	}
	ring := box(t, []int{6}, true)
	e, err := NewEvolutionFromEnd(ctx, ring, uniform(1, 1, 0, 0), 4, Ceiling, EvolutionOptions{})
	if err != nil {
		t.Fatal(err)
	}
	c, err := e.Correlations(ctx)
	if err != nil {
		t.Fatal(err)
	}
	if got := CornerFraction(ring, []bool{true}, c); math.Abs(got-1) > 1e-8 {
		t.Errorf("free atoms at the top of the band: %.9g at the corner, want 1", got)
	}
	sum := 0.0
	for m := range 6 {
		sum += MomentumDistribution(ring, c, [3]float64{2 * math.Pi * float64(m) / 6})
	}
	if math.Abs(sum-4) > 1e-8 || math.Abs(MomentumDistribution(ring, c, [3]float64{math.Pi})-4) > 1e-8 {
		t.Errorf("n(q) adds up to %.9g, want 4, all at pi", sum)
	}
}

// What does not fit is refused, and where memory is short the Krylov space is
// smaller.
func TestEvolutionMemory(t *testing.T) {
	l := box(t, []int{10})
	state := []int{1, 1, 1, 1, 1, 1, 1, 1, 1, 1}
	m := uniform(1, 1, 4, 0)
	var large *fock.TooLargeError
	if _, err := NewEvolution(context.Background(), l, m, state, EvolutionOptions{MemoryBytes: 1e6}); !errors.As(err, &large) {
		t.Errorf("in 1 MB: %v, want a *fock.TooLargeError", err)
	}
	for _, bytes := range []uint64{1e9, 20e6} {
		e := evolution(t, l, m, state, EvolutionOptions{MemoryBytes: bytes})
		e.must(t, Segment{Duration: 0.02})
		t.Logf("%d bytes: dimension %d", bytes, e.propagator.Dimension())
	}
}

// A stop at any time takes under 50 ms; the best of three, since the machine may be
// busy.
func TestEvolutionStops(t *testing.T) {
	if testing.Short() {
		t.Skip("needs seconds")
	}
	l := box(t, []int{11})
	from, to := uniform(1, 1, 20, 0.1), uniform(1, 1, 2, 0.1)
	state := []int{1, 1, 1, 1, 1, 1, 1, 1, 1, 1, 1}
	for _, drive := range []func(*bosehubbard.Model, float64){nil, path(from, to, 1e3, linear)} {
		for _, delay := range []time.Duration{0, 3 * time.Millisecond, 30 * time.Millisecond, 300 * time.Millisecond} {
			best := time.Hour
			for range 3 {
				ctx, cancel := context.WithTimeout(context.Background(), delay)
				begin := time.Now()
				e, err := NewEvolution(ctx, l, from, state, EvolutionOptions{})
				if err == nil {
					_, err = e.Run(ctx, Segment{Duration: 1e3, Drive: drive})
				}
				best = min(best, time.Since(begin)-delay)
				cancel()
				if !errors.Is(err, context.DeadlineExceeded) {
					t.Fatalf("stopped after %v: %v, want context.DeadlineExceeded", delay, err)
				}
			}
			if best > 50*time.Millisecond {
				t.Errorf("a stop after %v took %v more, want under 50 ms", delay, best)
			}
		}
	}
}

func TestEvolutionReportsProgress(t *testing.T) {
	e := evolution(t, box(t, []int{4}), uniform(1, 1, 4, 0), []int{1, 1, 1, 1}, EvolutionOptions{})
	for least, drive := range []func(*bosehubbard.Model, float64){nil, path(uniform(1, 1, 4, 0), uniform(1, 1, 0, 0), 3, linear)} {
		last, calls, whole := -1, 0, 0
		e.must(t, Segment{Duration: 3, Drive: drive, Progress: func(done, total int) {
			if done < last || done > total {
				t.Errorf("progress %d of %d after %d", done, total, last)
			}
			last, whole = done, total
			calls++
		}})
		if last != whole || calls < 1+9*least {
			t.Errorf("%d calls, the last %d of %d", calls, last, whole)
		}
	}
}

func BenchmarkEvolution(b *testing.B) {
	for _, n := range []int{7, 9} {
		b.Run(map[int]string{7: "sites=7/atoms=7", 9: "sites=9/atoms=9"}[n], func(b *testing.B) {
			const duration = 5 * hbarOverJ
			l := box(b, []int{n})
			from, to := uniform(1, 1, 20, 0.05), uniform(1, 1, 4, 0.05)
			state := make([]int, n)
			for i := range state {
				state[i] = 1
			}
			b.ReportAllocs()
			for b.Loop() {
				e := evolution(b, l, from, state, EvolutionOptions{Workers: 1})
				e.must(b, Segment{Duration: duration, Drive: path(from, to, duration, linear)})
				b.ReportMetric(float64(e.Products()), "products")
			}
		})
	}
}
