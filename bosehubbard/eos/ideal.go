package eos

import (
	"fmt"
	"math"
)

// banded is what the models of a band share: the band from its floor for T > 0 and
// from its ceiling for T < 0.
type banded struct {
	terms Terms
	zones [2]*zone
	zJ    float64 // of the larger of the two ends, Hz
}

func newBanded(t Terms) (banded, error) {
	if err := t.check(); err != nil {
		return banded{}, err
	}
	b := banded{terms: t}
	for i, mirror := range []float64{1, -1} {
		band, err := t.band(mirror)
		if err != nil {
			return banded{}, err
		}
		b.zones[i] = newZone(band)
		b.zJ = max(b.zJ, -band.bottom)
	}
	return b, nil
}

// zone returns the band as the mirrored system has it.
func (b *banded) zone(f frame) *zone {
	if f.mirror < 0 {
		return b.zones[1]
	}
	return b.zones[0]
}

// Ideal is the gas without interaction, exact in the band.
type Ideal struct{ banded }

// NewIdeal returns the ideal gas of a band. With U != 0 it serves as a comparison for
// thin and hot gases: Doubt is 2 |beta U| n.
//
// It returns an error if a number is not finite or the band of an axis does not rise
// from one end of the zone to the other.
func NewIdeal(t Terms) (*Ideal, error) {
	b, err := newBanded(t)
	if err != nil {
		return nil, err
	}
	return &Ideal{b}, nil
}

// Name returns "ideal".
func (m *Ideal) Name() string { return "ideal" }

// Valid returns the error of At.
func (m *Ideal) Valid(mu, beta float64) error {
	_, err := m.At(mu, beta)
	return err
}

// At returns the point of the ideal gas,
//
//	n = int d^dq/(2 pi)^d 1/(exp(beta (E(q) - mu)) - 1)
//
// to about 1e-9 down to T of J/20 and 1e-8 at J/300, on three axes 1e-6. mu lies below
// the band for T > 0 and above it for T < 0; at T = 0 that means an empty lattice.
// Cost: 96, 820 and 5,984 points of the zone on one, two and three equal axes; no
// allocation.
//
// It returns an *InputError, or an *InvalidError where mu lies in the band, with U of
// the wrong sign and where U matters.
func (m *Ideal) At(mu, beta float64) (Point, error) {
	f, err := newFrame(m.Name(), mu, beta, m.terms.Interaction)
	if err != nil {
		return Point{}, err
	}
	z := m.zone(f)
	excess := z.band.bottom - f.mu
	if !(excess > 0) {
		return Point{}, &InvalidError{m.Name(), mu, beta,
			fmt.Sprintf("mu is %g Hz inside the band, the gas has condensed", -excess)}
	}
	out := m.point(f, z.normal(excess, f.beta))
	u := math.Abs(m.terms.Interaction)
	if out.Filling > 0 {
		out.Doubt = 2 * u * f.beta * out.Filling
	}
	if !(out.Doubt <= maxDoubt) {
		return Point{}, &InvalidError{m.Name(), mu, beta,
			fmt.Sprintf("2 |beta U| n = %g of a gas without interaction, want at most %g", out.Doubt, maxDoubt)}
	}
	return out, nil
}

// normal is bose with T = 0 as the empty lattice that it is.
func (z *zone) normal(excess, beta float64) gas {
	if math.IsInf(beta, 1) {
		return gas{}
	}
	return z.bose(excess, beta)
}

// point turns sums of an ideal gas into a point, with the interaction left 0.
func (b *banded) point(f frame, g gas) Point {
	out := Point{Filling: g.filling, Entropy: g.entropy}
	out.Kinetic = g.kinetic + b.zone(f).band.bottom*g.filling
	out.geometric()
	f.finish(&out)
	return out
}

// Threshold returns the filling above which the ideal gas has a condensate at a beta
// in 1/Hz of either sign: +Inf on one and two axes, where it never has, and 0 at T = 0.
//
// It is the filling at an excess of 1e-10 of zJ, within 2e-5 of the limit. It
// returns an *InputError if beta is 0 or not a number.
func (m *Ideal) Threshold(beta float64) (float64, error) {
	f, err := newFrame(m.Name(), 0, beta, 0)
	if err != nil {
		return 0, err
	}
	z := m.zone(f)
	switch {
	case math.IsInf(f.beta, 1):
		return 0, nil
	case len(z.band.hops) < 3:
		return math.Inf(1), nil
	}
	return z.bose(1e-10*m.zJ, f.beta).filling, nil
}
