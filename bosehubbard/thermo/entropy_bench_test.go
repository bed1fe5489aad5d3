package thermo

import (
	"fmt"
	"testing"

	"hilltop/bosehubbard"
)

// BenchmarkEntropy is S(E) of an open chain with default settings, from nothing.
func BenchmarkEntropy(b *testing.B) {
	for _, n := range []int{8, 10, 11} {
		s := box(b, n, -2.1, []bosehubbard.AxisTerms{{Tunnelling: 1, Curvature: -0.05}}, false, n)
		b.Run(fmt.Sprintf("sites=%d/atoms=%d", n, n), func(b *testing.B) {
			b.ReportAllocs()
			for b.Loop() {
				mustEntropy(b, s, Options{})
			}
		})
	}
}
