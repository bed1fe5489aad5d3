package fock

import (
	"context"
	"errors"
	"fmt"
	"math"
	"math/rand/v2"
	"slices"
	"strings"
	"testing"

	"hilltop/bosehubbard"
	"hilltop/bosehubbard/lattice"
)

// element returns <a|H|b> from the definition: the diagonal, or one atom moved
// along one hop.
func element(t *Terms, a, b []int) float64 {
	sum := 0.0
	for _, hop := range t.Hops {
		for _, way := range [][2]int{{hop.From, hop.To}, {hop.To, hop.From}} {
			moved := slices.Clone(b) // b_to^+ b_from |b>
			moved[way[0]]--
			moved[way[1]]++
			if moved[way[0]] >= 0 && slices.Equal(moved, a) {
				sum += hop.Amplitude * math.Sqrt(float64(b[way[0]])) * math.Sqrt(float64(moved[way[1]]))
			}
		}
	}
	if slices.Equal(a, b) {
		for i, n := range b {
			sum += t.Interaction/2*float64(n*(n-1)) + t.potential(i)*float64(n)
		}
	}
	return sum
}

// Every matrix element, read off by applying H to unit vectors.
func TestOperatorElements(t *testing.T) {
	const tolerance = 1e-14 // a few roundings of the largest term
	for _, s := range systems(t) {
		h := mustOperator(t, s.terms, s.atoms, Options{})
		d, w := h.Dimension(), h.NewWorkspace(1)
		states := everyState(s.terms.Sites, s.atoms)
		if d != len(states) || h.Len() != d {
			t.Errorf("%s: dimension %d, length %d, want %d", s.name, d, h.Len(), len(states))
			continue
		}
		column, unit := make([]float64, d), make([]float64, d)
		for _, b := range states {
			unit[h.Rank(b)] = 1
			h.ApplyTo(column, unit, w)
			unit[h.Rank(b)] = 0
			for _, a := range states {
				got, want := column[h.Rank(a)], element(s.terms, a, b)
				if diff := math.Abs(got - want); diff > tolerance*(1+50*math.Abs(want)) {
					t.Errorf("%s: <%v|H|%v> = %.17g, want %.17g, difference %.2g", s.name, a, b, got, want, diff)
				}
			}
		}
	}
}

// close reports vectors that differ by more than roundings of their size.
func checkClose(t *testing.T, name string, got, want []float64) {
	t.Helper()
	size := math.Sqrt(dot(want, want))
	for i := range want {
		if diff := math.Abs(got[i] - want[i]); !(diff <= 1e-13*(1+size)) {
			t.Errorf("%s: component %d = %.17g, want %.17g, difference %.2g", name, i, got[i], want[i], diff)
			return
		}
	}
}

// The fast operator against the plain one, on random vectors of larger systems.
func TestOperatorAgainstPlain(t *testing.T) {
	random := rand.New(rand.NewPCG(13, 0))
	list := systems(t)
	chain := bosehubbard.Model{Axes: []bosehubbard.AxisTerms{axis(1, -0.05, 0.1)}, Interaction: -2.1}
	plane := bosehubbard.Model{Axes: []bosehubbard.AxisTerms{axis(1, -0.05, 0), axis(0.6, 0.1, 0)}, Interaction: 3}
	list = append(list,
		system{"nine on nine", boxTerms(t, []int{9}, []bool{false}, chain), 9},
		system{"eight on a ring", boxTerms(t, []int{8}, []bool{true}, chain), 8},
		system{"torus of nine", boxTerms(t, []int{3, 3}, []bool{true, true}, plane), 7},
		system{"ladder", boxTerms(t, []int{5, 2}, []bool{false, false}, plane), 6},
		system{"two sites, many atoms", boxTerms(t, []int{2}, []bool{false}, chain), 20_000},
		system{"three sites, many atoms", boxTerms(t, []int{3}, []bool{false}, chain), 100},
		system{"many sites, few atoms", boxTerms(t, []int{40}, []bool{true}, chain), 3},
	)
	for _, s := range list {
		h, plain := mustOperator(t, s.terms, s.atoms, Options{}), newPlainOperator(s.terms, s.atoms)
		x := randomVector(random, h.Len())
		got, want := make([]float64, h.Len()), make([]float64, h.Len())
		h.ApplyTo(got, x, h.NewWorkspace(2))
		plain.ApplyTo(want, plainVector(h, plain.plainBasis, x))
		checkClose(t, s.name, plainVector(h, plain.plainBasis, got), want)
	}
}

