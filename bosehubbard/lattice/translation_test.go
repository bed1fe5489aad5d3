package lattice

import (
	"slices"
	"testing"
)

// Translations keep the set of bonds, come back after their order and no earlier,
// and commute.
func TestTranslations(t *testing.T) {
	for _, tc := range []struct {
		l      *Lattice
		orders []int
	}{
		{mustBox(t, []int{5}, []bool{false}), nil},
		{mustBox(t, []int{5}, []bool{true}), []int{5}},
		{mustBox(t, []int{2}, []bool{true}), []int{2}},
		{mustBox(t, []int{1}, []bool{true}), nil},
		{mustBox(t, []int{3, 4}, []bool{true, true}), []int{3, 4}},
		{mustBox(t, []int{3, 4, 2}, []bool{false, true, true}), []int{4, 2}},
		{mustBuild(t, Ladder, []int{4}, true), []int{4}},
		{mustBuild(t, Triangular, []int{3, 4}, true), []int{3, 4}},
		{mustBuild(t, Honeycomb, []int{2, 3}, true), []int{2, 3}},
		{mustBuild(t, Kagome, []int{3, 2}, true), []int{3, 2}},
		{mustBuild(t, Kagome, []int{3, 2}, false), nil},
	} {
		var orders []int
		for _, tr := range tc.l.Translations {
			orders = append(orders, tr.Order)
			checkTranslation(t, tc.l, tr)
			for _, other := range tc.l.Translations {
				for i := range tr.Place {
					if tr.Place[other.Place[i]] != other.Place[tr.Place[i]] {
						t.Fatalf("translations of %d sites do not commute", tc.l.Sites)
					}
				}
			}
		}
		if !slices.Equal(orders, tc.orders) {
			t.Errorf("%d sites: orders %v, want %v", tc.l.Sites, orders, tc.orders)
		}
	}
}

func checkTranslation(t *testing.T, l *Lattice, tr Translation) {
	t.Helper()
	type key struct{ low, high, axis int }
	bonds := map[key]bool{}
	for _, b := range l.Bonds {
		bonds[key{min(b.From, b.To), max(b.From, b.To), b.Axis}] = true
	}
	for _, b := range l.Bonds {
		i, j := tr.Place[b.From], tr.Place[b.To]
		if !bonds[key{min(i, j), max(i, j), b.Axis}] {
			t.Errorf("%d sites: bond %v goes to sites %d and %d, which have none along its axis", l.Sites, b, i, j)
		}
	}
	for site := range l.Sites {
		at := site
		for step := 1; step <= tr.Order; step++ {
			at = tr.Place[at]
			if (at == site) != (step == tr.Order) {
				t.Fatalf("%d sites: site %d is at %d after %d of %d steps", l.Sites, site, at, step, tr.Order)
			}
		}
	}
}
