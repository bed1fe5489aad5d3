package fock

import (
	"context"
	"errors"
	"fmt"
	"math"
	"math/rand/v2"
	"slices"
	"sync"
	"testing"
	"time"

	"hilltop/bosehubbard"
)

// chainModel is an open chain at the ceiling's parameters.
func chainTerms(t testing.TB, sites int) *Terms {
	return boxTerms(t, []int{sites}, []bool{false}, bosehubbard.Model{Axes: []bosehubbard.AxisTerms{axis(1, -0.05, 0)}, Interaction: -2.1})
}

// shared are systems with many tasks and every kind of link and block.
func shared(t testing.TB) map[string]*Operator {
	plane := bosehubbard.Model{Axes: []bosehubbard.AxisTerms{axis(1, 0.1, 0), axis(-0.6, 0.2, 0)}, Interaction: 2}
	return map[string]*Operator{
		"chain":               mustOperator(t, chainTerms(t, 10), 10, Options{}),
		"even, even atoms":    mustOperator(t, chainTerms(t, 10), 10, Options{Parity: 1}),
		"odd, odd atoms":      mustOperator(t, chainTerms(t, 10), 9, Options{Parity: -1}),
		"odd chain, odd":      mustOperator(t, chainTerms(t, 9), 9, Options{Parity: -1}),
		"box":                 mustOperator(t, boxTerms(t, []int{3, 3}, []bool{false, true}, plane), 9, Options{Parity: 1}),
		"one block":           mustOperator(t, chainTerms(t, 2), 5000, Options{}),
		"limited occupation":  mustOperator(t, chainTerms(t, 10), 10, Options{MaxOccupation: 4}),
		"even and at most 40": mustOperator(t, chainTerms(t, 4), 60, Options{MaxOccupation: 40, Parity: 1}),
	}
}

// Every number of workers, and vectors one by one or together, give the same bits
// of vectors and sums.
func TestSameBits(t *testing.T) {
	for name, h := range shared(t) {
		const k = 5
		x, start := make([][]float64, k), make([][]float64, k)
		for i := range k {
			x[i], start[i] = make([]float64, h.Len()), make([]float64, h.Len())
			h.RandomTo(x[i], 1, uint64(i))
			h.RandomTo(start[i], 2, uint64(i))
		}
		run := func(workers, from, to int) (dst [][]float64, xy, xx []float64) {
			p := Product{A: 0.3, B: -0.7, C: 0.9, X: x[from:to], XY: make([]float64, to-from), XX: make([]float64, to-from)}
			for i := from; i < to; i++ {
				p.Dst = append(p.Dst, slices.Clone(start[i]))
			}
			if err := h.Combine(context.Background(), p, h.NewWorkspace(workers)); err != nil {
				t.Fatal(err)
			}
			return p.Dst, p.XY, p.XX
		}
		dst, xy, xx := run(1, 0, k)
		for _, workers := range []int{1, 2, 3, 8} {
			for i := range k {
				one, oneXY, oneXX := run(workers, i, i+1)
				if !slices.Equal(one[0], dst[i]) || oneXY[0] != xy[i] || oneXX[0] != xx[i] {
					t.Errorf("%s: vector %d alone with %d workers has other bits", name, i, workers)
				}
			}
			all, allXY, allXX := run(workers, 0, k)
			for i := range k {
				if !slices.Equal(all[i], dst[i]) || allXY[i] != xy[i] || allXX[i] != xx[i] {
					t.Errorf("%s: vector %d with %d workers has other bits", name, i, workers)
				}
			}
		}
	}
}

