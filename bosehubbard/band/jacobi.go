package band

import "math"

// jacobi is a symmetric tridiagonal matrix whose off-diagonals are all negative.
// Its eigenvalues are simple and vector number k has k changes of sign.
type jacobi struct {
	diag []float64 // length n
	off  []float64 // length n-1, < 0
}

// search says which eigenvalue is wanted and where it lies.
type search struct {
	index     int // 0 for the lowest
	row       int // where the factorizations meet; the vector must not vanish there
	guess     float64
	low, high float64 // bracket of the eigenvalue
}

// twist factors T - e from both ends until they meet in row m and writes the
// vector z with z[m] = 1 that solves (T - e) z = f unit(m). z has length n.
//
// f falls with e between its poles, its slope is -|z|^2, and nodes counts the
// poles below e, which are also the changes of sign of z. So f < 0 or nodes > k
// says that eigenvalue k lies below e.
//
// Source: inertia of the twisted factorization; Parlett, The Symmetric
// Eigenvalue Problem (1998), chapter 7.
func (t jacobi) twist(e float64, m int, z []float64) (f, norm2 float64, nodes int) {
	fromTop, above := t.eliminate(e, 0, m, 1, z)
	fromBottom, below := t.eliminate(e, len(t.diag)-1, m, -1, z)
	f = t.diag[m] - e + fromTop + fromBottom
	return f, unroll(z, m), above + below
}

// eliminate factors T - e from row i towards row m, leaves in z the ratio of each
// entry of the vector to the next one, and returns what it takes off the pivot of
// row m and the number of negative pivots.
func (t jacobi) eliminate(e float64, i, m, step int, z []float64) (pull float64, negative int) {
	const tiny = 1e-150 // keeps a vanishing pivot from dividing by zero
	for ; i != m; i += step {
		pivot := t.diag[i] - e + pull
		if math.Abs(pivot) < tiny {
			pivot = -tiny
		}
		if pivot < 0 {
			negative++
		}
		link := t.off[min(i, i+step)]
		z[i] = -link / pivot
		pull = link * z[i]
	}
	return pull, negative
}

// unroll turns the ratios of neighbours left by twist into the vector with
// z[m] = 1 and returns its squared norm.
func unroll(z []float64, m int) float64 {
	z[m] = 1
	norm2 := 1.0
	for i := m - 1; i >= 0; i-- {
		z[i] *= z[i+1]
		norm2 += z[i] * z[i]
	}
	for i := m + 1; i < len(z); i++ {
		z[i] *= z[i-1]
		norm2 += z[i] * z[i]
	}
	return norm2
}

// eigen returns the wanted eigenvalue and writes its vector, of norm 1 and
// positive in row s.row, to z of length n.
//
// Newton's method on f, whose every step gives the Rayleigh quotient of z,
// inside a bracket that shrinks by the count of nodes. It ends when the residual
// |f|/|z|, which bounds the error, is a few roundings of the diagonal; the step
// alone is no proof, for it also vanishes at the poles of f. Cost O(n) per step,
// 3 to 8 steps.
func (t jacobi) eigen(s search, z []float64) float64 {
	e, norm2 := s.guess, 1.0
	if !(e > s.low && e < s.high) {
		e = s.low + (s.high-s.low)/2
	}
	tolerance := 0x1p-50 * (1 + math.Abs(t.diag[s.row]))
	for range 200 {
		var f float64
		var nodes int
		f, norm2, nodes = t.twist(e, s.row, z)
		step := f / norm2
		if nodes == s.index && math.Abs(f) <= tolerance*math.Sqrt(norm2) {
			e += step
			break
		}
		if nodes > s.index || nodes == s.index && f < 0 {
			s.high = e
		} else {
			s.low = e
		}
		e = s.next(e, step, nodes == s.index && math.Abs(step) > tolerance)
		if s.high-s.low <= 0x1p-53*math.Abs(e) {
			break
		}
	}
	scale := 1 / math.Sqrt(norm2)
	for i := range z {
		z[i] *= scale
	}
	return e
}

// next takes the Newton step if it can be trusted and stays inside the bracket,
// else it halves the bracket.
func (s *search) next(e, step float64, trusted bool) float64 {
	if trusted && e+step > s.low && e+step < s.high {
		return e + step
	}
	return s.low + (s.high-s.low)/2
}
