package chebyshev

import (
	"fmt"
	"math"

	"gonum.org/v1/gonum/floats"
)

// Product computes, for every vector i of a group,
//
//	dst[i] = a A x[i] + b x[i] + c dst[i]
//
// and, where they are not nil, xy[i] = x[i].dst[i] and xx[i] = x[i].x[i]. With
// c = 0 it does not read dst. dst and x do not overlap.
type Product func(a, b, c float64, dst, x [][]float64, xy, xx []float64) error

// Interval is the stretch that a spectrum lies in.
type Interval struct{ Low, High float64 }

// Place moves e from the interval to [-1, 1].
func (s Interval) Place(e float64) float64 {
	return (2*e - s.High - s.Low) / (s.High - s.Low)
}

// OutsideError says that the spectrum leaves the interval, where the recurrence
// grows without bound.
type OutsideError struct {
	Order  int     // of the moment that shows it
	Moment float64 // of a unit vector
}

func (e *OutsideError) Error() string {
	return fmt.Sprintf("chebyshev: moment %d of a unit vector is %.3g, want -1 to 1: the spectrum leaves its interval", e.Order, e.Moment)
}

// Recurrence computes moments of a group of vectors at once.
type Recurrence struct {
	Product Product
	Within  Interval

	// After, if not nil, is called after each product. done counts to total.
	After func(done, total int)

	xy, xx []float64
}

// MomentsTo writes the moments of the vectors v, scaled to unit length, to dst:
// dst[i] has length N, which is even, and belongs to v[i]. next is scratch of the
// same shape as v; both are overwritten.
//
// Two moments come from each product,
//
//	mu_2n = 2 <v_n|v_n> - mu_0,   mu_2n+1 = 2 <v_n+1|v_n> - mu_1,   v_n = T_n(A) v
//
// so that there are N/2 products with each vector. Cost beside them O(N);
// it allocates only when the group is larger than before.
//
// It returns the error of a product, or an *OutsideError. It panics if the
// lengths do not match, N is odd, or Within has no length.
//
// Source: Weisse et al., Rev. Mod. Phys. 78, 275 (2006), section II.D; from memory.
func (r *Recurrence) MomentsTo(dst, v, next [][]float64) error {
	n := r.checkShape(dst, v, next)
	width := r.Within.High - r.Within.Low
	a, b := 2/width, -(r.Within.High+r.Within.Low)/width
	if len(r.xx) < len(v) {
		r.xx, r.xy = make([]float64, len(v)), make([]float64, len(v))
	}
	xx, xy := r.xx[:len(v)], r.xy[:len(v)]
	if err := r.Product(a, b, 0, next, v, xy, xx); err != nil {
		return err
	}
	for i, mu := range dst {
		mu[0], mu[1] = xx[i], xy[i]
	}
	for k := 1; k < n/2; k++ {
		r.report(k, n/2)
		if err := r.Product(2*a, 2*b, -1, v, next, xy, xx); err != nil {
			return err
		}
		for i, mu := range dst {
			mu[2*k], mu[2*k+1] = 2*xx[i]-mu[0], 2*xy[i]-mu[1]
		}
		v, next = next, v
	}
	r.report(n/2, n/2)
	return normalise(dst)
}

func (r *Recurrence) report(done, total int) {
	if r.After != nil {
		r.After(done, total)
	}
}

func (r *Recurrence) checkShape(dst, v, next [][]float64) int {
	if len(dst) == 0 || len(v) != len(dst) || len(next) != len(dst) || !(r.Within.High > r.Within.Low) {
		panic(fmt.Sprintf("chebyshev: %d moments and %d more for %d vectors within %g to %g, want as many each and a length",
			len(dst), len(next), len(v), r.Within.Low, r.Within.High))
	}
	n := len(dst[0])
	for i := range dst {
		if len(dst[i]) != n || n < 2 || n%2 != 0 || len(v[i]) != len(v[0]) || len(next[i]) != len(v[0]) {
			panic(fmt.Sprintf("chebyshev: %d moments of a vector of %d, want an even number, the same for all of %d", len(dst[i]), len(v[i]), n))
		}
	}
	return n
}

// normalise divides by mu_0 and checks the bound |mu_n| <= mu_0.
func normalise(moments [][]float64) error {
	const slack = 1e-6 // rounding stays far below, growth outside far above
	for _, mu := range moments {
		floats.Scale(1/mu[0], mu)
		for n, m := range mu {
			if !(math.Abs(m) <= 1+slack) {
				return &OutsideError{Order: n, Moment: m}
			}
		}
	}
	return nil
}
