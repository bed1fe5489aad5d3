package exact

import (
	"math"

	"hilltop/bosehubbard/fock"
	"hilltop/bosehubbard/lattice"
)

// EndState describes the eigenstate at one end. Where the end is degenerate it is
// one of many, and which one depends on the seed.
type EndState struct {
	Occupation        []float64 // <n_i> of each site
	SquaredOccupation []float64 // <n_i^2> of each site

	// Correlations[i*L+j] is <b_i^+ b_j> on L sites, a real symmetric matrix.
	Correlations []float64

	Kinetic, Interaction, Potential float64 // shares of the energy, Hz; their sum is the end
}

// Momentum returns the number of atoms with quasi-momentum q, in radians per site
// along x, y and z,
//
//	n(q) = (1/L) sum_ij <b_i^+ b_j> cos(q.(x_i - x_j))
//
// On a periodic box the sum over its quasi-momenta is the number of atoms; the
// corner (pi, pi, pi) of the zone is where a state at the ceiling gathers. l is the
// lattice of the state. Cost O(L^2).
func (s *EndState) Momentum(l *lattice.Lattice, q [3]float64) float64 {
	sum := 0.0
	for i, x := range l.Positions {
		for j, y := range l.Positions {
			phase := q[0]*(x[0]-y[0]) + q[1]*(x[1]-y[1]) + q[2]*(x[2]-y[2])
			sum += s.Correlations[i*l.Sites+j] * math.Cos(phase)
		}
	}
	return sum / float64(l.Sites)
}

// describe fills in what needs the vectors of the ends.
func (s *solver) describe() (err error) {
	if s.opt.MaxOccupation > 0 {
		if s.ends.FloorCutoff, err = s.cutoff(s.floor); err != nil {
			return err
		}
		if s.ends.CeilingCutoff, err = s.cutoff(s.ceiling); err != nil {
			return err
		}
	}
	if !s.opt.EndStates {
		return nil
	}
	if s.ends.FloorState, err = s.endState(s.floor, s.ends.Floor); err != nil {
		return err
	}
	s.ends.CeilingState, err = s.endState(s.ceiling, s.ends.Ceiling)
	return err
}

// cutoff returns how far the vector of an end is from the space without a limit.
func (s *solver) cutoff(f found) (float64, error) {
	return f.operator.CutoffResidual(s.ctx, f.vector, f.operator.NewWorkspace(s.opt.Workers))
}

// endState takes the expectation values in the unit vector of an end.
func (s *solver) endState(f found, energy float64) (*EndState, error) {
	sites := s.terms.Sites
	e := &EndState{
		Occupation: make([]float64, sites), SquaredOccupation: make([]float64, sites),
		Correlations: make([]float64, sites*sites),
	}
	w := f.operator.NewWorkspace(s.opt.Workers)
	if err := f.operator.Occupations(s.ctx, e.Occupation, e.SquaredOccupation, f.vector, w); err != nil {
		return nil, err
	}
	scratch := s.scratch[0]
	if len(scratch) != len(f.vector) {
		scratch = make([]float64, len(f.vector)) // after the dense solver
	}
	if err := f.operator.Correlations(s.ctx, e.Correlations, f.vector, scratch, w); err != nil {
		return nil, err
	}
	e.share(s.terms, energy)
	return e, nil
}

// share divides the energy: what the diagonal terms leave of it is kinetic.
func (e *EndState) share(t *fock.Terms, energy float64) {
	for i, n := range e.Occupation {
		e.Interaction += t.Interaction / 2 * (e.SquaredOccupation[i] - n)
		if t.Potential != nil {
			e.Potential += t.Potential[i] * n
		}
	}
	e.Kinetic = energy - e.Interaction - e.Potential
}
