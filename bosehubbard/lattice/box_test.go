package lattice

import (
	"fmt"
	"math"
	"reflect"
	"strings"
	"testing"
)

func mustBox(t *testing.T, sites []int, periodic []bool) *Lattice {
	t.Helper()
	l, err := Box(sites, periodic)
	if err != nil {
		t.Fatal(err)
	}
	return l
}

func TestBoxSmallShapes(t *testing.T) {
	for _, tc := range []struct {
		sites    []int
		periodic []bool
		bonds    []Bond
	}{
		{[]int{1}, []bool{true}, nil},
		{[]int{2}, []bool{false}, []Bond{{0, 1, 0}}},
		{[]int{2}, []bool{true}, []Bond{{0, 1, 0}}},
		{[]int{3}, []bool{false}, []Bond{{0, 1, 0}, {1, 2, 0}}},
		{[]int{3}, []bool{true}, []Bond{{0, 1, 0}, {1, 2, 0}, {2, 0, 0}}},
		{[]int{2, 2}, []bool{false, false}, []Bond{{0, 1, 0}, {0, 2, 1}, {1, 3, 1}, {2, 3, 0}}},
		{[]int{1, 3}, []bool{false, true}, []Bond{{0, 1, 1}, {1, 2, 1}, {2, 0, 1}}},
	} {
		l := mustBox(t, tc.sites, tc.periodic)
		if !reflect.DeepEqual(l.Bonds, tc.bonds) {
			t.Errorf("Box(%v, %v) has bonds %v, want %v", tc.sites, tc.periodic, l.Bonds, tc.bonds)
		}
	}
}

// An axis of n sites has n-1 bonds per line, n when it is a ring of three or more.
func TestBoxCountsBonds(t *testing.T) {
	for nx := 1; nx <= 5; nx++ {
		for ny := 1; ny <= 4; ny++ {
			for nz := 1; nz <= 3; nz++ {
				for flags := range 8 {
					sites := []int{nx, ny, nz}
					periodic := []bool{flags&1 > 0, flags&2 > 0, flags&4 > 0}
					l := mustBox(t, sites, periodic)
					want := 0
					for a, n := range sites {
						perLine := n - 1
						if periodic[a] && n > 2 {
							perLine = n
						}
						want += perLine * l.Sites / n
					}
					if l.Sites != nx*ny*nz || l.Axes != 3 || len(l.Bonds) != want {
						t.Errorf("Box(%v, %v): %d sites, %d axes, %d bonds, want %d sites, 3 axes, %d bonds",
							sites, periodic, l.Sites, l.Axes, len(l.Bonds), nx*ny*nz, want)
					}
					checkBonds(t, l, sites)
				}
			}
		}
	}
}

// checkBonds verifies that each pair of sites is joined once and that a bond
// leads one step, or all the way round, along its own axis only.
func checkBonds(t *testing.T, l *Lattice, sites []int) {
	t.Helper()
	seen := map[[2]int]bool{}
	for _, b := range l.Bonds {
		pair := [2]int{min(b.From, b.To), max(b.From, b.To)}
		if seen[pair] || b.From == b.To {
			t.Errorf("box %v: bond %v stands twice or joins a site to itself", sites, b)
		}
		seen[pair] = true
		for a, n := range sites {
			step := math.Abs(l.Positions[b.From][a] - l.Positions[b.To][a])
			if a == b.Axis && step != 1 && step != float64(n-1) || a != b.Axis && step != 0 {
				t.Errorf("box %v: bond %v moves %g sites along axis %d", sites, b, step, a)
			}
		}
	}
}

func TestBoxPositionsAreCentred(t *testing.T) {
	for _, periodic := range []bool{false, true} {
		l := mustBox(t, []int{4, 3}, []bool{periodic, periodic})
		if got, want := l.Positions[0], [3]float64{-1.5, -1, 0}; got != want {
			t.Errorf("periodic %v: first position %v, want %v", periodic, got, want)
		}
		if got, want := l.Positions[11], [3]float64{1.5, 1, 0}; got != want {
			t.Errorf("periodic %v: last position %v, want %v", periodic, got, want)
		}
		if got, want := l.Positions[5], [3]float64{-0.5, 0, 0}; got != want {
			t.Errorf("periodic %v: position of site 5 = (1, 1): %v, want %v", periodic, got, want)
		}
	}
}

func TestBoxRefuses(t *testing.T) {
	for _, tc := range []struct {
		sites    []int
		periodic []bool
		want     string
	}{
		{nil, nil, "0 axes"},
		{[]int{2, 2, 2, 2}, make([]bool, 4), "4 axes"},
		{[]int{2, 2}, []bool{true}, "1 periodic flags for 2 axes"},
		{[]int{0}, []bool{false}, "0 sites along axis 0"},
		{[]int{3, -7}, make([]bool, 2), "-7 sites along axis 1"},
		{[]int{1_000_001}, []bool{false}, "more than 1000000 sites"},
		{[]int{1000, 1001}, make([]bool, 2), "more than 1000000 sites"},
		{[]int{math.MaxInt, math.MaxInt, math.MaxInt}, make([]bool, 3), "more than 1000000 sites"},
	} {
		l, err := Box(tc.sites, tc.periodic)
		if err == nil || !strings.Contains(err.Error(), tc.want) {
			t.Errorf("Box(%v, %v) = %v, %v, want an error with %q", tc.sites, tc.periodic, l, err, tc.want)
		}
	}
	if l := mustBox(t, []int{100, 100, 100}, make([]bool, 3)); len(l.Bonds) != 3*99*100*100 {
		t.Errorf("the largest cube has %d bonds, want %d", len(l.Bonds), 3*99*100*100)
	}
}

func ExampleBox() {
	l, err := Box([]int{2, 3}, []bool{false, true})
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Println(l.Sites, "sites,", len(l.Bonds), "bonds, coordination", l.Coordination())
	// Output: 6 sites, 9 bonds, coordination 3
}
