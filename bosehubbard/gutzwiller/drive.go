package gutzwiller

import (
	"fmt"
	"math"
	"slices"

	"gonum.org/v1/gonum/integrate/quad"
)

// gaussPoints is the number of Gauss-Legendre points of a step at which the drive is
// read, checks are the points where the polynomial through them is tried.
const gaussPoints = 8

var checks = [3]float64{0.004, 0.5, 0.996}

// sampler reads a drive inside one step and gives its values and integrals at the
// stages of a method, from the polynomial through the Gauss points. The integrals
// are good to the order gaussPoints+1 of the step. No point lies on an end of the
// step, so a jump of the drive between two steps does no harm.
type sampler struct {
	points   [gaussPoints]float64   // of [0, 1]
	values   [][gaussPoints]float64 // by stage, then by check: weights of the value there
	integral [][gaussPoints]float64 // by stage, and for the end: of the integral from 0

	terms   [gaussPoints]Terms
	checked [len(checks)]Terms
}

// newSampler prepares for the nodes of a method.
func newSampler(nodes []float64, shapes int) *sampler {
	s := &sampler{}
	var weights [gaussPoints]float64
	quad.Legendre{}.FixedLocations(s.points[:], weights[:], 0, 1)
	for _, c := range slices.Concat(nodes, checks[:]) {
		s.values = append(s.values, s.lagrange(c))
	}
	for _, c := range slices.Concat(nodes, []float64{1}) {
		var sum [gaussPoints]float64
		for q, x := range s.points {
			for k, l := range s.lagrange(c * x) {
				sum[k] += c * weights[q] * l
			}
		}
		s.integral = append(s.integral, sum)
	}
	for i := range s.terms {
		s.terms[i].Weights = make([]float64, shapes)
	}
	for i := range s.checked {
		s.checked[i].Weights = make([]float64, shapes)
	}
	return s
}

// lagrange returns the polynomials through the Gauss points at x.
func (s *sampler) lagrange(x float64) (l [gaussPoints]float64) {
	for k, xk := range s.points {
		l[k] = 1
		for j, xj := range s.points {
			if j != k {
				l[k] *= (x - xj) / (xk - xj)
			}
		}
	}
	return l
}

// read calls the drive at the Gauss points and the checks of a step.
func (s *sampler) read(system *System, drive Drive, from, step float64) error {
	for i, x := range s.points {
		if err := readAt(system, drive, from+x*step, &s.terms[i]); err != nil {
			return err
		}
	}
	for i, x := range checks {
		if err := readAt(system, drive, from+x*step, &s.checked[i]); err != nil {
			return err
		}
	}
	return nil
}

func readAt(system *System, drive Drive, seconds float64, at *Terms) error {
	drive(seconds, at)
	if err := system.check(*at); err != nil {
		return fmt.Errorf("%w at %g s", err, seconds)
	}
	return nil
}

// weigh returns sum_k weights[k] pick(terms[k]).
func (s *sampler) weigh(weights *[gaussPoints]float64, pick func(*Terms) float64) float64 {
	sum := 0.0
	for k, w := range weights {
		sum += w * pick(&s.terms[k])
	}
	return sum
}

// tunnelling, interaction and weight are weigh of one of the terms.
func (s *sampler) tunnelling(weights *[gaussPoints]float64, axis int) float64 {
	return s.weigh(weights, func(t *Terms) float64 { return t.Tunnelling[axis] })
}

func (s *sampler) interaction(weights *[gaussPoints]float64) float64 {
	return s.weigh(weights, func(t *Terms) float64 { return t.Interaction })
}

func (s *sampler) weight(weights *[gaussPoints]float64, shape int) float64 {
	return s.weigh(weights, func(t *Terms) float64 { return t.Weights[shape] })
}

// miss is how far the polynomials are from the drive at the checks, as an energy in
// Hz. largest holds the largest |value| of every shape.
func (s *sampler) miss(largest []float64) float64 {
	worst := 0.0
	for i := range checks {
		at, want := &s.values[len(s.values)-len(checks)+i], &s.checked[i]
		sum := math.Abs(s.interaction(at) - want.Interaction)
		for axis, j := range want.Tunnelling {
			sum += 2 * math.Abs(s.tunnelling(at, axis)-j)
		}
		for k, w := range want.Weights {
			sum += largest[k] * math.Abs(s.weight(at, k)-w)
		}
		worst = max(worst, sum)
	}
	return worst
}
