package report

import (
	"encoding/json"
	"math"
	"slices"

	"hilltop/bosehubbard/num/digits"
	"hilltop/bosehubbard/plan"
	"hilltop/bosehubbard/thermo"
)

// Levels is the equilibrium of many independent bodies with a few levels each.
type Levels struct {
	EnergyHz    float64   `json:"energy_hz_per_body"`
	BetaPerHz   *float64  `json:"beta_per_hz,omitempty"` // absent at an end, where it is infinite
	Temperature Kelvin    `json:"temperature_k"`
	EntropyKB   float64   `json:"entropy_per_body_kb"`
	WindowMS    float64   `json:"window_ms"`
	TimeRatio   float64   `json:"time_ratio"` // outer over inner time
	Shares      []float64 `json:"shares"`     // of the bodies in each level
}

// Kelvin is a temperature; null in JSON where it is infinite, at beta = 0.
type Kelvin float64

// MarshalJSON writes the number, or null where T is infinite.
func (k Kelvin) MarshalJSON() ([]byte, error) {
	if math.IsInf(float64(k), 0) {
		return []byte("null"), nil
	}
	return json.Marshal(float64(k) + 0) // + 0 turns -0 into 0
}

// judgeLevels judges a plan of levels.
func judgeLevels(p *plan.Plan) (*Report, error) {
	l := thermo.Levels{
		Energies: p.Levels.EnergiesHz, Degeneracies: p.Levels.Degeneracies, Bodies: p.Levels.Bodies,
		InnerTime: p.Levels.InnerTimeS, OuterTime: p.Levels.OuterTimeS, Unbounded: p.Levels.Unbounded,
	}
	sign := signOf(p)
	j, err := l.Judge(p.Levels.EnergyHzPerBody, int(sign))
	if err != nil {
		return nil, plan.Errors{{Path: "/levels", Reason: err.Error()}}
	}
	r := &Report{Title: p.Title, AimSign: aimWord(sign), Verdict: j.Verdict, Stages: []Stage{}, HoldMS: p.Levels.OuterTimeS * 1e3}
	top := slices.Max(p.Levels.EnergiesHz)
	if p.Levels.Unbounded {
		top = math.Inf(1)
	}
	r.Ceiling.Terms = []Term{}
	r.Ceiling.Total = Bounds{Floor: Bound{Known: true, Hz: slices.Min(p.Levels.EnergiesHz)}, Ceiling: Bound{Known: true, Hz: top}}
	r.Ceiling.Criteria = levelCriteria(p.Levels, &j, float64(sign))
	r.Levels = levelsOf(&j)
	r.Sentence = r.levelSentence()
	return r, nil
}

func levelsOf(j *thermo.LevelJudgement) *Levels {
	s := j.State
	out := &Levels{
		EnergyHz: s.Energy, Temperature: Kelvin(s.Kelvin), EntropyKB: s.Entropy,
		WindowMS: j.Window * 1e3, TimeRatio: j.TimeRatio, Shares: s.Shares,
	}
	if beta := s.Beta; !math.IsInf(beta, 0) {
		out.BetaPerHz = &beta
	}
	return out
}

// levelCriteria are the three conditions of levels, with the names of their kin.
func levelCriteria(l *plan.Levels, j *thermo.LevelJudgement, sign float64) []Criterion {
	middle := middleEnergy(l)
	energy := -sign * (l.EnergyHzPerBody - middle)
	lifetime := (l.OuterTimeS - thermo.MinTimeRatio*l.InnerTimeS) * 1e3
	list := []Criterion{
		{Name: "energy", Passed: energy > 0, Margin: energy, Unit: "Hz", Breaks: "astray",
			Detail: "energy per body against that at infinite temperature"},
		{Name: "lifetime", Passed: lifetime >= 0, Margin: lifetime, Unit: "ms", Breaks: "leaky",
			Detail: "outer time against ten inner times"},
	}
	if energy <= 0 && energy != 0 {
		list[0].Advice = &Advice{
			Text: "Exchange the populations: energy " + digits.Signed(2*middle-l.EnergyHzPerBody, 6) + " Hz per body.",
			Set:  []Set{{Path: "/levels/energy_hz_per_body", Value: 2*middle - l.EnergyHzPerBody}},
		}
	}
	if l.Unbounded {
		list = append([]Criterion{{Name: "levels", Breaks: "open", Unit: "Hz", Detail: "the list of levels goes on without end"}}, list...)
	}
	return list
}

// levelSentence is the verdict on levels in words.
func (r *Report) levelSentence() string {
	if worst := r.worst(); worst != nil {
		return title(r.Verdict) + ": " + r.phrase(worst) + "."
	}
	return "Sealed: T = " + digits.Signed(float64(r.Levels.Temperature)*1e9, 3) + " nK, lives " + duration(r.HoldMS) + ", " +
		digits.Format(r.Levels.TimeRatio, 3) + " inner times."
}

// middleEnergy is the mean of the levels, that of infinite temperature, Hz.
func middleEnergy(l *plan.Levels) float64 {
	sum, weight := 0.0, 0.0
	for i, e := range l.EnergiesHz {
		g := 1.0
		if l.Degeneracies != nil {
			g = l.Degeneracies[i]
		}
		sum, weight = sum+g*e, weight+g
	}
	return sum / weight
}
