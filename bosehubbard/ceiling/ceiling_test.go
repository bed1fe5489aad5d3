package ceiling

import (
	"fmt"
	"math"
	"slices"
	"testing"
)

// flip is a system like that of Braun et al., Science 339, 52 (2013), in round
// numbers: two axes that move, one layered by gravity.
func flip(sign Sign) *System {
	s := float64(sign)
	axis := Axis{Tunnelling: 467, Band: Interval{-902, 970}, Gap: 27782, Curvature: s * 0.48, Trap: s * 43}
	x, y, z := axis, axis, axis
	x.Name, y.Name, z.Name = "x", "y", "z"
	z.Tunnelling, z.Band, z.Gap, z.Tilt = 16.4, Interval{-32.8, 32.8}, 76694, 352.7
	return &System{
		Sign: sign, Axes: []Axis{x, y, z}, Interaction: s * 984, HasInteraction: true, Hold: 0.6,
		EdgeDrop: func([3]bool) (float64, error) { return 40e3, nil },
	}
}

func TestFlipIsSealedForEitherSign(t *testing.T) {
	for _, sign := range []Sign{Negative, Positive} {
		a := assess(t, flip(sign))
		if a.Verdict != Sealed {
			t.Errorf("sign %d: %s, broken %v", sign, a.Verdict, a.Broken())
		}
		if want := []Motion{Moving, Moving, Layered}; !slices.Equal(a.Motions, want) {
			t.Errorf("sign %d: motions %v, want %v", sign, a.Motions, want)
		}
		lid, other := a.Total.Ceiling, a.Total.Floor
		want := 2 * 970.0
		if sign == Positive {
			lid, other, want = other, lid, -2*902
		}
		if lid != want || !math.IsInf(other, -int(sign)*-1) {
			t.Errorf("sign %d: total %+v, want %g at the end that counts and no end at the other", sign, a.Total, want)
		}
	}
}

// TestEveryBreakHasItsVerdict breaks one thing at a time.
func TestEveryBreakHasItsVerdict(t *testing.T) {
	for _, tc := range []struct {
		name   string
		spoil  func(*System)
		broken string
		want   Verdict
	}{
		{"repulsive", func(s *System) { s.Interaction = 10 }, "interaction", Open},
		{"too shallow for U, a > 0", func(s *System) { s.HasInteraction, s.Interaction, s.ScatteringLength = false, 0, 1e-9 }, "interaction", Open},
		{"x traps", func(s *System) { s.Axes[0].Curvature, s.Axes[0].Trap = 0.04, 12.4 }, "trap_x", Open},
		{"y traps", func(s *System) { s.Axes[1].Curvature, s.Axes[1].Trap = 0.04, 12.4 }, "trap_y", Open},
		{"tilt without curvature", func(s *System) { s.Axes[0].Curvature, s.Axes[0].Trap, s.Axes[0].Tilt = 0, 0, 3 }, "tilt", Open},
		{"shallow", func(s *System) { s.Axes[0].Gap = 1000 }, "one_band", Leaky},
		{"U equals the tilt", func(s *System) { s.Interaction = -352.7 }, "layers", Leaky},
		{"U equals two tilts", func(s *System) { s.Interaction = -705 }, "layers", Leaky},
		{"U equals three tilts, narrower", func(s *System) { s.Interaction = -1058.2 }, "layers", Leaky},
		{"slow drain", func(s *System) { s.Axes[2].Tunnelling, s.Hold = 80, 60 }, "layers", Leaky},
		{"flat", func(s *System) { s.Axes[1].Curvature, s.Axes[1].Trap = 0, 0 }, "held", Leaky},
		{"narrow beams", func(s *System) { s.EdgeDrop = func([3]bool) (float64, error) { return 4000, nil } }, "edge", Leaky},
	} {
		s := flip(Negative)
		tc.spoil(s)
		a := assess(t, s)
		if a.Verdict != tc.want || !slices.Contains(a.Broken(), tc.broken) {
			t.Errorf("%s: verdict %s, broken %v; want %s by %s", tc.name, a.Verdict, a.Broken(), tc.want, tc.broken)
		}
		for _, c := range a.Criteria {
			if math.IsNaN(c.Margin) || math.IsInf(c.Margin, 0) || c.Passed && c.Margin < 0 || !c.Passed && c.Margin > 0 {
				t.Errorf("%s: criterion %+v has a margin that does not fit", tc.name, c)
			}
		}
	}
}

