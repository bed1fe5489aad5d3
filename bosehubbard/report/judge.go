package report

import (
	"context"
	"fmt"
	"math"

	"hilltop/bosehubbard/apparatus"
	"hilltop/bosehubbard/ceiling"
	"hilltop/bosehubbard/plan"
)

// Judge judges plans one after the other with scratch of its own; one goroutine
// at a time.
type Judge struct {
	workspace *apparatus.Workspace
}

// NewJudge returns a Judge.
func NewJudge() *Judge { return &Judge{workspace: apparatus.NewWorkspace()} }

// Of judges one plan with fresh scratch.
func Of(ctx context.Context, p *plan.Plan) (*Report, error) { return NewJudge().Judge(ctx, p) }

// Judge takes a plan to its report: J, U, V at the end of every stage, bounds,
// criteria, advice, verdict, cautions.
//
// It returns plan.Errors for what the document causes, and ctx's error if stopped.
func (j *Judge) Judge(ctx context.Context, p *plan.Plan) (*Report, error) {
	switch {
	case p.Levels != nil:
		return judgeLevels(p)
	case p.Model != nil:
		return judgeModel(ctx, p)
	}
	return j.judgeApparatus(ctx, p)
}

// holdWithout is the hold assumed for a plan that ends without one, in hbar/J.
const holdWithout = 1000

// assumedHold returns the time in s assumed where no hold is given, for the
// largest tunnelling in Hz; 1 s where nothing tunnels.
func assumedHold(tunnelling float64) float64 {
	if tunnelling == 0 {
		return 1
	}
	return holdWithout / (2 * math.Pi * tunnelling)
}

func holdCaution(hold float64) Caution {
	return Caution{Code: "no_hold", Text: fmt.Sprintf(
		"The plan ends without a hold stage; %d ħ/J = %s is assumed. Add a stage of shape hold with the time you want.",
		holdWithout, duration(hold*1e3))}
}

func signOf(p *plan.Plan) ceiling.Sign {
	if p.AimSign == plan.Positive {
		return ceiling.Positive
	}
	return ceiling.Negative
}

// fill copies an assessment into the report.
func (r *Report) fill(a *ceiling.Assessment) {
	r.Verdict = string(a.Verdict)
	r.Ceiling.Total = boundsOf(a.Total)
	for _, t := range a.Terms {
		term := Term{Term: t.Name, Reason: t.Reason}
		if t.Name != "kinetic" && t.Name != "interaction" {
			term.Motion = string(t.Motion)
		}
		if t.Reason == "" {
			term.Bounds = boundsOf(t.Bounds)
		}
		r.Ceiling.Terms = append(r.Ceiling.Terms, term)
	}
	for _, c := range a.Criteria {
		r.Ceiling.Criteria = append(r.Ceiling.Criteria, Criterion{
			Name: c.Name, Passed: c.Passed, Margin: c.Margin, Unit: c.Unit,
			Breaks: string(c.Breaks), Detail: c.Detail,
		})
	}
}

func boundsOf(i ceiling.Interval) Bounds {
	return Bounds{Floor: Bound{Known: true, Hz: i.Floor + 0}, Ceiling: Bound{Known: true, Hz: i.Ceiling + 0}} // + 0 turns -0 into 0
}
