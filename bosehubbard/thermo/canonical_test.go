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
)

func mustCanonical(t testing.TB, s System, betas []float64, opt CanonicalOptions) *Averages {
	t.Helper()
	a, err := Canonical(context.Background(), s, betas, opt)
	if err != nil {
		t.Fatal(err)
	}
	return a
}

// exactAverage sums over known levels.
func exactAverage(levels []float64, beta float64) Average {
	end := levels[0]
	if beta < 0 {
		end = levels[len(levels)-1]
	}
	ones := slices.Repeat([]float64{1}, len(levels))
	var s sums
	s.add(weighted{levels, ones}, beta, end, 1e-10*(levels[len(levels)-1]-levels[0]))
	return average(beta, end, s, nil)
}

// Rings of N = L with U = 4 J. Source: exact diagonalisation outside this project,
// eight decimals; the averages at beta = 0 also from the moments of H.
func TestCanonicalRings(t *testing.T) {
	for _, tc := range []struct {
		sites                           int
		beta, energy, entropy, variance float64
	}{
		{4, 0.5, -1.94884884, 1.46604423, 8.76444633},
		{4, 0, 9.6, math.Log(35), 52.29714286},
		{4, -0.2, 20.94479910, 2.47022292, 38.45813197},
		{6, 0.5, -1.84734315, 3.04103724, 12.86638486},
		{6, 0, 17.14285714, math.Log(462), 126.69387755},
		{6, -0.2, 58.13421702, 2.39987730, 55.18428118},
	} {
		s := box(t, tc.sites, 4, []bosehubbard.AxisTerms{{Tunnelling: 1}}, true, tc.sites)
		a := mustCanonical(t, s, []float64{tc.beta}, CanonicalOptions{})
		p := a.Points[0]
		for what, pair := range map[string][2]float64{
			"E": {p.Energy, tc.energy}, "S": {p.Entropy, tc.entropy}, "var": {p.Variance, tc.variance},
		} {
			if diff := math.Abs(pair[0] - pair[1]); diff > 6e-9 || !a.Exact { // half a last digit
				t.Errorf("ring of %d, beta %g: %s = %.10g, want %.10g, difference %.2g", tc.sites, tc.beta, what, pair[0], pair[1], diff)
			}
		}
	}
}

// All atoms on one of L sites top the spectrum of repulsive atoms: S tends to ln L.
// Source: exact diagonalisation outside this project, beta J = -1.
func TestCanonicalTopOfRepulsiveRing(t *testing.T) {
	for sites, want := range map[int]float64{4: 1.3869, 6: 1.7918} {
		s := box(t, sites, 4, []bosehubbard.AxisTerms{{Tunnelling: 1}}, true, sites)
		a := mustCanonical(t, s, []float64{-1, -1e4, -1e300}, CanonicalOptions{})
		if got := a.Points[0].Entropy; math.Abs(got-want) > 5e-5 {
			t.Errorf("ring of %d: S = %.6f at beta = -1, want %.4f", sites, got, want)
		}
		for _, p := range a.Points[1:] {
			if math.IsNaN(p.Entropy) || p.Entropy < -1e-12 || p.Entropy > math.Log(float64(sites))+1e-12 {
				t.Errorf("ring of %d: S = %g at beta = %g, want 0 to ln %d", sites, p.Entropy, p.Beta, sites)
			}
		}
	}
}

