package eos

import (
	"context"
	"errors"
	"math"
	"slices"
	"testing"
)

func linkedOf(t testing.TB, terms Terms) *LinkedCluster {
	t.Helper()
	m, err := NewLinkedCluster(context.Background(), terms, LinkedClusterOptions{})
	if err != nil {
		t.Fatal(err)
	}
	return m
}

// The numbers of fixed polyominoes and polycubes, and the graphs among those of four
// cells: 3 squares and 20 stars in space, 1 and 4 in the plane.
func TestExpansion(t *testing.T) {
	for axes, want := range map[int][clusterSites]int{1: {1, 1, 1, 1}, 2: {1, 2, 6, 19}, 3: {1, 3, 15, 86}} {
		var got [clusterSites]int
		for _, c := range shapes(axes) {
			got[len(c)-1]++
		}
		if got != want {
			t.Errorf("%d axes: %v shapes, want %v", axes, got, want)
		}
	}
	for _, kinds := range [][]int8{{0}, {0, 0}, {0, 0, 0}, {0, 1}, {0, 1, 0}} {
		sites, bonds, fewer := 0, 0, 0
		for _, c := range expand(kinds) {
			sites += c.full * c.graph.sites
			fewer += c.fewer * c.graph.sites
			for i := range c.graph.bond {
				for k := range i {
					if c.graph.bond[i][k] != 0 {
						bonds += c.full
					}
				}
			}
		}
		if sites != 1 || fewer != 1 || bonds != len(kinds) {
			t.Errorf("kinds %v: %d and %d sites, %d bonds per site, want 1, 1, %d", kinds, sites, fewer, bonds, len(kinds))
		}
	}
}

// The ring of four sites with four atoms, U/J = 4: ground state and canonical averages
// by exact diagonalisation outside this project.
func TestRingOfFour(t *testing.T) {
	ring := graph{sites: 4}
	for i := range 4 {
		k := (i + 1) % 4
		ring.bond[i][k], ring.bond[k][i] = 1, 1
	}
	s := &spectrum{sites: 4}
	if err := s.sector(ring, []float64{1}, 4, 4); err != nil {
		t.Fatal(err)
	}
	s.weight = make([]float64, len(s.energy))
	if len(s.energy) != 35 {
		t.Fatalf("%d states, want 35", len(s.energy))
	}
	near(t, "ground state", slices.Min(s.energy), -3.9765130137, 1e-10)
	near(t, "highest state", slices.Max(s.energy), 24.6984601196, 1e-10)
	warm := s.average(0, 0.5)
	near(t, "energy", warm.energy, -1.94884884, 1e-8)
	near(t, "entropy", warm.entropy, 1.46604423, 1e-8)
	sum := 0.0
	for k, c := range warm.counts {
		sum += c * float64(k)
	}
	near(t, "atoms by the counts", sum, 4, 1e-12)
}

// Every graph of equal bonds has a swap, and the trace and the square of the
// Hamiltonian do not depend on the cut into both parities.
func TestParity(t *testing.T) {
	tunnelling := []float64{1, 0.7, 0.4}
	for _, c := range expand([]int8{0, 1, 2}) {
		for _, atoms := range []int{0, 1, 5} {
			s := &spectrum{sites: c.graph.sites}
			if err := s.sector(c.graph, tunnelling, 3, atoms); err != nil {
				t.Fatal(err)
			}
			first, second, wantFirst, wantSecond := 0.0, 0.0, 0.0, 0.0
			for _, e := range s.energy {
				first, second = first+e, second+e*e
			}
			states := placed(c.graph.sites, atoms)
			for _, state := range states {
				u := 3 * pairsOf(state)
				wantFirst, wantSecond = wantFirst+u, wantSecond+u*u
				for i, row := range c.graph.bond {
					for k, kind := range row {
						if kind > 0 {
							j := tunnelling[kind-1]
							wantSecond += j * j * float64(state[i]) * float64(state[k]+1)
						}
					}
				}
			}
			if len(s.energy) != len(states) {
				t.Errorf("%v: %d states, want %d", c.graph, len(s.energy), len(states))
			}
			near(t, "trace", first, wantFirst, 1e-12)
			near(t, "trace of the square", second, wantSecond, 1e-12)
		}
	}
	for _, c := range expand([]int8{0, 0}) {
		if c.graph.sites > 1 && swapOf(c.graph) == [clusterSites]int{0, 1, 2, 3} {
			t.Errorf("%v has no swap", c.graph)
		}
	}
}

