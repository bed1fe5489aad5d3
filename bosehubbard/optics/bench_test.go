package optics

import "testing"

func BenchmarkPotential(b *testing.B) {
	p := [3]float64{1e-5, 2e-5, -1e-5}
	d := DipoleBeam{Axis: X, Wavelength: 1e-6, Waists: [2]float64{1e-4, 6e-5}, Shift: -2e-36}
	l := LatticeBeam{Axis: Y, Wavelength: 1e-6, Waists: [2]float64{1e-4, 6e-5}, Shift: 1e-35, ReturnRatio: 0.9, Spacing: 5e-7, Recoil: 6e-30}
	b.Run("dipole", func(b *testing.B) {
		b.ReportAllocs()
		for b.Loop() {
			d.Potential(1, p)
		}
	})
	b.Run("lattice", func(b *testing.B) {
		b.ReportAllocs()
		for b.Loop() {
			l.Potential(22, p, meanEnergy)
		}
	})
}
