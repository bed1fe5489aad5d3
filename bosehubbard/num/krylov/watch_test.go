package krylov

import (
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/mat"
)

// outlying is a matrix whose highest level stands far apart: its Ritz value
// converges in a few steps, which is what destroys orthogonality.
func outlying(n int) *mat.SymDense {
	m := mat.NewSymDense(n, nil)
	for i := range n {
		m.SetSym(i, i, float64(i)/float64(n))
	}
	m.SetSym(n-1, n-1, 30)
	return m
}

// farthest returns the largest |v_i.v_j| of the normalised vectors.
func (p *Propagator) farthest() float64 {
	most := 0.0
	for j := 1; j < p.Dimension(); j++ {
		for k := range j {
			v, w := p.space.vectors[j], p.space.vectors[k]
			re := dot(v.Re, w.Re) + dot(v.Im, w.Im)
			im := dot(v.Re, w.Im) - dot(v.Im, w.Re)
			most = max(most, math.Hypot(re, im)/(p.space.norms[j]*p.space.norms[k]))
		}
	}
	return most
}

// The watch sees the loss of orthogonality coming and stops it; without it the
// vectors are not orthogonal at all. The error bound holds either way.
func TestWatchKeepsVectorsOrthogonal(t *testing.T) {
	const n, m = 200, 30
	d := newDense(t, outlying(n))
	for _, tolerance := range []float64{1e-4, 1e-9} {
		random := rand.New(rand.NewPCG(2, 0))
		psi := randomVector(n, random)
		size := norm(psi)
		p := New(n, Options{Dimension: m})
		reach, bound, err := p.Build(background, psi, 40, tolerance, d.product)
		if err != nil {
			t.Fatal(err)
		}
		lost := p.farthest()
		if p.Reorthogonalisations() == 0 || lost > 1e-7 {
			t.Errorf("tolerance %g: products of vectors up to %.3g after %d reorthogonalisations, want below 1e-7 after some",
				tolerance, lost, p.Reorthogonalisations())
		}
		dst := NewVector(n)
		if _, err := p.AdvanceTo(background, dst, reach); err != nil {
			t.Fatal(err)
		}
		if got := distance(dst, d.exp(psi, reach)) / size; got > bound+1e-13 {
			t.Errorf("tolerance %g: error %.3g at %g, want at most %.3g", tolerance, got, reach, bound)
		}
	}
}

// The recurrence follows the true products within a factor of a thousand, from
// rounding up to where it is acted on.
func TestWatchFollowsTheProducts(t *testing.T) {
	const n = 200
	d := newDense(t, outlying(n))
	random := rand.New(rand.NewPCG(4, 0))
	p := New(n, Options{Dimension: 30})
	if err := p.begin(background, randomVector(n, random)); err != nil {
		t.Fatal(err)
	}
	checked := 0
	for p.Dimension() < 30 && p.removals == 0 {
		if _, err := p.grow(background, math.Inf(1), d.product); err != nil {
			t.Fatal(err)
		}
		guess := 0.0
		for k := range p.Dimension() - 1 {
			guess = max(guess, math.Abs(p.watch.before[k]))
		}
		if actual := p.farthest(); actual > 1e-13 && guess > 0 {
			checked++
			if ratio := guess / actual; ratio < 1e-3 || ratio > 1e3 {
				t.Errorf("dimension %d: watch says %.3g, products are %.3g", p.Dimension(), guess, actual)
			}
		}
	}
	if checked < 2 {
		t.Errorf("only %d dimensions with products above rounding", checked)
	}
}
