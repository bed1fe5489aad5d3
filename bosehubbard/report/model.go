package report

import (
	"context"
	"fmt"
	"math"

	"hilltop/bosehubbard"
	"hilltop/bosehubbard/aim"
	"hilltop/bosehubbard/ceiling"
	"hilltop/bosehubbard/plan"
)

// judgeModel judges a plan that gives J, U, V directly. The verdict is for a
// system without end; the exact ticks are for the sites given and smaller ones.
func judgeModel(ctx context.Context, p *plan.Plan) (*Report, error) {
	sign := signOf(p)
	r := &Report{Title: p.Title, AimSign: aimWord(sign), Stages: []Stage{}}
	end := startOf(p.Model)
	r.Start = modelStage("start", 0, end)
	time := 0.0
	for _, s := range p.Stages {
		end = after(end, s)
		time += s.DurationMS
		r.Stages = append(r.Stages, *modelStage(s.Name, time, end))
	}
	hold, held := modelHold(p, end)
	if !held {
		r.Cautions = append(r.Cautions, holdCaution(hold))
	}
	r.HoldMS = hold * 1e3
	system := modelSystem(p.Model, end, sign, hold)
	assessment, err := ceiling.Assess(system)
	if err != nil {
		return nil, err
	}
	r.fill(assessment)
	if err := adviseModel(ctx, r, p, system, assessment); err != nil {
		return nil, err
	}
	if r.Ceiling.Exact, err = grow(ctx, p.Model, end); err != nil {
		return nil, err
	}
	r.stillCaution(assessment)
	r.planCautions(p)
	for i, periodic := range p.Model.Periodic {
		if periodic && end.Axes[i].Curvature != 0 {
			r.caution("ring_trap", "Along %s the model is periodic and has a trap: the potential jumps where the ring closes.", "xyz"[i:i+1])
		}
	}
	r.caution("model", "A model plan: the verdict is for a system without end at this filling; beams, loss and higher bands are not in it.")
	r.Sentence = r.sentence()
	return r, nil
}

// modelHold returns the trailing hold in s, or the assumed one, for the model at
// the end.
func modelHold(p *plan.Plan, end bosehubbard.Model) (hold float64, held bool) {
	for i := len(p.Stages) - 1; i >= 0 && p.Stages[i].Shape == plan.Hold; i-- {
		hold, held = hold+p.Stages[i].DurationMS*1e-3, true
	}
	if held {
		return hold, true
	}
	largest := 0.0
	for _, a := range end.Axes {
		largest = math.Max(largest, math.Abs(a.Tunnelling))
	}
	return assumedHold(largest), false
}

func startOf(m *plan.Model) bosehubbard.Model {
	out := bosehubbard.Model{Interaction: m.InteractionHz}
	for i := range m.Sites {
		terms := bosehubbard.AxisTerms{Tunnelling: m.TunnellingHz.At(i)}
		if m.CurvatureHz != nil {
			terms.Curvature = m.CurvatureHz[i]
		}
		out.Axes = append(out.Axes, terms)
	}
	return out
}

// after returns the model at the end of a stage.
func after(m bosehubbard.Model, s plan.Stage) bosehubbard.Model {
	out := bosehubbard.Model{Interaction: m.Interaction, Axes: append([]bosehubbard.AxisTerms(nil), m.Axes...)}
	if s.InteractionHz != nil {
		out.Interaction = *s.InteractionHz
	}
	for i := range out.Axes {
		if s.TunnellingHz != nil {
			out.Axes[i].Tunnelling = s.TunnellingHz.At(i)
		}
		if s.CurvatureHz != nil {
			out.Axes[i].Curvature = s.CurvatureHz[i]
		}
	}
	return out
}

func modelStage(name string, endMS float64, m bosehubbard.Model) *Stage {
	s := &Stage{Name: name, EndMS: endMS}
	largest := 0.0
	for _, a := range m.Axes {
		s.TunnellingHz = append(s.TunnellingHz, a.Tunnelling)
		s.CurvatureHz = append(s.CurvatureHz, a.Curvature)
		largest = math.Max(largest, math.Abs(a.Tunnelling))
	}
	s.scale(largest, true, m.Interaction)
	return s
}

