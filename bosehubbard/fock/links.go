package fock

// leftAndLinks adds to a row the hops inside the left part, which bring whole rows
// of the same block, and the hops across the cut, which bring rows of other ones.
func (j *job) leftAndLinks(row int) {
	y := j.row(j.dst, row)
	s := j.rowSector
	at := s.span[row]
	from := s.from[at.begin : at.begin+at.length]
	element := s.element[at.begin : at.begin+at.length]
	k := 0
	for ; k+4 <= len(from); k += 4 {
		addFour(y, j.row(j.x, int(from[k])), j.row(j.x, int(from[k+1])), j.row(j.x, int(from[k+2])), j.row(j.x, int(from[k+3])),
			j.a*element[k], j.a*element[k+1], j.a*element[k+2], j.a*element[k+3])
	}
	if k+2 <= len(from) {
		addTwo(y, j.row(j.x, int(from[k])), j.row(j.x, int(from[k+1])), j.a*element[k], j.a*element[k+1])
		k += 2
	}
	if k < len(from) {
		addOne(y, j.row(j.x, int(from[k])), j.a*element[k])
	}
	for i := range j.links {
		if l := &j.links[i]; !l.flipped {
			j.addLink(y, l, row)
		}
	}
}

// addLink adds what one hop across the cut brings to a row.
func (j *job) addLink(y []float64, l *link, row int) {
	factor := j.a * l.factor
	if l.row != nil {
		factor *= l.row.element[row]
		if row = int(l.row.from[row]); row < 0 {
			return
		}
	}
	x := j.blocks[l.source].row(j.x, row)
	if l.col == nil {
		addOne(y, x, factor)
		return
	}
	for _, r := range l.col.runs {
		addWeighted(y[r.to:r.to+r.length], x[r.from:r.from+r.length], l.col.element[r.to:r.to+r.length], factor)
	}
}

// tile is the side of the squares in which matrices are transposed: two of them
// fit the first cache.
const tile = 32

// flippedLinks adds to a band of rows the hops across the cut that come from the
// transpose of the block itself.
func (j *job) flippedLinks(from, to int) {
	for i := range j.links {
		if l := &j.links[i]; l.flipped {
			for at := 0; at < j.cols; at += tile {
				j.flippedTile(l, from, to, at, min(at+tile, j.cols))
			}
		}
	}
}

// flippedTile does the columns begin to end-1; successive rows read the same lines
// of memory.
func (j *job) flippedTile(l *link, from, to, begin, end int) {
	x := j.x[j.offset : j.offset+j.rows*j.cols]
	for row := from; row < to; row++ {
		col := int(l.row.from[row])
		if col < 0 {
			continue
		}
		factor := j.a * l.factor * l.row.element[row]
		y := j.row(j.dst, row)
		for i := begin; i < end; i++ {
			if source := int(l.col.from[i]); source >= 0 {
				y[i] += factor * l.col.element[i] * x[source*j.cols+col]
			}
		}
	}
}

// doBand completes a band of rows of a square block, and the columns that mirror
// it from the diagonal on, by Y + p Y^T, and returns their part of the sums.
func (h *Operator) doBand(t *task, p *Product, k int) (sums [2]float64) {
	j := h.newJob(&h.blocks[t.block], p, k)
	parity := float64(h.parity)
	x := j.x[j.offset : j.offset+j.rows*j.cols]
	y := j.dst[j.offset : j.offset+j.rows*j.cols]
	n := j.cols
	for begin := t.from; begin < n; begin += tile {
		end := min(begin+tile, n)
		for row := t.from; row < t.to; row++ {
			for col := max(begin, row); col < end; col++ {
				here, there := row*n+col, col*n+row
				sum := y[here] + parity*y[there]
				y[here], y[there] = sum, parity*sum
				weight := 2.0
				if row == col {
					weight = 1
				}
				sums[0] += weight * sum * x[here]
				sums[1] += weight * x[here] * x[here]
			}
		}
	}
	return sums
}

// addFour computes y += a0 x0 + a1 x1 + a2 x2 + a3 x3, all of one length.
func addFour(y, x0, x1, x2, x3 []float64, a0, a1, a2, a3 float64) {
	x0, x1, x2, x3 = x0[:len(y)], x1[:len(y)], x2[:len(y)], x3[:len(y)]
	for i := range y {
		y[i] += a0*x0[i] + a1*x1[i] + a2*x2[i] + a3*x3[i]
	}
}

// addTwo computes y += a0 x0 + a1 x1.
func addTwo(y, x0, x1 []float64, a0, a1 float64) {
	x0, x1 = x0[:len(y)], x1[:len(y)]
	for i := range y {
		y[i] += a0*x0[i] + a1*x1[i]
	}
}

// addOne computes y += a x.
func addOne(y, x []float64, a float64) {
	x = x[:len(y)]
	for i := range y {
		y[i] += a * x[i]
	}
}

// addWeighted computes y[i] += a s[i] x[i].
func addWeighted(y, x, s []float64, a float64) {
	x, s = x[:len(y)], s[:len(y)]
	for i := range y {
		y[i] += a * s[i] * x[i]
	}
}
