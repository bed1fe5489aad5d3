package plan

import "slices"

// Limits of a model. What fits into the memory is for others to say.
const (
	maxAxes  = 3
	maxSites = 1_000_000_000
	maxAtoms = 1_000_000_000
)

func (c *checker) model() {
	m := c.plan.Model
	total := c.sites(m.Sites)
	if m.Periodic != nil && total > 0 {
		c.lengthIs("/model/periodic", len(m.Periodic), len(m.Sites), "one for each entry of sites")
	}
	if m.Atoms < 1 || m.Atoms > maxAtoms {
		c.bad("/model/atoms", "want a whole number of atoms from 1 to 1e9")
	}
	c.modelKnobs("/model", &m.TunnellingHz, m.CurvatureHz)
	c.within("/model/interaction_hz", m.InteractionHz, energy)
	if m.Fock != nil {
		c.fock(m, total)
	}
}

// sites checks the extents and returns their product, or 0 if they are wrong.
func (c *checker) sites(sites []int) int {
	if len(sites) < 1 || len(sites) > maxAxes {
		c.bad("/model/sites", itoa(len(sites))+" entries, want 1 to 3")
		return 0
	}
	total := 1
	for i, n := range sites {
		if n < 1 || n > maxSites {
			c.bad("/model/sites/"+itoa(i), "want a whole number of sites from 1 to 1e9")
			return 0
		}
		if total *= n; total > maxSites {
			c.bad("/model/sites", "more than 1e9 sites")
			return 0
		}
	}
	return total
}

func (c *checker) modelKnobs(path string, tunnelling *OneOrMany, curvature []float64) {
	axes := len(c.plan.Model.Sites)
	if tunnelling != nil && tunnelling.Single {
		c.within(path+"/tunnelling_hz", tunnelling.At(0), energy)
	} else if tunnelling != nil {
		c.perAxis(path+"/tunnelling_hz", tunnelling.Values, axes)
	}
	if curvature != nil {
		c.perAxis(path+"/curvature_hz", curvature, axes)
	}
}

func (c *checker) perAxis(path string, values []float64, axes int) {
	if !c.wrongInside("/model/sites") {
		c.lengthIs(path, len(values), axes, "one for each entry of sites")
	}
	for i, x := range values {
		c.within(path+"/"+itoa(i), x, energy)
	}
}

func (c *checker) fock(m *Model, total int) {
	if total > 0 && !c.lengthIs("/model/fock", len(m.Fock), total, "one for each site") {
		return
	}
	sum := 0
	for i, n := range m.Fock {
		if n < 0 || n > maxAtoms {
			c.bad("/model/fock/"+itoa(i), "want a whole number of atoms from 0 to 1e9")
			return
		}
		if sum += n; sum > maxAtoms {
			break
		}
	}
	if sum != m.Atoms {
		c.bad("/model/fock", "the sites hold "+itoa(sum)+" atoms, want the "+itoa(m.Atoms)+" of /model/atoms")
	}
}

func (c *checker) levels() {
	l := c.plan.Levels
	if len(l.EnergiesHz) < 2 {
		c.bad("/levels/energies_hz", itoa(len(l.EnergiesHz))+" entries, want at least 2 levels")
	}
	for i, e := range l.EnergiesHz {
		c.within("/levels/energies_hz/"+itoa(i), e, energy)
	}
	if l.Degeneracies != nil {
		c.lengthIs("/levels/degeneracies", len(l.Degeneracies), len(l.EnergiesHz), "one for each entry of energies_hz")
	}
	for i, g := range l.Degeneracies {
		c.within("/levels/degeneracies/"+itoa(i), g, multiple)
	}
	c.within("/levels/bodies", l.Bodies, bodies)
	c.within("/levels/inner_time_s", l.InnerTimeS, relaxation)
	c.within("/levels/outer_time_s", l.OuterTimeS, relaxation)
	if len(l.EnergiesHz) == 0 || c.wrongInside("/levels/energies_hz") {
		return
	}
	low, high := slices.Min(l.EnergiesHz), slices.Max(l.EnergiesHz)
	if low == high {
		c.bad("/levels/energies_hz", "all levels are equal, want at least two energies")
	}
	if e := l.EnergyHzPerBody; !(e >= low && e <= high) {
		c.bad("/levels/energy_hz_per_body", "want an energy between the lowest and the highest level, "+
			short(low)+" to "+short(high)+" Hz")
	}
}
