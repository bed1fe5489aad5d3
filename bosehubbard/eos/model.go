package eos

import (
	"fmt"
	"math"
)

// Model is one equation of state. All of this package belong to one goroutine at a
// time.
type Model interface {
	Name() string

	// Valid returns nil if the model holds at a chemical potential in Hz and a beta in
	// 1/Hz, and else the *InvalidError or *InputError that At would return.
	Valid(mu, beta float64) error

	// At returns the point.
	At(mu, beta float64) (Point, error)
}

// Occupations is the length of Point.Shares.
const Occupations = 12

// maxDoubt is the largest Doubt at which a model answers.
const maxDoubt = 0.5

// Point is a lattice in equilibrium, per site. Energy is Kinetic + Interaction, and
// GrandPotential is Energy - T Entropy - mu Filling.
type Point struct {
	Filling        float64 // <n>
	Entropy        float64 // kB
	Energy         float64 // Hz
	Kinetic        float64 // Hz, from the centre of the band
	Interaction    float64 // U <n(n-1)>/2, Hz
	GrandPotential float64 // Hz
	Variance       float64 // <n^2> - <n>^2 of one site
	Order          float64 // |<b>|^2 of a model with a mean field, else 0

	// Shares[k] is the share of sites with k atoms, the last entry that of all with
	// more. They are given if HasShares.
	Shares    [Occupations]float64
	HasShares bool

	// Doubt is the rough size of what the model leaves out, relative to what it gives.
	Doubt float64
}

// InvalidError says that a model does not hold at a point.
type InvalidError struct {
	Model    string
	Mu, Beta float64
	Reason   string
}

func (e *InvalidError) Error() string {
	return fmt.Sprintf("eos: %s at mu = %g Hz, beta = %g /Hz: %s", e.Model, e.Mu, e.Beta, e.Reason)
}

// InputError says that a number makes no sense for any model.
type InputError struct {
	Mu, Beta float64
	Reason   string
}

func (e *InputError) Error() string {
	return fmt.Sprintf("eos: mu = %g Hz, beta = %g /Hz: %s", e.Mu, e.Beta, e.Reason)
}

// frame is a point of the mirrored system, at beta > 0.
type frame struct {
	mirror   float64 // +1, or -1 where all energies changed sign
	mu, beta float64
}

// newFrame mirrors a point to beta > 0 for an interaction u.
func newFrame(model string, mu, beta, u float64) (frame, error) {
	switch {
	case math.IsNaN(mu) || math.Abs(mu) > maxHz || math.IsNaN(beta):
		return frame{}, &InputError{mu, beta, "want a finite mu and a beta that is a number"}
	case beta == 0:
		return frame{}, &InputError{mu, beta, "mu sets no filling at infinite temperature, give the filling instead"}
	case math.Abs(beta) < 1/maxHz:
		return frame{}, &InputError{mu, beta, "beta is too small to be told from 0"}
	case u*beta < 0:
		return frame{}, &InvalidError{model, mu, beta, fmt.Sprintf("U = %g Hz leaves the energy without a bound, want the sign of beta", u)}
	}
	m := math.Copysign(1, beta)
	return frame{m, m * mu, m * beta}, nil
}

// maxHz bounds all parameters, so that no product of a few overflows.
const maxHz = 1e60

// finish turns the sums of the mirrored system into a point. out holds filling,
// entropy, variance, shares, kinetic energy and interaction of the mirrored system.
func (f frame) finish(out *Point) {
	heat := 0.0
	if !math.IsInf(f.beta, 1) {
		heat = out.Entropy / f.beta
	}
	out.Kinetic *= f.mirror
	out.Interaction *= f.mirror
	out.Energy = out.Kinetic + out.Interaction
	out.GrandPotential = out.Energy - f.mirror*(heat+f.mu*out.Filling)
}

// Infinite returns the point at infinite temperature, of either sign, where only the
// filling is held:
//
//	p_k = n^k/(1+n)^(k+1)    S = (1+n) ln(1+n) - n ln n    <n(n-1)> = 2 n^2
//
// All models approach it as beta goes to 0 at fixed beta mu = ln(n/(1+n)). The
// GrandPotential, which has no bound there, is left 0.
//
// It returns an error unless filling >= 0 [atoms per site] and interaction [Hz] are finite.
func Infinite(filling, interaction float64) (Point, error) {
	if !(filling >= 0 && filling < maxHz) || !(math.Abs(interaction) < maxHz) {
		return Point{}, fmt.Errorf("eos: filling %g, U = %g Hz at infinite temperature, want at least 0 atoms and a finite U", filling, interaction)
	}
	out := Point{Filling: filling, Interaction: interaction * filling * filling}
	out.Energy = out.Interaction
	if filling > 0 {
		out.Entropy = math.Log1p(filling) + filling*math.Log1p(1/filling)
	}
	out.geometric()
	return out, nil
}

// geometric sets variance and shares of a site whose state is Gaussian with the
// filling given, as in every ideal gas without a condensate.
func (p *Point) geometric() {
	n := p.Filling
	p.Variance, p.HasShares = n*(1+n), true
	share, ratio := 1/(1+n), n/(1+n)
	for k := range p.Shares[:Occupations-1] {
		p.Shares[k] = share
		share *= ratio
	}
	p.Shares[Occupations-1] = share * (1 + n)
}
