package main

import (
	"bytes"
	"context"
	"encoding/json"
	"errors"
	"math"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"hilltop/assets"
	"hilltop/testdata"
)

// call runs one command line and returns the exit code and both outputs.
func call(t *testing.T, args ...string) (code int, stdout, stderr string) {
	t.Helper()
	var out, errs bytes.Buffer
	code = run(context.Background(), args, &out, &errs)
	return code, out.String(), errs.String()
}

// object runs a command line with --json and returns the object it prints; no
// other output is allowed.
func object(t *testing.T, wantCode int, args ...string) map[string]any {
	t.Helper()
	code, stdout, stderr := call(t, append(args, "--json")...)
	if code != wantCode {
		t.Fatalf("%v: exit %d, want %d; %s%s", args, code, wantCode, stdout, stderr)
	}
	if stderr != "" {
		t.Errorf("%v: standard error says %q, want nothing", args, stderr)
	}
	decoder := json.NewDecoder(strings.NewReader(stdout))
	var answer map[string]any
	if err := decoder.Decode(&answer); err != nil {
		t.Fatalf("%v: %v in %q", args, err, stdout)
	}
	if decoder.More() {
		t.Errorf("%v: more than one JSON value", args)
	}
	return answer
}

// planFile writes a plan that ships with the program into a file.
func planFile(t *testing.T, name string) string {
	t.Helper()
	data, err := assets.Plan(name)
	if err != nil {
		t.Fatal(err)
	}
	return write(t, data)
}

func write(t *testing.T, data []byte) string {
	t.Helper()
	path := filepath.Join(t.TempDir(), "plan.json")
	if err := os.WriteFile(path, data, 0o600); err != nil {
		t.Fatal(err)
	}
	return path
}

func TestShippedPlansGetTheirVerdicts(t *testing.T) {
	for name, want := range map[string]string{
		"skerry-demo": "sealed", "skerry-trapped": "open", "skerry-shallow": "leaky", "model-chain": "sealed",
	} {
		path := planFile(t, name)
		if got := object(t, 0, "judge", path)["verdict"]; got != want {
			t.Errorf("%s: %v, want %s", name, got, want)
		}
		code, text, stderr := call(t, "judge", path)
		if code != 0 || stderr != "" || !strings.Contains(strings.ToLower(text), want) {
			t.Errorf("%s for people: exit %d, %q, %q", name, code, text, stderr)
		}
	}
}

// TestJudgeKeepsItsKeys holds the keys that other programs rely on.
func TestJudgeKeepsItsKeys(t *testing.T) {
	answer := object(t, 0, "judge", planFile(t, "skerry-demo"))
	need(t, "", answer, "verdict", "ceiling", "stages", "cautions")
	bounds := answer["ceiling"].(map[string]any)
	need(t, "ceiling", bounds, "terms", "total", "criteria")
	need(t, "total", bounds["total"].(map[string]any), "floor_hz_per_atom", "ceiling_hz_per_atom")
	if floor, there := bounds["total"].(map[string]any)["floor_hz_per_atom"]; !there || floor != nil {
		t.Errorf("the floor of a system that attracts is %v, want null", floor)
	}
	for _, term := range bounds["terms"].([]any) {
		need(t, "term", term.(map[string]any), "term")
	}
	for _, c := range bounds["criteria"].([]any) {
		need(t, "criterion", c.(map[string]any), "name", "passed", "margin", "unit", "breaks")
	}
	stages := answer["stages"].([]any)
	if len(stages) != 5 {
		t.Fatalf("%d stages, want 5: the start is not one", len(stages))
	}
	for _, s := range stages {
		need(t, "stage", s.(map[string]any), "name", "tunnelling_hz", "interaction_hz", "curvature_hz", "trap_hz",
			"depth_er", "gap_hz", "scattering_length_a0", "recoil_hz")
	}
	crosses := stages[1].(map[string]any)["crosses"].([]any)
	need(t, "crossing", crosses[0].(map[string]any), "kind", "field_g")
	broken := object(t, 0, "judge", planFile(t, "skerry-trapped"))["ceiling"].(map[string]any)["criteria"].([]any)
	for _, c := range broken {
		if c := c.(map[string]any); c["passed"] == false {
			need(t, "advice", c["advice"].(map[string]any), "text", "set")
		}
	}
	for _, absent := range []string{"cloud", "lifetime"} {
		if _, there := answer[absent]; there {
			t.Errorf("%s is there though nothing computes it", absent)
		}
	}
}

