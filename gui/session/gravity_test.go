package session

import (
	"math"
	"testing"
)

func TestGravityRows(t *testing.T) {
	_, _, st := judged(t, "skerry-demo")
	a := NewArtist()
	rows, err := a.Gravity(st.Plan, st.Report, stageNamed(t, st, "lower"))
	if err != nil || len(rows) != 2 {
		t.Fatalf("rows %+v, %v; want a tilt and a sag", rows, err)
	}
	tilt := readNumber(t, rows[0].Value)
	if want := StageAt(st.Report, 3).TiltHz[2]; math.Abs(tilt-want) > 1e-3*want || rows[0].Name != "Tilt along z" {
		t.Errorf("tilt %+v, want %g Hz along z", rows[0], want)
	}
	if rows[1].Name != "Sag along z" || rows[1].Note == "" {
		t.Errorf("sag: %+v", rows[1])
	}
	p := *st.Plan
	p.GravityAxis = "none"
	if rows, err := a.Gravity(&p, st.Report, 0); err != nil || len(rows) != 1 || rows[0].Value != "none" {
		t.Errorf("in free fall: %+v, %v", rows, err)
	}
}
