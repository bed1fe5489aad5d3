package optics

import (
	"math"
	"math/cmplx"
	"math/rand/v2"
	"testing"
)

// TestLatticeDepth: 1 W, 100 um, 39K: 156.55 Er at 1064 nm and 416.94 Er at
// 736.65 nm, sums over the D lines done outside this project, to five digits.
func TestLatticeDepth(t *testing.T) {
	sp := load(t, "39K")
	for nm, want := range map[float64]float64{1064: 156.55, 736.65: 416.94} {
		b := latticeBeam(sp, nm*1e-9, 100e-6, shift(t, sp, nm*1e-9))
		checkClose(t, "depth", b.DepthFromPower(1), want, 0.005/want)
		if b.Blue() != (nm < 760) {
			t.Errorf("%g nm: blue is %v", nm, b.Blue())
		}
	}
}

func TestDepthAndPowerRoundTrip(t *testing.T) {
	rng := rand.New(rand.NewPCG(19, 1))
	sp := load(t, "39K")
	for range 100 {
		wavelength := between(rng, 500e-9, 760e-9)
		b := latticeBeam(sp, wavelength, between(rng, 30e-6, 300e-6), shift(t, sp, wavelength))
		b.Waists[1] *= 1.7
		b.ReturnRatio = between(rng, 0.01, 1)
		depth := between(rng, 0.01, 100)
		checkClose(t, "depth", b.DepthFromPower(b.PowerFromDepth(depth)), depth, 1e-14)
		full := b
		full.ReturnRatio = 1
		checkClose(t, "weaker return", b.DepthFromPower(1), full.DepthFromPower(1)*math.Sqrt(b.ReturnRatio), 1e-14)
	}
	b := latticeBeam(sp, 740e-9, 100e-6, 1e-35)
	if p := b.PowerFromDepth(0); p != 0 {
		t.Errorf("power for no lattice: got %g W, want 0", p)
	}
	b.ReturnRatio = 0
	if d, p := b.DepthFromPower(1), b.PowerFromDepth(5); d != 0 || !math.IsInf(p, 1) {
		t.Errorf("no return: depth %g Er, power %g W, want 0 and +Inf", d, p)
	}
	if u := b.Potential(0, [3]float64{}, meanEnergy); u != b.Recoil*meanEnergy(0) {
		t.Errorf("no return, no depth: potential %g J, want %g", u, b.Recoil*meanEnergy(0))
	}
}

// TestStandingWave builds the intensity |1 + sqrt(rho) exp(2ikx)|^2 of the two
// running waves off axis: its contrast is DepthAt, and its shift at the dark or
// bright sites is what Potential adds to the mean of the band.
func TestStandingWave(t *testing.T) {
	rng := rand.New(rand.NewPCG(23, 1))
	none := func(float64) float64 { return 0 }
	for range 50 {
		b := LatticeBeam{
			Axis: Z, Wavelength: 740e-9, Spacing: 370e-9, Recoil: 6e-30, ReturnRatio: between(rng, 0.05, 1),
			Waists: [2]float64{between(rng, 50e-6, 200e-6), between(rng, 50e-6, 200e-6)},
			Shift:  math.Copysign(1e-35, rng.Float64()-0.5),
		}
		power := between(rng, 0.01, 1)
		depth := b.DepthFromPower(power)
		p := [3]float64{100e-6 * rng.Float64(), -100e-6 * rng.Float64(), 1e-3}
		onePass := b.Shift * 2 * power / (math.Pi * b.Waists[0] * b.Waists[1]) *
			math.Exp(-2*math.Pow(p[0]/b.Waists[0], 2)-2*math.Pow(p[1]/b.Waists[1], 2))
		low, high := math.Inf(1), math.Inf(-1)
		for i := range 200 {
			field := 1 + complex(math.Sqrt(b.ReturnRatio), 0)*cmplx.Exp(complex(0, 2*math.Pi*float64(i)/200))
			u := onePass * real(field*cmplx.Conj(field))
			low, high = math.Min(low, u), math.Max(high, u)
		}
		checkClose(t, "depth off axis", b.DepthAt(depth, p)*b.Recoil, high-low, 1e-12)
		// A sum of near-cancelling terms where almost all returns: relative to the depth.
		if got := b.Potential(depth, p, none); math.Abs(got-low) > 1e-12*(high-low) {
			t.Errorf("shift at the site, ratio %g, shift %g: got %g J, want %g", b.ReturnRatio, b.Shift, got, low)
		}
	}
}

// TestLatticeBeamTraps: 39K at 736.65 nm with eps'(22) = 0.107060 and eps'(6.1) =
// 0.206013 from a plane-wave calculation, which also gave the frequencies, in Hz to
// two decimals. The harmonic site would give 31.95 Hz for the first.
func TestLatticeBeamTraps(t *testing.T) {
	sp := load(t, "39K")
	u := shift(t, sp, 736.65e-9)
	const slope22, slope6 = 0.107060, 0.206013
	for _, tc := range []struct {
		what                string
		waist, shift        float64
		deep, shallow, both float64
	}{
		{"blue, 150 um", 150e-6, u, -32.02, -23.39, -39.65},
		{"blue, 100 um", 100e-6, u, -48.02, -35.08, -59.47},
		{"red, 150 um", 150e-6, -u, 92.46, 45.91, math.Hypot(92.46, 45.91)},
	} {
		deep := latticeBeam(sp, 736.65e-9, tc.waist, tc.shift)
		shallow := deep
		shallow.Axis = Z
		a, b := deep.Curvature(22, slope22), shallow.Curvature(6.1, slope6)
		checkFrequency(t, tc.what+", 22 Er", a[Y]/sp.Mass, tc.deep, 0.006)
		checkFrequency(t, tc.what+", 6.1 Er", b[Y]/sp.Mass, tc.shallow, 0.006)
		checkFrequency(t, tc.what+", both", (a[Y]+b[Y])/sp.Mass, tc.both, 0.01)
		if a[X] != 0 || b[Z] != 0 {
			t.Errorf("%s: curvature along the beam %g, %g, want 0", tc.what, a[X], b[Z])
		}
	}
	harmonic := latticeBeam(sp, 736.65e-9, 150e-6, u).Curvature(22, 0.5/math.Sqrt(22))
	checkFrequency(t, "harmonic site", harmonic[Z]/sp.Mass, -31.95, 0.006)
}

func checkFrequency(t *testing.T, what string, omegaSquared, want, tol float64) {
	t.Helper()
	if got := SignedFrequency(omegaSquared); math.Abs(got-want) > tol {
		t.Errorf("%s: got %.4f Hz, want %.2f, tolerance %g", what, got, want, tol)
	}
}

// TestBlueAntiTrapBarelyFalls: with eps' ~ 1/(2 sqrt s) its omega^2 goes as
// sqrt(depth), a red trap's nearly as the depth.
func TestBlueAntiTrapBarelyFalls(t *testing.T) {
	blue := LatticeBeam{Axis: X, Waists: [2]float64{1e-4, 1e-4}, ReturnRatio: 1, Shift: 1e-35, Recoil: 6e-30}
	red := blue
	red.Shift = -red.Shift
	slope := func(s float64) float64 { return 0.5 / math.Sqrt(s) }
	checkClose(t, "blue", blue.Curvature(40, slope(40))[Y]/blue.Curvature(10, slope(10))[Y], 2, 1e-14)
	if r := red.Curvature(40, slope(40))[Y] / red.Curvature(10, slope(10))[Y]; r < 4 || r > 5 {
		t.Errorf("red: ratio %g, want 4 to 5", r)
	}
}