// Random vectors against the sums over known levels, from cold to hot at either
// sign: nine in ten of the 95 % bars hold the exact value (neighbouring betas move
// together), none misses it by three bars, and at the ends it is met to rounding.
func TestCanonicalAgainstKnownLevels(t *testing.T) {
	if testing.Short() {
		t.Skip("many runs")
	}
	inside, bars := 0, 0
	for _, k := range knownSystems(t) {
		width := k.levels[len(k.levels)-1] - k.levels[0]
		betas := []float64{0}
		for _, x := range []float64{1, 4, 10, 30, 100, 300, 3e4, 1e7, 1e300} {
			betas = append(betas, x/width, -x/width)
		}
		a := mustCanonical(t, k.system, betas, CanonicalOptions{Vectors: 32})
		if a.Exact || a.Dimension != len(k.levels) {
			t.Fatalf("%s: %d states, exact %v", k.name, a.Dimension, a.Exact)
		}
		for i, p := range a.Points {
			want := exactAverage(k.levels, betas[i])
			for what, x := range map[string][4]float64{ // value, bar, exact value, rounding
				"E":   {p.Energy, p.EnergyError, want.Energy, 1e-12 * width},
				"S":   {p.Entropy, p.EntropyError, want.Entropy, 1e-11},
				"var": {p.Variance, p.VarianceError, want.Variance, 1e-12 * width * width},
			} {
				diff := math.Abs(x[0] - x[2])
				if !(diff <= 3*x[1]+x[3]) {
					t.Errorf("%s, beta %g: %s = %.12g +- %.2g, want %.12g", k.name, betas[i], what, x[0], x[1], x[2])
				}
				if math.Abs(betas[i])*width > 1e6 && diff > 10*x[3] {
					t.Errorf("%s, beta %g: %s = %.15g at the end, want %.15g", k.name, betas[i], what, x[0], x[2])
				}
				if bars++; diff <= x[1]+x[3] {
					inside++
				}
			}
		}
	}
	if share := float64(inside) / float64(bars); share < 0.9 || share == 1 {
		t.Errorf("bars hold %.3f of the exact values, want 0.95", share)
	}
}

// E(beta; J, U, V) = -E(-beta; J, -U, -V) and the same S and variance where the
// lattice is bipartite, with quasi-momenta moved by pi; not on a triangle.
func TestCanonicalMirror(t *testing.T) {
	ring := []bosehubbard.AxisTerms{{Tunnelling: 1}}
	trap := []bosehubbard.AxisTerms{{Tunnelling: 1, Curvature: 0.2}, {Tunnelling: 0.6, Tilt: 0.3}}
	for name, tc := range map[string]struct {
		system System
		same   bool
	}{
		"even ring": {box(t, 5, 4, ring, true, 4), true},
		"rectangle": {box(t, 4, 2.5, trap, false, 3, 2), true},
		"triangle":  {box(t, 4, 4, ring, true, 3), false},
	} {
		mirrored := tc.system
		mirrored.Model = tc.system.Model.Mirrored()
		a := mustCanonical(t, tc.system, []float64{0.3, 2, 0, -0.1, -3}, CanonicalOptions{Observables: true})
		b := mustCanonical(t, mirrored, []float64{-0.3, -2, 0, 0.1, 3}, CanonicalOptions{Observables: true})
		worst := 0.0
		for i, p := range a.Points {
			q := b.Points[i]
			worst = max(worst, math.Abs(p.Energy+q.Energy), math.Abs(p.Entropy-q.Entropy), math.Abs(p.Variance-q.Variance))
			worst = max(worst, math.Abs(p.Observables.Centre-q.Observables.Corner), math.Abs(p.Observables.Corner-q.Observables.Centre))
			for s, n := range p.Observables.Occupation {
				worst = max(worst, math.Abs(n-q.Observables.Occupation[s]))
			}
		}
		if (worst < 1e-10) != tc.same {
			t.Errorf("%s: mirror broken by %g, want the mirror: %v", name, worst, tc.same)
		}
	}
}

// dE/dbeta = -variance and dS/dbeta = -beta variance, for random vectors too, since
// they hold for the sums of each.
func TestCanonicalDerivatives(t *testing.T) {
	axes := []bosehubbard.AxisTerms{{Tunnelling: 1, Curvature: -0.05}}
	for _, s := range []System{box(t, 6, -2.1, axes, false, 6), box(t, 8, -2.1, axes, false, 8)} {
		for _, beta := range []float64{-0.7, -0.05, 0.02, 0.4} {
			const h = 1e-4
			p := mustCanonical(t, s, []float64{beta - h, beta, beta + h}, CanonicalOptions{Vectors: 4}).Points
			// the next term is h^2/6 d^3E/dbeta^3
			if slope := (p[2].Energy - p[0].Energy) / (2 * h); math.Abs(slope/p[1].Variance+1) > 1e-5 {
				t.Errorf("%d sites, beta %g: dE/dbeta %g, variance %g", s.Lattice.Sites, beta, slope, p[1].Variance)
			}
			if slope := (p[2].Entropy - p[0].Entropy) / (2 * h); math.Abs(slope/p[1].Variance/beta+1) > 1e-5 {
				t.Errorf("%d sites, beta %g: dS/dbeta %g, -beta variance %g", s.Lattice.Sites, beta, slope, -beta*p[1].Variance)
			}
		}
	}
}

