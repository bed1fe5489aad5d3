package session

import (
	"math"
	"strings"

	"hilltop/bosehubbard/report"
)

// Measures of the stage table.
var (
	hertz        = Measure{Dimension: Energy, Unit: "Hz"}
	signedHertz  = Measure{Dimension: Energy, Unit: "Hz", Signed: true}
	milliseconds = Measure{Dimension: Duration, Unit: "ms"}
	bohr         = Measure{Dimension: ScatteringLength, Unit: "a0", Signed: true}
	recoil       = Measure{Dimension: Depth, Unit: "Er"}
	gauss        = Measure{Dimension: FieldStrength, Unit: "G"}
)

// stageRows words the stages of a report, the start first where it has one.
func stageRows(r *report.Report) []StageRow {
	var rows []StageRow
	begin := 0.0
	if r.Start != nil {
		row := stageRow(r.Start, 0)
		row.Stage, row.Name, row.Duration = StartStage, "start", ""
		rows = append(rows, row)
	}
	for i := range r.Stages {
		row := stageRow(&r.Stages[i], r.Stages[i].EndMS-begin)
		row.Stage = i
		rows = append(rows, row)
		begin = r.Stages[i].EndMS
	}
	return rows
}

func stageRow(s *report.Stage, lasts float64) StageRow {
	row := StageRow{
		Name:       s.Name,
		Duration:   milliseconds.Fit(lasts, "ms", 9),
		Tunnelling: perAxis(hertz, s.TunnellingHz),
		Curvature:  perAxis(signedHertz, s.CurvatureHz),
		Trap:       perAxis(signedHertz, s.TrapHz),
		Depth:      perAxis(recoil, s.DepthEr),
		Crosses:    crossings(s.Crosses),
	}
	if u := s.InteractionHz; u != nil {
		row.Interaction = withUnit(signedHertz.formatDigits(*u, bestUnit(*u), 4), bestUnit(*u))
		if w := word("interaction_hz", *u); w != "" {
			row.Interaction += ", " + w
		}
	}
	if a := s.ScatteringLengthA0; a != nil {
		row.Scattering = withUnit(bohr.formatDigits(*a, "a0", 4), "a0")
	}
	return row
}

// perAxis writes one number per axis in a common unit, or a single one where all
// are shown alike: "467, 467, 16.4 Hz".
func perAxis(m Measure, values []float64) string {
	if len(values) == 0 {
		return ""
	}
	largest := 0.0
	for _, v := range values {
		largest = max(largest, math.Abs(v))
	}
	unit := m.Unit
	if unit == "Hz" {
		unit = bestUnit(largest)
	}
	texts := make([]string, len(values))
	same := true
	for i, v := range values {
		texts[i] = m.formatDigits(v, unit, 3)
		same = same && texts[i] == texts[0]
	}
	if same {
		return withUnit(texts[0], unit)
	}
	return withUnit(strings.Join(texts, ", "), unit)
}

// bestUnit keeps numbers below 10,000.
func bestUnit(hz float64) string {
	if math.Abs(hz) >= 1e4 {
		return "kHz"
	}
	return "Hz"
}

func crossings(list []report.Crossing) string {
	texts := make([]string, len(list))
	for i, c := range list {
		texts[i] = c.Kind + " at " + gauss.Fit(c.FieldG, "G", 9)
	}
	return strings.Join(texts, ", ")
}