// Both sectors of the mirror: H on the sector is H on the space, norms agree, and
// the dimensions add up.
func TestParitySectors(t *testing.T) {
	mirrored := 0
	for _, s := range systems(t) {
		if _, ok := s.terms.Mirror(); !ok {
			if _, err := NewOperatorOf(context.Background(), s.terms, s.atoms, Options{Parity: 1}); err == nil || !strings.Contains(err.Error(), "without a mirror") {
				t.Errorf("%s: parity without a mirror: %v", s.name, err)
			}
			continue
		}
		mirrored++
		plain := newPlainOperator(s.terms, s.atoms)
		total := 0
		checkOpposite(t, s)
		for _, parity := range []int{1, -1} {
			h := mustOperator(t, s.terms, s.atoms, Options{Parity: parity})
			total += h.Dimension()
			name := fmt.Sprintf("%s, parity %+d", s.name, parity)
			x, y := make([]float64, h.Len()), make([]float64, h.Len())
			h.RandomTo(x, 1, 2)
			h.ApplyTo(y, x, h.NewWorkspace(1))
			full, want := plainVector(h, plain.plainBasis, x), make([]float64, plain.Dimension)
			if a, b := dot(x, x), dot(full, full); math.Abs(a-b) > 1e-13*b {
				t.Errorf("%s: |x|^2 = %.17g in the sector, %.17g in the space", name, a, b)
			}
			plain.ApplyTo(want, full)
			checkClose(t, name, plainVector(h, plain.plainBasis, y), want)
		}
		if total != plain.Dimension {
			t.Errorf("%s: sectors of %d states in all, want %d", s.name, total, plain.Dimension)
		}
	}
	if mirrored < 15 {
		t.Errorf("%d systems with a mirror, want at least 15", mirrored)
	}
}

// checkOpposite compares the other sector made from one with the one built.
func checkOpposite(t *testing.T, s system) {
	t.Helper()
	even, odd := mustOperator(t, s.terms, s.atoms, Options{Parity: 1}), mustOperator(t, s.terms, s.atoms, Options{Parity: -1})
	other := even.Opposite()
	x, y, want := make([]float64, odd.Len()), make([]float64, odd.Len()), make([]float64, odd.Len())
	odd.RandomTo(x, 1, 2)
	odd.ApplyTo(want, x, odd.NewWorkspace(1))
	other.ApplyTo(y, x, other.NewWorkspace(1))
	back := other.Opposite()
	if !slices.Equal(y, want) || other.Dimension() != odd.Dimension() || other.Parity() != -1 || back.Dimension() != even.Dimension() {
		t.Errorf("%s: the sector opposite to the even one is not the odd one", s.name)
	}
}

// A limit of the occupation leaves the elements between the states it allows.
func TestMaxOccupation(t *testing.T) {
	for _, s := range systems(t) {
		for most := (s.atoms + s.terms.Sites - 1) / s.terms.Sites; most <= s.atoms; most++ {
			if most == 0 {
				continue
			}
			var allowed [][]int
			for _, state := range everyState(s.terms.Sites, s.atoms) {
				if slices.Max(state) <= most {
					allowed = append(allowed, state)
				}
			}
			h := mustOperator(t, s.terms, s.atoms, Options{MaxOccupation: most})
			if h.Dimension() != len(allowed) {
				t.Errorf("%s, at most %d: dimension %d, want %d", s.name, most, h.Dimension(), len(allowed))
				continue
			}
			random := rand.New(rand.NewPCG(14, 0))
			x, y, want := randomVector(random, h.Len()), make([]float64, h.Len()), make([]float64, h.Len())
			h.ApplyTo(y, x, h.NewWorkspace(1))
			for _, a := range allowed {
				for _, b := range allowed {
					want[h.Rank(a)] += element(s.terms, a, b) * x[h.Rank(b)]
				}
			}
			checkClose(t, fmt.Sprintf("%s, at most %d atoms", s.name, most), y, want)
			if _, ok := s.terms.Mirror(); ok {
				plus := mustOperator(t, s.terms, s.atoms, Options{MaxOccupation: most, Parity: 1})
				minus := mustOperator(t, s.terms, s.atoms, Options{MaxOccupation: most, Parity: -1})
				if n := plus.Dimension() + minus.Dimension(); n != len(allowed) {
					t.Errorf("%s, at most %d: sectors of %d states, want %d", s.name, most, n, len(allowed))
				}
			}
		}
	}
}

