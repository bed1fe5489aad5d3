package session

import (
	"fmt"
	"strings"

	"hilltop/bosehubbard/report"
)

// Explanation says where a number comes from, in two lines.
type Explanation struct {
	Formula string
	Inputs  string
	Source  string
}

// Lines returns the two lines of the strip.
func (e Explanation) Lines() (first, second string) {
	parts := []string{}
	for _, part := range []string{e.Inputs, e.Source} {
		if part != "" {
			parts = append(parts, part)
		}
	}
	return e.Formula, strings.Join(parts, " · ")
}

const (
	reviewSource  = "Bloch, Dalibard, Zwerger, Rev. Mod. Phys. 80, 885 (2008)"
	derivedSource = "derived"
)

// quantity is what can be said about a number of a stage.
type quantity struct {
	formula string
	source  string
	inputs  func(*report.Stage) string
}

// quantities by the keys of report.Stage, and terms and criteria by their names.
var quantities = map[string]quantity{
	"tunnelling_hz":              {"J = −½ ∫ E₀(q) cos πq dq, q from −1 to 1, from the exact band", reviewSource, depthAndRecoil},
	"next_tunnelling_hz":         {"J₂ = −½ ∫ E₀(q) cos 2πq dq, q from −1 to 1, from the exact band", reviewSource, depthAndRecoil},
	"interaction_hz":             {"U = (4πħ²a/m) ∫ |w|⁴ d³r / h, with exact Wannier functions", reviewSource, lengthAndDepth},
	"interaction_per_tunnelling": {"U / J of the fastest axis", "", lengthAndDepth},
	"curvature_hz":               {"V = m ω|ω| d² / 2h, per site squared; negative pushes outwards", derivedSource, trapAndSpacing},
	"trap_hz":                    {"sign(ω²) √|ω²| / 2π, ω² the sum over beams, lattice and coils", derivedSource, budgetOf},
	"scattering_length_a0":       {"a = a_bg Π (B − B₀ − Δ)/(B − B₀) over the resonances", "Chin et al., Rev. Mod. Phys. 82, 1225 (2010)", fieldOf},
	"gap_hz":                     {"smallest gap: E₁ − E₀ at q = 1", reviewSource, depthAndRecoil},
	"recoil_hz":                  {"Er/h = h / (8 m d²)", "", func(s *report.Stage) string { return "d = " + listed(s.SpacingNM, "nm") }},
	"tilt_hz":                    {"F = (m g − μ B′) d / h, per site", "", func(s *report.Stage) string { return "d = " + listed(s.SpacingNM, "nm") }},
	"sag":                        {"m ω² z = m g − μ B′ at the minimum of the beams' potential along gravity, the lattice left out", derivedSource, trapAndSpacing},
	"mirror":                     {"J₂/J₁ and −E₀″(1)/E₀″(0): 0 and 1 where −H is the mirror of H with −U, −V", derivedSource, depthAndRecoil},
	"tunnelling_time_ms":         {"ħ / J of the fastest axis", "", func(s *report.Stage) string { return "J = " + listed(s.TunnellingHz, "Hz") }},
	"depth_er":                   {"s = 4 √ρ |U₀| / Er, peak to peak at the centre", "", func(s *report.Stage) string { return "Er = " + listed(s.RecoilHz, "Hz") }},

	"kinetic":     {"sum over the moving axes of the band's edges about its centre", derivedSource, func(s *report.Stage) string { return "J = " + listed(s.TunnellingHz, "Hz") }},
	"interaction": {"per atom 0 to U(N − 1)/2: bounded above for U ≤ 0, below for U ≥ 0", derivedSource, lengthAndDepth},
	"trap_x":      {"V x²: bounded above for V ≤ 0, below for V ≥ 0", derivedSource, trapAndSpacing},
	"trap_y":      {"V y²: bounded above for V ≤ 0, below for V ≥ 0", derivedSource, trapAndSpacing},
	"trap_z":      {"V z²: bounded above for V ≤ 0, below for V ≥ 0", derivedSource, trapAndSpacing},
	"tilt":        {"a tilt along a moving axis is bounded only where a curvature stops it", derivedSource, func(s *report.Stage) string { return "F = " + listed(s.TiltHz, "Hz") + " per site" }},
	"one_band":    {"smallest gap > moving band widths + |U| + tilt per site: two atoms cannot lift one of them out", derivedSource, func(s *report.Stage) string { return "gap " + listed(s.GapHz, "Hz") }},
	"layers": {"|U| keeps away from k F by 4J (2J/F)^(k−1), k = 1, 2, 3, and the slow drift outlasts the hold", derivedSource, func(s *report.Stage) string {
		return "F = " + listed(s.TiltHz, "Hz") + ", J = " + listed(s.TunnellingHz, "Hz")
	}},
	"held":   {"V ≠ 0 along every moving axis, or walls", derivedSource, trapAndSpacing},
	"edge":   {"drop from the summit to where the beams end > 2zJ + |U|", derivedSource, trapAndSpacing},
	"energy": {"E_kin + U⟨n(n−1)⟩/2 per site against U n² at infinite temperature", derivedSource, nil},
	"total":  {"the sum of the terms' bounds, per atom", derivedSource, nil},
}

