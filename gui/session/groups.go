package session

import (
	"fmt"
	"strconv"

	"hilltop/bosehubbard/atom"
	"hilltop/bosehubbard/plan"
)

// Names of the groups, in the order they are shown.
const (
	stageGroup   = "Stage"
	cloudGroup   = "Cloud"
	latticeGroup = "Lattice"
	beamsGroup   = "Beams"
	fieldGroup   = "Field"
	modelGroup   = "Model"
	levelsGroup  = "Levels"
	planGroup    = "Plan"
)

func planEntries(p *plan.Plan) []entry {
	return []entry{
		longEntry("Title", "/title", p.Title),
		choiceEntry("Wanted sign of T", "/aim_sign", p.AimSign, plan.Negative, plan.Positive),
		longEntry("Note", "/note", p.Note),
	}
}

func stageEntries(p *plan.Plan, stage int) []entry {
	if stage < 0 {
		return nil
	}
	path, s := "/stages/"+strconv.Itoa(stage), p.Stages[stage]
	return []entry{
		textEntry("Name", path+"/name", s.Name),
		numberEntry("Duration", path+"/duration_ms", s.DurationMS, Measure{Dimension: Duration, Unit: "ms"}),
		choiceEntry("Shape", path+"/shape", s.Shape, plan.Hold, plan.Linear, plan.Exponential, plan.Smooth),
	}
}

func cloudEntries(p *plan.Plan, states []string) []entry {
	if p.Cloud == nil {
		return nil
	}
	return []entry{
		choiceEntry("Species", "/cloud/species", p.Cloud.Species, atom.Names()...),
		stateEntry(p.Cloud, states),
		numberEntry("Atoms", "/cloud/atoms", p.Cloud.Atoms, Measure{Dimension: Number, Whole: true}),
		numberEntry("Entropy per atom", "/cloud/entropy_per_atom_kb", p.Cloud.EntropyPerAtomKB, Measure{Dimension: Entropy, Unit: "kB"}),
	}
}

// stateEntry offers the states of the species, or takes any text where it is not
// known.
func stateEntry(c *plan.Cloud, states []string) entry {
	if states == nil {
		return textEntry("State", "/cloud/state", c.State)
	}
	return choiceEntry("State", "/cloud/state", c.State, states...)
}

func latticeEntries(p *plan.Plan) []entry {
	if p.Lattice == nil {
		return nil
	}
	var out []entry
	for i, axis := range p.Lattice.Axes {
		path, name := "/lattice/axes/"+strconv.Itoa(i), " "+axis.Axis
		beam := []entry{numberEntry("Wavelength"+name, path+"/wavelength_nm", axis.WavelengthNM, Measure{Dimension: Length, Unit: "nm"})}
		beam = append(beam, waistEntries("Waist"+name, path, axis.Axis, axis.WaistUM)...)
		beam = append(beam, numberEntry("Return ratio"+name, path+"/return_ratio", axis.ReturnRatio, Measure{Dimension: Ratio}))
		out = append(out, under(latticePart(axis), name, beam...)...)
	}
	return out
}

func beamEntries(p *plan.Plan) []entry {
	var out []entry
	for i, beam := range p.Beams {
		path, name := "/beams/"+strconv.Itoa(i), fmt.Sprintf(" '%s'", beam.Name)
		fields := append([]entry{nameEntry(p, i),
			choiceEntry("Axis"+name, path+"/axis", beam.Axis, "x", "y", "z"),
			numberEntry("Wavelength"+name, path+"/wavelength_nm", beam.WavelengthNM, Measure{Dimension: Length, Unit: "nm"})},
			waistEntries("Waist"+name, path, beam.Axis, beam.WaistUM)...)
		out = append(out, under(beamPart(beam), name, fields...)...)
	}
	return out
}

// nameEntry renames a beam together with its powers and limits.
func nameEntry(p *plan.Plan, beam int) entry {
	old := p.Beams[beam].Name
	e := textEntry(fmt.Sprintf("Name '%s'", old), "/beams/"+strconv.Itoa(beam)+"/name", old)
	e.editsFor = func(value any) []plan.Edit {
		name, _ := value.(string)
		edits := []plan.Edit{{Path: e.SetPath, Value: value}}
		if name == old {
			return edits
		}
		move := func(power float64, from, to string) {
			edits = append(edits, plan.Edit{Path: to, Value: power}, plan.Edit{Path: from})
		}
		if p.Start != nil {
			move(p.Start.PowerW[old], plan.JoinPath("start", "power_w", old), plan.JoinPath("start", "power_w", name))
		}
		for i, stage := range p.Stages {
			if power, given := stage.PowerW[old]; given {
				number := strconv.Itoa(i)
				move(power, plan.JoinPath("stages", number, "power_w", old), plan.JoinPath("stages", number, "power_w", name))
			}
		}
		return edits
	}
	return e
}

