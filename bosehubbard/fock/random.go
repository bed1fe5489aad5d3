package fock

import (
	"context"
	"math/rand/v2"

	"hilltop/bosehubbard/num/blocks"
)

// randomLength is the length of a stretch of a random vector with a generator of
// its own.
const randomLength = 1 << 15

// RandomTo fills dst, of length Len, with a random vector z whose covariance is
// the identity of the space or of the sector, so that
//
//	E z^T f(H) z = Tr f(H)
//
// The components are Gaussian, the same for the same seed and stream.
func (h *Operator) RandomTo(dst []float64, seed, stream uint64) {
	for begin := 0; begin < len(dst); begin += randomLength {
		source := rand.New(rand.NewPCG(seed, stream<<32+uint64(begin/randomLength)))
		for i := begin; i < min(begin+randomLength, len(dst)); i++ {
			dst[i] = source.NormFloat64()
		}
	}
	h.Project(dst)
}

// Project takes away from a vector of length Len what is not in the sector. It
// changes nothing in the whole space.
func (h *Operator) Project(x []float64) {
	_ = h.ProjectContext(context.Background(), x, h.NewWorkspace(1))
}

// ProjectContext is Project on the goroutines of a workspace, until ctx is done.
//
// It returns ctx.Err() if stopped.
func (h *Operator) ProjectContext(ctx context.Context, x []float64, w *Workspace) error {
	return blocks.Run(ctx, w.workers, len(h.bands), func(_, i int) {
		t := &h.bands[i]
		b := &h.blocks[t.block]
		p, n := float64(h.parity), b.cols
		m := x[b.offset : b.offset+n*n]
		for begin := t.from; begin < n; begin += tile {
			for row := t.from; row < t.to; row++ {
				for col := max(begin, row); col < min(begin+tile, n); col++ {
					mean := (m[row*n+col] + p*m[col*n+row]) / 2
					m[row*n+col], m[col*n+row] = mean, p*mean
				}
			}
		}
	})
}
