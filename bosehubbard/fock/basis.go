package fock

import "fmt"

// Basis is the number basis of Atoms bosons on Sites sites. It is not changed
// after it is built and may be shared.
type Basis struct {
	Sites, Atoms, Dimension int

	// ways[m][t+1] is the number of states of t atoms on m sites,
	// C(t+m-1, t), and ways[m][0] = 0 stands for t = -1. Rows 1 to Sites are
	// filled if there are two sites or more.
	ways [][]int
}

// NewBasis builds the table of binomials, sites times atoms numbers; the states
// themselves are not stored. opt.Vectors says how many vectors will be used with
// the basis.
//
// It returns the errors of Fit.
func NewBasis(sites, atoms int, opt Options) (*Basis, error) {
	dimension, err := Fit(sites, atoms, opt)
	if err != nil {
		return nil, err
	}
	b := &Basis{Sites: sites, Atoms: atoms, Dimension: dimension}
	if sites == 1 {
		return b, nil
	}
	b.ways = make([][]int, sites+1)
	table := make([]int, sites*(atoms+2))
	for m := 1; m <= sites; m++ {
		row := table[(m-1)*(atoms+2) : m*(atoms+2)]
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
	return b, nil
}

// Rank returns the place of a state in descending lexicographic order,
//
//	rank = sum_i C(T_i - 1 + L-1-i, L-1-i),   T_i = sum_{j>i} n_j
//
// where the term of site i counts the states that agree up to site i-1 and have
// more atoms on site i. state has length Sites. Cost O(Sites); no allocation.
//
// It panics if state has the wrong length, a negative number or not Atoms atoms.
func (b *Basis) Rank(state []int) int {
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
func (b *Basis) State(dst []int, rank int) {
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
func (b *Basis) Next(state []int) int {
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
