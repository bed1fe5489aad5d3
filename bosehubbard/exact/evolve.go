package exact

import (
	"context"
	"errors"
	"fmt"

	"hilltop/bosehubbard"
	"hilltop/bosehubbard/fock"
	"hilltop/bosehubbard/lattice"
	"hilltop/bosehubbard/num/blocks"
	"hilltop/bosehubbard/num/krylov"
)

// End is one end of a spectrum.
type End int

const (
	Floor   End = iota // where a state of T = +0 sits
	Ceiling            // where one of T = -0 sits
)

// EvolutionOptions of NewEvolution. The zero value works.
type EvolutionOptions struct {
	MemoryBytes uint64 // memory that may be used; 0: what the machine has available
	Workers     int    // goroutines that share the work; 0: what the machine runs at once
	Dimension   int    // of the Krylov space, at least 4; 0: up to 32, as the memory allows
	Seed        uint64 // of the search for an end to start from

	// Whole gives up the mirror: needed for a tilt, or a potential that comes later
	// than the start, on a lattice put together by hand.
	Whole bool
}

// Evolution carries a state through time under H(t), E/h in Hz:
//
//	d psi/dt = -2 pi i H(t) psi.
//
// Where the lattice and the state have a mirror, and Whole is not asked for, it
// works in the sector of the state, at half the cost. It is for one caller at a
// time; every number of workers gives the same bits.
type Evolution struct {
	hamiltonian *moving
	propagator  *krylov.Propagator
	psi         krylov.Vector
	scratch     []krylov.Vector

	now    couplings // at the present time
	time   float64   // s
	budget ErrorBudget
	count  struct{ steps, rejected int }
	pace   float64 // duration that the next step is likely to have, s
	tools  stepper
	seed   uint64
}

// ErrorBudget says how far the state may be from the exact one, as |psi - exact|.
type ErrorBudget struct {
	// Ordering is the estimated error of all steps from H(t) not commuting with itself
	// at other times: the sum of the norms of what stays of every step, and of what
	// returns at the ends of the segments.
	Ordering float64

	// Krylov is the sum of the bounds of the errors of all exponentials.
	Krylov float64

	// Limits is what is missed by limiting the energies of number states to where the
	// state has weight, in all steps.
	Limits float64
}

// Sum returns the sum of the three.
func (b ErrorBudget) Sum() float64 { return b.Ordering + b.Krylov + b.Limits }

// NewEvolution starts from the number state with the given atoms per site.
//
// Memory: some 2 (Dimension + 10) vectors of as many numbers as states.
//
// It returns a *fock.TooLargeError before it allocates anything large, and an error
// if the model has not the lattice's axes or is not finite, if there are not as
// many entries as sites, one is negative, or there are no atoms at all.
func NewEvolution(ctx context.Context, l *lattice.Lattice, m bosehubbard.Model, state []int, opt EvolutionOptions) (*Evolution, error) {
	atoms := 0
	for i, n := range state {
		if n < 0 {
			return nil, fmt.Errorf("exact: %d atoms on site %d, want at least 0", n, i)
		}
		atoms += n
	}
	if len(state) != l.Sites || atoms < 1 {
		return nil, fmt.Errorf("exact: start with %d atoms on %d sites, want some atoms on %d sites", atoms, len(state), l.Sites)
	}
	parity := 0
	if place, ok := mirrorOf(l, &m, opt); ok && mirrored(state, place) {
		parity = 1
	}
	e, err := newEvolution(ctx, l, &m, atoms, parity, opt)
	if err != nil {
		return nil, wrap(err)
	}
	at, err := e.hamiltonian.find(ctx, state)
	if err != nil {
		return nil, wrap(err)
	}
	e.psi.Re[at] = 1
	return e, nil
}

