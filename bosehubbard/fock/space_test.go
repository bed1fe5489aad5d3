package fock

import (
	"fmt"
	"math/rand/v2"
	"slices"
	"testing"
)

// All states in descending lexicographic order, by recursion.
func TestSpaceAgainstRecursion(t *testing.T) {
	for sites := 1; sites <= 5; sites++ {
		for atoms := range 7 {
			for most := 1; most <= max(1, atoms); most++ {
				s := newSpace(sites, atoms, most)
				var want [][]int
				for _, state := range everyState(sites, atoms) {
					if slices.Max(state) <= most {
						want = append(want, state)
					}
				}
				name := fmt.Sprintf("%d sites, %d atoms, at most %d", sites, atoms, most)
				if s.count(atoms) != len(want) {
					t.Errorf("%s: %d states, want %d", name, s.count(atoms), len(want))
					continue
				}
				checkSpace(t, name, s, atoms, want)
			}
		}
	}
}

func checkSpace(t *testing.T, name string, s *space, atoms int, want [][]int) {
	t.Helper()
	next, state := make([]int, s.sites), make([]int, s.sites)
	s.first(next, atoms)
	for rank, w := range want {
		s.state(state, atoms, rank)
		if got := s.rank(w); got != rank || !slices.Equal(state, w) || !slices.Equal(next, w) {
			t.Errorf("%s, rank %d: state %v, next %v, rank %d, want %v", name, rank, state, next, got, w)
		}
		if more := s.next(next); more != (rank < len(want)-1) {
			t.Errorf("%s: next after %v is %v", name, w, more)
		}
	}
}

// Rank and State of an operator are inverse to each other, too large to list.
func TestRankRoundTrip(t *testing.T) {
	random := rand.New(rand.NewPCG(7, 0))
	for range 100 {
		sites, atoms := 1+random.IntN(9), random.IntN(9)
		most := 0
		if least := (atoms + sites - 1) / sites; random.IntN(2) == 0 {
			most = least + random.IntN(3)
		}
		terms := &Terms{Sites: sites}
		for i := range sites {
			if j := random.IntN(sites); j != i {
				terms.Hops = append(terms.Hops, Hop{i, j, 1})
			}
		}
		h := mustOperator(t, terms, atoms, Options{MaxOccupation: most})
		rank := random.IntN(h.Dimension())
		state := make([]int, sites)
		h.State(state, rank)
		total := 0
		for _, n := range state {
			total += n
		}
		if got := h.Rank(state); got != rank || total != atoms {
			t.Errorf("%d sites, %d atoms: rank %d -> %v -> %d", sites, atoms, rank, state, got)
		}
	}
}

// A table of numbers of states beyond the range of int does not go wrong: where
// they are beyond it, it says so.
func TestSpaceSaturates(t *testing.T) {
	s := newSpace(200, 199, 1)
	if got := s.count(199); got != 200 {
		t.Errorf("199 atoms, at most one each, on 200 sites: %d states, want 200", got)
	}
	state := make([]int, 200)
	s.state(state, 199, 123)
	if state[199-123] != 0 || s.rank(state) != 123 {
		t.Errorf("state 123 is %v of rank %d", state, s.rank(state))
	}
	if got := newSpace(100, 1000, 1000).count(1000); got < 1<<62 {
		t.Errorf("1000 atoms on 100 sites: %d states, want as many as int holds", got)
	}
}
