package report

import (
	"context"
	"math"

	"hilltop/bosehubbard/apparatus"
	"hilltop/bosehubbard/ceiling"
	"hilltop/bosehubbard/plan"
)

// Variation judges the end of a plan with another interaction and curvature and
// everything else as it is. The edge of the beams is left out, since no beams
// belong to the values.
type Variation struct {
	InteractionHz float64 // of the plan
	CurvatureHz   float64 // of the plan: V of the first axis that moves, per site squared
	system        *ceiling.System
	perTrap       float64 // V over f|f| of that axis, for an apparatus
}

// Vary prepares the variations of a plan.
//
// It returns the errors of Judge.
func (j *Judge) Vary(ctx context.Context, p *plan.Plan) (*Variation, error) {
	if _, err := j.Judge(ctx, p); err != nil {
		return nil, err
	}
	v := &Variation{}
	if p.Model != nil {
		v.system = endOfModel(p)
	} else {
		system, err := j.endOfApparatus(p)
		if err != nil {
			return nil, err
		}
		v.system = system
	}
	v.InteractionHz = v.system.Interaction
	for i, m := range v.system.Motions() {
		if m == ceiling.Moving {
			a := v.system.Axes[i]
			v.CurvatureHz = a.Curvature
			if a.Trap != 0 {
				v.perTrap = a.Curvature / (a.Trap * math.Abs(a.Trap))
			}
			break
		}
	}
	return v, nil
}

// Verdict judges U and V in Hz; V is put on every axis that moves.
func (v *Variation) Verdict(interaction, curvature float64) (string, error) {
	s := *v.system
	s.Interaction, s.HasInteraction, s.EdgeDrop = interaction, true, nil
	s.Axes = append([]ceiling.Axis(nil), v.system.Axes...)
	for i, m := range v.system.Motions() {
		if m != ceiling.Moving {
			continue
		}
		s.Axes[i].Curvature = curvature
		if v.perTrap != 0 {
			square := curvature / v.perTrap
			s.Axes[i].Trap = math.Copysign(math.Sqrt(math.Abs(square)), square)
		} else {
			s.Axes[i].Trap = curvature // its sign is all that counts
		}
	}
	a, err := ceiling.Assess(&s)
	if err != nil {
		return "", err
	}
	return string(a.Verdict), nil
}

// endOfApparatus is the system at the end of the last stage.
func (j *Judge) endOfApparatus(p *plan.Plan) (*ceiling.System, error) {
	b, err := newBench(p, j.workspace)
	if err != nil {
		return nil, err
	}
	var end apparatus.Point
	if err := b.apparatus.At(b.workspace, &end, b.sequence.End()); err != nil {
		return nil, err
	}
	b.setHold(&end)
	return b.system(&end), nil
}

// endOfModel is the same for a model.
func endOfModel(p *plan.Plan) *ceiling.System {
	end := startOf(p.Model)
	for _, s := range p.Stages {
		end = after(end, s)
	}
	hold, _ := modelHold(p, end)
	return modelSystem(p.Model, end, signOf(p), hold)
}
