package gui

import (
	"hilltop/bosehubbard/figure"
	"hilltop/gui/session"
)

// mapPart is the map of the verdict over U and V, with the progress of its
// computation.
type mapPart struct {
	body   *Column
	tools  pageTools
	detail *Disclosure
	plot   *Plot
	job    *JobBar
	note   *Prose
	asked  uint64 // the report that the map was asked for
	held   bool   // stopped by the user
}

// Cells of the map.
const (
	mapColumns = 96
	mapRows    = 64
)

func newMapPart(p *CeilingPage) *mapPart {
	m := &mapPart{tools: p.tools, note: NewProse("", textAxis, 0).soft()}
	m.plot = p.plot("Verdict over U and V", func(float32) float32 {
		return min(max(p.roomInSight()-px(aroundCeiling), px(leastCeiling)), px(mostPicture))
	})
	m.job = NewJobBar(m.stop, func() { m.asked, m.held = 0, false; p.tools.echo() }, p.tools.key)
	p.follow(&m.job.button.control, m.job)
	m.note.Text = "U and V change alone, V along every axis that moves; the edge of the beams is left out. The diamond is the plan."
	m.body = NewColumn(space4, 0, m.plot, m.note, m.job)
	return m
}

func (m *mapPart) stop() {
	m.held = true
	m.tools.desk.StopJob(session.MapJob)
	m.tools.echo()
}

// Set computes the map anew once the plan rests, while it is open.
func (m *mapPart) Set(s session.State) {
	if !m.detail.open {
		return
	}
	if s.Judged != m.asked && !s.Stale && !s.Dragging && !m.held {
		m.asked = s.Judged
		m.tools.desk.StartMap(mapColumns, mapRows)
		s = m.tools.desk.State()
	}
	job := s.Jobs[session.MapJob]
	if verdicts, ok := job.Result.(*figure.VerdictMap); ok {
		m.plot.Draw(verdicts, func(*session.Artist) (subject, error) { return &mapSubject{verdicts}, nil })
		if job.Stale && s.Fading {
			m.plot.Age("the last change")
		}
	}
	show(m.plot, job.Result != nil)
	m.job.Set(job, m.held)
	m.body.Refresh()
}
