// Package eos gives the equations of state of bosons on an endless lattice: filling,
// entropy, energy, number variance and, where a model has one, the distribution of
// the occupation of a site, as functions of the chemical potential and of beta.
//
// Conventions: energies are E/h in Hz and per site, beta = 1/(kB T) is in 1/Hz,
// entropies are in kB per site. The chemical potential and the kinetic energy count
// from the centre of the band, the mean of its energies; the interaction counts from
// singly occupied sites. beta = +Inf and -Inf are T = +0 and -0. At beta = 0 the
// chemical potential has no meaning and all models agree: Infinite gives that end as
// a function of the filling.
//
// T < 0 goes through the mirror: exp(-beta (H - mu N)) does not change when H, mu and
// beta change sign together. So a point at beta < 0 is that of -beta, -mu, -U and the
// band turned over, with all energies reversed. The cosine band turned over is itself
// moved by pi along every axis; the second tunnelling of a real band changes its sign.
// T has to have the sign of U, or U = 0: else the energy has no bound.
//
// Models and where they hold. Doubt, the rough size of what a model leaves out, is at
// most 1/2; beyond, a model refuses with the reason.
//
//	Ideal          no interaction; exact for U = 0
//	HartreeFock    normal gas with the mean-field shift 2 U n
//	Bogoliubov     superfluid, one loop about the mean field
//	Atomic         sites without tunnelling, and its second order
//	Gutzwiller     one site in the field of its neighbours
//	LinkedCluster  exact clusters of up to four sites, added up
//
// Chooser asks all and gives their spread; the linked clusters, which have to be
// diagonalised first, can be added to it. Every model is derived from one grand
// potential, so that dn/dT at fixed mu is ds/dmu at fixed T in each of them.
//
// Models own their scratch: one per goroutine.
//
// References: Braun et al., Science 339, 52 (2013), for the ideal gas at T < 0; Freericks
// and Monien, EPL 26, 545 (1994), for the expansion in the tunnelling; the rest is
// textbook material, from memory, or derived.
package eos