// Without tunnelling it is the atomic limit; with little, it differs from it in the
// fourth order; without interaction and hot, it is the ideal gas.
func TestLinkedLimits(t *testing.T) {
	a, b := at(t, linkedOf(t, Cosine([]float64{0, 0}, 1)), 0.6, 3), at(t, atomicOf(t, Cosine([]float64{0, 0}, 1)), 0.6, 3)
	a.Doubt = b.Doubt
	for _, pair := range [][2]float64{{a.Filling, b.Filling}, {a.Entropy, b.Entropy}, {a.Energy, b.Energy},
		{a.Variance, b.Variance}, {a.GrandPotential, b.GrandPotential}, {a.Shares[2], b.Shares[2]}} {
		near(t, "atomic limit", pair[0], pair[1], 1e-9) // thirteen atoms have 1e-11
	}
	miss := func(j float64) float64 {
		terms := Cosine([]float64{j, j}, 1)
		return at(t, linkedOf(t, terms), 0.4, 3).GrandPotential - at(t, atomicOf(t, terms), 0.4, 3).GrandPotential
	}
	if ratio := miss(0.02) / miss(0.01); !(math.Abs(ratio-16) < 0.5) {
		t.Errorf("distance from the second order falls by %g for half the J, want 16", ratio)
	}
	free := Cosine([]float64{1, 1}, 0)
	p, q := at(t, linkedOf(t, free), -10, 0.2), at(t, idealOf(t, free), -10, 0.2)
	near(t, "ideal filling", p.Filling/q.Filling, 1, 0.002)
	near(t, "ideal entropy", p.Entropy/q.Entropy, 1, 0.002)
}

// Hard-core bosons on a chain are free fermions (Girardeau, J. Math. Phys. 1, 516
// (1960)): filling, entropy and energy by midpoints of the zone.
func TestHardCore(t *testing.T) {
	const beta, count = 1.0, 200
	m := linkedOf(t, Cosine([]float64{1}, 1e5))
	for _, mu := range []float64{-2.5, -1, 0, 1} {
		n, e, s := 0.0, 0.0, 0.0
		for i := range count {
			level := -2 * math.Cos(2*math.Pi*(float64(i)+0.5)/count)
			f := 1 / (math.Exp(beta*(level-mu)) + 1)
			n, e = n+f/count, e+f*level/count
			s -= (f*math.Log(f) + (1-f)*math.Log1p(-f)) / count
		}
		p := at(t, m, mu, beta)
		// Correlations fall as tanh(beta J/2)^distance or so: 0.46^4 of small numbers.
		near(t, "filling", p.Filling, n, 3e-3)
		near(t, "entropy", p.Entropy, s, 3e-3)
		near(t, "energy", p.Energy, e, 5e-3)
		if miss := math.Abs(p.Filling-n)/n + math.Abs(p.Entropy-s)/s; miss > 3*p.Doubt+1e-4 {
			t.Errorf("mu = %g: off by %g with a Doubt of %g", mu, miss, p.Doubt)
		}
	}
}

func TestLinkedMaxwell(t *testing.T) {
	for _, hops := range [][]float64{{1}, {1, 1}, {0.5, 0.5, 0.5}} {
		m := linkedOf(t, Cosine(hops, 6))
		for _, mu := range []float64{-4, 1.5} {
			maxwell(t, m, mu, 0.3, 1e-6)
		}
		want := must[Point](t)(Infinite(0.1, 6))
		p := at(t, m, math.Log(0.1/1.1)/1e-8, 1e-8)
		near(t, "filling", p.Filling, want.Filling, 1e-6)
		near(t, "entropy", p.Entropy, want.Entropy, 1e-6)
		near(t, "variance", p.Variance, want.Variance, 1e-5)
	}
}

func TestLinkedMirrorAndZero(t *testing.T) {
	hops := []float64{1, 1}
	m, other := linkedOf(t, Cosine(hops, 60)), linkedOf(t, Cosine(hops, -60))
	mirrored(t, m, other, 20, 0.1)
	cold := at(t, m, 25, math.Inf(1))
	near(t, "insulator", cold.Filling, 1, 1e-12)
	near(t, "entropy of the insulator", cold.Entropy, 0, 1e-12)
	// Freericks and Monien, EPL 26, 545 (1994): -z n(n+1) J^2/U, up to J^4.
	near(t, "energy of the insulator", cold.Energy, -4*2./60, 1e-2)
	sum := 0.0
	for _, p := range cold.Shares {
		sum += p
	}
	near(t, "all shares", sum, 1, 1e-12)
}

func TestLinkedRefuses(t *testing.T) {
	m := linkedOf(t, Cosine([]float64{1, 1}, 2))
	for _, x := range [][2]float64{{-3, 3}, {30, 0.5}, {0, -1}, {0, math.NaN()}} {
		if p, err := m.At(x[0], x[1]); err == nil {
			t.Errorf("at %g: %+v, want an error", x, p)
		}
	}
	if n := testing.AllocsPerRun(5, func() { at(t, m, -8, 0.3) }); n != 0 {
		t.Errorf("%g allocations, want none", n)
	}
	ctx, cancel := context.WithCancel(context.Background())
	steps := 0
	_, err := NewLinkedCluster(ctx, Cosine([]float64{1, 1}, 2), LinkedClusterOptions{Progress: func(done, total int) {
		if steps++; steps == 20 {
			cancel()
		}
		if done != steps || done > total {
			t.Errorf("progress %d of %d at step %d", done, total, steps)
		}
	}})
	if !errors.Is(err, context.Canceled) || steps != 20 {
		t.Errorf("stopped after %d steps with %v", steps, err)
	}
}
