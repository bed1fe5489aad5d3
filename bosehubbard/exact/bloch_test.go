package exact

import (
	"context"
	"fmt"
	"math"
	"strings"
	"testing"

	"hilltop/bosehubbard"
	"hilltop/bosehubbard/lattice"
)

// The lowest floor and the highest ceiling of all quasi-momenta are the ends, and
// the dimensions add up. One atom has the cosine band in each.
func TestMomentumSectors(t *testing.T) {
	for _, s := range []system{chain(6, 6, true, 4, 0), chain(7, 5, true, -2, 0), {[]int{3, 3}, []bool{true, true}, 4, bosehubbard.Model{
		Interaction: -2, Axes: []bosehubbard.AxisTerms{{Tunnelling: 1}, {Tunnelling: 0.5}},
	}}} {
		want := s.solve(t, Options{})
		floor, ceiling, states := math.Inf(1), math.Inf(-1), 0
		for code := range s.sites[0] * s.sites[len(s.sites)-1] {
			m := []int{code % s.sites[0], code / s.sites[0]}[:len(s.sites)]
			if len(m) == 1 && code >= s.sites[0] {
				continue
			}
			ends := s.solve(t, Options{Momentum: m})
			floor, ceiling = min(floor, ends.Floor), max(ceiling, ends.Ceiling)
			states += ends.Dimension
			if ends.Sector != fmt.Sprintf("quasi-momentum %v", m) {
				t.Errorf("quasi-momentum %v: sector %q", m, ends.Sector)
			}
		}
		near(t, fmt.Sprintf("%v sites: floor", s.sites), floor, want.Floor, 4*want.FloorResidual+1e-11)
		near(t, fmt.Sprintf("%v sites: ceiling", s.sites), ceiling, want.Ceiling, 4*want.CeilingResidual+1e-11)
		if states != want.Dimension {
			t.Errorf("%v sites: %d states in all, want %d", s.sites, states, want.Dimension)
		}
	}
	for m := range 7 {
		ends := chain(7, 1, true, 3, 0).solve(t, Options{Momentum: []int{m}})
		energy := -2 * math.Cos(2*math.Pi*float64(m)/7)
		near(t, fmt.Sprintf("one atom, quasi-momentum %d", m), ends.Floor, energy, 1e-13)
		near(t, fmt.Sprintf("one atom, quasi-momentum %d", m), ends.Ceiling, energy, 1e-13)
	}
}

func TestMomentumRefuses(t *testing.T) {
	ring, err := lattice.Box([]int{6}, []bool{true})
	if err != nil {
		t.Fatal(err)
	}
	open, m := mustChain(t, 6)
	flat := bosehubbard.Model{Axes: []bosehubbard.AxisTerms{{Tunnelling: 1}}}
	for _, tc := range []struct {
		l    *lattice.Lattice
		m    bosehubbard.Model
		n    int
		opt  Options
		want string
	}{
		{open, m, 3, Options{Momentum: []int{1}}, "without translations"},
		{ring, m, 3, Options{Momentum: []int{1}}, "no symmetry"}, // a trap
		{ring, flat, 3, Options{Momentum: []int{1, 2}}, "want 1 numbers"},
		{ring, flat, 0, Options{Momentum: []int{1}}, "no states"},
		{ring, flat, 3, Options{Momentum: []int{1}, EndStates: true}, "no states and no limit"},
		{ring, flat, 3, Options{Momentum: []int{1}, Sector: SectorEven}, "want one of the two"},
		{ring, flat, 3, Options{Sector: 17}, "sector 17"},
	} {
		if _, err := Solve(context.Background(), tc.l, tc.m, tc.n, tc.opt); err == nil || !strings.Contains(err.Error(), tc.want) {
			t.Errorf("%+v: %v, want an error with %q", tc.opt, err, tc.want)
		}
	}
}
