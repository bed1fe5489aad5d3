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

// response is what one D line contributes at an angular frequency w.
type response struct {
	strength float64 // weight 3 pi c^2/2 w_j^3
	ratio    float64 // w/w_j
	sum      float64 // Gamma_j/(w_j - w) + Gamma_j/(w_j + w)
}

// responses returns the two lines with weights 1/3 (D1) and 2/3 (D2), or the
// errors of LightShift.
func responses(sp *atom.Species, wavelength float64) ([2]response, error) {
	var out [2]response
	if !(wavelength > 0) || math.IsInf(wavelength, 1) {
		return out, fmt.Errorf("optics: wavelength %g m, want a positive number", wavelength)
	}
	w := 2 * math.Pi * si.SpeedOfLight / wavelength
	for i, line := range []atom.Line{sp.D1, sp.D2} {
		w0 := line.AngularFrequency()
		if off := math.Abs(w-w0) / (2 * math.Pi); off < resonanceRange {
			return out, fmt.Errorf("%w: %.6f nm is %.3g GHz from the D%d line of %s at %.6f nm, want at least %g GHz",
				ErrOnResonance, wavelength*1e9, off/1e9, i+1, sp.Name, line.Wavelength*1e9, resonanceRange/1e9)
		}
		weight := float64(i+1) / 3
		out[i] = response{
			strength: weight * 3 * math.Pi * si.SpeedOfLight * si.SpeedOfLight / (2 * w0 * w0 * w0),
			ratio:    w / w0,
			sum:      line.Linewidth * (1/(w0-w) + 1/(w0+w)),
		}
	}
	return out, nil
}

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
// (2000), eq. 10 for each line; formula from memory.
func LightShift(sp *atom.Species, wavelength float64) (float64, error) {
	lines, err := responses(sp, wavelength)
	if err != nil {
		return 0, err
	}
	shift := 0.0
	for _, line := range lines {
		shift -= line.strength * line.sum
	}
	return shift, nil
}

// ScatteringRate returns Gamma_sc/I, photons scattered per second and intensity,
// in (1/s)/(W/m^2).
//
//	Gamma_sc/I = sum_j g_j (3 pi c^2 / 2 hbar w_j^3) (w/w_j)^3 [Gamma_j/(w_j - w) + Gamma_j/(w_j + w)]^2
//
// Far from resonance and below saturation. It returns the errors of LightShift.
//
// Source: Grimm, Weidemueller, Ovchinnikov, Adv. At. Mol. Opt. Phys. 42, 95
// (2000), eq. 11 for each line; formula from memory.
func ScatteringRate(sp *atom.Species, wavelength float64) (float64, error) {
	lines, err := responses(sp, wavelength)
	if err != nil {
		return 0, err
	}
	rate := 0.0
	for _, line := range lines {
		rate += line.strength * line.ratio * line.ratio * line.ratio * line.sum * line.sum
	}
	return rate / si.ReducedPlanckConstant, nil
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
