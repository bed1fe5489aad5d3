package atom

import (
	"errors"
	"maps"
	"math"
	"math/rand/v2"
	"slices"
	"testing"

	"hilltop/bosehubbard/si"
	"hilltop/testdata"
)

// wide39K is the single-resonance formula of the wide resonance of 39K (1,1).
var wide39K = ScatteringCurve{Background: -29 * si.BohrRadius, Resonances: []Resonance{{402.5 * si.Gauss, -52 * si.Gauss}}}

// curves are the shapes that the search for fields must cope with. Numbers of
// atoms from C. Chin et al., Rev. Mod. Phys. 82, 1225 (2010), from memory.
var curves = map[string]ScatteringCurve{
	"39K wide":        wide39K,
	"39K all":         gaussCurve(-29, 25.85, 0.47, 402.5, -52, 752.3, 0.4),
	"39K (1,-1)":      gaussCurve(-19, 33.58, -55, 162.8, -37, 562.2, -56),
	"87Rb":            gaussCurve(100.4, 1007.4, 0.2),
	"133Cs virtual":   gaussCurve(1720, -11.7, 28.7),
	"virtual and two": gaussCurve(1720, -11.7, 28.7, 47.97, 0.12, 53.5, 0.0025),
	"opposite widths": gaussCurve(20, 100, 50, 300, -50),
	"zeros outside":   gaussCurve(20, 100, 250, 300, 30, 310, -200),
	"pole at zero":    gaussCurve(-5, 0, 3, 8, 2),
}

// curveNames lists the curves in a fixed order, so that seeded tests repeat.
func curveNames() []string { return slices.Sorted(maps.Keys(curves)) }

// gaussCurve makes a curve from a background in a0 and positions and widths in G.
func gaussCurve(background float64, numbers ...float64) ScatteringCurve {
	c := ScatteringCurve{Background: background * si.BohrRadius}
	for i := 0; i < len(numbers); i += 2 {
		c.Resonances = append(c.Resonances, Resonance{numbers[i] * si.Gauss, numbers[i+1] * si.Gauss})
	}
	return c
}

func TestScatteringLengthAgainstTable(t *testing.T) {
	sheet := testdata.Table(t, "scattering_inverse")
	lengths, fields := sheet.Floats(t, "length"), sheet.Floats(t, "field")
	cells := sheet.Strings(t, "field")
	for i, length := range lengths {
		got := wide39K.Fields(length*si.BohrRadius, 0, 1000*si.Gauss)
		tol := 0.51 * lastDigit(cells[i])
		if len(got) != 1 || !(math.Abs(got[0]/si.Gauss-fields[i]) <= tol) {
			t.Errorf("a = %g a0: got fields %v T, want %s G, tolerance %g G", length, got, cells[i], tol)
			continue
		}
		if a, err := wide39K.At(got[0]); err != nil || !(math.Abs(a/si.BohrRadius-length) <= 1e-10) {
			t.Errorf("a = %g a0: at %g T it is %.12g a0, %v", length, got[0], a/si.BohrRadius, err)
		}
	}
}

// lastDigit returns the unit of the last decimal of a number as written.
func lastDigit(cell string) float64 {
	for i := range cell {
		if cell[i] == '.' {
			return math.Pow(10, -float64(len(cell)-1-i))
		}
	}
	return 1
}

// TestSlopeAgainstHandValues: abg/D (1 - a/abg)^2 by hand in a0/G, to the last
// digit; for 87Rb and 133Cs the slope abg/D at the zero.
func TestSlopeAgainstHandValues(t *testing.T) {
	for _, tc := range []struct {
		name      string
		length    float64
		want, tol float64
	}{
		{"39K wide", 309, 75.8, 0.051},
		{"39K wide", 33, 2.55, 0.0051},
		{"39K wide", 0, 0.5577, 0.000051},
		{"87Rb", 0, 502, 0.51},
		{"133Cs virtual", 0, 60, 0.51},
	} {
		c := curves[tc.name]
		fields := c.Fields(tc.length*si.BohrRadius, 0, 0.2)
		if len(fields) != 1 {
			t.Errorf("%s: %d fields for %g a0, want 1", tc.name, len(fields), tc.length)
			continue
		}
		slope, err := c.Slope(fields[0])
		if got := slope * si.Gauss / si.BohrRadius; err != nil || !(math.Abs(got-tc.want) <= tc.tol) {
			t.Errorf("%s at %g a0: slope %.6g a0/G, %v, want %g, tolerance %g", tc.name, tc.length, got, err, tc.want, tc.tol)
		}
	}
}

// TestSlopeIsTheDerivative compares with a central difference. Its step h is
// 1e-5 of the distance to the next pole, which leaves about 1e-10 of the slope
// and of a over that distance; the rounding of a leaves 1e-16 a/h per factor, and
// that of the field 1e-16 of itself over h.
func TestSlopeIsTheDerivative(t *testing.T) {
	random := rand.New(rand.NewPCG(7, 8))
	for _, name := range curveNames() {
		c := curves[name]
		for range 200 {
			field := (random.Float64()*1.2 - 0.1) * 0.1
			distance := math.Inf(1)
			for _, pole := range c.Poles() {
				distance = math.Min(distance, math.Abs(field-pole))
			}
			h := 1e-5 * distance
			want := (c.at(field+h) - c.at(field-h)) / (2 * h)
			got, err := c.Slope(field)
			tol := math.Abs(c.at(field))*(1e-9/distance+4e-16*float64(len(c.Resonances)+1)/h) +
				math.Abs(want)*(1e-9+4e-16*math.Abs(field)/h)
			if err != nil || !(math.Abs(got-want) <= tol) {
				t.Errorf("%s at %.9g T: slope %.12g, %v, want %.12g m/T, tolerance %.2g", name, field, got, err, want, tol)
			}
		}
	}
}

