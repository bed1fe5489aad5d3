package atom

import (
	"errors"
	"math"
	"strings"
	"testing"

	"hilltop/assets"
)

// small is a species file with one curve, for the tests to break.
const small = `{
 "format": "hilltop-species", "version": 1, "name": "39K",
 "mass": {"value": 38.96, "sigma": 0.01, "unit": "u", "source": "here"},
 "nuclear_spin": {"value": 1.5, "unit": "1", "source": "here"},
 "hyperfine": {"value": 230.86, "unit": "MHz", "source": "here"},
 "gj": {"value": 2.002, "unit": "1", "source": "here"},
 "gi": {"value": -0.00014, "unit": "1", "source": "here"},
 "d1": {"wavelength": {"value": 770.1, "unit": "nm", "source": "here"}, "linewidth": {"value": 5.96, "unit": "MHz", "source": "here"}},
 "d2": {"wavelength": {"value": 766.7, "unit": "nm", "source": "here"}, "linewidth": {"value": 6.04, "unit": "MHz", "source": "here"}},
 "scattering": [{"state": "F=1,mF=+1", "background": {"value": -29, "unit": "a0", "source": "here"},
  "resonances": [{"position": {"value": 402.5, "unit": "G", "source": "here"}, "width": {"value": -52, "unit": "G", "source": "here"}}]}]
}`

func TestDecodeSmall(t *testing.T) {
	s, err := Decode([]byte(small))
	if err != nil {
		t.Fatal(err)
	}
	if len(s.Data) != 12 || s.Data[0] != (Datum{"/mass", 38.96, 0.01, true, "u", "here"}) {
		t.Errorf("%d data, first %+v, want 12, first the mass", len(s.Data), s.Data[0])
	}
	if last := s.Data[11]; last.Path != "/scattering/0/resonances/0/width" || last.SigmaKnown {
		t.Errorf("last datum %+v, want the width without an uncertainty", last)
	}
}

func TestDecodeRefuses(t *testing.T) {
	for _, tc := range []struct{ name, old, new, path, reason string }{
		{"no source", `"unit": "u", "source": "here"`, `"unit": "u"`, "/mass", "no \"source\""},
		{"empty source", `"unit": "u", "source": "here"`, `"unit": "u", "source": " "`, "/mass/source", "want a text"},
		{"source no text", `"unit": "u", "source": "here"`, `"unit": "u", "source": 3`, "/mass/source", "3, want a text"},
		{"no source deep down", `"value": -52, "unit": "G", "source": "here"`, `"value": -52, "unit": "G"`,
			"/scattering/0/resonances/0/width", "no \"source\""},
		{"bare number", `{"value": 38.96, "sigma": 0.01, "unit": "u", "source": "here"}`, `38.96`, "/mass", "38.96, want an object"},
		{"wrong unit", `"value": 402.5, "unit": "G"`, `"value": 402.5, "unit": "T"`,
			"/scattering/0/resonances/0/position/unit", `unit "T", want "G"`},
		{"no unit", `"unit": "u", `, ``, "/mass", `no "unit"`},
		{"no value", `"value": 38.96, `, ``, "/mass", `no "value"`},
		{"value no number", `38.96`, `"38.96"`, "/mass/value", "want a number"},
		{"value null", `38.96`, `null`, "/mass/value", "null, want a number"},
		{"value too large", `38.96`, `1e999`, "/mass/value", "1e999"},
		{"mass in gram per mole of nothing", `38.96`, `-1`, "/mass", "value -1 u"},
		{"negative sigma", `"sigma": 0.01`, `"sigma": -0.01`, "/mass/sigma", "-0.01"},
		{"unknown key", `"name": "39K"`, `"name": "39K", "weight": 3`, "/weight", "unknown key, want one of format"},
		{"unknown key deep down", `"state": "F=1`, `"sttae": 1, "state": "F=1`, "/scattering/0/sttae", "unknown key"},
		{"unknown key in a number", `"sigma": 0.01`, `"error": 0.01`, "/mass/error", "unknown key, want one of value, sigma"},
		{"key twice", `"version": 1`, `"version": 1, "version": 1`, "/version", "twice"},
		{"no mass", `"mass"`, `"note"`, "", `no "mass"`},
		{"other format", `hilltop-species`, `hilltop-plan`, "/format", "hilltop-plan"},
		{"newer version", `"version": 1`, `"version": 2`, "/version", "version 2, want 1"},
		{"empty name", `"39K"`, `""`, "/name", "want a text"},
		{"spin no half-integer", `"value": 1.5`, `"value": 1.4`, "/nuclear_spin", "multiple of 1/2"},
		{"spin zero", `"value": 1.5`, `"value": 0`, "/nuclear_spin", "value 0"},
		{"spin huge", `"value": 1.5`, `"value": 1e9`, "/nuclear_spin", "value 1e+09"},
		{"no coupling", `"value": 230.86`, `"value": 0`, "/hyperfine", "value 0 MHz"},
		{"gI in nuclear magnetons", `-0.00014`, `0.261`, "/gi", "value 0.261"},
		{"lines swapped", `770.1`, `760.1`, "/d1/wavelength", "D1 at 760.1 nm"},
		{"line missing", `"linewidth": {"value": 5.96, "unit": "MHz", "source": "here"}`, `"linewidth": 1`, "/d1/linewidth", "want an object"},
		{"state of another spin", `F=1,mF=+1`, `F=3,mF=+1`, "/scattering/0/state", "want one of F=1,mF=+1; F=1,mF=0"},
		{"mF beyond F", `F=1,mF=+1`, `F=1,mF=+2`, "/scattering/0/state", "F=1,mF=+2"},
		{"width zero", `-52`, `0`, "/scattering/0", "resonance 1 with width 0 T"},
		{"background zero", `-29`, `0`, "/scattering/0/background", "value 0 a0"},
		{"resonances no list", `"resonances": [`, `"resonances": 1, "note": [`, "/scattering/0/resonances", "1, want a list"},
		{"scattering no list", `"scattering": [`, `"scattering": {}, "note": [`, "/scattering", "an object, want a list"},
	} {
		text := strings.Replace(small, tc.old, tc.new, 1)
		if text == small {
			t.Fatalf("%s: the document has no %s", tc.name, tc.old)
		}
		_, err := Decode([]byte(text))
		if !hasMistake(err, tc.path, tc.reason) {
			t.Errorf("%s: got %v, want a mistake at %q with %q", tc.name, err, tc.path, tc.reason)
		}
	}
}

