package lattice

import (
	"fmt"
	"math"
	"strings"
	"testing"
)

func mustBuild(t *testing.T, kind Kind, cells []int, periodic bool) *Lattice {
	t.Helper()
	l, err := Build(kind, cells, periodic)
	if err != nil {
		t.Fatal(err)
	}
	return l
}

// Sites and bonds of each kind; a periodic patch has z/2 bonds per site.
func TestBuildCounts(t *testing.T) {
	for _, tc := range []struct {
		kind         Kind
		cells        []int
		periodic     bool
		sites, bonds int
		coordination int
		bipartite    bool
	}{
		{Chain, []int{7}, false, 7, 6, 2, true},
		{Chain, []int{7}, true, 7, 7, 2, false},
		{Ladder, []int{5}, false, 10, 13, 3, true},
		{Ladder, []int{4, 3}, false, 12, 17, 4, true},
		{Ladder, []int{6}, true, 12, 18, 3, true},
		{Square, []int{3, 4}, false, 12, 17, 4, true},
		{Square, []int{4, 4}, true, 16, 32, 4, true},
		{Cubic, []int{2, 2, 3}, false, 12, 20, 4, true},
		{Triangular, []int{3, 3}, false, 9, 16, 6, false},
		{Triangular, []int{3, 4}, true, 12, 36, 6, false},
		{Triangular, []int{2, 2}, false, 4, 5, 3, false},
		{Honeycomb, []int{2, 2}, false, 8, 8, 3, true},
		{Honeycomb, []int{2, 3}, true, 12, 18, 3, true},
		{Honeycomb, []int{3, 3}, true, 18, 27, 3, true},
		{Kagome, []int{1, 1}, false, 3, 3, 2, false},
		{Kagome, []int{2, 2}, false, 12, 17, 4, false},
		{Kagome, []int{2, 2}, true, 12, 24, 4, false},
		{Kagome, []int{3, 2}, true, 18, 36, 4, false},
	} {
		l := mustBuild(t, tc.kind, tc.cells, tc.periodic)
		name := fmt.Sprintf("%s %v periodic %v", tc.kind, tc.cells, tc.periodic)
		if l.Sites != tc.sites || len(l.Bonds) != tc.bonds || l.Coordination() != tc.coordination {
			t.Errorf("%s: %d sites, %d bonds, coordination %d, want %d, %d, %d",
				name, l.Sites, len(l.Bonds), l.Coordination(), tc.sites, tc.bonds, tc.coordination)
		}
		if _, ok := l.Bipartite(); ok != tc.bipartite {
			t.Errorf("%s: bipartite %v, want %v", name, ok, tc.bipartite)
		}
		if !l.Connected() {
			t.Errorf("%s: not connected", name)
		}
	}
}

// Inside a patch every bond is one site long, no two sites are closer, and the
// positions are about their mean.
func TestBuildPositions(t *testing.T) {
	for _, kind := range []Kind{Triangular, Honeycomb, Kagome} {
		l := mustBuild(t, kind, []int{4, 3}, false)
		distance := func(i, j int) float64 {
			p, q := l.Positions[i], l.Positions[j]
			return math.Hypot(p[0]-q[0], p[1]-q[1])
		}
		joined := map[[2]int]bool{}
		for _, b := range l.Bonds {
			joined[[2]int{min(b.From, b.To), max(b.From, b.To)}] = true
			if d := distance(b.From, b.To); math.Abs(d-1) > 1e-14 {
				t.Errorf("%s: bond %v of length %.17g, want 1", kind, b, d)
			}
		}
		sum := [3]float64{}
		for i, p := range l.Positions {
			for a := range p {
				sum[a] += p[a]
			}
			for j := range i {
				if d := distance(i, j); d < 1-1e-14 || d < 1.1 != joined[[2]int{j, i}] {
					t.Errorf("%s: sites %d and %d are %g apart, joined %v", kind, i, j, d, joined[[2]int{j, i}])
				}
			}
		}
		if math.Abs(sum[0])+math.Abs(sum[1])+math.Abs(sum[2]) > 1e-12 {
			t.Errorf("%s: mean position %v, want 0", kind, sum)
		}
	}
}

// The closed form of the endless band against the hopping matrix of a periodic
// patch that has the quasi-momenta of both ends: the corners of the zone need three
// cells on the triangular lattice, the others only the centre, or pi.
func TestBand(t *testing.T) {
	for _, tc := range []struct {
		kind  Kind
		cells []int
	}{
		{Chain, []int{6}}, {Ladder, []int{6}}, {Square, []int{4, 4}}, {Cubic, []int{4, 4, 4}},
		{Triangular, []int{3, 3}}, {Triangular, []int{6, 3}},
		{Honeycomb, []int{2, 2}}, {Honeycomb, []int{3, 4}},
		{Kagome, []int{2, 2}}, {Kagome, []int{3, 4}},
	} {
		l := mustBuild(t, tc.kind, tc.cells, true)
		for _, j := range []float64{1, -0.7} {
			wantFloor, wantCeiling := hoppingEnds(t, l, []float64{j, j, j})
			floor, ceiling := tc.kind.Band(j)
			if math.Abs(floor-wantFloor) > 1e-13 || math.Abs(ceiling-wantCeiling) > 1e-13 {
				t.Errorf("%s, J = %g: band %g to %g, the patch %v has %.15g to %.15g", tc.kind, j, floor, ceiling, tc.cells, wantFloor, wantCeiling)
			}
		}
	}
	if floor, ceiling := Kind("hexagon").Band(1); floor != 0 || ceiling != 0 {
		t.Errorf("unknown kind: band %g to %g, want 0", floor, ceiling)
	}
}

