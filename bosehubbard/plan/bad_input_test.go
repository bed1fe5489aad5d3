package plan

import (
	"strings"
	"testing"
)

// good is a small plan on one line per part, from which the broken ones are made.
const good = `{
 "format": "hilltop-plan", "version": 1, "title": "t",
 "cloud": {"species": "39K", "state": "F=1,mF=+1", "atoms": 80000, "entropy_per_atom_kb": 0.6},
 "lattice": {"geometry": "cubic", "axes": [
  {"axis": "x", "wavelength_nm": 740, "waist_um": 150, "return_ratio": 1.0},
  {"axis": "y", "wavelength_nm": 740, "waist_um": [150, 140]},
  {"axis": "z", "wavelength_nm": 740, "waist_um": 150}]},
 "beams": [{"name": "sheet", "wavelength_nm": 1064, "axis": "x", "waist_um": [120, 60]},
  {"name": "cross", "wavelength_nm": 1064, "axis": "y", "waist_um": 120}],
 "field": {"axis": "z", "gradient_g_per_cm": 0, "curvature_per_cm2": 0},
 "scattering": {"resonances": [{"position_g": 402.5, "width_g": -52}], "background_a0": -29},
 "gravity_axis": "z",
 "start": {"depth_er": [0,0,0], "power_w": {"sheet": 0.2, "cross": 0.2}, "field_g": 398},
 "stages": [
  {"name": "load", "duration_ms": 30, "shape": "exponential", "depth_er": [22,22,22]},
  {"name": "flip", "duration_ms": 2, "shape": "smooth", "field_g": 200, "power_w": {"sheet": 0.02}},
  {"name": "wait", "duration_ms": 300, "shape": "hold"}],
 "measured": {}, "limits": {}, "uncertainty": {}, "outputs": []
}`

const goodModel = `{"format": "hilltop-plan", "version": 1,
 "model": {"sites": [2, 3], "periodic": [false, true], "atoms": 6, "tunnelling_hz": 1, "interaction_hz": -2.1, "curvature_hz": [-0.05, 0], "fock": [1,1,1,1,1,1]},
 "stages": [{"name": "flip", "duration_ms": 2, "shape": "linear", "interaction_hz": 3, "tunnelling_hz": [1, 2]}]}`

const goodLevels = `{"format": "hilltop-plan", "version": 1,
 "levels": {"energies_hz": [-8000, 8000], "degeneracies": [1, 1], "bodies": 1e20, "inner_time_s": 1e-4, "outer_time_s": 300, "energy_hz_per_body": 5000}}`

// badField is a plan with one mistake, made by replacing a piece of a good one.
type badField struct {
	name     string
	from     string // the good plan
	old, new string
	want     string // the whole message, without "plan: "
	loose    bool   // a JSON Schema cannot say it
}

