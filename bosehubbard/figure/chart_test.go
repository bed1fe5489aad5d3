package figure

import (
	"math"
	"math/rand/v2"
	"testing"

	"hilltop/bosehubbard/atom"
	"hilltop/bosehubbard/band"
	"hilltop/bosehubbard/si"
)

func area(x, y ScaleKind) Area {
	a := Area{Rect: Rect{70, 20, 670, 320}, X: Range{-3, 5}, Y: Range{-2, 40}, KindX: x, KindY: y}
	if x == Log {
		a.X = Range{0.01, 300}
	}
	if y == Log {
		a.Y = Range{2, 3000}
	}
	return a
}

func TestPixelsAndDataAreInverse(t *testing.T) {
	rng := rand.New(rand.NewPCG(1, 7))
	for _, kx := range []ScaleKind{Linear, Log, Square} {
		for _, ky := range []ScaleKind{Linear, Log, Square} {
			a := area(kx, ky)
			for range 50 {
				p := Point{a.X0 + rng.Float64()*a.Width(), a.Y0 + rng.Float64()*a.Height()}
				x, y := a.Data(p)
				q := a.Pixel(x, y)
				// Three digits are lost to the offsets of a picture of 1000 px, half of all
				// digits to the square root near 0 on square axes.
				if math.Hypot(p.X-q.X, p.Y-q.Y) > 1e-9 {
					t.Errorf("kinds %d, %d: %v goes to %g, %g and back to %v", kx, ky, p, x, y, q)
				}
			}
			if q := a.Pixel(a.X.Low, a.Y.Low); math.Hypot(q.X-a.X0, q.Y-a.Y1) > 1e-9 {
				t.Errorf("kinds %d, %d: the lower ends stand at %v", kx, ky, q)
			}
		}
	}
}

func TestZoomKeepsThePlaceAndPanFollowsTheHand(t *testing.T) {
	for _, kind := range []ScaleKind{Linear, Log, Square} {
		a := area(kind, kind)
		p := Point{300, 100}
		x, y := a.Data(p)
		zoomed := a
		view := a.Zoom(p, 3)
		zoomed.X, zoomed.Y = view.X, view.Y
		if q := zoomed.Pixel(x, y); math.Hypot(p.X-q.X, p.Y-q.Y) > 1e-6 {
			t.Errorf("kind %d: zoom moves %v to %v", kind, p, q)
		}
		back := zoomed.Zoom(p, 1.0/3)
		if math.Abs(back.X.Low-a.X.Low) > 1e-9*(a.X.High-a.X.Low) || math.Abs(back.Y.High-a.Y.High) > 1e-9*(a.Y.High-a.Y.Low) {
			t.Errorf("kind %d: zoomed in and out again: %+v, want %+v and %+v", kind, back, a.X, a.Y)
		}
		moved := a
		view = a.Pan(40, -25)
		moved.X, moved.Y = view.X, view.Y
		if q := moved.Pixel(x, y); math.Hypot(p.X+40-q.X, p.Y-25-q.Y) > 1e-6 {
			t.Errorf("kind %d: pan by 40, -25 moves %v to %v", kind, p, q)
		}
	}
	a := area(Linear, Linear)
	for range 200 { // no zoom leads to a range that cannot be drawn
		view := a.Zoom(Point{100, 100}, 10)
		a.X, a.Y = view.X, view.Y
	}
	if !a.X.valid(Linear) || !a.Y.valid(Linear) {
		t.Errorf("zoomed in 200 times: %+v, %+v", a.X, a.Y)
	}
}

func TestViewSetsWhatIsShown(t *testing.T) {
	f, s := Frame{Width: 640, Height: 380}, Style{Palette: Light()}
	for _, p := range gallery(t)[1:] {
		c := p.(*Chart)
		before := c.Area(f, s)
		c.View = before.Zoom(Point{before.X0 + 100, before.Y0 + 100}, 2)
		after := c.Area(f, s)
		if after.X != c.View.X || after.Y != c.View.Y {
			t.Errorf("%s: shows %+v, %+v; asked for %+v", c.Name, after.X, after.Y, c.View)
		}
		if !after.Within(f.rect()) || after.Width() < 300 || after.Height() < 200 {
			t.Errorf("%s: area %+v in %+v", c.Name, after.Rect, f)
		}
		c.View = View{X: Range{math.NaN(), 3}, Y: Range{5, 5}}
		if got := c.Area(f, s); got.X != before.X || got.Y != before.Y {
			t.Errorf("%s: a view that cannot be drawn shows %+v, %+v", c.Name, got.X, got.Y)
		}
	}
}

