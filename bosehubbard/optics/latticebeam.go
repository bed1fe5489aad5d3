package optics

import "math"

// LatticeBeam is a retro-reflected beam that makes the lattice along its axis.
type LatticeBeam struct {
	Axis        Axis
	Wavelength  float64    // m
	Waists      [2]float64 // m, along the transverse axes in the order x, y, z
	ReturnRatio float64    // returning over incoming power, 0 to 1
	Shift       float64    // U/I, J/(W/m^2); positive is blue detuned
	Spacing     float64    // site spacing d, m
	Recoil      float64    // h^2/(8 m d^2), J
}

// Blue reports whether the atoms sit in the dark.
func (b LatticeBeam) Blue() bool { return b.Shift > 0 }

// onePass returns |U| of one incoming pass at the centre, J.
func (b LatticeBeam) onePass(power float64) float64 {
	return math.Abs(b.Shift) * peakIntensity(power, b.Waists)
}

// DepthFromPower returns the depth in recoil energies, 4 sqrt(rho) |U0|/Er.
func (b LatticeBeam) DepthFromPower(power float64) float64 {
	return 4 * math.Sqrt(b.ReturnRatio) * b.onePass(power) / b.Recoil
}

// PowerFromDepth returns the incoming power in W for a depth in recoil energies;
// +Inf where nothing returns and the depth is not 0.
func (b LatticeBeam) PowerFromDepth(depth float64) float64 {
	if depth == 0 {
		return 0
	}
	return depth / b.DepthFromPower(1)
}

// profile is exp(-2 ra^2/wa^2 - 2 rb^2/wb^2) at p. The beam's spread along its
// axis is left out: its Rayleigh range is centimetres.
func (b LatticeBeam) profile(p [3]float64) float64 {
	first, second := b.Axis.Transverse()
	ra, rb := p[first]/b.Waists[0], p[second]/b.Waists[1]
	return math.Exp(-2*ra*ra - 2*rb*rb)
}

// DepthAt returns the depth in recoil energies at p for the depth at the centre.
func (b LatticeBeam) DepthAt(depth float64, p [3]float64) float64 { return depth * b.profile(p) }

// flat is the light shift, in recoil energies at the centre, of the running part
// that unequal powers leave at the nodes: (1 - sqrt rho)^2 |U0|/Er for a depth of
// 4 sqrt(rho) |U0|/Er, with the sign of the shift.
func (b LatticeBeam) flat(depth float64) float64 {
	root := math.Sqrt(b.ReturnRatio)
	if root == 1 || depth == 0 {
		return 0
	}
	return math.Copysign(depth*(1-root)*(1-root)/(4*root), b.Shift)
}

// Potential returns the mean energy of the lowest band at p, J: Er eps(s) on a
// blue lattice, whose atoms sit in the dark, Er (eps(s) - s) on a red one, and
// the light shift of the part that does not interfere. mean(s) returns eps(s),
// in recoil energies.
//
// Source: derived; leading forms in Bloch, Dalibard, Zwerger, Rev. Mod. Phys. 80,
// 885 (2008).
func (b LatticeBeam) Potential(depth float64, p [3]float64, mean func(float64) float64) float64 {
	profile := b.profile(p)
	s := depth * profile
	energy := mean(s) + b.flat(depth)*profile
	if !b.Blue() {
		energy -= s
	}
	return b.Recoil * energy
}

// Curvature returns the second derivatives of Potential at the centre, J/m^2,
// with slope = d eps/ds at this depth; none along the beam's own axis.
func (b LatticeBeam) Curvature(depth, slope float64) [3]float64 {
	perProfile := depth*slope + b.flat(depth) // d energy / d profile
	if !b.Blue() {
		perProfile -= depth
	}
	first, second := b.Axis.Transverse()
	var c [3]float64
	c[first] = -4 * b.Recoil * perProfile / (b.Waists[0] * b.Waists[0])
	c[second] = -4 * b.Recoil * perProfile / (b.Waists[1] * b.Waists[1])
	return c
}
