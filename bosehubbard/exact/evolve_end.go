package exact

import (
	"context"

	"hilltop/bosehubbard/fock"
	"hilltop/bosehubbard/lattice"
	"hilltop/bosehubbard/num/blocks"
	"hilltop/bosehubbard/num/lanczos"
)

// endVector is one end of the spectrum in one sector.
type endVector struct {
	parity int
	energy float64 // Hz
	vector []float64
}

// beyond reports whether an end lies further out than another one.
func (v endVector) beyond(other endVector, end End) bool {
	if end == Floor {
		return v.energy < other.energy
	}
	return v.energy > other.energy
}

// findEnd searches one sector. It finds nothing in a sector without states.
func findEnd(ctx context.Context, l *lattice.Lattice, atoms int, c couplings, end End, parity int, opt EvolutionOptions) (endVector, error) {
	t, err := termsOf(l, c)
	if err != nil {
		return endVector{}, err
	}
	h, err := fock.NewOperatorOf(ctx, t, atoms, fock.Options{MemoryBytes: opt.MemoryBytes, Vectors: 3, Parity: parity})
	if err != nil || h.Dimension() == 0 {
		return endVector{}, err
	}
	workers := blocks.Workers(opt.Workers)
	search := lanczos.Options{Ends: lanczos.OnlyLowest, Seed: opt.Seed, Vectors: true, Workers: workers}
	if end == Ceiling {
		search.Ends = lanczos.OnlyHighest
	}
	r, err := lanczos.Search(ctx, newMatrix(h, workers), search)
	if end == Ceiling {
		return endVector{parity, r.Highest, r.HighestVector}, err
	}
	return endVector{parity, r.Lowest, r.LowestVector}, err
}

// Overlap is the weight of an end of the spectrum in a state.
type Overlap struct {
	Energy float64 // of the end, Hz
	Weight float64 // |<end|psi>|^2 of the normalised state
}

// Overlap returns the weight in the state of one end of the spectrum at present.
// With a mirror it is the end of the sector of the state. Where it is degenerate,
// the weight of one of many states. Cost: twice a search for that end.
//
// It returns ctx.Err() if stopped or a *lanczos.NotConvergedError.
func (e *Evolution) Overlap(ctx context.Context, end End) (Overlap, error) {
	h := e.hamiltonian
	found, err := findEnd(ctx, h.lattice, h.atoms, e.now, end, h.opt.Parity, EvolutionOptions{
		MemoryBytes: h.opt.MemoryBytes, Workers: h.workers, Seed: e.seed,
	})
	if err != nil {
		return Overlap{}, wrap(err)
	}
	re, im, norm := 0.0, 0.0, 0.0
	for i, v := range found.vector {
		re += v * e.psi.Re[i]
		im += v * e.psi.Im[i]
		norm += e.psi.Re[i]*e.psi.Re[i] + e.psi.Im[i]*e.psi.Im[i]
	}
	return Overlap{Energy: found.energy, Weight: (re*re + im*im) / norm}, nil
}
