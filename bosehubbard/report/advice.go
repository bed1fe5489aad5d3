package report

import (
	"context"
	"fmt"
	"math"
	"sort"
	"strconv"
	"strings"

	"hilltop/bosehubbard/aim"
	"hilltop/bosehubbard/apparatus"
	"hilltop/bosehubbard/atom"
	"hilltop/bosehubbard/ceiling"
	"hilltop/bosehubbard/num/digits"
	"hilltop/bosehubbard/optics"
	"hilltop/bosehubbard/plan"
	"hilltop/bosehubbard/si"
)

// advise asks for every broken criterion which knob mends it.
func (b *bench) advise(ctx context.Context, r *Report, end *apparatus.Point, now *ceiling.Assessment) error {
	if len(now.Broken()) == 0 {
		return nil
	}
	problem := b.problem(end)
	for i := range r.Ceiling.Criteria {
		c := &r.Ceiling.Criteria[i]
		if c.Passed {
			continue
		}
		found, err := problem.Advise(ctx, c.Name, now)
		if err != nil {
			return err
		}
		if found != nil {
			c.Advice = adviceOf(b.plan, found)
		}
	}
	return nil
}

// problem hands the knobs at the end of the last stage to aim, in plan units.
func (b *bench) problem(end *apparatus.Point) *aim.Problem {
	p := &aim.Problem{Sign: b.sign}
	for i, beam := range b.apparatus.Beams {
		p.Knobs = append(p.Knobs, aim.Knob{
			Name: "power_w/" + beam.Name, Kind: aim.Power, Value: end.Power[i],
			High: math.Max(2, 5*end.Power[i]),
		})
	}
	for k, axis := range b.order {
		p.Knobs = append(p.Knobs, aim.Knob{
			Name: fmt.Sprintf("depth_er/%d", k), Kind: aim.Depth, Axis: axis, Value: end.Depth[axis],
			High: math.Max(60, end.Depth[axis]),
		})
	}
	p.Knobs = append(p.Knobs, aim.Knob{
		Name: "field_g", Kind: aim.Field, Value: end.Field / si.Gauss, High: b.highestField() / si.Gauss,
	})
	for i := range p.Knobs {
		limit(b.plan, &p.Knobs[i])
	}
	p.Evaluate = b.evaluator(end)
	p.FieldsFor = b.fieldsFor(end)
	return p
}

// limit narrows a knob's range to what the plan says the lab can set.
func limit(p *plan.Plan, k *aim.Knob) {
	for _, path := range []string{settingPath(p, k.Name), p.KnobPath(-1, k.Name), bareKnob(k.Name)} {
		given, ok := p.Limits[path]
		if !ok {
			continue
		}
		if given.Min != nil {
			k.Low = math.Max(k.Low, *given.Min)
		}
		if given.Max != nil {
			k.High = math.Min(k.High, *given.Max)
		}
	}
}

// bareKnob is the path by which a plan speaks of a knob in every stage.
func bareKnob(name string) string {
	key, rest, nested := strings.Cut(name, "/")
	if !nested {
		return plan.JoinPath(key)
	}
	return plan.JoinPath(key, rest)
}

// highestField covers every resonance of the curve and the field in use, T.
func (b *bench) highestField() float64 {
	highest := 2 * math.Max(b.sequence.Start.Field, b.sequence.End().Field)
	for _, pole := range b.apparatus.Scattering.Poles() {
		highest = math.Max(highest, 1.2*pole)
	}
	return highest
}

// evaluator judges the last point with other knob values; the knobs come in the
// order of problem.
func (b *bench) evaluator(end *apparatus.Point) func([]float64) (*ceiling.Assessment, error) {
	settings := end.Settings.Clone()
	var point apparatus.Point
	return func(values []float64) (*ceiling.Assessment, error) {
		beams := len(settings.Power)
		copy(settings.Power, values)
		for k, axis := range b.order {
			settings.Depth[axis] = values[beams+k]
		}
		settings.Field = values[beams+len(b.order)] * si.Gauss
		if err := b.apparatus.At(b.workspace, &point, settings); err != nil {
			return nil, err
		}
		return ceiling.Assess(b.system(&point))
	}
}

