package thermo

import (
	"context"
	"fmt"
	"slices"

	"gonum.org/v1/gonum/floats"
	"gonum.org/v1/gonum/mat"

	"hilltop/bosehubbard/num/blocks"
	"hilltop/bosehubbard/num/chebyshev"
)

// Largest sectors that are diagonalised in full: some 40 ms each, in which they
// cannot be stopped.
const (
	fullLimit       = 500 // for the levels
	fullVectorLimit = 250 // for the states too
)

// largest returns the dimension of the largest sector.
func (s *space) largest() int {
	d := 0
	for _, h := range s.sectors {
		d = max(d, h.Dimension())
	}
	return d
}

// basis returns orthonormal vectors of sector i: unit vectors, with their mirror
// images where the sector has the two together.
func (s *space) basis(i int) [][]float64 {
	h := s.sectors[i]
	var basis [][]float64
	for j := range h.Len() {
		x := make([]float64, h.Len())
		x[j] = 1
		h.Project(x)
		first := slices.IndexFunc(x, func(v float64) bool { return v != 0 })
		if first < j { // nothing left, or seen from its image
			continue
		}
		floats.Scale(1/floats.Norm(x, 2), x)
		basis = append(basis, x)
	}
	return basis
}

// matrix writes out the Hamiltonian of a sector in its basis.
func (s *space) matrix(ctx context.Context, i, lane int, basis [][]float64) (*mat.SymDense, error) {
	full := mat.NewSymDense(len(basis), nil)
	y := s.vectors(i, lane)[:1]
	product := s.product(ctx, i, lane)
	for j, x := range basis {
		if err := product(1, 0, 0, y, [][]float64{x}, nil, nil); err != nil {
			return nil, err
		}
		for k := range j + 1 {
			full.SetSym(k, j, floats.Dot(basis[k], y[0]))
		}
	}
	return full, nil
}

// levels returns the levels of sector i in ascending order, Hz.
func (s *space) levels(ctx context.Context, i, lane int) ([]float64, error) {
	full, err := s.matrix(ctx, i, lane, s.basis(i))
	if err != nil {
		return nil, err
	}
	var eig mat.EigenSym
	if !eig.Factorize(full, false) {
		return nil, notDiagonalised(full)
	}
	return eig.Values(nil), nil
}

// states returns the eigenstates of sector i.
func (s *space) states(ctx context.Context, i, lane int) ([]edge, error) {
	basis := s.basis(i)
	full, err := s.matrix(ctx, i, lane, basis)
	if err != nil {
		return nil, err
	}
	var eig mat.EigenSym
	if !eig.Factorize(full, true) {
		return nil, notDiagonalised(full)
	}
	var u mat.Dense
	eig.VectorsTo(&u)
	out := make([]edge, len(basis))
	for k, energy := range eig.Values(nil) {
		out[k] = edge{energy: energy, vector: make([]float64, s.sectors[i].Len())}
		for j, x := range basis {
			floats.AddScaled(out[k].vector, u.At(j, k), x)
		}
	}
	return out, ctx.Err()
}

func notDiagonalised(full *mat.SymDense) error {
	return fmt.Errorf("thermo: full diagonalisation of %d states did not converge", full.SymmetricDim())
}

// spectrum returns all levels of all sectors in ascending order, Hz.
func (s *space) spectrum(ctx context.Context) ([]float64, error) {
	parts, errs := make([][]float64, len(s.sectors)), make([]error, len(s.sectors))
	err := blocks.Run(ctx, s.lanes(), len(s.sectors), func(lane, i int) {
		parts[i], errs[i] = s.levels(ctx, i, lane)
	})
	if err := firstError(append(errs, err)); err != nil {
		return nil, err
	}
	all := slices.Concat(parts...)
	slices.Sort(all)
	return all, nil
}

// traceOf returns the exact moments of known levels.
func traceOf(levels []float64, within chebyshev.Interval, moments int) trace {
	row := make([]float64, moments)
	for _, e := range levels {
		chebyshev.MomentsOf(row, within.Place(e), 1)
	}
	return trace{rows: [][]float64{row}, within: within, exact: true}
}
