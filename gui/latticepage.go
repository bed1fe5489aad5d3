package gui

import (
	"hilltop/bosehubbard/figure"
	"hilltop/gui/session"
)

// LatticePage shows the bands of an axis and what the depth does to J and U.
type LatticePage struct {
	plotPage
	axes    *Segmented
	bands   *Plot
	depths  *Plot
	wannier *Plot
	mirror  *Grid
	artist  *session.Artist
	axis    int    // of lattice.axes: the fastest at first, then what the user chooses
	chosen  string // the document that it was chosen for
	filled  latticeKey
}

// latticeKey is what a picture of the page depends on.
type latticeKey struct {
	judged      uint64
	stage, axis int
	part        string
}

var _ Page = (*LatticePage)(nil)

func newLatticePage(tools pageTools) *LatticePage {
	p := &LatticePage{artist: session.NewArtist()}
	p.begin(tools, func() { p.Show(p.state) })
	p.axes = NewSegmented(func(i int) {
		p.axis = i
		p.Show(p.state)
	})
	p.axes.OnKey = tools.key
	p.follow(&p.axes.control, p.axes)
	p.bands = p.plot("Bands", p.pictureHeight)
	p.depths = p.plot("J, U and J2 against depth", p.pictureHeight)
	p.wannier = p.plot("Wannier functions", p.pictureHeight)
	p.mirror = p.grid(func(_, column int) { tools.explain(mirrorTopics[column]) })
	p.assemble(p.axes, NewPair(p.bands, p.depths),
		p.detail("Wannier functions", p.wannier), p.detail("size of the break of the mirror", p.mirror))
	return p
}

// Name is that of the page.
func (p *LatticePage) Name() string { return "Lattice" }

// KeyNumber is J of the fastest axis.
func (p *LatticePage) KeyNumber(s session.State) string { return s.Keys.Lattice }

func (p *LatticePage) pictureHeight(float32) float32 {
	return min(max(p.roomInSight()-px(belowPictures)-px(cellHeight+space12), px(leastPicture)), px(mostPicture))
}

// Show shows a state.
func (p *LatticePage) Show(s session.State) {
	p.prepare(s)
	p.say(s, p.title(s))
	p.empty(p.lack(s))
	names := session.LatticeAxes(s.Plan)
	if s.Report == nil || len(names) == 0 {
		for _, plot := range p.plotList {
			plot.Clear()
		}
		p.fit()
		return
	}
	if p.chosen != s.Name || p.axis >= len(names) {
		p.axis, p.chosen = session.FastestAxis(s.Report, s.Stage), s.Name
	}
	cells := make([]string, len(names))
	for i, name := range names {
		cells[i] = "axis " + name
	}
	p.axes.Set(cells, p.axis)
	p.draw(s)
	if key := (latticeKey{s.Judged, s.Stage, 0, "mirror"}); key != p.filled && !s.Dragging {
		p.filled = key
		p.fillMirror(s)
	}
	p.fit()
}

// bandUnits are the units of the pictures of this page.
var bandUnits = []figure.Unit{figure.Hertz, figure.Recoil, figure.NanoKelvin}

func (p *LatticePage) draw(s session.State) {
	report, plan, stage, axis := s.Report, s.Plan, s.Stage, p.axis
	p.bands.Draw(latticeKey{s.Judged, stage, axis, "bands"}, func(a *session.Artist) (subject, error) {
		b, err := a.Bands(plan, report, stage, axis)
		return &chartSubject{bandUnits, func(u figure.Unit) *figure.Chart { return b.Chart(u) }}, err
	})
	p.depths.Draw(latticeKey{s.Judged, stage, axis, "depths"}, func(a *session.Artist) (subject, error) {
		d, err := a.Depths(plan, report, stage, axis)
		return &chartSubject{bandUnits, func(u figure.Unit) *figure.Chart { return d.Chart(u) }}, err
	})
	if !p.details[0].open {
		return
	}
	p.wannier.Draw(latticeKey{s.Judged, stage, 0, "wannier"}, func(a *session.Artist) (subject, error) {
		w, err := a.Wannier(plan, report, stage)
		return &chartSubject{chart: func(figure.Unit) *figure.Chart { return w.Chart() }}, err
	})
}

// lack says why there is nothing to show, "" where there is.
func (p *LatticePage) lack(s session.State) string {
	switch {
	case s.Plan != nil && s.Plan.Lattice == nil:
		return "This plan gives J directly: it has no lattice depth, so no bands. Page Ceiling shows what it bounds."
	case s.Report == nil:
		return "Nothing is judged yet. Open a plan, or mend the one that is open."
	}
	return ""
}

// title says J and U at the end of the stage.
func (p *LatticePage) title(s session.State) string {
	row := rowOf(s)
	if s.Report == nil || row.Tunnelling == "" {
		return "No lattice."
	}
	text := whenOf(s) + " J is " + row.Tunnelling
	if row.Interaction != "" {
		text += ", U " + row.Interaction
	}
	return text + "."
}

var (
	mirrorColumns = []GridColumn{
		{"Axis", true}, {"J2/J1", false}, {"Curvature, top over bottom of the band", false}, {"Band's floor", false}, {"Band's ceiling", false},
	}
	mirrorTopics = []string{"mirror", "next_tunnelling_hz", "mirror", "kinetic", "kinetic"}
)

func (p *LatticePage) fillMirror(s session.State) {
	list, err := p.artist.Mirror(s.Plan, s.Report, s.Stage)
	if err != nil {
		list = nil // the plots say why
	}
	rows := []GridRow{{Chosen: true, Cells: []string{"mirror", "0", "1", "−2 J", "+2 J"}}}
	for _, r := range list {
		rows = append(rows, GridRow{Cells: []string{r.Axis, r.Next, r.Curvature, r.Floor, r.Ceiling}})
	}
	p.mirror.Set(mirrorColumns, rows)
}
