package session

import (
	"errors"
	"strconv"
	"strings"
	"testing"
)

func judged(t testing.TB, template string) (*Session, *screen, State) {
	t.Helper()
	v := &screen{}
	s := New(Options{Show: v.show})
	t.Cleanup(s.Close)
	if err := s.NewFrom(template); err != nil {
		t.Fatal(err)
	}
	return s, v, settle(t, s, v)
}

func readNumber(t testing.TB, text string) float64 {
	t.Helper()
	text, _, _ = strings.Cut(strings.ReplaceAll(text, minus, "-"), " ")
	x, err := strconv.ParseFloat(text, 64)
	if err != nil {
		t.Fatalf("%q is no number: %v", text, err)
	}
	return x
}

func TestArtistFollowsTheStage(t *testing.T) {
	_, _, st := judged(t, "skerry-demo")
	a := NewArtist()
	load, lower := stageNamed(t, st, "load"), stageNamed(t, st, "lower")
	for _, tc := range []struct {
		stage      int
		depth      float64
		attractive bool
	}{{load, 22, false}, {lower, 6, true}} {
		bands, err := a.Bands(st.Plan, st.Report, tc.stage, 0)
		if err != nil || bands.Depth != tc.depth || len(bands.Energies) != bandCount {
			t.Errorf("stage %d: bands %+v, %v; want %d at %g Er", tc.stage, bands, err, bandCount, tc.depth)
		}
		depths, err := a.Depths(st.Plan, st.Report, tc.stage, 0)
		if err != nil || depths.Attractive != tc.attractive || len(depths.Plan) != 2 {
			t.Fatalf("stage %d: attractive %v, depths of the plan %v, %v; want %v and 6 and 22 Er", tc.stage, depths.Attractive, depths.Plan, err, tc.attractive)
		}
		budget, err := a.Budget(st.Report, tc.stage)
		if err != nil || budget.Stage != StageAt(st.Report, tc.stage).Name {
			t.Errorf("stage %d: budget of %+v, %v", tc.stage, budget, err)
		}
	}
	if axis := FastestAxis(st.Report, lower); LatticeAxes(st.Plan)[axis] == "z" {
		t.Error("z is the slowest axis of 'lower', not the fastest")
	}
	wannier, err := a.Wannier(st.Plan, st.Report, lower)
	if err != nil || len(wannier.Curves) != 2 || wannier.Curves[0].Axes != "x, y" {
		t.Errorf("Wannier functions %+v, %v; want one of x, y and one of z", wannier, err)
	}
	scattering, err := a.Scattering(st.Plan, st.Report)
	if err != nil || len(scattering.Path) != len(st.Report.Stages)+1 {
		t.Errorf("path of %d, %v; want the start and %d stages", len(scattering.Path), err, len(st.Report.Stages))
	}
}

func TestArtistSaysThatAModelHasNoBench(t *testing.T) {
	_, _, st := judged(t, "model-chain")
	a := NewArtist()
	_, budget := a.Budget(st.Report, 0)
	_, scattering := a.Scattering(st.Plan, st.Report)
	_, bands := a.Bands(st.Plan, st.Report, 0, 0)
	_, depths := a.Depths(st.Plan, st.Report, 0, 0)
	_, wannier := a.Wannier(st.Plan, st.Report, 0)
	_, mirror := a.Mirror(st.Plan, st.Report, 0)
	_, gravity := a.Gravity(st.Plan, st.Report, 0)
	_, sources := Sources(st.Plan)
	for i, err := range []error{budget, scattering, bands, depths, wannier, mirror, gravity, sources} {
		if !errors.Is(err, ErrNoBench) {
			t.Errorf("%d: got %v, want ErrNoBench", i, err)
		}
	}
}
