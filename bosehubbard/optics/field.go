package optics

import (
	"math"

	"hilltop/bosehubbard/si"
)

// MagneticField is the shape of the bias field. Its strength is passed in, since
// a sequence changes it.
type MagneticField struct {
	Axis              Axis
	Gradient          float64 // d|B|/d(up), T/m
	CurvaturePerField float64 // B''/B along the axis, 1/m^2
}

// Curvature returns the second derivatives of U = -mu |B|, J/m^2: -mu b along the
// axis and +mu b/2 across it, where b is the second derivative of |B| along the
// axis. moment is mu in J/T, field in T.
//
// Across the axis the bias is large and the gradients small, so |B| is the
// component along the axis; mu is taken as constant over the cloud.
//
// Source: derived from Laplace's equation.
func (m MagneticField) Curvature(moment, field float64) [3]float64 {
	second := m.CurvaturePerField * field
	first, other := m.Axis.Transverse()
	var c [3]float64
	c[m.Axis] = -moment * second
	c[first] = moment * second / 2
	c[other] = moment * second / 2
	return c
}

// Potential returns the part of -mu |B| that the curvature makes at p, J.
func (m MagneticField) Potential(moment, field float64, p [3]float64) float64 {
	sum := 0.0
	for i, c := range m.Curvature(moment, field) {
		sum += c * p[i] * p[i] / 2
	}
	return sum
}

// TiltPerSite returns (m g - mu dB/dz) d / h in Hz: positive where the potential
// rises upwards. mass in kg, spacing in m, moment in J/T, gradient in T/m.
func TiltPerSite(mass, spacing, moment, gradient float64) float64 {
	return si.HzFromJoule((mass*si.StandardGravity - moment*gradient) * spacing)
}

// LevitationGradient returns the gradient, T/m, that cancels gravity.
func LevitationGradient(mass, moment float64) float64 { return mass * si.StandardGravity / moment }

// Sag returns how far the tilt moves the minimum of a harmonic trap, m, negative
// downwards: -(g - mu B'/m)/omega^2. It is infinite where omega^2 is 0.
func Sag(omegaSquared, mass, moment, gradient float64) float64 {
	pull := si.StandardGravity - moment*gradient/mass
	if omegaSquared == 0 {
		return math.Copysign(math.Inf(1), -pull)
	}
	return -pull / omegaSquared
}
