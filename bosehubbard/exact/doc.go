// Package exact finds both ends of the Bose-Hubbard spectrum by exact
// diagonalisation: the floor, where a state of T = +0 sits, and the ceiling,
// where one of T = -0 sits.
//
// Conventions: energies are E/h in Hz and totals, not per atom. Small systems go
// to a dense solver, others to one Lanczos run for both ends. Each end comes with
// a residual, and an eigenvalue lies within it.
//
// This is the plain solver: one goroutine, hops by ranking, nothing reduced by
// symmetry. Faster ones are checked against it.
//
// References: package fock for the basis, package num/lanczos for the method.
package exact