func TestOpenBeatsAstrayBeatsLeaky(t *testing.T) {
	s := model([]int{4}, 4, 1, -1, -0.1)
	s.Box.Fock = []int{4, 0, 0, 0}
	s.Axes[0].Curvature = 0
	if a := assess(t, s); a.Verdict != Astray {
		t.Errorf("all atoms on one site, U < 0, no trap: %s, broken %v; want astray", a.Verdict, a.Broken())
	}
	s.Interaction, s.Box.Fock = 1, []int{1, 1, 1, 1}
	if a := assess(t, s); a.Verdict != Open {
		t.Errorf("U > 0: %s, want open", a.Verdict)
	}
	order := []Verdict{Sealed, Leaky, Astray, Open}
	for i := range order {
		for k := range order {
			if order[i].Worse(order[k]) != (i > k) {
				t.Errorf("%s worse than %s: got %v", order[i], order[k], !(i > k))
			}
		}
	}
}

// TestEnergyOfNumberStates: a Mott state with U < 0 has E = U n(n-1)/2 per site
// against U n^2 at infinite temperature; only the sign of the difference counts.
func TestEnergyOfNumberStates(t *testing.T) {
	for _, tc := range []struct {
		fock   []int
		sign   Sign
		u, v   float64
		margin float64
	}{
		{[]int{1, 1, 1, 1}, Negative, -2, 0, 2},         // 0 - (-2*1)
		{[]int{2, 2, 2, 2}, Negative, -2, 0, 6},         // -2 - (-8)
		{[]int{4, 0, 0, 0}, Negative, -2, 0, -1},        // -2*6/4 - (-2)
		{[]int{4, 0, 0, 0}, Negative, -2, -0.1, 20},     // in a trap: -12 - (-32)
		{[]int{1, 1, 1, 1}, Positive, 2, 0, 2},          // 2 - 0
		{[]int{4, 0, 0, 0}, Positive, 2, 0, -1},         // 2 - 3
		{[]int{0, 2, 2, 0}, Negative, -2, -0.1, -2 + 8}, // occupied sites only
	} {
		s := model([]int{4}, 4, 1, tc.u, tc.v)
		s.Sign, s.Box.Fock = tc.sign, tc.fock
		c, ok := assess(t, s).Criterion("energy")
		if !ok || math.Abs(c.Margin-tc.margin) > 1e-12 || c.Passed != (tc.margin > 0) {
			t.Errorf("fock %v sign %d U %g V %g: got %+v (%v), want margin %g", tc.fock, tc.sign, tc.u, tc.v, c, ok, tc.margin)
		}
	}
}

// TestMotionThresholds: layered from F = 4J, frozen up to J hold/hbar = 0.1.
func TestMotionThresholds(t *testing.T) {
	for _, tc := range []struct {
		j, f, hold float64
		want       Motion
	}{
		{10, 40, 1, Layered}, {10, -40, 1, Layered}, {10, 39.9, 1, Moving}, {10, 0, 1, Moving},
		{10, 0, 0.1 / (2 * math.Pi * 10), Frozen}, {10, 0, 0.1001 / (2 * math.Pi * 10), Moving},
		{0, 0, 100, Frozen}, {0, 5, 100, Layered}, {-10, 39.9, 1, Moving},
	} {
		if got := (Axis{Tunnelling: tc.j, Tilt: tc.f}).motion(tc.hold); got != tc.want {
			t.Errorf("J %g F %g hold %g: %s, want %s", tc.j, tc.f, tc.hold, got, tc.want)
		}
	}
}

