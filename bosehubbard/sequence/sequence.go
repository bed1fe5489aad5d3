package sequence

import (
	"hilltop/bosehubbard/apparatus"
	"hilltop/bosehubbard/atom"
)

// Stage is one step of a sequence: where the knobs end, when and how.
type Stage struct {
	Name     string
	Duration float64 // s
	Shape    Shape
	End      apparatus.Settings
}

// Sequence is a start and the stages that follow it.
type Sequence struct {
	Start  apparatus.Settings
	Stages []Stage
}

// Duration returns the length of the whole sequence in s.
func (s *Sequence) Duration() float64 {
	total := 0.0
	for _, stage := range s.Stages {
		total += stage.Duration
	}
	return total
}

// Before returns the settings at the beginning of a stage.
func (s *Sequence) Before(stage int) apparatus.Settings {
	if stage == 0 {
		return s.Start
	}
	return s.Stages[stage-1].End
}

// End returns the settings at the end of the last stage, or the start if there
// is none.
func (s *Sequence) End() apparatus.Settings { return s.Before(len(s.Stages)) }

// At writes the settings at time t into dst, which keeps its own slice. Before
// the start it is the start, after the end the end.
func (s *Sequence) At(dst *apparatus.Settings, t float64) {
	for i, stage := range s.Stages {
		if t < stage.Duration {
			mix(dst, s.Before(i), stage.End, stage.Shape.At(t/stage.Duration))
			return
		}
		t -= stage.Duration
	}
	end := s.End()
	mix(dst, end, end, 1)
}

func mix(dst *apparatus.Settings, from, to apparatus.Settings, f float64) {
	blend := func(a, b float64) float64 { return (1-f)*a + f*b }
	for i := range dst.Depth {
		dst.Depth[i] = blend(from.Depth[i], to.Depth[i])
	}
	dst.Power = dst.Power[:0]
	for i := range from.Power {
		dst.Power = append(dst.Power, blend(from.Power[i], to.Power[i]))
	}
	dst.Field = blend(from.Field, to.Field)
}

// HoldTime returns the duration of the trailing hold stages in s, and whether
// there are any.
func (s *Sequence) HoldTime() (hold float64, ok bool) {
	for i := len(s.Stages) - 1; i >= 0 && s.Stages[i].Shape == Hold; i-- {
		hold += s.Stages[i].Duration
		ok = true
	}
	return hold, ok
}

// Crossings returns, for each stage, what the scattering length passes on the
// way, in order. A pole loses doubly occupied sites; a zero is harmless. A pole
// or zero on which a stage ends belongs to that stage.
func (s *Sequence) Crossings(curve atom.ScatteringCurve) [][]atom.Crossing {
	path := []float64{s.Start.Field}
	for _, stage := range s.Stages {
		path = append(path, stage.End.Field)
	}
	list := make([][]atom.Crossing, len(s.Stages))
	if len(list) == 0 {
		return list
	}
	for _, c := range curve.Crossings(path) {
		list[c.Segment] = append(list[c.Segment], c)
	}
	return list
}
