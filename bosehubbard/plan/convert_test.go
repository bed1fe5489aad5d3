package plan

import (
	"math"
	"strings"
	"testing"

	"hilltop/assets"
	"hilltop/bosehubbard/apparatus"
	"hilltop/bosehubbard/atom"
	"hilltop/bosehubbard/optics"
	"hilltop/bosehubbard/si"
	"hilltop/testdata"
)

// row is one number with what it should be and a relative tolerance.
type row struct {
	what      string
	got, want float64
	tolerance float64
}

func checkRows(t *testing.T, rows []row) {
	t.Helper()
	for _, r := range rows {
		if off := math.Abs(r.got - r.want); !(off <= r.tolerance*math.Abs(r.want)) {
			t.Errorf("%s: got %.9g, want %.9g, off by %.3g, tolerance %g", r.what, r.got, r.want, off, r.tolerance*math.Abs(r.want))
		}
	}
}

func TestUnitsBecomeSI(t *testing.T) {
	text := strings.NewReplacer(
		`"gradient_g_per_cm": 0, "curvature_per_cm2": 0`, `"gradient_g_per_cm": 7, "curvature_per_cm2": 0.5`,
		`"wavelength_nm": 740, "waist_um": [150, 140]`, `"wavelength_nm": 736.65, "waist_um": [150, 140]`,
	).Replace(good)
	p := mustParse(t, text)
	a, err := p.Apparatus()
	if err != nil {
		t.Fatal(err)
	}
	s, err := p.Sequence()
	if err != nil {
		t.Fatal(err)
	}
	const exact = 4e-16 // a few roundings
	y, sheet, flip := a.Lattice[optics.Y], a.Beams[0], s.Stages[1]
	checkRows(t, []row{
		{"spacing, m", y.Spacing, 368.325e-9, exact},
		{"lattice waist along x, m", y.Waists[0], 150e-6, exact},
		{"lattice waist along z, m", y.Waists[1], 140e-6, exact},
		// Er/h = 9436.138(50) Hz for 39K at 736.65 nm, h/(2 m lambda^2) with CODATA 2022 and AME2020
		{"recoil, Hz", si.HzFromJoule(y.Recoil), 9436.138, 5e-6},
		{"return ratio", y.ReturnRatio, 1, 0},
		{"beam wavelength, m", sheet.Wavelength, 1064e-9, exact},
		{"beam waist along z, m", sheet.Waists[1], 60e-6, exact},
		// -1.8425e-36 J/(W/m^2): D lines of 39K with counter-rotating terms, computed from the published formula
		{"light shift at 1064 nm", sheet.Shift, -1.8425e-36, 5e-5},
		{"gradient, T/m", a.Field.Gradient, 7e-2, exact},
		{"curvature, 1/m^2", a.Field.CurvaturePerField, 5000, exact},
		{"background, m", a.Scattering.Background, -29 * 5.29177210544e-11, exact},
		{"pole, T", a.Scattering.Resonances[0].Position, 402.5e-4, exact},
		{"width, T", a.Scattering.Resonances[0].Width, -52e-4, exact},
		{"start field, T", s.Start.Field, 398e-4, exact},
		{"field, T", flip.End.Field, 200e-4, exact},
		{"duration, s", flip.Duration, 2e-3, exact},
		{"depth, Er", flip.End.Depth[optics.Z], 22, 0},
		{"power of sheet, W", flip.End.Power[0], 0.02, 0},
		{"power of cross, W", flip.End.Power[1], 0.2, 0},
	})
	if a.Species.Name != "39K" || a.State.Name != "F=1,mF=+1" || !a.GravityOn || a.Gravity != optics.Z || a.Field.Axis != optics.Z || sheet.Axis != optics.X {
		t.Errorf("got %s, %s, gravity %v %v, field %v, sheet %v", a.Species.Name, a.State.Name, a.GravityOn, a.Gravity, a.Field.Axis, sheet.Axis)
	}
}