// TestLeakOfTheStack: for the layers of Braun et al., Science 339, 52 (2013),
// hand calculation (derived, prefactor uncertain tenfold): 25 hops per second and
// about 2J of drift in 600 ms at k|T| = 2.2 J.
func TestLeakOfTheStack(t *testing.T) {
	const j, hold = 466.997, 0.6
	leak := LeakOf(Axis{Tunnelling: 16.416, Tilt: 352.70}, j, 2.2*j, hold)
	if middle := math.Sqrt(leak.Slow * leak.Fast); math.Abs(middle-25.4) > 0.2 {
		t.Errorf("rate %.4g per s, want 25.4", middle)
	}
	if drift := leak.Drift * math.Sqrt(10) / j; math.Abs(drift-2) > 0.1 {
		t.Errorf("drift %.3g J, want 2", drift)
	}
	if ratio := leak.Fast / leak.Slow; math.Abs(ratio-10) > 1e-9 {
		t.Errorf("range %.4g, want 10", ratio)
	}
}

func TestStillAxesAreListedWithTheReason(t *testing.T) {
	s := flip(Negative)
	s.Axes[0].Tunnelling = 1e-3
	a := assess(t, s)
	for _, term := range a.Terms {
		still := term.Name == "trap_x" || term.Name == "trap_z"
		if (term.Reason != "") != still {
			t.Errorf("%s: reason %q", term.Name, term.Reason)
		}
	}
	if _, ok := a.Criterion("trap_x"); ok {
		t.Error("a frozen axis needs no trap criterion")
	}
}

func TestEdgeErrorsComeThrough(t *testing.T) {
	s := flip(Negative)
	s.EdgeDrop = func([3]bool) (float64, error) { return 0, fmt.Errorf("no beams") }
	if _, err := Assess(s); err == nil {
		t.Error("want the error of the edge")
	}
}

func TestEvenPairs(t *testing.T) {
	for _, tc := range []struct {
		sites, atoms int
		want         float64
	}{{4, 4, 0}, {4, 3, 0}, {4, 8, 0.5}, {4, 6, 2.0 / 6}, {1, 5, 2}, {3, 0, 0}} {
		if got := EvenPairs(tc.sites, tc.atoms); math.Abs(got-tc.want) > 1e-15 {
			t.Errorf("%d sites, %d atoms: %g, want %g", tc.sites, tc.atoms, got, tc.want)
		}
	}
}

func assess(t *testing.T, s *System) *Assessment {
	t.Helper()
	a, err := Assess(s)
	if err != nil {
		t.Fatal(err)
	}
	return a
}

// model is a chain, rectangle or cuboid with the same J and V along every axis.
func model(sites []int, atoms int, j, u, v float64) *System {
	s := &System{Sign: Negative, Interaction: u, HasInteraction: true, Hold: 1e3, Box: &Box{Sites: sites, Atoms: atoms}}
	for i := range sites {
		s.Axes = append(s.Axes, Axis{
			Name: "xyz"[i : i+1], Tunnelling: j, Band: Interval{-2 * math.Abs(j), 2 * math.Abs(j)}, Gap: math.Inf(1), Curvature: v,
		})
	}
	return s
}

// TestOneBandCountsEverything: gap less both widths, |U| and the tilt, by hand:
// 27782 - 2(970+902) - 984 - 352.7 Hz.
func TestOneBandCountsEverything(t *testing.T) {
	c, ok := assess(t, flip(Negative)).Criterion("one_band")
	if want := 27782 - 2*(970+902) - 984 - 352.7; !ok || math.Abs(c.Margin-want) > 1e-9 {
		t.Errorf("margin %g, want %g", c.Margin, want)
	}
}

// TestResonancesNarrow: the k-th resonance is 4J (2J/F)^(k-1) wide to each side
// (derived), with J = 16.4 and F = 352.7: 65.6, 6.10 and 0.567 Hz.
func TestResonancesNarrow(t *testing.T) {
	for k, width := range []float64{65.6, 6.1006, 0.56733} {
		for _, side := range []float64{-1, 1} {
			for _, tc := range []struct {
				off    float64
				passes bool
			}{{0.99 * width, false}, {1.01 * width, true}} {
				s := flip(Negative)
				s.Interaction = -(float64(k+1)*352.7 + side*tc.off)
				if c, _ := assess(t, s).Criterion("layers"); c.Passed != tc.passes {
					t.Errorf("|U| %g Hz from %d F: passed %v, %s", side*tc.off, k+1, c.Passed, c.Detail)
				}
			}
		}
	}
}
