package passage

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
	"hilltop/bosehubbard/exact"
	"hilltop/bosehubbard/fock"
	"hilltop/bosehubbard/lattice"
	"hilltop/bosehubbard/sequence"
	"hilltop/bosehubbard/thermo"
)

func box(t testing.TB, sites []int, periodic []bool) *lattice.Lattice {
	t.Helper()
	if periodic == nil {
		periodic = make([]bool, len(sites))
	}
	l, err := lattice.Box(sites, periodic)
	if err != nil {
		t.Fatal(err)
	}
	return l
}

func model(j, u, v float64) bosehubbard.Model {
	return bosehubbard.Model{Interaction: u, Axes: []bosehubbard.AxisTerms{{Tunnelling: j, Curvature: v}}}
}

// flip is a chain whose U and V change sign while tunnelling is slow and whose J
// rises afterwards.
func flip(t testing.TB) Sequence {
	return Sequence{
		Lattice: box(t, []int{6}, nil), Atoms: 6, Fock: []int{1, 1, 1, 1, 1, 1}, End: exact.Ceiling,
		Start: model(0.02, 12, 0.1),
		Stages: []Stage{
			{"flip", 0.02, sequence.Linear, model(0.02, -12, -0.1)},
			{"lower", 1.5, sequence.Smooth, model(1, -2.1, -0.1)},
			{"wait", 0.5, sequence.Hold, model(1, -2.1, -0.1)},
		},
	}
}

func simulate(t testing.TB, s Sequence, opt Options) *Result {
	t.Helper()
	r, err := Simulate(context.Background(), s, opt)
	if err != nil {
		t.Fatal(err)
	}
	return r
}

// The flip of the experiment in small: the state ends near the ceiling, at T < 0,
// with its atoms at the corner of the zone; without the flip it ends near the floor.
func TestFlipEndsAtTheCeiling(t *testing.T) {
	s := flip(t)
	r := simulate(t, s, Options{Overlaps: true})
	last := r.Trace[len(r.Trace)-1]
	if got := r.Ends[2].Overlap.Weight; got < 0.9 {
		t.Errorf("weight %.3g of the ceiling, want more than 0.9", got)
	}
	if r.Final.CornerFraction < 0.6 || r.Ends[0].CornerFraction > 0.3 {
		t.Errorf("%.3g at the corner after the flip and %.3g at the end, want 1/4 and most", r.Ends[0].CornerFraction, r.Final.CornerFraction)
	}
	thermal, err := Match(context.Background(), s.Lattice, last.Model, s.Atoms, last.Energy, thermo.CanonicalOptions{})
	if err != nil || !(thermal.PerTunnelling < 0 && thermal.PerTunnelling > -1) || thermal.EntropyPerAtom > 0.3 {
		t.Errorf("%+v, %v; want T a little below 0 and little entropy", thermal, err)
	}
	upright := flip(t)
	upright.End = exact.Floor
	for i := range upright.Stages {
		m := &upright.Stages[i].End
		m.Interaction, m.Axes[0].Curvature = -m.Interaction, -m.Axes[0].Curvature
	}
	mirror := simulate(t, upright, Options{Overlaps: true})
	if got := mirror.Ends[2].Overlap.Weight; math.Abs(got-r.Ends[2].Overlap.Weight) > 0.05 || mirror.Final.CornerFraction > 0.1 {
		t.Errorf("without the flip: weight %.3g of the floor, %.3g at the corner", got, mirror.Final.CornerFraction)
	}
}

// The trace goes from the begin to the end through every stage, with the couplings
// of its times, and the sum of the shares of the energy is the energy.
func TestTraceRunsThroughEveryStage(t *testing.T) {
	s := flip(t)
	s.Stages = append(s.Stages, Stage{"quench", 0, sequence.Linear, model(0.5, 3, 0)}, Stage{"rest", 0.1, sequence.Hold, model(0.5, 3, 0)})
	r := simulate(t, s, Options{Samples: 40})
	if first := r.Trace[0]; first.Time != 0 || math.Abs(first.Energy-0.1*17.5/6) > 1e-14 || math.Abs(first.Kinetic) > 1e-14 {
		t.Errorf("first point %+v", first)
	}
	var stages []int
	last := -1.0
	for _, p := range r.Trace {
		if p.Time < last || p.Time == last && p.Stage != 3 {
			t.Errorf("a point at %g s after one at %g s", p.Time, last)
		}
		last = p.Time
		if !slices.Contains(stages, p.Stage) {
			stages = append(stages, p.Stage)
		}
		if sum := p.Kinetic + p.Interaction + p.Potential; math.Abs(sum-p.Energy) > 1e-12*(1+math.Abs(p.Energy)) {
			t.Errorf("%g s: shares add up to %g, want %g", p.Time, sum, p.Energy)
		}
		if want := p.Model.Interaction * p.Pairs; math.Abs(p.Interaction-want) > 1e-12*(1+math.Abs(want)) {
			t.Errorf("%g s: interaction %g, want U times pairs, %g", p.Time, p.Interaction, want)
		}
	}
	if !slices.Equal(stages, []int{0, 1, 2, 3, 4}) || math.Abs(last-2.12) > 1e-12 || len(r.Ends) != 5 || r.Final.Name != "rest" {
		t.Errorf("stages %v up to %g s, %d ends", stages, last, len(r.Ends))
	}
	end := r.Trace[len(r.Trace)-1]
	if end.Model.Interaction != 3 || end.Model.Axes[0].Tunnelling != 0.5 {
		t.Errorf("the last point has %+v", end.Model)
	}
	if n := len(r.Trace); n < 30 || n > 80 {
		t.Errorf("%d points for 40 asked for", n)
	}
}

