package aim

import "hilltop/bosehubbard/ceiling"

// Kind says what a knob sets.
type Kind string

// The kinds of knobs an advice may turn.
const (
	Power       Kind = "power"       // of one dipole beam
	Depth       Kind = "depth"       // of one lattice axis
	Field       Kind = "field"       // the bias field
	Interaction Kind = "interaction" // U of a model
	Curvature   Kind = "curvature"   // V of a model, one axis
)

// Knob is a value that may be moved, with its range, in its own unit.
type Knob struct {
	Name      string
	Kind      Kind
	Axis      int // 0, 1, 2 of a depth or curvature
	Value     float64
	Low, High float64
}

// Problem is a system that a set of knobs moves.
type Problem struct {
	Sign  ceiling.Sign
	Knobs []Knob
	// Evaluate judges the system with the knobs at these values, in the order of
	// Knobs. An error excludes the values.
	Evaluate func(values []float64) (*ceiling.Assessment, error)
	// FieldsFor lists the fields at which the scattering length is scale times
	// the present one, the best to reach first; nil without a field knob.
	FieldsFor func(scale float64) []float64
}

// Move is one knob's change.
type Move struct {
	Knob     Knob
	From, To float64
}

// Advice is a set of moves that mends one criterion, and what else it does.
type Advice struct {
	Criterion string
	Moves     []Move
	Verdict   ceiling.Verdict // after the moves
	Broken    []string        // still broken after the moves
	New       []string        // broken by the moves
}

// better reports whether a is to be preferred over b: the better verdict, then
// fewer new breaks, then fewer knobs.
func (a *Advice) better(b *Advice) bool {
	switch {
	case b == nil:
		return true
	case a.Verdict != b.Verdict:
		return b.Verdict.Worse(a.Verdict)
	case len(a.New) != len(b.New):
		return len(a.New) < len(b.New)
	}
	return len(a.Moves) < len(b.Moves)
}
