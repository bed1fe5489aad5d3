package lattice

import (
	"fmt"
	"math"
)

// plane describes a lattice in the plane by its cell.
type plane struct {
	vectors [2][2]float64 // of the cells, in distances of neighbours
	sites   [][2]float64  // in a cell
	bonds   []cellBond
}

// cellBond joins a site of a cell to one in the cell that lies step cells away; it
// points along its axis, so that bonds in a line follow one another.
type cellBond struct {
	from, to, axis int
	step           [2]int
}

var (
	half  = 0.5
	root3 = math.Sqrt(3)

	planes = map[Kind]plane{
		Triangular: {
			vectors: [2][2]float64{{1, 0}, {half, root3 / 2}},
			sites:   [][2]float64{{0, 0}},
			bonds:   []cellBond{{0, 0, 0, [2]int{1, 0}}, {0, 0, 1, [2]int{0, 1}}, {0, 0, 2, [2]int{-1, 1}}},
		},
		Honeycomb: {
			vectors: [2][2]float64{{root3, 0}, {root3 / 2, 1.5}},
			sites:   [][2]float64{{0, 0}, {root3 / 2, half}},
			bonds:   []cellBond{{0, 1, 0, [2]int{0, 0}}, {1, 0, 1, [2]int{1, 0}}, {1, 0, 2, [2]int{0, 1}}},
		},
		Kagome: {
			vectors: [2][2]float64{{2, 0}, {1, root3}},
			sites:   [][2]float64{{0, 0}, {1, 0}, {half, root3 / 2}},
			bonds: []cellBond{
				{0, 1, 0, [2]int{0, 0}}, {1, 0, 0, [2]int{1, 0}},
				{0, 2, 1, [2]int{0, 0}}, {2, 0, 1, [2]int{0, 1}},
				{1, 2, 2, [2]int{0, 0}}, {2, 1, 2, [2]int{-1, 1}},
			},
		},
	}
)

// newPatch lays cells[0] x cells[1] cells side by side, the first vector running
// fastest and the sites of a cell together.
func newPatch(p plane, cells []int, periodic bool) (*Lattice, error) {
	for a, n := range cells {
		if n < 1 {
			return nil, fmt.Errorf("lattice: %d cells along vector %d, want at least 1", n, a)
		}
	}
	if cells[0] > MaxSites/len(p.sites) || cells[1] > MaxSites/len(p.sites)/cells[0] {
		return nil, fmt.Errorf("lattice: patch %v of cells has more than %d sites, the largest that is built", cells, MaxSites)
	}
	l := &Lattice{Sites: cells[0] * cells[1] * len(p.sites), Axes: 3}
	seen := map[[2]int]bool{}
	for j := range cells[1] {
		for i := range cells[0] {
			for _, s := range p.sites {
				l.Positions = append(l.Positions, [3]float64{
					float64(i)*p.vectors[0][0] + float64(j)*p.vectors[1][0] + s[0],
					float64(i)*p.vectors[0][1] + float64(j)*p.vectors[1][1] + s[1],
				})
			}
			for _, b := range p.bonds {
				to, ok := neighbourCell([2]int{i + b.step[0], j + b.step[1]}, cells, periodic)
				if !ok {
					continue
				}
				from := (j*cells[0]+i)*len(p.sites) + b.from
				l.join(from, to*len(p.sites)+b.to, b.axis, seen)
			}
		}
	}
	l.centre()
	if periodic {
		block := len(p.sites)
		for _, n := range cells {
			if n > 1 {
				l.Translations = append(l.Translations, translation(l.Sites, block, n))
			}
			block *= n
		}
	}
	return l, nil
}

// neighbourCell numbers a cell, round the edge if the patch is periodic.
func neighbourCell(at [2]int, cells []int, periodic bool) (number int, ok bool) {
	for a, n := range cells {
		if at[a] >= 0 && at[a] < n {
			continue
		}
		if !periodic {
			return 0, false
		}
		at[a] = (at[a] + n) % n
	}
	return at[1]*cells[0] + at[0], true
}

// join adds a bond unless the two sites are one or have one.
func (l *Lattice) join(from, to, axis int, seen map[[2]int]bool) {
	key := [2]int{min(from, to), max(from, to)}
	if from == to || seen[key] {
		return
	}
	seen[key] = true
	l.Bonds = append(l.Bonds, Bond{From: from, To: to, Axis: axis})
}

// centre counts the positions from their mean.
func (l *Lattice) centre() {
	var mean [3]float64
	for _, p := range l.Positions {
		for a := range p {
			mean[a] += p[a] / float64(l.Sites)
		}
	}
	for i := range l.Positions {
		for a := range mean {
			l.Positions[i][a] -= mean[a]
		}
	}
}
