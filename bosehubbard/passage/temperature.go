package passage

import (
	"context"
	"errors"
	"fmt"
	"math"

	"hilltop/bosehubbard"
	"hilltop/bosehubbard/lattice"
	"hilltop/bosehubbard/thermo"
)

// ErrAtEnd says that an energy is so near an end of the spectrum that |T| is below
// a thousandth of J.
var ErrAtEnd = errors.New("the energy is at an end of the spectrum")

// Thermal is the canonical ensemble that has a given energy.
type Thermal struct {
	Beta float64 // 1/(kB T), 1/Hz; negative for T < 0

	// PerTunnelling is kB T in units of the largest |J|; infinite for beta = 0, NaN
	// without tunnelling.
	PerTunnelling float64

	EntropyPerAtom, EntropyError float64 // kB per atom; the error is half a 95 % interval

	Exact bool // from the full spectrum
}

// rungs is the number of |beta| of either sign, from 1e-3 to 1e3 over the unit of
// energy: a factor of 1.155 apart.
const rungs = 97

// infinite is the |beta| over the unit of energy below which T counts as infinite:
// rounding of the energy.
const infinite = 1e-10

// Match returns the canonical ensemble of atoms on a lattice with a given energy
// per atom [Hz], of either sign of T: what the state would relax to if it forgot
// all but its energy.
//
// Between the values of beta that are computed, ln Z is interpolated with its first
// two derivatives, -E and Var. Cost: that of thermo.Canonical.
//
// It returns an error that wraps ErrAtEnd, and the errors of thermo.Canonical.
func Match(ctx context.Context, l *lattice.Lattice, m bosehubbard.Model, atoms int, energy float64, opt thermo.CanonicalOptions) (*Thermal, error) {
	system := thermo.System{Lattice: l, Model: m, Atoms: atoms}
	unit := system.Unit()
	betas := make([]float64, 2*rungs+1)
	for k := range rungs {
		beta := math.Pow(10, -3+6*float64(k)/(rungs-1)) / unit
		betas[rungs+1+k], betas[rungs-1-k] = beta, -beta
	}
	averages, err := thermo.Canonical(ctx, system, betas, opt)
	if err != nil {
		return nil, err
	}
	points := averages.Points
	total := energy * float64(atoms)
	at := 0 // E falls with beta
	for at < len(points)-1 && points[at+1].Energy > total {
		at++
	}
	if !(points[0].Energy > total) || at == len(points)-1 {
		return nil, fmt.Errorf("passage: %g Hz per atom: %w", energy, ErrAtEnd)
	}
	between := newQuintic(points[at], points[at+1])
	beta := between.where(total)
	if math.Abs(beta)*unit < infinite {
		beta = 0
	}
	t := &Thermal{Beta: beta, PerTunnelling: math.NaN(), Exact: averages.Exact}
	logZ, _ := between.at(beta)
	t.EntropyPerAtom = (logZ + beta*total) / float64(atoms)
	t.EntropyError = max(points[at].EntropyError, points[at+1].EntropyError) / float64(atoms)
	if j := largestTunnelling(m); j > 0 {
		t.PerTunnelling = 1 / (beta * j)
	}
	return t, nil
}

// quintic is ln Z between two values of beta: the polynomial with the right value,
// first and second derivative at both.
type quintic struct {
	from, length float64 // of beta
	c            [6]float64
}

func newQuintic(low, high thermo.Average) quintic {
	h := high.Beta - low.Beta
	y0, d0, s0 := low.Entropy-low.Beta*low.Energy, -low.Energy*h, low.Variance*h*h
	y1, d1, s1 := high.Entropy-high.Beta*high.Energy, -high.Energy*h, high.Variance*h*h
	rise, slope, bend := y1-y0-d0-s0/2, d1-d0-s0, s1-s0
	return quintic{from: low.Beta, length: h, c: [6]float64{
		y0, d0, s0 / 2, 10*rise - 4*slope + bend/2, -15*rise + 7*slope - bend, 6*rise - 3*slope + bend/2,
	}}
}

// at returns ln Z and its derivative, -E.
func (q *quintic) at(beta float64) (logZ, slope float64) {
	u := (beta - q.from) / q.length
	for k := 5; k >= 0; k-- {
		slope = slope*u + logZ
		logZ = logZ*u + q.c[k]
	}
	return logZ, slope / q.length
}

// where returns the beta at which E is total.
func (q *quintic) where(total float64) float64 {
	a, b := q.from, q.from+q.length
	for range 60 { // E falls
		middle := (a + b) / 2
		if _, slope := q.at(middle); -slope > total {
			a = middle
		} else {
			b = middle
		}
	}
	return (a + b) / 2
}

func largestTunnelling(m bosehubbard.Model) float64 {
	j := 0.0
	for _, a := range m.Axes {
		j = max(j, math.Abs(a.Tunnelling))
	}
	return j
}