// waistEntries returns the two waists of a beam. A round beam shows one number;
// setting the second makes it elliptic, clearing that makes it round again.
func waistEntries(label, path, axis string, w plan.OneOrMany) []entry {
	m := Measure{Dimension: Length, Unit: "um"}
	path += "/waist_um"
	across := [][2]string{{"y", "z"}, {"x", "z"}, {"x", "y"}}[axisIndex(axis)]
	first := numberEntry(label+" along "+across[0], path+"/0", w.At(0), m)
	second := numberEntry(label+" along "+across[1], path+"/1", w.At(1), m)
	if w.Single {
		first.Label = label
		first.Path, first.SetPath = path, path
		second.Path, second.Inherited, second.From = path, true, "round"
		return []entry{first, second}
	}
	second.Clearable = true
	second.clear = []plan.Edit{{Path: path, Value: w.At(0)}}
	return []entry{first, second}
}

func fieldEntries(p *plan.Plan) []entry {
	if p.Field == nil {
		return nil
	}
	out := []entry{
		choiceEntry("Field axis", "/field/axis", p.Field.Axis, "x", "y", "z"),
		numberEntry("Gradient", "/field/gradient_g_per_cm", p.Field.GradientGPerCM, Measure{Dimension: FieldGradient, Unit: "G/cm", Signed: true}),
		numberEntry("Curvature B″/B", "/field/curvature_per_cm2", p.Field.CurvaturePerCM2, Measure{Dimension: FieldCurvature, Unit: "1/cm²", Signed: true}),
		choiceEntry("Upward axis", "/gravity_axis", p.GravityAxis, "x", "y", "z", plan.NoGravity),
	}
	if p.Scattering == nil {
		return out
	}
	out = append(out, numberEntry("Background a", "/scattering/background_a0", p.Scattering.BackgroundA0, Measure{Dimension: ScatteringLength, Unit: "a0", Signed: true}))
	gauss := Measure{Dimension: FieldStrength, Unit: "G"}
	signedGauss := gauss
	signedGauss.Signed = true
	for i, r := range p.Scattering.Resonances {
		path, name := "/scattering/resonances/"+strconv.Itoa(i), resonancePart(i)
		out = append(out, under(name, name, numberEntry(name+" position", path+"/position_g", r.PositionG, gauss),
			numberEntry(name+" width", path+"/width_g", r.WidthG, signedGauss))...)
	}
	return out
}

func modelEntries(p *plan.Plan) []entry {
	if p.Model == nil {
		return nil
	}
	whole := Measure{Dimension: Number, Whole: true}
	var out []entry
	for i, n := range p.Model.Sites {
		name, number := "", strconv.Itoa(i)
		if len(p.Model.Sites) > 1 {
			name = " " + axisName(i)
		}
		axis := []entry{numberEntry("Sites"+name, "/model/sites/"+number, float64(n), whole),
			periodicEntry("Ends"+name, "/model/periodic/"+number, p.Model.Periodicity()[i])}
		if name != "" {
			axis = under(modelPart(i), name, axis...)
		}
		out = append(out, axis...)
	}
	return append(out, numberEntry("Atoms", "/model/atoms", float64(p.Model.Atoms), whole), fockEntry(p.Model))
}

// Words for an axis of a model.
const (
	openEnds   = "open"
	joinedEnds = "joined to a ring"
)

func periodicEntry(label, path string, periodic bool) entry {
	text := openEnds
	if periodic {
		text = joinedEnds
	}
	e := choiceEntry(label, path, text, openEnds, joinedEnds)
	check := e.encode
	e.encode = func(text string) (any, error) {
		if _, err := check(text); err != nil {
			return nil, err
		}
		return text == joinedEnds, nil
	}
	return e
}

func levelEntries(p *plan.Plan) []entry {
	if p.Levels == nil {
		return nil
	}
	l := p.Levels
	seconds := Measure{Dimension: Duration, Unit: "s"}
	out := make([]entry, 0, len(l.EnergiesHz)+4)
	for i, energy := range l.EnergiesHz {
		out = append(out, numberEntry(fmt.Sprintf("Level %d", i+1), "/levels/energies_hz/"+strconv.Itoa(i), energy, Measure{Dimension: Energy, Unit: "Hz", Signed: true}))
	}
	return append(out,
		numberEntry("Bodies", "/levels/bodies", l.Bodies, Measure{Dimension: Number}),
		numberEntry("Inner time", "/levels/inner_time_s", l.InnerTimeS, seconds),
		numberEntry("Outer time", "/levels/outer_time_s", l.OuterTimeS, seconds),
		numberEntry("Energy per body", "/levels/energy_hz_per_body", l.EnergyHzPerBody, Measure{Dimension: Energy, Unit: "Hz", Signed: true}))
}
