package exact

import (
	"context"
	"fmt"
	"math"
	"math/rand/v2"
	"testing"

	"hilltop/bosehubbard"
	"hilltop/bosehubbard/lattice"
)

// mirrorDefect is how far the spectrum of the model with U, V and the tilts
// reversed is from the mirror image of the model's own.
func mirrorDefect(t *testing.T, s system) float64 {
	t.Helper()
	here := s.solve(t, Options{})
	s.model = s.model.Mirrored()
	there := s.solve(t, Options{})
	return max(math.Abs(here.Floor+there.Ceiling), math.Abs(here.Ceiling+there.Floor))
}

// On bipartite lattices the spectra of (J, U, V) and (J, -U, -V) are mirror
// images. Derived: a sign on one sublattice turns J into -J.
func TestMirrorOnBipartiteLattices(t *testing.T) {
	x := bosehubbard.AxisTerms{Tunnelling: 1, Curvature: 0.1, Tilt: 0.05}
	y := bosehubbard.AxisTerms{Tunnelling: 0.7, Curvature: -0.2}
	plane := bosehubbard.Model{Axes: []bosehubbard.AxisTerms{x, y}, Interaction: 4}
	cube := bosehubbard.Model{Axes: []bosehubbard.AxisTerms{x, y, x}, Interaction: -7}
	for _, s := range []system{
		chain(6, 6, true, 4, 0),
		chain(8, 8, true, 10, 0.3),
		chain(10, 10, false, -2.1, -0.05),
		chain(5, 5, false, 4, 0.1), // an open chain of odd length is bipartite
		{[]int{2, 3}, []bool{false, false}, 6, plane},
		{[]int{3, 3}, []bool{false, false}, 9, plane},
		{[]int{2, 4}, []bool{false, true}, 8, plane},
		{[]int{4, 4}, []bool{true, true}, 4, plane},
		{[]int{2, 2, 2}, []bool{false, false, false}, 5, cube},
	} {
		if defect := mirrorDefect(t, s); !(defect <= 1e-9) {
			t.Errorf("sites %v periodic %v: mirror defect %g, want at most 1e-9", s.sites, s.periodic, defect)
		}
	}
}

// A ring of odd length is frustrated. The defect is from exact diagonalisation
// outside this project.
func TestMirrorFailsOnOddRings(t *testing.T) {
	s := chain(5, 5, true, 4, 0)
	near(t, "mirror defect of the ring of five", mirrorDefect(t, s), 0.994064, 1e-6)
	s.model.Interaction = -4
	near(t, "ceiling at U = -4", s.solve(t, Options{}).Ceiling, 3.8280872867, 1e-9)
}

// -H(J, -U, -V) = H(-J, U, V) on any lattice.
func TestMirrorWithTunnellingReversed(t *testing.T) {
	for _, n := range []int{3, 5, 6} {
		s := chain(n, 5, true, 4, 0.2)
		s.model.Axes[0].Tilt = 0.3
		mirrored := s
		mirrored.model = s.model.Mirrored()
		s.model.Axes = []bosehubbard.AxisTerms{{Tunnelling: -1, Curvature: 0.2, Tilt: 0.3}}
		here, there := s.solve(t, Options{}), mirrored.solve(t, Options{})
		near(t, fmt.Sprintf("ring of %d, floor", n), here.Floor, -there.Ceiling, 1e-10)
		near(t, fmt.Sprintf("ring of %d, ceiling", n), here.Ceiling, -there.Floor, 1e-10)
	}
}

// Numbering the sites in another order changes nothing.
func TestRelabelling(t *testing.T) {
	random := rand.New(rand.NewPCG(21, 0))
	for range 6 {
		box, err := lattice.Box([]int{2, 3}, []bool{false, true})
		if err != nil {
			t.Fatal(err)
		}
		m := bosehubbard.Model{Interaction: -2, Axes: []bosehubbard.AxisTerms{{Tunnelling: 1, Curvature: -0.3, Tilt: 0.2}, {Tunnelling: 0.4, Tilt: -0.1}}}
		want, err := Solve(context.Background(), box, m, 5, Options{})
		if err != nil {
			t.Fatal(err)
		}
		place := random.Perm(box.Sites)
		other := &lattice.Lattice{Sites: box.Sites, Axes: box.Axes, Positions: make([][3]float64, box.Sites)}
		for i, p := range box.Positions {
			other.Positions[place[i]] = p
		}
		for _, b := range box.Bonds {
			other.Bonds = append(other.Bonds, lattice.Bond{From: place[b.To], To: place[b.From], Axis: b.Axis})
		}
		got, err := Solve(context.Background(), other, m, 5, Options{})
		if err != nil {
			t.Fatal(err)
		}
		near(t, fmt.Sprintf("floor with places %v", place), got.Floor, want.Floor, 1e-11)
		near(t, fmt.Sprintf("ceiling with places %v", place), got.Ceiling, want.Ceiling, 1e-11)
	}
}

// Scaling every energy scales the ends; adding no term, only the unit changes.
func TestUnitOfEnergy(t *testing.T) {
	for _, factor := range []float64{1e-150, 1e-9, 1e9, 1e150} {
		s := chain(6, 6, true, 4*factor, 0)
		s.model.Axes[0].Tunnelling = factor
		ends := s.solve(t, Options{})
		near(t, fmt.Sprintf("floor with factor %g", factor), ends.Floor/factor, -5.6901934006, 1e-9)
		near(t, fmt.Sprintf("ceiling with factor %g", factor), ends.Ceiling/factor, 60.6013216850, 1e-9)
	}
}
