package fock

import (
	"context"
	"errors"
	"fmt"
	"math"
	"math/rand/v2"
	"strings"
	"testing"

	"hilltop/bosehubbard"
	"hilltop/bosehubbard/lattice"
)

// axis returns the terms of one axis in the order J, V, F.
func axis(j, v, f float64) bosehubbard.AxisTerms {
	return bosehubbard.AxisTerms{Tunnelling: j, Curvature: v, Tilt: f}
}

func mustOperator(t testing.TB, sites []int, periodic []bool, m bosehubbard.Model, atoms int) *Operator {
	t.Helper()
	l, err := lattice.Box(sites, periodic)
	if err != nil {
		t.Fatal(err)
	}
	h, err := NewOperator(context.Background(), l, m, atoms, Options{})
	if err != nil {
		t.Fatal(err)
	}
	return h
}

// system is one box with one model; systems covers every kind of term and shape.
type system struct {
	name     string
	sites    []int
	periodic []bool
	model    bosehubbard.Model
	atoms    int
}

func systems() []system {
	x, y, z := axis(1.3, -0.2, 0.4), axis(-0.7, 0.1, -0.3), axis(0.5, 0.9, 0)
	model := func(u float64, axes ...bosehubbard.AxisTerms) bosehubbard.Model {
		return bosehubbard.Model{Axes: axes, Interaction: u}
	}
	return []system{
		{"one site", []int{1}, []bool{false}, model(3, x), 4},
		{"no atoms", []int{4}, []bool{true}, model(3, x), 0},
		{"one atom", []int{5}, []bool{true}, model(3, x), 1},
		{"two sites", []int{2}, []bool{true}, model(4, x), 5},
		{"open chain", []int{5}, []bool{false}, model(-2.1, x), 4},
		{"ring", []int{5}, []bool{true}, model(4, x), 5},
		{"rectangle", []int{2, 3}, []bool{false, false}, model(1.7, x, y), 4},
		{"cylinder", []int{3, 3}, []bool{true, false}, model(-1.7, x, y), 3},
		{"torus", []int{3, 4}, []bool{true, true}, model(9, x, y), 2},
		{"cube", []int{2, 2, 2}, []bool{false, false, true}, model(-6, x, y, z), 3},
		{"frozen axis", []int{3, 2}, []bool{true, false}, model(-6, x, axis(0, 1, 1)), 3},
	}
}

// element returns <a|H|b> from the definition: the diagonal, or one atom moved
// along one bond.
func element(l *lattice.Lattice, m bosehubbard.Model, a, b []int) float64 {
	sum := 0.0
	for _, bond := range l.Bonds {
		for _, way := range [][2]int{{bond.From, bond.To}, {bond.To, bond.From}} {
			moved := append([]int(nil), b...) // b_to^+ b_from |b>
			moved[way[0]]--
			moved[way[1]]++
			if moved[way[0]] >= 0 && fmt.Sprint(moved) == fmt.Sprint(a) {
				sum -= m.Axes[bond.Axis].Tunnelling * math.Sqrt(float64(b[way[0]])) * math.Sqrt(float64(moved[way[1]]))
			}
		}
	}
	if fmt.Sprint(a) == fmt.Sprint(b) {
		for i, n := range b {
			sum += m.Interaction / 2 * float64(n*(n-1))
			for ax, terms := range m.Axes {
				x := l.Positions[i][ax]
				sum += float64(n) * (terms.Curvature*x*x + terms.Tilt*x)
			}
		}
	}
	return sum
}

// Every matrix element, read off by applying H to unit vectors.
func TestOperatorElements(t *testing.T) {
	const tolerance = 1e-14 // a few roundings of the largest term
	for _, s := range systems() {
		l, err := lattice.Box(s.sites, s.periodic)
		if err != nil {
			t.Fatal(err)
		}
		h := mustOperator(t, s.sites, s.periodic, s.model, s.atoms)
		d, w := h.Basis.Dimension, NewWorkspace(h.Basis)
		states := everyState(l.Sites, s.atoms)
		column, unit := make([]float64, d), make([]float64, d)
		for j := range d {
			unit[j] = 1
			h.ApplyTo(column, unit, w)
			unit[j] = 0
			for i := range d {
				want := element(l, s.model, states[i], states[j])
				if diff := math.Abs(column[i] - want); diff > tolerance*(1+50*math.Abs(want)) {
					t.Errorf("%s: <%v|H|%v> = %.17g, want %.17g, difference %.2g", s.name, states[i], states[j], column[i], want, diff)
				}
			}
		}
	}
}

func randomVector(random *rand.Rand, n int) []float64 {
	x := make([]float64, n)
	for i := range x {
		x[i] = random.NormFloat64()
	}
	return x
}

func dot(x, y []float64) float64 {
	sum := 0.0
	for i := range x {
		sum += x[i] * y[i]
	}
	return sum
}

// <x, H y> = <H x, y> for random vectors, to the rounding of sums of D terms.
func TestOperatorIsHermitian(t *testing.T) {
	random := rand.New(rand.NewPCG(11, 0))
	for _, s := range systems() {
		h := mustOperator(t, s.sites, s.periodic, s.model, s.atoms)
		d, w := h.Basis.Dimension, NewWorkspace(h.Basis)
		x, y := randomVector(random, d), randomVector(random, d)
		hx, hy := make([]float64, d), make([]float64, d)
		h.ApplyTo(hx, x, w)
		h.ApplyTo(hy, y, w)
		left, right := dot(x, hy), dot(hx, y)
		tolerance := 1e-14 * math.Sqrt(dot(hx, hx)*dot(y, y))
		if diff := math.Abs(left - right); !(diff <= tolerance) {
			t.Errorf("%s: <x,Hy> = %.17g, <Hx,y> = %.17g, difference %.2g > %.2g", s.name, left, right, diff, tolerance)
		}
	}
}

