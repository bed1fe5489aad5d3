package krylov

import (
	"context"
	"math"

	"hilltop/bosehubbard/num/blocks"
)

// blockLength is the number of components in one block of the vector sums. It is
// fixed, so that sums are the same for any number of workers; two parts of three
// vectors of it fit the first cache.
const blockLength = 1024

// fewBlocks take less time than it does to wake a goroutine.
const fewBlocks = 8

// operation is what the blocks of a space are asked to do.
type operation int

const (
	opNorm    operation = iota // partial = |x|^2
	opRecur                    // w = a w + b v + c u, partial = |w|^2
	opCombine                  // w = sum of complex coefficients times vectors, partial = |w|^2
	opSum                      // w = sum of the coefficients' real parts times vectors
	opInner                    // partial, partialIm = <v|w>
	opRemove                   // w -= (cr + i ci) v, partial = |w|^2
)

// space holds the Lanczos vectors, unnormalised, and does the passes over them
// block by block.
type space struct {
	length  int
	vectors []Vector
	norms   []float64 // of the vectors

	workers            int
	do                 func(worker, block int) // block, made once
	partial, partialIm []float64               // per block

	// Arguments of the pass that runs.
	op           operation
	w, v, u      Vector
	a, b, c      float64
	coefficients []complex128 // of the unnormalised vectors
}

func newSpace(length, vectors, workers int) *space {
	count := (length + blockLength - 1) / blockLength
	if count < fewBlocks {
		workers = 1
	}
	s := &space{
		length: length, vectors: make([]Vector, vectors), norms: make([]float64, vectors),
		workers: blocks.Workers(workers), partial: make([]float64, count), partialIm: make([]float64, count),
		coefficients: make([]complex128, vectors),
	}
	s.do = s.block
	for i := range s.vectors {
		s.vectors[i] = NewVector(length)
	}
	return s
}

// block does the running operation on one block.
func (s *space) block(_, number int) {
	lo := number * blockLength
	hi := min(lo+blockLength, s.length)
	w := s.w.slice(lo, hi)
	switch s.op {
	case opNorm:
		s.partial[number] = sumSquares(w.Re) + sumSquares(w.Im)
	case opRecur:
		v, u := s.v.slice(lo, hi), s.u.slice(lo, hi)
		s.partial[number] = recur(w.Re, v.Re, u.Re, s.a, s.b, s.c) + recur(w.Im, v.Im, u.Im, s.a, s.b, s.c)
	case opCombine:
		s.combineBlock(w, lo, hi)
		s.partial[number] = sumSquares(w.Re) + sumSquares(w.Im)
	case opSum:
		s.sumBlock(w, lo, hi)
	case opInner:
		v := s.v.slice(lo, hi)
		s.partial[number] = dot(v.Re, w.Re) + dot(v.Im, w.Im)
		s.partialIm[number] = dot(v.Re, w.Im) - dot(v.Im, w.Re)
	case opRemove:
		v := s.v.slice(lo, hi)
		axpy(w.Re, v.Re, -s.a)
		axpy(w.Re, v.Im, s.b)
		axpy(w.Im, v.Re, -s.b)
		axpy(w.Im, v.Im, -s.a)
		s.partial[number] = sumSquares(w.Re) + sumSquares(w.Im)
	}
}

// combineBlock sums the vectors in pairs, which halves the traffic with the sum.
func (s *space) combineBlock(w Vector, lo, hi int) {
	clear(w.Re)
	clear(w.Im)
	for k := 0; k < len(s.coefficients); k += 2 {
		first, second, c := s.pair(k, lo, hi)
		rotate(w.Re, w.Im, first, second, s.coefficients[k], c)
	}
}

// sumBlock is combineBlock for real coefficients.
func (s *space) sumBlock(w Vector, lo, hi int) {
	clear(w.Re)
	clear(w.Im)
	for k := 0; k < len(s.coefficients); k += 2 {
		first, second, c := s.pair(k, lo, hi)
		stretch(w.Re, first.Re, second.Re, real(s.coefficients[k]), real(c))
		stretch(w.Im, first.Im, second.Im, real(s.coefficients[k]), real(c))
	}
}

// pair returns a block of the vectors k and k+1, and the coefficient of the latter:
// 0 if there is none.
func (s *space) pair(k, lo, hi int) (first, second Vector, c complex128) {
	first = s.vectors[k].slice(lo, hi)
	if k+1 == len(s.coefficients) {
		return first, first, 0
	}
	return first, s.vectors[k+1].slice(lo, hi), s.coefficients[k+1]
}

func (v Vector) slice(lo, hi int) Vector { return Vector{Re: v.Re[lo:hi], Im: v.Im[lo:hi]} }

// pass runs an operation and returns the sum of the partial results in order.
func (s *space) pass(ctx context.Context, op operation) (float64, error) {
	s.op = op
	if err := blocks.Run(ctx, s.workers, len(s.partial), s.do); err != nil {
		return 0, err
	}
	sum := 0.0
	for _, p := range s.partial {
		sum += p
	}
	return sum, nil
}

// norm returns |x|.
func (s *space) norm(ctx context.Context, x Vector) (float64, error) {
	s.w = x
	squared, err := s.pass(ctx, opNorm)
	return math.Sqrt(squared), err
}

// recur turns vector j+1, which holds H times vector j, into the next one of the
// recurrence and returns its norm, beta_j.
func (s *space) recur(ctx context.Context, j int, alpha, betaBefore float64) (float64, error) {
	s.w, s.v, s.u = s.vectors[j+1], s.vectors[j], s.vectors[j]
	s.a, s.b, s.c = 1/s.norms[j], -alpha/s.norms[j], 0
	if j > 0 {
		s.u, s.c = s.vectors[j-1], -betaBefore/s.norms[j-1]
	}
	squared, err := s.pass(ctx, opRecur)
	return math.Sqrt(squared), err
}

// combine sets dst to the sum of normalised vectors with the coefficients
// re + i im and returns its norm.
func (s *space) combine(ctx context.Context, dst Vector, re, im []float64) (float64, error) {
	s.coefficients = s.coefficients[:len(re)]
	for k := range re {
		s.coefficients[k] = complex(re[k]/s.norms[k], im[k]/s.norms[k])
	}
	s.w = dst
	squared, err := s.pass(ctx, opCombine)
	return math.Sqrt(squared), err
}

// sum sets dst to the sum of the first normalised vectors with real coefficients.
func (s *space) sum(ctx context.Context, dst Vector, coefficients []float64) error {
	s.coefficients = s.coefficients[:len(coefficients)]
	for k, c := range coefficients {
		s.coefficients[k] = complex(c/s.norms[k], 0)
	}
	s.w = dst
	_, err := s.pass(ctx, opSum)
	return err
}

// remove takes what vector j+1 has along the vectors 0 to j out of it and returns
// its norm and that of the part removed.
func (s *space) remove(ctx context.Context, j int) (norm, removed float64, err error) {
	for k := range j + 1 {
		s.w, s.v = s.vectors[j+1], s.vectors[k]
		along, err := s.pass(ctx, opInner)
		if err != nil {
			return 0, 0, err
		}
		across := 0.0
		for _, p := range s.partialIm {
			across += p
		}
		s.a, s.b = along/(s.norms[k]*s.norms[k]), across/(s.norms[k]*s.norms[k])
		removed = math.Hypot(removed, s.norms[k]*math.Hypot(s.a, s.b))
		if norm, err = s.pass(ctx, opRemove); err != nil {
			return 0, 0, err
		}
	}
	return math.Sqrt(norm), removed, nil
}
