package atom

import "slices"

// CrossingKind says what a path of fields met.
type CrossingKind int

const (
	// Pole is a Feshbach resonance: on it an atom pair binds and a doublon is lost.
	Pole CrossingKind = iota
	// Zero is a vanishing scattering length: passing it does no harm.
	Zero
)

// String returns "pole" or "zero".
func (k CrossingKind) String() string {
	if k == Pole {
		return "pole"
	}
	return "zero"
}

// Crossing is one pole or zero of the scattering length met on a path of fields.
type Crossing struct {
	Kind    CrossingKind
	Field   float64 // T
	Segment int     // i for the way from path[i] to path[i+1]
}

// Crossings returns the poles and zeros that the field meets on the way through
// path [T], in the order met; between two points of the path the field changes
// monotonically. A path that goes back meets them again.
//
// A point of the path that lies on one of them counts as met, at the first
// arrival: it belongs to the segment that ends there, at the very start to
// segment 0, and staying there or leaving it adds nothing.
func (c ScatteringCurve) Crossings(path []float64) []Crossing {
	marks := c.marks()
	var met []Crossing
	if len(path) > 0 {
		met = appendMet(met, marks, func(field float64) bool { return field == path[0] }, 0)
	}
	for i := 1; i < len(path); i++ {
		from, to := path[i-1], path[i]
		start := len(met)
		met = appendMet(met, marks, func(field float64) bool {
			return from < field && field <= to || to <= field && field < from
		}, i-1)
		if to < from {
			slices.Reverse(met[start:])
		}
	}
	return met
}

// marks lists every pole and zero in ascending order of the field.
func (c ScatteringCurve) marks() []Crossing {
	marks := make([]Crossing, 0, 2*len(c.Resonances))
	for _, r := range c.Resonances {
		marks = append(marks, Crossing{Kind: Pole, Field: r.Position}, Crossing{Kind: Zero, Field: r.zero()})
	}
	slices.SortFunc(marks, func(a, b Crossing) int {
		switch {
		case a.Field < b.Field:
			return -1
		case a.Field > b.Field:
			return 1
		}
		return int(a.Kind) - int(b.Kind)
	})
	return marks
}

func appendMet(met, marks []Crossing, meets func(field float64) bool, segment int) []Crossing {
	for _, mark := range marks {
		if meets(mark.Field) {
			mark.Segment = segment
			met = append(met, mark)
		}
	}
	return met
}
