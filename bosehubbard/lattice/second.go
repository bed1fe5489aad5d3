package lattice

// SecondBonds lists the pairs of sites two bonds apart along one axis, which the
// second-neighbour tunnelling J2 joins: on a chain i and i+2. It relies on bonds
// that point along their axis, as Box and Build make them.
//
// Two sites share at most one, so that on a ring of four each of the two pairs has
// one bond, though it is reached both ways. Cost O(bonds).
func (l *Lattice) SecondBonds() []Bond {
	type place struct{ site, axis int }
	next := make(map[place]int, len(l.Bonds))
	for _, b := range l.Bonds {
		next[place{b.From, b.Axis}] = b.To
	}
	second := &Lattice{}
	seen := map[[2]int]bool{}
	for _, b := range l.Bonds {
		if to, ok := next[place{b.To, b.Axis}]; ok {
			second.join(b.From, to, b.Axis, seen)
		}
	}
	return second.Bonds
}
