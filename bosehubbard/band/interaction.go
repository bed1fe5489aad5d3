package band

import (
	"math"

	"hilltop/bosehubbard/si"
)

// Interaction returns U/h in Hz of two atoms on one site,
//
//	U = (4 pi hbar^2 a/m) int |w|^4 d^3r,  int |w|^4 d^3r = prod_i k_i I_i
//
// scatteringLength [m] may have either sign; mass [kg] > 0; wave is the wave
// number pi/d of each axis [1/m] and moment its WannierFourthMoment.
//
// Source: Bloch, Dalibard, Zwerger, Rev. Mod. Phys. 80, 885 (2008), section IV.A.
func Interaction(scatteringLength, mass float64, wave, moment [3]float64) float64 {
	const hbar = si.ReducedPlanckConstant
	u := 4 * math.Pi * hbar * hbar * scatteringLength / mass / si.PlanckConstant
	for i, k := range wave {
		u *= k * moment[i]
	}
	return u
}
