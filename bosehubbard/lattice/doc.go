// Package lattice describes which sites an atom can tunnel between.
//
// Conventions: sites are numbered from 0 with the first axis running fastest,
// site = x + Lx (y + Ly z). Positions are in sites about the centre (L-1)/2 of
// every axis, for periodic axes too, so that a trap has one meaning everywhere.
// The package knows no Hamiltonian; tunnelling amplitudes are numbers handed in,
// in any unit, and J > 0 means that the uniform state is lowest.
package lattice
