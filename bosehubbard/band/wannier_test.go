package band

import (
	"math"
	"testing"
)

// onGrid returns w(xi) at (i + 1/2) pi/points over the sites -reach..reach. The
// trapezoid rule on such a grid is exact for products of Wannier functions up to
// the tails beyond it.
func onGrid(t *testing.T, w *Workspace, depth float64, reach, points int) []float64 {
	t.Helper()
	n := (2*reach + 1) * points
	xi, dst := make([]float64, n), make([]float64, n)
	for i := range xi {
		xi[i] = (float64(i-n/2) + 0.5) * math.Pi / float64(points)
	}
	if err := w.Wannier(dst, xi, depth); err != nil {
		t.Fatal(err)
	}
	return dst
}

// TestWannierIsOrthonormal: the norm, the overlap with the next three sites and
// the fourth moment that Solve gives.
func TestWannierIsOrthonormal(t *testing.T) {
	const points = 48
	w := NewWorkspace()
	for _, depth := range []float64{1, 2, 5, 6.1, 22, 60, 200} {
		f := onGrid(t, w, depth, 28, points)
		step := math.Pi / points
		for shift := range 4 {
			sum := 0.0
			for i := shift * points; i < len(f); i++ {
				sum += f[i] * f[i-shift*points] * step
			}
			want := 0.0
			if shift == 0 {
				want = 1
			}
			checkNear(t, "overlap", depth, sum, want, 1e-9)
		}
		fourth := 0.0
		for _, x := range f {
			fourth += x * x * x * x * step
		}
		checkNear(t, "fourth moment", depth, fourth, solve(t, w, depth).WannierFourthMoment, 1e-11)
	}
}

// TestWannierTunnelling: J1 = -<w_0|H|w_1> by differences on a fine grid; an
// independent way to J that uses phases and signs of the function.
func TestWannierTunnelling(t *testing.T) {
	const points = 64
	w := NewWorkspace()
	for _, depth := range []float64{2, 6.1, 15} {
		f := onGrid(t, w, depth, 20, points)
		step := math.Pi / points
		at := func(i int) float64 {
			if i < 0 || i >= len(f) {
				return 0
			}
			return f[i]
		}
		sum := 0.0
		for i := range f {
			// sixth-order second difference: error step^6/560 of the eighth derivative
			second := (2*(at(i-3)+at(i+3)) - 27*(at(i-2)+at(i+2)) + 270*(at(i-1)+at(i+1)) - 490*f[i]) / (180 * step * step)
			xi := (float64(i-len(f)/2) + 0.5) * step
			sin := math.Sin(xi)
			sum -= at(i-points) * (depth*sin*sin*f[i] - second) * step
		}
		checkNear(t, "-<0|H|1>", depth, sum, solve(t, w, depth).Tunnelling[0], 1e-6)
	}
}

func TestWannierShape(t *testing.T) {
	w := NewWorkspace()
	xi := []float64{0, 0.4, -0.4, 1.3, -1.3, math.Pi, -math.Pi, 5, -5, MaxReach, -MaxReach}
	got := make([]float64, len(xi))
	for _, depth := range []float64{0, 1e-12, 1e-6, 0.3, 1, 9, 100, MaxDepth} {
		if err := w.Wannier(got, xi, depth); err != nil {
			t.Fatal(err)
		}
		for i := 1; i < len(xi); i += 2 {
			checkNear(t, "w(xi) = w(-xi)", depth, got[i], got[i+1], 1e-13)
			if math.Abs(got[i]) >= got[0] {
				t.Errorf("depth %g: |w(%g)| = %g, want below w(0) = %g", depth, xi[i], got[i], got[0])
			}
		}
	}
	// free particle, and a lattice too weak to differ from it by more than its depth
	for _, depth := range []float64{0, 1e-7} {
		if err := w.Wannier(got, xi, depth); err != nil {
			t.Fatal(err)
		}
		checkNear(t, "w(0)", depth, got[0], 1/math.Sqrt(math.Pi), 1e-6)
		for i := 1; i < len(xi); i++ {
			checkNear(t, "free w", depth, got[i], math.Sin(xi[i])/(math.Sqrt(math.Pi)*xi[i]), 1e-6)
		}
	}
	// harmonic site: (sqrt(s)/pi)^(1/4) exp(-sqrt(s) xi^2/2), to 1/(16 sqrt(s)) or so
	if err := w.Wannier(got, xi, 400); err != nil {
		t.Fatal(err)
	}
	checkNear(t, "harmonic w(0)", 400, got[0], math.Pow(20/math.Pi, 0.25), 0.01)
}

func TestWannierRefuses(t *testing.T) {
	w := NewWorkspace()
	for _, x := range []float64{math.NaN(), math.Inf(1), MaxReach * 1.01, -MaxReach * 1.01} {
		if err := w.Wannier(make([]float64, 1), []float64{x}, 5); err == nil {
			t.Errorf("xi = %g: no error", x)
		}
	}
	defer func() {
		if recover() == nil {
			t.Error("no panic for different lengths")
		}
	}()
	_ = w.Wannier(make([]float64, 2), make([]float64, 3), 5)
}
