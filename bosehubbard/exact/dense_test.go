package exact

import (
	"fmt"
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/mat"

	"hilltop/bosehubbard"
)

// spectrum diagonalises a system in a way of its own: states in a map, found by
// counting in base N+1, bonds by comparing coordinates.
func spectrum(t *testing.T, s system) []float64 {
	t.Helper()
	total := 1
	for _, n := range s.sites {
		total *= n
	}
	index := map[string]int{}
	var states [][]int
	for code := range int(math.Pow(float64(s.atoms+1), float64(total)) + 0.5) {
		state, sum := make([]int, total), 0
		for i, rest := 0, code; i < total; i, rest = i+1, rest/(s.atoms+1) {
			state[i] = rest % (s.atoms + 1)
			sum += state[i]
		}
		if sum == s.atoms {
			index[fmt.Sprint(state)] = len(states)
			states = append(states, state)
		}
	}
	h := mat.NewSymDense(len(states), nil)
	for a, state := range states {
		energy := 0.0
		for i, n := range state {
			energy += s.model.Interaction*float64(n*(n-1))/2 + float64(n)*siteEnergy(s, i)
			for j := range state {
				hop := bondTunnelling(s, i, j)
				if hop == 0 || n == 0 {
					continue
				}
				moved := append([]int(nil), state...)
				moved[i]--
				moved[j]++
				if b := index[fmt.Sprint(moved)]; b > a {
					h.SetSym(a, b, -hop*math.Sqrt(float64(n)*float64(moved[j])))
				}
			}
		}
		h.SetSym(a, a, energy)
	}
	var eig mat.EigenSym
	if !eig.Factorize(h, false) {
		t.Fatal("dense diagonalisation failed")
	}
	return eig.Values(nil)
}

// coordinates of a site, the first axis fastest.
func coordinates(s system, site int) []int {
	var at []int
	for _, n := range s.sites {
		at = append(at, site%n)
		site /= n
	}
	return at
}

func siteEnergy(s system, site int) float64 {
	sum := 0.0
	for a, i := range coordinates(s, site) {
		x := float64(i) - float64(s.sites[a]-1)/2
		sum += s.model.Axes[a].Curvature*x*x + s.model.Axes[a].Tilt*x
	}
	return sum
}

// bondTunnelling is J of the bond between two sites, 0 if there is none.
func bondTunnelling(s system, i, j int) float64 {
	p, q := coordinates(s, i), coordinates(s, j)
	axis := -1
	for a, n := range s.sites {
		step := p[a] - q[a]
		if step == 0 {
			continue
		}
		if step < 0 {
			step = -step
		}
		if axis >= 0 || step != 1 && !(s.periodic[a] && step == n-1) {
			return 0
		}
		axis = a
	}
	if axis < 0 {
		return 0
	}
	return s.model.Axes[axis].Tunnelling
}

// Seeded random small systems of one to three axes, part of them through the dense
// path and half through Lanczos.
func TestRandomSystemsAgainstDense(t *testing.T) {
	random := rand.New(rand.NewPCG(31, 0))
	shapes := [][]int{{2}, {3}, {4}, {5}, {6}, {2, 2}, {2, 3}, {3, 2}, {1, 4}, {2, 2, 1}, {1, 2, 3}, {7}, {2, 3}, {6}}
	direct, iterated := 0, 0
	for range 60 {
		s := system{sites: shapes[random.IntN(len(shapes))], atoms: 1 + random.IntN(5)}
		s.model.Interaction = 10 * random.NormFloat64()
		for range s.sites {
			s.periodic = append(s.periodic, random.IntN(2) == 0)
			s.model.Axes = append(s.model.Axes, bosehubbard.AxisTerms{
				Tunnelling: random.NormFloat64(), Curvature: random.NormFloat64() / 3, Tilt: random.NormFloat64(),
			})
		}
		want := spectrum(t, s)
		ends := s.solve(t, Options{Seed: random.Uint64()})
		if ends.Iterations == 0 {
			direct++
		} else {
			iterated++
		}
		low, high := want[0], want[len(want)-1]
		// Both solvers are good to some roundings of the norm.
		tolerance := 1e-13 * max(math.Abs(low), math.Abs(high))
		near(t, fmt.Sprintf("%+v floor", s), ends.Floor, low, tolerance)
		near(t, fmt.Sprintf("%+v ceiling", s), ends.Ceiling, high, tolerance)
		if ends.Dimension != len(want) {
			t.Errorf("%+v: dimension %d, want %d", s, ends.Dimension, len(want))
		}
	}
	if direct < 10 || iterated < 10 {
		t.Errorf("%d systems went to the dense solver and %d to Lanczos, want at least 10 each", direct, iterated)
	}
}
