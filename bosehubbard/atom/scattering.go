package atom

import (
	"errors"
	"fmt"
	"math"
	"slices"
)

// ErrPole says that a field is the position of a Feshbach resonance, where the
// scattering length has no value.
var ErrPole = errors.New("the scattering length diverges there")

// Resonance is one Feshbach resonance: a pole of the scattering length at
// Position and a zero at Position + Width. A position may lie at negative
// field, as that of a virtual state does.
type Resonance struct {
	Position, Width float64 // T
}

// ScatteringCurve is the s-wave scattering length against the magnetic field,
//
//	a(B) = abg prod_i (B - B_i - D_i)/(B - B_i)
//
// with position B_i and width D_i. For one resonance this is the usual
// abg (1 - D/(B - B0)). For several the background is that of all of them
// together, far away from every one; the background that a narrow one sees is
// the product of the other factors. Without a resonance a is the background.
//
// Source: Chin et al., Rev. Mod. Phys. 82, 1225 (2010), section II; the product
// form: Lange et al., Phys. Rev. A 79, 013622 (2009), from memory.
type ScatteringCurve struct {
	Background float64 // abg, m
	Resonances []Resonance
}

// Validate returns nil if the curve can be used: a background and widths that
// are finite and not 0, positions that differ, and no zero that falls on the
// pole of another resonance and cancels it.
func (c ScatteringCurve) Validate() error {
	if c.Background == 0 || !finite(c.Background) {
		return fmt.Errorf("atom: background scattering length %g m, want a finite length that is not 0", c.Background)
	}
	for i, r := range c.Resonances {
		if !finite(r.Position) {
			return fmt.Errorf("atom: resonance %d at %g T, want a finite field", i+1, r.Position)
		}
		if r.Width == 0 || !finite(r.Width) || r.zero() == r.Position {
			return fmt.Errorf("atom: resonance %d with width %g T, want a finite width that is not 0", i+1, r.Width)
		}
		for j, other := range c.Resonances[:i] {
			switch {
			case coincide(r.Position, other.Position):
				return fmt.Errorf("atom: resonances %d and %d are both at %g T, want different fields", j+1, i+1, r.Position)
			case coincide(r.zero(), other.Position) || coincide(other.zero(), r.Position):
				return fmt.Errorf("atom: the zero of one of the resonances %d and %d cancels the pole of the other, want one resonance in their place", j+1, i+1)
			}
		}
	}
	return nil
}

// At returns the scattering length [m] at the field [T]. It is exactly 0 at the
// fields that Zeros returns. No allocation unless it fails.
//
// It returns ErrPole on a resonance, where a has no value.
func (c ScatteringCurve) At(field float64) (float64, error) {
	if !finite(field) {
		return 0, fmt.Errorf("atom: scattering length at the field %g T, want a finite field", field)
	}
	a := c.at(field)
	switch {
	case !finite(a):
		return 0, fmt.Errorf("atom: scattering length at %.9g T: %w", field, ErrPole)
	case a == 0:
		return 0, nil // never -0
	}
	return a, nil
}

// at is At without the checks: on a pole it is infinite or NaN.
func (c ScatteringCurve) at(field float64) float64 {
	a := c.Background
	for _, r := range c.Resonances {
		a *= (field - r.zero()) / (field - r.Position)
	}
	return a
}

// Slope returns da/dB [m/T] at the field [T]. No allocation unless it fails.
//
// It returns ErrPole on a resonance.
func (c ScatteringCurve) Slope(field float64) (float64, error) {
	if !finite(field) {
		return 0, fmt.Errorf("atom: slope of the scattering length at the field %g T, want a finite field", field)
	}
	a, slope := c.Background, 0.0
	for _, r := range c.Resonances {
		distance := field - r.Position
		factor := (field - r.zero()) / distance
		a, slope = a*factor, slope*factor+a*(r.zero()-r.Position)/(distance*distance)
	}
	if !finite(slope) {
		return 0, fmt.Errorf("atom: slope of the scattering length at %.9g T: %w", field, ErrPole)
	}
	return slope, nil
}

// Poles returns the fields [T] at which a diverges, ascending.
func (c ScatteringCurve) Poles() []float64 {
	return c.fields(func(r Resonance) float64 { return r.Position })
}

// Zeros returns the fields [T] at which a is 0, ascending.
func (c ScatteringCurve) Zeros() []float64 { return c.fields(Resonance.zero) }

func (c ScatteringCurve) fields(of func(Resonance) float64) []float64 {
	out := make([]float64, len(c.Resonances))
	for i, r := range c.Resonances {
		out[i] = of(r)
	}
	slices.Sort(out)
	return out
}

func (r Resonance) zero() float64 { return r.Position + r.Width }

func finite(x float64) bool { return !math.IsNaN(x) && !math.IsInf(x, 0) }

// coincide says that two fields differ by no more than the rounding of a sum.
func coincide(x, y float64) bool {
	return math.Abs(x-y) <= 4e-16*math.Max(math.Abs(x), math.Abs(y))
}
