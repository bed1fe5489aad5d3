package eos

import (
	"fmt"
	"math"
)

// Bogoliubov is the superfluid of weak coupling: a mean field and, to first order, the
// sound waves on it.
type Bogoliubov struct{ banded }

// NewBogoliubov returns the Bogoliubov gas of a band. Its errors are those of NewIdeal,
// and one for U = 0.
func NewBogoliubov(t Terms) (*Bogoliubov, error) {
	b, err := newBanded(t)
	if err != nil {
		return nil, err
	}
	if t.Interaction == 0 {
		return nil, fmt.Errorf("eos: U = 0 in the Bogoliubov gas, want an interaction")
	}
	return &Bogoliubov{b}, nil
}

// Name returns "Bogoliubov".
func (m *Bogoliubov) Name() string { return "Bogoliubov" }

// Valid returns the error of At.
func (m *Bogoliubov) Valid(mu, beta float64) error {
	_, err := m.At(mu, beta)
	return err
}

// At returns the point of the grand potential to one loop, with e the energy above the
// bottom of the band, m = mu - bottom and w = sqrt(e (e + 2m)):
//
//	Omega = -m^2/2U + mean over q of [(w - e - m)/2 + T ln(1 - exp(-w/T))]
//
// Two lower dimensions have no condensate at T != 0, yet the sums are finite there, as
// for a quasi-condensate. Doubt is the larger of the loop over the mean field in n, both
// its parts taken positive, and of U/zJ over 2. About 1e-6. Cost as Ideal; no allocation.
//
// It returns an *InputError, or an *InvalidError with U of the wrong sign, mu on the
// empty side of the band and where the Doubt is too large.
//
// Source: Bogoliubov (1947), as a loop expansion of the grand potential; from memory.
func (m *Bogoliubov) At(mu, beta float64) (Point, error) {
	u := math.Abs(m.terms.Interaction)
	f, err := newFrame(m.Name(), mu, beta, m.terms.Interaction)
	if err != nil {
		return Point{}, err
	}
	z := m.zone(f)
	above := f.mu - z.band.bottom
	if !(above > 0) {
		return Point{}, &InvalidError{m.Name(), mu, beta, fmt.Sprintf("mu is %g Hz on the empty side of the band, there is no mean field", -above)}
	}
	s := z.sound(above, f.beta)
	mean := above / u
	out := Point{Filling: mean - s.depletion, Entropy: s.entropy}
	out.Doubt = max(s.outside/mean, u/(-2*z.band.bottom))
	if !(out.Doubt <= maxDoubt) {
		return Point{}, &InvalidError{m.Name(), mu, beta, fmt.Sprintf(
			"%g atoms per site are in sound waves on a mean field of %g at U/zJ = %g, want at most half of it and U/zJ up to 1",
			s.outside, mean, -u/z.band.bottom)}
	}
	out.Interaction = above * above / (2 * u) // U dOmega/dU
	// Omega + T S = loop energy - m^2/2U, and E = that + mu n.
	out.Kinetic = s.energy - above*above/(2*u) + f.mu*out.Filling - out.Interaction
	out.Variance = mean*mean + out.Filling - out.Filling*out.Filling
	f.finish(&out)
	return out, nil
}

// loop holds what the sound waves add.
type loop struct {
	depletion float64 // what they take from m/U
	outside   float64 // the same, with the zero-point part counted as positive
	energy    float64 // zero-point and thermal, Hz
	entropy   float64
}

// crowd is how much nearer to the bottom of the band than the last scale of the sound
// waves the nodes begin, by the number of axes: w has a cusp there.
var crowd = [4]float64{0, 1e-6, 1e-3, 0.05}

// sound sums the sound waves at m = above. No allocation.
func (z *zone) sound(above, beta float64) loop {
	thermal := max(1/(2*above*beta*beta), -1e-6*z.band.bottom) // (T/c)^2
	z.lay(crowd[len(z.band.hops)] * min(above, -z.band.bottom, thermal))
	var l loop
	for i, e := range z.energy {
		w, p := math.Sqrt(e*(e+2*above)), z.weight[i]
		ratio := math.Sqrt(e / (e + 2*above)) // e/w
		// (w - e - m)/2 without cancellation: -m^2/(2 (w + e + m)).
		l.energy -= p * above * above / (2 * (w + e + above))
		l.depletion += p * (ratio - 1) / 2
		l.outside += p * (1 - ratio) / 2
		if x := beta * w; x < 700 && x > 0 {
			b := 1 / math.Expm1(x)
			l.energy += p * w * b
			l.entropy += p * (x*b + math.Log1p(b))
			l.depletion += p * ratio * b
			l.outside += p * ratio * b
		}
	}
	return l
}