// <x, H y> = <H x, y> for random vectors, to the rounding of sums of D terms.
func TestOperatorIsHermitian(t *testing.T) {
	for _, s := range systems(t) {
		for _, parity := range []int{0, 1, -1} {
			if _, ok := s.terms.Mirror(); parity != 0 && !ok {
				continue
			}
			h := mustOperator(t, s.terms, s.atoms, Options{Parity: parity})
			d, w := h.Len(), h.NewWorkspace(1)
			x, y, hx, hy := make([]float64, d), make([]float64, d), make([]float64, d), make([]float64, d)
			h.RandomTo(x, 1, 0)
			h.RandomTo(y, 2, 0)
			h.ApplyTo(hx, x, w)
			h.ApplyTo(hy, y, w)
			left, right := dot(x, hy), dot(hx, y)
			tolerance := 1e-14 * (1 + math.Sqrt(dot(hx, hx)*dot(y, y)))
			if diff := math.Abs(left - right); !(diff <= tolerance) {
				t.Errorf("%s, parity %d: <x,Hy> = %.17g, <Hx,y> = %.17g, difference %.2g > %.2g", s.name, parity, left, right, diff, tolerance)
			}
		}
	}
}

// Moments at infinite temperature: every number state is equally likely, so
//
//	Tr H / D     = U N (N-1) / (L+1)
//	Tr Hkin^2/ D = 2 Nb J^2 [N (N-1) / (L (L+1)) + N / L]
//
// Derived from <n_i (n_i - 1)> = 2 N (N-1) / (L (L+1)). The sums have D terms of
// one sign, so a relative 1e-13 is generous.
func TestOperatorMoments(t *testing.T) {
	for _, tc := range []struct {
		sites, atoms     int
		u, wantH, wantK2 float64
	}{
		{4, 4, 4, 9.6, 12.8},
		{6, 6, 4, 120.0 / 7, 144.0 / 7}, // 17.142857143, 20.571428571
		{8, 5, 2, 40.0 / 9, 130.0 / 9},  // 4.444444444, 14.444444444
	} {
		ring := func(j, u float64) *Operator {
			m := bosehubbard.Model{Axes: []bosehubbard.AxisTerms{axis(j, 0, 0)}, Interaction: u}
			return mustOperator(t, boxTerms(t, []int{tc.sites}, []bool{true}, m), tc.atoms, Options{})
		}
		if got := ring(1, tc.u).TraceMean(); math.Abs(got-tc.wantH) > 1e-13*tc.wantH {
			t.Errorf("ring L=%d N=%d U=%g: Tr H/D = %.15g, want %.15g", tc.sites, tc.atoms, tc.u, got, tc.wantH)
		}
		k := ring(1, 0)
		d := k.Dimension()
		w, unit, column := k.NewWorkspace(1), make([]float64, d), make([]float64, d)
		sum := 0.0
		for i := range d {
			unit[i] = 1
			k.ApplyTo(column, unit, w)
			sum += dot(column, column)
			unit[i] = 0
		}
		if got := sum / float64(d); math.Abs(got-tc.wantK2) > 1e-13*tc.wantK2 {
			t.Errorf("ring L=%d N=%d: Tr Hkin^2/D = %.15g, want %.15g", tc.sites, tc.atoms, got, tc.wantK2)
		}
	}
}

