package report

import (
	"strings"
	"testing"

	"hilltop/bosehubbard/plan"
)

// TestCautions changes the demo in one place and looks for what must be said.
func TestCautions(t *testing.T) {
	limits := func(path string, limit map[string]any) []plan.Edit {
		return []plan.Edit{{Path: "/limits", Value: map[string]any{path: limit}}}
	}
	for _, tc := range []struct {
		name, code, say string
		edits           []plan.Edit
	}{
		{"the demo itself", "", "", nil},
		{"start beams too weak", "falls", "'start'", []plan.Edit{{Path: "/start/power_w/sheet", Value: 0.01}, {Path: "/start/power_w/cross", Value: 0.01}}},
		{"start beams barely enough", "sag", "'start'", []plan.Edit{{Path: "/start/power_w/sheet", Value: 0.1}, {Path: "/start/power_w/cross", Value: 0.1}}},
		{"field ends on the far side", "pole_crossed", "402.5 G", []plan.Edit{{Path: "/stages/1/field_g", Value: 600.0}}},
		{"field beside the pole", "steep_field", "10 mG", []plan.Edit{{Path: "/stages/1/field_g", Value: 402.55}}},
		{"flip in a shallow lattice", "flip_moves", "'flip'", []plan.Edit{{Path: "/stages/0/depth_er", Value: []float64{3, 3, 3}}}},
		{"light between the lines", "near_line", "between the D lines", []plan.Edit{{Path: "/beams/0/wavelength_nm", Value: 768.0}}},
		{"light near a line", "near_line", "within 5 nm", []plan.Edit{{Path: "/lattice/axes/1/wavelength_nm", Value: 763.0}}},
		{"a lattice far from any line", "lattice_power", "W in one pass", []plan.Edit{{Path: "/lattice/axes/0/wavelength_nm", Value: 400.0}}},
		{"nothing moves", "stands_still", "", []plan.Edit{{Path: "/stages/4/duration_ms", Value: 1e-3}}},
		{"a power above its limit", "beyond_limits", "power_w/sheet is 0.2, above your limit 0.1", limits("/power_w/sheet", map[string]any{"max": 0.1})},
		{"a field below its limit", "beyond_limits", "'flip' field_g is 200, below your limit 250", limits("/stages/1/field_g", map[string]any{"min": 250})},
		{"a field that slews too fast", "beyond_limits", "faster than your limit 100", limits("/field_g", map[string]any{"slew_per_ms": 100})},
		{"measured values", "not_used", "measured", []plan.Edit{{Path: "/measured", Value: map[string]any{"/start/field_g": map[string]any{"value": 398.1}}}}},
		{"a stiff trap on the layers", "local_tilt", "below the centre", []plan.Edit{{Path: "/stages/2/power_w/sheet", Value: 0.2}, {Path: "/stages/2/power_w/cross", Value: 0.19}}},
	} {
		d := shipped(t, "skerry-demo")
		d, err := d.Apply(tc.edits...)
		if err != nil {
			t.Errorf("%s: %v", tc.name, err)
			continue
		}
		found := ""
		for _, c := range judge(t, d.Plan()).Cautions {
			switch {
			case c.Code == tc.code && strings.Contains(c.Text, tc.say):
				found = c.Text
			case tc.code == "" && c.Code != "d_lines_only" && c.Code != "not_judged":
				t.Errorf("the demo warns of %s: %s", c.Code, c.Text)
			}
		}
		if tc.code != "" && found == "" {
			t.Errorf("%s: no caution %s with %q in %+v", tc.name, tc.code, tc.say, judge(t, d.Plan()).Cautions)
		}
	}
}

// TestAdviceOnAMissingList: a stage that has no list of curvatures gets the whole
// list, so that a plain JSON tool can follow the advice.
func TestAdviceOnAMissingList(t *testing.T) {
	d := open(t, []byte(`{"format": "hilltop-plan", "version": 1, "model": {"sites": [3, 3], "periodic": [false, false], "atoms": 4,
		"tunnelling_hz": 1, "interaction_hz": -2, "curvature_hz": [0.5, -0.1]},
		"stages": [{"name": "turn", "duration_ms": 5, "shape": "linear", "interaction_hz": -3}]}`))
	c := judge(t, d.Plan()).criterion("trap_x")
	if c == nil || c.Advice == nil || len(c.Advice.Set) != 1 || c.Advice.Set[0].Path != "/stages/0/curvature_hz" {
		t.Fatalf("advice %+v, want the whole list of the stage", c)
	}
	d, err := d.With(c.Advice.Set[0].Path, c.Advice.Set[0].Value)
	if err != nil {
		t.Fatal(err)
	}
	if r := judge(t, d.Plan()); !r.Sealed() {
		t.Errorf("%s", r.Sentence)
	}
}

// TestHeadlineSpeaksOfTheAdviceThatSeals: with z as shallow as x and y two
// criteria are open; the tilt's advice, one axis deeper, seals.
func TestHeadlineSpeaksOfTheAdviceThatSeals(t *testing.T) {
	d, err := shipped(t, "skerry-demo").With("/stages/3/depth_er", []float64{6, 6, 6})
	if err != nil {
		t.Fatal(err)
	}
	r := judge(t, d.Plan())
	if r.Verdict != "open" || !strings.Contains(r.Sentence, "depth z to") || !strings.Contains(r.Sentence, "to seal") {
		t.Errorf("%s: %q", r.Verdict, r.Sentence)
	}
}
