package band

import (
	"fmt"
	"math"

	"gonum.org/v1/gonum/lapack/gonum"
)

// Energies writes the lowest len(dst) bands at quasi-momentum q, in Er and in
// ascending order.
//
// len(dst) is at most MaxBands. q is in units of k and may lie outside the first
// zone. Accurate to 1e-11 Er. Cost O(n^2) for n = 2 len(dst) + 20 plane waves or
// so; no allocation.
//
// It returns ErrDepth if the depth is out of range and an error if q is not
// finite. It panics if dst is longer than MaxBands.
func (w *Workspace) Energies(dst []float64, depth, q float64) error {
	if len(dst) > MaxBands {
		panic(fmt.Sprintf("band: %d bands, want at most %d", len(dst), MaxBands))
	}
	if err := checkDepth(depth); err != nil {
		return err
	}
	if math.IsNaN(q) || math.IsInf(q, 0) {
		return fmt.Errorf("band: quasi-momentum %g, want a finite number", q)
	}
	t := &w.matrix
	t.fill(depth, q-2*math.Round(q/2), rungs(depth)+MaxBands/2)
	gonum.Implementation{}.Dsterf(len(t.diag), t.diag, t.off)
	copy(dst, t.diag)
	return nil
}