// Tr H of both sectors, against the sum over an orthonormal basis of each.
func TestTraceMean(t *testing.T) {
	for _, s := range systems(t) {
		for _, parity := range []int{0, 1, -1} {
			if _, ok := s.terms.Mirror(); parity != 0 && !ok {
				continue
			}
			h := mustOperator(t, s.terms, s.atoms, Options{Parity: parity})
			x, y, w, sum := make([]float64, h.Len()), make([]float64, h.Len()), h.NewWorkspace(1), 0.0
			for i := range x { // Tr P H, P the projector on the sector
				clear(x)
				x[i] = 1
				h.Project(x)
				h.ApplyTo(y, x, w)
				sum += dot(x, y)
			}
			want := sum / max(1, float64(h.Dimension()))
			if got := h.TraceMean(); math.Abs(got-want) > 1e-12*(1+math.Abs(want)) {
				t.Errorf("%s, parity %d: Tr H/D = %.15g, want %.15g", s.name, parity, got, want)
			}
		}
	}
}

func TestNewOperatorRefuses(t *testing.T) {
	l, err := lattice.Box([]int{6}, []bool{true})
	if err != nil {
		t.Fatal(err)
	}
	one := func(u float64, terms bosehubbard.AxisTerms) bosehubbard.Model {
		return bosehubbard.Model{Axes: []bosehubbard.AxisTerms{terms}, Interaction: u}
	}
	nan, inf := math.NaN(), math.Inf(1)
	for _, tc := range []struct {
		model bosehubbard.Model
		atoms int
		opt   Options
		want  string
	}{
		{bosehubbard.Model{}, 3, Options{}, "model of 0 axes on a lattice of 1"},
		{one(1, axis(1, 0, 0)), -1, Options{}, "-1 atoms"},
		{one(nan, axis(1, 0, 0)), 3, Options{}, "interaction NaN"},
		{one(inf, axis(1, 0, 0)), 3, Options{}, "interaction +Inf"},
		{one(1, axis(nan, 0, 0)), 3, Options{}, "finite"},
		{one(1, axis(-inf, 0, 0)), 3, Options{}, "finite"},
		{one(1, axis(1, nan, 0)), 3, Options{}, "potential NaN"},
		{one(1, axis(1, 0, inf)), 3, Options{}, "finite"},
		{one(1e308, axis(1, 0, 0)), 3, Options{}, "finite"},
		{one(1, axis(1e308, 0, 0)), 3, Options{}, "finite"},
		{one(1, axis(1, 0, 0)), 1_000_000_000, Options{MemoryBytes: 1e9}, "states"},
		{one(1, axis(1, 0, 0)), 3, Options{Vectors: -1}, "-1 vectors"},
		{one(1, axis(1, 0, 0)), 3, Options{Parity: 2}, "parity 2"},
		{one(1, axis(1, 0, 1)), 3, Options{Parity: -1}, "without a mirror"},
		{one(1, axis(1, 0, 0)), 3, Options{MaxOccupation: -1}, "at most -1 atoms"},
		{one(1, axis(1, 0, 0)), 13, Options{MaxOccupation: 2}, "no room for 13"},
	} {
		h, err := NewOperator(context.Background(), l, tc.model, tc.atoms, tc.opt)
		if err == nil || h != nil || !strings.Contains(err.Error(), tc.want) {
			t.Errorf("NewOperator(%+v, %d atoms, %+v) = %v, want an error with %q", tc.model, tc.atoms, tc.opt, err, tc.want)
		}
	}
	for _, terms := range []*Terms{
		{Sites: 0}, {Sites: 3, Potential: []float64{1}}, {Sites: 3, Hops: []Hop{{0, 3, 1}}},
		{Sites: 3, Hops: []Hop{{1, 1, 1}}}, {Sites: 3, Hops: []Hop{{-1, 1, 1}}},
	} {
		if h, err := NewOperatorOf(context.Background(), terms, 2, Options{}); err == nil || h != nil {
			t.Errorf("terms %+v: no error", *terms)
		}
	}
	stopped, cancel := context.WithCancel(context.Background())
	cancel()
	if _, err := NewOperator(stopped, l, one(1, axis(1, 0, 0)), 6, Options{}); !errors.Is(err, context.Canceled) {
		t.Errorf("NewOperator with a stopped context: %v, want context.Canceled", err)
	}
}
