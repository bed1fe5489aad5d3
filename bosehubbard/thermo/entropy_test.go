package thermo

import (
	"context"
	"errors"
	"math"
	"runtime"
	"slices"
	"strings"
	"testing"
	"time"

	"hilltop/bosehubbard"
	"hilltop/bosehubbard/fock"
	"hilltop/bosehubbard/num/chebyshev"
)

func mustEntropy(t testing.TB, s System, opt Options) *Curve {
	t.Helper()
	c, err := Entropy(context.Background(), s, opt)
	if err != nil {
		t.Fatal(err)
	}
	return c
}

// exactCurve is the kernel-broadened exact density of known levels.
func exactCurve(t testing.TB, k known, like *Curve) *Curve {
	t.Helper()
	c := newCurve(traceOf(k.levels, like.within, like.Moments), like.Floor, like.Ceiling)
	c.Unit = like.Unit
	c.fill(Options{Points: len(like.Energy), Volume: like.VolumeEntropy != nil})
	return c
}

// interior tells the bins that have a hundredth of the states or more on either
// side.
func interior(c *Curve) (first, last int) {
	below, width := 0.0, c.Energy[1]-c.Energy[0]
	first, last = -1, -1
	for i, w := range c.Density {
		below += w * width
		if first < 0 && below >= 0.01*float64(c.Dimension) {
			first = i
		}
		if last < 0 && below >= 0.99*float64(c.Dimension) {
			last = i
		}
	}
	return first, last
}

// coverage counts the interior bins whose error bar holds the exact value.
func coverage(got, want *Curve) (inside, bins int) {
	first, last := interior(got)
	for i := first; i <= last; i++ {
		bins++
		if math.Abs(got.Entropy[i]-want.Entropy[i]) <= got.EntropyError[i] {
			inside++
		}
	}
	return inside, bins
}

// On systems with known spectra the 95 % bars hold the kernel-broadened exact
// entropy in at least 90 % of the interior bins, but are not simply too wide; with
// the default settings they stay below 0.1.
func TestErrorBars(t *testing.T) {
	if testing.Short() {
		t.Skip("many runs")
	}
	inside, bins := 0, 0
	for _, k := range knownSystems(t) {
		opt := Options{Floor: k.levels[0], Ceiling: k.levels[len(k.levels)-1]}
		if len(k.levels) <= completeLimit {
			opt.Vectors = 64 // else there are no error bars
		}
		c := mustEntropy(t, k.system, opt)
		if c.Dimension != len(k.levels) {
			t.Fatalf("%s: dimension %d, want %d", k.name, c.Dimension, len(k.levels))
		}
		n, of := coverage(c, exactCurve(t, k, c))
		inside, bins = inside+n, bins+of
		if float64(n) < 0.9*float64(of) {
			t.Errorf("%s: bars cover %d of %d bins, want 90 %%", k.name, n, of)
		}
		first, last := interior(c)
		if widest := slices.Max(c.EntropyError[first : last+1]); opt.Vectors == 0 && widest > 0.1 {
			t.Errorf("%s: bar of %g in S, want at most 0.1", k.name, widest)
		}
	}
	if inside == bins {
		t.Errorf("bars cover all of %d bins: they are too wide", bins)
	}
}

// Over many seeds the coverage is that of a 95 % interval, and the standard errors,
// Student's factor taken out, shrink as the square root of the vectors.
func TestErrorBarsShrink(t *testing.T) {
	if testing.Short() {
		t.Skip("many runs")
	}
	k := knownSystems(t)[4]
	var width [3]float64
	counts := [3]int{8, 32, 128}
	for i, vectors := range counts {
		inside, bins := 0, 0
		const seeds = 30
		for seed := range uint64(seeds) {
			c := mustEntropy(t, k.system, Options{Vectors: vectors, Seed: seed, Floor: k.levels[0], Ceiling: k.levels[len(k.levels)-1]})
			n, of := coverage(c, exactCurve(t, k, c))
			inside, bins = inside+n, bins+of
			first, last := interior(c)
			for _, e := range c.EntropyError[first : last+1] {
				width[i] += e / halfWidth(vectors) / math.Sqrt(float64(vectors)) / float64(seeds*(last+1-first))
			}
		}
		// 30 runs of some 20 independent bins: 0.95 +- 0.01
		if share := float64(inside) / float64(bins); share < 0.92 || share > 0.98 {
			t.Errorf("%d vectors: bars cover %.3f of the bins, want 0.95", vectors, share)
		}
	}
	for i := 1; i < 3; i++ {
		// a standard deviation of 8 samples is low by 1/(4*7) on average
		ratio := width[i] / width[0]
		if want := math.Sqrt(8 / float64(counts[i])); ratio < 0.97*want || ratio > 1.1*want {
			t.Errorf("%d vectors: standard error %.3g of that of 8, want %.3g", counts[i], ratio, want)
		}
	}
}

