package krylov

import (
	"context"
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/mat"
)

// dense is a full symmetric matrix with its eigenvectors: the oracle.
type dense struct {
	matrix *mat.SymDense
	values []float64
	states mat.Dense
}

func newDense(t testing.TB, m *mat.SymDense) *dense {
	t.Helper()
	d := &dense{matrix: m}
	var eig mat.EigenSym
	if !eig.Factorize(m, true) {
		t.Fatal("the oracle's diagonalisation failed")
	}
	d.values = eig.Values(nil)
	eig.VectorsTo(&d.states)
	return d
}

// randomSymmetric has eigenvalues spread over about width.
func randomSymmetric(n int, width float64, random *rand.Rand) *mat.SymDense {
	m := mat.NewSymDense(n, nil)
	scale := width / (4 * math.Sqrt(float64(n)/2))
	for i := range n {
		for j := range i + 1 {
			m.SetSym(i, j, scale*random.NormFloat64())
		}
	}
	return m
}

// chain is the tridiagonal matrix of one particle on n sites, spectrum -2 to 2.
func chain(n int) *mat.SymDense {
	m := mat.NewSymDense(n, nil)
	for i := 1; i < n; i++ {
		m.SetSym(i, i-1, -1)
	}
	return m
}

func randomVector(n int, random *rand.Rand) Vector {
	v := NewVector(n)
	for i := range n {
		v.Re[i], v.Im[i] = random.NormFloat64(), random.NormFloat64()
	}
	return v
}

func norm(v Vector) float64 { return math.Sqrt(sumSquares(v.Re) + sumSquares(v.Im)) }

func distance(v, w Vector) float64 {
	sum := 0.0
	for i := range v.Re {
		sum += (v.Re[i]-w.Re[i])*(v.Re[i]-w.Re[i]) + (v.Im[i]-w.Im[i])*(v.Im[i]-w.Im[i])
	}
	return math.Sqrt(sum)
}

// product is the Product of the matrix.
func (d *dense) product(_ context.Context, dst, x Vector) (float64, error) {
	sum := 0.0
	for _, part := range [][2][]float64{{dst.Re, x.Re}, {dst.Im, x.Im}} {
		mat.NewVecDense(len(part[0]), part[0]).MulVec(d.matrix, mat.NewVecDense(len(part[1]), part[1]))
		sum += dot(part[0], part[1])
	}
	return sum, nil
}

// exp returns exp(-i tau H) x from the eigenvectors.
func (d *dense) exp(x Vector, tau float64) Vector {
	n := len(d.values)
	re, im, out := mat.NewVecDense(n, nil), mat.NewVecDense(n, nil), NewVector(n)
	re.MulVec(d.states.T(), mat.NewVecDense(n, x.Re))
	im.MulVec(d.states.T(), mat.NewVecDense(n, x.Im))
	for k, e := range d.values {
		s, c := math.Sincos(-tau * e)
		a, b := re.AtVec(k), im.AtVec(k)
		re.SetVec(k, a*c-b*s)
		im.SetVec(k, a*s+b*c)
	}
	mat.NewVecDense(n, out.Re).MulVec(&d.states, re)
	mat.NewVecDense(n, out.Im).MulVec(&d.states, im)
	return out
}
