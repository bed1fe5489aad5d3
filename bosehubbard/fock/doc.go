// Package fock holds the number basis of N bosons on L sites and the Bose-Hubbard
// Hamiltonian as an operator y = H x that stores nothing as long as a vector.
//
// The sites are cut in two halves. With n atoms on the left the states are pairs of
// a left one and a right one, so that a vector is a list of matrices X_n and
//
//	Y_n = (K_n + E_n) X_n + X_n (K_(N-n) + E_(N-n)) + sum over hops across the cut
//	      of b_i^+ X_(n-1) b_j + b_i X_(n+1) b_j^+
//
// with the hops K and the energies E inside the halves, whose states are few and
// are listed. A mirror of the system that swaps the halves turns X_n into the
// transpose of X_(N-n), and a sector of its parity keeps one of the two.
//
// Conventions: states of a half are in descending lexicographic order of the
// numbers of atoms, counted from the cut outwards. Energies are E/h in Hz.
//
// Everything here refuses a problem that does not fit the memory before it
// allocates, with a *TooLargeError.
//
// References: Zhang and Dong, Eur. J. Phys. 31, 591 (2010), arXiv:1102.4006, for
// the ordered basis; ranks are sums of numbers of states, in place of their hash.
// The cut is that of the density-matrix renormalisation group, White, Phys. Rev.
// Lett. 69, 2863 (1992), from memory, without its truncation.
package fock
