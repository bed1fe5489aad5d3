package fock

import "gonum.org/v1/gonum/floats"

// task is a band of rows of one block.
type task struct{ block, from, to int }

// taskLength is the number of states in a band: some tens of microseconds of work.
const taskLength = 1 << 14

// divide cuts the blocks into tasks.
func (h *Operator) divide() {
	for i := range h.blocks {
		b := &h.blocks[i]
		rows := max(1, taskLength/b.cols)
		rows = (rows + 3) &^ 3
		for from := 0; from < b.rows; from += rows {
			h.tasks = append(h.tasks, task{block: i, from: from, to: min(from+rows, b.rows)})
		}
		if h.square(b) {
			for from := 0; from < b.rows; from += tile {
				h.bands = append(h.bands, task{block: i, from: from, to: min(from+tile, b.rows)})
			}
		}
	}
}

// job is a product restricted to one block and one vector.
type job struct {
	*block
	blocks    []block
	rowSector *sector
	colSector *sector
	dst, x    []float64 // whole vectors
	a, b, c   float64
}

func (h *Operator) newJob(block *block, p *Product, k int) job {
	return job{
		block: block, blocks: h.blocks, rowSector: h.rowSectors[block.left], colSector: h.colSectors[block.right],
		dst: p.Dst[k], x: p.X[k], a: p.A, b: p.B, c: p.C,
	}
}

// row returns a row of the block in a vector.
func (b *block) row(v []float64, row int) []float64 {
	at := b.offset + row*b.cols
	return v[at : at+b.cols : at+b.cols]
}

// doRows computes a band of rows of vector k, and its part of the sums. scratch has
// room for four rows.
func (h *Operator) doRows(t *task, p *Product, k int, scratch []float64) (sums [2]float64) {
	j := h.newJob(&h.blocks[t.block], p, k)
	begin, end := j.offset+t.from*j.cols, j.offset+t.to*j.cols
	if p.C == 0 {
		clear(j.dst[begin:end])
	}
	if h.square(j.block) {
		j.halfRows(t.from, t.to)
		return sums
	}
	row := t.from
	for ; row+4 <= t.to; row += 4 {
		z := scratch[:4*j.cols]
		j.colSector.gatherFour(z, j.row(j.x, row), j.row(j.x, row+1), j.row(j.x, row+2), j.row(j.x, row+3))
		for k := range 4 {
			j.wholeRow(row+k, z[k:], 4)
		}
	}
	for ; row < t.to; row++ {
		z := scratch[:j.cols]
		j.colSector.gather(z, j.row(j.x, row))
		j.wholeRow(row, z, 1)
	}
	j.flippedLinks(t.from, t.to)
	if p.XY != nil {
		sums[0] = floats.Dot(j.x[begin:end], j.dst[begin:end])
	}
	if p.XX != nil {
		sums[1] = floats.Dot(j.x[begin:end], j.x[begin:end])
	}
	return sums
}

// wholeRow computes a row of a block. z[i*stride] is what the hops inside the right
// part bring to column i.
func (j *job) wholeRow(row int, z []float64, stride int) {
	y, pairs := j.row(j.dst, row), j.rowSector.pairsOf(row)
	s := start{
		x: j.row(j.x, row), z: z, stride: stride, energy: j.colSector.energy,
		own: j.a*(j.rowSector.energy[row]+j.energy) + j.b, a: j.a, c: j.c,
	}
	if isFour(pairs) {
		f := j.four(pairs)
		s.joinFour(y, &f)
		pairs = pairs[2:]
	} else {
		s.join(y)
	}
	j.leftHops(y, pairs)
	j.cutHops(y, row)
}

// halfRows computes a band of a square block up to what symmetrising it adds: the
// matrix whose sum with p times its transpose is the product, p the parity.
func (j *job) halfRows(from, to int) {
	for row := from; row < to; row++ {
		y, pairs := j.row(j.dst, row), j.rowSector.pairsOf(row)
		s := start{x: j.row(j.x, row), own: j.a*(j.rowSector.energy[row]+j.energy/2) + j.b/2, c: j.c / 2}
		if isFour(pairs) {
			f := j.four(pairs)
			s.scaleFour(y, &f)
			pairs = pairs[2:]
		} else {
			s.scale(y)
		}
		j.leftHops(y, pairs)
		j.cutHops(y, row)
	}
}

// isFour says whether the first two pairs are four hops.
func isFour(pairs []hopPair) bool { return len(pairs) >= 2 && pairs[1].second != 0 }

// four takes the rows that the first two pairs of hops of the left part bring.
func (j *job) four(pairs []hopPair) fourRows {
	p, q := &pairs[0], &pairs[1]
	return fourRows{
		j.row(j.x, int(p.fromFirst)), j.row(j.x, int(p.fromSecond)), j.row(j.x, int(q.fromFirst)), j.row(j.x, int(q.fromSecond)),
		j.a * p.first, j.a * p.second, j.a * q.first, j.a * q.second,
	}
}

// leftHops adds to a row the hops inside the left part, which bring whole rows of
// the same block.
func (j *job) leftHops(y []float64, pairs []hopPair) {
	for ; isFour(pairs); pairs = pairs[2:] {
		f := j.four(pairs)
		f.add(y)
	}
	for i := range pairs {
		p := &pairs[i]
		if p.second != 0 {
			addTwo(y, j.row(j.x, int(p.fromFirst)), j.row(j.x, int(p.fromSecond)), j.a*p.first, j.a*p.second)
		} else {
			addOne(y, j.row(j.x, int(p.fromFirst)), j.a*p.first)
		}
	}
}
