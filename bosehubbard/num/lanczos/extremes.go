package lanczos

import (
	"context"
	"errors"
	"fmt"
)

const (
	defaultTolerance     = 1e-10
	defaultMaxIterations = 2000
)

// ErrNotFinite says that the product with the matrix gave an infinity or a NaN.
var ErrNotFinite = errors.New("lanczos: the matrix gives numbers that are not finite")

// Ends says which ends of the spectrum are looked for.
type Ends int

const (
	Both Ends = iota
	OnlyLowest
	OnlyHighest
)

// Options of Extremes and Search. The zero value works.
type Options struct {
	Ends          Ends
	Tolerance     float64 // on the residuals, relative to the largest |eigenvalue|; 0: 1e-10
	MaxIterations int     // products with the matrix in the search; 0: 2000
	Seed          uint64  // of the random start vector
	Vectors       bool    // rebuild the vectors of the ends in a second run
	Workers       int     // for sums over vectors; 0: what the machine runs at once

	// Scratch may hold two vectors of length n to work in, from an earlier run.
	Scratch [2][]float64

	// Progress, if not nil, is called on the computing goroutine after products
	// with the matrix. done/total is the share of the digits reached; it never
	// falls.
	Progress func(done, total int)
}

// Result holds the ends of the spectrum. One that was not looked for is as good as
// it came by the way, and its residual says how good.
type Result struct {
	Lowest, Highest float64

	// |A x - Lowest x| and |A x - Highest x| for the unit vectors x of the ends,
	// without Vectors calculated as beta_(m+1) |last component|. An eigenvalue lies
	// within the residual, and within residual^2/gap if it stands apart; eigenvalues
	// that crowd closer than that are not told apart.
	LowestResidual, HighestResidual float64

	LowestVector, HighestVector []float64 // unit vectors of length n, if asked for
	Iterations                  int       // products with the matrix in the search
	Seed                        uint64
}

// NotConvergedError comes with the last iterate.
type NotConvergedError struct {
	Iterations int
	Residual   float64 // the largest of those that have not
}

func (e *NotConvergedError) Error() string {
	return fmt.Sprintf("lanczos: residual %g after %d iterations, more than the tolerance", e.Residual, e.Iterations)
}

// Extremes finds the ends of the symmetric n x n matrix A; apply(dst, x) sets
// dst = A x. It is Search for a product that cannot be stopped or combined, and
// holds one vector more.
//
// It panics if n < 1.
func Extremes(ctx context.Context, n int, apply func(dst, x []float64), opt Options) (Result, error) {
	if n < 1 {
		panic(fmt.Sprintf("lanczos: matrix of size %d, want at least 1", n))
	}
	return Search(ctx, &product{apply: apply, scratch: make([]float64, n)}, opt)
}

// Search finds the lowest and the highest eigenvalue of a matrix, or one of them.
// The tolerance is at least 1e-13, since rounding is not far below.
//
// The start vector is random, so that no end is missed for lack of overlap, and
// the same for the same seed. Where an end is degenerate, its vector is one of
// many. Two vectors are held, and one more for each end with Vectors. Cost:
// Iterations products with A, twice that with Vectors. Every number of workers
// gives the same bits if it does so in the product.
//
// It returns ctx.Err() or another error of the product, a *NotConvergedError with
// the last iterate, an error that wraps ErrNotFinite, or one for a bad option.
func Search(ctx context.Context, m Matrix, opt Options) (Result, error) {
	if opt.Tolerance == 0 {
		opt.Tolerance = defaultTolerance
	}
	if opt.MaxIterations == 0 {
		opt.MaxIterations = defaultMaxIterations
	}
	if !(opt.Tolerance >= closed && opt.Tolerance < 1) {
		return Result{}, fmt.Errorf("lanczos: tolerance %g, want %g to below 1", opt.Tolerance, closed)
	}
	if opt.MaxIterations < 1 {
		return Result{}, fmt.Errorf("lanczos: %d iterations, want at least 1", opt.MaxIterations)
	}
	s := newSearch(newRecurrence(ctx, m, opt.Workers, opt.Scratch), opt)
	if err := s.run(); err != nil {
		return Result{}, err
	}
	if opt.Vectors {
		if err := s.rebuild(); err != nil {
			return Result{}, err
		}
	}
	return s.result()
}

// result reports the ends, with an error if one has not converged.
func (s *search) result() (Result, error) {
	low, high := &s.ends[0], &s.ends[1]
	r := Result{
		Lowest: low.value, LowestResidual: low.residual, LowestVector: low.vector,
		Highest: high.value, HighestResidual: high.residual, HighestVector: high.vector,
		Iterations: s.iterations, Seed: s.opt.Seed,
	}
	worst := 0.0
	for i := range s.ends {
		if s.wanted(i) && !s.ends[i].converged {
			worst = max(worst, s.ends[i].residual)
		}
	}
	if worst > 0 {
		return r, &NotConvergedError{Iterations: s.iterations, Residual: worst}
	}
	return r, nil
}
