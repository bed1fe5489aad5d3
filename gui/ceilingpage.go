package gui

import (
	"slices"

	"fyne.io/fyne/v2"

	"hilltop/gui/session"
)

// CeilingPage shows what bounds the energy: the picture of the bounds, the criteria
// with their margins and what mends a broken one, the terms with floor and ceiling,
// and the stages. On demand it shows how far every knob may go and the map of the
// verdict.
type CeilingPage struct {
	plotPage
	picture  *Plot
	criteria *Column
	rows     []*CriterionRow
	terms    *Grid
	stages   *Grid
	entropy  *entropyPart
	room     *roomPart
	verdicts *mapPart

	termIDs     []string // of the rows of terms
	stageIDs    []int    // of the rows of stages
	stageTopics []string // of its columns
}

var _ Page = (*CeilingPage)(nil)

func newCeilingPage(tools pageTools) *CeilingPage {
	p := &CeilingPage{criteria: NewColumn(0, 0)}
	p.begin(tools, func() { p.Show(p.state) })
	p.picture = p.plot("Ceiling of the energy", p.pictureHeight)
	p.terms = p.grid(p.explainTerm)
	p.stages = p.grid(p.stageCell)
	p.entropy = newEntropyPart(p)
	p.room = newRoomPart(p)
	p.verdicts = newMapPart(p)
	room := p.detail("room of every knob", p.room.body)
	chart := p.detail("map of the verdict over U and V", p.verdicts.body)
	p.room.detail, p.verdicts.detail = room, chart
	p.assemble(p.picture, p.entropy.body, p.criteria, room, chart, p.terms, p.stages)
	return p
}

// Heights of the picture at 100 % text, and what stands around it on a page that is
// too low for it.
const (
	ceilingHeight        = 372 + 40 // the frame, then the line of sizes
	ceilingHeightCompact = 328 + 40
	leastCeiling         = 300
	aroundCeiling        = 120
)

func (p *CeilingPage) pictureHeight(width float32) float32 {
	high := px(ceilingHeightCompact)
	if width >= px(widePage)-2*px(space16) {
		high = px(ceilingHeight)
	}
	if textScale() > 1 {
		high = min(high, p.roomInSight()-px(aroundCeiling))
	}
	return max(high, px(leastCeiling))
}

// Name is that of the page.
func (p *CeilingPage) Name() string { return "Ceiling" }

// KeyNumber is the bound that counts, per atom.
func (p *CeilingPage) KeyNumber(s session.State) string { return s.Keys.Ceiling }

// bound is the bound that counts, as it stands on the screen.
func (p *CeilingPage) bound(s session.State) string {
	total := s.Report.Ceiling.Total
	bound := total.Ceiling
	if isFloor(s) {
		bound = total.Floor
	}
	return boundText(bound.Known, bound.Unbounded(), bound.Hz)
}

// isFloor reports whether the bound that counts is the floor.
func isFloor(s session.State) bool { return s.Verdict.Aim == "positive" }

// boundText is a bound as it stands on the screen.
func boundText(known, unbounded bool, hz float64) string {
	switch {
	case !known:
		return ""
	case unbounded:
		return "unbounded"
	}
	return quantity(hz, "Hz")
}

// Show shows a state.
func (p *CeilingPage) Show(s session.State) {
	p.prepare(s)
	p.say(s, p.title(s))
	p.empty("")
	for _, o := range p.shown {
		show(o, s.Report != nil)
	}
	if s.Report == nil {
		p.picture.Clear()
		p.fit()
		return
	}
	p.entropy.Set(s)
	p.drawPicture(s)
	p.room.Set(s)
	p.verdicts.Set(s)
	p.showCriteria(s)
	p.showTerms(s)
	p.showStages(s)
	p.fit()
}

// ceilingKey is what the picture depends on.
type ceilingKey struct {
	judged  uint64
	entropy *session.SmallSystem
	stale   bool // of entropy
}

// drawPicture draws the bounds with S(E), or the ladder of levels.
func (p *CeilingPage) drawPicture(s session.State) {
	shown := p.entropy.subject(s)
	if s.Plan == nil || s.Plan.Levels == nil {
		key := ceilingKey{s.Judged, s.Entropy.Result, s.Entropy.Job.Stale}
		p.picture.Draw(key, func(*session.Artist) (subject, error) { return shown, nil })
		return
	}
	plan := s.Plan
	p.picture.Draw(ceilingKey{judged: s.Judged}, func(a *session.Artist) (subject, error) {
		levels := *shown
		var err error
		levels.ladder, levels.entropy, err = a.Ladder(plan, levels.report)
		if levels.report.Levels != nil {
			levels.state = &levels.report.Levels.EnergyHz
		}
		return &levels, err
	})
}

// title says at which stage the energy is bounded and by what.
func (p *CeilingPage) title(s session.State) string {
	if s.Report == nil {
		return "Nothing is judged yet."
	}
	begin := "The energy is "
	if n := len(s.Report.Stages); n > 0 {
		begin = "At the end of '" + s.Report.Stages[n-1].Name + "' the energy is "
	}
	side, word := "above", "ceiling"
	if isFloor(s) {
		side, word = "below", "floor"
	}
	number := p.bound(s)
	if number == "unbounded" {
		return begin + "unbounded from " + side + "."
	}
	of := " per atom."
	if s.Report.Levels != nil {
		of = " per body."
	}
	return begin + "bounded from " + side + ": " + word + " " + number + of
}

