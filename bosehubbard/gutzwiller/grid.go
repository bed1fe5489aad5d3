package gutzwiller

import (
	"fmt"
)

// MaxSites is the largest number of sites of a grid.
const MaxSites = 1_000_000

// Grid is a chain, rectangle or cuboid of sites, open or periodic along each axis.
// It is not changed after it is built.
type Grid struct {
	Sites int // in all
	Axes  int // 1 to 3

	length   [3]int
	periodic [3]bool
	near     [][]int32 // by direction: the neighbour of each site; padded, padded site for none
	sides    []side    // the same, for whole blocks
	padded   int       // Sites rounded up to whole blocks
}

// NewGrid returns the grid with sites[a] sites along axis a, closed to a ring along
// the axes that are periodic.
//
// Axis 0 runs fastest: site x + sites[0] (y + sites[1] z). A periodic axis of two
// sites keeps one bond per pair and one of one site has none. Cost O(sites).
//
// It returns an error unless there are one to three axes, as many entries in
// periodic, at least one site along each and at most MaxSites in all.
func NewGrid(sites []int, periodic []bool) (*Grid, error) {
	if len(sites) < 1 || len(sites) > 3 {
		return nil, fmt.Errorf("gutzwiller: %d axes, want 1 to 3", len(sites))
	}
	if len(periodic) != len(sites) {
		return nil, fmt.Errorf("gutzwiller: %d periodic flags for %d axes, want one per axis", len(periodic), len(sites))
	}
	g := &Grid{Sites: 1, Axes: len(sites), length: [3]int{1, 1, 1}}
	for a, n := range sites {
		if n < 1 {
			return nil, fmt.Errorf("gutzwiller: %d sites along axis %d, want at least 1", n, a)
		}
		if n > MaxSites/g.Sites {
			return nil, fmt.Errorf("gutzwiller: grid %v has more than %d sites, the most that are treated", sites, MaxSites)
		}
		g.Sites *= n
		g.length[a], g.periodic[a] = n, periodic[a]
	}
	g.padded = (g.Sites + width - 1) / width * width
	stride := 1
	for a := range g.Axes {
		for _, direction := range []int{+1, -1} {
			list := g.neighbours(a, stride, direction)
			g.near = append(g.near, list)
			g.sides = append(g.sides, newSide(list, direction*stride))
		}
		stride *= g.length[a]
	}
	return g, nil
}

// neighbours lists the next site in one direction along an axis.
func (g *Grid) neighbours(axis, stride, direction int) []int32 {
	list := make([]int32, g.padded)
	length := g.length[axis]
	for site := range list {
		list[site] = int32(g.padded)
		if site >= g.Sites {
			continue
		}
		at := site / stride % length
		next := at + direction
		if g.periodic[axis] && length > 2 {
			next = (next + length) % length
		}
		if next >= 0 && next < length {
			list[site] = int32(site + (next-at)*stride)
		}
	}
	return list
}

// Length returns the number of sites along an axis.
func (g *Grid) Length(axis int) int { return g.length[axis] }

// Periodic says whether an axis is closed to a ring.
func (g *Grid) Periodic(axis int) bool { return g.periodic[axis] }

// Coordinates returns the position of every site along an axis, in sites from the
// centre of the grid: index - (length-1)/2.
func (g *Grid) Coordinates(axis int) []float64 {
	stride := 1
	for a := range axis {
		stride *= g.length[a]
	}
	out := make([]float64, g.Sites)
	centre := float64(g.length[axis]-1) / 2
	for site := range out {
		out[site] = float64(site/stride%g.length[axis]) - centre
	}
	return out
}

// Squares returns the square of Coordinates: the shape of a harmonic trap.
func (g *Grid) Squares(axis int) []float64 {
	out := g.Coordinates(axis)
	for i, x := range out {
		out[i] = x * x
	}
	return out
}

// Stagger returns +1 or -1 at every site, +1 at the first, so that neighbours along
// the grid differ: (-1)^(x+y+z).
func (g *Grid) Stagger() []float64 {
	out := make([]float64, g.Sites)
	for site := range out {
		x := site % g.length[0]
		y := site / g.length[0] % g.length[1]
		z := site / (g.length[0] * g.length[1])
		out[site] = 1 - 2*float64((x+y+z)&1)
	}
	return out
}

// Bipartite says whether Stagger differs across every bond: it does unless a
// periodic axis has an odd number of sites above one.
func (g *Grid) Bipartite() bool {
	for a := range g.Axes {
		if g.periodic[a] && g.length[a] > 1 && g.length[a]%2 == 1 {
			return false
		}
	}
	return true
}
