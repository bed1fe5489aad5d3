package figure

import (
	"math"

	"hilltop/bosehubbard/report"
	"hilltop/bosehubbard/si"
)

// Unit is what energies are shown in.
type Unit int

// The units of energy.
const (
	Hertz      Unit = iota
	Recoil          // of the first lattice axis
	NanoKelvin      // E/kB
	Tunnelling      // |J| of the axis with the largest J
)

// String returns the sign of the unit: Hz, Er, nK or J.
func (u Unit) String() string { return [...]string{"Hz", "Er", "nK", "J"}[u] }

// Units lists the units that a report can be shown in.
func Units(r *report.Report) []Unit {
	var list []Unit
	for u := Hertz; u <= Tunnelling; u++ {
		if u.hz(r) > 0 {
			list = append(list, u)
		}
	}
	return list
}

// hz returns the energy of one unit in Hz, or 0 where the report has none.
func (u Unit) hz(r *report.Report) float64 {
	end := last(r)
	switch u {
	case NanoKelvin:
		return 1 / (si.KelvinFromHz(1) * 1e9)
	case Recoil:
		if end != nil && len(end.RecoilHz) > 0 {
			return end.RecoilHz[0]
		}
		return 0
	case Tunnelling:
		largest := 0.0
		if end != nil {
			for _, j := range end.TunnellingHz {
				largest = math.Max(largest, math.Abs(j))
			}
		}
		return largest
	}
	return 1
}

// last is the stage the verdict is for: the last one, or the start.
func last(r *report.Report) *report.Stage {
	if n := len(r.Stages); n > 0 {
		return &r.Stages[n-1]
	}
	return r.Start
}

// measureOf is a unit with a prefix that suits a range.
type measureOf struct {
	name string
	hz   float64 // of one
}

// prefixed picks the prefix of a unit for numbers up to half, in the unit.
func (u Unit) prefixed(r *report.Report, half float64) measureOf {
	m := measureOf{u.String(), u.hz(r)}
	if !(m.hz > 0) {
		m = measureOf{"Hz", 1}
	}
	type step struct {
		from  float64
		name  string
		times float64
	}
	steps := map[string][]step{
		"Hz": {{1e8, "MHz", 1e6}, {1e5, "kHz", 1e3}, {0.1, "Hz", 1}, {0, "mHz", 1e-3}},
		"nK": {{1e8, "mK", 1e6}, {1e5, "µK", 1e3}, {0.1, "nK", 1}, {0, "pK", 1e-3}},
	}
	for _, s := range steps[m.name] {
		if half >= s.from {
			return measureOf{s.name, m.hz * s.times}
		}
	}
	return m
}

// signed writes an energy in Hz with sign and unit.
func (m measureOf) signed(hz float64, digits int) string {
	return Signed(hz/m.hz, digits) + " " + m.name
}
