package lanczos

import (
	"context"
	"errors"
	"math"
	"math/rand/v2"

	"gonum.org/v1/gonum/floats"

	"hilltop/bosehubbard/num/blocks"
)

// blockLength is the length of vector handled between two looks at ctx, and the
// unit in which sums are made: some tens of microseconds.
const blockLength = 1 << 15

// recurrence holds the two vectors of the three-term recurrence
//
//	u_(j+1) = A v_j - alpha_j v_j - beta_j v_(j-1),   v_j = u_j / beta_j
//
// The vectors are kept as they come, without the division, and the next one is
// built in the place of the one before.
type recurrence struct {
	ctx         context.Context
	matrix      Matrix
	workers     int
	u, before   []float64 // u_j and u_(j-1)
	norm        float64   // |u_j|, in units of 1/scale but for the start vector
	normBefore  float64
	scale       float64   // a power of two that keeps squares in range; 0: not yet known
	alpha, beta []float64 // T: alpha[j] = <v_j|A|v_j>, beta[j] couples v_j to v_(j+1)
	sums        []float64 // of the blocks
}

func newRecurrence(ctx context.Context, m Matrix, workers int, scratch [2][]float64) *recurrence {
	r := &recurrence{ctx: ctx, matrix: m, workers: blocks.Workers(workers), u: scratch[0], before: scratch[1]}
	n := m.Len()
	if len(r.u) != n {
		r.u = make([]float64, n)
	}
	if len(r.before) != n {
		r.before = make([]float64, n)
	}
	r.sums = make([]float64, (n+blockLength-1)/blockLength)
	return r
}

// random starts the recurrence from the random vector of a seed and a stream; each
// block has a generator of its own.
func (r *recurrence) random(seed, stream uint64) error {
	return r.start(func(dst []float64, offset int) {
		source := rand.New(rand.NewPCG(seed, stream<<32+uint64(offset/blockLength)))
		for i := range dst {
			dst[i] = 2*source.Float64() - 1
		}
	})
}

// start starts the recurrence from the vector that fill writes, block by block
// from the given offset, as far as it lies in the matrix's space.
func (r *recurrence) start(fill func(dst []float64, offset int)) error {
	r.alpha, r.beta, r.normBefore = r.alpha[:0], r.beta[:0], 0
	if err := r.blocks(func(lo, hi int) { fill(r.u[lo:hi], lo) }); err != nil {
		return err
	}
	if err := r.matrix.Project(r.ctx, r.u); err != nil {
		return err
	}
	square, err := r.sum(func(lo, hi int) float64 { return floats.Dot(r.u[lo:hi], r.u[lo:hi]) })
	r.norm = math.Sqrt(square)
	return err
}

// step appends alpha and beta of the next step and moves on to the next Lanczos
// vector, which is 0 or rounding if beta is 0.
func (r *recurrence) step() error {
	a, c := r.scale/r.norm, 0.0
	if len(r.alpha) > 0 {
		c = -r.norm / r.normBefore
	}
	product, err := r.product(a, c)
	if err != nil {
		return err
	}
	alpha := product / r.norm
	square, err := r.sum(func(lo, hi int) float64 { // Paige's order: subtract, then project
		next := r.before[lo:hi]
		floats.AddScaled(next, -alpha/r.norm, r.u[lo:hi])
		return floats.Dot(next, next)
	})
	if err != nil {
		return err
	}
	beta := math.Sqrt(square)
	if !(math.Abs(alpha)/r.scale+beta/r.scale < math.MaxFloat64/8) { // sums of four stay finite
		return ErrNotFinite
	}
	r.alpha, r.beta = append(r.alpha, alpha/r.scale), append(r.beta, beta/r.scale)
	r.u, r.before = r.before, r.u
	r.norm, r.normBefore = beta, r.norm
	return nil
}

// product sets before = a A u + c before and returns its product with u. The first
// one shows how large A is.
func (r *recurrence) product(a, c float64) (float64, error) {
	if r.scale != 0 {
		return r.matrix.Combine(r.ctx, r.before, r.u, a, c)
	}
	product, err := r.matrix.Combine(r.ctx, r.before, r.u, 1/r.norm, 0)
	if err != nil {
		return 0, err
	}
	largest := 0.0
	err = r.blocks(func(lo, hi int) { largest = max(largest, floats.Norm(r.before[lo:hi], math.Inf(1))) })
	if math.IsNaN(largest) || math.IsInf(largest, 0) {
		return 0, ErrNotFinite
	}
	r.scale = 1
	if _, exponent := math.Frexp(largest); exponent < -safe || exponent > safe {
		r.scale = math.Ldexp(1, min(-exponent, 1000))
		err = errors.Join(err, r.blocks(func(lo, hi int) { floats.Scale(r.scale, r.before[lo:hi]) }))
	}
	return product * r.scale, err
}

// safe is the exponent of 2 up to which sums of squares are in range for certain.
const safe = 300

// sum adds up what do gives for consecutive stretches of the vectors. The stretches
// may be done at once; their sums are added in order, so that every number of
// workers gives the same bits.
func (r *recurrence) sum(do func(lo, hi int) float64) (float64, error) {
	n := len(r.u)
	err := blocks.Run(r.ctx, r.workers, len(r.sums), func(_, i int) {
		r.sums[i] = do(i*blockLength, min((i+1)*blockLength, n))
	})
	return floats.Sum(r.sums), err
}

// blocks calls do for consecutive stretches of the vectors, in order.
func (r *recurrence) blocks(do func(lo, hi int)) error {
	n := len(r.u)
	return blocks.Run(r.ctx, 1, len(r.sums), func(_, i int) { do(i*blockLength, min((i+1)*blockLength, n)) })
}