// The ring of 6 atoms on 6 sites with U = 4 J: the density of states peaks at 12 to
// 13 J, far from the mean Tr H/D = U N (N-1)/(L+1) = 120/7 J. Source: exact
// diagonalisation outside this project.
func TestRingPeakAndMean(t *testing.T) {
	s := box(t, 6, 4, []bosehubbard.AxisTerms{{Tunnelling: 1}}, true, 6)
	c := mustEntropy(t, s, Options{})
	if c.Dimension != 462 || c.Vectors != 0 || math.Abs(c.Floor+5.6901934006) > 1e-9 || math.Abs(c.Ceiling-60.6013216850) > 1e-9 {
		t.Errorf("dimension %d, %d vectors, %.10f to %.10f", c.Dimension, c.Vectors, c.Floor, c.Ceiling)
	}
	if !(c.Peak > 12 && c.Peak < 13) || math.Abs(c.Mean-120./7) > 1e-12 {
		t.Errorf("peak at %g, mean %.12g, want 12 to 13 and %.12g", c.Peak, c.Mean, 120./7)
	}
	p, err := c.At(c.Peak)
	if err != nil || math.Abs(p.Beta) > 1e-9 {
		t.Errorf("beta at the peak is %g, %v, want 0", p.Beta, err)
	}
}

// sumRules checks that a curve is a density of states: it adds up to the dimension,
// S is the logarithm, beta its slope, and the volume entropy its integral.
func sumRules(t *testing.T, name string, c *Curve) {
	t.Helper()
	width := c.Energy[1] - c.Energy[0]
	states := 0.0
	for i, w := range c.Density {
		states += w * width
		if s := math.Log(w * c.Unit); math.Abs(s-c.Entropy[i]) > 1e-12 {
			t.Errorf("%s at %g: S = %.15g, want %.15g", name, c.Energy[i], c.Entropy[i], s)
		}
		if !(c.VolumeBeta[i] >= 0) || i > 0 && c.VolumeEntropy[i] < c.VolumeEntropy[i-1]-1e-12 {
			t.Errorf("%s at %g: volume entropy falls", name, c.Energy[i])
		}
	}
	// The half bins of broadened levels beyond both ends are missing.
	if math.Abs(states/float64(c.Dimension)-1) > 0.02 {
		t.Errorf("%s: density adds up to %g, want %d", name, states, c.Dimension)
	}
	if top := c.VolumeEntropy[len(c.Energy)-1]; math.Abs(top-math.Log(float64(c.Dimension))) > 0.02 {
		t.Errorf("%s: volume entropy at the ceiling %g, want ln %d", name, top, c.Dimension)
	}
	for _, share := range []float64{0.2, 0.4, 0.6, 0.8} {
		e := c.Floor + share*(c.Ceiling-c.Floor)
		h := 1e-4 * c.Resolution
		low, here, high := c.at(e-h), c.at(e), c.at(e+h)
		if slope := (high.Entropy - low.Entropy) / (2 * h); math.Abs(slope-here.Beta)*c.Resolution > 1e-5 {
			t.Errorf("%s at %g: dS/dE %g, beta %g", name, e, slope, here.Beta)
		}
		if slope := (high.VolumeEntropy - low.VolumeEntropy) / (2 * h); math.Abs(slope-here.VolumeBeta)*c.Resolution > 1e-5 {
			t.Errorf("%s at %g: slope of the volume entropy %g, beta %g", name, e, slope, here.VolumeBeta)
		}
	}
}

