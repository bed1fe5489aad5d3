package gutzwiller

import (
	"fmt"
	"math"
)

// LobeBoundary returns the coupling zJ/U at which the Mott insulator with n atoms
// per site ends at T = 0, for m = mu/U.
//
//	zJ/U = (n - m)(m - n + 1)/(1 + m)
//
// It returns an error unless n >= 1 and n-1 <= m <= n.
//
// Source: Fisher et al., Phys. Rev. B 40, 546 (1989); van Oosten et al., Phys. Rev.
// A 63, 053601 (2001); from memory.
func LobeBoundary(n int, m float64) (float64, error) {
	if n < 1 || !(m >= float64(n-1) && m <= float64(n)) {
		return 0, fmt.Errorf("gutzwiller: lobe of %d atoms at mu/U = %g, want at least 1 atom and mu/U from n-1 to n", n, m)
	}
	return (float64(n) - m) * (m - float64(n) + 1) / (1 + m), nil
}

// LobeTip returns mu/U and zJ/U at the tip of the lobe of n atoms per site,
//
//	m = sqrt(n(n+1)) - 1     zJ/U = 2n + 1 - 2 sqrt(n(n+1))
//
// It returns an error if n < 1. Source: as LobeBoundary.
func LobeTip(n int) (m, coupling float64, err error) {
	if n < 1 {
		return 0, 0, fmt.Errorf("gutzwiller: lobe of %d atoms, want at least 1", n)
	}
	root := math.Sqrt(float64(n) * (float64(n) + 1))
	return root - 1, 1 / (2*float64(n) + 1 + 2*root), nil // the inverse does not cancel
}

// CriticalCoupling returns the |zJ| in Hz above which a site in equilibrium has
// phi != 0, at the temperature and the chemical potential of the site; its coupling
// is not read.
//
//	1/zJ = (1/Z) sum_n e^(-beta E_n) [(n+1)/(E_(n+1)-E_n) + n/(E_(n-1)-E_n)],
//	E_n = U n(n-1)/2 - mu n
//
// It is 0 where two occupations have the same lowest energy at T = 0.
//
// It returns the errors of Solver.Solve. Source: as LobeBoundary; the sum is taken
// over pairs n, n+1, which has no poles.
func CriticalCoupling(site Site) (float64, error) {
	site.Coupling = 0
	w := NewSolver()
	if err := w.prepare(site); err != nil {
		return 0, err
	}
	w.grow()
	return 1 / w.susceptibility(), nil
}
