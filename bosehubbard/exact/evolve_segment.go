package exact

import (
	"context"
	"fmt"
	"math"
	"slices"

	"hilltop/bosehubbard"
)

// DefaultTolerance of the steps of a Segment.
const DefaultTolerance = 1e-4

// krylovShare is the part of the tolerance that all exponentials together take.
const krylovShare = 0.1

// Segment is a stretch of time without kinks.
type Segment struct {
	Duration float64 // s

	// Drive sets the couplings of m, whose axes are there, for a time from 0 to
	// Duration. It is smooth in between; it may start with a jump. nil holds what is.
	Drive func(m *bosehubbard.Model, t float64)

	Times []float64 // at which to take samples, in order, from 0 to Duration, s

	// Tolerance of the estimated errors of all steps together, ErrorBudget.Ordering;
	// the exponentials take a tenth of it more. 0: DefaultTolerance.
	Tolerance float64

	// Progress, if not nil, is called on the computing goroutine.
	Progress func(done, total int)
}

// check refuses what is no segment.
func (s *Segment) check() error {
	if !(s.Duration >= 0) || math.IsInf(s.Duration, 1) {
		return fmt.Errorf("duration %g s, want a finite number of at least 0", s.Duration)
	}
	if s.Tolerance == 0 {
		s.Tolerance = DefaultTolerance
	}
	if !(s.Tolerance > 0 && s.Tolerance < 1) {
		return fmt.Errorf("tolerance %g, want above 0 and below 1", s.Tolerance)
	}
	last := 0.0
	for _, t := range s.Times {
		if !(t >= last && t <= s.Duration) {
			return fmt.Errorf("sample at %g s after one at %g s, want them in order up to %g s", t, last, s.Duration)
		}
		last = t
	}
	return nil
}

// Run carries the state through a segment and returns a sample for each of its
// times. Cost: some 20 products with H for a step that is as long as the tolerance
// allows; while nothing changes, about one product for the time 1/(2 width), width
// in Hz that of the spectrum.
//
// It returns ctx.Err() if stopped, within 50 ms, an error if the segment or a model
// of its drive makes no sense, or a *krylov.ToleranceError. The state then stands
// at a time in between.
func (e *Evolution) Run(ctx context.Context, s Segment) ([]Sample, error) {
	if err := s.check(); err != nil {
		return nil, wrap(err)
	}
	r := &run{Evolution: e, Segment: &s, begin: e.time}
	err := r.all(ctx)
	if err != nil {
		return r.samples, wrap(err)
	}
	e.time = r.begin + s.Duration
	return r.samples, nil
}

// run is the progress through one segment.
type run struct {
	*Evolution
	*Segment
	begin   float64 // s, of the evolution
	samples []Sample
	model   bosehubbard.Model
}

func (r *run) all(ctx context.Context) error {
	if r.Drive == nil {
		return r.hold(ctx)
	}
	r.model.Axes = make([]bosehubbard.AxisTerms, r.now.axes())
	r.pace = min(r.pace, r.Duration)
	if r.pace == 0 {
		r.pace = r.Duration / 8
	}
	at := 0.0
	for _, stop := range append(slices.Clone(r.Times), r.Duration) {
		if err := r.ramp(ctx, at, stop); err != nil {
			return err
		}
		if err := r.couplingsAt(r.now, stop); err != nil {
			return err
		}
		at, r.time = stop, r.begin+stop
		if len(r.samples) < len(r.Times) {
			if err := r.sample(ctx, r.psi, stop); err != nil {
				return err
			}
		}
	}
	return nil
}

// couplingsAt reads the drive.
func (r *run) couplingsAt(c couplings, t float64) error {
	r.Drive(&r.model, t)
	return c.set(&r.model)
}

func (r *run) report(t float64) {
	if r.Progress != nil {
		const total = 1000
		r.Progress(int(total*t/r.Duration), total)
	}
}

// sample observes a state at a time of the segment.
func (r *run) sample(ctx context.Context, psi vector, t float64) error {
	s, err := r.observe(ctx, psi)
	if err != nil {
		return err
	}
	s.Time = r.begin + t
	r.samples = append(r.samples, s)
	return nil
}

// hold lets the state turn under a constant H. Samples come from the Krylov space
// that carries the state past them.
func (r *run) hold(ctx context.Context) error {
	if err := r.hamiltonian.tune(ctx, r.now); err != nil {
		return err
	}
	next := 0
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
		held := r.scratch[3]
		for ; next < len(r.Times) && r.Times[next] <= done; next++ {
			if _, err := r.propagator.AdvanceTo(ctx, held, 2*math.Pi*(r.Times[next]-at)); err != nil {
				return err
			}
			if err := r.sample(ctx, held, r.Times[next]); err != nil {
				return err
			}
		}
		if _, err := r.propagator.AdvanceTo(ctx, r.psi, reach); err != nil {
			return err
		}
		r.budget.Krylov += bound
		at, r.time = done, r.begin+done
		r.report(at)
		if at >= r.Duration {
			return nil
		}
	}
}