// A H x + B x + C y and both sums, against the parts.
func TestCombine(t *testing.T) {
	random := rand.New(rand.NewPCG(15, 0))
	for name, h := range shared(t) {
		w := h.NewWorkspace(2)
		x, y, hx := make([]float64, h.Len()), make([]float64, h.Len()), make([]float64, h.Len())
		h.RandomTo(x, 1, 1)
		h.RandomTo(y, 1, 2)
		h.ApplyTo(hx, x, w)
		for range 4 {
			p := Product{A: random.NormFloat64(), B: random.NormFloat64(), C: random.NormFloat64(), XY: make([]float64, 1), XX: make([]float64, 1)}
			got, want := slices.Clone(y), make([]float64, h.Len())
			for i := range want {
				want[i] = p.A*hx[i] + p.B*x[i] + p.C*y[i]
			}
			p.X, p.Dst = [][]float64{x}, [][]float64{got}
			if err := h.Combine(context.Background(), p, w); err != nil {
				t.Fatal(err)
			}
			checkClose(t, name, got, want)
			size := 1e-13 * math.Sqrt(dot(x, x)*dot(want, want))
			if math.Abs(p.XY[0]-dot(x, want)) > size || math.Abs(p.XX[0]-dot(x, x)) > 1e-13*dot(x, x) {
				t.Errorf("%s: sums %.17g, %.17g, want %.17g, %.17g", name, p.XY[0], p.XX[0], dot(x, want), dot(x, x))
			}
		}
	}
}

// With C = 0 nothing is read from Dst.
func TestCombineOverwrites(t *testing.T) {
	for name, h := range shared(t) {
		w := h.NewWorkspace(1)
		x, clean, dirty := make([]float64, h.Len()), make([]float64, h.Len()), make([]float64, h.Len())
		h.RandomTo(x, 1, 1)
		for i := range dirty {
			dirty[i] = math.NaN()
		}
		h.ApplyTo(clean, x, w)
		h.ApplyTo(dirty, x, w)
		if !slices.Equal(clean, dirty) {
			t.Errorf("%s: what stood in dst changed the product", name)
		}
	}
}

// Several goroutines may share an operator.
func TestOperatorIsShared(t *testing.T) {
	h := mustOperator(t, chainTerms(t, 9), 9, Options{Parity: 1})
	x, want := make([]float64, h.Len()), make([]float64, h.Len())
	h.RandomTo(x, 1, 1)
	h.ApplyTo(want, x, h.NewWorkspace(1))
	var all sync.WaitGroup
	for range 4 {
		all.Go(func() {
			w, y := h.NewWorkspace(2), make([]float64, h.Len())
			for range 5 {
				h.ApplyTo(y, x, w)
			}
			if !slices.Equal(y, want) {
				t.Error("another product beside others")
			}
		})
	}
	all.Wait()
}

func TestCombineAllocatesNothing(t *testing.T) {
	h := mustOperator(t, chainTerms(t, 8), 8, Options{Parity: 1})
	w := h.NewWorkspace(1)
	p := Product{Dst: [][]float64{make([]float64, h.Len())}, X: [][]float64{make([]float64, h.Len())}, A: 1, XY: make([]float64, 1)}
	ctx := context.Background()
	if n := testing.AllocsPerRun(20, func() { _ = h.Combine(ctx, p, w) }); n > 3 {
		t.Errorf("Combine allocates %g times, want at most 3 closures", n)
	}
}

// A stop takes under 50 ms, on the best of three since the machine may be busy.
func TestCombineStops(t *testing.T) {
	h := mustOperator(t, chainTerms(t, 11), 11, Options{})
	p := Product{Dst: [][]float64{make([]float64, h.Len())}, X: [][]float64{make([]float64, h.Len())}, A: 1}
	best := time.Hour
	for range 3 {
		ctx, cancel := context.WithTimeout(context.Background(), 20*time.Millisecond)
		begin := time.Now()
		w := h.NewWorkspace(2)
		var err error
		for err == nil {
			err = h.Combine(ctx, p, w)
		}
		best = min(best, time.Since(begin)-20*time.Millisecond)
		cancel()
		if !errors.Is(err, context.DeadlineExceeded) {
			t.Fatalf("stopped: %v", err)
		}
	}
	if best > 50*time.Millisecond {
		t.Errorf("a stop took %v, want under 50 ms", best)
	}
}

