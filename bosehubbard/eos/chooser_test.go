package eos

import (
	"errors"
	"math"
	"testing"

	"hilltop/bosehubbard/gutzwiller"
)

func siteOf(t testing.TB, terms Terms) *Gutzwiller {
	t.Helper()
	m, err := NewGutzwiller(terms)
	if err != nil {
		t.Fatal(err)
	}
	return m
}

// Mean-field boundary at finite temperature in both phases' own words: Fisher et al.,
// Phys. Rev. B 40, 546 (1989); zJ/U at mu = U/2 and at the tip, summed outside this
// project.
func TestMeanFieldBoundary(t *testing.T) {
	for _, row := range []struct{ mu, temperature, critical float64 }{
		{0.5, 0, 1. / 6}, {0.5, 0.05, 0.166687}, {0.5, 0.1, 0.169675},
		{math.Sqrt2 - 1, 0, 0.1715729}, {math.Sqrt2 - 1, 0.05, 0.1716359}, {math.Sqrt2 - 1, 0.1, 0.1760795},
	} {
		for _, u := range []float64{1, -877} {
			phase := func(shift float64) Point {
				j := (row.critical + shift) * math.Abs(u) / 4
				return at(t, siteOf(t, Cosine([]float64{j, j}, u)), row.mu*u, 1/(row.temperature*u+math.Copysign(1e-300, u)))
			}
			if below, above := phase(-1e-6), phase(1e-6); below.Order != 0 || !(above.Order > 0) {
				t.Errorf("mu/U = %g, T/U = %g: order %g and %g on both sides of zJ/U = %g",
					row.mu, row.temperature, below.Order, above.Order, row.critical)
			}
			// X of Atomic is the same response.
			atomic := atomicOf(t, Cosine([]float64{0}, u))
			f, _ := newFrame("", row.mu*u, 1/(row.temperature*u+math.Copysign(1e-300, u)), u)
			atomic.occupy(f)
			near(t, "1/X", 1/atomic.response()/math.Abs(u), row.critical, 1e-6)
		}
	}
}

func TestGutzwillerMaxwell(t *testing.T) {
	for _, zJ := range []float64{0.05, 0.4} {
		m, other := siteOf(t, Cosine([]float64{zJ / 4, zJ / 4}, 1)), siteOf(t, Cosine([]float64{zJ / 4, zJ / 4}, -1))
		for _, mu := range []float64{0.4, 1.3} {
			maxwell(t, m, mu, 6, 1e-6)
			mirrored(t, m, other, mu, 6)
		}
	}
	m := siteOf(t, Cosine([]float64{0, 0.01}, 1))
	for _, filling := range []float64{0.1, 1} {
		want := must[Point](t)(Infinite(filling, 1))
		p := at(t, m, math.Log(filling/(1+filling))/1e-8, 1e-8)
		near(t, "filling", p.Filling, want.Filling, 1e-6)
		near(t, "entropy", p.Entropy, want.Entropy, 1e-6)
		near(t, "energy", p.Energy, want.Energy, 1e-6)
	}
	near(t, "Infinite of gutzwiller", must[gutzwiller.Equilibrium](t)(gutzwiller.Infinite(0.7, 3)).Entropy,
		must[Point](t)(Infinite(0.7, 3)).Entropy, 1e-14)
}

