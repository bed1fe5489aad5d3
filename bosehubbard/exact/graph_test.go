package exact

import (
	"context"
	"fmt"
	"math"
	"math/rand/v2"
	"strconv"
	"strings"
	"testing"

	"gonum.org/v1/gonum/mat"

	"hilltop/bosehubbard"
	"hilltop/bosehubbard/fock"
	"hilltop/bosehubbard/lattice"
	"hilltop/testdata"
)

// graphRow reads the system of one row of the table of graphs.
func graphRow(t *testing.T, table *testdata.Sheet, i int) (terms *fock.Terms, atoms, most int) {
	t.Helper()
	list := func(column string) []float64 {
		var out []float64
		for _, cell := range strings.Split(table.Strings(t, column)[i], ",") {
			x, err := strconv.ParseFloat(cell, 64)
			if err != nil {
				t.Fatal(err)
			}
			out = append(out, x)
		}
		return out
	}
	var cells []int
	for _, n := range list("cells") {
		cells = append(cells, int(n))
	}
	l, err := lattice.Build(lattice.Kind(table.Strings(t, "kind")[i]), cells, list("periodic")[0] == 1)
	if err != nil {
		t.Fatal(err)
	}
	m := bosehubbard.Model{Interaction: list("interaction")[0]}
	for a, j := range list("tunnelling") {
		m.Axes = append(m.Axes, bosehubbard.AxisTerms{Tunnelling: j, Curvature: list("curvature")[a], Tilt: list("tilt")[a]})
	}
	if terms, err = fock.TermsOf(l, m); err != nil {
		t.Fatal(err)
	}
	if err := terms.AddTunnelling(l.SecondBonds(), list("second")); err != nil {
		t.Fatal(err)
	}
	return terms, int(list("atoms")[0]), int(list("most")[0])
}

// Ladders, triangular, honeycomb and kagome patches, second neighbours and limits
// of the occupation by NumPy, which finds the bonds by distance.
func TestGraphsTable(t *testing.T) {
	table := testdata.Table(t, "graphs")
	lowest, highest, dimension := table.Floats(t, "lowest"), table.Floats(t, "highest"), table.Floats(t, "dimension")
	for i, name := range table.Strings(t, "name") {
		terms, atoms, most := graphRow(t, table, i)
		for _, sector := range []Sector{SectorAuto, SectorWhole} {
			ends, err := SolveTerms(context.Background(), terms, atoms, Options{MaxOccupation: most, Sector: sector})
			if err != nil {
				t.Fatal(err)
			}
			tolerance := 1e-12 * max(math.Abs(lowest[i]), math.Abs(highest[i]))
			near(t, name+": lowest", ends.Floor, lowest[i], tolerance)
			near(t, name+": highest", ends.Ceiling, highest[i], tolerance)
			if float64(ends.Dimension) != dimension[i] {
				t.Errorf("%s: dimension %d, want %g", name, ends.Dimension, dimension[i])
			}
			if ends.Connected == strings.Contains(name, "side by side") {
				t.Errorf("%s: connected %v", name, ends.Connected)
			}
		}
	}
	if len(lowest) != 16 {
		t.Errorf("%d rows, want 16", len(lowest))
	}
}

// sectorValues diagonalises a sector in full.
func sectorValues(t *testing.T, terms *fock.Terms, atoms, parity int) []float64 {
	t.Helper()
	h, err := fock.NewOperatorOf(context.Background(), terms, atoms, fock.Options{Parity: parity})
	if err != nil {
		t.Fatal(err)
	}
	d, w := h.Len(), h.NewWorkspace(1)
	if h.Dimension() == 0 {
		return nil
	}
	// H on the sector and a number beyond its spectrum on the rest of the vectors.
	const far = 1e6
	full, x, column := mat.NewSymDense(d, nil), make([]float64, d), make([]float64, d)
	for j := range d {
		clear(x)
		x[j] = 1
		h.Project(x)
		h.ApplyTo(column, x, w)
		for i := range column {
			column[i] -= far * x[i]
		}
		column[j] += far
		for i := range j + 1 {
			full.SetSym(i, j, column[i])
		}
	}
	var eig mat.EigenSym
	if !eig.Factorize(full, false) {
		t.Fatal("dense diagonalisation failed")
	}
	return eig.Values(nil)[:h.Dimension()]
}