// Rows in any split give the same bits, and nothing outside them is touched.
func TestApplyRowsInParts(t *testing.T) {
	random := rand.New(rand.NewPCG(12, 0))
	h := mustOperator(t, []int{3, 2}, []bool{true, false}, bosehubbard.Model{Axes: []bosehubbard.AxisTerms{axis(1, 0.1, 0), axis(2, 0, 0.3)}, Interaction: -3}, 5)
	d, w := h.Basis.Dimension, NewWorkspace(h.Basis)
	x, whole := randomVector(random, d), make([]float64, d)
	h.ApplyTo(whole, x, w)
	for range 50 {
		from := random.IntN(d)
		to := from + random.IntN(d-from+1)
		part := make([]float64, d)
		for i := range part {
			part[i] = math.NaN()
		}
		h.ApplyRowsTo(part, x, from, to, w)
		for i := range part {
			if inside := i >= from && i < to; inside && part[i] != whole[i] || !inside && !math.IsNaN(part[i]) {
				t.Fatalf("rows %d to %d: dst[%d] = %g, all rows give %g", from, to, i, part[i], whole[i])
			}
		}
	}
}

func TestApplyAllocatesNothing(t *testing.T) {
	h := mustOperator(t, []int{6}, []bool{true}, bosehubbard.Model{Axes: []bosehubbard.AxisTerms{axis(1, 0.1, 0)}, Interaction: 4}, 6)
	w := NewWorkspace(h.Basis)
	x, y := make([]float64, 462), make([]float64, 462)
	if n := testing.AllocsPerRun(20, func() { h.ApplyTo(y, x, w) }); n != 0 {
		t.Errorf("ApplyTo allocates %g times, want 0", n)
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
			return mustOperator(t, []int{tc.sites}, []bool{true}, bosehubbard.Model{Axes: []bosehubbard.AxisTerms{axis(j, 0, 0)}, Interaction: u}, tc.atoms)
		}
		sum := 0.0
		h := ring(1, tc.u)
		for _, e := range h.Diagonal() {
			sum += e
		}
		d := h.Basis.Dimension
		if got := sum / float64(d); math.Abs(got-tc.wantH) > 1e-13*tc.wantH {
			t.Errorf("ring L=%d N=%d U=%g: Tr H/D = %.15g, want %.15g", tc.sites, tc.atoms, tc.u, got, tc.wantH)
		}
		k := ring(1, 0)
		w, unit, column := NewWorkspace(k.Basis), make([]float64, d), make([]float64, d)
		sum = 0
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
		want  string
	}{
		{bosehubbard.Model{}, 3, "model of 0 axes on a lattice of 1"},
		{one(1, axis(1, 0, 0)), -1, "-1 atoms"},
		{one(nan, axis(1, 0, 0)), 3, "interaction NaN"},
		{one(inf, axis(1, 0, 0)), 3, "interaction +Inf"},
		{one(1, axis(nan, 0, 0)), 3, "finite"},
		{one(1, axis(-inf, 0, 0)), 3, "finite"},
		{one(1, axis(1, nan, 0)), 3, "potential NaN"},
		{one(1, axis(1, 0, inf)), 3, "finite"},
		{one(1e308, axis(1, 0, 0)), 3, "finite"},
		{one(1, axis(1e308, 0, 0)), 3, "finite"},
		{one(1, axis(1, 0, 0)), 1_000_000_000, "states"},
	} {
		h, err := NewOperator(context.Background(), l, tc.model, tc.atoms, Options{MemoryBytes: 1e9})
		if err == nil || h != nil || !strings.Contains(err.Error(), tc.want) {
			t.Errorf("NewOperator(%+v, %d atoms) = %v, want an error with %q", tc.model, tc.atoms, err, tc.want)
		}
	}
	stopped, cancel := context.WithCancel(context.Background())
	cancel()
	if _, err := NewOperator(stopped, l, one(1, axis(1, 0, 0)), 6, Options{}); !errors.Is(err, context.Canceled) {
		t.Errorf("NewOperator with a stopped context: %v, want context.Canceled", err)
	}
}

func TestApplyPanicsOnMisuse(t *testing.T) {
	h := mustOperator(t, []int{3}, []bool{true}, bosehubbard.Model{Axes: []bosehubbard.AxisTerms{axis(1, 0, 0)}}, 2)
	w, other := NewWorkspace(h.Basis), NewWorkspace(mustBasis(t, 3, 2))
	six, five := make([]float64, 6), make([]float64, 5)
	for name, misuse := range map[string]func(){
		"short dst":       func() { h.ApplyTo(five, six, w) },
		"short x":         func() { h.ApplyTo(six, five, w) },
		"row 7":           func() { h.ApplyRowsTo(six, six, 0, 7, w) },
		"backwards":       func() { h.ApplyRowsTo(six, six, 3, 2, w) },
		"other workspace": func() { h.ApplyTo(six, six, other) },
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

func BenchmarkApply(b *testing.B) {
	for _, size := range []int{8, 10, 12} {
		for _, ring := range []bool{false, true} {
			b.Run(fmt.Sprintf("sites=%d/atoms=%d/ring=%v", size, size, ring), func(b *testing.B) {
				h := mustOperator(b, []int{size}, []bool{ring}, bosehubbard.Model{Axes: []bosehubbard.AxisTerms{axis(1, -0.05, 0)}, Interaction: -2.1}, size)
				w := NewWorkspace(h.Basis)
				x, y := make([]float64, h.Basis.Dimension), make([]float64, h.Basis.Dimension)
				b.ReportAllocs()
				for b.Loop() {
					h.ApplyTo(y, x, w)
				}
			})
		}
	}
}
