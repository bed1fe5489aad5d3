package session

import (
	"fmt"
	"math"
	"strconv"
	"strings"

	"hilltop/bosehubbard/plan"
)

// knobs returns the entries of all knobs as they stand at the end of a stage; recoil
// holds the recoil energy of every lattice axis in Hz, or nothing.
func knobs(p *plan.Plan, stage int, recoil []float64) []entry {
	k := knobReader{plan: p, stage: stage, rows: p.Rows(), recoil: recoil}
	names := p.Knobs()
	out := make([]entry, len(names))
	for i, name := range names {
		out[i] = k.entry(name)
	}
	return out
}

type knobReader struct {
	plan   *plan.Plan
	stage  int
	rows   []plan.Row // the start first
	recoil []float64  // by lattice axis
}

func (k *knobReader) entry(name string) entry {
	p := k.plan
	e := entry{Field: Field{ID: name, Kind: NumberField, Slider: true}}
	e.Label, e.measure = k.describe(name)
	e.Short = e.Label
	e.Unit = e.measure.Unit
	e.value = k.rows[k.stage+1].Value(name)
	e.Word = word(name, e.value)
	e.Path = p.Source(k.stage, name)
	e.sets = k.settingStage(name)
	e.SetPath = k.setPath(e.sets, name)
	giver := k.giver(name)
	e.Inherited = giver != k.stage
	if e.Inherited {
		e.From = k.rows[giver+1].Name
	}
	if e.sets != k.stage {
		e.SetsIn = k.rows[e.sets+1].Name
	}
	e.Clearable = !e.Inherited && k.stage != StartStage
	if e.Clearable {
		e.clear = []plan.Edit{{Path: p.KnobPath(k.stage, name)}}
		if strings.HasPrefix(name, "tunnelling_hz/") && p.Stages[k.stage].TunnellingHz.Single {
			e.clear[0].Path = e.Path
		}
	}
	e.low, e.top = k.slider(name)
	followers := k.followers(name, e.sets)
	path := e.SetPath
	e.editsFor = func(value any) []plan.Edit {
		return append([]plan.Edit{{Path: path, Value: value}}, followers...)
	}
	if e.sets == StartStage {
		e.Slider = e.top > e.low
	}
	return e
}

// setPath is where a stage sets a knob. A tunnelling that is one number stays one
// while there is one axis.
func (k *knobReader) setPath(stage int, name string) string {
	path := k.plan.KnobPath(stage, name)
	if m := k.plan.Model; m != nil && len(m.Sites) == 1 && strings.HasPrefix(name, "tunnelling_hz/") {
		if stage != StartStage && k.plan.Stages[stage].TunnellingHz == nil || m.TunnellingHz.Single && stage == StartStage {
			return strings.TrimSuffix(path, "/0")
		}
		if stage != StartStage && k.plan.Stages[stage].TunnellingHz.Single {
			return strings.TrimSuffix(path, "/0")
		}
	}
	return path
}

// given reports whether a stage that moves knobs sets this one.
func (k *knobReader) given(stage int, name string) bool { return k.rows[stage+1].Given[name] }

// giver is the stage whose value is in force; holds only repeat it.
func (k *knobReader) giver(name string) int {
	for i := k.stage; i >= 0; i-- {
		if k.given(i, name) && (k.rows[i+1].Shape != plan.Hold || i == k.stage) {
			return i
		}
	}
	return StartStage
}

// settingStage is the stage in which an edit takes effect: the selected one, or,
// because a hold moves no knob, the one that gives the value, or else the last
// one before it that moves.
func (k *knobReader) settingStage(name string) int {
	if k.stage == StartStage || k.rows[k.stage+1].Shape != plan.Hold {
		return k.stage
	}
	moving := StartStage
	for i := k.stage; i >= 0; i-- {
		if k.rows[i+1].Shape == plan.Hold {
			continue
		}
		if k.given(i, name) {
			return i
		}
		moving = max(moving, i)
	}
	return moving
}