var badFields = []badField{
	{"unknown key", good, `"depth_er": [22,22,22]`, `"depth": [22,22,22]`,
		`/stages/0/depth: "depth": unknown key; the nearest known one is "depth_er"`, false},
	{"unknown key in an axis", good, `"return_ratio"`, `"return_ration"`,
		`/lattice/axes/0/return_ration: "return_ration": unknown key; the nearest known one is "return_ratio"`, false},
	{"unknown key at the top", good, `"gravity_axis"`, `"gravity"`,
		`/gravity: "gravity": unknown key; the nearest known one is "gravity_axis"`, false},
	{"unknown key with a slash", good, `"title"`, `"ti/t~le"`,
		`/ti~1t~0le: "ti/t~le": unknown key; the nearest known one is "title"`, false},
	{"string for a number", good, `"atoms": 80000`, `"atoms": "80000"`,
		`/cloud/atoms: "80000": found a string, want a number without quotes`, false},
	{"number for a string", good, `"39K"`, `39`, `/cloud/species: 39: found a number, want a string`, false},
	{"list for a number", good, `"field_g": 398`, `"field_g": [398]`,
		`/start/field_g: [398]: found a list, want a number`, false},
	{"number for a list", good, `"depth_er": [0,0,0]`, `"depth_er": 0`,
		`/start/depth_er: 0: found a number, want a list`, false},
	{"object for a waist", good, `"waist_um": 120`, `"waist_um": {}`,
		`/beams/1/waist_um: {}: found an object, want a number or a list of numbers`, false},
	{"null", good, `"field_g": 200`, `"field_g": null`,
		`/stages/1/field_g: null: found null, want a number; leave out a key that has no value`, false},
	{"overflow", good, `"atoms": 80000`, `"atoms": 1e400`,
		`/cloud/atoms: 1e400: the number overflows, want at most 1.8e308 in size`, false},
	{"missing key", good, `"species": "39K", `, ``, `/cloud/species: the key is missing`, false},
	{"missing part", good, `"cloud": {"species": "39K", "state": "F=1,mF=+1", "atoms": 80000, "entropy_per_atom_kb": 0.6},`, ``,
		`/cloud: the key is missing`, false},
	{"duplicate key", good, `"title": "t"`, `"title": "t", "title": "u"`,
		`/title: "u": the key stands twice, in line 2 and in line 2`, true},
	{"aim", good, `"title": "t"`, `"aim_sign": "negativ"`,
		`/aim_sign: "negativ": want "negative" or "positive"; the nearest known one is "negative"`, false},
	{"no atoms", good, `80000`, `0`, `/cloud/atoms: 0: want a whole number of atoms from 1 to 1e10`, false},
	{"half an atom", good, `80000`, `80000.5`, `/cloud/atoms: 80000.5: want a whole number of atoms from 1 to 1e10`, false},
	{"negative entropy", good, `0.6`, `-0.6`,
		`/cloud/entropy_per_atom_kb: -0.6: want an entropy per atom from 0 to 100 kB`, false},
	{"empty state", good, `"F=1,mF=+1"`, `""`, `/cloud/state: "": want a name that is not empty`, false},
	{"other geometry", good, `"cubic"`, `"kagome"`,
		`/lattice/geometry: "kagome": want "cubic"`, false},
	{"axis twice", good, `"axis": "y", "wavelength_nm": 740`, `"axis": "x", "wavelength_nm": 740`,
		`/lattice/axes/1/axis: "x": the axis is taken by /lattice/axes/0, want each of x, y and z once`, true},
	{"no axis", good, `"axis": "z", "wave`, `"axis": "w", "wave`,
		`/lattice/axes/2/axis: "w": want "x", "y" or "z"`, false},
	{"wavelength in metres", good, `"axis": "x", "wavelength_nm": 740`, `"axis": "x", "wavelength_nm": 7.4e-7`,
		`/lattice/axes/0/wavelength_nm: 7.4e-7: want a wavelength from 150 to 20000 nm; 7.4e-7 looks like metres, which would be 740 nm`, false},
	{"negative wavelength", good, `"wavelength_nm": 1064, "axis": "x"`, `"wavelength_nm": -1064, "axis": "x"`,
		`/beams/0/wavelength_nm: -1064: want a wavelength from 150 to 20000 nm`, false},
	{"zero waist", good, `"waist_um": 120`, `"waist_um": 0`,
		`/beams/1/waist_um: 0: want a waist from 0.5 to 50000 um`, false},
	{"waist in millimetres", good, `[120, 60]`, `[120, 0.06]`,
		`/beams/0/waist_um/1: 0.06: want a waist from 0.5 to 50000 um; 0.06 looks like millimetres, which would be 60 um`, false},
	{"three waists", good, `[120, 60]`, `[120, 60, 60]`,
		`/beams/0/waist_um: [120, 60, 60]: 3 entries, want 2, one for each transverse axis in the order x, y, z, or one number for a round beam`, false},
	{"return ratio in per cent", good, `"return_ratio": 1.0`, `"return_ratio": 98`,
		`/lattice/axes/0/return_ratio: 98: want a ratio of powers above 0, up to 1; 98 looks like per cent, which would be 0.98`, false},
	{"beams named twice", good, `"name": "cross"`, `"name": "sheet"`,
		`/beams/1/name: "sheet": the name is taken by /beams/0/name`, true},
	{"beam without a name", good, `"name": "cross"`, `"name": ""`,
		`/beams/1/name: "": want a name that is not empty`, false},
	{"beam named like a key of the user", good, `"name": "cross"`, `"name": "x_cross"`,
		`/beams/1/name: "x_cross": want a name that does not begin with x_, which marks keys of your own`, false},
	{"power of no beam", good, `"power_w": {"sheet": 0.02}`, `"power_w": {"shet": 0.02}`,
		`/stages/1/power_w/shet: 0.02: no beam has this name; the nearest known one is "sheet"`, true},
	{"negative power", good, `"power_w": {"sheet": 0.02}`, `"power_w": {"sheet": -0.02}`,
		`/stages/1/power_w/sheet: -0.02: want a power from 0 to 500 W`, false},
	{"start without a beam", good, `, "cross": 0.2`, ``,
		`/start/power_w/cross: the key is missing, want the power of every beam before the first stage`, true},
	{"start with two depths", good, `[0,0,0]`, `[0,0]`,
		`/start/depth_er: [0,0]: 2 entries, want 3, one for each entry of lattice.axes`, false},
	{"negative depth", good, `[22,22,22]`, `[22,-3,22]`,
		`/stages/0/depth_er/1: -3: want a depth from 0 to 300 Er`, false},
	{"depth in hertz", good, `[22,22,22]`, `[22,22,205000]`,
		`/stages/0/depth_er/2: 205000: want a depth from 0 to 300 Er`, false},
	{"negative field", good, `"field_g": 200`, `"field_g": -200`,
		`/stages/1/field_g: -200: want a field from 0 to 50000 G`, false},
	{"unknown shape", good, `"smooth"`, `"smoth"`,
		`/stages/1/shape: "smoth": want "hold", "linear", "exponential" or "smooth"; the nearest known one is "smooth"`, false},
	{"zero length", good, `"duration_ms": 2,`, `"duration_ms": 0,`,
		`/stages/1/duration_ms: 0: want a duration above 0, up to 1e9 ms`, false},
	{"stages named twice", good, `"name": "flip"`, `"name": "load"`,
		`/stages/1/name: "load": the name is taken by /stages/0/name`, true},
	{"stage that names no knob", good, `, "field_g": 200, "power_w": {"sheet": 0.02}`, ``,
		`/stages/1/shape: "smooth": the stage changes nothing; give a knob a new value (depth_er, power_w, field_g) or choose the shape hold`, true},
	{"stage that changes nothing", good, `"field_g": 200, "power_w": {"sheet": 0.02}`, `"field_g": 398`,
		`/stages/1/shape: "smooth": the stage changes nothing; give a knob a new value (depth_er, power_w, field_g) or choose the shape hold`, true},
	{"hold that moves a knob", good, `"shape": "hold"`, `"shape": "hold", "depth_er": [22,22,6]`,
		`/stages/2/depth_er/2: 6: a hold stage moves no knob and depth_er/2 stands at 22; drop the key or choose the shape linear, exponential or smooth`, true},
	{"model key in an apparatus", good, `"field_g": 200`, `"interaction_hz": 200`,
		`/stages/1/interaction_hz: 200: the key belongs to a plan of kind model, and this is one of kind apparatus`, false},
	{"no width", good, `"width_g": -52`, `"width_g": 0`,
		`/scattering/resonances/0/width_g: 0: want a resonance width other than 0 from -50000 to 50000 G`, false},
	{"limit on nothing", good, `"limits": {}`, `"limits": {"/field_gg": {"max": 600}}`,
		`/limits/~1field_gg: "/field_gg": want the path of a number of this plan or of a knob, like /start/field_g or /field_g`, true},
	{"limits crossed", good, `"limits": {}`, `"limits": {"/field_g": {"min": 3, "max": 2}}`,
		`/limits/~1field_g/max: 2: want at least the 3 of min`, true},
	{"limit of nothing", good, `"limits": {}`, `"limits": {"/field_g": {}}`,
		`/limits/~1field_g: {}: want min, max or slew_per_ms`, false},
	{"standing limit", good, `"limits": {}`, `"limits": {"/field_g": {"slew_per_ms": 0}}`,
		`/limits/~1field_g/slew_per_ms: 0: want a slew rate above 0`, false},
	{"negative uncertainty", good, `"uncertainty": {}`, `"uncertainty": {"/start/field_g": -1}`,
		`/uncertainty/~1start~1field_g: -1: want a standard deviation of 0 or more`, false},
	{"uncertainty of a string", good, `"uncertainty": {}`, `"uncertainty": {"/title": 1}`,
		`/uncertainty/~1title: "/title": want the path of a number of this plan or of a knob, like /start/field_g or /field_g`, true},
	{"measured without a value", good, `"measured": {}`, `"measured": {"/stages/2/trap_hz/0": {"sigma": 1}}`,
		`/measured/~1stages~12~1trap_hz~10/value: the key is missing`, false},
	{"output that is no object", good, `"outputs": []`, `"outputs": [3]`,
		`/outputs/0: 3: found a number, want an object`, false},
	{"model and apparatus", goodModel, `"version": 1,`, `"version": 1, "gravity_axis": "z",`,
		`/gravity_axis: "z": the key belongs to an apparatus, and this plan has model`, false},
	{"apparatus key in a model", goodModel, `"interaction_hz": 3`, `"field_g": 3`,
		`/stages/0/field_g: 3: the key belongs to a plan of kind apparatus, and this is one of kind model`, false},
	{"half a site", goodModel, `[2, 3]`, `[2, 2.5]`, `/model/sites/1: 2.5: want a whole number`, false},
	{"no site", goodModel, `[2, 3]`, `[2, 0]`, `/model/sites/1: 0: want a whole number of sites from 1 to 1e9`, false},
	{"four dimensions", goodModel, `"sites": [2, 3], "periodic": [false, true]`, `"sites": [1, 1, 2, 3]`,
		`/model/sites: [1, 1, 2, 3]: 4 entries, want 1 to 3`, false},
	{"three ends", goodModel, `[false, true]`, `[false]`,
		`/model/periodic: [false]: 1 entries, want 2, one for each entry of sites`, true},
	{"one curvature", goodModel, `[-0.05, 0]`, `[-0.05]`,
		`/model/curvature_hz: [-0.05]: 1 entries, want 2, one for each entry of sites`, true},
	{"atoms that do not add up", goodModel, `[1,1,1,1,1,1]`, `[1,1,1,1,1,2]`,
		`/model/fock: [1,1,1,1,1,2]: the sites hold 7 atoms, want the 6 of /model/atoms`, true},
	{"sites that do not add up", goodModel, `[1,1,1,1,1,1]`, `[1,1,1,1,2]`,
		`/model/fock: [1,1,1,1,2]: 5 entries, want 6, one for each site`, true},
	{"levels with stages", goodLevels, `"version": 1,`, `"version": 1, "stages": [{"name": "a", "duration_ms": 1, "shape": "hold"}],`,
		`/stages: [{"name": "a", "duration_ms": 1, "shape": "hold"}]: levels have no stages`, false},
	{"levels out of reach", goodLevels, `5000`, `9000`,
		`/levels/energy_hz_per_body: 9000: want an energy between the lowest and the highest level, -8000 to 8000 Hz`, true},
	{"degeneracies that do not match", goodLevels, `[1, 1]`, `[1]`,
		`/levels/degeneracies: [1]: 1 entries, want 2, one for each entry of energies_hz`, false},
	{"one level", goodLevels, `[-8000, 8000], "degeneracies": [1, 1]`, `[5000]`,
		`/levels/energies_hz: [5000]: 1 entries, want at least 2 levels`, false},
	{"no time", goodLevels, `1e-4`, `0`, `/levels/inner_time_s: 0: want a time above 0, up to 1e18 s`, false},
	{"wrong format", good, `"hilltop-plan"`, `"hill-plan"`, `/format: "hill-plan": want "hilltop-plan"`, false},
	{"no format", good, `"format": "hilltop-plan",`, ``, `/format: the key is missing, want "hilltop-plan"`, false},
	{"newer version", good, `"version": 1`, `"version": 7`,
		`/version: 7: version 7 is newer than this program, which reads versions up to 1`, false},
	{"version 0", good, `"version": 1`, `"version": 0`, `/version: 0: want a version from 1 to 1`, false},
	{"version that is no number", good, `"version": 1`, `"version": "one"`,
		`/version: "one": found a string, want a whole number`, false},
}

