package band

import (
	"math"
	"slices"

	"gonum.org/v1/gonum/integrate/quad"
)

// rule is a set of points on 0 < q < 1 for integrals over half the zone. From 0
// to 1 - inner it is fixed; the rest follows the branch point of the depth.
type rule struct {
	q, weight         []float64 // the fixed part, ascending
	node, innerWeight []float64 // Gauss-Legendre on [0, 1] for the rest
	inner             float64
}

// gradedPoints are the points per panel [0, 1/2], [1/2, 3/4], ... of the rule for
// shallow lattices and for Wannier functions. A panel of length h carries waves
// exp(iq xi) with |xi| <= MaxReach, so it takes h MaxReach/2 points and 15 more.
var gradedPoints = [...]int{40, 28, 22, 18, 16, 16}

// innerPoints closes the graded rule over the last 1/64.
const innerPoints = 40

// maxPoints is the size of the graded rule, the largest.
const maxPoints = 40 + 28 + 22 + 18 + 16 + 16 + innerPoints

// plainRule maps all of [0, 1], which suits depths whose branch point is far and
// whose Wannier function ends within a few sites.
func plainRule(points int) rule {
	r := rule{inner: 1}
	r.node, r.innerWeight = legendre(points, 0, 1)
	return r
}

// gradedRule halves its panels towards q = 1.
func gradedRule() rule {
	r := rule{inner: 1}
	for _, points := range gradedPoints {
		q, weight := legendre(points, 1-r.inner, 1-r.inner/2)
		r.q, r.weight = append(r.q, q...), append(r.weight, weight...)
		r.inner /= 2
	}
	r.node, r.innerWeight = legendre(innerPoints, 0, 1)
	return r
}

// legendre returns a Gauss-Legendre rule in ascending order; gonum's descends.
func legendre(points int, low, high float64) (x, weight []float64) {
	x, weight = make([]float64, points), make([]float64, points)
	quad.Legendre{}.FixedLocations(x, weight, low, high)
	if x[0] > x[points-1] {
		slices.Reverse(x)
		slices.Reverse(weight)
	}
	return x, weight
}

// rules are what a Workspace keeps, from shallow to deep. Each is enough for
// 1e-13 in all integrals of its depths.
type rules struct{ graded, shallow, middle, deep rule }

func newRules() rules {
	return rules{graded: gradedRule(), shallow: plainRule(32), middle: plainRule(20), deep: plainRule(12)}
}

// at picks the smallest rule that is enough at a depth in Er.
func (r *rules) at(depth float64) *rule {
	switch {
	case depth < 1:
		return &r.graded
	case depth < 6:
		return &r.shallow
	case depth < 20:
		return &r.middle
	}
	return &r.deep
}

// zone is a rule placed for one depth, with what has been found at each point.
type zone struct {
	q, weight []float64
	rise      []float64 // E0(q) - E0(0), Er
	vector    []float64 // row i holds the coefficients c_l of point i, sum c^2 = 1
	width     int       // length of a row
}

func newZone() zone {
	return zone{
		q: make([]float64, maxPoints), weight: make([]float64, maxPoints),
		rise: make([]float64, maxPoints), vector: make([]float64, maxPoints*(2*maxRungs+1)),
	}
}

// row returns the coefficients at point i.
func (z *zone) row(i int) []float64 { return z.vector[i*z.width : (i+1)*z.width] }

// place sets the points and weights for a depth > 0. Beyond 1 - r.inner
//
//	q = 1 - a sinh t,  a = s/8,  t from asinh(r.inner/a) to 0
//
// so that the branch point at 1 + i a stays at a fixed distance in t.
func (z *zone) place(r *rule, depth float64) {
	fixed, n := len(r.q), len(r.q)+len(r.node)
	z.q, z.weight, z.rise = z.q[:n], z.weight[:n], z.rise[:n]
	copy(z.q, r.q)
	copy(z.weight, r.weight)
	a := depth / 8
	top := math.Asinh(r.inner / a)
	for i, x := range r.node {
		t := top * (1 - x)
		z.q[fixed+i] = 1 - a*math.Sinh(t)
		z.weight[fixed+i] = r.innerWeight[i] * top * a * math.Cosh(t)
	}
}
