package thermo

import (
	"context"
	"fmt"

	"gonum.org/v1/gonum/mat"

	"hilltop/bosehubbard/num/chebyshev"
)

// matrix writes out the Hamiltonian of a whole space, column by column.
func (s *space) matrix(ctx context.Context) (*mat.SymDense, error) {
	h := s.sectors[0]
	d := h.Dimension()
	full := mat.NewSymDense(d, nil)
	v := s.scratch
	product := s.product(ctx, 0, 0)
	for j := range d {
		clear(v[0])
		v[0][j] = 1
		if err := product(1, 0, 0, v[1:2], v[:1], nil, nil); err != nil {
			return nil, err
		}
		for i := range j + 1 {
			full.SetSym(i, j, v[1][i])
		}
	}
	return full, nil
}

// levels returns the whole spectrum in ascending order, Hz, by full
// diagonalisation. It cannot be stopped while the matrix is diagonalised.
func (s System) levels(ctx context.Context, memory uint64) ([]float64, error) {
	sp, err := s.whole(ctx, resources{lanes: 1, vectors: 2, memory: memory})
	if err != nil {
		return nil, err
	}
	full, err := sp.matrix(ctx)
	if err != nil {
		return nil, err
	}
	var eig mat.EigenSym
	if !eig.Factorize(full, false) {
		return nil, fmt.Errorf("thermo: full diagonalisation of %d states did not converge", sp.dimension)
	}
	return eig.Values(nil), ctx.Err()
}

// traceOf returns the exact moments of known levels.
func traceOf(levels []float64, within chebyshev.Interval, moments int) trace {
	row := make([]float64, moments)
	for _, e := range levels {
		chebyshev.MomentsOf(row, within.Place(e), 1)
	}
	return trace{rows: [][]float64{row}, within: within, exact: true}
}