// NewEvolutionFromEnd starts from the state at one end of the spectrum of m. Where
// that is degenerate it is one of many, and which one depends on the seed.
//
// It returns the errors of NewEvolution, and a *lanczos.NotConvergedError.
func NewEvolutionFromEnd(ctx context.Context, l *lattice.Lattice, m bosehubbard.Model, atoms int, end End, opt EvolutionOptions) (*Evolution, error) {
	if atoms < 1 || end != Floor && end != Ceiling {
		return nil, fmt.Errorf("exact: start with %d atoms at end %d, want at least 1 at the floor or the ceiling", atoms, end)
	}
	parities := []int{0}
	if _, ok := mirrorOf(l, &m, opt); ok {
		parities = []int{1, -1}
	}
	now := newCouplings(l.Axes)
	if err := now.set(&m); err != nil {
		return nil, wrap(err)
	}
	var best endVector
	for _, parity := range parities {
		found, err := findEnd(ctx, l, atoms, now, end, parity, opt)
		if err != nil {
			return nil, wrap(err)
		}
		if best.vector == nil || found.vector != nil && found.beyond(best, end) {
			best = found
		}
	}
	e, err := newEvolution(ctx, l, &m, atoms, best.parity, opt)
	if err != nil {
		return nil, wrap(err)
	}
	copy(e.psi.Re, best.vector)
	return e, nil
}

// mirrorOf returns the mirror in whose sectors the evolution may work.
func mirrorOf(l *lattice.Lattice, m *bosehubbard.Model, opt EvolutionOptions) (place []int, ok bool) {
	if opt.Whole || len(m.Axes) != l.Axes {
		return nil, false
	}
	for _, a := range m.Axes {
		if a.Tilt != 0 {
			return nil, false
		}
	}
	t, err := termsOf(l, newCouplings(l.Axes))
	if err != nil {
		return nil, false
	}
	return t.Mirror()
}

// mirrored reports whether a number state is its own mirror image.
func mirrored(state, place []int) bool {
	for i, other := range place {
		if state[i] != state[other] {
			return false
		}
	}
	return true
}

// dimensions of the Krylov space that are tried where memory is short.
var dimensions = []int{32, 20, 12, 8}

// newEvolution builds all but the state.
func newEvolution(ctx context.Context, l *lattice.Lattice, m *bosehubbard.Model, atoms, parity int, opt EvolutionOptions) (*Evolution, error) {
	e := &Evolution{now: newCouplings(l.Axes), seed: opt.Seed}
	if err := e.now.set(m); err != nil {
		return nil, err
	}
	if opt.Dimension < 0 || opt.Dimension > 0 && opt.Dimension < 4 {
		return nil, fmt.Errorf("dimension %d of the Krylov space, want at least 4, or 0", opt.Dimension)
	}
	workers := blocks.Workers(opt.Workers)
	tries := dimensions
	if opt.Dimension > 0 {
		tries = []int{opt.Dimension}
	}
	var err error
	for _, d := range tries {
		vectors := 2*(d+1+1+scratchVectors) + 2*l.Axes + 3 + stepperTables
		e.hamiltonian, err = newMoving(ctx, l, atoms, workers, fock.Options{MemoryBytes: opt.MemoryBytes, Vectors: vectors, Parity: parity})
		if err == nil {
			e.allocate(d, workers)
			return e, e.hamiltonian.tune(ctx, e.now)
		}
		if !errors.As(err, new(*fock.TooLargeError)) {
			break
		}
	}
	return nil, err
}

// scratchVectors are complex vectors beside psi and the Krylov space.
const scratchVectors = 4

func (e *Evolution) allocate(dimension, workers int) {
	n := e.hamiltonian.hops.Len()
	e.propagator = krylov.New(n, krylov.Options{Dimension: dimension, Least: 3, Workers: workers})
	e.psi = krylov.NewVector(n)
	for range scratchVectors {
		e.scratch = append(e.scratch, krylov.NewVector(n))
	}
	e.tools = newStepper(len(e.now), n)
}
