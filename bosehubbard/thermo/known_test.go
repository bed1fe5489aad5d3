package thermo

import (
	"context"
	"math"
	"slices"
	"testing"

	"gonum.org/v1/gonum/lapack/gonum"
	"gonum.org/v1/gonum/mat"

	"hilltop/bosehubbard"
	"hilltop/bosehubbard/lattice"
)

func box(t testing.TB, atoms int, interaction float64, axes []bosehubbard.AxisTerms, periodic bool, sites ...int) System {
	t.Helper()
	around := make([]bool, len(sites))
	for i := range around {
		around[i] = periodic
	}
	l, err := lattice.Box(sites, around)
	if err != nil {
		t.Fatal(err)
	}
	return System{Lattice: l, Atoms: atoms, Model: bosehubbard.Model{Axes: axes, Interaction: interaction}}
}

// known is a system whose whole spectrum comes from elsewhere.
type known struct {
	name   string
	system System
	levels []float64
}

// knownSystems lists systems of different kinds.
func knownSystems(t testing.TB) []known {
	t.Helper()
	line := []bosehubbard.AxisTerms{{Tunnelling: 1}}
	antitrap := []bosehubbard.AxisTerms{{Tunnelling: 1, Curvature: -0.3, Tilt: 0.2}, {Tunnelling: 0.7, Curvature: -0.1, Tilt: 0.05}}
	all := []known{
		{name: "free bosons on a chain", system: box(t, 8, 0, line, false, 8)},
		{name: "free bosons on a tilted anti-trap", system: box(t, 8, 0, antitrap, false, 4, 2)},
		{name: "two free atoms on a torus", system: box(t, 2, 0, []bosehubbard.AxisTerms{{Tunnelling: 1}, {Tunnelling: 0.3}}, true, 8, 9)},
		{name: "many atoms on two sites", system: box(t, 3000, -0.002, []bosehubbard.AxisTerms{{Tunnelling: 1, Tilt: 0.3}}, false, 2)},
		{name: "attractive ladder", system: box(t, 5, -2.1, antitrap, false, 4, 2)},
	}
	for i := range all[:3] {
		all[i].levels = freeBosons(t, all[i].system)
	}
	all[3].levels = twoSites(t, all[3].system)
	all[4].levels = allLevels(t, all[4].system)
	for i := range all {
		slices.Sort(all[i].levels)
	}
	return all
}

// allLevels diagonalises in full.
func allLevels(t testing.TB, s System) []float64 {
	t.Helper()
	sp, err := s.whole(context.Background(), resources{lanes: 1, vectors: 2})
	if err != nil {
		t.Fatal(err)
	}
	levels, err := sp.spectrum(context.Background())
	if err != nil {
		t.Fatal(err)
	}
	return levels
}

// freeBosons adds up the energies of one atom in every way.
func freeBosons(t testing.TB, s System) []float64 {
	t.Helper()
	n := s.Lattice.Sites
	h := mat.NewSymDense(n, nil)
	for i, p := range s.Lattice.Positions {
		v := 0.0
		for a, terms := range s.Model.Axes {
			v += terms.Curvature*p[a]*p[a] + terms.Tilt*p[a]
		}
		h.SetSym(i, i, v)
	}
	for _, b := range s.Lattice.Bonds {
		h.SetSym(b.From, b.To, -s.Model.Axes[b.Axis].Tunnelling)
	}
	var eig mat.EigenSym
	if !eig.Factorize(h, false) {
		t.Fatal("one atom did not converge")
	}
	single := eig.Values(nil)
	var levels []float64
	var add func(from, atoms int, energy float64)
	add = func(from, atoms int, energy float64) {
		if atoms == 0 {
			levels = append(levels, energy)
			return
		}
		for k := from; k < len(single); k++ {
			add(k, atoms-1, energy+single[k])
		}
	}
	add(0, s.Atoms, 0)
	return levels
}

// twoSites diagonalises the tridiagonal matrix of N atoms on two sites at +-1/2,
//
//	<n|H|n> = U/2 (n(n-1) + (N-n)(N-n-1)) + F (n-(N-n))(-1/2),  <n|H|n+1> = -J sqrt((n+1)(N-n))
//
// n atoms on the first.
func twoSites(t testing.TB, s System) []float64 {
	t.Helper()
	atoms := s.Atoms
	d, e := make([]float64, atoms+1), make([]float64, atoms)
	for n := range d {
		a, b := float64(n), float64(atoms-n)
		d[n] = s.Model.Interaction/2*(a*(a-1)+b*(b-1)) + s.Model.Axes[0].Tilt*(b-a)/2
		if n < atoms {
			e[n] = -s.Model.Axes[0].Tunnelling * math.Sqrt((a+1)*b)
		}
	}
	if !(gonum.Implementation{}).Dsterf(len(d), d, e) {
		t.Fatal("two sites did not converge")
	}
	return d
}
