package exact

import (
	"context"
	"math"

	"hilltop/bosehubbard/num/krylov"
)

type vector = krylov.Vector

// A step of length h from the time t is the product of two exponentials,
//
//	exp(-i pi h X2) exp(-i pi h X1),   X1 = 2 (a1 H1 + a2 H2),   X2 = 2 (a2 H1 + a1 H2),
//	a = 1/4 +- sqrt(3)/6,   H1, H2 at t + (1/2 -+ sqrt(3)/6) h,
//
// of fourth order and exactly unitary.
//
// Source: Blanes and Moan, Appl. Numer. Math. 56, 1519 (2006), from memory; the
// order is tested.
var (
	gauss   = math.Sqrt(3) / 6
	weights = [2]float64{0.25 + gauss, 0.25 - gauss}
)

// stepper holds the couplings of a step and the scratch of its estimate.
type stepper struct {
	nodes  [2]couplings // at the Gauss points
	first  couplings    // X1
	second couplings    // X2

	reach, bound float64 // of the Krylov space of the first exponential
	missed       float64 // by its limits

	limiter
	estimate
}

func newStepper(couplingCount, length int) stepper {
	list := func() couplings { return make(couplings, couplingCount) }
	return stepper{
		nodes: [2]couplings{list(), list()}, first: list(), second: list(),
		limiter: limiter{trust: mostTrust}, estimate: newEstimate(list, length),
	}
}

// step tries one step and sets the pace of the next. It leaves psi alone if the
// estimated error is too large.
func (r *run) step(ctx context.Context, at, h float64) (taken bool, err error) {
	s := &r.tools
	if err := r.prepare(at, h); err != nil {
		return false, err
	}
	allowed := r.Tolerance * h / r.Duration
	if !s.proportional() {
		return r.doubled(ctx, at, h, allowed)
	}
	if err := r.hamiltonian.tune(ctx, s.first); err != nil {
		return false, err
	}
	if r.before.h > 0 { // the state has settled into the first step
		s.limiter.choose(r.hamiltonian.energies, r.psi, h, s.limiter.trust*limitedShare*allowed)
		r.hamiltonian.limit(s.limiter.low, s.limiter.high)
	}
	if err := r.build(ctx, h); err != nil {
		return false, err
	}
	d, err := r.estimated(ctx, h)
	if err != nil {
		return false, err
	}
	excess := max(d.staying/(stayingShare*allowed), d.returning/(returningShare*r.Tolerance))
	if r.rest--; excess < easy && r.rest < 0 {
		r.rest = easySteps - 1
	}
	if !s.constant() {
		excess = max(excess, math.Pow(2*math.Pi*h*r.propagator.Frequency()/widestAngle, 4))
	}
	if r.setPace(h, excess); excess > 1 {
		return false, nil
	}
	fine, err := r.exponentials(ctx, h)
	if err == nil && !fine {
		err = r.again(ctx, h)
	}
	r.account(h, d)
	return true, err
}

// again takes a step without limits.
func (r *run) again(ctx context.Context, h float64) error {
	r.count.rejected++
	if err := r.hamiltonian.tune(ctx, r.tools.first); err != nil {
		return err
	}
	if err := r.build(ctx, h); err != nil {
		return err
	}
	_, err := r.exponentials(ctx, h)
	return err
}

// build builds the Krylov space of the first exponential of a step.
func (r *run) build(ctx context.Context, h float64) (err error) {
	s := &r.tools
	s.missed = r.hamiltonian.beyond(r.psi, h)
	s.reach, s.bound, err = r.propagator.Build(ctx, r.psi, math.Pi*h, r.krylovTolerance(h), r.hamiltonian.product)
	return err
}

// krylovTolerance is that of one of the exponentials of a step.
func (r *run) krylovTolerance(h float64) float64 {
	return krylovShare * r.Tolerance * h / r.Duration / 2
}

