package session

import (
	"reflect"

	"hilltop/bosehubbard/atom"
	"hilltop/bosehubbard/plan"
	"hilltop/bosehubbard/si"
)

// facts is what the entries need to know about the atoms. It takes a species file
// to find out, so the last answer is kept.
type facts struct {
	species string
	lattice plan.Lattice
	recoil  []float64 // Hz, by lattice axis; nil where it cannot be computed
	states  []string  // of the species; nil where it is not known
	curves  []string  // the states whose scattering length is known
}

// factsOf returns the facts of a plan. The caller holds mu.
func (s *Session) factsOf(p *plan.Plan) facts {
	if p.Cloud == nil || p.Lattice == nil {
		return facts{}
	}
	if s.facts.recoil == nil || s.facts.species != p.Cloud.Species || !reflect.DeepEqual(s.facts.lattice, *p.Lattice) {
		s.facts = facts{species: p.Cloud.Species, lattice: *p.Lattice, recoil: recoils(p)}
		s.facts.states, s.facts.curves = states(p.Cloud.Species)
	}
	return s.facts
}

// recoils returns the recoil energy of every lattice axis of the plan in Hz.
func recoils(p *plan.Plan) []float64 {
	bench, err := p.Apparatus()
	if err != nil {
		return nil
	}
	out := make([]float64, len(p.Lattice.Axes))
	for i, axis := range p.Lattice.Axes {
		out[i] = si.HzFromJoule(bench.Lattice[axisIndex(axis.Axis)].Recoil)
	}
	return out
}

// states returns the states of a species, and those with a scattering length.
func states(species string) (all, known []string) {
	loaded, err := atom.Load(species)
	if err != nil {
		return nil, nil
	}
	for _, state := range loaded.States {
		all = append(all, state.Name)
		if state.Scattering != nil {
			known = append(known, state.Name)
		}
	}
	return all, known
}
