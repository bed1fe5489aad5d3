// Package thermo holds the thermodynamics of bounded spectra at temperatures of
// either sign.
//
// Conventions: energies are E/h in Hz, of all atoms together or, for Levels, per
// body. beta = 1/(kB T) is in 1/Hz and entropies are in kB; beta runs through 0
// from T > 0 to T < 0, so it orders the states where T does not.
//
// References: Purcell and Pound, Phys. Rev. 81, 279 (1951), and Ramsey, Phys. Rev.
// 103, 20 (1956), for levels at T < 0.
package thermo
