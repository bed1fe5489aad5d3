package gutzwiller

import (
	"context"
	"fmt"
	"math"
	"math/cmplx"
	"testing"

	"hilltop/bosehubbard/lattice"
	"hilltop/testdata"
)

// antiTrap is a cloud at the corner of the zone, U < 0 and V < 0, on a square of so
// many sites across; energies are in units of hbar J per second.
func antiTrap(t testing.TB, side int) (*State, Terms) {
	t.Helper()
	g := mustGrid(t, []int{side, side}, []bool{false, false})
	s := mustSystem(t, g, 6, g.Squares(0), g.Squares(1))
	radius := 0.3 * float64(side)
	state := NewState(s)
	x, y := g.Squares(0), g.Squares(1)
	for site, sign := range g.Stagger() {
		d := 0.9 * max(0, 1-(x[site]+y[site])/(radius*radius))
		if err := state.SetSite(site, []complex128{complex(math.Sqrt(1-d), 0), complex(sign*math.Sqrt(d), 0)}); err != nil {
			t.Fatal(err)
		}
	}
	const hz = 1 / (2 * math.Pi)
	v := -4 / (radius * radius) * hz
	return state, Terms{Tunnelling: [3]float64{hz, hz}, Interaction: -2.1 * hz, Weights: []float64{v, v}}
}

func mustEngine(t testing.TB, s *System, opt Options) *Engine {
	t.Helper()
	e, err := NewEngine(s, opt)
	if err != nil {
		t.Fatal(err)
	}
	return e
}

// mustAdvance follows a copy of the state from 0.
func mustAdvance(t testing.TB, state *State, drive Drive, seconds float64, opt Options) (*State, Report) {
	t.Helper()
	out := state.Clone()
	r, err := mustEngine(t, state.System, opt).Advance(context.Background(), out, drive, 0, seconds)
	if err != nil {
		t.Fatal(err)
	}
	return out, r
}

// distance is the root mean square over sites of the distance of their amplitudes,
// and the largest one.
func distance(a, b *State) (mean, largest float64) {
	f, g := make([]complex128, a.System.Levels), make([]complex128, a.System.Levels)
	for site := range a.System.Grid.Sites {
		a.Site(f, site)
		b.Site(g, site)
		sum := 0.0
		for n := range f {
			sum += norm(f[n] - g[n])
		}
		mean += sum / float64(a.System.Grid.Sites)
		largest = max(largest, math.Sqrt(sum))
	}
	return math.Sqrt(mean), largest
}

// The plain method takes the same steps as a NumPy script; 400 rates, each with
// rounding of 1e-16 times amplitudes up to 1 and energies up to 25, step 0.01.
func TestPlainMethodAgainstNumPy(t *testing.T) {
	state, terms := antiTrap(t, 64)
	out, report := mustAdvance(t, state, Constant(terms), 1, Options{PlainStep: 0.01, TopLimit: 1})
	if report.Steps != 100 {
		t.Errorf("%d steps, want 100", report.Steps)
	}
	sheet := testdata.Table(t, "gutzwiller_rk4")
	x, y := sheet.Floats(t, "x"), sheet.Floats(t, "y")
	f := make([]complex128, 6)
	for n := range f {
		re, im := sheet.Floats(t, fmt.Sprintf("re%d", n)), sheet.Floats(t, fmt.Sprintf("im%d", n))
		for i := range re {
			out.Site(f, int(x[i])+64*int(y[i]))
			if d := cmplx.Abs(f[n] - complex(re[i], im[i])); !(d < 2e-13) {
				t.Errorf("x = %g, y = %g, n = %d: got %v, want %g%+gi, difference %.2g", x[i], y[i], n, f[n], re[i], im[i], d)
			}
		}
	}
}

// slow is the equations of motion on the bonds of package lattice, one site and one
// level after the other, with the classical method.
type slow struct {
	box    *lattice.Lattice
	terms  Terms
	v      []float64
	levels int
}

