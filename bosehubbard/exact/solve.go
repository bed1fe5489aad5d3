package exact

import (
	"context"
	"errors"
	"fmt"
	"time"

	"hilltop/bosehubbard"
	"hilltop/bosehubbard/fock"
	"hilltop/bosehubbard/lattice"
	"hilltop/bosehubbard/num/lanczos"
)

// Options of Solve. The zero value works.
type Options struct {
	Tolerance     float64 // on the residuals, relative to the largest |energy|, from 1e-13; 0: 1e-10
	MaxIterations int     // in each sector; 0: 2000
	Seed          uint64  // of the random start vector
	MemoryBytes   uint64  // memory that may be used; 0: what the machine has available
	EndStates     bool    // fill FloorState and CeilingState; twice the time
	Workers       int     // goroutines that share the work; 0: what the machine runs at once
	Sector        Sector  // which part of the spectrum
	Momentum      []int   // the sector of quasi-momentum 2 pi m/L, one m for each closed axis; nil: all
	MaxOccupation int     // most atoms on one site; 0: no limit. Sets FloorCutoff and CeilingCutoff

	// Progress, if not nil, is called on the computing goroutine; done never falls.
	Progress func(done, total int)
}

// Ends are both ends of the spectrum of H/h.
type Ends struct {
	Dimension      int     // states of the space, or of the sector that was asked for
	Floor, Ceiling float64 // Hz, of all atoms together

	// |H x - E x| in Hz for the unit vector x found. An eigenvalue lies within the
	// residual, and much closer, within residual^2/gap, if it stands apart. Levels
	// that crowd closer than that are not told apart: the end may then be off by
	// some times the residual.
	FloorResidual, CeilingResidual float64

	// With a limit of the occupation: how far H without it takes x out of the space,
	// Hz, at most. The floor is then too high, the ceiling too low, and an eigenvalue
	// without the limit lies within sqrt(residual^2 + cutoff^2).
	FloorCutoff, CeilingCutoff float64

	// The sector of the mirror in which the end was found: even +1, odd -1; 0 if the
	// whole space was searched.
	FloorParity, CeilingParity int

	// Sector says in words what was searched, such as "even" or "quasi-momentum [1]".
	Sector string

	Connected                  bool // hops lead from any site to any other
	Iterations                 int  // products with H in the search, 0 if dense
	Seed                       uint64
	BuildSeconds, SolveSeconds float64

	FloorState, CeilingState *EndState // nil unless asked for
}

// Solve finds both ends of the spectrum of atoms bosons on a lattice.
//
// The answer is the same for the same seed and any number of workers. Cost: with D
// states, 2 vectors of length D (4 with EndStates or MaxOccupation) and some 50 to
// 500 products with H; half of both where both ends lie in one sector of a mirror.
// It stops within 50 ms of ctx.
//
// It returns a *fock.TooLargeError before it allocates anything large, the other
// errors of fock.NewOperator, ctx.Err() if stopped, and the last iterate with an
// error that wraps a *lanczos.NotConvergedError.
func Solve(ctx context.Context, l *lattice.Lattice, m bosehubbard.Model, atoms int, opt Options) (Ends, error) {
	t, err := fock.TermsOf(l, m)
	if err != nil {
		return Ends{}, wrap(err)
	}
	return SolveTerms(ctx, t, atoms, opt)
}

// SolveTerms is Solve for a Hamiltonian written out site by site and bond by bond.
func SolveTerms(ctx context.Context, t *fock.Terms, atoms int, opt Options) (Ends, error) {
	s := &solver{ctx: ctx, terms: t, atoms: atoms, opt: opt}
	ends, err := s.run()
	return ends, wrap(err)
}

func wrap(err error) error {
	if err == nil {
		return nil
	}
	return fmt.Errorf("exact: %w", err)
}

// solver holds what the searches of one Solve share.
type solver struct {
	ctx     context.Context
	terms   *fock.Terms
	atoms   int
	opt     Options
	sector  *fock.Operator // of the search before
	scratch [2][]float64
	ends    Ends
	floor   found
	ceiling found
}

// found is an end with the operator and the vector that belong to it.
type found struct {
	operator *fock.Operator
	vector   []float64 // nil unless needed
}

