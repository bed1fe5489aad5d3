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

// doRows computes a band of rows of vector k, and its part of the sums.
func (h *Operator) doRows(t *task, p *Product, k int) (sums [2]float64) {
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
		j.rightFour(row)
		for r := row; r < row+4; r++ {
			j.leftAndLinks(r)
		}
	}
	for ; row < t.to; row++ {
		j.rightOne(row)
		j.leftAndLinks(row)
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

// halfRows computes a band of a square block up to what symmetrising it adds: the
// matrix whose sum with p times its transpose is the product, p the parity.
func (j *job) halfRows(from, to int) {
	b, c := j.b/2, j.c/2
	for row := from; row < to; row++ {
		x, y := j.row(j.x, row), j.row(j.dst, row)
		s := j.a*(j.rowSector.energy[row]+j.energy/2) + b
		for i, v := range x {
			y[i] = s*v + c*y[i]
		}
		j.leftAndLinks(row)
	}
}

// rightOne starts a row: the hops inside the right part and all energies.
func (j *job) rightOne(row int) {
	x, y := j.row(j.x, row), j.row(j.dst, row)
	s := j.colSector
	own := j.rowSector.energy[row] + j.energy
	at := 0
	begin := int32(0)
	for hops, end := range s.classEnd {
		for _, p := range s.order[begin:end] {
			sum := (own + s.energy[p]) * x[p]
			element := s.element[at : at+hops]
			for i, from := range s.from[at : at+hops] {
				sum += element[i] * x[from]
			}
			at += hops
			y[p] = j.a*sum + j.b*x[p] + j.c*y[p]
		}
		begin = end
	}
}

// rightFour is rightOne for four rows at once, so that each hop is read once for
// all of them. Every row gets the same bits as from rightOne.
func (j *job) rightFour(row int) {
	s := j.colSector
	n := s.count
	x0, x1, x2, x3 := j.row(j.x, row)[:n], j.row(j.x, row+1)[:n], j.row(j.x, row+2)[:n], j.row(j.x, row+3)[:n]
	y0, y1, y2, y3 := j.row(j.dst, row)[:n], j.row(j.dst, row+1)[:n], j.row(j.dst, row+2)[:n], j.row(j.dst, row+3)[:n]
	energy := s.energy[:n]
	own := j.rowSector.energy[row : row+4 : row+4]
	e0, e1, e2, e3 := own[0]+j.energy, own[1]+j.energy, own[2]+j.energy, own[3]+j.energy
	a, b, c := j.a, j.b, j.c
	at := 0
	begin := int32(0)
	for hops, end := range s.classEnd {
		for _, p := range s.order[begin:end] {
			e := energy[p]
			s0, s1, s2, s3 := (e0+e)*x0[p], (e1+e)*x1[p], (e2+e)*x2[p], (e3+e)*x3[p]
			element := s.element[at : at+hops]
			for i, from := range s.from[at : at+hops] {
				v := element[i]
				s0 += v * x0[from]
				s1 += v * x1[from]
				s2 += v * x2[from]
				s3 += v * x3[from]
			}
			at += hops
			y0[p] = a*s0 + b*x0[p] + c*y0[p]
			y1[p] = a*s1 + b*x1[p] + c*y1[p]
			y2[p] = a*s2 + b*x2[p] + c*y2[p]
			y3[p] = a*s3 + b*x3[p] + c*y3[p]
		}
		begin = end
	}
}
