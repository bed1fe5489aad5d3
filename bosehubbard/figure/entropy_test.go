package figure

import (
	"bytes"
	"encoding/csv"
	"math"
	"strconv"
	"strings"
	"testing"

	"hilltop/bosehubbard/report"
	"hilltop/bosehubbard/thermo"
)

// parabola is S = 1 - ((E-e0)/w)^2, so that beta = -2 (E-e0)/w^2, from E = e0-w,
// where S is 0, to e0+w; the points reach a little beyond.
func parabola(e0, w float64) *EntropyCurve {
	c := &EntropyCurve{Name: "10 sites, 10 atoms"}
	for i := -60; i <= 60; i++ {
		x := float64(i) / 50
		c.Energy = append(c.Energy, e0+w*x)
		c.Entropy = append(c.Entropy, 1-x*x)
		c.Beta = append(c.Beta, -2*x/w)
	}
	return c
}

// eachEntropy lays out S(E) in several frames, text sizes and units.
func eachEntropy(t *testing.T, c *EntropyCurve, state float64, check func(*testing.T, *Geometry)) {
	t.Helper()
	for _, f := range frames {
		for _, text := range []float64{1, 1.5} {
			for u := Hertz; u <= Tunnelling; u++ {
				s := Style{Palette: Light(), Text: text}
				g := CeilingGeometry(handmade(nil), f, s, CeilingOptions{Unit: u, Entropy: c, State: &state})
				t.Logf("frame %+v, text %g, unit %v", f, text, u)
				check(t, g)
			}
		}
	}
}

func TestEntropyReadsBackAsTheCurve(t *testing.T) {
	c := parabola(-200, 1500)
	eachEntropy(t, c, 800, func(t *testing.T, g *Geometry) {
		e := g.Entropy
		if len(e.Points) != 101 { // S >= 0 from -50 to 50
			t.Fatalf("%d points, want the 101 with S >= 0", len(e.Points))
		}
		for i, p := range e.Points {
			near1e9(t, "energy", g.Scale.Hz(p.At.Y), c.Energy[i+10], g.Scale.HalfRange)
			if got, want := e.Entropy(p.At.X), c.Entropy[i+10]; math.Abs(got-want) > 1e-12 {
				t.Errorf("entropy at %g Hz reads back as %g, want %g", p.Hz, got, want)
			}
		}
		if got, want := e.Peak.At.X, e.Box.X0+0.9*e.Box.Width(); math.Abs(got-want) > 1e-9 {
			t.Errorf("the largest S stands at %g, want 90 %% of the width: %g", got, want)
		}
		if math.Abs(e.Peak.Hz+200) > 1e-9 {
			t.Errorf("S peaks at %g Hz, want -200", e.Peak.Hz)
		}
		if e.Box.X1 > g.Ruler.X0 || e.Box.X0 < g.Terms.X1-1e-9 || g.Hill.Width() > 0 && e.Box.X0 < g.Hill.X1-1e-9 {
			t.Errorf("S(E) in %+v, hill in %+v, ruler from %g", e.Box, g.Hill, g.Ruler.X0)
		}
	})
}

func TestSharesOfTheWidth(t *testing.T) {
	g := CeilingGeometry(handmade(nil), Frame{Width: 976, Height: 412}, Style{}, CeilingOptions{Entropy: parabola(0, 1500)})
	inner := g.Plot.Width()
	for _, tc := range []struct {
		what      string
		got, want float64
	}{{"terms", g.Terms.Width(), 0.46 * inner}, {"hill", g.Hill.Width(), 0.27 * inner}, {"S(E)", g.Plot.X1 - g.Entropy.Box.X0, 0.27 * inner}} {
		if math.Abs(tc.got-tc.want) > 1e-9 {
			t.Errorf("%s: %g px wide, want %g", tc.what, tc.got, tc.want)
		}
	}
	g = CeilingGeometry(handmade(nil), Frame{Width: 619, Height: 412}, Style{}, CeilingOptions{Entropy: parabola(0, 1500)})
	if g.Slope != nil || g.Hill.Width() != 0 || g.Entropy == nil {
		t.Errorf("at 619 px: hill %+v, S(E) %v; want the hill gone and S(E) there", g.Hill, g.Entropy != nil)
	}
}

