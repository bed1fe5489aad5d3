package session

import (
	"errors"
	"strings"
	"testing"
	"time"

	"hilltop/assets"
	"hilltop/bosehubbard/plan"
)

// TestKnobsSayWhereTheyComeFrom reads the demo at three stages.
func TestKnobsSayWhereTheyComeFrom(t *testing.T) {
	s, _ := newTest(t, Options{})
	for _, tc := range []struct {
		stage, id, text, unit, from, setsIn, setPath string
		inherited, clearable                         bool
	}{
		{"start", "depth_er/0", "0", "Er", "", "", "/start/depth_er/0", false, false},
		{"load", "depth_er/0", "22", "Er", "", "", "/stages/0/depth_er/0", false, true},
		{"load", "power_w/sheet", "200", "mW", "start", "", "/stages/0/power_w/sheet", true, false},
		{"flip", "field_g", "200", "G", "", "", "/stages/1/field_g", false, true},
		{"flip", "depth_er/1", "22", "Er", "load", "", "/stages/1/depth_er/1", true, false},
		{"lower", "power_w/cross", "20", "mW", "release", "", "/stages/3/power_w/cross", true, false},
		{"wait", "power_w/sheet", "20", "mW", "release", "release", "/stages/2/power_w/sheet", true, false},
		{"wait", "depth_er/2", "22", "Er", "lower", "lower", "/stages/3/depth_er/2", true, false},
	} {
		s.SelectStage(stageNamed(t, s.State(), tc.stage))
		f := field(t, s.State(), tc.id)
		got := []any{f.Text, f.Unit, f.From, f.SetsIn, f.SetPath, f.Inherited, f.Clearable}
		want := []any{tc.text, tc.unit, tc.from, tc.setsIn, tc.setPath, tc.inherited, tc.clearable}
		for i := range want {
			if got[i] != want[i] {
				t.Errorf("%s at %s: got %v, want %v", tc.id, tc.stage, got, want)
				break
			}
		}
	}
}

func TestCommitSetsInTheSelectedStageAndClearInherits(t *testing.T) {
	s, _ := newTest(t, Options{})
	s.SelectStage(stageNamed(t, s.State(), "lower"))
	if err := s.Commit("power_w/sheet", "15"); err != nil {
		t.Fatal(err)
	}
	f := field(t, s.State(), "power_w/sheet")
	mustBe(t, "text", f.Text, "15")
	mustBe(t, "path", f.Path, "/stages/3/power_w/sheet")
	mustBe(t, "inherited", f.Inherited, false)
	if err := s.Clear("power_w/sheet"); err != nil {
		t.Fatal(err)
	}
	f = field(t, s.State(), "power_w/sheet")
	mustBe(t, "text after clearing", f.Text, "20")
	mustBe(t, "from after clearing", f.From, "release")
	mustBe(t, "plan after clearing", bytesOf(s), string(demo(t)))
	mustBe(t, "name of the edit", s.State().Undo, "Power 'sheet' at 'lower': inherited")
}

// TestHoldSetsWhereTheValueIsGiven edits a knob with the hold selected.
func TestHoldSetsWhereTheValueIsGiven(t *testing.T) {
	s, _ := newTest(t, Options{})
	s.SelectStage(stageNamed(t, s.State(), "wait"))
	if err := s.Commit("power_w/sheet", "18 mW"); err != nil {
		t.Fatal(err)
	}
	mustBe(t, "name of the edit", s.State().Undo, "Power 'sheet' at 'release': 20 → 18 mW")
	mustBe(t, "power of the stage", s.State().Plan.Stages[2].PowerW["sheet"], 0.018)
}

