package bosehubbard

// Model is the Hamiltonian at one moment: one set of terms per lattice axis, in
// the order x, y, z, and the interaction U/h in Hz.
type Model struct {
	Axes        []AxisTerms
	Interaction float64 // U/h, Hz; negative attracts
}

// AxisTerms are the terms of the Hamiltonian along one lattice axis, E/h in Hz.
type AxisTerms struct {
	Tunnelling float64 // J, Hz
	Curvature  float64 // V, Hz per site squared; negative pushes outwards
	Tilt       float64 // F, Hz per site; positive rises along the axis
}

// Mirrored returns the model with U, V and the tilts reversed and J kept. On a
// bipartite lattice its spectrum is that of -m.
func (m Model) Mirrored() Model {
	out := Model{Interaction: -m.Interaction, Axes: make([]AxisTerms, len(m.Axes))}
	for i, a := range m.Axes {
		out.Axes[i] = AxisTerms{Tunnelling: a.Tunnelling, Curvature: -a.Curvature, Tilt: -a.Tilt}
	}
	return out
}
