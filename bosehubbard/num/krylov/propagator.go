package krylov

import (
	"context"
	"errors"
	"fmt"
	"math"
)

// DefaultDimension is the largest dimension of the Krylov space unless asked for
// otherwise.
const DefaultDimension = 32

// ErrNotFinite says that a vector or the product with the matrix has an infinity
// or a NaN, or that the vector is zero.
var ErrNotFinite = errors.New("krylov: a vector is zero or has numbers that are not finite")

// ToleranceError says that a tolerance lies below the rounding errors.
type ToleranceError struct {
	Tolerance float64 // for the time left
	Rounding  float64 // what the rounding errors may add up to in it
}

func (e *ToleranceError) Error() string {
	return fmt.Sprintf("krylov: tolerance %.3g is below the rounding errors of about %.3g", e.Tolerance, e.Rounding)
}

// Options of New. The zero value works.
type Options struct {
	Dimension int // largest dimension of the Krylov space, at least 2; 0: DefaultDimension
	Least     int // dimension that a space has at least unless it is closed; 0: 1
	Workers   int // goroutines that share the vector sums; below 1: what the machine runs at once
}

// Propagator applies exp(-i tau H) to vectors of one length. It holds
// Dimension + 1 complex vectors and is for one caller at a time. Every number of
// workers gives the same bits.
type Propagator struct {
	least int
	most  int
	space *space
	march *march
	watch *watch

	alpha, beta []float64 // T: beta[j] couples the vectors j and j+1
	size        float64   // |psi|
	again       int       // the last vector to be orthogonalised in full, if any
	defects     []float64 // |what that took out of H v_j|, and beta_m for the last
	likely      int       // dimension that sufficed last time,
	likelyTime  float64   // for this time

	products, removals int
}

// New returns a propagator for vectors of n complex components.
//
// It panics if n < 1, or a dimension of 1 or less than 0 is asked for.
func New(n int, opt Options) *Propagator {
	if opt.Dimension == 0 {
		opt.Dimension = DefaultDimension
	}
	if n < 1 || opt.Dimension < 2 {
		panic(fmt.Sprintf("krylov: %d components in a space of dimension %d, want at least 1 and 2", n, opt.Dimension))
	}
	return &Propagator{
		least: min(opt.Least, opt.Dimension), most: opt.Dimension, space: newSpace(n, opt.Dimension+1, opt.Workers),
		march: newMarch(opt.Dimension + 1), watch: newWatch(n, opt.Dimension),
		alpha: make([]float64, 0, opt.Dimension), beta: make([]float64, 0, opt.Dimension), defects: make([]float64, 0, opt.Dimension),
	}
}

// Bytes returns the memory that a propagator of the dimension needs for vectors of
// n complex components, apart from some kilobytes.
func Bytes(n, dimension int) float64 { return 16 * float64(n) * float64(dimension+1) }

// Dimension returns the dimension m of the space built last.
func (p *Propagator) Dimension() int { return len(p.alpha) }

// Products returns the number of products with H so far, Reorthogonalisations how
// many vectors had to be made orthogonal in full.
func (p *Propagator) Products() int             { return p.products }
func (p *Propagator) Reorthogonalisations() int { return p.removals }

// Build builds the Krylov space of psi for times up to |tau|: it grows until the
// bound of the error in the time |tau| is at most tolerance, relative to |psi|, or
// until it has the largest dimension.
//
// It returns a time up to |tau| for which [Propagator.AdvanceTo] has an error of
// at most tolerance*reach/|tau|, and the bound of the error there, both apart from
// some units of rounding. No allocation with one worker.
//
// It returns the errors of h, ctx.Err() if stopped, [ErrNotFinite], or a
// *[ToleranceError].
func (p *Propagator) Build(ctx context.Context, psi Vector, tau, tolerance float64, h Product) (reach, bound float64, err error) {
	if psi.Len() != p.space.length {
		panic(fmt.Sprintf("krylov: vector of %d components, want %d", psi.Len(), p.space.length))
	}
	time := math.Abs(tau)
	if !(tolerance > 0) || math.IsInf(tolerance, 1) || math.IsNaN(time) || math.IsInf(time, 1) {
		return 0, 0, fmt.Errorf("krylov: time %g with tolerance %g, want finite numbers and a tolerance > 0", tau, tolerance)
	}
	if err := p.begin(ctx, psi); err != nil {
		return 0, 0, err
	}
	for check := p.firstCheck(time); ; {
		closed, err := p.grow(ctx, tolerance/time, h)
		if err != nil {
			return 0, 0, err
		}
		m := p.Dimension()
		early := m < check && p.beta[m-1]*time > tolerance/4 || m < p.least
		if early && m < p.most && !closed {
			continue
		}
		if reach, bound, err = p.assess(time, tolerance); err != nil {
			return 0, 0, err
		}
		if reach == time || m == p.most || closed {
			p.likely, p.likelyTime = m, time
			if reach == 0 && time > 0 {
				err = &ToleranceError{Tolerance: tolerance, Rounding: p.defects[0] * time}
			}
			return reach, bound, err
		}
		// A dimension more gains about one over the radius in time.
		t, _ := p.projected()
		check = m + max(1, int(0.75*min((time-reach)*t.radius, float64(p.most))))
	}
}

// firstCheck is the first dimension at which to look at the bound: one less than
// sufficed for about the same time.
func (p *Propagator) firstCheck(time float64) int {
	if math.Abs(time-p.likelyTime) < 0.2*time {
		return p.likely - 1
	}
	return 2
}

