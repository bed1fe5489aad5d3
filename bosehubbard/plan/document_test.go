package plan

import (
	"encoding/json"
	"errors"
	"math"
	"strings"
	"testing"
)

func number(t testing.TB, text []byte) float64 {
	t.Helper()
	var x float64
	if err := json.Unmarshal(text, &x); err != nil {
		t.Fatalf("%s: %v", text, err)
	}
	return x
}

func mustOpen(t testing.TB, text string) *Document {
	t.Helper()
	d, err := Open([]byte(text))
	if err != nil {
		t.Fatal(err)
	}
	return d
}

// difference shows where two texts begin to differ.
func difference(got, want string) string {
	i := 0
	for i < len(got) && i < len(want) && got[i] == want[i] {
		i++
	}
	begin := max(0, i-30)
	return "got\n..." + got[begin:min(len(got), i+90)] + "\nwant\n..." + want[begin:min(len(want), i+90)]
}

func sum(a, b float64) float64 { return a + b }

// edited is an edit of the good plan as a replacement in its text.
type edited struct {
	name     string
	edits    []Edit
	old, new string
}

func TestEditsTouchOnlyTheirPlace(t *testing.T) {
	set := func(path string, value any) []Edit { return []Edit{{path, value}} }
	for _, tc := range []edited{
		{"number", set("/start/field_g", 397.5), `398`, `397.5`},
		{"shortest number", set("/start/field_g", sum(0.1, 0.2)), `398`, `0.30000000000000004`},
		{"small number", set("/stages/1/power_w/sheet", 2e-7), `0.02`, `2e-7`},
		{"entry of a list", set("/stages/0/depth_er/1", 20), `[22,22,22]`, `[22,20,22]`},
		{"text", set("/title", "a \"b\" <c>"), `"t"`, `"a \"b\" <c>"`},
		{"new power", set("/stages/1/power_w/cross", 0.01), `{"sheet": 0.02}`, `{"sheet": 0.02, "cross": 0.01}`},
		{"new object", set("/stages/0/power_w/cross", 0.01), `[22,22,22]}`, `[22,22,22], "power_w": {"cross": 0.01}}`},
		{"new list of depths", set("/stages/1/depth_er/2", 30), `{"sheet": 0.02}`, `{"sheet": 0.02}, "depth_er": [22, 22, 30]`},
		{"second waist", set("/lattice/axes/0/waist_um/1", 140), `"waist_um": 150, "return_ratio"`, `"waist_um": [150, 140], "return_ratio"`},
		{"key behind the last", set("/note", "n"), `"outputs": []`, `"outputs": [], "note": "n"`},
		{"key of the user", set("/x_lab/log", []string{"a"}), `"outputs": []`, `"outputs": [], "x_lab": {"log": ["a"]}`},
		{"into an empty object", set("/limits/~1field_g/max", 600), `"limits": {}`, `"limits": {"/field_g": {"max": 600}}`},
		{"appended output", set("/outputs/-", map[string]int{"channel": 1}), `[]`, `[{"channel": 1}]`},
		{"appended stage", set("/stages/3", Stage{Name: "more", DurationMS: 1, Shape: Hold}), `"shape": "hold"}`,
			`"shape": "hold"},` + "\n  " + `{"name": "more", "duration_ms": 1, "shape": "hold"}`},
		{"removed key", set("/gravity_axis", nil), ` "gravity_axis": "z",` + "\n", ``},
		{"removed first key", set("/stages/1/field_g", nil), `"field_g": 200, `, ``},
		{"removed list", set("/scattering", nil), ` "scattering": {"resonances": [{"position_g": 402.5, "width_g": -52}], "background_a0": -29},` + "\n", ``},
		{"removed last power", set("/stages/1/power_w/sheet", nil), `, "power_w": {"sheet": 0.02}`, ``},
		{"removed stage", set("/stages/2", nil), `,` + "\n  " + `{"name": "wait", "duration_ms": 300, "shape": "hold"}`, ``},
		{"inherited depth", set("/stages/0/depth_er/1", nil), `[22,22,22]`, `[22,0,22]`},
		{"renamed beam", []Edit{{"/beams/1/name", "dimple"}, {"/start/power_w/cross", nil}, {"/start/power_w/dimple", 0.3}},
			``, ``},
		{"hold that becomes a ramp", []Edit{{"/stages/2/shape", Linear}, {"/stages/2/field_g", 100}},
			`"shape": "hold"`, `"shape": "linear", "field_g": 100`},
		{"two depths", []Edit{{"/stages/1/depth_er/0", 8}, {"/stages/1/depth_er/1", 9}},
			`{"sheet": 0.02}`, `{"sheet": 0.02}, "depth_er": [8, 9, 22]`},
		{"nothing", nil, ``, ``},
	} {
		got, err := mustOpen(t, good).Apply(tc.edits...)
		if err != nil {
			t.Errorf("%s: %v", tc.name, err)
			continue
		}
		want := good
		if tc.name == "renamed beam" {
			want = strings.Replace(want, `"name": "cross"`, `"name": "dimple"`, 1)
			want = strings.Replace(want, `"cross": 0.2`, `"dimple": 0.3`, 1)
		} else if tc.old != "" {
			if strings.Count(good, tc.old) != 1 {
				t.Fatalf("%s: %q stands %d times in the good plan", tc.name, tc.old, strings.Count(good, tc.old))
			}
			want = strings.Replace(want, tc.old, tc.new, 1)
		}
		if string(got.Bytes()) != want {
			t.Errorf("%s: %s", tc.name, difference(string(got.Bytes()), want))
		}
	}
}

