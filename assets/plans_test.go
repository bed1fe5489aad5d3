package assets

import (
	"errors"
	"io/fs"
	"slices"
	"strings"
	"testing"
)

func TestEveryPlanIsListedAndReadable(t *testing.T) {
	names := PlanNames()
	if !slices.IsSorted(names) || !slices.Contains(names, "skerry-demo") {
		t.Errorf("the plans are %v", names)
	}
	for _, name := range names {
		data, err := Plan(name)
		if err != nil || !strings.Contains(string(data), `"format": "hilltop-plan"`) {
			t.Errorf("%s: %v, %d bytes", name, err, len(data))
		}
		if !strings.Contains(string(data), `"note": "`) {
			t.Errorf("%s says nothing about itself in a note", name)
		}
	}
}

func TestUnknownPlan(t *testing.T) {
	for _, name := range []string{"", "none", "../plans/skerry-demo", "skerry-demo.json"} {
		if data, err := Plan(name); data != nil || !errors.Is(err, fs.ErrNotExist) {
			t.Errorf("%q: got %d bytes, %v, want fs.ErrNotExist", name, len(data), err)
		}
	}
}

func TestSchemaIsACopy(t *testing.T) {
	clear(PlanSchema())
	if !strings.Contains(string(PlanSchema()), "https://json-schema.org/draft/2020-12/schema") {
		t.Error("the schema changed with a slice it gave")
	}
}
