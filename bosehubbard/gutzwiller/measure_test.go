package gutzwiller

import (
	"math"
	"math/cmplx"
	"strings"
	"testing"

	"hilltop/bosehubbard/lattice"
)

// A measure is compared with plain sums over the bonds and sites of package lattice.
func TestMeasure(t *testing.T) {
	for _, shape := range shapes {
		g := mustGrid(t, shape.sites, shape.periodic)
		box, err := lattice.Box(shape.sites, shape.periodic)
		if err != nil {
			t.Fatal(err)
		}
		s := mustSystem(t, g, 5, g.Squares(0), g.Coordinates(0))
		state := scramble(t, s, 9)
		terms := Terms{Tunnelling: [3]float64{1, 0.7, -0.3}, Interaction: -2.1, Weights: []float64{-0.05, 0.4}}
		got, err := state.Measure(terms)
		if err != nil {
			t.Fatal(err)
		}
		phi := make([]complex128, g.Sites)
		state.Field(phi)
		f := make([]complex128, 5)
		want := Measure{}
		var plain, corner complex128
		for i, at := range box.Positions {
			state.Site(f, i)
			sign := 1.0
			for a, x := range at {
				if a < len(shape.sites) && int(x+float64(shape.sites[a]-1)/2)%2 == 1 {
					sign = -sign
				}
			}
			plain += phi[i]
			corner += complex(sign, 0) * phi[i]
			want.Coherent += real(phi[i] * cmplx.Conj(phi[i]))
			for n, a := range f {
				w, x := real(a*cmplx.Conj(a)), float64(n)
				want.Atoms += w * x
				want.Square += w * x * x / float64(g.Sites)
				want.Interaction += terms.Interaction / 2 * w * x * (x - 1)
				want.Potential += (-0.05*at[0]*at[0] + 0.4*at[0]) * w * x
				want.SiteShares[min(n, 3)] += w / float64(g.Sites)
				for a, x := range at {
					want.Middle[a] += w * float64(n) * x
					want.Radius += w * float64(n) * x * x
				}
			}
		}
		for _, b := range box.Bonds {
			want.Kinetic -= terms.Tunnelling[b.Axis] * 2 * real(cmplx.Conj(phi[b.From])*phi[b.To])
		}
		near(t, "atoms", got.Atoms, want.Atoms, 1e-12*want.Atoms)
		near(t, "kinetic", got.Kinetic, want.Kinetic/want.Atoms, 1e-12)
		near(t, "interaction", got.Interaction, want.Interaction/want.Atoms, 1e-12)
		near(t, "potential", got.Potential, want.Potential/want.Atoms, 1e-10)
		near(t, "energy", got.Energy(), (want.Kinetic+want.Interaction+want.Potential)/want.Atoms, 1e-10)
		square := want.Radius / want.Atoms
		for a := range 3 {
			near(t, "middle", got.Middle[a], want.Middle[a]/want.Atoms, 1e-12)
			square -= got.Middle[a] * got.Middle[a]
		}
		near(t, "square of the radius", got.Radius*got.Radius, square, 1e-9)
		near(t, "square", got.Square, want.Square, 1e-12)
		near(t, "coherent", got.Coherent, want.Coherent/want.Atoms, 1e-12)
		near(t, "centre", got.Centre, real(plain*cmplx.Conj(plain))/want.Atoms, 1e-10)
		near(t, "corner", got.Corner, real(corner*cmplx.Conj(corner))/want.Atoms, 1e-10)
		for i := range want.SiteShares {
			near(t, "share of sites", got.SiteShares[i], want.SiteShares[i], 1e-13)
		}
		near(t, "shares of atoms", got.AtomShares[0]+got.AtomShares[1]+got.AtomShares[2], 1, 1e-13)
		near(t, "atoms alone", got.AtomShares[0], want.SiteShares[1]*float64(g.Sites)/want.Atoms, 1e-13)
	}
}

// Hand values: two atoms, at -1.5 and at +0.5 of a chain of four sites.
func TestMeasurePlace(t *testing.T) {
	g := mustGrid(t, []int{4}, []bool{false})
	state, err := Fock(mustSystem(t, g, 4), []int{1, 0, 1, 0})
	if err != nil {
		t.Fatal(err)
	}
	m, err := state.Measure(Terms{})
	if err != nil {
		t.Fatal(err)
	}
	near(t, "middle", m.Middle[0], -0.5, 1e-15)
	near(t, "radius", m.Radius, 1, 1e-15)
	if m.SiteShares != [4]float64{0.5, 0.5, 0, 0} || m.AtomShares != [3]float64{1, 0, 0} {
		t.Errorf("shares %v, %v, want half and half, all alone", m.SiteShares, m.AtomShares)
	}
}

// All phases agree at the momentum of a coherent state.
func TestMeasureOfCoherent(t *testing.T) {
	g := mustGrid(t, []int{8, 8}, []bool{true, true})
	s := mustSystem(t, g, 20)
	filling := make([]float64, 64)
	for i := range filling {
		filling[i] = 0.7
	}
	for _, q := range []float64{0, math.Pi} {
		state, err := Coherent(s, filling, [3]float64{q, q})
		if err != nil {
			t.Fatal(err)
		}
		m, err := state.Measure(Terms{Tunnelling: [3]float64{1, 1}})
		if err != nil {
			t.Fatal(err)
		}
		near(t, "kinetic energy", m.Kinetic, -4*math.Cos(q), 1e-12)
		near(t, "centre", m.Centre, 64*(1+math.Cos(q))/2, 1e-10)
		near(t, "corner", m.Corner, 64*(1-math.Cos(q))/2, 1e-10)
		near(t, "coherent", m.Coherent, 1, 1e-12)
		near(t, "square", m.Square, 0.7*0.7+0.7, 1e-12)
	}
}

func TestMeasureOfNothing(t *testing.T) {
	g := mustGrid(t, []int{5}, []bool{false})
	s := mustSystem(t, g, 3, g.Squares(0))
	m, err := NewState(s).Measure(Terms{Weights: []float64{1}})
	if want := (Measure{SiteShares: [4]float64{1}}); err != nil || m != want {
		t.Errorf("got %+v, %v, want only empty sites", m, err)
	}
	for _, terms := range []Terms{{}, {Weights: []float64{math.NaN()}}, {Weights: []float64{1}, Interaction: math.Inf(1)}} {
		if _, err := NewState(s).Measure(terms); err == nil || !strings.Contains(err.Error(), "weights") {
			t.Errorf("%+v: got %v, want an error", terms, err)
		}
	}
}
