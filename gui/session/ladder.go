package session

import (
	"hilltop/bosehubbard/figure"
	"hilltop/bosehubbard/plan"
	"hilltop/bosehubbard/report"
	"hilltop/bosehubbard/thermo"
)

// ladderPoints is how many points S(E) of levels has.
const ladderPoints = 241

// Ladder returns the levels of a plan with the share of the bodies in each, and S(E)
// per body.
//
// It returns the errors of thermo.Levels.Curve.
func (a *Artist) Ladder(p *plan.Plan, r *report.Report) (*figure.Ladder, *figure.EntropyCurve, error) {
	l := thermo.Levels{Energies: p.Levels.EnergiesHz, Degeneracies: p.Levels.Degeneracies, Bodies: p.Levels.Bodies}
	c, err := l.Curve(ladderPoints)
	if err != nil {
		return nil, nil, err
	}
	ladder := &figure.Ladder{Energies: l.Energies, Degeneracies: l.Degeneracies}
	if r.Levels != nil {
		ladder.Shares = r.Levels.Shares
	}
	return ladder, &figure.EntropyCurve{Name: "per body", Energy: c.Energy, Entropy: c.Entropy, Beta: c.Beta}, nil
}
