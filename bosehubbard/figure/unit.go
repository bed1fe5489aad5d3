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
	var end *report.Stage
	if r != nil {
		end = last(r)
	}
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
	return m.prefixed(half)
}

// ofRecoil is a unit where only the recoil energy in Hz is known, with a prefix for
// energies up to largest, in Hz.
func (u Unit) ofRecoil(recoil, largest float64) measureOf {
	m := measureOf{Hertz.String(), 1}
	switch {
	case u == Recoil && recoil > 0:
		m = measureOf{u.String(), recoil}
	case u == NanoKelvin:
		m = measureOf{u.String(), u.hz(nil)}
	}
	return m.prefixed(largest / m.hz)
}

func (m measureOf) prefixed(half float64) measureOf {
	for _, p := range prefixes[m.name] {
		if half >= p.from {
			return measureOf{p.name, m.hz * p.times}
		}
	}
	return m
}

type prefix struct {
	from  float64 // used for numbers from here on
	name  string
	times float64
}

var prefixes = map[string][]prefix{
	"Hz": {{1e8, "MHz", 1e6}, {1e5, "kHz", 1e3}, {0.1, "Hz", 1}, {0, "mHz", 1e-3}},
	"nK": {{1e8, "mK", 1e6}, {1e5, "µK", 1e3}, {0.1, "nK", 1}, {0, "pK", 1e-3}},
}

// signed writes an energy in Hz with sign and unit; one far beyond the range gets a
// prefix of its own.
func (m measureOf) signed(hz float64, digits int) string {
	if v := math.Abs(hz / m.hz); v >= 1e5 {
		m = m.prefixed(v)
	}
	if v := hz / m.hz; math.Abs(v) >= 1e6 {
		return plus(v) + exponent(v, min(digits, 3)) + " " + m.name
	}
	return Signed(hz/m.hz, digits) + " " + m.name
}

// plus is the sign of a positive number.
func plus(v float64) string {
	if v > 0 {
		return "+"
	}
	return ""
}

// list returns energies in Hz in the unit.
func (m measureOf) list(hz []float64) []float64 {
	out := make([]float64, len(hz))
	for i, v := range hz {
		out[i] = v / m.hz
	}
	return out
}
