package report

import (
	"math"
	"strings"

	"hilltop/bosehubbard/apparatus"
	"hilltop/bosehubbard/atom"
	"hilltop/bosehubbard/ceiling"
	"hilltop/bosehubbard/num/digits"
	"hilltop/bosehubbard/plan"
	"hilltop/bosehubbard/si"
)

// localTiltCaution: layers are judged at the beam centre. Atoms that were loaded
// where gravity hung them feel the trap along the layered axis too, which changes
// the tilt by 2V per site.
func (b *bench) localTiltCaution(r *Report, end *apparatus.Point, a *ceiling.Assessment) {
	if !b.apparatus.GravityOn {
		return
	}
	axis := int(b.apparatus.Gravity)
	terms := end.Model.Axes[axis]
	if a.Motions[axis] != ceiling.Layered || b.sag == 0 {
		return
	}
	local := terms.Tilt - 2*terms.Curvature*b.sag/end.Spacing[axis]
	if math.Abs(local) < 4*math.Abs(terms.Tunnelling) || local*terms.Tilt < 0 || math.Abs(local) < 0.5*math.Abs(terms.Tilt) {
		r.caution("local_tilt", "The atoms are loaded %s µm below the centre; with the final trap along %v the tilt there is %s Hz per site, not the %s Hz that is judged.",
			digits.Format(b.sag*1e6, 3), b.apparatus.Gravity, digits.Format(local, 3), digits.Format(terms.Tilt, 4))
	}
}

// fieldStep is a usual noise of a bias field, 10 mG; common practice.
const fieldStep = 0.010 * si.Gauss

// fieldCaution says where a usual field noise changes a by more than a tenth.
func (b *bench) fieldCaution(r *Report, end *apparatus.Point) {
	slope, err := b.apparatus.Scattering.Slope(end.Field)
	if err != nil {
		return
	}
	change := math.Abs(slope) * fieldStep
	if change > 0.1*math.Abs(end.ScatteringLength) && change > 0.01*si.BohrRadius {
		r.caution("steep_field", "At %s G a field noise of 10 mG changes a = %s a0 by %s a0.",
			digits.Format(end.Field/si.Gauss, 7), digits.Format(end.ScatteringLength/si.BohrRadius, 3), digits.Format(change/si.BohrRadius, 2))
	}
}

// largestLatticePower is what one lattice beam of a usual laboratory has, W;
// common practice.
const largestLatticePower = 10

// lightCautions: light between or near the D lines, where the sign of the shift
// surprises and photons scatter, and lattice depths that no usual laser gives.
func (b *bench) lightCautions(r *Report) {
	for _, axis := range b.plan.Lattice.Axes {
		b.lineCaution(r, "lattice beam "+axis.Axis, axis.WavelengthNM)
	}
	for _, beam := range b.plan.Beams {
		b.lineCaution(r, "beam '"+beam.Name+"'", beam.WavelengthNM)
	}
	for _, s := range r.Stages {
		for k, power := range s.LatticePowerW {
			if power > largestLatticePower {
				r.caution("lattice_power", "At '%s' the depth along %s takes %s W in one pass.", s.Name, b.plan.Lattice.Axes[k].Axis, digits.Format(power, 3))
				return
			}
		}
	}
}

func (b *bench) lineCaution(r *Report, what string, wavelengthNM float64) {
	const near = 5 // nm
	d1, d2 := b.apparatus.Species.D1.Wavelength*1e9, b.apparatus.Species.D2.Wavelength*1e9
	switch {
	case wavelengthNM > d2 && wavelengthNM < d1:
		r.caution("near_line", "The %s at %s nm lies between the D lines (%s and %s nm): check the sign of its shift, and expect much scattering.",
			what, digits.Format(wavelengthNM, 6), digits.Format(d2, 6), digits.Format(d1, 6))
	case wavelengthNM > d2-near && wavelengthNM < d1+near:
		r.caution("near_line", "The %s at %s nm is within %d nm of a D line: expect much scattering.", what, digits.Format(wavelengthNM, 6), near)
	}
}

