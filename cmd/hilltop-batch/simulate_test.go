package main

import (
	"bytes"
	"context"
	"encoding/json"
	"math"
	"strings"
	"testing"
	"time"

	"hilltop/testdata"
)

// flipPlan is a chain of six whose U and V change sign while tunnelling is slow.
const flipPlan = `{
  "format": "hilltop-plan", "version": 1, "title": "flip", "aim_sign": "negative",
  "model": {"sites": [6], "atoms": 6, "tunnelling_hz": 0.02, "interaction_hz": 12, "curvature_hz": [0.1], "fock": [1, 1, 1, 1, 1, 1]},
  "stages": [
    {"name": "flip", "duration_ms": 20, "shape": "linear", "interaction_hz": -12, "curvature_hz": [-0.1]},
    {"name": "lower", "duration_ms": 1500, "shape": "smooth", "tunnelling_hz": 1, "interaction_hz": -2.1},
    {"name": "wait", "duration_ms": 500, "shape": "hold"}
  ]
}`

func TestSimulateKeepsItsKeys(t *testing.T) {
	path := write(t, []byte(flipPlan))
	answer := object(t, 0, "simulate", path, "--overlap")
	need(t, "", answer, "title", "dimension", "trace", "stages", "final", "seconds", "cautions")
	columns := answer["trace"].(map[string]any)
	need(t, "trace", columns, "time_ms", "stage", "tunnelling_hz", "interaction_hz", "energy_hz_per_atom", "kinetic_hz_per_atom",
		"interaction_hz_per_atom", "potential_hz_per_atom", "pairs_per_atom", "norm_defect")
	length := len(columns["time_ms"].([]any))
	for key, column := range columns {
		if n := len(column.([]any)); n != length || n < 20 {
			t.Errorf("trace.%s has %d entries, time_ms %d", key, n, length)
		}
	}
	times := columns["time_ms"].([]any)
	if times[0] != 0.0 || math.Abs(times[length-1].(float64)-2020) > 1e-9 {
		t.Errorf("from %v to %v ms, want 0 to 2020", times[0], times[length-1])
	}
	end := answer["final"].(map[string]any)
	need(t, "final", end, "energy_hz_per_atom", "temperature_per_tunnelling", "entropy_per_atom_kb", "corner_fraction", "norm_defect",
		"ordering_error", "krylov_error", "limits_error", "occupation", "squared_occupation")
	if x := end["temperature_per_tunnelling"].(float64); !(x < 0 && x > -1) {
		t.Errorf("T %g J after the flip, want a little below 0", x)
	}
	if x := end["corner_fraction"].(float64); x < 0.6 || x > 1 {
		t.Errorf("%g at the corner, want most", x)
	}
	if x := end["norm_defect"].(float64); x > 1e-9 {
		t.Errorf("norm defect %g", x)
	}
	stages := answer["stages"].([]any)
	if len(stages) != 3 {
		t.Fatalf("%d stages, want 3", len(stages))
	}
	need(t, "stage", stages[2].(map[string]any), "name", "time_ms", "corner_fraction", "overlap")
	need(t, "seconds", answer["seconds"].(map[string]any), "build", "solve", "temperature")
}

// A linear sweep of seven atoms on seven sites in a trap, from one atom per site.
//
// Source: the midpoint rule with SciPy's expm_multiply, extrapolated from 1600 and
// 3200 steps; 9 digits.
func TestSimulateSweep(t *testing.T) {
	const wantPairs, wantKinetic = 0.974220983, -7.43915598
	path := write(t, []byte(`{
	  "format": "hilltop-plan", "version": 1, "aim_sign": "positive",
	  "model": {"sites": [7], "atoms": 7, "tunnelling_hz": 1, "interaction_hz": 20, "curvature_hz": [0.05], "fock": [1, 1, 1, 1, 1, 1, 1]},
	  "stages": [{"name": "sweep", "duration_ms": 795.7747154594767, "shape": "linear", "interaction_hz": 4}]}`))
	answer := object(t, 0, "simulate", path, "--temperature=false", "--tolerance", "1e-6")
	end := answer["final"].(map[string]any)
	for _, absent := range []string{"temperature_per_tunnelling", "entropy_per_atom_kb"} {
		if _, there := end[absent]; there {
			t.Errorf("%s is there with --temperature=false", absent)
		}
	}
	pairs, kinetic := 7*end["pairs_per_atom"].(float64), 7*(end["kinetic_hz_per_atom"].(float64)+end["potential_hz_per_atom"].(float64))
	if math.Abs(pairs-wantPairs) > 1e-6 || math.Abs(kinetic-wantKinetic) > 1e-5 {
		t.Errorf("pairs %.9g, kinetic and trap %.9g, want %.9g and %.9g", pairs, kinetic, wantPairs, wantKinetic)
	}
}

func TestSimulateFromAStage(t *testing.T) {
	path := write(t, []byte(flipPlan))
	answer := object(t, 0, "simulate", path, "--from", "lower", "--temperature=false", "--samples", "10")
	columns := answer["trace"].(map[string]any)
	if first := columns["time_ms"].([]any)[0]; first != 20.0 || columns["stage"].([]any)[0] != "lower" || columns["interaction_hz"].([]any)[0] != -12.0 {
		t.Errorf("begins at %v ms in %v with U %v", first, columns["stage"].([]any)[0], columns["interaction_hz"].([]any)[0])
	}
	if n := len(answer["stages"].([]any)); n != 2 {
		t.Errorf("%d stages, want 2", n)
	}
}

