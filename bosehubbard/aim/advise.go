package aim

import (
	"context"
	"math"
	"slices"

	"hilltop/bosehubbard/ceiling"
)

// Advise returns the best way found to mend one broken criterion, or nil where
// no turn of the knobs within their ranges mends it.
//
// now is the assessment with the knobs at their present values. The search
// samples each route at 24 points and refines by bisection to 1/400 of the way:
// about 40 evaluations a route. It stops at the first route that seals the plan,
// and returns ctx's error if stopped.
func (p *Problem) Advise(ctx context.Context, criterion string, now *ceiling.Assessment) (*Advice, error) {
	var best *Advice
	for _, r := range p.routes(criterion, now) {
		if err := ctx.Err(); err != nil {
			return nil, err
		}
		found := p.follow(r, criterion, now)
		if found != nil && found.better(best) {
			best = found
		}
		if best != nil && best.Verdict == ceiling.Sealed {
			break
		}
	}
	return best, nil
}

func (p *Problem) follow(r route, criterion string, now *ceiling.Assessment) *Advice {
	if r.ends == nil {
		return p.jump(r, criterion, now)
	}
	const samples = 24
	var passing *Advice
	for k := 1; k <= samples; k++ {
		t := float64(k) / samples
		tried := p.try(r, t, criterion, now)
		if tried == nil {
			continue
		}
		if !tried.better(passing) {
			continue
		}
		passing = p.refine(r, t-1.0/samples, t, tried, criterion, now)
		if passing.Verdict == ceiling.Sealed {
			break
		}
	}
	return passing
}

// refine walks back from t towards the last point that was not as good.
func (p *Problem) refine(r route, bad, good float64, found *Advice, criterion string, now *ceiling.Assessment) *Advice {
	for range 5 {
		middle := (bad + good) / 2
		tried := p.try(r, middle, criterion, now)
		if tried != nil && !found.better(tried) {
			good, found = middle, tried
		} else {
			bad = middle
		}
	}
	return found
}

func (p *Problem) jump(r route, criterion string, now *ceiling.Assessment) *Advice {
	var best *Advice
	for _, value := range r.jumps {
		tried := p.judge(r.knobs, []float64{value}, criterion, now)
		if tried != nil && tried.better(best) {
			best = tried
		}
		if best != nil && best.Verdict == ceiling.Sealed {
			break
		}
	}
	return best
}

// try turns the knobs of a route the fraction t of their ways, rounded onwards.
func (p *Problem) try(r route, t float64, criterion string, now *ceiling.Assessment) *Advice {
	values := make([]float64, len(r.knobs))
	for n, i := range r.knobs {
		k := p.Knobs[i]
		values[n] = roundOnwards(k.Value+t*(r.ends[n]-k.Value), k.Value, r.ends[n])
	}
	return p.judge(r.knobs, values, criterion, now)
}

// judge returns the advice to set these knobs, or nil if it does not mend the
// criterion.
func (p *Problem) judge(knobs []int, to []float64, criterion string, now *ceiling.Assessment) *Advice {
	values := make([]float64, len(p.Knobs))
	for i, k := range p.Knobs {
		values[i] = k.Value
	}
	advice := &Advice{Criterion: criterion}
	for n, i := range knobs {
		k := p.Knobs[i]
		if to[n] == k.Value || to[n] < k.Low || to[n] > k.High {
			continue
		}
		values[i] = to[n]
		advice.Moves = append(advice.Moves, Move{Knob: k, From: k.Value, To: to[n]})
	}
	after, err := p.Evaluate(values)
	if err != nil || len(advice.Moves) == 0 {
		return nil
	}
	advice.Verdict, advice.Broken = after.Verdict, after.Broken()
	if slices.Contains(advice.Broken, criterion) || freezes(now, after) {
		return nil
	}
	before := now.Broken()
	for _, name := range advice.Broken {
		if !slices.Contains(before, name) {
			advice.New = append(advice.New, name)
		}
	}
	return advice
}

// freezes reports whether an axis that moved stands still for lack of tunnelling:
// that ends the flip instead of mending it. A layered axis is another matter.
func freezes(before, after *ceiling.Assessment) bool {
	for i, m := range after.Motions {
		if m == ceiling.Frozen && i < len(before.Motions) && before.Motions[i] != ceiling.Frozen {
			return true
		}
	}
	return false
}

// roundOnwards rounds value to two significant digits in the direction from -> end,
// or to three where two would pass the end.
func roundOnwards(value, from, end float64) float64 {
	if value == 0 || value == end {
		return value
	}
	for digits := 1; digits <= 2; digits++ {
		scale := math.Pow(10, float64(digits)-math.Floor(math.Log10(math.Abs(value))))
		rounded := math.Floor(value*scale) / scale
		if end > from {
			rounded = math.Ceil(value*scale) / scale
		}
		if (rounded-end)*(end-from) <= 0 {
			return rounded
		}
	}
	return value
}