func TestNearestFindsTheCurve(t *testing.T) {
	c := &Chart{
		Name: "lines", X: Axis{Label: "depth", Unit: "Er", Range: Range{0, 10}}, Y: Axis{Label: "energy", Unit: "Hz", Range: Range{0, 100}},
		Curves: []Curve{{Name: "J", X: []float64{0, 10}, Y: []float64{20, 40}}, {Name: "U", X: []float64{0, 5, 10}, Y: []float64{80, math.NaN(), 60}}},
	}
	f, s := Frame{Width: 600, Height: 400}, Style{Palette: Light()}
	a := c.Area(f, s)
	on := a.Pixel(5, 30)
	r, ok := c.Nearest(a, Point{on.X, on.Y - 3}, 10)
	if !ok || r.Curve != "J" || math.Abs(r.X-5) > 0.1 || math.Abs(r.Y-30) > 0.2 {
		t.Errorf("near the middle of J: %+v, %v", r, ok)
	}
	r, _ = c.Nearest(a, on, 10)
	if want := "J 30 Hz at depth 5 Er"; r.Text != want {
		t.Errorf("reads %q, want %q", r.Text, want)
	}
	if r, ok := c.Nearest(a, a.Pixel(5, 95), 10); ok {
		t.Errorf("far from all curves: %+v", r)
	}
	if got, want := a.Read(on).Text, "depth 5 Er, energy 30 Hz"; got != want {
		t.Errorf("crosshair reads %q, want %q", got, want)
	}
}

func TestTicksAreNiceAndInside(t *testing.T) {
	for _, tc := range []struct {
		r    Range
		kind ScaleKind
	}{
		{Range{0, 1}, Linear}, {Range{-3.2e-7, 4e-7}, Linear}, {Range{1e9, 1.5e9}, Linear}, {Range{4.99, 5.01}, Linear},
		{Range{1e-3, 2e3}, Log}, {Range{2, 9}, Log}, {Range{1e-40, 1e40}, Log}, {Range{-46, 46}, Square}, {Range{10, 20}, Square},
	} {
		ticks := Axis{Kind: tc.kind}.marks(tc.r, 500, 60)
		labels := 0
		for _, tick := range ticks {
			if tick.Label != "" {
				labels++
			}
		}
		if labels == 0 || labels > 12 || len(ticks) > 400 {
			t.Errorf("%+v, kind %d: %d labels on %d ticks: %v", tc.r, tc.kind, labels, len(ticks), ticks)
		}
	}
}

// The squares of the frequencies add: the net is that of the report's trap.
func TestBudgetAddsUpToTheTrap(t *testing.T) {
	r := judged(t, "skerry-demo")
	for i, stage := range r.Stages {
		b, ok := NewBudget(r, i)
		if !ok {
			t.Fatal("no budget")
		}
		for k, axis := range b.Axes {
			if want := stage.TrapHz[k]; math.Abs(axis.Net-want) > 1e-9*math.Abs(want) {
				t.Errorf("%s, axis %s: net %.12g Hz, the report has %.12g", stage.Name, axis.Axis, axis.Net, want)
			}
		}
	}
	before, _ := NewBudget(r, 0)
	after, _ := NewBudget(r, len(r.Stages)-1)
	after.Pinned = before
	if f, ok := after.Pinned.find("x", "cross"); !ok || !(f > 0) {
		t.Errorf("pinned cross along x: %g, %v", f, ok)
	}
	checkTexts(t, after.Chart(), Frame{Width: 700, Height: 400}, Style{Palette: Light()})
	if _, ok := NewBudget(judged(t, "model-chain"), -1); ok {
		t.Error("a model has a budget")
	}
}

// The demo's path runs from 398 G through the zero at 350.5 G to 200 G, on one side
// of the pole at 402.5 G.
func TestScatteringFollowsTheSequence(t *testing.T) {
	r := judged(t, "skerry-demo")
	a, err := demo(t, "skerry-demo").Apparatus()
	if err != nil {
		t.Fatal(err)
	}
	s := NewScattering(a.Scattering, r)
	if len(s.Path) != len(r.Stages)+1 || s.Path[0].Field != 398 {
		t.Fatalf("path %+v", s.Path)
	}
	if len(s.Poles) != 1 || math.Abs(s.Poles[0]-402.5) > 1e-9 || len(s.Zeros) != 1 || math.Abs(s.Zeros[0]-350.5) > 1e-9 {
		t.Errorf("poles %v, zeros %v; want 402.5 and 350.5 G", s.Poles, s.Zeros)
	}
	holes := 0
	for i, b := range s.Fields {
		if math.IsNaN(s.Lengths[i]) {
			holes++
			continue
		}
		want, err := a.Scattering.At(b * si.Gauss)
		if err != nil || math.Abs(s.Lengths[i]*si.BohrRadius-want) > 1e-9*math.Abs(want)+1e-20 {
			t.Errorf("at %g G: %g a0, want %g", b, s.Lengths[i], want/si.BohrRadius)
		}
		if i > 0 && !(b > s.Fields[i-1]) {
			t.Errorf("fields do not rise at %g G", b)
		}
	}
	if holes != 1 {
		t.Errorf("the curve is parted %d times, want once, at the pole", holes)
	}
	paths := s.paths()
	if len(paths) != 1 || paths[0].X[0] != 200 || paths[0].X[len(paths[0].X)-1] != 398 {
		t.Errorf("%d paths, want one between 200 and 398 G", len(paths))
	}
}

