package thermo

import (
	"context"
	"errors"
	"fmt"
	"math"

	"hilltop/bosehubbard"
	"hilltop/bosehubbard/fock"
	"hilltop/bosehubbard/lattice"
	"hilltop/bosehubbard/num/blocks"
)

// System is a fixed number of atoms on a lattice.
type System struct {
	Lattice *lattice.Lattice
	Model   bosehubbard.Model
	Atoms   int

	MaxOccupation int // most atoms on a site; 0: no limit
}

// Unit returns the energy eps that makes a number of states of a density, Hz: the
// largest |J|, without tunnelling |U|, without both 1 Hz.
func (s System) Unit() float64 {
	unit := 0.0
	for _, a := range s.Model.Axes {
		unit = max(unit, math.Abs(a.Tunnelling))
	}
	if unit == 0 {
		unit = math.Abs(s.Model.Interaction)
	}
	if unit == 0 {
		unit = 1
	}
	return unit
}

// resources say what a computation may use.
type resources struct {
	lanes   int // goroutines with vectors of their own, if the memory allows; below 1: what the machine runs
	vectors int // for each of them
	shared  int // vectors for all
	memory  uint64
}

// space is the space of states, whole or as the sectors of its mirror, with what
// some goroutines at once need to work on it.
type space struct {
	sectors   []*fock.Operator
	dimension int
	length    int // of the longest vector

	works   [][]*fock.Workspace // by lane and sector
	scratch [][][]float64       // by lane
}

// whole builds the space in one piece.
//
// It returns the errors of fock.NewOperatorOf, a *fock.TooLargeError among them.
func (s System) whole(ctx context.Context, r resources) (*space, error) {
	return s.fit(ctx, r, func(*fock.Terms) []int { return []int{0} })
}

// halves builds the space in two sectors if the system has a mirror: vectors are
// half as long, and the numbers the same but for the random ones.
func (s System) halves(ctx context.Context, r resources) (*space, error) {
	return s.fit(ctx, r, func(t *fock.Terms) []int {
		if _, ok := t.Mirror(); ok {
			return []int{1, -1}
		}
		return []int{0}
	})
}

// share is the length of vector that is worth another goroutine on one vector. Two
// on one touch half the memory of two on two, and never wait long for each other.
const share = 1 << 15

// fit builds the space of given parities, with goroutines that share long vectors
// and lanes for those that are left, as many as the memory allows.
func (s System) fit(ctx context.Context, r resources, parities func(*fock.Terms) []int) (*space, error) {
	if s.Lattice == nil {
		return nil, errors.New("thermo: a system without a lattice")
	}
	terms, err := fock.TermsOf(s.Lattice, s.Model)
	if err != nil {
		return nil, fmt.Errorf("thermo: %w", err)
	}
	wanted := blocks.Workers(r.lanes)
	for lanes := wanted; ; lanes /= 2 {
		sp, err := s.build(ctx, terms, parities(terms), fock.Options{
			MemoryBytes: r.memory, Vectors: lanes*r.vectors + r.shared, MaxOccupation: s.MaxOccupation,
		})
		var large *fock.TooLargeError
		if errors.As(err, &large) && lanes > 1 {
			continue
		}
		if err != nil {
			return nil, fmt.Errorf("thermo: %w", err)
		}
		lanes = min(lanes, max(1, wanted/max(1, sp.length/share)))
		sp.open(lanes, r.vectors, wanted/lanes)
		return sp, nil
	}
}

func (s System) build(ctx context.Context, terms *fock.Terms, parities []int, opt fock.Options) (*space, error) {
	out := &space{}
	for _, opt.Parity = range parities {
		h, err := fock.NewOperatorOf(ctx, terms, s.Atoms, opt)
		if err != nil {
			return nil, err
		}
		if h.Dimension() == 0 {
			continue
		}
		out.sectors = append(out.sectors, h)
		out.dimension += h.Dimension()
		out.length = max(out.length, h.Len())
	}
	return out, nil
}

// open allocates the lanes, each with so many vectors and goroutines within.
func (s *space) open(lanes, vectors, within int) {
	for range lanes {
		s.scratch = append(s.scratch, newRows(vectors, s.length))
		var works []*fock.Workspace
		for _, h := range s.sectors {
			works = append(works, h.NewWorkspace(within))
		}
		s.works = append(s.works, works)
	}
}

// mean returns Tr H over the dimension, Hz.
func (s *space) mean() float64 {
	sum := 0.0
	for _, h := range s.sectors {
		sum += h.TraceMean() * (float64(h.Dimension()) / float64(s.dimension))
	}
	return sum
}

// product returns the products with the Hamiltonian of sector i in a lane.
func (s *space) product(ctx context.Context, i, lane int) func(a, b, c float64, dst, x [][]float64, xy, xx []float64) error {
	return func(a, b, c float64, dst, x [][]float64, xy, xx []float64) error {
		return s.sectors[i].Combine(ctx, fock.Product{Dst: dst, X: x, A: a, B: b, C: c, XY: xy, XX: xx}, s.works[lane][i])
	}
}

// lanes returns the number of goroutines at once.
func (s *space) lanes() int { return len(s.works) }

// vectors returns the scratch of a lane, shortened to the vectors of sector i.
func (s *space) vectors(i, lane int) [][]float64 {
	out := make([][]float64, len(s.scratch[lane]))
	for k, v := range s.scratch[lane] {
		out[k] = v[:s.sectors[i].Len()]
	}
	return out
}