// exponentials applies both to the state, the first from the Krylov space built
// last. If the limits turn out to miss too much, it leaves the state as it was.
func (r *run) exponentials(ctx context.Context, h float64) (fine bool, err error) {
	s := &r.tools
	tau, tolerance := math.Pi*h, r.krylovTolerance(h)
	limits, start, before := r.hamiltonian.limited, r.scratch[0], r.budget
	if limits {
		start.CopyFrom(r.psi)
	}
	if _, err := r.propagator.AdvanceTo(ctx, r.psi, s.reach); err != nil {
		return false, err
	}
	r.budget.Krylov += s.bound
	if s.reach < tau {
		if err := r.exponential(ctx, tau-s.reach, tolerance*(1-s.reach/tau)); err != nil {
			return false, err
		}
	}
	if err := r.hamiltonian.tune(ctx, s.second); err != nil {
		return false, err
	}
	if limits {
		r.hamiltonian.limit(s.limiter.low, s.limiter.high)
	}
	if err := r.exponential(ctx, tau, tolerance); err != nil || !limits {
		return true, err
	}
	missed := max(s.missed, r.hamiltonian.beyond(r.psi, h))
	if s.limiter.judge(missed, limitedShare*r.Tolerance*h/r.Duration) {
		r.psi.CopyFrom(start)
		r.budget = before
		return false, nil
	}
	r.budget.Limits += missed
	return true, nil
}

// exponential applies exp(-i tau H) of the couplings set last to the state.
func (r *run) exponential(ctx context.Context, tau, tolerance float64) error {
	report, err := r.propagator.Exp(ctx, r.psi, tau, tolerance, r.hamiltonian.product)
	r.budget.Krylov += report.Bound
	return err
}

// prepare reads the drive at the Gauss points, and around the middle for the
// estimate.
func (r *run) prepare(at, h float64) error {
	s := &r.tools
	for k, sign := range [2]float64{-1, 1} {
		if err := r.couplingsAt(s.nodes[k], at+h*(0.5+sign*gauss)); err != nil {
			return err
		}
	}
	s.first.combine([]float64{2 * weights[0], 2 * weights[1]}, s.nodes[:])
	s.second.combine([]float64{2 * weights[1], 2 * weights[0]}, s.nodes[:])
	for k := range s.samples {
		if err := r.couplingsAt(s.samples[k], at+h*float64(k)/4); err != nil {
			return err
		}
	}
	s.expand()
	return nil
}

// plain takes a step without an estimate.
func (r *run) plain(ctx context.Context, at, h, tolerance float64) error {
	if err := r.prepare(at, h); err != nil {
		return err
	}
	for _, c := range []couplings{r.tools.first, r.tools.second} {
		if err := r.hamiltonian.tune(ctx, c); err != nil {
			return err
		}
		if err := r.exponential(ctx, math.Pi*h, tolerance/2); err != nil {
			return err
		}
	}
	return nil
}

// doubled takes two steps of half the length and estimates their error by the
// distance from a whole one, a sixteenth of whose error theirs is.
func (r *run) doubled(ctx context.Context, at, h, allowed float64) (taken bool, err error) {
	start, whole, before := r.scratch[1], r.scratch[2], r.budget
	start.CopyFrom(r.psi)
	tolerance := krylovShare * allowed
	if err := r.plain(ctx, at, h, tolerance/4); err != nil {
		return false, err
	}
	whole.CopyFrom(r.psi)
	r.psi.CopyFrom(start)
	r.budget = before
	for k := range 2 {
		if err := r.plain(ctx, at+h/2*float64(k), h/2, tolerance/2); err != nil {
			return false, err
		}
	}
	squared := 0.0
	for i := range whole.Re {
		re, im := r.psi.Re[i]-whole.Re[i], r.psi.Im[i]-whole.Im[i]
		squared += re*re + im*im
	}
	ordering := math.Sqrt(squared) / 15
	if r.setPace(h, ordering/allowed); ordering > allowed {
		r.psi.CopyFrom(start)
		r.budget = before
		return false, nil
	}
	r.budget.Ordering += ordering
	return true, nil
}
