package gutzwiller

import (
	"fmt"
	"math"
	"strings"
	"testing"

	"hilltop/bosehubbard/lattice"
)

func mustGrid(t testing.TB, sites []int, periodic []bool) *Grid {
	t.Helper()
	g, err := NewGrid(sites, periodic)
	if err != nil {
		t.Fatal(err)
	}
	return g
}

// shapes are grids of every kind; blocks of 64 sites end within rows in some.
var shapes = []struct {
	sites    []int
	periodic []bool
}{
	{[]int{1}, []bool{false}},
	{[]int{2}, []bool{true}},
	{[]int{3}, []bool{true}},
	{[]int{200}, []bool{false}},
	{[]int{64, 3}, []bool{true, false}},
	{[]int{1, 70}, []bool{true, true}},
	{[]int{17, 11}, []bool{true, true}},
	{[]int{2, 2, 2}, []bool{true, false, true}},
	{[]int{5, 6, 7}, []bool{false, true, true}},
}

// The neighbours are the bonds of the box of package lattice.
func TestGridIsTheBox(t *testing.T) {
	for _, tc := range shapes {
		g := mustGrid(t, tc.sites, tc.periodic)
		box, err := lattice.Box(tc.sites, tc.periodic)
		if err != nil {
			t.Fatal(err)
		}
		want := map[string]int{}
		for _, b := range box.Bonds {
			want[fmt.Sprint(b.From, b.To, b.Axis)]++
			want[fmt.Sprint(b.To, b.From, b.Axis)]++
		}
		got := map[string]int{}
		for direction, list := range g.near {
			for site, to := range list {
				if int(to) != g.padded {
					got[fmt.Sprint(site, to, direction/2)]++
				}
			}
		}
		if fmt.Sprint(got) != fmt.Sprint(want) {
			t.Errorf("%v periodic %v: neighbours %v, want %v", tc.sites, tc.periodic, got, want)
		}
		_, bipartite := box.Bipartite()
		if g.Bipartite() != bipartite {
			t.Errorf("%v periodic %v: bipartite %v, want %v", tc.sites, tc.periodic, g.Bipartite(), bipartite)
		}
		for a := range g.Axes {
			x := g.Coordinates(a)
			for site, p := range box.Positions {
				if x[site] != p[a] {
					t.Errorf("%v: site %d at %g along axis %d, want %g", tc.sites, site, x[site], a, p[a])
				}
			}
			if g.Length(a) != tc.sites[a] || g.Periodic(a) != tc.periodic[a] {
				t.Errorf("%v: axis %d has %d sites, periodic %v", tc.sites, a, g.Length(a), g.Periodic(a))
			}
		}
	}
}

func TestGridRefuses(t *testing.T) {
	for _, tc := range []struct {
		sites    []int
		periodic []bool
		want     string
	}{
		{nil, nil, "0 axes"},
		{[]int{1, 1, 1, 1}, make([]bool, 4), "4 axes"},
		{[]int{4}, nil, "0 periodic flags"},
		{[]int{0}, []bool{false}, "0 sites"},
		{[]int{3, -1}, []bool{false, false}, "-1 sites"},
		{[]int{1001, 1000}, []bool{false, false}, "more than 1000000 sites"},
		{[]int{math.MaxInt, math.MaxInt}, []bool{false, false}, "more than 1000000 sites"},
	} {
		if _, err := NewGrid(tc.sites, tc.periodic); err == nil || !strings.Contains(err.Error(), tc.want) {
			t.Errorf("%v: got %v, want an error with %q", tc.sites, err, tc.want)
		}
	}
}

func TestSystemRefuses(t *testing.T) {
	g := mustGrid(t, []int{4}, []bool{false})
	for _, tc := range []struct {
		levels int
		shape  []float64
		want   string
	}{
		{1, nil, "1 levels"},
		{257, nil, "257 levels"},
		{4, []float64{1, 2}, "2 values for 4 sites"},
		{4, []float64{1, 2, math.NaN(), 0}, "NaN at site 2"},
	} {
		shapes := [][]float64{}
		if tc.shape != nil {
			shapes = append(shapes, tc.shape)
		}
		if _, err := NewSystem(g, tc.levels, shapes...); err == nil || !strings.Contains(err.Error(), tc.want) {
			t.Errorf("%d levels, shape %v: got %v, want an error with %q", tc.levels, tc.shape, err, tc.want)
		}
	}
}
