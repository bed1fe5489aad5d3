package lanczos

import (
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/floats"
	"gonum.org/v1/gonum/mat"
)

// Random tridiagonal matrices against dense diagonalisation.
func TestLowestPairAgainstDense(t *testing.T) {
	random := rand.New(rand.NewPCG(4, 0))
	for m := 1; m <= 60; m++ {
		a, b, dense := make([]float64, m), make([]float64, m), mat.NewSymDense(m, nil)
		for i := range m {
			a[i], b[i] = 2*random.Float64()-1, random.Float64()
			dense.SetSym(i, i, a[i])
			if i > 0 {
				dense.SetSym(i, i-1, -b[i-1])
			}
		}
		var eig mat.EigenSym
		if !eig.Factorize(dense, false) {
			t.Fatal("dense diagonalisation failed")
		}
		want := eig.Values(nil)
		p, d := make([]float64, m), make([]float64, m)
		got := lowestPair(p, d, a, b)
		if math.Abs(got-want[0]) > 1e-14 {
			t.Errorf("m = %d: lowest %.17g, want %.17g", m, got, want[0])
		}
		var r mat.VecDense
		r.MulVec(dense, mat.NewVecDense(m, p))
		r.AddScaledVec(&r, -got, mat.NewVecDense(m, p))
		if residual := mat.Norm(&r, 2); residual > 1e-14 || math.Abs(floats.Norm(p, 2)-1) > 1e-14 {
			t.Errorf("m = %d: residual %.2g, norm %.17g", m, residual, floats.Norm(p, 2))
		}
		for i, x := range p {
			if !(x > 0) {
				t.Errorf("m = %d: component %d is %g, want above 0", m, i, x)
			}
		}
	}
}

// Components far below rounding are still right: for a = (0, 1, 1, ..), b = c, the
// vector of the lowest eigenvalue falls as c^j up to factors 1 + O(c^2).
func TestLowestPairTinyComponents(t *testing.T) {
	const c = 1e-3
	a, b := make([]float64, 30), make([]float64, 30)
	for i := range a {
		a[i], b[i] = 1, c
	}
	a[0] = 0
	p, d := make([]float64, 30), make([]float64, 30)
	lowestPair(p, d, a, b)
	for j, x := range p[:14] { // to 1e-39
		if want := math.Pow(c, float64(j)); math.Abs(x-want) > 1e-4*want {
			t.Errorf("component %d: %g, want %g", j, x, want)
		}
	}
}

func TestLowestPairAllocatesNothing(t *testing.T) {
	a, b := []float64{1, 2, 3, 4}, []float64{1, 1, 1}
	p, d := make([]float64, 4), make([]float64, 4)
	if n := testing.AllocsPerRun(50, func() { lowestPair(p, d, a, b) }); n != 0 {
		t.Errorf("lowestPair allocates %g times, want 0", n)
	}
}
