// Package lattice describes which sites an atom can tunnel between.
//
// Conventions: the sites of a box are numbered from 0 with the first axis running
// fastest, site = x + Lx (y + Ly z), those of other patches cell by cell in the same
// way. Positions are in sites about the centre (L-1)/2 of every axis of a box, for
// periodic axes too, so that a trap has one meaning everywhere, and about their
// mean in other patches. The package knows no Hamiltonian; tunnelling amplitudes
// are numbers handed in, in any unit, and J > 0 means that the uniform state is
// lowest.
package lattice
