package lattice

import (
	"fmt"
	"math"
)

// KineticRange returns the lowest and the highest kinetic energy per boson in
// the box with the given sites and periodic axes,
//
//	open axis, L sites:  -2J cos(pi k/(L+1)), k = 1..L
//	ring of L sites:     -2J cos(2 pi m/L),   m = 0..L-1
//
// summed over the axes, with tunnelling[a] = J of axis a of either sign; the
// result is in its unit. N bosons without interaction reach N times both. A
// ring of odd length is narrower on the side of the sign of J.
//
// It returns the errors of Box (without its limit on sites), and one if a
// tunnelling is missing, not finite, or too large to be summed.
//
// Source: derived; a plane wave on the ring, a standing wave on the open chain.
func KineticRange(sites []int, periodic []bool, tunnelling []float64) (floor, ceiling float64, err error) {
	if len(sites) < 1 || len(sites) > 3 || len(periodic) != len(sites) || len(tunnelling) != len(sites) {
		return 0, 0, fmt.Errorf("lattice: %d axes, %d periodic flags, %d tunnellings, want 1 to 3 and as many of each",
			len(sites), len(periodic), len(tunnelling))
	}
	for a, n := range sites {
		if n < 1 {
			return 0, 0, fmt.Errorf("lattice: %d sites along axis %d, want at least 1", n, a)
		}
		low, high := cosineRange(n, periodic[a])
		ends := [2]float64{2 * tunnelling[a] * low, 2 * tunnelling[a] * high}
		floor += min(ends[0], ends[1])
		ceiling += max(ends[0], ends[1])
		if math.IsNaN(floor+ceiling) || math.IsInf(floor, 0) || math.IsInf(ceiling, 0) {
			return 0, 0, fmt.Errorf("lattice: tunnelling %g along axis %d, want a finite range", tunnelling[a], a)
		}
	}
	return floor, ceiling, nil
}

// cosineRange returns the ends of -cos over the quasi-momenta of one axis.
func cosineRange(n int, periodic bool) (low, high float64) {
	switch {
	case n == 1:
		return 0, 0 // no bond; cos(pi/2) would leave 6e-17
	case !periodic || n == 2:
		edge := math.Cos(math.Pi / float64(n+1))
		return -edge, edge
	case n%2 == 0:
		return -1, 1
	default:
		return -1, math.Cos(math.Pi / float64(n)) // pi itself is not a quasi-momentum
	}
}
