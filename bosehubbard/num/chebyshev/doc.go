// Package chebyshev expands spectral densities in Chebyshev polynomials, the
// kernel polynomial method.
//
// A symmetric matrix A is known by its products with vectors. Its spectrum is
// moved into [-1, 1], and
//
//	mu_n = <v|T_n(A)|v>,   T_n(cos t) = cos(n t)
//
// are the moments of the density that v sees. N of them, damped by a kernel that
// keeps the sum positive, give that density broadened by about pi/N.
//
// Conventions: moments are those of a vector of length 1, so mu_0 = 1, and x is
// the place in [-1, 1]. Nothing here has a unit.
//
// References: Weisse, Wellein, Alvermann and Fehske, Rev. Mod. Phys. 78, 275
// (2006), arXiv:cond-mat/0504627; Jackson, Trans. Am. Math. Soc. 13, 491 (1912).
package chebyshev
