package plan

import (
	"encoding/json"
	"fmt"
	"reflect"
	"slices"
	"testing"

	"pgregory.net/rapid"
)

// reference is a plan as encoding/json reads it, edited without regard to text.
type reference map[string]any

func readReference(t interface{ Fatal(...any) }, text []byte) reference {
	var out reference
	if err := json.Unmarshal(text, &out); err != nil {
		t.Fatal(err)
	}
	return out
}

// parent walks to the container of the last token and makes objects on the way.
func (r reference) parent(tokens []string) any {
	var at any = map[string]any(r)
	for _, token := range tokens[:len(tokens)-1] {
		switch v := at.(type) {
		case map[string]any:
			if v[token] == nil {
				v[token] = map[string]any{}
			}
			at = v[token]
		case []any:
			i, _ := listIndex(token)
			at = v[i]
		}
	}
	return at
}

func (r reference) set(path string, value any) {
	tokens, _ := SplitPath(path)
	last := tokens[len(tokens)-1]
	switch v := r.parent(tokens).(type) {
	case map[string]any:
		v[last] = value
	case []any:
		i, _ := listIndex(last)
		v[i] = value
	}
}

func (r reference) remove(path string) {
	tokens, _ := SplitPath(path)
	last := tokens[len(tokens)-1]
	v := r.parent(tokens).(map[string]any)
	delete(v, last)
	if len(v) == 0 && isStagePower(tokens[:len(tokens)-1]) {
		delete(r.parent(tokens[:len(tokens)-1]).(map[string]any), "power_w")
	}
}

// fillDepths makes the list that an entry of depth_er needs, by looking back
// through the stages of the document itself.
func (r reference) fillDepths(stage int) {
	stages := r["stages"].([]any)
	here := stages[stage].(map[string]any)
	if here["depth_er"] != nil {
		return
	}
	depths := r["start"].(map[string]any)["depth_er"].([]any)
	for _, s := range stages[:stage] {
		if given, ok := s.(map[string]any)["depth_er"].([]any); ok {
			depths = given
		}
	}
	here["depth_er"] = slices.Clone(depths)
}

// change is one drawn edit, made on both sides.
func change(t *rapid.T, d *Document, want reference) *Document {
	stage := rapid.IntRange(0, 2).Draw(t, "stage")
	axis := rapid.IntRange(0, 2).Draw(t, "axis")
	beam := rapid.SampledFrom([]string{"sheet", "cr/o~ss"}).Draw(t, "beam")
	x := rapid.Float64Range(-1, 300).Draw(t, "x")
	var path string
	var value any = x
	depth := false
	switch rapid.IntRange(0, 8).Draw(t, "what") {
	case 0:
		path, depth = fmt.Sprintf("/stages/%d/depth_er/%d", stage, axis), true
	case 1:
		path = JoinPath("stages", itoa(stage), "power_w", beam)
	case 2:
		path = fmt.Sprintf("/stages/%d/field_g", stage)
	case 3:
		path = JoinPath("start", "power_w", beam)
	case 4:
		path, value = JoinPath("x_"+rapid.StringMatching(`[a/~" é]{0,3}`).Draw(t, "key"), rapid.StringN(0, 3, 9).Draw(t, "sub")), rapid.String().Draw(t, "text")
	case 5:
		path, value = "/note", rapid.String().Draw(t, "text")
	case 6:
		path, value = fmt.Sprintf("/stages/%d/field_g", stage), nil
	case 7:
		path, value = JoinPath("stages", itoa(stage), "power_w", beam), nil
	case 8:
		path, value = "/note", nil
	}
	next, err := d.With(path, value)
	if err != nil {
		return d // refused: neither side changes
	}
	if depth {
		want.fillDepths(stage)
	}
	if value == nil {
		want.remove(path)
	} else {
		want.set(path, value)
	}
	return next
}

// TestEditsMatchAnEditedMap makes the same edits in the text and in a map.
func TestEditsMatchAnEditedMap(t *testing.T) {
	const text = `{ "format":"hilltop-plan",
		"x_first" : [1.50, {"kept":  "as written"}],
	"version": 1,"cloud": {"species": "39K", "state": "F=1,mF=+1", "atoms": 8.0e4, "entropy_per_atom_kb": 0.6},
	"lattice": {"geometry": "cubic", "axes": [{"axis": "x", "wavelength_nm": 740, "waist_um": 150},
	 {"axis": "y", "wavelength_nm": 740, "waist_um": 150}, {"axis": "z", "wavelength_nm": 740, "waist_um": 150}]},
	"beams": [{"name": "sheet", "wavelength_nm": 1064, "axis": "x", "waist_um": 120}, {"name": "cr/o~ss", "wavelength_nm": 1064, "axis": "y", "waist_um": 120}],
	"start": {"depth_er": [0,0,0], "power_w": {"sheet": 0.2, "cr/o~ss": 0.2}, "field_g": 398},
	"stages": [{"name": "a", "duration_ms": 30, "shape": "linear", "depth_er": [22,22,22]},
	{"name": "b", "duration_ms": 2, "shape": "smooth", "x_note": {}, "field_g": 200},
	{
	  "name": "c",
	  "duration_ms": 2,
	  "shape": "smooth",
	  "power_w": {"sheet": 0.02, "cr/o~ss": 0.02}
	}]}`
	rapid.Check(t, func(t *rapid.T) {
		d, err := Open([]byte(text))
		if err != nil {
			t.Fatal(err)
		}
		want := readReference(t, []byte(text))
		for range rapid.IntRange(1, 12).Draw(t, "edits") {
			d = change(t, d, want)
			got := readReference(t, d.Bytes())
			if !reflect.DeepEqual(got, want) {
				t.Fatalf("the text reads as %v\nwant %v\ntext %s", got, want, d.Bytes())
			}
			kept, _ := d.Value("/x_first")
			if string(kept) != `[1.50, {"kept":  "as written"}]` {
				t.Fatalf("the user's own value became %s", kept)
			}
			again, err := Parse(d.Bytes())
			if err != nil || !reflect.DeepEqual(again, d.Plan()) {
				t.Fatalf("the plan does not read back: %v", err)
			}
		}
	})
}

// TestSetAndUnsetRestoresTheText creates a value and removes it again.
func TestSetAndUnsetRestoresTheText(t *testing.T) {
	d := mustOpen(t, good)
	for path, value := range map[string]any{
		"/note": "n", "/stages/0/power_w/cross": 0.1, "/stages/0/field_g": 12.5, "/x_a": 1, "/limits/~1field_g": Limit{Max: new(600.0)},
		"/stages/1/power_w/cross": 0.1, "/lattice/axes/1/return_ratio": 0.9, "/outputs/-": map[string]any{"a": 1},
	} {
		with, err := d.With(path, value)
		if err != nil {
			t.Errorf("%s: %v", path, err)
			continue
		}
		if path == "/outputs/-" {
			path = "/outputs/0"
		}
		back, err := with.With(path, nil)
		if err != nil || string(back.Bytes()) != good {
			t.Errorf("%s: %v, %s", path, err, difference(string(back.Bytes()), good))
		}
	}
}
