package exact

import (
	"fmt"
	"math"

	"gonum.org/v1/gonum/floats"
	"gonum.org/v1/gonum/mat"

	"hilltop/bosehubbard/fock"
	"hilltop/bosehubbard/num/lanczos"
)

// denseLimit is the largest dimension that is diagonalised as a full matrix.
const denseLimit = 64

var (
	logDenseLimit  = math.Log(denseLimit)
	logSmallBlocks = math.Log(smallBlocks)
)

// dense diagonalises the full matrix, column by column H times a unit vector, and
// measures the residuals.
func dense(h *fock.Operator) (lanczos.Result, error) {
	d := h.Len()
	w := h.NewWorkspace(1)
	full := mat.NewSymDense(d, nil)
	column, unit := make([]float64, d), make([]float64, d)
	for j := range d {
		unit[j] = 1
		h.ApplyTo(column, unit, w)
		unit[j] = 0
		for i := range j + 1 {
			full.SetSym(i, j, column[i])
		}
	}
	var eig mat.EigenSym
	if !eig.Factorize(full, true) {
		return lanczos.Result{}, fmt.Errorf("dense diagonalisation of %d states did not converge", d)
	}
	var states mat.Dense
	eig.VectorsTo(&states)
	values := eig.Values(nil)
	r := lanczos.Result{
		Lowest: values[0], LowestVector: mat.Col(nil, 0, &states),
		Highest: values[d-1], HighestVector: mat.Col(nil, d-1, &states),
	}
	residual := func(x []float64, energy float64) float64 {
		h.ApplyTo(column, x, w)
		floats.AddScaled(column, -energy, x)
		return floats.Norm(column, 2)
	}
	r.LowestResidual, r.HighestResidual = residual(r.LowestVector, r.Lowest), residual(r.HighestVector, r.Highest)
	return r, nil
}
