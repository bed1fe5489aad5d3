package thermo

import (
	"context"
	"errors"
	"fmt"
	"math"
	"time"

	"hilltop/bosehubbard/num/chebyshev"
)

// ErrOneEnergy says that all levels have the same energy, so that there is no S(E).
var ErrOneEnergy = errors.New("all levels have one energy")

// Options of Entropy. The zero value works.
type Options struct {
	Floor, Ceiling float64 // both ends of the spectrum if known, Hz; both 0: found

	Points  int  // of the curve; 0: 200
	Moments int  // of the expansion, even; 0: 2.5 sqrt(dimension), 32 to 256
	Vectors int  // random vectors, at least 2; 0: 8, more below 150,000 states
	Volume  bool // fill VolumeEntropy and VolumeBeta

	Seed        uint64 // of the random vectors
	Workers     int    // goroutines; below 1: what the machine runs at once
	MemoryBytes uint64 // memory that may be used; 0: what the machine has available

	// Progress, if not nil, is called on the computing goroutine; done never falls.
	Progress func(done, total int)
}

const (
	completeLimit = 2000    // states up to which its trace runs over all of them: under a second
	steadyStates  = 150_000 // states times vectors/8 that keep the error of S below 0.1

	mostPoints  = 1_000_000
	mostMoments = 1 << 16
	mostVectors = 1 << 16
)

func (o Options) resources() resources {
	return resources{lanes: o.Workers, vectors: 2, memory: o.MemoryBytes}
}

func (o Options) report(done, total int) {
	if o.Progress != nil {
		o.Progress(done, total)
	}
}

// check refuses options that make no sense and sets the number of points.
func (o Options) check() (Options, error) {
	if o.Points == 0 {
		o.Points = 200
	}
	switch {
	case o.Points < 2 || o.Points > mostPoints:
		return o, fmt.Errorf("thermo: %d points, want 2 to %d", o.Points, mostPoints)
	case o.Moments != 0 && (o.Moments < 8 || o.Moments > mostMoments || o.Moments%2 != 0):
		return o, fmt.Errorf("thermo: %d moments, want an even number from 8 to %d", o.Moments, mostMoments)
	case o.Vectors != 0 && (o.Vectors < 2 || o.Vectors > mostVectors):
		return o, fmt.Errorf("thermo: %d random vectors, want 2 to %d", o.Vectors, mostVectors)
	case (o.Floor != 0 || o.Ceiling != 0) && !(o.Floor < o.Ceiling && !math.IsInf(o.Ceiling-o.Floor, 0)):
		return o, fmt.Errorf("thermo: ends %g and %g Hz of the spectrum, want the floor below the ceiling", o.Floor, o.Ceiling)
	}
	return o, nil
}

// withDefaults chooses moments and vectors for a number of states: so many moments
// that a broadened level still covers many others, and so many vectors that the
// error of S stays below 0.1 but for the outermost percent of the states.
func (o Options) withDefaults(dimension int) Options {
	if o.Moments == 0 {
		o.Moments = min(max(2*int(1.25*math.Sqrt(float64(dimension))), 32), 256)
	}
	if o.Vectors == 0 {
		o.Vectors = 8 * max(1, (steadyStates+dimension-1)/dimension)
	}
	return o
}

// Entropy computes the density of states, S(E) and beta(E) of a system. It stops
// within 50 ms of ctx. The numbers depend on the seed, not on Workers.
//
// Up to 500 states of each sector of a mirror the spectrum is diagonalised in full,
// up to 2000 in all the trace runs over all states, and beyond over random vectors;
// see doc.go. Cost: Moments/2 products with each vector and 40 before; 2 vectors for
// each goroutine, or for all if the memory is short.
//
// It returns a *fock.TooLargeError before it allocates anything large, one that
// wraps a *chebyshev.OutsideError if given ends leave out a part of the spectrum,
// one that wraps ErrOneEnergy, and ctx.Err() if stopped.
func Entropy(ctx context.Context, s System, opt Options) (*Curve, error) {
	begin := time.Now()
	opt, err := opt.check()
	if err != nil {
		return nil, err
	}
	sp, err := s.halves(ctx, opt.resources())
	if err != nil {
		return nil, err
	}
	built := time.Now()
	var c *Curve
	if opt.Vectors == 0 && sp.largest() <= fullLimit {
		c, err = fullCurve(ctx, sp, opt.withDefaults(sp.dimension))
	} else {
		c, err = s.momentCurve(ctx, sp, opt)
	}
	if err != nil {
		return nil, err
	}
	c.Dimension, c.Unit, c.Mean, c.Seed = sp.dimension, s.Unit(), sp.mean(), opt.Seed
	c.fill(opt)
	c.BuildSeconds, c.SolveSeconds = built.Sub(begin).Seconds(), time.Since(built).Seconds()
	return c, nil
}

// fullCurve takes the moments of the levels.
func fullCurve(ctx context.Context, sp *space, opt Options) (*Curve, error) {
	levels, err := sp.spectrum(ctx)
	if err != nil {
		return nil, err
	}
	floor, ceiling := levels[0], levels[len(levels)-1]
	within, err := interval(floor, ceiling)
	if err != nil {
		return nil, err
	}
	opt.report(1, 1)
	return newCurve(traceOf(levels, within, opt.Moments), floor, ceiling), nil
}

// momentCurve takes the moments of vectors.
func (s System) momentCurve(ctx context.Context, sp *space, opt Options) (*Curve, error) {
	all := opt.Vectors == 0 && sp.dimension <= completeLimit
	opt = opt.withDefaults(sp.dimension)
	if all && len(sp.sectors) > 1 {
		var err error
		if sp, err = s.whole(ctx, opt.resources()); err != nil {
			return nil, err
		}
	}
	floor, ceiling := opt.Floor, opt.Ceiling
	if floor == 0 && ceiling == 0 {
		var err error
		if floor, ceiling, err = sp.ends(ctx, opt.Seed); err != nil {
			return nil, err
		}
	}
	within, err := interval(floor, ceiling)
	if err != nil {
		return nil, err
	}
	sum := sp.stochastic
	if all {
		sum = sp.complete
	}
	t, err := sum(ctx, opt, within)
	if err != nil {
		return nil, err
	}
	return newCurve(t, floor, ceiling), nil
}

// interval adds the margin to both ends.
func interval(floor, ceiling float64) (chebyshev.Interval, error) {
	width := ceiling - floor
	if !(width > 1e-12*math.Max(math.Abs(floor), math.Abs(ceiling))) {
		return chebyshev.Interval{}, fmt.Errorf("thermo: %w, at %g Hz", ErrOneEnergy, floor)
	}
	return chebyshev.Interval{Low: floor - margin*width, High: ceiling + margin*width}, nil
}
