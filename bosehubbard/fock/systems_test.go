package fock

import (
	"context"
	"fmt"
	"math"
	"math/rand/v2"
	"testing"

	"hilltop/bosehubbard"
	"hilltop/bosehubbard/lattice"
)

// axis returns the terms of one axis in the order J, V, F.
func axis(j, v, f float64) bosehubbard.AxisTerms {
	return bosehubbard.AxisTerms{Tunnelling: j, Curvature: v, Tilt: f}
}

func boxTerms(t testing.TB, sites []int, periodic []bool, m bosehubbard.Model) *Terms {
	t.Helper()
	l, err := lattice.Box(sites, periodic)
	if err != nil {
		t.Fatal(err)
	}
	terms, err := TermsOf(l, m)
	if err != nil {
		t.Fatal(err)
	}
	return terms
}

func mustOperator(t testing.TB, terms *Terms, atoms int, opt Options) *Operator {
	t.Helper()
	h, err := NewOperatorOf(context.Background(), terms, atoms, opt)
	if err != nil {
		t.Fatal(err)
	}
	return h
}

// system is one problem; systems covers every kind of term and shape.
type system struct {
	name  string
	terms *Terms
	atoms int
}

func systems(t testing.TB) []system {
	x, y, z := axis(1.3, -0.2, 0.4), axis(-0.7, 0.1, -0.3), axis(0.5, 0.9, 0)
	box := func(sites []int, periodic []bool, u float64, axes ...bosehubbard.AxisTerms) *Terms {
		return boxTerms(t, sites, periodic, bosehubbard.Model{Axes: axes, Interaction: u})
	}
	even := axis(1.1, 0.3, 0)
	list := []system{
		{"one site", box([]int{1}, []bool{false}, 3, x), 4},
		{"no atoms", box([]int{4}, []bool{true}, 3, even), 0},
		{"one atom", box([]int{5}, []bool{true}, 3, x), 1},
		{"two sites", box([]int{2}, []bool{true}, 4, x), 5},
		{"two even sites", box([]int{2}, []bool{true}, 4, even), 5},
		{"three even sites", box([]int{3}, []bool{false}, 4, even), 4},
		{"open chain", box([]int{5}, []bool{false}, -2.1, x), 4},
		{"even chain, even atoms", box([]int{6}, []bool{false}, -2.1, even), 4},
		{"even chain, odd atoms", box([]int{6}, []bool{false}, -2.1, even), 5},
		{"odd chain, odd atoms", box([]int{5}, []bool{false}, -2.1, even), 5},
		{"odd chain, even atoms", box([]int{7}, []bool{false}, 3, even), 4},
		{"ring", box([]int{5}, []bool{true}, 4, x), 5},
		{"even ring", box([]int{6}, []bool{true}, 4, even), 5},
		{"odd ring", box([]int{5}, []bool{true}, 4, even), 5},
		{"rectangle", box([]int{2, 3}, []bool{false, false}, 1.7, x, y), 4},
		{"even rectangle", box([]int{2, 3}, []bool{false, false}, 1.7, even, y), 5},
		{"even square", box([]int{3, 3}, []bool{false, false}, 1.7, even, z), 3},
		{"cylinder", box([]int{3, 3}, []bool{true, false}, -1.7, x, y), 3},
		{"torus", box([]int{3, 4}, []bool{true, true}, 9, x, y), 2},
		{"cube", box([]int{2, 2, 2}, []bool{false, false, true}, -6, x, y, z), 3},
		{"frozen axis", box([]int{3, 2}, []bool{true, false}, -6, x, axis(0, 1, 1)), 3},
		{"long and dilute", box([]int{17}, []bool{false}, 3, even), 2},
	}
	random := rand.New(rand.NewPCG(51, 0))
	for i := range 12 {
		list = append(list, randomSystem(random, fmt.Sprintf("random graph %d", i), i%2 == 0))
	}
	return list
}

// randomSystem has hops of any size and sign between any sites, some twice, perhaps
// in several parts; if mirrored it is even under the reversal of the numbering.
func randomSystem(random *rand.Rand, name string, mirrored bool) system {
	sites := 2 + random.IntN(6)
	t := &Terms{Sites: sites, Interaction: random.NormFloat64(), Potential: make([]float64, sites)}
	for i := range t.Potential {
		t.Potential[i] = random.NormFloat64()
		if mirrored {
			t.Potential[i] = t.Potential[min(i, sites-1-i)]
		}
	}
	for range 2 * sites {
		hop := Hop{From: random.IntN(sites), To: random.IntN(sites), Amplitude: random.NormFloat64()}
		if hop.From == hop.To {
			continue
		}
		t.Hops = append(t.Hops, hop)
		if mirrored {
			t.Hops = append(t.Hops, Hop{From: sites - 1 - hop.From, To: sites - 1 - hop.To, Amplitude: hop.Amplitude})
		}
	}
	return system{name: name, terms: t, atoms: 1 + random.IntN(5)}
}

func randomVector(random *rand.Rand, n int) []float64 {
	x := make([]float64, n)
	for i := range x {
		x[i] = random.NormFloat64()
	}
	return x
}

func dot(x, y []float64) float64 {
	sum := 0.0
	for i := range x {
		sum += x[i] * y[i]
	}
	return sum
}

// plainVector writes a vector of an operator in the order of the plain basis, a
// sector with both of its halves.
func plainVector(h *Operator, b *plainBasis, x []float64) []float64 {
	out := make([]float64, b.Dimension)
	state, image := make([]int, b.Sites), make([]int, b.Sites)
	for i := range x {
		h.State(state, i)
		if h.parity == 0 {
			out[b.Rank(state)] = x[i]
			continue
		}
		for k, site := range h.split.left {
			image[site], image[h.split.right[k]] = state[h.split.right[k]], state[site]
		}
		if c := h.split.centre; c >= 0 {
			image[c] = state[c]
		}
		left, right := 0, 0
		for k := range h.split.left {
			left += state[h.split.left[k]]
			right += state[h.split.right[k]]
		}
		if left == right {
			out[b.Rank(state)] = x[i] // its image has a place of its own
			continue
		}
		out[b.Rank(state)] = x[i] / math.Sqrt2
		out[b.Rank(image)] = float64(h.parity) * x[i] / math.Sqrt2
	}
	return out
}
