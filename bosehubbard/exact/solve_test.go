package exact

import (
	"context"
	"math"
	"slices"
	"strconv"
	"strings"
	"testing"

	"hilltop/bosehubbard"
	"hilltop/bosehubbard/fock"
	"hilltop/bosehubbard/lattice"
	"hilltop/testdata"
)

// system is one problem in tests.
type system struct {
	sites    []int
	periodic []bool
	atoms    int
	model    bosehubbard.Model
}

func chain(sites, atoms int, periodic bool, u, v float64) system {
	axis := bosehubbard.AxisTerms{Tunnelling: 1, Curvature: v}
	return system{[]int{sites}, []bool{periodic}, atoms, bosehubbard.Model{Axes: []bosehubbard.AxisTerms{axis}, Interaction: u}}
}

func (s system) solve(t testing.TB, opt Options) Ends {
	t.Helper()
	l, err := lattice.Box(s.sites, s.periodic)
	if err != nil {
		t.Fatal(err)
	}
	ends, err := Solve(context.Background(), l, s.model, s.atoms, opt)
	if err != nil {
		t.Fatalf("%+v: %v", s, err)
	}
	return ends
}

// terms writes the system out.
func (s system) terms(t testing.TB) *fock.Terms {
	t.Helper()
	l, err := lattice.Box(s.sites, s.periodic)
	if err != nil {
		t.Fatal(err)
	}
	terms, err := fock.TermsOf(l, s.model)
	if err != nil {
		t.Fatal(err)
	}
	return terms
}

// plane is a model with two axes.
func plane() bosehubbard.Model {
	return bosehubbard.Model{Interaction: 3, Axes: []bosehubbard.AxisTerms{{Tunnelling: 1, Curvature: 0.3}, {Tunnelling: 0.6, Curvature: 0.1}}}
}

// near reports a difference beyond an absolute tolerance.
func near(t *testing.T, what string, got, want, tolerance float64) {
	t.Helper()
	if diff := got - want; !(math.Abs(diff) <= tolerance) {
		t.Errorf("%s: got %.15g, want %.15g, difference %.3g > %.3g", what, got, want, diff, tolerance)
	}
}

// Two atoms on two sites: E = U/2 +- sqrt(U^2/4 + 4 J^2), and U. Derived from the
// 3 x 3 matrix in |20>, |11>, |02>.
func TestTwoSites(t *testing.T) {
	for _, u := range []float64{-10, -4, 0, 1, 4, 10} {
		ends := chain(2, 2, false, u, 0).solve(t, Options{})
		root := math.Sqrt(u*u/4 + 4)
		near(t, "floor at U = "+strconv.FormatFloat(u, 'g', -1, 64), ends.Floor, u/2-root, 1e-14*(1+root))
		near(t, "ceiling at U = "+strconv.FormatFloat(u, 'g', -1, 64), ends.Ceiling, u/2+root, 1e-14*(1+root))
	}
	ends := chain(2, 2, true, 4, 0).solve(t, Options{}) // a ring of two has one bond
	near(t, "floor", ends.Floor, -0.8284271247, 1e-9)
	near(t, "ceiling", ends.Ceiling, 4.8284271247, 1e-9)
}

// The table of rings and chains, to half a unit of its last digit and some
// roundings of the largest energy. At large U the top levels, all atoms on one of
// the sites, lie closer than the default tolerance. The vector found is then a
// mixture of up to six of them, and the end is off by the residual over the
// share of the outermost, some times the residual; with a tighter tolerance the
// digits come.
func TestEndsTable(t *testing.T) {
	table := testdata.Table(t, "ends")
	periodic, sites, atoms := table.Floats(t, "periodic"), table.Floats(t, "sites"), table.Floats(t, "atoms")
	u, v := table.Floats(t, "interaction"), table.Floats(t, "curvature")
	floor, ceiling, decimals := table.Floats(t, "floor"), table.Floats(t, "ceiling"), table.Floats(t, "decimals")
	if len(u) != 26 {
		t.Fatalf("%d rows, want 26", len(u))
	}
	for i := range u {
		name := strings.Join(table.Rows[i][:5], " ")
		tolerance := 0.51*math.Pow(10, -decimals[i]) + 1e-14*math.Abs(ceiling[i])
		s := chain(int(sites[i]), int(atoms[i]), periodic[i] == 1, u[i], v[i])
		tight := s.solve(t, Options{Tolerance: 1e-13})
		near(t, name+" floor", tight.Floor, floor[i], tolerance)
		near(t, name+" ceiling", tight.Ceiling, ceiling[i], tolerance)
		for _, states := range []bool{false, true} {
			ends := s.solve(t, Options{EndStates: states})
			near(t, name+" floor", ends.Floor, floor[i], tolerance+4*ends.FloorResidual)
			near(t, name+" ceiling", ends.Ceiling, ceiling[i], tolerance+4*ends.CeilingResidual)
			checkResiduals(t, name, ends)
		}
	}
}

// checkResiduals allows the default tolerance and some roundings of the norm.
func checkResiduals(t *testing.T, name string, ends Ends) {
	t.Helper()
	norm := max(math.Abs(ends.Floor), math.Abs(ends.Ceiling))
	if worst := max(ends.FloorResidual, ends.CeilingResidual); !(worst <= 1.01e-10*norm) || ends.FloorResidual < 0 || ends.CeilingResidual < 0 {
		t.Errorf("%s: residuals %g and %g, want 0 to %g", name, ends.FloorResidual, ends.CeilingResidual, 1e-10*norm)
	}
}

