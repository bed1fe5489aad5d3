package fock

import (
	"context"
	"fmt"
	"slices"

	"hilltop/bosehubbard"
	"hilltop/bosehubbard/lattice"
)

// Operator is the Bose-Hubbard Hamiltonian of a fixed number of atoms, E/h in Hz.
//
// The sites are cut in two. A vector is a list of matrices, one for each number of
// atoms on the left, with a row for each state there and a column for each on the
// right. So only the hops inside the halves are listed, whose states are few, and
// nothing as long as a vector is stored.
//
// It is not changed after it is built; several goroutines may apply it, each with
// its own Workspace.
type Operator struct {
	*layout
	terms      *Terms
	rowSectors map[int]*sector // by the number of atoms on the left
	colSectors map[int]*sector // by the number of atoms on the right
	tasks      []task
	bands      []task // of square blocks, for doBand
}

// NewOperator builds the Hamiltonian of atoms bosons on a lattice; see
// NewOperatorOf.
//
// It returns an error if the model has not the lattice's axes, and the errors of
// NewOperatorOf.
func NewOperator(ctx context.Context, l *lattice.Lattice, m bosehubbard.Model, atoms int, opt Options) (*Operator, error) {
	checked, err := opt.checked(l.Sites, max(atoms, 0))
	if err != nil {
		return nil, err
	}
	if err := checked.fitTables(l.Sites, max(atoms, 0)); err != nil {
		return nil, err // before work that grows with the sites
	}
	t, err := TermsOf(l, m)
	if err != nil {
		return nil, err
	}
	return NewOperatorOf(ctx, t, atoms, opt)
}

// NewOperatorOf builds the Hamiltonian of atoms bosons from its terms, for all
// states, for those with at most opt.MaxOccupation atoms on a site, or for the
// sector of one parity of the mirror. Cost: the hops among the states of half the
// sites, with up to all atoms on them.
//
// It returns a *TooLargeError before it allocates anything that grows with the
// number of states, an error if the terms are no Hamiltonian, the energies are not
// finite, opt.Parity is given without a mirror or opt.MaxOccupation leaves no
// room for the atoms, and ctx.Err() when it is stopped.
func NewOperatorOf(ctx context.Context, t *Terms, atoms int, opt Options) (*Operator, error) {
	if err := t.check(atoms); err != nil {
		return nil, err
	}
	opt, err := opt.checked(t.Sites, atoms)
	if err != nil {
		return nil, err
	}
	var mirror []int
	if opt.Parity != 0 {
		place, ok := t.Mirror()
		if !ok {
			return nil, fmt.Errorf("fock: parity %+d of a system without a mirror", opt.Parity)
		}
		mirror = place
	}
	return newOperator(ctx, t, newSplit(t, mirror), atoms, opt, nil)
}

// newOperator builds the Hamiltonian on a given split, in the memory of an operator
// that is no longer needed if there is one.
func newOperator(ctx context.Context, t *Terms, s *split, atoms int, opt Options, old *Operator) (*Operator, error) {
	if err := opt.fitTables(t.Sites, atoms); err != nil {
		return nil, err
	}
	h := &Operator{layout: newLayout(t, s, atoms, opt), terms: t}
	if err := h.fit(opt); err != nil {
		return nil, err
	}
	if old == nil {
		old = &Operator{}
	}
	h.rowSectors, h.colSectors = map[int]*sector{}, map[int]*sector{}
	if h.parity != 0 {
		h.rowSectors = h.colSectors // the halves are images of each other
	}
	for i := range h.blocks {
		b := &h.blocks[i]
		if err := buildSector(ctx, h.rowSectors, h.left, b.left, old.rowSectors); err != nil {
			return nil, err
		}
		if err := buildSector(ctx, h.colSectors, h.right, b.right, old.colSectors); err != nil {
			return nil, err
		}
	}
	if err := h.connect(ctx, t); err != nil {
		return nil, err
	}
	h.divide()
	return h, nil
}

