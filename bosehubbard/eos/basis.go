package eos

import (
	"math"

	"gonum.org/v1/gonum/mat"
)

// occupied is the number of atoms on each site.
type occupied [clusterSites]int8

// basis lists the ways to place atoms on a graph. A swap of sites that the graph does
// not notice takes each to its image; the basis holds one of both, standing for their
// sum or difference over sqrt 2.
type basis struct {
	parity float64
	swap   [clusterSites]int
	states []occupied
	place  map[occupied]int // of a state or its image
	size   []float64        // 1 where the state is its own image, else 2
}

func newBasis(g graph, atoms int, parity float64) *basis {
	b := &basis{parity: parity, swap: swapOf(g), place: map[occupied]int{}}
	for _, state := range placed(g.sites, atoms) {
		image := b.image(state)
		if _, known := b.place[image]; known || (image == state && parity < 0) {
			continue
		}
		b.place[state] = len(b.states)
		b.states = append(b.states, state)
		b.size = append(b.size, 2)
		if image == state {
			b.size[len(b.size)-1] = 1
		}
	}
	return b
}

func (b *basis) image(state occupied) occupied {
	var out occupied
	for i, n := range state {
		out[b.swap[i]] = n
	}
	return out
}

// hamiltonian returns the matrix elements
//
//	<a|H|b> = sum over hops from b to a or its image of -J sqrt(n (n'+1)) sign sqrt(size b/size a)
//
// and U n(n-1)/2 of all sites on the diagonal.
func (b *basis) hamiltonian(g graph, tunnelling []float64, u float64) *mat.SymDense {
	h := mat.NewSymDense(len(b.states), nil)
	for i, state := range b.states {
		h.SetSym(i, i, h.At(i, i)+u*pairsOf(state))
		for from := range g.sites {
			for to := range g.sites {
				kind := g.bond[from][to]
				if kind == 0 || state[from] == 0 {
					continue
				}
				next := state
				next[from]--
				next[to]++
				amplitude := -tunnelling[kind-1] * math.Sqrt(float64(state[from])*float64(next[to]))
				at, known := b.place[next]
				if !known {
					at, known = b.place[b.image(next)]
					amplitude *= b.parity
				}
				if known && at <= i { // the other half is its mirror image
					h.SetSym(at, i, h.At(at, i)+amplitude*math.Sqrt(b.size[i]/b.size[at]))
				}
			}
		}
	}
	return h
}

// swapOf returns the exchange of sites that moves most of them and leaves the bonds as
// they are.
func swapOf(g graph) [clusterSites]int {
	best, most := [clusterSites]int{0, 1, 2, 3}, 0
	for _, swap := range [][clusterSites]int{
		{1, 0, 2, 3}, {2, 1, 0, 3}, {3, 1, 2, 0}, {0, 2, 1, 3}, {0, 3, 2, 1}, {0, 1, 3, 2},
		{1, 0, 3, 2}, {2, 3, 0, 1}, {3, 2, 1, 0},
	} {
		moves, same := 0, true
		for i, a := range swap {
			if a != i {
				moves++
				same = same && a < g.sites && i < g.sites
			}
			for k, b := range swap {
				same = same && g.bond[i][k] == g.bond[a][b]
			}
		}
		if same && moves > most {
			best, most = swap, moves
		}
	}
	return best
}

func pairsOf(state occupied) float64 {
	sum := 0.0
	for _, n := range state {
		sum += float64(n) * float64(n-1) / 2
	}
	return sum
}

// placed lists the ways to place atoms on sites.
func placed(sites, atoms int) []occupied {
	if sites == 1 {
		return []occupied{{int8(atoms)}}
	}
	var out []occupied
	for last := range atoms + 1 {
		for _, state := range placed(sites-1, atoms-last) {
			state[sites-1] = int8(last)
			out = append(out, state)
		}
	}
	return out
}
