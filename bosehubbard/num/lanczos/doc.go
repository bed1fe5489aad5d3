// Package lanczos finds both ends of the spectrum of a real symmetric matrix that
// is known only by its product with a vector.
//
// One run of the three-term recurrence
//
//	beta_(j+1) v_(j+1) = A v_j - alpha_j v_j - beta_j v_(j-1)
//
// turns A into a tridiagonal T whose lowest and highest eigenvalues tend to those
// of A together. The Lanczos vectors are not kept and not orthogonalised again:
// the loss of orthogonality only repeats eigenvalues that have converged, and an
// end is taken when it first converges. Nothing here has a unit.
//
// References: Lanczos, J. Res. Natl. Bur. Stand. 45, 255 (1950); Paige, J. Inst.
// Maths Applics 18, 341 (1976), for the recurrence in finite precision; Parlett,
// The Symmetric Eigenvalue Problem (1980), for the residual bound. From memory.
package lanczos
