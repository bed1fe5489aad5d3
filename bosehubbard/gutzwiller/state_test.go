package gutzwiller

import (
	"math"
	"math/cmplx"
	"math/rand/v2"
	"strings"
	"testing"
)

func mustSystem(t testing.TB, g *Grid, levels int, shapes ...[]float64) *System {
	t.Helper()
	s, err := NewSystem(g, levels, shapes...)
	if err != nil {
		t.Fatal(err)
	}
	return s
}

// scramble gives every site random amplitudes that fall with the number of atoms.
func scramble(t testing.TB, s *System, seed uint64) *State {
	t.Helper()
	random := rand.New(rand.NewPCG(seed, 0))
	state := NewState(s)
	f := make([]complex128, s.Levels)
	for site := range s.Grid.Sites {
		for n := range f {
			size := math.Exp(-float64(n * n))
			f[n] = complex(size*random.NormFloat64(), size*random.NormFloat64())
		}
		if err := state.SetSite(site, f); err != nil {
			t.Fatal(err)
		}
	}
	return state
}

func TestSetSite(t *testing.T) {
	s := mustSystem(t, mustGrid(t, []int{70}, []bool{false}), 4)
	state := NewState(s)
	f := make([]complex128, 4)
	for _, size := range []float64{1, 1e-300, 1e300} { // scaled before they are squared
		if err := state.SetSite(65, []complex128{complex(3*size, 0), complex(0, 4*size)}); err != nil {
			t.Fatal(err)
		}
		state.Site(f, 65)
		if cmplx.Abs(f[0]-0.6) > 1e-15 || cmplx.Abs(f[1]-0.8i) > 1e-15 || f[2] != 0 || f[3] != 0 {
			t.Errorf("size %g: got %v, want 0.6, 0.8i, 0, 0", size, f)
		}
	}
	state.Site(f, 64)
	if f[0] != 1 {
		t.Errorf("the site beside it: %v, want no atoms", f)
	}
	other := state.Clone()
	if err := other.SetSite(65, []complex128{1}); err != nil {
		t.Fatal(err)
	}
	if state.Site(f, 65); cmplx.Abs(f[1]-0.8i) > 1e-15 {
		t.Error("a clone shares its amplitudes")
	}
	for _, tc := range []struct {
		site int
		f    []complex128
		want string
	}{
		{-1, []complex128{1}, "site -1"},
		{70, []complex128{1}, "site 70"},
		{0, make([]complex128, 5), "5 amplitudes"},
		{0, []complex128{0, 0}, "not all zero"},
		{0, nil, "not all zero"},
		{0, []complex128{1, complex(0, math.NaN())}, "finite"},
		{0, []complex128{complex(math.Inf(1), 0)}, "finite"},
	} {
		if err := state.SetSite(tc.site, tc.f); err == nil || !strings.Contains(err.Error(), tc.want) {
			t.Errorf("site %d, %v: got %v, want an error with %q", tc.site, tc.f, err, tc.want)
		}
	}
}

// Everything that can be read agrees with the amplitudes, site by site.
func TestReadings(t *testing.T) {
	s := mustSystem(t, mustGrid(t, []int{13, 7}, []bool{false, true}), 5)
	state := scramble(t, s, 1)
	filling, field := make([]float64, 91), make([]complex128, 91)
	state.Filling(filling)
	state.Field(field)
	f := make([]complex128, 5)
	p := make([]float64, 91)
	for site := range 91 {
		state.Site(f, site)
		mean, phi := 0.0, complex(0, 0)
		for n, a := range f {
			w := real(a)*real(a) + imag(a)*imag(a)
			mean += float64(n) * w
			if n > 0 {
				phi += complex(math.Sqrt(float64(n)), 0) * cmplx.Conj(f[n-1]) * a
			}
			if state.Occupation(p, n); math.Abs(p[site]-w) > 1e-15 {
				t.Errorf("site %d: probability %g of %d atoms, want %g", site, p[site], n, w)
			}
		}
		near(t, "filling", filling[site], mean, 1e-14)
		near(t, "field", cmplx.Abs(field[site]-phi), 0, 1e-14)
	}
	for _, n := range []int{-1, 5} {
		if state.Occupation(p, n); p[0] != 0 {
			t.Errorf("probability %g of %d atoms, want 0", p[0], n)
		}
	}
}
