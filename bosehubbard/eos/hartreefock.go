package eos

import (
	"fmt"
	"math"
)

// HartreeFock is the normal gas in which every atom feels the others as a shift.
type HartreeFock struct{ banded }

// NewHartreeFock returns the Hartree-Fock gas of a band. Its errors are those of
// NewIdeal.
func NewHartreeFock(t Terms) (*HartreeFock, error) {
	b, err := newBanded(t)
	if err != nil {
		return nil, err
	}
	return &HartreeFock{b}, nil
}

// Name returns "Hartree-Fock".
func (m *HartreeFock) Name() string { return "Hartree-Fock" }

// Valid returns the error of At.
func (m *HartreeFock) Valid(mu, beta float64) error {
	_, err := m.At(mu, beta)
	return err
}

// At returns the point of an ideal gas in its own mean field,
//
//	n = n_ideal(mu - 2 U n)    E = E_ideal + U n^2
//
// the best Gaussian state without a condensate, so that its grand potential bounds the
// true one. Doubt is the larger of
//
//	2 |U/T| n x/(1 + x) with x = |U|/(|T| + zJ/2), two atoms avoiding each other, and
//	|U| n/(16 |bottom - mu + 2 U n|), the nearness of the superfluid
//
// Cost: some ten points of Ideal; no allocation.
//
// It returns an *InputError, or an *InvalidError with U of the wrong sign, where the
// Doubt is too large, and where three axes have no normal gas.
//
// Source: the variational principle of Gibbs and Bogoliubov; the Doubt is a
// guess that agrees with small clusters.
func (m *HartreeFock) At(mu, beta float64) (Point, error) {
	u := math.Abs(m.terms.Interaction)
	f, err := newFrame(m.Name(), mu, beta, m.terms.Interaction)
	if err != nil {
		return Point{}, err
	}
	z := m.zone(f)
	excess, ok := z.selfConsistent(z.band.bottom-f.mu, f.beta, u)
	if !ok {
		return Point{}, &InvalidError{m.Name(), mu, beta, "there is no normal gas, it has condensed"}
	}
	g := z.normal(excess, f.beta)
	out := m.point(f, g)
	out.Interaction = f.mirror * u * g.filling * g.filling
	out.Kinetic *= f.mirror // finish turns it again
	out.Interaction *= f.mirror
	f.finish(&out)
	x := u / (1/f.beta - z.band.bottom/2)
	avoiding, near := 0.0, 0.0
	if g.filling > 0 {
		avoiding, near = 2*u*f.beta*g.filling*x/(1+x), u*g.filling/(16*excess)
	}
	out.Doubt = max(avoiding, near)
	if !(out.Doubt <= maxDoubt) {
		return Point{}, &InvalidError{m.Name(), mu, beta, fmt.Sprintf(
			"collisions change n = %g by %g of itself, and |U| n is %g of 16 times the %g Hz to the superfluid, want at most half",
			g.filling, avoiding, near, excess)}
	}
	return out, nil
}

// selfConsistent solves excess = bare + 2 U n(excess) for a positive excess. The
// difference of both sides grows with the excess, so there is at most one. It is sought
// by Newton's method in the logarithm, kept inside a bracket.
func (z *zone) selfConsistent(bare, beta, u float64) (excess float64, ok bool) {
	if u == 0 || math.IsInf(beta, 1) {
		return bare, bare > 0
	}
	smallest := 1e-10 * (-z.band.bottom + 1/beta)
	low, high := max(bare, smallest), math.Inf(1)
	if z.bose(low, beta).filling*2*u+bare < low {
		return low, bare > 0 // no root above smallest: condensed unless bare is the root
	}
	x := low + 1/beta
	for range 200 {
		g := z.bose(x, beta)
		miss := x - bare - 2*u*g.filling
		if miss > 0 {
			high = x
		} else {
			low = x
		}
		if math.Abs(miss) <= 4e-15*(x+math.Abs(bare)+2*u*g.filling) || high-low <= 1e-15*high {
			break
		}
		next := x * math.Exp(-miss/(x*(1+2*u*g.response)))
		if !(next > low && next < high) {
			next = math.Sqrt(low * high)
			if math.IsInf(high, 1) {
				next = 4 * x
			}
		}
		x = next
	}
	return x, true
}
