package gutzwiller

import (
	"math"
	"math/rand/v2"
	"testing"
)

// The angles of a step are a few rad; far ones go through the same reduction.
func TestCircle(t *testing.T) {
	random := rand.New(rand.NewPCG(1, 2))
	for _, size := range []float64{0, 1e-300, 1e-3, 1, 10, 1e3, 9e5, 1e7, 1e15} {
		var angle, re, im lane
		for s := range angle {
			angle[s] = size * (2*random.Float64() - 1)
		}
		angle[0], angle[1], angle[2], angle[3] = 0, math.Pi/4, -math.Pi/2, math.Copysign(0, -1)
		circle(&re, &im, &angle)
		for s, a := range angle {
			sin, cos := math.Sincos(a)
			// Both round twice; the reduction leaves 2^-53 of a quarter turn and
			// |angle| 2^-87 of what high and low together miss of pi/2.
			if tol := 4e-16 + 1e-26*math.Abs(a); math.Abs(re[s]-cos) > tol || math.Abs(im[s]+sin) > tol {
				t.Errorf("angle %g: got %g, %g, want %g, %g", a, re[s], im[s], cos, -sin)
			}
		}
	}
	angle, re, im := lane{math.NaN(), math.Inf(1)}, lane{}, lane{}
	if circle(&re, &im, &angle); !math.IsNaN(re[0]) || !math.IsNaN(im[1]) {
		t.Errorf("NaN and Inf give %g, %g, want NaN", re[0], im[1])
	}
}
