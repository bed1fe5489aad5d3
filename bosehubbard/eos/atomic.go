package eos

import (
	"fmt"
	"math"
)

// atomicLevels is the largest number of occupations that Atomic takes into account.
const atomicLevels = 512

// Atomic is the expansion about sites without tunnelling, to second order in it.
type Atomic struct {
	terms   Terms
	squares float64 // sum of J^2 over the bonds of a site
	zJ      float64

	u, mu, beta float64 // of the mirrored system
	still       bool    // only one occupation has a weight
	levels      int
	h, p        []float64 // E_n - mu n and probability of n atoms without tunnelling
	f           []float64 // pair factors by the energy difference in units of U
	low, high   []float64 // and their derivatives
	d           []float64 // dK/dh_k of one site of a bond
}

// NewAtomic returns the atomic limit of a lattice.
//
// It returns an error if a number is not finite or U = 0.
func NewAtomic(t Terms) (*Atomic, error) {
	if err := t.check(); err != nil {
		return nil, err
	}
	if t.Interaction == 0 {
		return nil, fmt.Errorf("eos: U = 0 in the atomic limit, want an interaction")
	}
	m := &Atomic{terms: t, squares: t.squares()}
	for _, hops := range t.Hops {
		for _, j := range hops {
			m.zJ += 2 * math.Abs(j)
		}
	}
	for _, s := range []*[]float64{&m.h, &m.p, &m.f, &m.low, &m.high, &m.d} {
		*s = make([]float64, atomicLevels)
	}
	return m, nil
}

// Name returns "atomic".
func (m *Atomic) Name() string { return "atomic" }

// Valid returns the error of At.
func (m *Atomic) Valid(mu, beta float64) error {
	_, err := m.At(mu, beta)
	return err
}

// At returns the point of the grand potential per site
//
//	Omega = -T ln sum_n exp(-h_n/T) - sum J^2 K       h_n = U n(n-1)/2 - mu n
//	K = sum_(m,n) (m+1) n (p_m p_n - p_(m+1) p_(n-1)) / U(m-n+1)
//
// the sum over J running over the bonds of a site. All averages of one site include
// the second order. Doubt is the largest of (zJ X)^4, X the response <b>/field of a site
// without tunnelling, which is 1/zJ at the boundary of the superfluid in mean field, and
// the squares of the changes by the second order of n, relative to n, and of S, relative
// to S + n/10.
// Cost O(levels^2), 512 levels at most; no allocation.
//
// It returns an *InputError, or an *InvalidError with U of the wrong sign, where the
// Doubt is too large, and where more levels are needed.
//
// Source: perturbation theory; its energy at T = 0 is that of Freericks and Monien,
// EPL 26, 545 (1994).
func (m *Atomic) At(mu, beta float64) (Point, error) {
	f, err := newFrame(m.Name(), mu, beta, m.terms.Interaction)
	if err != nil {
		return Point{}, err
	}
	if reason := m.occupy(f); reason != "" {
		return Point{}, &InvalidError{m.Name(), mu, beta, reason}
	}
	k := m.secondOrder()
	out := Point{HasShares: true, Kinetic: -2 * m.squares * k}
	entropy, filling, moved := 0.0, 0.0, k
	for n, p := range m.p[:m.levels] {
		if p > 0 {
			entropy -= p * math.Log(p)
		}
		filling += p * float64(n)
		moved += 2 * m.h[n] * m.d[n]
	}
	if !m.still {
		out.Entropy = settle(entropy - m.beta*m.squares*moved)
	}
	if reason := m.distribute(&out); reason != "" {
		return Point{}, &InvalidError{m.Name(), mu, beta, reason}
	}
	out.Doubt = max(math.Pow(m.zJ*m.response(), 4), change(filling, out.Filling, 0), change(entropy, out.Entropy, 0.1*out.Filling))
	if !(out.Doubt <= maxDoubt) || out.Entropy < 0 {
		return Point{}, &InvalidError{m.Name(), mu, beta, fmt.Sprintf(
			"zJ X = %g, and the second order changes n = %g to %g and S = %g to %g: not small enough",
			m.zJ*m.response(), filling, out.Filling, entropy, out.Entropy)}
	}
	f.finish(&out)
	return out, nil
}

// settle turns an entropy that rounding made negative to 0.
func settle(entropy float64) float64 {
	if entropy < 0 && entropy > -1e-12 {
		return 0
	}
	return entropy
}

// change is the square of the change of a quantity relative to it and a floor, 0 for
// nothing at all.
func change(from, to, floor float64) float64 {
	if from == to || math.Abs(from)+math.Abs(to) < 1e-290 {
		return 0
	}
	relative := (to - from) / (to + floor)
	return relative * relative
}

// occupy sets the levels and their weights without tunnelling, and says what prevents
// it. T = 0, and all that is too cold to be told from it, is taken as a temperature of
// a thousandth of the gap.
func (m *Atomic) occupy(f frame) string {
	m.u, m.mu, m.beta = math.Abs(m.terms.Interaction), f.mu, f.beta
	middle := max(0, math.Round(m.mu/m.u+0.5)) // of lowest energy
	if middle >= atomicLevels-2 {
		return fmt.Sprintf("mu/U = %g, want fewer than %d atoms on a site", m.mu/m.u, atomicLevels-2)
	}
	lowest := m.level(middle)
	gap := m.level(middle+1) - lowest
	if middle > 0 {
		gap = min(gap, m.level(middle-1)-lowest)
	}
	if math.IsInf(m.beta, 1) && !(gap > 0) {
		return "two occupations have the same lowest energy at T = 0"
	}
	if m.still = m.beta*gap > 1e3; m.still {
		m.beta = 1e3 / gap
	}
	sum := 0.0
	for m.levels = 0; ; m.levels++ {
		if m.levels == atomicLevels {
			return fmt.Sprintf("more than %d occupations of a site are needed", atomicLevels)
		}
		n := float64(m.levels)
		h := m.level(n) - lowest
		p := math.Exp(-m.beta * h)
		m.h[m.levels], m.p[m.levels] = h, p
		sum += p
		if p < 1e-18 && n > middle+1 {
			break
		}
	}
	m.levels++
	for i := range m.p[:m.levels] {
		m.p[i] /= sum
	}
	return ""
}

func (m *Atomic) level(n float64) float64 { return m.u*n*(n-1)/2 - m.mu*n }

// distribute adds the second order to the probabilities and fills in what follows
// from them.
//
//	p_k -> p_k - 2 sum J^2 dK/dh_k
func (m *Atomic) distribute(out *Point) string {
	square := 0.0
	for n, p := range m.p[:m.levels] {
		p -= 2 * m.squares * m.d[n]
		if p < -1e-3 { // above, a rare occupation that only a higher order gets right
			return fmt.Sprintf("the second order makes the share of %d atoms %g, want at least 0", n, p)
		}
		x := float64(n)
		out.Filling += p * x
		square += p * x * x
		out.Interaction += m.u * p * x * (x - 1) / 2
		out.Shares[min(n, Occupations-1)] += max(p, 0)
	}
	out.Variance = square - out.Filling*out.Filling
	return ""
}
