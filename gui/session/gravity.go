package session

import (
	"math"

	"hilltop/bosehubbard/apparatus"
	"hilltop/bosehubbard/plan"
	"hilltop/bosehubbard/report"
)

// GravityRow is one thing that gravity and the field's gradient do.
type GravityRow struct {
	Name  string // "Tilt along z"
	Value string // with unit
	Note  string
	Topic string // for Explain
}

// Gravity returns the tilt along every axis that has one and the sag at the end of
// a stage.
//
// It returns ErrNoBench for a model plan, and the errors of plan.Apparatus and
// apparatus.At.
func (a *Artist) Gravity(p *plan.Plan, r *report.Report, stage int) ([]GravityRow, error) {
	s := StageAt(r, stage)
	if s == nil || p.Lattice == nil {
		return nil, ErrNoBench
	}
	bench, err := p.Apparatus()
	if err != nil {
		return nil, err
	}
	if !bench.GravityOn {
		return []GravityRow{{Name: "Gravity", Value: "none", Note: "the plan has no gravity axis"}}, nil
	}
	var point apparatus.Point
	rows := p.Rows()
	if err := bench.At(a.bench, &point, p.Settings(rows[min(stage+1, len(rows)-1)])); err != nil {
		return nil, err
	}
	var out []GravityRow
	for i, terms := range point.Model.Axes {
		if terms.Tilt != 0 {
			out = append(out, tiltRow(i, terms.Tilt, terms.Tunnelling))
		}
	}
	sag, held, err := bench.Sag(a.bench, &point)
	if err != nil {
		return nil, err
	}
	return append(out, sagRow(bench.Gravity.String(), sag, held)), nil
}

// tiltRow compares a tilt with the band it would have to move atoms through.
func tiltRow(axis int, tilt, tunnelling float64) GravityRow {
	unit := bestUnit(tilt)
	width := 4 * math.Abs(tunnelling)
	note := "4J = " + withUnit(hertz.formatDigits(width, bestUnit(width), 3), bestUnit(width)) + ": "
	if math.Abs(tilt) >= width {
		note += "the sites of this axis keep apart"
	} else {
		note += "atoms move along this axis"
	}
	return GravityRow{
		Name:  "Tilt along " + axisName(axis),
		Value: withUnit(signedHertz.formatDigits(tilt, unit, 4), unit) + " per site",
		Note:  note, Topic: "tilt_hz",
	}
}

func sagRow(axis string, sag float64, held bool) GravityRow {
	row := GravityRow{Name: "Sag along " + axis, Topic: "sag"}
	if !held {
		row.Value = "no minimum"
		row.Note = "without the lattice the beams would not hold the atoms against gravity"
		return row
	}
	micrometres := Measure{Dimension: Length, Unit: "um"}
	row.Value = withUnit(micrometres.formatDigits(sag*1e6, "um", 3), "um")
	row.Note = "below the beam centre, without the lattice; traps are given at the centre"
	return row
}
