package krylov

import "math"

// The bound of the integral of |u_m| marches through time with u(s) exact at
// every node. From a node on, |u| cannot grow faster than the solution of
//
//	y' = B y,   y(0) = |u(s)|,
//
// B the tridiagonal matrix of the beta_j without a diagonal: the diagonal of T
// turns phases only, and every off-diagonal path of the Dyson series is bounded by
// that of y (derived). So, node by node,
//
//	integral_s^(s+r) |u_m| <= sum_p r^(p+1)/(p+1)! (B^p |u(s)|)_m.
//
// Where a vector had to be made orthogonal again, what was removed from H v_j is a
// defect too, |removed| u_j. So defects come as a list with a number for every u_j,
// most of them 0, and beta_m for the last.

const (
	// stride is the length of an interval times the largest row sum of T. The bound
	// exceeds the integral by less than the factor e^(2 stride/3) or so.
	stride = 1.0

	// terms of both series: stride^p/p! is then below 1e-18.
	terms = 19

	// mostNodes of one march.
	mostNodes = 4096

	// stepRounding allows for those of one step's norm and sums.
	stepRounding = 16 * unitRoundoff

	// unitRoundoff of float64.
	unitRoundoff = 1.0 / (1 << 53)
)

// march holds u(s) = exp(-i s T) e_1 and the scratch of its series, all of the
// largest dimension.
type march struct {
	re, im         []float64 // u
	termRe, termIm []float64
	nextRe, nextIm []float64
	above, spare   []float64 // terms of the bound
}

func newMarch(most int) *march {
	row := func() []float64 { return make([]float64, most) }
	return &march{row(), row(), row(), row(), row(), row(), row(), row()}
}

// tridiagonal is T with its rows' centre taken out of the diagonal.
type tridiagonal struct {
	alpha, beta []float64 // beta[j] couples j and j+1; len(beta) = len(alpha)-1
	centre      float64   // taken out of alpha
	radius      float64   // largest row sum of |T - centre|, 0 in one dimension
}

// centred fills in centre and radius from the discs of Gershgorin.
func centred(alpha, beta []float64) tridiagonal {
	low, high := math.Inf(1), math.Inf(-1)
	for j, a := range alpha {
		r := 0.0
		if j > 0 {
			r += beta[j-1]
		}
		if j < len(beta) {
			r += beta[j]
		}
		low, high = min(low, a-r), max(high, a+r)
	}
	return tridiagonal{alpha: alpha, beta: beta, centre: (low + high) / 2, radius: (high - low) / 2}
}

// start sets u = e_1.
func (m *march) start(dimension int) {
	clear(m.re[:dimension])
	clear(m.im[:dimension])
	m.re[0] = 1
}

// advance takes u over a step with step*radius <= stride, without the phase of
// the centre.
func (m *march) advance(t tridiagonal, step float64) {
	n := len(t.alpha)
	re, im := m.termRe[:n], m.termIm[:n]
	nextRe, nextIm := m.nextRe[:n], m.nextIm[:n]
	copy(re, m.re)
	copy(im, m.im)
	for p := 1; p <= terms; p++ {
		h := step / float64(p)
		t.applyTo(nextRe, im, h)
		t.applyTo(nextIm, re, -h)
		re, nextRe = nextRe, re
		im, nextIm = nextIm, im
		for j := range re {
			m.re[j] += re[j]
			m.im[j] += im[j]
		}
	}
}

// applyTo sets dst = h (T - centre) x.
func (t tridiagonal) applyTo(dst, x []float64, h float64) {
	n := len(dst)
	before := 0.0
	for j := range n - 1 {
		b := t.beta[j]
		dst[j] = h * (before + (t.alpha[j]-t.centre)*x[j] + b*x[j+1])
		before = b * x[j]
	}
	dst[n-1] = h * (before + (t.alpha[n-1]-t.centre)*x[n-1])
}

// ahead bounds the integral of sum_j defects[j] |u_j| over the next step; those
// before first are 0.
func (m *march) ahead(t tridiagonal, defects []float64, first int, step float64) float64 {
	n := len(t.alpha)
	y, next := m.above[:n], m.spare[:n]
	for j := range y {
		y[j] = math.Hypot(m.re[j], m.im[j])
	}
	sum := step * dot(defects[first:], y[first:])
	for p := 1; p <= terms; p++ {
		h := step / float64(p)
		before := 0.0
		for j := range n - 1 {
			next[j] = h * (before + t.beta[j]*y[j+1])
			before = t.beta[j] * y[j]
		}
		next[n-1] = h * before
		y, next = next, y
		sum += step / float64(p+1) * dot(defects[first:], y[first:])
	}
	return sum
}

// reach returns a time s <= time at which the bound of the error of a unit vector
// from the defects is at most rate s, and that bound. It marches to the first node
// that fails and then looks for a shorter last interval.
func (m *march) reach(t tridiagonal, defects []float64, time, rate float64) (reach, bound float64) {
	first := 0
	for defects[first] == 0 && first < len(defects)-1 {
		first++
	}
	m.start(len(t.alpha))
	nodes := max(1, math.Ceil(time*t.radius/stride))
	step := time / nodes
	for k := 1.0; k <= nodes; k++ {
		now := bound + m.ahead(t, defects, first, step)
		if !(now <= rate*step*k) {
			break
		}
		bound, reach = now, step*k
		if k == nodes {
			return time, bound
		}
		m.advance(t, step)
	}
	halvings := 3 // an eighth of an interval is close enough
	if reach == 0 {
		halvings = 60
	}
	for range halvings {
		step /= 2
		if now := bound + m.ahead(t, defects, first, step); now <= rate*(reach+step) {
			return reach + step, now
		}
	}
	return reach, bound
}

// rounding allows for the rounding errors of products and sums that grow with
// time: the recurrence holds to some units of T's size.
func rounding(t tridiagonal, last, time float64) float64 {
	return 8 * unitRoundoff * time * (math.Abs(t.centre) + t.radius + last)
}

// at sets u = exp(-i time T) e_1, of either sign of the time, in re and im.
func (m *march) at(t tridiagonal, time float64) (re, im []float64) {
	n := len(t.alpha)
	m.start(n)
	span := math.Abs(time)
	nodes := max(1, math.Ceil(span*t.radius/stride))
	for range int(nodes) {
		m.advance(t, span/nodes)
	}
	sin, cos := math.Sincos(-span * t.centre)
	if time < 0 { // T is real: u(-s) is the conjugate of u(s)
		sin = -sin
	}
	re, im = m.re[:n], m.im[:n]
	for j := range re {
		if time < 0 {
			im[j] = -im[j]
		}
		re[j], im[j] = re[j]*cos-im[j]*sin, re[j]*sin+im[j]*cos
	}
	return re, im
}
