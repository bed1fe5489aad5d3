package session

import (
	"context"
	"time"

	"hilltop/bosehubbard/plan"
)

// trials are judgements of plans that nobody has chosen yet: what the text in a
// field would do, what the advice would do, and the points of a slider's track.
// They run one by one after the judgement of the plan itself.
type trials struct {
	preview previewTrial
	advice  adviceTrial
	track   trackTrial
}

type previewTrial struct {
	shown *Preview // nil for none
	next  *plan.Document
}

type adviceTrial struct {
	next    []plan.Edit // nil where there is nothing to compute
	verdict string
}

// trackTrial fills a Track from both ends towards what matters: coarse first.
type trackTrial struct {
	track *Track
	entry entry
	base  *plan.Document
	order []int // points that are still to be judged
	shown time.Time
}

// nextTrial returns the next trial, or nil; during a drag there is none. The caller
// holds mu.
func (s *Session) nextTrial() func() {
	if s.drag != nil {
		return nil
	}
	t := &s.work.trials
	if next := t.preview.next; next != nil {
		t.preview.next = nil
		preview := t.preview.shown
		ctx := s.begin(0)
		return func() { s.endPreview(ctx, preview, next) }
	}
	if edits := t.advice.next; edits != nil {
		t.advice.next = nil
		doc, version := s.doc.now, s.work.version
		ctx := s.begin(0)
		return func() { s.endAdvice(ctx, version, doc, edits) }
	}
	if len(t.track.order) > 0 {
		i := t.track.order[0]
		t.track.order = t.track.order[1:]
		track := t.track
		ctx := s.begin(0)
		return func() { s.endTrackPoint(ctx, track, i) }
	}
	return nil
}

// verdictOf judges a plan as it would be; "" where that fails.
func (s *Session) verdictOf(ctx context.Context, doc *plan.Document) string {
	r, err := s.judge(ctx, doc.Plan())
	if err != nil {
		return ""
	}
	return r.Verdict
}

func (s *Session) endPreview(ctx context.Context, preview *Preview, doc *plan.Document) {
	verdict := s.verdictOf(ctx, doc)
	s.mu.Lock()
	defer s.mu.Unlock()
	interrupted := ctx.Err() != nil
	s.work.end()
	t := &s.work.preview
	if t.shown != preview {
		return
	}
	if interrupted {
		t.next = doc
		return
	}
	if verdict != "" {
		t.shown = &Preview{Field: preview.Field, Text: preview.Text + ", " + verdict, Verdict: verdict}
		s.changed(urgent)
	}
}

// startAdvice asks for the verdict after the advice of the present report. The
// caller holds mu.
func (s *Session) startAdvice() {
	s.work.advice = adviceTrial{}
	if s.work.reported != s.work.version || s.drag != nil {
		return
	}
	if c := decisive(s.work.report); c != nil && c.Advice != nil {
		s.work.advice.next = editsOf(c.Advice.Set)
	}
}

func (s *Session) endAdvice(ctx context.Context, version uint64, doc *plan.Document, edits []plan.Edit) {
	verdict := ""
	if next, err := doc.Apply(edits...); err == nil {
		verdict = s.verdictOf(ctx, next)
	}
	s.mu.Lock()
	defer s.mu.Unlock()
	interrupted := ctx.Err() != nil
	s.work.end()
	if version != s.work.version {
		return
	}
	if interrupted {
		s.work.advice.next = edits
		return
	}
	s.work.advice.verdict = verdict
	s.changed(urgent)
}

// startTrack begins the track of a field, or drops the present one where the
// field has no slider. The caller holds mu.
func (s *Session) startTrack(e entry) {
	s.work.track = trackTrial{}
	if !e.Slider || s.doc == nil {
		return
	}
	points := make([]TrackPoint, trackCount)
	for i := range points {
		points[i].Value = e.Min + (e.Max-e.Min)*float64(i)/(trackCount-1)
	}
	s.work.track = trackTrial{
		track: &Track{Field: e.ID, Unit: e.Unit, Min: e.Min, Max: e.Max, Points: points},
		entry: e, base: s.doc.now, order: coarseFirst(trackCount),
	}
	wake(s.wakes.judge)
}

// coarseFirst returns 0..n-1 so that every beginning of it is spread evenly.
func coarseFirst(n int) []int {
	order := make([]int, 0, n)
	taken := make([]bool, n)
	for step := 16; step > 0; step /= 2 {
		for i := 0; i < n; i += step {
			if !taken[i] {
				taken[i] = true
				order = append(order, i)
			}
		}
	}
	return order
}

func (s *Session) endTrackPoint(ctx context.Context, t trackTrial, i int) {
	verdict := ""
	value := t.entry.measure.inDocument(t.track.Points[i].Value, t.entry.Unit)
	if next, err := t.base.Apply(t.entry.edits(value)...); err == nil {
		verdict = s.verdictOf(ctx, next)
	}
	s.mu.Lock()
	defer s.mu.Unlock()
	interrupted := ctx.Err() != nil
	s.work.end()
	now := &s.work.track
	if now.track == nil || now.entry.ID != t.entry.ID || now.base != t.base {
		return
	}
	if interrupted {
		now.order = append([]int{i}, now.order...)
		return
	}
	fresh := *now.track
	fresh.Points = append([]TrackPoint(nil), fresh.Points...)
	fresh.Points[i].Verdict = verdict
	fresh.Done = len(now.order) == 0
	now.track = &fresh
	if fresh.Done || time.Since(now.shown) > 4*s.opt.Interval {
		now.shown = time.Now()
		s.changed(patient)
	}
}