func (s *slow) rate(f [][]complex128) [][]complex128 {
	phi, mean := make([]complex128, len(f)), make([]complex128, len(f))
	for i := range f {
		for n := 1; n < s.levels; n++ {
			phi[i] += complex(math.Sqrt(float64(n)), 0) * cmplx.Conj(f[i][n-1]) * f[i][n]
		}
	}
	for _, b := range s.box.Bonds {
		j := complex(s.terms.Tunnelling[b.Axis], 0)
		mean[b.From] += j * phi[b.To]
		mean[b.To] += j * phi[b.From]
	}
	out := make([][]complex128, len(f))
	for i := range f {
		out[i] = make([]complex128, s.levels)
		for n := range s.levels {
			x := float64(n)
			h := complex(s.terms.Interaction*x*(x-1)/2+s.v[i]*x, 0) * f[i][n]
			if n > 0 {
				h -= mean[i] * complex(math.Sqrt(x), 0) * f[i][n-1]
			}
			if n+1 < s.levels {
				h -= cmplx.Conj(mean[i]) * complex(math.Sqrt(x+1), 0) * f[i][n+1]
			}
			out[i][n] = -2i * math.Pi * h
		}
	}
	return out
}

func (s *slow) step(f [][]complex128, h float64) [][]complex128 {
	add := func(a [][]complex128, c float64, k [][]complex128) [][]complex128 {
		out := make([][]complex128, len(a))
		for i := range a {
			out[i] = make([]complex128, len(a[i]))
			for n := range a[i] {
				out[i][n] = a[i][n] + complex(c, 0)*k[i][n]
			}
		}
		return out
	}
	k1 := s.rate(f)
	k2 := s.rate(add(f, h/2, k1))
	k3 := s.rate(add(f, h/2, k2))
	k4 := s.rate(add(f, h, k3))
	return add(add(add(add(f, h/6, k1), h/3, k2), h/3, k3), h/6, k4)
}

// Both methods against the slow one on every kind of grid, with different tunnelling
// along the axes. The slow one is good to 1e-10: (2 pi 8 h)^5 per step.
func TestAgainstSlow(t *testing.T) {
	for _, shape := range shapes {
		g := mustGrid(t, shape.sites, shape.periodic)
		box, err := lattice.Box(shape.sites, shape.periodic)
		if err != nil {
			t.Fatal(err)
		}
		s := mustSystem(t, g, 4, g.Squares(0), g.Coordinates(g.Axes-1))
		curvature := -4 / float64(shape.sites[0]*shape.sites[0])
		terms := Terms{Tunnelling: [3]float64{1, 0.6, -0.8}, Interaction: -3, Weights: []float64{curvature, 0.01}}
		state := scramble(t, s, 4)
		const steps, duration = 100, 0.05
		reference := &slow{box: box, terms: terms, v: s.potential(terms), levels: 4}
		f := make([][]complex128, g.Sites)
		for i := range f {
			f[i] = make([]complex128, 4)
			state.Site(f[i], i)
		}
		for range steps {
			f = reference.step(f, duration/steps)
		}
		want := NewState(s)
		for i := range f {
			if err := want.SetSite(i, f[i]); err != nil {
				t.Fatal(err)
			}
		}
		name := fmt.Sprint(shape.sites, shape.periodic)
		plain, _ := mustAdvance(t, state, Constant(terms), duration, Options{PlainStep: duration / steps, TopLimit: 1})
		if _, d := distance(plain, want); !(d < 1e-8) { // the slow one was set to norm 1
			t.Errorf("%s, plain method: distance %.3g, want below 1e-8", name, d)
		}
		good, _ := mustAdvance(t, state, Constant(terms), duration, Options{Tolerance: 1e-11, TopLimit: 1})
		if _, d := distance(good, want); !(d < 1e-8) {
			t.Errorf("%s: distance %.3g, want below 1e-8", name, d)
		}
	}
}
