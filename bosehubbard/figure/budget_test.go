package figure

import (
	"bytes"
	"strings"
	"testing"
)

// A part of the budget names the bars of that part alone.
func TestBudgetNamesOnlyWhatIsShown(t *testing.T) {
	b := &Budget{Stage: "lower", Axes: []AxisBudget{{Axis: "x", Contributions: []Part{{"sheet", 11}, {"cross", 22}, {"coil", 33}}, Net: 41}}}
	f, s := Frame{Width: 600, Height: 300}, Style{Palette: Light()}
	for _, tc := range []struct {
		view Range
		want []string
		not  []string
	}{
		{Range{}, []string{"+11 Hz", "+22 Hz", "+33 Hz", "+41 Hz, trap"}, nil},
		{Range{-3, -1}, []string{"+22 Hz", "+33 Hz"}, []string{"+11 Hz", "+41 Hz"}},
	} {
		c := b.Chart()
		c.View.Y = tc.view
		var svg bytes.Buffer
		if err := WriteSVG(&svg, c, f, s); err != nil {
			t.Fatal(err)
		}
		for _, label := range tc.want {
			if !strings.Contains(svg.String(), label) {
				t.Errorf("rows %+v: no label %q", tc.view, label)
			}
		}
		for _, label := range tc.not {
			if strings.Contains(svg.String(), label) {
				t.Errorf("rows %+v: label %q of a row that is not shown", tc.view, label)
			}
		}
	}
}
