package optics

import (
	"math"
	"testing"

	"hilltop/bosehubbard/si"
)

func sheetBeam(t testing.TB, axis Axis) DipoleBeam {
	t.Helper()
	return DipoleBeam{
		Name: "sheet", Axis: axis, Wavelength: 1064e-9, Waists: [2]float64{120e-6, 40e-6},
		Shift: shift(t, load(t, "39K"), 1064e-9),
	}
}

// TestDipoleDepth: 39K, 1064 nm, 1 W, 100 um: 8.496 uK, a sum over the D lines done
// outside this project, to four digits.
func TestDipoleDepth(t *testing.T) {
	b := sheetBeam(t, X)
	b.Waists = [2]float64{100e-6, 100e-6}
	checkClose(t, "depth in uK", b.Depth(1)/si.BoltzmannConstant*1e6, -8.496, 0.6e-4)
	checkClose(t, "peak intensity", b.PeakIntensity(1), 2/(math.Pi*1e-8), 1e-15)
}

// TestPowerCrossesEveryPlane integrates the intensity over planes across the beam:
// the power, at the focus and beyond both Rayleigh ranges. The trapezoid rule on a
// Gaussian over +-6 waists is exact to exp(-72).
func TestPowerCrossesEveryPlane(t *testing.T) {
	const power = 0.37
	for _, axis := range []Axis{X, Y, Z} {
		b := sheetBeam(t, axis)
		first, second := axis.Transverse()
		za, zb := b.RayleighRanges()
		for _, along := range []float64{0, zb, za, -3 * za} {
			wa, wb := b.Waists[0]*math.Hypot(1, along/za), b.Waists[1]*math.Hypot(1, along/zb)
			const n = 40
			sum := 0.0
			for i := -n; i <= n; i++ {
				for j := -n; j <= n; j++ {
					var p [3]float64
					p[axis], p[first], p[second] = along, 6*wa*float64(i)/n, 6*wb*float64(j)/n
					sum += b.Potential(power, p) / b.Shift * (6 * wa / n) * (6 * wb / n)
				}
			}
			checkClose(t, "power through a plane", sum, power, 1e-12)
		}
	}
}

// TestWaistAndRayleighRange: 1/e^2 of the intensity at the waist, half of it on
// axis at the Rayleigh range of a round beam, on the right axes.
func TestWaistAndRayleighRange(t *testing.T) {
	b := sheetBeam(t, Y) // waists along x and z
	e2 := math.Exp(-2)
	u0 := b.Depth(1)
	checkClose(t, "at the centre", b.Potential(1, [3]float64{}), u0, 1e-15)
	checkClose(t, "one waist along x", b.Potential(1, [3]float64{120e-6, 0, 0}), u0*e2, 1e-14)
	checkClose(t, "one waist along z", b.Potential(1, [3]float64{0, 0, 40e-6}), u0*e2, 1e-14)
	b.Waists = [2]float64{50e-6, 50e-6}
	za, zb := b.RayleighRanges()
	checkClose(t, "Rayleigh range", za, math.Pi*50e-6*50e-6/1064e-9, 1e-15)
	checkClose(t, "one Rayleigh range", b.Potential(1, [3]float64{0, zb, 0}), b.Depth(1)/2, 1e-14)
}

// TestRoundBeamFrequencies: 4 U0/(m w^2) across and 2 U0/(m zR^2) along, Grimm,
// Weidemueller, Ovchinnikov (2000); linear in the power; a blue beam repels.
func TestRoundBeamFrequencies(t *testing.T) {
	b := sheetBeam(t, Z)
	b.Waists = [2]float64{60e-6, 60e-6}
	u0 := math.Abs(b.Depth(0.2))
	zr, _ := b.RayleighRanges()
	c := b.Curvature(0.2)
	checkClose(t, "across", c[X], 4*u0/(60e-6*60e-6), 1e-14)
	checkClose(t, "across", c[Y], c[X], 0)
	checkClose(t, "along", c[Z], 2*u0/(zr*zr), 1e-14)
	checkClose(t, "twice the power", b.Curvature(0.4)[Z], 2*c[Z], 1e-14)
	b.Shift = -b.Shift
	checkClose(t, "blue", b.Curvature(0.2)[X], -c[X], 0)
}