// broken returns the bad text of a row.
func (b badField) broken(t testing.TB) []byte {
	t.Helper()
	if strings.Count(b.from, b.old) != 1 {
		t.Fatalf("%s: %q stands %d times in the good plan, want once", b.name, b.old, strings.Count(b.from, b.old))
	}
	return []byte(strings.Replace(b.from, b.old, b.new, 1))
}

func TestGoodPlansParse(t *testing.T) {
	for _, text := range []string{good, goodModel, goodLevels} {
		if _, err := Parse([]byte(text)); err != nil {
			t.Errorf("%v", err)
		}
	}
}

func TestBadFields(t *testing.T) {
	for _, tc := range badFields {
		_, err := Parse(tc.broken(t))
		got := "no error"
		if err != nil {
			got = err.Error()
		}
		if want := "plan: " + tc.want; got != want {
			t.Errorf("%s:\n got %s\nwant %s", tc.name, got, want)
		}
	}
}

func TestBadTexts(t *testing.T) {
	for _, tc := range []struct{ name, text, want string }{
		{"empty", "", "line 1, column 1: the text is empty, want a JSON object"},
		{"only space", " \n ", "line 2, column 2: the text is empty, want a JSON object"},
		{"not JSON", "depth = 22\n", `line 1, column 1: found depth, want a value`},
		{"a comment", "{\n // mine\n}", `line 2, column 2: found '/', want a key in double quotes`},
		{"truncated in an object", good[:strings.Index(good, ` "beams"`)],
			"line 8, column 1: the text ends inside the object that begins at line 1, column 1"},
		{"truncated in a list", `{"a": [1, 2`, "line 1, column 12: the text ends inside the list that begins at line 1, column 7"},
		{"truncated in a string", "{\n\"titl", "line 2, column 6: the text ends inside a string that begins at line 2, column 1"},
		{"truncated after a key", `{"a":`, "line 1, column 6: the text ends inside the object that begins at line 1, column 1"},
		{"trailing data", good + " x", "line 19, column 3: found 'x' after the end of the plan"},
		{"two documents", good + "\n" + good, "line 20, column 1: found '{' after the end of the plan"},
		{"trailing comma", `{"a": 1,}`, `line 1, column 9: found '}', want a key in double quotes`},
		{"single quotes", `{'a': 1}`, `line 1, column 2: found '\'', want a key in double quotes`},
		{"NaN", `{"a": NaN}`, "line 1, column 7: found NaN, want a value"},
		{"infinity", `{"a": -Infinity}`, "line 1, column 7: found -Infinity, want a number like -1.5e3"},
		{"leading zero", `{"a": 022}`, "line 1, column 7: found 022, want a number like -1.5e3"},
		{"no colon", `{"é" 1}`, "line 1, column 6: found '1', want ':'"},
		{"no comma", `{"a": 1 "b": 2}`, `line 1, column 9: found '"', want ',' or '}'`},
		{"line break in a string", "{\"a\": \"b\nc\"}", `line 1, column 9: found '\n' inside a string that begins at column 7, want it closed or escaped`},
		{"bad escape", `{"a": "\q"}`, "line 1, column 7: a string with a backslash that JSON does not know"},
		{"invalid UTF-8", "{\"a\":\n \"\xff\"}", "line 2, column 3: the text is not UTF-8"},
		{"UTF-16", "\xff\xfe{\x00}\x00", "line 1, column 1: the text is UTF-16, want UTF-8"},
		{"nesting bomb", strings.Repeat("[", 1_000_000), "line 1, column 101: more than 100 lists and objects inside one another"},
		{"a list", "[]", "document: []: found a list, want an object"},
		{"nothing in it", `{"format": "hilltop-plan", "version": 1}`,
			"document: want an apparatus (cloud, lattice, start, stages), a model or levels"},
		{"model and levels", `{"format": "hilltop-plan", "version": 1, "model": ` + inside(goodModel, "model") + `, "levels": ` + inside(goodLevels, "levels") + `}`,
			`/levels: {"energies_hz": [-8000, 8000], "degeneracies": [1, 1], "bodi...: a plan has a model or levels, and this one has both`},
		{"17 MB", strings.Repeat(" ", 17_000_000), "17 MB (17000000 bytes), want at most 16 MB (16000000 bytes)"},
		{"a bomb of commas", "[" + strings.Repeat("1,", 2_000_000), "line 1, column 2000000: more than 1000000 values"},
	} {
		_, err := Parse([]byte(tc.text))
		got := "no error"
		if err != nil {
			got = err.Error()
		}
		if want := "plan: " + tc.want; got != want {
			t.Errorf("%s:\n got %s\nwant %s", tc.name, got, want)
		}
	}
}

