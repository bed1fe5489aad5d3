package optics

// Axis is one of the three directions of the apparatus.
type Axis int

// The axes.
const (
	X Axis = iota
	Y
	Z
)

// String returns "x", "y" or "z".
func (a Axis) String() string { return "xyz"[a : a+1] }

// Transverse returns the two other axes in the order x, y, z.
func (a Axis) Transverse() (Axis, Axis) {
	switch a {
	case X:
		return Y, Z
	case Y:
		return X, Z
	}
	return X, Y
}
