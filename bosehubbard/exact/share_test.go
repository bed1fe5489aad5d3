package exact

import (
	"context"
	"errors"
	"fmt"
	"reflect"
	"runtime"
	"testing"

	"hilltop/bosehubbard"
	"hilltop/bosehubbard/fock"
	"hilltop/bosehubbard/lattice"
)

// Every number of workers gives the same bits, states of the ends included.
func TestSameBitsForAnyWorkers(t *testing.T) {
	ladder, err := lattice.Build(lattice.Ladder, []int{4}, false)
	if err != nil {
		t.Fatal(err)
	}
	two := bosehubbard.Model{Axes: []bosehubbard.AxisTerms{{Tunnelling: 1, Curvature: -0.1}, {Tunnelling: 0.7}}, Interaction: -2}
	line, one := mustChain(t, 9)
	for _, s := range []struct {
		name  string
		l     *lattice.Lattice
		m     bosehubbard.Model
		atoms int
		opt   Options
	}{
		{"chain", line, one, 9, Options{EndStates: true}},
		{"chain without the mirror", line, one, 9, Options{EndStates: true, Sector: SectorWhole}},
		{"ladder", ladder, two, 8, Options{EndStates: true, MaxOccupation: 5}},
		{"odd ladder", ladder, two, 7, Options{EndStates: true}},
	} {
		var first Ends
		for _, workers := range []int{1, 2, 3, 8} {
			s.opt.Workers = workers
			ends, err := Solve(context.Background(), s.l, s.m, s.atoms, s.opt)
			if err != nil {
				t.Fatal(err)
			}
			ends.BuildSeconds, ends.SolveSeconds = 0, 0
			if workers == 1 {
				first = ends
			} else if !reflect.DeepEqual(ends, first) {
				t.Errorf("%s, %d workers: %+v, want %+v", s.name, workers, ends, first)
			}
		}
	}
}

// One sector and both give the same ends, at fillings that put the ends into
// different sectors too.
func TestMirrorChangesNothing(t *testing.T) {
	for sites := 4; sites <= 9; sites++ {
		for _, atoms := range []int{3, 4, 5, 6} {
			for _, j := range []float64{1, -1} {
				s := chain(sites, atoms, false, -2.1, -0.05)
				s.model.Axes[0].Tunnelling = j
				auto, whole := s.solve(t, Options{}), s.solve(t, Options{Sector: SectorWhole})
				name := fmt.Sprintf("%d atoms on %d sites, J = %g", atoms, sites, j)
				// Both sectors have an end each, close together, if V drives atoms outwards;
				// the whole mixes them within some residuals.
				near(t, name+": floor", auto.Floor, whole.Floor, 1e-12+4*whole.FloorResidual)
				near(t, name+": ceiling", auto.Ceiling, whole.Ceiling, 1e-12+4*whole.CeilingResidual)
				if auto.Dimension != whole.Dimension || whole.FloorParity != 0 {
					t.Errorf("%s: dimension %d, want %d; parity %d of the whole", name, auto.Dimension, whole.Dimension, whole.FloorParity)
				}
				// The sublattices of an even chain change places under its mirror.
				odd := 1
				if sites%2 == 0 && atoms%2 == 1 {
					odd = -1
				}
				if floor, ceiling := auto.FloorParity, auto.CeilingParity; auto.Iterations > 0 && floor != 0 &&
					(j > 0 && (floor != 1 || ceiling != odd) || j < 0 && (floor != odd || ceiling != 1)) {
					t.Errorf("%s: parities %+d and %+d, want one even and the other %+d", name, floor, ceiling, odd)
				}
			}
		}
	}
}

// The figure of a refusal is what a run takes, within five percent.
func TestMemoryIsAsSaid(t *testing.T) {
	if testing.Short() {
		t.Skip("needs a second")
	}
	for _, tc := range []struct {
		sites, atoms int
		opt          Options
	}{
		{12, 12, Options{}}, {12, 12, Options{Sector: SectorWhole}}, {12, 11, Options{}}, {13, 11, Options{}},
		{12, 12, Options{EndStates: true}}, {12, 12, Options{MaxOccupation: 6}},
	} {
		l, m := mustChain(t, tc.sites)
		want := refusal(t, l, m, tc.atoms, tc.opt)
		runtime.GC()
		var before, during runtime.MemStats
		runtime.ReadMemStats(&before)
		most := uint64(0)
		opt := tc.opt
		opt.MaxIterations = 20
		opt.Progress = func(_, _ int) {
			runtime.GC()
			runtime.ReadMemStats(&during)
			most = max(most, during.HeapAlloc-before.HeapAlloc)
		}
		_, err := Solve(context.Background(), l, m, tc.atoms, opt)
		if most == 0 {
			t.Fatalf("%d atoms on %d sites: no progress, %v", tc.atoms, tc.sites, err)
		}
		if ratio := float64(most) / want; ratio < 0.95 || ratio > 1.05 {
			t.Errorf("%d atoms on %d sites, %+v: %d bytes in use, %.0f announced, ratio %.3f", tc.atoms, tc.sites, tc.opt, most, want, ratio)
		}
	}
}

// refusal finds the figure of the refusal that names the whole need.
func refusal(t *testing.T, l *lattice.Lattice, m bosehubbard.Model, atoms int, opt Options) float64 {
	t.Helper()
	opt.MemoryBytes = 1
	var large *fock.TooLargeError
	for range 5 { // a small budget is refused by a rough figure, a larger one by a better
		_, err := Solve(context.Background(), l, m, atoms, opt)
		if !errors.As(err, &large) {
			break
		}
		opt.MemoryBytes = uint64(0.98 * large.BytesWanted)
	}
	return large.BytesWanted
}

// A hundred runs leave nothing behind.
func TestRunsDoNotGrow(t *testing.T) {
	l, m := mustChain(t, 7)
	run := func() {
		if _, err := Solve(context.Background(), l, m, 7, Options{EndStates: true, Workers: 3}); err != nil {
			t.Fatal(err)
		}
	}
	run()
	var before, after runtime.MemStats
	runtime.GC()
	runtime.ReadMemStats(&before)
	routines := runtime.NumGoroutine()
	for range 100 {
		run()
	}
	runtime.GC()
	runtime.ReadMemStats(&after)
	if grown := int64(after.HeapAlloc) - int64(before.HeapAlloc); grown > 1<<18 {
		t.Errorf("100 runs left %d bytes", grown)
	}
	if now := runtime.NumGoroutine(); now > routines {
		t.Errorf("100 runs left %d goroutines, %d before", now, routines)
	}
}
