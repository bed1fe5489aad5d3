package thermo

import (
	"fmt"
	"math"
)

// MinTimeRatio is how many inner times the outer time must hold for a state of the
// levels to count as sealed: fewer, and it drains while it forms.
const MinTimeRatio = 10

// LevelJudgement says whether levels hold a state of the wanted sign of T.
type LevelJudgement struct {
	Verdict string   // "sealed", "leaky", "astray" or "open"
	Reasons []string // what is broken, worst first; empty if sealed

	State     LevelState
	Window    float64 // from the inner to the outer time, s; 0 if the outer is shorter
	TimeRatio float64 // outer over inner time
}

// Judge decides on the levels at a mean energy per body [Hz] for the wanted sign
// of T, -1 or +1.
//
// open if the levels go on without end, astray if beta is not of that sign, leaky
// if the outer time is under MinTimeRatio inner times, else sealed; the first that
// applies is the verdict.
//
// It returns the errors of At, and one for a sign or a time that is none.
func (l Levels) Judge(energy float64, sign int) (LevelJudgement, error) {
	if sign != 1 && sign != -1 {
		return LevelJudgement{}, fmt.Errorf("thermo: sign %d of the temperature, want -1 or 1", sign)
	}
	for i, t := range []float64{l.InnerTime, l.OuterTime} {
		if !(t > 0) || math.IsInf(t, 1) {
			return LevelJudgement{}, fmt.Errorf("thermo: %s time %g s, want above 0", []string{"inner", "outer"}[i], t)
		}
	}
	state, err := l.At(energy)
	if err != nil {
		return LevelJudgement{}, err
	}
	j := LevelJudgement{
		Verdict: "sealed", State: state,
		Window: max(0, l.OuterTime-l.InnerTime), TimeRatio: l.OuterTime / l.InnerTime,
	}
	if l.Unbounded {
		j.breaks("open", "the levels go on upwards without end, so nothing bounds the energy above")
	}
	if !(state.Beta*float64(sign) > 0) {
		j.breaks("astray", fmt.Sprintf("beta is %.4g per Hz at %g Hz per body, want it %s", state.Beta, energy, wanted(sign)))
	}
	if !(j.TimeRatio >= MinTimeRatio) {
		j.breaks("leaky", fmt.Sprintf("the outer time is %.3g inner times, want at least %d", j.TimeRatio, MinTimeRatio))
	}
	return j, nil
}

// breaks adds a reason; the first one makes the verdict.
func (j *LevelJudgement) breaks(verdict, reason string) {
	if len(j.Reasons) == 0 {
		j.Verdict = verdict
	}
	j.Reasons = append(j.Reasons, reason)
}

func wanted(sign int) string {
	if sign < 0 {
		return "below 0"
	}
	return "above 0"
}
