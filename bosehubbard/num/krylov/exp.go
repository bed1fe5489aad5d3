package krylov

import (
	"context"
	"math"
)

// Report says how a time was passed.
type Report struct {
	Steps, Products int
	Bound           float64 // of the error, relative to |psi|
	Norm            float64 // |psi| at the end
}

// Exp replaces psi by exp(-i tau H) psi in as many steps as the largest dimension
// asks for. tau may be negative. The errors of the steps add up to at most
// tolerance, relative to |psi|, apart from some units of rounding in each; the
// report has the sum of their bounds. No allocation with one worker.
//
// It returns the errors of [Propagator.Build]; psi then stands at a time in
// between.
func (p *Propagator) Exp(ctx context.Context, psi Vector, tau, tolerance float64, h Product) (Report, error) {
	var r Report
	before := p.products
	left := math.Abs(tau)
	for {
		reach, bound, err := p.Build(ctx, psi, left, tolerance*share(left, tau), h)
		if err == nil {
			r.Norm, err = p.AdvanceTo(ctx, psi, math.Copysign(reach, tau))
		}
		r.Products = p.products - before
		if err != nil {
			return r, err
		}
		r.Steps++
		r.Bound += bound
		if left -= reach; !(left > 0) {
			return r, nil
		}
	}
}

// share is the part of the tolerance for the time left.
func share(left, tau float64) float64 {
	if tau == 0 {
		return 1
	}
	return left / math.Abs(tau)
}
