package aim

import (
	"context"
	"errors"
	"fmt"
	"math"
	"slices"
	"testing"

	"hilltop/bosehubbard/ceiling"
)

// bench is a make-believe system whose criteria are straight lines of the knobs.
type bench struct {
	knobs    []Knob
	criteria func(v []float64) []ceiling.Criterion
	calls    int
}

func (b *bench) evaluate(v []float64) (*ceiling.Assessment, error) {
	b.calls++
	a := &ceiling.Assessment{Verdict: ceiling.Sealed, Motions: []ceiling.Motion{ceiling.Moving, ceiling.Moving, ceiling.Layered}}
	for _, c := range b.criteria(v) {
		c.Passed = c.Margin >= 0
		if !c.Passed && c.Breaks.Worse(a.Verdict) {
			a.Verdict = c.Breaks
		}
		a.Criteria = append(a.Criteria, c)
	}
	return a, nil
}

func (b *bench) advise(t *testing.T, sign ceiling.Sign, criterion string) *Advice {
	t.Helper()
	p := &Problem{Sign: sign, Knobs: b.knobs, Evaluate: b.evaluate}
	var values []float64
	for _, k := range b.knobs {
		values = append(values, k.Value)
	}
	now, err := b.evaluate(values)
	if err != nil {
		t.Fatal(err)
	}
	advice, err := p.Advise(context.Background(), criterion, now)
	if err != nil {
		t.Fatal(err)
	}
	return advice
}

func power(name string, value float64) Knob {
	return Knob{Name: name, Kind: Power, Value: value, High: 2}
}

func margin(name string, m float64, breaks ceiling.Verdict) ceiling.Criterion {
	return ceiling.Criterion{Name: name, Margin: m, Breaks: breaks}
}

// TestSmallestTurn: the trap holds up to 83.4 mW; the advice is that, rounded
// onwards to two digits, 83 mW, from a sampling of 200 mW in 24 steps.
func TestSmallestTurn(t *testing.T) {
	b := &bench{knobs: []Knob{power("sheet", 0.2)}, criteria: func(v []float64) []ceiling.Criterion {
		return []ceiling.Criterion{margin("trap_x", 0.0834-v[0], ceiling.Open)}
	}}
	a := b.advise(t, ceiling.Negative, "trap_x")
	if a == nil || len(a.Moves) != 1 || a.Moves[0].To > 0.0834 || a.Moves[0].To < 0.081 || a.Verdict != ceiling.Sealed {
		t.Fatalf("advice %+v, want 81 to 83 mW and sealed", a)
	}
}

// TestPowersGoUpForPositiveT.
func TestPowersGoUpForPositiveT(t *testing.T) {
	b := &bench{knobs: []Knob{power("sheet", 0.2)}, criteria: func(v []float64) []ceiling.Criterion {
		return []ceiling.Criterion{margin("trap_x", v[0]-0.501, ceiling.Open)}
	}}
	a := b.advise(t, ceiling.Positive, "trap_x")
	if a == nil || a.Moves[0].To < 0.501 || a.Moves[0].To > 0.54 {
		t.Fatalf("advice %+v, want just above 501 mW", a)
	}
}

// TestTwoBeamsTogether: neither beam alone can go low enough.
func TestTwoBeamsTogether(t *testing.T) {
	b := &bench{knobs: []Knob{power("sheet", 0.2), power("cross", 0.2)}, criteria: func(v []float64) []ceiling.Criterion {
		return []ceiling.Criterion{margin("trap_x", 0.15-v[0]-v[1], ceiling.Open)}
	}}
	a := b.advise(t, ceiling.Negative, "trap_x")
	if a == nil || len(a.Moves) != 2 || a.Moves[0].To+a.Moves[1].To > 0.15 {
		t.Fatalf("advice %+v, want both beams lowered", a)
	}
}

// TestPullingApart: below 50 mW the trap is mended but the edge breaks; between
// nothing seals, so the advice says what breaks.
func TestPullingApart(t *testing.T) {
	b := &bench{knobs: []Knob{power("sheet", 0.2)}, criteria: func(v []float64) []ceiling.Criterion {
		return []ceiling.Criterion{margin("trap_x", 0.05-v[0], ceiling.Open), margin("edge", v[0]-0.06, ceiling.Leaky)}
	}}
	a := b.advise(t, ceiling.Negative, "trap_x")
	if a == nil || a.Verdict != ceiling.Leaky || !slices.Equal(a.New, []string{"edge"}) || a.Moves[0].To > 0.05 {
		t.Fatalf("advice %+v, want the edge named as newly broken", a)
	}
}

// TestSealedIsPreferred: the first beam mends its criterion and breaks another;
// the second one seals.
func TestSealedIsPreferred(t *testing.T) {
	b := &bench{knobs: []Knob{power("sheet", 0.2), power("cross", 0.2)}, criteria: func(v []float64) []ceiling.Criterion {
		return []ceiling.Criterion{margin("trap_x", 0.3-v[0]-v[1], ceiling.Open), margin("edge", v[0]-0.19, ceiling.Leaky)}
	}}
	a := b.advise(t, ceiling.Negative, "trap_x")
	if a == nil || a.Verdict != ceiling.Sealed || len(a.Moves) != 1 || a.Moves[0].Knob.Name != "cross" {
		t.Fatalf("advice %+v, want the cross beam alone", a)
	}
}

