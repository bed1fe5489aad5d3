package session

import (
	"math"

	"hilltop/bosehubbard/apparatus"
	"hilltop/bosehubbard/band"
	"hilltop/bosehubbard/plan"
	"hilltop/bosehubbard/report"
)

// MirrorRow says how far the real band of one lattice axis is from the band -2J cos
// q that the mirror between the two signs of T asks for.
type MirrorRow struct {
	Axis      string
	Next      string // J2/J1
	Curvature string // of the band's top over that of its bottom; 1 in the mirror
	Floor     string // edges about the centre, in J; -2 and +2 in the mirror
	Ceiling   string
}

// Mirror returns a row for every lattice axis at the end of a stage.
//
//	E0(q) about its mean = -2 sum_n J_n cos(n pi q); curvature ratio = -E0''(1)/E0''(0)
//
// It returns ErrNoBench for a model plan, and the error of the band solver.
//
// Source: Bloch, Dalibard, Zwerger, Rev. Mod. Phys. 80, 885 (2008), for J_n.
func (a *Artist) Mirror(p *plan.Plan, r *report.Report, stage int) ([]MirrorRow, error) {
	s, names := StageAt(r, stage), LatticeAxes(p)
	if s == nil || len(s.DepthEr) == 0 || len(s.DepthEr) != len(names) {
		return nil, ErrNoBench
	}
	rows := make([]MirrorRow, len(names))
	for i, depth := range s.DepthEr {
		bands, err := a.bands.Solve(depth)
		if err != nil {
			return nil, err
		}
		j := bands.Tunnelling[0]
		rows[i] = MirrorRow{
			Axis:    names[i],
			Next:    Digits(bands.Tunnelling[1]/j, 3),
			Floor:   signed(Digits((bands.Edges[0][0]-bands.Mean)/j, 4)) + " J",
			Ceiling: signed(Digits((bands.Edges[0][1]-bands.Mean)/j, 4)) + " J",
		}
		if depth < apparatus.MinimumInteractionDepth {
			continue // the top of the band turns into the kink of the free one
		}
		ratio, err := curvatureRatio(a.bands, depth)
		if err != nil {
			return nil, err
		}
		rows[i].Curvature = Digits(ratio, 3)
	}
	return rows, nil
}

// curvatureRatio is the curvature of the lowest band at its top over that at its
// bottom, both counted positive.
//
// The second differences over h and h/2 are extrapolated; the remainder, of the
// order of (8h/s)^4, is below 3e-6 from 1 Er on, and the rounding of the band's
// energies adds 1e-4 at 40 Er, where the ratio is 1 to three digits.
func curvatureRatio(w *band.Workspace, depth float64) (float64, error) {
	const h = 0.005
	bend := func(q, h float64) (float64, error) {
		sum, energy := 0.0, [1]float64{}
		for _, at := range [...]struct{ q, weight float64 }{{q - h, 1}, {q, -2}, {q + h, 1}} {
			if err := w.Energies(energy[:], depth, at.q); err != nil {
				return 0, err
			}
			sum += at.weight * energy[0]
		}
		return sum / (h * h), nil
	}
	curvature := [2]float64{} // at q = 0 and q = 1
	for q := range curvature {
		coarse, err := bend(float64(q), h)
		if err != nil {
			return 0, err
		}
		fine, err := bend(float64(q), h/2)
		if err != nil {
			return 0, err
		}
		curvature[q] = math.Abs((4*fine - coarse) / 3)
	}
	return curvature[1] / curvature[0], nil
}
