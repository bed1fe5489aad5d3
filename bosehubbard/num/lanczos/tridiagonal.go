package lanczos

import (
	"math"

	"gonum.org/v1/gonum/floats"
)

// lowestPair finds the lowest eigenvalue of the symmetric tridiagonal matrix with
// the diagonal a and the off-diagonals -b, b > 0, and its unit vector p > 0.
//
// a and p have length m >= 1, b at least m-1. All are at most of order one; the
// caller scales. d is scratch of length m. The value is good to a few roundings
// of the matrix, and components of p down to about 1e-40 to some roundings of
// themselves: all signs agree, so that nothing cancels. Cost O(60 m); no allocation.
//
// It bisects for the largest x at which a - x is positive definite, then does
// inverse iteration from there.
func lowestPair(p, d, a, b []float64) float64 {
	low, high := math.Inf(1), math.Inf(1)
	for i := range a {
		reach := 0.0 // Gershgorin
		if i > 0 {
			reach += b[i-1]
		}
		if i < len(a)-1 {
			reach += b[i]
		}
		low = min(low, a[i]-reach)
		high = min(high, a[i])
	}
	size := max(math.Abs(low), math.Abs(high))
	low -= 4 * epsilon * size // positive definite for certain
	for {
		middle := low + (high-low)/2
		if !(low < middle && middle < high) || high-low <= epsilon*size {
			break
		}
		if positive(d, a, b, middle) {
			low = middle
		} else {
			high = middle
		}
	}
	if positive(d, a, b, low) {
		inverseIteration(p, d, b)
	} else { // a zero matrix
		clear(p)
		p[0] = 1
	}
	return high
}

const epsilon = 0x1p-52

// positive writes the pivots of the matrix minus x to d and reports whether all
// of them are positive, so that x lies below the spectrum.
func positive(d, a, b []float64, x float64) bool {
	d[0] = a[0] - x
	if !(d[0] > 0) {
		return false
	}
	for i := 1; i < len(a); i++ {
		d[i] = a[i] - x - b[i-1]/d[i-1]*b[i-1]
		if !(d[i] > 0) {
			return false
		}
	}
	return true
}

// inverseIteration solves with the factors L D L^T of pivots d, L = 1 - b/d,
// until p, of length m like d, is the vector of the eigenvalue next to the shift.
func inverseIteration(p, d, b []float64) {
	m := len(p)
	for i := range p {
		p[i] = 1
	}
	for range 3 { // each step gains a factor rounding/gap
		for i := 1; i < m; i++ {
			p[i] += b[i-1] / d[i-1] * p[i-1]
		}
		for i := range p {
			p[i] /= d[i]
		}
		for i := m - 2; i >= 0; i-- {
			p[i] += b[i] / d[i] * p[i+1]
		}
		divide(p, floats.Norm(p, 2))
	}
}

func divide(x []float64, by float64) {
	for i := range x {
		x[i] /= by
	}
}