func TestBuildRefuses(t *testing.T) {
	for _, tc := range []struct {
		kind  Kind
		cells []int
		want  string
	}{
		{"hexagon", []int{2, 2}, `kind "hexagon"`},
		{"", nil, "want one of"},
		{Chain, []int{2, 2}, "2 numbers of cells for a chain patch, want 1"},
		{Cubic, []int{2, 2}, "want 3"},
		{Kagome, []int{2}, "want 2"},
		{Kagome, []int{2, 0}, "0 cells along vector 1"},
		{Triangular, []int{-1, 2}, "-1 cells"},
		{Honeycomb, []int{1000, 501}, "more than 1000000 sites"},
		{Kagome, []int{math.MaxInt, math.MaxInt}, "more than 1000000 sites"},
		{Square, []int{2, -2}, "-2 sites"},
	} {
		if l, err := Build(tc.kind, tc.cells, false); err == nil || !strings.Contains(err.Error(), tc.want) {
			t.Errorf("Build(%q, %v) = %v, %v, want an error with %q", tc.kind, tc.cells, l, err, tc.want)
		}
	}
}

// A reflection keeps the shape: it sends every site to one, itself after two.
func TestReflections(t *testing.T) {
	for _, tc := range []struct {
		l    *Lattice
		want int
	}{
		{mustBox(t, []int{1}, []bool{false}), 0},
		{mustBox(t, []int{5}, []bool{true}), 1},
		{mustBox(t, []int{3, 4}, []bool{false, false}), 3},
		{mustBox(t, []int{3, 1}, []bool{false, false}), 1},
		{mustBox(t, []int{2, 3, 4}, []bool{false, false, false}), 7},
		{mustBuild(t, Triangular, []int{3, 4}, false), 1}, // the inversion
		{mustBuild(t, Triangular, []int{3, 3}, false), 1}, // its diagonals lie askew
		{mustBuild(t, Honeycomb, []int{2, 3}, false), 1},
		{mustBuild(t, Kagome, []int{2, 2}, false), 0},
		{&Lattice{Sites: 3}, 0}, // no positions
	} {
		list := tc.l.Reflections()
		if len(list) != tc.want {
			t.Errorf("%d sites at %v: %d reflections, want %d", tc.l.Sites, tc.l.Positions, len(list), tc.want)
		}
		for _, place := range list {
			for i, other := range place {
				if place[other] != i {
					t.Errorf("%v is not its own inverse", place)
				}
			}
		}
	}
}

func TestSecondBonds(t *testing.T) {
	for _, tc := range []struct {
		l    *Lattice
		want int
	}{
		{mustBox(t, []int{6}, []bool{false}), 4},
		{mustBox(t, []int{6}, []bool{true}), 6},
		{mustBox(t, []int{4}, []bool{true}), 2},
		{mustBox(t, []int{2}, []bool{true}), 0},
		{mustBox(t, []int{3, 4}, []bool{false, false}), 1*4 + 2*3},
		{mustBuild(t, Triangular, []int{5, 5}, true), 3 * 25},
		{mustBuild(t, Honeycomb, []int{3, 3}, true), 0}, // no two bonds in a line
		{mustBuild(t, Kagome, []int{3, 3}, true), 2 * 27},
	} {
		bonds := tc.l.SecondBonds()
		if len(bonds) != tc.want {
			t.Errorf("%d sites: %d second bonds %v, want %d", tc.l.Sites, len(bonds), bonds, tc.want)
		}
	}
	l := mustBox(t, []int{5, 5}, []bool{false, false})
	for _, b := range l.SecondBonds() {
		p, q := l.Positions[b.From], l.Positions[b.To]
		if q[b.Axis]-p[b.Axis] != 2 {
			t.Errorf("second bond %v from %v to %v, want two sites along axis %d", b, p, q, b.Axis)
		}
	}
}

func ExampleBuild() {
	l, err := Build(Kagome, []int{2, 2}, true)
	if err != nil {
		fmt.Println(err)
		return
	}
	floor, ceiling := Kagome.Band(1)
	fmt.Printf("%d sites, %d bonds, band %g J to %g J\n", l.Sites, len(l.Bonds), floor, ceiling)
	// Output: 12 sites, 24 bonds, band -4 J to 2 J
}
