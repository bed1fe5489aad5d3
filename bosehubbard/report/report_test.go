package report

import (
	"context"
	"encoding/json"
	"errors"
	"math"
	"os"
	"strings"
	"testing"
	"unicode/utf8"

	"hilltop/assets"
	"hilltop/bosehubbard"
	"hilltop/bosehubbard/apparatus"
	"hilltop/bosehubbard/atom"
	"hilltop/bosehubbard/plan"
	"hilltop/bosehubbard/si"
	"hilltop/testdata"
)

func shipped(t testing.TB, name string) *plan.Document {
	t.Helper()
	data, err := assets.Plan(name)
	if err != nil {
		t.Fatal(err)
	}
	return open(t, data)
}

func open(t testing.TB, data []byte) *plan.Document {
	t.Helper()
	d, err := plan.Open(data)
	if err != nil {
		t.Fatal(err)
	}
	return d
}

func judge(t testing.TB, p *plan.Plan) *Report {
	t.Helper()
	r, err := Of(context.Background(), p)
	if err != nil {
		t.Fatal(err)
	}
	return r
}

func (r *Report) criterion(name string) *Criterion {
	for i := range r.Ceiling.Criteria {
		if r.Ceiling.Criteria[i].Name == name {
			return &r.Ceiling.Criteria[i]
		}
	}
	return nil
}

// TestShippedPlans: what each note says is what the judge finds.
func TestShippedPlans(t *testing.T) {
	for name, want := range map[string]struct{ verdict, broken string }{
		"skerry-demo": {"sealed", ""}, "skerry-trapped": {"open", "trap_"}, "skerry-shallow": {"leaky", "one_band"}, "model-chain": {"sealed", ""},
	} {
		r := judge(t, shipped(t, name).Plan())
		if r.Verdict != want.verdict {
			t.Errorf("%s: %s, want %s: %s", name, r.Verdict, want.verdict, r.Sentence)
		}
		worst := r.worst()
		if (worst == nil) != (want.broken == "") || worst != nil && !strings.HasPrefix(worst.Name, want.broken) {
			t.Errorf("%s: worst criterion %+v, want %q", name, worst, want.broken)
		}
		if worst != nil && worst.Advice == nil {
			t.Errorf("%s: no advice for %s", name, worst.Name)
		}
		if n := utf8.RuneCountInString(r.Sentence); n == 0 || n > sentenceLength {
			t.Errorf("%s: sentence of %d runes: %q", name, n, r.Sentence)
		}
		finite(t, name, r)
	}
}

// TestReadmePlan: the whole plan printed in the README is a good one.
func TestReadmePlan(t *testing.T) {
	text, err := os.ReadFile("../../README.md")
	if err != nil {
		t.Fatal(err)
	}
	_, rest, found := strings.Cut(string(text), "```json\n")
	body, _, closed := strings.Cut(rest, "```")
	if !found || !closed {
		t.Fatal("the README shows no plan")
	}
	if r := judge(t, open(t, []byte(body)).Plan()); r.Verdict != "sealed" {
		t.Errorf("%s: %s", r.Verdict, r.Sentence)
	}
}

// TestDemoIsHeldAtTheStart and passes the zero, never a pole.
func TestDemoIsHeldAtTheStart(t *testing.T) {
	r := judge(t, shipped(t, "skerry-demo").Plan())
	for _, c := range r.Cautions {
		if c.Code == "falls" || c.Code == "pole_crossed" {
			t.Errorf("caution %s: %s", c.Code, c.Text)
		}
	}
	zeros := 0
	for _, s := range r.Stages {
		for _, c := range s.Crosses {
			if c.Kind == "zero" {
				zeros++
			}
		}
	}
	if zeros != 1 {
		t.Errorf("%d zeros crossed, want 1", zeros)
	}
}