func TestScatteringWithoutResonanceOrPath(t *testing.T) {
	for _, curve := range []atom.ScatteringCurve{
		{Background: 100 * si.BohrRadius},
		{Background: -29 * si.BohrRadius, Resonances: []atom.Resonance{{Position: 0.04025, Width: -0.0052}}},
	} {
		r := judged(t, "model-chain")
		c := NewScattering(curve, r).Chart()
		checkTexts(t, c, Frame{Width: 600, Height: 300}, Style{Palette: Light()})
	}
}

func TestDepthCurvesMeetTheReport(t *testing.T) {
	r := judged(t, "skerry-demo")
	end := last(r)
	d, err := NewDepthCurves(band.NewWorkspace(), r, DepthOptions{Low: end.DepthEr[0], High: 30, Points: 3})
	if err != nil {
		t.Fatal(err)
	}
	if d.Axes != "x, y" || !d.Attractive || len(d.Plan) != 2 {
		t.Errorf("axes %q, attractive %v, depths %+v", d.Axes, d.Attractive, d.Plan)
	}
	for _, tc := range []struct {
		name      string
		got, want float64
	}{
		{"J", d.Tunnelling[0], end.TunnellingHz[0]}, {"J2", d.Next[0], math.Abs(end.NextTunnellingHz[0])},
		{"U", d.Interaction[0], math.Abs(*end.InteractionHz)},
	} {
		if math.Abs(tc.got-tc.want) > 1e-9*tc.want {
			t.Errorf("%s at the plan's depth: %.12g Hz, the report has %.12g", tc.name, tc.got, tc.want)
		}
	}
	if _, err := NewDepthCurves(band.NewWorkspace(), judged(t, "model-chain"), DepthOptions{}); err == nil {
		t.Error("a model has no depths, but there is no error")
	}
	if _, err := NewDepthCurves(band.NewWorkspace(), r, DepthOptions{High: 1e6}); err == nil {
		t.Error("depth 1e6 Er gives no error")
	}
}

func TestBandsShowTheGapOfTheReport(t *testing.T) {
	end := last(judged(t, "skerry-demo"))
	b, err := NewBands(band.NewWorkspace(), "x", end.DepthEr[0], end.RecoilHz[0], 3)
	if err != nil {
		t.Fatal(err)
	}
	// Energies are good to 1e-11 Er.
	if got := (b.GapHigh - b.GapLow) * b.Recoil; math.Abs(got-end.GapHz[0]) > 1e-9*end.GapHz[0] {
		t.Errorf("gap %.12g Hz, the report has %.12g", got, end.GapHz[0])
	}
	if er, hz := b.Chart(Recoil), b.Chart(Hertz); er.Y.Unit != "Er" || hz.Y.Unit != "kHz" ||
		math.Abs(er.Curves[1].Y[0]*b.Recoil-1e3*hz.Curves[1].Y[0]) > 1e-6 {
		t.Errorf("units %s, %s: %g, %g", er.Y.Unit, hz.Y.Unit, er.Curves[1].Y[0], hz.Curves[1].Y[0])
	}
	if _, err := NewBands(band.NewWorkspace(), "x", -1, 1, 2); err == nil {
		t.Error("depth -1 Er gives no error")
	}
}

// The sum of w^2 over the picture is the norm, 1, but for the tails beyond 2.5
// sites, some 1e-6 at 6 Er, and the trapezoid rule, exact for so smooth a curve.
func TestWannierIsNormalised(t *testing.T) {
	w, err := NewWannier(band.NewWorkspace(), []string{"x", "y", "z"}, []float64{6, 6, 22})
	if err != nil {
		t.Fatal(err)
	}
	if len(w.Curves) != 2 || w.Curves[0].Axes != "x, y" || w.Curves[1].Axis != 2 {
		t.Fatalf("curves %+v", w.Curves)
	}
	for _, c := range w.Curves {
		norm := 0.0
		for _, v := range c.Values {
			norm += v * v * (w.Sites[1] - w.Sites[0])
		}
		if math.Abs(norm-1) > 1e-3 {
			t.Errorf("%g Er: norm %g", c.Depth, norm)
		}
	}
}

func TestVerdictMapKeepsItsCells(t *testing.T) {
	m := verdictMap()
	for row := range m.Rows {
		for column := range m.Columns {
			u, v := m.Cell(column, row)
			if got, want := m.At(u, v), m.Verdicts[row*m.Columns+column]; got != want {
				t.Errorf("cell %d, %d: %q, want %q", column, row, got, want)
			}
		}
	}
	if got := m.At(1e9, 0); got != "" {
		t.Errorf("outside the map: %q", got)
	}
	if column, row, ok := m.middle("sealed"); !ok || m.verdict(column, row) != "sealed" {
		t.Errorf("middle of sealed: %d, %d, %v", column, row, ok)
	}
	if _, _, ok := m.middle("nothing"); ok {
		t.Error("found the middle of a verdict that is not there")
	}
}
