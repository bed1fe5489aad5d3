// Package exact finds both ends of the Bose-Hubbard spectrum by exact
// diagonalisation: the floor, where a state of T = +0 sits, and the ceiling,
// where one of T = -0 sits.
//
// Conventions: energies are E/h in Hz and totals, not per atom. Small systems go
// to a dense solver, others to one Lanczos run for both ends, in the sector of a
// mirror where that is known to hold an end. Each end comes with a residual, and an
// eigenvalue lies within it.
//
// References: package fock for the operator, package num/lanczos for the method;
// Perron and Frobenius for the sector of an end, from any text on matrices.
package exact
