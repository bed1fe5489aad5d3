package gutzwiller

import (
	"math"
	"math/cmplx"
	"slices"
	"strings"
	"testing"
)

func TestFock(t *testing.T) {
	s := mustSystem(t, mustGrid(t, []int{3}, []bool{false}), 4)
	state, err := Fock(s, []int{2, 0, 1})
	if err != nil {
		t.Fatal(err)
	}
	filling := make([]float64, 3)
	if state.Filling(filling); !slices.Equal(filling, []float64{2, 0, 1}) {
		t.Errorf("filling %v, want 2, 0, 1", filling)
	}
	for _, atoms := range [][]int{{1, 1}, {3, 0, 0}, {0, -1, 0}} {
		if _, err := Fock(s, atoms); err == nil || !strings.Contains(err.Error(), "atoms on") {
			t.Errorf("%v with 4 levels: got %v, want an error", atoms, err)
		}
	}
}

// A coherent state has phi = alpha and Poisson numbers; 20 levels cut off 6e-14 of a
// state of two atoms, that is 1.2e-12 atoms.
func TestCoherent(t *testing.T) {
	g := mustGrid(t, []int{4, 3}, []bool{true, false})
	s := mustSystem(t, g, 20)
	nbar := []float64{0, 0.1, 0.2, 0.3, 0.4, 0.5, 0.6, 0.7, 0.8, 0.9, 1, 2}
	q := [3]float64{math.Pi / 2, 1, 7}
	state, err := Coherent(s, nbar, q)
	if err != nil {
		t.Fatal(err)
	}
	filling, field, p := make([]float64, 12), make([]complex128, 12), make([]float64, 12)
	state.Filling(filling)
	state.Field(field)
	state.Occupation(p, 3)
	for site, n := range nbar {
		angle := q[0]*float64(site%4) + q[1]*float64(site/4)
		near(t, "filling", filling[site], n, 2e-12)
		near(t, "distance of phi", cmplx.Abs(field[site]-cmplx.Rect(math.Sqrt(n), angle)), 0, 1e-12)
		near(t, "probability of 3", p[site], math.Exp(-n)*n*n*n/6, 1e-12)
	}
}

func TestCoherentRefuses(t *testing.T) {
	s := mustSystem(t, mustGrid(t, []int{2}, []bool{false}), 6)
	for _, tc := range []struct {
		filling []float64
		q       float64
		want    string
	}{
		{[]float64{1}, 0, "1 sites of 2"},
		{[]float64{-1, 0}, 0, "filling -1"},
		{[]float64{math.NaN(), 0}, 0, "filling NaN"},
		{[]float64{0, math.Inf(1)}, 0, "filling +Inf"},
		{[]float64{0, 1}, math.NaN(), "quasi-momentum NaN"},
		{[]float64{0, 2}, 0, "6 levels cut off 0.017"}, // 1 - e^-2 (1+2+2+4/3+2/3+4/15) = 0.0166
	} {
		if _, err := Coherent(s, tc.filling, [3]float64{tc.q}); err == nil || !strings.Contains(err.Error(), tc.want) {
			t.Errorf("%v: got %v, want an error with %q", tc.filling, err, tc.want)
		}
	}
}

// The weight that noise gives to other occupations is (2n+1) size^2 on average, with a
// spread of sqrt(5/9 / sites) relative for n = 1.
func TestNoise(t *testing.T) {
	s := mustSystem(t, mustGrid(t, []int{10000}, []bool{false}), 5)
	atoms := make([]int, 10000)
	for i := range atoms {
		atoms[i] = 1
	}
	const size = 1e-2
	draw := func(seed uint64) *State {
		state, err := Fock(s, atoms)
		if err != nil {
			t.Fatal(err)
		}
		if err := state.AddNoise(size, seed); err != nil {
			t.Fatal(err)
		}
		return state
	}
	a, b, c := draw(1), draw(1), draw(2)
	if !slices.Equal(a.amplitudes, b.amplitudes) || slices.Equal(a.amplitudes, c.amplitudes) {
		t.Error("noise is not a function of its seed")
	}
	if err := c.AddNoise(0, 7); err != nil || !slices.Equal(c.Seeds, []uint64{2, 7}) {
		t.Errorf("seeds %v, %v, want 2, 7", c.Seeds, err)
	}
	mean := func(n int) float64 {
		p := make([]float64, 10000)
		a.Occupation(p, n)
		sum := 0.0
		for _, v := range p {
			sum += v / 10000
		}
		return sum
	}
	// Five standard deviations, 5/sqrt(10000) of each, and size^4.
	near(t, "holes", mean(0), size*size, 0.05*size*size+10*math.Pow(size, 4))
	near(t, "particles", mean(2), 2*size*size, 0.05*2*size*size+10*math.Pow(size, 4))
	near(t, "beyond", mean(3)+mean(4), 0, 0)
	for _, bad := range []float64{-1, 1.5, math.NaN()} {
		if err := a.AddNoise(bad, 1); err == nil {
			t.Errorf("noise of size %g: want an error", bad)
		}
	}
}
