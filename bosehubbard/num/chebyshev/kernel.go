package chebyshev

import (
	"fmt"
	"math"
)

// JacksonTo writes the damping factors of the Jackson kernel of N moments to dst,
// of length N,
//
//	g_n = ((N-n+1) cos(n q) + sin(n q) cot q)/(N+1),   q = pi/(N+1)
//
// with g_0 = 1. Of all kernels that keep a density positive it broadens least.
// Cost O(N); no allocation.
//
// Source: Weisse et al., Rev. Mod. Phys. 78, 275 (2006), section II.C; equation
// from memory, its width checked by the tests.
func JacksonTo(dst []float64) {
	n := float64(len(dst))
	q := math.Pi / (n + 1)
	for i := range dst {
		k := float64(i)
		sin, cos := math.Sincos(k * q)
		dst[i] = ((n-k+1)*cos + sin/math.Tan(q)) / (n + 1)
	}
}

// JacksonWidth returns the standard deviation that the Jackson kernel of n
// moments gives a single level at x,
//
//	sigma^2 = (n - x^2 (n-1)) (1 - cos(2 pi/(n+1)))/(2 (n+1))
//
// exactly; it tends to pi/n sqrt(1-x^2) inside and to pi/n^(3/2) at the ends.
// It panics if n < 1 or x is not in [-1, 1].
//
// Source: derived from g_1 and g_2.
func JacksonWidth(n int, x float64) float64 {
	if n < 1 || !(x >= -1 && x <= 1) {
		panic(fmt.Sprintf("chebyshev: width of %d moments at %g, want at least 1, and -1 to 1", n, x))
	}
	m := float64(n)
	s := math.Sin(math.Pi / (m + 1))
	return s * math.Sqrt((m-x*x*(m-1))/(m+1))
}
