package gutzwiller

import (
	"context"
	"fmt"
	"math"
	"math/cmplx"
	"slices"
	"testing"
)

// uniform returns a coherent state with one filling and one quasi-momentum.
func uniform(t testing.TB, s *System, filling float64, momentum [3]float64) *State {
	t.Helper()
	list := make([]float64, s.Grid.Sites)
	for i := range list {
		list[i] = filling
	}
	state, err := Coherent(s, list, momentum)
	if err != nil {
		t.Fatal(err)
	}
	return state
}

// Collapse and revival after a jump to a deep lattice, J = 0: a coherent state of nbar
// atoms has
//
//	phi(t) = alpha exp(nbar (e^(-i theta) - 1)) e^(-i eta)
//
// theta and eta the integrals of 2 pi U and 2 pi V. Derived: the matrix element
// between n and n+1 turns by theta n + eta. It revives whenever U t is a whole number.
// A ramp of U is as good, and any time takes one step.
func TestCollapseAndRevival(t *testing.T) {
	g := mustGrid(t, []int{70}, []bool{false})
	s := mustSystem(t, g, 20, g.Squares(0))
	const nbar, v = 1.3, 0.37
	state := uniform(t, s, nbar, [3]float64{0.4})
	start := make([]complex128, 70)
	state.Field(start)
	field := make([]complex128, 70)
	for _, u := range []float64{18e3, -18e3} {
		for _, turns := range []float64{0.1, 0.5, 1, 3.25, 54} {
			for _, change := range []float64{0, 3} { // U(t) = u + change u^2 t
				seconds := turns / math.Abs(u)
				drive := func(at float64, terms *Terms) {
					terms.Tunnelling = [3]float64{}
					terms.Interaction = u + change*u*u*at
					terms.Weights[0] = v
				}
				out, report := mustAdvance(t, state, drive, seconds, Options{})
				if report.Steps != 1 {
					t.Errorf("U = %g Hz for %g s: %d steps, want 1", u, seconds, report.Steps)
				}
				theta := 2 * math.Pi * (u*seconds + change*u*u*seconds*seconds/2)
				out.Field(field)
				for i, x := range g.Squares(0) {
					want := start[i] * cmplx.Exp(nbar*(cmplx.Exp(complex(0, -theta))-1)) * cmplx.Exp(complex(0, -2*math.Pi*v*x*seconds))
					// Rounding of the angle, n up to 19 times theta.
					if d := cmplx.Abs(field[i] - want); !(d < 1e-12+2e-15*math.Abs(theta)) {
						t.Fatalf("U = %g Hz, %g turns, ramp %g, site %d: got %v, want %v", u, turns, change, i, field[i], want)
					}
				}
			}
		}
	}
}

// Without interaction coherent states stay coherent and alpha moves like one
// particle: from one site of a long chain to distance j with i^j J_j(4 pi J t).
// Source: free particle in a tight-binding band, i d/dt alpha_j = -J (alpha_(j-1) +
// alpha_(j+1)), DLMF 10.6.1.
func TestSpreading(t *testing.T) {
	g := mustGrid(t, []int{101}, []bool{false})
	s := mustSystem(t, g, 14)
	filling := make([]float64, 101)
	filling[50] = 0.8
	state, err := Coherent(s, filling, [3]float64{})
	if err != nil {
		t.Fatal(err)
	}
	const j, seconds = 25.0, 0.03
	out, _ := mustAdvance(t, state, Constant(Terms{Tunnelling: [3]float64{j}}), seconds, Options{Tolerance: 1e-11})
	field := make([]complex128, 101)
	out.Field(field)
	for site, phi := range field {
		order := site - 50
		want := complex(math.Sqrt(0.8)*math.Jn(order, 4*math.Pi*j*seconds), 0)
		for range ((order % 4) + 4) % 4 {
			want *= 1i
		}
		if d := cmplx.Abs(phi - want); !(d < 1e-8) {
			t.Errorf("site %d: phi = %v, want %v", site, phi, want)
		}
	}
}

// A perfect insulator stays where it is, whatever is done to it, until it has a seed.
func TestMottStays(t *testing.T) {
	g := mustGrid(t, []int{6, 7}, []bool{false, true})
	s := mustSystem(t, g, 5, g.Squares(0))
	atoms := make([]int, 42)
	for i := range atoms {
		atoms[i] = 1
	}
	mott, err := Fock(s, atoms)
	if err != nil {
		t.Fatal(err)
	}
	drive := Constant(Terms{Tunnelling: [3]float64{1, 1}, Interaction: 1, Weights: []float64{0.01}})
	out, report := mustAdvance(t, mott, drive, 10, Options{})
	p := make([]float64, 42)
	out.Occupation(p, 1)
	for site, w := range p {
		if math.Abs(w-1) > 1e-14 {
			t.Errorf("site %d: probability %.15g of one atom, want 1", site, w)
		}
	}
	if report.Steps > 8 {
		t.Errorf("%d steps, want only those in which the first short one grows", report.Steps)
	}
	if err := mott.AddNoise(1e-3, 5); err != nil {
		t.Fatal(err)
	}
	out, _ = mustAdvance(t, mott, drive, 10, Options{TopLimit: 1})
	m, err := out.Measure(Terms{Weights: []float64{0}})
	if err != nil {
		t.Fatal(err)
	}
	if m.Coherent < 0.01 {
		t.Errorf("coherent share %g with a seed, want an instability", m.Coherent)
	}
	if !slices.Equal(out.Seeds, []uint64{5}) {
		t.Errorf("seeds %v, want 5", out.Seeds)
	}
}

