package fock

import (
	"fmt"
	"testing"

	"hilltop/bosehubbard"
)

// BenchmarkApply reports the time per hop and core: a hop is one matrix element
// off the diagonal of the whole space, though a sector does half of them.
func BenchmarkApply(b *testing.B) {
	m := bosehubbard.Model{Axes: []bosehubbard.AxisTerms{axis(1, -0.05, 0)}, Interaction: -2.1}
	for _, size := range []int{10, 11, 12, 13, 14} {
		terms := boxTerms(b, []int{size}, []bool{false}, m)
		for _, parity := range []int{0, 1} {
			for _, workers := range []int{1, 2} {
				b.Run(fmt.Sprintf("sites=%d/atoms=%d/parity=%d/workers=%d", size, size, parity, workers), func(b *testing.B) {
					h := mustOperator(b, terms, size, Options{Parity: parity})
					w := h.NewWorkspace(workers)
					x, y := make([]float64, h.Len()), make([]float64, h.Len())
					h.RandomTo(x, 1, 0)
					b.ReportAllocs()
					for b.Loop() {
						h.ApplyTo(y, x, w)
					}
					perHop := float64(b.Elapsed().Nanoseconds()) / float64(b.N) / hopsOf(terms, size)
					if parity != 0 {
						perHop *= 2
					}
					b.ReportMetric(perHop*float64(workers), "ns/hop/core")
				})
			}
		}
	}
}

// hopsOf counts the matrix elements off the diagonal: for every hop the states
// with an atom to give, both ways.
func hopsOf(t *Terms, atoms int) float64 {
	states := binomial(t.Sites, atoms-1).Int64()
	return float64(2 * len(t.bonds()) * int(states))
}