// TestNoWay: limits that forbid the cure leave no advice.
func TestNoWay(t *testing.T) {
	knob := power("sheet", 0.2)
	knob.Low, knob.High = 0.15, 0.3
	b := &bench{knobs: []Knob{knob}, criteria: func(v []float64) []ceiling.Criterion {
		return []ceiling.Criterion{margin("trap_x", 0.1-v[0], ceiling.Open)}
	}}
	if a := b.advise(t, ceiling.Negative, "trap_x"); a != nil {
		t.Errorf("advice %+v, want none", a)
	}
	if a := b.advise(t, ceiling.Negative, "unknown"); a != nil {
		t.Errorf("advice for an unknown criterion: %+v", a)
	}
}

// TestDepthsRiseTogether and stop at the first depth that seals.
func TestDepthsRiseTogether(t *testing.T) {
	var knobs []Knob
	for axis, depth := range []float64{2, 2, 22} {
		knobs = append(knobs, Knob{Name: fmt.Sprintf("depth_er/%d", axis), Kind: Depth, Axis: axis, Value: depth, High: 40})
	}
	b := &bench{knobs: knobs, criteria: func(v []float64) []ceiling.Criterion {
		return []ceiling.Criterion{margin("one_band", v[0]+v[1]-9, ceiling.Leaky)}
	}}
	a := b.advise(t, ceiling.Negative, "one_band")
	if a == nil || len(a.Moves) != 2 || a.Moves[0].To != a.Moves[1].To || a.Moves[0].To < 4.5 || a.Moves[0].To > 4.8 {
		t.Fatalf("advice %+v, want x and y raised to about 4.5", a)
	}
}

func TestModelsAreMirrored(t *testing.T) {
	b := &bench{knobs: []Knob{
		{Name: "interaction_hz", Kind: Interaction, Value: 3, Low: -10, High: 10},
		{Name: "curvature_hz/0", Kind: Curvature, Value: 0.2, Low: -1, High: 1},
	}, criteria: func(v []float64) []ceiling.Criterion {
		return []ceiling.Criterion{margin("interaction", -v[0], ceiling.Open), margin("trap_x", -v[1], ceiling.Open)}
	}}
	for criterion, want := range map[string]float64{"interaction": -3, "trap_x": -0.2} {
		a := b.advise(t, ceiling.Negative, criterion)
		if a == nil || len(a.Moves) != 1 || a.Moves[0].To != want || len(a.Broken) != 1 {
			t.Errorf("%s: %+v, want one move to %g and the other still broken", criterion, a, want)
		}
	}
}

func TestFieldsAreTriedInOrder(t *testing.T) {
	b := &bench{knobs: []Knob{{Name: "field_g", Kind: Field, Value: 398, High: 500}}, criteria: func(v []float64) []ceiling.Criterion {
		return []ceiling.Criterion{margin("interaction", 350-v[0], ceiling.Open), margin("layers", math.Abs(v[0]-300)-20, ceiling.Leaky)}
	}}
	p := &Problem{Sign: ceiling.Negative, Knobs: b.knobs, Evaluate: b.evaluate, FieldsFor: func(scale float64) []float64 {
		return map[float64][]float64{-1: {310, 700}, -0.5: {250}}[scale]
	}}
	now, _ := b.evaluate([]float64{398})
	a, err := p.Advise(context.Background(), "interaction", now)
	if err != nil || a == nil || a.Moves[0].To != 250 || a.Verdict != ceiling.Sealed {
		t.Errorf("advice %+v, %v; want 250 G: 310 is leaky, 700 beyond the range", a, err)
	}
}

func TestAdviseStops(t *testing.T) {
	ctx, cancel := context.WithCancel(context.Background())
	cancel()
	b := &bench{knobs: []Knob{power("sheet", 0.2)}, criteria: func([]float64) []ceiling.Criterion { return nil }}
	p := &Problem{Knobs: b.knobs, Evaluate: b.evaluate}
	if _, err := p.Advise(ctx, "trap_x", &ceiling.Assessment{}); !errors.Is(err, context.Canceled) {
		t.Errorf("got %v, want context.Canceled", err)
	}
}

func TestRoundOnwards(t *testing.T) {
	for _, tc := range []struct{ value, from, end, want float64 }{
		{0.0834, 0.2, 0, 0.083}, {0.0836, 0.2, 0, 0.083}, {5.123, 2, 40, 5.2}, {39.6, 2, 40, 40}, {0, 0.2, 0, 0},
		{123.4, 200, 0, 120}, {0.2996, 0.2, 0.3, 0.3}, {0.29961, 0.2, 0.2997, 0.29961},
	} {
		if got := roundOnwards(tc.value, tc.from, tc.end); math.Abs(got-tc.want) > 1e-12 {
			t.Errorf("%g on the way from %g to %g: %g, want %g", tc.value, tc.from, tc.end, got, tc.want)
		}
	}
}
