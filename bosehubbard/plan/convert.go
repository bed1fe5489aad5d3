package plan

import (
	"errors"
	"fmt"
	"slices"

	"hilltop/bosehubbard/apparatus"
	"hilltop/bosehubbard/atom"
	"hilltop/bosehubbard/optics"
	"hilltop/bosehubbard/sequence"
	"hilltop/bosehubbard/si"
)

// The scaled units of the document in SI.
const (
	nanometre     = 1e-9
	micrometre    = 1e-6
	millisecond   = 1e-3
	gaussPerCM    = si.Gauss / 1e-2 // T/m
	perCentimetre = 1 / 1e-2        // 1/m
)

// Apparatus returns the apparatus of the plan in SI units, its lattice beams in
// the order x, y, z and its dipole beams in the order of the document.
//
// It returns Errors if the species or the state is unknown, if neither the plan
// nor the species file has a scattering length, if a wavelength lies on a D line,
// or if the plan is of another kind.
func (p *Plan) Apparatus() (*apparatus.Apparatus, error) {
	if err := p.mustBeApparatus(); err != nil {
		return nil, err
	}
	b := &bench{plan: p}
	b.atoms()
	if b.out.Species == nil {
		return nil, b.found
	}
	b.lattice()
	b.beams()
	b.out.Field = optics.MagneticField{
		Axis:              axisOf(p.Field.Axis),
		Gradient:          p.Field.GradientGPerCM * gaussPerCM,
		CurvaturePerField: p.Field.CurvaturePerCM2 * perCentimetre * perCentimetre,
	}
	if p.GravityAxis != NoGravity {
		b.out.GravityOn, b.out.Gravity = true, axisOf(p.GravityAxis)
	}
	if len(b.found) > 0 {
		return nil, b.found
	}
	return &b.out, nil
}

// mustBeApparatus refuses models, levels and plans that Parse would refuse.
func (p *Plan) mustBeApparatus() error {
	switch {
	case p.Kind() != ApparatusKind:
		return Errors{{Path: "/" + string(p.Kind()), Reason: "a plan of kind " + string(p.Kind()) + " has no apparatus"}}
	case p.Cloud == nil || p.Lattice == nil || p.Field == nil || p.Start == nil:
		return Errors{{Reason: "want a plan with cloud, lattice, field and start"}}
	}
	return nil
}

// bench turns the parts of a plan into SI and collects what cannot be.
type bench struct {
	mistakes
	plan *Plan
	out  apparatus.Apparatus
}

func (b *bench) fail(path, value string, err error) {
	e := &FieldError{Path: path, Value: value, Reason: err.Error()}
	if unknown, ok := errors.AsType[*atom.UnknownError](err); ok {
		e.Value = `"` + unknown.Name + `"`
		e.Reason = "want a known " + unknown.Kind + ": " + listed(unknown.Known)
		e.Nearest = alike(unknown.Name, unknown.Known)
	}
	b.add(e)
}

// atoms finds the species, the state and its scattering length.
func (b *bench) atoms() {
	cloud := b.plan.Cloud
	species, err := atom.Load(cloud.Species)
	if err != nil {
		b.fail("/cloud/species", cloud.Species, err)
		return
	}
	b.out.Species = species
	if b.out.State, err = species.State(cloud.State); err != nil {
		b.fail("/cloud/state", cloud.State, err)
		return
	}
	if s := b.plan.Scattering; s != nil {
		b.out.Scattering = s.curve()
		if err := b.out.Scattering.Validate(); err != nil {
			b.fail("/scattering", "", err)
		}
		return
	}
	if b.out.Scattering, err = b.out.State.Curve(); err != nil {
		b.fail("/scattering", "", fmt.Errorf("the key is missing, and the species file has no scattering length for %s %s; give your own calibration",
			species.Name, b.out.State.Name))
	}
}

func (s *Scattering) curve() atom.ScatteringCurve {
	curve := atom.ScatteringCurve{Background: s.BackgroundA0 * si.BohrRadius}
	for _, r := range s.Resonances {
		curve.Resonances = append(curve.Resonances, atom.Resonance{Position: r.PositionG * si.Gauss, Width: r.WidthG * si.Gauss})
	}
	return curve
}

func (b *bench) lattice() {
	for i, axis := range b.plan.Lattice.Axes {
		shift := b.lightShift("/lattice/axes/"+itoa(i)+"/wavelength_nm", axis.WavelengthNM)
		spacing := axis.WavelengthNM * nanometre / 2
		b.out.Lattice[axisOf(axis.Axis)] = optics.LatticeBeam{
			Axis: axisOf(axis.Axis), Wavelength: axis.WavelengthNM * nanometre, Waists: axis.WaistUM.waists(),
			ReturnRatio: axis.ReturnRatio, Shift: shift, Spacing: spacing,
			Recoil: si.JouleFromHz(si.RecoilHz(b.out.Species.Mass, spacing)),
		}
	}
}

func (b *bench) beams() {
	for i, beam := range b.plan.Beams {
		b.out.Beams = append(b.out.Beams, optics.DipoleBeam{
			Name: beam.Name, Axis: axisOf(beam.Axis), Wavelength: beam.WavelengthNM * nanometre, Waists: beam.WaistUM.waists(),
			Shift: b.lightShift("/beams/"+itoa(i)+"/wavelength_nm", beam.WavelengthNM),
		})
	}
}

func (b *bench) lightShift(path string, wavelengthNM float64) float64 {
	shift, err := optics.LightShift(b.out.Species, wavelengthNM*nanometre)
	if err != nil {
		b.fail(path, short(wavelengthNM), err)
	}
	return shift
}

func (v OneOrMany) waists() [2]float64 {
	return [2]float64{v.At(0) * micrometre, v.At(1) * micrometre}
}

// axisOf returns the axis of a name that Parse has checked.
func axisOf(name string) optics.Axis {
	return optics.Axis(max(0, slices.Index(axisNames, name)))
}

// Sequence returns the stages of the plan in SI units, with every knob resolved at
// the end of every stage; depths by axis, powers in the order of the beams.
//
// It returns Errors if the plan is of another kind.
func (p *Plan) Sequence() (*sequence.Sequence, error) {
	if err := p.mustBeApparatus(); err != nil {
		return nil, err
	}
	rows := p.Rows()
	s := &sequence.Sequence{Start: p.Settings(rows[0])}
	for _, row := range rows[1:] {
		s.Stages = append(s.Stages, sequence.Stage{
			Name: row.Name, Duration: row.DurationMS * millisecond, Shape: sequence.Shape(row.Shape), End: p.Settings(row),
		})
	}
	return s, nil
}

// Settings returns the knobs of a row of an apparatus plan in SI units: depths by
// axis, powers in the order of the beams.
func (p *Plan) Settings(row Row) apparatus.Settings {
	s := apparatus.Settings{Power: make([]float64, len(p.Beams)), Field: row.FieldG * si.Gauss}
	for i, axis := range p.Lattice.Axes {
		s.Depth[axisOf(axis.Axis)] = row.Value("depth_er/" + itoa(i))
	}
	for i, beam := range p.Beams {
		s.Power[i] = row.PowerW[beam.Name]
	}
	return s
}
