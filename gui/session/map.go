package session

import (
	"context"
	"math"

	"hilltop/bosehubbard/figure"
	"hilltop/bosehubbard/plan"
	"hilltop/bosehubbard/report"
)

// MapJob is the key of the map of the verdict; its result is a *figure.VerdictMap.
const MapJob = "verdict map"

// StartMap computes the verdict over U and V around the present plan, on so many
// columns of U and rows of V, as the job MapJob.
func (s *Session) StartMap(columns, rows int) {
	s.Start(MapJob, func(ctx context.Context, p *plan.Plan, progress func(done, total int)) (any, error) {
		return verdictMap(ctx, p, columns, rows, progress)
	})
}

// verdictMap judges every cell of the map, row by row.
//
// It returns the errors of report.Vary and ctx's error if stopped.
func verdictMap(ctx context.Context, p *plan.Plan, columns, rows int, progress func(done, total int)) (*figure.VerdictMap, error) {
	v, err := report.NewJudge().Vary(ctx, p)
	if err != nil {
		return nil, err
	}
	m := &figure.VerdictMap{
		U: mapRange(v.InteractionHz), V: mapRange(v.CurvatureHz), Columns: columns, Rows: rows,
		AtU: v.InteractionHz, AtV: v.CurvatureHz, Verdicts: make([]string, 0, columns*rows),
	}
	for row := range rows {
		if err := ctx.Err(); err != nil {
			return nil, err
		}
		for column := range columns {
			verdict, err := v.Verdict(m.Cell(column, row))
			if err != nil {
				return nil, err
			}
			m.Verdicts = append(m.Verdicts, verdict)
		}
		progress(row+1, rows)
	}
	return m, nil
}

// mapRange shows both signs, the one of the plan to twice its value.
func mapRange(at float64) figure.Range {
	size := math.Abs(at)
	switch {
	case size == 0:
		return figure.Range{Low: -1, High: 1}
	case at < 0:
		return figure.Range{Low: -2 * size, High: size}
	}
	return figure.Range{Low: -size, High: 2 * size}
}
