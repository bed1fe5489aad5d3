package quadrature

import (
	"errors"
	"fmt"
	"math"

	"gonum.org/v1/gonum/lapack"
	"gonum.org/v1/gonum/lapack/gonum"
)

// ErrNotConverged says that a tridiagonal matrix could not be diagonalised, which
// happens when it holds numbers that are not finite.
var ErrNotConverged = errors.New("quadrature: the tridiagonal matrix has no finite eigenvalues")

// Tridiagonal is the symmetric tridiagonal matrix of a Lanczos run.
type Tridiagonal struct {
	Diagonal []float64 // length m
	Coupling []float64 // to the next step: length m, or m-1 if the run has ended

	size  float64 // largest entry
	ended bool
}

func (t *Tridiagonal) reset(steps int) {
	if cap(t.Diagonal) < steps {
		t.Diagonal, t.Coupling = make([]float64, 0, steps), make([]float64, 0, steps)
	}
	*t = Tridiagonal{Diagonal: t.Diagonal[:0], Coupling: t.Coupling[:0]}
}

// Rule is the Gauss rule of a Lanczos run: nodes in ascending order, and weights
// that sum to 1.
type Rule struct {
	Node, Weight []float64

	first   []float64 // component of each eigenvector on the start vector
	vectors []float64 // m x m, row j is the Lanczos vector j
}

// Rule diagonalises the first m steps of the matrix, all if m is larger. Cost
// O(m^3).
//
// It returns ErrNotConverged if the matrix is not finite. It panics if m < 1 or
// the matrix is empty.
func (t *Tridiagonal) Rule(m int) (Rule, error) {
	m = min(m, len(t.Diagonal))
	if m < 1 {
		panic(fmt.Sprintf("quadrature: rule of %d nodes, want at least 1", m))
	}
	r := Rule{
		Node: append([]float64(nil), t.Diagonal[:m]...), Weight: make([]float64, m),
		first: make([]float64, m), vectors: make([]float64, m*m),
	}
	coupling := append([]float64(nil), t.Coupling[:m-1]...)
	work := make([]float64, max(1, 2*m-2))
	if !(gonum.Implementation{}).Dsteqr(lapack.EVTridiag, m, r.Node, coupling, r.vectors, m, work) {
		return Rule{}, ErrNotConverged
	}
	for k := range m {
		r.first[k] = r.vectors[k]
		r.Weight[k] = r.vectors[k] * r.vectors[k]
	}
	return r, nil
}

// Next returns the coupling to the step after the first m, 0 if the run ended
// there. For a unit vector with components y on the first m Lanczos vectors that is
// an eigenvector of T, the residual |A x - node x| is Next(m) |y_(m-1)|, and an
// eigenvalue lies within it.
//
// It panics if m is below 1 or above the length of the run.
//
// Source: Parlett, The Symmetric Eigenvalue Problem (1980), from memory.
func (t *Tridiagonal) Next(m int) float64 {
	if m == len(t.Coupling)+1 && m == len(t.Diagonal) {
		return 0
	}
	return t.Coupling[m-1]
}

// PartTo writes the components, on the Lanczos vectors, of the part of the start
// vector that lies on the nodes from to to-1, scaled to length 1. Nodes that lie
// together because of rounding make one part, whose vector is well defined.
//
// It panics if dst has not the length of the rule or there is no such node.
func (r *Rule) PartTo(dst []float64, from, to int) {
	m := len(r.Node)
	if len(dst) != m || from < 0 || from >= to || to > m {
		panic(fmt.Sprintf("quadrature: %d components of nodes %d to %d, want %d of some", len(dst), from, to-1, m))
	}
	norm := 0.0
	for _, w := range r.Weight[from:to] {
		norm += w
	}
	norm = math.Sqrt(norm)
	for j := range dst {
		sum := 0.0
		for k := from; k < to; k++ {
			sum += r.first[k] / norm * r.vectors[j*m+k]
		}
		dst[j] = sum
	}
}

// CoefficientsTo writes <v_j|f(A)|v> of the Lanczos vectors j to dst, of length m,
// so that f(A) v = sum_j dst[j] v_j for the unit start vector v. f[k] is f at
// Node[k]. Cost O(m^2); no allocation.
//
// It panics if a length is not m.
func (r *Rule) CoefficientsTo(dst, f []float64) {
	m := len(r.Node)
	if len(dst) != m || len(f) != m {
		panic(fmt.Sprintf("quadrature: %d coefficients of %d values, want %d", len(dst), len(f), m))
	}
	for j := range dst {
		sum := 0.0
		for k, v := range r.vectors[j*m : (j+1)*m] {
			sum += v * f[k] * r.first[k]
		}
		dst[j] = sum
	}
}
