package gui

import (
	"fmt"
	"strings"
	"time"

	"hilltop/gui/session"
)

// roomPart lists how far every knob may go until the verdict changes.
type roomPart struct {
	body   *Column
	tools  pageTools
	detail *Disclosure
	grid   *Grid
	job    *JobBar
	note   *Prose
	rooms  []session.KnobRoom
	asked  uint64      // the report that the room was asked for
	timer  *time.Timer // until the search begins; nil for none
	held   bool        // stopped by the user
}

func newRoomPart(p *CeilingPage) *roomPart {
	r := &roomPart{tools: p.tools, note: NewProse("", textAxis, 0).soft()}
	r.grid = p.grid(func(row, _ int) { r.tools.goTo(r.rooms[row].Stage, r.rooms[row].Field) })
	r.job = NewJobBar(r.stop, func() { r.asked, r.held = 0, false; r.tools.echo() }, p.tools.key)
	p.follow(&r.job.button.control, r.job)
	r.body = NewColumn(space4, 0, r.grid, r.note, r.job)
	return r
}

func (r *roomPart) stop() {
	r.held = true
	r.tools.desk.StopJob(session.RoomJob)
	r.tools.echo()
}

// roomAfter is how long a plan rests before the search begins: it takes the time of
// some hundred judgements.
const roomAfter = 500 * time.Millisecond

// Set starts the search once the plan rests, stops it when the plan changes, so that
// it does not slow down the verdict, and shows what was found.
func (r *roomPart) Set(s session.State) {
	job := s.Jobs[session.RoomJob]
	switch {
	case (s.Dragging || s.Stale) && job.Running:
		r.tools.desk.StopJob(session.RoomJob)
		r.asked = 0
	case s.Judged != r.asked && !s.Stale && !s.Dragging && !r.held:
		r.asked = s.Judged
		r.begin()
	}
	r.rooms, _ = job.Result.([]session.KnobRoom)
	if r.detail.open {
		r.fill(s, job)
	}
}

// begin starts the search after a while, unless something else was asked for.
func (r *roomPart) begin() {
	if r.timer != nil {
		r.timer.Stop()
	}
	asked := r.asked
	r.timer = time.AfterFunc(roomAfter, func() {
		r.tools.plots.easel.later(func() {
			if r.timer = nil; r.asked == asked {
				r.tools.desk.StartRoom()
				r.tools.echo()
			}
		})
	})
}

var roomColumns = []GridColumn{{"Knob", true}, {"Value", false}, {"Lost below", false}, {"Lost above", false}, {"What breaks", true}}

func (r *roomPart) fill(s session.State, job session.Job) {
	rows := make([]GridRow, len(r.rooms))
	for i, room := range r.rooms {
		near := room.Nearest()
		rows[i] = GridRow{Chosen: i == 0, Cells: []string{room.Label, room.Value, limitText(room.Down), limitText(room.Up), breaks(near)}}
	}
	show(r.grid, len(rows) > 0)
	r.grid.Set(roomColumns, rows)
	r.note.Text = "One knob moves, the others stay. The first one listed has the least room in parts of its value. Space or a click leads to the knob."
	switch {
	case job.Running && len(rows) == 0:
		r.note.Text = "Looking how far each knob may go."
	case len(rows) == 0:
		r.note.Text = "No knob alone changes the verdict within four times its value."
	case job.Stale || s.Stale:
		r.note.Text = "From before the last change. " + r.note.Text
	}
	r.job.Set(job, r.held)
	r.body.Refresh()
}

func limitText(l session.KnobLimit) string {
	if !l.Found {
		return "none"
	}
	return l.Value + ", " + l.Change
}

// breaks says what is lost at a limit: "Layers keep apart: leaky".
func breaks(l session.KnobLimit) string {
	if l.Breaks == "" {
		return l.Verdict
	}
	return screenName(l.Breaks) + ": " + l.Verdict
}

// first returns the criterion of a sealed plan that breaks first, and which knob
// does it.
func (r *roomPart) first(s session.State) (criterion, words string) {
	if s.Report == nil || !s.Report.Sealed() || len(r.rooms) == 0 || s.Jobs[session.RoomJob].Stale {
		return "", ""
	}
	room := r.rooms[0]
	near := room.Nearest()
	return near.Breaks, fmt.Sprintf("Breaks first: %s, from %s to %s (%s) it turns %s.", firstLower(room.Label), room.Value, near.Value, near.Change, near.Verdict)
}

// firstLower begins a label inside a sentence.
func firstLower(label string) string {
	if label == "" {
		return ""
	}
	return strings.ToLower(label[:1]) + label[1:]
}
