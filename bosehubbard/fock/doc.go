// Package fock holds the number basis of N bosons on L sites, the exact place of
// every state in it, and the Bose-Hubbard Hamiltonian as an operator y = H x.
//
// Conventions: a state is the list of atoms per site, n_0 .. n_(L-1). States are
// in descending lexicographic order, from |N,0,..,0> of rank 0 to |0,..,0,N>.
// Nothing is hashed or searched: ranks are sums of binomial coefficients, and a
// hop changes the rank by a sum over the sites that the atom crosses. Energies
// are E/h in Hz.
//
// Everything here refuses a problem that does not fit the memory before it
// allocates, with a *TooLargeError.
//
// The code is the plain one: it is meant to be read and to check faster ones.
//
// References: Zhang and Dong, Eur. J. Phys. 31, 591 (2010), arXiv:1102.4006, for
// the ordered basis; the combinatorial rank replaces their hash.
package fock