// TestPublishedSequence: Braun et al., Science 339, 52 (2013): U/J = -2.1(1),
// h/(2 pi J) = 10(2) ms at 22 Er, horizontal anti-trap 43(1) Hz, lattice recoil
// and J from plane waves. The calibration of a(B) in the plan is a chosen one.
func TestPublishedSequence(t *testing.T) {
	r := judge(t, open(t, testdata.Plan(t, "braun2013")).Plan())
	if r.Verdict != "sealed" {
		t.Errorf("%s: %s", r.Verdict, r.Sentence)
	}
	end := r.last()
	within := func(what string, got, want, sigma float64) {
		if !(math.Abs(got-want) <= sigma) {
			t.Errorf("%s: %.5g, published %.5g(%.2g)", what, got, want, sigma)
		}
	}
	within("a, a0", *end.ScatteringLengthA0, -37, 1)
	within("U/J", *end.InteractionPerJ, -2.1, 0.1)
	within("Er/h, Hz", end.RecoilHz[0], 9436.138, 0.05)
	within("J/h, Hz", end.TunnellingHz[0], 466.997, 0.467)
	within("anti-trap along x, Hz", end.TrapHz[0], -43, 1)
	within("anti-trap along y, Hz", end.TrapHz[1], -43, 1)
	deep := r.Stages[0]
	within("hbar/J at 22 Er, ms", *deep.TunnellingTimeMS, 10, 2)
	within("trap before loading along x, Hz", r.Start.TrapHz[0], 37, 1)
}

// finite walks everything that is written and finds no NaN or infinity.
func finite(t *testing.T, name string, r *Report) {
	t.Helper()
	text, err := json.Marshal(r)
	if err != nil {
		t.Errorf("%s: %v", name, err)
	}
	for _, bad := range []string{"NaN", "Inf"} {
		if strings.Contains(string(text), bad) {
			t.Errorf("%s: %s in %s", name, bad, text)
		}
	}
}

// TestBoundsInJSON: a number, null for unbounded, absent where not computed.
func TestBoundsInJSON(t *testing.T) {
	for _, tc := range []struct {
		bounds Bounds
		want   string
	}{
		{Bounds{}, `{}`},
		{Bounds{Floor: Bound{Known: true, Hz: math.Inf(-1)}, Ceiling: Bound{Known: true, Hz: 2.5}}, `{"floor_hz_per_atom":null,"ceiling_hz_per_atom":2.5}`},
		{Bounds{Ceiling: Bound{Known: true}}, `{"ceiling_hz_per_atom":0}`},
	} {
		text, err := json.Marshal(tc.bounds)
		if err != nil || string(text) != tc.want {
			t.Errorf("%+v: %s, %v; want %s", tc.bounds, text, err, tc.want)
		}
	}
}

func TestLayeredAxisHasAReasonAndNoBounds(t *testing.T) {
	r := judge(t, shipped(t, "skerry-demo").Plan())
	for _, term := range r.Ceiling.Terms {
		if still := term.Term == "trap_z"; still != (term.Reason != "") || still == term.Ceiling.Known {
			t.Errorf("%+v", term)
		}
	}
}

