package session

import (
	"context"
	"math"
	"testing"

	"hilltop/bosehubbard/plan"
	"hilltop/bosehubbard/report"
)

// Two levels of equal degeneracy: S is ln 2 in the middle, and a share (1+x)/2 is in
// the upper one at the mean energy x e.
func TestLadderOfTwoLevels(t *testing.T) {
	p, err := plan.Parse([]byte(`{"format":"hilltop-plan","version":1,"levels":{"energies_hz":[-8000,8000],"degeneracies":[1,1],"bodies":1e20,"inner_time_s":1e-4,"outer_time_s":300,"energy_hz_per_body":5000}}`))
	if err != nil {
		t.Fatal(err)
	}
	r, err := report.NewJudge().Judge(context.Background(), p)
	if err != nil {
		t.Fatal(err)
	}
	ladder, curve, err := NewArtist().Ladder(p, r)
	if err != nil {
		t.Fatal(err)
	}
	if got, want := ladder.Shares[1], (1+5.0/8)/2; math.Abs(got-want) > 1e-12 {
		t.Errorf("share of the upper level %g, want %g", got, want)
	}
	middle := len(curve.Energy) / 2
	if math.Abs(curve.Entropy[middle]-math.Ln2) > 1e-12 || curve.Energy[middle] != 0 {
		t.Errorf("S(%g Hz) = %g, want ln 2 at 0", curve.Energy[middle], curve.Entropy[middle])
	}
}