// TestHoldsThatRepeatAValueFollow has a hold that states the depths again.
func TestHoldsThatRepeatAValueFollow(t *testing.T) {
	s, _ := newTest(t, Options{})
	if err := s.Edit("repeat", "/stages/4/depth_er", []float64{6, 6, 22}); err != nil {
		t.Fatal(err)
	}
	s.SelectStage(stageNamed(t, s.State(), "lower"))
	if err := s.Commit("depth_er/0", "7"); err != nil {
		t.Fatal(err)
	}
	rows := s.State().Plan.Rows()
	mustBe(t, "depth in the hold", rows[len(rows)-1].DepthEr[0], 7)
	s.SelectStage(stageNamed(t, s.State(), "wait"))
	if err := s.Commit("depth_er/1", "8"); err != nil {
		t.Fatal(err)
	}
	rows = s.State().Plan.Rows()
	mustBe(t, "depth set from the hold", rows[len(rows)-1].DepthEr[1], 8)
}

func TestTypedUnitStays(t *testing.T) {
	s, _ := newTest(t, Options{})
	s.SelectStage(StartStage)
	if err := s.Commit("power_w/sheet", "0.3 W"); err != nil {
		t.Fatal(err)
	}
	f := field(t, s.State(), "power_w/sheet")
	mustBe(t, "shown", f.Text+" "+f.Unit, "0.3 W")
	if err := s.Commit("power_w/sheet", "250 mW"); err != nil {
		t.Fatal(err)
	}
	f = field(t, s.State(), "power_w/sheet")
	mustBe(t, "shown", f.Text+" "+f.Unit, "250 mW")
	s.SetUnit("power_w/sheet", "uW")
	mustBe(t, "shown", field(t, s.State(), "power_w/sheet").Text, "250000")
	s.SetUnit("power_w/sheet", "Er")
	mustBe(t, "unit after a wrong one", field(t, s.State(), "power_w/sheet").Unit, "uW")
	depth := field(t, s.State(), "depth_er/0")
	if want := []string{"Er", "Hz", "kHz", "MHz", "nK", "uK"}; strings.Join(depth.Units, " ") != strings.Join(want, " ") {
		t.Errorf("units of a depth: got %v, want %v", depth.Units, want)
	}
}

func TestRefusedTextIsKept(t *testing.T) {
	s, _ := newTest(t, Options{})
	for _, tc := range []struct{ id, text, want string }{
		{"depth_er/1", "22 mW", "Depth y at 'lower': 22 mW is a power; give Er, kHz or nK. 6 Er stays."},
		{"depth_er/1", "−3", "Depth y at 'lower': −3 Er; want …. 6 Er stays."},
		{"depth_er/1", "", "Depth y at 'lower': empty; give a number in Er, kHz or nK. 6 Er stays."},
		{"power_w/sheet", "1,200", "Power 'sheet' at 'lower': 1,200 can be read in two ways: write 1.2 or 1200. 20 mW stays."},
		{"/cloud/atoms", "NaN", "Atoms: NaN is not a number; give a finite one. 80000 stays."},
		{"/cloud/atoms", "1e12", "Atoms: 1000000000000; want …. 80000 stays."},
		{"/beams/0/waist_um/0", "0", "Waist 'sheet' along y: 0 µm; want …. 120 µm stays."},
		{"/stages/3/shape", "wobbly", "Shape at 'lower': wobbly is none of hold, linear, exponential, smooth. linear stays."},
		{"/stages/3/name", "wait", "Name at 'lower': wait; then 'wait': …. lower stays."},
	} {
		err := s.Commit(tc.id, tc.text)
		before, after, _ := strings.Cut(tc.want, "…") // which stands for the plan's own words
		if err == nil || !strings.HasPrefix(err.Error(), before) || !strings.HasSuffix(err.Error(), after) {
			t.Errorf("%s %q: got %v, want %s", tc.id, tc.text, err, tc.want)
			continue
		}
		if _, ok := errors.AsType[*InputError](err); !ok {
			t.Errorf("%s %q: error of type %T, want *InputError", tc.id, tc.text, err)
		}
		f := field(t, s.State(), tc.id)
		if f.Pending != tc.text || f.Reason != err.Error() {
			t.Errorf("%s: pending %q because %q, want %q because %q", tc.id, f.Pending, f.Reason, tc.text, err)
		}
		mustBe(t, "unapplied", s.State().Unapplied, 1)
		s.Undo()
		mustBe(t, "unapplied after undo", s.State().Unapplied, 0)
		mustBe(t, "plan", bytesOf(s), string(demo(t)))
	}
}