// The chooser's models by regime.
func TestChooser(t *testing.T) {
	flat := func(j, u float64) *Chooser { return must[*Chooser](t)(NewChooser(Cosine([]float64{j, j}, u))) }
	for _, row := range []struct {
		what     string
		chooser  *Chooser
		mu, beta float64
		best     string // "" where none holds
	}{
		{"no interaction", flat(1, 0), -4.5, 0.4, "ideal"},
		{"no tunnelling", flat(0, 1), 0.5, 10, "atomic"},
		{"deep insulator", flat(0.01, 1), 0.45, 10, "atomic"},
		{"thin gas", flat(1, 2.1), -9, 0.4, "Hartree-Fock"},
		{"weak superfluid", flat(1, 0.2), -3, 1, "Bogoliubov"},
		{"the same at T < 0", flat(1, -0.2), 3, -1, "Bogoliubov"},
		{"superfluid near the insulator", flat(0.06, 1), 0.45, 20, "Gutzwiller"},
		{"U of the wrong sign", flat(1, 1), 4, -1, ""},
	} {
		choice, err := row.chooser.Choose(row.mu, row.beta)
		if row.best == "" {
			if !errors.As(err, new(*NoModelError)) {
				t.Errorf("%s: %s, %v, want a NoModelError", row.what, choice.Model, err)
			}
			continue
		}
		if err != nil || choice.Model != row.best {
			t.Errorf("%s: %q, %v, want %q; of %d", row.what, choice.Model, err, row.best, len(choice.Models))
			continue
		}
		for _, m := range choice.Models {
			if d := math.Abs(m.Point.Filling - choice.Point.Filling); d > 2*choice.Filling*(1+1e-12) {
				t.Errorf("%s: %s is %g away, spread %g", row.what, m.Model, d, choice.Filling)
			}
		}
		p := at(t, row.chooser, row.mu, row.beta)
		if p != choice.Point {
			t.Errorf("%s: At is not the choice", row.what)
		}
	}
	var input *InputError
	if _, err := flat(1, 1).Choose(math.NaN(), 1); !errors.As(err, &input) {
		t.Errorf("NaN: %v, want an InputError", err)
	}
}

// At U/J = 2 on two axes the superfluid is not left to a single site.
func TestGutzwillerIsNotAlone(t *testing.T) {
	c := must[*Chooser](t)(NewChooser(Cosine([]float64{1, 1}, 2)))
	alone := 0
	for mu := -4.5; mu < 3; mu += 0.5 {
		for _, temperature := range []float64{0.1, 0.5, 1, 2.2, 5} {
			choice, err := c.Choose(mu, 1/temperature)
			if err != nil {
				alone++
				continue
			}
			if choice.Model == "Gutzwiller" && choice.Point.Order > 0 && len(choice.Models) == 1 {
				t.Errorf("mu = %g, T = %g: Gutzwiller alone", mu, temperature)
			}
		}
	}
	if alone > 15 {
		t.Errorf("%d of 75 points have no model, want most covered", alone)
	}
}

// A superfluid on which only the single site has an answer: refused at |U|/zJ = 1.5,
// taken at 4.
func TestAloneInTheSuperfluid(t *testing.T) {
	for _, sign := range []float64{1, -1} {
		terms := Cosine([]float64{1, 1}, sign*6)
		if p := at(t, siteOf(t, terms), sign*10, sign*0.25); !(p.Order > 0) {
			t.Fatalf("%+v is no superfluid", p)
		}
		var none *NoModelError
		if _, err := must[*Chooser](t)(NewChooser(terms)).Choose(sign*10, sign*0.25); !errors.As(err, &none) {
			t.Errorf("U/J = %g: %v, want a NoModelError", sign*6, err)
		} else if len(none.Refused) != 5 {
			t.Errorf("%d reasons for 5 models: %v", len(none.Refused), none)
		}
		choice, err := must[*Chooser](t)(NewChooser(Cosine([]float64{1, 1}, sign*16))).Choose(0, sign*1.25)
		if err != nil || choice.Model != "Gutzwiller" || len(choice.Models) != 1 || !(choice.Point.Order > 0) {
			t.Errorf("U/J = %g: %+v, %v, want Gutzwiller alone", sign*16, choice, err)
		}
	}
}

// The top of a real band is steeper than its bottom, so that at zJ/U = 1/6 of the
// nearest neighbours the insulator has melted at the top only.
func TestRealBandInMeanField(t *testing.T) {
	for _, row := range []struct{ sign, coupling float64 }{{1, 3.84}, {-1, 4.16}} {
		hops := []float64{1, -0.04}
		m := siteOf(t, Terms{Hops: [][]float64{hops, hops}, Interaction: row.sign * 24})
		p := at(t, m, row.sign*12, math.Inf(int(row.sign)))
		if melted := row.coupling > 4; (p.Order > 0) != melted {
			t.Errorf("sign %g: order %g at zJ = %g Hz, boundary 4 Hz", row.sign, p.Order, row.coupling)
		}
	}
}
