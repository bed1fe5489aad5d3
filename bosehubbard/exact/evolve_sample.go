package exact

import (
	"context"
	"math"

	"hilltop/bosehubbard/lattice"
)

// Sample holds what was looked at in one state. Energies are E/h in Hz, of all
// atoms together.
type Sample struct {
	Time float64 // s since the start of the evolution

	Energy                          float64
	Kinetic, Interaction, Potential float64 // shares of the energy

	Occupation        []float64 // <n_i> of each site
	SquaredOccupation []float64 // <n_i^2> of each site

	NormDefect float64 // | |psi|^2 - 1 |; expectation values are of the normalised state
}

// Observe looks at the state as it is.
//
// It returns ctx.Err() if stopped.
func (e *Evolution) Observe(ctx context.Context) (Sample, error) {
	s, err := e.observe(ctx, e.psi)
	s.Time = e.time
	return s, wrap(err)
}

// observe looks at a state with the couplings of the present.
func (e *Evolution) observe(ctx context.Context, psi vector) (Sample, error) {
	h := e.hamiltonian
	sites := h.lattice.Sites
	s := Sample{Occupation: make([]float64, sites), SquaredOccupation: make([]float64, sites)}
	weight := squared(psi)
	s.NormDefect = math.Abs(weight - 1)
	if err := h.tune(ctx, e.now); err != nil {
		return s, err
	}
	energy, err := h.product(ctx, e.scratch[0], psi)
	if err != nil {
		return s, err
	}
	n, square := make([]float64, sites), make([]float64, sites)
	for _, part := range [2][]float64{psi.Re, psi.Im} {
		if err := h.hops.Occupations(ctx, n, square, part, h.work); err != nil {
			return s, err
		}
		addScaled(s.Occupation, n, 1/weight)
		addScaled(s.SquaredOccupation, square, 1/weight)
	}
	s.Energy = energy / weight
	for i, p := range h.lattice.Positions {
		s.Interaction += e.now.interaction() / 2 * (s.SquaredOccupation[i] - s.Occupation[i])
		for a, v := range e.now.curvature() {
			s.Potential += (v*p[a] + e.now.tilt()[a]) * p[a] * s.Occupation[i]
		}
	}
	s.Kinetic = s.Energy - s.Interaction - s.Potential
	return s, nil
}

// Correlations returns the real part of <b_i^+ b_j> at [i*L+j] on L sites, a
// symmetric matrix with the atoms per site on its diagonal. Cost: as many products
// with a hop as there are pairs of sites.
//
// It returns ctx.Err() if stopped.
func (e *Evolution) Correlations(ctx context.Context) ([]float64, error) {
	h := e.hamiltonian
	sites := h.lattice.Sites
	sum, one := make([]float64, sites*sites), make([]float64, sites*sites)
	for _, part := range [2][]float64{e.psi.Re, e.psi.Im} {
		if err := h.hops.Correlations(ctx, one, part, e.scratch[0].Re, h.work); err != nil {
			return nil, wrap(err)
		}
		addScaled(sum, one, 1/squared(e.psi))
	}
	return sum, nil
}

// MomentumDistribution returns the number of atoms with quasi-momentum q, in
// radians per site along x, y and z, averaged over q and -q,
//
//	n(q) = (1/L) sum_ij Re <b_i^+ b_j> cos(q.(x_i - x_j)).
func MomentumDistribution(l *lattice.Lattice, correlations []float64, q [3]float64) float64 {
	state := EndState{Correlations: correlations}
	return state.Momentum(l, q)
}

// cornerWidth is the largest distance in q from pi that counts as the corner.
const cornerWidth = math.Pi / 4

// CornerFraction returns the share of the atoms at the corner of the zone: those
// whose quasi-momentum lies within pi/4 of pi, in radians per site, along every
// axis with more than one site. periodic says which axes are rings; there the
// quasi-momenta are the multiples of 2 pi/L, elsewhere n(q) is integrated. A flat
// n(q) of an open system has 1/4 per axis.
//
// l is a box whose atoms per site stand on the diagonal of correlations.
func CornerFraction(l *lattice.Lattice, periodic []bool, correlations []float64) float64 {
	extent := [3]float64{}
	for _, p := range l.Positions {
		for a := range p {
			extent[a] = max(extent[a], 2*p[a]+1)
		}
	}
	share, atoms := 0.0, 0.0
	for i, x := range l.Positions {
		atoms += correlations[i*l.Sites+i]
		for j, y := range l.Positions {
			w := correlations[i*l.Sites+j]
			for a := range extent {
				if extent[a] > 1 {
					w *= cornerWeight(x[a]-y[a], extent[a], a < len(periodic) && periodic[a])
				}
			}
			share += w
		}
	}
	return share / atoms
}

// cornerWeight is the mean of exp(i q distance) over the zone, with those q left
// out that are not at the corner.
func cornerWeight(distance, sites float64, periodic bool) float64 {
	if periodic {
		sum := 0.0
		for m := range int(sites) {
			q := 2 * math.Pi * float64(m) / sites
			if math.Abs(q-math.Pi) <= cornerWidth*(1+1e-12) {
				sum += math.Cos(q * distance)
			}
		}
		return sum / sites
	}
	if distance == 0 {
		return cornerWidth / math.Pi
	}
	return math.Cos(math.Pi*distance) * math.Sin(cornerWidth*distance) / (math.Pi * distance)
}

// Time returns the time since the start, s; Errors how far the state may be from
// the exact one.
func (e *Evolution) Time() float64       { return e.time }
func (e *Evolution) Errors() ErrorBudget { return e.budget }

// Dimension returns the number of states of the whole space, Parity the sector of
// the mirror that the evolution works in, +1 or -1, or 0 for the whole space.
func (e *Evolution) Dimension() int { return e.hamiltonian.hops.SpaceDimension() }
func (e *Evolution) Parity() int    { return e.hamiltonian.opt.Parity }

// Products returns the number of products with H so far, Steps those of the steps
// in which H changed that were taken, and that had to be taken again.
func (e *Evolution) Products() int                { return e.propagator.Products() }
func (e *Evolution) Steps() (taken, rejected int) { return e.count.steps, e.count.rejected }
