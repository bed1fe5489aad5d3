package band_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"hilltop/bosehubbard/atom"
	"hilltop/bosehubbard/band"
	"hilltop/bosehubbard/optics"
	"hilltop/bosehubbard/si"
)

// latticeBeam is a beam of 39K at 736.65 nm along x, blue as it comes.
func latticeBeam(t *testing.T, waists [2]float64, returnRatio, sign float64) (optics.LatticeBeam, float64) {
	t.Helper()
	const wavelength = 736.65e-9
	sp, err := atom.Load("39K")
	if err != nil {
		t.Fatal(err)
	}
	shift, err := optics.LightShift(sp, wavelength)
	if err != nil {
		t.Fatal(err)
	}
	return optics.LatticeBeam{
		Axis: optics.X, Wavelength: wavelength, Waists: waists, ReturnRatio: returnRatio, Shift: sign * shift,
		Spacing: wavelength / 2, Recoil: si.JouleFromHz(si.RecoilHz(sp.Mass, wavelength/2)),
	}, sp.Mass
}

// TestZeroPointTrap: the zero-point energy of a blue lattice pushes outwards, 32.02
// Hz from a beam of 22 Er and 150 um waist, 23.39 Hz at 6.1 Er, 39.65 Hz from both
// (Braun et al., Science 339, 52 (2013) had 43(1) Hz); red it would hold with 92.46
// and 45.91 Hz. A plane-wave calculation, to two decimals.
func TestZeroPointTrap(t *testing.T) {
	w := band.NewWorkspace()
	for _, tc := range []struct {
		sign, deep, shallow float64
	}{{1, -32.02, -23.39}, {-1, 92.46, 45.91}} {
		beam, mass := latticeBeam(t, [2]float64{150e-6, 150e-6}, 1, tc.sign)
		sum := 0.0
		for _, part := range []struct{ depth, want float64 }{{22, tc.deep}, {6.1, tc.shallow}} {
			b, err := w.Solve(part.depth)
			if err != nil {
				t.Fatal(err)
			}
			w2 := beam.Curvature(part.depth, b.MeanSlope)[optics.Y] / mass
			sum += w2
			if got := optics.SignedFrequency(w2); math.Abs(got-part.want) > 0.006 {
				t.Errorf("%g Er, sign %g: got %.4f Hz, want %.2f", part.depth, tc.sign, got, part.want)
			}
		}
		want := math.Copysign(math.Hypot(tc.deep, tc.shallow), tc.deep)
		if got := optics.SignedFrequency(sum); math.Abs(got-want) > 0.012 {
			t.Errorf("both, sign %g: got %.4f Hz, want %.2f", tc.sign, got, want)
		}
	}
}

// TestRealBandHessian: the potential with the real mean energy has the curvature
// that its real slope gives, for 100 elliptical beams, red and blue, of unequal
// powers. Differences over h, 2h and 4h, extrapolated twice, are good to 1e-8;
// near 0.5 Er the logarithm in eps(s) leaves less.
func TestRealBandHessian(t *testing.T) {
	rng := rand.New(rand.NewPCG(29, 1))
	w := band.NewWorkspace()
	solve := func(s float64) band.Bands {
		b, err := w.Solve(s)
		if err != nil {
			t.Fatal(err)
		}
		return b
	}
	for range 100 {
		waists := [2]float64{30e-6 + 200e-6*rng.Float64(), 30e-6 + 200e-6*rng.Float64()}
		beam, _ := latticeBeam(t, waists, 0.2+0.8*rng.Float64(), math.Copysign(1, rng.Float64()-0.5))
		depth := 0.5 * math.Pow(100, rng.Float64())
		want := beam.Curvature(depth, solve(depth).MeanSlope)
		mean := func(s float64) float64 { return solve(s).Mean }
		u := func(y, z float64) float64 { return beam.Potential(depth, [3]float64{0, y, z}, mean) }
		second := func(axis int, h float64) float64 {
			p := [2]float64{}
			p[axis] = h
			return 2 * (u(p[0], p[1]) - u(0, 0)) / (h * h)
		}
		for axis, waist := range waists {
			h := waist / 64
			a, b, c := second(axis, h), second(axis, 2*h), second(axis, 4*h)
			ab, bc := a+(a-b)/3, b+(b-c)/3
			got := ab + (ab-bc)/15
			if math.Abs(got-want[axis+1]) > 1e-6*math.Abs(want[axis+1]) {
				t.Errorf("%g Er, %+v, transverse axis %d: by differences %.9g, analytic %.9g", depth, beam, axis, got, want[axis+1])
			}
		}
	}
}