// TestAxesInAnyOrder lists the lattice axes as z, x, y: depths follow the list in
// the document and the axis in SI.
func TestAxesInAnyOrder(t *testing.T) {
	text := strings.NewReplacer(`{"axis": "x", "wave`, `{"axis": "z", "wave`, `{"axis": "y", "wave`, `{"axis": "x", "wave`,
		`{"axis": "z", "wave`, `{"axis": "y", "wave`, `[22,22,22]`, `[1,2,3]`, `"gravity_axis": "z"`, `"gravity_axis": "none"`).Replace(good)
	p := mustParse(t, text)
	s, err := p.Sequence()
	if err != nil {
		t.Fatal(err)
	}
	a, err := p.Apparatus()
	if err != nil {
		t.Fatal(err)
	}
	if want := [3]float64{2, 3, 1}; s.Stages[0].End.Depth != want {
		t.Errorf("depths x, y, z = %v, want %v", s.Stages[0].End.Depth, want)
	}
	if a.Lattice[optics.X].Waists != [2]float64{150e-6, 140e-6} || a.GravityOn {
		t.Errorf("x beam %+v, gravity %v", a.Lattice[optics.X], a.GravityOn)
	}
}

func TestConversionsThatFail(t *testing.T) {
	for _, tc := range []struct{ old, new, want string }{
		{`"39K"`, `"39L"`, `plan: /cloud/species: "39L": want a known species: ` + listed(atom.Names()) + `; the nearest known one is "39K"`},
		{`"F=1,mF=+1"`, `"F=1,mF=+2"`, `plan: /cloud/state: "F=1,mF=+2": want a known state: "F=1,mF=+1", "F=1,mF=0"`},
		{`"wavelength_nm": 1064, "axis": "y"`, `"wavelength_nm": 766.7, "axis": "y"`, `plan: /beams/1/wavelength_nm: 766.7: optics: wavelength on a D line`},
	} {
		a, err := mustParse(t, strings.Replace(good, tc.old, tc.new, 1)).Apparatus()
		if a != nil || err == nil || !strings.HasPrefix(err.Error(), tc.want) {
			t.Errorf("got %v\nwant %s", err, tc.want)
		}
	}
	noCurve := strings.NewReplacer(`"F=1,mF=+1"`, `"F=2,mF=+2"`,
		` "scattering": {"resonances": [{"position_g": 402.5, "width_g": -52}], "background_a0": -29},`, ``).Replace(good)
	want := "plan: /scattering: the key is missing, and the species file has no scattering length for 39K F=2,mF=+2; give your own calibration"
	if _, err := mustParse(t, noCurve).Apparatus(); err == nil || err.Error() != want {
		t.Errorf("got %v\nwant %s", err, want)
	}
	for _, text := range []string{goodModel, goodLevels} {
		p := mustParse(t, text)
		_, errA := p.Apparatus()
		_, errS := p.Sequence()
		if errA == nil || errS == nil {
			t.Errorf("a plan of kind %s gave an apparatus or a sequence", p.Kind())
		}
	}
}

// end returns the Hamiltonian at the end of a stage, -1 for the start.
func end(t *testing.T, p *Plan, stage int) apparatus.Point {
	t.Helper()
	a, err := p.Apparatus()
	if err != nil {
		t.Fatal(err)
	}
	var point apparatus.Point
	if err := a.At(apparatus.NewWorkspace(), &point, p.Settings(p.Rows()[stage+1])); err != nil {
		t.Fatal(err)
	}
	return point
}

