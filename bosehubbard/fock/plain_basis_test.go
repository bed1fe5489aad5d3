package fock

import (
	"slices"
	"testing"
)

// everyState lists the states by recursion, most atoms on the first site first.
func everyState(sites, atoms int) [][]int {
	if sites == 1 {
		return [][]int{{atoms}}
	}
	var all [][]int
	for n := atoms; n >= 0; n-- {
		for _, rest := range everyState(sites-1, atoms-n) {
			all = append(all, append([]int{n}, rest...))
		}
	}
	return all
}

func TestPlainBasisAgainstRecursion(t *testing.T) {
	for sites := 1; sites <= 6; sites++ {
		for atoms := 0; atoms <= 6; atoms++ {
			b := newPlainBasis(sites, atoms)
			want := everyState(sites, atoms)
			if b.Dimension != len(want) {
				t.Errorf("%d sites, %d atoms: dimension %d, want %d", sites, atoms, b.Dimension, len(want))
				continue
			}
			next := slices.Clone(want[0])
			state := make([]int, sites)
			for rank, s := range want {
				b.State(state, rank)
				if got := b.Rank(s); got != rank || !slices.Equal(state, s) || !slices.Equal(next, s) {
					t.Errorf("rank %d: State %v, Next %v, Rank %d, want %v", rank, state, next, got, s)
				}
				first := b.Next(next)
				if wantFirst := firstChange(want, rank); first != wantFirst {
					t.Errorf("Next of %v changed site %d first, want %d", s, first, wantFirst)
				}
			}
			if !slices.Equal(next, want[len(want)-1]) {
				t.Errorf("Next of the last state gives %v, want no change", next)
			}
		}
	}
}

func firstChange(states [][]int, rank int) int {
	if rank == len(states)-1 {
		return -1
	}
	for i, n := range states[rank] {
		if n != states[rank+1][i] {
			return i
		}
	}
	return -1
}
