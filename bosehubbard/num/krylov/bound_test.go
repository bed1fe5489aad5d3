package krylov

import (
	"math"
	"math/rand/v2"
	"testing"
)

// random T with a diagonal.
func randomTridiagonal(m int, random *rand.Rand) tridiagonal {
	alpha, beta := make([]float64, m), make([]float64, m-1)
	for j := range alpha {
		alpha[j] = 5 * random.NormFloat64()
	}
	for j := range beta {
		beta[j] = 0.1 + 3*random.Float64()
	}
	return centred(alpha, beta)
}

// lastOnly is a list of defects with beta_m alone.
func lastOnly(m int, beta float64) []float64 {
	defects := make([]float64, m)
	defects[m-1] = beta
	return defects
}

// u from the march against the dense exponential of T.
func TestMarchAgainstDense(t *testing.T) {
	random := rand.New(rand.NewPCG(1, 2))
	for range 20 {
		m := 2 + random.IntN(20)
		tri := randomTridiagonal(m, random)
		full := chain(m)
		for j := range m {
			full.SetSym(j, j, tri.alpha[j])
			if j+1 < m {
				full.SetSym(j, j+1, tri.beta[j])
			}
		}
		first := NewVector(m)
		first.Re[0] = 1
		time := 4 * (random.Float64() - 0.5)
		want := newDense(t, full).exp(first, time)
		re, im := newMarch(m).at(tri, time)
		if diff := distance(Vector{re, im}, want); diff > 1e-13 {
			t.Errorf("dimension %d, time %g: off by %.3g, want below 1e-13", m, time, diff)
		}
	}
}

// The bound of the integral of |u_m| is above a fine quadrature, by less than a
// factor of three where the integral is above rounding.
func TestIntegralIsBounded(t *testing.T) {
	random := rand.New(rand.NewPCG(2, 2))
	for range 30 {
		m := 2 + random.IntN(12)
		tri := randomTridiagonal(m, random)
		time := 3 * random.Float64()
		march := newMarch(m)
		reach, bound := march.reach(tri, lastOnly(m, 1), time, math.Inf(1))
		if reach != time {
			t.Fatalf("reach %g of %g with every error allowed", reach, time)
		}
		const pieces = 400
		sum := 0.0
		for k := range pieces { // midpoints
			re, im := march.at(tri, time*(float64(k)+0.5)/pieces)
			sum += math.Hypot(re[m-1], im[m-1]) * time / pieces
		}
		if !(bound > sum*(1-1e-2)) || bound > 3*sum+1e-12 {
			t.Errorf("dimension %d, time %g: bound %.4g of an integral of %.4g", m, time, bound, sum)
		}
	}
}

// Where the whole time fails, reach gives a shorter one that holds, and one not
// much longer does not.
func TestReachIsNearlyAsFarAsItGoes(t *testing.T) {
	random := rand.New(rand.NewPCG(3, 2))
	for range 30 {
		m := 3 + random.IntN(20)
		tri := randomTridiagonal(m, random)
		march := newMarch(m)
		rate := math.Pow(10, -12+10*random.Float64())
		reach, bound := march.reach(tri, lastOnly(m, 2), 50, rate)
		if !(reach > 0) || bound > rate*reach {
			t.Errorf("dimension %d, rate %.2g: reach %g with bound %.3g", m, rate, reach, bound)
			continue
		}
		further := 1.3*reach + 0.3/tri.radius
		if got, _ := march.reach(tri, lastOnly(m, 2), further, rate); got == further && further > 2.5*reach {
			t.Errorf("dimension %d, rate %.2g: stopped at %g, but %g holds too", m, rate, reach, further)
		}
	}
}
