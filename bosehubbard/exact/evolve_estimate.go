package exact

import (
	"context"
	"math"
)

// The error of a step. With H(t) = P0 + P1 s + P2 s^2 + .. about the middle, s the
// time in units of h, alpha_k = -2 pi i h P_(k-1), [12] the commutator of alpha_1
// and alpha_2, and so on, the exponent of the step differs from that of the exact
// evolution by
//
//	D = [1112]/2880 - [113]/360 - [212]/2160 + [23]/360 + [14]/180 - alpha_5/180
//
// up to terms of order h^7; [212] is [2,[1,2]]. The error of the step is |D psi|.
//
// Source: derived; the formula of Baker, Campbell and Hausdorff for the two
// exponentials against the sixth order of the Magnus series of Blanes, Casas and
// Ros, BIT Numer. Math. 40, 434 (2000), the latter from memory. The tests compare
// it with the error itself.
//
// H is J K + diagonal. Where all J change in proportion, P_k is g_k P0 plus a
// diagonal R_k, and g_k P0 drops out of the commutators with P0. So D psi takes
// three products with H, and the powers of H on psi, which the Krylov space has.
// P0 is that of the first exponential there, a third of a step before the middle:
// the difference is of order h^6.

// estimate holds the expansion of a step.
type estimate struct {
	samples [5]couplings // at s = -1/2, -1/4, 0, 1/4, 1/2
	powers  [5]couplings // P0 to P4; then R_k in place of P_k, k >= 1
	g       [5]float64   // g_k, k >= 1

	// Diagonals: R1, and the sums of R_k that stand in double, single and no
	// commutators with P0. nil if 0.
	tables                [stepperTables][]float64
	r1, twice, once, none []float64
	sum                   couplings
}

// stepperTables is the number of diagonals.
const stepperTables = 4

func newEstimate(newList func() couplings, length int) estimate {
	e := estimate{sum: newList()}
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

// proportional splits off the multiples of P0, taken from the first exponential,
// and reports whether that leaves no hops.
func (s *stepper) proportional() bool {
	j := s.first.tunnelling()
	at := largest(j)
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

// commutators returns |D psi| for the psi of the Krylov space built last, which is
// that of the first exponential of a step of length h.
func (r *run) commutators(ctx context.Context, h float64) (float64, error) {
	e := &r.tools.estimate
	if e.constant() {
		return 0, nil
	}
	r.diagonals(e)
	theta := 2 * math.Pi * h
	third := -theta * theta * theta
	d := commutator{
		run: r, estimate: e,
		a: complex(-third*theta/2880, 0), b: complex(0, third), c: complex(-theta*theta, 0),
		e: complex(0, theta/180), q: complex(0, third/2160),
		phi: r.scratch[0], inner: r.scratch[1], low: r.scratch[2], high: r.scratch[3],
	}
	return d.norm(ctx)
}

// diagonals fills in the tables.
func (r *run) diagonals(e *estimate) {
	table := func(k int, factors ...float64) []float64 { // of R1, R2, ..
		if e.sum.combine(factors, e.powers[1:]); e.sum.zero() {
			return nil
		}
		r.hamiltonian.diagonalTo(e.tables[k], e.sum)
		return e.tables[k]
	}
	e.r1 = table(0, 1)
	e.twice = table(1, e.g[1]/2160, 1./360)
	e.once = table(2, -e.g[2]/360, e.g[1]/360, 1./180)
	e.none = table(3, 0, 0, 0, 1)
}
