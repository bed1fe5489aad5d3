package lanczos

import (
	"context"
	"fmt"
	"math"
	"math/rand/v2"
	"slices"
	"testing"

	"gonum.org/v1/gonum/floats"
	"gonum.org/v1/gonum/mat"
)

// diagonal returns the product with a diagonal matrix. Lanczos sees nothing but
// the eigenvalues and the random start, so this is as general as any matrix.
func diagonal(values []float64) func(dst, x []float64) {
	return func(dst, x []float64) {
		for i, v := range values {
			dst[i] = v * x[i]
		}
	}
}

// spaced returns n values evenly from low to high.
func spaced(n int, low, high float64) []float64 {
	return floats.Span(make([]float64, n), low, high)
}

// spectra are matrices by their eigenvalues, with what is hard about each.
func spectra() map[string][]float64 {
	graded := make([]float64, 60)
	for i := range graded {
		graded[i] = math.Pow(10, -float64(i)/5)
	}
	return map[string][]float64{
		"one value":              {-3.5},
		"one zero":               {0},
		"two values":             {-1, 2},
		"two equal":              {7, 7},
		"three, two equal":       {1, 1, 5},
		"identity":               slices.Repeat([]float64{1}, 300),
		"zero matrix":            make([]float64, 500),
		"evenly spaced":          spaced(400, -3, 11),
		"few distinct":           slices.Repeat([]float64{-2, -1, 0, 4}, 100),
		"degenerate ends":        slices.Concat(slices.Repeat([]float64{-5}, 7), spaced(300, -4, 4), slices.Repeat([]float64{5}, 9)),
		"near-degenerate end":    slices.Concat([]float64{-5, -5 + 1e-9}, spaced(300, -4, 4)),
		"one end far out":        slices.Concat(spaced(1000, -1, 1), []float64{1000}),
		"both ends far out":      slices.Concat([]float64{-1000}, spaced(1000, -1, 1), []float64{1000}),
		"graded":                 graded,
		"negative only":          spaced(100, -9, -2),
		"large offset":           spaced(50, 1e6, 1e6+1),
		"tiny":                   floatsScaled(1e-200, spaced(100, -3, 11)),
		"huge":                   floatsScaled(1e200, spaced(100, -3, 11)),
		"largest":                {1e300, -1e300, 1},
		"smallest":               {1e-300, 2e-300, 5e-300},
		"hundred, far and close": slices.Concat(spaced(98, 0, 1), []float64{1.0001, 50}),
	}
}

func floatsScaled(factor float64, x []float64) []float64 {
	floats.Scale(factor, x)
	return x
}

// The ends of every spectrum, and the residual as a bound on the error.
func TestExtremesOfKnownSpectra(t *testing.T) {
	for name, values := range spectra() {
		for seed := range uint64(5) {
			for _, vectors := range []bool{false, true} {
				got, err := Extremes(context.Background(), len(values), diagonal(values), Options{Seed: seed, Vectors: vectors})
				if err != nil {
					t.Errorf("%s, seed %d: %v", name, seed, err)
					continue
				}
				checkEnds(t, fmt.Sprintf("%s, seed %d", name, seed), got, values, 1e-10)
			}
		}
	}
}

// checkEnds compares with the known eigenvalues. The residuals are within the
// tolerance and a few roundings of the norm; the errors are within the residuals.
func checkEnds(t *testing.T, name string, got Result, values []float64, tolerance float64) {
	t.Helper()
	norm := max(math.Abs(slices.Min(values)), math.Abs(slices.Max(values)))
	rounding := 1e-13 * norm
	for _, e := range []struct {
		name                string
		got, want, residual float64
		vector              []float64
	}{
		{"lowest", got.Lowest, slices.Min(values), got.LowestResidual, got.LowestVector},
		{"highest", got.Highest, slices.Max(values), got.HighestResidual, got.HighestVector},
	} {
		if diff := math.Abs(e.got - e.want); !(diff <= e.residual+rounding) {
			t.Errorf("%s: %s %.17g, want %.17g, difference %.2g beyond residual %.2g", name, e.name, e.got, e.want, diff, e.residual)
		}
		if !(e.residual >= 0 && e.residual <= tolerance*norm+rounding) {
			t.Errorf("%s: %s residual %g, want at most %g", name, e.name, e.residual, tolerance*norm)
		}
		if e.vector != nil {
			checkVector(t, name+", "+e.name, e.vector, values, e.got, e.residual, rounding)
		}
	}
}