func modelSystem(m *plan.Model, at bosehubbard.Model, sign ceiling.Sign, hold float64) *ceiling.System {
	s := &ceiling.System{
		Sign: sign, Interaction: at.Interaction, HasInteraction: true, Hold: hold,
		Box: &ceiling.Box{Sites: m.Sites, Atoms: m.Atoms, Fock: m.Fock},
	}
	for i, a := range at.Axes {
		j := 2 * math.Abs(a.Tunnelling)
		s.Axes = append(s.Axes, ceiling.Axis{
			Name: "xyz"[i : i+1], Tunnelling: a.Tunnelling, Band: ceiling.Interval{Floor: -j, Ceiling: j},
			Gap: math.Inf(1), Curvature: a.Curvature,
		})
	}
	return s
}

func adviseModel(ctx context.Context, r *Report, p *plan.Plan, s *ceiling.System, now *ceiling.Assessment) error {
	problem := modelProblem(p, s)
	for i := range r.Ceiling.Criteria {
		c := &r.Ceiling.Criteria[i]
		switch {
		case c.Passed:
			continue
		case c.Name == "energy":
			c.Advice = adviseEnergy(p, s)
			continue
		}
		found, err := problem.Advise(ctx, c.Name, now)
		if err != nil {
			return err
		}
		if found != nil {
			c.Advice = adviceOf(p, found)
		}
	}
	return nil
}

func modelProblem(p *plan.Plan, s *ceiling.System) *aim.Problem {
	far := math.Inf(1)
	out := &aim.Problem{Sign: s.Sign}
	out.Knobs = append(out.Knobs, aim.Knob{Name: "interaction_hz", Kind: aim.Interaction, Value: s.Interaction, Low: -far, High: far})
	for i, a := range s.Axes {
		out.Knobs = append(out.Knobs, aim.Knob{
			Name: fmt.Sprintf("curvature_hz/%d", i), Kind: aim.Curvature, Axis: i, Value: a.Curvature, Low: -far, High: far,
		})
	}
	for i := range out.Knobs {
		limit(p, &out.Knobs[i])
	}
	out.Evaluate = func(values []float64) (*ceiling.Assessment, error) {
		changed := *s
		changed.Interaction = values[0]
		changed.Axes = append([]ceiling.Axis(nil), s.Axes...)
		for i := range changed.Axes {
			changed.Axes[i].Curvature = values[1+i]
		}
		return ceiling.Assess(&changed)
	}
	return out
}

// adviseEnergy offers the changes that bring a number state to the wanted side of
// infinite temperature: the most even filling, the other sign of U, or both.
func adviseEnergy(p *plan.Plan, s *ceiling.System) *Advice {
	even := evenFilling(len(s.Box.Fock), s.Box.Atoms)
	filled := Set{Path: "/model/fock", Value: even}
	flipped := Set{Path: settingPath(p, "interaction_hz"), Value: -s.Interaction}
	flip := step(aim.Move{Knob: aim.Knob{Kind: aim.Interaction}, To: -s.Interaction})
	for _, way := range []struct {
		text        string
		fock        []int
		interaction float64
		set         []Set
	}{
		{"Start from evenly filled sites", even, s.Interaction, []Set{filled}},
		{flip, s.Box.Fock, -s.Interaction, []Set{flipped}},
		{flip + ", start from evenly filled sites", even, -s.Interaction, []Set{flipped, filled}},
	} {
		changed, box := *s, *s.Box
		box.Fock, changed.Box, changed.Interaction = way.fock, &box, way.interaction
		after, err := ceiling.Assess(&changed)
		if err != nil {
			return nil
		}
		if c, ok := after.Criterion("energy"); ok && c.Passed {
			found := &aim.Advice{Verdict: after.Verdict, Broken: after.Broken()}
			return &Advice{Text: way.text + outcome(found), Set: way.set}
		}
	}
	return nil
}

// evenFilling spreads atoms over sites as evenly as whole numbers allow.
func evenFilling(sites, atoms int) []int {
	even := make([]int, sites)
	for i := range even {
		even[i] = atoms / sites
		if i < atoms%sites {
			even[i]++
		}
	}
	return even
}
