package chebyshev

import (
	"math"
	"math/rand/v2"
	"testing"
)

// The half circle 2/pi sqrt(1-x^2) = 1 T_0 - 1/2 T_2 has three moments.
func TestHalfCircle(t *testing.T) {
	d := Density{1, 0, -0.5}
	for _, x := range []float64{-0.999, -0.5, 0, 0.3, 0.95} {
		p := d.At(x)
		root := math.Sqrt(1 - x*x)
		want := Point{Value: 2 / math.Pi * root, Slope: -2 / math.Pi * x / root, Below: 0.5 + (x*root+math.Asin(x))/math.Pi}
		for what, pair := range map[string][2]float64{"value": {p.Value, want.Value}, "slope": {p.Slope, want.Slope}, "below": {p.Below, want.Below}} {
			// the value at x = -0.999 is the difference of numbers 1/root = 22 times larger
			if math.Abs(pair[0]-pair[1]) > 1e-14*(1+math.Abs(pair[1]))/(root*root) {
				t.Errorf("x = %g: %s %.16g, want %.16g", x, what, pair[0], pair[1])
			}
		}
	}
}

// Random moments: the slope and the integral belong to the value.
func TestDensityDerivatives(t *testing.T) {
	random := rand.New(rand.NewPCG(3, 0))
	d := make(Density, 40)
	for i := range d {
		d[i] = random.NormFloat64()
	}
	for _, x := range []float64{-0.9, -0.33, 0.02, 0.7} {
		const h = 1e-5 // truncation h^2 n^3 ~ 1e-5 of the slope, rounding 1e-11 of the value
		low, here, high := d.At(x-h), d.At(x), d.At(x+h)
		if slope := (high.Value - low.Value) / (2 * h); math.Abs(slope-here.Slope) > 1e-5*(math.Abs(slope)+1600) {
			t.Errorf("x = %g: slope %.12g, by difference %.12g", x, here.Slope, slope)
		}
		if value := (high.Below - low.Below) / (2 * h); math.Abs(value-here.Value) > 1e-7*(math.Abs(value)+40) {
			t.Errorf("x = %g: value %.12g, by difference of the integral %.12g", x, here.Value, value)
		}
	}
	if all := d.At(math.Nextafter(1, 0)).Below; math.Abs(all-d[0]) > 1e-6 { // 1 - 1e-16 is acos = 1.5e-8
		t.Errorf("integral %.12g, want mu_0 = %.12g", all, d[0])
	}
}

func TestMomentsOf(t *testing.T) {
	dst := make([]float64, 5)
	MomentsOf(dst, 0.3, 2)
	x := 0.3
	for n, want := range []float64{1, x, 2*x*x - 1, 4*x*x*x - 3*x, 8*x*x*x*x - 8*x*x + 1} {
		if math.Abs(dst[n]-2*want) > 1e-15 {
			t.Errorf("2 T_%d(0.3) = %.17g, want %.17g", n, dst[n], 2*want)
		}
	}
}

func TestDensityAllocatesNothing(t *testing.T) {
	d := jackson(64, 0.2)
	g := make([]float64, 64)
	if n := testing.AllocsPerRun(50, func() { d.At(0.1); MomentsOf(d, 0.1, 1); JacksonTo(g) }); n != 0 {
		t.Errorf("At, MomentsOf and JacksonTo allocate %g times, want 0", n)
	}
}

func BenchmarkDensityAt(b *testing.B) {
	d := jackson(256, 0.2)
	b.ReportAllocs()
	for b.Loop() {
		d.At(0.1)
	}
}
