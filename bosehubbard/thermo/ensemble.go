package thermo

import (
	"context"
	"errors"
	"fmt"
	"math"
	"sync/atomic"

	"hilltop/bosehubbard/num/blocks"
	"hilltop/bosehubbard/num/quadrature"
)

const (
	mostRuleSteps = 240   // more would take long to diagonalise
	sameLevels    = 1e-13 // of the width: levels of a full diagonalisation that count as one
	chunk         = 8     // betas whose thermal vectors stand in memory at once
)

// ensemble is what the canonical averages of a system are made of: levels, all or
// those found at the ends, and a Gauss rule of the rest for each random vector.
type ensemble struct {
	*space
	opt CanonicalOptions

	exact     bool         // the edges are all levels
	edges     [][]edge     // by sector
	runs      [][]weighted // of each random vector, by sector
	shortRuns [][]weighted // the same of nine tenths of the steps
	low, high float64      // ends of the spectrum, Hz
	close     float64      // distance of levels that count as one, Hz

	ticks atomic.Int64
	total int
}

// ensemble builds the space for the options.
func (s System) ensemble(ctx context.Context, opt CanonicalOptions) (*ensemble, error) {
	r := resources{lanes: opt.Workers, vectors: 2, shared: 8 * opt.withDefaults(1).Levels, memory: opt.MemoryBytes}
	if opt.Observables {
		r.vectors += chunk
	}
	sp, err := s.halves(ctx, r)
	if err != nil {
		return nil, err
	}
	e := &ensemble{space: sp, opt: opt.withDefaults(sp.dimension)}
	e.exact = sp.largest() <= fullLimit && !opt.Observables || sp.largest() <= fullVectorLimit
	return e, nil
}

// solve finds the levels, all or those at the ends, and runs Lanczos from every
// random vector for the others.
func (e *ensemble) solve(ctx context.Context, betas int) error {
	e.total = len(e.sectors) * mostRuleSteps
	if !e.exact {
		passes := 1
		if e.opt.Observables {
			passes += 2 * ((betas + chunk - 1) / chunk)
		}
		e.total += len(e.sectors) * e.opt.Vectors * e.opt.Steps * passes
	}
	if err := e.findLevels(ctx); err != nil {
		return err
	}
	if !e.exact {
		if err := e.runAll(ctx); err != nil {
			return err
		}
	}
	e.findRange()
	return nil
}

// findLevels fills in the edges.
func (e *ensemble) findLevels(ctx context.Context) error {
	e.edges = make([][]edge, len(e.sectors))
	return e.each(ctx, 1, func(ctx context.Context, lane, i, _ int) (err error) {
		switch {
		case !e.exact:
			s := edgeSearch{ensemble: e, lane: lane, sector: i}
			err = s.search(ctx)
			e.edges[i] = s.found
		case e.opt.Observables:
			e.edges[i], err = e.space.states(ctx, i, lane)
		default:
			var levels []float64
			levels, err = e.space.levels(ctx, i, lane)
			for _, energy := range levels {
				e.edges[i] = append(e.edges[i], edge{energy: energy})
			}
		}
		e.tick(lane, mostRuleSteps)
		return err
	})
}

// runAll runs Lanczos from every random vector.
func (e *ensemble) runAll(ctx context.Context) error {
	vectors := e.opt.Vectors
	e.runs, e.shortRuns = make([][]weighted, vectors), make([][]weighted, vectors)
	for k := range vectors {
		e.runs[k], e.shortRuns[k] = make([]weighted, len(e.sectors)), make([]weighted, len(e.sectors))
	}
	return e.each(ctx, vectors, func(ctx context.Context, lane, i, k int) error {
		t, err := e.run(ctx, lane, i, k, nil)
		if err != nil {
			return err
		}
		if e.runs[k][i], err = e.rest(t, i, e.opt.Steps); err != nil {
			return err
		}
		e.shortRuns[k][i], err = e.rest(t, i, e.opt.Steps*9/10)
		return err
	})
}

// each calls do for count vectors of every sector, shared between the lanes, and
// returns the first error that is not a stop.
func (e *ensemble) each(ctx context.Context, count int, do func(ctx context.Context, lane, i, k int) error) error {
	errs := make([]error, len(e.sectors)*count)
	ctx, stop := context.WithCancel(ctx)
	defer stop()
	err := blocks.Run(ctx, e.lanes(), len(errs), func(lane, n int) {
		if errs[n] = do(ctx, lane, n/count, n%count); errs[n] != nil {
			stop()
		}
	})
	return firstError(append(errs, err))
}

