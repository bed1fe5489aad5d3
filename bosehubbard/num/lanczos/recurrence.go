package lanczos

import (
	"context"
	"math"
	"math/rand/v2"

	"gonum.org/v1/gonum/floats"
)

// blockLength is the length of vector handled between two looks at ctx: some
// tens of microseconds.
const blockLength = 1 << 15

// recurrence holds the vectors of the three-term recurrence.
type recurrence struct {
	ctx         context.Context
	apply       func(dst, x []float64)
	prev, v, w  []float64
	alpha, beta []float64 // T: alpha[j] = <v_j|A|v_j>, beta[j] couples v_j to v_(j+1)
}

func newRecurrence(ctx context.Context, n int, apply func(dst, x []float64)) *recurrence {
	return &recurrence{ctx: ctx, apply: apply, prev: make([]float64, n), v: make([]float64, n), w: make([]float64, n)}
}

// random starts the recurrence from the random unit vector of a seed and a stream.
func (r *recurrence) random(seed, stream uint64) error {
	source := rand.New(rand.NewPCG(seed, stream))
	return r.start(func(dst []float64, _ int) {
		for i := range dst {
			dst[i] = source.NormFloat64()
		}
	})
}

// start starts the recurrence from the vector that fill writes, block by block
// from the given offset, and normalises it.
func (r *recurrence) start(fill func(dst []float64, offset int)) error {
	r.alpha, r.beta = r.alpha[:0], r.beta[:0]
	norm := 0.0
	err := r.blocks(func(lo, hi int) {
		clear(r.prev[lo:hi])
		fill(r.v[lo:hi], lo)
		norm = math.Hypot(norm, floats.Norm(r.v[lo:hi], 2))
	})
	if err != nil {
		return err
	}
	return r.blocks(func(lo, hi int) { divide(r.v[lo:hi], norm) })
}

// step appends alpha and beta of the next step and moves on to the next Lanczos
// vector, which is left undefined if beta is 0.
func (r *recurrence) step() error {
	if err := r.product(r.w, r.v); err != nil {
		return err
	}
	last := 0.0
	if len(r.beta) > 0 {
		last = r.beta[len(r.beta)-1]
	}
	alpha := 0.0
	err := r.blocks(func(lo, hi int) { // Paige's order: subtract, then project
		floats.AddScaled(r.w[lo:hi], -last, r.prev[lo:hi])
		alpha += floats.Dot(r.v[lo:hi], r.w[lo:hi])
	})
	if err != nil {
		return err
	}
	beta := 0.0
	err = r.blocks(func(lo, hi int) {
		floats.AddScaled(r.w[lo:hi], -alpha, r.v[lo:hi])
		beta = math.Hypot(beta, floats.Norm(r.w[lo:hi], 2)) // neither overflows nor underflows
	})
	if err != nil {
		return err
	}
	if sum := math.Abs(alpha) + beta; math.IsNaN(sum) || math.IsInf(sum, 0) {
		return ErrNotFinite
	}
	r.alpha, r.beta = append(r.alpha, alpha), append(r.beta, beta)
	r.prev, r.v, r.w = r.v, r.w, r.prev
	if beta == 0 {
		return nil
	}
	return r.blocks(func(lo, hi int) { divide(r.v[lo:hi], beta) })
}

// product computes dst = A x.
func (r *recurrence) product(dst, x []float64) error {
	if err := r.ctx.Err(); err != nil {
		return err
	}
	r.apply(dst, x)
	return r.ctx.Err()
}

// blocks calls do for consecutive stretches of the vectors, in order, so that
// sums are the same in every run.
func (r *recurrence) blocks(do func(lo, hi int)) error {
	n := len(r.v)
	for lo := 0; lo < n; lo += blockLength {
		if err := r.ctx.Err(); err != nil {
			return err
		}
		do(lo, min(lo+blockLength, n))
	}
	return nil
}

func divide(x []float64, by float64) {
	for i := range x {
		x[i] /= by
	}
}
