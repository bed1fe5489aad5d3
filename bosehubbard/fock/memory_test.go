package fock

import (
	"errors"
	"math"
	"strings"
	"testing"
	"time"
)

func TestFitCountsTheStates(t *testing.T) {
	d, err := Fit(12, 12, Options{MemoryBytes: 1 << 30, Vectors: 5})
	if err != nil || d != 1352078 {
		t.Errorf("Fit(12, 12) in 1 GiB = %d, %v, want 1352078", d, err)
	}
}

// The need is that of bytesWanted, and one byte decides.
func TestFitAtTheEdge(t *testing.T) {
	need := bytesWanted(10, 10, Options{Vectors: 3})
	if vectors := 8.0 * 92378 * 3; need < vectors || need > 1.35*vectors { // halves of 3003 states
		t.Errorf("10 on 10 needs %g bytes, three vectors alone %g", need, vectors)
	}
	if _, err := Fit(10, 10, Options{MemoryBytes: uint64(need) + 1, Vectors: 3}); err != nil {
		t.Errorf("with one byte to spare: %v", err)
	}
	var large *TooLargeError
	if _, err := Fit(10, 10, Options{MemoryBytes: uint64(need) - 1, Vectors: 3}); !errors.As(err, &large) {
		t.Fatalf("with one byte too few: %v, want a *TooLargeError", err)
	}
	if large.BytesWanted != need || large.BytesAvailable != uint64(need)-1 || large.LargestSites != 9 ||
		large.Dimension != "92378" || large.Sites != 10 || large.Atoms != 10 {
		t.Errorf("got %+v, want %g bytes for 92378 states and 9 sites", *large, need)
	}
}

func TestFitRefusesTheImpossible(t *testing.T) {
	opt := Options{MemoryBytes: 8e9, Vectors: 3}
	for _, tc := range []struct {
		sites, atoms, largest int
		text                  []string
	}{
		// D(16, 16) = 300540195 needs 7.2 GB for three vectors, D(17, 17) = 1166803110 28 GB.
		{20, 20, 16, []string{"68923264410 states", "1.67 TB", "8 GB", "16 sites"}},
		{22, 22, 16, []string{"1052049481860 states", "25.3 TB"}}, // dimension 1e12
		// D(22, 11) = 129024480 needs 3.1 GB, D(23, 12) = 548354040 needs 13.2 GB.
		{40, 20, 22, []string{"67.1 PB", "22 sites"}},
		{100, 100, 16, []string{"4.527e+58 states", "1.09e+60 bytes"}},
		{2, 1_000_000_000, 1, []string{"1000000001 states", "130 GB"}},
		{12, 1_000_000_000, 1, []string{"e+91 states"}},
		{1_000_000, 1_000_000_000, 3, []string{"e+", "over 1e+300 bytes"}},
		{math.MaxInt, math.MaxInt, 16, []string{"10^(5.553e+18) states", "over 1e+300 bytes"}},
		{math.MaxInt, 3, -1, []string{"states"}},
	} {
		start := time.Now()
		_, err := Fit(tc.sites, tc.atoms, opt)
		spent := time.Since(start)
		var large *TooLargeError
		if !errors.As(err, &large) {
			t.Errorf("Fit(%d, %d) = %v, want a *TooLargeError", tc.sites, tc.atoms, err)
			continue
		}
		t.Log(err)
		if tc.largest >= 0 && large.LargestSites != tc.largest {
			t.Errorf("Fit(%d, %d): largest %d sites, want %d", tc.sites, tc.atoms, large.LargestSites, tc.largest)
		}
		for _, part := range tc.text {
			if !strings.Contains(err.Error(), part) {
				t.Errorf("Fit(%d, %d): %q, want it to say %q", tc.sites, tc.atoms, err, part)
			}
		}
		if math.IsInf(large.BytesWanted, 0) || math.IsNaN(large.BytesWanted) || len(err.Error()) > 300 || spent > 50*time.Millisecond {
			t.Errorf("Fit(%d, %d): %d bytes of text after %v, %g bytes wanted", tc.sites, tc.atoms, len(err.Error()), spent, large.BytesWanted)
		}
	}
}

// The largest size fits, one site more does not.
func TestLargestSitesIsTheEdge(t *testing.T) {
	for _, filling := range []struct{ sites, atoms int }{{60, 60}, {60, 30}, {60, 20}, {60, 6}, {60, 120}, {60, 1}} {
		opt := Options{MemoryBytes: 5e4, Vectors: 3}
		_, err := Fit(filling.sites, filling.atoms, opt)
		var large *TooLargeError
		if !errors.As(err, &large) {
			if filling.atoms != 1 {
				t.Errorf("Fit(%v) = %v, want a *TooLargeError", filling, err)
			}
			continue
		}
		inProportion := func(l int) int { return (filling.atoms*l + filling.sites - 1) / filling.sites }
		l := large.LargestSites
		if _, err := Fit(l, inProportion(l), opt); err != nil {
			t.Errorf("%v: the largest size %d: %v", filling, l, err)
		}
		if _, err := Fit(l+1, inProportion(l+1), opt); err == nil {
			t.Errorf("%v: %d sites fit, more than the largest size %d", filling, l+1, l)
		}
	}
}

func TestFitBadInput(t *testing.T) {
	for _, tc := range []struct {
		sites, atoms, vectors int
		want                  string
	}{{0, 1, 0, "0 sites"}, {3, -2, 0, "-2 atoms"}, {3, 3, -1, "-1 vectors"}} {
		_, err := Fit(tc.sites, tc.atoms, Options{Vectors: tc.vectors})
		var large *TooLargeError
		if err == nil || errors.As(err, &large) || !strings.Contains(err.Error(), tc.want) {
			t.Errorf("Fit(%d, %d, %d vectors) = %v, want %q", tc.sites, tc.atoms, tc.vectors, err, tc.want)
		}
	}
}

func TestMemAvailable(t *testing.T) {
	for _, tc := range []struct {
		text string
		want uint64
	}{
		{"MemTotal:  24105000 kB\nMemFree: 1 kB\nMemAvailable:   23769000 kB\n", 23769000 << 10},
		{"MemTotal:  24105000 kB\n", DefaultMemory},
		{"MemAvailable: lots kB\n", DefaultMemory},
		{"MemAvailable: 99999999999999999999 kB\n", DefaultMemory},
		{"", DefaultMemory},
	} {
		if got := memAvailable(strings.NewReader(tc.text)); got != tc.want {
			t.Errorf("memAvailable(%q) = %d, want %d", tc.text, got, tc.want)
		}
	}
	if AvailableMemory() == 0 {
		t.Error("AvailableMemory() = 0")
	}
}

func TestBytesText(t *testing.T) {
	for _, tc := range []struct {
		bytes float64
		want  string
	}{{0, "0 B"}, {999, "999 B"}, {1000, "1 kB"}, {999600, "1 MB"}, {1.5e9, "1.5 GB"}, {2.2e18, "2.2 EB"}, {3e25, "3e+25 bytes"}} {
		if got := bytesText(tc.bytes); got != tc.want {
			t.Errorf("bytesText(%g) = %q, want %q", tc.bytes, got, tc.want)
		}
	}
}