func TestCurveSumRules(t *testing.T) {
	line := []bosehubbard.AxisTerms{{Tunnelling: 1, Curvature: -0.05}}
	for name, s := range map[string]System{
		"levels":  box(t, 6, -2.1, line, false, 6),
		"all":     box(t, 7, -2.1, line, false, 7),
		"vectors": box(t, 8, -2.1, line, false, 8),
		"cut off": {Lattice: box(t, 8, -2.1, line, false, 8).Lattice, Model: box(t, 8, -2.1, line, false, 8).Model, Atoms: 8, MaxOccupation: 3},
	} {
		sumRules(t, name, mustEntropy(t, s, Options{Volume: true}))
	}
}

// The trace over all states has the bits of no random number and agrees with the
// levels of the full diagonalisation.
func TestCompleteTraceAgainstLevels(t *testing.T) {
	k := knownSystems(t)[4] // 792 states
	c := mustEntropy(t, k.system, Options{Floor: k.levels[0], Ceiling: k.levels[len(k.levels)-1]})
	want := exactCurve(t, k, c)
	for i, s := range c.Entropy {
		// rounding of the density is 1e-15 N D of the sum
		if tolerance := 1e-12 * float64(c.Dimension) / want.Density[i]; math.Abs(s-want.Entropy[i]) > tolerance || c.EntropyError[i] != 0 {
			t.Errorf("S(%g) = %.12g +- %g, want %.12g", c.Energy[i], s, c.EntropyError[i], want.Entropy[i])
		}
	}
}

// On a bipartite lattice the curve of (J, -U, -V) is that of (J, U, V) read from
// the other side; on a triangle it is not.
func TestCurveMirror(t *testing.T) {
	for name, tc := range map[string]struct {
		system System
		same   bool
	}{
		"chain":    {box(t, 5, 4, []bosehubbard.AxisTerms{{Tunnelling: 1, Curvature: 0.2, Tilt: 0.1}}, false, 5), true},
		"triangle": {box(t, 5, 4, []bosehubbard.AxisTerms{{Tunnelling: 1}}, true, 3), false},
	} {
		mirrored := tc.system
		mirrored.Model = tc.system.Model.Mirrored()
		a, b := mustEntropy(t, tc.system, Options{}), mustEntropy(t, mirrored, Options{})
		worst := 0.0
		for i := range a.Energy {
			worst = max(worst, math.Abs(a.Density[i]-b.Density[len(b.Density)-1-i])/a.Density[i])
		}
		if (worst < 1e-6) != tc.same {
			t.Errorf("%s: densities differ by %g of themselves", name, worst)
		}
	}
}

// The same bits for any number of workers and any memory that suffices.
func TestEntropyIsTheSameForAnyWorkers(t *testing.T) {
	s := box(t, 8, -2.1, []bosehubbard.AxisTerms{{Tunnelling: 1, Curvature: -0.05}}, false, 8)
	want := mustEntropy(t, s, Options{Workers: 1, Vectors: 10, Seed: 4})
	little := uint64(50_000) // bytes, as few as will do
	for {
		sp, err := s.halves(context.Background(), resources{lanes: 4, vectors: 2, memory: little})
		if err == nil {
			if sp.lanes() != 1 {
				t.Errorf("%d lanes in %d bytes, want 1", sp.lanes(), little)
			}
			break
		}
		little += 10_000
	}
	for _, opt := range []Options{{Workers: 2}, {Workers: 3}, {Workers: 8}, {Workers: 4, MemoryBytes: little}} {
		opt.Vectors, opt.Seed = 10, 4
		got := mustEntropy(t, s, opt)
		if !slices.Equal(got.Entropy, want.Entropy) || !slices.Equal(got.EntropyError, want.EntropyError) || !slices.Equal(got.Beta, want.Beta) {
			t.Errorf("%d workers, %d bytes: other numbers", opt.Workers, opt.MemoryBytes)
		}
	}
	if other := mustEntropy(t, s, Options{Workers: 1, Vectors: 10, Seed: 5}); slices.Equal(other.Entropy, want.Entropy) || other.Seed != 5 {
		t.Error("another seed gives the same numbers")
	}
}

