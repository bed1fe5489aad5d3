package band

import "math"

// climb returns E0(q) - E0(0) in Er for the coefficients c of the lowest band at
// q, from the current through the barrier at xi = pi/2:
//
//	(E_q - E_0) int_0^{pi/2} phi_0 A_q = -phi_0(pi/2) A_q'(pi/2)
//
// with A_q = sum_l c_l cos (2l+q)xi and phi_0 = A_0. No energies are subtracted,
// so in a deep lattice the answer keeps its relative accuracy, about
// 1e-16 exp(sqrt(s)).
//
// Source: Green's identity for the two solutions; Herring's formula is its
// limit for a high barrier.
func (w *Workspace) climb(q float64, c []float64) float64 {
	top := (len(c) - 1) / 2
	inverse := w.inverse[:4*top+1]
	sign := 1.0 // of (-1)^m; m starts at the even number -2 top
	for i := range inverse {
		inverse[i] = sign / (float64(2*(i-2*top)) + q)
		sign = -sign
	}
	sign = float64(1 - 2*(top&1))
	var barrier, current, overlap float64
	for i, c0 := range w.bottom {
		barrier += sign * c0
		current += sign * (float64(2*(i-top)) + q) * c[i]
		sign = -sign
		overlap += c0 * dot(c, inverse[i:])
	}
	return barrier * current / overlap
}

func dot(a, b []float64) float64 {
	sum := 0.0
	b = b[:len(a)]
	for i, x := range a {
		sum += x * b[i]
	}
	return sum
}

// integrals fills the mean, its slope and J1 to J3 from the swept zone:
//
//	eps = int_0^1 E0 dq,  deps/ds = int_0^1 <sin^2> dq,  J_r = -int_0^1 E0 cos(pi q r) dq
//	<sin^2> = 1/2 - (1/2) sum_l c_l c_{l+1}
func (w *Workspace) integrals(b *Bands) {
	z := &w.zone
	for i, weight := range z.weight {
		b.Mean += weight * z.rise[i]
		c := z.row(i)
		b.MeanSlope += weight * (0.5 - 0.5*dot(c[:len(c)-1], c[1:]))
		sin, cos := math.Sincos(math.Pi * z.q[i])
		re, im := 1.0, 0.0
		for r := range b.Tunnelling {
			re, im = re*cos-im*sin, re*sin+im*cos
			b.Tunnelling[r] -= weight * z.rise[i] * re
		}
	}
	b.Mean += b.Edges[0][0]
}