func TestPolesAndZeros(t *testing.T) {
	for _, name := range curveNames() {
		c := curves[name]
		poles, zeros := c.Poles(), c.Zeros()
		if !slices.IsSorted(poles) || !slices.IsSorted(zeros) || len(poles) != len(c.Resonances) || len(zeros) != len(poles) {
			t.Errorf("%s: poles %v and zeros %v, want as many as resonances, ascending", name, poles, zeros)
		}
		for _, pole := range poles {
			if _, err := c.At(pole); !errors.Is(err, ErrPole) {
				t.Errorf("%s: a at the pole %g T: %v, want ErrPole", name, pole, err)
			}
			if _, err := c.Slope(pole); !errors.Is(err, ErrPole) {
				t.Errorf("%s: slope at the pole %g T: %v, want ErrPole", name, pole, err)
			}
		}
		for _, zero := range zeros {
			if a, err := c.At(zero); err != nil || a != 0 || math.Signbit(a) {
				t.Errorf("%s: a at the zero %g T: %g, %v, want 0", name, zero, a, err)
			}
			if slope, err := c.Slope(zero); err != nil || slope == 0 {
				t.Errorf("%s: slope at the zero %g T: %g, %v, want one", name, zero, slope, err)
			}
		}
	}
	if got := wide39K.Zeros()[0] / si.Gauss; !(math.Abs(got-350.5) <= 1e-12) {
		t.Errorf("zero of the wide resonance: got %.12g G, want 350.5 G", got)
	}
}

func TestBadFieldsAreErrors(t *testing.T) {
	for _, field := range []float64{math.NaN(), math.Inf(1), math.Inf(-1)} {
		if a, err := wide39K.At(field); err == nil || a != 0 {
			t.Errorf("a at %g T: got %g, %v, want an error", field, a, err)
		}
		if slope, err := wide39K.Slope(field); err == nil || slope != 0 {
			t.Errorf("slope at %g T: got %g, %v, want an error", field, slope, err)
		}
	}
}

// TestProductOf39K states what the product of the species file gives, so that
// its note stays true: backgrounds seen by the narrow resonances, a at zero
// field, and the change that they make to the wide one.
func TestProductOf39K(t *testing.T) {
	c, err := mustState(t, fixture(t, "39K"), "F=1,mF=+1").Curve()
	if err != nil {
		t.Fatal(err)
	}
	without := func(i int) ScatteringCurve {
		return ScatteringCurve{c.Background, slices.Delete(slices.Clone(c.Resonances), i, i+1)}
	}
	for _, tc := range []struct {
		name            string
		curve           ScatteringCurve
		gauss, want, up float64
	}{
		{"background at 25.85 G", without(0), 25.85, -25.0, 0.06},
		{"background at 752.3 G", without(2), 752.3, -33.3, 0.06},
		{"a at zero field", c, 0, -25.7, 0.06},
		{"a of the product where the wide one alone has 309 a0", c, 398.0385, 309, 0.06},
	} {
		a, err := tc.curve.At(tc.gauss * si.Gauss)
		if got := a / si.BohrRadius; err != nil || !(math.Abs(got-tc.want) <= tc.up) {
			t.Errorf("%s: got %.4f a0, %v, want %g, tolerance %g", tc.name, got, err, tc.want, tc.up)
		}
	}
}

func TestValidate(t *testing.T) {
	for _, name := range curveNames() {
		c := curves[name]
		if err := c.Validate(); err != nil {
			t.Errorf("%s: %v", name, err)
		}
	}
	if err := (ScatteringCurve{Background: 1e-9}).Validate(); err != nil {
		t.Errorf("background alone: %v", err)
	}
	nan, inf := math.NaN(), math.Inf(1)
	for name, c := range map[string]ScatteringCurve{
		"no background":          gaussCurve(0, 400, 50),
		"background NaN":         gaussCurve(nan, 400, 50),
		"position infinite":      gaussCurve(20, inf, 50),
		"width zero":             gaussCurve(20, 400, 0),
		"width NaN":              gaussCurve(20, 400, nan),
		"width below the digits": gaussCurve(20, 400, 1e-15),
		"one position twice":     gaussCurve(20, 400, 50, 400, 30),
		"zero on another pole":   gaussCurve(20, 402.5, -52, 350.5, 30),
		"pole on another zero":   gaussCurve(20, 350.5, 30, 402.5, -52),
	} {
		if c.Validate() == nil {
			t.Errorf("%s: no error", name)
		}
	}
}

func TestScatteringAllocatesNothing(t *testing.T) {
	c := curves["39K all"]
	var sink float64
	if n := testing.AllocsPerRun(100, func() {
		a, _ := c.At(0.039)
		slope, _ := c.Slope(0.039)
		sink += a + slope
	}); n != 0 {
		t.Errorf("%v allocations, want 0", n)
	}
	_ = sink
}

func BenchmarkAt(b *testing.B) {
	c := curves["39K all"]
	b.ReportAllocs()
	for b.Loop() {
		_, _ = c.At(0.039)
	}
}
