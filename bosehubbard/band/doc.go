// Package band solves the bands of one axis of a sinusoidal lattice,
//
//	H/Er = -d^2/dxi^2 + s sin^2(xi),    xi = k x
//
// k is the wave number of the light, Er = hbar^2 k^2 / 2m the recoil energy and
// s the lattice depth. A site sits at xi = 0, the next at xi = pi. The quasi-momentum q is in units of k, the
// first zone is (-1, 1].
//
// The plane waves exp(i(2l+q)xi) make H a tridiagonal matrix with (2l+q)^2 + s/2
// on the diagonal and -s/4 beside it. Its off-diagonals are negative, so the
// lowest vector can be taken positive. That is also the choice of phases, a Bloch
// wave real and positive at the site, that makes the Wannier function
//
//	w(xi) = (1/sqrt(pi)) int_0^1 dq Re psi_q(xi)
//
// real, even and as narrow as it can be (Kohn 1959).
//
// Quasi-momentum: the gap s/2 closes with the depth, and E0(q) has a branch point
// near q = 1 + i s/8. All integrals over the zone therefore use Gauss-Legendre
// points in t with q = 1 - (s/8) sinh t, which converge exponentially at every
// depth; evenly spaced points would need about 80/s of them.
//
// Deep lattices: the width of the band falls below the rounding of its energies.
// Energies above the bottom of the band come from the current through the
// barrier instead (see climb), so the tunnelling keeps its relative accuracy.
//
// Units: energies in Er, lengths as xi. Only Interaction speaks SI and Hz.
//
// References: W. Kohn, Phys. Rev. 115, 809 (1959); I. Bloch, J. Dalibard, W.
// Zwerger, Rev. Mod. Phys. 80, 885 (2008); DLMF section 28.2 for the band edges
// as characteristic values of Mathieu's equation.
package band