// From a later stage: the values at which it starts, the same kind of state, and
// the times of the whole sequence.
func TestFromALaterStage(t *testing.T) {
	s := flip(t)
	late := s.From(1)
	if late.Begin != 0.02 || late.Start.Interaction != -12 || len(late.Stages) != 2 || s.Begin != 0 || len(s.Stages) != 3 {
		t.Fatalf("%+v", late)
	}
	r := simulate(t, late, Options{})
	whole := simulate(t, s, Options{})
	a, b := r.Trace[len(r.Trace)-1], whole.Trace[len(whole.Trace)-1]
	if r.Trace[0].Time != 0.02 || math.Abs(a.Time-b.Time) > 1e-12 {
		t.Errorf("from %g to %g s, want 0.02 to %g", r.Trace[0].Time, a.Time, b.Time)
	}
	if d := math.Abs(a.Energy - b.Energy); d > 0.05 { // tunnelling is slow before
		t.Errorf("energies %g and %g at the end, want nearly the same", a.Energy, b.Energy)
	}
	late.Fock = nil // from the ceiling of the values there
	if r = simulate(t, late, Options{Overlaps: true}); r.Ends[0].Overlap.Weight < 0.9 {
		t.Errorf("weight %.3g of the ceiling from the ceiling", r.Ends[0].Overlap.Weight)
	}
}

func TestSequenceWithoutStages(t *testing.T) {
	s := flip(t)
	s.Stages = nil
	r := simulate(t, s, Options{})
	if len(r.Trace) != 1 || math.Abs(r.Final.CornerFraction-0.25) > 1e-12 || r.Final.Name != "start" {
		t.Errorf("%d points, %+v", len(r.Trace), r.Final)
	}
}

// Canonical values are found again from their energies, at either sign.
//
// Source: full diagonalisation of rings with as many atoms as sites, U/J = 4:
// energies and entropies at four sites, 8 decimals.
func TestMatchFindsTheTemperature(t *testing.T) {
	ring := box(t, []int{4}, []bool{true})
	for _, tc := range []struct{ beta, energy, entropy float64 }{
		{0.5, -1.94884884, 1.46604423}, {-0.2, 20.94479910, 2.47022292}, {0, 9.6, 3.55534806},
	} {
		for _, scale := range []float64{1, 30} { // the unit of energy does not matter
			got, err := Match(context.Background(), ring, model(scale, 4*scale, 0), 4, tc.energy*scale/4, thermo.CanonicalOptions{})
			if err != nil {
				t.Fatal(err)
			}
			if math.Abs(got.Beta*scale-tc.beta) > 1e-5*(0.01+math.Abs(tc.beta)) || math.Abs(4*got.EntropyPerAtom-tc.entropy) > 1e-6 || !got.Exact {
				t.Errorf("energy %g: beta J %.8g, entropy %.9g, want %g and %.9g", tc.energy, got.Beta*scale, 4*got.EntropyPerAtom, tc.beta, tc.entropy)
			}
			if tc.beta == 0 && (got.Beta != 0 || !math.IsInf(got.PerTunnelling, 0)) || tc.beta != 0 && math.Abs(got.PerTunnelling*tc.beta-1) > 1e-5 {
				t.Errorf("energy %g: T %g J, want %g", tc.energy, got.PerTunnelling, 1/tc.beta)
			}
		}
	}
	for _, energy := range []float64{-3.97651302, 24.69846013, -5, 30} { // beyond the ends
		if _, err := Match(context.Background(), ring, model(1, 4, 0), 4, energy/4, thermo.CanonicalOptions{}); !errors.Is(err, ErrAtEnd) {
			t.Errorf("energy %g: %v, want ErrAtEnd", energy, err)
		}
	}
	if got, err := Match(context.Background(), ring, model(0, 4, 0), 4, 1, thermo.CanonicalOptions{}); err != nil || !math.IsNaN(got.PerTunnelling) {
		t.Errorf("without tunnelling: %+v, %v; want no T in units of J", got, err)
	}
}

