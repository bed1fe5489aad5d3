package atom

import "testing"

func TestStateNamesAreTolerant(t *testing.T) {
	s := fixture(t, "39K")
	for name, want := range map[string]string{
		"F=1,mF=+1":         "F=1,mF=+1",
		"F=1, mF=1":         "F=1,mF=+1",
		" f = 1 , mf = +1 ": "F=1,mF=+1",
		"F=1 mF=1":          "F=1,mF=+1",
		"F=1,m_F=-1":        "F=1,mF=-1",
		"F=1,m=-1":          "F=1,mF=-1",
		"F=1,mF=\u22121":    "F=1,mF=-1",
		"|1,1>":             "F=1,mF=+1",
		"|F=1,mF=1⟩":        "F=1,mF=+1",
		"(2, -2)":           "F=2,mF=-2",
		"2,0":               "F=2,mF=0",
		"2,-0":              "F=2,mF=0",
		"F:2;mF:2":          "F=2,mF=+2",
		"4/2,2/2":           "F=2,mF=+1",
	} {
		state, err := s.State(name)
		if err != nil || state.Name != want {
			t.Errorf("%q: got %q, %v, want %q", name, state.Name, err, want)
		}
	}
	potassium40 := fixture(t, "40K")
	for _, name := range []string{"F=9/2,mF=-7/2", "4.5,-3.5", "|9/2, -7/2>"} {
		state, err := potassium40.State(name)
		if err != nil || state.Name != "F=9/2,mF=-7/2" {
			t.Errorf("%q: got %q, %v, want F=9/2,mF=-7/2", name, state.Name, err)
		}
	}
}

func TestStateNamesThatAreNone(t *testing.T) {
	s := fixture(t, "39K")
	for _, name := range []string{
		"", "1", ",", "F=1", "mF=1", "F=1,mF=2", "F=3,mF=0", "F=0.5,mF=0.5", "F=1.3,mF=0", "F=1,mF=0.5",
		"F=1,mF=", "F=,mF=1", "F=1,mF=1,x", "F=NaN,mF=0", "F=Inf,mF=0", "F=1e400,mF=0", "F=1,mF=1/3", "ground",
	} {
		if state, err := s.State(name); err == nil {
			t.Errorf("%q: got %s, want an error", name, state.Name)
		}
	}
}

// TestEveryStateNameReadsBack goes through every state of every nuclear spin.
func TestEveryStateNameReadsBack(t *testing.T) {
	for doubled := 1; doubled <= 20; doubled++ {
		for _, state := range groundStates(float64(doubled) / 2) {
			f, mf, ok := parseStateName(state.Name)
			if !ok || f != state.F || mf != state.MF {
				t.Errorf("%s: got F=%g, mF=%g, %v", state.Name, f, mf, ok)
			}
		}
	}
}
