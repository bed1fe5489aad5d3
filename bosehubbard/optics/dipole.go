package optics

import "math"

// DipoleBeam is a single-pass Gaussian beam focused at the common centre.
type DipoleBeam struct {
	Name       string
	Axis       Axis       // direction of travel
	Wavelength float64    // m
	Waists     [2]float64 // m, along the transverse axes in the order x, y, z
	Shift      float64    // U/I, J/(W/m^2)
}

// PeakIntensity returns 2P/(pi wa wb), W/m^2, for a power in W.
func (b DipoleBeam) PeakIntensity(power float64) float64 { return peakIntensity(power, b.Waists) }

func peakIntensity(power float64, waists [2]float64) float64 {
	return 2 * power / (math.Pi * waists[0] * waists[1])
}

// Depth returns the light shift at the centre, J; negative where it traps.
func (b DipoleBeam) Depth(power float64) float64 { return b.Shift * b.PeakIntensity(power) }

// RayleighRanges returns pi w^2/lambda, m, for the two transverse axes.
func (b DipoleBeam) RayleighRanges() (a, c float64) {
	return math.Pi * b.Waists[0] * b.Waists[0] / b.Wavelength, math.Pi * b.Waists[1] * b.Waists[1] / b.Wavelength
}

// Potential returns the light shift at p (m, from the centre), J:
//
//	U0 wa wb/(wa(z) wb(z)) exp(-2a^2/wa(z)^2 - 2b^2/wb(z)^2), w(z) = w sqrt(1 + z^2/zR^2)
func (b DipoleBeam) Potential(power float64, p [3]float64) float64 {
	first, second := b.Axis.Transverse()
	along := p[b.Axis]
	za, zb := b.RayleighRanges()
	growA, growB := 1+along*along/(za*za), 1+along*along/(zb*zb)
	ra, rb := p[first]/b.Waists[0], p[second]/b.Waists[1]
	return b.Depth(power) / math.Sqrt(growA*growB) * math.Exp(-2*ra*ra/growA-2*rb*rb/growB)
}

// Curvature returns d2U/dx_i^2 at the centre, J/m^2: -4 U0/w^2 across the beam
// and -U0 (1/zRa^2 + 1/zRb^2) along it.
func (b DipoleBeam) Curvature(power float64) [3]float64 {
	u0 := b.Depth(power)
	first, second := b.Axis.Transverse()
	za, zb := b.RayleighRanges()
	var c [3]float64
	c[first] = -4 * u0 / (b.Waists[0] * b.Waists[0])
	c[second] = -4 * u0 / (b.Waists[1] * b.Waists[1])
	c[b.Axis] = -u0 * (1/(za*za) + 1/(zb*zb))
	return c
}
