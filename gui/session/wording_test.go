package session

import (
	"math"
	"strings"
	"testing"

	"hilltop/bosehubbard/report"
)

func TestFitSentence(t *testing.T) {
	long := strings.Repeat("many words ", 20)
	for _, tc := range []struct{ text, want string }{
		{"Sealed.", "Sealed."},
		{"Open: the first sentence. " + long, "Open: the first sentence."},
		{long, "many words many words many words many words many words many words many words many words many…"},
		{strings.Repeat("x", 200), strings.Repeat("x", 95) + "…"},
	} {
		got := fitSentence(tc.text)
		if got != tc.want || len([]rune(got)) > sentenceLength {
			t.Errorf("%q: got %q, want %q", tc.text, got, tc.want)
		}
	}
}

func TestJoinSteps(t *testing.T) {
	for _, tc := range []struct {
		steps []adviceStep
		want  string
	}{
		{[]adviceStep{{"Raise", "depth x", " at 'a'", "2 Er", "2", "4 Er"}, {"Raise", "depth y", " at 'a'", "2 Er", "2", "4 Er"}},
			"Raise depth x, y at 'a': 2 → 4 Er"},
		{[]adviceStep{{"Raise", "depth x", " at 'a'", "2 Er", "2", "4 Er"}, {"Lower", "'sheet'", " at 'b'", "45 mW", "45", "31 mW"}},
			"Raise depth x at 'a': 2 → 4 Er; lower 'sheet' at 'b': 45 → 31 mW"},
		{[]adviceStep{{"Set", "Title", "", "", "", "x"}}, "Set Title: x"},
		{nil, ""},
	} {
		if got := joinSteps(tc.steps); got != tc.want {
			t.Errorf("got %q, want %q", got, tc.want)
		}
	}
}

// TestDecisive prefers the first criterion of the worst kind that has an advice.
func TestDecisive(t *testing.T) {
	advice := &report.Advice{}
	r := &report.Report{Verdict: "open", Ceiling: report.Ceiling{Criteria: []report.Criterion{
		{Name: "one_band", Breaks: "leaky", Advice: advice}, {Name: "interaction", Passed: true, Breaks: "open"},
		{Name: "trap_x", Breaks: "open"}, {Name: "trap_y", Breaks: "open", Advice: advice},
	}}}
	mustBe(t, "decisive", decisive(r).Name, "trap_y")
	r.Ceiling.Criteria[3].Advice = nil
	mustBe(t, "decisive without advice", decisive(r).Name, "trap_x")
	if c := decisive(&report.Report{Verdict: "sealed"}); c != nil {
		t.Errorf("decisive %v of a sealed plan", c)
	}
}

func TestPageKeys(t *testing.T) {
	stage := &report.Stage{TrapHz: []float64{-41, -39.96, 28}, TunnellingHz: []float64{475.2, 475.2, 16.3}}
	r := &report.Report{AimSign: "negative", Stages: []report.Stage{{EndMS: 336.5}}}
	r.Ceiling.Terms = []report.Term{{Term: "trap_z", Reason: "layered"}}
	r.Ceiling.Total.Ceiling = report.Bound{Known: true, Hz: 1974.3}
	mustBe(t, "keys", pageKeys(r, stage), PageKeys{"y −40 Hz", "J 475 Hz", "+1974 Hz", "336.5 ms"})
	r.Ceiling.Total.Ceiling.Hz = math.Inf(1)
	mustBe(t, "ceiling without bound", pageKeys(r, stage).Ceiling, "none")
	r.AimSign = "positive"
	mustBe(t, "ceiling that is not known", pageKeys(r, stage).Ceiling, "")
	mustBe(t, "trap for T > 0", pageKeys(r, stage).Bench, "x −41 Hz")
}

func TestStageRows(t *testing.T) {
	u, a := -983.7, -37.0
	r := &report.Report{Start: &report.Stage{Name: "start"}, Stages: []report.Stage{
		{Name: "load", EndMS: 30, TunnellingHz: []float64{1e5, 2e5}},
		{Name: "flip", EndMS: 32.5, TunnellingHz: []float64{467, 467, 16.42}, CurvatureHz: []float64{-0.48, -0.48, -0.48},
			InteractionHz: &u, ScatteringLengthA0: &a, Crosses: []report.Crossing{{Kind: "zero", FieldG: 350.5}, {Kind: "pole", FieldG: 402.5}}},
	}}
	rows := stageRows(r)
	mustBe(t, "rows", len(rows), 3)
	mustBe(t, "start", rows[0], StageRow{Stage: StartStage, Name: "start"})
	mustBe(t, "load", rows[1], StageRow{Stage: 0, Name: "load", Duration: "30 ms", Tunnelling: "100, 200 kHz"})
	mustBe(t, "flip", rows[2], StageRow{Stage: 1, Name: "flip", Duration: "2.5 ms", Tunnelling: "467, 467, 16.4 Hz", Curvature: "−0.48 Hz",
		Interaction: "−983.7 Hz, attractive", Scattering: "−37 a0", Crosses: "zero at 350.5 G, pole at 402.5 G"})
}

// TestExplain asks for every number of the demo and of its fields.
func TestExplain(t *testing.T) {
	v := &screen{}
	s := New(Options{Show: v.show})
	defer s.Close()
	if err := s.NewFrom("skerry-demo"); err != nil {
		t.Fatal(err)
	}
	st := settle(t, s, v)
	topics := []string{}
	for topic := range quantities {
		topics = append(topics, topic)
	}
	for _, f := range st.Knobs {
		topics = append(topics, f.ID)
	}
	for _, g := range st.Groups {
		for _, f := range g.Fields {
			topics = append(topics, f.ID)
		}
	}
	for _, topic := range topics {
		e, ok := s.Explain(topic)
		first, second := e.Lines()
		if !ok || first == "" || second == "" || strings.ContainsAny(first+second, "\n") {
			t.Errorf("%s: %v, %q, %q", topic, ok, first, second)
		}
		if f, isField := st.Field(topic); isField && f.Text != "" && !strings.Contains(first, f.Text) {
			t.Errorf("%s: %q does not say %s", topic, first, f.Text)
		}
	}
	for _, c := range st.Report.Ceiling.Criteria {
		if e, ok := s.Explain(c.Name); !ok || e.Inputs != c.Detail {
			t.Errorf("%s: %v, inputs %q, want %q", c.Name, ok, e.Inputs, c.Detail)
		}
	}
	if _, ok := s.Explain("nothing of the kind"); ok {
		t.Error("an explanation of nothing")
	}
	u, _ := s.Explain("interaction_hz")
	if !strings.Contains(u.Inputs, "a = −21.55 a0") {
		t.Errorf("inputs of U: %q, want its scattering length", u.Inputs)
	}
}
