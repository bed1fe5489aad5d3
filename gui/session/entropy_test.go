package session

import (
	"context"
	"encoding/json"
	"math"
	"slices"
	"testing"
	"time"

	"hilltop/assets"
	"hilltop/bosehubbard/plan"
	"hilltop/bosehubbard/report"
)

// model is a model plan as text.
func modelText(t testing.TB, change map[string]any) []byte {
	t.Helper()
	m := map[string]any{"sites": []int{12}, "periodic": []bool{false}, "atoms": 12, "tunnelling_hz": 1, "interaction_hz": -2.1, "curvature_hz": []float64{-0.05}}
	for key, v := range change {
		m[key] = v
	}
	data, err := json.Marshal(map[string]any{"format": "hilltop-plan", "version": 1, "aim_sign": "negative", "model": m})
	if err != nil {
		t.Fatal(err)
	}
	return data
}

// following starts a session that follows the plan as a page does.
func following(t testing.TB, data []byte) (*Session, *screen) {
	t.Helper()
	v := &screen{}
	var s *Session
	ready := make(chan struct{})
	s = New(Options{Show: func(st State) {
		<-ready
		s.FollowEntropy()
		v.show(st)
	}})
	close(ready)
	t.Cleanup(s.Close)
	if err := s.OpenBytes("model", data); err != nil {
		t.Fatal(err)
	}
	return s, v
}

func fresh(st State) bool {
	return st.Entropy.Result != nil && !st.Entropy.Job.Stale && !st.Entropy.Job.Running && !st.Stale
}

func smallOf(t *testing.T, data []byte) (*plan.Plan, *smallPlan, []EntropySize) {
	t.Helper()
	p, err := plan.Parse(data)
	if err != nil {
		t.Fatal(err)
	}
	r, err := report.NewJudge().Judge(context.Background(), p)
	if err != nil {
		t.Fatal(err)
	}
	k, err := smallKind(p, r)
	if err != nil {
		t.Fatal(err)
	}
	return p, k, (&Session{}).sizes(k)
}

func TestSizesOfAModel(t *testing.T) {
	for _, tc := range []struct {
		change map[string]any
		want   []string // shape and atoms
	}{
		{nil, []string{"6/6", "8/8", "10/10", "12/12"}},
		{map[string]any{"sites": []int{9}, "atoms": 3}, []string{"6/2", "8/3", "9/3"}},
		{map[string]any{"sites": []int{4}, "atoms": 4}, []string{"4/4"}},
		{map[string]any{"sites": []int{40}, "atoms": 20}, []string{"6/3", "8/4", "10/5", "12/6"}},
		{map[string]any{"sites": []int{3, 4}, "periodic": []bool{false, false}, "curvature_hz": []float64{-0.1, -0.1}}, []string{"3×2/6", "4×2/8", "5×2/10", "3×4/12"}},
	} {
		_, _, sizes := smallOf(t, modelText(t, tc.change))
		var got []string
		for _, z := range sizes {
			got = append(got, shapeText(z.Shape)+"/"+shapeText([]int{z.Atoms}))
		}
		if !slices.Equal(got, tc.want) {
			t.Errorf("%v: sizes %v, want %v", tc.change, got, tc.want)
		}
	}
}

func TestSizesOfAnApparatusFollowTheAxesThatMove(t *testing.T) {
	data, err := assets.Plan("skerry-demo")
	if err != nil {
		t.Fatal(err)
	}
	_, k, sizes := smallOf(t, data)
	if len(k.axes) != 2 || k.axes[0].Tunnelling <= 0 || k.axes[0].Curvature >= 0 || k.interaction >= 0 {
		t.Fatalf("the demo moves along x and y with V < 0 and U < 0, got %+v", k)
	}
	for i, want := range []string{"3×2", "4×2", "5×2", "4×3"} {
		if got := shapeText(sizes[i].Shape); got != want || sizes[i].Atoms != sizes[i].Sites {
			t.Errorf("size %d: %s with %d atoms, want %s at filling 1", i, got, sizes[i].Atoms, want)
		}
	}
}

// Dimensions of N atoms on N sites: binomial(2N-1, N).
func TestCostIsSaidBefore(t *testing.T) {
	_, _, sizes := smallOf(t, modelText(t, nil))
	for i, want := range []string{"462", "6435", "92378", "1352078"} {
		z := sizes[i]
		if z.Dimension != want || !z.Fits || !(z.Bytes > 0) || !(z.Seconds > 0) {
			t.Errorf("size %d: %+v, want dimension %s and a cost", i, z, want)
		}
		if i > 0 && (z.Bytes <= sizes[i-1].Bytes || z.Seconds <= sizes[i-1].Seconds) {
			t.Errorf("%s costs no more than %s", z.Text, sizes[i-1].Text)
		}
		if z.automatic() != (z.Sites <= 10) {
			t.Errorf("%d sites follow by themselves: %v", z.Sites, z.automatic())
		}
	}
	_, _, large := smallOf(t, modelText(t, map[string]any{"atoms": 360}))
	if z := large[len(large)-1]; z.Fits || z.automatic() {
		t.Errorf("360 atoms on 12 sites: %s, want too large", z.Text)
	}
}

