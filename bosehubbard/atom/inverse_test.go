package atom

import (
	"math"
	"math/rand/v2"
	"slices"
	"testing"

	"gonum.org/v1/gonum/mat"

	"hilltop/bosehubbard/si"
)

// TestFieldsReadBack takes a at random fields on every branch, near poles too,
// and asks for the field. a carries a rounding of one unit per factor, which
// the slope turns into a field; the field itself has one unit.
func TestFieldsReadBack(t *testing.T) {
	random := rand.New(rand.NewPCG(9, 10))
	const low, high = -0.01, 0.12
	for _, name := range curveNames() {
		c := curves[name]
		for range 500 {
			field := low + (high-low)*random.Float64()
			if random.IntN(2) == 0 { // close to a pole or zero, on either side
				r := c.Resonances[random.IntN(len(c.Resonances))]
				field = r.Position + r.Width*(random.Float64()*6-3)*math.Pow(10, -6*random.Float64())
			}
			length, err := c.At(field)
			slope, err2 := c.Slope(field)
			if err != nil || err2 != nil || field < low || field > high {
				continue
			}
			tol := 4.5e-16*math.Abs(field) + 4.5e-16*float64(2*len(c.Resonances)+1)*math.Abs(length/slope)
			got := c.Fields(length, low, high)
			nearest := math.Inf(1)
			for _, found := range got {
				nearest = math.Min(nearest, math.Abs(found-field))
			}
			if !(nearest <= tol) {
				t.Errorf("%s: a at %.17g T is %.17g m; got fields %v, nearest %.2g off, tolerance %.2g", name, field, length, got, nearest, tol)
			}
			if !slices.IsSorted(got) || len(got) > len(c.Resonances) {
				t.Errorf("%s: fields %v, want ascending, at most one per resonance", name, got)
			}
		}
	}
}

// TestFieldsAgainstEigenvalues finds all fields of random curves as the real
// eigenvalues of diag(B_j) + r 1^T/(length - abg), with the residues r_j of a
// at its poles: a = abg + sum_j r_j/(B - B_j).
func TestFieldsAgainstEigenvalues(t *testing.T) {
	random := rand.New(rand.NewPCG(11, 12))
	const low, high = -50.0, 50.0
	several := 0
	for round := range 3000 {
		c := randomCurve(random, 2+random.IntN(4))
		length := 1e-9 * random.NormFloat64()
		want, clear := eigenFields(t, c, length, low, high)
		if !clear {
			continue // two fields meet, or one is out at the end of the range
		}
		got := c.Fields(length, low, high)
		if len(got) != len(want) {
			t.Errorf("round %d: curve %+v, a = %g m: got fields %v, want %v", round, c, length, got, want)
			continue
		}
		for i := range got {
			if !(math.Abs(got[i]-want[i]) <= 1e-7) { // the matrix is not symmetric
				t.Errorf("round %d: curve %+v, a = %g m: field %d: got %.12g, want %.12g", round, c, length, i, got[i], want[i])
			}
			if math.Abs(c.excessOf(got[i], length)) > 1e-9*math.Abs(length) && !stepsOver(c, got[i], length) {
				t.Errorf("round %d: a at %.17g T is %.15g m, want %.15g m", round, got[i], c.at(got[i]), length)
			}
		}
		several += min(1, len(got)/2)
	}
	if several < 500 {
		t.Errorf("%d curves with several fields, want at least 500", several)
	}
}

func (c ScatteringCurve) excessOf(field, length float64) float64 { return c.at(field) - length }

// stepsOver tells whether a passes length between the neighbours of a field.
func stepsOver(c ScatteringCurve, field, length float64) bool {
	below, above := math.Nextafter(field, math.Inf(-1)), math.Nextafter(field, math.Inf(1))
	return (c.excessOf(below, length) < 0) != (c.excessOf(above, length) < 0)
}

