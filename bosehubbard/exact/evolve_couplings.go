package exact

import (
	"fmt"
	"math"

	"hilltop/bosehubbard"
)

// couplings are the numbers of a model in one list, for sums: J of each axis, then
// V, then F, then U.
type couplings []float64

func (c couplings) axes() int             { return (len(c) - 1) / 3 }
func (c couplings) tunnelling() []float64 { return c[:c.axes()] }
func (c couplings) curvature() []float64  { return c[c.axes() : 2*c.axes()] }
func (c couplings) tilt() []float64       { return c[2*c.axes() : 3*c.axes()] }
func (c couplings) interaction() float64  { return c[len(c)-1] }

func newCouplings(axes int) couplings { return make(couplings, 3*axes+1) }

// set takes the numbers from a model.
//
// It returns an error if the model has another number of axes or a number that is
// not finite.
func (c couplings) set(m *bosehubbard.Model) error {
	n := c.axes()
	if len(m.Axes) != n {
		return fmt.Errorf("model of %d axes on a lattice of %d, want the same", len(m.Axes), n)
	}
	for a, terms := range m.Axes {
		c[a], c[n+a], c[2*n+a] = terms.Tunnelling, terms.Curvature, terms.Tilt
	}
	c[3*n] = m.Interaction
	for _, v := range c {
		if math.IsNaN(v) || math.IsInf(v, 0) {
			return fmt.Errorf("model with a coupling of %g Hz, want finite numbers", v)
		}
	}
	return nil
}

// combine sets c to the sum of factors times other couplings.
func (c couplings) combine(factors []float64, list []couplings) {
	for i := range c {
		c[i] = 0
		for k, f := range factors {
			c[i] += f * list[k][i]
		}
	}
}

// zero reports whether all couplings are 0.
func (c couplings) zero() bool {
	for _, v := range c {
		if v != 0 {
			return false
		}
	}
	return true
}

// largest returns the index of the largest |v|, the first of equals.
func largest(v []float64) int {
	at := 0
	for i := range v {
		if math.Abs(v[i]) > math.Abs(v[at]) {
			at = i
		}
	}
	return at
}
