// Package thermo holds the thermodynamics of bounded spectra at temperatures of
// either sign: the density of states and S(E) of atoms on a lattice (Entropy), their
// canonical averages (Canonical), and many independent bodies with given levels
// (Levels).
//
// Conventions: energies are E/h in Hz, of all atoms together or, for Levels, per
// body. beta = 1/(kB T) is in 1/Hz and entropies are in kB; beta runs through 0
// from T > 0 to T < 0, so it orders the states where T does not.
//
// Two entropies. The one of the surface, S = ln(omega(E) eps), has beta = dS/dE of
// both signs; it is the one that two bodies in contact agree on, and the one meant
// where nothing else is said. The one of the volume, S = ln Omega(E), counts all
// states below and never has beta < 0; Options.Volume gives it. Around beta = 0 the
// microcanonical and the canonical answers differ in small systems: omega peaks
// elsewhere than at Tr H/D.
//
// Density of states. Each of R random vectors gives N Chebyshev moments, the Jackson
// kernel turns them into a density broadened by pi/N of half the width of the
// spectrum, and R of them into a mean with its error. The vectors are drawn on the
// sphere, so that the sum over all states is right with every one.
//
// Canonical averages. Each random vector gives the Gauss rule of a short Lanczos run.
// Levels at both ends are found before, count as they are, and are projected out of
// the vectors: a relative error sqrt(2/(R Z)) is left on the rest Z of the partition
// function, in units of the weight of the end. Weights count from the end that a
// state of that sign sits at, so none overflows and that of the end stays at any
// |beta|. Levels closer than 1e-7 of the width of the spectrum, 1e-13 where all are
// found, count as one.
//
// References: Weisse, Wellein, Alvermann and Fehske, Rev. Mod. Phys. 78, 275 (2006),
// for the density of states; Jaklic and Prelovsek, Adv. Phys. 49, 1 (2000), Morita
// and Tohyama, Phys. Rev. Research 2, 013205 (2020), for levels left out, and Sugiura
// and Shimizu, Phys. Rev. Lett. 111, 010401 (2013), for thermal vectors, from memory;
// Purcell and Pound, Phys. Rev. 81, 279 (1951), and Ramsey, Phys. Rev. 103, 20
// (1956), for levels at T < 0; Frenkel and Warren, Am. J. Phys. 83, 163 (2015), and
// Buonsante, Franzosi and Smerzi, Ann. Phys. 375, 414 (2016), for the entropy of the
// surface; Dunkel and Hilbert, Nature Physics 10, 67 (2014), for that of the volume.
package thermo
