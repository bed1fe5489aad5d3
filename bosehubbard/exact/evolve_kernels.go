package exact

import "math"

// addMultiple sets dst += factor x for a factor that is real or imaginary.
func addMultiple(dst, x vector, factor complex128) {
	re, im := real(factor), imag(factor)
	switch {
	case re != 0:
		addScaled(dst.Re, x.Re, re)
		addScaled(dst.Im, x.Im, re)
	case im != 0:
		addScaled(dst.Re, x.Im, -im)
		addScaled(dst.Im, x.Re, im)
	}
}

// addTimes sets dst += factor d x, component by component, for a factor that is
// real or imaginary; d nil is 0.
func addTimes(dst, x vector, d []float64, factor complex128) {
	re, im := real(factor), imag(factor)
	switch {
	case d == nil:
	case re != 0:
		addProducts(dst.Re, d, x.Re, re)
		addProducts(dst.Im, d, x.Im, re)
	case im != 0:
		addProducts(dst.Re, d, x.Im, -im)
		addProducts(dst.Im, d, x.Re, im)
	}
}

// addSquare is addTimes with d^2 in place of d.
func addSquare(dst, x vector, d []float64, factor complex128) {
	im := imag(factor)
	for i, v := range d {
		v *= v * im
		dst.Re[i] -= v * x.Im[i]
		dst.Im[i] += v * x.Re[i]
	}
}

func addScaled(dst, x []float64, factor float64) {
	x = x[:len(dst)]
	for i := range dst {
		dst[i] += factor * x[i]
	}
}

func addProducts(dst, d, x []float64, factor float64) {
	d, x = d[:len(dst)], x[:len(dst)]
	for i := range dst {
		dst[i] += factor * d[i] * x[i]
	}
}

// squared returns |v|^2.
func squared(v vector) float64 {
	even, odd := 0.0, 0.0
	for i, re := range v.Re {
		even += re * re
		odd += v.Im[i] * v.Im[i]
	}
	return even + odd
}

func norm(v vector) float64 { return math.Sqrt(squared(v)) }
