package aim

import (
	"math"
	"slices"

	"hilltop/bosehubbard/ceiling"
)

// route is one way to turn knobs together: along straight lines towards ends, or
// to one of a list of values of a single knob.
type route struct {
	knobs []int
	ends  []float64 // of each knob; nil for jumps
	jumps []float64 // values of the only knob, best first
}

// routes lists the ways that can mend a criterion, the most natural first.
func (p *Problem) routes(criterion string, now *ceiling.Assessment) []route {
	switch criterion {
	case "interaction":
		return append(p.fieldJumps(-1, -0.5, -0.25, -0.1, -0.02), p.mirrored(Interaction, -1)...)
	case "trap_x", "trap_y", "trap_z", "held":
		list := append(p.powers(), p.mirrored(Curvature, axisOf(criterion))...)
		return append(list, p.deeper(only(axisOf(criterion)))...)
	case "tilt":
		list := p.powers()
		for axis := range 3 {
			list = append(list, p.deeper(only(axis))...)
		}
		return append(list, p.deeper(func(int) bool { return true })...)
	case "one_band":
		return append(p.deeper(moves(now)), p.fieldJumps(0.5, 0.25)...)
	case "layers":
		still := func(axis int) bool { return axis < len(now.Motions) && now.Motions[axis] == ceiling.Layered }
		return append(p.fieldJumps(0.95, 1.05, 0.9, 1.1, 0.8, 1.2, 0.7, 1.3, 0.5), p.deeper(still)...)
	case "edge":
		return append(p.powers(), p.deeper(moves(now))...)
	}
	return nil
}

func moves(now *ceiling.Assessment) func(axis int) bool {
	return func(axis int) bool { return axis < len(now.Motions) && now.Motions[axis] == ceiling.Moving }
}

func only(axis int) func(int) bool { return func(i int) bool { return i == axis } }

func axisOf(criterion string) int {
	return slices.Index([]string{"trap_x", "trap_y", "trap_z"}, criterion)
}

// powers turns each dipole beam alone and then all together: down first where
// T < 0 wants less trapping, up first where T > 0 wants more.
func (p *Problem) powers() []route {
	var list []route
	var all, down, up = []int{}, []float64{}, []float64{}
	for i, k := range p.Knobs {
		if k.Kind != Power {
			continue
		}
		all, down, up = append(all, i), append(down, k.Low), append(up, k.High)
	}
	first, second := down, up
	if p.Sign == ceiling.Positive {
		first, second = up, down
	}
	for _, ends := range [][]float64{first, second} {
		for n, i := range all {
			list = append(list, route{knobs: []int{i}, ends: []float64{ends[n]}})
		}
		if len(all) > 1 {
			list = append(list, route{knobs: all, ends: ends})
		}
	}
	return list
}

// deeper raises the lattice along the chosen axes together.
func (p *Problem) deeper(chosen func(axis int) bool) []route {
	var r route
	for i, k := range p.Knobs {
		if k.Kind == Depth && chosen(k.Axis) {
			r.knobs, r.ends = append(r.knobs, i), append(r.ends, k.High)
		}
	}
	if r.knobs == nil {
		return nil
	}
	return []route{r}
}

// fieldJumps sends the field to where a is one of these multiples of today's.
func (p *Problem) fieldJumps(scales ...float64) []route {
	if p.FieldsFor == nil {
		return nil
	}
	i := slices.IndexFunc(p.Knobs, func(k Knob) bool { return k.Kind == Field })
	if i < 0 {
		return nil
	}
	r := route{knobs: []int{i}}
	for _, scale := range scales {
		r.jumps = append(r.jumps, p.FieldsFor(scale)...)
	}
	return []route{r}
}

// mirrored reverses the sign of a model's own value; axis -1 means all of them.
func (p *Problem) mirrored(kind Kind, axis int) []route {
	var list []route
	for i, k := range p.Knobs {
		if k.Kind == kind && (axis < 0 || k.Axis == axis) && k.Value != 0 {
			list = append(list, route{knobs: []int{i}, jumps: []float64{math.Max(k.Low, math.Min(k.High, -k.Value))}})
		}
	}
	return list
}
