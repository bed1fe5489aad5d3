package figure

import (
	"math"
	"math/rand/v2"
	"testing"

	"hilltop/bosehubbard/report"
)

var frames = []Frame{
	{Width: 944, Height: 412}, {Width: 976, Height: 628}, {Width: 744, Height: 372}, {Width: 600, Height: 300}, {Width: 976, Height: 372},
}

// eachGeometry lays out 100 seeded reports, half of them with numbers 1000 times
// apart, in changing frames, text sizes, units and ranges.
func eachGeometry(t *testing.T, check func(t *testing.T, r *report.Report, g *Geometry)) {
	t.Helper()
	for seed := range uint64(100) {
		rng := rand.New(rand.NewPCG(seed, 3))
		spread := 3.0
		if seed%2 == 1 {
			spread = 1000
		}
		r := randomReport(rng, spread)
		o := CeilingOptions{Unit: Unit(rng.IntN(4))}
		switch rng.IntN(4) {
		case 0:
			o.HalfRange = math.Pow(10, 4*rng.Float64()-1)
		case 1:
			o.ScaleTo = r.Ceiling.Terms[rng.IntN(len(r.Ceiling.Terms))].Term
		case 2:
			o.Pinned = randomReport(rng, spread)
		}
		s := Style{Palette: Light(), Text: []float64{1, 1.5}[rng.IntN(2)]}
		g := CeilingGeometry(r, frames[rng.IntN(len(frames))], s, o)
		t.Run("", func(t *testing.T) {
			t.Logf("seed %d, aim %s, options %+v, style %+v, frame %+v", seed, r.AimSign, o, s.Text, g.Frame)
			check(t, r, g)
		})
	}
}

// near1e9 compares an energy read back from a place. Places are of the order of
// 1000 px, so they are good to 1e-13 px, which is some 1e-15 of the range; to that
// comes 1e-9 of the value.
func near1e9(t *testing.T, what string, got, want, halfRange float64) {
	t.Helper()
	if tolerance := 1e-9*math.Abs(want) + 1e-14*halfRange; !(math.Abs(got-want) <= tolerance) {
		t.Errorf("%s: read back %.15g Hz, want %.15g, off by %g, tolerance %g", what, got, want, got-want, tolerance)
	}
}

func checkEnd(t *testing.T, g *Geometry, what string, end End, bound report.Bound) {
	t.Helper()
	switch end.Kind {
	case Lid:
		near1e9(t, what, g.Scale.Hz(end.Y), bound.Hz, g.Scale.HalfRange)
	case Strips:
		if !bound.Unbounded() {
			t.Errorf("%s: strips at %g Hz, want them only where unbounded", what, bound.Hz)
		}
	case Cut:
		if math.Abs(bound.Hz) <= g.Scale.HalfRange || bound.Unbounded() {
			t.Errorf("%s: cut at %g Hz, want that only beyond %g", what, bound.Hz, g.Scale.HalfRange)
		}
	}
	if end.Hz != bound.Hz && !bound.IsZero() {
		t.Errorf("%s: %g Hz, want %g", what, end.Hz, bound.Hz)
	}
	inside := end.Y > g.Sky.Y1 && end.Y < g.Ground.Y0
	if inside == bound.Unbounded() {
		t.Errorf("%s: %g Hz at y = %g, sky ends at %g, ground begins at %g", what, bound.Hz, end.Y, g.Sky.Y1, g.Ground.Y0)
	}
	if bound.Unbounded() && (end.Hz > 0) != (end.Y == g.Sky.Y1) {
		t.Errorf("%s: %g Hz leaves at y = %g", what, bound.Hz, end.Y)
	}
}

func TestBarsReadBackAsTheReport(t *testing.T) {
	eachGeometry(t, func(t *testing.T, r *report.Report, g *Geometry) {
		if len(g.Bars) != len(r.Ceiling.Terms) {
			t.Fatalf("%d bars for %d terms", len(g.Bars), len(r.Ceiling.Terms))
		}
		for i, term := range r.Ceiling.Terms {
			bar := g.Bars[i]
			if bar.Term != term.Term || bar.Still != (term.Reason != "") {
				t.Errorf("bar %d is %q, still %v; want %q, %q", i, bar.Term, bar.Still, term.Term, term.Reason)
			}
			if bar.Still {
				continue
			}
			checkEnd(t, g, term.Term+" ceiling", bar.Upper, term.Ceiling)
			checkEnd(t, g, term.Term+" floor", bar.Lower, term.Floor)
		}
		checkEnd(t, g, "total ceiling", g.Total.Upper, r.Ceiling.Total.Ceiling)
		checkEnd(t, g, "total floor", g.Total.Lower, r.Ceiling.Total.Floor)
	})
}

