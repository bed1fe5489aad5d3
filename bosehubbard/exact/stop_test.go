package exact

import (
	"context"
	"errors"
	"fmt"
	"math"
	"slices"
	"strings"
	"testing"
	"time"

	"hilltop/bosehubbard"
	"hilltop/bosehubbard/fock"
	"hilltop/bosehubbard/lattice"
	"hilltop/bosehubbard/num/lanczos"
)

func mustChain(t testing.TB, sites int) (*lattice.Lattice, bosehubbard.Model) {
	t.Helper()
	l, err := lattice.Box([]int{sites}, []bool{false})
	if err != nil {
		t.Fatal(err)
	}
	return l, bosehubbard.Model{Axes: []bosehubbard.AxisTerms{{Tunnelling: 1, Curvature: -0.05}}, Interaction: -2.1}
}

func TestSolveRefuses(t *testing.T) {
	l, m := mustChain(t, 6)
	for _, tc := range []struct {
		change func(m *bosehubbard.Model, atoms *int, opt *Options)
		want   string
	}{
		{func(_ *bosehubbard.Model, atoms *int, _ *Options) { *atoms = -1 }, "-1 atoms"},
		{func(m *bosehubbard.Model, _ *int, _ *Options) { m.Axes = make([]bosehubbard.AxisTerms, 2) }, "2 axes on a lattice of 1"},
		{func(m *bosehubbard.Model, _ *int, _ *Options) { m.Interaction = math.NaN() }, "NaN"},
		{func(m *bosehubbard.Model, _ *int, _ *Options) { m.Axes[0].Tunnelling = math.Inf(1) }, "Inf"},
		{func(_ *bosehubbard.Model, _ *int, opt *Options) { opt.Tolerance = -1 }, "tolerance -1"},
		{func(_ *bosehubbard.Model, _ *int, opt *Options) { opt.MaxIterations = -1 }, "-1 iterations"},
	} {
		model, atoms, opt := m, 6, Options{}
		model.Axes = append([]bosehubbard.AxisTerms(nil), m.Axes...)
		tc.change(&model, &atoms, &opt)
		if _, err := Solve(context.Background(), l, model, atoms, opt); err == nil || !strings.Contains(err.Error(), tc.want) {
			t.Errorf("got %v, want an error with %q", err, tc.want)
		}
	}
}

// What does not fit is refused at once, with figures.
func TestSolveTooLarge(t *testing.T) {
	for _, atoms := range []int{22, 1000, 1_000_000_000} {
		l, m := mustChain(t, 22)
		begin := time.Now()
		_, err := Solve(context.Background(), l, m, atoms, Options{MemoryBytes: 1e9})
		var large *fock.TooLargeError
		if !errors.As(err, &large) {
			t.Fatalf("%d atoms on 22 sites: %v, want a *fock.TooLargeError", atoms, err)
		}
		if large.Sites != 22 || large.Atoms != atoms || large.BytesAvailable != 1e9 || large.BytesWanted < 1e9 || large.LargestSites < 1 {
			t.Errorf("%d atoms on 22 sites: %+v", atoms, *large)
		}
		if spent := time.Since(begin); spent > 50*time.Millisecond {
			t.Errorf("%d atoms on 22 sites: refused after %v, want at once", atoms, spent)
		}
	}
	l, m := mustChain(t, 12) // 1,352,078 states, half of them even
	if _, err := Solve(context.Background(), l, m, 12, Options{MemoryBytes: 1.2e7}); err == nil {
		t.Error("12 atoms on 12 sites fitted 12 MB, want a refusal: two vectors of half the space take 12.5 MB")
	}
	if _, err := Solve(context.Background(), l, m, 12, Options{MemoryBytes: 2.4e7, EndStates: true}); err == nil {
		t.Error("12 atoms on 12 sites with end states fitted 24 MB, want a refusal: four vectors take 25 MB")
	}
	if _, err := Solve(context.Background(), l, m, 12, Options{MemoryBytes: 2.1e7, Sector: SectorWhole}); err == nil {
		t.Error("12 atoms on 12 sites without the mirror fitted 21 MB, want a refusal: two vectors take 21.6 MB")
	}
}

