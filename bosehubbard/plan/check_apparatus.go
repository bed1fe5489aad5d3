package plan

import (
	"math"
	"slices"
)

var axisNames = []string{"x", "y", "z"}

func (c *checker) apparatus() {
	p := c.plan
	c.oneOf("/gravity_axis", p.GravityAxis, "x", "y", "z", NoGravity)
	if p.Cloud != nil {
		c.cloud(p.Cloud)
	}
	if p.Lattice != nil {
		c.lattice(p.Lattice)
	}
	taken := map[string]string{}
	for i := range p.Beams {
		c.beam("/beams/"+itoa(i), &p.Beams[i], taken)
	}
	if p.Field != nil {
		c.oneOf("/field/axis", p.Field.Axis, axisNames...)
		c.optional("/field/gradient_g_per_cm", p.Field.GradientGPerCM, gradient)
		c.optional("/field/curvature_per_cm2", p.Field.CurvaturePerCM2, bend)
	}
	if p.Scattering != nil {
		c.scattering(p.Scattering)
	}
	if p.Start != nil {
		c.start(p.Start)
	}
}

func (c *checker) cloud(cloud *Cloud) {
	c.notEmpty("/cloud/species", cloud.Species)
	c.notEmpty("/cloud/state", cloud.State)
	if cloud.Atoms != math.Trunc(cloud.Atoms) || !count.holds(cloud.Atoms) {
		c.bad("/cloud/atoms", count.wanted(cloud.Atoms))
	}
	c.within("/cloud/entropy_per_atom_kb", cloud.EntropyPerAtomKB, entropy)
}

func (c *checker) notEmpty(path, word string) {
	if word == "" {
		c.bad(path, "want a name that is not empty")
	}
}

func (c *checker) lattice(l *Lattice) {
	c.oneOf("/lattice/geometry", l.Geometry, Cubic)
	c.lengthIs("/lattice/axes", len(l.Axes), 3, "one for each of x, y and z")
	taken := map[string]string{}
	for i := range l.Axes {
		axis, path := &l.Axes[i], "/lattice/axes/"+itoa(i)
		if c.oneOf(path+"/axis", axis.Axis, axisNames...) {
			if first, twice := taken[axis.Axis]; twice {
				c.bad(path+"/axis", "the axis is taken by "+first+", want each of x, y and z once")
			}
			taken[axis.Axis] = path
		}
		c.within(path+"/wavelength_nm", axis.WavelengthNM, wavelength)
		c.waist(path+"/waist_um", axis.WaistUM)
		c.within(path+"/return_ratio", axis.ReturnRatio, returnRatio)
	}
}

func (c *checker) beam(path string, b *Beam, taken map[string]string) {
	c.name(path+"/name", b.Name, taken)
	c.within(path+"/wavelength_nm", b.WavelengthNM, wavelength)
	c.oneOf(path+"/axis", b.Axis, axisNames...)
	c.waist(path+"/waist_um", b.WaistUM)
}

func (c *checker) waist(path string, w OneOrMany) {
	if w.Single {
		c.within(path, w.At(0), waist)
		return
	}
	if c.lengthIs(path, len(w.Values), 2, "one for each transverse axis in the order x, y, z, or one number for a round beam") {
		for i, x := range w.Values {
			c.within(path+"/"+itoa(i), x, waist)
		}
	}
}

func (c *checker) scattering(s *Scattering) {
	if s.BackgroundA0 == 0 || !background.holds(s.BackgroundA0) {
		c.bad("/scattering/background_a0", background.wanted(s.BackgroundA0))
	}
	for i, r := range s.Resonances {
		path := "/scattering/resonances/" + itoa(i)
		c.within(path+"/position_g", r.PositionG, position)
		if r.WidthG == 0 || !width.holds(r.WidthG) {
			c.bad(path+"/width_g", width.wanted(r.WidthG))
		}
		for j, other := range s.Resonances[:i] {
			switch {
			case r.PositionG == other.PositionG:
				c.bad(path+"/position_g", "the position is taken by /scattering/resonances/"+itoa(j))
			case r.PositionG+r.WidthG == other.PositionG || other.PositionG+other.WidthG == r.PositionG:
				c.bad(path, "a pole and a zero at one field cancel with /scattering/resonances/"+itoa(j)+"; want one resonance in their place")
			}
		}
	}
}

func (c *checker) start(s *Start) {
	c.depths("/start/depth_er", s.DepthEr)
	c.powers("/start/power_w", s.PowerW)
	for _, b := range c.plan.Beams {
		if _, given := s.PowerW[b.Name]; !given && c.beamsNamed() {
			c.add(&FieldError{Path: JoinPath("start", "power_w", b.Name),
				Reason: "the key is missing, want the power of every beam before the first stage"})
		}
	}
	c.within("/start/field_g", s.FieldG, field)
}

func (c *checker) depths(path string, depths []float64) {
	if c.plan.Lattice != nil {
		c.lengthIs(path, len(depths), len(c.plan.Lattice.Axes), "one for each entry of lattice.axes")
	}
	for i, s := range depths {
		c.within(path+"/"+itoa(i), s, depth)
	}
}

func (c *checker) powers(path string, powers map[string]float64) {
	for _, name := range sortedKeys(powers) {
		at := path + "/" + escape(name)
		known := make([]string, len(c.plan.Beams))
		for i, b := range c.plan.Beams {
			known[i] = b.Name
		}
		if c.beamsNamed() && !slices.Contains(known, name) {
			c.badWord(at, "no beam has this name", alike(name, known))
			continue
		}
		c.within(at, powers[name], power)
	}
}

// beamsNamed reports whether the names of the beams are good; if not, a power
// that fits none of them is no second mistake.
func (c *checker) beamsNamed() bool {
	if c.wrong("/beams") {
		return false
	}
	for i := range c.plan.Beams {
		if c.wrong("/beams/" + itoa(i) + "/name") {
			return false
		}
	}
	return true
}
