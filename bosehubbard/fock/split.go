package fock

// split divides the sites into a left part, whose states number the rows of a
// block, a right part, whose states number its columns, and at most one site
// between them. Each part lists its sites from the cut outwards, so that hops
// across the cut change the first sites, which move whole stretches of states.
//
// If mirrored, right[k] is the mirror image of left[k], and the centre its own.
type split struct {
	left, right []int
	centre      int // -1: none
	mirrored    bool
}

// newSplit halves the sites by the mirror, or where that is nil, in the way of
// those it tries that cuts the fewest hops.
func newSplit(t *Terms, mirror []int) *split {
	near := neighbours(t)
	if mirror != nil {
		s := &split{centre: -1, mirrored: true}
		for i, other := range mirror {
			if i == other {
				s.centre = i
			}
		}
		s.left = outwards(near, halfOf(mirror))
		for _, i := range s.left {
			s.right = append(s.right, mirror[i])
		}
		return s
	}
	var best []bool
	fewest := 0
	for _, inLeft := range halves(t, near) {
		cut := 0
		for i, others := range near {
			for _, j := range others {
				if inLeft[i] && !inLeft[j] {
					cut++
				}
			}
		}
		if best == nil || cut < fewest {
			best, fewest = inLeft, cut
		}
	}
	return &split{left: outwards(near, best), right: outwards(near, inverted(best)), centre: -1}
}

// halfOf chooses the sites with a lower number than their mirror image.
func halfOf(mirror []int) []bool {
	in := make([]bool, len(mirror))
	for i, other := range mirror {
		in[i] = i < other
	}
	return in
}

// halves lists left parts to try: the first half of the numbers, of the sites by
// distance from the first one, and of what the lattice's reflections swap, be they
// symmetries or not. Two sites or fewer are not cut, which would leave many blocks
// of one state.
func halves(t *Terms, near [][]int) [][]bool {
	if t.Sites <= 2 {
		return [][]bool{make([]bool, t.Sites)}
	}
	var list [][]bool
	for _, order := range [][]int{numbering(t.Sites), byDistance(near)} {
		in := make([]bool, t.Sites)
		for _, i := range order[:t.Sites/2] {
			in[i] = true
		}
		list = append(list, in)
	}
	for _, mirror := range t.Mirrors {
		size := 0
		in := halfOf(mirror)
		for _, chosen := range in {
			if chosen {
				size++
			}
		}
		if len(mirror) == t.Sites && size == t.Sites/2 {
			list = append(list, in)
		}
	}
	return list
}

// neighbours lists the sites that hops join to each site.
func neighbours(t *Terms) [][]int {
	near := make([][]int, t.Sites)
	for _, b := range t.bonds() {
		near[b.low] = append(near[b.low], b.high)
		near[b.high] = append(near[b.high], b.low)
	}
	return near
}

func numbering(n int) []int {
	order := make([]int, n)
	for i := range order {
		order[i] = i
	}
	return order
}

func inverted(in []bool) []bool {
	out := make([]bool, len(in))
	for i := range in {
		out[i] = !in[i]
	}
	return out
}

// byDistance lists all sites by their distance in hops from the first one.
func byDistance(near [][]int) []int {
	return breadthFirst(near, []int{0}, nil)
}

// outwards lists the chosen sites by their distance in hops from those that are
// not chosen.
func outwards(near [][]int, in []bool) []int {
	var edge []int
	for i := range near {
		for _, j := range near[i] {
			if in[i] && !in[j] {
				edge = append(edge, i)
				break
			}
		}
	}
	return breadthFirst(near, edge, in)
}

// breadthFirst lists the sites that are chosen, nil for all, by their distance
// from the start; what cannot be reached comes last, in the order of the numbers.
func breadthFirst(near [][]int, start []int, in []bool) []int {
	seen := make([]bool, len(near))
	order := append([]int(nil), start...)
	for _, i := range order {
		seen[i] = true
	}
	next := 0
	for rest := 0; ; rest++ {
		for ; next < len(order); next++ {
			for _, j := range near[order[next]] {
				if !seen[j] && (in == nil || in[j]) {
					seen[j] = true
					order = append(order, j)
				}
			}
		}
		for rest < len(near) && (seen[rest] || in != nil && !in[rest]) {
			rest++
		}
		if rest == len(near) {
			return order
		}
		seen[rest] = true
		order = append(order, rest)
	}
}
