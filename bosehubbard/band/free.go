package band

import "math"

// almostFree is the depth in Er below which the first order in s is exact to
// rounding: the next terms are of order s^2 ln s in energies.
const almostFree = 1e-10

// freeBands returns the bands of a free particle, folded into the zone, with the
// shift s/2 and the splitting +-s/4 at q = 1 that a vanishing lattice brings.
//
//	J_r = -int_0^1 q^2 cos(pi q r) dq = -2 (-1)^r/(pi r)^2,  int w^4 = 2/(3 pi)
func freeBands(depth float64) Bands {
	b := Bands{
		Depth:     depth,
		Mean:      1.0/3 + depth/2,
		MeanSlope: 0.5,
		Width:     1 - depth/4,
		Gap:       depth / 2,
		Edges: [3][2]float64{
			{depth / 2, 1 + depth/4}, {4 + depth/2, 1 + 3*depth/4}, {4 + depth/2, 9 + depth/2},
		},
		WannierFourthMoment: 2 / (3 * math.Pi),
	}
	for r := range b.Tunnelling {
		n := math.Pi * float64(r+1)
		b.Tunnelling[r] = 2 * float64(1-2*(r&1)) / (n * n)
	}
	return b
}
