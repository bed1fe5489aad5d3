package session

import (
	"errors"
	"fmt"
	"math"
	"slices"
	"strings"

	"hilltop/bosehubbard"
	"hilltop/bosehubbard/lattice"
	"hilltop/bosehubbard/plan"
	"hilltop/bosehubbard/report"
	"hilltop/bosehubbard/thermo"
)

// smallPlan is what small systems take from a plan: J, V and the tilt of the axes
// that move at the end of the last stage, U, and the filling.
type smallPlan struct {
	axes        []bosehubbard.AxisTerms
	interaction float64
	periodic    []bool // per axis; nil: all open

	own      []int   // sites of a model along these axes; nil for an apparatus
	ownAtoms int     // atoms on them
	fock     []int   // of a model, per site; nil where not given
	filling  float64 // atoms per site
}

// smallKind finds out what stands for the cloud of a plan: a chain, patch or block
// along the axes that move, one atom per site for an apparatus, the model's own
// filling for a model.
//
// It returns an error that says why there is none.
func smallKind(p *plan.Plan, r *report.Report) (*smallPlan, error) {
	end := StageAt(r, len(r.Stages))
	switch {
	case p.Levels != nil:
		return nil, errors.New("")
	case end == nil:
		return nil, errors.New("the report has no stage")
	case end.InteractionHz == nil:
		return nil, errors.New("no S(E): U is not defined below 1 Er")
	}
	k := &smallPlan{interaction: *end.InteractionHz, filling: 1}
	if m := p.Model; m != nil {
		k.takeModel(m, end)
	} else {
		k.takeApparatus(p, r, end)
	}
	if len(k.axes) == 0 {
		return nil, errors.New("no S(E): nothing moves at the end of the last stage")
	}
	return k, nil
}

func (k *smallPlan) takeModel(m *plan.Model, end *report.Stage) {
	total := 1
	for i, sites := range m.Sites {
		if sites < 2 && len(m.Sites) > 1 {
			continue
		}
		total *= sites
		k.own = append(k.own, sites)
		k.periodic = append(k.periodic, i < len(m.Periodic) && m.Periodic[i])
		k.axes = append(k.axes, bosehubbard.AxisTerms{Tunnelling: at(end.TunnellingHz, i), Curvature: at(end.CurvatureHz, i)})
	}
	k.ownAtoms, k.fock = m.Atoms, m.Fock
	k.filling = float64(m.Atoms) / float64(total)
}

func (k *smallPlan) takeApparatus(p *plan.Plan, r *report.Report, end *report.Stage) {
	order := LatticeAxes(p)
	for axis := range 3 {
		i := slices.Index(order, axisName(axis))
		if i < 0 || !moves(r, axis) {
			continue
		}
		k.axes = append(k.axes, bosehubbard.AxisTerms{
			Tunnelling: at(end.TunnellingHz, i), Curvature: at(end.CurvatureHz, axis), Tilt: at(end.TiltHz, axis),
		})
	}
}

func at(list []float64, i int) float64 {
	if i < len(list) {
		return list[i]
	}
	return 0
}

// offered are the sizes, in sites.
var offered = [...]int{6, 8, 10, 12}

// patches are the shapes of the offered sizes along two and three axes.
var patches = map[int][2][]int{
	6: {{3, 2}, {3, 2, 1}}, 8: {{4, 2}, {2, 2, 2}}, 10: {{5, 2}, {5, 2, 1}}, 12: {{4, 3}, {3, 2, 2}},
}

// shapes lists the sizes that can stand for the plan: for a model its own sites and
// smaller ones.
func (k *smallPlan) shapes() [][]int {
	own := product(k.own)
	var list [][]int
	for _, n := range offered {
		if k.own != nil && n >= own {
			break
		}
		shape := []int{n}
		if d := len(k.axes); d > 1 {
			shape = patches[n][d-2]
		}
		list = append(list, shape)
	}
	if k.own != nil && own <= offered[len(offered)-1] {
		list = append(list, k.own)
	}
	return list
}

func product(sites []int) int {
	n := 1
	for _, l := range sites {
		n *= l
	}
	return n
}

// isOwn reports whether a shape is that of the model itself.
func (k *smallPlan) isOwn(shape []int) bool { return k.own != nil && slices.Equal(shape, k.own) }

// atoms is the number of atoms on a shape at the filling of the plan.
func (k *smallPlan) atoms(shape []int) int {
	if k.isOwn(shape) {
		return k.ownAtoms
	}
	return max(1, int(math.Round(k.filling*float64(product(shape)))))
}

// system builds the system of a size.
//
// It returns the errors of lattice.Box.
func (k *smallPlan) system(z EntropySize) (thermo.System, error) {
	periodic := make([]bool, len(z.Shape))
	copy(periodic, k.periodic)
	l, err := lattice.Box(z.Shape, periodic)
	if err != nil {
		return thermo.System{}, err
	}
	return thermo.System{Lattice: l, Model: bosehubbard.Model{Axes: k.axes, Interaction: k.interaction}, Atoms: z.Atoms}, nil
}

// state is the energy per atom of the Fock state that a model plan gives, in the
// Hamiltonian at the end:
//
//	E = sum_i U n_i (n_i - 1)/2 + sum_a V_a x_ia^2 n_i
//
// It is nil where the plan gives none or the size is another.
func (k *smallPlan) state(z EntropySize, s thermo.System) *float64 {
	if k.fock == nil || !k.isOwn(z.Shape) || len(k.fock) != s.Lattice.Sites || z.Atoms == 0 {
		return nil
	}
	energy := 0.0
	for i, n := range k.fock {
		n := float64(n)
		energy += k.interaction * n * (n - 1) / 2
		for a, terms := range k.axes {
			x := s.Lattice.Positions[i][a]
			energy += (terms.Curvature*x*x + terms.Tilt*x) * n
		}
	}
	energy /= float64(z.Atoms)
	return &energy
}

// shapeText is "10" or "5×2".
func shapeText(shape []int) string {
	parts := make([]string, len(shape))
	for i, n := range shape {
		parts[i] = fmt.Sprint(n)
	}
	return strings.Join(parts, "×")
}
