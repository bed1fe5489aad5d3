package fock

import (
	"fmt"
	"math"
)

// The plain operator: every state of the lattice in lexicographic order, hops by
// ranking, the diagonal stored. It is meant to be read, and to check the fast one.

// plainBasis is the number basis of Atoms bosons on Sites sites. It is not changed
// after it is built and may be shared.
type plainBasis struct {
	Sites, Atoms, Dimension int

	// ways[m][t+1] is the number of states of t atoms on m sites,
	// C(t+m-1, t), and ways[m][0] = 0 stands for t = -1. Rows 1 to Sites are
	// filled if there are two sites or more.
	ways [][]int
}

// newPlainBasis builds the table of binomials.
func newPlainBasis(sites, atoms int) *plainBasis {
	b := &plainBasis{Sites: sites, Atoms: atoms, Dimension: int(binomial(sites, atoms).Int64())}
	b.ways = make([][]int, sites+1)
	for m := 1; m <= sites; m++ {
		row := make([]int, atoms+2)
		row[1] = 1
		for t := 1; t <= atoms; t++ {
			if m == 1 {
				row[t+1] = 1
			} else {
				row[t+1] = row[t] + b.ways[m-1][t+1] // first site occupied, or not
			}
		}
		b.ways[m] = row
	}
	return b
}

// Rank returns the place of a state in descending lexicographic order,
//
//	rank = sum_i C(T_i - 1 + L-1-i, L-1-i),   T_i = sum_{j>i} n_j
//
// where the term of site i counts the states that agree up to site i-1 and have
// more atoms on site i. state has length Sites. Cost O(Sites); no allocation.
//
// It panics if state has the wrong length, a negative number or not Atoms atoms.
func (b *plainBasis) Rank(state []int) int {
	if len(state) != b.Sites {
		panic(fmt.Sprintf("fock: state of %d sites, want %d", len(state), b.Sites))
	}
	beyond, rank := b.Atoms, 0
	for i, n := range state {
		if n < 0 || n > beyond || i == b.Sites-1 && n != beyond {
			panic(fmt.Sprintf("fock: state %v, want %d atoms and no negative number", state, b.Atoms))
		}
		beyond -= n
		if i < b.Sites-1 {
			rank += b.ways[b.Sites-i][beyond] // C(T-1+m, m) = ways of T-1 atoms on m+1 sites
		}
	}
	return rank
}

// State writes the state of a rank to dst, of length Sites. It is the inverse of
// Rank. Cost O(Sites + Atoms Sites) at most; no allocation.
//
// It panics if dst has the wrong length or rank is not in [0, Dimension).
func (b *plainBasis) State(dst []int, rank int) {
	if len(dst) != b.Sites {
		panic(fmt.Sprintf("fock: state of %d sites, want %d", len(dst), b.Sites))
	}
	if rank < 0 || rank >= b.Dimension {
		panic(fmt.Sprintf("fock: rank %d, want 0 to %d", rank, b.Dimension-1))
	}
	left := b.Atoms
	for i := range b.Sites - 1 {
		// Few atoms beyond site i come first: t of them head ways[m][t+1] states.
		row, beyond := b.ways[b.Sites-1-i], 0
		for rank >= row[beyond+1] {
			rank -= row[beyond+1]
			beyond++
		}
		dst[i] = left - beyond
		left = beyond
	}
	dst[b.Sites-1] = left
}

// Next replaces state by the one that follows it and returns the first site that
// changed, or -1, with the state unchanged, after the last one.
//
// The last occupied site before the end loses an atom, which goes to the next
// site together with all that stood on the last one. Cost O(1) on average; no
// allocation.
func (b *plainBasis) Next(state []int) int {
	last := b.Sites - 1
	k := last - 1
	for k >= 0 && state[k] == 0 {
		k--
	}
	if k < 0 {
		return -1
	}
	tail := state[last]
	state[last] = 0
	state[k]--
	state[k+1] = tail + 1
	return k
}

// plainOperator is the Hamiltonian of some terms in that basis.
type plainOperator struct {
	*plainBasis
	diagonal []float64
	bonds    []bond
}

func newPlainOperator(t *Terms, atoms int) *plainOperator {
	h := &plainOperator{plainBasis: newPlainBasis(t.Sites, atoms), bonds: t.bonds()}
	h.diagonal = make([]float64, h.Dimension)
	state := make([]int, t.Sites)
	h.State(state, 0)
	for rank := range h.diagonal {
		for i, n := range state {
			h.diagonal[rank] += float64(n) * (t.Interaction/2*float64(n-1) + t.potential(i))
		}
		h.Next(state)
	}
	return h
}

// plainWorkspace is the scratch of one goroutine that applies an Operator: a state
// and what is needed to rank the states one hop away.
type plainWorkspace struct {
	basis  *plainBasis
	state  []int
	beyond []int // beyond[i] = T_i, atoms to the right of site i

	// right[j] - right[i] is the change of rank when an atom hops from site i
	// to j > i: it adds one to T_i .. T_(j-1), and one more atom there adds
	// C(T+m-1, T), m the number of sites to the right. left is the same with
	// T-1 in place of T, for the way back.
	right, left []int
}

// newPlainWorkspace returns scratch for the operators on a basis.
func newPlainWorkspace(b *plainBasis) *plainWorkspace {
	ints := make([]int, 4*b.Sites)
	return &plainWorkspace{
		basis: b,
		state: ints[:b.Sites], beyond: ints[b.Sites : 2*b.Sites],
		right: ints[2*b.Sites : 3*b.Sites], left: ints[3*b.Sites:],
	}
}

// ApplyTo computes dst = H x.
func (h *plainOperator) ApplyTo(dst, x []float64) {
	w := newPlainWorkspace(h.plainBasis)
	w.seek(0)
	for rank := range x {
		dst[rank] = h.diagonal[rank]*x[rank] + h.kinetic(x, rank, w)
		w.next()
	}
}

// kinetic sums the hops that lead to the state of w, of the given rank.
func (h *plainOperator) kinetic(x []float64, rank int, w *plainWorkspace) float64 {
	sum := 0.0
	for i := range h.bonds {
		hop := &h.bonds[i]
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
func (w *plainWorkspace) seek(rank int) {
	w.basis.State(w.state, rank)
	w.refresh(0)
}

// next moves on to the state that follows; after the last one it stays.
func (w *plainWorkspace) next() {
	if first := w.basis.Next(w.state); first >= 0 {
		w.refresh(first)
	}
}

// refresh recomputes the ranking data that depends on the sites from first on.
func (w *plainWorkspace) refresh(first int) {
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
