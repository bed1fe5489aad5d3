package thermo

import (
	"context"
	"errors"
	"fmt"
	"sync/atomic"

	"gonum.org/v1/gonum/floats"

	"hilltop/bosehubbard/num/blocks"
	"hilltop/bosehubbard/num/chebyshev"
)

// trace holds the Chebyshev moments of a spectrum, in units of states: each row is
// one estimate of sum_k T_n(x_k) over the levels. One row is exact.
type trace struct {
	rows   [][]float64
	within chebyshev.Interval
	exact  bool
}

// stochastic estimates the moments with random vectors of a seed, one row each:
// for Gaussian vectors v of the space,
//
//	Tr T_n = D <v|T_n|v>/<v|v>  on average,
//
// with a relative variance of about 2 over the number of levels that count. The
// two sectors of a mirror add up to the row.
//
// Source: Weisse et al., Rev. Mod. Phys. 78, 275 (2006), section II.B.2.
func (s *space) stochastic(ctx context.Context, opt Options, within chebyshev.Interval) (trace, error) {
	t := trace{within: within, rows: newRows(opt.Vectors, opt.Moments)}
	all, err := s.moments(ctx, opt, within, opt.Vectors, func(v []float64, sector, k int) {
		s.sectors[sector].RandomTo(v, opt.Seed, stream(traceStream, sector, k))
	})
	if err != nil {
		return trace{}, err
	}
	for i, h := range s.sectors {
		for k, row := range t.rows {
			floats.AddScaled(row, float64(h.Dimension()), all[i*opt.Vectors+k])
		}
	}
	return t, nil
}

// complete sums the moments over all states of a whole space, which leaves no
// error.
func (s *space) complete(ctx context.Context, opt Options, within chebyshev.Interval) (trace, error) {
	t := trace{within: within, rows: newRows(1, opt.Moments), exact: true}
	all, err := s.moments(ctx, opt, within, s.dimension, func(v []float64, _, k int) {
		clear(v)
		v[k] = 1
	})
	for _, moments := range all {
		floats.Add(t.rows[0], moments)
	}
	return t, err
}

func newRows(count, length int) [][]float64 {
	rows := make([][]float64, count)
	for i := range rows {
		rows[i] = make([]float64, length)
	}
	return rows
}

// moments computes the moments of count vectors of each sector, sector by sector.
// fill writes the start vectors.
//
// A run of one vector touches little memory, and runs do not wait for each other:
// each goroutine has one at a time.
func (s *space) moments(ctx context.Context, opt Options, within chebyshev.Interval, count int, fill func(v []float64, sector, k int)) ([][]float64, error) {
	runs := len(s.sectors) * count
	out, errs := newRows(runs, opt.Moments), make([]error, runs)
	total := runs * (opt.Moments / 2)
	var done atomic.Int64
	ctx, stop := context.WithCancel(ctx)
	defer stop()
	err := blocks.Run(ctx, s.lanes(), runs, func(lane, run int) {
		i, k := run/count, run%count
		v := s.vectors(i, lane)
		fill(v[0], i, k)
		r := chebyshev.Recurrence{Product: s.product(ctx, i, lane), Within: within}
		r.After = func(int, int) {
			if n := done.Add(1); lane == 0 { // the calling goroutine
				opt.report(int(n), total)
			}
		}
		if errs[run] = r.MomentsTo(out[run:run+1], v[:1], v[1:]); errs[run] != nil {
			stop()
		}
	})
	for _, e := range errs {
		if e != nil && !errors.Is(e, context.Canceled) {
			return nil, fmt.Errorf("thermo: %w", e)
		}
	}
	if err != nil {
		return nil, err
	}
	opt.report(total, total)
	return out, errors.Join(errs...)
}
