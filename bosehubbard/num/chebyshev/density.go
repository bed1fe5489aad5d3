package chebyshev

import (
	"fmt"
	"math"
)

// Density is a function on (-1, 1) given by its Chebyshev moments, damping
// included,
//
//	f(x) = (mu_0 + 2 sum_n mu_n T_n(x)) / (pi sqrt(1-x^2))
//
// Its integral from -1 to 1 is mu_0.
type Density []float64

// Point is a density at one place.
type Point struct {
	Value float64 // f(x)
	Slope float64 // df/dx
	Below float64 // integral of f from -1 to x
}

// At evaluates the density, its derivative and its integral from -1 to x, with
// t = arccos x:
//
//	f'  = (2 sum n mu_n sin(n t))/(pi sin^2 t) + f cos t/sin^2 t
//	int = (mu_0 (pi - t) - 2 sum mu_n sin(n t)/n)/pi
//
// Rounding is about N times 1e-16 of the sums. Cost O(N); no allocation.
//
// It panics unless -1 < x < 1 and there is a moment.
func (d Density) At(x float64) Point {
	if !(x > -1 && x < 1) || len(d) == 0 {
		panic(fmt.Sprintf("chebyshev: density of %d moments at %g, want at least 1, between -1 and 1", len(d), x))
	}
	sin := math.Sqrt((1 - x) * (1 + x))
	cosine, slope, below := 0.0, 0.0, 0.0
	c, s := 1.0, 0.0 // cos(n t), sin(n t)
	for i, mu := range d[1:] {
		c, s = c*x-s*sin, s*x+c*sin
		n := float64(i + 1)
		cosine += mu * c
		slope += n * mu * s
		below += mu * s / n
	}
	value := (d[0] + 2*cosine) / (math.Pi * sin)
	return Point{
		Value: value,
		Slope: (2*slope/math.Pi + value*x) / (sin * sin),
		Below: (d[0]*math.Acos(-x) - 2*below) / math.Pi,
	}
}

// MomentsOf adds weight T_n(x) to dst[n] for every n: the moments of one level at
// x in [-1, 1]. Cost O(N); no allocation.
func MomentsOf(dst []float64, x, weight float64) {
	t := math.Acos(min(max(x, -1), 1))
	for n := range dst {
		dst[n] += weight * math.Cos(float64(n)*t)
	}
}