// checkVector measures the norm and the residual of a vector again.
func checkVector(t *testing.T, name string, x, values []float64, value, residual, rounding float64) {
	t.Helper()
	if norm := floats.Norm(x, 2); math.Abs(norm-1) > 1e-14 {
		t.Errorf("%s: vector of norm %.17g, want 1", name, norm)
	}
	r := make([]float64, len(x))
	for i := range r {
		r[i] = (values[i] - value) * x[i]
	}
	if got := floats.Norm(r, 2); math.Abs(got-residual) > rounding {
		t.Errorf("%s: |Ax - value x| = %g, reported %g", name, got, residual)
	}
}

// Small random matrices against dense diagonalisation, whose error is some
// roundings of the norm.
func TestExtremesAgainstDense(t *testing.T) {
	random := rand.New(rand.NewPCG(3, 0))
	for n := 1; n <= 40; n++ {
		a := mat.NewSymDense(n, nil)
		for i := range n {
			for j := i; j < n; j++ {
				a.SetSym(i, j, random.NormFloat64())
			}
		}
		apply := func(dst, x []float64) {
			mat.NewVecDense(n, dst).MulVec(a, mat.NewVecDense(n, x))
		}
		var eig mat.EigenSym
		if !eig.Factorize(a, false) {
			t.Fatal("dense diagonalisation failed")
		}
		want := eig.Values(nil)
		for _, tolerance := range []float64{1e-6, 1e-10, 1e-13} {
			got, err := Extremes(context.Background(), n, apply, Options{Tolerance: tolerance})
			if err != nil {
				t.Errorf("n = %d, tolerance %g: %v", n, tolerance, err)
			}
			checkEnds(t, fmt.Sprintf("n = %d, tolerance %g", n, tolerance), got, want, tolerance)
		}
	}
}

// The open chain of n sites has the eigenvalues 2 cos(pi k/(n+1)).
func TestExtremesOfTheChain(t *testing.T) {
	const n = 100
	apply := func(dst, x []float64) {
		for i := range dst {
			dst[i] = 0
			if i > 0 {
				dst[i] += x[i-1]
			}
			if i < n-1 {
				dst[i] += x[i+1]
			}
		}
	}
	got, err := Extremes(context.Background(), n, apply, Options{Vectors: true})
	if err != nil {
		t.Fatal(err)
	}
	want := 2 * math.Cos(math.Pi/(n+1))
	if math.Abs(got.Lowest+want) > 1e-13 || math.Abs(got.Highest-want) > 1e-13 {
		t.Errorf("ends %.16g and %.16g, want -+%.16g", got.Lowest, got.Highest, want)
	}
	// Components sqrt(2/(n+1)) sin(pi i/(n+1)); the error is residual over gap, 2e-10/3e-3.
	for i, x := range got.HighestVector {
		exact := math.Sqrt(2.0/(n+1)) * math.Sin(math.Pi*float64(i+1)/(n+1))
		if math.Abs(math.Abs(x)-exact) > 1e-7 {
			t.Errorf("component %d of the highest vector: %g, want +-%g", i, x, exact)
		}
	}
}

// Before it converges, the residual already bounds the distance to an eigenvalue.
func TestResidualBoundsEarlyIterates(t *testing.T) {
	values := slices.Concat(spaced(200, -1, 1), []float64{-1.5, 2})
	for iterations := 1; iterations <= 40; iterations++ {
		got, _ := Extremes(context.Background(), len(values), diagonal(values), Options{MaxIterations: iterations})
		for _, e := range [][2]float64{{got.Lowest, got.LowestResidual}, {got.Highest, got.HighestResidual}} {
			nearest := math.Inf(1)
			for _, v := range values {
				nearest = min(nearest, math.Abs(v-e[0]))
			}
			if !(nearest <= e[1]+1e-14) {
				t.Errorf("%d iterations: %.15g is %g from an eigenvalue, residual %g", iterations, e[0], nearest, e[1])
			}
		}
	}
}

