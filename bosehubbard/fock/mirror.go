package fock

import "math"

// Mirror finds a symmetry of the Hamiltonian that swaps the sites pairwise and
// keeps at most one in place: a reflection, an inversion, half a turn of a ring.
// place[i] is where site i goes. Among several it takes the one whose halves are
// joined by the fewest hops.
//
// It tries t.Mirrors and the reversal of the numbering, and returns nil and false
// if none of them is a symmetry. Potentials may differ by rounding, 1e-14 of the
// largest. Cost O(candidates (sites + hops)).
func (t *Terms) Mirror() (place []int, ok bool) {
	fewest := math.MaxInt
	bonds := t.bonds()
	for _, candidate := range t.candidates() {
		if !t.isMirror(candidate) {
			continue
		}
		if n := crossing(candidate, bonds); n < fewest {
			place, fewest = candidate, n
		}
	}
	return place, place != nil
}

// candidates lists what may be a mirror.
func (t *Terms) candidates() [][]int {
	reversal := make([]int, t.Sites)
	for i := range reversal {
		reversal[i] = t.Sites - 1 - i
	}
	return append(append([][]int(nil), t.Mirrors...), reversal)
}

// isMirror verifies that a permutation swaps sites pairwise, keeps at most one, and
// is a symmetry.
func (t *Terms) isMirror(place []int) bool {
	if t.Sites < 2 || !t.isSymmetry(place) {
		return false
	}
	fixed := 0
	for i, other := range place {
		if place[other] != i {
			return false
		}
		if other == i {
			fixed++
		}
	}
	return fixed <= 1
}

// crossing counts the hops between the halves {i: i < place[i]} and the rest.
func crossing(place []int, bonds []bond) int {
	n := 0
	for _, b := range bonds {
		if (b.low < place[b.low]) != (b.high < place[b.high]) {
			n++
		}
	}
	return n
}

// Gauge finds signs +-1 of the sites that make every off-diagonal matrix element
// of sign * H zero or negative once each atom on a site carries its sign. Then,
// by Perron and Frobenius, the lowest state of sign * H can be chosen to have no
// other signs than these. sign is +1 for the floor, -1 for the ceiling.
//
// On a chain, a square or a cube both exist; on a triangle with J > 0 only the
// one of the floor. Cost O(sites + hops).
func (t *Terms) Gauge(sign float64) (gauge []int8, ok bool) {
	type end struct {
		site int
		flip int8 // -1 if the signs of the two ends must differ
	}
	near := make([][]end, t.Sites)
	for _, b := range t.bonds() {
		flip := int8(1)
		if sign*b.amplitude > 0 {
			flip = -1
		}
		near[b.low] = append(near[b.low], end{b.high, flip})
		near[b.high] = append(near[b.high], end{b.low, flip})
	}
	gauge = make([]int8, t.Sites)
	var queue []int
	for start := range gauge {
		if gauge[start] != 0 {
			continue
		}
		gauge[start] = 1
		for queue = append(queue[:0], start); len(queue) > 0; {
			site := queue[0]
			queue = queue[1:]
			for _, e := range near[site] {
				switch want := gauge[site] * e.flip; gauge[e.site] {
				case 0:
					gauge[e.site] = want
					queue = append(queue, e.site)
				case -want:
					return nil, false
				}
			}
		}
	}
	return gauge, true
}

// Connected reports whether hops lead from any site to any other. Where they do
// not, the number of atoms in each part is conserved.
func (t *Terms) Connected() bool {
	near := neighbours(t)
	reached := make([]bool, t.Sites)
	reached[0] = true
	stack := []int{0}
	count := 1
	for len(stack) > 0 {
		site := stack[len(stack)-1]
		stack = stack[:len(stack)-1]
		for _, other := range near[site] {
			if !reached[other] {
				reached[other] = true
				count++
				stack = append(stack, other)
			}
		}
	}
	return count == t.Sites
}
