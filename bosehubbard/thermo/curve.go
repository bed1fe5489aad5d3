package thermo

import (
	"fmt"
	"math"

	"gonum.org/v1/gonum/stat/distuv"

	"hilltop/bosehubbard/num/chebyshev"
)

// Curve is the density of states and the entropy of a system against its energy,
// all of one length and evenly spaced in energy:
//
//	S(E) = ln(omega(E) Unit),   beta(E) = dS/dE
//
// omega is broadened by Resolution. Errors are half widths of 95 % confidence, of
// the random vectors alone; they are 0 where the spectrum was diagonalised in full.
type Curve struct {
	Dimension      int
	Floor, Ceiling float64 // Hz, of all atoms together; as given, or to 1e-4 of the width
	Unit           float64 // eps, Hz
	Resolution     float64 // standard deviation of a broadened level at mid-spectrum, Hz

	Energy                []float64 // Hz, middles of equal bins from Floor to Ceiling
	Density, DensityError []float64 // omega, 1/Hz; its integral is Dimension
	Entropy, EntropyError []float64 // kB
	Beta, BetaError       []float64 // 1/Hz

	// Of the states below, S = ln Omega(E), Omega' = omega, and dS/dE, which is
	// never negative; nil unless asked for.
	VolumeEntropy []float64 // kB
	VolumeBeta    []float64 // 1/Hz

	Peak float64 // where omega is largest and Beta changes sign, Hz
	Mean float64 // Tr H/Dimension, where the canonical beta is 0, Hz

	Moments, Vectors           int // Vectors is 0 where the spectrum was diagonalised
	Seed                       uint64
	BuildSeconds, SolveSeconds float64

	within chebyshev.Interval
	rows   []chebyshev.Density // damped moments, one row for each vector
	total  chebyshev.Density   // their mean
	spread float64             // of rows to half widths of the mean; 0 if exact
}

// CurvePoint is a Curve at one energy, in its units.
type CurvePoint struct {
	Energy                    float64
	Density, DensityError     float64
	Entropy, EntropyError     float64
	Beta, BetaError           float64
	VolumeEntropy, VolumeBeta float64
}

// newCurve damps the moments of a trace.
func newCurve(t trace, floor, ceiling float64) *Curve {
	n := len(t.rows[0])
	kernel := make([]float64, n)
	chebyshev.JacksonTo(kernel)
	c := &Curve{Floor: floor, Ceiling: ceiling, Moments: n, within: t.within, total: make(chebyshev.Density, n)}
	for _, row := range t.rows {
		damped := make(chebyshev.Density, n)
		for i, mu := range row {
			damped[i] = mu * kernel[i]
			c.total[i] += damped[i] / float64(len(t.rows))
		}
		c.rows = append(c.rows, damped)
	}
	if !t.exact {
		c.Vectors = len(t.rows)
		c.spread = halfWidth(c.Vectors)
	}
	c.Resolution = chebyshev.JacksonWidth(n, 0) * (t.within.High - t.within.Low) / 2
	return c
}

// halfWidth returns the factor from the standard deviation of count samples to
// the half width of 95 % confidence of their mean, by Student's t.
func halfWidth(count int) float64 {
	t := distuv.StudentsT{Mu: 0, Sigma: 1, Nu: float64(count - 1)}
	return t.Quantile(0.975) / math.Sqrt(float64(count))
}

// At evaluates the curve at an energy from Floor to Ceiling. Cost O(Moments
// Vectors).
//
// It returns an error if the energy lies outside.
func (c *Curve) At(energy float64) (CurvePoint, error) {
	if !(energy >= c.Floor && energy <= c.Ceiling) {
		return CurvePoint{}, fmt.Errorf("thermo: energy %g Hz, want %g to %g Hz", energy, c.Floor, c.Ceiling)
	}
	return c.at(energy), nil
}

func (c *Curve) at(energy float64) CurvePoint {
	x := c.within.Place(energy)
	scale := 2 / (c.within.High - c.within.Low) // dx/dE
	p := c.total.At(x)
	// Where there are no levels, rounding of the sum of the moments is what is
	// left; the density is not smaller than that.
	least := 1e-15 * float64(c.Moments) * c.total[0]
	value, below := max(p.Value, least), max(p.Below, least)
	beta := p.Slope / value
	out := CurvePoint{
		Energy: energy, Density: value * scale, Beta: beta * scale,
		Entropy:       math.Log(value * scale * c.Unit),
		VolumeEntropy: math.Log(below), VolumeBeta: value / below * scale,
	}
	if c.spread == 0 {
		return out
	}
	density, slope := 0.0, 0.0
	for _, row := range c.rows {
		r := row.At(x)
		d, s := r.Value/value-1, (r.Slope-beta*r.Value)/value
		density += d * d
		slope += s * s
	}
	free := float64(len(c.rows) - 1)
	out.EntropyError = c.spread * math.Sqrt(density/free)
	out.DensityError = out.EntropyError * out.Density
	out.BetaError = c.spread * math.Sqrt(slope/free) * scale
	return out
}

// fill evaluates the curve at the middles of equal bins.
func (c *Curve) fill(opt Options) {
	lists := []*[]float64{
		&c.Energy, &c.Density, &c.DensityError, &c.Entropy, &c.EntropyError, &c.Beta, &c.BetaError,
	}
	if opt.Volume {
		lists = append(lists, &c.VolumeEntropy, &c.VolumeBeta)
	}
	for _, list := range lists {
		*list = make([]float64, opt.Points)
	}
	for i := range opt.Points {
		p := c.at(c.Floor + (c.Ceiling-c.Floor)*(float64(i)+0.5)/float64(opt.Points))
		c.Energy[i] = p.Energy
		c.Density[i], c.DensityError[i] = p.Density, p.DensityError
		c.Entropy[i], c.EntropyError[i] = p.Entropy, p.EntropyError
		c.Beta[i], c.BetaError[i] = p.Beta, p.BetaError
		if opt.Volume {
			c.VolumeEntropy[i], c.VolumeBeta[i] = p.VolumeEntropy, p.VolumeBeta
		}
	}
	c.Peak = c.peak()
}

// peak finds the largest density between the bins beside the largest one.
func (c *Curve) peak() float64 {
	top := 0
	for i, w := range c.Density {
		if w > c.Density[top] {
			top = i
		}
	}
	low, high := c.Energy[max(top-1, 0)], c.Energy[min(top+1, len(c.Energy)-1)]
	if !(c.at(low).Beta > 0 && c.at(high).Beta < 0) {
		return c.Energy[top]
	}
	for range 60 { // bisection
		middle := low + (high-low)/2
		if c.at(middle).Beta > 0 {
			low = middle
		} else {
			high = middle
		}
	}
	return low
}
