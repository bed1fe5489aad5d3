package fock

import (
	"context"
	"fmt"
	"math"
)

// link is one hop across the cut: what it brings to a block from another one.
//
//	dst[r, c] += factor row[r] col[c] source[row.from[r], col.from[c]]
//
// A nil ladder keeps rows or columns as they are. A flipped link takes the
// transpose of the source, which is the block itself.
type link struct {
	source   int // block
	factor   float64
	row, col *ladder
	flipped  bool
}

// ladders builds each ladder once.
type ladders struct {
	part  *part
	built map[[3]int]*ladder
}

func (c *ladders) get(site, t, step int) *ladder {
	key := [3]int{site, t, step}
	if c.built[key] == nil {
		c.built[key] = c.part.newLadder(site, t, step)
	}
	return c.built[key]
}

// linker adds the hops across the cut to a layout.
type linker struct {
	*layout
	rows, cols ladders

	// Hops between a place on the left and one on the right, and between the
	// centre and either side.
	cut, leftCentre, rightCentre []bond
}

// connect finds all links of all blocks, looking at ctx between blocks.
func (y *layout) connect(ctx context.Context, t *Terms) error {
	k := y.newLinker(t)
	for target := range y.blocks {
		if err := ctx.Err(); err != nil {
			return err
		}
		for _, b := range k.cut {
			k.across(target, b)
		}
		for _, b := range k.leftCentre {
			k.toLeft(target, b)
		}
		for _, b := range k.rightCentre {
			k.toRight(target, b)
		}
	}
	return nil
}

// newLinker sorts the hops across the cut; bond.low is the place on the left, or
// beside the centre, bond.high the one on the right.
func (y *layout) newLinker(t *Terms) *linker {
	k := &linker{layout: y,
		rows: ladders{y.left, map[[3]int]*ladder{}},
		cols: ladders{y.right, map[[3]int]*ladder{}},
	}
	left, right := placesOf(y.split.left), placesOf(y.split.right)
	for _, b := range t.bonds() {
		for _, ends := range [2][2]int{{b.low, b.high}, {b.high, b.low}} {
			l, onLeft := left[ends[0]]
			r, onRight := right[ends[0]]
			other, across := right[ends[1]]
			switch centre := ends[1] == y.split.centre; {
			case onLeft && across:
				k.cut = append(k.cut, bond{l, other, b.amplitude})
			case onLeft && centre:
				k.leftCentre = append(k.leftCentre, bond{l, 0, b.amplitude})
			case onRight && centre:
				k.rightCentre = append(k.rightCentre, bond{r, 0, b.amplitude})
			}
		}
	}
	return k
}

func placesOf(sites []int) map[int]int {
	place := make(map[int]int, len(sites))
	for k, i := range sites {
		place[i] = k
	}
	return place
}

// across adds the hops between a place of the left part and one of the right.
func (k *linker) across(target int, hop bond) {
	b := &k.blocks[target]
	p, q, amplitude := hop.low, hop.high, hop.amplitude
	k.add(target, b.left-1, b.centre, b.right+1, amplitude, func(l *link) {
		l.row, l.col = k.rows.get(p, b.left, -1), k.cols.get(q, b.right, 1)
	})
	k.add(target, b.left+1, b.centre, b.right-1, amplitude, func(l *link) {
		l.row, l.col = k.rows.get(p, b.left, 1), k.cols.get(q, b.right, -1)
	})
}

// toLeft adds the hops between the centre and a place of the left part.
func (k *linker) toLeft(target int, hop bond) {
	b := &k.blocks[target]
	p, amplitude := hop.low, hop.amplitude
	k.add(target, b.left-1, b.centre+1, b.right, amplitude*math.Sqrt(float64(b.centre+1)), func(l *link) {
		l.row = k.rows.get(p, b.left, -1)
	})
	k.add(target, b.left+1, b.centre-1, b.right, amplitude*math.Sqrt(float64(b.centre)), func(l *link) {
		l.row = k.rows.get(p, b.left, 1)
	})
}

// toRight adds the hops between the centre and a place of the right part.
func (k *linker) toRight(target int, hop bond) {
	b := &k.blocks[target]
	q, amplitude := hop.low, hop.amplitude
	k.add(target, b.left, b.centre+1, b.right-1, amplitude*math.Sqrt(float64(b.centre+1)), func(l *link) {
		l.col = k.cols.get(q, b.right, -1)
	})
	k.add(target, b.left, b.centre-1, b.right+1, amplitude*math.Sqrt(float64(b.centre)), func(l *link) {
		l.col = k.cols.get(q, b.right, 1)
	})
}

// add appends a link from the block with the given atoms, if there is such a block
// and the link is not the mirror image of another; fill sets its ladders.
func (k *linker) add(target, l, c, r int, factor float64, fill func(*link)) {
	b := &k.blocks[target]
	if l < 0 || c < 0 || r < 0 {
		return
	}
	link := link{factor: factor}
	if k.parity != 0 && l > r {
		if b.left == b.right {
			return // the transpose of a link that is there
		}
		if l != b.right || r != b.left || c != b.centre {
			panic(fmt.Sprintf("fock: a hop from block %d,%d,%d to %d,%d,%d", l, c, r, b.left, b.centre, b.right))
		}
		link.source, link.flipped, link.factor = target, true, factor*float64(k.parity)
	} else if link.source = k.find(l, c, r); link.source < 0 {
		return
	}
	if k.parity != 0 && !link.flipped {
		switch source := &k.blocks[link.source]; {
		case b.left == b.right && source.left != source.right:
			link.factor /= math.Sqrt2
		case b.left != b.right && source.left == source.right:
			link.factor *= math.Sqrt2
		}
	}
	fill(&link)
	b.links = append(b.links, link)
}
