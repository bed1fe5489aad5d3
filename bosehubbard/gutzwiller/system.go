package gutzwiller

import (
	"fmt"
	"math"
)

// System is a grid whose sites hold up to Levels-1 atoms each, in a potential that
// is a sum of fixed shapes with weights that may change in time,
//
//	V_i(t) = sum_k w_k(t) Shapes[k][i].
type System struct {
	Grid   *Grid
	Levels int
	Shapes [][]float64 // each of length Grid.Sites
}

// NewSystem checks and returns a system. The shapes are not copied.
//
// It returns an error unless 2 <= levels <= MaxLevels and every shape has one
// finite number per site.
func NewSystem(g *Grid, levels int, shapes ...[]float64) (*System, error) {
	if levels < 2 || levels > MaxLevels {
		return nil, fmt.Errorf("gutzwiller: %d levels per site, want 2 to %d", levels, MaxLevels)
	}
	for k, shape := range shapes {
		if len(shape) != g.Sites {
			return nil, fmt.Errorf("gutzwiller: shape %d has %d values for %d sites", k, len(shape), g.Sites)
		}
		for site, v := range shape {
			if math.IsNaN(v) || math.IsInf(v, 0) {
				return nil, fmt.Errorf("gutzwiller: shape %d is %g at site %d, want a finite number", k, v, site)
			}
		}
	}
	return &System{Grid: g, Levels: levels, Shapes: shapes}, nil
}

// Terms are the parameters of the Hamiltonian at one time.
type Terms struct {
	Tunnelling  [3]float64 // J/h by axis, Hz
	Interaction float64    // U/h, Hz
	Weights     []float64  // of the shapes of the potential; shape times weight is V/h in Hz
}

// Drive sets all the terms at a time in seconds; Weights comes with one entry per
// shape. It is called on one goroutine, several times per step, with times strictly
// inside the run.
type Drive func(seconds float64, at *Terms)

// Constant returns the drive that never changes.
func Constant(terms Terms) Drive {
	return func(_ float64, at *Terms) {
		at.Tunnelling, at.Interaction = terms.Tunnelling, terms.Interaction
		copy(at.Weights, terms.Weights)
	}
}

// check returns an error unless the terms fit the system and are finite.
func (s *System) check(t Terms) error {
	if len(t.Weights) != len(s.Shapes) {
		return fmt.Errorf("gutzwiller: %d weights for %d shapes of the potential", len(t.Weights), len(s.Shapes))
	}
	sum := math.Abs(t.Interaction)
	for _, j := range t.Tunnelling {
		sum += math.Abs(j)
	}
	for _, w := range t.Weights {
		sum += math.Abs(w)
	}
	if !(sum <= maxHz) {
		return fmt.Errorf("gutzwiller: tunnelling %g, interaction %g, weights %g Hz: want finite numbers below %g",
			t.Tunnelling, t.Interaction, t.Weights, float64(maxHz))
	}
	return nil
}

// potential returns V_i in Hz.
func (s *System) potential(t Terms) []float64 {
	v := make([]float64, s.Grid.Sites)
	for k, shape := range s.Shapes {
		for i, x := range shape {
			v[i] += t.Weights[k] * x
		}
	}
	return v
}
