package gui

import (
	"hilltop/gui/session"
)

// entropyPart lets the size of the small system be chosen whose S(E) the Ceiling
// picture shows, says what each size costs, and shows the progress.
type entropyPart struct {
	body  *Column
	tools pageTools
	title *Prose
	sizes *Segmented
	run   *Button
	job   *JobBar
	list  []session.EntropySize
}

// quick is how many seconds a computation takes whose progress is not worth showing:
// the page would jump with every knob.
const quick = 1

func newEntropyPart(p *CeilingPage) *entropyPart {
	e := &entropyPart{tools: p.tools, title: NewProse("", textAxis, 0).soft()}
	e.sizes = NewSegmented(e.choose)
	e.sizes.OnKey = p.tools.key
	p.follow(&e.sizes.control, e.sizes)
	e.run = NewButton("", e.start)
	e.run.OnKey = p.tools.key
	p.follow(&e.run.control, e.run)
	e.job = NewJobBar(e.stop, e.start, p.tools.key)
	p.follow(&e.job.button.control, e.job)
	e.body = NewColumn(space4, 0, e.title, e.sizes, NewFlow(space8, e.run), e.job)
	return e
}

func (e *entropyPart) choose(i int) {
	e.tools.desk.ChooseEntropySize(e.list[i].Sites)
	e.tools.echo()
}

func (e *entropyPart) start() {
	e.tools.desk.StartEntropy()
	e.tools.echo()
}

func (e *entropyPart) stop() {
	e.tools.desk.StopEntropy()
	e.tools.echo()
}

// Set shows a state and lets the session follow the plan.
func (e *entropyPart) Set(s session.State) {
	e.tools.desk.FollowEntropy()
	now := s.Entropy
	e.list = now.Sizes
	cells := make([]string, len(now.Sizes))
	for i, z := range now.Sizes {
		cells[i] = z.Text
	}
	e.sizes.Set(cells, now.Chosen)
	chosen := now.Chosen >= 0 && now.Chosen < len(now.Sizes)
	waits := chosen && !now.Runs && !now.Held && !now.Job.Running && now.Job.Err == nil && now.Sizes[now.Chosen].Fits
	if waits {
		e.run.SetText("Compute S(E) of " + now.Sizes[now.Chosen].Text)
	}
	why := now.Why
	if chosen {
		why = words(now.Sizes[now.Chosen])
	}
	e.title.SetText(why)
	show(e.title, why != "")
	show(e.sizes, chosen)
	show(e.run, waits)
	job := now.Job
	job.Running = job.Running && chosen && now.Sizes[now.Chosen].Seconds > quick
	e.job.Set(job, now.Held && chosen)
	show(e.body, why != "")
	e.body.Refresh()
}

// words say what the sizes are.
func words(chosen session.EntropySize) string {
	if !chosen.Fits {
		return "This size does not fit the memory. Choose a smaller one."
	}
	return "S(E) of a small system with J, U and V of the end, sites:"
}

// subject is the picture of a state, with S(E) where there is one.
func (e *entropyPart) subject(s session.State) *ceilingSubject {
	c := &ceilingSubject{report: s.Report, axes: session.LatticeAxes(s.Plan)}
	if r := s.Entropy.Result; r != nil {
		curve := *r.Curve
		curve.Stale = s.Entropy.Job.Stale
		c.entropy = &curve
		if !curve.Stale {
			c.state = r.State
		}
	}
	return c
}
