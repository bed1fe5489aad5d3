package fock

import (
	"math/rand/v2"
	"slices"
	"testing"

	"hilltop/bosehubbard"
	"hilltop/bosehubbard/lattice"
)

func TestMirror(t *testing.T) {
	even, tilted := axis(1, 0.2, 0), axis(1, 0.2, 0.1)
	model := func(axes ...bosehubbard.AxisTerms) bosehubbard.Model {
		return bosehubbard.Model{Axes: axes, Interaction: 1}
	}
	for _, tc := range []struct {
		name     string
		sites    []int
		periodic []bool
		model    bosehubbard.Model
		want     []int
	}{
		{"chain", []int{4}, []bool{false}, model(even), []int{3, 2, 1, 0}},
		{"odd chain", []int{5}, []bool{false}, model(even), []int{4, 3, 2, 1, 0}},
		{"tilted chain", []int{4}, []bool{false}, model(tilted), nil},
		{"one site", []int{1}, []bool{false}, model(even), nil},
		{"ladder along x", []int{4, 2}, []bool{false, false}, model(even, even), []int{3, 2, 1, 0, 7, 6, 5, 4}},
		{"ladder along y", []int{2, 4}, []bool{false, false}, model(even, even), []int{6, 7, 4, 5, 2, 3, 0, 1}},
		{"tilted along x", []int{3, 2}, []bool{false, false}, model(tilted, even), []int{3, 4, 5, 0, 1, 2}},
		{"tilted along both", []int{3, 2}, []bool{false, false}, model(tilted, tilted), nil},
		{"three by three", []int{3, 3}, []bool{false, false}, model(even, even), []int{8, 7, 6, 5, 4, 3, 2, 1, 0}},
	} {
		place, ok := boxTerms(t, tc.sites, tc.periodic, tc.model).Mirror()
		if ok != (tc.want != nil) || !slices.Equal(place, tc.want) {
			t.Errorf("%s: mirror %v, %v, want %v", tc.name, place, ok, tc.want)
		}
	}
}

// What is handed over as a mirror and is none is passed over.
func TestMirrorChecksItsCandidates(t *testing.T) {
	uneven := &Terms{Sites: 4, Hops: []Hop{{0, 1, -1}, {2, 3, -2}}}
	uneven.Mirrors = [][]int{{1, 0, 3, 2}, {1, 2, 3, 0}, {0, 1, 2, 3}, {3, 2}, {9, 2, 1, 0}, {-1, 2, 1, 0}}
	if place, ok := uneven.Mirror(); !ok || !slices.Equal(place, []int{1, 0, 3, 2}) {
		t.Errorf("two unequal pairs: mirror %v, %v, want the swap inside the pairs", place, ok)
	}
	uneven.Potential = []float64{1, 2, 0, 0}
	if place, ok := uneven.Mirror(); ok {
		t.Errorf("with a potential: mirror %v, want none", place)
	}
}

// The signs of a gauge make every hop's amplitude, times both signs and the sign of
// the end, negative; and where there is none a loop of hops is frustrated.
func TestGauge(t *testing.T) {
	random := rand.New(rand.NewPCG(17, 0))
	found := 0
	for range 200 {
		s := randomSystem(random, "", false)
		for _, sign := range []float64{1, -1} {
			gauge, ok := s.terms.Gauge(sign)
			if ok {
				found++
			}
			if best := bruteGauge(s.terms, sign); best != ok {
				t.Errorf("%+v: gauge %v for sign %g, want %v", *s.terms, ok, sign, best)
			}
			for _, b := range s.terms.bonds() {
				if ok && sign*b.amplitude*float64(gauge[b.low])*float64(gauge[b.high]) > 0 {
					t.Errorf("%+v: gauge %v leaves hop %v", *s.terms, gauge, b)
				}
			}
		}
	}
	if found < 40 || found > 360 {
		t.Errorf("%d of 400 have a gauge; the test sees one case only", found)
	}
}

// bruteGauge tries all signs.
func bruteGauge(t *Terms, sign float64) bool {
	for code := range 1 << t.Sites {
		good := true
		for _, b := range t.bonds() {
			differ := (code>>b.low^code>>b.high)&1 == 1
			good = good && (sign*b.amplitude > 0) == differ
		}
		if good {
			return true
		}
	}
	return false
}

func TestConnected(t *testing.T) {
	for _, tc := range []struct {
		terms *Terms
		want  bool
	}{
		{&Terms{Sites: 1}, true},
		{&Terms{Sites: 2}, false},
		{&Terms{Sites: 3, Hops: []Hop{{0, 1, 1}, {2, 1, 1}}}, true},
		{&Terms{Sites: 3, Hops: []Hop{{0, 1, 1}, {2, 1, 1}, {2, 1, -1}}}, false}, // two that cancel
	} {
		if got := tc.terms.Connected(); got != tc.want {
			t.Errorf("%+v: connected %v, want %v", *tc.terms, got, tc.want)
		}
	}
}

// A plane is cut across its longer side, which leaves fewer hops across.
func TestSplitCutsFewHops(t *testing.T) {
	for _, sites := range [][]int{{6, 2}, {2, 6}} {
		box, err := lattice.Box(sites, []bool{false, false})
		if err != nil {
			t.Fatal(err)
		}
		terms, err := TermsOf(box, bosehubbard.Model{Axes: []bosehubbard.AxisTerms{axis(1, 0.1, 0.3), axis(1, 0, 0.2)}})
		if err != nil {
			t.Fatal(err)
		}
		h := mustOperator(t, terms, 2, Options{})
		links := 0
		for _, b := range h.blocks {
			links = max(links, len(b.links))
		}
		if links != 4 { // two hops, both ways
			t.Errorf("box %v: %d links of a block, want 4", sites, links)
		}
	}
}
