package session

import (
	"errors"
	"strings"
	"testing"

	"hilltop/assets"
)

// groupNamed returns a group of a state.
func groupNamed(t testing.TB, st State, name string) Group {
	t.Helper()
	for _, g := range st.Groups {
		if g.Name == name {
			return g
		}
	}
	t.Fatalf("no group %q", name)
	return Group{}
}

func template(t testing.TB, name string) []byte {
	t.Helper()
	data, err := assets.Plan(name)
	if err != nil {
		t.Fatal(err)
	}
	return data
}

// withText opens the demo after a change of its text.
func withText(t testing.TB, old, text string) *Session {
	t.Helper()
	s, _ := newTest(t, Options{})
	changed := strings.Replace(string(demo(t)), old, text, 1)
	if changed == string(demo(t)) {
		t.Fatalf("the demo has no %s", old)
	}
	if err := s.OpenBytes("changed", []byte(changed)); err != nil {
		t.Fatal(err)
	}
	return s
}

// Every action of every group of every template works, leaves a plan that reads
// back, and one undo takes it back to the last byte.
func TestActions(t *testing.T) {
	for _, name := range assets.PlanNames() {
		s, _ := newTest(t, Options{})
		if err := s.OpenBytes(name, template(t, name)); err != nil {
			t.Fatal(err)
		}
		for _, action := range allActions(s.State()) {
			before := bytesOf(s)
			if err := s.Do(action); err != nil {
				t.Errorf("%s: %s: %v", name, action, err)
				continue
			}
			if bytesOf(s) == before {
				t.Errorf("%s: %s changes nothing", name, action)
			}
			st := s.State()
			if st.Undo == "" || st.Touched != "" {
				if _, ok := st.Field(st.Touched); !ok {
					t.Errorf("%s: %s leads to %q, which is no field; undo %q", name, action, st.Touched, st.Undo)
				}
			}
			s.Undo()
			mustBe(t, name+": "+action+" and undo", bytesOf(s), before)
			s.Redo()
			s.Undo()
			mustBe(t, name+": "+action+", redo and undo", bytesOf(s), before)
		}
	}
}

func allActions(st State) []string {
	var ids []string
	for _, g := range st.Groups {
		for _, a := range g.Actions {
			ids = append(ids, a.ID)
		}
		for _, p := range g.Parts {
			if p.Remove != nil {
				ids = append(ids, p.Remove.ID)
			}
		}
	}
	return ids
}

func TestBeamsComeAndGo(t *testing.T) {
	s := withText(t, `"limits": {}`, `"limits": {"/beams/0/wavelength_nm": {"max": 1100}, "/beams/1/waist_um/0": {"min": 5}, "/power_w/sheet": {"max": 3}}`)
	if err := s.Do("add /beams"); err != nil {
		t.Fatal(err)
	}
	st := s.State()
	mustBe(t, "new beam", st.Plan.Beams[2].Name, "beam 3")
	mustBe(t, "its power", st.Plan.Start.PowerW["beam 3"], 0)
	mustBe(t, "its knob", field(t, st, "power_w/beam 3").Text, "0")
	mustBe(t, "led to", st.Touched, "/beams/2/name")

	if err := s.Commit("/beams/1/wavelength_nm", "red"); err == nil {
		t.Fatal("a wavelength of red was taken")
	}
	if err := s.Do("remove /beams/0"); err != nil {
		t.Fatal(err)
	}
	st = s.State()
	mustBe(t, "first beam", st.Plan.Beams[0].Name, "cross")
	mustBe(t, "limits left", len(st.Plan.Limits), 1)
	if _, kept := st.Plan.Limits["/beams/0/waist_um/0"]; !kept {
		t.Errorf("the limit of the second beam did not move up: %v", st.Plan.Limits)
	}
	for i, stage := range st.Plan.Stages {
		if _, given := stage.PowerW["sheet"]; given {
			t.Errorf("stage %d still sets the power of the beam", i)
		}
	}
	mustBe(t, "texts of beams", st.Unapplied, 0)
	for range 2 {
		if err := s.Do("remove /beams/0"); err != nil {
			t.Fatal(err)
		}
	}
	mustBe(t, "summary without beams", groupNamed(t, s.State(), "Beams").Summary, "none")
	if err := s.Do("add /beams"); err != nil {
		t.Fatal(err)
	}
	mustBe(t, "first beam again", s.State().Plan.Beams[0].Name, "beam 1")
	if err := s.Do("remove /beams/7"); !errors.Is(err, ErrNoAction) {
		t.Errorf("removing a beam that is not there: %v", err)
	}
}