func need(t *testing.T, where string, object map[string]any, keys ...string) {
	t.Helper()
	for _, key := range keys {
		if _, there := object[key]; !there {
			t.Errorf("%s has no key %q: %v", where, key, object)
		}
	}
}

func TestJudgeLevels(t *testing.T) {
	path := write(t, testdata.Plan(t, "levels-spin"))
	answer := object(t, 0, "judge", path)
	need(t, "levels", answer["levels"].(map[string]any), "energy_hz_per_body", "beta_per_hz", "temperature_k", "entropy_per_body_kb", "window_ms")
	if answer["verdict"] != "sealed" {
		t.Errorf("verdict %v", answer["verdict"])
	}
	if code, text, _ := call(t, "judge", path); code != 0 || !strings.Contains(text, "beta −") {
		t.Errorf("for people: exit %d, %q", code, text)
	}
}

// TestBands: J and the gap at s = 10, Bloch, Dalibard, Zwerger, Rev. Mod. Phys.
// 80, 885 (2008), Table I (4J = 0.076730), and plane waves outside this project.
func TestBands(t *testing.T) {
	answer := object(t, 0, "bands", "--depth", "10")
	need(t, "bands", answer, "tunnelling_er", "width_er", "gap_er", "wannier_fourth_moment", "band_edges_er")
	if j := answer["tunnelling_er"].([]any)[0].(float64); math.Abs(4*j-0.076730) > 5e-7 {
		t.Errorf("4J = %g Er, want 0.076730", 4*j)
	}
	if gap := answer["gap_er"].(float64); math.Abs(gap-4.572262) > 1e-6 {
		t.Errorf("gap %g Er, want 4.572262", gap)
	}
}

// TestExact: two atoms on two sites, E = U/2 +- sqrt(U^2/4 + 4J^2) (derived), and
// the ring of six with U = 4J, exact diagonalisation outside this project.
func TestExact(t *testing.T) {
	for _, tc := range []struct {
		args           []string
		floor, ceiling float64
		dimension      float64
	}{
		{[]string{"--sites", "2", "--atoms", "2", "--interaction", "4"}, 2 - math.Sqrt(8), 2 + math.Sqrt(8), 3},
		{[]string{"--sites", "6", "--atoms", "6", "--interaction", "4", "--ring"}, -5.6901934006, 60.6013216850, 462},
		{[]string{"--sites", "6", "--atoms", "6", "--interaction", "-4", "--curvature", "-0.1"}, -64.044981846, 2.784858540, 462},
		{[]string{"--grid", "2x3", "--atoms", "0"}, 0, 0, 1},
		// From the table of graphs, NumPy.
		{[]string{"--lattice", "kagome", "--grid", "2x2", "--ring", "--atoms", "3", "--interaction", "-2"}, -12.689120825162, 5.8595723934251, 364},
		{[]string{"--lattice", "triangular", "--grid", "3x2", "--atoms", "4", "--interaction", "-2.1", "--curvature", "-0.1"}, -16.785917291587, 5.3165365372524, 126},
		{[]string{"--lattice", "chain", "--sites", "6", "--atoms", "4", "--interaction", "4", "--curvature", "-0.1", "--second-tunnelling", "-0.2"}, -5.2003338459996, 24.638568227014, 126},
		{[]string{"--sites", "6", "--atoms", "4", "--interaction", "1", "--curvature", "0.1", "--max-occupation", "2"}, -5.0834018796308, 8.3210644841793, 90},
	} {
		answer := object(t, 0, append([]string{"exact"}, tc.args...)...)
		need(t, "exact", answer, "dimension", "floor", "ceiling", "seconds")
		need(t, "seconds", answer["seconds"].(map[string]any), "build", "solve")
		floor, ceiling := answer["floor"].(float64), answer["ceiling"].(float64)
		if math.Abs(floor-tc.floor) > 1e-8 || math.Abs(ceiling-tc.ceiling) > 1e-8 || answer["dimension"] != tc.dimension {
			t.Errorf("%v: %v, want %.10g to %.10g in %g states", tc.args, answer, tc.floor, tc.ceiling, tc.dimension)
		}
	}
}

