package thermo

import (
	"fmt"
	"math"
	"strings"
	"testing"
)

func TestJudgeLevels(t *testing.T) {
	spins := Levels{Energies: []float64{-8000, 8000}, Bodies: 1e20, InnerTime: 1e-4, OuterTime: 300}
	for _, tc := range []struct {
		name    string
		change  func(l *Levels)
		energy  float64
		sign    int
		verdict string
		reasons int
	}{
		{"inverted", func(*Levels) {}, 5000, -1, "sealed", 0},
		{"wanted above", func(*Levels) {}, 5000, 1, "astray", 1},
		{"not inverted", func(*Levels) {}, -5000, -1, "astray", 1},
		{"saturated", func(*Levels) {}, 0, -1, "astray", 1},
		{"top", func(*Levels) {}, 8000, -1, "sealed", 0},
		{"bottom", func(*Levels) {}, -8000, 1, "sealed", 0},
		{"fast loss", func(l *Levels) { l.OuterTime = 9.9e-4 }, 5000, -1, "leaky", 1},
		{"ten inner times", func(l *Levels) { l.InnerTime, l.OuterTime = 1, 10 }, 5000, -1, "sealed", 0},
		{"endless", func(l *Levels) { l.Unbounded = true }, 5000, -1, "open", 1},
		{"all at once", func(l *Levels) { l.Unbounded, l.OuterTime = true, 1e-5 }, -5000, -1, "open", 3},
	} {
		l := spins
		tc.change(&l)
		j, err := l.Judge(tc.energy, tc.sign)
		if err != nil {
			t.Fatal(err)
		}
		if j.Verdict != tc.verdict || len(j.Reasons) != tc.reasons {
			t.Errorf("%s: %s because of %q, want %s with %d reasons", tc.name, j.Verdict, j.Reasons, tc.verdict, tc.reasons)
		}
	}
	j, err := spins.Judge(5000, -1)
	if err != nil || !near(j.Window, 300-1e-4, 1e-15) || !near(j.TimeRatio, 3e6, 1e-12) || !(j.State.Kelvin < 0) {
		t.Errorf("%+v, %v", j, err)
	}
	spins.OuterTime = 5e-5
	if j, err = spins.Judge(5000, -1); err != nil || j.Window != 0 {
		t.Errorf("outer time below the inner: window %g, %v, want 0", j.Window, err)
	}
}

func TestJudgeLevelsRefused(t *testing.T) {
	spins := Levels{Energies: []float64{-8000, 8000}, InnerTime: 1e-4, OuterTime: 300}
	if _, err := spins.Judge(5000, 0); err == nil {
		t.Error("sign 0: no error")
	}
	if _, err := spins.Judge(8001, -1); err == nil {
		t.Error("energy out of range: no error")
	}
	for _, time := range []float64{0, -1, math.NaN(), math.Inf(1)} {
		l := spins
		l.InnerTime = time
		if _, err := l.Judge(5000, -1); err == nil || !strings.Contains(err.Error(), "inner time") {
			t.Errorf("inner time %g: %v", time, err)
		}
		l = spins
		l.OuterTime = time
		if _, err := l.Judge(5000, -1); err == nil || !strings.Contains(err.Error(), "outer time") {
			t.Errorf("outer time %g: %v", time, err)
		}
	}
}

func ExampleLevels_Judge() {
	spins := Levels{Energies: []float64{-8000, 8000}, Bodies: 1e20, InnerTime: 1e-4, OuterTime: 300}
	j, err := spins.Judge(5000, -1)
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("%s, beta %.4g per Hz, T %.3g K, S %.3f kB\n", j.Verdict, j.State.Beta, j.State.Kelvin, j.State.Entropy)
	// Output: sealed, beta -9.165e-05 per Hz, T -5.24e-07 K, S 0.483 kB
}
