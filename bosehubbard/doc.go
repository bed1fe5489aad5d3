// Package bosehubbard holds the model that everything in Hilltop is about,
//
//	H = -J sum_<ij> (b_i^+ b_j + h.c.) + (U/2) sum_i n_i (n_i - 1)
//	    + sum_i (V_x x_i^2 + V_y y_i^2 + V_z z_i^2 + F_x x_i + ...) n_i
//
// with x_i in sites. J is the tunnelling, U the interaction, V the curvature of
// the trap and F the tilt per site; each has a sign.
//
// Conventions: every energy is E/h in hertz. J > 0 is the natural sign of the
// lowest band. U < 0 is attraction, V < 0 pushes the atoms outwards. A state of
// negative absolute temperature sits at the top of the energy, so it needs a
// bound from above: U <= 0, V < 0 and a single band.
//
// Mirror: -H(J, -U, -V) = H(-J, U, V) on any lattice, and on a bipartite one
// the sign of J is a choice of phases on one sublattice. Source: derived; used
// for the fermionic case by Schneider et al., Nature Physics 8, 213 (2012).
package bosehubbard
