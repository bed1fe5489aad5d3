package ceiling

import (
	"context"
	"math"
	"math/rand/v2"
	"testing"

	"hilltop/bosehubbard"
	"hilltop/bosehubbard/exact"
	"hilltop/bosehubbard/lattice"
)

// ends diagonalises the finite system, energies per atom.
func ends(t *testing.T, s *System, periodic []bool) (floor, top float64) {
	t.Helper()
	box, err := lattice.Box(s.Box.Sites, periodic)
	if err != nil {
		t.Fatal(err)
	}
	m := bosehubbard.Model{Interaction: s.Interaction}
	for _, a := range s.Axes {
		m.Axes = append(m.Axes, bosehubbard.AxisTerms{Tunnelling: a.Tunnelling, Curvature: a.Curvature})
	}
	e, err := exact.Solve(context.Background(), box, m, s.Box.Atoms, exact.Options{})
	if err != nil {
		t.Fatal(err)
	}
	n := float64(s.Box.Atoms)
	return e.Floor / n, e.Ceiling / n
}

// TestBoundsHoldForSmallSystems: the closed-form bounds of 200 seeded chains,
// rectangles and boxes, with all signs of J, U and V, enclose the exact ends of
// the spectrum. The trap of a finite box is bounded at its corners too, so only
// the end that the closed form calls bounded is compared.
func TestBoundsHoldForSmallSystems(t *testing.T) {
	rng := rand.New(rand.NewPCG(5, 7))
	shapes := [][]int{{2}, {3}, {4}, {5}, {6}, {2, 2}, {2, 3}, {3, 2}, {2, 2, 2}, {1, 4}}
	value := func(scale float64) float64 {
		if rng.IntN(6) == 0 {
			return 0
		}
		return scale * (2*rng.Float64() - 1)
	}
	checked := 0
	for trial := range 200 {
		sites := shapes[rng.IntN(len(shapes))]
		periodic := make([]bool, len(sites))
		for i := range periodic {
			periodic[i] = rng.IntN(2) == 0
		}
		s := model(sites, 1+rng.IntN(5), 0, value(5), 0)
		for i := range s.Axes {
			a := &s.Axes[i]
			a.Tunnelling, a.Curvature = value(2), value(0.8)
			a.Band = Interval{-2 * math.Abs(a.Tunnelling), 2 * math.Abs(a.Tunnelling)}
		}
		_, total := s.terms(allMoving(s)) // an axis with J = 0 is frozen and would be left out
		floor, top := ends(t, s, periodic)
		const rounding = 1e-9 // of the exact ends, relative to energies of order 10
		if floor < total.Floor-rounding || top > total.Ceiling+rounding {
			t.Errorf("trial %d, sites %v, %d atoms, %+v: exact %g to %g, bounds %+v", trial, sites, s.Box.Atoms, s, floor, top, total)
		}
		for _, end := range []float64{total.Floor, total.Ceiling} {
			if !math.IsInf(end, 0) {
				checked++
			}
		}
	}
	if checked < 80 {
		t.Errorf("only %d of 400 ends are bounded; the test looks at nothing", checked)
	}
}

// TestBoundsAreReached where theory says so: an even ring without interaction
// has both edges at -+2J (derived), a square torus at -+4J; without tunnelling
// the even filling costs least and one atom per middle site the least trap.
func TestBoundsAreReached(t *testing.T) {
	for _, tc := range []struct {
		name     string
		s        *System
		periodic []bool
		floor    bool // compare the floor too
	}{
		{"even ring", model([]int{6}, 3, 1.3, 0, 0), []bool{true}, true},
		{"even ring, J < 0", model([]int{4}, 5, -0.7, 0, 0), []bool{true}, true},
		{"torus", model([]int{4, 4}, 2, 1, 0, 0), []bool{true, true}, true},
		{"attraction alone", model([]int{5}, 8, 0, -2, 0), []bool{false}, false},
		{"anti-trap alone, odd chain", model([]int{5}, 3, 0, 0, -0.4), []bool{false}, false},
		{"anti-trap alone, even chain", model([]int{4}, 3, 0, 0, -0.4), []bool{false}, false},
		{"anti-trap alone, box", model([]int{2, 3}, 2, 0, 0, -0.4), []bool{false, false}, false},
	} {
		tc.s.Hold = 1e9 // J = 0 stands still for ever; judge the bounds alone
		terms, total := tc.s.terms(allMoving(tc.s))
		floor, top := ends(t, tc.s, tc.periodic)
		if math.Abs(top-total.Ceiling) > 1e-9 || tc.floor && math.Abs(floor-total.Floor) > 1e-9 {
			t.Errorf("%s: exact %.12g to %.12g, bounds %+v of %+v", tc.name, floor, top, total, terms)
		}
	}
	if a := assess(t, model([]int{6}, 6, 1, 2, 0)); !math.IsInf(a.Total.Ceiling, 1) || a.Verdict != Open {
		t.Errorf("repulsion: total %+v, %s; want no ceiling", a.Total, a.Verdict)
	}
	// U > 0 at the floor: the even filling, U(k-1)k/2 per site.
	s := model([]int{4}, 8, 0, 3, 0)
	s.Sign = Positive
	_, total := s.terms(allMoving(s))
	if floor, _ := ends(t, s, []bool{false}); math.Abs(floor-total.Floor) > 1e-9 || total.Floor != 1.5 {
		t.Errorf("two atoms a site: exact floor %g, bound %g, want 1.5", floor, total.Floor)
	}
}

func allMoving(s *System) []Motion {
	m := make([]Motion, len(s.Axes))
	for i := range m {
		m[i] = Moving
	}
	return m
}