// TestExactStates: what the flags add, and only they.
func TestExactStates(t *testing.T) {
	plain := object(t, 0, "exact", "--sites", "6", "--atoms", "6", "--interaction", "-4", "--curvature", "-0.1")
	for _, key := range []string{"floor_state", "floor_cutoff", "cautions"} {
		if _, there := plain[key]; there {
			t.Errorf("%s is there though nothing asked for it", key)
		}
	}
	if plain["floor_parity"] != 1.0 || plain["ceiling_parity"] != 1.0 {
		t.Errorf("parities %v and %v, want 1", plain["floor_parity"], plain["ceiling_parity"])
	}
	answer := object(t, 0, "exact", "--sites", "6", "--atoms", "6", "--interaction", "-4", "--curvature", "-0.1",
		"--states", "--max-occupation", "5", "--workers", "2")
	need(t, "exact", answer, "floor_cutoff", "ceiling_cutoff", "floor_state", "ceiling_state")
	state := answer["ceiling_state"].(map[string]any)
	need(t, "state", state, "occupation", "squared_occupation", "correlations", "kinetic", "interaction", "potential")
	sum := 0.0
	for _, n := range state["occupation"].([]any) {
		sum += n.(float64)
	}
	if math.Abs(sum-6) > 1e-10 || len(state["correlations"].([]any)) != 6 {
		t.Errorf("%g atoms and %d rows of correlations, want 6 of each", sum, len(state["correlations"].([]any)))
	}
	ring := object(t, 0, "exact", "--sites", "6", "--atoms", "1", "--ring", "--momentum", "2")
	if floor := ring["floor"].(float64); math.Abs(floor-1) > 1e-12 || ring["sector"] != "quasi-momentum [2]" || ring["dimension"] != 1.0 {
		t.Errorf("one atom of quasi-momentum 2 pi/3: %v, want 1 J = -2 J cos(2 pi/3)", ring)
	}
	odd := object(t, 0, "exact", "--sites", "2", "--atoms", "2", "--interaction", "4", "--sector", "odd")
	if odd["floor"] != 4.0 || odd["dimension"] != 1.0 { // (|20> - |02>)/sqrt 2 at U, from the 3 x 3 matrix
		t.Errorf("the odd state of two atoms on two sites: %v, want U = 4", odd)
	}
	apart := object(t, 0, "exact", "--sites", "3", "--atoms", "2", "--tunnelling", "0")
	if note := apart["cautions"].([]any)[0].(map[string]any); note["code"] != "disconnected" {
		t.Errorf("sites apart: %v, want the caution disconnected", note)
	}
	code, text, _ := call(t, "exact", "--sites", "6", "--atoms", "6", "--states", "--max-occupation", "4")
	if code != 0 || !strings.Contains(text, "atoms per site at the floor") || !strings.Contains(text, "cuts off at most") || !strings.Contains(text, "even under the mirror") {
		t.Errorf("for people: exit %d, %s", code, text)
	}
}

// TestExactThermodynamics: the ring of four with U = 4J at beta = -0.2, 0, 0.5 and
// the infinite-temperature mean of six sites, U N(N-1)/(L+1) (exact
// diagonalisation outside this project; the mean is derived).
func TestExactThermodynamics(t *testing.T) {
	answer := object(t, 0, "exact", "--sites", "4", "--atoms", "4", "--interaction", "4", "--ring", "--beta", "-0.2,0,0.5")
	for i, want := range []struct{ beta, energy, entropy, variance float64 }{
		{-0.2, 20.94479910, 2.47022292, 38.45813197}, {0, 9.6, math.Log(35), 52.29714286}, {0.5, -1.94884884, 1.46604423, 8.76444633},
	} {
		got := answer["canonical"].([]any)[i].(map[string]any)
		need(t, "canonical", got, "beta", "energy", "entropy", "variance")
		for key, value := range map[string]float64{"beta": want.beta, "energy": want.energy, "entropy": want.entropy, "variance": want.variance} {
			if math.Abs(got[key].(float64)-value) > 1e-6 {
				t.Errorf("beta %g: %s = %v, want %.9g", want.beta, key, got[key], value)
			}
		}
	}
	answer = object(t, 0, "exact", "--sites", "6", "--atoms", "6", "--interaction", "4", "--ring", "--entropy", "--volume-entropy")
	curve := answer["entropy"].(map[string]any)
	need(t, "entropy", curve, "energy", "entropy", "beta", "volume_entropy")
	if mean := curve["mean"].(float64); math.Abs(mean-120.0/7) > 1e-6 {
		t.Errorf("mean %g, want 4*6*5/7", mean)
	}
	if peak := curve["peak"].(float64); peak < 8 || peak > 16 {
		t.Errorf("beta is 0 at %g, want about 12 (Tr H/D is 17.14)", peak)
	}
	for _, args := range [][]string{{"--beta", "NaN"}, {"--volume-entropy"}, {"--entropy", "--second-tunnelling", "0.1"}} {
		code, _, stderr := call(t, append([]string{"exact", "--sites", "3", "--atoms", "2"}, args...)...)
		if code != 2 || !strings.Contains(stderr, strings.TrimPrefix(args[0], "--")) {
			t.Errorf("%v: exit %d, %q", args, code, stderr)
		}
	}
}

