package exact

import (
	"context"
	"fmt"
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
	gauss  = math.Sqrt(3) / 6
	weight = [2]float64{0.25 + gauss, 0.25 - gauss}
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
	make := func() couplings { return make(couplings, couplingCount) }
	return stepper{
		nodes: [2]couplings{make(), make()}, first: make(), second: make(),
		limiter: limiter{trust: mostTrust}, estimate: newEstimate(make, length),
	}
}

// most and least factors of one change of pace, and the share of the allowed
// error that is aimed at, as a factor of the step.
const (
	leastChange = 0.02
	mostChange  = 3
	cautious    = 0.9
)

// shares of the tolerance: for what stays of the errors of all steps, and for what
// one step has to give back at the end.
const (
	stayingShare   = 0.5
	returningShare = 0.125
)

// fewestSteps of a segment: fewer could miss the shape of its drive.
const fewestSteps = 8

// caution is for what the leading order of the error leaves out.
const caution = 1.5

// widestAngle is how far the frequencies in the state may turn in a step. At 2 pi
// they would be in resonance with the steps: the errors of all steps would add up,
// and the estimate would not know. Some turn three times as fast as the mean.
const widestAngle = 1.6

// ramp takes steps from one time of the segment to another.
func (r *run) ramp(ctx context.Context, from, to float64) error {
	for at := from; at < to; {
		left := to - at
		r.pace = min(r.pace, r.Duration/fewestSteps)
		if r.Every > 0 {
			r.pace = min(r.pace, 2*r.Every)
		}
		steps := math.Max(1, math.Ceil(left/r.pace*(1-1e-9)))
		h := left / steps
		if h < 1e-13*r.Duration {
			return fmt.Errorf("steps of %g s at %g s: the drive is not smooth, or the tolerance of %g too small", h, at, r.Tolerance)
		}
		taken, err := r.step(ctx, at, h)
		if err != nil {
			return err
		}
		if !taken {
			r.count.rejected++
			continue
		}
		r.count.steps++
		if at += h; steps == 1 {
			at = to
		}
		r.time = r.begin + at
		r.report(at)
		if r.Every > 0 && at < to && at-r.last >= r.Every*(1-1e-9) {
			if err := r.couplingsAt(r.now, at); err != nil {
				return err
			}
			if err := r.sample(ctx, r.psi, at); err != nil {
				return err
			}
		}
	}
	return nil
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
	limits := r.before.h > 0 // the state has settled into the first step
	if err := r.first(ctx, h, limits); err != nil {
		return false, err
	}
	error, err := r.estimated(ctx, h)
	if err != nil {
		return false, err
	}
	excess := max(error.staying/(stayingShare*allowed), error.returning/(returningShare*r.Tolerance))
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
		r.count.rejected++
		if err = r.first(ctx, h, false); err == nil {
			_, err = r.exponentials(ctx, h)
		}
	}
	r.account(h, error)
	return true, err
}

// first builds the Krylov space of the first exponential of a step, within limits
// if they are asked for.
func (r *run) first(ctx context.Context, h float64, limits bool) (err error) {
	s := &r.tools
	if err := r.hamiltonian.tune(ctx, s.first); err != nil {
		return err
	}
	if limits {
		s.limiter.choose(r.hamiltonian.energies, r.psi, h, s.limiter.trust*limitedShare*r.Tolerance*h/r.Duration)
		r.hamiltonian.limit(s.limiter.low, s.limiter.high)
	}
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

// estimated returns the error of a step with some caution. After one whose error is
// far below what is allowed, two are taken to have the same, by their lengths, if
// the drive goes on as it did.
func (r *run) estimated(ctx context.Context, h float64) (defect, error) {
	change := r.tools.change() / h
	if r.rest > 0 && change < 1.5*r.change {
		ratio := h / r.before.h
		return defect{returning: r.before.returning * math.Pow(ratio, 4), staying: r.before.staying * math.Pow(ratio, 5)}, nil
	}
	r.rest, r.change = 0, change
	error, err := r.commutators(ctx, h)
	return defect{returning: caution * error.returning, staying: caution * error.staying}, err
}

const (
	easy      = 0.3 // share of what is allowed
	easySteps = 3   // from one estimate to the next
)

// account adds the error of a step to the budget: what returns is there at the
// begin of the segment and, for the time being, at the end of this step, and where
// steps change their length, the change of it, which goes as h^4. What returns is
// known about the begin of a step; where it grows, it is taken to go on growing.
func (r *run) account(h float64, error defect) {
	begin, end := error.returning, error.returning
	if before := r.before; before.h > 0 {
		same := before.returning * math.Pow(h/before.h, 4)
		begin = math.Abs(same - before.returning)
		if same > 0 {
			end *= min(max(error.returning/same, 1), mostGrowth)
		}
	}
	r.budget.Ordering += error.staying + begin + end - r.before.end
	r.before.h, r.before.end, r.before.defect = h, end, error
}

// mostGrowth of what returns, from one step to the next.
const mostGrowth = 4

// exponential applies exp(-i tau H) of the couplings set last to the state.
func (r *run) exponential(ctx context.Context, tau, tolerance float64) error {
	report, err := r.propagator.Exp(ctx, r.psi, tau, tolerance, r.hamiltonian.product)
	r.budget.Krylov += report.Bound
	return err
}

// setPace chooses the length of the next step: what is compared with what is
// allowed goes as h^4.
func (r *run) setPace(h, excess float64) {
	change := float64(mostChange)
	if excess > 0 {
		change = cautious * math.Pow(excess, -0.25)
	}
	r.pace = h * min(max(change, leastChange), mostChange)
}

// firstPace lets the frequencies in the state turn by their widest angle.
func (r *run) firstPace(ctx context.Context) error {
	r.pace = r.Duration
	if err := r.couplingsAt(r.tools.first, 0); err != nil {
		return err
	}
	if err := r.hamiltonian.tune(ctx, r.tools.first); err != nil {
		return err
	}
	if _, _, err := r.propagator.Build(ctx, r.psi, 0, 1, r.hamiltonian.product); err != nil {
		return err
	}
	if f := r.propagator.Frequency(); f > 0 {
		r.pace = cautious * widestAngle / (2 * math.Pi * f)
	}
	return nil
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
	s.first.combine([]float64{2 * weight[0], 2 * weight[1]}, s.nodes[:])
	s.second.combine([]float64{2 * weight[1], 2 * weight[0]}, s.nodes[:])
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
