package fock

// pairsOf returns the pairs of hops to one state.
func (s *sector) pairsOf(state int) []hopPair {
	at := s.span[state]
	return s.pairs[at.begin : at.begin+at.length]
}

// gatherFour sets z[4 i + k] to what the hops bring to state i from row k of four,
// so that each hop is read once for all of them. z has length 4 count, the rows
// count.
func (s *sector) gatherFour(z, x0, x1, x2, x3 []float64) {
	pairs, begin := s.pairs, int32(0)
	for each, end := range s.classEnd {
		if end > begin {
			gatherClass(z, x0, x1, x2, x3, s.order[begin:end], pairs, each)
			pairs = pairs[each*int(end-begin):]
		}
		begin = end
	}
}

// gatherClass is gatherFour for states with equally many pairs, each of them. It
// has few variables besides those of the inner loop, which then stay in registers;
// that loop is bound by its ten loads.
func gatherClass(z, x0, x1, x2, x3 []float64, order []int32, pairs []hopPair, each int) {
	x1, x2, x3 = x1[:len(x0)], x2[:len(x0)], x3[:len(x0)]
	for _, state := range order {
		s0, s1, s2, s3 := 0.0, 0.0, 0.0, 0.0
		for i := range pairs[:each] {
			p := &pairs[i]
			f, g, v, w := p.fromFirst, p.fromSecond, p.first, p.second
			s0 += v*x0[f] + w*x0[g]
			s1 += v*x1[f] + w*x1[g]
			s2 += v*x2[f] + w*x2[g]
			s3 += v*x3[f] + w*x3[g]
		}
		pairs = pairs[each:]
		t := (*[4]float64)(z[4*int(state):])
		t[0], t[1], t[2], t[3] = s0, s1, s2, s3
	}
}

// gather sets z[i] to what the hops bring to state i from one row, with the bits of
// gatherFour.
func (s *sector) gather(z, x []float64) {
	pairs, begin := s.pairs, int32(0)
	for each, end := range s.classEnd {
		for _, state := range s.order[begin:end] {
			sum := 0.0
			for i := range pairs[:each] {
				p := &pairs[i]
				sum += p.first*x[p.fromFirst] + p.second*x[p.fromSecond]
			}
			pairs = pairs[each:]
			z[state] = sum
		}
		begin = end
	}
}
