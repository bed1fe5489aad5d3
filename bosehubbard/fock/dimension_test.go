package fock

import (
	"math"
	"math/big"
	"testing"
	"time"
)

// Dimensions of N = L: C(2N-1, N).
func TestDimensionKnown(t *testing.T) {
	for _, tc := range []struct {
		sites, atoms int
		want         string
	}{
		{1, 0, "1"}, {7, 0, "1"}, {1, 1_000_000_000, "1"}, {2, 1_000_000, "1000001"}, {1000, 1, "1000"},
		{4, 4, "35"}, {5, 5, "126"}, {6, 6, "462"}, {8, 8, "6435"}, {9, 9, "24310"}, {10, 10, "92378"}, {12, 12, "1352078"},
		{20, 20, "68923264410"}, {34, 34, "14226520737620288370"}, // the first that passes 2^63
		{2, math.MaxInt, "9223372036854775808"},
	} {
		got, err := Dimension(tc.sites, tc.atoms)
		if err != nil || got.String() != tc.want {
			t.Errorf("Dimension(%d, %d) = %v, %v, want %s", tc.sites, tc.atoms, got, err, tc.want)
		}
	}
}

// Pascal's rule, and the logarithm against the exact number.
func TestDimensionPascalAndLogarithm(t *testing.T) {
	for sites := 2; sites <= 60; sites += 3 {
		for atoms := 1; atoms <= 90; atoms += 4 {
			d, err := Dimension(sites, atoms)
			if err != nil {
				t.Fatal(err)
			}
			fewerSites, _ := Dimension(sites-1, atoms)
			fewerAtoms, _ := Dimension(sites, atoms-1)
			if sum := new(big.Int).Add(fewerSites, fewerAtoms); d.Cmp(sum) != 0 {
				t.Errorf("D(%d, %d) = %v, want %v", sites, atoms, d, sum)
			}
			value, _ := new(big.Float).SetInt(d).Float64()
			if got, want := LogDimension(sites, atoms), math.Log(value); math.Abs(got-want) > 1e-13*want {
				t.Errorf("LogDimension(%d, %d) = %.17g, want %.17g", sites, atoms, got, want)
			}
		}
	}
}

// Stirling's series, used beyond a thousand factors, against the exact number.
func TestLogDimensionStirling(t *testing.T) {
	for _, tc := range [][2]int{{1002, 1001}, {1002, 1_000_000}, {5000, 3000}, {1500, 40_000}} {
		d, err := Dimension(tc[0], tc[1])
		if err != nil {
			t.Fatal(err)
		}
		var mantissa big.Float
		exponent := new(big.Float).SetInt(d).MantExp(&mantissa)
		m, _ := mantissa.Float64()
		want := math.Log(m) + float64(exponent)*math.Ln2
		if got := LogDimension(tc[0], tc[1]); math.Abs(got-want) > 1e-13*want {
			t.Errorf("LogDimension(%d, %d) = %.17g, want %.17g", tc[0], tc[1], got, want)
		}
	}
}

func TestDimensionRefuses(t *testing.T) {
	for _, tc := range [][2]int{{0, 3}, {-1, 3}, {3, -1}, {1_000_000, 1_000_000_000}, {math.MaxInt, math.MaxInt}} {
		start := time.Now()
		if d, err := Dimension(tc[0], tc[1]); err == nil || d != nil {
			t.Errorf("Dimension(%d, %d) = %v, want an error", tc[0], tc[1], d)
		}
		if spent := time.Since(start); spent > 100*time.Millisecond {
			t.Errorf("Dimension(%d, %d) took %v to refuse", tc[0], tc[1], spent)
		}
	}
	if got := LogDimension(-3, 5); got != 0 {
		t.Errorf("LogDimension(-3, 5) = %g, want 0", got)
	}
}

func TestDimensionText(t *testing.T) {
	for _, tc := range []struct {
		sites, atoms int
		want         string
	}{
		{20, 20, "68923264410"},
		// C(199, 100) = 4.527e58 (half of C(200, 100) = 9.0548514656e58)
		{100, 100, "4.527e+58"},
	} {
		if got := dimensionText(tc.sites, tc.atoms); got != tc.want {
			t.Errorf("dimensionText(%d, %d) = %q, want %q", tc.sites, tc.atoms, got, tc.want)
		}
	}
	// Every text is the start of the exact number.
	for n := 60; n <= 4000; n += 79 {
		d, err := Dimension(n, n)
		if err != nil {
			t.Fatal(err)
		}
		want := new(big.Float).SetInt(d).Text('e', 3)
		if got := dimensionText(n, n); got != want {
			t.Errorf("dimensionText(%d, %d) = %q, want %q", n, n, got, want)
		}
	}
}
