package figure

import "math"

// Slope is the hill: along one axis, the band V x^2 + floor ... V x^2 + ceiling of
// the kinetic energy, x in sites.
type Slope struct {
	Axis           string
	Curvature      float64 // V, Hz per site squared
	Floor, Ceiling float64 // of the kinetic energy, Hz
	Reach          float64 // sites at the borders of the panel
	Turn           float64 // where |V| x^2 is the width of the band; 0 for none
	Box            Rect
}

// X returns the place of a site.
func (s *Slope) X(site float64) float64 {
	return (s.Box.X0+s.Box.X1)/2 + site/s.Reach*s.Box.Width()/2
}

// Site returns the site at a place.
func (s *Slope) Site(x float64) float64 {
	return (x - (s.Box.X0+s.Box.X1)/2) * s.Reach / (s.Box.Width() / 2)
}

// edge is the end of the band that counts, Hz at a site.
func (s *Slope) edge(site, offset float64) float64 { return s.Curvature*site*site + offset }

// hill lays out the hill, if there is room and something moves.
func (b *builder) hill() {
	g := b.g
	if g.Hill.Width() == 0 {
		return
	}
	axis := b.hillAxis()
	end := last(b.report)
	if axis < 0 || end == nil || axis >= len(end.CurvatureHz) {
		return
	}
	s := &Slope{Axis: "xyz"[axis : axis+1], Curvature: end.CurvatureHz[axis]}
	for _, t := range b.report.Ceiling.Terms {
		if t.Term == "kinetic" && !t.Floor.Unbounded() && !t.Ceiling.Unbounded() {
			s.Floor, s.Ceiling = t.Floor.Hz, t.Ceiling.Hz
		}
	}
	s.Box = Rect{g.Hill.X0 + 12, g.Hill.Y0, g.Hill.X1 - 12, g.Hill.Y1}
	s.Reach = 100
	size := s.Ceiling - s.Floor
	if v := math.Abs(s.Curvature); v > 0 && size > 0 {
		s.Turn = math.Sqrt(size / v)
		s.Reach = niceReach(1.25 * s.Turn)
	} else if v > 0 {
		s.Reach = niceReach(1.25 * math.Sqrt(g.Scale.HalfRange/v))
	}
	g.Slope = s
}

// niceReach rounds up to a number that divides well.
func niceReach(v float64) float64 {
	power := math.Pow(10, math.Floor(math.Log10(v)))
	for _, m := range [...]float64{1, 1.5, 2, 3, 4, 5, 6, 8} {
		if m*power >= v {
			return m * power
		}
	}
	return 10 * power
}

// hillAxis picks the moving axis most in danger: the one whose V helps least. It
// is -1 where nothing moves.
func (b *builder) hillAxis() int {
	end := last(b.report)
	best := -1
	for _, t := range b.report.Ceiling.Terms {
		name := axisOf(t.Term)
		if name == "" || t.Reason != "" || end == nil {
			continue
		}
		axis := int(name[0] - 'x')
		if axis < 0 || axis >= len(end.CurvatureHz) {
			continue
		}
		if name == b.options.HillAxis {
			return axis
		}
		if best < 0 || b.helps(end.CurvatureHz[axis]) < b.helps(end.CurvatureHz[best]) {
			best = axis
		}
	}
	return best
}

// helps counts a curvature positive where it bounds the energy on the wanted side.
func (b *builder) helps(v float64) float64 {
	if b.g.Upwards {
		return -v
	}
	return v
}
