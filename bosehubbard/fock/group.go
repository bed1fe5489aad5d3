package fock

import (
	"fmt"
	"math"
	"math/cmplx"

	"hilltop/bosehubbard/lattice"
)

// group is the translations of a system with the character of each in the sector
// of one quasi-momentum, exp(2 pi i sum_a m_a j_a / L_a).
type group struct {
	back      [][]int      // back[g][i] is the site that g sends to i
	character []complex128 // of g
	isReal    bool         // no character has an imaginary part
}

// newGroup multiplies the translations out. m has one number for each of them.
//
// It returns an error unless the translations are symmetries of the terms and m has
// their number.
func newGroup(t *Terms, m []int) (*group, error) {
	if len(t.Translations) == 0 {
		return nil, fmt.Errorf("fock: quasi-momentum %v of a system without translations", m)
	}
	if len(m) != len(t.Translations) {
		return nil, fmt.Errorf("fock: quasi-momentum %v, want %d numbers, one for each translation", m, len(t.Translations))
	}
	g := &group{back: [][]int{numbering(t.Sites)}, character: []complex128{1}, isReal: true}
	for a, tr := range t.Translations {
		if !t.isSymmetry(tr.Place) || tr.Order < 1 {
			return nil, fmt.Errorf("fock: quasi-momentum %v: translation %d is no symmetry of the hops and potentials", m, a)
		}
		number := (m[a]%tr.Order + tr.Order) % tr.Order
		g.isReal = g.isReal && 2*number%tr.Order == 0
		g.extend(tr, number)
	}
	return g, nil
}

// extend multiplies all elements by the powers of a translation.
func (g *group) extend(tr lattice.Translation, number int) {
	back, character := g.back, g.character
	step := make([]int, len(tr.Place))
	for i, to := range tr.Place {
		step[to] = i
	}
	shift := numbering(len(step))
	for power := 1; power < tr.Order; power++ {
		next := make([]int, len(step))
		for i := range next {
			next[i] = step[shift[i]]
		}
		shift = next
		phase := phaseOf(number*power%tr.Order, tr.Order)
		for k := range back {
			product := make([]int, len(step))
			for i := range product {
				product[i] = back[k][shift[i]]
			}
			g.back = append(g.back, product)
			g.character = append(g.character, character[k]*phase)
		}
	}
}

// phaseOf returns exp(2 pi i number/order), exact where it is real.
func phaseOf(number, order int) complex128 {
	switch {
	case number == 0:
		return 1
	case 2*number == order:
		return -1
	}
	return cmplx.Rect(1, 2*math.Pi*float64(number)/float64(order))
}

// isSymmetry says whether a permutation of the sites keeps all hops and potentials.
func (t *Terms) isSymmetry(place []int) bool {
	if len(place) != t.Sites || t.Potential != nil && len(t.Potential) != t.Sites {
		return false
	}
	seen, size := make([]bool, t.Sites), 0.0
	for i := range place {
		size = max(size, math.Abs(t.potential(i)))
	}
	for i, other := range place {
		if other < 0 || other >= t.Sites || seen[other] || !(math.Abs(t.potential(i)-t.potential(other)) <= 1e-14*size) {
			return false
		}
		seen[other] = true
	}
	bonds := t.bonds()
	amplitude := make(map[[2]int]float64, len(bonds))
	for _, b := range bonds {
		amplitude[[2]int{b.low, b.high}] = b.amplitude
	}
	for _, b := range bonds {
		i, j := place[b.low], place[b.high]
		if amplitude[[2]int{min(i, j), max(i, j)}] != b.amplitude {
			return false
		}
	}
	return true
}

// weight returns the sum of the characters of the elements that keep a state, the
// square of its norm in the sector times the size of the group; 0 if the state is
// not the first of its orbit, or has no part in the sector.
func (g *group) weight(state []int) float64 {
	sum := complex128(0)
	for k, back := range g.back {
		switch compareImage(state, back, state) {
		case 1:
			return 0
		case 0:
			sum += g.character[k]
		}
	}
	if real(sum) < 0.5 { // a whole number but for rounding
		return 0
	}
	return math.Round(real(sum))
}

// first writes the first state of an orbit to dst and returns the element that
// leads from state to it.
func (g *group) first(dst, state []int) (element int) {
	copy(dst, state)
	for k, back := range g.back {
		if compareImage(state, back, dst) == 1 {
			element = k
			for i := range dst {
				dst[i] = state[back[i]]
			}
		}
	}
	return element
}

// compareImage is 1, 0, -1 if the image of a state stands before, at, behind
// another one in descending lexicographic order.
func compareImage(state, back, other []int) int {
	for i, j := range back {
		if d := state[j] - other[i]; d > 0 {
			return 1
		} else if d < 0 {
			return -1
		}
	}
	return 0
}
