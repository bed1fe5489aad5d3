package thermo

import (
	"context"
	"math"
	"testing"

	"gonum.org/v1/gonum/floats"

	"hilltop/bosehubbard"
)

// At beta = 0 all states of N atoms on L sites are equally likely: <n_i> = N/L,
// <n_i (n_i - 1)> = 2 N(N-1)/(L(L+1)), and no coherence. Derived.
func TestObservablesAtInfiniteTemperature(t *testing.T) {
	const sites, atoms = 5, 4
	s := box(t, atoms, -2.1, []bosehubbard.AxisTerms{{Tunnelling: 1, Curvature: -0.05}}, false, sites)
	o := mustCanonical(t, s, []float64{0}, CanonicalOptions{Observables: true}).Points[0].Observables
	n := float64(atoms) / sites
	square := n + 2*atoms*(atoms-1)/float64(sites*(sites+1))
	for i := range sites {
		if math.Abs(o.Occupation[i]-n) > 1e-12 || math.Abs(o.SquaredOccupation[i]-square) > 1e-12 {
			t.Errorf("site %d: <n> = %.15g, <n^2> = %.15g, want %.15g and %.15g", i, o.Occupation[i], o.SquaredOccupation[i], n, square)
		}
		for j := range i {
			if c := o.Correlation[i*sites+j]; math.Abs(c) > 1e-12 {
				t.Errorf("<b_%d^+ b_%d> = %g, want 0", i, j, c)
			}
		}
	}
	if math.Abs(o.Centre-1./sites) > 1e-12 || math.Abs(o.Corner-1./sites) > 1e-12 {
		t.Errorf("shares %g and %g, want 1/%d", o.Centre, o.Corner, sites)
	}
}

// The energy is the sum of its parts, the momenta of a ring hold all atoms, and an
// attractive ring at beta < 0 fills the corner, a repulsive one at beta > 0 the
// centre.
func TestObservablesAddUp(t *testing.T) {
	const sites, atoms, beta = 6, 5, 0.6
	for _, sign := range []float64{1, -1} {
		s := box(t, atoms, sign*3, []bosehubbard.AxisTerms{{Tunnelling: 1}}, true, sites)
		p := mustCanonical(t, s, []float64{sign * beta}, CanonicalOptions{Observables: true}).Points[0]
		o := p.Observables
		energy := 0.0
		for i := range sites {
			energy += sign * 3 / 2 * (o.SquaredOccupation[i] - o.Occupation[i])
			energy -= 2 * o.Correlation[i*sites+(i+1)%sites]
		}
		if math.Abs(energy-p.Energy) > 1e-11 || math.Abs(floats.Sum(o.Occupation)-atoms) > 1e-11 {
			t.Errorf("sign %g: parts add up to %.14g Hz, want %.14g; %.14g atoms", sign, energy, p.Energy, floats.Sum(o.Occupation))
		}
		all := 0.0
		for m := range sites {
			all += o.Momentum(s.Lattice, [3]float64{2 * math.Pi * float64(m) / sites})
		}
		full, little := o.Centre, o.Corner
		if sign < 0 {
			full, little = little, full
		}
		if math.Abs(all-1) > 1e-12 || !(full > 0.5 && little < 0.1) {
			t.Errorf("sign %g: momenta hold %.14g of the atoms, centre %g, corner %g", sign, all, o.Centre, o.Corner)
		}
		if at := o.Momentum(s.Lattice, corner(s.Lattice)); math.Abs(at-o.Corner) > 1e-12 {
			t.Errorf("sign %g: Momentum at the corner %g, want %g", sign, at, o.Corner)
		}
	}
}

// Thermal vectors against all eigenstates: the bars hold nine in ten of the values.
func TestObservablesOfRandomVectors(t *testing.T) {
	if testing.Short() {
		t.Skip("many runs")
	}
	k := knownSystems(t)[4] // 792 states, no mirror
	betas := []float64{-2, -0.5, -0.1, 0, 0.1, 0.5, 2}
	got := mustCanonical(t, k.system, betas, CanonicalOptions{Observables: true, Vectors: 32})
	r := resources{lanes: 1, vectors: 2 + chunk}
	sp, err := k.system.whole(context.Background(), r)
	if err != nil {
		t.Fatal(err)
	}
	e := &ensemble{space: sp, exact: true, edges: make([][]edge, 1)}
	if e.edges[0], err = sp.states(context.Background(), 0, 0); err != nil {
		t.Fatal(err)
	}
	e.findRange()
	want := make([]Average, len(betas))
	for i, beta := range betas {
		want[i].Beta = beta
	}
	if err := e.observe(context.Background(), k.system.Lattice, k.system.Atoms, want); err != nil {
		t.Fatal(err)
	}
	inside, bars := 0, 0
	for i, p := range got.Points {
		o, w := p.Observables, want[i].Observables
		for _, lists := range [][3][]float64{
			{o.Occupation, o.OccupationError, w.Occupation},
			{o.SquaredOccupation, o.SquaredOccupationError, w.SquaredOccupation},
			{o.Correlation, o.CorrelationError, w.Correlation},
			{{o.Centre, o.Corner}, {o.CentreError, o.CornerError}, {w.Centre, w.Corner}},
		} {
			for n := range lists[0] {
				diff := math.Abs(lists[0][n] - lists[2][n])
				if !(diff <= 3*lists[1][n]+1e-9) {
					t.Errorf("beta %g: value %d is %.9g +- %.2g, want %.9g", p.Beta, n, lists[0][n], lists[1][n], lists[2][n])
				}
				if bars++; diff <= lists[1][n]+1e-9 {
					inside++
				}
			}
		}
	}
	if share := float64(inside) / float64(bars); share < 0.9 || share == 1 {
		t.Errorf("bars hold %.3f of the exact values, want 0.95", share)
	}
}

func TestMomentumPanicsOnAnotherLattice(t *testing.T) {
	defer func() {
		if recover() == nil {
			t.Error("no panic")
		}
	}()
	o := Observables{Correlation: make([]float64, 4), Occupation: make([]float64, 2)}
	o.Momentum(box(t, 1, 0, []bosehubbard.AxisTerms{{}}, false, 3).Lattice, [3]float64{})
}
