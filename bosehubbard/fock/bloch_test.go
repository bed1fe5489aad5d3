package fock

import (
	"context"
	"errors"
	"fmt"
	"math"
	"slices"
	"strings"
	"testing"

	"gonum.org/v1/gonum/mat"

	"hilltop/bosehubbard"
	"hilltop/bosehubbard/lattice"
)

// closed are periodic systems with one and two translations.
func closed(t testing.TB) []system {
	patch := func(kind lattice.Kind, cells ...int) *Terms {
		l, err := lattice.Build(kind, cells, true)
		if err != nil {
			t.Fatal(err)
		}
		m := bosehubbard.Model{Interaction: 1.7}
		for a := range l.Axes {
			m.Axes = append(m.Axes, bosehubbard.AxisTerms{Tunnelling: 1 - 0.3*float64(a)})
		}
		terms, err := TermsOf(l, m)
		if err != nil {
			t.Fatal(err)
		}
		return terms
	}
	return []system{
		{"ring of five", patch(lattice.Chain, 5), 4}, {"ring of six", patch(lattice.Chain, 6), 4},
		{"closed ladder", patch(lattice.Ladder, 3), 3}, {"square torus", patch(lattice.Square, 3, 3), 3},
		{"triangular torus", patch(lattice.Triangular, 3, 3), 3}, {"kagome torus", patch(lattice.Kagome, 2, 2), 2},
		{"honeycomb torus", patch(lattice.Honeycomb, 2, 3), 2},
	}
}

// momenta lists the numbers of all quasi-momenta.
func momenta(t *Terms) [][]int {
	list := [][]int{nil}
	for _, tr := range t.Translations {
		var longer [][]int
		for _, m := range list {
			for k := range tr.Order {
				longer = append(longer, append(slices.Clone(m), k))
			}
		}
		list = longer
	}
	return list
}

func mustBloch(t testing.TB, s system, m []int, opt Options) *Bloch {
	t.Helper()
	b, err := NewBloch(context.Background(), s.terms, s.atoms, m, 2, opt)
	if err != nil {
		t.Fatal(err)
	}
	return b
}

// levels diagonalises a product; of a complex sector each level comes twice.
func levels(t testing.TB, n int, apply func(dst, x []float64)) []float64 {
	t.Helper()
	if n == 0 {
		return nil
	}
	full, column, unit := mat.NewSymDense(n, nil), make([]float64, n), make([]float64, n)
	for j := range n {
		unit[j] = 1
		apply(column, unit)
		unit[j] = 0
		for i := range j + 1 {
			full.SetSym(i, j, column[i])
		}
	}
	var eig mat.EigenSym
	if !eig.Factorize(full, false) {
		t.Fatal("dense diagonalisation failed")
	}
	return eig.Values(nil)
}

// The sectors of all quasi-momenta together have the spectrum of the space, and so
// have their dimensions.
func TestBlochSectorsMakeTheSpectrum(t *testing.T) {
	for _, s := range closed(t) {
		for _, most := range []int{0, 2} {
			h := mustOperator(t, s.terms, s.atoms, Options{MaxOccupation: most})
			w := h.NewWorkspace(1)
			want := levels(t, h.Len(), func(dst, x []float64) { h.ApplyTo(dst, x, w) })
			var got []float64
			for _, m := range momenta(s.terms) {
				b := mustBloch(t, s, m, Options{MaxOccupation: most})
				values := levels(t, b.Len(), func(dst, x []float64) { _, _ = b.Combine(context.Background(), dst, x, 1, 0) })
				for i := 0; i < b.Dimension(); i++ {
					got = append(got, values[i*b.Len()/b.Dimension()])
				}
			}
			slices.Sort(got)
			if len(got) != len(want) {
				t.Errorf("%s, at most %d: %d levels in all sectors, want %d", s.name, most, len(got), len(want))
				continue
			}
			for i := range want {
				if math.Abs(got[i]-want[i]) > 1e-11 {
					t.Errorf("%s, at most %d: level %d = %.14g, want %.14g", s.name, most, i, got[i], want[i])
					break
				}
			}
		}
	}
}

// Hermitian, c dst is added, dst is not read with c = 0, and the sum is x.dst.
func TestBlochCombine(t *testing.T) {
	ctx := context.Background()
	for _, s := range closed(t) {
		for _, m := range momenta(s.terms)[:3] {
			b := mustBloch(t, s, m, Options{})
			n := b.Len()
			x, y, hx, hy, sum := make([]float64, n), make([]float64, n), make([]float64, n), make([]float64, n), make([]float64, n)
			for i := range n {
				x[i], y[i] = math.Sin(float64(i*i)), math.Cos(float64(3*i))
				hx[i], sum[i] = math.NaN(), y[i]
			}
			xy, err := b.Combine(ctx, hx, x, 1, 0)
			_, err2 := b.Combine(ctx, hy, y, 1, 0)
			_, err3 := b.Combine(ctx, sum, x, 0.5, -2)
			if err := errors.Join(err, err2, err3); err != nil {
				t.Fatal(err)
			}
			name := fmt.Sprintf("%s, quasi-momentum %v", s.name, m)
			if left, right := dot(x, hy), dot(hx, y); math.Abs(left-right) > 1e-12*(1+math.Abs(left)) {
				t.Errorf("%s: <x,Hy> = %.15g, <Hx,y> = %.15g", name, left, right)
			}
			if want := dot(x, hx); math.Abs(xy-want) > 1e-12*(1+math.Abs(want)) {
				t.Errorf("%s: x.dst = %.15g, want %.15g", name, xy, want)
			}
			for i := range sum {
				hx[i] = 0.5*hx[i] - 2*y[i]
			}
			checkClose(t, name, sum, hx)
		}
	}
}

func TestNewBlochRefuses(t *testing.T) {
	s := closed(t)[1]
	open := chainTerms(t, 4)
	trapped := *s.terms
	trapped.Potential = []float64{0, 0, 0, 0, 0, 1}
	for _, tc := range []struct {
		terms *Terms
		m     []int
		opt   Options
		want  string
	}{
		{open, []int{0}, Options{}, "without translations"},
		{s.terms, []int{0, 1}, Options{}, "want 1 numbers"},
		{&trapped, []int{0}, Options{}, "no symmetry"},
		{s.terms, []int{0}, Options{MaxOccupation: -2}, "at most -2"},
		{s.terms, []int{0}, Options{MemoryBytes: 100}, "need"},
	} {
		if b, err := NewBloch(context.Background(), tc.terms, 4, tc.m, 1, tc.opt); err == nil || b != nil || !strings.Contains(err.Error(), tc.want) {
			t.Errorf("quasi-momentum %v: %v, want an error with %q", tc.m, err, tc.want)
		}
	}
	ctx, cancel := context.WithCancel(context.Background())
	cancel()
	if _, err := NewBloch(ctx, s.terms, 4, []int{0}, 2, Options{}); !errors.Is(err, context.Canceled) {
		t.Errorf("stopped: %v, want context.Canceled", err)
	}
}
