package sequence

import "math"

// Shape is how a knob travels from the end of one stage to the end of the next.
type Shape string

// The shapes a stage may have; u = t/duration runs from 0 to 1.
const (
	Hold        Shape = "hold"        // nothing changes
	Linear      Shape = "linear"      // u
	Exponential Shape = "exponential" // (e^(4u) - 1)/(e^4 - 1)
	Smooth      Shape = "smooth"      // 10u^3 - 15u^4 + 6u^5
)

// Shapes lists every shape in the order in which they are offered.
func Shapes() []Shape { return []Shape{Hold, Linear, Exponential, Smooth} }

// At returns the fraction of the way travelled at u, 0 before and 1 after the
// stage; it is monotone in u.
func (s Shape) At(u float64) float64 {
	u = math.Min(math.Max(u, 0), 1)
	switch s {
	case Hold:
		return 1
	case Exponential:
		return math.Expm1(4*u) / math.Expm1(4)
	case Smooth:
		return u * u * u * (10 + u*(-15+6*u))
	}
	return u
}
