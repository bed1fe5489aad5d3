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
	if e.Stale {
		return
	}
	e.Spans = e.singleValued()
	room := tickRoom * b.style.text()
	add := func(value float64) {
		hz, ok := e.energyAt(value / e.PerUnit)
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

// singleValued finds the branch around the peak on which -1/T rises with the energy,
// so that each value has one place. Levels of a small system make dS/dE rough: where
// its mean over a few points rises further, that is taken.
func (e *EntropyPanel) singleValued() [][2]float64 {
	e.rising = make([]float64, len(e.Points))
	for i, p := range e.Points {
		e.rising[i] = -p.Beta
	}
	top := 0
	for i, p := range e.Points {
		if p.Entropy > e.Points[top].Entropy {
			top = i
		}
	}
	smooth := means(e.rising, len(e.rising)/smoothing)
	first, last := branch(e.rising, top)
	if a, b := branch(smooth, top); b-a > last-first {
		first, last, e.rising = a, b, smooth
	}
	if first == last {
		return nil
	}
	return [][2]float64{{e.Points[first].Hz, e.Points[last].Hz}}
}

// smoothing is which part of the curve dS/dE is averaged over, to either side.
const smoothing = 32

// branch is how far a list rises around one of its places.
func branch(v []float64, top int) (first, last int) {
	first, last = top, top
	for first > 0 && v[first-1] < v[first] {
		first--
	}
	for last+1 < len(v) && v[last+1] > v[last] {
		last++
	}
	return first, last
}

// means averages each entry with so many on either side, fewer at the ends.
func means(v []float64, reach int) []float64 {
	out := make([]float64, len(v))
	for i := range v {
		near := min(reach, i, len(v)-1-i)
		sum := 0.0
		for _, x := range v[i-near : i+near+1] {
			sum += x
		}
		out[i] = sum / float64(2*near+1)
	}
	return out
}

// energyAt returns the energy of a value of -dS/dE on the branch; ok is false off it.
func (e *EntropyPanel) energyAt(cold float64) (hz float64, ok bool) {
	for _, span := range e.Spans {
		for i := 0; i+1 < len(e.Points); i++ {
			p, q, a, b := e.Points[i].Hz, e.Points[i+1].Hz, e.rising[i], e.rising[i+1]
			if p < span[0] || q > span[1] || a > cold || b < cold || math.IsInf(b-a, 0) {
				continue
			}
			return p + (cold-a)/(b-a)*(q-p), true
		}
	}
	return 0, false
}
