package lattice

import "fmt"

// MaxSites is the largest number of sites that Box builds.
const MaxSites = 1_000_000

// Lattice is a set of sites and the bonds between them. It is not changed after
// it is built. A lattice may be put together by hand; every bond then joins two
// different sites in [0, Sites) and stands in the list once.
type Lattice struct {
	Sites     int
	Axes      int // number of directions of bonds, each with its own tunnelling, 1 to 3
	Bonds     []Bond
	Positions [][3]float64 // in sites about the centre, length Sites; 0 on axes that do not exist

	// Translations by one cell along each closed axis, which keep all bonds.
	Translations []Translation
}

// Translation sends site i to Place[i]; Order of them bring every site back.
type Translation struct {
	Place []int
	Order int
}

// Bond joins two sites along one axis: of a box 0 for x, 1 for y, 2 for z, of other
// kinds one of the directions of its bonds.
type Bond struct{ From, To, Axis int }

// Box builds the chain, rectangle or cuboid with sites[a] sites along axis a,
// closed to a ring along the axes that are periodic.
//
// A periodic axis of two sites keeps one bond per pair, the same as the open
// one (not two, which would double J), and an axis of one site has none.
// Cost O(sites).
//
// It returns an error unless there are one to three axes, as many entries in
// periodic, at least one site along each and at most MaxSites in all.
func Box(sites []int, periodic []bool) (*Lattice, error) {
	total, err := count(sites, periodic)
	if err != nil {
		return nil, err
	}
	length := [3]int{1, 1, 1}
	copy(length[:], sites)
	l := &Lattice{Sites: total, Axes: len(sites), Positions: make([][3]float64, total)}
	for site := range total {
		at := [3]int{site % length[0], site / length[0] % length[1], site / (length[0] * length[1])}
		stride := 1
		for a := range sites {
			l.Positions[site][a] = float64(at[a]) - float64(length[a]-1)/2
			switch {
			case at[a]+1 < length[a]:
				l.Bonds = append(l.Bonds, Bond{From: site, To: site + stride, Axis: a})
			case periodic[a] && length[a] > 2:
				l.Bonds = append(l.Bonds, Bond{From: site, To: site - at[a]*stride, Axis: a})
			}
			stride *= length[a]
		}
	}
	stride := 1
	for a, n := range sites {
		if periodic[a] && n > 1 {
			l.Translations = append(l.Translations, translation(total, stride, n))
		}
		stride *= n
	}
	return l, nil
}

// translation shifts blocks of `block` sites, every `order` of which form a ring.
func translation(sites, block, order int) Translation {
	t := Translation{Place: make([]int, sites), Order: order}
	for i := range t.Place {
		if i/block%order == order-1 {
			t.Place[i] = i - (order-1)*block
		} else {
			t.Place[i] = i + block
		}
	}
	return t
}

// count checks the shape of a box and returns its number of sites.
func count(sites []int, periodic []bool) (int, error) {
	if len(sites) < 1 || len(sites) > 3 {
		return 0, fmt.Errorf("lattice: %d axes, want 1 to 3", len(sites))
	}
	if len(periodic) != len(sites) {
		return 0, fmt.Errorf("lattice: %d periodic flags for %d axes, want one per axis", len(periodic), len(sites))
	}
	total := 1
	for a, n := range sites {
		if n < 1 {
			return 0, fmt.Errorf("lattice: %d sites along axis %d, want at least 1", n, a)
		}
		if n > MaxSites/total {
			return 0, fmt.Errorf("lattice: box %v has more than %d sites, the largest that is built", sites, MaxSites)
		}
		total *= n
	}
	return total, nil
}
