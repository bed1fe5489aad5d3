package fock

import (
	"context"
	"fmt"

	"gonum.org/v1/gonum/floats"

	"hilltop/bosehubbard/num/blocks"
)

// Occupations sets
//
//	n[i] = x^T n_i x,   square[i] = x^T n_i^2 x
//
// for every site; both have length Sites, x has length Len. They are expectation
// values if x has norm 1. Cost O(Len); every number of workers gives the same bits.
//
// It returns ctx.Err() if stopped. It panics if a length is wrong.
func (h *Operator) Occupations(ctx context.Context, n, square, x []float64, w *Workspace) error {
	if len(n) != h.terms.Sites || len(square) != h.terms.Sites || len(x) != h.length {
		panic(fmt.Sprintf("fock: %d and %d occupations from %d numbers, want %d from %d", len(n), len(square), len(x), h.terms.Sites, h.length))
	}
	clear(n)
	clear(square)
	rows, cols := make([][]float64, len(h.blocks)), make([][]float64, len(h.blocks))
	err := blocks.Run(ctx, w.workers, len(h.blocks), func(_, i int) {
		rows[i], cols[i] = h.blocks[i].weights(ctx, x)
	})
	if err != nil || ctx.Err() != nil {
		return ctx.Err()
	}
	for i := range h.blocks {
		b := &h.blocks[i]
		h.left.addOccupations(n, square, h.split.left, b.left, rows[i])
		h.right.addOccupations(n, square, h.split.right, b.right, cols[i])
		if c := h.split.centre; c >= 0 {
			weight := float64(b.centre) * floats.Sum(rows[i])
			n[c] += weight
			square[c] += weight * float64(b.centre)
		}
	}
	if h.parity != 0 { // of each pair of mirror images only one has been counted
		for k, i := range h.split.left {
			j := h.split.right[k]
			n[i] = (n[i] + n[j]) / 2
			square[i] = (square[i] + square[j]) / 2
			n[j], square[j] = n[i], square[i]
		}
	}
	return nil
}

// weights sums the squares of a block over its columns and over its rows.
func (b *block) weights(ctx context.Context, x []float64) (rows, cols []float64) {
	rows, cols = make([]float64, b.rows), make([]float64, b.cols)
	look := max(1, taskLength/b.cols)
	for r := range rows {
		if r%look == 0 && ctx.Err() != nil {
			break
		}
		sum := 0.0
		for c, v := range b.row(x, r) {
			v *= v
			sum += v
			cols[c] += v
		}
		rows[r] = sum
	}
	return rows, cols
}

// addOccupations adds up the atoms of all states of t atoms by their weights.
func (p *part) addOccupations(n, square []float64, sites []int, t int, weights []float64) {
	state := make([]int, p.sites)
	p.first(state, t)
	for _, weight := range weights {
		for k, atoms := range state {
			if atoms > 0 {
				n[sites[k]] += weight * float64(atoms)
				square[sites[k]] += weight * float64(atoms) * float64(atoms)
			}
		}
		p.next(state)
	}
}

// Correlations sets dst[i*Sites+j] = x^T b_i^+ b_j x, a symmetric matrix with the
// atoms per site on its diagonal. dst has length Sites^2, x and scratch Len; none
// may overlap another. Cost: one hop in every state for each pair of sites.
//
// It returns ctx.Err() if stopped, and *TooLargeError never: what it needs besides
// scratch is smaller than the operator. It panics if a length is wrong.
func (h *Operator) Correlations(ctx context.Context, dst, x, scratch []float64, w *Workspace) error {
	sites := h.terms.Sites
	if len(dst) != sites*sites {
		panic(fmt.Sprintf("fock: %d correlations, want %d", len(dst), sites*sites))
	}
	n, square := make([]float64, sites), make([]float64, sites)
	if err := h.Occupations(ctx, n, square, x, w); err != nil {
		return err
	}
	c := &correlator{Operator: h, ctx: ctx, x: x, scratch: scratch, workspace: h.NewWorkspace(w.workers), image: h.split.image(sites)}
	image := c.image
	for i := range sites {
		dst[i*sites+i] = n[i]
		for j := i + 1; j < sites; j++ {
			a, b := image[i], image[j]
			if h.parity != 0 && min(a, b)*sites+max(a, b) < i*sites+j {
				dst[i*sites+j] = dst[a*sites+b] // done as its mirror image
			} else {
				value, err := c.of(i, j)
				if err != nil {
					return err
				}
				dst[i*sites+j] = value
			}
			dst[j*sites+i] = dst[i*sites+j]
		}
	}
	return nil
}

// image returns where the mirror sends each site; without one, all stay.
func (s *split) image(sites int) []int {
	place := numbering(sites)
	if s.mirrored {
		for k, i := range s.left {
			place[i], place[s.right[k]] = s.right[k], i
		}
	}
	return place
}

// correlator holds what the pairs of sites share.
type correlator struct {
	*Operator
	ctx        context.Context
	x, scratch []float64
	workspace  *Workspace
	image      []int
	pair       *Operator // of the pair before
}

// of takes the expectation value of (b_i^+ b_j + b_j^+ b_i)/2, averaged with its
// mirror image, as that of a Hamiltonian with no other term.
func (c *correlator) of(i, j int) (float64, error) {
	t := &Terms{Sites: c.terms.Sites, Hops: []Hop{{i, j, 0.25}, {c.image[i], c.image[j], 0.25}}}
	opt := Options{MemoryBytes: 1 << 62, Vectors: 2, MaxOccupation: c.most, Parity: c.parity}
	pair, err := newOperator(c.ctx, t, c.split, c.atoms, opt, c.pair)
	if err != nil {
		return 0, err
	}
	c.pair, c.workspace.operator = pair, pair
	sum := [1]float64{}
	p := Product{Dst: [][]float64{c.scratch}, X: [][]float64{c.x}, A: 1, XY: sum[:]}
	err = pair.Combine(c.ctx, p, c.workspace)
	return sum[0], err
}