func TestFillsSayWhatIsBounded(t *testing.T) {
	eachGeometry(t, func(t *testing.T, r *report.Report, g *Geometry) {
		leaky := false
		for _, c := range r.Ceiling.Criteria {
			leaky = leaky || !c.Passed
		}
		for _, bar := range append(g.Bars, g.Total) {
			if bar.Still {
				continue
			}
			unbounded := math.IsInf(bar.Counting().Hz, 0)
			if unbounded != (bar.Fill == Unbounded) {
				t.Errorf("%s at %g Hz is filled as %v", bar.Term, bar.Counting().Hz, bar.Fill)
			}
			if bar.Term == "total" && !unbounded && leaky != (bar.Fill == Drained) {
				t.Errorf("total is filled as %v, leaky %v", bar.Fill, leaky)
			}
		}
		if up := r.AimSign == "negative"; g.Total.Upper.Counts != up || g.Total.Lower.Counts == up {
			t.Errorf("aim %s: the ceiling counts %v", r.AimSign, g.Total.Upper.Counts)
		}
	})
}

func TestCarryLineAddsUp(t *testing.T) {
	eachGeometry(t, func(t *testing.T, r *report.Report, g *Geometry) {
		if len(g.Carry) == 0 {
			t.Fatal("no carry line, though the kinetic energy is bounded")
		}
		end := g.Carry[len(g.Carry)-1]
		if g.Open {
			far := g.Sky.Y0
			if !g.Upwards {
				far = g.Ground.Y1
			}
			if end.Y != far {
				t.Errorf("open, but the carry line ends at y = %g, want %g", end.Y, far)
			}
			if g.Ceiling.X1 != 0 {
				t.Errorf("open, but there is a ceiling line at %g Hz", g.Ceiling.Hz)
			}
			return
		}
		// The sum rounds differently from the report's by a few ulp.
		if math.Abs(end.Y-g.Total.Counting().Y) > 1e-9*g.Frame.Height() {
			t.Errorf("the carry line ends at y = %.12g, the total's lid is at %.12g", end.Y, g.Total.Counting().Y)
		}
		if g.Ceiling.Y != g.Total.Counting().Y || g.Ceiling.Hz != g.Total.Counting().Hz {
			t.Errorf("ceiling %+v, want it at the total's %+v", g.Ceiling, g.Total.Counting())
		}
	})
}

func TestLabelsNeitherOverlapNorLeave(t *testing.T) {
	eachGeometry(t, func(t *testing.T, r *report.Report, g *Geometry) {
		for i, l := range g.Labels {
			if !l.Box.Within(g.Frame) {
				t.Errorf("label %q at %+v leaves %+v", l.Text, l.Box, g.Frame)
			}
			for _, m := range g.Labels[:i] {
				if l.Box.Overlaps(m.Box) {
					t.Errorf("labels %q at %+v and %q at %+v overlap", l.Text, l.Box, m.Text, m.Box)
				}
			}
		}
	})
}

func TestEverythingStaysInTheFrame(t *testing.T) {
	eachGeometry(t, func(t *testing.T, r *report.Report, g *Geometry) {
		inside := func(what string, p Point) {
			if !g.Frame.Contains(p) {
				t.Errorf("%s at %+v leaves %+v", what, p, g.Frame)
			}
		}
		for _, bar := range append(g.Bars, g.Total) {
			inside(bar.Term, Point{bar.X0 - bar.Overhang, bar.Upper.Y})
			inside(bar.Term, Point{bar.X1 + bar.Overhang, bar.Lower.Y})
		}
		for _, p := range g.Carry {
			inside("carry", p)
		}
		for _, m := range g.Size.Marks {
			inside("size "+m.Name, Point{m.X, g.Size.Y})
		}
		for _, p := range g.Pinned {
			inside("pinned", Point{p.X0, p.Y0})
			inside("pinned", Point{p.X1, p.Y1})
		}
	})
}

