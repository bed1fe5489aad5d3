package exact

import (
	"context"
	"slices"

	"hilltop/bosehubbard"
	"hilltop/bosehubbard/fock"
	"hilltop/bosehubbard/lattice"
	"hilltop/bosehubbard/num/blocks"
	"hilltop/bosehubbard/num/krylov"
)

// moving is a Hamiltonian whose couplings change all the time,
//
//	H = sum_a (J_a K_a + V_a X_a + F_a Z_a) + U P,
//
// K the hops, P the pairs, X and Z the sums of n_i x_i^2 and n_i x_i. The hops come
// from an operator with fixed ratios of the J_a, which is built again when those
// change; the rest is a diagonal put together from tables.
type moving struct {
	lattice *lattice.Lattice
	atoms   int
	opt     fock.Options
	workers int

	hops  *fock.Operator // with J_a = ratio[a]
	work  *fock.Workspace
	ratio []float64
	scale float64 // H has scale times the hops

	tables   [][]float64 // of V_a, F_a and U, in the order of couplings; nil where not needed
	energies []float64   // the diagonal of H
	diagonal []float64   // the same, or what is left of it within limits
	limited  bool

	request fock.Product
	dst, x  krylov.Vector
	partial []float64
	do      func(worker, block int)
}

const (
	// whisper stands for 0 where a term has to stay in the list, Hz.
	whisper = 1e-200

	// diagonalBlock is the number of states in one block of the diagonal's pass.
	diagonalBlock = 4096
)

// newMoving builds the tables. opt.Parity is only given where every coupling that
// will come keeps the mirror; there is then no tilt.
func newMoving(ctx context.Context, l *lattice.Lattice, atoms, workers int, opt fock.Options) (*moving, error) {
	h := &moving{lattice: l, atoms: atoms, opt: opt, workers: workers, ratio: make([]float64, l.Axes)}
	for a := range h.ratio {
		h.ratio[a] = 1
	}
	if err := h.build(ctx); err != nil {
		return nil, err
	}
	n := h.hops.Len()
	h.energies, h.diagonal = make([]float64, n), make([]float64, n)
	h.partial = make([]float64, (n+diagonalBlock-1)/diagonalBlock)
	h.do = h.diagonalBlock
	h.request = fock.Product{Dst: make([][]float64, 2), X: make([][]float64, 2), XY: make([]float64, 2)}
	return h, h.tabulate(ctx)
}

// termsOf writes a model out so that the order of the states depends on the
// lattice and the mirror alone: every bond has its hop, and there is a trap, which
// every trap has the mirrors of.
func termsOf(l *lattice.Lattice, c couplings) (*fock.Terms, error) {
	m := bosehubbard.Model{Axes: make([]bosehubbard.AxisTerms, l.Axes), Interaction: c.interaction()}
	for a := range m.Axes {
		m.Axes[a] = bosehubbard.AxisTerms{Tunnelling: c.tunnelling()[a], Curvature: c.curvature()[a], Tilt: c.tilt()[a]}
		if m.Axes[a].Tunnelling == 0 {
			m.Axes[a].Tunnelling = whisper
		}
		if m.Axes[a].Curvature == 0 {
			m.Axes[a].Curvature = whisper * float64(1+a)
		}
	}
	return fock.TermsOf(l, m)
}

// operator builds the operator of some couplings.
func (h *moving) operator(ctx context.Context, c couplings) (*fock.Operator, error) {
	t, err := termsOf(h.lattice, c)
	if err != nil {
		return nil, err
	}
	return fock.NewOperatorOf(ctx, t, h.atoms, h.opt)
}

// build makes the operator of the hops.
func (h *moving) build(ctx context.Context) (err error) {
	c := newCouplings(h.lattice.Axes)
	copy(c.tunnelling(), h.ratio)
	if h.hops, err = h.operator(ctx, c); err == nil {
		h.work = h.hops.NewWorkspace(h.workers)
	}
	return err
}

// tabulate fills in the tables: the diagonal of an operator shows in its product
// with any vector.
func (h *moving) tabulate(ctx context.Context) error {
	axes := h.lattice.Axes
	x := make([]float64, h.hops.Len())
	if h.opt.Parity < 0 {
		h.hops.RandomTo(x, 1, 0)
	} else {
		for i := range x {
			x[i] = 1
		}
	}
	one := newCouplings(axes)
	h.tables = make([][]float64, len(one)-axes)
	for k := range h.tables {
		if tilt := k >= axes && k < 2*axes; tilt && h.opt.Parity != 0 {
			continue
		}
		clear(one)
		one[axes+k] = 1
		operator, err := h.operator(ctx, one)
		if err != nil {
			return err
		}
		h.tables[k] = make([]float64, len(x))
		if err := readDiagonal(ctx, h.tables[k], x, operator, h.workers); err != nil {
			return err
		}
	}
	return nil
}

