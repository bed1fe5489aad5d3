package optics

import (
	"math"
	"testing"
)

func TestBudgetSum(t *testing.T) {
	b := Budget{
		{Source: "sheet", Kind: "dipole", OmegaSquared: [3]float64{1, 2, 3}},
		{Source: "lattice x", Kind: "lattice", OmegaSquared: [3]float64{0, -5, -5}},
		{Source: "field", Kind: "magnetic", OmegaSquared: [3]float64{0.5, 0.5, -1}},
	}
	if got, want := b.Sum(), ([3]float64{1.5, -2.5, -3}); got != want {
		t.Errorf("got %v, want %v", got, want)
	}
	if got := (Budget{}).Sum(); got != ([3]float64{}) {
		t.Errorf("empty budget: got %v, want zeros", got)
	}
}

func TestSignedFrequencyRoundTrip(t *testing.T) {
	for _, hz := range []float64{-1e6, -43, -1e-3, 1e-9, 37, 1e5} {
		checkClose(t, "frequency", SignedFrequency(OmegaSquared(hz)), hz, 1e-15)
	}
	if got := SignedFrequency(0); got != 0 {
		t.Errorf("no trap: got %g Hz, want 0", got)
	}
	checkClose(t, "1 Hz", OmegaSquared(1), 4*math.Pi*math.Pi, 1e-15)
	checkClose(t, "-1 Hz", OmegaSquared(-1), -4*math.Pi*math.Pi, 1e-15)
}

func TestAxes(t *testing.T) {
	for _, tc := range []struct {
		axis, first, second Axis
		name                string
	}{{X, Y, Z, "x"}, {Y, X, Z, "y"}, {Z, X, Y, "z"}} {
		first, second := tc.axis.Transverse()
		if first != tc.first || second != tc.second || tc.axis.String() != tc.name {
			t.Errorf("%v: transverse %v, %v, want %v, %v and name %q", tc.axis, first, second, tc.first, tc.second, tc.name)
		}
	}
}
