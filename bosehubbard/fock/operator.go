package fock

import (
	"context"
	"fmt"
	"math"

	"hilltop/bosehubbard"
	"hilltop/bosehubbard/lattice"
)

// Operator is the Bose-Hubbard Hamiltonian in the number basis,
//
//	H = -sum_bonds J_a (b_i^+ b_j + b_j^+ b_i) + (U/2) sum_i n_i (n_i - 1)
//	    + sum_i n_i sum_a (V_a x_ia^2 + F_a x_ia)
//
// in Hz. The diagonal is stored, hops are computed by ranking. It is not changed
// after it is built; several goroutines may apply it, each with its own Workspace.
type Operator struct {
	Basis     *Basis
	Potential []float64 // sum_a (V_a x_a^2 + F_a x_a) of each site, Hz

	diagonal []float64
	hops     []hop
	onSite   float64 // U, Hz
}

// hop is one bond with its matrix element -J; low < high.
type hop struct {
	low, high int
	amplitude float64 // Hz
}

// NewOperator builds the Hamiltonian of atoms bosons on a lattice. Bonds along an
// axis without tunnelling are dropped. Cost O(D), with D numbers stored.
//
// It returns the errors of Fit before it allocates anything that grows with D,
// an error if the model has not the lattice's axes or the energies are not
// finite, and ctx.Err() when it is stopped.
func NewOperator(ctx context.Context, l *lattice.Lattice, m bosehubbard.Model, atoms int, opt Options) (*Operator, error) {
	if len(m.Axes) != l.Axes {
		return nil, fmt.Errorf("fock: model of %d axes on a lattice of %d, want the same", len(m.Axes), l.Axes)
	}
	basis, err := NewBasis(l.Sites, atoms, opt)
	if err != nil {
		return nil, err
	}
	h := &Operator{Basis: basis, Potential: potential(l, m), onSite: m.Interaction}
	for _, b := range l.Bonds {
		if j := m.Axes[b.Axis].Tunnelling; j != 0 {
			h.hops = append(h.hops, hop{low: min(b.From, b.To), high: max(b.From, b.To), amplitude: -j})
		}
	}
	if err := h.checkRange(); err != nil {
		return nil, err
	}
	h.diagonal = make([]float64, basis.Dimension)
	if err := h.fillDiagonal(ctx); err != nil {
		return nil, err
	}
	return h, nil
}

// potential returns the energy of one atom on each site.
func potential(l *lattice.Lattice, m bosehubbard.Model) []float64 {
	v := make([]float64, l.Sites)
	for site, p := range l.Positions {
		for a, terms := range m.Axes {
			v[site] += (terms.Curvature*p[a] + terms.Tilt) * p[a]
		}
	}
	return v
}

// checkRange refuses energies that are not finite or could overflow in a sum.
func (h *Operator) checkRange() error {
	n := float64(h.Basis.Atoms)
	bound := math.Abs(h.onSite) * n * n
	for site, v := range h.Potential {
		if math.IsNaN(v) || math.IsInf(v, 0) {
			return fmt.Errorf("fock: potential %g Hz on site %d, want a finite number", v, site)
		}
		bound = max(bound, math.Abs(v)*n)
	}
	for _, hop := range h.hops {
		bound = max(bound, math.Abs(hop.amplitude)*n*float64(len(h.hops)))
	}
	if !(bound < math.MaxFloat64/8) {
		return fmt.Errorf("fock: interaction %g Hz and energies up to %g Hz for %d atoms, want finite ones", h.onSite, bound, h.Basis.Atoms)
	}
	return nil
}

// Diagonal returns the energies of the number states without tunnelling, Hz, by
// rank. The slice belongs to the operator and is not to be written to.
func (h *Operator) Diagonal() []float64 { return h.diagonal }

// Interaction returns U/h in Hz.
func (h *Operator) Interaction() float64 { return h.onSite }

// BlockRows returns how many rows take some milliseconds, at least 1: what to
// pass to ApplyRowsTo between two looks at a context.
func (h *Operator) BlockRows() int {
	return max(1, (1<<19)/(h.Basis.Sites+2*len(h.hops)))
}

func (h *Operator) fillDiagonal(ctx context.Context) error {
	state := make([]int, h.Basis.Sites)
	h.Basis.State(state, 0)
	block := h.BlockRows()
	for rank := range h.diagonal {
		if rank%block == 0 && ctx.Err() != nil {
			return ctx.Err()
		}
		sum := 0.0
		for i, n := range state {
			if n > 0 {
				sum += float64(n) * (h.onSite/2*float64(n-1) + h.Potential[i])
			}
		}
		h.diagonal[rank] = sum
		h.Basis.Next(state)
	}
	return nil
}