// readDiagonal divides the product of an operator without hops by x. Places at
// which every vector of the sector is 0 get 0.
func readDiagonal(ctx context.Context, dst, x []float64, h *fock.Operator, workers int) error {
	err := h.Combine(ctx, fock.Product{Dst: [][]float64{dst}, X: [][]float64{x}, A: 1}, h.NewWorkspace(workers))
	for i, v := range x {
		if v == 0 {
			dst[i] = 0
		} else {
			dst[i] /= v
		}
	}
	return err
}

// find returns the place of a number state that is its own mirror image, or of any
// in the whole space.
func (h *moving) find(ctx context.Context, state []int) (int, error) {
	if h.opt.Parity == 0 {
		return h.hops.Rank(state), nil
	}
	here := make([]int, len(state))
	for at := range h.hops.Len() {
		if at%diagonalBlock == 0 && ctx.Err() != nil {
			return 0, ctx.Err()
		}
		if h.hops.State(here, at); slices.Equal(here, state) {
			return at, nil
		}
	}
	panic("exact: a mirrored state is not in the even sector")
}

// tune sets the couplings, without limits.
func (h *moving) tune(ctx context.Context, c couplings) error {
	j := c.tunnelling()
	h.scale = j[largest(j)]
	if h.scale != 0 {
		changed := false
		for a := range j {
			r := j[a] / h.scale
			changed = changed || r != h.ratio[a]
			h.ratio[a] = r
		}
		if changed {
			if err := h.build(ctx); err != nil {
				return err
			}
		}
	}
	h.diagonalTo(h.energies, c)
	copy(h.diagonal, h.energies)
	h.limited = false
	return nil
}

// diagonalTo sums the tables.
func (h *moving) diagonalTo(dst []float64, c couplings) {
	first := true
	for k, factor := range c[c.axes():] {
		table := h.tables[k]
		switch {
		case factor == 0 || table == nil:
		case first:
			for i, v := range table {
				dst[i] = factor * v
			}
			first = false
		default:
			for i, v := range table {
				dst[i] += factor * v
			}
		}
	}
	if first {
		clear(dst)
	}
}

// product is the krylov.Product of the couplings set last.
func (h *moving) product(ctx context.Context, dst, x krylov.Vector) (float64, error) {
	kinetic := 0.0
	if h.scale == 0 {
		clear(dst.Re)
		clear(dst.Im)
	} else {
		r := &h.request
		r.Dst[0], r.Dst[1], r.X[0], r.X[1], r.A = dst.Re, dst.Im, x.Re, x.Im, h.scale
		if err := h.hops.Combine(ctx, *r, h.work); err != nil {
			return 0, err
		}
		kinetic = r.XY[0] + r.XY[1]
	}
	h.dst, h.x = dst, x
	err := blocks.Run(ctx, h.workers, len(h.partial), h.do)
	sum := 0.0
	for _, p := range h.partial {
		sum += p
	}
	return kinetic + sum, err
}

// diagonalBlock adds the diagonal to a block of the product.
func (h *moving) diagonalBlock(_, number int) {
	lo := number * diagonalBlock
	hi := min(lo+diagonalBlock, len(h.diagonal))
	d := h.diagonal[lo:hi]
	h.partial[number] = addDiagonal(h.dst.Re[lo:hi], h.x.Re[lo:hi], d) + addDiagonal(h.dst.Im[lo:hi], h.x.Im[lo:hi], d)
}

// addDiagonal sets dst += d x, component by component, and returns x.(d x).
func addDiagonal(dst, x, d []float64) float64 {
	dst, x = dst[:len(d)], x[:len(d)]
	even, odd := 0.0, 0.0
	i := 0
	for ; i+1 < len(d); i += 2 {
		first, second := d[i]*x[i], d[i+1]*x[i+1]
		dst[i] += first
		dst[i+1] += second
		even += first * x[i]
		odd += second * x[i+1]
	}
	for ; i < len(d); i++ {
		dst[i] += d[i] * x[i]
		even += d[i] * x[i] * x[i]
	}
	return even + odd
}
