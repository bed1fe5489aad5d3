package exact

import (
	"context"
	"fmt"
	"math"
)

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

// estimated returns the error of a step with some caution. After one whose error is
// far below what is allowed, two are taken to have the same, by their lengths, if
// the drive goes on as it did.
func (r *run) estimated(ctx context.Context, h float64) (defect, error) {
	change := r.tools.change() / h
	if r.rest > 0 && r.before.h > 0 && change < 1.5*r.change {
		ratio := h / r.before.h
		return defect{returning: r.before.returning * math.Pow(ratio, 4), staying: r.before.staying * math.Pow(ratio, 5)}, nil
	}
	r.rest, r.change = 0, change
	d, err := r.commutators(ctx, h)
	return defect{returning: caution * d.returning, staying: caution * d.staying}, err
}

const (
	easy      = 0.3 // share of what is allowed
	easySteps = 3   // from one estimate to the next
)

// account adds the error of a step to the budget: what returns is there at the
// begin of the segment and, for the time being, at the end of this step, and where
// steps change their length, the change of it, which goes as h^4. What returns is
// known about the begin of a step; where it grows, it is taken to go on growing.
func (r *run) account(h float64, d defect) {
	begin, end := d.returning, d.returning
	if before := r.before; before.h > 0 {
		same := before.returning * math.Pow(h/before.h, 4)
		begin = math.Abs(same - before.returning)
		if same > 0 {
			end *= min(max(d.returning/same, 1), mostGrowth)
		}
	}
	r.budget.Ordering += d.staying + begin + end - r.before.end
	r.before.h, r.before.end, r.before.defect = h, end, d
}

// mostGrowth of what returns, from one step to the next.
const mostGrowth = 4
