package gutzwiller

import "math"

// circle writes cos and -sin of every angle in rad, to about 1e-16 for |angle| up to
// 1e6; beyond, it asks math.Sincos.
//
// Source: reduction and polynomials of fdlibm (Sun Microsystems, 1993), k_sin.c and
// k_cos.c; from memory, tested against math.Sincos.
func circle(re, im, angle *lane) {
	const (
		shift = 3 << 51 // adding it rounds to a whole number
		high  = 1.57079632673412561417e+00
		low   = 6.07710050650619224932e-11
	)
	for s, a := range angle {
		if !(math.Abs(a) <= 1e6) {
			sin, cos := math.Sincos(a)
			re[s], im[s] = cos, -sin
			continue
		}
		shifted := a*(2/math.Pi) + shift
		quarter := math.Float64bits(shifted)
		q := shifted - shift
		x := (a - q*high) - q*low
		z := x * x
		sin := x + x*z*(-1.66666666666666324348e-01+z*(8.33333333332248946124e-03+z*(-1.98412698298579493134e-04+
			z*(2.75573137070700676789e-06+z*(-2.50507602534068634195e-08+z*1.58969099521155010221e-10)))))
		cos := 1 - z/2 + z*z*(4.16666666666666019037e-02+z*(-1.38888888888741095749e-03+z*(2.48015872894767294178e-05+
			z*(-2.75573143513906633035e-07+z*(2.08757232129817482790e-09+z*-1.13596475577881948265e-11)))))
		// A quarter turn swaps the two; a half turn reverses both.
		swap := -(quarter & 1)
		c, d := math.Float64bits(cos), math.Float64bits(sin)
		mixed := (c ^ d) & swap
		c, d = c^mixed, d^mixed
		re[s] = math.Float64frombits(c ^ ((quarter+1)&2)<<62)
		im[s] = math.Float64frombits(d ^ (^quarter&2)<<62)
	}
}
