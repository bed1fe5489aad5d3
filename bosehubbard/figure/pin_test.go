package figure

import (
	"math"
	"testing"
)

// A reference in kHz stands at its place in a chart in Hz, and one in Er is left out.
func TestPinBringsTheUnitAlong(t *testing.T) {
	curve := Curve{Name: "a", X: []float64{0, 1}, Y: []float64{2, math.NaN()}}
	before := &Chart{X: Axis{Unit: "Er"}, Y: Axis{Unit: "kHz"}, Curves: []Curve{curve}}
	for _, tc := range []struct {
		unit string
		want float64 // 0 for nothing pinned
	}{{"kHz", 2}, {"Hz", 2000}, {"MHz", 0.002}, {"Er", 0}, {"nK", 0}} {
		c := &Chart{X: Axis{Unit: "Er"}, Y: Axis{Unit: tc.unit}}
		c.Pin(before)
		if tc.want == 0 {
			if len(c.Pinned) != 0 {
				t.Errorf("%s: %d curves pinned, want none", tc.unit, len(c.Pinned))
			}
			continue
		}
		if len(c.Pinned) != 1 || math.Abs(c.Pinned[0].Y[0]-tc.want) > 1e-12*tc.want || !math.IsNaN(c.Pinned[0].Y[1]) {
			t.Errorf("%s: pinned %+v, want %g", tc.unit, c.Pinned, tc.want)
		}
	}
	if before.Curves[0].Y[0] != 2 {
		t.Error("the chart of before was changed")
	}
}