// The same seed gives the same bits, another seed the same ends.
func TestExtremesAreDeterministic(t *testing.T) {
	values := spaced(70_000, -1, 1) // three blocks
	values[17], values[40_000] = -1.2, 1.3
	run := func(seed uint64) Result {
		got, err := Extremes(context.Background(), len(values), diagonal(values), Options{Seed: seed, Vectors: true})
		if err != nil {
			t.Fatal(err)
		}
		return got
	}
	first, again, other := run(5), run(5), run(6)
	if first.Lowest != again.Lowest || first.HighestResidual != again.HighestResidual ||
		!slices.Equal(first.LowestVector, again.LowestVector) || !slices.Equal(first.HighestVector, again.HighestVector) {
		t.Error("the same seed gave another result")
	}
	if first.Seed != 5 || other.Seed != 6 || slices.Equal(first.LowestVector, other.LowestVector) {
		t.Errorf("seeds %d and %d, want 5 and 6 with different vectors", first.Seed, other.Seed)
	}
	if math.Abs(first.Lowest+1.2) > 1e-13 || math.Abs(other.Highest-1.3) > 1e-13 {
		t.Errorf("ends %.16g and %.16g, want -1.2 and 1.3", first.Lowest, other.Highest)
	}
}

// One end alone takes fewer steps where the other converges more slowly.
func TestOneEnd(t *testing.T) {
	values := slices.Concat(spaced(2000, -1, 1), []float64{5})
	both, err := Extremes(context.Background(), len(values), diagonal(values), Options{Vectors: true})
	if err != nil {
		t.Fatal(err)
	}
	for _, ends := range []Ends{OnlyLowest, OnlyHighest} {
		got, err := Extremes(context.Background(), len(values), diagonal(values), Options{Ends: ends, Vectors: true})
		if err != nil {
			t.Errorf("ends %d: %v", ends, err)
		}
		if ends == OnlyHighest {
			if got.Iterations >= both.Iterations/2 || math.Abs(got.Highest-5) > 1e-9 || got.LowestVector != nil || len(got.HighestVector) != len(values) {
				t.Errorf("highest alone: %.15g after %d steps, both took %d", got.Highest, got.Iterations, both.Iterations)
			}
			checkVector(t, "highest alone", got.HighestVector, values, got.Highest, got.HighestResidual, 1e-12)
		} else if math.Abs(got.Lowest+1) > 1e-9 || got.HighestVector != nil {
			t.Errorf("lowest alone: %.15g", got.Lowest)
		}
	}
}

// Vectors to work in that are handed over are used and change nothing, nor does
// the number of workers.
func TestScratchAndWorkers(t *testing.T) {
	values := spaced(100_000, -1, 1)
	values[17], values[40_000] = -1.2, 1.3
	n := len(values)
	want, err := Extremes(context.Background(), n, diagonal(values), Options{Vectors: true, Workers: 1})
	if err != nil {
		t.Fatal(err)
	}
	dirty := func() []float64 {
		x := make([]float64, n)
		for i := range x {
			x[i] = math.NaN()
		}
		return x
	}
	for _, workers := range []int{1, 2, 3, 8} {
		got, err := Extremes(context.Background(), n, diagonal(values), Options{Vectors: true, Workers: workers, Scratch: [2][]float64{dirty(), dirty()}})
		if err != nil || got.Lowest != want.Lowest || got.HighestResidual != want.HighestResidual ||
			!slices.Equal(got.LowestVector, want.LowestVector) || !slices.Equal(got.HighestVector, want.HighestVector) {
			t.Errorf("%d workers: %v, %.17g to %.17g, want %.17g to %.17g in all bits", workers, err, got.Lowest, got.Highest, want.Lowest, want.Highest)
		}
	}
}
