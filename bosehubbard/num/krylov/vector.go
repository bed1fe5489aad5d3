package krylov

import "context"

// Vector is a complex vector as its real and its imaginary part, slices of one
// length.
type Vector struct{ Re, Im []float64 }

// NewVector returns the zero vector of length n.
func NewVector(n int) Vector {
	both := make([]float64, 2*n)
	return Vector{Re: both[:n:n], Im: both[n:]}
}

// Len returns the number of complex components.
func (v Vector) Len() int { return len(v.Re) }

// CopyFrom sets v = x. It panics if the lengths differ.
func (v Vector) CopyFrom(x Vector) {
	if v.Len() != x.Len() {
		panic("krylov: copy between vectors of different lengths")
	}
	copy(v.Re, x.Re)
	copy(v.Im, x.Im)
}

// Product sets dst = H x for a real symmetric H, both parts, and returns
//
//	x.Hx = Re x . H Re x + Im x . H Im x
//
// dst and x do not overlap. A product that takes long looks at ctx and returns its
// error; dst may then be left undone. The same x must always give the same bits.
type Product func(ctx context.Context, dst, x Vector) (float64, error)

// sumSquares returns x.x in four partial sums.
func sumSquares(x []float64) float64 {
	var a, b, c, d float64
	for ; len(x) >= 4; x = x[4:] {
		a += x[0] * x[0]
		b += x[1] * x[1]
		c += x[2] * x[2]
		d += x[3] * x[3]
	}
	for _, v := range x {
		a += v * v
	}
	return (a + b) + (c + d)
}

// dot returns x.y in four partial sums.
func dot(x, y []float64) float64 {
	var a, b, c, d float64
	for len(x) >= 4 && len(y) >= 4 {
		a += x[0] * y[0]
		b += x[1] * y[1]
		c += x[2] * y[2]
		d += x[3] * y[3]
		x, y = x[4:], y[4:]
	}
	for i := range min(len(x), len(y)) {
		a += x[i] * y[i]
	}
	return (a + b) + (c + d)
}

// recur sets w = a w + b v + c u and returns w.w of the result, the three-term
// recurrence in one pass. The slices have one length.
func recur(w, v, u []float64, a, b, c float64) float64 {
	v, u = v[:len(w)], u[:len(w)]
	var even, odd float64
	i := 0
	for ; i+1 < len(w); i += 2 {
		first := a*w[i] + b*v[i] + c*u[i]
		second := a*w[i+1] + b*v[i+1] + c*u[i+1]
		w[i], w[i+1] = first, second
		even += first * first
		odd += second * second
	}
	for ; i < len(w); i++ {
		w[i] = a*w[i] + b*v[i] + c*u[i]
		even += w[i] * w[i]
	}
	return even + odd
}

// axpy sets y += a x.
func axpy(y, x []float64, a float64) {
	x = x[:len(y)]
	for i, v := range x {
		y[i] += a * v
	}
}

// rotate adds the complex multiples (cr + i ci) of two vectors to (re, im):
// c0 v0 + c1 v1. Two at a time halve the traffic with re and im.
func rotate(re, im []float64, v0, v1 Vector, c0, c1 complex128) {
	r0, i0, r1, i1 := v0.Re[:len(re)], v0.Im[:len(re)], v1.Re[:len(re)], v1.Im[:len(re)]
	im = im[:len(re)]
	a0, b0, a1, b1 := real(c0), imag(c0), real(c1), imag(c1)
	for j := range re {
		x0, y0, x1, y1 := r0[j], i0[j], r1[j], i1[j]
		re[j] += (a0*x0 - b0*y0) + (a1*x1 - b1*y1)
		im[j] += (b0*x0 + a0*y0) + (b1*x1 + a1*y1)
	}
}

// stretch adds real multiples of two vectors: y += a0 x0 + a1 x1.
func stretch(y, x0, x1 []float64, a0, a1 float64) {
	x0, x1 = x0[:len(y)], x1[:len(y)]
	for j := range y {
		y[j] += a0*x0[j] + a1*x1[j]
	}
}