func TestHillAndSizesReadBack(t *testing.T) {
	eachGeometry(t, func(t *testing.T, r *report.Report, g *Geometry) {
		end := r.Stages[len(r.Stages)-1]
		for _, m := range g.Size.Marks {
			if got := g.Size.Hz(m.X); math.Abs(got-m.Hz) > 1e-9*m.Hz {
				t.Errorf("size %s: read back %.12g Hz, want %.12g", m.Name, got, m.Hz)
			}
		}
		s := g.Slope
		if s == nil {
			return
		}
		axis := s.Axis[0] - 'x'
		if s.Curvature != end.CurvatureHz[axis] {
			t.Errorf("hill along %s has V = %g, want %g", s.Axis, s.Curvature, end.CurvatureHz[axis])
		}
		kinetic := r.Ceiling.Terms[0]
		if s.Floor != kinetic.Floor.Hz || s.Ceiling != kinetic.Ceiling.Hz {
			t.Errorf("hill between %g and %g, want %+v", s.Floor, s.Ceiling, kinetic.Bounds)
		}
		if got := s.Site(s.X(0.3 * s.Reach)); math.Abs(got-0.3*s.Reach) > 1e-9*s.Reach {
			t.Errorf("site %g read back as %g", 0.3*s.Reach, got)
		}
		if width := math.Abs(s.Curvature) * s.Turn * s.Turn; s.Turn > 0 && math.Abs(width-(s.Ceiling-s.Floor)) > 1e-9*width {
			t.Errorf("|V| x^2 = %g at the tick, want %g", width, s.Ceiling-s.Floor)
		}
	})
}

func TestRangeIsTheSmallestNiceOne(t *testing.T) {
	for _, tc := range []struct{ hold, want float64 }{
		{1, 1}, {1.0001, 2}, {2, 2}, {4.99, 5}, {5.1, 10}, {1965, 2000}, {2031, 5000}, {0.031, 0.05}, {1e-5, 1e-5},
	} {
		r := &report.Report{AimSign: "negative"}
		r.Ceiling.Total = bounds(math.Inf(-1), tc.hold)
		r.Ceiling.Terms = []report.Term{{Term: "kinetic", Bounds: bounds(-tc.hold/2, tc.hold)}}
		g := CeilingGeometry(r, frames[0], Style{}, CeilingOptions{})
		if got := g.Scale.HalfRange; math.Abs(got-tc.want) > 1e-12*tc.want {
			t.Errorf("to hold %g Hz: half-range %g, want %g", tc.hold, got, tc.want)
		}
		frozen := CeilingGeometry(r, frames[0], Style{}, CeilingOptions{HalfRange: 7 * tc.hold})
		if got := frozen.Scale.HalfRange; got != 7*tc.hold {
			t.Errorf("frozen at %g Hz: half-range %g", 7*tc.hold, got)
		}
	}
}

func TestStateLineOnlyWhereBounded(t *testing.T) {
	rng := rand.New(rand.NewPCG(1, 1))
	for range 50 {
		r := randomReport(rng, 3)
		state := 0.9 * r.Ceiling.Terms[0].Ceiling.Hz
		g := CeilingGeometry(r, frames[0], Style{}, CeilingOptions{State: &state})
		if (g.State == nil) != g.Open {
			t.Fatalf("open %v, state %v", g.Open, g.State)
		}
		if g.State != nil {
			near1e9(t, "state", g.Scale.Hz(g.State.Y), state, g.Scale.HalfRange)
		}
	}
}

func TestOpenPlansHaveTheFlag(t *testing.T) {
	eachGeometry(t, func(t *testing.T, r *report.Report, g *Geometry) {
		flagged := false
		for _, l := range g.Labels {
			flagged = flagged || l.Role == Flag
		}
		if flagged != g.Open {
			t.Errorf("open %v, flag %v", g.Open, flagged)
		}
	})
}

func TestClickFindsTheTerm(t *testing.T) {
	r := randomReport(rand.New(rand.NewPCG(5, 5)), 3)
	g := CeilingGeometry(r, frames[0], Style{}, CeilingOptions{})
	for _, bar := range append(g.Bars, g.Total) {
		if got := g.At(Point{bar.Centre(), 10}); got != bar.Term {
			t.Errorf("at the column of %s: %q", bar.Term, got)
		}
	}
	if got := g.At(Point{2, 10}); got != "" {
		t.Errorf("at the border: %q, want nothing", got)
	}
}

func TestReadGivesTheEnergyAtAPlace(t *testing.T) {
	r := handmade(nil)
	g := CeilingGeometry(r, frames[0], Style{}, CeilingOptions{})
	at := Point{g.Slope.X(30), g.Scale.Y(1000)}
	got, ok := g.Read(at)
	if want := "E/N +1,000 Hz at 30 sites along x"; !ok || got.Text != want {
		t.Errorf("reads %q, %v; want %q", got.Text, ok, want)
	}
	if _, ok := g.Read(Point{at.X, g.Sky.Y0 + 5}); ok {
		t.Error("the sky has an energy")
	}
}
