// Package krylov applies exp(-i tau H) to a complex vector for a real symmetric
// matrix H that is known only by its product with a vector.
//
// The Lanczos recurrence projects H on the space of psi, H psi, .. H^(m-1) psi,
//
//	H V_m = V_m T_m + beta_m v_(m+1) e_m^T,   exp(-i tau H) psi ~ |psi| V_m exp(-i tau T_m) e_1
//
// with T_m real and tridiagonal, for a complex psi too. Since H is real, a complex
// vector is kept as its real and its imaginary part, and one product with H is two
// real ones. Nothing here has a unit: tau H is a pure number.
//
// The error of every step comes with a bound that needs nothing but T_m. The
// approximation solves the equation of motion up to the defect
// beta_m u_m(s) v_(m+1), u(s) = exp(-i s T_m) e_1, and exp(-i s H) keeps norms, so
//
//	error(tau) <= |psi| beta_m integral_0^tau |u_m(s)| ds.
//
// The integral is bounded, not estimated: see file bound.go.
//
// References: Park and Light, J. Chem. Phys. 85, 5870 (1986), for the method, from
// memory; Jawecki, Auzinger and Koch, BIT Numer. Math. 60, 157 (2020), for bounds
// from the defect; Hochbruck and Lubich, SIAM J. Numer. Anal. 34, 1911 (1997), for
// how many products a time needs, which the tests check; Simon, Math. Comp. 42, 115
// (1984), for the watch on orthogonality, from memory.
package krylov
