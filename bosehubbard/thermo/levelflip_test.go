package thermo

import (
	"errors"
	"math"
	"testing"
)

// An instantaneous reversal keeps every share: beta changes sign, S stays.
func TestReversalAtOnce(t *testing.T) {
	l := Levels{Energies: []float64{-100, 20, 70, 75}, Degeneracies: []float64{1, 4, 1, 2}}
	for _, u := range []float64{-100, -60, 0, 40, 75} {
		s := mustAt(t, l, u)
		back, flipped, err := l.AfterReversal(s, 0)
		if err != nil {
			t.Fatal(err)
		}
		if flipped.Beta != 0-s.Beta || flipped.Energy != 0-u || math.Abs(flipped.Entropy-s.Entropy) > 1e-14 {
			t.Errorf("from %g: %+v, want beta %g", u, flipped, -s.Beta)
		}
		for i, p := range flipped.Shares {
			if math.Abs(p-s.Shares[i]) > 1e-14 {
				t.Errorf("from %g: share of level %d is %g, was %g", u, i, p, s.Shares[i])
			}
		}
		if again := mustAt(t, back, -u); !math.IsInf(s.Beta, 0) && math.Abs(again.Beta+s.Beta) > 1e-12*math.Abs(s.Beta)+1e-17 {
			t.Errorf("from %g: equilibrium at that energy has beta %g, want %g", u, again.Beta, -s.Beta)
		}
	}
}

// Slowly, beta stays; half and half, everything is lost; a sweep of a drive does
// the opposite of a reversal of the levels.
func TestSlowPassage(t *testing.T) {
	l := Levels{Energies: []float64{-8000, 8000}}
	s := mustAt(t, l, -5000)
	for _, tc := range []struct{ following, factor float64 }{{0, -1}, {0.25, -0.5}, {0.5, 0}, {1, 1}} {
		_, flipped, err := l.AfterReversal(s, tc.following)
		if err != nil {
			t.Fatal(err)
		}
		if math.Abs(flipped.Energy-tc.factor*-5000) > 1e-9 {
			t.Errorf("reversal with %g following: %g Hz, want %g", tc.following, flipped.Energy, tc.factor*-5000)
		}
		swept, err := l.AfterSweep(s, tc.following)
		if err != nil {
			t.Fatal(err)
		}
		if math.Abs(swept.Energy+flipped.Energy) > 1e-9 || math.Abs(swept.Beta+flipped.Beta) > 1e-12*math.Abs(swept.Beta) {
			t.Errorf("%g following: sweep gives %g, reversal %g Hz, want opposite", tc.following, swept.Energy, flipped.Energy)
		}
		if flipped.Entropy < s.Entropy-1e-14 {
			t.Errorf("%g following: entropy fell from %g to %g", tc.following, s.Entropy, flipped.Entropy)
		}
	}
	ground := mustAt(t, l, -8000)
	if top, err := l.AfterSweep(ground, 1); err != nil || !math.IsInf(top.Beta, -1) {
		t.Errorf("sweep of the ground state: %+v, %v, want the upper level", top, err)
	}
}

func TestPassageRefused(t *testing.T) {
	three := Levels{Energies: []float64{-1, 0, 1}}
	s := mustAt(t, three, -0.5)
	if _, _, err := three.AfterReversal(s, 0.5); !errors.Is(err, ErrNotTwoLevels) {
		t.Errorf("three levels: %v, want ErrNotTwoLevels", err)
	}
	two := Levels{Energies: []float64{-1, 1}, Degeneracies: []float64{1, 2}}
	if _, err := two.AfterSweep(mustAt(t, two, 0), 0.5); !errors.Is(err, ErrNotTwoLevels) {
		t.Errorf("unequal degeneracies: %v, want ErrNotTwoLevels", err)
	}
	for _, p := range []float64{-0.1, 1.1, math.NaN()} {
		if _, err := three.AfterSweep(s, p); err == nil {
			t.Errorf("share %g: no error", p)
		}
	}
	if _, err := two.AfterSweep(s, 0); err == nil {
		t.Error("state of other levels: no error")
	}
}

// followed integrates i dpsi/dt = 2 pi (H/h) psi from -span to span, starting and
// ending in the instantaneous lower level, with fourth-order Runge-Kutta.
func followed(coupling, rate, span float64, steps int) float64 {
	derivative := func(t float64, p [2]complex128) [2]complex128 {
		d, c := complex(rate*t/2, 0), complex(coupling, 0)
		return [2]complex128{-2i * math.Pi * (d*p[0] + c*p[1]), -2i * math.Pi * (c*p[0] - d*p[1])}
	}
	along := func(p, k [2]complex128, h float64) [2]complex128 {
		return [2]complex128{p[0] + complex(h, 0)*k[0], p[1] + complex(h, 0)*k[1]}
	}
	lower := func(t float64) (float64, float64) { // eigenvector of the lower level
		angle := math.Atan2(2*coupling, rate*t) / 2
		return -math.Sin(angle), math.Cos(angle)
	}
	a, b := lower(-span)
	p := [2]complex128{complex(a, 0), complex(b, 0)}
	h := 2 * span / float64(steps)
	for i := range steps {
		t := -span + float64(i)*h
		k1 := derivative(t, p)
		k2 := derivative(t+h/2, along(p, k1, h/2))
		k3 := derivative(t+h/2, along(p, k2, h/2))
		k4 := derivative(t+h, along(p, k3, h))
		for j := range p {
			p[j] += complex(h/6, 0) * (k1[j] + 2*k2[j] + 2*k3[j] + k4[j])
		}
	}
	a, b = lower(span)
	amplitude := complex(a, 0)*p[0] + complex(b, 0)*p[1]
	return real(amplitude)*real(amplitude) + imag(amplitude)*imag(amplitude)
}

// The Landau-Zener probability against the integrated Schroedinger equation. A
// start and an end at finite times leave amplitudes of about
// coupling rate/(2 pi (rate span)^3) each beside the exact one, derived by first-order
// perturbation theory in the instantaneous levels.
func TestLandauZenerAgainstIntegration(t *testing.T) {
	const rate = 1000.0 // Hz/s
	for _, p := range []float64{0.02, 0.2, 0.5, 0.8, 0.98} {
		coupling := math.Sqrt(-math.Log1p(-p)*rate) / (2 * math.Pi)
		if got := LandauZener(coupling, rate); !near(got, p, 1e-13) {
			t.Errorf("P of coupling %g Hz at %g Hz/s: %.15g, want %g", coupling, rate, got, p)
		}
		span := 20 / math.Sqrt(rate)
		left := 4 * coupling * rate / (2 * math.Pi * math.Pow(rate*span, 3))
		got := followed(coupling, rate, span, 60_000)
		if diff := math.Abs(got - p); diff > left+1e-7 {
			t.Errorf("P = %g: integrated %.9g, difference %.2g, tolerance %.2g", p, got, diff, left+1e-7)
		}
	}
	if LandauZener(0, 0) != 0 || LandauZener(5, 0) != 1 || LandauZener(3, -7) != LandauZener(3, 7) {
		t.Error("Landau-Zener at its limits")
	}
}
