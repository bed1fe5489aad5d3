package plan

import (
	"maps"
	"slices"
	"strings"
)

// Row is the state of all knobs at the end of a stage, or before the first one.
type Row struct {
	Stage      int // index into Plan.Stages; -1 is the start
	Name       string
	DurationMS float64
	Shape      string

	DepthEr []float64          // in the order of lattice.axes
	PowerW  map[string]float64 // every beam
	FieldG  float64

	TunnellingHz  []float64 // per axis of the model
	InteractionHz float64
	CurvatureHz   []float64 // per site squared, per axis of the model

	Given map[string]bool // the knobs that this stage sets; at the start, all
}

// Rows returns the start and then every stage with the values in force at its
// end. It has length len(p.Stages)+1; the rows share nothing. A plan of levels
// has only an empty start.
func (p *Plan) Rows() []Row {
	row := p.startRow()
	rows := []Row{row}
	for i := range p.Stages {
		row = p.next(row, i)
		rows = append(rows, row)
	}
	return rows
}

func (p *Plan) startRow() Row {
	row := Row{Stage: -1, Name: "start", Shape: Hold, PowerW: map[string]float64{}, Given: map[string]bool{}}
	if p.Start != nil {
		row.DepthEr = slices.Clone(p.Start.DepthEr)
		row.FieldG = p.Start.FieldG
		for _, b := range p.Beams {
			row.PowerW[b.Name] = p.Start.PowerW[b.Name]
		}
	}
	if m := p.Model; m != nil {
		row.TunnellingHz = m.TunnellingHz.Expanded(len(m.Sites))
		row.InteractionHz = m.InteractionHz
		row.CurvatureHz = make([]float64, len(m.Sites))
		copy(row.CurvatureHz, m.CurvatureHz)
	}
	for _, knob := range p.Knobs() {
		row.Given[knob] = true
	}
	return row
}

// next returns the row after stage i, which starts from row.
func (p *Plan) next(row Row, i int) Row {
	s := &p.Stages[i]
	out := Row{Stage: i, Name: s.Name, DurationMS: s.DurationMS, Shape: s.Shape, Given: map[string]bool{},
		DepthEr: slices.Clone(row.DepthEr), PowerW: maps.Clone(row.PowerW), FieldG: row.FieldG,
		TunnellingHz: slices.Clone(row.TunnellingHz), InteractionHz: row.InteractionHz,
		CurvatureHz: slices.Clone(row.CurvatureHz)}
	copy(out.DepthEr, s.DepthEr)
	for name, w := range s.PowerW {
		if _, known := out.PowerW[name]; known {
			out.PowerW[name] = w
		}
	}
	if s.FieldG != nil {
		out.FieldG = *s.FieldG
	}
	if s.TunnellingHz != nil {
		out.TunnellingHz = s.TunnellingHz.Expanded(len(row.TunnellingHz))
	}
	if s.InteractionHz != nil {
		out.InteractionHz = *s.InteractionHz
	}
	copy(out.CurvatureHz, s.CurvatureHz)
	for _, knob := range p.Knobs() {
		if s.sets(knob) != "" {
			out.Given[knob] = true
		}
	}
	return out
}

// Knobs returns the names of all knobs of the plan, in a fixed order.
func (p *Plan) Knobs() []string {
	var knobs []string
	if p.Model != nil {
		for i := range p.Model.Sites {
			knobs = append(knobs, "tunnelling_hz/"+itoa(i))
		}
		knobs = append(knobs, "interaction_hz")
		for i := range p.Model.Sites {
			knobs = append(knobs, "curvature_hz/"+itoa(i))
		}
		return knobs
	}
	if p.Levels != nil || p.Lattice == nil {
		return nil
	}
	for i := range p.Lattice.Axes {
		knobs = append(knobs, "depth_er/"+itoa(i))
	}
	for _, b := range p.Beams {
		knobs = append(knobs, "power_w/"+b.Name)
	}
	return append(knobs, "field_g")
}

// Value returns the value of a knob in the unit of its name, 0 if the row has no
// such knob.
func (r Row) Value(knob string) float64 {
	key, which, _ := strings.Cut(knob, "/")
	entry := func(list []float64) float64 {
		if i, ok := listIndex(which); ok && i < len(list) {
			return list[i]
		}
		return 0
	}
	switch key {
	case "depth_er":
		return entry(r.DepthEr)
	case "power_w":
		return r.PowerW[which]
	case "field_g":
		return r.FieldG
	case "tunnelling_hz":
		return entry(r.TunnellingHz)
	case "interaction_hz":
		return r.InteractionHz
	case "curvature_hz":
		return entry(r.CurvatureHz)
	}
	return 0
}

// Source returns the path of the value of a knob that is in force at the end of a
// stage: in that stage, in an earlier one, or in /start or /model. Stage -1 is the
// start. It returns "" if the plan has no such knob or no such stage.
func (p *Plan) Source(stage int, knob string) string {
	if stage < -1 || stage >= len(p.Stages) || !slices.Contains(p.Knobs(), knob) {
		return ""
	}
	for i := stage; i >= 0; i-- {
		if key := p.Stages[i].sets(knob); key != "" {
			return "/stages/" + itoa(i) + key
		}
	}
	if p.Model == nil {
		return "/start" + knobPath(knob)
	}
	if strings.HasPrefix(knob, "tunnelling_hz/") && p.Model.TunnellingHz.Single {
		return "/model/tunnelling_hz"
	}
	return "/model" + knobPath(knob)
}

// KnobPath returns the path at which a knob is set in a stage, given already or
// not. Stage -1 is the start.
func (p *Plan) KnobPath(stage int, knob string) string {
	switch {
	case stage >= 0:
		return "/stages/" + itoa(stage) + knobPath(knob)
	case p.Model != nil:
		return "/model" + knobPath(knob)
	}
	return "/start" + knobPath(knob)
}

// knobPath returns the path of a knob below a stage.
func knobPath(knob string) string {
	key, which, deep := strings.Cut(knob, "/")
	if !deep {
		return "/" + key
	}
	return JoinPath(key, which)
}

// sets returns the path, below the stage, of the value that the stage gives to a
// knob, or "" if it gives none.
func (s *Stage) sets(knob string) string {
	key, which, _ := strings.Cut(knob, "/")
	given := false
	switch key {
	case "depth_er":
		given = s.DepthEr != nil
	case "power_w":
		_, given = s.PowerW[which]
	case "field_g":
		given = s.FieldG != nil
	case "tunnelling_hz":
		if given = s.TunnellingHz != nil; given && s.TunnellingHz.Single {
			return "/" + key
		}
	case "interaction_hz":
		given = s.InteractionHz != nil
	case "curvature_hz":
		given = s.CurvatureHz != nil
	}
	if !given {
		return ""
	}
	return knobPath(knob)
}

func sortedKeys[V any](m map[string]V) []string { return slices.Sorted(maps.Keys(m)) }
