package plan

import (
	"encoding/json"
	"math"
	"reflect"
	"testing"
)

func addSeeds(f *testing.F, add func(text []byte)) {
	for _, data := range shippedPlans(f) {
		add(data)
	}
	for _, text := range []string{good, goodModel, goodLevels, "\ufeff" + good, "", "{}", "[]", `{"format":"hilltop-plan","version":1,"model":null}`,
		`{"format":"hilltop-plan","version":1,"stages":[{}],"model":{"sites":[1e9,1e9],"tunnelling_hz":[]}}`,
		`{"format":"hilltop-plan","version":1,"lattice":{"axes":[{}]},"start":{"depth_er":[1e400]},"beams":[{"name":"a/b~c"}],"stages":[{"power_w":{"x_":3}}]}`} {
		add([]byte(text))
	}
	for _, tc := range badFields {
		add(tc.broken(f))
	}
}

// finite reports whether every number below v is finite.
func finite(v reflect.Value) bool {
	switch v.Kind() {
	case reflect.Float64:
		return !math.IsNaN(v.Float()) && !math.IsInf(v.Float(), 0)
	case reflect.Pointer:
		return v.IsNil() || finite(v.Elem())
	case reflect.Struct:
		for i := range v.NumField() {
			if !finite(v.Field(i)) {
				return false
			}
		}
	case reflect.Slice:
		for i := range v.Len() {
			if !finite(v.Index(i)) {
				return false
			}
		}
	case reflect.Map:
		for it := v.MapRange(); it.Next(); {
			if !finite(it.Value()) {
				return false
			}
		}
	}
	return true
}

// checkAccepted checks what must hold for every plan that was accepted.
func checkAccepted(t *testing.T, p *Plan, text []byte) {
	if !finite(reflect.ValueOf(p)) {
		t.Fatalf("%q: accepted with a number that is not finite", text)
	}
	rows := p.Rows()
	if len(rows) != len(p.Stages)+1 {
		t.Fatalf("%q: %d rows of %d stages", text, len(rows), len(p.Stages))
	}
	for _, row := range rows {
		for _, knob := range p.Knobs() {
			if p.Source(row.Stage, knob) == "" || math.IsNaN(row.Value(knob)) {
				t.Fatalf("%q: stage %d has no %s", text, row.Stage, knob)
			}
		}
	}
}

func FuzzParse(f *testing.F) {
	addSeeds(f, func(text []byte) { f.Add(text) })
	f.Fuzz(func(t *testing.T, text []byte) {
		p, err := Parse(text)
		if err == nil {
			checkAccepted(t, p, text)
			return
		}
		if err.Error() == "" {
			t.Fatal("an error without words")
		}
		if list, ok := err.(Errors); ok {
			for _, e := range list {
				if _, bad := SplitPath(e.Path); bad != nil || e.Reason == "" {
					t.Fatalf("%q: mistake %+v", text, e)
				}
			}
		}
	})
}

func FuzzWith(f *testing.F) {
	for _, edit := range [][2]string{
		{"/start/field_g", "3"}, {"/stages/1/depth_er/0", "4"}, {"/stages/0/depth_er", "null"}, {"/stages/-", `{"name":"q","duration_ms":1,"shape":"hold"}`},
		{"/x_a/b/c", `[1,{"a":2}]`}, {"", "{}"}, {"/stages/0", "null"}, {"/model/tunnelling_hz/0", "2"}, {"/beams/0/waist_um/1", "70"}, {"/stages/2/power_w/sheet", "null"},
		{"/stages/0/depth_er/0", "null"}, {"/model/curvature_hz/0", "null"}, {"/format", `"x"`}, {"/version", "2"}, {"/stages", "null"}, {"/levels", "{}"}, {"/limits/~1field_g/max", "1e3"},
	} {
		for _, text := range []string{good, goodModel, goodLevels, "\ufeff" + good} {
			f.Add([]byte(text), edit[0], edit[1])
		}
	}
	f.Fuzz(func(t *testing.T, text []byte, path, value string) {
		d, err := Open(text)
		if err != nil {
			return
		}
		var v any = json.RawMessage(value)
		if value == "null" {
			v = nil
		}
		next, err := d.With(path, v)
		if string(d.Bytes()) != string(text) {
			t.Fatalf("the old document changed")
		}
		if err != nil {
			return
		}
		checkAccepted(t, next.Plan(), next.Bytes())
		if got, ok := next.Value(path); v != nil && ok && !sameJSON(got, []byte(value)) {
			t.Fatalf("%q: wrote %q at %q, and there stands %q", text, value, path, got)
		}
	})
}

func sameJSON(a, b []byte) bool {
	var x, y any
	return json.Unmarshal(a, &x) == nil && json.Unmarshal(b, &y) == nil && reflect.DeepEqual(x, y)
}