// If f(t) follows (J, U, V), then conj(f(t)) with the sign (-1)^(n(x+y+z)) follows
// (J, -U, -V). Derived: conjugation turns H to -H, the signs turn J back.
// Source for the symmetry: Schneider et al., Nature Physics 8, 213 (2012), from memory.
func TestMirroredDynamics(t *testing.T) {
	g := mustGrid(t, []int{6, 4, 5}, []bool{true, true, false})
	s := mustSystem(t, g, 5, g.Squares(0), g.Coordinates(2))
	state := scramble(t, s, 7)
	mirror := func(in *State) *State {
		out := NewState(s)
		f := make([]complex128, 5)
		for site, sign := range g.Stagger() {
			in.Site(f, site)
			for n := range f {
				f[n] = cmplx.Conj(f[n])
				if n%2 == 1 {
					f[n] *= complex(sign, 0)
				}
			}
			if err := out.SetSite(site, f); err != nil {
				t.Fatal(err)
			}
		}
		return out
	}
	reversed := func(seconds float64, at *Terms) {
		ramp(2)(seconds, at)
		at.Interaction *= -1
		for k := range at.Weights {
			at.Weights[k] *= -1
		}
	}
	want, _ := mustAdvance(t, state, ramp(2), 0.3, Options{Tolerance: 1e-10, TopLimit: 1})
	got, _ := mustAdvance(t, mirror(state), reversed, 0.3, Options{Tolerance: 1e-10, TopLimit: 1})
	if _, d := distance(got, mirror(want)); !(d < 1e-11) { // the same steps, other rounding
		t.Errorf("mirrored run is %.3g from the mirror of the run", d)
	}
	a, err := want.Measure(Terms{Tunnelling: [3]float64{1, 1, 1}, Interaction: 2, Weights: []float64{1, 1}})
	if err != nil {
		t.Fatal(err)
	}
	b, err := got.Measure(Terms{Tunnelling: [3]float64{1, 1, 1}, Interaction: -2, Weights: []float64{-1, -1}})
	if err != nil {
		t.Fatal(err)
	}
	near(t, "energy", b.Energy(), -a.Energy(), 1e-10)
	near(t, "corner", b.Corner, a.Centre, 1e-10)
	near(t, "square", b.Square, a.Square, 1e-10)
}

// A small superfluid cloud, displaced by one site, swings at the frequency of the
// effective mass hbar^2/(2 J d^2) in the trap V x^2: hbar omega = sqrt(4 J V), or
// 2 sqrt(J V) in Hz. Source: effective mass of a tight-binding band, derived; the
// first correction for the shape of the band, -J q^4/12, is -V/4 (first order,
// spacing of the two lowest levels; derived). Beyond it come the displacement,
// 1/16 (q_max)^2 with q_max = sqrt(V/J), and the density with U, so 1 % is asked for.
func TestDipole(t *testing.T) {
	const j, v, atoms = 100.0, 0.1, 3.0
	for _, u := range []float64{0.5, -0.5} { // floor, and ceiling with V < 0
		g := mustGrid(t, []int{80}, []bool{false})
		s := mustSystem(t, g, 9, g.Squares(0), g.Coordinates(0))
		sign := math.Copysign(1, u)
		terms := Terms{Tunnelling: [3]float64{j}, Interaction: u * j / 5, Weights: []float64{sign * v, -2 * sign * v}}
		ground, err := Ground(context.Background(), s, terms, GroundOptions{Ceiling: u < 0, Atoms: atoms, Tolerance: 1e-8})
		if err != nil {
			t.Fatal(err)
		}
		terms.Weights[1] = 0 // V (x-1)^2 -> V x^2
		state := ground.State
		middle := func() float64 {
			m, err := state.Measure(terms)
			if err != nil {
				t.Fatal(err)
			}
			return m.Middle[0]
		}
		near(t, "displacement", middle(), 1, 1e-6)
		want := 2*math.Sqrt(j*v) - v/4
		// The centre crosses 0 after one and three quarters of a period.
		e := mustEngine(t, s, Options{Tolerance: 1e-7})
		step := 1 / want / 400
		var crossings []float64
		last := middle()
		for i := range 400 {
			if _, err := e.Advance(context.Background(), state, Constant(terms), step*float64(i), step*float64(i+1)); err != nil {
				t.Fatal(err)
			}
			now := middle()
			if last*now < 0 {
				crossings = append(crossings, step*(float64(i)+last/(last-now)))
			}
			last = now
		}
		if len(crossings) != 2 {
			t.Fatalf("U/J = %g: %d crossings in one period, want 2", u/5, len(crossings))
		}
		got := 0.5 / (crossings[1] - crossings[0])
		t.Logf("U/J = %g: %.4f Hz, effective mass %.4f Hz", u/5, got, want)
		near(t, fmt.Sprintf("dipole frequency at U/J = %g", u/5), got, want, 0.01*want)
	}
}