// Six systems of different kinds by NumPy, to the twelve digits of the table.
func TestSpectraTable(t *testing.T) {
	table := testdata.Table(t, "spectra")
	list := func(column string, row int) []float64 {
		var out []float64
		for _, cell := range strings.Split(table.Strings(t, column)[row], ",") {
			x, err := strconv.ParseFloat(cell, 64)
			if err != nil {
				t.Fatal(err)
			}
			out = append(out, x)
		}
		return out
	}
	u, dimension := table.Floats(t, "interaction"), table.Floats(t, "dimension")
	lowest, highest := table.Floats(t, "lowest"), table.Floats(t, "highest")
	for i, name := range table.Strings(t, "name") {
		s := system{atoms: int(table.Floats(t, "atoms")[i]), model: bosehubbard.Model{Interaction: u[i]}}
		for a, n := range list("sites", i) {
			s.sites = append(s.sites, int(n))
			s.periodic = append(s.periodic, list("periodic", i)[a] == 1)
			s.model.Axes = append(s.model.Axes, bosehubbard.AxisTerms{
				Tunnelling: list("tunnelling", i)[a], Curvature: list("curvature", i)[a], Tilt: list("tilt", i)[a],
			})
		}
		ends := s.solve(t, Options{})
		tolerance := 1e-12 * max(math.Abs(lowest[i]), math.Abs(highest[i]))
		near(t, name+": lowest", ends.Floor, lowest[i], tolerance)
		near(t, name+": highest", ends.Ceiling, highest[i], tolerance)
		if float64(ends.Dimension) != dimension[i] {
			t.Errorf("%s: dimension %d, want %g", name, ends.Dimension, dimension[i])
		}
	}
	if len(u) != 6 {
		t.Errorf("%d rows, want 6", len(u))
	}
}

// Free atoms all go to the same end of the one-atom band, on lattices of any size.
func TestFreeAtoms(t *testing.T) {
	for _, s := range []system{
		chain(5, 1, true, 3, 0),
		chain(70, 1, false, 3, 0),
		chain(7, 5, true, 0, 0),
		chain(10, 10, true, 0, 0),
		{[]int{3, 4}, []bool{true, false}, 3, bosehubbard.Model{Axes: []bosehubbard.AxisTerms{{Tunnelling: 1}, {Tunnelling: -0.6}}}},
		{[]int{2, 2, 3}, []bool{true, false, true}, 4, bosehubbard.Model{Axes: []bosehubbard.AxisTerms{{Tunnelling: 0.2}, {Tunnelling: 1}, {Tunnelling: -0.9}}}},
	} {
		var tunnelling []float64
		for _, a := range s.model.Axes {
			tunnelling = append(tunnelling, a.Tunnelling)
		}
		floor, ceiling, err := lattice.KineticRange(s.sites, s.periodic, tunnelling)
		if err != nil {
			t.Fatal(err)
		}
		ends := s.solve(t, Options{})
		n := float64(s.atoms)
		near(t, "free floor", ends.Floor, n*floor, 1e-12*n*math.Abs(floor))
		near(t, "free ceiling", ends.Ceiling, n*ceiling, 1e-12*n*math.Abs(floor))
		checkResiduals(t, "free atoms", ends)
	}
}

// Atoms that do not tunnel: the smallest and largest energy of the number states.
func TestFrozenAtoms(t *testing.T) {
	s := chain(6, 6, false, -2, -0.3)
	s.model.Axes[0].Tunnelling = 0
	ends := s.solve(t, Options{})
	near(t, "frozen floor", ends.Floor, -2*15-0.3*6.25*6, 1e-12) // all on an outer site
	// One atom per site, or pairs that leave the outermost sites: the best of all
	// ways to put 6 atoms on |x| = 0.5, 1.5, 2.5 (two sites each).
	best := math.Inf(-1)
	for _, n := range [][]int{{1, 1, 1, 1, 1, 1}, {0, 1, 2, 2, 1, 0}, {0, 1, 1, 2, 1, 1}} {
		sum := 0.0
		for i, k := range n {
			x := float64(i) - 2.5
			sum += -float64(k*(k-1)) - 0.3*x*x*float64(k)
		}
		best = max(best, sum)
	}
	near(t, "frozen ceiling", ends.Ceiling, best, 1e-12)
}

func TestNoAtomsAndOneSite(t *testing.T) {
	none := chain(5, 0, true, 4, 1).solve(t, Options{EndStates: true})
	if none.Dimension != 1 || none.Floor != 0 || none.Ceiling != 0 || !slices.Equal(none.FloorState.Occupation, make([]float64, 5)) {
		t.Errorf("no atoms: %+v, want one state of energy 0", none)
	}
	one := chain(1, 7, true, 4, 1).solve(t, Options{})
	if one.Dimension != 1 || one.Floor != 84 || one.Ceiling != 84 { // U N (N-1) / 2
		t.Errorf("seven atoms on one site: %+v, want one state of 84 Hz", one)
	}
}

// The same seed gives the same bits, another one the same ends.
func TestSolveIsDeterministic(t *testing.T) {
	first := chain(7, 7, true, -3, 0).solve(t, Options{Seed: 3})
	again := chain(7, 7, true, -3, 0).solve(t, Options{Seed: 3})
	other := chain(7, 7, true, -3, 0).solve(t, Options{Seed: 4})
	first.BuildSeconds, first.SolveSeconds = again.BuildSeconds, again.SolveSeconds
	if first != again || first.Seed != 3 {
		t.Errorf("seed 3 gave %+v, then %+v", first, again)
	}
	near(t, "floor with another seed", other.Floor, first.Floor, 1e-12*math.Abs(first.Floor))
	near(t, "ceiling with another seed", other.Ceiling, first.Ceiling, 1e-12*math.Abs(first.Floor))
}
