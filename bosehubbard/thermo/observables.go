package thermo

import (
	"context"
	"math"

	"gonum.org/v1/gonum/floats"

	"hilltop/bosehubbard/fock"
	"hilltop/bosehubbard/lattice"
)

// Observables say where the atoms are in a canonical ensemble. Errors are half
// widths of 95 % confidence from the spread of the random vectors.
type Observables struct {
	Occupation, OccupationError               []float64 // <n_i> of each site
	SquaredOccupation, SquaredOccupationError []float64 // <n_i^2>
	Correlation, CorrelationError             []float64 // <b_i^+ b_j>, row-major, sites x sites

	// Shares of the atoms at the centre and at the corners of the Brillouin zone,
	// n(k)/N at k = 0 and k = pi along every axis; see Momentum. A superfluid at
	// T > 0 fills the first, one at T < 0 the second.
	Centre, CentreError float64
	Corner, CornerError float64
}

// Momentum returns the share of the atoms at a quasi-momentum k, in 1/site,
//
//	n(k)/N = sum_ij cos(k.(r_i - r_j)) <b_i^+ b_j> / (L N)
//
// It adds up to 1 over the L momenta of a periodic lattice. Cost O(sites^2).
//
// It panics if l is another lattice.
func (o *Observables) Momentum(l *lattice.Lattice, k [3]float64) float64 {
	return momentum(o.Correlation, l, k) / floats.Sum(o.Occupation)
}

// momentum is the sum of Momentum over L.
func momentum(correlation []float64, l *lattice.Lattice, k [3]float64) float64 {
	sites := l.Sites
	if len(correlation) != sites*sites {
		panic("thermo: correlations of another lattice")
	}
	phase := make([]float64, sites)
	for i, p := range l.Positions {
		phase[i] = k[0]*p[0] + k[1]*p[1] + k[2]*p[2]
	}
	sum := 0.0
	for i := range sites {
		for j := range sites {
			sum += math.Cos(phase[i]-phase[j]) * correlation[i*sites+j]
		}
	}
	return sum / float64(sites)
}

// corner is pi along every axis that has more than one site.
func corner(l *lattice.Lattice) [3]float64 {
	var k [3]float64
	for _, p := range l.Positions {
		for a := range k {
			if p[a] != 0 {
				k[a] = math.Pi
			}
		}
	}
	return k
}

// meter measures all observables of a vector as one list: <n_i^2>, <b_i^+ b_j>,
// n(0) and n at the corner. All of them are linear in the density matrix.
type meter struct {
	lattice *lattice.Lattice
	corner  [3]float64
}

func (m *meter) length() int { return m.lattice.Sites + m.lattice.Sites*m.lattice.Sites + 2 }

// measure returns the list for a vector of h, not divided by its norm.
func (m *meter) measure(ctx context.Context, h *fock.Operator, x, scratch []float64, w *fock.Workspace) ([]float64, error) {
	sites := m.lattice.Sites
	out := make([]float64, m.length())
	correlation := out[sites : sites+sites*sites]
	if err := h.Occupations(ctx, make([]float64, sites), out[:sites], x, w); err != nil {
		return nil, err
	}
	if err := h.Correlations(ctx, correlation, x, scratch, w); err != nil {
		return nil, err
	}
	out[len(out)-2] = momentum(correlation, m.lattice, [3]float64{})
	out[len(out)-1] = momentum(correlation, m.lattice, m.corner)
	return out, nil
}

// observables sorts a list of means and one of their errors.
func (m *meter) observables(mean, half []float64, atoms int) *Observables {
	sites := m.lattice.Sites
	n := float64(max(atoms, 1))
	o := &Observables{
		SquaredOccupation: mean[:sites], SquaredOccupationError: half[:sites],
		Correlation: mean[sites : sites+sites*sites], CorrelationError: half[sites : sites+sites*sites],
		Occupation: make([]float64, sites), OccupationError: make([]float64, sites),
		Centre: mean[len(mean)-2] / n, CentreError: half[len(half)-2] / n,
		Corner: mean[len(mean)-1] / n, CornerError: half[len(half)-1] / n,
	}
	for i := range sites {
		o.Occupation[i], o.OccupationError[i] = o.Correlation[i*sites+i], o.CorrelationError[i*sites+i]
	}
	return o
}