func TestUndoClearsTextFirst(t *testing.T) {
	s, _ := newTest(t, Options{})
	if err := s.Commit("depth_er/0", "7"); err != nil {
		t.Fatal(err)
	}
	s.Preview("depth_er/1", "8")
	mustBe(t, "undo", s.State().Undo, "text in Depth y at 'lower'")
	s.Undo()
	mustBe(t, "depth x", field(t, s.State(), "depth_er/0").Text, "7")
	s.Undo()
	mustBe(t, "plan", bytesOf(s), string(demo(t)))
	mustBe(t, "touched", s.State().Touched, "depth_er/0")
}

func TestUndoGoesToItsStage(t *testing.T) {
	s, _ := newTest(t, Options{})
	s.SelectStage(stageNamed(t, s.State(), "flip"))
	if err := s.Commit("field_g", "210"); err != nil {
		t.Fatal(err)
	}
	s.SelectStage(stageNamed(t, s.State(), "load"))
	s.Undo()
	mustBe(t, "stage", s.State().Stage, stageNamed(t, s.State(), "flip"))
}

func TestCommitOfTheShownTextChangesNothing(t *testing.T) {
	s, _ := newTest(t, Options{})
	for _, g := range s.State().Groups {
		for _, f := range g.Fields {
			if err := s.Commit(f.ID, f.Text); err != nil {
				t.Errorf("%s %q: %v", f.ID, f.Text, err)
			}
		}
	}
	mustBe(t, "plan", bytesOf(s), string(demo(t)))
	mustBe(t, "undo", s.State().Undo, "")
}

func TestStepsAreOneEdit(t *testing.T) {
	s, _ := newTest(t, Options{})
	for range 5 {
		if err := s.Step("depth_er/0", 1, LastDigit); err != nil {
			t.Fatal(err)
		}
	}
	mustBe(t, "value", field(t, s.State(), "depth_er/0").Text, "11")
	mustBe(t, "undo", s.State().Undo, "Depth x at 'lower': 6 → 11 Er")
	if err := s.Step("depth_er/0", 1, TenthOfDigit); err != nil {
		t.Fatal(err)
	}
	mustBe(t, "value", field(t, s.State(), "depth_er/0").Text, "11.1")
	s.Undo()
	mustBe(t, "plan", bytesOf(s), string(demo(t)))
	for _, n := range []int{1, -1, -1, 1, 1} { // through the first value and back
		if err := s.Step("depth_er/0", n, LastDigit); err != nil {
			t.Fatal(err)
		}
	}
	mustBe(t, "undo", s.State().Undo, "Depth x at 'lower': 6 → 7 Er")
	s.Undo()
	mustBe(t, "plan", bytesOf(s), string(demo(t)))
	if err := s.Step("depth_er/0", -1, TenDigits); err == nil {
		t.Error("a step below zero: no error")
	}
}

func TestReset(t *testing.T) {
	s, _ := newTest(t, Options{})
	for id, text := range map[string]string{"depth_er/0": "9", "power_w/sheet": "25", "/cloud/atoms": "5e4", "/stages/3/shape": "smooth", "/title": "mine"} {
		if err := s.Commit(id, text); err != nil {
			t.Fatal(err)
		}
		if err := s.Reset(id); err != nil {
			t.Fatal(err)
		}
		mustBe(t, "plan after resetting "+id, bytesOf(s), string(demo(t)))
	}
}

