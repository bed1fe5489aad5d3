package atom

import (
	"fmt"
	"strings"
	"testing"

	"hilltop/bosehubbard/si"
)

// TestCrossings: poles at 100 and 300 G, zeros at 150 and 250 G; gauss in, and
// out as kind, field and segment.
func TestCrossings(t *testing.T) {
	c := gaussCurve(20, 300, -50, 100, 50)
	for _, tc := range []struct {
		name string
		path []float64
		want string
	}{
		{"nothing", nil, ""},
		{"one point", []float64{50}, ""},
		{"below all", []float64{0, 50, 99}, ""},
		{"up through all", []float64{0, 400}, "pole 100 0, zero 150 0, zero 250 0, pole 300 0"},
		{"down through all", []float64{400, 0}, "pole 300 0, zero 250 0, zero 150 0, pole 100 0"},
		{"in pieces", []float64{0, 120, 200, 400}, "pole 100 0, zero 150 1, zero 250 2, pole 300 2"},
		{"up and back", []float64{120, 200, 120}, "zero 150 0, zero 150 1"},
		{"ends on a pole", []float64{200, 260, 300}, "zero 250 0, pole 300 1"},
		{"ends on a zero", []float64{0, 150}, "pole 100 0, zero 150 0"},
		{"rests on a pole", []float64{200, 300, 300, 300}, "zero 250 0, pole 300 0"},
		{"touches a pole and turns", []float64{260, 300, 260}, "pole 300 0"},
		{"through a point on a pole", []float64{260, 300, 320}, "pole 300 0"},
		{"comes back to it", []float64{260, 300, 260, 300}, "pole 300 0, pole 300 2"},
		{"starts on a zero", []float64{150, 200}, "zero 150 0"},
		{"starts on a pole, goes down over the other", []float64{300, 200, 100}, "pole 300 0, zero 250 0, zero 150 1, pole 100 1"},
		{"only a pole", []float64{100}, "pole 100 0"},
		{"holds", []float64{200, 200, 200}, ""},
		{"repeated", []float64{90, 110, 90, 110}, "pole 100 0, pole 100 1, pole 100 2"},
	} {
		path := make([]float64, len(tc.path))
		for i, gauss := range tc.path {
			path[i] = onMark(c, gauss)
		}
		var words []string
		for _, met := range c.Crossings(path) {
			words = append(words, fmt.Sprintf("%s %.6g %d", met.Kind, met.Field/si.Gauss, met.Segment))
		}
		if got := strings.Join(words, ", "); got != tc.want {
			t.Errorf("%s: path %v G: got %q, want %q", tc.name, tc.path, got, tc.want)
		}
	}
}

// onMark returns the field, and exactly that of the curve's pole or zero there.
func onMark(c ScatteringCurve, gauss float64) float64 {
	for _, mark := range c.marks() {
		if coincide(mark.Field, gauss*si.Gauss) {
			return mark.Field
		}
	}
	return gauss * si.Gauss
}

// TestCrossingsBackwardsAreReversed goes through paths with no point on a mark.
func TestCrossingsBackwardsAreReversed(t *testing.T) {
	for _, name := range curveNames() {
		c := curves[name]
		path := []float64{-0.017, 0.0123, 0.0321, 0.0123, 0.0789, 0.1234, 0.0001}
		back := make([]float64, len(path))
		for i, field := range path {
			back[len(path)-1-i] = field
		}
		there, here := c.Crossings(path), c.Crossings(back)
		if len(there) != len(here) {
			t.Errorf("%s: %d crossings there, %d back", name, len(there), len(here))
			continue
		}
		for i, met := range there {
			other := here[len(here)-1-i]
			if other.Kind != met.Kind || other.Field != met.Field || other.Segment != len(path)-2-met.Segment {
				t.Errorf("%s: crossing %d there %+v, back %+v", name, i, met, other)
			}
		}
	}
}

// TestCrossingOf39KAt37a0: on the way from 309 a0 to -37 a0 the field of the
// single-resonance curve has to pass the pole; the other way round there is no
// such length. Source: the formula, (402.5 G, -52 G, -29 a0).
func TestCrossingOf39KAt37a0(t *testing.T) {
	from := wide39K.Fields(309*si.BohrRadius, 0, 0.1)[0]
	to := wide39K.Fields(-37*si.BohrRadius, 0, 0.1)
	if len(to) != 1 || to[0] < wide39K.Poles()[0] {
		t.Fatalf("fields of -37 a0: %v, want one above the pole", to)
	}
	met := wide39K.Crossings([]float64{from, to[0]})
	if len(met) != 1 || met[0].Kind != Pole || met[0].Field != 402.5*si.Gauss {
		t.Errorf("crossings %+v, want the pole at 402.5 G", met)
	}
	met = wide39K.Crossings([]float64{from, wide39K.Fields(-20*si.BohrRadius, 0, 0.1)[0]})
	if len(met) != 1 || met[0].Kind != Zero {
		t.Errorf("crossings %+v, want the zero at 350.5 G", met)
	}
}