func TestTangentHasTheSlopeOfTheCurve(t *testing.T) {
	for _, state := range []float64{-900, -200, 800, 1200} {
		eachEntropy(t, parabola(-200, 1500), state, func(t *testing.T, g *Geometry) {
			e := g.Entropy
			if e.State == nil {
				t.Fatalf("no state at %g Hz", state)
			}
			low, high := e.Tangent[0], e.Tangent[1]
			if length := math.Hypot(high.X-low.X, high.Y-low.Y); math.Abs(length-64) > 1e-9 {
				t.Errorf("tangent %g px long, want 64", length)
			}
			dS := e.Entropy(high.X) - e.Entropy(low.X)
			dE := g.Scale.Hz(high.Y) - g.Scale.Hz(low.Y)
			// beta is linear in E, so that interpolation is exact.
			want := -2 * (state + 200) / (1500 * 1500)
			if got := dS / dE; math.Abs(got-want) > 1e-9*math.Abs(want)+1e-15 {
				t.Errorf("at %g Hz the tangent has dS/dE = %g, want %g", state, got, want)
			}
			if leansLeft := high.X < low.X && high.Y < low.Y; leansLeft != (want < 0) {
				t.Errorf("at %g Hz, beta %g: from %+v to %+v", state, want, low, high)
			}
			if middle := (low.X + high.X) / 2; math.Abs(middle-e.State.At.X) > 1e-9 {
				t.Errorf("tangent about %g, state at %g", middle, e.State.At.X)
			}
		})
	}
}

func TestRulerTicksStandWhereTheTemperatureIs(t *testing.T) {
	eachEntropy(t, parabola(-200, 1500), 800, func(t *testing.T, g *Geometry) {
		e := g.Entropy
		if e.Unit != "kB/J" || e.PerUnit != 450 {
			t.Fatalf("ruler in %s of %g Hz, want kB/J of 450", e.Unit, e.PerUnit)
		}
		zero := false
		for i, tick := range e.Ticks {
			// -dS/dE J = 2 (E-e0) J/w^2, linear, so that interpolation is exact.
			want := -200 + tick.Value*1500*1500/(2*450)
			near1e9(t, "tick", g.Scale.Hz(tick.Y), want, g.Scale.HalfRange)
			if i > 0 && !(e.Ticks[i-1].Y-tick.Y >= 18) {
				t.Errorf("ticks %g and %g are %g px apart, want 18", e.Ticks[i-1].Value, tick.Value, e.Ticks[i-1].Y-tick.Y)
			}
			zero = zero || tick.Value == 0
		}
		if !zero || len(e.Ticks) < 3 && g.Scale.Bottom-g.Scale.Top > 100 {
			t.Errorf("ticks %+v, want 0 and some of either sign", e.Ticks)
		}
	})
}

func TestRulerIsBlankWhereNotSingleValued(t *testing.T) {
	c := parabola(-200, 1500)
	for i, hz := range c.Energy { // a dip: -beta falls back over 200 Hz to what it was below
		if hz > 500 && hz < 700 {
			c.Beta[i] = c.Beta[i-12]
		}
	}
	g := CeilingGeometry(handmade(nil), frames[1], Style{Palette: Light()}, CeilingOptions{Entropy: c})
	if len(g.Entropy.Spans) != 1 {
		t.Fatalf("spans %v, want the branch below the dip", g.Entropy.Spans)
	}
	end := g.Entropy.Spans[0][1]
	if end < 300 || end > 700 {
		t.Errorf("single-valued up to %g Hz, want to the dip from 500 to 700", end)
	}
	for _, tick := range g.Entropy.Ticks {
		if tick.Hz > end {
			t.Errorf("tick %g at %g Hz stands above the branch", tick.Value, tick.Hz)
		}
	}
}

