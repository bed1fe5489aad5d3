package lattice

import "testing"

// A box is bipartite unless it has a periodic axis of odd length above one.
func TestBipartite(t *testing.T) {
	for n := 1; n <= 9; n++ {
		for m := 1; m <= 4; m++ {
			for flags := range 4 {
				periodic := []bool{flags&1 > 0, flags&2 > 0}
				l := mustBox(t, []int{n, m}, periodic)
				odd := periodic[0] && n%2 == 1 && n > 1 || periodic[1] && m%2 == 1 && m > 1
				colour, ok := l.Bipartite()
				if ok == odd {
					t.Errorf("box %dx%d periodic %v: bipartite %v, want %v", n, m, periodic, ok, !odd)
				}
				if !ok && colour != nil {
					t.Errorf("box %dx%d periodic %v: colours %v without a colouring", n, m, periodic, colour)
				}
				if ok {
					checkColours(t, l, colour)
				}
			}
		}
	}
}

func checkColours(t *testing.T, l *Lattice, colour []int8) {
	t.Helper()
	if len(colour) != l.Sites || colour[0] != 1 {
		t.Errorf("colours %v for %d sites, want one each and +1 first", colour, l.Sites)
	}
	for _, b := range l.Bonds {
		if colour[b.From]*colour[b.To] != -1 {
			t.Errorf("bond %v joins colours %d and %d", b, colour[b.From], colour[b.To])
		}
	}
}

func TestBipartiteColoursEveryPart(t *testing.T) {
	// Two separate chains 0-2-4 and 1-3, and a single site.
	l := &Lattice{Sites: 6, Axes: 1, Bonds: []Bond{{0, 2, 0}, {4, 2, 0}, {3, 1, 0}}}
	colour, ok := l.Bipartite()
	want := []int8{1, 1, -1, -1, 1, 1}
	for i := range want {
		if !ok || colour[i] != want[i] {
			t.Fatalf("colours %v, %v, want %v", colour, ok, want)
		}
	}
	triangle := &Lattice{Sites: 4, Axes: 1, Bonds: []Bond{{1, 2, 0}, {2, 3, 0}, {3, 1, 0}}}
	if _, ok := triangle.Bipartite(); ok {
		t.Error("a triangle beside a single site was coloured with two colours")
	}
}

func TestConnected(t *testing.T) {
	for _, tc := range []struct {
		name string
		l    *Lattice
		want bool
	}{
		{"one site", &Lattice{Sites: 1}, true},
		{"two sites apart", &Lattice{Sites: 2}, false},
		{"cube", mustBox(t, []int{3, 4, 5}, make([]bool, 3)), true},
		{"torus", mustBox(t, []int{3, 5}, []bool{true, true}), true},
		{"cut chain", &Lattice{Sites: 4, Bonds: []Bond{{0, 1, 0}, {2, 3, 0}}}, false},
	} {
		if got := tc.l.Connected(); got != tc.want {
			t.Errorf("%s: connected %v, want %v", tc.name, got, tc.want)
		}
	}
}

func TestCoordination(t *testing.T) {
	for _, tc := range []struct {
		sites    []int
		periodic []bool
		want     int
	}{
		{[]int{1}, []bool{true}, 0},
		{[]int{2}, []bool{true}, 1},
		{[]int{5}, []bool{false}, 2},
		{[]int{3, 3}, []bool{false, false}, 4},
		{[]int{2, 3}, []bool{false, false}, 3},
		{[]int{3, 3, 3}, []bool{false, false, false}, 6},
		{[]int{2, 2, 2}, []bool{true, true, true}, 3},
	} {
		if got := mustBox(t, tc.sites, tc.periodic).Coordination(); got != tc.want {
			t.Errorf("box %v periodic %v: coordination %d, want %d", tc.sites, tc.periodic, got, tc.want)
		}
	}
}
