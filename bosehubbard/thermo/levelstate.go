package thermo

import (
	"fmt"
	"math"

	"hilltop/bosehubbard/si"
)

// LevelState is the equilibrium of many bodies, given per body.
type LevelState struct {
	Energy   float64 // Hz
	Beta     float64 // 1/(kB T), 1/Hz; +Inf at the lowest level, -Inf at the highest
	Kelvin   float64 // T; +0 and -0 at the ends, +Inf at Beta = 0
	Entropy  float64 // canonical, kB
	Variance float64 // of the energy of one body, Hz^2

	// Counted over all bodies at one energy, S = ln(omega(E) eps), beta = dS/dE,
	// eps the smallest spacing of two levels; to first order in 1/Bodies.
	MicroEntropy float64 // kB
	MicroBeta    float64 // 1/Hz

	Shares []float64 // of the bodies in each level, in the order given
}

// At returns the equilibrium of a mean energy per body [Hz].
//
// Beta is good to about 1e-13 of itself. Exactly at an end it is infinite, the
// temperature is a zero of that sign and the entropy is ln of the degeneracy.
// Cost O(levels).
//
// It returns an error that wraps ErrOutOfRange and gives the range if no state has
// this energy, and an error for what is no list of levels.
//
// Source: Purcell and Pound, Phys. Rev. 81, 279 (1951), and Ramsey, Phys. Rev.
// 103, 20 (1956), for T < 0 of levels bounded above; from memory.
func (l Levels) At(energy float64) (LevelState, error) {
	r, err := l.ladder()
	if err != nil {
		return LevelState{}, err
	}
	if !(energy >= r.lowest() && energy <= r.highest()) {
		return LevelState{}, fmt.Errorf("thermo: %g Hz per body, want %g to %g Hz: %w",
			energy, r.lowest(), r.highest(), ErrOutOfRange)
	}
	return l.state(r, r.beta(energy), energy), nil
}

// AtBeta returns the equilibrium of an inverse temperature [1/Hz] of either sign,
// which may be infinite. Cost O(levels).
//
// It returns an error if beta is not a number or l is no list of levels.
func (l Levels) AtBeta(beta float64) (LevelState, error) {
	r, err := l.ladder()
	if err != nil {
		return LevelState{}, err
	}
	if math.IsNaN(beta) {
		return LevelState{}, fmt.Errorf("thermo: beta %g per Hz, want a number", beta)
	}
	g := r.at(beta)
	return l.state(r, beta, g.end+g.shift), nil
}

// state describes the ladder r of l at beta, where the energy per body is known.
func (l Levels) state(r ladder, beta, energy float64) LevelState {
	g := r.at(beta)
	s := LevelState{
		Energy: energy, Beta: beta + 0, // no -0
		Kelvin:  si.KelvinFromHz(1 / (beta + 0)),
		Entropy: g.entropy(beta), Variance: g.variance,
		Shares: make([]float64, len(l.Energies)),
	}
	s.MicroEntropy, s.MicroBeta = g.finite(beta, r.spacing(), l.Bodies)
	for i, rung := range r.rung {
		s.Shares[i] = g.share[rung] * l.degeneracy(i) / r.weight[rung]
	}
	return s
}

// finite corrects entropy and beta per body for a finite number of bodies,
//
//	S = N s - ln(2 pi N var/eps^2)/2,   beta = ds/du - skew/(2 N var^2)
//
// the saddle point of the integral that counts the states, with du/dbeta = -var
// and dvar/dbeta = -skew. It needs many quanta eps among the bodies, N var >
// eps^2; below, and for N = 0, it returns the canonical values.
//
// Source: Darwin and Fowler, Phil. Mag. 44, 450 (1922), from memory; the next
// term is of order 1/(N^2 var) of the entropy.
func (g gibbs) finite(beta, eps, bodies float64) (entropy, microBeta float64) {
	entropy, microBeta = g.entropy(beta), beta
	if bodies == 0 || !(bodies*g.variance > eps*eps) || eps == 0 {
		return entropy, microBeta
	}
	entropy -= math.Log(2*math.Pi*bodies*(g.variance/eps)/eps) / (2 * bodies)
	microBeta -= g.skew / g.variance / g.variance / (2 * bodies)
	return entropy, microBeta
}

// LevelCurve is entropy against energy per body, from the lowest to the highest
// level.
type LevelCurve struct {
	Energy  []float64 // Hz
	Entropy []float64 // kB
	Beta    []float64 // 1/Hz; infinite at both ends
}

// Curve returns S(E) and beta(E) per body at evenly spaced energies, ends
// included. Cost O(points levels).
//
// It returns an error if points < 2 or l is no list of levels.
func (l Levels) Curve(points int) (LevelCurve, error) {
	r, err := l.ladder()
	if err != nil {
		return LevelCurve{}, err
	}
	if points < 2 {
		return LevelCurve{}, fmt.Errorf("thermo: %d points, want at least 2", points)
	}
	c := LevelCurve{Energy: make([]float64, points), Entropy: make([]float64, points), Beta: make([]float64, points)}
	for i := range points {
		u := r.lowest() + (r.highest()-r.lowest())*(float64(i)/float64(points-1))
		u = min(u, r.highest())
		c.Energy[i], c.Beta[i] = u, r.beta(u)
		c.Entropy[i] = r.at(c.Beta[i]).entropy(c.Beta[i])
	}
	c.Energy[points-1], c.Beta[points-1] = r.highest(), r.beta(r.highest())
	return c, nil
}