// hasMistake looks through all mistakes that an error joins.
func hasMistake(err error, path, reason string) bool {
	mistakes := []error{err}
	if joined, ok := err.(interface{ Unwrap() []error }); ok {
		mistakes = joined.Unwrap()
	}
	for _, mistake := range mistakes {
		if m, ok := errors.AsType[*DataError](mistake); ok && m.Path == path && strings.Contains(m.Reason, reason) {
			return true
		}
	}
	return false
}

func TestDecodeReportsEveryMistake(t *testing.T) {
	text := strings.NewReplacer(`"unit": "u", "source": "here"`, `"unit": "kg"`, `"value": 1.5`, `"value": 1.4`,
		`-29`, `0`, `"name"`, `"nmae"`).Replace(small)
	_, err := Decode([]byte(text))
	for path, reason := range map[string]string{
		"/mass": "no \"source\"", "/mass/unit": `"kg"`, "/nuclear_spin": "1.4", "/scattering/0/background": "0 a0", "/nmae": "unknown key", "": `no "name"`,
	} {
		if !hasMistake(err, path, reason) {
			t.Errorf("no mistake at %q with %q in: %v", path, reason, err)
		}
	}
}

func TestDecodeRefusesWhatIsNoDocument(t *testing.T) {
	for name, text := range map[string]string{
		"empty":            "",
		"truncated":        small[:len(small)/2],
		"no JSON":          "species: 39K",
		"more after it":    small + "{}",
		"a list":           "[]",
		"a number":         "3",
		"null":             "null",
		"missing bracket":  strings.TrimSuffix(small, "}"),
		"nested very deep": strings.Repeat("[", 100000) + strings.Repeat("]", 100000),
		"key without end":  `{"a`,
	} {
		if s, err := Decode([]byte(text)); err == nil {
			t.Errorf("%s: got %+v, want an error", name, s)
		} else if _, ok := errors.AsType[*DataError](err); !ok {
			t.Errorf("%s: got %v, want a *DataError", name, err)
		}
	}
}

func TestDecodeBoundsItsDepth(t *testing.T) {
	deep := strings.Repeat(`{"a":[`, 50000) + strings.Repeat("]}", 50000)
	if _, err := Decode([]byte(deep)); !hasMistake(err, "", errTooDeep.Error()) {
		t.Errorf("got %v, want %q", err, errTooDeep)
	}
}

func TestDecodeRefusesOneStateTwice(t *testing.T) {
	curve := `{"state": "1,1", "background": {"value": 3, "unit": "a0", "source": "here"}, "resonances": []}`
	text := strings.Replace(small, `"scattering": [`, `"scattering": [`+curve+`, `, 1)
	if _, err := Decode([]byte(text)); !hasMistake(err, "/scattering/1/state", "stands twice") {
		t.Errorf("got %v, want the second curve refused", err)
	}
}

func FuzzDecode(f *testing.F) {
	for _, name := range assets.SpeciesNames() {
		data, err := assets.SpeciesFile(name)
		if err != nil {
			f.Fatal(err)
		}
		f.Add(data)
	}
	for _, text := range []string{
		small, "", "{}", "[]", "null", `{"mass": {"value": 1e999}}`, `{"a": 1, "a": 2}`, strings.Repeat(`{"a":`, 50),
		strings.Replace(small, "1.5", "1e9", 1), strings.Replace(small, "402.5", "-1e-300", 1), small[:200],
		strings.Replace(small, `"here"`, `"\ud800"`, 1), strings.Replace(small, "F=1", "F=9/2", 1),
	} {
		f.Add([]byte(text))
	}
	f.Fuzz(func(t *testing.T, data []byte) {
		s, err := Decode(data)
		if err != nil {
			return
		}
		for _, datum := range s.Data {
			if strings.TrimSpace(datum.Source) == "" || !finite(datum.Value) {
				t.Errorf("accepted %+v", datum)
			}
		}
		for _, state := range s.States {
			if e, m := s.Energy(state, 0.04), s.Moment(state, 0.04); math.IsNaN(e) || math.IsNaN(m) {
				t.Errorf("%s: energy %g Hz, moment %g J/T", state.Name, e, m)
			}
			if state.Scattering != nil && state.Scattering.Validate() != nil {
				t.Errorf("%s: %v", state.Name, state.Scattering.Validate())
			}
		}
	})
}
