package exact

import (
	"fmt"

	"gonum.org/v1/gonum/floats"
	"gonum.org/v1/gonum/mat"

	"hilltop/bosehubbard/fock"
)

// dense diagonalises the full matrix, column by column H times a unit vector, and
// measures the residuals.
func dense(h *fock.Operator) (Ends, vectors, error) {
	d := h.Basis.Dimension
	w := fock.NewWorkspace(h.Basis)
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
		return Ends{}, vectors{}, fmt.Errorf("dense diagonalisation of %d states did not converge", d)
	}
	var states mat.Dense
	eig.VectorsTo(&states)
	values := eig.Values(nil)
	v := vectors{floor: mat.Col(nil, 0, &states), ceiling: mat.Col(nil, d-1, &states)}
	residual := func(x []float64, energy float64) float64 {
		h.ApplyTo(column, x, w)
		floats.AddScaled(column, -energy, x)
		return floats.Norm(column, 2)
	}
	return Ends{
		Dimension: d, Floor: values[0], Ceiling: values[d-1],
		FloorResidual: residual(v.floor, values[0]), CeilingResidual: residual(v.ceiling, values[d-1]),
	}, v, nil
}
