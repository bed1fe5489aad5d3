package eos

import (
	"math"

	"gonum.org/v1/gonum/integrate/quad"
)

// zone averages functions of the energy over the Brillouin zone of a band. It holds
// energies above the lowest and weights that sum to 1, crowded at the lowest energy:
//
//	q = s sinh(c t), c = asinh(pi/s), t by the rule of Gauss and Legendre
//
// on each axis. An occupation has its pole at q = i sqrt(excess/J), the excess being
// the distance from the chemical potential to the band, and s is that length.
type zone struct {
	band   rising
	t, w   []float64 // rule on (0, 1)
	e, p   [3][]float64
	energy []float64
	weight []float64
	scale  float64 // energy the nodes were laid for
}

// nodes is the number of points of the rule by the number of axes.
var nodes = [4]int{0, 96, 40, 32}

func newZone(b rising) *zone {
	axes := len(b.hops)
	n := nodes[axes]
	z := &zone{band: b, t: make([]float64, n), w: make([]float64, n), scale: -1}
	quad.Legendre{}.FixedLocations(z.t, z.w, 0, 1)
	for a := range axes {
		z.e[a], z.p[a] = make([]float64, n), make([]float64, n)
	}
	size := n
	for range axes - 1 {
		size *= n
	}
	z.energy, z.weight = make([]float64, 0, size), make([]float64, 0, size)
	return z
}

// lay places the nodes for an energy scale in Hz, rounded to a power of 4 so that
// neighbouring points share their nodes. No allocation.
func (z *zone) lay(scale float64) {
	scale = math.Exp2(2 * math.Floor(math.Log2(scale)/2))
	if scale == z.scale {
		return
	}
	z.scale = scale
	for a, hops := range z.band.hops {
		j := rise(hops, math.Pi) / 4
		s := min(math.Sqrt(scale/j), 4)
		s = max(s, 1e-9)
		c := math.Asinh(math.Pi / s)
		for i, t := range z.t {
			z.e[a][i] = rise(hops, s*math.Sinh(c*t))
			z.p[a][i] = z.w[i] * s * c * math.Cosh(c*t) / math.Pi
		}
	}
	z.energy, z.weight = z.energy[:0], z.weight[:0]
	z.spread(0, 0, 0, 1, 1)
}

// spread lists the points of the axes from a on. Equal axes are taken in ascending
// order only; run counts how many of the last indices agree.
func (z *zone) spread(a, from int, energy, weight, run float64) {
	if a == len(z.band.hops) {
		z.energy, z.weight = append(z.energy, energy), append(z.weight, weight)
		return
	}
	if !z.band.equal {
		for i, e := range z.e[a] {
			z.spread(a+1, 0, energy+e, weight*z.p[a][i], 1)
		}
		return
	}
	for i := from; i < len(z.t); i++ {
		same := 1.0
		if a > 0 && i == from {
			same = run + 1
		}
		z.spread(a+1, i, energy+z.e[a][i], weight*z.p[a][i]*float64(a+1)/same, same)
	}
}

// gas holds averages over the zone of an ideal gas.
type gas struct {
	filling, kinetic float64 // kinetic from the lowest energy, Hz
	entropy          float64
	response         float64 // d filling/d mu, 1/Hz
}

// bose sums an ideal gas whose lowest energy lies excess > 0 above its chemical
// potential, at a finite beta. See Ideal.At for the errors. No allocation.
func (z *zone) bose(excess, beta float64) gas {
	z.lay(min(excess, 1/beta))
	var g gas
	for i, e := range z.energy {
		x, w := beta*(excess+e), z.weight[i]
		if x > 700 {
			continue
		}
		b := 1 / math.Expm1(x)
		g.filling += w * b
		g.kinetic += w * b * e
		g.entropy += w * (x*b + math.Log1p(b)) // -ln(1-exp(-x)) = ln(1+b)
		g.response += w * b * (1 + b)
	}
	g.response *= beta
	return g
}
