package band

import (
	"errors"
	"math"
	"math/rand/v2"
	"testing"
)

func solve(t *testing.T, w *Workspace, depth float64) Bands {
	t.Helper()
	b, err := w.Solve(depth)
	if err != nil {
		t.Fatal(err)
	}
	return b
}

func TestFreeBand(t *testing.T) {
	b := solve(t, NewWorkspace(), 0)
	pi2 := math.Pi * math.Pi
	want := Bands{
		Mean: 1.0 / 3, MeanSlope: 0.5, Width: 1,
		Tunnelling:          [3]float64{2 / pi2, -1 / (2 * pi2), 2 / (9 * pi2)},
		Edges:               [3][2]float64{{0, 1}, {4, 1}, {4, 9}},
		WannierFourthMoment: 2 / (3 * math.Pi),
	}
	for r := range b.Tunnelling {
		checkNear(t, "tunnelling", 0, b.Tunnelling[r], want.Tunnelling[r], 1e-16)
	}
	b.Tunnelling = want.Tunnelling
	if b != want {
		t.Errorf("got %+v\nwant %+v", b, want)
	}
}

// TestShallowLimit: the solution joins the free band. Corrections to energies
// are of order s^2 ln s, to the slope s ln s, to the fourth moment s.
func TestShallowLimit(t *testing.T) {
	w := NewWorkspace()
	for _, depth := range []float64{1.0001 * almostFree, 1e-8, 1e-6, 1e-4, 1e-3} {
		got, free := solve(t, w, depth), freeBands(depth)
		second := depth*depth*(1+math.Log(1/depth)) + 4e-15
		checkNear(t, "mean", depth, got.Mean, free.Mean, second)
		checkNear(t, "mean slope", depth, got.MeanSlope, 0.5, depth*(1+math.Log(1/depth))+1e-14)
		checkNear(t, "width", depth, got.Width, free.Width, second)
		checkNear(t, "gap", depth, got.Gap, depth/2, second)
		checkNear(t, "fourth moment", depth, got.WannierFourthMoment, free.WannierFourthMoment, depth+4e-8)
		for r := range got.Tunnelling {
			checkNear(t, "tunnelling", depth, got.Tunnelling[r], free.Tunnelling[r], second)
		}
		for n := range got.Edges {
			for end := range got.Edges[n] {
				checkNear(t, "edge", depth, got.Edges[n][end], free.Edges[n][end], second)
			}
		}
	}
}

// TestSumRules: E0(q) = eps - 2 sum_r J_r cos(pi q r) at q = 0 and 1, where what
// follows J3 falls at least as fast as powers of 1.5 |J3/J2|; and Hellmann-Feynman
// against a central difference, off by h^2/6 of the third derivative.
func TestSumRules(t *testing.T) {
	w := NewWorkspace()
	for depth := 3.0; depth <= 400; depth *= 1.31 {
		b := solve(t, w, depth)
		j := b.Tunnelling
		power := 1.5 * math.Abs(j[2]/j[1])
		if depth > 60 {
			power = 1e-6 // J2 and J3 are below the rounding of J1
		}
		rest := 2*math.Abs(j[2])*power/(1-power) + 1e-14
		checkNear(t, "4(J1+J3) = width", depth, 4*(j[0]+j[2]), b.Width, rest)
		checkNear(t, "bottom", depth, b.Mean-2*(j[0]+j[1]+j[2]), b.Edges[0][0], rest)
		checkNear(t, "top", depth, b.Mean-2*(-j[0]+j[1]-j[2]), b.Edges[0][1], rest)
		h := 1e-3 * depth
		slope := (solve(t, w, depth+h).Mean - solve(t, w, depth-h).Mean) / (2 * h)
		checkNear(t, "mean slope", depth, b.MeanSlope, slope, 1e-7)
	}
}

// TestZwerger: J = (4/sqrt(pi)) s^(3/4) exp(-2 sqrt s) overestimates, by the
// factors of a plane-wave calculation (three decimals) and by 1 + 0.55/sqrt(s) at
// most in a deep lattice. Zwerger, J. Opt. B 5, S9 (2003), from memory.
func TestZwerger(t *testing.T) {
	w := NewWorkspace()
	ratio := func(b Bands) float64 {
		s := b.Depth
		return 4 / math.Sqrt(math.Pi) * math.Pow(s, 0.75) * math.Exp(-2*math.Sqrt(s)) / b.Tunnelling[0]
	}
	for depth, want := range map[float64]float64{
		1: 1.714, 3: 1.450, 5: 1.311, 8: 1.218, 10: 1.185, 15: 1.141, 20: 1.118, 22: 1.111,
	} {
		checkNear(t, "Zwerger's ratio", depth, ratio(solve(t, w, depth)), want, 1e-3)
	}
	for depth := 20.0; depth <= MaxDepth; depth *= 1.2 {
		b, most := solve(t, w, depth), 1+0.55/math.Sqrt(depth)
		if r := ratio(b); !(r > 1 && r < most) {
			t.Errorf("Zwerger's ratio at %g Er: got %g, want within (1, %g)", depth, r, most)
		}
	}
}