func TestWaistsBecomeRoundAndElliptic(t *testing.T) {
	s, _ := newTest(t, Options{})
	id := "/lattice/axes/0/waist_um"
	if err := s.Commit(id+"/1", "140"); err != nil {
		t.Fatal(err)
	}
	w := s.State().Plan.Lattice.Axes[0].WaistUM
	if w.Single || w.At(0) != 150 || w.At(1) != 140 {
		t.Errorf("waists %+v, want 150 and 140", w)
	}
	if err := s.Clear(id + "/1"); err != nil {
		t.Fatal(err)
	}
	w = s.State().Plan.Lattice.Axes[0].WaistUM
	if !w.Single || w.At(0) != 150 {
		t.Errorf("waists %+v, want a round 150", w)
	}
	if err := s.Commit(id+"/0", "130"); err != nil {
		t.Fatal(err)
	}
	w = s.State().Plan.Lattice.Axes[0].WaistUM
	if !w.Single || w.At(0) != 130 {
		t.Errorf("waists %+v, want a round 130", w)
	}
}

func TestBeamIsRenamedEverywhere(t *testing.T) {
	s, _ := newTest(t, Options{})
	if err := s.Commit("/beams/0/name", "light/sheet~1"); err != nil {
		t.Fatal(err)
	}
	p := s.State().Plan
	mustBe(t, "start power", p.Start.PowerW["light/sheet~1"], 0.2)
	mustBe(t, "stage power", p.Stages[2].PowerW["light/sheet~1"], 0.02)
	mustBe(t, "powers", len(p.Stages[2].PowerW), 2)
	if f := field(t, s.State(), "power_w/light/sheet~1"); f.Path != "/stages/2/power_w/light~1sheet~01" {
		t.Errorf("path %q of the renamed beam", f.Path)
	}
	s.Undo()
	mustBe(t, "plan", bytesOf(s), string(demo(t)))
}

func TestPreviewBringsTheVerdict(t *testing.T) {
	s, v := newTest(t, Options{})
	settle(t, s, v)
	s.Focus("power_w/sheet")
	got := s.Preview("power_w/sheet", "2*30")
	if got.Text != "= 60 mW" || got.Err != nil || got.Value != 0.06 {
		t.Errorf("preview %+v, want = 60 mW", got)
	}
	st := waitFor(t, v, "the verdict", func(st State) bool { return st.Preview != nil && st.Preview.Verdict != "" })
	mustBe(t, "text", st.Preview.Text, "= 60 mW, open")
	mustBe(t, "plan", bytesOf(s), string(demo(t)))
	if got := s.Preview("power_w/sheet", "2*"); got.Err == nil {
		t.Error("no error for half a product")
	}
	mustBe(t, "preview of nonsense", s.State().Preview, nil)
	s.Revert("power_w/sheet")
	mustBe(t, "pending", field(t, s.State(), "power_w/sheet").Pending, "")
}

// TestTrack computes the verdict along a slider: sealed to the limit of the fake
// judge and open beyond it.
func TestTrack(t *testing.T) {
	s, v := newTest(t, Options{})
	s.Focus("power_w/sheet")
	st := waitFor(t, v, "a track", func(st State) bool { return st.Track != nil && st.Track.Done })
	mustBe(t, "points", len(st.Track.Points), trackCount)
	for _, p := range st.Track.Points {
		want := "sealed"
		if p.Value > 1e3*powerLimit*(1+1e-12) {
			want = "open"
		}
		if p.Verdict != want {
			t.Errorf("%g mW: got %q, want %q", p.Value, p.Verdict, want)
		}
	}
	track := st.Track
	if err := s.Commit("power_w/sheet", "25"); err != nil {
		t.Fatal(err)
	}
	mustBe(t, "track after an edit of its own knob", s.State().Track, track)
	if err := s.Commit("depth_er/0", "8"); err != nil {
		t.Fatal(err)
	}
	if s.State().Track == track {
		t.Error("the track of another plan is still shown")
	}
	s.Focus("/title")
	mustBe(t, "track of a text", s.State().Track, nil)
}

