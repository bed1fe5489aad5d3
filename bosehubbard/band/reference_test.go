package band

import (
	"math"
	"strconv"
	"strings"
	"testing"

	"hilltop/testdata"
)

// checkNear reports a value that misses the wanted one by more than tol.
func checkNear(t *testing.T, what string, depth, got, want, tol float64) {
	t.Helper()
	if diff := math.Abs(got - want); !(diff <= tol) {
		t.Errorf("%s at %g Er: got %.15g, want %.15g, difference %.2g, tolerance %.2g", what, depth, got, want, diff, tol)
	}
}

// halfDigit returns half of the last digit of a number as it stands in a table.
func halfDigit(t *testing.T, cell string) float64 {
	t.Helper()
	mantissa, exponent, _ := strings.Cut(cell, "e")
	_, decimals, _ := strings.Cut(mantissa, ".")
	power := -len(decimals)
	if exponent != "" {
		e, err := strconv.Atoi(exponent)
		if err != nil {
			t.Fatalf("cell %q: %v", cell, err)
		}
		power += e
	}
	return 0.5 * math.Pow(10, float64(power))
}

// TestMasterTable checks every column to the digits it is given with. The ratios
// of tunnellings carry the rounding of their energies, 1e-15/J1, besides.
func TestMasterTable(t *testing.T) {
	sheet := testdata.Table(t, "band_master")
	columns := map[string]func(Bands) float64{
		"E0_q0":  func(b Bands) float64 { return b.Edges[0][0] },
		"E0_q1":  func(b Bands) float64 { return b.Edges[0][1] },
		"E1_q1":  func(b Bands) float64 { return b.Edges[1][1] },
		"E1_q0":  func(b Bands) float64 { return b.Edges[1][0] },
		"W":      func(b Bands) float64 { return b.Width },
		"J1":     func(b Bands) float64 { return b.Tunnelling[0] },
		"J2_J1":  func(b Bands) float64 { return b.Tunnelling[1] / b.Tunnelling[0] },
		"J3_J1":  func(b Bands) float64 { return b.Tunnelling[2] / b.Tunnelling[0] },
		"gap_q1": func(b Bands) float64 { return b.Gap },
		"gap_q0": func(b Bands) float64 { return b.Edges[1][0] - b.Edges[0][0] },
		"I4":     func(b Bands) float64 { return b.WannierFourthMoment },
		"U_ratio": func(b Bands) float64 { // the harmonic moment is (sqrt(s)/2 pi)^(1/2)
			return math.Pow(b.WannierFourthMoment/math.Sqrt(math.Sqrt(b.Depth)/(2*math.Pi)), 3)
		},
	}
	if len(sheet.Columns) != len(columns)+1 {
		t.Errorf("%d columns, want %d", len(sheet.Columns), len(columns)+1)
	}
	w := NewWorkspace()
	depths := sheet.Floats(t, "s")
	for name, value := range columns {
		cells, want := sheet.Strings(t, name), sheet.Floats(t, name)
		for i, depth := range depths {
			b, err := w.Solve(depth)
			if err != nil {
				t.Fatal(err)
			}
			tol := 1.0001 * halfDigit(t, cells[i])
			if strings.HasSuffix(name, "_J1") {
				tol += 1e-15 / b.Tunnelling[0]
			}
			checkNear(t, name, depth, value(b), want[i], tol)
		}
	}
}

// TestMathieuEdges: the table has 12 decimals. The energies add s/2 and the
// rounding of it in the matrix, 2^-52 s/2 a few times over.
func TestMathieuEdges(t *testing.T) {
	sheet := testdata.Table(t, "mathieu")
	edges := []struct {
		name      string
		band, end int
	}{{"a0", 0, 0}, {"b1", 0, 1}, {"a1", 1, 1}, {"b2", 1, 0}, {"a2", 2, 0}}
	w := NewWorkspace()
	for i, depth := range sheet.Floats(t, "s") {
		b, err := w.Solve(depth)
		if err != nil {
			t.Fatal(err)
		}
		for _, e := range edges {
			want := depth/2 + sheet.Floats(t, e.name)[i]
			checkNear(t, e.name, depth, b.Edges[e.band][e.end], want, 6e-13+4*0x1p-52*depth)
		}
	}
}