// Both sectors together have the spectrum of the whole, and each end of a sector is
// found there.
func TestSectorsMakeTheSpectrum(t *testing.T) {
	random := rand.New(rand.NewPCG(61, 0))
	for trial := range 20 {
		terms, atoms := randomMirrored(random)
		if _, ok := terms.Mirror(); !ok {
			continue
		}
		name := fmt.Sprintf("trial %d, %d atoms on %d sites", trial, atoms, terms.Sites)
		even, odd := sectorValues(t, terms, atoms, 1), sectorValues(t, terms, atoms, -1)
		whole := sectorValues(t, terms, atoms, 0)
		all := append(append([]float64(nil), even...), odd...)
		sortFloats(all)
		size := max(math.Abs(whole[0]), math.Abs(whole[len(whole)-1]))
		for i := range whole {
			near(t, fmt.Sprintf("%s, level %d", name, i), all[i], whole[i], 1e-9*size)
		}
		for sector, values := range map[Sector][]float64{SectorEven: even, SectorOdd: odd, SectorAuto: whole, SectorWhole: whole} {
			ends, err := SolveTerms(context.Background(), terms, atoms, Options{Sector: sector})
			if len(values) == 0 {
				if err == nil {
					t.Errorf("%s, sector %d: no error though it has no states", name, sector)
				}
				continue
			}
			if err != nil {
				t.Fatalf("%s, sector %d: %v", name, sector, err)
			}
			near(t, fmt.Sprintf("%s, floor of sector %d", name, sector), ends.Floor, values[0], 1e-9*size)
			near(t, fmt.Sprintf("%s, ceiling of sector %d", name, sector), ends.Ceiling, values[len(values)-1], 1e-9*size)
			if ends.Dimension != len(values) {
				t.Errorf("%s, sector %d: dimension %d, want %d", name, sector, ends.Dimension, len(values))
			}
		}
	}
}

// randomMirrored has hops of either sign that are even under the reversal of the
// numbering; half of them have one sign only, so that the sector of the ends is
// known beforehand.
func randomMirrored(random *rand.Rand) (*fock.Terms, int) {
	sites := 3 + random.IntN(4)
	t := &fock.Terms{Sites: sites, Interaction: 3 * random.NormFloat64(), Potential: make([]float64, sites)}
	for i := range t.Potential {
		t.Potential[i] = random.NormFloat64()
		t.Potential[sites-1-i] = t.Potential[i]
	}
	oneSign := random.IntN(2) == 0
	for i := range sites - 1 {
		amplitude := random.NormFloat64()
		if oneSign {
			amplitude = -math.Abs(amplitude)
		}
		j := i + 1
		if random.IntN(4) == 0 {
			j = (i + 2) % sites
		}
		t.Hops = append(t.Hops, fock.Hop{From: i, To: j, Amplitude: amplitude}, fock.Hop{From: sites - 1 - i, To: sites - 1 - j, Amplitude: amplitude})
	}
	return t, 1 + random.IntN(4)
}

func sortFloats(x []float64) {
	for i := range x {
		for j := i; j > 0 && x[j] < x[j-1]; j-- {
			x[j], x[j-1] = x[j-1], x[j]
		}
	}
}

// A ring of four with one hop reversed encloses half a flux quantum: a free atom
// has -+sqrt 2 J at both ends. Derived: quasi-momenta (2m+1) pi/4.
func TestSignOfOneBond(t *testing.T) {
	terms := &fock.Terms{Sites: 4, Hops: []fock.Hop{{From: 0, To: 1, Amplitude: -1}, {From: 1, To: 2, Amplitude: -1}, {From: 2, To: 3, Amplitude: -1}, {From: 3, To: 0, Amplitude: 1}}}
	for _, atoms := range []int{1, 5, 9} {
		ends, err := SolveTerms(context.Background(), terms, atoms, Options{})
		if err != nil {
			t.Fatal(err)
		}
		want := float64(atoms) * math.Sqrt2
		near(t, "floor with half a flux quantum", ends.Floor, -want, 1e-12*want)
		near(t, "ceiling with half a flux quantum", ends.Ceiling, want, 1e-12*want)
	}
}

// E(J, U, V) and E(J, -U, -V) mirror each other on bipartite graphs, and do not on
// a triangle. Derived: a sign on one sublattice.
func TestMirrorOfGraphs(t *testing.T) {
	for _, tc := range []struct {
		kind   lattice.Kind
		cells  []int
		ring   bool
		mirror bool
	}{
		{lattice.Ladder, []int{4}, false, true}, {lattice.Honeycomb, []int{2, 2}, true, true}, {lattice.Honeycomb, []int{1, 2}, false, true},
		{lattice.Triangular, []int{2, 2}, false, false}, {lattice.Kagome, []int{1, 1}, false, false}, {lattice.Kagome, []int{2, 1}, false, false},
	} {
		l, err := lattice.Build(tc.kind, tc.cells, tc.ring)
		if err != nil {
			t.Fatal(err)
		}
		m := bosehubbard.Model{Interaction: 4}
		for range l.Axes {
			m.Axes = append(m.Axes, bosehubbard.AxisTerms{Tunnelling: 1, Curvature: 0.1})
		}
		here, err := Solve(context.Background(), l, m, 4, Options{})
		if err != nil {
			t.Fatal(err)
		}
		there, err := Solve(context.Background(), l, m.Mirrored(), 4, Options{})
		if err != nil {
			t.Fatal(err)
		}
		defect := max(math.Abs(here.Floor+there.Ceiling), math.Abs(here.Ceiling+there.Floor))
		if tc.mirror != (defect <= 1e-9) || !tc.mirror && defect < 0.1 {
			t.Errorf("%s %v: mirror defect %g, bipartite %v", tc.kind, tc.cells, defect, tc.mirror)
		}
	}
}
