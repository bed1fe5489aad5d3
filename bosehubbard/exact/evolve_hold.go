package exact

import (
	"context"
	"math"
	"slices"
)

// hold lets the state turn under a constant H. Samples come from the Krylov space
// that carries the state past them.
func (r *run) hold(ctx context.Context) error {
	if err := r.hamiltonian.tune(ctx, r.now); err != nil {
		return err
	}
	times := r.holdTimes()
	for at := 0.0; ; {
		left := r.Duration - at
		tolerance := krylovShare * r.Tolerance
		if left < r.Duration {
			tolerance *= left / r.Duration
		}
		reach, bound, err := r.propagator.Build(ctx, r.psi, 2*math.Pi*left, tolerance, r.hamiltonian.product)
		if err != nil {
			return err
		}
		done := at + reach/(2*math.Pi)
		if reach >= 2*math.Pi*left {
			done = r.Duration
		}
		for ; len(times) > 0 && times[0] <= done; times = times[1:] {
			if err := r.sampleAhead(ctx, times[0], times[0]-at); err != nil {
				return err
			}
		}
		if _, err := r.propagator.AdvanceTo(ctx, r.psi, reach); err != nil {
			return err
		}
		r.budget.Krylov += bound
		at, r.time = done, r.begin+done
		if r.report(at); at >= r.Duration {
			return nil
		}
	}
}

// sampleAhead observes the state some time after that of the Krylov space.
func (r *run) sampleAhead(ctx context.Context, t, ahead float64) error {
	held := r.scratch[3]
	if _, err := r.propagator.AdvanceTo(ctx, held, 2*math.Pi*ahead); err != nil {
		return err
	}
	return r.sample(ctx, held, t)
}

// holdTimes lists when to take samples: Times, multiples of Every, and with that
// the end.
func (r *run) holdTimes() []float64 {
	times := slices.Clone(r.Times)
	if r.Every > 0 {
		for k := 1.0; k*r.Every < r.Duration*(1-1e-9); k++ {
			times = append(times, k*r.Every)
		}
		times = append(times, r.Duration)
		slices.Sort(times)
		times = slices.Compact(times)
	}
	return times
}
