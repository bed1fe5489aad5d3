package thermo

import (
	"math"
	"runtime"
	"strings"
	"testing"

	"hilltop/bosehubbard"
	"hilltop/bosehubbard/lattice"
)

// Without tunnelling the levels are U times a number of pairs, each of many states,
// and Krylov spaces close after as many steps as there are levels.
func TestWithoutTunnelling(t *testing.T) {
	for _, sites := range []int{4, 8} {
		s := box(t, sites, -1.5, []bosehubbard.AxisTerms{{}}, false, sites)
		if s.Unit() != 1.5 {
			t.Errorf("unit %g Hz, want |U|", s.Unit())
		}
		c := mustEntropy(t, s, Options{})
		if math.Abs(c.Ceiling) > 1e-9 || math.Abs(c.Floor+1.5*float64(sites*(sites-1))/2) > 1e-9 {
			t.Errorf("%d sites: levels from %g to %g", sites, c.Floor, c.Ceiling)
		}
		a := mustCanonical(t, s, []float64{-40, 40}, CanonicalOptions{Observables: true})
		// One atom on each site on top, all atoms on any one site at the bottom.
		for i, want := range []struct{ energy, entropy float64 }{{0, 0}, {c.Floor, math.Log(float64(sites))}} {
			p := a.Points[i]
			if math.Abs(p.Energy-want.energy) > 1e-9 || math.Abs(p.Entropy-want.entropy) > 1e-9 {
				t.Errorf("%d sites, beta %g: E = %g, S = %g +- %g, want %g and %g", sites, p.Beta, p.Energy, p.Entropy, p.EntropyError, want.energy, want.entropy)
			}
			for site, n := range p.Observables.Occupation {
				if math.Abs(n-1) > 1e-9+p.Observables.OccupationError[site] {
					t.Errorf("%d sites, beta %g: %g atoms on site %d, want 1", sites, p.Beta, n, site)
				}
			}
		}
	}
}

// Two chains that do not touch share their atoms all the same.
func TestDisconnectedLattice(t *testing.T) {
	l := &lattice.Lattice{Sites: 4, Axes: 1, Bonds: []lattice.Bond{{From: 0, To: 1}, {From: 2, To: 3}}, Positions: make([][3]float64, 4)}
	for i := range l.Positions {
		l.Positions[i][0] = float64(i) - 1.5
	}
	s := System{Lattice: l, Atoms: 3, Model: bosehubbard.Model{Axes: []bosehubbard.AxisTerms{{Tunnelling: 1}}, Interaction: 2}}
	if c := mustEntropy(t, s, Options{}); c.Dimension != 20 {
		t.Errorf("dimension %d, want 20", c.Dimension)
	}
	p := mustCanonical(t, s, []float64{0}, CanonicalOptions{}).Points[0]
	if want := 2 * 3 * 2 / 5.; math.Abs(p.Energy-want) > 1e-12 { // U N (N-1)/(L+1)
		t.Errorf("Tr H/D = %g, want %g", p.Energy, want)
	}
}

func TestCutOffTooLow(t *testing.T) {
	s := box(t, 8, 1, []bosehubbard.AxisTerms{{Tunnelling: 1}}, false, 6)
	s.MaxOccupation = 1
	if _, err := Entropy(t.Context(), s, Options{}); err == nil || !strings.Contains(err.Error(), "no room for 8") {
		t.Errorf("8 atoms on 6 sites, one each: %v", err)
	}
}

// A hundred runs leave neither memory nor goroutines behind.
func TestRunsDoNotGrow(t *testing.T) {
	if testing.Short() {
		t.Skip("many runs")
	}
	s := box(t, 5, -2.1, []bosehubbard.AxisTerms{{Tunnelling: 1, Tilt: 0.1}}, false, 7)
	once := func() {
		mustEntropy(t, s, Options{Vectors: 4, Workers: 2})
		mustCanonical(t, s, []float64{-1, 1}, CanonicalOptions{Vectors: 2, Steps: 10, Workers: 2, Observables: true})
	}
	heap := func() uint64 {
		runtime.GC()
		var m runtime.MemStats
		runtime.ReadMemStats(&m)
		return m.HeapAlloc
	}
	once()
	before, goroutines := heap(), runtime.NumGoroutine()
	for range 100 {
		once()
	}
	if after := heap(); after > before+200_000 || runtime.NumGoroutine() > goroutines {
		t.Errorf("heap %d after %d bytes, %d after %d goroutines", after, before, runtime.NumGoroutine(), goroutines)
	}
}
