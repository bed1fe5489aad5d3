package lanczos

import (
	"context"

	"gonum.org/v1/gonum/floats"
)

// Matrix is a real symmetric matrix that is known only by its product.
type Matrix interface {
	// Len is the length of its vectors.
	Len() int

	// Combine sets dst = a A x + c dst and returns x.dst. With c = 0 what stands in
	// dst does not matter. dst and x have length Len and do not overlap.
	Combine(ctx context.Context, dst, x []float64, a, c float64) (float64, error)

	// Project takes away from x what is not in the space that A acts on, where that
	// is a subspace of all vectors.
	Project(ctx context.Context, x []float64) error
}

// product makes a Matrix of a function that sets dst = A x.
type product struct {
	apply   func(dst, x []float64)
	scratch []float64
}

func (p *product) Len() int { return len(p.scratch) }

func (p *product) Project(context.Context, []float64) error { return nil }

func (p *product) Combine(ctx context.Context, dst, x []float64, a, c float64) (float64, error) {
	if err := ctx.Err(); err != nil {
		return 0, err
	}
	p.apply(p.scratch, x)
	sum := 0.0
	for begin := 0; begin < len(x); begin += blockLength {
		if err := ctx.Err(); err != nil {
			return 0, err
		}
		end := min(begin+blockLength, len(x))
		y := dst[begin:end]
		if c == 0 {
			clear(y)
		} else {
			floats.Scale(c, y)
		}
		floats.AddScaled(y, a, p.scratch[begin:end])
		sum += floats.Dot(x[begin:end], y)
	}
	return sum, nil
}
