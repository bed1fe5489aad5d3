package session

import (
	"math"
	"testing"

	"hilltop/bosehubbard/band"
	"hilltop/bosehubbard/report"
)

func TestMirror(t *testing.T) {
	_, _, st := judged(t, "skerry-demo")
	a := NewArtist()
	changed, stages := *st.Report, append([]report.Stage(nil), st.Report.Stages...)
	stages[0].DepthEr = []float64{6.1, 5, 40}
	changed.Stages = stages
	rows, err := a.Mirror(st.Plan, &changed, 0)
	if err != nil {
		t.Fatal(err)
	}
	if rows[0].Floor != "−1.931 J" || rows[0].Ceiling != "+2.077 J" {
		t.Errorf("at 6.1 Er: %+v, want −1.931 J and +2.077 J", rows[0])
	}
	if got := readNumber(t, rows[2].Curvature); math.Abs(got-1) > 0.01 {
		t.Errorf("at 40 Er: ratio %g, want 1 to 0.01", got)
	}
	if got := readNumber(t, rows[2].Ceiling); math.Abs(got-2) > 0.001 {
		t.Errorf("at 40 Er: ceiling %g J, want 2 to 0.001", got)
	}
	const next = -0.0516412 // J2/J1 at 5 Er; Bloch, Dalibard, Zwerger, table I has 0.051641
	if got := readNumber(t, rows[1].Next); math.Abs(got-next) > 5e-5 {
		t.Errorf("at 5 Er: J2/J1 = %g, want %g", got, next)
	}
	if got, want := readNumber(t, rows[1].Curvature), (1-4*next)/(1+4*next); math.Abs(got-want) > 0.1 {
		t.Errorf("at 5 Er: ratio %g, want %g to 0.1", got, want)
	}
}

func TestCurvatureRatioAgainstTunnelling(t *testing.T) {
	w := band.NewWorkspace()
	for _, depth := range []float64{8, 12, 20} {
		b, err := w.Solve(depth)
		if err != nil {
			t.Fatal(err)
		}
		j := b.Tunnelling
		want := (j[0] - 4*j[1] + 9*j[2]) / (j[0] + 4*j[1] + 9*j[2])
		got, err := curvatureRatio(w, depth)
		if err != nil || math.Abs(got-want) > 3e-3*want {
			t.Errorf("depth %g Er: got %g, %v; want %g to 3e-3", depth, got, err, want)
		}
	}
}
