package thermo

import (
	"math"
	"strconv"
	"testing"

	"hilltop/bosehubbard"
	"hilltop/testdata"
)

// Canonical averages and observables against NumPy's, of systems of six kinds. Both
// are good to some 1e-12 of the largest energy.
func TestCanonicalTable(t *testing.T) {
	table := testdata.Table(t, "canonical")
	number := func(column string) []float64 { return table.Floats(t, column) }
	names, periodic := table.Strings(t, "name"), table.Strings(t, "periodic")
	sites, atoms, tunnelling, interaction := number("sites"), number("atoms"), number("tunnelling"), number("interaction")
	curvature, tilt, betas := number("curvature"), number("tilt"), number("beta")
	columns := []string{"energy", "entropy", "variance", "occupation", "square", "correlation"}
	want := make([][]float64, len(columns))
	for c, name := range columns {
		want[c] = number(name)
	}
	for row, name := range names {
		axes := []bosehubbard.AxisTerms{{Tunnelling: tunnelling[row], Curvature: curvature[row], Tilt: tilt[row]}}
		s := box(t, int(atoms[row]), interaction[row], axes, periodic[row] == "1", int(sites[row]))
		p := mustCanonical(t, s, []float64{betas[row]}, CanonicalOptions{Observables: true}).Points[0]
		o := p.Observables
		for c, got := range []float64{p.Energy, p.Entropy, p.Variance, o.Occupation[0], o.SquaredOccupation[0], o.Correlation[1]} {
			if diff := math.Abs(got - want[c][row]); !(diff <= 1e-11*(1+math.Abs(want[c][row]))) {
				t.Errorf("%s, beta %s: %s %.14g, want %.14g, difference %.2g", name,
					strconv.FormatFloat(betas[row], 'g', -1, 64), columns[c], got, want[c][row], diff)
			}
		}
	}
}
