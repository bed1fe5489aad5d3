package si

// JouleFromHz returns the energy h f [J] of the frequency f [Hz].
func JouleFromHz(hz float64) float64 { return PlanckConstant * hz }

// HzFromJoule returns the frequency E/h [Hz] of the energy E [J].
func HzFromJoule(joule float64) float64 { return joule / PlanckConstant }

// KelvinFromHz returns the temperature h f/kB [K] of the frequency f [Hz].
func KelvinFromHz(hz float64) float64 { return hz * (PlanckConstant / BoltzmannConstant) }

// HzFromKelvin returns the frequency kB T/h [Hz] of the temperature T [K].
func HzFromKelvin(kelvin float64) float64 { return kelvin / (PlanckConstant / BoltzmannConstant) }

// RadPerSFromHz returns the angular frequency 2 pi f [rad/s], which for an
// energy E/h is E/hbar.
func RadPerSFromHz(hz float64) float64 { return hz * (PlanckConstant / ReducedPlanckConstant) }

// HzFromRadPerS returns the frequency omega/(2 pi) [Hz].
func HzFromRadPerS(radPerS float64) float64 {
	return radPerS / (PlanckConstant / ReducedPlanckConstant)
}

// HzFromEr returns E/h [Hz] of an energy in recoil energies; recoilHz is Er/h,
// see RecoilHz.
func HzFromEr(er, recoilHz float64) float64 { return er * recoilHz }

// ErFromHz returns the energy E/h [Hz] in recoil energies; recoilHz is Er/h and
// must not be 0.
func ErFromHz(hz, recoilHz float64) float64 { return hz / recoilHz }

// RecoilHz returns the recoil energy of an atom in a lattice,
//
//	Er/h = h/(8 m d^2)
//
// in Hz, for the mass m [kg] > 0 and the site spacing d [m] > 0. For a
// retro-reflected beam d is half the wavelength and Er = h^2/(2 m lambda^2).
//
// Source: definition.
func RecoilHz(mass, spacing float64) float64 {
	return PlanckConstant / (8 * mass * spacing * spacing)
}