func depthAndRecoil(s *report.Stage) string {
	if len(s.DepthEr) == 0 {
		return "given by the model"
	}
	return "s = " + listed(s.DepthEr, "Er") + ", Er = " + listed(s.RecoilHz, "Hz")
}

func lengthAndDepth(s *report.Stage) string {
	if s.ScatteringLengthA0 == nil {
		return "given by the model"
	}
	return "a = " + withUnit(bohr.formatDigits(*s.ScatteringLengthA0, "a0", 4), "a0") + ", s = " + listed(s.DepthEr, "Er")
}

func trapAndSpacing(s *report.Stage) string {
	if len(s.TrapHz) == 0 {
		return "given by the model"
	}
	return "trap " + listed(s.TrapHz, "Hz") + ", d = " + listed(s.SpacingNM, "nm")
}

func budgetOf(s *report.Stage) string {
	parts := make([]string, len(s.Budget))
	for i, c := range s.Budget {
		parts[i] = c.Source + " " + listed(c.TrapHz[:], "Hz")
	}
	return strings.Join(parts, "; ")
}

func fieldOf(s *report.Stage) string {
	if s.FieldG == nil {
		return ""
	}
	return "B = " + withUnit(Digits(*s.FieldG, 6), "G")
}

// listed writes one number per axis, or one where they are alike.
func listed(values []float64, unit string) string {
	texts := make([]string, len(values))
	same := len(values) > 0
	for i, v := range values {
		texts[i] = Digits(v, 4)
		same = same && texts[i] == texts[0]
	}
	if same {
		texts = texts[:1]
	}
	return withUnit(strings.Join(texts, ", "), unit)
}

// Explain returns formula, inputs and source of a number: of a field by its ID, of
// a value of the selected stage by its key in the report, of a term or a
// criterion by its name. It returns false for anything else.
func (s *Session) Explain(topic string) (Explanation, bool) {
	s.mu.Lock()
	defer s.mu.Unlock()
	if e, ok := s.entry(topic); ok {
		return s.explainEntry(e), true
	}
	q, ok := quantities[topic]
	if !ok {
		return Explanation{}, false
	}
	out := Explanation{Formula: q.formula, Source: q.source}
	if stage := s.reported(); stage != nil && q.inputs != nil {
		out.Inputs = q.inputs(stage)
	}
	if c := s.criterion(topic); c != nil {
		out.Inputs = c.Detail
	}
	return out, true
}

// reported returns the selected stage of the report, or nil.
func (s *Session) reported() *report.Stage {
	r := s.work.report
	switch {
	case r == nil:
		return nil
	case s.stage < 0 || len(r.Stages) == 0:
		return r.Start
	}
	return &r.Stages[min(s.stage, len(r.Stages)-1)]
}

func (s *Session) criterion(name string) *report.Criterion {
	if s.work.report == nil {
		return nil
	}
	for i := range s.work.report.Ceiling.Criteria {
		if c := &s.work.report.Ceiling.Criteria[i]; c.Name == name {
			return c
		}
	}
	return nil
}

// explainEntry says where the value of a field is given and what it takes.
func (s *Session) explainEntry(e entry) Explanation {
	out := Explanation{Formula: s.placeOf(e.ID) + ": " + withUnit(e.Text, e.Unit)}
	if e.Word != "" {
		out.Formula += ", " + e.Word
	}
	switch {
	case e.Inherited && e.SetsIn != "":
		out.Inputs = fmt.Sprintf("from '%s', set there, because a hold moves no knob", e.SetsIn)
	case e.Inherited:
		out.Inputs = fmt.Sprintf("inherited from '%s'", e.From)
	case e.Path != "":
		out.Inputs = "given at " + e.Path
	}
	if e.Kind == NumberField && len(e.Units) > 1 {
		out.Source = "takes " + strings.Join(e.Units, ", ")
	}
	return out
}
