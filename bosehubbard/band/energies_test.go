package band

import (
	"math"
	"math/rand/v2"
	"testing"

	"hilltop/bosehubbard/si"
)

// TestEnergiesMatchDense: 8 bands at seeded depths and quasi-momenta.
func TestEnergiesMatchDense(t *testing.T) {
	rng := rand.New(rand.NewPCG(7, 11))
	w := NewWorkspace()
	got := make([]float64, MaxBands)
	for range 100 {
		depth, q := MaxDepth*math.Pow(rng.Float64(), 3), 2*rng.Float64()-1
		if err := w.Energies(got, depth, q); err != nil {
			t.Fatal(err)
		}
		want, _ := denseVectors(t, depth, q, 45)
		for n := range got {
			checkNear(t, "energy", depth, got[n], want[n], 2e-11)
		}
	}
}

// TestEnergiesMeetTheEdges: at q = 0 and 1, and one zone further, and the free
// parabola folded back.
func TestEnergiesMeetTheEdges(t *testing.T) {
	w := NewWorkspace()
	e := make([]float64, 3)
	for _, depth := range []float64{0, 0.3, 5, 22, 150} {
		b := solve(t, w, depth)
		for _, q := range []float64{0, 1, -1, 2, 7, -6, 1001, -1e6} {
			if err := w.Energies(e, depth, q); err != nil {
				t.Fatal(err)
			}
			end := int(math.Abs(q)) % 2
			for n := range e {
				checkNear(t, "edge", depth, e[n], b.Edges[n][end], 2e-12)
			}
		}
	}
	if err := w.Energies(e, 0, 0.25); err != nil {
		t.Fatal(err)
	}
	for n, want := range []float64{0.0625, 1.75 * 1.75, 2.25 * 2.25} {
		checkNear(t, "free energy", 0, e[n], want, 1e-13)
	}
}

// TestSeriesGivesTheBand: E0(q) = eps - 2 sum_r J_r cos(pi q r); J4 is below 1e-6 at 8 Er.
func TestSeriesGivesTheBand(t *testing.T) {
	w := NewWorkspace()
	b := solve(t, w, 8)
	for _, q := range []float64{0.1, 0.33, 0.5, 0.77, -0.9} {
		var e [1]float64
		if err := w.Energies(e[:], 8, q); err != nil {
			t.Fatal(err)
		}
		want := b.Mean
		for r, j := range b.Tunnelling {
			want -= 2 * j * math.Cos(math.Pi*q*float64(r+1))
		}
		checkNear(t, "E0", 8, e[0], want, 2e-6)
	}
}

// TestEffectiveMass: m*/m = 2/(d^2E0/dq^2) at q = 0, a plane-wave calculation to
// five decimals; the difference quotient over h = 0.01 is off by a few h^2.
func TestEffectiveMass(t *testing.T) {
	w := NewWorkspace()
	const h = 0.01
	for depth, want := range map[float64]float64{1: 1.03138, 3: 1.29189, 5: 1.86471, 10: 5.53356} {
		var centre, aside [1]float64
		if err := w.Energies(centre[:], depth, 0); err != nil {
			t.Fatal(err)
		}
		if err := w.Energies(aside[:], depth, h); err != nil {
			t.Fatal(err)
		}
		checkNear(t, "m*/m", depth, h*h/(aside[0]-centre[0]), want, 5e-4*want)
	}
}

// TestLandauZenerAcceleration: a_c = d Eg^2/4 hbar^2 for 39K at 736.65 nm, a
// plane-wave calculation, to the digits given.
func TestLandauZenerAcceleration(t *testing.T) {
	const spacing, mass = 736.65e-9 / 2, 38.963706485 * si.AtomicMassConstant
	recoil := si.RecoilHz(mass, spacing)
	w := NewWorkspace()
	for depth, tc := range map[float64]struct{ want, tol float64 }{
		6.1: {2805.9, 0.06}, 1: {80.76, 0.006}, 0.5: {20.22, 0.006},
	} {
		gap := 2 * math.Pi * recoil * solve(t, w, depth).Gap // rad/s
		checkNear(t, "critical acceleration", depth, spacing*gap*gap/4, tc.want, tc.tol)
	}
}

func TestEnergiesRefuses(t *testing.T) {
	w := NewWorkspace()
	for _, q := range []float64{math.NaN(), math.Inf(1), math.Inf(-1)} {
		if err := w.Energies(make([]float64, 1), 3, q); err == nil {
			t.Errorf("q = %g: no error", q)
		}
	}
	defer func() {
		if recover() == nil {
			t.Error("no panic for too many bands")
		}
	}()
	_ = w.Energies(make([]float64, MaxBands+1), 3, 0)
}
