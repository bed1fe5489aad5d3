package eos

import (
	"fmt"
	"math"

	"hilltop/bosehubbard/gutzwiller"
)

// Gutzwiller is one site in the mean field of its neighbours, in equilibrium.
type Gutzwiller struct {
	terms    Terms
	coupling [2]float64 // zJ of the end of the band that the sign of beta chooses
	solver   *gutzwiller.Solver
}

// NewGutzwiller returns the mean-field model of a lattice.
//
// It returns an error if a number is not finite, U = 0 or a band does not rise from one
// end of the zone to the other; an axis without tunnelling is fine.
func NewGutzwiller(t Terms) (*Gutzwiller, error) {
	if err := t.check(); err != nil {
		return nil, err
	}
	if t.Interaction == 0 {
		return nil, fmt.Errorf("eos: U = 0 in the Gutzwiller state, want an interaction")
	}
	m := &Gutzwiller{terms: t, solver: gutzwiller.NewSolver()}
	moving := Terms{}
	for _, hops := range t.Hops {
		if hops[0] != 0 || len(hops) > 1 {
			moving.Hops = append(moving.Hops, hops)
		}
	}
	for i, mirror := range []float64{1, -1} {
		band, err := moving.band(mirror)
		if err != nil {
			return nil, err
		}
		m.coupling[i] = -band.bottom
	}
	return m, nil
}

// Name returns "Gutzwiller".
func (m *Gutzwiller) Name() string { return "Gutzwiller" }

// Valid returns the error of At.
func (m *Gutzwiller) Valid(mu, beta float64) error {
	_, err := m.At(mu, beta)
	return err
}

// At returns the point of the mean field phi = <b> that makes
//
//	h = U n(n-1)/2 - mu n - zJ phi (b + b^+) + zJ phi^2
//
// most stable. Its normal phase is Atomic without the second order. Doubt is the larger
// of sum J^2/T^2 over the bonds of a site, at most 1/2, and half of zJ times the response
// of the normal phase, so that 1/2 is the boundary. It is 1/2 everywhere in the
// superfluid, whose entropy is too small: it misses the sound waves.
// Cost: some ten diagonalisations.
//
// It returns an *InputError, or an *InvalidError with U of the wrong sign, in a
// superfluid on one axis, where a mean field means nothing, and where more than
// gutzwiller.MaxLevels levels are needed.
//
// Source: see package gutzwiller.
func (m *Gutzwiller) At(mu, beta float64) (Point, error) {
	f, err := newFrame(m.Name(), mu, beta, m.terms.Interaction)
	if err != nil {
		return Point{}, err
	}
	site := gutzwiller.Site{ChemicalPotential: f.mu, Interaction: math.Abs(m.terms.Interaction),
		Coupling: m.coupling[0], Temperature: 1 / f.beta}
	if f.mirror < 0 {
		site.Coupling = m.coupling[1]
	}
	state, err := m.solver.Solve(site)
	if err != nil {
		return Point{}, &InvalidError{m.Name(), mu, beta, err.Error()}
	}
	out := Point{Filling: state.Filling, Entropy: state.Entropy, Kinetic: state.Kinetic, Interaction: state.Interaction,
		Variance: state.Variance, Order: state.Order * state.Order, Doubt: maxDoubt, HasShares: true}
	for n, p := range state.Distribution {
		out.Shares[min(n, Occupations-1)] += p
	}
	if state.Order > 0 && len(m.terms.Hops) == 1 {
		return Point{}, &InvalidError{m.Name(), mu, beta, "a mean field means nothing on one axis"}
	}
	if state.Order == 0 {
		critical, err := gutzwiller.CriticalCoupling(site)
		if err != nil {
			return Point{}, &InvalidError{m.Name(), mu, beta, err.Error()}
		}
		if critical > 0 {
			out.Doubt = min(maxDoubt, max(maxDoubt*site.Coupling/critical, m.terms.squares()*f.beta*f.beta))
		}
		if site.Coupling == 0 {
			out.Doubt = 0 // exact
		}
	}
	f.finish(&out)
	return out, nil
}
