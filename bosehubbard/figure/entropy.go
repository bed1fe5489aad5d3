package figure

import "math"

// EntropyCurve is S(E) of a system that stands for the cloud, per atom or, for
// levels, per body.
type EntropyCurve struct {
	Name    string    // such as "10 sites, 10 atoms"
	Energy  []float64 // Hz, ascending
	Entropy []float64 // kB
	Beta    []float64 // dS/dE, 1/Hz; may be infinite at the ends
	Stale   bool      // of before: drawn dashed and soft, nothing is read off it
}

// counted is the part of the curve around its peak that counts at least one state:
// S >= 0. It is nil where there is none.
func (c *EntropyCurve) counted() *EntropyCurve {
	if c == nil || len(c.Energy) < 2 || len(c.Entropy) != len(c.Energy) || len(c.Beta) != len(c.Energy) {
		return nil
	}
	peak := 0
	for i, s := range c.Entropy {
		if s > c.Entropy[peak] {
			peak = i
		}
	}
	first, past := peak, peak
	for first > 0 && c.Entropy[first-1] >= 0 {
		first--
	}
	for past < len(c.Entropy) && c.Entropy[past] >= 0 {
		past++
	}
	if past-first < 2 || !(c.Entropy[peak] > 0) {
		return nil
	}
	return &EntropyCurve{c.Name, c.Energy[first:past], c.Entropy[first:past], c.Beta[first:past], c.Stale}
}

// EntropyPoint is a place on S(E).
type EntropyPoint struct {
	Hz      float64 // energy per atom
	Entropy float64 // per atom, kB
	Beta    float64 // 1/Hz
	At      Point
}

// EntropyPanel is S(E) beside the bars: S/N to the right, the energy as everywhere.
type EntropyPanel struct {
	Name    string
	Box     Rect
	Largest float64 // S/N at the peak, kB; stands at 90 % of the width
	Stale   bool    // of before: no state, no ticks

	Points  []EntropyPoint
	Peak    EntropyPoint  // where beta is 0 and S is largest
	State   *EntropyPoint // nil where the state is not known or off the curve
	Tangent [2]Point      // at the state

	PerUnit float64      // Hz of the unit in which the ruler counts kB
	Unit    string       // of the ruler
	Ticks   []RulerTick  // of -1/T, from the lowest to the highest energy
	Spans   [][2]float64 // energies, Hz, between which -1/T is single-valued
	rising  []float64    // -1/T there, 1/Hz
}

// RulerTick is a value of -1/T at the energy of that temperature.
type RulerTick struct {
	Value float64 // -dS/dE in kB per unit
	Hz, Y float64
}

const (
	peakShare     = 0.9  // of the panel's width at the largest S
	tangentLength = 64.0 // px
)

// X returns the place of an entropy in kB.
func (e *EntropyPanel) X(entropy float64) float64 {
	return e.Box.X0 + peakShare*e.Box.Width()*entropy/e.Largest
}

// Entropy returns the entropy at a place, kB.
func (e *EntropyPanel) Entropy(x float64) float64 {
	return (x - e.Box.X0) * e.Largest / (peakShare * e.Box.Width())
}

// at interpolates between two neighbours; ok is false off the curve.
func (e *EntropyPanel) at(hz float64) (p EntropyPoint, ok bool) {
	for i := 0; i+1 < len(e.Points); i++ {
		a, b := e.Points[i], e.Points[i+1]
		if hz < a.Hz || hz > b.Hz {
			continue
		}
		t := (hz - a.Hz) / (b.Hz - a.Hz)
		p = EntropyPoint{Hz: hz, Entropy: a.Entropy + t*(b.Entropy-a.Entropy), Beta: slopeBetween(a.Beta, b.Beta, t)}
		return p, true
	}
	return EntropyPoint{}, false
}

// slopeBetween interpolates; next to an infinite value it takes the nearer one.
func slopeBetween(a, b, t float64) float64 {
	switch {
	case !math.IsInf(a, 0) && !math.IsInf(b, 0):
		return a + t*(b-a)
	case t < 0.5:
		return a
	}
	return b
}

// entropy lays out S(E), if there is a curve.
func (b *builder) entropy() {
	g := b.g
	if g.Entropy == nil {
		return
	}
	e, curve := g.Entropy, b.curve
	e.Name, e.Stale = curve.Name, curve.Stale
	for i, hz := range curve.Energy {
		p := EntropyPoint{Hz: hz, Entropy: curve.Entropy[i], Beta: curve.Beta[i]}
		e.Largest = math.Max(e.Largest, p.Entropy)
		e.Points = append(e.Points, p)
	}
	for i := range e.Points {
		b.locate(&e.Points[i])
	}
	e.Peak = e.peak()
	b.locate(&e.Peak)
	if g.State != nil && !e.Stale {
		if p, ok := e.at(g.State.Hz); ok {
			b.locate(&p)
			e.State = &p
			e.Tangent = b.tangent(p)
		}
	}
	b.ruler()
}

// locate gives a point its place.
func (b *builder) locate(p *EntropyPoint) {
	p.At = Point{b.g.Entropy.X(p.Entropy), b.g.Scale.Y(p.Hz)}
}

// peak is where beta changes its sign next to the largest S.
func (e *EntropyPanel) peak() EntropyPoint {
	top := 0
	for i, p := range e.Points {
		if p.Entropy > e.Points[top].Entropy {
			top = i
		}
	}
	for i := max(top-1, 0); i <= top && i+1 < len(e.Points); i++ {
		a, b := e.Points[i], e.Points[i+1]
		if a.Beta >= 0 && b.Beta < 0 && !math.IsInf(a.Beta-b.Beta, 0) {
			t := a.Beta / (a.Beta - b.Beta)
			return EntropyPoint{Hz: a.Hz + t*(b.Hz-a.Hz), Entropy: e.Largest}
		}
	}
	p := e.Points[top]
	p.Beta = 0
	return p
}

// tangent has the slope beta = dS/dE on the scales of the panel: it leans left as it
// rises where T < 0, and is upright at T = ±∞.
func (b *builder) tangent(p EntropyPoint) [2]Point {
	e, s := b.g.Entropy, b.g.Scale
	up := (s.Bottom - s.Top) / 2 / s.HalfRange              // px per Hz
	right := p.Beta * peakShare * e.Box.Width() / e.Largest // px per Hz
	dx, dy := math.Copysign(tangentLength/2, p.Beta), 0.0   // at T = ±0
	if size := math.Hypot(up, right); !math.IsInf(size, 0) {
		dx, dy = tangentLength/2*right/size, tangentLength/2*up/size
	}
	return [2]Point{{p.At.X - dx, p.At.Y + dy}, {p.At.X + dx, p.At.Y - dy}}
}