func TestStateOfAFockPlan(t *testing.T) {
	fock := []int{0, 0, 0, 2, 1, 0}
	data := modelText(t, map[string]any{"sites": []int{6}, "atoms": 3, "fock": fock})
	_, k, sizes := smallOf(t, data)
	z := sizes[len(sizes)-1]
	system, err := k.system(z)
	if err != nil {
		t.Fatal(err)
	}
	got := k.state(z, system)
	// By hand: U once for the pair; V (0.5^2 twice, 1.5^2 once).
	want := (-2.1 - 0.05*(2*0.25+2.25)) / 3
	if got == nil || math.Abs(*got-want) > 1e-15 {
		t.Errorf("state %v, want %g", got, want)
	}
	_, k, sizes = smallOf(t, modelText(t, map[string]any{"fock": []int{1, 1, 1, 1, 1, 1, 1, 1, 1, 1, 1, 1}}))
	if system, err = k.system(sizes[0]); err != nil {
		t.Fatal(err)
	}
	if got := k.state(sizes[0], system); got != nil {
		t.Errorf("a Fock state of 12 sites on %s: %g", shapeText(sizes[0].Shape), *got)
	}
}

func TestEntropyFollowsThePlan(t *testing.T) {
	s, v := following(t, modelText(t, map[string]any{"sites": []int{8}, "atoms": 8}))
	st := waitFor(t, v, "S(E)", fresh)
	first := st.Entropy.Result
	if first.Sites != 8 || len(first.Curve.Energy) == 0 || first.State != nil {
		t.Fatalf("result %+v", first)
	}
	if !(first.Curve.Beta[100] > 0 && first.Curve.Beta[180] < 0) {
		t.Error("beta does not fall from T > 0 to T < 0")
	}
	if err := s.Edit("U", "/model/interaction_hz", -5); err != nil {
		t.Fatal(err)
	}
	st = waitFor(t, v, "S(E) of the new plan", func(st State) bool { return fresh(st) && st.Entropy.Result != first })
	if got, before := st.Entropy.Result.Curve.Energy[0], first.Curve.Energy[0]; got >= before {
		t.Errorf("floor %g with U = -5, %g with -2.1", got, before)
	}
}

func TestEntropyOfALargeSizeWaitsToBeAsked(t *testing.T) {
	s, v := following(t, modelText(t, map[string]any{"sites": []int{8}, "atoms": 16})) // 245,157 states
	st := waitFor(t, v, "S(E)", fresh)
	if st.Entropy.Result.Sites != 6 {
		t.Fatalf("%d sites at first, want the 6 of 6,188 states", st.Entropy.Result.Sites)
	}
	s.ChooseEntropySize(8)
	st = waitFor(t, v, "the choice", func(st State) bool { return st.Entropy.Sizes[st.Entropy.Chosen].Sites == 8 })
	time.Sleep(3 * settleTime)
	if st = s.State(); st.Entropy.Job.Running || st.Entropy.Runs {
		t.Fatal("8 sites run without being asked")
	}
	s.StartEntropy()
	waitFor(t, v, "8 sites to run", func(st State) bool { return st.Entropy.Job.Running })
	begin := time.Now()
	s.StopEntropy()
	waitFor(t, v, "the stop", func(st State) bool { return !st.Entropy.Job.Running && st.Entropy.Held })
	if late := time.Since(begin); late > time.Second {
		t.Errorf("stopped after %v", late)
	}
	if st = s.State(); st.Entropy.Result.Sites != 6 {
		t.Errorf("after the stop the result has %d sites, want the 6 of before", st.Entropy.Result.Sites)
	}
	s.ChooseEntropySize(6)
	waitFor(t, v, "6 sites", func(st State) bool { return fresh(st) && st.Entropy.Result.Sites == 6 })
}

func TestNewestPlanWins(t *testing.T) {
	s, v := following(t, modelText(t, map[string]any{"sites": []int{8}, "atoms": 8}))
	waitFor(t, v, "S(E)", fresh)
	for i := range 12 {
		if err := s.Edit("U", "/model/interaction_hz", -3-float64(i)/4); err != nil {
			t.Fatal(err)
		}
		time.Sleep(15 * time.Millisecond)
	}
	waitFor(t, v, "S(E) of the last plan", func(st State) bool { return fresh(st) && st.Plan.Model.InteractionHz == -5.75 })
}

func TestAnotherDocumentBringsNoOldCurve(t *testing.T) {
	s, v := following(t, modelText(t, map[string]any{"sites": []int{6}, "atoms": 6}))
	waitFor(t, v, "S(E)", fresh)
	if err := s.OpenBytes("other", modelText(t, map[string]any{"sites": []int{3, 2}, "periodic": []bool{false, false}, "curvature_hz": []float64{0, 0}, "atoms": 6})); err != nil {
		t.Fatal(err)
	}
	if st := s.State(); st.Entropy.Result != nil {
		t.Error("the curve of the model stands beside another plan")
	}
	st := waitFor(t, v, "S(E) of the other", func(st State) bool { return st.Name == "other" && fresh(st) })
	if st.Entropy.Result.Curve.Name != "3×2 sites, 6 atoms" {
		t.Errorf("of %q, want 3×2 sites", st.Entropy.Result.Curve.Name)
	}
}

func TestLevelsHaveNoSmallSystem(t *testing.T) {
	s, v := following(t, []byte(`{"format":"hilltop-plan","version":1,"levels":{"energies_hz":[-8000,8000],"degeneracies":[1,1],"bodies":1e20,"inner_time_s":1e-4,"outer_time_s":300,"energy_hz_per_body":5000}}`))
	st := waitFor(t, v, "a report", func(st State) bool { return st.Report != nil })
	s.FollowEntropy()
	if len(st.Entropy.Sizes) != 0 || st.Entropy.Why != "" {
		t.Errorf("levels offer %+v", st.Entropy)
	}
}
