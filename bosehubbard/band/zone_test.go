package band

import (
	"math"
	"testing"
)

// TestZoneIntegratesTheBranchPoint uses functions with the singularity of the
// band, at 1 + i s/8, and exact integrals from 0 to 1.
func TestZoneIntegratesTheBranchPoint(t *testing.T) {
	r := newRules()
	z := newZone()
	for depth := 1e-6; depth <= MaxDepth; depth *= 1.7 {
		z.place(r.at(depth), depth)
		a := depth / 8
		one, pole, root := 0.0, 0.0, 0.0
		last := 0.0
		for i, q := range z.q {
			if !(q > last && q < 1) {
				t.Fatalf("depth %g: point %d is %g after %g, want ascending within (0, 1)", depth, i, q, last)
			}
			last = q
			p := 1 - q
			one += z.weight[i]
			pole += z.weight[i] * a / (p*p + a*a)
			root += z.weight[i] * math.Sqrt(p*p+a*a)
		}
		// Points and weights are rounded at 1e-16; the pole magnifies that by up to
		// 1/a where q is near 1, over a stretch of length a.
		checkNear(t, "int 1", depth, one, 1, 1e-14)
		checkNear(t, "int a/(p^2+a^2)", depth, pole, math.Atan(1/a), 1e-10)
		want := (math.Sqrt(1+a*a) + a*a*math.Asinh(1/a)) / 2
		checkNear(t, "int sqrt(p^2+a^2)", depth, root, want, 1e-13*(1+a))
	}
}

// TestGradedRuleCarriesWaves: exp(iq xi) up to MaxReach, at every shallow depth.
func TestGradedRuleCarriesWaves(t *testing.T) {
	r := newRules()
	z := newZone()
	for _, depth := range []float64{1e-9, 1e-5, 1e-3, 0.1, 1, 10, 100} {
		z.place(&r.graded, depth)
		for xi := 0.7; xi < MaxReach; xi *= 1.3 {
			sum := 0.0
			for i, q := range z.q {
				sum += z.weight[i] * math.Cos(q*xi)
			}
			checkNear(t, "int cos(q xi)", depth, sum, math.Sin(xi)/xi, 1e-10)
		}
	}
}