// TestHighPrecision: averages over the band to a few roundings, J1 to the
// relative accuracy that Solve promises, J2 and J3 to that of J1.
func TestHighPrecision(t *testing.T) {
	sheet := testdata.Table(t, "band_deep")
	depths := sheet.Floats(t, "s")
	mean, slope := sheet.Floats(t, "mean"), sheet.Floats(t, "mean_slope")
	w := NewWorkspace()
	for i, depth := range depths {
		b, err := w.Solve(depth)
		if err != nil {
			t.Fatal(err)
		}
		checkNear(t, "mean", depth, b.Mean, mean[i], 1e-15+4*0x1p-52*(1+depth))
		checkNear(t, "mean slope", depth, b.MeanSlope, slope[i], 1e-14)
		first := sheet.Floats(t, "J1")[i]
		tol := first * 3e-14 * (10 + math.Exp(0.7*math.Sqrt(depth)))
		for r, name := range []string{"J1", "J2", "J3"} {
			checkNear(t, name, depth, b.Tunnelling[r], sheet.Floats(t, name)[i], tol)
		}
	}
}

// TestExcitationAtZoneCentre: E2 - E0 at q = 0, a plane-wave calculation with
// |l| <= 10 to six decimals.
func TestExcitationAtZoneCentre(t *testing.T) {
	w := NewWorkspace()
	for depth, want := range map[float64]float64{
		0.5: 4.014296, 3: 4.484721, 5: 5.231015, 6.1: 5.731004, 8: 6.686622,
		10: 7.766119, 15: 10.557107, 20: 13.249156, 22: 14.264697,
	} {
		b, err := w.Solve(depth)
		if err != nil {
			t.Fatal(err)
		}
		checkNear(t, "E2-E0", depth, b.Edges[2][0]-b.Edges[0][0], want, 0.6e-6)
	}
}

// TestMeanSlopeValues: plane-wave calculation to six decimals.
func TestMeanSlopeValues(t *testing.T) {
	w := NewWorkspace()
	for depth, want := range map[float64]float64{6.1: 0.206013, 22: 0.107060} {
		b, err := w.Solve(depth)
		if err != nil {
			t.Fatal(err)
		}
		checkNear(t, "mean slope", depth, b.MeanSlope, want, 0.6e-6)
	}
}

// TestAgainstDense compares with the plain solution on a ring. 96 sites leave
// exp(-12 pi s) at depth s, below 1e-16 from s = 1 on.
func TestAgainstDense(t *testing.T) {
	if testing.Short() {
		t.Skip("dense matrices")
	}
	w := NewWorkspace()
	for _, depth := range []float64{1, 1.3, 2.7, 4.4, 5.999, 6, 7.7, 13, 19.999, 20, 29, 61} {
		b, err := w.Solve(depth)
		if err != nil {
			t.Fatal(err)
		}
		want := solveDense(t, depth, 96)
		checkNear(t, "mean", depth, b.Mean, want.mean, 2e-13)
		checkNear(t, "mean slope", depth, b.MeanSlope, want.slope, 1e-13)
		checkNear(t, "fourth moment", depth, b.WannierFourthMoment, want.fourth, 1e-12)
		for r := range b.Tunnelling {
			checkNear(t, "tunnelling", depth, b.Tunnelling[r], want.tunnelling[r], 1e-13)
		}
	}
}

// TestShallowFourthMoment: on 640 sites the plain solution is good to 1e-12 at
// 0.1 Er and to 1e-9 at 0.05 Er (its change from 320 sites, squared).
func TestShallowFourthMoment(t *testing.T) {
	if testing.Short() {
		t.Skip("dense matrices")
	}
	w := NewWorkspace()
	for depth, tol := range map[float64]float64{0.4: 1e-12, 0.1: 5e-10, 0.05: 2e-9} {
		b, err := w.Solve(depth)
		if err != nil {
			t.Fatal(err)
		}
		checkNear(t, "fourth moment", depth, b.WannierFourthMoment, solveDense(t, depth, 640).fourth, tol)
	}
}
