package exact

import (
	"context"

	"hilltop/bosehubbard/fock"
)

// matrix is an operator as package lanczos wants it.
type matrix struct {
	*fock.Operator
	workspace *fock.Workspace
	product   fock.Product
}

func newMatrix(h *fock.Operator, workers int) *matrix {
	return &matrix{
		Operator: h, workspace: h.NewWorkspace(workers),
		product: fock.Product{Dst: make([][]float64, 1), X: make([][]float64, 1), XY: make([]float64, 1)},
	}
}

// Project takes away what is not in the sector.
func (m *matrix) Project(ctx context.Context, x []float64) error {
	return m.ProjectContext(ctx, x, m.workspace)
}

// Combine sets dst = a H x + c dst and returns x.dst.
func (m *matrix) Combine(ctx context.Context, dst, x []float64, a, c float64) (float64, error) {
	m.product.Dst[0], m.product.X[0] = dst, x
	m.product.A, m.product.C = a, c
	err := m.Operator.Combine(ctx, m.product, m.workspace)
	return m.product.XY[0], err
}
