package eos

import (
	"errors"
	"fmt"
	"math"
	"testing"
)

func atomicOf(t testing.TB, terms Terms) *Atomic {
	t.Helper()
	m, err := NewAtomic(terms)
	if err != nil {
		t.Fatal(err)
	}
	return m
}

// Particle-hole thermodynamics of a deep lattice at mu = U/2, by sums over occupations
// outside this project; half of the last digit.
func TestAtomicTable(t *testing.T) {
	for _, row := range []struct{ temperature, filling, variance, entropy float64 }{ // kT/U
		{0.05, 1.000000, 9.1e-5, 0.000999}, {0.10, 1.000000, 0.013297, 0.079869},
		{0.15, 1.000003, 0.066602, 0.290927}, {0.20, 1.000078, 0.141169, 0.504971},
	} {
		for _, u := range []float64{1, 877, -18e3} {
			m := atomicOf(t, Cosine([]float64{0, 0}, u))
			p := at(t, m, u/2, 1/(row.temperature*u))
			near(t, "filling", p.Filling, row.filling, 0.5e-6)
			near(t, "variance", p.Variance, row.variance, 0.5e-6)
			near(t, "entropy", p.Entropy, row.entropy, 0.5e-6)
			if p.Kinetic != 0 {
				t.Errorf("kinetic energy %g without tunnelling", p.Kinetic)
			}
		}
	}
}

// Energy of the Mott insulator, E/U = n(n-1)/2 - z n(n+1) (J/U)^2: Freericks and Monien,
// EPL 26, 545 (1994), derived again by exact rational perturbation theory. Its shares
// of n-1 and n+1 atoms are z n(n+1) (J/U)^2 each.
func TestMottEnergy(t *testing.T) {
	const x = 0.002
	for axes := 1; axes <= 3; axes++ {
		for n := 1.0; n <= 3; n++ {
			for _, u := range []float64{1, -250} {
				m := atomicOf(t, Cosine([]float64{x * u, x * u, x * u}[:axes], u))
				for _, beta := range []float64{math.Copysign(math.Inf(1), u), 200 / u} {
					p := at(t, m, (n-0.5)*u, beta)
					pairs := 2 * float64(axes) * n * (n + 1) * x * x
					near(t, "energy", (p.Energy/u-n*(n-1)/2)/pairs, -1, 1e-9)
					near(t, "kinetic", p.Kinetic/u/pairs, -2, 1e-9)
					near(t, "filling", p.Filling, n, 1e-12)
					near(t, "entropy", p.Entropy, 0, 1e-12)
					near(t, "one more", p.Shares[int(n)+1]/pairs, 1, 1e-8)
					near(t, "one less", p.Shares[int(n)-1]/pairs, 1, 1e-8)
					near(t, "variance", p.Variance/pairs, 2, 1e-8)
				}
			}
		}
	}
}

func TestAtomicMaxwell(t *testing.T) {
	for _, hops := range [][]float64{{0.03}, {0.03, 0.02}, {0.02, 0.02, 0.02}} {
		m, other := atomicOf(t, Cosine(hops, 1)), atomicOf(t, Cosine(hops, -1))
		for _, mu := range []float64{-0.7, 0.3, 0.5, 1.45} {
			for _, temperature := range []float64{0.13, 0.4, 3} {
				if mu == 1.45 && temperature < 0.2 {
					continue // too near to the superfluid
				}
				maxwell(t, m, mu, 1/temperature, 1e-6)
				mirrored(t, m, other, mu, 1/temperature)
				p := at(t, m, mu, 1/temperature)
				sum := 0.0
				for _, share := range p.Shares {
					sum += share
				}
				near(t, "all shares", sum, 1, 1e-9)
				near(t, "U<n(n-1)>/2", (p.Variance+p.Filling*p.Filling-p.Filling)/2, p.Interaction, 1e-12)
			}
		}
	}
}

// Two sites with one bond, summed exactly: the error of the second order falls as J^4.
func TestAtomicOrder(t *testing.T) {
	const mu, beta = 0.3, 4.0
	miss := func(j float64) float64 {
		// One bond per two sites has half the J^2 of a chain: the chain of J/sqrt 2.
		m := atomicOf(t, Cosine([]float64{j / math.Sqrt2}, 1))
		return at(t, m, mu, beta).GrandPotential - dimer(j, mu, beta)
	}
	coarse, fine := miss(0.04), miss(0.02)
	if ratio := coarse / fine; !(math.Abs(ratio-16) < 0.5) {
		t.Errorf("errors %g and %g at J and J/2, ratio %g, want 16", coarse, fine, ratio)
	}
}

// dimer returns the grand potential per site of two sites with U = 1, by the power
// series of the exponential of its sectors.
func dimer(j, mu, beta float64) float64 {
	z := 0.0
	for atoms := range 16 {
		size := atoms + 1
		h := make([][]float64, size)
		shift := math.Inf(1)
		for a := range h {
			h[a] = make([]float64, size)
			b := atoms - a
			h[a][a] = float64(a*(a-1)+b*(b-1)) / 2
			shift = min(shift, h[a][a])
		}
		for a := range size - 1 {
			h[a][a+1] = -j * math.Sqrt(float64((a+1)*(atoms-a)))
			h[a+1][a] = h[a][a+1]
		}
		z += math.Exp(beta*(mu*float64(atoms)-shift)) * traceExp(h, shift, beta)
	}
	return -math.Log(z) / beta / 2
}