// randomCurve has positions about 1 T and widths from 1e-4 T to 3 T, of either
// sign, so that zeros lie between other poles and branches meet.
func randomCurve(random *rand.Rand, n int) ScatteringCurve {
	c := ScatteringCurve{Background: 1e-9 * (0.2 + random.Float64())}
	for range n {
		width := 3 * math.Pow(10, -4*random.Float64())
		c.Resonances = append(c.Resonances, Resonance{
			Position: 4*random.Float64() - 1,
			Width:    math.Copysign(width, random.Float64()-0.5),
		})
	}
	return c
}

func eigenFields(t *testing.T, c ScatteringCurve, length, low, high float64) (fields []float64, clear bool) {
	t.Helper()
	n := len(c.Resonances)
	m := mat.NewDense(n, n, nil)
	for j, r := range c.Resonances {
		residue := c.Background * (r.Position - r.zero())
		for i, other := range c.Resonances {
			if i != j {
				residue *= (r.Position - other.zero()) / (r.Position - other.Position)
			}
		}
		for i := range n {
			m.Set(j, i, residue/(length-c.Background))
		}
		m.Set(j, j, m.At(j, j)+r.Position)
	}
	var eigen mat.Eigen
	if !eigen.Factorize(m, mat.EigenNone) {
		t.Fatal("the diagonalisation failed")
	}
	clear = true
	values := eigen.Values(nil)
	for i, z := range values {
		for _, other := range values[:i] {
			if math.Hypot(real(z)-real(other), imag(z)-imag(other)) < 1e-4 {
				clear = false
			}
		}
		if imag(z) == 0 && low <= real(z) && real(z) <= high {
			fields = append(fields, real(z))
		}
		if math.Abs(real(z)-low) < 1 || math.Abs(real(z)-high) < 1 {
			clear = false
		}
	}
	slices.Sort(fields)
	return fields, clear
}

// TestBranchesThatMeet goes to the maxima and minima of the curves. On the one
// side of the extreme two fields stand close together, on it there is one, and
// beyond it none.
func TestBranchesThatMeet(t *testing.T) {
	tested := 0
	for _, name := range curveNames() {
		c := curves[name]
		for _, extreme := range extremes(c, -0.02, 0.12) {
			tested++
			top := c.at(extreme)
			within := math.Inf(1) // half way to the next pole or zero
			for _, mark := range c.marks() {
				within = math.Min(within, math.Abs(mark.Field-extreme)/2)
			}
			near := func(length float64) int {
				return len(c.Fields(length, extreme-within, extreme+within))
			}
			if got := near(top); got != 1 {
				t.Errorf("%s: %d fields at the extreme %.9g a0 at %.9g G, want 1", name, got, top/si.BohrRadius, extreme/si.Gauss)
			}
			for _, side := range []float64{-1, 1} { // an extreme that rounding has moved
				if got := near(math.Nextafter(top, math.Inf(int(side)))); got != 1 {
					t.Errorf("%s: %d fields one rounding beside the extreme %.9g a0, want 1", name, got, top/si.BohrRadius)
				}
			}
			for _, shift := range []float64{1e-13, 1e-11, 1e-9} {
				up, down := near(top*(1+shift)), near(top*(1-shift))
				if up+down != 2 || up*down != 0 {
					t.Errorf("%s: %d and %d fields at %g beside the extreme %.9g a0 at %.9g G, want 2 and 0",
						name, up, down, shift, top/si.BohrRadius, extreme/si.Gauss)
				}
			}
		}
	}
	if tested < 5 {
		t.Errorf("%d extremes found, want at least 5", tested)
	}
}

// extremes scans the slope for changes of sign that are not a pole's.
func extremes(c ScatteringCurve, low, high float64) []float64 {
	var found []float64
	slope := func(field float64) float64 {
		s, err := c.Slope(field)
		if err != nil {
			return 0
		}
		return s
	}
	const n = 40000
	at := func(i int) float64 { return low + (high-low)*float64(i)/n }
	for i := range n {
		a, b := at(i), at(i+1)
		if slope(a)*slope(b) >= 0 || slices.ContainsFunc(c.Poles(), func(p float64) bool { return a <= p && p <= b }) {
			continue
		}
		for {
			middle := a + (b-a)/2
			if middle <= a || middle >= b {
				break
			}
			if slope(middle)*slope(a) > 0 {
				a = middle
			} else {
				b = middle
			}
		}
		found = append(found, a)
	}
	return found
}

