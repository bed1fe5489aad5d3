// Package quadrature computes <v|f(A)|v> for many functions f at once from one
// short Lanczos run from v.
//
// The run turns A into a tridiagonal T of m steps. The eigenvalues of T are the
// nodes and the squared first components of its eigenvectors the weights of the
// Gauss rule of the density that v sees:
//
//	<v|f(A)|v> = sum_k weight_k f(node_k)
//
// exactly for polynomials up to degree 2m-1, and best where f is largest at an
// end of the spectrum. The loss of orthogonality in finite precision only splits
// weights among copies of a node. Nothing here has a unit.
//
// References: Golub and Meurant, Matrices, Moments and Quadrature with
// Applications (2010); Greenbaum, Lin. Alg. Appl. 113, 7 (1989), for finite
// precision; from memory.
package quadrature
