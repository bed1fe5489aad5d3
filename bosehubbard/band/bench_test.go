package band

import (
	"fmt"
	"testing"
)

// BenchmarkSolve takes one depth anew each time, past the store.
func BenchmarkSolve(b *testing.B) {
	for _, depth := range []float64{0.01, 0.5, 2, 6.1, 22, 100, 500} {
		b.Run(fmt.Sprintf("depth=%g", depth), func(b *testing.B) {
			w := NewWorkspace()
			b.ReportAllocs()
			for b.Loop() {
				w.solve(depth)
			}
		})
	}
}

// BenchmarkScan solves 200 depths from 1 to 30 Er: J and the fourth moment.
func BenchmarkScan(b *testing.B) {
	w := NewWorkspace()
	b.ReportAllocs()
	for b.Loop() {
		for i := range 200 {
			if _, err := w.Solve(1 + 29*float64(i)/199); err != nil {
				b.Fatal(err)
			}
		}
	}
}

func BenchmarkMeanCurve(b *testing.B) {
	for _, depth := range []float64{30, 300} {
		b.Run(fmt.Sprintf("new/depth=%g", depth), func(b *testing.B) {
			for b.Loop() {
				if _, err := NewMeanCurve(depth); err != nil {
					b.Fatal(err)
				}
			}
		})
	}
	c, err := NewMeanCurve(30)
	if err != nil {
		b.Fatal(err)
	}
	b.Run("at", func(b *testing.B) {
		b.ReportAllocs()
		for b.Loop() {
			c.At(17.3)
		}
	})
}