func TestSolveNotConverged(t *testing.T) {
	l, m := mustChain(t, 8)
	ends, err := Solve(context.Background(), l, m, 8, Options{MaxIterations: 12})
	var short *lanczos.NotConvergedError
	if !errors.As(err, &short) || short.Iterations != 12 || ends.Iterations != 12 {
		t.Fatalf("12 iterations: %v with %+v, want a *lanczos.NotConvergedError", err, ends)
	}
	full, err := Solve(context.Background(), l, m, 8, Options{})
	if err != nil {
		t.Fatal(err)
	}
	if !(ends.Floor >= full.Floor && ends.Floor < full.Floor+5 && ends.Ceiling <= full.Ceiling && ends.Ceiling > full.Ceiling-5) {
		t.Errorf("last iterate %g to %g, want it just inside %g to %g", ends.Floor, ends.Ceiling, full.Floor, full.Ceiling)
	}
}

// A stop at any time, while building or solving, takes under 50 ms. The best of
// three, since the machine may be busy.
func TestSolveStops(t *testing.T) {
	if testing.Short() {
		t.Skip("needs a second")
	}
	l, m := mustChain(t, 11)
	for _, delay := range []time.Duration{0, 2 * time.Millisecond, 20 * time.Millisecond, 150 * time.Millisecond} {
		best := time.Hour
		for range 3 {
			ctx, cancel := context.WithTimeout(context.Background(), delay)
			begin := time.Now()
			_, err := Solve(ctx, l, m, 11, Options{Tolerance: 1e-13, EndStates: true})
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

// polled records the times between looks at a context.
type polled struct {
	context.Context
	last time.Time
	gaps []time.Duration
}

func (p *polled) Err() error {
	now := time.Now()
	p.gaps = append(p.gaps, now.Sub(p.last))
	p.last = now
	return nil
}

// The context is looked at every 50 ms all through a problem whose single product
// takes longer. Every run looks at the same places, so the shortest time of three
// at each leaves out what else the machine is doing.
func TestSolveLooksAtItsContext(t *testing.T) {
	if testing.Short() {
		t.Skip("needs seconds")
	}
	l, m := mustChain(t, 13) // 5,200,300 states
	var shortest []time.Duration
	for run := range 3 {
		ctx := &polled{Context: context.Background(), last: time.Now()}
		_, err := Solve(ctx, l, m, 13, Options{MaxIterations: 2, EndStates: true, Workers: 1})
		var short *lanczos.NotConvergedError
		if !errors.As(err, &short) {
			t.Fatalf("2 iterations: %v, want a *lanczos.NotConvergedError", err)
		}
		_ = ctx.Err() // the time since the last look counts too
		if run == 0 {
			shortest = ctx.gaps
		}
		if len(ctx.gaps) != len(shortest) {
			t.Fatalf("run %d looked %d times, the first one %d times", run, len(ctx.gaps), len(shortest))
		}
		for i, gap := range ctx.gaps {
			shortest[i] = min(shortest[i], gap)
		}
	}
	if longest := slices.Max(shortest); longest > 50*time.Millisecond {
		t.Errorf("%v passed between two looks at the context, want under 50 ms", longest)
	}
}

func TestSolveReportsProgress(t *testing.T) {
	l, m := mustChain(t, 7)
	last, whole := -1, 0
	_, err := Solve(context.Background(), l, m, 7, Options{EndStates: true, Progress: func(done, total int) {
		if done < last || done > total {
			t.Errorf("progress %d of %d after %d", done, total, last)
		}
		last, whole = done, total
	}})
	if err != nil || last != whole || whole == 0 {
		t.Errorf("%v, last progress %d of %d", err, last, whole)
	}
}

// The largest chain of the plain solver, 1,352,078 states, without interaction,
// where the closed form of the band is the check.
func TestTwelveAtomsOnTwelveSites(t *testing.T) {
	if testing.Short() {
		t.Skip("takes ten seconds")
	}
	s := chain(12, 12, false, 0, 0)
	ends := s.solve(t, Options{})
	t.Logf("%d iterations, %.2f s and %.2f s", ends.Iterations, ends.BuildSeconds, ends.SolveSeconds)
	want := 24 * math.Cos(math.Pi/13)
	near(t, "floor", ends.Floor, -want, 1e-12*want)
	near(t, "ceiling", ends.Ceiling, want, 1e-12*want)
	checkResiduals(t, "12 on 12", ends)
	if ends.Dimension != 1352078 {
		t.Errorf("dimension %d, want 1352078", ends.Dimension)
	}
}

func BenchmarkSolve(b *testing.B) {
	for _, size := range []int{6, 8, 10} {
		b.Run(fmt.Sprintf("sites=%d/atoms=%d", size, size), func(b *testing.B) {
			l, m := mustChain(b, size)
			b.ReportAllocs()
			for b.Loop() {
				if _, err := Solve(context.Background(), l, m, size, Options{}); err != nil {
					b.Fatal(err)
				}
			}
		})
	}
}
