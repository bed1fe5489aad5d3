package optics

import (
	"errors"
	"fmt"
	"math"

	"hilltop/bosehubbard/atom"
	"hilltop/bosehubbard/si"
)

// ErrOnResonance says that a wavelength is too near to a D line for a light shift
// without hyperfine structure.
var ErrOnResonance = errors.New("optics: wavelength on a D line")

// resonanceRange is how near to a line, in Hz, a light shift is refused: a
// hundred times the hyperfine splittings of the alkalis' excited states.
const resonanceRange = 50e9

// LightShift returns U/I, the energy of the ground state per intensity, in
// J/(W/m^2); negative attracts to the light (red detuned).
//
//	U/I = - sum_j g_j (3 pi c^2 / 2 w_j^3) [Gamma_j/(w_j - w) + Gamma_j/(w_j + w)]
//
// with g = 1/3 for D1 and 2/3 for D2. wavelength is in vacuum, m.
//
// It returns an error unless wavelength is positive and finite, and one that
// wraps ErrOnResonance within 50 GHz of a line.
//
// Source: Grimm, Weidemueller, Ovchinnikov, Adv. At. Mol. Opt. Phys. 42, 95
// (2000), eq. 10 for each line.
func LightShift(sp *atom.Species, wavelength float64) (float64, error) {
	if !(wavelength > 0) || math.IsInf(wavelength, 1) {
		return 0, fmt.Errorf("optics: wavelength %g m, want a positive number", wavelength)
	}
	w := 2 * math.Pi * si.SpeedOfLight / wavelength
	sum := 0.0
	for _, line := range []struct {
		name   string
		weight float64
		atom.Line
	}{{"D1", 1.0 / 3, sp.D1}, {"D2", 2.0 / 3, sp.D2}} {
		w0 := line.AngularFrequency()
		if off := math.Abs(w-w0) / (2 * math.Pi); off < resonanceRange {
			return 0, fmt.Errorf("%w: %.6g nm is %.3g GHz from the %s line of %s at %.6f nm, want at least %g GHz",
				ErrOnResonance, wavelength*1e9, off/1e9, line.name, sp.Name, line.Wavelength*1e9, resonanceRange/1e9)
		}
		strength := 3 * math.Pi * si.SpeedOfLight * si.SpeedOfLight / (2 * w0 * w0 * w0)
		sum -= line.weight * strength * line.Linewidth * (1/(w0-w) + 1/(w0+w))
	}
	return sum, nil
}

// PolarizabilityAU returns the real polarizability in atomic units, from
// U = -alpha I / (2 eps0 c) and 1 a.u. = 4 pi eps0 a0^3.
//
// It returns the errors of LightShift.
func PolarizabilityAU(sp *atom.Species, wavelength float64) (float64, error) {
	shift, err := LightShift(sp, wavelength)
	if err != nil {
		return 0, err
	}
	alpha := -shift * 2 * si.ElectricConstant * si.SpeedOfLight
	return alpha / (4 * math.Pi * si.ElectricConstant * si.BohrRadius * si.BohrRadius * si.BohrRadius), nil
}
