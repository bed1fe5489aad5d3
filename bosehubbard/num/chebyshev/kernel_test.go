package chebyshev

import (
	"math"
	"testing"
)

// jackson returns the damped moments of one level at x.
func jackson(n int, x float64) Density {
	d, g := make(Density, n), make([]float64, n)
	MomentsOf(d, x, 1)
	JacksonTo(g)
	for i := range d {
		d[i] *= g[i]
	}
	return d
}

// The kernel is 1 at n = 0, falls, and is small at the end.
func TestJacksonShape(t *testing.T) {
	for _, n := range []int{1, 2, 7, 64, 257} {
		g := make([]float64, n)
		JacksonTo(g)
		if math.Abs(g[0]-1) > 1e-13 {
			t.Errorf("%d moments: g_0 = %.17g, want 1", n, g[0])
		}
		for i := 1; i < n; i++ {
			if !(g[i] < g[i-1] && g[i] > 0) {
				t.Errorf("%d moments: g_%d = %g after %g, want it falling and positive", n, i, g[i], g[i-1])
			}
		}
	}
}

// A broadened level has the stated width, its mean at g_1 x, and is nowhere
// negative. Integrals over x by the midpoint rule in t, exact for polynomials.
func TestJacksonWidth(t *testing.T) {
	for _, n := range []int{8, 33, 128} {
		for _, x := range []float64{-1, -0.9, -0.2, 0, 0.5, 0.99} {
			d := jackson(n, x)
			const steps = 1000
			sum, mean, square := 0.0, 0.0, 0.0
			for i := range steps {
				theta := math.Pi * (float64(i) + 0.5) / steps
				y := math.Cos(theta)
				value := d.At(y).Value
				if value < -1e-13*float64(n) {
					t.Errorf("n = %d, level at %g: density %g at %g, want it positive", n, x, value, y)
				}
				w := value * math.Sin(theta) * math.Pi / steps
				sum += w
				mean += w * y
				square += w * y * y
			}
			width := math.Sqrt(square - mean*mean)
			// sums of order 1 good to 1e-12 are subtracted
			if want := JacksonWidth(n, x); math.Abs(sum-1) > 1e-12 || math.Abs(width-want) > 1e-12/want {
				t.Errorf("n = %d, level at %g: integral %.15g, width %.12g, want 1 and %.12g", n, x, sum, width, want)
			}
		}
	}
	if limit := math.Pi / 4096; math.Abs(JacksonWidth(4096, 0)/limit-1) > 1e-3 {
		t.Errorf("width of 4096 moments %g, want about %g", JacksonWidth(4096, 0), limit)
	}
}

func TestKernelPanicsOnMisuse(t *testing.T) {
	for name, misuse := range map[string]func(){
		"no moments":   func() { JacksonWidth(0, 0) },
		"x beyond 1":   func() { JacksonWidth(8, 1.5) },
		"x NaN":        func() { JacksonWidth(8, math.NaN()) },
		"density at 1": func() { Density{1, 0}.At(1) },
		"no density":   func() { Density{}.At(0) },
	} {
		func() {
			defer func() {
				if recover() == nil {
					t.Errorf("%s: no panic", name)
				}
			}()
			misuse()
		}()
	}
}
