package figure

import (
	"math"

	"hilltop/bosehubbard/report"
)

// SizeLine sets the energies of the model side by side on a log line.
type SizeLine struct {
	Box       Rect
	X0, X1, Y float64
	Low, High float64 // decades at the ends
	Marks     []SizeMark
	Zero      []string // what is 0 and cannot stand on the line
}

// SizeMark is one energy; V counts per site squared.
type SizeMark struct {
	Name string
	Hz   float64
	X    float64
}

// X returns the place of an energy in Hz.
func (s *SizeLine) X(hz float64) float64 {
	return s.X0 + (math.Log10(hz)-s.Low)/(s.High-s.Low)*(s.X1-s.X0)
}

// Hz returns the energy at a place.
func (s *SizeLine) Hz(x float64) float64 {
	return math.Pow(10, s.Low+(x-s.X0)/(s.X1-s.X0)*(s.High-s.Low))
}

// sizes places |V|, J, |U|, zJ and the gap.
func (b *builder) sizes() {
	line := &b.g.Size
	t := b.style.text()
	line.X0, line.X1 = b.g.Plot.X0, b.g.Ruler.X0+12*t
	line.Y = (line.Box.Y0 + line.Box.Y1) / 2
	marks := sizesOf(b.report, b.options.LatticeAxes)
	low, high := math.Inf(1), math.Inf(-1)
	for _, m := range marks {
		if m.Hz > 0 {
			low, high = math.Min(low, m.Hz), math.Max(high, m.Hz)
		}
	}
	if !(low <= high) {
		low, high = 1, 1
	}
	line.Low, line.High = math.Floor(math.Log10(low)-0.2), math.Ceil(math.Log10(high)+0.2)
	for _, m := range marks {
		if m.Hz == 0 {
			line.Zero = append(line.Zero, m.Name)
			continue
		}
		m.X = line.X(m.Hz)
		line.Marks = append(line.Marks, m)
	}
}

// sizesOf lists the energies at the end of a report's last stage.
func sizesOf(r *report.Report, latticeAxes []string) []SizeMark {
	end := last(r)
	if end == nil {
		return nil
	}
	var v, j, zj, gap float64
	gap = math.Inf(1)
	for _, t := range r.Ceiling.Terms {
		name := axisOf(t.Term)
		if name == "" || t.Reason != "" {
			continue
		}
		if axis := int(name[0] - 'x'); axis < len(end.CurvatureHz) {
			v = math.Max(v, math.Abs(end.CurvatureHz[axis]))
		}
		k := latticeIndex(name, latticeAxes)
		if k < len(end.TunnellingHz) {
			j = math.Max(j, math.Abs(end.TunnellingHz[k]))
			zj += 2 * math.Abs(end.TunnellingHz[k])
		}
		if k < len(end.GapHz) {
			gap = math.Min(gap, end.GapHz[k])
		}
	}
	list := []SizeMark{{Name: "|V|", Hz: v}, {Name: "J", Hz: j}}
	if end.InteractionHz != nil {
		list = append(list, SizeMark{Name: "|U|", Hz: math.Abs(*end.InteractionHz)})
	}
	list = append(list, SizeMark{Name: "zJ", Hz: zj})
	if !math.IsInf(gap, 0) {
		list = append(list, SizeMark{Name: "gap", Hz: gap})
	}
	return list
}

// latticeIndex is the place of an axis in lattice.axes.
func latticeIndex(axis string, order []string) int {
	for i, name := range order {
		if name == axis {
			return i
		}
	}
	return int(axis[0] - 'x')
}