// inside returns the text of one top-level value.
func inside(text, key string) string {
	root, err := scan([]byte(text))
	if err != nil {
		panic(err)
	}
	n := root.member(key)
	return text[n.start:n.end]
}

func TestAllMistakesAtOnce(t *testing.T) {
	text := good
	for _, change := range [][2]string{
		{`"atoms": 80000`, `"atoms": -1`}, {`"smooth"`, `"s"`}, {`"title"`, `"titel"`}, {`"field_g": 398`, `"field_g": 1e999`},
		{`"state": "F=1,mF=+1", `, ``},
	} {
		text = strings.Replace(text, change[0], change[1], 1)
	}
	_, err := Parse([]byte(text))
	want := `plan: 5 mistakes:
  /titel: "titel": unknown key; the nearest known one is "title"
  /cloud/state: the key is missing
  /cloud/atoms: -1: want a whole number of atoms from 1 to 1e10
  /start/field_g: 1e999: the number overflows, want at most 1.8e308 in size
  /stages/1/shape: "s": want "hold", "linear", "exponential" or "smooth"`
	if err == nil || err.Error() != want {
		t.Errorf("got %v\nwant %s", err, want)
	}
}

func TestMistakesAreBounded(t *testing.T) {
	var text strings.Builder
	text.WriteString(`{"format": "hilltop-plan", "version": 1`)
	for i := range 5000 {
		text.WriteString(`, "k` + itoa(i) + `": 0`)
	}
	text.WriteString("}")
	_, err := Parse([]byte(text.String()))
	list, _ := err.(Errors)
	if len(list) != maxMistakes+1 {
		t.Errorf("%d mistakes, want %d", len(list), maxMistakes+1)
	}
}

