package eos

import (
	"cmp"
	"slices"
)

// clusterSites is the largest number of sites of a cluster.
const clusterSites = 4

// cell is the place of a site on up to three axes.
type cell [3]int8

// graph is a cluster whose bonds are all that matters: bond[i][k] is 0 without a bond
// and else 1 + the kind of tunnelling.
type graph struct {
	sites int
	bond  [clusterSites][clusterSites]int8
}

// counted is how often a graph enters the sums of clusters of up to three and of up to
// clusterSites sites.
type counted struct {
	graph       graph
	fewer, full int
}

// expand lists the graphs of the linked-cluster expansion on a lattice whose axis a
// has tunnelling of kind kinds[a], per site:
//
//	P = sum_c W(c)    W(c) = P(c) - sum of W(s) over connected s inside c
//
// c running over the connected sets of sites, up to translation.
//
// Source: Rigol, Bryant, Singh, Phys. Rev. Lett. 97, 187202 (2006), the expansion by
// sites; from memory.
func expand(kinds []int8) []counted {
	var out []counted
	for _, c := range shapes(len(kinds)) {
		for g, times := range weight(c, kinds) {
			i := slices.IndexFunc(out, func(o counted) bool { return o.graph == g })
			if i < 0 {
				i = len(out)
				out = append(out, counted{graph: g})
			}
			out[i].full += times
			if len(c) < clusterSites {
				out[i].fewer += times
			}
		}
	}
	slices.SortFunc(out, func(a, b counted) int { return cmp.Or(a.graph.sites-b.graph.sites, compare(a.graph, b.graph)) })
	return slices.DeleteFunc(out, func(c counted) bool { return c.fewer == 0 && c.full == 0 })
}

// shapes lists the connected sets of cells up to translation.
func shapes(axes int) [][]cell {
	all := [][]cell{{{}}}
	for from := 0; from < len(all); from++ {
		shape := all[from]
		if len(shape) == clusterSites {
			continue
		}
		for _, c := range shape {
			for side := range 2 * axes {
				next := c
				next[side/2] += int8(1 - side%2*2)
				if slices.Contains(shape, next) {
					continue
				}
				grown := moved(append(slices.Clone(shape), next))
				if !slices.ContainsFunc(all, func(o []cell) bool { return slices.Equal(o, grown) }) {
					all = append(all, grown)
				}
			}
		}
	}
	return all
}

// moved sorts cells and puts the smallest of every coordinate to 0.
func moved(cells []cell) []cell {
	least := cells[0]
	for _, c := range cells {
		for a := range c {
			least[a] = min(least[a], c[a])
		}
	}
	for i := range cells {
		for a := range least {
			cells[i][a] -= least[a]
		}
	}
	slices.SortFunc(cells, func(a, b cell) int { return slices.Compare(a[:], b[:]) })
	return cells
}

// weight returns W of a cluster as multiples of the graphs inside it.
func weight(cells []cell, kinds []int8) map[graph]int {
	out := map[graph]int{graphOf(cells, kinds): 1}
	for subset := 1; subset < 1<<len(cells)-1; subset++ {
		var part []cell
		for i, c := range cells {
			if subset>>i&1 == 1 {
				part = append(part, c)
			}
		}
		if !connected(part) {
			continue
		}
		for g, times := range weight(part, kinds) {
			out[g] -= times
		}
	}
	return out
}

// axisOf returns the axis along which two cells are neighbours, or -1.
func axisOf(a, b cell) int {
	at, steps := -1, 0
	for i := range a {
		if d := int(a[i]) - int(b[i]); d != 0 {
			at, steps = i, steps+d*d
		}
	}
	if steps != 1 {
		return -1
	}
	return at
}

func connected(cells []cell) bool {
	reached := 1
	for range cells {
		for i := range cells {
			for k := range cells {
				if reached>>i&1 == 1 && axisOf(cells[i], cells[k]) >= 0 {
					reached |= 1 << k
				}
			}
		}
	}
	return reached == 1<<len(cells)-1
}

// graphOf returns the smallest of all graphs that differ by the numbering of the sites.
func graphOf(cells []cell, kinds []int8) graph {
	var best graph
	order := make([]int, len(cells))
	for i := range order {
		order[i] = i
	}
	first := true
	var place func(from int)
	place = func(from int) {
		if from == len(order) {
			g := graph{sites: len(cells)}
			for i, a := range order {
				for k, b := range order {
					if axis := axisOf(cells[a], cells[b]); axis >= 0 {
						g.bond[i][k] = 1 + kinds[axis]
					}
				}
			}
			if first || compare(g, best) < 0 {
				best, first = g, false
			}
			return
		}
		for i := from; i < len(order); i++ {
			order[from], order[i] = order[i], order[from]
			place(from + 1)
			order[from], order[i] = order[i], order[from]
		}
	}
	place(0)
	return best
}

func compare(a, b graph) int {
	for i := range a.bond {
		if c := slices.Compare(a.bond[i][:], b.bond[i][:]); c != 0 {
			return c
		}
	}
	return 0
}