func TestAdviceButton(t *testing.T) {
	s, v := newTest(t, Options{})
	if err := s.Commit("power_w/sheet", "60"); err != nil {
		t.Fatal(err)
	}
	st := waitFor(t, v, "an advice with its verdict", func(st State) bool { return st.Verdict.Advice != nil && st.Verdict.Advice.Verdict != "" })
	mustBe(t, "text", st.Verdict.Advice.Text, "Lower 'sheet' at 'lower': 60 → 31 mW, sealed")
	mustBe(t, "blocking", st.Verdict.Blocking, "trap_x")
	s.SelectStage(StartStage)
	if err := s.Apply(*st.Verdict.Advice); err != nil {
		t.Fatal(err)
	}
	st = settle(t, s, v)
	mustBe(t, "verdict", st.Verdict.Word, "Sealed")
	mustBe(t, "touched", st.Touched, "power_w/sheet")
	mustBe(t, "stage", st.Stage, stageNamed(t, st, "lower"))
	mustBe(t, "undo", st.Undo, "Lower 'sheet' at 'lower': 60 → 31 mW, sealed")
	if a, ok := s.AdviceFor("trap_x"); ok {
		t.Errorf("advice %+v for a criterion that holds", a)
	}
}

func TestModelPlan(t *testing.T) {
	s, _ := newTest(t, Options{})
	data, err := assets.Plan("model-chain")
	if err != nil {
		t.Fatal(err)
	}
	if err := s.OpenBytes("chain", data); err != nil {
		t.Fatal(err)
	}
	st := s.State()
	mustBe(t, "stage", st.Stage, StartStage)
	u := field(t, st, "interaction_hz")
	mustBe(t, "U", u.Text+" "+u.Unit+", "+u.Word, "−2.1 Hz, attractive")
	for id, text := range map[string]string{"tunnelling_hz/0": "2", "interaction_hz": "+3", "curvature_hz/0": "0.1", "/model/periodic/0": "joined to a ring"} {
		if err := s.Commit(id, text); err != nil {
			t.Errorf("%s: %v", id, err)
		}
	}
	m := s.State().Plan.Model
	if !m.TunnellingHz.Single || m.TunnellingHz.At(0) != 2 || m.InteractionHz != 3 || m.CurvatureHz[0] != 0.1 || !m.Periodicity()[0] {
		t.Errorf("model %+v", m)
	}
	mustBe(t, "word", field(t, s.State(), "interaction_hz").Word, "repulsive")
	for s.State().Undo != "" {
		s.Undo()
	}
	mustBe(t, "plan", bytesOf(s), string(data))
}

func TestNoDocument(t *testing.T) {
	s := New(Options{Judge: fakeJudge})
	defer s.Close()
	st := s.State()
	if st.Plan != nil || st.Name != "" || st.Busy || len(st.Knobs) > 0 {
		t.Errorf("state %+v without a document", st)
	}
	s.Undo()
	s.Redo()
	s.SelectStage(3)
	s.Focus("depth_er/0")
	s.BeginDrag("depth_er/0")
	s.Drag(3)
	s.EndDrag()
	s.Retry()
	s.Stop()
	s.KeepMine()
	for what, err := range map[string]error{
		"commit": s.Commit("depth_er/0", "3"), "clear": s.Clear("x"), "step": s.Step("x", 1, LastDigit), "reset": s.Reset("x"),
		"edit": s.Edit("x", "/title", "y"), "save": s.Save(), "save as": s.SaveAs("x"), "reload": s.Reload(), "preview": s.Preview("x", "1").Err,
	} {
		if err == nil {
			t.Errorf("%s without a document: no error", what)
		}
	}
	time.Sleep(5 * time.Millisecond)
}

func TestEditRefusesWhatThePlanRefuses(t *testing.T) {
	s, _ := newTest(t, Options{})
	err := s.Edit("bad", "/cloud/atoms", -1)
	if _, ok := errors.AsType[plan.Errors](err); !ok {
		t.Errorf("error %v of type %T, want plan.Errors", err, err)
	}
	mustBe(t, "plan", bytesOf(s), string(demo(t)))
}
