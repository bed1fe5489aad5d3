package figure

import (
	"math"
	"slices"
)

// tickRoom is the least distance of two ticks of the ruler, px.
const tickRoom = 18.0

// ruler places -1/T = -dS/dE: ticks at 0, then at 0.1, 0.2, 0.5, ... of either sign
// where there is room, the smaller first.
func (b *builder) ruler() {
	e := b.g.Entropy
	e.PerUnit, e.Unit = Tunnelling.hz(b.report), "kB/J"
	if !(e.PerUnit > 0) {
		e.PerUnit, e.Unit = e.decade()
	}
	e.Spans = e.singleValued()
	room := tickRoom * b.style.text()
	add := func(value float64) {
		hz, ok := e.energyAt(-value / e.PerUnit)
		if !ok || !b.g.Scale.Holds(hz) {
			return
		}
		y := b.g.Scale.Y(hz)
		for _, t := range e.Ticks {
			if math.Abs(t.Y-y) < room {
				return
			}
		}
		e.Ticks = append(e.Ticks, RulerTick{Value: value, Hz: hz, Y: y})
	}
	add(0)
	for power := 0.1; power < 2e4; power *= 10 {
		for _, m := range [...]float64{1, 2, 5} {
			add(m * power)
			add(-m * power)
		}
	}
	slices.SortFunc(e.Ticks, func(a, b RulerTick) int {
		if a.Hz < b.Hz {
			return -1
		}
		return 1
	})
}

// decade is the unit of the ruler where there is no tunnelling: Hz with the prefix
// in which a typical |beta| is of the order of one.
func (e *EntropyPanel) decade() (hz float64, unit string) {
	width := e.Points[len(e.Points)-1].Hz - e.Points[0].Hz
	typical := e.Largest / (width / 2)
	for _, p := range [...]prefix{{0.01, "kB/Hz", 1}, {1e-5, "kB/kHz", 1e3}, {1e-8, "kB/MHz", 1e6}} {
		if typical >= p.from {
			return p.times, p.name
		}
	}
	return 1e9, "kB/GHz"
}

// singleValued lists where no other energy has the same -1/T: all that lies below
// has a smaller one, all above a larger one.
func (e *EntropyPanel) singleValued() [][2]float64 {
	n := len(e.Points)
	above := make([]float64, n+1) // the smallest -beta from i on
	above[n] = math.Inf(1)
	for i := n - 1; i >= 0; i-- {
		above[i] = math.Min(above[i+1], -e.Points[i].Beta)
	}
	var spans [][2]float64
	below := math.Inf(-1)
	for i := 0; i+1 < n; i++ {
		p, q := e.Points[i], e.Points[i+1]
		below = math.Max(below, -p.Beta)
		if !(-p.Beta >= below && -q.Beta <= above[i+1] && -q.Beta > -p.Beta) {
			continue
		}
		if k := len(spans); k > 0 && spans[k-1][1] == p.Hz {
			spans[k-1][1] = q.Hz
		} else {
			spans = append(spans, [2]float64{p.Hz, q.Hz})
		}
	}
	return spans
}

// energyAt returns the only energy with a beta; ok is false where there is none or
// more than one.
func (e *EntropyPanel) energyAt(beta float64) (hz float64, ok bool) {
	for _, span := range e.Spans {
		for i := 0; i+1 < len(e.Points); i++ {
			p, q := e.Points[i], e.Points[i+1]
			if p.Hz < span[0] || q.Hz > span[1] || p.Beta < beta || q.Beta > beta || math.IsInf(p.Beta-q.Beta, 0) {
				continue
			}
			return p.Hz + (p.Beta-beta)/(p.Beta-q.Beta)*(q.Hz-p.Hz), true
		}
	}
	return 0, false
}