// TestLevels: two levels +-e at mean energy x e have beta = ln((1-x)/(1+x))/2e
// and S = -sum p ln p (derived).
func TestLevels(t *testing.T) {
	r := judge(t, open(t, testdata.Plan(t, "levels-spin")).Plan())
	const e, x = 8000.0, 5000.0 / 8000
	beta := math.Log((1-x)/(1+x)) / (2 * e)
	up := (1 + x) / 2
	entropy := -up*math.Log(up) - (1-up)*math.Log(1-up)
	l := r.Levels
	if r.Verdict != "sealed" || l == nil || l.BetaPerHz == nil {
		t.Fatalf("%s: %+v", r.Sentence, l)
	}
	if math.Abs(*l.BetaPerHz-beta) > 1e-12*math.Abs(beta) || math.Abs(l.EntropyKB-entropy) > 1e-12 {
		t.Errorf("beta %.12g, S %.12g; want %.12g, %.12g", *l.BetaPerHz, l.EntropyKB, beta, entropy)
	}
	if want := si.KelvinFromHz(1 / beta); math.Abs(float64(l.Temperature)-want) > 1e-9*math.Abs(want) {
		t.Errorf("T %g K, want %g", l.Temperature, want)
	}
	finite(t, "levels", r)
	for _, tc := range []struct {
		path, verdict string
		value         any
	}{
		{"/levels/unbounded", "open", true}, {"/levels/outer_time_s", "leaky", 5e-4},
		{"/levels/energy_hz_per_body", "astray", -5000.0}, {"/levels/energy_hz_per_body", "astray", 0.0},
		{"/levels/energy_hz_per_body", "sealed", 8000.0},
	} {
		d, err := open(t, testdata.Plan(t, "levels-spin")).With(tc.path, tc.value)
		if err != nil {
			t.Fatal(err)
		}
		r := judge(t, d.Plan())
		if r.Verdict != tc.verdict {
			t.Errorf("%s = %v: %s, want %s", tc.path, tc.value, r.Verdict, tc.verdict)
		}
		finite(t, tc.path, r)
	}
}

func TestMissingHoldIsAssumedAndSaid(t *testing.T) {
	d, err := shipped(t, "skerry-demo").With("/stages/4", nil)
	if err != nil {
		t.Fatal(err)
	}
	r := judge(t, d.Plan())
	if len(r.Cautions) == 0 || r.Cautions[0].Code != "no_hold" {
		t.Errorf("cautions %+v, want no_hold first", r.Cautions)
	}
	end := r.last()
	if want := 1000 * *end.TunnellingTimeMS; math.Abs(r.HoldMS-want) > 1e-9*want {
		t.Errorf("hold %g ms, want 1,000 hbar/J = %g ms", r.HoldMS, want)
	}
}

// TestGrowthApproachesTheBound: U = 0 on a chain has E_max/N = 2J cos(pi/(L+1))
// (derived), which rises to the closed-form ceiling 2J.
func TestGrowthApproachesTheBound(t *testing.T) {
	d := open(t, []byte(`{"format": "hilltop-plan", "version": 1, "model": {"sites": [8], "periodic": [false], "atoms": 8,
		"tunnelling_hz": 1.5, "interaction_hz": 0, "curvature_hz": [0]}}`))
	r := judge(t, d.Plan())
	if len(r.Ceiling.Exact) < 3 {
		t.Fatalf("%d sizes solved, want a few: %+v", len(r.Ceiling.Exact), r.Ceiling.Exact)
	}
	for _, g := range r.Ceiling.Exact {
		want := 3 * math.Cos(math.Pi/float64(g.Sites[0]+1))
		if math.Abs(g.Ceiling-want) > 1e-8 || g.Ceiling > r.Ceiling.Total.Ceiling.Hz {
			t.Errorf("%d sites: E_max/N = %.10g, want %.10g under %g", g.Sites[0], g.Ceiling, want, r.Ceiling.Total.Ceiling.Hz)
		}
	}
}

// TestGrowthScalesTheTrap: V = v N^(-2/d) keeps V R^2 per atom, so E_max/N of
// the mirrored Thomas-Fermi state converges instead of drifting away.
func TestGrowthScalesTheTrap(t *testing.T) {
	r := judge(t, shipped(t, "model-chain").Plan())
	n := len(r.Ceiling.Exact)
	if n < 3 {
		t.Fatalf("%d sizes: %+v", n, r.Ceiling.Exact)
	}
	first := math.Abs(r.Ceiling.Exact[1].Ceiling - r.Ceiling.Exact[0].Ceiling)
	last := math.Abs(r.Ceiling.Exact[n-1].Ceiling - r.Ceiling.Exact[n-2].Ceiling)
	if last >= first {
		t.Errorf("steps of E_max/N grow from %g to %g: %+v", first, last, r.Ceiling.Exact)
	}
}

