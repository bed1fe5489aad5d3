package fock

import (
	"fmt"
	"math"
)

// Workspace is the scratch of one goroutine that applies an Operator: a state
// and what is needed to rank the states one hop away.
type Workspace struct {
	basis  *Basis
	state  []int
	beyond []int // beyond[i] = T_i, atoms to the right of site i

	// right[j] - right[i] is the change of rank when an atom hops from site i
	// to j > i: it adds one to T_i .. T_(j-1), and one more atom there adds
	// C(T+m-1, T), m the number of sites to the right. left is the same with
	// T-1 in place of T, for the way back.
	right, left []int
}

// NewWorkspace returns scratch for the operators on a basis.
func NewWorkspace(b *Basis) *Workspace {
	ints := make([]int, 4*b.Sites)
	return &Workspace{
		basis: b,
		state: ints[:b.Sites], beyond: ints[b.Sites : 2*b.Sites],
		right: ints[2*b.Sites : 3*b.Sites], left: ints[3*b.Sites:],
	}
}

// ApplyTo computes dst = H x. dst and x have length D and must not overlap. Cost
// O(D (bonds + 1)); no allocation. It may take long; ApplyRowsTo does a part.
//
// It panics if a length is wrong or w belongs to another basis.
func (h *Operator) ApplyTo(dst, x []float64, w *Workspace) {
	h.ApplyRowsTo(dst, x, 0, len(h.diagonal), w)
}

// ApplyRowsTo computes rows from to to-1 of dst = H x and leaves the others of
// dst, which have length D like x and must not overlap it. Rows are independent:
// any split gives the same numbers. Cost O((to-from) bonds); no allocation.
//
// It panics if a length or a row is out of range or w belongs to another basis.
func (h *Operator) ApplyRowsTo(dst, x []float64, from, to int, w *Workspace) {
	d := len(h.diagonal)
	if len(dst) != d || len(x) != d || from < 0 || to < from || to > d || w.basis != h.Basis {
		panic(fmt.Sprintf("fock: rows %d to %d, dst of %d, x of %d, want slices of %d and a workspace of this basis",
			from, to, len(dst), len(x), d))
	}
	if from == to {
		return
	}
	w.seek(from)
	for rank := from; rank < to; rank++ {
		dst[rank] = h.diagonal[rank]*x[rank] + h.kinetic(x, rank, w)
		w.next()
	}
}

// kinetic sums the hops that lead to the state of w, of the given rank.
func (h *Operator) kinetic(x []float64, rank int, w *Workspace) float64 {
	sum := 0.0
	for i := range h.hops {
		hop := &h.hops[i]
		low, high := w.state[hop.low], w.state[hop.high]
		if low > 0 {
			there := rank + w.right[hop.high] - w.right[hop.low]
			sum += hop.amplitude * math.Sqrt(float64(low)*float64(high+1)) * x[there]
		}
		if high > 0 {
			there := rank - w.left[hop.high] + w.left[hop.low]
			sum += hop.amplitude * math.Sqrt(float64(high)*float64(low+1)) * x[there]
		}
	}
	return sum
}

// seek puts the workspace on the state of a rank.
func (w *Workspace) seek(rank int) {
	w.basis.State(w.state, rank)
	w.refresh(0)
}

// next moves on to the state that follows; after the last one it stays.
func (w *Workspace) next() {
	if first := w.basis.Next(w.state); first >= 0 {
		w.refresh(first)
	}
}

// refresh recomputes the ranking data that depends on the sites from first on.
func (w *Workspace) refresh(first int) {
	beyond := w.basis.Atoms
	if first > 0 {
		beyond = w.beyond[first-1]
	}
	last := w.basis.Sites - 1
	for i := first; i < last; i++ {
		beyond -= w.state[i]
		w.beyond[i] = beyond
		row := w.basis.ways[last-i]
		w.right[i+1] = w.right[i] + row[beyond+1]
		w.left[i+1] = w.left[i] + row[beyond]
	}
}
