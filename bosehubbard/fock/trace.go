package fock

// TraceMean returns Tr H over the number of states, Hz: the energy at infinite
// temperature, of the space or of the sector; 0 where that has no states.
//
//	Tr_p H = (Tr H + p Tr R H)/2,   R the mirror, p = +-1
//
// Cost O(states of the halves).
func (h *Operator) TraceMean() float64 {
	if h.dimension == 0 {
		return 0
	}
	sum := 0.0
	for i := range h.blocks {
		b := &h.blocks[i]
		rows, cols := h.rowSectors[b.left].energy, h.colSectors[b.right].energy
		trace := float64(b.rows)*float64(b.cols)*b.energy + float64(b.cols)*sumOf(rows) + float64(b.rows)*sumOf(cols)
		if h.square(b) {
			trace = (trace + float64(h.parity)*(2*sumOf(rows)+float64(b.rows)*b.energy)) / 2
		}
		sum += trace
		for _, l := range b.links {
			if l.flipped {
				sum += l.trace()
			}
		}
	}
	return sum / float64(h.dimension)
}

// trace sums the elements of a flipped link that lead from a state to itself: the
// hops that take a state to its mirror image.
func (l *link) trace() float64 {
	sum := 0.0
	for row, col := range l.row.from {
		if col >= 0 && l.col.from[col] == int32(row) {
			sum += l.factor * l.row.element[row] * l.col.element[col]
		}
	}
	return sum
}

func sumOf(x []float64) float64 {
	sum := 0.0
	for _, v := range x {
		sum += v
	}
	return sum
}
