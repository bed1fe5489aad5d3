package gutzwiller

import (
	"fmt"
	"math"
	"math/rand/v2"
	"strings"
	"testing"
)

func mustSolve(t testing.TB, site Site) Equilibrium {
	t.Helper()
	out, err := NewSolver().Solve(site)
	if err != nil {
		t.Fatalf("%+v: %v", site, err)
	}
	return out
}

// Particle-hole thermodynamics of a deep lattice at mu = U/2.
func TestDeepLattice(t *testing.T) {
	t.Log("sums over occupations at J = 0 evaluated outside this project; half of the last digit")
	for _, tc := range []struct {
		temperature, filling, variance, entropy float64 // kT/U
		varianceTol                             float64
	}{
		{0.05, 1.000000, 9.1e-5, 0.000999, 0.5e-6},
		{0.10, 1.000000, 0.013297, 0.079869, 0.5e-6},
		{0.15, 1.000003, 0.066602, 0.290927, 0.5e-6},
		{0.20, 1.000078, 0.141169, 0.504971, 0.5e-6},
	} {
		for _, u := range []float64{1, 250, -18e3} {
			got := mustSolve(t, Site{ChemicalPotential: u / 2, Interaction: u, Temperature: tc.temperature * u})
			near(t, "filling", got.Filling, tc.filling, 0.5e-6)
			near(t, "variance", got.Variance, tc.variance, tc.varianceTol)
			near(t, "entropy", got.Entropy, tc.entropy, 0.5e-6)
			if got.Order != 0 || got.Kinetic != 0 {
				t.Errorf("phi = %g, kinetic energy %g without tunnelling, want 0", got.Order, got.Kinetic)
			}
		}
	}
}

// sites draws systems on both sides of the boundary, floor and ceiling.
func sites(count int) []Site {
	random := rand.New(rand.NewPCG(3, 5))
	out := make([]Site, count)
	for i := range out {
		u := math.Exp(3 * random.NormFloat64())
		out[i] = Site{
			ChemicalPotential: u * (3*random.Float64() - 0.5), Interaction: u,
			Coupling: u * random.Float64(), Temperature: u * (0.02 + random.Float64()),
		}
		if i%2 == 1 {
			s := &out[i]
			s.ChemicalPotential, s.Interaction, s.Temperature = -s.ChemicalPotential, -u, -s.Temperature
		}
	}
	return out
}

// The grand potential is a minimum over phi, so its derivatives are the averages:
// n = -dO/dmu, S = -dO/dT, kinetic energy = zJ dO/d(zJ).
func TestMaxwell(t *testing.T) {
	ordered := 0
	for _, site := range sites(40) {
		at := mustSolve(t, site)
		if at.Order > 0 {
			ordered++
		}
		// A symmetric difference of step h is off by h^2 times a third derivative of
		// order 1/U^2, and by rounding, 1e-13 of the largest term over h.
		const h = 1e-4
		u := math.Abs(site.Interaction)
		slope := func(change func(*Site, float64)) float64 {
			up, down := site, site
			change(&up, h*u)
			change(&down, -h*u)
			return (mustSolve(t, up).GrandPotential - mustSolve(t, down).GrandPotential) / (2 * h * u)
		}
		what := fmt.Sprintf("%+v", site)
		near(t, what+" filling", -slope(func(s *Site, d float64) { s.ChemicalPotential += d }), at.Filling, 3e-6)
		near(t, what+" entropy", -slope(func(s *Site, d float64) { s.Temperature += d }), at.Entropy, 3e-6)
		if at.Order > 0 {
			near(t, what+" kinetic", site.Coupling*slope(func(s *Site, d float64) { s.Coupling += d })/u, at.Kinetic/u, 1e-5)
		}
		sum := at.Kinetic + at.Interaction - site.Temperature*at.Entropy - site.ChemicalPotential*at.Filling
		near(t, what+" sum of the parts", sum/u, at.GrandPotential/u, 1e-11)
	}
	if ordered < 10 || ordered > 30 {
		t.Errorf("%d of 40 systems are ordered, want both kinds", ordered)
	}
}

// T < 0 of (-U, -mu) is T > 0 of (U, mu) with every energy reversed, exactly.
func TestSiteMirror(t *testing.T) {
	for _, site := range sites(20) {
		a := mustSolve(t, site)
		b := mustSolve(t, Site{-site.ChemicalPotential, -site.Interaction, -site.Coupling, -site.Temperature})
		same := a.Order == b.Order && a.Filling == b.Filling && a.Variance == b.Variance && a.Entropy == b.Entropy
		if !same || a.Kinetic != -b.Kinetic || a.Interaction != -b.Interaction || a.GrandPotential != -b.GrandPotential {
			t.Errorf("%+v: %+v, mirrored %+v", site, a, b)
		}
	}
}

// Above the boundary phi grows as a root, below it there is none.
func TestOrderAtTheBoundary(t *testing.T) {
	for _, temperature := range []float64{0, 0.05, 0.3, 2} {
		site := Site{ChemicalPotential: 0.4, Interaction: 1, Temperature: temperature}
		critical, err := CriticalCoupling(site)
		if err != nil {
			t.Fatal(err)
		}
		site.Coupling = critical * (1 - 1e-9)
		if got := mustSolve(t, site); got.Order != 0 {
			t.Errorf("T = %g: phi = %g just below the boundary, want 0", temperature, got.Order)
		}
		site.Coupling = critical * (1 + 1e-5)
		first := mustSolve(t, site).Order
		site.Coupling = critical * (1 + 4e-5)
		second := mustSolve(t, site).Order
		near(t, "ratio of phi at four times the distance", second/first, 2, 2e-3)
	}
}

