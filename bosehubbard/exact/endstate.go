package exact

import (
	"context"

	"hilltop/bosehubbard/fock"
)

// EndState describes the eigenstate at one end. Where the end is degenerate it is
// one of many, and which one depends on the seed.
type EndState struct {
	Occupation        []float64 // <n_i> of each site
	SquaredOccupation []float64 // <n_i^2> of each site

	Kinetic, Interaction, Potential float64 // shares of the energy, Hz; their sum is the end
}

// describe fills in the states of both ends.
func (e *Ends) describe(ctx context.Context, h *fock.Operator, v vectors) error {
	var err error
	if e.FloorState, err = newEndState(ctx, h, v.floor, e.Floor); err != nil {
		return err
	}
	e.CeilingState, err = newEndState(ctx, h, v.ceiling, e.Ceiling)
	return err
}

// newEndState takes the expectation values in a unit vector of H's length. What
// the diagonal terms leave of the energy is kinetic.
func newEndState(ctx context.Context, h *fock.Operator, vector []float64, energy float64) (*EndState, error) {
	sites := h.Basis.Sites
	s := &EndState{Occupation: make([]float64, sites), SquaredOccupation: make([]float64, sites)}
	state := make([]int, sites)
	h.Basis.State(state, 0)
	block := h.BlockRows()
	for rank, amplitude := range vector {
		if rank%block == 0 && ctx.Err() != nil {
			return nil, ctx.Err()
		}
		weight := amplitude * amplitude
		for i, n := range state {
			if n > 0 {
				s.Occupation[i] += weight * float64(n)
				s.SquaredOccupation[i] += weight * float64(n) * float64(n)
			}
		}
		h.Basis.Next(state)
	}
	for i, n := range s.Occupation {
		s.Interaction += h.Interaction() / 2 * (s.SquaredOccupation[i] - n)
		s.Potential += h.Potential[i] * n
	}
	s.Kinetic = energy - s.Interaction - s.Potential
	return s, nil
}