// TestFailures: kind and exit code of everything that can go wrong; the message
// names the flag, key or file.
func TestFailures(t *testing.T) {
	folder := t.TempDir()
	for _, tc := range []struct {
		name, kind, say string
		code            int
		args            []string
	}{
		{"no verb", usage, "judge", 2, nil},
		{"unknown verb", usage, "nonsense", 2, []string{"nonsense"}},
		{"unknown flag", usage, "--depht", 2, []string{"bands", "--depht", "3"}},
		{"not a number", usage, "abc", 2, []string{"bands", "--depth", "abc"}},
		{"no depth", usage, "depth", 2, []string{"bands"}},
		{"negative depth", usage, "-3", 2, []string{"bands", "--depth", "-3"}},
		{"endless depth", usage, "Inf", 2, []string{"bands", "--depth", "Inf"}},
		{"no plan", usage, "judge", 2, []string{"judge"}},
		{"two plans", usage, "judge", 2, []string{"judge", "a", "b"}},
		{"missing file", file, "absent.json", 1, []string{"judge", filepath.Join(folder, "absent.json")}},
		{"a folder", file, folder, 1, []string{"judge", folder}},
		{"not JSON", document, "line 1", 2, []string{"judge", write(t, []byte("hello"))}},
		{"truncated", document, "line", 2, []string{"judge", write(t, []byte(`{"format": "hilltop-plan", "ver`))}},
		{"negative atoms", usage, "-1", 2, []string{"exact", "--sites", "3", "--atoms", "-1"}},
		{"zero sites", usage, "0", 2, []string{"exact", "--sites", "0", "--atoms", "1"}},
		{"a grid of letters", usage, "3xa", 2, []string{"exact", "--grid", "3xa", "--atoms", "1"}},
		{"sites and grid", usage, "sites", 2, []string{"exact", "--grid", "3x3", "--sites", "3", "--atoms", "1"}},
		{"unknown lattice", usage, "hexagon", 2, []string{"exact", "--lattice", "hexagon", "--grid", "3x3", "--atoms", "1"}},
		{"a kagome of one number", usage, "kagome", 2, []string{"exact", "--lattice", "kagome", "--sites", "3", "--atoms", "1"}},
		{"unknown sector", usage, "sector", 2, []string{"exact", "--sites", "3", "--atoms", "1", "--sector", "left"}},
		{"negative limit", usage, "max-occupation", 2, []string{"exact", "--sites", "3", "--atoms", "1", "--max-occupation", "-1"}},
		{"limit too low", usage, "no room", 2, []string{"exact", "--sites", "3", "--atoms", "4", "--max-occupation", "1"}},
		{"NaN", usage, "interaction", 2, []string{"exact", "--sites", "3", "--atoms", "1", "--interaction", "NaN"}},
		{"1e9 atoms", tooLarge, "1000000000", 2, []string{"exact", "--sites", "12", "--atoms", "1000000000"}},
		{"dimension 1e12", tooLarge, "", 2, []string{"exact", "--sites", "22", "--atoms", "22"}},
	} {
		failed := object(t, tc.code, tc.args...)["error"].(map[string]any)
		if failed["kind"] != tc.kind || !strings.Contains(failed["message"].(string), tc.say) {
			t.Errorf("%s: %v, want kind %s and a message with %q", tc.name, failed, tc.kind, tc.say)
		}
		if tc.kind == tooLarge {
			need(t, tc.name, failed, "dimension", "bytes_wanted", "bytes_available", "largest_sites")
		}
		code, stdout, stderr := call(t, tc.args...)
		if code != tc.code || stdout != "" || !strings.Contains(stderr, "hilltop-batch: ") {
			t.Errorf("%s for people: exit %d, %q, %q", tc.name, code, stdout, stderr)
		}
	}
}

func TestMistakesOfAPlanAreAllNamed(t *testing.T) {
	data, err := assets.Plan("skerry-demo")
	if err != nil {
		t.Fatal(err)
	}
	text := strings.Replace(string(data), `"waist_um": 150`, `"waist_um": 0`, 1)
	text = strings.Replace(text, `"gravity_axis"`, `"gravity_axes"`, 1)
	text = strings.Replace(text, `"background_a0": -29`, `"background_a0": 1e400`, 1)
	failed := object(t, 2, "judge", write(t, []byte(text)))["error"].(map[string]any)
	fields := failed["fields"].([]any)
	var paths []string
	for _, f := range fields {
		need(t, "field", f.(map[string]any), "path", "value", "reason", "nearest")
		paths = append(paths, f.(map[string]any)["path"].(string))
	}
	for _, want := range []string{"/lattice/axes/0/waist_um", "/gravity_axes", "/scattering/background_a0"} {
		if !strings.Contains(strings.Join(paths, " "), want) {
			t.Errorf("mistakes at %v, want one at %s", paths, want)
		}
	}
}

