package figure

import (
	"math"

	"hilltop/bosehubbard/report"
)

// EnergyScale maps an energy per atom to a height: linear, zero in the middle.
type EnergyScale struct {
	Top, Bottom float64 // y of +HalfRange and -HalfRange
	HalfRange   float64 // Hz
}

// Y returns the height of an energy in Hz.
func (s EnergyScale) Y(hz float64) float64 {
	return s.zero() - hz/s.HalfRange*(s.Bottom-s.Top)/2
}

// Hz returns the energy at a height.
func (s EnergyScale) Hz(y float64) float64 {
	return (s.zero() - y) * s.HalfRange / ((s.Bottom - s.Top) / 2)
}

func (s EnergyScale) zero() float64 { return (s.Top + s.Bottom) / 2 }

// Holds reports whether an energy lies within the range.
func (s EnergyScale) Holds(hz float64) bool { return math.Abs(hz) <= s.HalfRange }

// inset keeps lids at the ends of the range out of the sky and the ground, px.
const inset = 8.0

// chooseScale sets the range: the smallest of 1, 2, 5 x 10^n, in the unit shown,
// that holds what has to be seen.
func (b *builder) chooseScale() {
	one := b.options.Unit.hz(b.report)
	if !(one > 0) {
		b.options.Unit, one = Hertz, 1
	}
	half := b.options.HalfRange
	if !(half > 0) || math.IsInf(half, 0) {
		half = 1
		if largest := b.toHold(); largest > 0 {
			half = niceAbove(largest / one)
		}
	}
	b.unit = b.options.Unit.prefixed(b.report, half)
	b.g.unit = b.unit
	b.g.Scale = EnergyScale{Top: b.g.Sky.Y1 + inset, Bottom: b.g.Ground.Y0 - inset, HalfRange: half * one}
	step := half / 2
	for _, v := range [...]float64{0, 2, -2, 1, -1} { // the most telling first
		hz := v * step * one
		b.g.Ticks = append(b.g.Ticks, Tick{Hz: hz, Y: b.g.Scale.Y(hz)})
	}
}

// toHold is the largest energy, Hz, that has to be within the range.
func (b *builder) toHold() float64 {
	c := &b.report.Ceiling
	largest := 0.0
	hold := func(bounds ...report.Bound) {
		for _, bound := range bounds {
			if bound.Known && !bound.Unbounded() {
				largest = math.Max(largest, math.Abs(bound.Hz))
			}
		}
	}
	if state := b.options.State; state != nil {
		largest = math.Abs(*state)
		if b.options.ScaleTo == "state" {
			return largest
		}
	}
	for _, t := range c.Terms {
		if b.options.ScaleTo == t.Term {
			largest = 0
			hold(t.Floor, t.Ceiling)
			return largest
		}
	}
	if b.options.ScaleTo == "total" || b.options.Ladder != nil {
		largest = 0
		hold(c.Total.Floor, c.Total.Ceiling)
		return largest
	}
	hold(b.counting(c.Total))
	for _, t := range c.Terms {
		if t.Term == "kinetic" && b.g.Upwards {
			hold(t.Floor)
		} else if t.Term == "kinetic" {
			hold(t.Ceiling)
		}
	}
	if largest == 0 { // nothing bounded but zero: show what there is
		for _, t := range c.Terms {
			hold(t.Floor, t.Ceiling)
		}
	}
	return largest
}

// HalfRange returns the half-range in the unit of the options, to freeze it.
func (g *Geometry) HalfRange(r *report.Report, u Unit) float64 {
	one := u.hz(r)
	if !(one > 0) {
		one = 1
	}
	return g.Scale.HalfRange / one
}
