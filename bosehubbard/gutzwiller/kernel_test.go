package gutzwiller

import (
	"fmt"
	"math"
	"math/rand/v2"
	"testing"
)

// blockOf draws the inputs of the kernels, with NaN around what they may touch.
type blockOf struct {
	g, k, base, dst []float64
	terms           [][]float64
	c, left         []float64
	psiRe, psiIm    lane
	factors         []factor
}

func newBlock(levels int) *blockOf {
	random := rand.New(rand.NewPCG(uint64(levels), 1))
	draw := func(n int) []float64 {
		v := make([]float64, n+2)
		for i := range v {
			v[i] = random.NormFloat64()
		}
		v[0], v[n+1] = math.NaN(), math.NaN()
		return v[1 : n+1]
	}
	size := 2 * width * levels
	b := &blockOf{g: draw(size), k: draw(size), base: draw(size), dst: draw(size), c: draw(9), left: draw(levels)}
	for range 9 {
		b.terms = append(b.terms, draw(size))
	}
	copy(b.psiRe[:], draw(width))
	copy(b.psiIm[:], draw(width))
	for n := range levels - 1 {
		b.factors = append(b.factors, factor{math.Sqrt(float64(n + 1)), random.NormFloat64()})
	}
	return b
}

// framed says whether the numbers just outside a slice of blockOf are still NaN.
func framed(v []float64) bool {
	whole := v[:len(v)+1]
	return math.IsNaN(whole[len(v)]) && !math.IsNaN(v[0])
}

// The kernels for four sites give the bits of the plain ones and touch nothing else.
// With GOAMD64=v3 the compiler fuses products and sums of the plain ones: then the
// last bits differ, each sum of up to 10 terms of size 4 by some 1e-15.
func TestVectorKernels(t *testing.T) {
	if !vectors {
		t.Skip("this machine runs the plain kernels only")
	}
	same := func(what string, got, want []float64) {
		t.Helper()
		if !framed(got) || !framed(want) {
			t.Errorf("%s: wrote outside of its slice", what)
		}
		for i := range want {
			if !(math.Abs(got[i]-want[i]) <= 2e-14) {
				t.Errorf("%s: entry %d is %g, want %g", what, i, got[i], want[i])
				return
			}
		}
	}
	for _, levels := range []int{1, 2, 3, 6, 9} {
		a, b := newBlock(levels), newBlock(levels)
		rateAVX2(a.k, a.g, &a.psiRe, &a.psiIm, a.factors, a.left)
		ratePlain(b.k, b.g, &b.psiRe, &b.psiIm, b.factors, b.left)
		same(fmt.Sprintf("rate of %d levels", levels), a.k, b.k)
		var are, aim, bre, bim lane
		fieldAVX2(&are, &aim, a.g, a.factors)
		fieldPlain(&bre, &bim, b.g, b.factors)
		for s := range width {
			near(t, "real part of the field", are[s], bre[s], 2e-14)
			near(t, "imaginary part of the field", aim[s], bim[s], 2e-14)
		}
		for n := range 10 {
			combineAVX2(a.dst, a.base, a.c[:n], a.terms[:n])
			copy(b.dst, b.base)
			combinePlain(b.dst, b.dst, b.c[:n], b.terms[:n])
			same(fmt.Sprintf("sum of %d terms", n), a.dst, b.dst)
		}
	}
}

// The plain kernels against the sums of their definitions in complex numbers.
func TestPlainKernels(t *testing.T) {
	const levels = 5
	b := newBlock(levels)
	ratePlain(b.k, b.g, &b.psiRe, &b.psiIm, b.factors, b.left)
	var re, im lane
	fieldPlain(&re, &im, b.g, b.factors)
	at := func(v []float64, n, s int) complex128 { return complex(v[2*n*width+s], v[(2*n+1)*width+s]) }
	conj := func(z complex128) complex128 { return complex(real(z), -imag(z)) }
	for s := range width {
		psi, phi := complex(b.psiRe[s], b.psiIm[s]), complex(0, 0)
		for n := range levels {
			want := -complex(b.left[n], 0) * at(b.g, n, s)
			if n > 0 {
				e := conj(psi) * complex(b.factors[n-1].re, b.factors[n-1].im)
				want += conj(e) * at(b.g, n-1, s)
			}
			if n < levels-1 {
				c := complex(b.factors[n].re, b.factors[n].im)
				want += conj(psi) * c * at(b.g, n+1, s)
				phi += c * conj(at(b.g, n, s)) * at(b.g, n+1, s)
			}
			want *= 1i
			got := at(b.k, n, s)
			near(t, "real part of the rate", real(got), real(want), 1e-13)
			near(t, "imaginary part of the rate", imag(got), imag(want), 1e-13)
		}
		near(t, "real part of the field", re[s], real(phi), 1e-13)
		near(t, "imaginary part of the field", im[s], imag(phi), 1e-13)
	}
}

func BenchmarkKernels(b *testing.B) {
	for _, levels := range []int{6, 12} {
		in := newBlock(levels)
		kernels := []struct {
			name string
			run  func()
		}{
			{"rate", func() { rate(in.k, in.g, &in.psiRe, &in.psiIm, in.factors, in.left) }},
			{"field", func() { field(&in.psiRe, &in.psiIm, in.g, in.factors) }},
			{"combine", func() { combine(in.dst, in.base, in.c[:5], in.terms) }},
			{"circle", func() { circle(&in.psiRe, &in.psiIm, (*lane)(in.g)) }},
			{"ratePlain", func() { ratePlain(in.k, in.g, &in.psiRe, &in.psiIm, in.factors, in.left) }},
			{"fieldPlain", func() { fieldPlain(&in.psiRe, &in.psiIm, in.g, in.factors) }},
			{"combinePlain", func() { combinePlain(in.dst, in.base, in.c[:5], in.terms) }},
		}
		for _, k := range kernels {
			b.Run(fmt.Sprintf("%s/levels=%d", k.name, levels), func(b *testing.B) {
				b.ReportAllocs()
				for b.Loop() {
					k.run()
				}
				b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N)/width, "ns/site")
			})
		}
	}
}
