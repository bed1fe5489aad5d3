package exact

import (
	"context"
	"fmt"
	"time"

	"hilltop/bosehubbard"
	"hilltop/bosehubbard/fock"
	"hilltop/bosehubbard/lattice"
	"hilltop/bosehubbard/num/lanczos"
)

// denseLimit is the largest dimension that is diagonalised as a full matrix.
const denseLimit = 64

// Options of Solve. The zero value works.
type Options struct {
	Tolerance     float64 // on the residuals, relative to the largest |energy|, from 1e-13; 0: 1e-10
	MaxIterations int     // 0: 2000
	Seed          uint64  // of the random start vector
	MemoryBytes   uint64  // memory that may be used; 0: what the machine has available
	EndStates     bool    // fill FloorState and CeilingState; twice the time

	// Progress, if not nil, is called on the computing goroutine; done never falls.
	Progress func(done, total int)
}

// Ends are both ends of the spectrum of H/h.
type Ends struct {
	Dimension      int
	Floor, Ceiling float64 // Hz, of all atoms together

	// |H x - E x| in Hz for the unit vector x found. An eigenvalue lies within the
	// residual, and much closer, within residual^2/gap, if it stands apart. Levels
	// that crowd closer than that are not told apart: the end may then be off by
	// some times the residual.
	FloorResidual, CeilingResidual float64

	Iterations                 int // products with H in the search, 0 if dense
	Seed                       uint64
	BuildSeconds, SolveSeconds float64

	FloorState, CeilingState *EndState // nil unless asked for
}

// vectors holds the eigenvectors of both ends, or nil.
type vectors struct{ floor, ceiling []float64 }

// Solve finds both ends of the spectrum of atoms bosons on a lattice.
//
// The answer is the same for the same seed. Cost: with D states, 4 vectors of
// length D (6 with EndStates) and some 50 to 500 products with H. It stops within
// 50 ms of ctx.
//
// It returns a *fock.TooLargeError before it allocates anything large, the other
// errors of fock.NewOperator, ctx.Err() if stopped, and the last iterate with an
// error that wraps a *lanczos.NotConvergedError.
func Solve(ctx context.Context, l *lattice.Lattice, m bosehubbard.Model, atoms int, opt Options) (Ends, error) {
	begin := time.Now()
	held := 3 // by the Lanczos recurrence
	if opt.EndStates {
		held += 2
	}
	h, err := fock.NewOperator(ctx, l, m, atoms, fock.Options{MemoryBytes: opt.MemoryBytes, Vectors: held})
	if err != nil {
		return Ends{}, wrap(err)
	}
	built := time.Now()
	var ends Ends
	var v vectors
	if h.Basis.Dimension <= denseLimit {
		ends, v, err = dense(h)
	} else {
		ends, v, err = extremes(ctx, h, opt)
	}
	if err == nil && opt.EndStates {
		err = ends.describe(ctx, h, v)
	}
	ends.BuildSeconds = built.Sub(begin).Seconds()
	ends.SolveSeconds = time.Since(built).Seconds()
	return ends, wrap(err)
}

func wrap(err error) error {
	if err == nil {
		return nil
	}
	return fmt.Errorf("exact: %w", err)
}

// extremes runs Lanczos, looking at ctx between blocks of rows.
func extremes(ctx context.Context, h *fock.Operator, opt Options) (Ends, vectors, error) {
	w := fock.NewWorkspace(h.Basis)
	rows := h.BlockRows()
	d := h.Basis.Dimension
	apply := func(dst, x []float64) {
		for from := 0; from < d && ctx.Err() == nil; from += rows {
			h.ApplyRowsTo(dst, x, from, min(from+rows, d), w)
		}
	}
	r, err := lanczos.Extremes(ctx, d, apply, lanczos.Options{
		Tolerance: opt.Tolerance, MaxIterations: opt.MaxIterations, Seed: opt.Seed,
		Vectors: opt.EndStates, Progress: opt.Progress,
	})
	return Ends{
		Dimension: d, Floor: r.Lowest, Ceiling: r.Highest,
		FloorResidual: r.LowestResidual, CeilingResidual: r.HighestResidual,
		Iterations: r.Iterations, Seed: opt.Seed,
	}, vectors{floor: r.LowestVector, ceiling: r.HighestVector}, err
}
