package figure

import (
	"bytes"
	"flag"
	"image/png"
	"math"
	"os"
	"path/filepath"
	"testing"

	"hilltop/bosehubbard/report"
)

var update = flag.Bool("update", false, "write the golden pictures anew")

// handmade is a report with round numbers: sealed for T < 0 but for what change
// does to it.
func handmade(change func(*report.Report)) *report.Report {
	u := -900.0
	r := &report.Report{AimSign: "negative", Verdict: "sealed", HoldMS: 300}
	r.Stages = []report.Stage{{
		Name: "hold", TunnellingHz: []float64{450, 450, 16}, InteractionHz: &u, CurvatureHz: []float64{-0.4, -0.4, 0.5},
		RecoilHz: []float64{9400, 9400, 9400}, GapHz: []float64{27000, 27000, 70000},
	}}
	r.Ceiling.Terms = []report.Term{
		{Term: "kinetic", Bounds: bounds(-1740, 1870)},
		{Term: "interaction", Bounds: oneSided(u, 0)},
		{Term: "trap_x", Bounds: oneSided(-1, 0), Motion: "moving"},
		{Term: "trap_y", Bounds: oneSided(-1, 0), Motion: "moving"},
		{Term: "trap_z", Motion: "layered", Reason: "layered: tilt 354 Hz per site is at least 4J = 64 Hz"},
	}
	if change != nil {
		change(r)
	}
	r.Ceiling.Total = totalOf(r.Ceiling.Terms)
	return r
}

func goldens(t *testing.T) map[string]struct {
	p Picture
	s Style
} {
	open := handmade(func(r *report.Report) {
		r.Stages[0].CurvatureHz[0] = 0.06
		r.Ceiling.Terms[2].Bounds = oneSided(1, 0)
	})
	leaky := handmade(func(r *report.Report) {
		r.Ceiling.Criteria = []report.Criterion{{Name: "one_band", Margin: -230, Unit: "Hz", Breaks: "leaky"}}
	})
	far := handmade(func(r *report.Report) {
		r.AimSign = "positive"
		r.Ceiling.Terms[0].Bounds = bounds(-1740e3, 1870e3)
		r.Ceiling.Terms[1].Bounds = oneSided(1, 0)
		r.Ceiling.Terms[2].Bounds, r.Ceiling.Terms[3].Bounds = oneSided(1, 0), oneSided(1, 0)
		r.Stages[0].CurvatureHz = []float64{0.4, 0.4, 0.5}
	})
	state := 1200.0
	_, ladder := twoLevels(t)
	wave := &Chart{
		Name: "wave", Title: "Three axes", X: Axis{Label: "depth", Unit: "Er"}, Y: Axis{Label: "energy", Unit: "Hz", Kind: Log},
		Rules: []Rule{{Name: "load", X: 22, Dash: Pinned}},
		Marks: []Mark{{Name: "here", X: 6, Y: 100 * math.Exp(-1.2)}},
	}
	for axis, name := range []string{"x", "y", "z"} {
		u := Curve{Name: name, Dash: AxisDash(axis)}
		for i := range 60 {
			s := 1 + float64(i)/2
			u.X, u.Y = append(u.X, s), append(u.Y, 100*math.Exp(-0.2*s*float64(axis+1)/2))
		}
		wave.Curves = append(wave.Curves, u)
	}
	light, dark := Style{Palette: Light()}, Style{Palette: Dark()}
	return map[string]struct {
		p Picture
		s Style
	}{
		"ceiling-sealed-light": {&Ceiling{handmade(nil), CeilingOptions{State: &state, Pinned: leaky}}, light},
		"ceiling-open-dark":    {&Ceiling{open, CeilingOptions{Unit: Tunnelling}}, dark},
		"ceiling-leaky-light":  {&Ceiling{leaky, CeilingOptions{}}, Style{Palette: Light(), Text: 1.5}},
		"ceiling-far-dark":     {&Ceiling{far, CeilingOptions{HalfRange: 2000}}, dark},
		"ceiling-entropy-dark": {&Ceiling{handmade(nil), CeilingOptions{State: &state, Entropy: parabola(-200, 1500)}}, dark},
		"ceiling-levels-light": {ladder, light},
		"chart-light":          {wave, light},
		"map-dark":             {verdictMap().Chart(), dark},
	}
}

// Letters and edges may be smoothed a little differently from one machine to the
// next: the mean may differ by half a grey level of 255, and one pixel in 500 by
// more than half the range.
func TestGoldenPictures(t *testing.T) {
	r := NewRenderer()
	for name, g := range goldens(t) {
		path := filepath.Join("testdata", name+".png")
		img := r.Image(g.p, Frame{Width: 760, Height: 400}, g.s)
		if *update {
			var data bytes.Buffer
			if err := png.Encode(&data, img); err != nil {
				t.Fatal(err)
			}
			if err := os.WriteFile(path, data.Bytes(), 0o644); err != nil {
				t.Fatal(err)
			}
			continue
		}
		file, err := os.Open(path)
		if err != nil {
			t.Errorf("%v; run the test with -update", err)
			continue
		}
		want, err := png.Decode(file)
		file.Close()
		if err != nil || want.Bounds() != img.Bounds() {
			t.Errorf("%s: %v, size %v, want %v", path, err, img.Bounds(), want.Bounds())
			continue
		}
		if mean, worst := difference(img, want); mean > 0.5 || worst > 0.002 {
			t.Errorf("%s: mean difference %.3g of 255, want 0.5 at most; share of pixels off by half %.3g, want 0.002 at most", name, mean, worst)
		}
	}
}