// assess bounds the error in the space as it is.
func (p *Propagator) assess(time, tolerance float64) (reach, bound float64, err error) {
	t, last := p.projected()
	if time == 0 {
		return 0, stepRounding, nil
	}
	whole := rounding(t, last, time)
	if !(whole < tolerance/2) {
		return 0, 0, &ToleranceError{Tolerance: tolerance, Rounding: whole}
	}
	span := min(time, mostNodes*stride/t.radius) // radius 0: time
	end := &p.defects[len(p.defects)-1]
	removed := *end
	*end += last
	reach, bound = p.march.reach(t, p.defects, span, (tolerance-whole)/time)
	*end = removed
	return reach, bound + whole*(reach/time) + stepRounding, nil
}

// begin takes psi as the first vector.
func (p *Propagator) begin(ctx context.Context, psi Vector) error {
	p.alpha, p.beta, p.defects, p.again = p.alpha[:0], p.beta[:0], p.defects[:0], -1
	size, err := p.space.norm(ctx, psi)
	if err != nil {
		return err
	}
	if !(size > 0) || math.IsInf(size, 1) {
		return ErrNotFinite
	}
	p.space.vectors[0].CopyFrom(psi)
	p.space.norms[0], p.size = size, size
	p.watch.start()
	return nil
}

// grow adds one dimension, and reports whether the space is closed: H does not
// lead out of it. rate is the error allowed per time.
func (p *Propagator) grow(ctx context.Context, rate float64, h Product) (closed bool, err error) {
	s, j := p.space, len(p.alpha)
	expectation, err := h(ctx, s.vectors[j+1], s.vectors[j])
	if err != nil {
		return false, err
	}
	p.products++
	alpha := expectation / (s.norms[j] * s.norms[j])
	before := 0.0
	if j > 0 {
		before = p.beta[j-1]
	}
	beta, err := s.recur(ctx, j, alpha, before)
	if err != nil {
		return false, err
	}
	if sum := math.Abs(alpha) + beta; math.IsNaN(sum) || math.IsInf(sum, 0) {
		return false, ErrNotFinite
	}
	p.alpha, p.beta, p.defects = append(p.alpha, alpha), append(p.beta, beta), append(p.defects, 0)
	if !p.closes(j) && p.mustClean(j, rate) {
		for before, again := beta, true; again; before = p.beta[j] {
			norm, removed, err := s.remove(ctx, j)
			if err != nil {
				return false, err
			}
			p.beta[j] = norm
			p.defects[j] += removed
			again = norm < 0.7*before && !p.closes(j) // what was left was rounding
		}
		p.removals++
	}
	s.norms[j+1] = p.beta[j]
	return p.closes(j), nil
}

// closes reports whether beta_j is rounding only, and then sets it to 0.
func (p *Propagator) closes(j int) bool {
	if t, last := p.projected(); last <= 8*unitRoundoff*(math.Abs(t.centre)+t.radius) {
		p.beta[j] = 0
	}
	return p.beta[j] == 0
}

// mustClean reports whether vector j+1 has to be made orthogonal to all before it:
// it and the one after it, once the watch says that it matters. What is removed
// from H v_j is missing from T and counts as a defect, so it has to be done while
// that is little.
func (p *Propagator) mustClean(j int, rate float64) bool {
	t, last := p.projected()
	limit := min(math.Sqrt(unitRoundoff), max(4*p.watch.floor, 0.01*rate/(t.radius+last)))
	if p.watch.step(p.alpha, p.beta) > limit {
		p.again = j + 1
	} else if p.again != j {
		return false
	}
	p.watch.reset(j)
	return true
}

// projected returns T_m and beta_m.
func (p *Propagator) projected() (t tridiagonal, last float64) {
	m := len(p.alpha)
	return centred(p.alpha, p.beta[:m-1]), p.beta[m-1]
}

// Frequency returns |(H - E)^2 psi|/|(H - E) psi|, E = psi.H psi/|psi|^2, for the psi
// of the space built last: what psi mostly turns with, beside the phase of E. It is
// 0 for an eigenvector.
func (p *Propagator) Frequency() float64 {
	switch m := p.Dimension(); {
	case p.beta[0] == 0:
		return 0
	case m == 1:
		return p.beta[0]
	default:
		return math.Hypot(math.Hypot(p.beta[0], p.alpha[1]-p.alpha[0]), p.beta[1])
	}
}

// AdvanceTo sets dst to the approximation of exp(-i tau H) psi in the space built
// last, tau of either sign, and returns its norm. Its error is known for |tau| up
// to the reach. dst may be the psi given to [Propagator.Build]. Cost: as many
// passes as the dimension; no allocation with one worker.
//
// It returns ctx.Err() if stopped.
func (p *Propagator) AdvanceTo(ctx context.Context, dst Vector, tau float64) (norm float64, err error) {
	t, _ := p.projected()
	re, im := p.march.at(t, tau)
	for j := range re {
		re[j] *= p.size
		im[j] *= p.size
	}
	return p.space.combine(ctx, dst, re, im)
}

// PowerTo sets dst = H^power psi for the psi of the space built last, power less
// than its dimension; a closed space has every power.
//
// It returns ctx.Err() if stopped. It panics if the space has too few dimensions.
func (p *Propagator) PowerTo(ctx context.Context, dst Vector, power int) error {
	t, last := p.projected()
	n := p.Dimension()
	if power < 0 || power >= n && last != 0 {
		panic(fmt.Sprintf("krylov: power %d in a space of dimension %d", power, n))
	}
	t.centre = 0
	c, next := p.march.re[:n], p.march.termRe[:n]
	clear(c)
	c[0] = p.size
	for range power {
		t.applyTo(next, c, 1)
		c, next = next, c
	}
	return p.space.sum(ctx, dst, c[:min(power+1, n)]) // the others are 0
}
