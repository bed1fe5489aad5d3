package eos

import (
	"math"
	"testing"
)

// Where the clusters have converged, the others are off by no more than twice their
// Doubt, relative to n and to S, and most by much less.
func TestDoubtCoversTheError(t *testing.T) {
	if testing.Short() {
		t.Skip("diagonalises for seconds")
	}
	checked := map[string]int{}
	for _, row := range []struct {
		axes                     int
		interaction, temperature float64
	}{{2, 2.1, 2.2}, {2, 2.1, 4}, {2, 6, 4}, {2, 20, 2}, {2, 40, 3}, {1, 2, 1}, {1, 2, 2}, {3, 2.1, 4}} {
		terms := Cosine([]float64{1, 1, 1}[:row.axes], row.interaction)
		clusters := linkedOf(t, terms)
		chooser := must[*Chooser](t)(NewChooser(terms))
		for _, above := range []float64{-6, -3, -1.5, -0.5, 0.5, 1.5, 2.5, 4, 6, 9, 14, 22} {
			mu, beta := above-2*float64(row.axes), 1/row.temperature
			want, err := clusters.At(mu, beta)
			if err != nil || want.Doubt > 0.05 {
				continue
			}
			for _, m := range chooser.Models() {
				got, err := m.At(mu, beta)
				if err != nil {
					continue
				}
				checked[m.Name()]++
				off := max(math.Abs(got.Filling/want.Filling-1), math.Abs(got.Entropy/want.Entropy-1))
				if off > 2*got.Doubt+2*want.Doubt {
					t.Errorf("%+v: %s at %g above the band is off by %.3f with a Doubt of %.3f, clusters %.3f",
						row, m.Name(), above, off, got.Doubt, want.Doubt)
				}
			}
		}
	}
	for name, least := range map[string]int{"ideal": 10, "Hartree-Fock": 25, "atomic": 20, "Gutzwiller": 40} {
		if checked[name] < least {
			t.Errorf("%s was checked at %d points, want %d", name, checked[name], least)
		}
	}
	t.Log(checked)
}