// TestHarmonicLimit: with p = 2n+1 and h = sqrt(s)/2 band n lies at
//
//	2ph - (p^2+1)/8 - (p^3+3p)/2^7 h - (5p^4+34p^2+9)/2^12 h^2 - (33p^5+410p^3+405p)/2^17 h^3
//
// above s/2 - 2h^2 = 0 (DLMF 28.8.1), to the next order and the width of the
// band; w^4 is below that of the Gaussian by 0.3/sqrt(s) at most.
func TestHarmonicLimit(t *testing.T) {
	w := NewWorkspace()
	for depth := 20.0; depth <= MaxDepth; depth *= 1.2 {
		b := solve(t, w, depth)
		h := math.Sqrt(depth) / 2
		for n, edges := range b.Edges {
			p := float64(2*n + 1)
			p2 := p * p
			last := p * (33*p2*p2 + 410*p2 + 405) / (1 << 17 * h * h * h)
			want := 2*p*h - (p2+1)/8 - p*(p2+3)/(1<<7*h) - (5*p2*p2+34*p2+9)/(1<<12*h*h) - last
			for _, e := range edges {
				checkNear(t, "edge", depth, e, want, last*2*p/h+math.Abs(edges[1]-edges[0])+1e-12)
			}
		}
		least := 1 - 0.3/math.Sqrt(depth)
		if r := b.WannierFourthMoment / math.Sqrt(h/math.Pi); !(r < 1 && r > least) {
			t.Errorf("fourth moment over harmonic at %g Er: got %g, want within (%g, 1)", depth, r, least)
		}
	}
}

// TestMonotony: a deeper lattice has a narrower band, less tunnelling of every
// range, a wider gap, higher and flatter energies and narrower Wannier functions.
func TestMonotony(t *testing.T) {
	rng := rand.New(rand.NewPCG(3, 5))
	w := NewWorkspace()
	for range 400 {
		low := MaxDepth * math.Pow(rng.Float64(), 4)
		high := low + (MaxDepth-low)*math.Pow(rng.Float64(), 4)
		if high < low*(1+1e-5)+1e-6 {
			continue
		}
		a, b := solve(t, w, low), solve(t, w, high)
		rounding := 4 * 0x1p-52 * high
		for what, ok := range map[string]bool{
			"tunnelling falls":     a.Tunnelling[0] > b.Tunnelling[0] && b.Tunnelling[0] > 0,
			"width falls":          a.Width > b.Width && b.Width > 0,
			"gap rises":            a.Gap < b.Gap,
			"mean rises":           a.Mean < b.Mean,
			"slope falls":          a.MeanSlope > b.MeanSlope && b.MeanSlope > 0,
			"fourth moment rises":  a.WannierFourthMoment < b.WannierFourthMoment+5e-8,
			"edges in order":       b.Edges[0][0] <= b.Edges[0][1] && b.Edges[0][1] < b.Edges[1][1] && b.Edges[1][1] <= b.Edges[1][0]+rounding && b.Edges[1][0] < b.Edges[2][0],
			"next tunnelling less": math.Abs(b.Tunnelling[1]) < b.Tunnelling[0]/3,
		} {
			if !ok {
				t.Errorf("%s fails between %g and %g Er:\n%+v\n%+v", what, low, high, a, b)
			}
		}
	}
}

func TestBadDepths(t *testing.T) {
	w := NewWorkspace()
	for _, depth := range []float64{-1, -1e-300, math.NaN(), math.Inf(1), math.Inf(-1), MaxDepth * 1.0001} {
		if b, err := w.Solve(depth); !errors.Is(err, ErrDepth) || b != (Bands{}) {
			t.Errorf("Solve(%g) = %+v, %v, want ErrDepth", depth, b, err)
		}
		if err := w.Energies(make([]float64, 2), depth, 0); !errors.Is(err, ErrDepth) {
			t.Errorf("Energies at %g Er: %v, want ErrDepth", depth, err)
		}
		if err := w.Wannier(make([]float64, 1), make([]float64, 1), depth); !errors.Is(err, ErrDepth) {
			t.Errorf("Wannier at %g Er: %v, want ErrDepth", depth, err)
		}
		if c, err := NewMeanCurve(depth); !errors.Is(err, ErrDepth) || c != nil {
			t.Errorf("NewMeanCurve(%g): %v, want ErrDepth", depth, err)
		}
	}
}

// TestEveryDepthIsFinite walks through all magnitudes, the smallest included.
func TestEveryDepthIsFinite(t *testing.T) {
	w := NewWorkspace()
	depths := []float64{5e-324, 1e-300, MaxDepth}
	for d := 1e-14; d < MaxDepth; d *= 1.23 {
		depths = append(depths, d)
	}
	for _, depth := range depths {
		b := solve(t, w, depth)
		for _, x := range []float64{
			b.Mean, b.MeanSlope, b.Tunnelling[0], b.Tunnelling[1], b.Tunnelling[2], b.Width, b.Gap, b.WannierFourthMoment,
		} {
			if math.IsNaN(x) || math.IsInf(x, 0) {
				t.Errorf("not finite at %g Er: %+v", depth, b)
			}
		}
	}
}

// TestSolveKeepsAnswers: the same depth gives the same bits, from the store or
// anew, before and after others have passed through.
func TestSolveKeepsAnswers(t *testing.T) {
	w := NewWorkspace()
	first := solve(t, w, 7)
	for i := range 30 {
		solve(t, w, float64(i))
		if got := solve(t, w, 7); got != first {
			t.Fatalf("after %d depths got %+v, want %+v", i+1, got, first)
		}
	}
}

func TestSolveAllocatesNothing(t *testing.T) {
	w := NewWorkspace()
	dst, xi := make([]float64, MaxBands), []float64{0, 1, 2, 3, 4, 5, 6, 7}
	depth := 0.0
	if n := testing.AllocsPerRun(50, func() {
		depth += 0.37
		if _, err := w.Solve(depth); err != nil {
			t.Fatal(err)
		}
		if err := w.Energies(dst, depth, 0.3); err != nil {
			t.Fatal(err)
		}
		if err := w.Wannier(dst, xi, depth); err != nil {
			t.Fatal(err)
		}
	}); n != 0 {
		t.Errorf("%g allocations per run, want 0", n)
	}
}
