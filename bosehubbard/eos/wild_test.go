package eos

import (
	"math"
	"math/rand/v2"
	"reflect"
	"testing"
)

// allOf returns every model of a lattice.
func allOf(t testing.TB, terms Terms) []Model {
	t.Helper()
	chooser := must[*Chooser](t)(NewChooser(terms))
	return append(chooser.Models(), linkedOf(t, terms), chooser)
}

// Whatever the point, a model gives finite numbers that make sense, or an error.
func TestNothingWild(t *testing.T) {
	random := rand.New(rand.NewPCG(11, 4))
	answered := 0
	for _, terms := range []Terms{Cosine([]float64{1, 1}, 2), Cosine([]float64{467, 467}, -984), Cosine([]float64{1e-3}, 1e3),
		{Hops: [][]float64{{1, -0.03, 0.002}}, Interaction: 0.4}} {
		models := allOf(t, terms)
		sign := math.Copysign(1, terms.Interaction)
		for range 400 {
			unit := math.Abs(terms.Hops[0][0]) + math.Abs(terms.Interaction)*random.Float64()
			mu := sign * unit * random.NormFloat64() * math.Exp(3*random.NormFloat64())
			beta := sign / unit * math.Exp(6*random.NormFloat64())
			switch random.IntN(12) {
			case 0:
				beta = math.Inf(int(sign))
			case 1:
				mu = -sign * math.Exp(30*random.Float64()) / math.Abs(beta)
			}
			for _, m := range models {
				p, err := m.At(mu, beta)
				if err != nil {
					continue
				}
				answered++
				sensible(t, m, mu, beta, p)
			}
		}
	}
	if answered < 2000 {
		t.Errorf("%d answers, want most points to have some", answered)
	}
}

func sensible(t *testing.T, m Model, mu, beta float64, p Point) {
	t.Helper()
	numbers := reflect.ValueOf(p)
	for i := range numbers.NumField() {
		if field := numbers.Field(i); field.CanFloat() {
			if x := field.Float(); math.IsNaN(x) || math.IsInf(x, 0) {
				t.Fatalf("%s at mu = %g, beta = %g: %+v", m.Name(), mu, beta, p)
			}
		}
	}
	sum := 0.0
	for _, share := range p.Shares {
		sum += share
		if !(share >= 0) {
			t.Errorf("%s at mu = %g, beta = %g: shares %g", m.Name(), mu, beta, p.Shares)
		}
	}
	// Shares below 0 of a series are left out, so that the sum may exceed 1 by Doubt.
	if p.HasShares && math.Abs(sum-1) > 1e-9+0.1*p.Doubt {
		t.Errorf("%s at mu = %g, beta = %g: shares add up to %g, Doubt %g", m.Name(), mu, beta, sum, p.Doubt)
	}
	if p.Filling < 0 || p.Entropy < 0 || p.Doubt < 0 || p.Doubt > maxDoubt {
		t.Errorf("%s at mu = %g, beta = %g: %+v", m.Name(), mu, beta, p)
	}
	if beta*p.GrandPotential > 1e-9*(1+math.Abs(beta*mu)*p.Filling) {
		t.Errorf("%s at mu = %g, beta = %g: beta Omega = %g, want none above the empty lattice", m.Name(), mu, beta, beta*p.GrandPotential)
	}
}

// The filling rises with beta mu in every model, at either sign of T.
func TestFillingRises(t *testing.T) {
	for _, u := range []float64{1.5, -1.5} {
		sign := math.Copysign(1, u)
		for _, m := range allOf(t, Cosine([]float64{0.5, 0.5}, u)) {
			if m.Name() == "chooser" {
				continue // jumps where models change
			}
			last, points := -1.0, 0
			for mu := -6.0; mu < 12; mu += 0.05 {
				p, err := m.At(sign*mu, sign*0.5)
				if err != nil {
					continue
				}
				points++
				if !(p.Filling > last) {
					t.Errorf("%s: n = %g after %g at mu = %g", m.Name(), p.Filling, last, sign*mu)
				}
				last = p.Filling
			}
			if points < 20 {
				t.Errorf("%s: %d points", m.Name(), points)
			}
		}
	}
}
