package exact

import (
	"context"
	"math"
	"os"
	"runtime"
	"testing"

	"hilltop/bosehubbard"
	"hilltop/bosehubbard/lattice"
)

// Sixteen atoms on sixteen sites, 300,540,195 states, in the even sector and in the
// whole space, without interaction, where the closed form of the band is the check.
// Minutes; set HILLTOP_LONG=1. The memory is that of two vectors and the lists.
func TestSixteenAtomsOnSixteenSites(t *testing.T) {
	if os.Getenv("HILLTOP_LONG") != "1" {
		t.Skip("takes minutes and 5 GB; HILLTOP_LONG=1 runs it")
	}
	l, err := lattice.Box([]int{16}, []bool{false})
	if err != nil {
		t.Fatal(err)
	}
	m := bosehubbard.Model{Axes: []bosehubbard.AxisTerms{{Tunnelling: 1}}}
	want := 32 * math.Cos(math.Pi/17)
	for _, sector := range []Sector{SectorAuto, SectorWhole} {
		ends, err := Solve(context.Background(), l, m, 16, Options{Sector: sector})
		if err != nil {
			t.Fatal(err)
		}
		var memory runtime.MemStats
		runtime.ReadMemStats(&memory)
		t.Logf("sector %s: %d iterations, %.1f s and %.1f s, %.2f GB from the system", ends.Sector, ends.Iterations,
			ends.BuildSeconds, ends.SolveSeconds, float64(memory.Sys)/1e9)
		near(t, "floor", ends.Floor, -want, 1e-11*want)
		near(t, "ceiling", ends.Ceiling, want, 1e-11*want)
		if ends.Dimension != 300_540_195 || memory.Sys > 7e9 {
			t.Errorf("%d states in %d bytes, want 300540195 in at most 7 GB", ends.Dimension, memory.Sys)
		}
		runtime.GC()
	}
}
