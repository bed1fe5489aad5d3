package plan

import (
	"bytes"
	"reflect"
	"regexp"
	"slices"
	"strconv"
	"testing"

	"github.com/santhosh-tekuri/jsonschema/v6"

	"hilltop/assets"
)

func compiledSchema(t *testing.T) *jsonschema.Schema {
	t.Helper()
	document, err := jsonschema.UnmarshalJSON(bytes.NewReader(assets.PlanSchema()))
	if err != nil {
		t.Fatal(err)
	}
	compiler := jsonschema.NewCompiler()
	const name = "plan.schema.json"
	if err := compiler.AddResource(name, document); err != nil {
		t.Fatal(err)
	}
	schema, err := compiler.Compile(name)
	if err != nil {
		t.Fatal(err)
	}
	return schema
}

func validate(schema *jsonschema.Schema, text []byte) error {
	value, err := jsonschema.UnmarshalJSON(bytes.NewReader(text))
	if err != nil {
		return err
	}
	return schema.Validate(value)
}

func TestSchemaPassesGoodPlans(t *testing.T) {
	schema := compiledSchema(t)
	plans := shippedPlans(t)
	plans["good"], plans["good model"], plans["good levels"] = []byte(good), []byte(goodModel), []byte(goodLevels)
	for name, data := range plans {
		if err := validate(schema, data); err != nil {
			t.Errorf("%s: %v", name, err)
		}
	}
}

// TestSchemaRefusesBadPlans checks every bad plan of the table, which Parse
// refuses, against the schema, and that the marks of what a schema cannot say are
// honest.
func TestSchemaRefusesBadPlans(t *testing.T) {
	schema := compiledSchema(t)
	for _, tc := range badFields {
		err := validate(schema, tc.broken(t))
		if refused := err != nil; refused == tc.loose {
			t.Errorf("%s: refused by the schema: %v, want %v (%v)", tc.name, refused, !tc.loose, err)
		}
	}
}

// TestSchemaKnowsTheKeys compares the keys of every struct, and which of them are
// required, with those of its part of the schema.
func TestSchemaKnowsTheKeys(t *testing.T) {
	root, err := jsonschema.UnmarshalJSON(bytes.NewReader(assets.PlanSchema()))
	if err != nil {
		t.Fatal(err)
	}
	top := root.(map[string]any)
	parts := top["$defs"].(map[string]any)
	for name, value := range map[string]any{
		"": Plan{}, "cloud": Cloud{}, "lattice": Lattice{}, "latticeAxis": LatticeAxis{}, "beam": Beam{}, "field": Field{},
		"scattering": Scattering{}, "resonance": Resonance{}, "start": Start{}, "stage": Stage{}, "model": Model{},
		"levels": Levels{}, "measured": Measured{}, "limit": Limit{},
	} {
		part := top
		if name != "" {
			part = parts[name].(map[string]any)
		}
		var known, required []string
		for _, field := range fieldsOf(reflect.TypeOf(value)) {
			known = append(known, field.name)
			if field.required {
				required = append(required, field.name)
			}
		}
		slices.Sort(known)
		if got := sortedKeys(part["properties"].(map[string]any)); !slices.Equal(got, known) {
			t.Errorf("%s: the schema knows %v, the struct %v", name, got, known)
		}
		var demanded []string
		list, _ := part["required"].([]any)
		for _, key := range list {
			demanded = append(demanded, key.(string))
		}
		slices.Sort(demanded)
		slices.Sort(required)
		if !slices.Equal(demanded, required) {
			t.Errorf("%s: the schema requires %v, the struct %v", name, demanded, required)
		}
	}
}

// TestSchemaRangesAreThoseOfParse puts many numbers into every number of the good
// plans: both must draw the line at the same place.
func TestSchemaRangesAreThoseOfParse(t *testing.T) {
	schema := compiledSchema(t)
	tries := []float64{-1e300, -1e19, -60_000, -1, 0, 1e-300, 0.4, 0.5, 1, 1.5, 2, 100.5, 149, 150, 300, 301, 500, 501,
		20_000, 20_001, 50_000, 50_001, 2e5, 2e6, 1e9, 2e9, 1e10, 2e10, 2e15, 2e18, 1e41, 1e300}
	for _, text := range []string{good, goodModel, goodLevels} {
		d, err := Open([]byte(text))
		if err != nil {
			t.Fatal(err)
		}
		c := &checker{mistakes: &mistakes{}, plan: d.plan, root: d.root, text: d.text}
		for _, path := range c.numberPaths() {
			n := c.at(path)
			for _, x := range tries {
				number := []byte(strconv.FormatFloat(x, 'g', -1, 64))
				changed := splice(d.text, n.start, n.end, number)
				_, err := Parse(changed)
				refused := validate(schema, changed)
				inRange := true
				if list, ok := err.(Errors); ok {
					inRange = !slices.ContainsFunc(list, func(e *FieldError) bool {
						return e.Path == path && rangeReason.MatchString(e.Reason)
					})
				}
				if refused != nil && err == nil || refused == nil && !inRange {
					t.Errorf("%s = %g: Parse says %v, the schema %v", path, x, err, refused)
				}
			}
		}
	}
}

// rangeReason matches the reasons that speak of one number alone.
var rangeReason = regexp.MustCompile(`^want (a|an) .* (from|above) [-0-9]`)

func TestSchemaDescribesEveryKey(t *testing.T) {
	root, err := jsonschema.UnmarshalJSON(bytes.NewReader(assets.PlanSchema()))
	if err != nil {
		t.Fatal(err)
	}
	top := root.(map[string]any)
	parts := top["$defs"].(map[string]any)
	described := func(value any) bool {
		entry, _ := value.(map[string]any)
		if _, ok := entry["description"]; ok {
			return true
		}
		reference, _ := entry["$ref"].(string)
		target, _ := parts[string(bytes.TrimPrefix([]byte(reference), []byte("#/$defs/")))].(map[string]any)
		_, ok := target["description"]
		return ok
	}
	parts[""] = top
	for _, name := range sortedKeys(parts) {
		part := parts[name].(map[string]any)
		if part["additionalProperties"] != false {
			continue
		}
		for key, value := range part["properties"].(map[string]any) {
			if !described(value) {
				t.Errorf("%s.%s has no description", name, key)
			}
		}
	}
}