// withVectors says whether the vectors of the ends are needed.
func (s *solver) withVectors() bool { return s.opt.EndStates || s.opt.MaxOccupation > 0 }

// run searches the sectors one after the other and describes what was found.
func (s *solver) run() (Ends, error) {
	if s.opt.Momentum != nil {
		return s.bloch()
	}
	searches, err := s.plan()
	if err != nil {
		return Ends{}, err
	}
	s.ends = Ends{Seed: s.opt.Seed, Connected: s.terms.Connected(), Sector: sectorText(searches)}
	var short *lanczos.NotConvergedError
	for i, search := range searches {
		err := s.search(search, i, len(searches))
		if err != nil && !errors.As(err, &short) {
			return Ends{}, err
		}
	}
	begin := time.Now()
	if err := s.describe(); err != nil {
		return Ends{}, err
	}
	s.ends.SolveSeconds += time.Since(begin).Seconds()
	if short != nil {
		return s.ends, short
	}
	return s.ends, nil
}

// build makes the operator of one sector, from that of the other if there is one.
func (s *solver) build(parity, searches int) (*fock.Operator, error) {
	if s.sector != nil {
		return s.sector.Opposite(), nil
	}
	begin := time.Now()
	vectors := 2
	if s.withVectors() {
		vectors += 2 * searches
	}
	h, err := fock.NewOperatorOf(s.ctx, s.terms, s.atoms, fock.Options{
		MemoryBytes: s.opt.MemoryBytes, Vectors: vectors, Parity: parity, MaxOccupation: s.opt.MaxOccupation,
	})
	s.sector = h
	s.ends.BuildSeconds += time.Since(begin).Seconds()
	return h, err
}

// search finds the ends in one sector and keeps those that lie further out.
func (s *solver) search(sector search, number, of int) error {
	h, err := s.build(sector.parity, of)
	if err != nil {
		return err
	}
	begin := time.Now()
	defer func() { s.ends.SolveSeconds += time.Since(begin).Seconds() }()
	s.ends.Dimension = h.Dimension()
	if s.opt.Sector == SectorAuto {
		s.ends.Dimension = h.SpaceDimension()
	}
	if h.Dimension() == 0 {
		return nil
	}
	var r lanczos.Result
	if h.Dimension() <= denseLimit && sector.parity == 0 {
		r, err = dense(h)
	} else {
		r, err = s.lanczos(h, sector, number, of)
	}
	var short *lanczos.NotConvergedError
	if err != nil && !errors.As(err, &short) {
		return err
	}
	s.ends.Iterations += r.Iterations
	if sector.floor && (s.floor.operator == nil || r.Lowest < s.ends.Floor) {
		s.floor = found{h, r.LowestVector}
		s.ends.Floor, s.ends.FloorResidual, s.ends.FloorParity = r.Lowest, r.LowestResidual, sector.parity
	}
	if sector.ceiling && (s.ceiling.operator == nil || r.Highest > s.ends.Ceiling) {
		s.ceiling = found{h, r.HighestVector}
		s.ends.Ceiling, s.ends.CeilingResidual, s.ends.CeilingParity = r.Highest, r.HighestResidual, sector.parity
	}
	return err
}

func (s *solver) lanczosOptions() lanczos.Options {
	return lanczos.Options{
		Tolerance: s.opt.Tolerance, MaxIterations: s.opt.MaxIterations, Seed: s.opt.Seed, Workers: s.opt.Workers,
	}
}

// lanczos runs the iteration in one sector.
func (s *solver) lanczos(h *fock.Operator, sector search, number, of int) (lanczos.Result, error) {
	if len(s.scratch[0]) != h.Len() {
		s.scratch = [2][]float64{make([]float64, h.Len()), make([]float64, h.Len())}
	}
	opt := s.lanczosOptions()
	opt.Vectors, opt.Scratch = s.withVectors(), s.scratch
	switch {
	case !sector.ceiling:
		opt.Ends = lanczos.OnlyLowest
	case !sector.floor:
		opt.Ends = lanczos.OnlyHighest
	}
	if s.opt.Progress != nil {
		opt.Progress = func(done, total int) { s.opt.Progress(number*total+done, of*total) }
	}
	return lanczos.Search(s.ctx, newMatrix(h, s.opt.Workers), opt)
}