func TestScatteringComesAndGoes(t *testing.T) {
	s, _ := newTest(t, Options{})
	if err := s.Do("add /scattering/resonances"); err != nil {
		t.Fatal(err)
	}
	mustBe(t, "position", field(t, s.State(), "/scattering/resonances/1/position_g").Text, "502.5")
	for range 2 {
		if err := s.Do("remove /scattering/resonances/0"); err != nil {
			t.Fatal(err)
		}
	}
	mustBe(t, "resonances", len(s.State().Plan.Scattering.Resonances), 0)
	if err := s.Do("remove /scattering"); err != nil {
		t.Fatal(err)
	}
	if s.State().Plan.Scattering != nil {
		t.Error("the plan still has its own scattering length")
	}
	mustBe(t, "summary", groupNamed(t, s.State(), "Field").Summary, "along z, a(B) of the species")
	if err := s.Do("add /scattering"); err != nil {
		t.Fatal(err)
	}
	own := s.State().Plan.Scattering
	curve, ok := speciesCurve(s.State().Plan)
	if !ok || own == nil || len(own.Resonances) != len(curve.Resonances) {
		t.Fatalf("the plan got %+v, the species file has %+v", own, curve)
	}
}

func TestModelAxesComeAndGo(t *testing.T) {
	s, _ := newTest(t, Options{})
	if err := s.OpenBytes("chain", template(t, "model-chain")); err != nil {
		t.Fatal(err)
	}
	if err := s.Commit(fockPath, "1 1 1 1 1 1 1 1 1 1 1 1"); err != nil {
		t.Fatal(err)
	}
	if err := s.Do("add /model/sites"); err != nil {
		t.Fatal(err)
	}
	st := s.State()
	mustBe(t, "axes", len(st.Plan.Model.Sites), 2)
	mustBe(t, "curvatures", len(st.Plan.Model.CurvatureHz), 2)
	mustBe(t, "parts", len(groupNamed(t, st, "Model").Parts), 2)
	mustBe(t, "short label", field(t, st, "/model/sites/1").Short, "Sites")
	mustBe(t, "summary", groupNamed(t, st, "Model").Summary, "12 × 1 sites, 12 atoms")
	if err := s.Do("remove /model/sites/0"); err != nil {
		t.Fatal(err)
	}
	st = s.State()
	mustBe(t, "sites", st.Plan.Model.Sites[0], 1)
	if st.Plan.Model.Fock != nil {
		t.Error("the atoms per site of the removed axis are still there")
	}
}

func TestAtomsPerSite(t *testing.T) {
	s, _ := newTest(t, Options{})
	if err := s.OpenBytes("chain", template(t, "model-chain")); err != nil {
		t.Fatal(err)
	}
	for _, tc := range []struct{ typed, want string }{
		{"letters", ""}, {"1 1 1", ""}, {"12 NaN", ""}, {"1e400", ""}, {"1,5", ""},
		{"2 2 2 2 2 2 0 0 0 0 0 0", "2 2 2 2 2 2 0 0 0 0 0 0"},
		{"1, 1, 1, 1; 1 1 1 1 1 1 1 1", "1 1 1 1 1 1 1 1 1 1 1 1"},
		{"", ""},
	} {
		err := s.Commit(fockPath, tc.typed)
		refused := tc.want == "" && tc.typed != ""
		if (err != nil) != refused {
			t.Errorf("%q: %v, want refused: %v", tc.typed, err, refused)
		}
		mustBe(t, tc.typed, field(t, s.State(), fockPath).Text, tc.want)
		if refused {
			s.Revert(fockPath)
		}
	}
	s.Undo()
	s.Undo()
	s.Undo()
	mustBe(t, "after undo", bytesOf(s), string(template(t, "model-chain")))
}

func TestSummaries(t *testing.T) {
	s, _ := newTest(t, Options{})
	for name, want := range map[string]string{
		"Stage": "2.5 ms, linear", "Cloud": "80000 of 39K at 0.6 kB", "Lattice": "740 nm, 150 µm", "Beams": "'sheet', 'cross'",
		"Field": "along z, resonance at 402.5 G", "Plan": "Skerry bench, negative temperature",
	} {
		mustBe(t, name, groupNamed(t, s.State(), name).Summary, want)
	}
	if err := s.Commit("/lattice/axes/2/wavelength_nm", "1064"); err != nil {
		t.Fatal(err)
	}
	mustBe(t, "two wavelengths", groupNamed(t, s.State(), "Lattice").Summary, "740 nm and 1064 nm, 150 µm")
	mustBe(t, "label below its heading", field(t, s.State(), "/beams/0/waist_um/1").Short, "Waist along z")
}