// Rough levels, as of a small system, still have a temperature in the mean.
func TestRulerOfARoughCurve(t *testing.T) {
	c := parabola(-200, 1500)
	for i := range c.Beta {
		c.Beta[i] += 0.03 / 450 * float64(1-2*(i%2)) // steps between samples are 0.012
	}
	g := CeilingGeometry(handmade(nil), frames[1], Style{Palette: Light()}, CeilingOptions{Entropy: c})
	if len(g.Entropy.Ticks) < 5 {
		t.Fatalf("ticks %+v, want five at least", g.Entropy.Ticks)
	}
	for _, tick := range g.Entropy.Ticks {
		// The mean over seven samples leaves a seventh of the roughness.
		want := -200 + tick.Value*1500*1500/(2*450)
		if off := math.Abs(tick.Hz - want); off > 0.03/7*1500*1500/(2*450)+30 {
			t.Errorf("tick %g at %g Hz, want %g", tick.Value, tick.Hz, want)
		}
	}
}

func TestCurvesThatSayNothingAreLeftOut(t *testing.T) {
	bad := []*EntropyCurve{nil, {}, {Energy: []float64{1, 2}}, {Energy: []float64{1, 2}, Entropy: []float64{-1, -2}, Beta: []float64{0, 0}},
		{Energy: []float64{1, 2}, Entropy: []float64{math.NaN(), math.NaN()}, Beta: []float64{0, 0}}}
	for _, c := range bad {
		g := CeilingGeometry(handmade(nil), frames[1], Style{Palette: Light()}, CeilingOptions{Entropy: c})
		if g.Entropy != nil {
			t.Errorf("curve %+v is shown", c)
		}
	}
}

func TestEntropyInTheTable(t *testing.T) {
	c := parabola(-200, 1500)
	var out bytes.Buffer
	if err := WriteCSV(&out, &Ceiling{Report: handmade(nil), Options: CeilingOptions{Entropy: c}}); err != nil {
		t.Fatal(err)
	}
	rows, err := csv.NewReader(&out).ReadAll()
	if err != nil {
		t.Fatal(err)
	}
	n := 0
	for _, row := range rows {
		if row[0] != "entropy" {
			continue
		}
		for k, want := range []float64{c.Energy[n], c.Entropy[n], c.Beta[n]} {
			if got, err := strconv.ParseFloat(row[len(row)-3+k], 64); err != nil || got != want {
				t.Errorf("row %d, column %d: %q, want %g", n, k, row[len(row)-3+k], want)
			}
		}
		n++
	}
	if n != len(c.Energy) {
		t.Errorf("%d rows of S(E), want %d", n, len(c.Energy))
	}
}

func TestTextsOfEntropyAndLevels(t *testing.T) {
	state := 800.0
	_, ladder := twoLevels(t)
	for _, p := range []Picture{&Ceiling{handmade(nil), CeilingOptions{Entropy: parabola(-200, 1500), State: &state}}, ladder} {
		for _, f := range []Frame{{Width: 976, Height: 412}, {Width: 480, Height: 300}, {Width: 744, Height: 372}} {
			for _, size := range []float64{1, 1.5} {
				checkTexts(t, p, f, Style{Palette: Dark(), Text: size})
			}
		}
	}
}

// twoLevels are spins in a field, two thirds of them up: beta = ln(1/2)/(E1 - E0).
func twoLevels(t testing.TB) (thermo.LevelState, *Ceiling) {
	t.Helper()
	l := thermo.Levels{Energies: []float64{-8000, 8000}, Bodies: 1e20}
	energy := 8000.0 / 3
	state, err := l.At(energy)
	if err != nil {
		t.Fatal(err)
	}
	c, err := l.Curve(201)
	if err != nil {
		t.Fatal(err)
	}
	r := &report.Report{AimSign: "negative", Verdict: "sealed", Levels: &report.Levels{EnergyHz: energy, Shares: state.Shares}}
	r.Ceiling.Total = bounds(-8000, 8000)
	return state, &Ceiling{r, CeilingOptions{
		State:   &energy,
		Entropy: &EntropyCurve{Name: "per body", Energy: c.Energy, Entropy: c.Entropy, Beta: c.Beta},
		Ladder:  &Ladder{Energies: l.Energies, Shares: state.Shares},
	}}
}

