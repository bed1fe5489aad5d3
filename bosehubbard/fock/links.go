package fock

// cutHops adds to a row the hops across the cut, which bring rows of other blocks.
// Two that start at the first state are added together.
func (j *job) cutHops(y []float64, row int) {
	var held strand
	for i := range j.links {
		l := &j.links[i]
		x, a := j.source(l, row)
		if x == nil {
			continue
		}
		if l.col == nil {
			addOne(y, x, a)
			continue
		}
		for _, r := range l.col.runs {
			s := strand{x[r.from : r.from+r.length], l.col.element[r.to : r.to+r.length], a}
			switch {
			case r.to > 0:
				s.add(y[r.to : r.to+r.length])
			case held.x == nil:
				held = s
			default:
				addTwoStrands(y, held, s)
				held.x = nil
			}
		}
	}
	if held.x != nil {
		held.add(y[:len(held.x)])
	}
}

// source returns the row that a link brings to a row, nil if there is none, and its
// factor without that of the columns.
func (j *job) source(l *link, row int) (x []float64, a float64) {
	if l.flipped {
		return nil, 0
	}
	a = j.a * l.factor
	if l.row != nil {
		a *= l.row.element[row]
		if row = int(l.row.from[row]); row < 0 {
			return nil, 0
		}
	}
	return j.blocks[l.source].row(j.x, row), a
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