// TestRefusedByPhysics: what only the physics can refuse still names the path.
func TestRefusedByPhysics(t *testing.T) {
	data, err := assets.Plan("skerry-demo")
	if err != nil {
		t.Fatal(err)
	}
	for _, tc := range []struct{ name, old, new, path, say string }{
		{"field on the pole", `"field_g": 200`, `"field_g": 402.5`, "/stages/1/field_g", "402.5: the field stands on a pole"},
		{"wavelength on the D2 line", `"axis": "x", "wavelength_nm": 740`, `"axis": "x", "wavelength_nm": 766.700922`, "/lattice/axes/0/wavelength_nm", "D2 line of 39K"},
		{"unknown species", `"39K"`, `"38K"`, "/cloud/species", `want a known species: "39K" or "87Rb"; the nearest known one is "39K"`},
		{"unknown state", `"F=1,mF=+1"`, `"F=7,mF=+1"`, "/cloud/state", "want a known state"},
	} {
		text := strings.Replace(string(data), tc.old, tc.new, 1)
		failed := object(t, 2, "judge", write(t, []byte(text)))["error"].(map[string]any)
		fields, ok := failed["fields"].([]any)
		if !ok || fields[0].(map[string]any)["path"] != tc.path {
			t.Errorf("%s: %v, want a mistake at %s", tc.name, failed, tc.path)
		}
		if message := failed["message"].(string); !strings.Contains(message, tc.say) {
			t.Errorf("%s: message %q, want %q in it", tc.name, message, tc.say)
		}
	}
}

func TestStopIsSaid(t *testing.T) {
	ctx, cancel := context.WithCancel(context.Background())
	cancel()
	var out, errs bytes.Buffer
	code := run(ctx, []string{"exact", "--sites", "10", "--atoms", "10", "--json"}, &out, &errs)
	if code != 1 || !strings.Contains(out.String(), `"stopped"`) {
		t.Errorf("exit %d, %s", code, out.String())
	}
}

// full is an output that takes nothing, like a full disk.
type full struct{}

func (full) Write([]byte) (int, error) { return 0, errors.New("no space left") }

func TestLostOutputIsAFailure(t *testing.T) {
	for _, args := range [][]string{{"bands", "--depth", "3"}, {"bands", "--depth", "3", "--json"}, {"judge", planFile(t, "skerry-demo"), "--json"}} {
		var errs bytes.Buffer
		if code := run(context.Background(), args, full{}, &errs); code != 1 || !strings.Contains(errs.String(), "no space left") {
			t.Errorf("%v: exit %d, %q", args, code, errs.String())
		}
	}
}

func TestTerminalsAreNotDriven(t *testing.T) {
	data, err := assets.Plan("skerry-demo")
	if err != nil {
		t.Fatal(err)
	}
	text := strings.Replace(string(data), "Skerry bench, negative", `\u001b[2J\u0007evil`, 1)
	if _, stdout, _ := call(t, "judge", write(t, []byte(text))); strings.ContainsAny(stdout, "\x1b\x07") || !strings.Contains(stdout, "evil") {
		t.Errorf("control characters reach the terminal: %q", stdout[:60])
	}
}

func TestRefusalsNameTheFile(t *testing.T) {
	data, err := assets.Plan("skerry-demo")
	if err != nil {
		t.Fatal(err)
	}
	path := write(t, []byte(strings.Replace(string(data), `"field_g": 200`, `"field_g": 402.5`, 1)))
	if _, _, stderr := call(t, "judge", path); !strings.Contains(stderr, path) || !strings.Contains(stderr, "402.5") {
		t.Errorf("%q does not name %s", stderr, path)
	}
}

func TestHelpAndCompletion(t *testing.T) {
	for _, args := range [][]string{{"--help"}, {"judge", "--help"}, {"completion", "bash"}, {"--version"}} {
		if code, stdout, stderr := call(t, args...); code != 0 || len(stdout) < 10 || stderr != "" {
			t.Errorf("%v: exit %d, %d bytes, %q", args, code, len(stdout), stderr)
		}
	}
}