func (p *CeilingPage) showCriteria(s session.State) {
	list := s.Report.Ceiling.Criteria
	for len(p.rows) < len(list) {
		row := newCriterionRow(p.tools)
		p.follow(&row.margin.control, row)
		p.follow(&row.button.control, row)
		p.rows = append(p.rows, row)
	}
	first, words := p.room.first(s)
	var objects []fyne.CanvasObject
	for i, c := range ordered(list, first) {
		shown := criterion{name: c.Name, detail: minusSigns(c.Detail), margin: quantity(c.Margin, c.Unit), verdict: sealed, floor: isFloor(s), stale: s.Fading}
		if !c.Passed {
			shown.verdict = c.Breaks
			if advice, ok := p.tools.desk.AdviceFor(c.Name); ok && !s.Fading {
				p.rows[i].advice, shown.mend = advice, advice.Text
			}
		}
		if c.Name == first {
			shown.first = words
		}
		p.rows[i].set(shown)
		objects = append(objects, p.rows[i])
	}
	if !slices.Equal(objects, p.criteria.Objects) {
		p.criteria.Objects = objects
		p.criteria.Refresh()
	}
}

// ordered puts the broken criteria first, then the one that breaks first.
func ordered(list []session.Criterion, first string) []session.Criterion {
	place := func(c session.Criterion) int {
		switch {
		case !c.Passed:
			return 0
		case c.Name == first:
			return 1
		}
		return 2
	}
	sorted := slices.Clone(list)
	slices.SortStableFunc(sorted, func(a, b session.Criterion) int { return place(a) - place(b) })
	return sorted
}

var termColumns = []GridColumn{{"Term, per atom", true}, {"Floor", false}, {"Ceiling", false}, {"", true}}

func (p *CeilingPage) showTerms(s session.State) {
	var rows []GridRow
	p.termIDs = nil
	for _, t := range s.Report.Ceiling.Terms {
		p.termIDs = append(p.termIDs, t.Term)
		rows = append(rows, GridRow{Cells: []string{
			screenName(t.Term),
			boundText(t.Floor.Known, t.Floor.Unbounded(), t.Floor.Hz),
			boundText(t.Ceiling.Known, t.Ceiling.Unbounded(), t.Ceiling.Hz),
			minusSigns(t.Reason),
		}})
	}
	p.termIDs = append(p.termIDs, "total")
	total := s.Report.Ceiling.Total
	p.terms.Fade(s.Fading)
	p.terms.Set(termColumns, append(rows, GridRow{Chosen: true, Cells: []string{
		screenName("total"),
		boundText(total.Floor.Known, total.Floor.Unbounded(), total.Floor.Hz),
		boundText(total.Ceiling.Known, total.Ceiling.Unbounded(), total.Ceiling.Hz),
		"",
	}}))
}

// stageColumns are those of the stage table.
var stageColumns = []struct {
	GridColumn
	topic string
	cell  func(session.StageRow) string
}{
	{GridColumn{"Stage, at its end", true}, "", func(r session.StageRow) string { return r.Name }},
	{GridColumn{"Lasts", false}, "", func(r session.StageRow) string { return r.Duration }},
	{GridColumn{"J", false}, "tunnelling_hz", func(r session.StageRow) string { return r.Tunnelling }},
	{GridColumn{"U", false}, "interaction_hz", func(r session.StageRow) string { return r.Interaction }},
	{GridColumn{"V per site²", false}, "curvature_hz", func(r session.StageRow) string { return r.Curvature }},
	{GridColumn{"a", false}, "scattering_length_a0", func(r session.StageRow) string { return r.Scattering }},
	{GridColumn{"Trap", false}, "trap_hz", func(r session.StageRow) string { return r.Trap }},
	{GridColumn{"Crosses", true}, "", func(r session.StageRow) string { return r.Crosses }},
}

// showStages fills the stage table; a column in which nothing stands is left out.
func (p *CeilingPage) showStages(s session.State) {
	var columns []GridColumn
	rows := make([]GridRow, len(s.Rows))
	p.stageIDs, p.stageTopics = nil, nil
	for i, r := range s.Rows {
		rows[i].Chosen = r.Stage == s.Stage
		p.stageIDs = append(p.stageIDs, r.Stage)
	}
	for _, column := range stageColumns {
		if !slices.ContainsFunc(s.Rows, func(r session.StageRow) bool { return column.cell(r) != "" }) {
			continue
		}
		columns = append(columns, column.GridColumn)
		p.stageTopics = append(p.stageTopics, column.topic)
		for i, r := range s.Rows {
			rows[i].Cells = append(rows[i].Cells, column.cell(r))
		}
	}
	p.stages.Fade(s.Fading)
	p.stages.Set(columns, rows)
}

// explainTerm explains the term of a row.
func (p *CeilingPage) explainTerm(row, _ int) { p.tools.explain(p.termIDs[row]) }

// stageCell selects the stage by its name; the other cells explain themselves.
func (p *CeilingPage) stageCell(row, column int) {
	if column == 0 {
		p.tools.desk.SelectStage(p.stageIDs[row])
		p.tools.echo()
		return
	}
	p.tools.explain(p.stageTopics[column])
}
