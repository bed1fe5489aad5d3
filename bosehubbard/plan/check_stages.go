package plan

import "strings"

// stageKeys are the knobs of a stage by the kind of plan that has them.
var stageKeys = map[Kind][]string{
	ApparatusKind: {"depth_er", "power_w", "field_g"},
	ModelKind:     {"tunnelling_hz", "interaction_hz", "curvature_hz"},
}

func (c *checker) stages() {
	p := c.plan
	if p.Kind() == LevelsKind {
		return
	}
	if p.Kind() == ApparatusKind && p.Stages != nil && len(p.Stages) == 0 {
		c.bad("/stages", "no stages, want at least one")
	}
	taken := map[string]string{}
	for i := range p.Stages {
		c.stage("/stages/"+itoa(i), &p.Stages[i], taken)
	}
	if c.wrongInside("/start") || c.wrongInside("/lattice") || c.wrongInside("/beams") || c.wrongInside("/model") {
		return
	}
	rows := p.Rows()
	for i := range p.Stages {
		if path := "/stages/" + itoa(i); !c.wrongInside(path) {
			c.changes(path, p, rows[i], rows[i+1])
		}
	}
}

func (c *checker) stage(path string, s *Stage, taken map[string]string) {
	c.name(path+"/name", s.Name, taken)
	c.within(path+"/duration_ms", s.DurationMS, duration)
	c.oneOf(path+"/shape", s.Shape, Hold, Linear, Exponential, Smooth)
	kind := c.plan.Kind()
	for other, keys := range stageKeys {
		for _, key := range keys {
			if n := c.at(path + "/" + key); n != nil && other != kind {
				c.bad(path+"/"+key, "the key belongs to a plan of kind "+string(other)+", and this is one of kind "+string(kind))
			}
		}
	}
	if kind == ModelKind {
		c.modelKnobs(path, s.TunnellingHz, s.CurvatureHz)
		if s.InteractionHz != nil {
			c.within(path+"/interaction_hz", *s.InteractionHz, energy)
		}
		return
	}
	if s.DepthEr != nil {
		c.depths(path+"/depth_er", s.DepthEr)
	}
	c.powers(path+"/power_w", s.PowerW)
	if s.FieldG != nil {
		c.within(path+"/field_g", *s.FieldG, field)
	}
}

// changes checks that a hold moves no knob and that any other stage moves one.
func (c *checker) changes(path string, p *Plan, before, after Row) {
	moved := 0
	for _, knob := range p.Knobs() {
		was, is := before.Value(knob), after.Value(knob)
		if was == is {
			continue
		}
		moved++
		if after.Shape == Hold {
			c.bad(p.Source(after.Stage, knob), "a hold stage moves no knob and "+knob+" stands at "+short(was)+
				"; drop the key or choose the shape linear, exponential or smooth")
		}
	}
	if moved == 0 && after.Shape != Hold {
		c.bad(path+"/shape", "the stage changes nothing; give a knob a new value ("+
			strings.Join(stageKeys[p.Kind()], ", ")+") or choose the shape hold")
	}
}
