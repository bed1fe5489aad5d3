package band

import (
	"math"
	"testing"
)

// TestMeanCurveError takes three places in every piece of the table, the middle,
// where a cubic Hermite piece is worst, among them.
func TestMeanCurveError(t *testing.T) {
	for _, top := range []float64{0.001, 0.7, 30, MaxDepth} {
		c, err := NewMeanCurve(top)
		if err != nil {
			t.Fatal(err)
		}
		w := NewWorkspace()
		for i := range c.value[1:] {
			for _, u := range []float64{0.02, 0.5, 0.8} {
				x := (float64(i) + u) * c.step
				want := w.solveMean(x * x)
				checkNear(t, "mean", x*x, c.At(x*x), want.Mean, 1e-7)
				tol := 1e-6
				if x < 1 {
					tol = 4e-4
				}
				checkNear(t, "slope", x*x, c.Slope(x*x), want.MeanSlope, tol)
			}
		}
	}
}

// TestMeanCurveIsOneFunction: pieces join, and Slope is the derivative of At.
func TestMeanCurveIsOneFunction(t *testing.T) {
	c, err := NewMeanCurve(25)
	if err != nil {
		t.Fatal(err)
	}
	for s := 0.01; s < 24; s += 0.317 {
		const h = 1e-4
		checkNear(t, "slope", s, c.Slope(s), (c.At(s+h)-c.At(s-h))/(2*h), 1e-6)
	}
	for i := 1; i+1 < len(c.value); i++ {
		x := float64(i) * c.step
		s := x * x
		checkNear(t, "mean across a joint", s, c.At(s*(1+1e-12)), c.At(s*(1-1e-12)), 1e-10)
		checkNear(t, "slope across a joint", s, c.Slope(s*(1+1e-12)), c.Slope(s*(1-1e-12)), 1e-9)
	}
}

func TestMeanCurveEnds(t *testing.T) {
	w := NewWorkspace()
	for _, top := range []float64{0, 1e-12, 22} {
		c, err := NewMeanCurve(top)
		if err != nil {
			t.Fatal(err)
		}
		end := solve(t, w, top)
		for _, s := range []float64{top, top + 1, math.Inf(1)} {
			checkNear(t, "mean", s, c.At(s), end.Mean, 1e-14)
			checkNear(t, "slope", s, c.Slope(s), end.MeanSlope, 1e-9)
		}
		for _, s := range []float64{0, -1, math.Inf(-1), math.NaN()} {
			checkNear(t, "mean", s, c.At(s), 1.0/3, 0)
			checkNear(t, "slope", s, c.Slope(s), 0.5, 0)
		}
	}
}

func TestMeanCurveAllocatesNothing(t *testing.T) {
	c, err := NewMeanCurve(30)
	if err != nil {
		t.Fatal(err)
	}
	if n := testing.AllocsPerRun(100, func() { c.At(c.Slope(3.3)) }); n != 0 {
		t.Errorf("%g allocations per run, want 0", n)
	}
}
