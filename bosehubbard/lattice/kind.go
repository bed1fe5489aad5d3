package lattice

import (
	"fmt"
	"math"
	"slices"
)

// Kind names a regular graph.
type Kind string

// The kinds that Build knows, with the coordination of the endless lattice.
const (
	Chain      Kind = "chain"      // 2
	Ladder     Kind = "ladder"     // 3: two chains with rungs
	Square     Kind = "square"     // 4
	Cubic      Kind = "cubic"      // 6
	Triangular Kind = "triangular" // 6
	Honeycomb  Kind = "honeycomb"  // 3
	Kagome     Kind = "kagome"     // 4
)

// Kinds lists all kinds.
func Kinds() []Kind {
	return []Kind{Chain, Ladder, Square, Cubic, Triangular, Honeycomb, Kagome}
}

// Build makes a patch of a kind with the given numbers of cells along its lattice
// vectors: one number for a chain, its length and perhaps the number of legs (else
// 2) for a ladder, three for cubic, two for the others. A cell has one site, two
// for honeycomb, three for kagome. Periodic patches are closed along all vectors,
// ladders along their length.
//
// Two sites share at most one bond, and none is joined to itself, so that periodic
// patches of fewer than three cells have fewer bonds. Triangular, honeycomb and
// kagome patches are parallelograms whose neighbours are one site apart; their
// bonds have three directions, each with a tunnelling of its own as an axis, and
// their positions x and y count from the mean of all sites.
//
// It returns an error for an unknown kind, the wrong number of cells, and those of
// Box.
func Build(kind Kind, cells []int, periodic bool) (*Lattice, error) {
	want := map[Kind][]int{Chain: {1}, Ladder: {1, 2}, Square: {2}, Cubic: {3}, Triangular: {2}, Honeycomb: {2}, Kagome: {2}}[kind]
	if want == nil {
		return nil, fmt.Errorf("lattice: kind %q, want one of %q", kind, Kinds())
	}
	if !slices.Contains(want, len(cells)) {
		return nil, fmt.Errorf("lattice: %d numbers of cells for a %s patch, want %d", len(cells), kind, want[len(want)-1])
	}
	switch kind {
	case Ladder:
		if len(cells) == 1 {
			cells = []int{cells[0], 2}
		}
		return Box(cells, []bool{periodic, false})
	case Triangular, Honeycomb, Kagome:
		return newPatch(planes[kind], cells, periodic)
	}
	closed := make([]bool, len(cells))
	for a := range closed {
		closed[a] = periodic
	}
	return Box(cells, closed)
}

// Band returns the range of the kinetic energy of one boson on the endless lattice
// of a kind, with tunnelling J of either sign on all bonds and in its unit:
//
//	-zJ to zJ on bipartite lattices, -6J to 3J on the triangular and
//	-4J to 2J on the kagome lattice, whose highest band is flat
//
// It is 0, 0 for an unknown kind.
//
// Source: derived, the plane waves at the centre and the corners of the zone.
func (k Kind) Band(tunnelling float64) (floor, ceiling float64) {
	ends := map[Kind][2]float64{
		Chain: {-2, 2}, Ladder: {-3, 3}, Square: {-4, 4}, Cubic: {-6, 6},
		Honeycomb: {-3, 3}, Triangular: {-6, 3}, Kagome: {-4, 2},
	}[k]
	low, high := ends[0]*tunnelling, ends[1]*tunnelling
	return math.Min(low, high), math.Max(low, high)
}
