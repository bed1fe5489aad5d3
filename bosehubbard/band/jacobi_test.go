package band

import (
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/mat"
)

// randomJacobi has off-diagonals between -2 and 0 and a diagonal up to 20.
func randomJacobi(rng *rand.Rand, n int) jacobi {
	t := jacobi{make([]float64, n), make([]float64, n-1)}
	for i := range t.diag {
		t.diag[i] = 20 * rng.Float64()
	}
	for i := range t.off {
		t.off[i] = -2*rng.Float64() - 1e-9
	}
	return t
}

// TestEigenMatchesDense looks for every eigenvalue of seeded matrices, with the
// factorizations meeting in the largest row of the vector, and checks value,
// residual, norm and number of nodes.
func TestEigenMatchesDense(t *testing.T) {
	rng := rand.New(rand.NewPCG(1, 2))
	for range 200 {
		n := 2 + rng.IntN(20)
		m := randomJacobi(rng, n)
		values, vectors := denseOf(t, m)
		for k, want := range values {
			row := largest(mat.Col(nil, k, vectors))
			z := make([]float64, n)
			got := m.eigen(search{index: k, row: row, guess: 10, low: -10, high: 40}, z)
			if math.Abs(got-want) > 1e-13*40 {
				t.Errorf("n=%d: eigenvalue %d got %.15g, want %.15g", n, k, got, want)
			}
			checkVector(t, m, k, got, z)
		}
	}
}

func denseOf(t *testing.T, m jacobi) ([]float64, *mat.Dense) {
	t.Helper()
	n := len(m.diag)
	h := mat.NewSymDense(n, nil)
	for i := range n {
		h.SetSym(i, i, m.diag[i])
		if i > 0 {
			h.SetSym(i-1, i, m.off[i-1])
		}
	}
	var e mat.EigenSym
	if !e.Factorize(h, true) {
		t.Fatal("dense eigenvalues failed")
	}
	var v mat.Dense
	e.VectorsTo(&v)
	return e.Values(nil), &v
}

func largest(x []float64) int {
	at := 0
	for i := range x {
		if math.Abs(x[i]) > math.Abs(x[at]) {
			at = i
		}
	}
	return at
}

func checkVector(t *testing.T, m jacobi, k int, e float64, z []float64) {
	t.Helper()
	norm2, residual2, nodes := 0.0, 0.0, 0
	for i, x := range z {
		r := (m.diag[i] - e) * x
		if i > 0 {
			r += m.off[i-1] * z[i-1]
			if (x < 0) != (z[i-1] < 0) {
				nodes++
			}
		}
		if i+1 < len(z) {
			r += m.off[i] * z[i+1]
		}
		norm2 += x * x
		residual2 += r * r
	}
	if math.Abs(norm2-1) > 1e-13 || nodes != k {
		t.Errorf("n=%d: vector %d has norm^2 %.15g and %d changes of sign, want 1 and %d", len(z), k, norm2, nodes, k)
	}
	// The last Newton step may be 2^-50 (1 + |diag|), and the vector is the one before it.
	if residual := math.Sqrt(residual2); residual > 1e-12 {
		t.Errorf("n=%d: vector %d has residual %.2g, want below 1e-12", len(z), k, residual)
	}
}

// TestEigenSurvivesZeroPivots starts the search on the diagonal itself.
func TestEigenSurvivesZeroPivots(t *testing.T) {
	m := jacobi{[]float64{1, 1, 1}, []float64{-1, -1}}
	z := make([]float64, 3)
	for k, want := range []float64{1 - math.Sqrt2, 1, 1 + math.Sqrt2} {
		row := []int{1, 0, 1}[k]
		got := m.eigen(search{index: k, row: row, guess: 1, low: -3, high: 5}, z)
		if math.Abs(got-want) > 1e-14 {
			t.Errorf("eigenvalue %d: got %.16g, want %.16g", k, got, want)
		}
	}
}
