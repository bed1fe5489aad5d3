package session

import (
	"fmt"
	"slices"
	"strconv"

	"hilltop/bosehubbard/atom"
	"hilltop/bosehubbard/plan"
	"hilltop/bosehubbard/si"
)

func resonancePart(i int) string { return fmt.Sprintf("Resonance %d", i+1) }

func resonanceParts(p *plan.Plan) []Part {
	if p.Scattering == nil {
		return nil
	}
	parts := make([]Part, len(p.Scattering.Resonances))
	for i := range parts {
		parts[i] = Part{resonancePart(i), removal(resonanceList, i)}
	}
	return parts
}

// scatteringActions let the plan bring its own scattering length, or take that of
// the species file where there is one; known are the states that have it.
func scatteringActions(p *plan.Plan, known []string) []Action {
	switch {
	case p.Kind() != plan.ApparatusKind:
		return nil
	case p.Scattering == nil:
		return []Action{action(adds, scatteringPath, "Give a(B) in the plan")}
	}
	list := []Action{action(adds, resonanceList, "Add a resonance")}
	if p.Cloud != nil && slices.Contains(known, p.Cloud.State) {
		list = append(list, action(removes, scatteringPath, "Take a(B) of the species file"))
	}
	return list
}

// backgroundA0 is what a plan begins with whose species file has no scattering
// length: the size of that of most alkali atoms.
const backgroundA0 = 100

// addScattering copies the scattering length of the species file into the plan.
func addScattering(p *plan.Plan) reshaping {
	own := plan.Scattering{BackgroundA0: backgroundA0, Resonances: []plan.Resonance{}}
	if curve, ok := speciesCurve(p); ok {
		own.BackgroundA0 = written(curve.Background / si.BohrRadius)
		for _, r := range curve.Resonances {
			own.Resonances = append(own.Resonances, plan.Resonance{PositionG: written(r.Position / si.Gauss), WidthG: written(r.Width / si.Gauss)})
		}
	}
	return reshaping{"scattering length in the plan", scatteringPath + "/background_a0", []plan.Edit{{Path: scatteringPath, Value: own}}}
}

func speciesCurve(p *plan.Plan) (atom.ScatteringCurve, bool) {
	if p.Cloud == nil {
		return atom.ScatteringCurve{}, false
	}
	species, err := atom.Load(p.Cloud.Species)
	if err != nil {
		return atom.ScatteringCurve{}, false
	}
	state, err := species.State(p.Cloud.State)
	if err != nil || state.Scattering == nil {
		return atom.ScatteringCurve{}, false
	}
	return *state.Scattering, true
}

// written drops the digits that a change of units has made up.
func written(x float64) float64 {
	const digits = 12
	short, _ := strconv.ParseFloat(strconv.FormatFloat(x, 'g', digits, 64), 64)
	return short
}

// addResonance adds a narrow resonance above all fields of the plan, where it
// changes nothing much.
func addResonance(p *plan.Plan) reshaping {
	const room, width = 100, 0.1 // G
	highest := 0.0
	for _, row := range p.Rows() {
		highest = max(highest, row.FieldG)
	}
	for _, r := range p.Scattering.Resonances {
		highest = max(highest, r.PositionG, r.PositionG+r.WidthG)
	}
	n := len(p.Scattering.Resonances)
	number := strconv.Itoa(n)
	return reshaping{fmt.Sprintf("add resonance %d", n+1), resonanceList + "/" + number + "/position_g",
		[]plan.Edit{{Path: resonanceList + "/" + number, Value: plan.Resonance{PositionG: highest + room, WidthG: width}}}}
}

func removeResonance(d *plan.Document, index int) reshaping {
	edits := append([]plan.Edit{{Path: resonanceList + "/" + strconv.Itoa(index)}}, withoutEntry(d, resonanceList, index)...)
	return reshaping{fmt.Sprintf("remove resonance %d", index+1), "", edits}
}
