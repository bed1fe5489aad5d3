package figure

import (
	"math"
	"strings"

	"gonum.org/v1/plot"
)

// ScaleKind says how values are spaced along an axis.
type ScaleKind int

// The scales of axes.
const (
	Linear ScaleKind = iota
	Log
	// Square spaces v as v|v|, so that lengths of signed frequencies add as their
	// squares do.
	Square
)

// forward maps a value to where it stands before the axis is stretched. Values
// that a log axis cannot show are far below it.
func (k ScaleKind) forward(v float64) float64 {
	switch k {
	case Log:
		if !(v > 0) {
			return -400
		}
		return math.Log10(v)
	case Square:
		return v * math.Abs(v)
	}
	return v
}

// back undoes forward.
func (k ScaleKind) back(t float64) float64 {
	switch k {
	case Log:
		return math.Pow(10, t)
	case Square:
		return math.Copysign(math.Sqrt(math.Abs(t)), t)
	}
	return t
}

// Range is a part of an axis; the zero value leaves the choice to the picture.
type Range struct{ Low, High float64 }

// IsZero reports whether the range leaves the choice open.
func (r Range) IsZero() bool { return r == Range{} }

// valid reports whether an axis of this kind can show the range.
func (r Range) valid(k ScaleKind) bool {
	low, high := k.forward(r.Low), k.forward(r.High)
	return high-low > 1e-12*math.Max(math.Abs(low), math.Abs(high)) && !math.IsInf(high-low, 0) &&
		(k != Log || r.Low > 0)
}

// Axis is one axis of a chart.
type Axis struct {
	Label string
	Unit  string
	Kind  ScaleKind
	Range Range
	// names replaces the numbers; the first ones stay where there is no room for
	// all.
	names []plot.Tick
}

// title is what stands along the axis.
func (a Axis) title() string {
	if a.Unit == "" {
		return a.Label
	}
	return a.Label + " (" + a.Unit + ")"
}

// Normalize implements plot.Normalizer.
func (k ScaleKind) Normalize(low, high, v float64) float64 {
	from := k.forward(low)
	return (k.forward(v) - from) / (k.forward(high) - from)
}

// marks returns the ticks of an axis that is length px long, its labels at least
// apart px from middle to middle.
func (a Axis) marks(r Range, length, apart float64) []plot.Tick {
	switch {
	case a.names != nil:
		return nameMarks(a.names, r, length, apart)
	case a.Kind == Log:
		return logMarks(r, length, apart)
	case a.Kind == Square:
		return squareMarks(r, length, apart)
	}
	step := niceAbove((r.High - r.Low) * apart / length)
	decimals := int(math.Max(0, -math.Floor(math.Log10(step)+1e-9)))
	var ticks []plot.Tick
	for n := math.Ceil(r.Low/step - 1e-9); n*step <= r.High+1e-9*step && len(ticks) < 200; n++ {
		ticks = append(ticks, plot.Tick{Value: n * step, Label: tickLabel(n*step, step, decimals)})
	}
	return ticks
}

func tickLabel(v, step float64, decimals int) string {
	if step < 1e-4 || math.Abs(v) >= 1e7 {
		return Number(v, 4)
	}
	return decimal(v, decimals)
}

// nameMarks keeps the names that do not come too close to one before them.
func nameMarks(names []plot.Tick, r Range, length, apart float64) []plot.Tick {
	unit := length / (r.High - r.Low)
	var kept []plot.Tick
next:
	for _, name := range names {
		for _, k := range kept {
			if math.Abs(k.Value-name.Value)*unit < 0.99*apart {
				continue next
			}
		}
		kept = append(kept, name)
	}
	return kept
}

// logMarks labels decades, every few of them where they are close, and 1, 2, 5
// where there is less than two; the other whole multiples are short ticks.
func logMarks(r Range, length, apart float64) []plot.Tick {
	low, high := math.Log10(r.Low), math.Log10(r.High)
	decade := length / (high - low)
	every := math.Max(1, math.Ceil(apart/decade))
	var ticks []plot.Tick
	for d := math.Floor(low); d <= math.Ceil(high) && len(ticks) < 400; d++ {
		for m := 1.0; m < 10; m++ {
			v := m * math.Pow(10, d)
			if v < r.Low*(1-1e-9) || v > r.High*(1+1e-9) {
				continue
			}
			label := ""
			if m == 1 && math.Mod(d, every) == 0 || (m == 2 || m == 5) && decade > 3.5*apart {
				label = Number(v, 3)
			}
			if label != "" || decade > 40 || m == 1 {
				ticks = append(ticks, plot.Tick{Value: v, Label: label})
			}
		}
	}
	return ticks
}

// squareMarks labels frequencies from the outside in until they come too close.
func squareMarks(r Range, length, apart float64) []plot.Tick {
	reach := math.Max(math.Abs(r.Low), math.Abs(r.High))
	step := niceAbove(reach / 8)
	at := func(v float64) float64 { return Square.Normalize(r.Low, r.High, v) * length }
	ticks := []plot.Tick{{Value: 0, Label: "0"}}
	for _, sign := range [...]float64{1, -1} {
		before := math.Inf(1)
		for n := math.Floor(reach / step); n > 0; n-- {
			v := sign * n * step
			place := math.Abs(at(v) - at(0))
			if v < r.Low || v > r.High || place < apart || before-place < apart {
				continue
			}
			ticks = append(ticks, plot.Tick{Value: v, Label: Signed(v, 3)})
			before = place
		}
	}
	return ticks
}

// around returns a range that holds all values, with part of its length to spare
// at both ends. Without values it is 0 to 1.
func around(kind ScaleKind, part float64, values ...[]float64) Range {
	low, high := math.Inf(1), math.Inf(-1)
	for _, list := range values {
		for _, v := range list {
			if t := kind.forward(v); !math.IsNaN(v) && !math.IsInf(v, 0) && (kind != Log || v > 0) {
				low, high = math.Min(low, t), math.Max(high, t)
			}
		}
	}
	if low > high {
		return Range{kind.back(0), kind.back(1)}
	}
	spare := part * (high - low)
	if high == low {
		spare = math.Max(0.1, 0.1*math.Abs(high))
	}
	return Range{kind.back(low - spare), kind.back(high + spare)}
}

// join names several things in a row.
func join(names []string) string { return strings.Join(names, ", ") }
