package thermo

import (
	"context"
	"errors"
	"fmt"
	"math"
	"slices"

	"hilltop/bosehubbard/num/blocks"
	"hilltop/bosehubbard/num/quadrature"
)

// The interval of a Chebyshev expansion has a margin on both sides of the ends of
// the spectrum. A Lanczos run finds them from inside, off by about the square of
// the residual over a gap, so that a residual of roughResidual is far enough below
// the margin. Both are relative to the width of the spectrum.
const (
	margin        = 0.005 // of the width: a percent of the half width
	roughResidual = 2e-3
	firstSteps    = 40
	mostSteps     = 160 // more would take long to diagonalise
)

// ends finds both ends of the spectrum roughly, to some 1e-5 of its width, by runs
// that double until they are good enough.
func (s *space) ends(ctx context.Context, seed uint64) (floor, ceiling float64, err error) {
	low, high, errs := make([]float64, len(s.sectors)), make([]float64, len(s.sectors)), make([]error, len(s.sectors))
	err = blocks.Run(ctx, s.lanes(), len(s.sectors), func(lane, i int) {
		low[i], high[i], errs[i] = s.sectorEnds(ctx, i, lane, seed)
	})
	return slices.Min(low), slices.Max(high), errors.Join(append(errs, err)...)
}

// sectorEnds finds both ends of sector i in a lane.
func (s *space) sectorEnds(ctx context.Context, i, lane int, seed uint64) (low, high float64, err error) {
	run := make([]quadrature.Tridiagonal, 1)
	v := s.vectors(i, lane)
	for steps := firstSteps; ; steps *= 2 {
		s.sectors[i].RandomTo(v[0], seed, stream(endStream, i, 0))
		r := quadrature.Recurrence{Product: s.product(ctx, i, lane), Steps: steps}
		if err := r.Run(run, make([]float64, 1), v[:1], v[1:]); err != nil {
			return 0, 0, err
		}
		rule, err := run[0].Rule(steps)
		if err != nil {
			return 0, 0, fmt.Errorf("thermo: %w", err)
		}
		m := len(rule.Node)
		low, high = rule.Node[0], rule.Node[m-1]
		worst, y := 0.0, make([]float64, m)
		for _, k := range []int{0, m - 1} {
			rule.PartTo(y, k, k+1)
			worst = max(worst, run[0].Next(m)*math.Abs(y[m-1]))
		}
		if worst <= roughResidual*(high-low) || m < steps || steps >= mostSteps {
			return low, high, nil
		}
	}
}

// Streams of random numbers for what needs its own.
const (
	traceStream   = iota // vectors of a stochastic trace
	endStream            // start of a search for the ends
	edgeStream           // start of a search for levels at the ends
	thermalStream        // vectors of canonical averages
)

// stream numbers the random vectors: use, sector and count.
func stream(use, sector, count int) uint64 {
	return uint64(use)<<24 | uint64(sector)<<22 | uint64(count)
}