func TestStopWhileJudging(t *testing.T) {
	ctx, cancel := context.WithCancel(context.Background())
	cancel()
	if _, err := Of(ctx, shipped(t, "skerry-trapped").Plan()); !errors.Is(err, context.Canceled) {
		t.Errorf("got %v, want context.Canceled", err)
	}
}

func BenchmarkJudge(b *testing.B) {
	for _, name := range []string{"skerry-demo", "skerry-trapped", "skerry-shallow", "model-chain"} {
		b.Run("plan="+name, func(b *testing.B) {
			d := shipped(b, name)
			j := NewJudge()
			b.ReportAllocs()
			for b.Loop() {
				if _, err := j.Judge(context.Background(), d.Plan()); err != nil {
					b.Fatal(err)
				}
			}
		})
	}
}

// BenchmarkKnob is a knob moved in the demo: edit, validate, judge.
func BenchmarkKnob(b *testing.B) {
	for _, knob := range []struct {
		path       string
		value, end float64
	}{{"/stages/2/power_w/sheet", 0.02, 0.2}, {"/stages/3/depth_er/0", 5, 8}, {"/stages/1/field_g", 180, 360}} {
		b.Run("knob="+strings.ReplaceAll(knob.path[1:], "/", "."), func(b *testing.B) {
			d, j := shipped(b, "skerry-demo"), NewJudge()
			step := 0
			b.ReportAllocs()
			for b.Loop() {
				step = (step + 1) % 100
				moved, err := d.With(knob.path, knob.value+(knob.end-knob.value)*float64(step)/100)
				if err != nil {
					b.Fatal(err)
				}
				if _, err := j.Judge(context.Background(), moved.Plan()); err != nil {
					b.Fatal(err)
				}
			}
		})
	}
}

// TestTrapScalesWithTheDimension: V N^(2/d) stays, so halving the atoms doubles V
// in a plane and takes it fourfold on a chain.
func TestTrapScalesWithTheDimension(t *testing.T) {
	for d, want := range map[int]float64{1: 4, 2: 2, 3: math.Cbrt(4)} {
		m := bosehubbard.Model{Axes: make([]bosehubbard.AxisTerms, d)}
		m.Axes[0].Curvature = -0.1
		if got := scaled(m, 2).Axes[0].Curvature / m.Axes[0].Curvature; math.Abs(got-want) > 1e-12 {
			t.Errorf("%d axes: V grows %g times, want %g", d, got, want)
		}
	}
}

// TestFieldsWithoutAPoleComeFirst: with a second resonance at 420 G the same a is
// found nearer by beyond the pole at 402.5 G; the first field offered must be the
// one that can be reached without crossing it.
func TestFieldsWithoutAPoleComeFirst(t *testing.T) {
	d, err := shipped(t, "skerry-demo").With("/scattering/resonances/-", map[string]any{"position_g": 420, "width_g": -8})
	if err != nil {
		t.Fatal(err)
	}
	b, err := newBench(d.Plan(), apparatus.NewWorkspace())
	if err != nil {
		t.Fatal(err)
	}
	var end apparatus.Point
	if err := b.apparatus.At(b.workspace, &end, b.sequence.Start); err != nil {
		t.Fatal(err)
	}
	for _, scale := range []float64{-0.02, -0.05, -0.07, 0.5} {
		fields := b.fieldsFor(&end)(scale)
		if len(fields) == 0 {
			t.Errorf("no field for %g times a", scale)
			continue
		}
		for _, c := range b.apparatus.Scattering.Crossings([]float64{end.Field, fields[0] * si.Gauss}) {
			if c.Kind == atom.Pole {
				t.Errorf("%g times a: %g G lies behind the pole at %g G; candidates %v", scale, fields[0], c.Field/si.Gauss, fields)
			}
		}
	}
}
