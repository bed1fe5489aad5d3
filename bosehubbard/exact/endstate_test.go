package exact

import (
	"fmt"
	"math"
	"testing"

	"gonum.org/v1/gonum/mat"

	"hilltop/bosehubbard"
	"hilltop/bosehubbard/lattice"
)

// Sums, symmetry and shares of the energy, through both solvers.
func TestEndStates(t *testing.T) {
	for _, s := range []system{
		chain(4, 3, false, 3, 0.2), chain(6, 6, false, 4, 0.1), chain(6, 6, false, -4, -0.1), chain(7, 5, false, -2.1, -0.05),
	} {
		ends := s.solve(t, Options{EndStates: true})
		for _, e := range []struct {
			name   string
			state  *EndState
			energy float64
		}{{"floor", ends.FloorState, ends.Floor}, {"ceiling", ends.CeilingState, ends.Ceiling}} {
			name := fmt.Sprintf("%d atoms on %d sites, %s", s.atoms, s.sites[0], e.name)
			sum, square := 0.0, 0.0
			for i, n := range e.state.Occupation {
				sum += n
				square += e.state.SquaredOccupation[i]
				if other := e.state.Occupation[len(e.state.Occupation)-1-i]; e.name == "floor" && s.model.Interaction > 0 {
					near(t, name+": left and right", n, other, 1e-7)
				}
				if e.state.SquaredOccupation[i] < n*n-1e-12 {
					t.Errorf("%s: <n^2> = %g below <n>^2 = %g on site %d", name, e.state.SquaredOccupation[i], n*n, i)
				}
			}
			near(t, name+": atoms", sum, float64(s.atoms), 1e-12*float64(s.atoms))
			near(t, name+": interaction", e.state.Interaction, s.model.Interaction/2*(square-sum), 1e-10)
			near(t, name+": energy", e.state.Kinetic+e.state.Interaction+e.state.Potential, e.energy, 1e-12*(1+math.Abs(e.energy)))
		}
	}
}

// The shares are derivatives of the energy (Hellmann-Feynman): dE/dU times U is
// the interaction, dE/dJ times J the kinetic energy. Central differences of step
// h are off by h^2/6 times the third derivative, here about 1e-7, and by rounding
// over h, 1e-10.
func TestSharesAreDerivatives(t *testing.T) {
	floor := func(j, u, v float64) float64 {
		s := chain(6, 5, false, u, v)
		s.model.Axes[0].Tunnelling = j
		return s.solve(t, Options{}).Floor
	}
	const h = 1e-3
	state := chain(6, 5, false, 3, 0.2).solve(t, Options{EndStates: true}).FloorState
	near(t, "interaction", state.Interaction, 3*(floor(1, 3+h, 0.2)-floor(1, 3-h, 0.2))/(2*h), 1e-6)
	near(t, "kinetic", state.Kinetic, (floor(1+h, 3, 0.2)-floor(1-h, 3, 0.2))/(2*h), 1e-6)
	near(t, "potential", state.Potential, 0.2*(floor(1, 3, 0.2+h)-floor(1, 3, 0.2-h))/(2*h), 1e-6)
}

// Two atoms on two sites at U = 4 J: the floor is cos|11> + sin (|20> + |02>)/sqrt 2
// with tan(2 phi) = 4J/U, so <n^2> = 1 + sin^2 phi on both sites.
func TestEndStateOfTwoSites(t *testing.T) {
	ends := chain(2, 2, false, 4, 0).solve(t, Options{EndStates: true})
	sine := math.Sin(math.Atan2(4, 4) / 2)
	for i := range 2 {
		near(t, "floor <n>", ends.FloorState.Occupation[i], 1, 1e-14)
		near(t, "floor <n^2>", ends.FloorState.SquaredOccupation[i], 1+sine*sine, 1e-14)
		near(t, "ceiling <n^2>", ends.CeilingState.SquaredOccupation[i], 2-sine*sine, 1e-14)
	}
}