// TestMonotoneIsNeverWrong takes random intervals between neighbouring poles
// and zeros, the whole ones too, and samples the slope where the bounds say that
// it keeps its sign.
func TestMonotoneIsNeverWrong(t *testing.T) {
	random := rand.New(rand.NewPCG(15, 16))
	proved := 0
	for range 4000 {
		c := randomCurve(random, 2+random.IntN(3))
		search := inverse{curve: c, pairs: closestPairs(c.Poles(), c.Zeros())}
		marks := c.marks()
		i := random.IntN(len(marks) - 1)
		part := interval{marks[i].Field, marks[i+1].Field}
		length := part.high - part.low
		switch random.IntN(4) {
		case 1:
			part.high -= length * random.Float64()
		case 2:
			part.low += length * random.Float64()
		case 3:
			part.low += length / 2 * random.Float64()
			part.high -= length / 2 * random.Float64()
		}
		if !search.monotone(part) {
			continue
		}
		proved++
		first, _ := c.Slope(part.middle())
		for k := 1; k < 50; k++ {
			field := part.low + (part.high-part.low)*float64(k)/50
			if slope, err := c.Slope(field); err == nil && slope*first < 0 {
				t.Fatalf("curve %+v in %v: slope %g m/T at %g T, want the sign of %g", c, part, slope, field, first)
			}
		}
	}
	if proved < 1000 {
		t.Errorf("%d intervals proved monotone, want at least 1000", proved)
	}
}

// TestNarrowBranches counts the fields of 39K (1,1): one per resonance, also of
// those a hundred times narrower than the scan of a picture.
func TestNarrowBranches(t *testing.T) {
	c := curves["39K all"]
	for _, tc := range []struct {
		length float64 // a0
		want   []float64
	}{
		{309, []float64{25.885192, 398.039013, 752.338902}},
		{-37, []float64{24.868361, 592.465703, 748.662187}},
		{0, []float64{26.32, 350.5, 752.7}},
	} {
		got := c.Fields(tc.length*si.BohrRadius, 0, 0.1)
		for i := range got {
			got[i] /= si.Gauss
		}
		if len(got) != 3 {
			t.Errorf("a = %g a0: got %v G, want %v G", tc.length, got, tc.want)
			continue
		}
		for i, want := range tc.want {
			// Each field again from a itself: this is the check, want is to read by.
			a, err := c.At(got[i] * si.Gauss)
			slope, _ := c.Slope(got[i] * si.Gauss)
			off := (a - tc.length*si.BohrRadius) / slope
			if err != nil || !(math.Abs(off) <= 1e-16) || !(math.Abs(got[i]-want) <= 1e-6) {
				t.Errorf("a = %g a0: got %.9f G, off by %.2g T, want %.6f G", tc.length, got[i], off, want)
			}
		}
	}
}

func TestFieldsAtTheEnds(t *testing.T) {
	zero := wide39K.Zeros()[0]
	for name, tc := range map[string]struct {
		got  []float64
		want int
	}{
		"zero at both ends":        {wide39K.Fields(0, zero, zero), 1},
		"zero just outside":        {wide39K.Fields(0, math.Nextafter(zero, 1), 0.1), 0},
		"field at the low end":     {wide39K.Fields(wide39K.at(0.039), 0.039, 0.1), 1},
		"field at the high end":    {wide39K.Fields(wide39K.at(0.039), 0, 0.039), 1},
		"same of several":          {curves["39K all"].Fields(curves["39K all"].at(0.039), 0.039, 0.039), 1},
		"the background, far away": {wide39K.Fields(wide39K.Background, -1e6, 1e6), 0},
		"empty range":              {wide39K.Fields(1e-9, 0.1, 0), 0},
		"pole at an end":           {curves["39K all"].Fields(1e-9, 0.03, curves["39K all"].Resonances[1].Position), 1},
		"range between knots":      {curves["39K all"].Fields(-1e-9, 0.036, 0.039), 0},
		"length NaN":               {wide39K.Fields(math.NaN(), 0, 1), 0},
		"length infinite":          {wide39K.Fields(math.Inf(1), 0, 1), 0},
		"range infinite":           {wide39K.Fields(1e-9, math.Inf(-1), 1), 0},
		"no resonance":             {ScatteringCurve{Background: 1e-9}.Fields(1e-9, 0, 1), 0},
		"negative field":           {curves["133Cs virtual"].Fields(-1000*si.BohrRadius, -0.1, 0.1), 1},
		"only at negative field":   {curves["133Cs virtual"].Fields(3000*si.BohrRadius, 0, 1), 0},
		"wide range, narrow curve": {curves["39K all"].Fields(309*si.BohrRadius, -1e9, 1e9), 3},
	} {
		if len(tc.got) != tc.want {
			t.Errorf("%s: got %v, want %d fields", name, tc.got, tc.want)
		}
	}
}