// TestBraun2013 compares the plan with the numbers of Braun et al., Science 339, 52
// (2013): 37(1) Hz before loading, 10(2) ms tunnelling time at 22 Er, -43(1) Hz and
// U/J = -2.1(1) at the end (from memory); U/J = -2.106 and J/h = 16.416 Hz follow
// from plane waves and exact Wannier functions.
func TestBraun2013(t *testing.T) {
	p := mustParse(t, string(testdata.Plan(t, "braun2013")))
	start, load, last := end(t, p, -1), end(t, p, 0), end(t, p, len(p.Stages)-1)
	a0 := si.BohrRadius
	checkRows(t, []row{
		{"trap before loading, Hz", start.Trap[0], 37, 0.003},
		{"a before loading, a0", start.ScatteringLength / a0, 309, 0.001},
		{"J at 22 Er, Hz", load.Model.Axes[0].Tunnelling, 16.416, 1e-4},
		{"a at the end, a0", last.ScatteringLength / a0, -37, 1e-9},
		{"J at the end, Hz", last.Model.Axes[0].Tunnelling, 466.997, 1e-5},
		{"U at the end, Hz", last.Model.Interaction, -983.7, 2e-4},
		{"U/J at the end", last.Model.Interaction / last.Model.Axes[0].Tunnelling, -2.1064, 2e-4},
		{"trap x at the end, Hz", last.Trap[0], -43, 0.001},
		{"trap y at the end, Hz", last.Trap[1], -43, 0.001},
		{"tilt per site, Hz", last.Model.Axes[2].Tilt, 352.70, 1e-4},
	})
}

// TestSkerryPlans checks what the notes of the demo plans say, against the closed
// formulas for beams and lattice evaluated by hand with the exact d eps/ds.
func TestSkerryPlans(t *testing.T) {
	read := func(name string) *Plan {
		data, err := assets.Plan(name)
		if err != nil {
			t.Fatal(err)
		}
		return mustParse(t, string(data))
	}
	demo, trapped, shallow := read("skerry-demo"), read("skerry-trapped"), read("skerry-shallow")
	start, last := end(t, demo, -1), end(t, demo, len(demo.Stages)-1)
	warm := end(t, trapped, len(trapped.Stages)-1)
	low := end(t, shallow, len(shallow.Stages)-1)
	checkRows(t, []row{
		{"demo: trap x before loading, Hz", start.Trap[0], 59.527, 1e-3},
		{"demo: trap z before loading, Hz", start.Trap[2], 168.366, 1e-3},
		{"demo: trap x at the end, Hz", last.Trap[0], -34.624, 1e-3},
		{"demo: trap y at the end, Hz", last.Trap[1], -34.624, 1e-3},
		{"demo: a at the end, a0", last.ScatteringLength / si.BohrRadius, -29 * 150.5 / 202.5, 1e-12},
		{"trapped: trap x at the end, Hz", warm.Trap[0], 14.783, 1e-3},
		{"trapped: trap y at the end, Hz", warm.Trap[1], -34.623, 1e-3},
		{"shallow: trap x at the end, Hz", low.Trap[0], -30.752, 1e-3},
	})
	widths := (low.Bands[0].Width*low.Recoil[0] + low.Bands[1].Width*low.Recoil[1])
	if low.Gap[0] > widths {
		t.Errorf("shallow: the gap of %g Hz exceeds the widths of %g Hz", low.Gap[0], widths)
	}
}

// TestShippedPathsAvoidPoles follows the field of every good plan of an apparatus.
func TestShippedPathsAvoidPoles(t *testing.T) {
	for name, data := range shippedPlans(t) {
		p := mustParse(t, string(data))
		if p.Kind() != ApparatusKind {
			continue
		}
		a, err := p.Apparatus()
		if err != nil {
			t.Fatal(err)
		}
		s, err := p.Sequence()
		if err != nil {
			t.Fatal(err)
		}
		zeros := 0
		for i, met := range s.Crossings(a.Scattering) {
			for _, c := range met {
				if c.Kind == atom.Pole {
					t.Errorf("%s crosses the pole at %g G in stage %d", name, c.Field/si.Gauss, i)
				}
				zeros++
			}
		}
		if zeros != 1 {
			t.Errorf("%s crosses %d zeros, want the one of the flip", name, zeros)
		}
	}
}