// flipCaution: the sign of a is best changed while nothing tunnels; a cloud that
// moves can collapse. The flip is the first stage that ends with the last sign.
func (b *bench) flipCaution(r *Report) {
	before := r.Start
	last := r.last()
	flip := -1
	for i := range r.Stages {
		if s := &r.Stages[i]; *s.ScatteringLengthA0*(*last.ScatteringLengthA0) > 0 && *before.ScatteringLengthA0*(*last.ScatteringLengthA0) <= 0 {
			flip = i
		}
		before = &r.Stages[i]
	}
	if flip < 0 {
		return
	}
	duration := b.sequence.Stages[flip].Duration
	start, end := b.sequence.Before(flip), b.sequence.Stages[flip].End
	var point apparatus.Point
	fastest := 0.0
	for _, settings := range []apparatus.Settings{start, end} {
		if err := b.apparatus.At(b.workspace, &point, settings); err == nil {
			fastest = math.Max(fastest, b.largestTunnelling(&point))
		}
	}
	if 2*math.Pi*fastest*duration > 1 {
		r.caution("flip_moves", "The sign of a changes in '%s' while atoms tunnel (J = %s Hz, %s ħ/J long): deepen the lattice first.",
			r.Stages[flip].Name, digits.Format(fastest, 3), digits.Format(2*math.Pi*fastest*duration, 2))
	}
}

// stillCaution: a verdict on a system in which nothing moves says little.
func (r *Report) stillCaution(a *ceiling.Assessment) {
	for _, m := range a.Motions {
		if m == ceiling.Moving {
			if end := r.last(); end.InteractionHz != nil && *end.InteractionHz == 0 {
				r.caution("no_collisions", "U is zero: nothing brings the atoms to equilibrium.")
			}
			return
		}
	}
	r.caution("stands_still", "No axis moves within the hold, so nothing comes to equilibrium: the verdict says only that the state stands.")
}

// planCautions names what the plan gives and nothing uses yet, and values beyond
// the limits it states.
func (r *Report) planCautions(p *plan.Plan) {
	var unused []string
	if len(p.Measured) > 0 {
		unused = append(unused, "measured")
	}
	if len(p.Uncertainty) > 0 {
		unused = append(unused, "uncertainty")
	}
	if len(p.Outputs) > 0 {
		unused = append(unused, "outputs")
	}
	if len(unused) > 0 {
		r.caution("not_used", "The plan gives %s; nothing uses it yet.", strings.Join(unused, " and "))
	}
	rows := p.Rows()
	for i, row := range rows {
		for _, knob := range p.Knobs() {
			r.limitCaution(p, row, knob)
			if i > 0 {
				r.slewCaution(p, rows[i-1], row, knob)
			}
		}
	}
}

// limitsOf lists what the plan says of a knob at a stage, or everywhere.
func limitsOf(p *plan.Plan, stage int, knob string) []plan.Limit {
	var list []plan.Limit
	for _, path := range []string{p.KnobPath(stage, knob), bareKnob(knob)} {
		if l, ok := p.Limits[path]; ok {
			list = append(list, l)
		}
	}
	return list
}

func (r *Report) limitCaution(p *plan.Plan, row plan.Row, knob string) {
	value := row.Value(knob)
	for _, l := range limitsOf(p, row.Stage, knob) {
		if l.Max != nil && value > *l.Max {
			r.caution("beyond_limits", "At '%s' %s is %s, above your limit %s.", row.Name, knob, digits.Format(value, 6), digits.Format(*l.Max, 6))
		}
		if l.Min != nil && value < *l.Min {
			r.caution("beyond_limits", "At '%s' %s is %s, below your limit %s.", row.Name, knob, digits.Format(value, 6), digits.Format(*l.Min, 6))
		}
	}
}

// steepest is the largest slope of each shape in units of change over duration.
var steepest = map[string]float64{plan.Linear: 1, plan.Exponential: 4 / (1 - math.Exp(-4)), plan.Smooth: 1.875}

func (r *Report) slewCaution(p *plan.Plan, before, row plan.Row, knob string) {
	rate := math.Abs(row.Value(knob)-before.Value(knob)) / row.DurationMS * steepest[row.Shape]
	for _, l := range limitsOf(p, row.Stage, knob) {
		if l.SlewPerMS != nil && rate > *l.SlewPerMS {
			r.caution("beyond_limits", "In '%s' %s changes by up to %s per ms, faster than your limit %s.",
				row.Name, knob, digits.Format(rate, 3), digits.Format(*l.SlewPerMS, 3))
		}
	}
}

// poleName is the word for a pole in crossings.
var poleName = atom.Pole.String()
