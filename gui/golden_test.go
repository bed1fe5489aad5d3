package gui

import (
	"bytes"
	"image/png"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"hilltop/bosehubbard/plan"
	"hilltop/bosehubbard/report"
	"hilltop/gui/session"
)

// leakyState is a state made up for pictures, so that they change only with the
// window: numbers are of no plan. It has all that can stand in a first window.
func leakyState() session.State {
	bound := func(hz float64) report.Bound { return report.Bound{Known: true, Hz: hz} }
	criteria := []report.Criterion{
		{Name: "interaction", Passed: true, Margin: 984, Unit: "Hz", Breaks: open, Detail: "U = -984 Hz, attractive"},
		{Name: "trap_x", Margin: -12.4, Unit: "Hz", Breaks: open, Detail: "trap +12.4 Hz along x"},
		{Name: "one_band", Margin: -230, Unit: "Hz", Breaks: leaky, Detail: "gap 9320 Hz against band widths + |U| + tilt = 9550 Hz"},
		{Name: "energy", Margin: -31.5, Unit: "Hz", Breaks: astray, Detail: "31.5 Hz below infinite temperature"},
	}
	r := &report.Report{Verdict: leaky, AimSign: "negative", HoldMS: 300, Stages: []report.Stage{{Name: "load"}, {Name: "wait"}}}
	r.Ceiling.Criteria = criteria
	r.Ceiling.Terms = []report.Term{
		{Term: "kinetic", Bounds: report.Bounds{Floor: bound(-1832), Ceiling: bound(1975)}},
		{Term: "trap_z", Reason: "frozen: J hold / ħ = 0.02 is at most 0.1"},
	}
	r.Ceiling.Total = report.Bounds{Floor: bound(-1832), Ceiling: bound(1975)}
	return session.State{
		Number: 1 << 60, Name: "picture.json", Path: "picture.json", Dirty: true, Plan: &plan.Plan{}, Stage: 0,
		Rail: []session.Stop{{Stage: -1, Name: "start"}, {Stage: 0, Name: "load"}, {Stage: 1, Name: "wait"}},
		Knobs: []session.Field{
			{ID: "depth_er/0", Label: "Depth x", Text: "6.1", Unit: "Er", Value: 6.1, Min: 0, Max: 40, Slider: true},
			{ID: "power_w/sheet", Label: "Power 'sheet'", Text: "20", Unit: "mW", Inherited: true, From: "load"},
			{ID: "field_g", Label: "Bias field", Text: "398", Unit: "G", Pending: "398 mV", Reason: "Bias field at 'load': 398 mV is a voltage; give G or mT. 398 G stays."},
			{ID: "interaction_hz", Label: "Interaction U", Text: "−984", Unit: "Hz", Word: "attractive", Signed: true},
		},
		Report: r, Keys: session.PageKeys{Ceiling: "+1975 Hz"},
		Verdict: session.Verdict{Word: "Leaky", Aim: "negative", Sentence: "Leaky: two atoms can leave the band (gap short by 230 Hz).",
			Advice: &session.Advice{Text: "Raise depth x at 'load': 6.1 → 6.4 Er, sealed"}},
		Unapplied: 1, Undo: "depth x",
		Rows: []session.StageRow{
			{Stage: 0, Name: "load", Duration: "30 ms", Tunnelling: "467, 467, 16.4 Hz", Interaction: "−984 Hz, attractive", Scattering: "−37 a0"},
			{Stage: 1, Name: "wait", Duration: "300 ms", Tunnelling: "467, 467, 16.4 Hz", Interaction: "−984 Hz, attractive", Scattering: "−37 a0", Crosses: "zero at 350.5 G"},
		},
		Track: &session.Track{Field: "depth_er/0", Unit: "Er", Max: 40, Done: true, Points: []session.TrackPoint{
			{Value: 0, Verdict: open}, {Value: 5, Verdict: leaky}, {Value: 10, Verdict: sealed}, {Value: 30, Verdict: astray}, {Value: 40, Verdict: astray},
		}},
		Notice: "Saved picture.json.",
	}
}

// The window as a picture: the three folds, light and dark.
func TestGoldenPictures(t *testing.T) {
	for _, tc := range []struct {
		name string
		setup
		drawer bool
	}{
		{"full-light", setup{width: 1280, height: 900}, false},
		{"full-dark", setup{width: 1280, height: 900, variant: Dark}, false},
		{"compact-light", setup{width: 1024, height: 900}, false},
		{"drawer-dark", setup{width: 1024, height: 600, variant: Dark, scale: 1.5}, true},
	} {
		b := newBench(t, tc.setup)
		b.window.drawerOpen = tc.drawer
		b.window.column.atHand = "depth_er/0"
		b.window.Show(leakyState())
		b.window.arrange()
		b.settle()
		b.checkLayout(tc.name)
		b.golden(tc.name)
	}
}

// The pages with pictures of the demo: numbers change with the physics, and then
// these pictures do.
func TestGoldenPages(t *testing.T) {
	for _, tc := range []struct {
		page string
		setup
	}{
		{"Bench", setup{width: 1280, height: 768}},
		{"Lattice", setup{width: 1024, height: 648, variant: Dark}},
	} {
		b := newBench(t, tc.setup)
		b.turnTo(tc.page)
		b.golden("page-" + strings.ToLower(tc.page))
	}
}

// golden compares the window with the picture in testdata, or writes it with
// -update. Up to one pixel in 200 may differ: fonts are smoothed, not moved.
func (b *bench) golden(name string) {
	b.Helper()
	path := filepath.Join("testdata", name+".png")
	got := b.canvas().Capture()
	if *update {
		writePNG(b.T, path, got)
		return
	}
	data, err := os.ReadFile(path)
	if err != nil {
		b.Fatal(err)
	}
	want, err := png.Decode(bytes.NewReader(data))
	if err != nil {
		b.Fatalf("%s: %v", path, err)
	}
	const tolerance = 0.005
	if part := differing(got, want); part > tolerance {
		b.keep("golden-" + name)
		b.Errorf("%s: %.2f %% of the pixels differ, want at most %.2f %% (size %v, want %v); HILLTOP_SHOTS names a folder for what was drawn, -update takes it",
			path, 100*part, 100*tolerance, got.Bounds().Size(), want.Bounds().Size())
	}
}
