package optics

import (
	"math"
	"testing"

	"hilltop/bosehubbard/si"
)

// TestTiltPerSite: m g d/h in Hz with g = 9.80665, to the digits given.
func TestTiltPerSite(t *testing.T) {
	for _, tc := range []struct {
		species string
		nm, hz  float64
		tol     float64
	}{
		{"39K", 736.65, 352.70, 0.006}, {"39K", 1064, 509.43, 0.006}, {"39K", 532, 254.72, 0.006},
		{"87Rb", 1064, 1136.3, 0.06}, {"87Rb", 532, 568.15, 0.006},
	} {
		mass := load(t, tc.species).Mass
		if got := TiltPerSite(mass, tc.nm*1e-9/2, 0, 0); math.Abs(got-tc.hz) > tc.tol {
			t.Errorf("%s at %g nm: got %.4f Hz per site, want %g", tc.species, tc.nm, got, tc.hz)
		}
	}
}

// TestLevitation: gradients in G/cm that cancel gravity, with mu from Breit and
// Rabi, a calculation to four digits; there the tilt vanishes, and twice as much
// turns it round.
func TestLevitation(t *testing.T) {
	const gaussPerCentimetre = si.Gauss / 0.01
	for _, tc := range []struct {
		species     string
		field, want float64 // G, G/cm
	}{{"39K", 402, 7.12}, {"87Rb", 1007, 20.97}} {
		sp := load(t, tc.species)
		state, err := sp.State("F=1,mF=+1")
		if err != nil {
			t.Fatal(err)
		}
		moment := sp.Moment(state, tc.field*si.Gauss)
		gradient := LevitationGradient(sp.Mass, moment)
		if got := gradient / gaussPerCentimetre; math.Abs(got-tc.want) > 0.006 {
			t.Errorf("%s: got %.4f G/cm, want %g", tc.species, got, tc.want)
		}
		free := TiltPerSite(sp.Mass, 4e-7, moment, 0)
		if got := TiltPerSite(sp.Mass, 4e-7, moment, gradient); math.Abs(got) > 1e-12*free {
			t.Errorf("%s: levitated tilt %g Hz, want 0", tc.species, got)
		}
		checkClose(t, "twice the gradient", TiltPerSite(sp.Mass, 4e-7, moment, 2*gradient), -free, 1e-12)
	}
}

// TestCoilCurvature: 10 G/cm^2 on 39K with mu = 0.9606 muB (402.5 G): 5.906 Hz
// along, 4.176 Hz across, calculated to four digits. A high-field seeker is held
// where the field is highest, so b > 0 along the axis pushes it out there.
func TestCoilCurvature(t *testing.T) {
	sp := load(t, "39K")
	const field = 402.5 * si.Gauss
	state, err := sp.State("F=1,mF=+1")
	if err != nil {
		t.Fatal(err)
	}
	moment := sp.Moment(state, field)
	checkClose(t, "moment in muB", moment/si.BohrMagneton, 0.9606, 0.6e-4)
	m := MagneticField{Axis: Y, CurvaturePerField: 10 * si.Gauss / 1e-4 / field}
	c := m.Curvature(moment, field)
	checkFrequency(t, "axial", c[Y]/sp.Mass, -5.906, 0.0006)
	checkFrequency(t, "radial", c[X]/sp.Mass, 4.176, 0.0006)
	checkFrequency(t, "radial", c[Z]/sp.Mass, 4.176, 0.0006)
	checkClose(t, "half the bias", m.Curvature(moment, field/2)[Y], c[Y]/2, 1e-14)
	p := [3]float64{1e-4, 0, 0}
	checkClose(t, "potential", m.Potential(moment, field, p), c[X]*1e-8/2, 1e-14)
}

// TestSag: -g/omega^2, 134 um upwards to the summit of an anti-trap of 43 Hz.
func TestSag(t *testing.T) {
	mass := load(t, "39K").Mass
	checkClose(t, "summit", Sag(OmegaSquared(-43), mass, 0, 0), 134.3e-6, 1e-3)
	checkClose(t, "minimum", Sag(OmegaSquared(43), mass, 0, 0), -134.3e-6, 1e-3)
	checkClose(t, "100 Hz", Sag(OmegaSquared(100), mass, 0, 0), -si.StandardGravity/math.Pow(200*math.Pi, 2), 1e-14)
	const moment = 9e-24
	half := LevitationGradient(mass, moment) / 2
	checkClose(t, "half levitated", Sag(OmegaSquared(43), mass, moment, half), -134.3e-6/2, 1e-3)
	if got := Sag(0, mass, 0, 0); !math.IsInf(got, -1) {
		t.Errorf("no trap: got %g, want -Inf", got)
	}
}