// Without stages the end is the start, from the end of the spectrum.
func TestSimulateWithoutStages(t *testing.T) {
	answer := object(t, 0, "simulate", write(t, []byte(`{
	  "format": "hilltop-plan", "version": 1, "aim_sign": "negative",
	  "model": {"sites": [5], "atoms": 5, "tunnelling_hz": 1, "interaction_hz": -2, "curvature_hz": [-0.1]}}`)))
	end := answer["final"].(map[string]any)
	if _, there := end["temperature_per_tunnelling"]; there {
		t.Error("a temperature of a state that is the ceiling itself")
	}
	codes := []string{}
	for _, c := range answer["cautions"].([]any) {
		codes = append(codes, c.(map[string]any)["code"].(string))
	}
	if !strings.Contains(strings.Join(codes, " "), "at_end") {
		t.Errorf("cautions %v, want at_end among them", codes)
	}
}

// A number state of free atoms on a ring has the mean energy of all states: beta = 0,
// where the temperature is null.
func TestSimulateAtInfiniteTemperature(t *testing.T) {
	answer := object(t, 0, "simulate", write(t, []byte(`{
	  "format": "hilltop-plan", "version": 1, "aim_sign": "negative",
	  "model": {"sites": [4], "periodic": [true], "atoms": 4, "tunnelling_hz": 1, "interaction_hz": 0, "fock": [1, 1, 1, 1]}}`)))
	end := answer["final"].(map[string]any)
	if value, there := end["temperature_per_tunnelling"]; !there || value != nil {
		t.Errorf("temperature %v, want null", value)
	}
	if s := 4 * end["entropy_per_atom_kb"].(float64); math.Abs(s-math.Log(35)) > 1e-9 {
		t.Errorf("entropy %g, want ln 35", s)
	}
}

func TestSimulateRefuses(t *testing.T) {
	flip := write(t, []byte(flipPlan))
	large := write(t, []byte(strings.NewReplacer("[6]", "[14]", `"atoms": 6`, `"atoms": 14`, `, "fock": [1, 1, 1, 1, 1, 1]`, "").Replace(flipPlan)))
	vast := write(t, []byte(strings.NewReplacer("[6]", "[1000000000]", `"atoms": 6`, `"atoms": 1000000000`, `, "fock": [1, 1, 1, 1, 1, 1]`, "").Replace(flipPlan)))
	for _, tc := range []struct {
		args []string
		code int
		kind string
		want string
	}{
		{[]string{"simulate"}, 2, usage, "arg"},
		{[]string{"simulate", flip, "--from", "nowhere"}, 2, usage, "flip, lower, wait"},
		{[]string{"simulate", flip, "--samples", "0"}, 2, usage, "--samples 0"},
		{[]string{"simulate", flip, "--tolerance", "NaN"}, 2, usage, "--tolerance NaN"},
		{[]string{"simulate", planFile(t, "skerry-demo")}, 2, document, "only plans with a model"},
		{[]string{"simulate", write(t, testdata.Plan(t, "levels-spin"))}, 2, document, "only plans with a model"},
		{[]string{"simulate", large}, 2, tooLarge, "20058300 states"},
		{[]string{"simulate", vast}, 2, tooLarge, "states"},
		{[]string{"simulate", "no-such-file.json"}, 1, file, "no-such-file"},
	} {
		begin := time.Now()
		answer := object(t, tc.code, tc.args...)
		failure := answer["error"].(map[string]any)
		if failure["kind"] != tc.kind || !strings.Contains(failure["message"].(string), tc.want) {
			t.Errorf("%v: %v, want kind %s and %q", tc.args, failure, tc.kind, tc.want)
		}
		if tc.kind == tooLarge {
			need(t, "error", failure, "dimension", "bytes_wanted", "bytes_available", "largest_sites")
			if failure["largest_sites"] != 12.0 {
				t.Errorf("%v: largest size %v sites, want 12", tc.args, failure["largest_sites"])
			}
		}
		if spent := time.Since(begin); spent > time.Second {
			t.Errorf("%v: refused after %v", tc.args, spent)
		}
	}
}

func TestSimulateForPeople(t *testing.T) {
	code, text, stderr := call(t, "simulate", write(t, []byte(flipPlan)), "--overlap")
	if code != 0 || stderr != "" {
		t.Fatalf("exit %d, %q", code, stderr)
	}
	for _, want := range []string{"flip", "462 states", "temperature", "J/kB", "entropy", "zone corner", "wanted end after wait", "error of the state", "Cautions"} {
		if !strings.Contains(text, want) {
			t.Errorf("no %q in %q", want, text)
		}
	}
}

func TestSimulateStops(t *testing.T) {
	path := write(t, []byte(strings.NewReplacer("[6]", "[10]", `"atoms": 6`, `"atoms": 10`, `, "fock": [1, 1, 1, 1, 1, 1]`, "").Replace(flipPlan)))
	ctx, cancel := context.WithCancel(context.Background())
	time.AfterFunc(200*time.Millisecond, cancel)
	var out, errs bytes.Buffer
	begin := time.Now()
	code := run(ctx, []string{"simulate", path, "--json", "--tolerance", "1e-8"}, &out, &errs)
	var answer struct{ Error failure }
	if err := json.Unmarshal(out.Bytes(), &answer); err != nil || code != 1 || answer.Error.Kind != stopped {
		t.Errorf("exit %d, %s, %v; want 1 and kind %s", code, out.String(), err, stopped)
	}
	if spent := time.Since(begin); spent > 2*time.Second {
		t.Errorf("stopped after %v", spent)
	}
}
