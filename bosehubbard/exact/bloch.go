package exact

import (
	"errors"
	"fmt"
	"time"

	"hilltop/bosehubbard/fock"
	"hilltop/bosehubbard/num/lanczos"
)

// bloch searches the sector of one quasi-momentum.
func (s *solver) bloch() (Ends, error) {
	switch {
	case s.opt.Sector != SectorAuto:
		return Ends{}, fmt.Errorf("sector %d and quasi-momentum %v, want one of the two", s.opt.Sector, s.opt.Momentum)
	case s.withVectors():
		return Ends{}, fmt.Errorf("quasi-momentum %v: no states and no limit of the occupation there, since vectors of a sector are not kept", s.opt.Momentum)
	}
	begin := time.Now()
	h, err := fock.NewBloch(s.ctx, s.terms, s.atoms, s.opt.Momentum, s.opt.Workers, fock.Options{MemoryBytes: s.opt.MemoryBytes, Vectors: 2})
	if err != nil {
		return Ends{}, err
	}
	if h.Dimension() == 0 {
		return Ends{}, fmt.Errorf("%d atoms on %d sites have no states of quasi-momentum %v", s.atoms, s.terms.Sites, s.opt.Momentum)
	}
	built := time.Now()
	opt := s.lanczosOptions()
	opt.Progress = s.opt.Progress
	r, err := lanczos.Search(s.ctx, h, opt)
	if short := (*lanczos.NotConvergedError)(nil); err != nil && !errors.As(err, &short) {
		return Ends{}, err
	}
	return Ends{
		Dimension: h.Dimension(), Floor: r.Lowest, Ceiling: r.Highest,
		FloorResidual: r.LowestResidual, CeilingResidual: r.HighestResidual,
		Sector: fmt.Sprintf("quasi-momentum %v", s.opt.Momentum), Connected: s.terms.Connected(),
		Iterations: r.Iterations, Seed: r.Seed,
		BuildSeconds: built.Sub(begin).Seconds(), SolveSeconds: time.Since(built).Seconds(),
	}, err
}
