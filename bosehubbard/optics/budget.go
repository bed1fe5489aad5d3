package optics

import "math"

// Entry is what one beam or coil adds to the trap.
type Entry struct {
	Source       string     // name of the beam, "lattice x", "field"
	Kind         string     // "dipole", "lattice" or "magnetic"
	OmegaSquared [3]float64 // rad^2/s^2 along x, y, z; negative pushes outwards
}

// Budget lists all that shapes the trap.
type Budget []Entry

// Sum returns the total omega^2 along x, y, z, rad^2/s^2.
func (b Budget) Sum() [3]float64 {
	var sum [3]float64
	for _, e := range b {
		for i, w2 := range e.OmegaSquared {
			sum[i] += w2
		}
	}
	return sum
}

// SignedFrequency returns sign(w2) sqrt|w2| / 2 pi in Hz for w2 in rad^2/s^2:
// negative for an anti-trap.
func SignedFrequency(omegaSquared float64) float64 {
	return math.Copysign(math.Sqrt(math.Abs(omegaSquared)), omegaSquared) / (2 * math.Pi)
}

// OmegaSquared is the inverse of SignedFrequency, in rad^2/s^2.
func OmegaSquared(signedHz float64) float64 {
	omega := 2 * math.Pi * signedHz
	return omega * math.Abs(omega)
}
