package session

import (
	"cmp"
	"context"
	"math"
	"slices"

	"hilltop/bosehubbard/plan"
	"hilltop/bosehubbard/report"
)

// RoomJob is the key of the room that the knobs have; its result is a []KnobRoom.
const RoomJob = "room of the knobs"

// KnobRoom is how far one knob may go before the verdict changes, while the others
// stay as they are.
type KnobRoom struct {
	Field    string // ID
	Stage    int    // that sets it
	Label    string // "Power 'sheet' at 'release'"
	Value    string // in force, with unit
	Down, Up KnobLimit
}

// KnobLimit is the first value in one direction at which the verdict is another.
type KnobLimit struct {
	Found   bool
	Value   string  // with unit
	Change  string  // "−23 %"
	Part    float64 // of the value, how far away: 0.25 for 20 to 25 mW
	Breaks  string  // name of the criterion that decides there; "" where sealed
	Verdict string
}

// Nearest is the limit that is closer in parts of the value.
func (r KnobRoom) Nearest() KnobLimit {
	if !r.Down.Found || r.Up.Found && r.Up.Part < r.Down.Part {
		return r.Up
	}
	return r.Down
}

// StartRoom computes the room of every knob that the end of the plan depends on,
// as the job RoomJob: the one with the least room first, those without a limit
// left out.
func (s *Session) StartRoom() {
	s.mu.Lock()
	if s.doc == nil {
		s.mu.Unlock()
		return
	}
	search := roomSearch{doc: s.doc.now, judge: report.NewJudge()}
	search.stage = len(search.doc.Plan().Stages) - 1
	for _, e := range knobs(search.doc.Plan(), search.stage, s.factsOf(search.doc.Plan()).recoil) {
		e.Unit = s.shownUnit(e)
		search.knobs = append(search.knobs, e)
	}
	s.mu.Unlock()
	s.Start(RoomJob, func(ctx context.Context, p *plan.Plan, progress func(done, total int)) (any, error) {
		if p != search.doc.Plan() {
			return nil, context.Canceled // a newer plan has come between
		}
		return search.run(ctx, progress)
	})
}

// roomSearch looks for the limits of knobs, one knob after the other.
type roomSearch struct {
	doc   *plan.Document
	judge *report.Judge
	stage int
	knobs []entry
	now   string // the verdict of the plan
}

func (r *roomSearch) run(ctx context.Context, progress func(done, total int)) ([]KnobRoom, error) {
	own, err := r.judge.Judge(ctx, r.doc.Plan())
	if err != nil {
		return nil, err
	}
	r.now = own.Verdict
	var rooms []KnobRoom
	for i, e := range r.knobs {
		room := KnobRoom{Field: e.ID, Stage: e.sets, Value: e.measure.Fit(e.value, e.Unit, 10)}
		room.Label = e.Label + " at '" + r.doc.Plan().Rows()[e.sets+1].Name + "'"
		if room.Down, err = r.limit(ctx, e, -1); err != nil {
			return nil, err
		}
		if room.Up, err = r.limit(ctx, e, +1); err != nil {
			return nil, err
		}
		if room.Down.Found || room.Up.Found {
			rooms = append(rooms, room)
		}
		progress(i+1, len(r.knobs))
	}
	slices.SortStableFunc(rooms, func(a, b KnobRoom) int { return cmp.Compare(a.Nearest().Part, b.Nearest().Part) })
	return rooms, nil
}

// The steps away from the value grow from firstStep of it by stepGrowth; the place
// of the change is then halved to a hundredth of its distance.
const (
	firstStep  = 0.002
	stepGrowth = 1.3
	farthest   = 4 // times the value
	halvings   = 6
)

// limit walks from the value of a knob down (direction -1) or up (+1) until the
// verdict changes. A change that lasts less than a step may be missed.
func (r *roomSearch) limit(ctx context.Context, e entry, direction float64) (KnobLimit, error) {
	low, top := e.ends()
	inside, size := e.value, math.Abs(e.value)
	if size == 0 {
		return KnobLimit{}, nil
	}
	for step := firstStep; ; step *= stepGrowth {
		outside := min(max(e.value+direction*step*size, low), top)
		if outside == inside {
			return KnobLimit{}, nil
		}
		verdict, breaks, err := r.at(ctx, e, outside)
		if err != nil {
			return KnobLimit{}, err
		}
		if verdict != r.now && verdict != "" {
			return r.narrow(ctx, e, inside, outside, KnobLimit{Found: true, Breaks: breaks, Verdict: verdict})
		}
		inside = outside
	}
}

// ends is how far the search goes: to 0, and to the end of the slider or a few times
// the value, whichever is farther.
func (e entry) ends() (low, top float64) {
	top = max(farthest*math.Abs(e.value), e.top)
	if e.measure.Signed {
		low = -top
	}
	return low, top
}

// narrow halves the stretch in which the verdict changes.
func (r *roomSearch) narrow(ctx context.Context, e entry, inside, outside float64, found KnobLimit) (KnobLimit, error) {
	for range halvings {
		middle := (inside + outside) / 2
		verdict, breaks, err := r.at(ctx, e, middle)
		if err != nil {
			return KnobLimit{}, err
		}
		if verdict == r.now || verdict == "" {
			inside = middle
			continue
		}
		outside, found.Breaks, found.Verdict = middle, breaks, verdict
	}
	found.Part = math.Abs(outside-e.value) / math.Abs(e.value)
	found.Value = withUnit(e.measure.formatDigits(outside, e.Unit, 4), e.Unit)
	found.Change = withUnit(signed(Digits(math.Copysign(100*found.Part, outside-e.value), 2)), "%")
	return found, nil
}

// at judges the plan with another value; the verdict is "" where that cannot be
// judged, as on a pole.
func (r *roomSearch) at(ctx context.Context, e entry, value float64) (verdict, breaks string, err error) {
	if err := ctx.Err(); err != nil {
		return "", "", err
	}
	doc, err := r.doc.Apply(e.edits(value)...)
	if err != nil {
		return "", "", nil
	}
	out, err := r.judge.Judge(ctx, doc.Plan())
	if err != nil {
		return "", "", ctx.Err()
	}
	if c := decisive(out); c != nil {
		breaks = c.Name
	}
	return out.Verdict, breaks, nil
}