// followers removes the value from the holds that repeat it after a stage: they
// would stand in the way of its change.
func (k *knobReader) followers(name string, stage int) []plan.Edit {
	var edits []plan.Edit
	for i := stage + 1; i < len(k.plan.Stages); i++ {
		switch {
		case k.rows[i+1].Shape != plan.Hold && k.given(i, name):
			return edits
		case k.rows[i+1].Shape == plan.Hold && k.given(i, name):
			path := k.plan.KnobPath(i, name)
			if source := k.plan.Source(i, name); strings.HasPrefix(path, source) {
				path = source
			}
			edits = append(edits, plan.Edit{Path: path})
		}
	}
	return edits
}

// describe returns the label and the measure of a knob.
func (k *knobReader) describe(name string) (string, Measure) {
	key, which, _ := strings.Cut(name, "/")
	index, _ := strconv.Atoi(which)
	switch key {
	case "depth_er":
		m := Measure{Dimension: Depth, Unit: "Er"}
		if index < len(k.recoil) {
			m.RecoilHz = k.recoil[index]
		}
		return "Depth " + k.plan.Lattice.Axes[index].Axis, m
	case "power_w":
		return fmt.Sprintf("Power '%s'", which), Measure{Dimension: Power, Unit: "W"}
	case "field_g":
		return "Bias field", Measure{Dimension: FieldStrength, Unit: "G"}
	case "tunnelling_hz":
		return "Tunnelling J" + k.modelAxis(index), Measure{Dimension: Energy, Unit: "Hz", Signed: true}
	case "interaction_hz":
		return "Interaction U", Measure{Dimension: Energy, Unit: "Hz", Signed: true}
	}
	return "Curvature V" + k.modelAxis(index), Measure{Dimension: Energy, Unit: "Hz", Signed: true}
}

// modelAxis names an axis of a model where it has more than one.
func (k *knobReader) modelAxis(index int) string {
	if len(k.plan.Model.Sites) == 1 {
		return ""
	}
	return " " + axisName(index)
}

func axisName(i int) string { return string("xyz"[i%3]) }

// word says a sign in a word.
func word(knob string, value float64) string {
	key, _, _ := strings.Cut(knob, "/")
	words := map[string][2]string{
		"interaction_hz": {"attractive", "repulsive"},
		"curvature_hz":   {"anti-trapping", "trapping"},
		"tunnelling_hz":  {"sign reversed", ""},
	}[key]
	switch {
	case value < 0:
		return words[0]
	case value > 0:
		return words[1]
	}
	return ""
}

// slider returns the ends of a knob's slider: room around every value the plan
// gives it, within what the lab can set.
func (k *knobReader) slider(name string) (low, top float64) {
	least, most := math.Inf(1), math.Inf(-1)
	for _, row := range k.rows {
		least, most = min(least, row.Value(name)), max(most, row.Value(name))
	}
	size := max(math.Abs(least), math.Abs(most))
	switch key, _, _ := strings.Cut(name, "/"); key {
	case "depth_er":
		low, top = 0, max(40, roundUp(1.25*most))
	case "power_w":
		low, top = 0, roundUp(1.5*most)
		if most == 0 {
			top = 1
		}
	case "field_g":
		room := max(0.25*(most-least), 20)
		low, top = max(0, math.Floor(least-room)), math.Ceil(most+room)
	default:
		if top = roundUp(2 * size); size == 0 {
			top = 1
		}
		low = -top
	}
	return k.limited(name, low, top)
}

// limited narrows a range to the limits of the plan.
func (k *knobReader) limited(name string, low, top float64) (float64, float64) {
	for _, path := range []string{k.plan.KnobPath(k.stage, name), k.plan.KnobPath(StartStage, name), "/" + name} {
		limit := k.plan.Limits[path]
		if limit.Min != nil {
			low = max(low, *limit.Min)
		}
		if limit.Max != nil {
			top = min(top, *limit.Max)
		}
	}
	return low, max(low, top)
}

// roundUp returns the smallest number of two digits that is not below x.
func roundUp(x float64) float64 {
	if !(x > 0) || math.IsInf(x, 1) {
		return 0
	}
	unit := math.Pow(10, math.Floor(math.Log10(x))-1)
	return math.Ceil(x/unit*(1-1e-12)) * unit
}
