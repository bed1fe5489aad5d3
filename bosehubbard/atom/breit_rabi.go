package atom

import (
	"fmt"
	"math"

	"hilltop/bosehubbard/si"
)

// Energy returns the energy E/h [Hz] of a ground state in the field B [T],
//
//	E = -D/(2(2I+1)) + gI muB mF B +- (D/2) sqrt(1 + 4 mF x/(2I+1) + x^2)
//	x = (gJ - gI) muB B/D,  D = A (I + 1/2)
//
// with + for F = I + 1/2, counted from the energy without hyperfine coupling.
// For mF = +-(I + 1/2) the root is 1 +- x with its sign. No allocation.
//
// It panics if st is not a ground state of s.
//
// Source: Breit and Rabi, Phys. Rev. 38, 2082 (1931).
func (s *Species) Energy(st State, field float64) float64 {
	upper := s.mustBeUpper(st)
	ratio := st.MF / (s.NuclearSpin + 0.5) // 2 mF/(2I+1), between -1 and 1
	splitting := s.Hyperfine * (s.NuclearSpin + 0.5)
	x := (s.GJ - s.GI) * si.BohrMagneton * field / (si.PlanckConstant * splitting)
	centre := -splitting/(2*(2*s.NuclearSpin+1)) + s.GI*si.BohrMagneton*st.MF*field/si.PlanckConstant
	return centre + upper*splitting/2*root(ratio, x)
}

// Moment returns the magnetic moment -dE/dB [J/T] of a ground state in the field
// B [T]; it is positive for a high-field seeker,
//
//	mu = -gI muB mF -+ ((gJ - gI) muB/2) (2 mF/(2I+1) + x)/sqrt(...)
//
// with the signs and the root of Energy. No allocation.
//
// It panics if st is not a ground state of s.
//
// Source: derivative of Breit and Rabi, Phys. Rev. 38, 2082 (1931).
func (s *Species) Moment(st State, field float64) float64 {
	upper := s.mustBeUpper(st)
	ratio := st.MF / (s.NuclearSpin + 0.5)
	splitting := s.Hyperfine * (s.NuclearSpin + 0.5)
	x := (s.GJ - s.GI) * si.BohrMagneton * field / (si.PlanckConstant * splitting)
	slope := ratio // of the stretched states, where the root is 1 +- x
	if math.Abs(ratio) < 1 {
		slope = (ratio + x) / root(ratio, x)
	}
	return -si.BohrMagneton * (s.GI*st.MF + upper*(s.GJ-s.GI)/2*slope)
}

// Transition returns the frequency [Hz] of the transition between two ground
// states in the field B [T] and its slope against the field [Hz/T]. Both are
// differences of the second state and the first, so they have a sign. It is
// what a radio-frequency or microwave calibration of the field measures.
//
// It panics if a state is not a ground state of s.
func (s *Species) Transition(from, to State, field float64) (hz, hzPerTesla float64) {
	hz = s.Energy(to, field) - s.Energy(from, field)
	return hz, (s.Moment(from, field) - s.Moment(to, field)) / si.PlanckConstant
}

// root returns sqrt(1 + 2 r x + x^2), and 1 +- x with its sign where r = +-1.
func root(ratio, x float64) float64 {
	if math.Abs(ratio) >= 1 {
		return 1 + ratio*x
	}
	// (x + r)^2 + (1 - r^2) keeps its digits where x is near -r.
	return math.Hypot(x+ratio, math.Sqrt((1-ratio)*(1+ratio)))
}

// mustBeUpper returns +1 for F = I + 1/2 and -1 for F = I - 1/2.
func (s *Species) mustBeUpper(st State) float64 {
	switch {
	case math.Abs(st.MF) > st.F:
	case st.F == s.NuclearSpin+0.5:
		return 1
	case st.F == s.NuclearSpin-0.5:
		return -1
	}
	panic(fmt.Sprintf("atom: F=%g, mF=%g is not a ground state of nuclear spin %g", st.F, st.MF, s.NuclearSpin))
}