func TestEditsOfAModel(t *testing.T) {
	for _, tc := range []struct{ path, old, new string }{
		{"/model/tunnelling_hz/1", `"tunnelling_hz": 1,`, `"tunnelling_hz": [1, 7],`},
		{"/stages/0/curvature_hz/0", `"tunnelling_hz": [1, 2]}`, `"tunnelling_hz": [1, 2], "curvature_hz": [7, 0]}`},
	} {
		got, err := mustOpen(t, goodModel).With(tc.path, 7)
		if err != nil {
			t.Errorf("%s: %v", tc.path, err)
			continue
		}
		if want := strings.Replace(goodModel, tc.old, tc.new, 1); string(got.Bytes()) != want {
			t.Errorf("%s: got\n%s\nwant\n%s", tc.path, got.Bytes(), want)
		}
	}
	bare := strings.Replace(goodModel, `, "curvature_hz": [-0.05, 0]`, ``, 1)
	got, err := mustOpen(t, bare).With("/model/curvature_hz/1", -0.5)
	if err != nil || !strings.Contains(string(got.Bytes()), `"curvature_hz": [0, -0.5]`) {
		t.Errorf("curvature from nothing: %v", err)
	}
	bare = strings.Replace(goodModel, `"periodic": [false, true], `, ``, 1)
	got, err = mustOpen(t, bare).With("/model/periodic/0", true)
	if err != nil || !strings.Contains(string(got.Bytes()), `"periodic": [true, false]`) {
		t.Errorf("periodic from nothing: %v", err)
	}
}

func TestCompactTextStaysCompact(t *testing.T) {
	var compact strings.Builder
	for _, r := range good {
		if r != ' ' && r != '\n' {
			compact.WriteRune(r)
		}
	}
	d, err := mustOpen(t, compact.String()).With("/stages/0/power_w/cross", 0.01)
	if err != nil {
		t.Fatal(err)
	}
	if !strings.Contains(string(d.Bytes()), `"depth_er":[22,22,22],"power_w":{"cross":0.01}}`) {
		t.Errorf("got %s", d.Bytes())
	}
}

func TestBadEditsAreRefused(t *testing.T) {
	d := mustOpen(t, good)
	for _, tc := range []struct {
		path  string
		value any
		want  string
	}{
		{"stages/0", 1, "plan: stages/0: want a path like /stages/0/field_g, with ~0 for ~ and ~1 for /"},
		{"/start/field_g", math.NaN(), "plan: /start/field_g: NaN: want a finite number"},
		{"/start/field_g", math.Inf(-1), "plan: /start/field_g: -Inf: want a finite number"},
		{"/start/field_g", -5, "plan: /start/field_g: -5: want a field from 0 to 50000 G"},
		{"/start/field_g", "398", `plan: /start/field_g: "398": found a string, want a number without quotes`},
		{"/start/field_g", nil, "plan: /start/field_g: the key is missing"},
		{"/start/field_g/x", 1, "plan: /start/field_g/x: the path leads through a number, want an object or a list"},
		{"/start/depth_er/3", 1, "plan: /start/depth_er: [0,0,0,1]: 4 entries, want 3, one for each entry of lattice.axes"},
		{"/start/depth_er/4", 1, "plan: /start/depth_er/4: the list has 3 entries, no entry 4"},
		{"/stages/1/depth_er/3", 1, "plan: /stages/1/depth_er/3: the list has 3 entries, no entry 3"},
		{"/stages/9/field_g", 1, "plan: /stages/9/field_g: the list has 3 entries, no entry 9"},
		{"/stages/01/field_g", 1, "plan: /stages/01/field_g: the list has 3 entries, no entry 01"},
		{"/stages/0/field", 1, `plan: /stages/0/field: "field": unknown key; the nearest known one is "field_g"`},
		{"/nothing", nil, "plan: /nothing: there is nothing to remove"},
		{"", nil, "plan: document: the whole document cannot be removed"},
		{"/stages/2/field_g", 100, "plan: /stages/2/field_g: 100: a hold stage moves no knob and field_g stands at 200; drop the key or choose the shape linear, exponential or smooth"},
	} {
		got, err := d.With(tc.path, tc.value)
		var list Errors
		if got != nil || err == nil || err.Error() != tc.want || !errors.As(err, &list) {
			t.Errorf("%s = %v:\n got %v\nwant %s", tc.path, tc.value, err, tc.want)
		}
	}
	if _, err := d.With("/x_c", make(chan int)); err == nil {
		t.Error("a channel was written as JSON")
	}
	if string(d.Bytes()) != good {
		t.Error("a refused edit changed the document")
	}
}

func TestDocumentsShareNothing(t *testing.T) {
	text := []byte(good)
	d, err := Open(text)
	if err != nil {
		t.Fatal(err)
	}
	clear(text)
	clear(d.Bytes())
	value, _ := d.Value("/title")
	clear(value)
	if string(d.Bytes()) != good {
		t.Error("the document changed with a slice it gave or took")
	}
	if _, ok := d.Value("/none"); ok {
		t.Error("a value at /none")
	}
}
