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
// energy: a factor of 1.075 apart.
const rungs = 193

// Match returns the canonical ensemble of atoms on a lattice with a given energy
// per atom [Hz], of either sign of T: what the state would relax to if it forgot
// all but its energy.
//
// Between the values of beta that are computed, E and S are interpolated with their
// slopes -Var and -beta Var, to 1e-6 or so. Cost: that of thermo.Canonical.
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
	low, high := points[at], points[at+1]
	beta := crossing(low, high, total)
	t := &Thermal{Beta: beta, PerTunnelling: math.NaN(), Exact: averages.Exact}
	t.EntropyPerAtom = hermite(low.Beta, high.Beta, low.Entropy, high.Entropy, -low.Beta*low.Variance, -high.Beta*high.Variance, beta) / float64(atoms)
	t.EntropyError = max(low.EntropyError, high.EntropyError) / float64(atoms)
	if j := largestTunnelling(m); j > 0 {
		t.PerTunnelling = 1 / (beta * j)
	}
	return t, nil
}

// crossing returns the beta between two averages at which E is total.
func crossing(low, high thermo.Average, total float64) float64 {
	a, b := low.Beta, high.Beta
	for range 60 {
		middle := (a + b) / 2
		if hermite(low.Beta, high.Beta, low.Energy, high.Energy, -low.Variance, -high.Variance, middle) > total {
			a = middle
		} else {
			b = middle
		}
	}
	return (a + b) / 2
}

// hermite is the cubic through two points with two slopes.
func hermite(x0, x1, y0, y1, slope0, slope1, x float64) float64 {
	h := x1 - x0
	u := (x - x0) / h
	return y0*(1+2*u)*(1-u)*(1-u) + y1*u*u*(3-2*u) + h*u*(1-u)*(slope0*(1-u)-slope1*u)
}

func largestTunnelling(m bosehubbard.Model) float64 {
	j := 0.0
	for _, a := range m.Axes {
		j = max(j, math.Abs(a.Tunnelling))
	}
	return j
}