// TestDegenerateCurvesEnd: curves that Validate refuses still give an answer.
func TestDegenerateCurvesEnd(t *testing.T) {
	for _, c := range []ScatteringCurve{
		gaussCurve(20, 400, 0), gaussCurve(20, 400, 0, 300, 0), gaussCurve(20, 400, 50, 400, 50),
		gaussCurve(20, 400, -50, 350, 50), gaussCurve(0, 400, 50, 300, 20), gaussCurve(20, math.NaN(), 50, 300, 20),
		gaussCurve(20, 400, math.Inf(1), 300, 20), gaussCurve(1e300, 400, 1e300, 300, 1e300),
	} {
		for _, length := range []float64{0, 1e-9, -1e-9, 20 * si.BohrRadius} {
			for _, field := range c.Fields(length, -1, 1) {
				if math.IsNaN(field) || field < -1 || field > 1 {
					t.Errorf("%+v: field %g", c, field)
				}
			}
		}
		c.Crossings([]float64{0, 1, 0})
	}
}

func BenchmarkFields(b *testing.B) {
	for _, name := range []string{"39K wide", "39K all", "opposite widths"} {
		c := curves[name]
		length := c.at(0.02) // near the extreme of the last
		b.Run(name, func(b *testing.B) {
			b.ReportAllocs()
			for b.Loop() {
				c.Fields(length, 0, 0.12)
			}
		})
	}
}

// TestSlopeThatTouchesZero moves one curve into another until a maximum and a
// minimum have just merged. There the bounds of the slope decide nothing, and
// the search must still end and find the field.
func TestSlopeThatTouchesZero(t *testing.T) {
	random := rand.New(rand.NewPCG(13, 14))
	tested := 0
	for tested < 4 {
		from, to := randomCurve(random, 3), randomCurve(random, 3)
		count := func(share float64) int { return len(extremes(between(from, to, share), -6, 6)) }
		first := count(0)
		if count(1) == first {
			continue
		}
		tested++
		low, high := 0.0, 1.0
		for range 50 {
			if middle := (low + high) / 2; count(middle) == first {
				low = middle
			} else {
				high = middle
			}
		}
		for _, share := range []float64{low, high} {
			c := between(from, to, share)
			for _, field := range extremes(c, -6, 6) {
				length := c.at(field)
				ok := slices.ContainsFunc(c.Fields(length, -6, 6), func(found float64) bool {
					return math.Abs(c.excessOf(found, length)) <= 1e-14*math.Abs(length) && math.Abs(found-field) < 1e-4
				})
				if !ok {
					t.Errorf("curve %+v: a = %g m at %.12g T: got fields %v", c, length, field, c.Fields(length, -6, 6))
				}
			}
		}
	}
}

// between returns the curve at a share of the way from one to another.
func between(from, to ScatteringCurve, share float64) ScatteringCurve {
	c := ScatteringCurve{Background: from.Background + share*(to.Background-from.Background)}
	for i, r := range from.Resonances {
		end := to.Resonances[i]
		c.Resonances = append(c.Resonances, Resonance{
			Position: r.Position + share*(end.Position-r.Position),
			Width:    r.Width + share*(end.Width-r.Width),
		})
	}
	return c
}
