package fock

import (
	"fmt"
	"math/rand/v2"
	"slices"
	"testing"
)

func mustBasis(t testing.TB, sites, atoms int) *Basis {
	t.Helper()
	b, err := NewBasis(sites, atoms, Options{})
	if err != nil {
		t.Fatal(err)
	}
	return b
}

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

func TestBasisAgainstRecursion(t *testing.T) {
	for sites := 1; sites <= 6; sites++ {
		for atoms := 0; atoms <= 6; atoms++ {
			b := mustBasis(t, sites, atoms)
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

// Rank and State are inverse to each other on bases too large to list.
func TestRankRoundTrip(t *testing.T) {
	random := rand.New(rand.NewPCG(7, 0))
	for range 300 {
		sites, atoms := 1+random.IntN(18), random.IntN(18)
		b, err := NewBasis(sites, atoms, Options{MemoryBytes: 1 << 62}) // only its small table is built
		if err != nil {
			t.Fatal(err)
		}
		rank := random.IntN(b.Dimension)
		state := make([]int, sites)
		b.State(state, rank)
		total := 0
		for _, n := range state {
			total += n
		}
		if got := b.Rank(state); got != rank || total != atoms {
			t.Errorf("%d sites, %d atoms: rank %d -> %v -> %d", sites, atoms, rank, state, got)
		}
	}
}

func TestBasisCorners(t *testing.T) {
	b := mustBasis(t, 2, 100_000)
	state := make([]int, 2)
	b.State(state, 31_415)
	if got := b.Rank(state); got != 31_415 || state[1] != 31_415 {
		t.Errorf("two sites: rank 31415 -> %v -> %d", state, got)
	}
	one := mustBasis(t, 1, 1_000_000_000)
	one.State(state[:1], 0)
	if got := one.Rank(state[:1]); got != 0 || state[0] != 1_000_000_000 || one.Next(state[:1]) != -1 {
		t.Errorf("one site: rank 0 -> %v -> %d", state[:1], got)
	}
}

func TestBasisPanicsOnMisuse(t *testing.T) {
	b := mustBasis(t, 3, 2)
	for name, misuse := range map[string]func(){
		"short state":    func() { b.Rank([]int{2, 0}) },
		"too few atoms":  func() { b.Rank([]int{1, 0, 0}) },
		"too many atoms": func() { b.Rank([]int{1, 1, 1}) },
		"negative":       func() { b.Rank([]int{3, -1, 0}) },
		"short dst":      func() { b.State(make([]int, 2), 0) },
		"rank -1":        func() { b.State(make([]int, 3), -1) },
		"rank D":         func() { b.State(make([]int, 3), 6) },
	} {
		func() {
			defer func() {
				if recover() == nil {
					t.Errorf("%s: no panic", name)
				}
			}()
			misuse()
		}()
	}
}

func TestBasisAllocatesNothing(t *testing.T) {
	b := mustBasis(t, 8, 8)
	state := make([]int, 8)
	b.State(state, 100)
	if n := testing.AllocsPerRun(100, func() { b.State(state, b.Rank(state)); b.Next(state) }); n != 0 {
		t.Errorf("State, Rank and Next allocate %g times, want 0", n)
	}
}

func ExampleBasis() {
	b, err := NewBasis(3, 2, Options{})
	if err != nil {
		fmt.Println(err)
		return
	}
	state := make([]int, 3)
	for rank := range b.Dimension {
		b.State(state, rank)
		fmt.Print(state, " ")
	}
	fmt.Println(b.Rank([]int{0, 1, 1}))
	// Output: [2 0 0] [1 1 0] [1 0 1] [0 2 0] [0 1 1] [0 0 2] 4
}
