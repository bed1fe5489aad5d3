package figure

import (
	"math"
	"slices"

	"hilltop/bosehubbard/atom"
	"hilltop/bosehubbard/report"
	"hilltop/bosehubbard/si"
)

// Scattering shows the scattering length against the field with the path of the
// sequence on it. Fields are in G, lengths in a0.
type Scattering struct {
	Fields, Lengths []float64 // a NaN parts the curve at a pole
	Poles, Zeros    []float64
	Path            []FieldStep
	Range           Range // of the lengths
}

// FieldStep is the end of a stage.
type FieldStep struct {
	Name          string
	Field, Length float64
}

// NewScattering takes the path from a report: the start and the end of every
// stage.
func NewScattering(curve atom.ScatteringCurve, r *report.Report) *Scattering {
	s := &Scattering{}
	add := func(stage *report.Stage) {
		if stage != nil && stage.FieldG != nil && stage.ScatteringLengthA0 != nil {
			s.Path = append(s.Path, FieldStep{stage.Name, *stage.FieldG, *stage.ScatteringLengthA0})
		}
	}
	add(r.Start)
	for i := range r.Stages {
		add(&r.Stages[i])
	}
	shown := s.fields(curve)
	s.Range = s.lengths(curve)
	s.sample(curve, shown)
	return s
}

// fields is the range to show: the path, and with it what lies within its length
// on either side, at least 20 G, so that the next pole and zero are seen.
func (s *Scattering) fields(curve atom.ScatteringCurve) Range {
	low, high := math.Inf(1), math.Inf(-1)
	for _, p := range s.Path {
		low, high = math.Min(low, p.Field), math.Max(high, p.Field)
	}
	special := inGauss(append(curve.Poles(), curve.Zeros()...))
	if low > high { // no path: what is special
		for _, b := range special {
			low, high = math.Min(low, b), math.Max(high, b)
		}
	}
	if low > high {
		return Range{0, 1000}
	}
	reach := math.Max(20, 0.6*(high-low))
	from, to := low, high
	for _, b := range special {
		if b > low-reach && b < high+reach {
			from, to = math.Min(from, b), math.Max(to, b)
		}
	}
	spare := math.Max(1, 0.08*(to-from))
	return Range{math.Max(0, from-spare), to + spare}
}

// lengths is the range of a: it holds the ends of all stages.
func (s *Scattering) lengths(curve atom.ScatteringCurve) Range {
	largest := math.Abs(curve.Background) / si.BohrRadius
	for _, p := range s.Path {
		largest = math.Max(largest, math.Abs(p.Length))
	}
	if largest == 0 {
		largest = 1
	}
	half := niceReach(1.25 * largest)
	return Range{-half, half}
}

// sample follows the curve between poles, more closely near them.
func (s *Scattering) sample(curve atom.ScatteringCurve, shown Range) {
	const points = 240
	var fields []float64
	for i := range points + 1 {
		fields = append(fields, shown.Low+(shown.High-shown.Low)*float64(i)/points)
	}
	s.Zeros = within(inGauss(curve.Zeros()), shown)
	s.Poles = within(inGauss(curve.Poles()), shown)
	for _, pole := range s.Poles {
		for d := (shown.High - shown.Low) / points; d > 1e-7*(shown.High-shown.Low); d /= 1.4 {
			fields = append(fields, pole-d, pole+d)
		}
		fields = append(fields, pole)
	}
	for _, p := range s.Path {
		fields = append(fields, p.Field)
	}
	slices.Sort(fields)
	for _, b := range within(slices.Compact(append(fields, s.Zeros...)), shown) {
		length, err := curve.At(b * si.Gauss)
		if err != nil || slices.Contains(s.Poles, b) {
			length = math.NaN()
		} else {
			length /= si.BohrRadius
		}
		s.Fields = append(s.Fields, b)
		s.Lengths = append(s.Lengths, length)
	}
}

func inGauss(fields []float64) []float64 {
	out := make([]float64, len(fields))
	for i, b := range fields {
		out[i] = b / si.Gauss
	}
	return out
}

func within(values []float64, r Range) []float64 {
	var out []float64
	for _, v := range values {
		if v >= r.Low && v <= r.High {
			out = append(out, v)
		}
	}
	slices.Sort(out)
	return out
}

// Chart draws the curve thin, the path thick on it, the ends of stages as discs,
// poles as lines and zeros as circles.
func (s *Scattering) Chart() *Chart {
	c := &Chart{
		Name:  "scattering",
		Title: "Scattering length",
		X:     Axis{Label: "field", Unit: "G"},
		Y:     Axis{Label: "a", Unit: "a0", Range: s.Range},
	}
	c.X.Range = around(Linear, 0, s.Fields)
	c.Curves = []Curve{{Name: "a", X: s.Fields, Y: s.Lengths, Width: 1.5, Soft: true}}
	c.Curves = append(c.Curves, s.paths()...)
	for _, pole := range s.Poles {
		c.Rules = append(c.Rules, Rule{Name: "pole " + Number(pole, 5) + " G", X: pole, Dash: Dashed})
	}
	for _, zero := range s.Zeros {
		c.Marks = append(c.Marks, Mark{Name: "zero " + Number(zero, 5) + " G", X: zero, Open: true})
	}
	c.Marks = append(c.Marks, s.stops()...)
	c.under = func(p *pen, a Area) {
		if y := a.Pixel(a.X.Low, 0).Y; y > a.Y0 && y < a.Y1 {
			p.line(stroke{width: 1, color: p.style.Palette.Edge}, Point{a.X0, y}, Point{a.X1, y})
		}
	}
	return c
}

// paths are the parts of the curve that the sequence runs along.
func (s *Scattering) paths() []Curve {
	var list []Curve
	for i := 0; i+1 < len(s.Path); i++ {
		from, to := s.Path[i].Field, s.Path[i+1].Field
		if from == to {
			continue
		}
		low, high := math.Min(from, to), math.Max(from, to)
		u := Curve{Width: 5}
		for k, b := range s.Fields {
			if b >= low && b <= high {
				u.X, u.Y = append(u.X, b), append(u.Y, s.Lengths[k])
			}
		}
		list = append(list, u)
	}
	return list
}

// stops joins the stages that end at the same field.
func (s *Scattering) stops() []Mark {
	var list []Mark
	var names [][]string
next:
	for _, p := range s.Path {
		for i := range list {
			if list[i].X == p.Field {
				names[i] = append(names[i], p.Name)
				continue next
			}
		}
		list = append(list, Mark{X: p.Field, Y: p.Length})
		names = append(names, []string{p.Name})
	}
	for i := range list {
		list[i].Name = stagesName(names[i]) + ": " + Signed(list[i].Y, 3) + " a0"
	}
	return list
}
