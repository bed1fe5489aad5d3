package gutzwiller

import (
	"math"
	"strings"
	"testing"
)

// meanField says where the check values of lobes and boundaries come from.
const meanField = "mean-field theory, Fisher et al., PRB 40, 546 (1989), evaluated outside this project"

// near reports a value that is off by more than tol.
func near(t *testing.T, what string, got, want, tol float64) {
	t.Helper()
	if !(math.Abs(got-want) <= tol) {
		t.Errorf("%s: got %.15g, want %.15g, difference %.3g, tolerance %.3g", what, got, want, got-want, tol)
	}
}

func TestLobeTip(t *testing.T) {
	t.Log(meanField)
	for _, tc := range []struct {
		n    int
		want float64 // U/zJ, 6 decimals
	}{{1, 5.828427}, {2, 9.898979}, {3, 13.928203}} {
		m, coupling, err := LobeTip(tc.n)
		if err != nil {
			t.Fatal(err)
		}
		near(t, "U/zJ at the tip", 1/coupling, tc.want, 0.5e-6)
		boundary, err := LobeBoundary(tc.n, m)
		if err != nil {
			t.Fatal(err)
		}
		near(t, "boundary at the tip", boundary, coupling, 1e-15)
		for _, off := range []float64{-1e-3, 1e-3} { // the tip is the largest coupling
			if beside, _ := LobeBoundary(tc.n, m+off); beside >= boundary {
				t.Errorf("n = %d: boundary %g beside the tip, %g at it", tc.n, beside, boundary)
			}
		}
	}
	m, _, _ := LobeTip(1)
	near(t, "mu/U at the tip", m, 0.414214, 0.5e-6)
}

func TestCriticalCoupling(t *testing.T) {
	t.Log(meanField)
	for _, tc := range []struct {
		mu, temperature, want, tol float64 // in units of U
	}{
		{0.5, 0, 1. / 6, 1e-15},
		{0.5, 0.05, 0.166687, 0.5e-6},
		{0.5, 0.1, 0.169675, 0.5e-6},
		{math.Sqrt2 - 1, 0, 0.1715729, 0.5e-7},
		{math.Sqrt2 - 1, 0.05, 0.1716359, 0.5e-7},
		{math.Sqrt2 - 1, 0.1, 0.1760795, 0.5e-7},
	} {
		for _, u := range []float64{1, -1, 733} { // the mirror, and any unit
			got, err := CriticalCoupling(Site{ChemicalPotential: tc.mu * u, Interaction: u, Temperature: tc.temperature * u, Coupling: 9})
			if err != nil {
				t.Fatal(err)
			}
			near(t, "zJ/U", got/math.Abs(u), tc.want, tc.tol)
		}
	}
}

// At T = 0 the susceptibility has its poles at whole mu/U, and between them it is the
// closed form of the lobes.
func TestCriticalCouplingAtZeroTemperature(t *testing.T) {
	for n := 1; n <= 4; n++ {
		for _, part := range []float64{0.01, 0.3, 0.5, 0.77, 0.999} {
			m := float64(n-1) + part
			want, err := LobeBoundary(n, m)
			if err != nil {
				t.Fatal(err)
			}
			got, err := CriticalCoupling(Site{ChemicalPotential: m, Interaction: 1})
			if err != nil {
				t.Fatal(err)
			}
			near(t, "zJ/U", got, want, 1e-14)
		}
		if got, err := CriticalCoupling(Site{ChemicalPotential: float64(n), Interaction: 1}); err != nil || got != 0 {
			t.Errorf("mu = %d U: got %g, %v, want 0", n, got, err)
		}
	}
}

func TestLobeRefuses(t *testing.T) {
	for _, tc := range []struct {
		n int
		m float64
	}{{0, 0.5}, {1, -0.1}, {1, 1.1}, {2, 0.5}, {1, math.NaN()}} {
		if got, err := LobeBoundary(tc.n, tc.m); err == nil || !strings.Contains(err.Error(), "lobe of") {
			t.Errorf("lobe %d at %g: got %g, %v, want an error", tc.n, tc.m, got, err)
		}
	}
	if _, _, err := LobeTip(0); err == nil {
		t.Error("tip of the lobe of 0 atoms: want an error")
	}
	if _, err := CriticalCoupling(Site{ChemicalPotential: 0.5}); err == nil {
		t.Error("U = 0: want an error")
	}
}