func TestCombinePanicsOnMisuse(t *testing.T) {
	h := mustOperator(t, chainTerms(t, 3), 2, Options{})
	w, other := h.NewWorkspace(1), mustOperator(t, chainTerms(t, 3), 2, Options{}).NewWorkspace(1)
	six, five := make([]float64, 6), make([]float64, 5)
	one := func(dst, x []float64) Product { return Product{Dst: [][]float64{dst}, X: [][]float64{x}, A: 1} }
	for name, misuse := range map[string]func(){
		"short dst":       func() { h.ApplyTo(five, six, w) },
		"short x":         func() { h.ApplyTo(six, five, w) },
		"other workspace": func() { h.ApplyTo(six, six, other) },
		"two into one": func() {
			p := one(six, six)
			p.X = append(p.X, six)
			_ = h.Combine(context.Background(), p, w)
		},
		"short sums": func() {
			p := one(six, six)
			p.XY = []float64{}
			_ = h.Combine(context.Background(), p, w)
		},
		"short state":      func() { h.Rank([]int{2, 0}) },
		"too few atoms":    func() { h.Rank([]int{1, 0, 0}) },
		"too many atoms":   func() { h.Rank([]int{1, 1, 1}) },
		"negative":         func() { h.Rank([]int{3, -1, 0}) },
		"short dst state":  func() { h.State(make([]int, 2), 0) },
		"rank -1":          func() { h.State(make([]int, 3), -1) },
		"rank D":           func() { h.State(make([]int, 3), 6) },
		"few occupations":  func() { _ = h.Occupations(context.Background(), six[:2], six[:3], six, w) },
		"few correlations": func() { _ = h.Correlations(context.Background(), six[:5], six, six, w) },
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

// E z z^T is the projector on the sector: over many vectors the mean of (u z)^2 is
// |P u|^2. The variance of one term is 2 |P u|^4, so that 2,000 of them leave 3 %,
// and five times that is allowed.
func TestRandomTo(t *testing.T) {
	for name, h := range map[string]*Operator{
		"whole": mustOperator(t, chainTerms(t, 4), 3, Options{}),
		"even":  mustOperator(t, chainTerms(t, 4), 4, Options{Parity: 1}),
		"odd":   mustOperator(t, chainTerms(t, 4), 4, Options{Parity: -1}),
	} {
		random := rand.New(rand.NewPCG(16, 0))
		u := randomVector(random, h.Len())
		projected := slices.Clone(u)
		h.Project(projected)
		const many = 2000
		z, sum := make([]float64, h.Len()), 0.0
		for i := range many {
			h.RandomTo(z, 5, uint64(i))
			sum += dot(u, z) * dot(u, z)
		}
		want := dot(projected, projected)
		if got := sum / many; math.Abs(got-want) > 0.16*want {
			t.Errorf("%s: mean of (u z)^2 is %g, want %g", name, got, want)
		}
	}
	long := mustOperator(t, chainTerms(t, 10), 9, Options{})
	a, b, c := make([]float64, long.Len()), make([]float64, long.Len()), make([]float64, long.Len())
	long.RandomTo(a, 1, 1)
	long.RandomTo(b, 1, 1)
	long.RandomTo(c, 1, 2)
	if !slices.Equal(a, b) || slices.Equal(a, c) || a[0] == a[randomLength] {
		t.Error("random vectors do not follow from the seed and the stream")
	}
}

func ExampleOperator_Combine() {
	t := &Terms{Sites: 2, Hops: []Hop{{From: 0, To: 1, Amplitude: -1}}, Interaction: 4}
	h, err := NewOperatorOf(context.Background(), t, 2, Options{})
	if err != nil {
		fmt.Println(err)
		return
	}
	x, y := make([]float64, h.Len()), make([]float64, h.Len())
	x[h.Rank([]int{1, 1})] = 1
	h.ApplyTo(y, x, h.NewWorkspace(1))
	for rank, amplitude := range y {
		state := make([]int, 2)
		h.State(state, rank)
		fmt.Printf("%v %.4f\n", state, amplitude)
	}
	// Output:
	// [2 0] -1.4142
	// [1 1] 0.0000
	// [0 2] -1.4142
}
