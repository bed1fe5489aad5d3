package session

import (
	"strings"
	"testing"
)

func TestSourcesNameEveryNumber(t *testing.T) {
	_, _, st := judged(t, "skerry-demo")
	rows, err := Sources(st.Plan)
	if err != nil {
		t.Fatal(err)
	}
	find := func(name string) SourceRow {
		for _, r := range rows {
			if r.Name == name {
				return r
			}
		}
		t.Fatalf("no %q in %+v", name, rows)
		return SourceRow{}
	}
	for _, r := range rows {
		if r.Source == "" || r.Value == "" || r.Uncertainty == "" {
			t.Errorf("%+v has an empty cell", r)
		}
	}
	if got := find("39K mass"); got.Value != "38.963706485 u" || got.Uncertainty != "±5e−9" && got.Uncertainty != "±0.000000005" {
		t.Errorf("mass: %+v", got)
	}
	if got := find("Resonance 1 position"); got.Value != "402.5 G" || !strings.Contains(got.Source, "this plan") {
		t.Errorf("the plan's own resonance: %+v", got)
	}
	for _, r := range rows {
		if strings.HasPrefix(r.Name, "39K resonance") {
			t.Errorf("the plan brings its own scattering length, but %+v is listed", r)
		}
	}
	p := *st.Plan
	p.Scattering = nil
	if rows, err = Sources(&p); err != nil {
		t.Fatal(err)
	}
	if got := find("39K resonance 2 position"); got.Value != "402.5 G" || got.Uncertainty != "±0.03" {
		t.Errorf("the species' resonance: %+v", got)
	}
}
