package sequence

import (
	"math"
	"testing"

	"hilltop/bosehubbard/apparatus"
	"hilltop/bosehubbard/atom"
	"hilltop/bosehubbard/si"
)

func settings(depth, power, gauss float64) apparatus.Settings {
	return apparatus.Settings{Depth: [3]float64{depth, depth, 22}, Power: []float64{power}, Field: gauss * si.Gauss}
}

func example() *Sequence {
	return &Sequence{
		Start: settings(0, 0.2, 398),
		Stages: []Stage{
			{"load", 0.030, Exponential, settings(22, 0.2, 398)},
			{"flip", 0.002, Smooth, settings(22, 0.02, 200)},
			{"lower", 0.0025, Linear, settings(6, 0.02, 200)},
			{"rest", 0.1, Hold, settings(6, 0.02, 200)},
			{"wait", 0.2, Hold, settings(6, 0.02, 200)},
		},
	}
}

// TestShapes checks the formulas at hand values: the smooth step is 1/2 in the
// middle with zero slope at the ends, the exponential (e^2-1)/(e^4-1).
func TestShapes(t *testing.T) {
	for _, tc := range []struct {
		shape   Shape
		u, want float64
	}{
		{Linear, 0.3, 0.3}, {Smooth, 0.5, 0.5}, {Smooth, 0.25, 0.103515625},
		{Exponential, 0.5, (math.E*math.E - 1) / (math.Pow(math.E, 4) - 1)}, {Hold, 0, 1},
	} {
		if got := tc.shape.At(tc.u); math.Abs(got-tc.want) > 1e-14 {
			t.Errorf("%s at %g: %.15g, want %.15g", tc.shape, tc.u, got, tc.want)
		}
	}
	for _, shape := range []Shape{Linear, Exponential, Smooth} {
		if shape.At(0) != 0 || shape.At(-1) != 0 || shape.At(1) != 1 || shape.At(2) != 1 {
			t.Errorf("%s does not run from 0 to 1", shape)
		}
		for u := 0.0; u < 1; u += 0.01 {
			if shape.At(u+0.01) < shape.At(u) {
				t.Errorf("%s falls at %g", shape, u)
			}
		}
	}
}

func TestSettingsInTime(t *testing.T) {
	s := example()
	var got apparatus.Settings
	for _, tc := range []struct{ t, depth, power, gauss float64 }{
		{-1, 0, 0.2, 398}, {0, 0, 0.2, 398}, {0.030, 22, 0.2, 398}, {0.031, 22, 0.11, 299},
		{0.03325, 14, 0.02, 200}, {0.2, 6, 0.02, 200}, {9, 6, 0.02, 200},
	} {
		s.At(&got, tc.t)
		if math.Abs(got.Depth[0]-tc.depth) > 1e-9 || math.Abs(got.Power[0]-tc.power) > 1e-12 || math.Abs(got.Field/si.Gauss-tc.gauss) > 1e-9 {
			t.Errorf("t = %g: %+v, want depth %g, power %g, field %g G", tc.t, got, tc.depth, tc.power, tc.gauss)
		}
	}
	if n := testing.AllocsPerRun(100, func() { s.At(&got, 0.031) }); n != 0 {
		t.Errorf("At allocates %g times", n)
	}
	if got := s.Duration(); math.Abs(got-0.3345) > 1e-12 {
		t.Errorf("duration %g s, want 0.3345", got)
	}
}

func TestHoldIsTheTrailingHoldStages(t *testing.T) {
	s := example()
	if hold, ok := s.HoldTime(); !ok || math.Abs(hold-0.3) > 1e-12 {
		t.Errorf("hold %g s, %v; want 0.3", hold, ok)
	}
	s.Stages = s.Stages[:3]
	if hold, ok := s.HoldTime(); ok || hold != 0 {
		t.Errorf("without a hold: %g s, %v", hold, ok)
	}
	if hold, ok := (&Sequence{}).HoldTime(); ok || hold != 0 {
		t.Errorf("without stages: %g s, %v", hold, ok)
	}
}

// TestCrossings: from 398 G down to 200 G passes the zero at 350.5 G and not the
// pole at 402.5 G; a stage that ends on the zero has it, the next one has not.
func TestCrossings(t *testing.T) {
	curve := atom.ScatteringCurve{
		Background: -29 * si.BohrRadius,
		Resonances: []atom.Resonance{{Position: 402.5 * si.Gauss, Width: -52 * si.Gauss}},
	}
	s := example()
	got := s.Crossings(curve)
	if len(got[1]) != 1 || got[1][0].Kind != atom.Zero || math.Abs(got[1][0].Field/si.Gauss-350.5) > 1e-9 {
		t.Errorf("flip crosses %+v, want the zero at 350.5 G", got[1])
	}
	if len(got[0])+len(got[2])+len(got[3])+len(got[4]) != 0 {
		t.Errorf("other stages cross %+v", got)
	}
	s.Start.Field = 420 * si.Gauss
	s.Stages[0].End.Field = curve.Zeros()[0]
	got = s.Crossings(curve)
	if len(got[0]) != 2 || got[0][0].Kind != atom.Pole || got[0][1].Kind != atom.Zero || len(got[1]) != 0 {
		t.Errorf("420 G to the zero and on: %+v, want pole then zero in the first stage only", got)
	}
	if n := len((&Sequence{}).Crossings(curve)); n != 0 {
		t.Errorf("no stages: %d lists", n)
	}
}
