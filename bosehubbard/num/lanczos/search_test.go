package lanczos

import (
	"context"
	"errors"
	"math"
	"slices"
	"strings"
	"sync/atomic"
	"testing"
	"time"
)

// A start vector that has no part in the ends closes its own Krylov space; the
// second, random one finds them.
func TestDeficientStart(t *testing.T) {
	values := slices.Concat([]float64{-4}, spaced(200, -1, 1), []float64{3})
	for name, occupied := range map[string][]int{
		"eigenvector inside":    {100},
		"three of the inside":   {1, 100, 200},
		"the lowest itself":     {0},
		"the lowest and inside": {0, 7, 9},
		"both ends":             {0, 201},
	} {
		opt := Options{Tolerance: 1e-10, MaxIterations: 500, Seed: 1, Vectors: true}
		r := newRecurrence(context.Background(), &product{apply: diagonal(values), scratch: make([]float64, len(values))}, 1, [2][]float64{})
		s := newSearch(r, opt)
		s.begin = func(seed, stream uint64) error {
			if stream > 0 {
				return r.random(seed, stream)
			}
			return r.start(func(dst []float64, offset int) {
				clear(dst)
				for i, at := range occupied {
					dst[at-offset] = 1 + float64(i)
				}
			})
		}
		if err := errors.Join(s.run(), s.rebuild()); err != nil {
			t.Errorf("%s: %v", name, err)
			continue
		}
		got, err := s.result()
		if err != nil {
			t.Errorf("%s: %v", name, err)
		}
		checkEnds(t, name, got, values, opt.Tolerance)
	}
}

// Long after an end has converged, its ghosts change neither value nor residual.
func TestGhostsDoNotDisturb(t *testing.T) {
	values := slices.Concat(spaced(3000, -1, 1), []float64{100})
	got, err := Extremes(context.Background(), len(values), diagonal(values), Options{Vectors: true, Tolerance: 1e-12})
	if err != nil {
		t.Fatal(err)
	}
	if got.Iterations < 100 {
		t.Errorf("%d iterations, want so many that the end at 100 has ghosts", got.Iterations)
	}
	checkEnds(t, "ghosts", got, values, 1e-12)
}

func TestNotConverged(t *testing.T) {
	values := spaced(5000, 0, 1)
	got, err := Extremes(context.Background(), len(values), diagonal(values), Options{MaxIterations: 20, Vectors: true})
	var short *NotConvergedError
	if !errors.As(err, &short) {
		t.Fatalf("20 iterations: %v, want a *NotConvergedError", err)
	}
	if short.Iterations != 20 || got.Iterations != 20 || short.Residual != max(got.LowestResidual, got.HighestResidual) {
		t.Errorf("%+v with result of %d iterations, residuals %g and %g", *short, got.Iterations, got.LowestResidual, got.HighestResidual)
	}
	if !(got.Lowest > 0 && got.Lowest < 0.05 && got.Highest < 1 && got.Highest > 0.95) || len(got.LowestVector) != 5000 {
		t.Errorf("last iterate %g to %g with %d components, want it near 0 to 1", got.Lowest, got.Highest, len(got.LowestVector))
	}
}

func TestExtremesRefuses(t *testing.T) {
	one := diagonal([]float64{1, 2})
	for _, tc := range []struct {
		opt  Options
		want string
	}{
		{Options{Tolerance: -1}, "tolerance -1"},
		{Options{Tolerance: math.NaN()}, "tolerance NaN"},
		{Options{Tolerance: 1e-15}, "tolerance 1e-15"},
		{Options{Tolerance: 1}, "tolerance 1"},
		{Options{MaxIterations: -3}, "-3 iterations"},
	} {
		if _, err := Extremes(context.Background(), 2, one, tc.opt); err == nil || !strings.Contains(err.Error(), tc.want) {
			t.Errorf("options %+v: %v, want %q", tc.opt, err, tc.want)
		}
	}
	for _, bad := range []float64{math.NaN(), math.Inf(1), math.MaxFloat64} {
		_, err := Extremes(context.Background(), 3, diagonal([]float64{1, bad, -bad}), Options{})
		if !errors.Is(err, ErrNotFinite) {
			t.Errorf("matrix with %g: %v, want ErrNotFinite", bad, err)
		}
	}
	defer func() {
		if recover() == nil {
			t.Error("size 0: no panic")
		}
	}()
	_, _ = Extremes(context.Background(), 0, one, Options{})
}

// ctx is seen in the product, before the first step, and inside vector sums.
func TestStop(t *testing.T) {
	ctx, cancel := context.WithCancel(context.Background())
	calls := 0
	apply := func(dst, x []float64) {
		if calls++; calls == 5 {
			cancel()
			return // with dst undone
		}
		copy(dst, x)
		dst[0] *= 2
		dst[1] *= 3
		for i := 2; i < len(dst); i++ {
			dst[i] *= float64(i)
		}
	}
	if _, err := Extremes(ctx, 1000, apply, Options{}); !errors.Is(err, context.Canceled) || calls != 5 {
		t.Errorf("stopped in product 5: %v after %d products", err, calls)
	}
	if _, err := Extremes(ctx, 1000, apply, Options{}); !errors.Is(err, context.Canceled) || calls != 5 {
		t.Errorf("stopped before: %v after %d products", err, calls)
	}
}

// A stop takes under 50 ms. The best of three, since the machine may be busy.
func TestStopIsQuick(t *testing.T) {
	const n = 3_000_000
	values := spaced(n, -1, 1)
	best := time.Hour
	for range 3 {
		ctx, cancel := context.WithCancel(context.Background())
		var stopped atomic.Int64
		timer := time.AfterFunc(150*time.Millisecond, func() { stopped.Store(time.Now().UnixNano()); cancel() })
		_, err := Extremes(ctx, n, diagonal(values), Options{Tolerance: 1e-13, MaxIterations: 100_000})
		best = min(best, time.Duration(time.Now().UnixNano()-stopped.Load()))
		timer.Stop()
		if !errors.Is(err, context.Canceled) {
			t.Fatalf("got %v, want context.Canceled", err)
		}
	}
	if best > 50*time.Millisecond {
		t.Errorf("a stop took %v, want under 50 ms", best)
	}
}

func TestProgressGrowsToItsTotal(t *testing.T) {
	for _, vectors := range []bool{false, true} {
		for name, values := range spectra() {
			last, sum := -1, 0
			_, err := Extremes(context.Background(), len(values), diagonal(values), Options{Vectors: vectors, Progress: func(done, total int) {
				if done < last || done > total || total != sum && sum != 0 {
					t.Errorf("%s: progress %d of %d after %d of %d", name, done, total, last, sum)
				}
				last, sum = done, total
			}})
			if err != nil || last != sum {
				t.Errorf("%s, vectors %v: %v, last progress %d of %d", name, vectors, err, last, sum)
			}
		}
	}
}
