package exact

import (
	"fmt"
	"math"
	"testing"
)

// hardCoreFloor is the lowest energy of free fermions with the same number: on a
// ring of L sites the momenta are 2 pi m/L for odd N and 2 pi (m + 1/2)/L for even.
func hardCoreFloor(sites, atoms int, periodic bool) float64 {
	sum := 0.0
	for k := range atoms {
		if periodic {
			sum -= 2 * math.Cos(2*math.Pi*(float64(k)-float64(atoms-1)/2)/float64(sites))
		} else {
			sum -= 2 * math.Cos(math.Pi*float64(k+1)/float64(sites+1))
		}
	}
	return sum
}

// For U -> infinity the floor tends to the one of hard-core bosons, which is that
// of free fermions (Girardeau, J. Math. Phys. 1, 516 (1960), from memory), with a
// first correction c J^2/U. So 2 E(2U) - E(U) leaves O(J^3/U^2), and U (E - limit)
// tends to c.
func TestHardCoreLimit(t *testing.T) {
	for _, tc := range []struct {
		sites, atoms int
		periodic     bool
		want         float64 // free fermions, calculated outside this project
	}{
		{6, 3, false, -3.4939592074},
		{8, 4, false, -4.7587704831},
		{6, 3, true, -4.0},
		{8, 4, true, -5.2262518595},
	} {
		name := fmt.Sprintf("L=%d N=%d periodic %v", tc.sites, tc.atoms, tc.periodic)
		limit := hardCoreFloor(tc.sites, tc.atoms, tc.periodic)
		near(t, name+" free fermions", limit, tc.want, 1e-10)
		floor := func(u float64) float64 {
			return chain(tc.sites, tc.atoms, tc.periodic, u, 0).solve(t, Options{}).Floor
		}
		e1, e2, e4 := floor(1000), floor(2000), floor(4000)
		near(t, name+" extrapolated", 2*e4-e2, limit, 1e-4)
		near(t, name+" extrapolated again", (8*e4-6*e2+e1)/3, limit, 1e-6)
		near(t, name+" slope in 1/U, ratio", (e1-limit)/(e2-limit), 2, 0.02)
		if !(e1 < e2 && e2 < e4 && e4 < limit) {
			t.Errorf("%s: floors %g, %g, %g do not rise to %g", name, e1, e2, e4, limit)
		}
	}
}

// The Mott state at large U: E = -2 Nb n(n+1) J^2/U + O(J^4/U^3), n = 1, second
// order perturbation theory; each of Nb bonds lets an atom hop both ways.
func TestMottLimit(t *testing.T) {
	for _, periodic := range []bool{false, true} {
		bonds := 5.0
		if periodic {
			bonds = 6
		}
		const u = 500
		got := chain(6, 6, periodic, u, 0).solve(t, Options{}).Floor
		near(t, "Mott energy times U", got*u, -4*bonds, 4*bonds*50/(u*u))
	}
}