// traceExp returns Tr exp(-beta (h - shift)) by squaring a series.
func traceExp(h [][]float64, shift, beta float64) float64 {
	n, halvings := len(h), 14
	step := beta / math.Exp2(float64(halvings))
	total := identity(n)
	term := identity(n)
	small := make([][]float64, n)
	for i := range h {
		small[i] = make([]float64, n)
		for k := range h {
			small[i][k] = -step * h[i][k]
		}
		small[i][i] += step * shift
	}
	for order := 1; order <= 14; order++ {
		term = multiply(term, small, 1/float64(order))
		for i := range total {
			for k := range total {
				total[i][k] += term[i][k]
			}
		}
	}
	for range halvings {
		total = multiply(total, total, 1)
	}
	sum := 0.0
	for i := range total {
		sum += total[i][i]
	}
	return sum
}

func identity(n int) [][]float64 {
	out := make([][]float64, n)
	for i := range out {
		out[i] = make([]float64, n)
		out[i][i] = 1
	}
	return out
}

func multiply(a, b [][]float64, factor float64) [][]float64 {
	out := make([][]float64, len(a))
	for i := range a {
		out[i] = make([]float64, len(a))
		for k := range a {
			for l := range a {
				out[i][k] += factor * a[i][l] * b[l][k]
			}
		}
	}
	return out
}

// Both ends of the temperature, and a thin gas: n = exp(beta mu) (1 + z J^2 beta^2/2).
func TestAtomicLimits(t *testing.T) {
	m := atomicOf(t, Cosine([]float64{0.05, 0.05}, 1))
	for _, filling := range []float64{0.01, 0.7, 3} {
		want := must[Point](t)(Infinite(filling, 1))
		const beta = 1e-8
		p := at(t, m, math.Log(filling/(1+filling))/beta, beta)
		near(t, "filling", p.Filling, want.Filling, 1e-6)
		near(t, "entropy", p.Entropy, want.Entropy, 1e-6)
		near(t, "energy", p.Energy, want.Energy, 1e-6)
		near(t, "variance", p.Variance, want.Variance, 2e-6)
	}
	const beta = 2.0
	thin := at(t, m, -15, beta)
	z := math.Exp(-30)
	near(t, "thin gas", thin.Filling/z, 1+4*0.05*0.05*beta*beta/2, 1e-9)
	near(t, "thin gas, energy", thin.Energy/z, -4*0.05*0.05*beta, 1e-9)
	last := -1.0
	for mu := -2.0; mu < 3; mu += 0.01 {
		hot := at(t, atomicOf(t, Cosine([]float64{0.01}, 1)), mu, 5).Filling
		if !(hot > last) {
			t.Fatalf("n(mu = %g) = %g after %g, want it to rise", mu, hot, last)
		}
		last = hot
	}
}

func TestAtomicRefuses(t *testing.T) {
	m := atomicOf(t, Cosine([]float64{0.05, 0.05}, 1))
	for _, x := range [][2]float64{{math.NaN(), 1}, {0, math.NaN()}, {0.5, 0}, {math.Inf(1), 1}} {
		if _, err := m.At(x[0], x[1]); !errors.As(err, new(*InputError)) {
			t.Errorf("at %g: %v, want an InputError", x, err)
		}
	}
	for _, x := range [][2]float64{{1, math.Inf(1)}, {1, 20}, {600, 1}, {0.5, -3}, {-1e-6, 1e-7}} {
		if _, err := m.At(x[0], x[1]); !errors.As(err, new(*InvalidError)) {
			t.Errorf("at %g: %v, want an InvalidError", x, err)
		}
	}
	// Without tunnelling T = 0 is right at any distance from the next insulator.
	still := atomicOf(t, Cosine([]float64{0}, 1))
	for _, beta := range []float64{math.Inf(1), 1e15} {
		if p := at(t, still, 1-1e-9, beta); p.Filling != 1 || p.Entropy != 0 || p.Shares[1] != 1 {
			t.Errorf("beta = %g: %+v, want one atom", beta, p)
		}
	}
	if _, err := NewAtomic(Cosine([]float64{1}, 0)); err == nil {
		t.Error("U = 0 was taken")
	}
	mu := 0.4
	if n := testing.AllocsPerRun(20, func() { mu += 0.001; at(t, m, mu, 2) }); n != 0 {
		t.Errorf("%g allocations, want none", n)
	}
}

func BenchmarkAt(b *testing.B) {
	for axes := 1; axes <= 3; axes++ {
		hops := []float64{1, 1, 1}[:axes]
		ideal, _ := NewIdeal(Cosine(hops, 0))
		fock, _ := NewHartreeFock(Cosine(hops, 0.5))
		atomic, _ := NewAtomic(Cosine([]float64{0.5, 0.5, 0.5}[:axes], 200))
		for _, m := range []Model{ideal, fock, atomic} {
			b.Run(fmt.Sprintf("%s/axes=%d", m.Name(), axes), func(b *testing.B) {
				b.ReportAllocs()
				for b.Loop() {
					if _, err := m.At(-6.1, 0.3); err != nil {
						b.Fatal(err)
					}
				}
			})
		}
	}
}