// firstError returns the first error that is not a stop, or else a stop.
func firstError(errs []error) error {
	var stopped error
	for _, err := range errs {
		if err != nil && !errors.Is(err, context.Canceled) {
			return err
		}
		if err != nil {
			stopped = err
		}
	}
	return stopped
}

// run does the Lanczos run of vector k of sector i, off the levels found there.
// It is the same every time.
func (e *ensemble) run(ctx context.Context, lane, i, k int, visit func(step int, v []float64)) (*quadrature.Tridiagonal, error) {
	v := e.vectors(i, lane)
	e.sectors[i].RandomTo(v[0], e.opt.Seed, stream(thermalStream, i, k))
	t := make([]quadrature.Tridiagonal, 1)
	r := quadrature.Recurrence{
		Product: e.product(ctx, i, lane), Steps: e.opt.Steps,
		Project: projector(e.edges[i]),
		Visit: func(step int, v [][]float64) error {
			e.tick(lane, 1)
			if visit != nil {
				visit(step, v[0])
			}
			return nil
		},
	}
	err := r.Run(t, make([]float64, 1), v[:1], v[1:2])
	return &t[0], err
}

// tick counts products done; the first lane is the calling goroutine.
func (e *ensemble) tick(lane, n int) {
	done := e.ticks.Add(int64(n))
	if lane == 0 && e.opt.Progress != nil {
		e.opt.Progress(min(int(done), e.total), e.total)
	}
}

// rest is the Gauss rule of a run, in units of the states that were not found at
// the ends.
func (e *ensemble) rest(t *quadrature.Tridiagonal, i, steps int) (weighted, error) {
	states := e.left(i)
	if states == 0 || len(t.Diagonal) == 0 {
		return weighted{}, nil
	}
	rule, err := t.Rule(steps)
	if err != nil {
		return weighted{}, fmt.Errorf("thermo: %w", err)
	}
	for k := range rule.Weight {
		rule.Weight[k] *= states
	}
	return weighted{rule.Node, rule.Weight}, nil
}

// left is the number of states of sector i that are left to the random vectors.
func (e *ensemble) left(i int) float64 {
	return float64(e.sectors[i].Dimension() - len(e.edges[i]))
}

// findRange sets both ends from what has been found.
func (e *ensemble) findRange() {
	e.low, e.high = math.Inf(1), math.Inf(-1)
	see := func(energy float64) { e.low, e.high = min(e.low, energy), max(e.high, energy) }
	for i := range e.sectors {
		for _, level := range e.edges[i] {
			see(level.energy)
		}
		for _, run := range e.runs {
			for _, energy := range run[i].energy {
				see(energy)
			}
		}
	}
	e.close = nearLevels * (e.high - e.low)
	if e.exact {
		e.close = sameLevels * (e.high - e.low)
	}
}

// end is where the energies count from at beta.
func (e *ensemble) end(beta float64) float64 {
	if beta < 0 {
		return e.high
	}
	return e.low
}

// average is the ensemble at beta.
func (e *ensemble) average(beta float64) Average {
	a := average(beta, e.end(beta), e.base(beta), e.drawn(e.runs, beta))
	if e.exact {
		return a
	}
	b := average(beta, e.end(beta), e.base(beta), e.drawn(e.shortRuns, beta))
	a.EnergyError += math.Abs(a.Energy - b.Energy)
	a.EntropyError += math.Abs(a.Entropy - b.Entropy)
	a.VarianceError += math.Abs(a.Variance - b.Variance)
	return a
}

// base sums over the known levels.
func (e *ensemble) base(beta float64) sums {
	var s sums
	one := []float64{1}
	for i := range e.sectors {
		for _, level := range e.edges[i] {
			s.add(weighted{[]float64{level.energy}, one}, beta, e.end(beta), e.close)
		}
	}
	return s
}

// drawn sums over the rules of each random vector.
func (e *ensemble) drawn(runs [][]weighted, beta float64) []sums {
	out := make([]sums, len(runs))
	for k, run := range runs {
		for _, w := range run {
			out[k].add(w, beta, e.end(beta), e.close)
		}
	}
	return out
}
