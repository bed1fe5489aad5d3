package band

import (
	"fmt"
	"math"
)

// MaxReach is the largest |xi| at which Wannier evaluates, 31 sites and a half.
const MaxReach = 31.5 * math.Pi

// maxCellPoints is the number of points in half a cell at MaxDepth.
const maxCellPoints = 24

// cell holds the Bloch waves of the zone on a grid over half a lattice cell and
// the phases with which they continue into the next ones.
type cell struct {
	cos, sin   []float64 // cos 2l xi, sin 2l xi
	even, odd  []float64 // weight Re psi_q, weight Im psi_q: row per point of the zone
	phase      []float64 // cos(pi n q), sin(pi n q), pairs
	step       []float64 // cos(pi q), sin(pi q), pairs
	sumE, sumO []float64
}

func newCell(points int) cell {
	return cell{
		cos: make([]float64, maxRungs+1), sin: make([]float64, maxRungs+1),
		even: make([]float64, points*maxCellPoints), odd: make([]float64, points*maxCellPoints),
		phase: make([]float64, 2*points), step: make([]float64, 2*points),
		sumE: make([]float64, maxCellPoints), sumO: make([]float64, maxCellPoints),
	}
}

// cellPoints returns the number of grid points in half a cell. w^4 has the
// Fourier transform exp(-K^2/8 sqrt(s)) in a deep lattice, and a spacing of
// pi/2n is blind to K = 4n: n = 4 + 4 s^(1/4) leaves below 1e-15.
func cellPoints(depth float64) int {
	return int(math.Ceil(4 + 4*math.Sqrt(math.Sqrt(depth))))
}

// fourthMoment returns int w^4 dxi from the swept zone: the trapezoid rule in xi,
// cell after cell until the tail has died away or MaxReach is met.
func (w *Workspace) fourthMoment(depth float64) float64 {
	n := cellPoints(depth)
	w.fillCell(n)
	total := 0.0
	for site := 0; float64(site) < MaxReach/math.Pi; site++ {
		part := w.cellMoment(site, n)
		total += part
		if part < 1e-14*total {
			break
		}
	}
	return total / (math.Pi * float64(n)) // 2 (pi/2n) and 1/sqrt(pi) to the fourth
}

// fillCell evaluates the Bloch waves at xi = (j + 1/2) pi/2n, j < n.
func (w *Workspace) fillCell(n int) {
	z, c := &w.zone, &w.cell
	for i, q := range z.q {
		sin, cos := math.Sincos(math.Pi * q)
		c.step[2*i], c.step[2*i+1] = cos, sin
		c.phase[2*i], c.phase[2*i+1] = 1, 0
	}
	for j := range n {
		xi := (float64(j) + 0.5) * math.Pi / float64(2*n)
		top := (z.width - 1) / 2
		harmonics(c.cos[:top+1], c.sin[:top+1], 2*xi)
		for i, q := range z.q {
			re, im := bloch(z.row(i), c.cos, c.sin)
			sin, cos := math.Sincos(q * xi)
			c.even[i*n+j] = z.weight[i] * (cos*re - sin*im)
			c.odd[i*n+j] = z.weight[i] * (sin*re + cos*im)
		}
	}
}

// harmonics writes cos(l x) and sin(l x).
func harmonics(cos, sin []float64, x float64) {
	s, c := math.Sincos(x)
	cos[0], sin[0] = 1, 0
	for l := 1; l < len(cos); l++ {
		cos[l] = cos[l-1]*c - sin[l-1]*s
		sin[l] = cos[l-1]*s + sin[l-1]*c
	}
}

// bloch returns the periodic part of a Bloch wave, sum_l c_l exp(2il xi), given
// the cosines and sines of 2l xi.
func bloch(c, cos, sin []float64) (re, im float64) {
	top := (len(c) - 1) / 2
	re = c[top]
	for l := 1; l <= top; l++ {
		up, down := c[top+l], c[top-l]
		re += (up + down) * cos[l]
		im += (up - down) * sin[l]
	}
	return re, im
}

// cellMoment returns the sum of (sqrt(pi) w)^4 over the points +-xi_j + pi site,
// once for site 0, and moves the phases on to the next site.
func (w *Workspace) cellMoment(site, n int) float64 {
	c := &w.cell
	even, odd := c.sumE[:n], c.sumO[:n]
	clear(even)
	clear(odd)
	for i := range w.zone.q {
		re, im := c.phase[2*i], c.phase[2*i+1]
		e, o := c.even[i*n:(i+1)*n], c.odd[i*n:(i+1)*n]
		for j := range even {
			even[j] += re * e[j]
			odd[j] += im * o[j]
		}
		cos, sin := c.step[2*i], c.step[2*i+1]
		c.phase[2*i], c.phase[2*i+1] = re*cos-im*sin, re*sin+im*cos
	}
	sum := 0.0
	for j, e := range even {
		right, left := (e-odd[j])*(e-odd[j]), (e+odd[j])*(e+odd[j])
		if site == 0 {
			left = 0 // at site 0 both are the same point by symmetry
		}
		sum += right*right + left*left
	}
	return sum
}

// Wannier writes the real Wannier function of the lowest band, centred on the
// site at xi = 0 and normalised to int w^2 dxi = 1, at each xi. dst and xi have
// the same length.
//
// Accurate to 1e-10 above 1 Er, to 1e-8 below. Cost O(64 len(xi)); no allocation.
//
// It returns ErrDepth if the depth is out of range and an error if an xi lies
// beyond MaxReach. It panics if the lengths differ.
func (w *Workspace) Wannier(dst, xi []float64, depth float64) error {
	if len(dst) != len(xi) {
		panic(fmt.Sprintf("band: %d places for %d positions", len(dst), len(xi)))
	}
	if err := checkDepth(depth); err != nil {
		return err
	}
	for _, x := range xi {
		if !(math.Abs(x) <= MaxReach) {
			return fmt.Errorf("band: position %g, want within %g of the site", x, MaxReach)
		}
	}
	if depth < almostFree {
		freeWannier(dst, xi)
		return nil
	}
	b := Bands{Depth: depth}
	w.edges(&b)
	w.sweep(&w.rules.graded, &b)
	for j, x := range xi {
		dst[j] = w.wannierAt(x)
	}
	return nil
}

func (w *Workspace) wannierAt(x float64) float64 {
	z, c := &w.zone, &w.cell
	harmonics(c.cos[:(z.width+1)/2], c.sin[:(z.width+1)/2], 2*x)
	sum := 0.0
	for i, q := range z.q {
		re, im := bloch(z.row(i), c.cos, c.sin)
		sin, cos := math.Sincos(q * x)
		sum += z.weight[i] * (cos*re - sin*im)
	}
	return sum / math.Sqrt(math.Pi)
}

// freeWannier writes sin(xi)/(sqrt(pi) xi).
func freeWannier(dst, xi []float64) {
	for j, x := range xi {
		dst[j] = 1 / math.Sqrt(math.Pi)
		if x != 0 {
			dst[j] = math.Sin(x) / (math.Sqrt(math.Pi) * x)
		}
	}
}
