package lattice

import "math"

// Reflections lists the permutations of the sites that reflecting the positions
// in one or more coordinates gives, without the identity: place[i] is the site
// that stands where i is sent. Coordinates in which all sites agree are left out.
//
// What does not send the sites to themselves is not listed; bonds are not looked
// at. Positions count as the same if they agree within 1e-6 sites.
func (l *Lattice) Reflections() [][]int {
	if len(l.Positions) != l.Sites {
		return nil
	}
	site := make(map[[3]int]int, l.Sites)
	extended := 0
	for i, p := range l.Positions {
		site[rounded(p)] = i
		for a := range p {
			if rounded(p)[a] != rounded(l.Positions[0])[a] {
				extended |= 1 << a
			}
		}
	}
	var list [][]int
	for axes := 1; axes < 8; axes++ {
		if axes&^extended != 0 {
			continue
		}
		place := make([]int, 0, l.Sites)
		for _, p := range l.Positions {
			for a := range p {
				if axes>>a&1 == 1 {
					p[a] = -p[a]
				}
			}
			other, ok := site[rounded(p)]
			if !ok {
				break
			}
			place = append(place, other)
		}
		if len(place) == l.Sites {
			list = append(list, place)
		}
	}
	return list
}

// rounded makes positions comparable.
func rounded(p [3]float64) [3]int {
	const fine = 1 << 20
	return [3]int{int(math.Round(p[0] * fine)), int(math.Round(p[1] * fine)), int(math.Round(p[2] * fine))}
}