// The state at the ceiling of (J, -U, -V) has the density of the one at the floor
// of (J, U, V): the mirror changes only phases.
func TestMirrorKeepsTheDensity(t *testing.T) {
	s := system{[]int{3, 3}, []bool{false, false}, 4, bosehubbard.Model{Interaction: 4, Axes: []bosehubbard.AxisTerms{{Tunnelling: 1, Curvature: 0.3}, {Tunnelling: 1, Curvature: 0.2}}}}
	floor := s.solve(t, Options{EndStates: true}).FloorState
	s.model = s.model.Mirrored()
	ceiling := s.solve(t, Options{EndStates: true, Seed: 9}).CeilingState
	for i := range floor.Occupation {
		// Vectors are off by residual over gap, 1e-9, densities by as much.
		near(t, fmt.Sprintf("<n> on site %d", i), ceiling.Occupation[i], floor.Occupation[i], 1e-8)
		near(t, fmt.Sprintf("<n^2> on site %d", i), ceiling.SquaredOccupation[i], floor.SquaredOccupation[i], 1e-8)
	}
	near(t, "kinetic", ceiling.Kinetic, -floor.Kinetic, 1e-8)
}

// A free atom on a ring of L sits in the quasi-momentum 0 at the floor and pi at
// the ceiling; N of them fill it, and the sum over the zone is N.
func TestMomentum(t *testing.T) {
	s := chain(6, 4, true, 0, 0)
	l, err := lattice.Box(s.sites, s.periodic)
	if err != nil {
		t.Fatal(err)
	}
	ends := s.solve(t, Options{EndStates: true})
	for _, e := range []struct {
		name  string
		state *EndState
		peak  int
	}{{"floor", ends.FloorState, 0}, {"ceiling", ends.CeilingState, 3}} {
		for m := range 6 {
			want := 0.0
			if m == e.peak {
				want = 4
			}
			near(t, fmt.Sprintf("%s, atoms of quasi-momentum %d", e.name, m), e.state.Momentum(l, [3]float64{2 * math.Pi / 6 * float64(m)}), want, 1e-8)
		}
	}
}

// The correlations are those of the state: their trace is the number of atoms, on
// the bonds they make the kinetic energy, and they are symmetric and positive.
func TestCorrelations(t *testing.T) {
	for _, s := range []system{
		chain(6, 6, false, 4, 0.1), chain(7, 5, false, -2.1, -0.05), chain(5, 5, true, 4, 0),
		{[]int{2, 3}, []bool{false, false}, 5, plane()},
	} {
		ends := s.solve(t, Options{EndStates: true})
		terms := s.terms(t)
		n := terms.Sites
		for name, state := range map[string]*EndState{"floor": ends.FloorState, "ceiling": ends.CeilingState} {
			trace, kinetic := 0.0, 0.0
			for i := range n {
				trace += state.Correlations[i*n+i]
				for j := range n {
					if a, b := state.Correlations[i*n+j], state.Correlations[j*n+i]; a != b {
						t.Errorf("%v, %s: <b_%d^+ b_%d> = %g and %g the other way", s.sites, name, i, j, a, b)
					}
				}
			}
			for _, h := range terms.Hops {
				kinetic += 2 * h.Amplitude * state.Correlations[h.From*n+h.To]
			}
			near(t, fmt.Sprintf("%v, %s: trace", s.sites, name), trace, float64(s.atoms), 1e-12*float64(s.atoms))
			near(t, fmt.Sprintf("%v, %s: kinetic energy", s.sites, name), kinetic, state.Kinetic, 1e-9)
			var eig mat.EigenSym
			if !eig.Factorize(mat.NewSymDense(n, state.Correlations), false) || eig.Values(nil)[0] < -1e-12 {
				t.Errorf("%v, %s: natural occupations %v, want none negative", s.sites, name, eig.Values(nil))
			}
		}
	}
}
