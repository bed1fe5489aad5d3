package ceiling

import "math"

// Sign is the wanted sign of the temperature.
type Sign int

// The two signs of T.
const (
	Negative Sign = -1
	Positive Sign = +1
)

// Motion is what atoms do along an axis during the hold.
type Motion string

// The motions along an axis.
const (
	Moving  Motion = "moving"
	Layered Motion = "layered"
	Frozen  Motion = "frozen"
)

// Interval is a floor and a ceiling in Hz; an infinite end is unbounded.
type Interval struct{ Floor, Ceiling float64 }

func (i Interval) plus(j Interval) Interval {
	return Interval{i.Floor + j.Floor, i.Ceiling + j.Ceiling}
}

// Width is the ceiling less the floor.
func (i Interval) Width() float64 { return i.Ceiling - i.Floor }

// Axis holds the terms along one lattice axis, E/h in Hz.
type Axis struct {
	Name       string   // "x", "y" or "z"
	Tunnelling float64  // J
	Band       Interval // edges of the lowest band about its centre
	Gap        float64  // smallest gap to the next band; +Inf for a single-band model
	Curvature  float64  // V, Hz per site squared
	Trap       float64  // signed trap frequency, Hz, of an apparatus
	Tilt       float64  // F, Hz per site
}

// Box is the finite system of a model plan.
type Box struct {
	Sites []int // per axis, in the order of Axes
	Atoms int
	Fock  []int // atoms per site, first axis fastest; nil where no state is given
}

// System is all that the verdict needs.
type System struct {
	Sign        Sign
	Axes        []Axis
	Interaction float64 // U, Hz
	// ScatteringLength, m, stands for U where the lattice is too shallow to have
	// one; HasInteraction says which holds.
	ScatteringLength float64
	HasInteraction   bool
	Hold             float64 // s
	Box              *Box    // nil for an apparatus
	// EdgeDrop is how far the potential falls (T < 0) or rises (T > 0), Hz, from
	// the centre to where the beams stop helping, on the weakest way out. It is
	// called once, only where every moving axis has the right curvature, and is
	// nil for a model.
	EdgeDrop func(moving [3]bool) (float64, error)
}

// motion is what atoms do along the axis within the hold.
func (a Axis) motion(hold float64) Motion {
	tilt, j := math.Abs(a.Tilt), math.Abs(a.Tunnelling)
	switch {
	case tilt > 0 && tilt >= 4*j:
		return Layered
	case 2*math.Pi*j*hold <= 0.1:
		return Frozen
	}
	return Moving
}

// Motions returns what each axis does during the hold.
func (s *System) Motions() []Motion {
	out := make([]Motion, len(s.Axes))
	for i, a := range s.Axes {
		out[i] = a.motion(s.Hold)
	}
	return out
}