func TestLadder(t *testing.T) {
	state, picture := twoLevels(t)
	g := picture.Geometry(frames[0], Style{Palette: Light()})
	if len(g.Rungs) != 2 || g.Total.Upper.Kind != Lid || g.Total.Lower.Kind != Lid {
		t.Fatalf("%d rungs, ends %v and %v; want two and a lid at both ends", len(g.Rungs), g.Total.Upper.Kind, g.Total.Lower.Kind)
	}
	for i, r := range g.Rungs {
		near1e9(t, "rung", g.Scale.Hz(r.Y), picture.Options.Ladder.Energies[i], g.Scale.HalfRange)
		if got := r.Share.Width() / (r.X1 - r.X0); math.Abs(got-state.Shares[i]) > 1e-12 {
			t.Errorf("rung %d: share drawn %g, want %g", i, got, state.Shares[i])
		}
	}
	near1e9(t, "lid", g.Scale.Hz(g.Total.Upper.Y), 8000, g.Scale.HalfRange)
	e := g.Entropy
	// beta = -ln 2/16 kHz; between samples of 80 Hz it is good to a percent.
	if want := -math.Ln2 / 16000; e.State == nil || math.Abs(e.State.Beta-want) > 0.01*math.Abs(want) {
		t.Errorf("state %+v, want beta %g", e.State, want)
	}
	if e.Unit != "kB/kHz" {
		t.Errorf("ruler in %s, want kB/kHz", e.Unit)
	}
	if math.Abs(e.Largest-math.Ln2) > 1e-9 {
		t.Errorf("largest entropy %g, want ln 2", e.Largest)
	}
	table := picture.Table()
	levels := 0
	for _, row := range table.Rows {
		if row[0] == "level" && strings.HasPrefix(row[5], "degeneracy 1, share ") {
			levels++
		}
	}
	if levels != 2 {
		t.Errorf("%d levels in the table, want 2", levels)
	}
}

func TestLevelsWithoutEnd(t *testing.T) {
	_, picture := twoLevels(t)
	picture.Report.Ceiling.Total = bounds(-8000, math.Inf(1))
	g := picture.Geometry(frames[0], Style{Palette: Light()})
	if !g.Open || g.Total.Upper.Kind != Strips || g.State != nil {
		t.Errorf("open %v, upper end %v, state %v; want open strips and no state", g.Open, g.Total.Upper.Kind, g.State)
	}
}

func TestTemperatureInWords(t *testing.T) {
	// k T = h f: 1 Hz is 0.0479924 nK (h/kB exact, SI 2019).
	for _, tc := range []struct {
		beta float64
		want string
	}{{0, "±∞"}, {math.Inf(1), "+0"}, {math.Inf(-1), "−0"}, {-1.0 / 100, "−4.8 nK"}, {1e-4, "+480 nK"}} {
		if got := Temperature(tc.beta, 3); got != tc.want {
			t.Errorf("beta %g: %q, want %q", tc.beta, got, tc.want)
		}
	}
}

func TestNothingIsReadOffAnOldCurve(t *testing.T) {
	c, state := parabola(-200, 1500), 800.0
	c.Stale = true
	picture := &Ceiling{handmade(nil), CeilingOptions{Entropy: c, State: &state}}
	g := picture.Geometry(frames[1], Style{Palette: Light()})
	if e := g.Entropy; len(e.Points) == 0 || len(e.Ticks) != 0 || len(e.Spans) != 0 || e.State != nil {
		t.Errorf("an old curve: %d points, ticks %v, spans %v, state %v; want the points alone", len(e.Points), e.Ticks, e.Spans, e.State)
	}
	said := false
	for _, l := range g.Labels {
		said = said || strings.HasSuffix(l.Text, "from before")
	}
	if !said {
		t.Error("the picture does not say that the curve is of before")
	}
}
