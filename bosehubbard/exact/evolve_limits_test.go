package exact

import (
	"context"
	"math"
	"math/rand/v2"
	"testing"
)

// The interval misses no more than it may, and the next narrower one would, or the
// whole of what is left is one bin.
func TestLimiterChoosesTheNarrowest(t *testing.T) {
	for seed := range uint64(50) {
		random := rand.New(rand.NewPCG(seed, 7))
		n := 200
		h := &moving{energies: make([]float64, n), diagonal: make([]float64, n)}
		psi := vector{Re: make([]float64, n), Im: make([]float64, n)}
		for i := range n {
			h.energies[i] = 300*random.Float64() - 100
			decay := math.Exp(-math.Abs(h.energies[i]) * 0.2 * random.Float64())
			psi.Re[i], psi.Im[i] = decay*random.NormFloat64(), decay*random.NormFloat64()
		}
		l := limiter{trust: mostTrust}
		time, most := 0.01*random.Float64(), math.Pow(10, -6*random.Float64())
		l.choose(h.energies, psi, time, most)
		h.limit(l.low, l.high)
		// The bins' middles stand for their energies: half a bin on each side.
		bin := 300. / limiterBins
		slack := 2 * math.Pi * time * bin / 2 * norm(psi)
		if got := h.beyond(psi, time); got > most+slack {
			t.Errorf("seed %d: %.3g missed, want at most %.3g + %.3g", seed, got, most, slack)
		}
		if l.high-l.low > 1.5*bin {
			h.limit(l.low+bin, l.high-bin)
			if got := h.beyond(psi, time); got < (most-slack)/2 {
				t.Errorf("seed %d: %.3g missed by a narrower interval, want more than %.3g", seed, got, (most-slack)/2)
			}
		}
		h.limit(math.Inf(-1), math.Inf(1))
		if got := h.beyond(psi, time); got != 0 {
			t.Errorf("seed %d: %.3g missed without limits", seed, got)
		}
	}
	flat := limiter{}
	if flat.choose([]float64{3, 3}, vector{Re: []float64{1, 0}, Im: []float64{0, 0}}, 1, 0.1); flat.low != 3 || flat.high != 3 {
		t.Errorf("equal energies: limits %g and %g, want 3", flat.low, flat.high)
	}
}

// In a sweep from a Mott state the limits save products and keep to their share; the
// state is the same within the budget as with the whole diagonal.
func TestLimitsSaveProducts(t *testing.T) {
	const duration = 0.4
	from, to := uniform(1, 1, 20, 0.05), uniform(1, 1, 4, 0.05)
	state := []int{1, 1, 1, 1, 1, 1, 1}
	segment := Segment{Duration: duration, Drive: path(from, to, duration, linear)}
	e := evolution(t, box(t, []int{7}), from, state, EvolutionOptions{})
	e.must(t, segment)
	fine := segment
	fine.Tolerance = 1e-7
	reference := evolution(t, box(t, []int{7}), from, state, EvolutionOptions{})
	reference.must(t, fine)
	budget := e.Errors()
	if got := e.gap(reference); got > budget.Sum() || budget.Limits == 0 || budget.Limits > fewTimes*limitedShare*DefaultTolerance {
		t.Errorf("off by %.3g with a budget of %+v", got, budget)
	}
	taken, _ := e.Steps()
	if most := 30 * taken; e.Products() > most {
		t.Errorf("%d products in %d steps, want at most %d", e.Products(), taken, most)
	}
}

// A step at whose end the limits turn out to miss too much is taken again without
// them and gives what a step without limits gives.
func TestStepWithBadLimitsIsTakenAgain(t *testing.T) {
	ctx := context.Background()
	const duration = 0.4
	from, to := uniform(1, 1, 20, 0.05), uniform(1, 1, 4, 0.05)
	segment := Segment{Duration: duration, Drive: path(from, to, duration, linear), Tolerance: 1e-6}
	var states [2]*Evolution
	for k, deceived := range []bool{false, true} {
		e := evolution(t, box(t, []int{5}), from, []int{1, 1, 1, 1, 1}, EvolutionOptions{})
		r := &run{Evolution: e, Segment: &segment}
		r.model.Axes = append(r.model.Axes, from.Axes...)
		if err := r.prepare(0, 0.005); err != nil {
			t.Fatal(err)
		}
		if err := r.hamiltonian.tune(ctx, r.tools.first); err != nil {
			t.Fatal(err)
		}
		if deceived { // a start in one number state: nothing seems to be missed
			r.hamiltonian.limit(-1, 1)
			r.tools.low, r.tools.high = -1, 1
		}
		if err := r.build(ctx, 0.005); err != nil {
			t.Fatal(err)
		}
		fine, err := r.exponentials(ctx, 0.005)
		if err != nil || fine == deceived {
			t.Fatalf("limits to 1 Hz %v: fine %v, %v; want to go again with them", deceived, fine, err)
		}
		if deceived {
			if err := r.again(ctx, 0.005); err != nil {
				t.Fatal(err)
			}
		}
		states[k] = e
	}
	if got := states[0].gap(states[1]); got > 1e-8 || states[1].Errors().Limits != 0 {
		t.Errorf("off by %.3g, budget %+v", got, states[1].Errors())
	}
}
