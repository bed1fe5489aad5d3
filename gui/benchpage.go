package gui

import (
	"errors"

	"hilltop/bosehubbard/figure"
	"hilltop/gui/session"
)

// BenchPage shows what the beams and coils do: who adds what to the trap along each
// axis, and the scattering length with the path of the sequence on it.
type BenchPage struct {
	plotPage
	budget     *Plot
	scattering *Plot
	gravity    *Grid
	sources    *Grid
	topics     []string // of the rows of gravity
	artist     *session.Artist
	filled     benchKey // what the tables show
}

// benchKey is what the pictures of the page depend on.
type benchKey struct {
	judged uint64
	stage  int
	part   string
}

var _ Page = (*BenchPage)(nil)

func newBenchPage(tools pageTools) *BenchPage {
	p := &BenchPage{artist: session.NewArtist()}
	p.begin(tools, func() { p.Show(p.state) })
	p.budget = p.plot("Trap, who adds what", p.budgetHeight)
	p.scattering = p.plot("Scattering length against field", p.pictureHeight)
	p.gravity = p.grid(func(row, _ int) { tools.explain(p.topics[row]) })
	p.sources = p.grid(func(int, int) {})
	p.assemble(NewPair(p.budget, p.scattering),
		p.detail("sag and tilt", p.gravity), p.detail("sources of the numbers", p.sources))
	return p
}

// Name is that of the page.
func (p *BenchPage) Name() string { return "Bench" }

// KeyNumber is the trap of the moving axis that is nearest to the wrong sign.
func (p *BenchPage) KeyNumber(s session.State) string { return s.Keys.Bench }

// Heights of the pictures at 100 % text; belowPictures is what stands above and
// below them.
const (
	leastPicture  = 280
	mostPicture   = 460
	belowPictures = 208
)

func (p *BenchPage) pictureHeight(float32) float32 {
	return min(max(p.roomInSight()-px(belowPictures), px(leastPicture)), px(mostPicture))
}

// budgetHeight has a line for every beam and axis.
func (p *BenchPage) budgetHeight(width float32) float32 {
	high := p.pictureHeight(width)
	if d := p.budget.sheet.drawn; d != nil {
		if b, ok := d.subject.(*budgetSubject); ok {
			high = max(high, float32(b.budget.Height(pictureStyle())))
		}
	}
	return high
}

// Show shows a state.
func (p *BenchPage) Show(s session.State) {
	p.prepare(s)
	p.say(s, p.title(s))
	p.empty(p.lack(s))
	if s.Report == nil || s.Plan == nil || s.Plan.Lattice == nil {
		p.budget.Clear()
		p.scattering.Clear()
		p.fit()
		return
	}
	report, plan, stage := s.Report, s.Plan, s.Stage
	p.budget.Draw(benchKey{s.Judged, stage, "budget"}, func(a *session.Artist) (subject, error) {
		b, err := a.Budget(report, stage)
		return &budgetSubject{b}, err
	})
	p.scattering.Draw(benchKey{s.Judged, 0, "scattering"}, func(a *session.Artist) (subject, error) {
		c, err := a.Scattering(plan, report)
		return &chartSubject{chart: func(figure.Unit) *figure.Chart { return c.Chart() }}, err
	})
	if key := (benchKey{s.Judged, stage, "tables"}); key != p.filled && !s.Dragging {
		p.filled = key
		p.fillGravity(s)
		p.fillSources(s)
	}
	p.fit()
}

// lack says why there is nothing to show, "" where there is.
func (p *BenchPage) lack(s session.State) string {
	switch {
	case s.Plan != nil && s.Plan.Lattice == nil:
		return "This plan gives J, U and V directly: it has no beams, coils or atoms. Page Ceiling shows what it bounds."
	case s.Report == nil:
		return "Nothing is judged yet. Open a plan, or mend the one that is open."
	}
	return ""
}

// title says what the trap is at the end of the stage.
func (p *BenchPage) title(s session.State) string {
	row := rowOf(s)
	if s.Report == nil || row.Trap == "" {
		return "No beams."
	}
	return whenOf(s) + " the trap is " + row.Trap + " along x, y, z."
}

var gravityColumns = []GridColumn{{"Gravity", true}, {"", false}, {"", true}}

func (p *BenchPage) fillGravity(s session.State) {
	list, err := p.artist.Gravity(s.Plan, s.Report, s.Stage)
	rows := make([]GridRow, len(list))
	p.topics = make([]string, len(list))
	for i, r := range list {
		rows[i] = GridRow{Cells: []string{r.Name, r.Value, r.Note}}
		p.topics[i] = r.Topic
	}
	if err != nil && !errors.Is(err, session.ErrNoBench) {
		p.topics = []string{""}
		rows = []GridRow{{Cells: []string{"Not computed", "", err.Error()}}}
	}
	p.gravity.Set(gravityColumns, rows)
}

var sourceColumns = []GridColumn{{"Number", true}, {"Value", false}, {"One sigma", false}, {"Source", true}}

func (p *BenchPage) fillSources(s session.State) {
	list, _ := session.Sources(s.Plan) // a species that is not known has no report
	rows := make([]GridRow, len(list))
	for i, r := range list {
		rows[i] = GridRow{Cells: []string{r.Name, r.Value, r.Uncertainty, r.Source}}
	}
	p.sources.Set(sourceColumns, rows)
}