func TestEntropyRefuses(t *testing.T) {
	line := []bosehubbard.AxisTerms{{Tunnelling: 1}}
	good := box(t, 8, 4, line, false, 8)
	for _, tc := range []struct {
		opt  Options
		want string
	}{
		{Options{Points: 1}, "1 points"},
		{Options{Points: -5}, "-5 points"},
		{Options{Moments: 7}, "7 moments"},
		{Options{Moments: -2}, "-2 moments"},
		{Options{Vectors: 1}, "1 random vectors"},
		{Options{Floor: 3, Ceiling: 2}, "ends 3 and 2"},
		{Options{Floor: math.NaN(), Ceiling: 2}, "ends NaN"},
		{Options{Floor: math.Inf(-1), Ceiling: 2}, "ends -Inf"},
	} {
		if _, err := Entropy(context.Background(), good, tc.opt); err == nil || !strings.Contains(err.Error(), tc.want) {
			t.Errorf("%+v: %v, want %q", tc.opt, err, tc.want)
		}
	}
	var large *fock.TooLargeError
	if _, err := Entropy(context.Background(), box(t, 30, 4, line, false, 30), Options{}); !errors.As(err, &large) {
		t.Errorf("30 atoms on 30 sites: %v, want a *fock.TooLargeError", err)
	}
	var outside *chebyshev.OutsideError
	if _, err := Entropy(context.Background(), good, Options{Floor: -5, Ceiling: 60}); !errors.As(err, &outside) {
		t.Errorf("ends inside the spectrum: %v, want a *chebyshev.OutsideError", err)
	}
	if _, err := Entropy(context.Background(), box(t, 0, 4, line, false, 8), Options{}); !errors.Is(err, ErrOneEnergy) {
		t.Errorf("no atoms: %v, want ErrOneEnergy", err)
	}
	if _, err := Entropy(context.Background(), box(t, -1, 4, line, false, 8), Options{}); err == nil || !strings.Contains(err.Error(), "-1 atoms") {
		t.Errorf("-1 atoms: %v", err)
	}
	if _, err := Entropy(context.Background(), System{Atoms: 3}, Options{}); err == nil {
		t.Error("no lattice: no error")
	}
	if _, err := mustEntropy(t, good, Options{}).At(1e6); err == nil {
		t.Error("energy above the ceiling: no error")
	}
}

// A stop takes under 50 ms wherever it comes, and leaves no goroutine. The best of
// three, since the machine may be busy.
func TestEntropyStops(t *testing.T) {
	s := box(t, 11, -2.1, []bosehubbard.AxisTerms{{Tunnelling: 1, Curvature: -0.05}}, false, 11)
	before := runtime.NumGoroutine()
	for _, after := range []time.Duration{0, 5 * time.Millisecond, 40 * time.Millisecond, 300 * time.Millisecond} {
		best := time.Hour
		for range 3 {
			ctx, cancel := context.WithCancel(context.Background())
			var stopped time.Time
			timer := time.AfterFunc(after, func() { stopped = time.Now(); cancel() })
			_, err := Entropy(ctx, s, Options{Workers: 2})
			best = min(best, time.Since(stopped))
			timer.Stop()
			if !errors.Is(err, context.Canceled) {
				t.Fatalf("after %v: %v, want context.Canceled", after, err)
			}
		}
		if best > 50*time.Millisecond {
			t.Errorf("a stop after %v took %v, want under 50 ms", after, best)
		}
	}
	time.Sleep(20 * time.Millisecond)
	if now := runtime.NumGoroutine(); now > before {
		t.Errorf("%d goroutines, before %d", now, before)
	}
}

func TestEntropyProgress(t *testing.T) {
	line := []bosehubbard.AxisTerms{{Tunnelling: 1, Tilt: 0.1}}
	for sites := 6; sites <= 8; sites++ {
		last, sum := -1, 0
		mustEntropy(t, box(t, sites, 2, line, false, sites), Options{Progress: func(done, total int) {
			if done < last || done > total || sum != 0 && total != sum {
				t.Errorf("%d sites: progress %d of %d after %d of %d", sites, done, total, last, sum)
			}
			last, sum = done, total
		}})
		if last != sum || sum == 0 {
			t.Errorf("%d sites: last progress %d of %d", sites, last, sum)
		}
	}
}