func TestTooManyStates(t *testing.T) {
	for _, tc := range []struct {
		sites, atoms, largest int
		dimension             string
	}{
		{13, 13, 12, "5200300"}, {20, 20, 12, "68923264410"}, {1_000_000, 1_000_000, 12, ""}, {3, 100_000, 2, ""},
	} {
		begin := time.Now()
		err := CheckSize(tc.sites, tc.atoms, Options{})
		var states *TooManyStatesError
		var size *fock.TooLargeError
		if !errors.As(err, &states) || !errors.As(err, &size) {
			t.Fatalf("%d atoms on %d sites: %v, want a *TooManyStatesError that wraps a *fock.TooLargeError", tc.atoms, tc.sites, err)
		}
		if size.LargestSites != tc.largest || tc.dimension != "" && size.Dimension != tc.dimension || !(size.BytesWanted > 1e9) || size.BytesAvailable == 0 {
			t.Errorf("%d atoms on %d sites: %+v", tc.atoms, tc.sites, size)
		}
		if spent := time.Since(begin); spent > 100*time.Millisecond {
			t.Errorf("%d atoms on %d sites: refused after %v", tc.atoms, tc.sites, spent)
		}
	}
	if err := CheckSize(12, 12, Options{}); err != nil {
		t.Errorf("12 atoms on 12 sites: %v", err)
	}
	s := flip(t)
	var states *TooManyStatesError
	if _, err := Simulate(context.Background(), s, Options{MostStates: 461}); !errors.As(err, &states) || states.Most != 461 {
		t.Errorf("462 states with 461 allowed: %v", err)
	}
	if _, err := Simulate(context.Background(), s, Options{MostStates: 462}); err != nil {
		t.Errorf("462 states with 462 allowed: %v", err)
	}
}

func TestSimulateRefuses(t *testing.T) {
	for _, tc := range []struct {
		change func(s *Sequence)
		want   string
	}{
		{func(s *Sequence) { s.Atoms = 0 }, "0 atoms"},
		{func(s *Sequence) { s.Lattice = nil }, "on a lattice"},
		{func(s *Sequence) { s.Atoms = 7 }, "6 atoms on 6 sites, want 7"},
		{func(s *Sequence) { s.Fock = []int{6} }, "on 1 sites"},
		{func(s *Sequence) { s.Fock = []int{2, -1, 2, 1, 1, 1} }, "-1 atoms"},
		{func(s *Sequence) { s.Stages[1].Duration = -1 }, `"lower" of -1 s`},
		{func(s *Sequence) { s.Stages[1].Duration = math.NaN() }, "NaN"},
		{func(s *Sequence) { s.Stages[1].End.Axes = nil }, "0 axes"},
		{func(s *Sequence) { s.Start.Interaction = math.NaN() }, "NaN"},
		{func(s *Sequence) { s.Stages[0].End.Interaction = math.Inf(1) }, "finite"},
	} {
		s := flip(t)
		tc.change(&s)
		if _, err := Simulate(context.Background(), s, Options{}); err == nil || !strings.Contains(err.Error(), tc.want) {
			t.Errorf("%v, want an error with %q", err, tc.want)
		}
	}
	if _, err := Simulate(context.Background(), flip(t), Options{Tolerance: 2}); err == nil {
		t.Error("tolerance 2: no error")
	}
}

func TestSimulateStopsAndReports(t *testing.T) {
	s := flip(t)
	last := -1
	simulate(t, s, Options{Progress: func(done, total int) {
		if done < last || done > total {
			t.Errorf("progress %d of %d after %d", done, total, last)
		}
		last = done
	}})
	if last < 990 {
		t.Errorf("last progress %d of 1000", last)
	}
	ctx, cancel := context.WithCancel(context.Background())
	cancel()
	if _, err := Simulate(ctx, s, Options{}); !errors.Is(err, context.Canceled) {
		t.Errorf("stopped before it began: %v", err)
	}
}

// The same bits for any number of workers.
func TestWorkersChangeNothing(t *testing.T) {
	var first *Result
	for _, workers := range []int{1, 2, 3} {
		r := simulate(t, flip(t), Options{Workers: workers, Samples: 10})
		if first == nil {
			first = r
		}
		for i := range r.Trace {
			if r.Trace[i].Energy != first.Trace[i].Energy || r.Trace[i].Pairs != first.Trace[i].Pairs {
				t.Fatalf("%d workers, %g s: energy %.17g, want %.17g", workers, r.Trace[i].Time, r.Trace[i].Energy, first.Trace[i].Energy)
			}
		}
	}
}

func ExampleSimulate() {
	l, _ := lattice.Box([]int{4}, []bool{false})
	s := Sequence{
		Lattice: l, Atoms: 4, Fock: []int{1, 1, 1, 1}, End: exact.Ceiling, Start: model(0.05, -20, -0.1),
		Stages: []Stage{{Name: "lower", Duration: 1, Shape: sequence.Smooth, End: model(1, -2, -0.1)}},
	}
	r, err := Simulate(context.Background(), s, Options{Overlaps: true})
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("%d states, %.2f of the ceiling, %.2f of the atoms at the corner\n", r.Dimension, r.Ends[0].Overlap.Weight, r.Final.CornerFraction)
	// Output: 35 states, 0.97 of the ceiling, 0.75 of the atoms at the corner
}
