package session

import (
	"fmt"
	"strconv"
	"strings"
	"unicode/utf8"

	"hilltop/bosehubbard/plan"
	"hilltop/bosehubbard/report"
)

// sentenceLength is how many characters the verdict's sentence has at most.
const sentenceLength = 96

// verdict puts the present report into words. The caller holds mu.
func (s *Session) verdict() Verdict {
	r := s.work.report
	v := Verdict{Word: capital(r.Verdict), Aim: r.AimSign, Sentence: fitSentence(r.Sentence)}
	c := decisive(r)
	if c == nil {
		return v
	}
	v.Blocking = c.Name
	if c.Advice != nil {
		a := s.advice(c.Advice, s.work.advice.verdict)
		v.Advice = &a
	}
	return v
}

// decisive returns the criterion that makes the verdict what it is: the first
// broken one of the worst kind, with an advice if one of them has it. It returns
// nil for a sealed plan.
func decisive(r *report.Report) *report.Criterion {
	var first *report.Criterion
	for i := range r.Ceiling.Criteria {
		c := &r.Ceiling.Criteria[i]
		if c.Passed || c.Breaks != r.Verdict {
			continue
		}
		if first == nil {
			first = c
		}
		if c.Advice != nil {
			return c
		}
	}
	return first
}

// AdviceFor returns the advice of one criterion of the present report as a
// button, or false where it has none.
func (s *Session) AdviceFor(criterion string) (Advice, bool) {
	s.mu.Lock()
	defer s.mu.Unlock()
	if s.work.report == nil || s.doc == nil {
		return Advice{}, false
	}
	for _, c := range s.work.report.Ceiling.Criteria {
		if c.Name == criterion && c.Advice != nil {
			return s.advice(c.Advice, ""), true
		}
	}
	return Advice{}, false
}

// advice words a change as a button: knob, from, to, verdict. The caller holds mu.
func (s *Session) advice(a *report.Advice, verdict string) Advice {
	out := Advice{Verdict: verdict, Set: a.Set}
	steps := make([]adviceStep, len(a.Set))
	for i, set := range a.Set {
		steps[i] = s.step(set)
	}
	if len(steps) > 0 {
		out.Knob, out.From, out.To = knobAt(a.Set[0].Path), steps[0].from, steps[0].to
	}
	out.Text = joinSteps(steps)
	if verdict != "" {
		out.Text += ", " + verdict
	}
	return out
}

// adviceStep is one change in pieces: "Lower", "'sheet'", " at 'lower'", "45", "31
// mW".
type adviceStep struct {
	verb, name, place string
	from, bare, to    string // bare is from without its unit
}

// step takes one change apart.
func (s *Session) step(set report.Set) adviceStep {
	out := adviceStep{verb: "Set", name: s.placeOfPath(set.Path), to: fmt.Sprint(set.Value)}
	stage, inStage := stageOf(set.Path)
	p := s.doc.now.Plan()
	value, isNumber := set.Value.(float64)
	if !inStage || !isNumber || stage >= len(p.Stages) {
		return out
	}
	for _, e := range knobs(p, stage, s.factsOf(p).recoil) {
		if e.ID != knobAt(set.Path) {
			continue
		}
		unit := s.shownUnit(e)
		out.verb = verb(e.value, value)
		out.name = lowerFirst(strings.TrimPrefix(e.Label, "Power "))
		out.place = " at '" + s.stageName(stage) + "'"
		if p.Model != nil && stage == StartStage {
			out.place = ""
		}
		out.from, out.to = e.measure.Fit(e.value, unit, 10), e.measure.Fit(value, unit, 10)
		out.bare = strings.TrimSuffix(out.from, " "+Symbol(unit))
	}
	return out
}

// joinSteps writes the steps in a row; neighbours that differ only in the axis
// become one: "Raise depth x, y at 'lower': 2 → 4 Er".
func joinSteps(steps []adviceStep) string {
	var joined []adviceStep
	for _, step := range steps {
		if n := len(joined); n > 0 {
			last := &joined[n-1]
			what, axis, many := strings.Cut(step.name, " ")
			if many && strings.HasPrefix(last.name, what+" ") && last.verb == step.verb &&
				last.place == step.place && last.from == step.from && last.to == step.to {
				last.name += ", " + axis
				continue
			}
			step.verb = strings.ToLower(step.verb)
		}
		joined = append(joined, step)
	}
	texts := make([]string, len(joined))
	for i, step := range joined {
		texts[i] = step.verb + " " + step.name + step.place + ": " + strings.TrimPrefix(step.bare+" → "+step.to, " → ")
	}
	return strings.Join(texts, "; ")
}

func (s *Session) shownUnit(e entry) string {
	if unit, chosen := s.units[e.ID]; chosen {
		return unit
	}
	return e.Unit
}

func verb(from, to float64) string {
	switch {
	case from < 0 && to > 0 || from > 0 && to < 0:
		return "Turn"
	case to < from:
		return "Lower"
	}
	return "Raise"
}

// stageOf returns the stage that a path lies in; StartStage for /start and
// /model.
func stageOf(path string) (int, bool) {
	tokens, err := plan.SplitPath(path)
	if err != nil || len(tokens) < 2 {
		return 0, false
	}
	switch tokens[0] {
	case "start", "model":
		return StartStage, true
	case "stages":
		i, err := strconv.Atoi(tokens[1])
		return i, err == nil && i >= 0
	}
	return 0, false
}

func editsOf(sets []report.Set) []plan.Edit {
	out := make([]plan.Edit, len(sets))
	for i, set := range sets {
		out[i] = plan.Edit{Path: set.Path, Value: set.Value}
	}
	return out
}

// fitSentence shortens a text to the length of the verdict bar, at the end of a
// sentence if it can.
func fitSentence(text string) string {
	if utf8.RuneCountInString(text) <= sentenceLength {
		return text
	}
	cut := string([]rune(text)[:sentenceLength])
	if end := strings.LastIndex(cut, ". "); end > 0 {
		return cut[:end+1]
	}
	cut = string([]rune(text)[:sentenceLength-1])
	if end := strings.LastIndex(cut, " "); end > 0 {
		cut = cut[:end]
	}
	return cut + "…"
}

func capital(word string) string {
	if word == "" {
		return ""
	}
	return strings.ToUpper(word[:1]) + word[1:]
}

// lowerFirst begins a label in the middle of a sentence; names in quotes and
// symbols stay.
func lowerFirst(label string) string {
	if label == "" || label[0] == '\'' {
		return label
	}
	return strings.ToLower(label[:1]) + label[1:]
}