// fieldsFor lists the fields, G, at which a is scale times its value now: those
// that no pole parts from the present one first, then the nearest.
func (b *bench) fieldsFor(end *apparatus.Point) func(float64) []float64 {
	return func(scale float64) []float64 {
		fields := b.apparatus.Scattering.Fields(scale*end.ScatteringLength, 0, b.highestField())
		poles := func(to float64) int {
			count := 0
			for _, c := range b.apparatus.Scattering.Crossings([]float64{end.Field, to}) {
				if c.Kind == atom.Pole {
					count++
				}
			}
			return count
		}
		sort.SliceStable(fields, func(i, j int) bool {
			if a, b := poles(fields[i]), poles(fields[j]); a != b {
				return a < b
			}
			return math.Abs(fields[i]-end.Field) < math.Abs(fields[j]-end.Field)
		})
		for i := range fields {
			fields[i] = math.Round(fields[i]/si.Gauss*100) / 100
		}
		return fields
	}
}

// settingPath is where the plan sets the last value of a knob: where it is given
// now, or, where that is the start and stages follow, the last stage that moves.
func settingPath(p *plan.Plan, knob string) string {
	last := len(p.Stages) - 1
	path := p.Source(last, knob)
	if strings.HasPrefix(path, "/stages/") {
		return path
	}
	for i := last; i >= 0; i-- {
		if p.Stages[i].Shape != plan.Hold {
			return p.KnobPath(i, knob)
		}
	}
	return path
}

// adviceOf puts moves into words and plan paths.
func adviceOf(p *plan.Plan, found *aim.Advice) *Advice {
	out := &Advice{}
	for _, m := range found.Moves {
		out.Set = setKnob(p, out.Set, m)
	}
	out.Text = steps(found.Moves) + outcome(found)
	return out
}

// setKnob adds a move to the values to set. An entry of a list that the plan does
// not have yet is set by giving the whole list.
func setKnob(p *plan.Plan, sets []Set, m aim.Move) []Set {
	path := settingPath(p, m.Knob.Name)
	key, entry, nested := strings.Cut(m.Knob.Name, "/")
	index, err := strconv.Atoi(entry)
	if !nested || err != nil || path == p.Source(len(p.Stages)-1, m.Knob.Name) {
		return append(sets, Set{Path: path, Value: m.To})
	}
	list := strings.TrimSuffix(path, "/"+entry)
	for i := range sets {
		if sets[i].Path == list {
			sets[i].Value.([]float64)[index] = m.To
			return sets
		}
	}
	rows := p.Rows()
	var values []float64
	for _, knob := range p.Knobs() {
		if strings.HasPrefix(knob, key+"/") {
			values = append(values, rows[len(rows)-1].Value(knob))
		}
	}
	values[index] = m.To
	return append(sets, Set{Path: list, Value: values})
}

// steps puts moves into words; depths that go to one value are named together.
func steps(moves []aim.Move) string {
	var words []string
	for i, m := range moves {
		if i > 0 && m.Knob.Kind == aim.Depth && moves[i-1].Knob.Kind == aim.Depth && m.To == moves[i-1].To {
			last := len(words) - 1
			words[last] = strings.Replace(words[last], " to ", fmt.Sprintf(", %v to ", optics.Axis(m.Knob.Axis)), 1)
			continue
		}
		words = append(words, step(m))
	}
	for i := 1; i < len(words); i++ {
		words[i] = strings.ToLower(words[i][:1]) + words[i][1:]
	}
	return strings.Join(words, " and ")
}

func outcome(found *aim.Advice) string {
	switch {
	case found.Verdict == ceiling.Sealed:
		return sealing
	case len(found.New) > 0:
		return fmt.Sprintf("; this mends it, but then breaks: %s.", criteriaWords(found.New))
	case len(found.Broken) > 0:
		return fmt.Sprintf("; still broken then: %s.", criteriaWords(found.Broken))
	}
	return "."
}

func criteriaWords(names []string) string {
	words := make([]string, len(names))
	for i, name := range names {
		words[i] = criterionWords[name]
	}
	return strings.Join(words, ", ")
}

// step is one move in words: "Lower 'sheet' to 31 mW".
func step(m aim.Move) string {
	verb := "Raise"
	if m.To < m.From {
		verb = "Lower"
	}
	switch m.Knob.Kind {
	case aim.Power:
		return fmt.Sprintf("%s '%s' to %s mW", verb, strings.TrimPrefix(m.Knob.Name, "power_w/"), digits.Format(m.To*1e3, 3))
	case aim.Depth:
		return fmt.Sprintf("%s depth %v to %s Er", verb, optics.Axis(m.Knob.Axis), digits.Format(m.To, 3))
	case aim.Field:
		return fmt.Sprintf("%s the field to %s G", verb, digits.Format(m.To, 6))
	case aim.Interaction:
		return fmt.Sprintf("Set U to %s Hz", digits.Signed(m.To, 4))
	}
	return fmt.Sprintf("Set V along %v to %s Hz per site²", optics.Axis(m.Knob.Axis), digits.Signed(m.To, 4))
}
