package session

import (
	"fmt"
	"slices"
	"strconv"
	"strings"

	"hilltop/bosehubbard/plan"
)

func beamPart(b plan.Beam) string { return fmt.Sprintf("Beam '%s'", b.Name) }

func beamParts(p *plan.Plan) []Part {
	parts := make([]Part, len(p.Beams))
	for i, b := range p.Beams {
		parts[i] = Part{beamPart(b), removal(beamList, i)}
	}
	return parts
}

func beamActions(p *plan.Plan) []Action {
	if p.Kind() != plan.ApparatusKind {
		return nil
	}
	return []Action{action(adds, beamList, "Add a beam")}
}

// addBeam adds a beam like the last one, without power: the plan means the same
// until it gets some.
func addBeam(p *plan.Plan) reshaping {
	beam := plan.Beam{WavelengthNM: 1064, Axis: "x", WaistUM: plan.OneOrMany{Values: []float64{100}, Single: true}}
	if n := len(p.Beams); n > 0 {
		beam = p.Beams[n-1]
	}
	beam.Name = freeBeam(p)
	number := strconv.Itoa(len(p.Beams))
	put := plan.Edit{Path: beamList + "/" + number, Value: beam}
	if len(p.Beams) == 0 {
		put = plan.Edit{Path: beamList, Value: []plan.Beam{beam}}
	}
	return reshaping{"add beam '" + beam.Name + "'", beamList + "/" + number + "/name",
		[]plan.Edit{put, {Path: plan.JoinPath("start", "power_w", beam.Name), Value: 0}}}
}

// freeBeam returns a name that no beam has.
func freeBeam(p *plan.Plan) string {
	for i := len(p.Beams) + 1; ; i++ {
		name := "beam " + strconv.Itoa(i)
		if !slices.ContainsFunc(p.Beams, func(b plan.Beam) bool { return b.Name == name }) {
			return name
		}
	}
}

// removeBeam takes a beam out, with its powers and what else names it.
func removeBeam(d *plan.Document, index int) reshaping {
	p := d.Plan()
	name := p.Beams[index].Name
	edits := []plan.Edit{{Path: beamList + "/" + strconv.Itoa(index)}}
	if _, given := p.Start.PowerW[name]; given {
		edits = append(edits, plan.Edit{Path: plan.JoinPath("start", "power_w", name)})
	}
	for i, stage := range p.Stages {
		edits = append(edits, withoutPower(i, stage, name)...)
	}
	for _, key := range referenceKeys(p) {
		if strings.HasSuffix(key.path, plan.JoinPath("power_w", name)) {
			edits = append(edits, plan.Edit{Path: plan.JoinPath(key.object, key.path)})
		}
	}
	return reshaping{"remove beam '" + name + "'", "", append(edits, withoutEntry(d, beamList, index)...)}
}

// withoutPower takes the power of a beam out of a stage. A stage that moved nothing
// else becomes a hold.
func withoutPower(i int, stage plan.Stage, beam string) []plan.Edit {
	if _, given := stage.PowerW[beam]; !given {
		return nil
	}
	number := strconv.Itoa(i)
	edits := []plan.Edit{{Path: plan.JoinPath("stages", number, "power_w", beam)}}
	if len(stage.PowerW) == 1 && stage.DepthEr == nil && stage.FieldG == nil && stage.Shape != plan.Hold {
		edits = append(edits, plan.Edit{Path: plan.JoinPath("stages", number, "shape"), Value: plan.Hold})
	}
	return edits
}