func TestToleratedTexts(t *testing.T) {
	for name, text := range map[string]string{
		"byte-order mark":  "\ufeff" + good,
		"windows lines":    strings.ReplaceAll(good, "\n", "\r\n"),
		"keys of the user": strings.Replace(good, `"axis": "x", "wavelength_nm": 740`, `"x_serial": {"a": [1, null], "a": 2}, "axis": "x", "wavelength_nm": 740`, 1),
		"user key at top":  strings.Replace(good, `"title"`, `"x_lab": null, "title"`, 1),
		"user key in powers": strings.Replace(good, `"power_w": {"sheet": 0.02}`,
			`"power_w": {"x_why": "colder", "sheet": 0.02}`, 1),
		"hold that repeats a value": strings.Replace(good, `"shape": "hold"`, `"shape": "hold", "field_g": 200`, 1),
		"escaped key":               strings.Replace(good, `"title"`, `"t\u0069tle"`, 1),
		"whole number as float":     strings.Replace(good, `80000`, `8.0e4`, 1),
		"no optional keys":          strings.Replace(good, `"field": {"axis": "z", "gradient_g_per_cm": 0, "curvature_per_cm2": 0},`, ``, 1),
		"beam with a slash":         strings.ReplaceAll(good, `"cross"`, `"1064/~cross"`),
		"limits on knobs": strings.Replace(good, `"limits": {}`,
			`"limits": {"/power_w/sheet": {"max": 2}, "/stages/2/depth_er/0": {"min": 1}, "/beams/0/waist_um/1": {"max": 100}}`, 1),
	} {
		if _, err := Parse([]byte(text)); err != nil {
			t.Errorf("%s: %v", name, err)
		}
	}
}

func TestColumnsSkipTheByteOrderMark(t *testing.T) {
	p, err := Parse([]byte("\ufeff{\"a\" 1}"))
	if want := "plan: line 1, column 6: found '1', want ':'"; p != nil || err == nil || err.Error() != want {
		t.Errorf("after a byte-order mark: got %v, want %s", err, want)
	}
}
