package fock

import (
	"context"
	"math"

	"hilltop/bosehubbard/num/blocks"
)

// CutoffResidual bounds how far H without the limit of the occupation takes x, of
// length Len and norm 1, out of the space with it,
//
//	|Q H x|^2 <= sum_i (m+1) z_i sum_j A_ij^2 <x| [n_i = m] n_j |x>
//
// m the limit, j the z_i neighbours of site i: only an atom that joins m others
// leads out. If x is an eigenvector in the space, an eigenvalue of the H without
// limit lies within that, in Hz. It is 0 if there is no limit.
//
// It returns ctx.Err() if stopped.
//
// Source: derived; Cauchy's inequality over the neighbours.
func (h *Operator) CutoffResidual(ctx context.Context, x []float64, w *Workspace) (float64, error) {
	if h.most >= h.atoms {
		return 0, nil
	}
	weight := make([]float64, h.terms.Sites) // (m+1) z_i
	bonds := h.terms.bonds()
	for _, b := range bonds {
		weight[b.low] += float64(h.most + 1)
		weight[b.high] += float64(h.most + 1)
	}
	sums := make([]float64, len(h.tasks))
	err := blocks.Run(ctx, w.workers, len(h.tasks), func(_, i int) {
		h.eachState(&h.tasks[i], func(rank int, state []int) {
			leak := 0.0
			for _, b := range bonds {
				if state[b.low] == h.most {
					leak += weight[b.low] * b.amplitude * b.amplitude * float64(state[b.high])
				}
				if state[b.high] == h.most {
					leak += weight[b.high] * b.amplitude * b.amplitude * float64(state[b.low])
				}
			}
			sums[i] += leak * x[rank] * x[rank]
		})
	})
	return math.Sqrt(sumOf(sums)), err
}

// eachState calls do for the states of a task.
func (h *Operator) eachState(t *task, do func(rank int, state []int)) {
	b := &h.blocks[t.block]
	state := make([]int, h.terms.Sites)
	left, right := make([]int, len(h.split.left)), make([]int, len(h.split.right))
	if c := h.split.centre; c >= 0 {
		state[c] = b.centre
	}
	h.left.state(left, b.left, t.from)
	rank := b.offset + t.from*b.cols
	for row := t.from; row < t.to; row++ {
		for k, i := range h.split.left {
			state[i] = left[k]
		}
		h.right.first(right, b.right)
		for range b.cols {
			for k, i := range h.split.right {
				state[i] = right[k]
			}
			do(rank, state)
			rank++
			h.right.next(right)
		}
		h.left.next(left)
	}
}
