package plan

import (
	"testing"

	"hilltop/assets"
	"hilltop/testdata"
)

// testPlans are the plans that only tests use.
var testPlans = []string{"braun2013", "levels-spin", "model-stages"}

// shippedPlans returns all good plans by name.
func shippedPlans(t testing.TB) map[string][]byte {
	t.Helper()
	all := map[string][]byte{}
	for _, name := range assets.PlanNames() {
		data, err := assets.Plan(name)
		if err != nil {
			t.Fatal(err)
		}
		all[name] = data
	}
	for _, name := range testPlans {
		all[name] = testdata.Plan(t, name)
	}
	return all
}

func TestShippedPlansParse(t *testing.T) {
	for name, data := range shippedPlans(t) {
		if _, err := Parse(data); err != nil {
			t.Errorf("%s: %v", name, err)
		}
	}
}
