package figure

// Pin keeps the curves of a chart drawn before, to be drawn dashed below these. They
// are brought into the unit of this chart where that differs only by its prefix, and
// left out where they measure something else.
func (c *Chart) Pin(before *Chart) {
	c.Pinned = nil
	ratio, ok := prefixRatio(before.Y.Unit, c.Y.Unit)
	if !ok || before.X.Unit != c.X.Unit {
		return
	}
	for _, u := range before.Curves {
		if ratio != 1 {
			scaled := make([]float64, len(u.Y))
			for i, y := range u.Y {
				scaled[i] = y * ratio
			}
			u.Y = scaled
		}
		c.Pinned = append(c.Pinned, u)
	}
}

// prefixRatio is how many of a unit one of another is, such as 1000 from kHz to Hz; ok
// is false where they are not of one kind.
func prefixRatio(from, to string) (ratio float64, ok bool) {
	if from == to {
		return 1, true
	}
	for _, list := range prefixes {
		sizes := map[string]float64{}
		for _, p := range list {
			sizes[p.name] = p.times
		}
		if sizes[from] > 0 && sizes[to] > 0 {
			return sizes[from] / sizes[to], true
		}
	}
	return 0, false
}