func TestCanonicalIsTheSameForAnyWorkers(t *testing.T) {
	s := box(t, 7, -2.1, []bosehubbard.AxisTerms{{Tunnelling: 1, Curvature: -0.05}}, false, 7)
	betas := []float64{-1, 0.2}
	opt := CanonicalOptions{Workers: 1, Vectors: 5, Steps: 40, Seed: 9, Observables: true}
	want := mustCanonical(t, s, betas, opt)
	for _, workers := range []int{2, 3, 8} {
		opt.Workers = workers
		got := mustCanonical(t, s, betas, opt)
		for i, p := range got.Points {
			w := want.Points[i]
			if p.Energy != w.Energy || p.Entropy != w.Entropy || p.EntropyError != w.EntropyError ||
				!slices.Equal(p.Observables.Correlation, w.Observables.Correlation) {
				t.Errorf("%d workers, beta %g: other numbers", workers, p.Beta)
			}
		}
	}
}

func TestCanonicalRefuses(t *testing.T) {
	line := []bosehubbard.AxisTerms{{Tunnelling: 1}}
	s := box(t, 3, 4, line, false, 3)
	for _, tc := range []struct {
		betas []float64
		opt   CanonicalOptions
		want  string
	}{
		{nil, CanonicalOptions{}, "no beta"},
		{[]float64{1, math.NaN()}, CanonicalOptions{}, "beta NaN per Hz, number 2"},
		{[]float64{math.Inf(-1)}, CanonicalOptions{}, "beta -Inf"},
		{[]float64{1}, CanonicalOptions{Vectors: 1}, "1 random vectors"},
		{[]float64{1}, CanonicalOptions{Steps: 5}, "5 Lanczos steps"},
		{[]float64{1}, CanonicalOptions{Levels: -1}, "-1 levels"},
	} {
		if _, err := Canonical(context.Background(), s, tc.betas, tc.opt); err == nil || !strings.Contains(err.Error(), tc.want) {
			t.Errorf("%v, %+v: %v, want %q", tc.betas, tc.opt, err, tc.want)
		}
	}
	var large *fock.TooLargeError
	if _, err := Canonical(context.Background(), box(t, 30, 4, line, false, 30), []float64{1}, CanonicalOptions{}); !errors.As(err, &large) {
		t.Errorf("30 atoms on 30 sites: %v, want a *fock.TooLargeError", err)
	}
	// One state is a system like any other.
	empty := mustCanonical(t, box(t, 0, 4, line, false, 3), []float64{-2, 3}, CanonicalOptions{Observables: true})
	for _, p := range empty.Points {
		if p.Energy != 0 || p.Entropy != 0 || p.Variance != 0 || p.Observables.Centre != 0 {
			t.Errorf("no atoms: %+v", p)
		}
	}
}

// A stop takes under 50 ms; the best of three, since the machine may be busy.
func TestCanonicalStops(t *testing.T) {
	s := box(t, 10, -2.1, []bosehubbard.AxisTerms{{Tunnelling: 1, Curvature: -0.05}}, false, 10)
	before := runtime.NumGoroutine()
	for _, after := range []time.Duration{0, 20 * time.Millisecond, 200 * time.Millisecond, 800 * time.Millisecond} {
		best := time.Hour
		for range 3 {
			ctx, cancel := context.WithCancel(context.Background())
			var stopped time.Time
			timer := time.AfterFunc(after, func() { stopped = time.Now(); cancel() })
			_, err := Canonical(ctx, s, []float64{-1, 1}, CanonicalOptions{Workers: 2, Observables: true, Vectors: 200})
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

func TestCanonicalProgress(t *testing.T) {
	line := []bosehubbard.AxisTerms{{Tunnelling: 1, Tilt: 0.1}}
	for _, tc := range []struct {
		atoms       int
		observables bool
	}{{3, false}, {3, true}, {6, true}} {
		last, sum := -1, 0
		mustCanonical(t, box(t, tc.atoms, 2, line, false, 6), []float64{0.1, -0.1}, CanonicalOptions{
			Observables: tc.observables, Vectors: 4, Workers: 2,
			Progress: func(done, total int) {
				if done < last || done > total || sum != 0 && total != sum {
					t.Errorf("%+v: progress %d of %d after %d of %d", tc, done, total, last, sum)
				}
				last, sum = done, total
			},
		})
		if last != sum || sum == 0 {
			t.Errorf("%+v: last progress %d of %d", tc, last, sum)
		}
	}
}
