package optics

import (
	"math"
	"math/rand/v2"
	"testing"
)

// secondDerivative is that of f at 0 by central differences over h, 2h and 4h,
// extrapolated twice: off by a few (h/length)^6, where length is that of f, plus
// 1e-15 (length/h)^2 of rounding.
func secondDerivative(f func(float64) float64, h float64) float64 {
	d := func(h float64) float64 { return (f(h) - 2*f(0) + f(-h)) / (h * h) }
	a, b, c := d(h), d(2*h), d(4*h)
	ab, bc := a+(a-b)/3, b+(b-c)/3
	return ab + (ab-bc)/15
}

// checkHessian compares a potential with its analytic curvatures, and finds its
// mixed derivatives zero by being even in every coordinate. lengths are the
// scales on which it changes.
func checkHessian(t *testing.T, what string, u func([3]float64) float64, want, lengths [3]float64) {
	t.Helper()
	for i := range want {
		along := func(x float64) float64 {
			var p [3]float64
			p[i] = x
			return u(p)
		}
		got := secondDerivative(along, lengths[i]/64)
		tol := 1e-6 * math.Abs(want[i])
		if want[i] == 0 {
			tol = 1e-11 * math.Abs(u([3]float64{})) / (lengths[i] * lengths[i])
		}
		if math.Abs(got-want[i]) > tol {
			t.Errorf("%s along %v: curvature by differences %.9g, analytic %.9g, ratio-1 %.2g", what, Axis(i), got, want[i], got/want[i]-1)
		}
		p := [3]float64{0.2 * lengths[0], -0.3 * lengths[1], 0.1 * lengths[2]}
		q := p
		q[i] = -q[i]
		if u(p) != u(q) {
			t.Errorf("%s: potential %g and %g at mirrored points along %v", what, u(p), u(q), Axis(i))
		}
	}
}

// between draws from a range, evenly in the logarithm.
func between(rng *rand.Rand, low, high float64) float64 {
	return low * math.Pow(high/low, rng.Float64())
}

func TestDipoleHessian(t *testing.T) {
	rng := rand.New(rand.NewPCG(11, 1))
	for range 100 {
		b := DipoleBeam{
			Axis: Axis(rng.IntN(3)), Wavelength: between(rng, 400e-9, 1600e-9),
			Waists: [2]float64{between(rng, 5e-6, 500e-6), between(rng, 5e-6, 500e-6)},
			Shift:  math.Copysign(between(rng, 1e-37, 1e-34), rng.Float64()-0.5),
		}
		power := between(rng, 1e-3, 50)
		first, second := b.Axis.Transverse()
		za, zb := b.RayleighRanges()
		var lengths [3]float64
		lengths[first], lengths[second], lengths[b.Axis] = b.Waists[0], b.Waists[1], math.Min(za, zb)
		checkHessian(t, "dipole beam", func(p [3]float64) float64 { return b.Potential(power, p) }, b.Curvature(power), lengths)
	}
}

// meanEnergy stands in for the mean of the lowest band, (sqrt(1 + s) - 1/4) Er,
// with its slope; any smooth function serves, if the two belong together.
func meanEnergy(s float64) float64      { return math.Sqrt(1+s) - 0.25 }
func meanEnergySlope(s float64) float64 { return 0.5 / math.Sqrt(1+s) }

func TestLatticeHessian(t *testing.T) {
	rng := rand.New(rand.NewPCG(13, 1))
	red, unequal := 0, 0
	for range 100 {
		wavelength := between(rng, 400e-9, 1600e-9)
		b := LatticeBeam{
			Axis: Axis(rng.IntN(3)), Wavelength: wavelength, Spacing: wavelength / 2, Recoil: between(rng, 1e-31, 1e-28),
			Waists:      [2]float64{between(rng, 30e-6, 500e-6), between(rng, 30e-6, 500e-6)},
			ReturnRatio: math.Min(1, 1.3-rng.Float64()),
			Shift:       math.Copysign(between(rng, 1e-37, 1e-34), rng.Float64()-0.5),
		}
		if !b.Blue() {
			red++
		}
		if b.ReturnRatio < 1 {
			unequal++
		}
		depth := between(rng, 0.1, 100)
		first, second := b.Axis.Transverse()
		var lengths [3]float64
		lengths[first], lengths[second], lengths[b.Axis] = b.Waists[0], b.Waists[1], wavelength
		checkHessian(t, "lattice beam", func(p [3]float64) float64 { return b.Potential(depth, p, meanEnergy) },
			b.Curvature(depth, meanEnergySlope(depth)), lengths)
	}
	if red < 20 || red > 80 || unequal < 30 {
		t.Errorf("%d red and %d unequal beams of 100, want a mixture", red, unequal)
	}
}

func TestMagneticHessian(t *testing.T) {
	rng := rand.New(rand.NewPCG(17, 1))
	for range 100 {
		m := MagneticField{Axis: Axis(rng.IntN(3)), CurvaturePerField: 1e4 * (rng.Float64() - 0.5)}
		moment, field := 1e-23*(rng.Float64()-0.5), 0.1*rng.Float64()
		curvature := m.Curvature(moment, field)
		checkHessian(t, "field", func(p [3]float64) float64 { return m.Potential(moment, field, p) },
			curvature, [3]float64{1e-3, 1e-3, 1e-3})
		if sum := curvature[0] + curvature[1] + curvature[2]; math.Abs(sum) > 1e-15*math.Abs(curvature[m.Axis]) {
			t.Errorf("curvatures %v sum to %g, want 0 (Laplace)", curvature, sum)
		}
	}
}

func TestPotentialsAllocateNothing(t *testing.T) {
	d := DipoleBeam{Axis: X, Wavelength: 1e-6, Waists: [2]float64{1e-4, 6e-5}, Shift: -2e-36}
	l := LatticeBeam{Axis: Y, Wavelength: 1e-6, Waists: [2]float64{1e-4, 6e-5}, Shift: 1e-35, ReturnRatio: 0.9, Spacing: 5e-7, Recoil: 6e-30}
	m := MagneticField{Axis: Z, CurvaturePerField: 20}
	p := [3]float64{1e-5, 2e-5, -1e-5}
	sink := 0.0
	if n := testing.AllocsPerRun(100, func() {
		sink += d.Potential(1, p) + d.Curvature(1)[0]
		sink += l.Potential(22, p, meanEnergy) + l.Curvature(22, 0.1)[0]
		sink += m.Potential(9e-24, 0.04, p) + m.Curvature(9e-24, 0.04)[0]
	}); n != 0 {
		t.Errorf("%g allocations per run, want 0 (sum %g)", n, sink)
	}
}
