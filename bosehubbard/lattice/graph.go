package lattice

// Bipartite colours the sites with +1 and -1 so that every bond joins two
// colours. The colour of a site j is the sign (-1)^j of the phases that turn
// J into -J.
//
// Every connected part starts with +1 at its lowest site. If no colouring exists
// (a ring of odd length), it returns nil and false. Cost O(sites + bonds).
func (l *Lattice) Bipartite() (sublattice []int8, ok bool) {
	near := l.neighbours()
	colour := make([]int8, l.Sites)
	queue := make([]int, 0, l.Sites)
	for start := range colour {
		if colour[start] != 0 {
			continue
		}
		colour[start] = 1
		queue = append(queue[:0], start)
		for len(queue) > 0 {
			site := queue[0]
			queue = queue[1:]
			for _, other := range near.of(site) {
				switch colour[other] {
				case 0:
					colour[other] = -colour[site]
					queue = append(queue, other)
				case colour[site]:
					return nil, false
				}
			}
		}
	}
	return colour, true
}

// Connected reports whether bonds lead from any site to any other.
// Cost O(sites + bonds).
func (l *Lattice) Connected() bool {
	near := l.neighbours()
	seen := make([]bool, l.Sites)
	seen[0] = true
	stack := []int{0}
	reached := 1
	for len(stack) > 0 {
		site := stack[len(stack)-1]
		stack = stack[:len(stack)-1]
		for _, other := range near.of(site) {
			if !seen[other] {
				seen[other] = true
				reached++
				stack = append(stack, other)
			}
		}
	}
	return reached == l.Sites
}

// Coordination returns z, the largest number of bonds that meet at one site.
func (l *Lattice) Coordination() int {
	bonds := make([]int, l.Sites)
	most := 0
	for _, b := range l.Bonds {
		bonds[b.From]++
		bonds[b.To]++
		most = max(most, bonds[b.From], bonds[b.To])
	}
	return most
}

// adjacency lists the neighbours of site i in other[first[i]:first[i+1]].
type adjacency struct{ first, other []int }

func (a adjacency) of(site int) []int { return a.other[a.first[site]:a.first[site+1]] }

// neighbours sorts the ends of the bonds by site.
func (l *Lattice) neighbours() adjacency {
	a := adjacency{first: make([]int, l.Sites+1), other: make([]int, 2*len(l.Bonds))}
	for _, b := range l.Bonds {
		a.first[b.From+1]++
		a.first[b.To+1]++
	}
	for i := range l.Sites {
		a.first[i+1] += a.first[i]
	}
	next := append([]int(nil), a.first[:l.Sites]...)
	for _, b := range l.Bonds {
		a.other[next[b.From]] = b.To
		a.other[next[b.To]] = b.From
		next[b.From]++
		next[b.To]++
	}
	return a
}