// Deep in the superfluid the site is a coherent state: phi^2 = n = (mu + zJ)/U, no
// entropy; the corrections are of relative order sqrt(U/zJ)/n.
func TestDeepSuperfluid(t *testing.T) {
	got := mustSolve(t, Site{ChemicalPotential: -900, Interaction: 1, Coupling: 1000, Temperature: 1e-3})
	near(t, "filling", got.Filling, 100, 1)
	near(t, "phi^2", got.Order*got.Order, got.Filling, 0.5)
	near(t, "variance over filling", got.Variance/got.Filling, 1, 0.1)
	near(t, "entropy", got.Entropy, 0, 1e-12)
}

// At T = 0 a normal site is a Fock state.
func TestFockSite(t *testing.T) {
	for n := range 4 {
		got := mustSolve(t, Site{ChemicalPotential: float64(n) - 0.5, Interaction: 1, Coupling: 0.01})
		if got.Filling != float64(n) || got.Variance != 0 || got.Entropy != 0 || got.Distribution[n] != 1 {
			t.Errorf("mu = %g: %+v, want %d atoms", float64(n)-0.5, got, n)
		}
	}
}

// A hot site tends to the geometric distribution; what is left is of order U/T.
func TestInfiniteTemperature(t *testing.T) {
	for _, n := range []float64{0.2, 1, 3} {
		want, err := Infinite(n, -2)
		if err != nil {
			t.Fatal(err)
		}
		const hot = -1e6
		got := mustSolve(t, Site{ChemicalPotential: hot * math.Log(n/(n+1)), Interaction: -2, Coupling: 4, Temperature: hot})
		tol := 100 * (n + 1) * (n + 1) * 2 / 1e6
		near(t, "filling", got.Filling, want.Filling, tol)
		near(t, "variance", got.Variance, want.Variance, tol)
		near(t, "entropy", got.Entropy, want.Entropy, tol)
		near(t, "energy", got.Interaction, want.Interaction, 4*tol)
	}
	if empty, err := Infinite(0, 1); err != nil || empty.Entropy != 0 {
		t.Errorf("no atoms: %+v, %v, want no entropy", empty, err)
	}
	for _, tc := range [][2]float64{{-1, 1}, {math.NaN(), 1}, {1, math.NaN()}, {math.Inf(1), 1}} {
		if _, err := Infinite(tc[0], tc[1]); err == nil {
			t.Errorf("filling %g, U %g: want an error", tc[0], tc[1])
		}
	}
}

func TestSiteRefuses(t *testing.T) {
	for _, tc := range []struct {
		site Site
		want string
	}{
		{Site{ChemicalPotential: math.NaN(), Interaction: 1}, "finite"},
		{Site{Interaction: math.Inf(1)}, "finite"},
		{Site{Interaction: 1, Coupling: math.NaN()}, "finite"},
		{Site{Interaction: 1, Temperature: math.Inf(-1)}, "finite"},
		{Site{ChemicalPotential: 1, Coupling: 1, Temperature: 1}, "no bound"},
		{Site{Interaction: 1, Temperature: -1}, "no bound"},
		{Site{Interaction: -1, Temperature: 1}, "no bound"},
		{Site{ChemicalPotential: 1000, Interaction: 1}, "256 levels"},
		{Site{ChemicalPotential: 1, Interaction: 1, Temperature: 1e9}, "256 levels"},
		{Site{Interaction: 1e-100, Coupling: 1e99}, "256 levels"},
	} {
		got, err := NewSolver().Solve(tc.site)
		if err == nil || !strings.Contains(err.Error(), tc.want) {
			t.Errorf("%+v: got %+v, %v, want an error with %q", tc.site, got, err, tc.want)
		}
	}
}

// The cut-off is found, not given: the last level is empty and more levels change
// nothing.
func TestCutoffIsWatched(t *testing.T) {
	for _, site := range sites(20) {
		w := NewSolver()
		got, err := w.Solve(site)
		if err != nil {
			t.Fatal(err)
		}
		if got.TopWeight > topAllowed {
			t.Errorf("%+v: probability %g of the last of %d levels", site, got.TopWeight, w.levels)
		}
		filling, entropy := got.Filling, got.Entropy
		w.levels += 10
		w.grow()
		if w.order > 0 {
			w.average(w.order)
		} else {
			w.atomic()
		}
		more := w.collect()
		near(t, fmt.Sprintf("%+v filling with ten levels more", site), more.Filling, filling, 1e-11)
		near(t, fmt.Sprintf("%+v entropy with ten levels more", site), more.Entropy, entropy, 1e-11)
	}
}

func TestSolveAllocatesNothing(t *testing.T) {
	w := NewSolver()
	for _, site := range []Site{
		{ChemicalPotential: 0.4, Interaction: 1, Coupling: 0.5, Temperature: 0.2},
		{ChemicalPotential: -0.4, Interaction: -1, Coupling: 0.1, Temperature: -0.2},
	} {
		solve := func() {
			if _, err := w.Solve(site); err != nil {
				t.Fatal(err)
			}
		}
		solve()
		if n := testing.AllocsPerRun(5, solve); n != 0 {
			t.Errorf("%+v: %g allocations, want 0", site, n)
		}
	}
}

func BenchmarkSolve(b *testing.B) {
	for _, coupling := range []float64{0.1, 0.5, 3} {
		b.Run(fmt.Sprintf("coupling=%g", coupling), func(b *testing.B) {
			w := NewSolver()
			b.ReportAllocs()
			for b.Loop() {
				if _, err := w.Solve(Site{ChemicalPotential: 0.4, Interaction: 1, Coupling: coupling, Temperature: 0.2}); err != nil {
					b.Fatal(err)
				}
			}
		})
	}
}