// buildSector builds the sector of t atoms unless it is there.
func buildSector(ctx context.Context, built map[int]*sector, p *part, t int, old map[int]*sector) (err error) {
	if built[t] == nil {
		built[t], err = p.build(ctx, t, old[t])
	}
	return err
}

// Opposite returns the operator of the other sector of the mirror. The two share
// what they hold, and their vectors are of one length.
//
// It panics if the operator has no parity.
func (h *Operator) Opposite() *Operator {
	if h.parity == 0 {
		panic("fock: the other sector of the whole space")
	}
	y := *h.layout
	y.parity = -h.parity
	y.dimension = h.both - h.dimension
	y.blocks = slices.Clone(h.blocks)
	for i := range y.blocks {
		b := &y.blocks[i]
		b.links = slices.Clone(b.links)
		for k := range b.links {
			if b.links[k].flipped {
				b.links[k].factor = -b.links[k].factor
			}
		}
	}
	other := *h
	other.layout = &y
	return &other
}

// Len returns the length of the vectors that the operator takes.
func (h *Operator) Len() int { return h.length }

// Dimension returns the number of states of the space, or of the sector; with a
// parity vectors are a little longer than that.
func (h *Operator) Dimension() int { return h.dimension }

// SpaceDimension returns the number of states of the space, with both sectors.
func (h *Operator) SpaceDimension() int { return h.both }

// Parity returns the sector of the mirror, +1 or -1, or 0 for the whole space.
func (h *Operator) Parity() int { return h.parity }

// Terms returns what the operator was built from. It is not to be written to.
func (h *Operator) Terms() *Terms { return h.terms }

// Rank returns the place of a state in a vector. state has length Sites.
//
// It panics if the operator has a parity, or if the state is none of the space.
func (h *Operator) Rank(state []int) int {
	if h.parity != 0 || len(state) != h.terms.Sites {
		panic(fmt.Sprintf("fock: rank of %v among states of %d sites with parity %d, want one of them and no parity",
			state, h.terms.Sites, h.parity))
	}
	left, l := h.pick(state, h.split.left)
	right, r := h.pick(state, h.split.right)
	i := -1
	if l >= 0 && r >= 0 {
		i = h.find(l, 0, r)
	}
	if i < 0 {
		panic(fmt.Sprintf("fock: state %v, want %d atoms, 0 to %d on each site", state, h.atoms, h.most))
	}
	b := &h.blocks[i]
	return b.offset + h.left.rank(left)*b.cols + h.right.rank(right)
}

// pick takes the atoms on some sites and their sum, -1 if one is out of range.
func (h *Operator) pick(state, sites []int) (part []int, sum int) {
	part = make([]int, len(sites))
	for k, i := range sites {
		if state[i] < 0 || state[i] > h.most {
			return nil, -1
		}
		part[k] = state[i]
		sum += state[i]
	}
	return part, sum
}

// State writes the state at a place in a vector to dst, of length Sites. Without
// a parity it is the inverse of Rank; with one it is one of two mirror images.
//
// It panics if dst has the wrong length or rank is not in [0, Len).
func (h *Operator) State(dst []int, rank int) {
	if len(dst) != h.terms.Sites || rank < 0 || rank >= h.length {
		panic(fmt.Sprintf("fock: state of %d sites at place %d, want %d sites and 0 to %d", len(dst), rank, h.terms.Sites, h.length-1))
	}
	low, high := 0, len(h.blocks)
	for high-low > 1 {
		if middle := (low + high) / 2; h.blocks[middle].offset <= rank {
			low = middle
		} else {
			high = middle
		}
	}
	b := &h.blocks[low]
	left, right := make([]int, len(h.split.left)), make([]int, len(h.split.right))
	h.left.state(left, b.left, (rank-b.offset)/b.cols)
	h.right.state(right, b.right, (rank-b.offset)%b.cols)
	for k, i := range h.split.left {
		dst[i] = left[k]
	}
	for k, i := range h.split.right {
		dst[i] = right[k]
	}
	if h.split.centre >= 0 {
		dst[h.split.centre] = b.centre
	}
}
