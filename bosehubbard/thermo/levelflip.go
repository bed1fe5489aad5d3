package thermo

import (
	"errors"
	"fmt"
	"math"
)

// ErrNotTwoLevels says that a slow passage is defined for two levels only.
var ErrNotTwoLevels = errors.New("not two levels of equal degeneracy")

// LandauZener returns the chance that a two-level body follows its level when the
// levels of
//
//	H/h = | rate t/2   coupling  |
//	      | coupling   -rate t/2 |
//
// approach to 2 |coupling| and part again, from long before to long after,
//
//	P = 1 - exp(-4 pi^2 coupling^2/|rate|)
//
// coupling in Hz, rate in Hz/s. It is 0 without coupling, else 1 at rate 0.
//
// Source: Landau, Phys. Z. Sowjetunion 2, 46 (1932); Zener, Proc. R. Soc. A 137,
// 696 (1932); from memory.
func LandauZener(coupling, rate float64) float64 {
	if coupling == 0 {
		return 0
	}
	return -math.Expm1(-4 * math.Pi * math.Pi * coupling * (coupling / math.Abs(rate)))
}

// Reversed returns the levels of -E, as after a field has changed sign. A list
// without an end stays one.
func (l Levels) Reversed() Levels {
	out := l
	out.Energies = make([]float64, len(l.Energies))
	for i, e := range l.Energies {
		out.Energies[i] = 0 - e
	}
	return out
}

// AfterReversal returns the levels of -E and the state there once the levels of
// bodies in the state s have been reversed, where a share following, 0 to 1, of
// the bodies followed its level through the crossing.
//
// At once, following = 0: every body stays in its level and keeps its share, so
// that beta changes sign and the entropy stays. Slowly, following = 1: every body
// stays low or stays high, and beta stays. In between the entropy grows. Only two
// levels of equal degeneracy have one crossing; for others following must be 0.
// See LandauZener for the share.
//
// It returns an error that wraps ErrNotTwoLevels, or one for a share outside 0
// to 1 or a state that is not one of l.
func (l Levels) AfterReversal(s LevelState, following float64) (Levels, LevelState, error) {
	if err := l.checkPassage(s, following); err != nil {
		return Levels{}, LevelState{}, err
	}
	out := l.Reversed()
	if following == 0 {
		r, err := out.ladder()
		if err != nil {
			return Levels{}, LevelState{}, err
		}
		return out, out.state(r, -s.Beta, 0-s.Energy), nil
	}
	state, err := out.withShares(s.Shares, following)
	return out, state, err
}

// AfterSweep returns the state once the frequency of a drive has been swept
// through the transition of two levels that stay where they are. A body that
// follows in the rotating frame changes its level: with following = 1 the shares
// are exchanged and beta changes sign, with 0 nothing happens.
//
// It returns the errors of AfterReversal.
//
// Source: adiabatic fast passage, Bloch, Phys. Rev. 70, 460 (1946), from memory.
func (l Levels) AfterSweep(s LevelState, following float64) (LevelState, error) {
	if err := l.checkPassage(s, following); err != nil {
		return LevelState{}, err
	}
	if following == 0 {
		return s, nil
	}
	return l.withShares(s.Shares, following)
}

func (l Levels) checkPassage(s LevelState, following float64) error {
	if err := l.check(); err != nil {
		return err
	}
	if !(following >= 0 && following <= 1) {
		return fmt.Errorf("thermo: share of %g that follows, want 0 to 1", following)
	}
	if len(s.Shares) != len(l.Energies) {
		return fmt.Errorf("thermo: state of %d levels, want %d", len(s.Shares), len(l.Energies))
	}
	if following != 0 && (len(l.Energies) != 2 || l.degeneracy(0) != l.degeneracy(1)) {
		return fmt.Errorf("thermo: passage of %d levels: %w", len(l.Energies), ErrNotTwoLevels)
	}
	return nil
}

// withShares is the state of two levels after a share of their bodies has changed
// places. It is an equilibrium, as every state of two levels is.
func (l Levels) withShares(shares []float64, exchanged float64) (LevelState, error) {
	first := (1-exchanged)*shares[0] + exchanged*shares[1]
	second := exchanged*shares[0] + (1-exchanged)*shares[1]
	u := (first*l.Energies[0] + second*l.Energies[1]) / (first + second)
	low, high := min(l.Energies[0], l.Energies[1]), max(l.Energies[0], l.Energies[1])
	return l.At(min(max(u, low), high))
}
