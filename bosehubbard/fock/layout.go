package fock

import "math"

// block is a stretch of a vector: all states with given numbers of atoms on the
// left, at the centre and on the right, as a matrix with a row for each state of
// the left part and a column for each of the right one.
type block struct {
	left, centre, right int // atoms
	offset, rows, cols  int
	energy              float64 // of the centre, Hz
	links               []link
}

// layout is the arrangement of a vector.
//
// With a mirror and parity p = +-1 the coefficients obey X_(r,l) = p X_(l,r)^T for
// the block of l atoms on the left and r on the right. Of each such pair the one
// with l < r is kept, times sqrt 2; blocks with l = r are kept whole. The plain
// scalar product of two such vectors is that of the states.
type layout struct {
	split       *split
	left, right *part
	parity      int // 0, +1 or -1; not 0 only if mirrored
	atoms, most int
	blocks      []block
	length      int // of a vector
	dimension   int // number of states
	both        int // number of states of both sectors
}

// newLayout arranges the blocks, without what is in them.
func newLayout(t *Terms, s *split, atoms int, opt Options) *layout {
	most := opt.MaxOccupation
	if most == 0 || most > atoms {
		most = atoms
	}
	y := &layout{split: s, parity: opt.Parity, atoms: atoms, most: most}
	y.left = newPart(t, s.left, atoms, most)
	y.right = newPart(t, s.right, atoms, most)
	middle := 0
	if s.centre >= 0 {
		middle = most
	}
	for l := 0; l <= y.left.atoms; l++ {
		for c := 0; c <= min(middle, atoms-l); c++ {
			y.add(t, l, c, atoms-l-c)
		}
	}
	return y
}

// add appends a block unless it is empty or the mirror image of another.
func (y *layout) add(t *Terms, l, c, r int) {
	rows, cols := y.left.count(l), y.right.count(r)
	if rows == 0 || cols == 0 || y.parity != 0 && l > r {
		return
	}
	b := block{left: l, centre: c, right: r, offset: y.length, rows: rows, cols: cols}
	if c > 0 {
		b.energy = float64(c) * (t.Interaction/2*float64(c-1) + t.potential(y.split.centre))
	}
	y.blocks = append(y.blocks, b)
	states := saturatingProduct(rows, cols)
	y.length = saturatingSum(y.length, states)
	if y.parity != 0 && l == r { // symmetric or antisymmetric matrices
		states = rows * (rows + y.parity) / 2
	}
	y.dimension = saturatingSum(y.dimension, states)
	y.both = saturatingSum(y.both, saturatingProduct(rows, cols))
	if y.parity != 0 && l != r { // and its mirror image
		y.both = saturatingSum(y.both, states)
	}
}

func saturatingProduct(a, b int) int {
	if a != 0 && b > math.MaxInt/a {
		return math.MaxInt
	}
	return a * b
}

// find returns the number of the block with so many atoms, or -1.
func (y *layout) find(l, c, r int) int {
	low, high := 0, len(y.blocks)
	for low < high { // blocks are in the order of l, then c
		middle := (low + high) / 2
		if b := &y.blocks[middle]; b.left < l || b.left == l && b.centre < c {
			low = middle + 1
		} else {
			high = middle
		}
	}
	if low < len(y.blocks) {
		if b := &y.blocks[low]; b.left == l && b.centre == c && b.right == r {
			return low
		}
	}
	return -1
}

// square says that the mirror maps a block to itself.
func (y *layout) square(b *block) bool { return y.parity != 0 && b.left == b.right }
