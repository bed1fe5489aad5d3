package figure

import (
	"fmt"
	"math"
	"math/rand/v2"

	"hilltop/bosehubbard/report"
)

// randomReport invents a report whose numbers lie up to spread apart, with one to
// three axes, some of which do not move, and every pattern of signs.
func randomReport(rng *rand.Rand, spread float64) *report.Report {
	size := func(typical float64) float64 {
		return typical * math.Pow(spread, rng.Float64()-0.5) * (0.5 + rng.Float64())
	}
	sign := func() float64 { return float64(1 - 2*rng.IntN(2)) }
	r := &report.Report{AimSign: "negative", Verdict: "sealed", HoldMS: 300}
	if rng.IntN(2) == 0 {
		r.AimSign = "positive"
	}
	u := sign() * size(600)
	end := report.Stage{Name: "hold", InteractionHz: &u}
	axes := 1 + rng.IntN(3)
	moving := make([]bool, axes)
	kinetic := bounds(0, 0)
	for i := range axes {
		moving[i] = rng.IntN(4) > 0
		j, v := size(400), sign()*size(0.4)
		if rng.IntN(12) == 0 {
			v = 0
		}
		end.TunnellingHz = append(end.TunnellingHz, j)
		end.CurvatureHz = append(end.CurvatureHz, v)
		end.RecoilHz = append(end.RecoilHz, 9436)
		end.GapHz = append(end.GapHz, size(27000))
		if moving[i] {
			kinetic.Floor.Hz -= 1.93 * j
			kinetic.Ceiling.Hz += 2.08 * j
		}
	}
	r.Stages = []report.Stage{{Name: "load"}, end}
	even := 0.0
	if rng.IntN(3) == 0 { // a model with more atoms than sites
		even = u * float64(rng.IntN(4)) / 2
	}
	r.Ceiling.Terms = []report.Term{{Term: "kinetic", Bounds: kinetic}, {Term: "interaction", Bounds: oneSided(u, even)}}
	for i := range axes {
		term := report.Term{Term: "trap_" + "xyz"[i:i+1], Motion: "moving"}
		if moving[i] {
			term.Bounds = oneSided(end.CurvatureHz[i], end.CurvatureHz[i]*float64(rng.IntN(2))/4)
		} else {
			term.Motion = "layered"
			term.Reason = fmt.Sprintf("layered: tilt %.4g Hz per site is at least 4J = %.4g Hz", size(350), size(60))
		}
		r.Ceiling.Terms = append(r.Ceiling.Terms, term)
	}
	r.Ceiling.Total = totalOf(r.Ceiling.Terms)
	breakSome(rng, r)
	return r
}

// breakSome breaks leaky criteria and adds the ends of growing systems.
func breakSome(rng *rand.Rand, r *report.Report) {
	for _, name := range []string{"one_band", "layers", "held", "edge", "lifetime"} {
		passed := rng.IntN(5) > 0
		margin := 300 * rng.Float64()
		if !passed {
			margin = -margin
			r.Verdict = "leaky"
		}
		r.Ceiling.Criteria = append(r.Ceiling.Criteria, report.Criterion{
			Name: name, Passed: passed, Margin: margin, Unit: "Hz", Breaks: "leaky",
		})
	}
	if total := r.Ceiling.Total; rng.IntN(3) == 0 && !total.Floor.Unbounded() && !total.Ceiling.Unbounded() {
		for n := 2; n < 6; n++ {
			shrink := 1 - 1/float64(n)
			r.Ceiling.Exact = append(r.Ceiling.Exact, report.Grown{
				Sites: []int{n}, Atoms: n, Floor: total.Floor.Hz * shrink, Ceiling: total.Ceiling.Hz * shrink,
			})
		}
	}
}

func bounds(floor, ceiling float64) report.Bounds {
	return report.Bounds{Floor: report.Bound{Known: true, Hz: floor}, Ceiling: report.Bound{Known: true, Hz: ceiling}}
}

// oneSided are the bounds of a term that grows without end on the side of v.
func oneSided(v, end float64) report.Bounds {
	switch {
	case v > 0:
		return bounds(end, math.Inf(1))
	case v < 0:
		return bounds(math.Inf(-1), end)
	}
	return bounds(0, 0)
}

func totalOf(terms []report.Term) report.Bounds {
	total := bounds(0, 0)
	for _, t := range terms {
		if t.Reason == "" {
			total.Floor.Hz += t.Floor.Hz
			total.Ceiling.Hz += t.Ceiling.Hz
		}
	}
	return total
}
