package exact

import (
	"context"
	"fmt"
	"math"
	"slices"

	"hilltop/bosehubbard"
)

// DefaultTolerance of the steps of a Segment.
const DefaultTolerance = 1e-3

// krylovShare is the part of the tolerance that all exponentials together take.
const krylovShare = 0.1

// Segment is a stretch of time without kinks.
type Segment struct {
	Duration float64 // s

	// Drive sets the couplings of m, whose axes are there, for a time from 0 to
	// Duration. It is smooth in between; it may start with a jump. nil holds what is.
	Drive func(m *bosehubbard.Model, t float64)

	Times []float64 // at which to take samples, rising, from 0 to Duration, s

	// Every, if not 0, asks for more samples about so far apart, s, and one at the end.
	// While H changes they fall on the ends of steps, which they shorten
	// to twice Every at most.
	Every float64

	// Tolerance of the state's error from steps in time, ErrorBudget.Ordering; the
	// exponentials take a tenth of it more. 0: DefaultTolerance.
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
	if !(s.Every >= 0) || math.IsInf(s.Every, 1) {
		return fmt.Errorf("samples every %g s, want a finite time of at least 0", s.Every)
	}
	for i, t := range s.Times {
		if !(t >= 0 && t <= s.Duration) || i > 0 && t <= s.Times[i-1] {
			return fmt.Errorf("samples at %v s, want times that rise from 0 up to %g s", s.Times, s.Duration)
		}
	}
	return nil
}

// Run carries the state through a segment and returns its samples in order of
// time. Cost: some 20 products with H for a step that is as long as the tolerance
// allows; while nothing changes, about two products for the time 1/(width of the
// spectrum in Hz).
//
// It returns ctx.Err() if stopped, within 50 ms, an error if the segment or a model
// of its drive makes no sense, or a *krylov.ToleranceError. The state then stands
// at a time in between.
func (e *Evolution) Run(ctx context.Context, s Segment) ([]Sample, error) {
	if err := s.check(); err != nil {
		return nil, wrap(err)
	}
	r := &run{Evolution: e, Segment: &s, begin: e.time}
	pass := r.drive
	if s.Drive == nil {
		pass = r.hold
	}
	if err := pass(ctx); err != nil {
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
	last    float64 // time of the last sample, s
	rest    int     // steps until the next estimate
	change  float64 // of the couplings per time at the last one

	before struct { // the step before, h = 0 before the first
		h, end float64 // length, and what counts as returning at its end
		defect
	}
	model bosehubbard.Model
}

// drive goes from one of the times to the next.
func (r *run) drive(ctx context.Context) error {
	r.model.Axes = make([]bosehubbard.AxisTerms, r.now.axes())
	if r.pace == 0 && r.Duration > 0 {
		if err := r.firstPace(ctx); err != nil {
			return err
		}
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
		if r.wanted(stop) {
			if err := r.sample(ctx, r.psi, stop); err != nil {
				return err
			}
		}
	}
	return nil
}

// wanted reports whether a sample is due at one of the times, or at the end.
func (r *run) wanted(stop float64) bool {
	taken := len(r.samples) > 0 && r.last == stop
	return !taken && (slices.Contains(r.Times, stop) || r.Every > 0 && stop == r.Duration)
}

// couplingsAt reads the drive.
func (r *run) couplingsAt(c couplings, t float64) error {
	r.Drive(&r.model, t)
	return c.set(&r.model)
}

func (r *run) report(t float64) {
	if r.Progress != nil && r.Duration > 0 {
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
	r.last = t
	return nil
}
