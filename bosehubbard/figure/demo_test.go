package figure

import (
	"context"
	"testing"

	"hilltop/assets"
	"hilltop/bosehubbard/plan"
	"hilltop/bosehubbard/report"
)

// demo parses one of the plans that ship with the program.
func demo(t testing.TB, name string) *plan.Plan {
	t.Helper()
	data, err := assets.Plan(name)
	if err != nil {
		t.Fatal(err)
	}
	p, err := plan.Parse(data)
	if err != nil {
		t.Fatal(err)
	}
	return p
}

// judged is the report of a demo plan.
func judged(t testing.TB, name string) *report.Report {
	t.Helper()
	r, err := report.NewJudge().Judge(context.Background(), demo(t, name))
	if err != nil {
		t.Fatal(err)
	}
	return r
}
