package band

import (
	"math"
	"math/cmplx"
	"testing"

	"gonum.org/v1/gonum/mat"
)

// denseBand is the plain way to everything Solve gives: full matrices, evenly
// spaced midpoints in q and the Wannier function on a ring of as many sites.
type denseBand struct {
	mean, slope, fourth float64
	tunnelling          [3]float64
}

// denseVectors returns the energies and vectors of H with |l| <= top at q.
func denseVectors(t *testing.T, depth, q float64, top int) ([]float64, *mat.Dense) {
	t.Helper()
	n := 2*top + 1
	h := mat.NewSymDense(n, nil)
	for i := range n {
		k := float64(2*(i-top)) + q
		h.SetSym(i, i, k*k+depth/2)
		if i > 0 {
			h.SetSym(i-1, i, -depth/4)
		}
	}
	var e mat.EigenSym
	if !e.Factorize(h, true) {
		t.Fatalf("dense eigenvalues failed at depth %g, q %g", depth, q)
	}
	var v mat.Dense
	e.VectorsTo(&v)
	return e.Values(nil), &v
}

// solveDense takes sites points in q; its error falls as exp(-pi sites s/8).
func solveDense(t *testing.T, depth float64, sites int) denseBand {
	t.Helper()
	const top, points = 20, 40
	var b denseBand
	wave := make([]complex128, sites*points)
	for i := range sites {
		q := -1 + 2*(float64(i)+0.5)/float64(sites)
		e, v := denseVectors(t, depth, q, top)
		c := mat.Col(nil, 0, v)
		sum, pairs := 0.0, 0.0
		for l, x := range c {
			sum += x
			if l > 0 {
				pairs += x * c[l-1]
			}
		}
		b.mean += e[0] / float64(sites)
		b.slope += (1 - pairs) / 2 / float64(sites)
		for r := range b.tunnelling {
			b.tunnelling[r] -= e[0] * math.Cos(math.Pi*q*float64(r+1)) / float64(sites)
		}
		addBloch(wave, c, q, math.Copysign(1, sum), points)
	}
	norm, fourth := 0.0, 0.0
	for _, w := range wave {
		w2 := real(w)*real(w) + imag(w)*imag(w)
		norm += w2
		fourth += w2 * w2
	}
	b.fourth = fourth / (norm * norm) / (math.Pi / points)
	return b
}

// addBloch adds the Bloch wave with coefficients c at every point of the ring.
func addBloch(wave []complex128, c []float64, q, sign float64, points int) {
	top := (len(c) - 1) / 2
	for p := range points {
		xi := math.Pi * float64(p) / float64(points)
		var u complex128
		for i, x := range c {
			u += complex(sign*x, 0) * cmplx.Exp(complex(0, (float64(2*(i-top))+q)*xi))
		}
		step := cmplx.Exp(complex(0, math.Pi*q))
		for j := p; j < len(wave); j += points {
			wave[j] += u
			u *= step
		}
	}
}
