package optics

import "math"

// Axis is one of the three directions of the apparatus.
type Axis int

// The axes.
const (
	X Axis = iota
	Y
	Z
)

// String returns "x", "y" or "z".
func (a Axis) String() string { return "xyz"[a : a+1] }

// Transverse returns the two other axes in the order x, y, z.
func (a Axis) Transverse() (Axis, Axis) {
	switch a {
	case X:
		return Y, Z
	case Y:
		return X, Z
	}
	return X, Y
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
