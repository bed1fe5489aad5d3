package plan

import (
	"reflect"
	"slices"
	"strings"
	"testing"

	"hilltop/testdata"
)

func mustParse(t testing.TB, text string) *Plan {
	t.Helper()
	p, err := Parse([]byte(text))
	if err != nil {
		t.Fatal(err)
	}
	return p
}

func TestRowsCarryValuesOn(t *testing.T) {
	rows := mustParse(t, good).Rows()
	if len(rows) != 4 {
		t.Fatalf("%d rows, want the start and 3 stages", len(rows))
	}
	for i, want := range []Row{
		{Stage: -1, Name: "start", Shape: Hold, DepthEr: []float64{0, 0, 0}, FieldG: 398, PowerW: map[string]float64{"sheet": 0.2, "cross": 0.2}},
		{Stage: 0, Name: "load", Shape: Exponential, DurationMS: 30, DepthEr: []float64{22, 22, 22}, FieldG: 398, PowerW: map[string]float64{"sheet": 0.2, "cross": 0.2}},
		{Stage: 1, Name: "flip", Shape: Smooth, DurationMS: 2, DepthEr: []float64{22, 22, 22}, FieldG: 200, PowerW: map[string]float64{"sheet": 0.02, "cross": 0.2}},
		{Stage: 2, Name: "wait", Shape: Hold, DurationMS: 300, DepthEr: []float64{22, 22, 22}, FieldG: 200, PowerW: map[string]float64{"sheet": 0.02, "cross": 0.2}},
	} {
		got := rows[i]
		got.Given = nil
		if !reflect.DeepEqual(got, want) {
			t.Errorf("row %d:\n got %+v\nwant %+v", i, got, want)
		}
	}
	if given := sortedKeys(rows[2].Given); !slices.Equal(given, []string{"field_g", "power_w/sheet"}) {
		t.Errorf("the flip gives %v", given)
	}
	if given := len(rows[0].Given); given != 6 {
		t.Errorf("the start gives %d knobs, want all 6", given)
	}
}

func TestRowsOfAModel(t *testing.T) {
	p := mustParse(t, string(testdata.Plan(t, "model-stages")))
	rows := p.Rows()
	last := rows[len(rows)-1]
	if !slices.Equal(last.TunnellingHz, []float64{1, 0.9}) || last.InteractionHz != -2.1 || !slices.Equal(last.CurvatureHz, []float64{-0.05, -0.05}) {
		t.Errorf("the last row is %+v", last)
	}
	if start := rows[0]; !slices.Equal(start.TunnellingHz, []float64{0.05, 0.05}) {
		t.Errorf("the start has J = %v, want the one number for both axes", start.TunnellingHz)
	}
}

func TestSourceFindsTheValueInForce(t *testing.T) {
	apparatus := mustParse(t, strings.ReplaceAll(good, `"cross"`, `"1064/~cross"`))
	model := mustParse(t, goodModel)
	for _, tc := range []struct {
		plan  *Plan
		stage int
		knob  string
		want  string
	}{
		{apparatus, -1, "depth_er/0", "/start/depth_er/0"},
		{apparatus, 2, "depth_er/0", "/stages/0/depth_er/0"},
		{apparatus, 0, "power_w/sheet", "/start/power_w/sheet"},
		{apparatus, 2, "power_w/sheet", "/stages/1/power_w/sheet"},
		{apparatus, 2, "power_w/1064/~cross", "/start/power_w/1064~1~0cross"},
		{apparatus, 0, "field_g", "/start/field_g"},
		{apparatus, 1, "field_g", "/stages/1/field_g"},
		{apparatus, 1, "depth_er/3", ""},
		{apparatus, 1, "power_w/none", ""},
		{apparatus, 3, "field_g", ""},
		{apparatus, -2, "field_g", ""},
		{model, -1, "tunnelling_hz/1", "/model/tunnelling_hz"},
		{model, 0, "tunnelling_hz/1", "/stages/0/tunnelling_hz/1"},
		{model, -1, "interaction_hz", "/model/interaction_hz"},
		{model, 0, "interaction_hz", "/stages/0/interaction_hz"},
		{model, 0, "curvature_hz/1", "/model/curvature_hz/1"},
		{model, 0, "field_g", ""},
	} {
		if got := tc.plan.Source(tc.stage, tc.knob); got != tc.want {
			t.Errorf("stage %d, %s: got %q, want %q", tc.stage, tc.knob, got, tc.want)
		}
	}
}

// TestSourcesLeadToTheirValues follows the source of every knob of every stage of
// every good plan into the text and finds the value of the row there.
func TestSourcesLeadToTheirValues(t *testing.T) {
	for name, data := range shippedPlans(t) {
		d, err := Open(data)
		if err != nil {
			t.Fatal(err)
		}
		for _, row := range d.Plan().Rows() {
			for _, knob := range d.Plan().Knobs() {
				path := d.Plan().Source(row.Stage, knob)
				text, ok := d.Value(path)
				if !ok && row.Value(knob) == 0 && strings.HasPrefix(path, "/model/curvature_hz") {
					continue // absent, hence 0
				}
				if want := row.Value(knob); !ok || number(t, text) != want {
					t.Errorf("%s, %s: %s = %s, want %g", name, knob, path, text, want)
				}
			}
		}
	}
}
