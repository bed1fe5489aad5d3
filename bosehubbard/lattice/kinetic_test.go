package lattice

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/mat"
)

// hoppingEnds returns the ends of the spectrum of -J on every bond.
func hoppingEnds(t *testing.T, l *Lattice, tunnelling []float64) (floor, ceiling float64) {
	t.Helper()
	h := mat.NewSymDense(l.Sites, nil)
	for _, b := range l.Bonds {
		h.SetSym(b.From, b.To, h.At(b.From, b.To)-tunnelling[b.Axis])
	}
	var eig mat.EigenSym
	if !eig.Factorize(h, false) {
		t.Fatal("dense diagonalisation failed")
	}
	e := eig.Values(nil)
	return e[0], e[len(e)-1]
}

// The closed form against dense diagonalisation of the hopping matrix. LAPACK's
// error is a few rounding errors of the norm, at most 2 sum |J| = 8.
func TestKineticRangeAgainstDense(t *testing.T) {
	const tolerance = 1e-13
	for _, sites := range [][]int{{1}, {2}, {3}, {4}, {5}, {8}, {9}, {2, 3}, {3, 3}, {4, 5}, {2, 2, 2}, {3, 4, 3}, {1, 5, 1}} {
		for flags := range 1 << len(sites) {
			for signs := range 1 << len(sites) {
				periodic, tunnelling := make([]bool, len(sites)), make([]float64, len(sites))
				for a := range sites {
					periodic[a] = flags>>a&1 > 0
					tunnelling[a] = []float64{1, 0.7, 1.9}[a] * float64(1-2*(signs>>a&1))
				}
				wantFloor, wantCeiling := hoppingEnds(t, mustBox(t, sites, periodic), tunnelling)
				floor, ceiling, err := KineticRange(sites, periodic, tunnelling)
				if err != nil || math.Abs(floor-wantFloor) > tolerance || math.Abs(ceiling-wantCeiling) > tolerance {
					t.Errorf("KineticRange(%v, %v, %v) = %.16g, %.16g, %v, want %.16g, %.16g", sites, periodic, tunnelling,
						floor, ceiling, err, wantFloor, wantCeiling)
				}
			}
		}
	}
}

// The square lattice without end runs from -4J to 4J per boson, the cube to 6J
// (Braun et al., Science 339, 52 (2013)): an open box comes within pi^2 J/L^2 per axis.
func TestKineticRangeTendsToTheBand(t *testing.T) {
	for _, n := range []int{10, 100, 1000} {
		floor, ceiling, err := KineticRange([]int{n, n}, []bool{false, false}, []float64{1, 1})
		if err != nil {
			t.Fatal(err)
		}
		width := 2 * math.Pi * math.Pi / float64(n*n)
		if floor < -4 || floor > -4+width || ceiling != -floor {
			t.Errorf("open %dx%d: range %.12g to %.12g, want within %.3g of -4 and 4", n, n, floor, ceiling, width)
		}
	}
}

func TestKineticRangeRefuses(t *testing.T) {
	for _, tc := range []struct {
		sites      []int
		periodic   []bool
		tunnelling []float64
	}{
		{nil, nil, nil},
		{[]int{3}, nil, []float64{1}},
		{[]int{3}, []bool{true}, nil},
		{[]int{3, 3, 3, 3}, make([]bool, 4), make([]float64, 4)},
		{[]int{0}, []bool{true}, []float64{1}},
		{[]int{3}, []bool{true}, []float64{math.NaN()}},
		{[]int{3}, []bool{true}, []float64{math.Inf(-1)}},
		{[]int{3}, []bool{true}, []float64{1.5e308}},
		{[]int{1}, []bool{true}, []float64{math.NaN()}},
		{[]int{4, 4}, []bool{true, true}, []float64{8e307, 8e307}},
	} {
		if floor, ceiling, err := KineticRange(tc.sites, tc.periodic, tc.tunnelling); err == nil || floor != 0 || ceiling != 0 {
			t.Errorf("KineticRange(%v, %v, %v) = %g, %g, %v, want zeros and an error", tc.sites, tc.periodic, tc.tunnelling, floor, ceiling, err)
		}
	}
}
