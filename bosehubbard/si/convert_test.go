package si

import (
	"math"
	"math/rand/v2"
	"testing"
)

const (
	mass39K  = 38.963706485 * AtomicMassConstant // AME2020, from memory
	mass87Rb = 86.909180529 * AtomicMassConstant // AME2020, from memory
	mass133C = 132.905451958 * AtomicMassConstant
	mass7Li  = 7.016003434 * AtomicMassConstant
)

// TestRoundTrips goes there and back at seeded random values of either sign.
// Two roundings per way allow four units of 1.1e-16.
func TestRoundTrips(t *testing.T) {
	random := rand.New(rand.NewPCG(1, 2))
	const recoil = 9436.138
	for range 2000 {
		x := math.Copysign(math.Exp(40*(random.Float64()-0.5)), random.Float64()-0.5)
		for name, got := range map[string]float64{
			"joule":  HzFromJoule(JouleFromHz(x)),
			"kelvin": HzFromKelvin(KelvinFromHz(x)),
			"rad/s":  HzFromRadPerS(RadPerSFromHz(x)),
			"Er":     HzFromEr(ErFromHz(x, recoil), recoil),
		} {
			if diff := math.Abs(got/x - 1); diff > 4.5e-16 {
				t.Errorf("Hz to %s and back: %v gave %v, relative difference %.2g", name, x, got, diff)
			}
		}
	}
}

func TestConversionsAtKnownValues(t *testing.T) {
	for _, tc := range []struct {
		name           string
		got, want, tol float64
	}{
		{"1 Hz in J", JouleFromHz(1), 6.62607015e-34, 1e-15},
		// kB/h to 12 digits: CODATA 2022 listing, "Boltzmann constant in Hz/K".
		{"1 K in Hz", HzFromKelvin(1), 2.083661912333e10, 1e-12},
		{"1 Hz in rad/s", RadPerSFromHz(1), 2 * math.Pi, 1e-15},
	} {
		if diff := math.Abs(tc.got/tc.want - 1); !(diff <= tc.tol) {
			t.Errorf("%s: got %.14g, want %.14g, relative difference %.2g, tolerance %.2g", tc.name, tc.got, tc.want, diff, tc.tol)
		}
	}
	for name, got := range map[string]float64{
		"J": JouleFromHz(0), "K": KelvinFromHz(0), "rad/s": RadPerSFromHz(0), "Er": ErFromHz(0, 1),
	} {
		if got != 0 {
			t.Errorf("0 Hz: got %g %s, want 0", got, name)
		}
	}
}

// TestRecoil: Er = h^2/(2 m lambda^2) of 39K in a retro-reflected lattice of
// 736.65 nm, the lattice of Braun et al., Science 339, 52 (2013); hand values
// from the constants above.
func TestRecoil(t *testing.T) {
	recoil := RecoilHz(mass39K, 736.65e-9/2)
	if diff := math.Abs(recoil - 9436.138); !(diff <= 0.05) {
		t.Errorf("Er/h: got %.4f Hz, want 9436.138 Hz, difference %.2g, tolerance 0.05", recoil, diff)
	}
	if got := KelvinFromHz(recoil) * 1e9; !(math.Abs(got-452.863) <= 0.01) {
		t.Errorf("Er/kB: got %.4f nK, want 452.863 nK, tolerance 0.01", got)
	}
}

// TestTiltPerSite: m g d/h, hand values from the constants above, good to the
// last digit given.
func TestTiltPerSite(t *testing.T) {
	for _, tc := range []struct {
		name               string
		mass, wavelengthNM float64
		wantHz, tolerance  float64
	}{
		{"39K", mass39K, 736.65, 352.70, 0.01},
		{"39K", mass39K, 1064, 509.43, 0.01},
		{"39K", mass39K, 532, 254.72, 0.01},
		{"87Rb", mass87Rb, 1064, 1136.3, 0.1},
		{"87Rb", mass87Rb, 532, 568.15, 0.01},
		{"133Cs", mass133C, 1064, 1737.7, 0.1},
		{"7Li", mass7Li, 1064, 91.73, 0.01},
	} {
		got := HzFromJoule(tc.mass * StandardGravity * tc.wavelengthNM * 1e-9 / 2)
		if diff := math.Abs(got - tc.wantHz); !(diff <= tc.tolerance) {
			t.Errorf("%s %g nm: got %.4f Hz, want %g Hz, difference %.2g, tolerance %g",
				tc.name, tc.wavelengthNM, got, tc.wantHz, diff, tc.tolerance)
		}
	}
}

func TestConversionsAllocateNothing(t *testing.T) {
	var sink float64
	if n := testing.AllocsPerRun(100, func() {
		sink += HzFromJoule(JouleFromHz(3)) + HzFromKelvin(KelvinFromHz(2)) + RecoilHz(mass39K, 4e-7)
	}); n != 0 {
		t.Errorf("%v allocations, want 0", n)
	}
	_ = sink
}
