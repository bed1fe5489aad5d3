package exact

import (
	"context"
	"math"
)

// The error of the steps. With H(t) = P0 + P1 s + P2 s^2 + .. about the middle, s the
// time in units of h, alpha_k = -2 pi i h P_(k-1), [12] the commutator of alpha_1
// and alpha_2, and so on, the exponent of a step differs from that of the exact
// evolution by
//
//	D = [1112]/2880 - [113]/360 - [212]/2160 + [23]/360 + [14]/180 - alpha_5/180
//
// up to terms of order h^7; [212] is [2,[1,2]]. Most of it cancels from step to
// step: [alpha_1, Q] adds the change of U Q psi, U being the evolution to the end,
// so that the sum of the errors is what it is at both ends and what Q itself
// changes. Taking as much as possible into Q leaves
//
//	D = [alpha_1, Q] - Q' + S,   Q = [112]/2880 - [13]/480 - alpha_4/1440
//	                             S = -[212]/8640 + [23]/1440 - alpha_5/120
//
// Q' the change of Q in a step. The error of a stretch of equal steps is then
// |Q psi| at its begin and at its end, and the sum of all |S psi|, at most. That
// holds as long as the steps resolve the frequencies in the state.
//
// Source: derived; the formula of Baker, Campbell and Hausdorff for the two
// exponentials against the sixth order of the Magnus series of Blanes, Casas and
// Ros, BIT Numer. Math. 40, 434 (2000), the latter from memory. The tests compare
// with the error itself.
//
// H is J K + diagonal. Where all J change in proportion, P_k is g_k P0 plus a
// diagonal R_k, and g_k P0 drops out of the commutators with P0. So Q psi and S psi
// take three products with H, and powers of H on psi, which the Krylov space has.
// P0 is that of the first exponential there, a third of a step before the middle:
// the difference is of higher order.

// estimate holds the expansion of a step.
type estimate struct {
	samples [5]couplings // at s = -1/2, -1/4, 0, 1/4, 1/2
	powers  [5]couplings // P0 to P4; then R_k in place of P_k, k >= 1
	g       [5]float64   // g_k, k >= 1
	size    float64      // of P0, the largest |coupling|

	tables         [stepperTables][]float64
	r1, r2, r3, r4 []float64 // R_k, nil if 0
}

// stepperTables is the number of diagonals.
const stepperTables = 4

func newEstimate(newList func() couplings, length int) estimate {
	var e estimate
	for k := range e.samples {
		e.samples[k], e.powers[k] = newList(), newList()
	}
	for k := range e.tables {
		e.tables[k] = make([]float64, length)
	}
	return e
}

// differences are the formulas of five points for P0 to P4.
var differences = [5][]float64{
	{0, 0, 1, 0, 0},
	{1. / 3, -8. / 3, 0, 8. / 3, -1. / 3},
	{-2. / 3, 32. / 3, -20, 32. / 3, -2. / 3},
	{-16. / 3, 32. / 3, 0, -32. / 3, 16. / 3},
	{32. / 3, -128. / 3, 64, -128. / 3, 32. / 3},
}

// expand fills in the powers from the samples. What a constant leaves by rounding
// counts as 0.
func (e *estimate) expand() {
	for k := range e.powers {
		e.powers[k].combine(differences[k], e.samples[:])
		for i := range e.powers[k] {
			if k > 0 && math.Abs(e.powers[k][i]) < 1e-12*math.Abs(e.powers[0][i]) {
				e.powers[k][i] = 0
			}
		}
	}
}

// change returns how much the couplings change in the step, all powers together.
func (e *estimate) change() float64 {
	sum := 0.0
	for k := 1; k < len(e.powers); k++ {
		sum += math.Abs(e.g[k]) * e.size // what proportional took away
		for _, v := range e.powers[k] {
			sum += math.Abs(v)
		}
	}
	return sum
}

// proportional splits off the multiples of P0, taken from the first exponential,
// and reports whether that leaves no hops.
func (s *stepper) proportional() bool {
	j := s.first.tunnelling()
	at := largest(j)
	s.size = math.Abs(s.first[largest(s.first)])
	for k := 1; k < len(s.powers); k++ {
		p := s.powers[k]
		hops := p.tunnelling()
		most := math.Abs(hops[largest(hops)])
		s.g[k] = 0
		if j[at] != 0 {
			s.g[k] = hops[at] / j[at]
		}
		for i := range p {
			p[i] -= s.g[k] * s.first[i]
		}
		if math.Abs(hops[largest(hops)]) > 1e-9*most {
			return false
		}
		clear(hops)
	}
	return true
}

// constant reports whether nothing changes during the step.
func (e *estimate) constant() bool {
	for k := 1; k < len(e.powers); k++ {
		if e.g[k] != 0 || !e.powers[k].zero() {
			return false
		}
	}
	return true
}

// defect is the error of a step, split into what comes back at its end and what
// stays: |Q psi| and |S psi|.
type defect struct{ returning, staying float64 }

// commutators returns the error of a step of length h for the psi of the Krylov
// space built last, which is that of its first exponential.
func (r *run) commutators(ctx context.Context, h float64) (defect, error) {
	e := &r.tools.estimate
	if e.constant() {
		return defect{}, nil
	}
	for k, list := range []*[]float64{&e.r1, &e.r2, &e.r3, &e.r4} {
		if *list = nil; !e.powers[k+1].zero() {
			*list = e.tables[k]
			r.hamiltonian.diagonalTo(*list, e.powers[k+1])
		}
	}
	c := commutator{
		run: r, estimate: e, theta: 2 * math.Pi * h,
		phi1: r.scratch[0], inner: r.scratch[1], left: r.scratch[2], right: r.scratch[3],
	}
	return c.defect(ctx)
}
