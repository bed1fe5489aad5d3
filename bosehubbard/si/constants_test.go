package si

import (
	"math"
	"testing"
)

// TestIdentities ties the measured constants to each other. Each tolerance is
// the sum of the relative uncertainties of the constants that enter, counted
// with their powers, because the table's rounding is far below them.
func TestIdentities(t *testing.T) {
	u := relativeUncertainties()
	for _, tc := range []struct {
		name      string
		got, want float64
		tol       float64
	}{
		{"eps0 mu0 c^2", ElectricConstant * MagneticConstant * SpeedOfLight * SpeedOfLight, 1, u["eps0"] + u["mu0"]},
		{"e^2/(4 pi eps0 hbar c)", ElementaryCharge * ElementaryCharge /
			(4 * math.Pi * ElectricConstant * ReducedPlanckConstant * SpeedOfLight), FineStructureConstant, u["eps0"] + u["alpha"]},
		{"e hbar/(2 me)", ElementaryCharge * ReducedPlanckConstant / (2 * ElectronMass), BohrMagneton, u["me"] + u["muB"]},
		{"hbar/(me c alpha)", ReducedPlanckConstant / (ElectronMass * SpeedOfLight * FineStructureConstant),
			BohrRadius, u["me"] + u["alpha"] + u["a0"]},
		{"4 pi eps0 hbar^2/(me e^2)", 4 * math.Pi * ElectricConstant * ReducedPlanckConstant * ReducedPlanckConstant /
			(ElectronMass * ElementaryCharge * ElementaryCharge), BohrRadius, u["eps0"] + u["me"] + u["a0"]},
	} {
		if diff := math.Abs(tc.got/tc.want - 1); !(diff <= tc.tol) {
			t.Errorf("%s: got %.12e, want %.12e, relative difference %.2g, tolerance %.2g", tc.name, tc.got, tc.want, diff, tc.tol)
		}
	}
}

// TestExactConstants holds the digits of the defining constants. Source: The
// International System of Units, 9th edition, BIPM (2019), section 2.2.
func TestExactConstants(t *testing.T) {
	for _, tc := range []struct {
		name      string
		got, want float64
	}{
		{"h", PlanckConstant, 6.62607015e-34},
		{"kB", BoltzmannConstant, 1.380649e-23},
		{"c", SpeedOfLight, 299792458},
		{"e", ElementaryCharge, 1.602176634e-19},
		{"gn", StandardGravity, 9.80665},
		{"G", Gauss, 1e-4},
	} {
		if tc.got != tc.want {
			t.Errorf("%s: got %v, want exactly %v", tc.name, tc.got, tc.want)
		}
	}
	// hbar to the 13 digits of the CODATA 2022 listing.
	if got, want := ReducedPlanckConstant, 1.054571817646e-34; math.Abs(got/want-1) > 5e-13 {
		t.Errorf("hbar: got %.13e, want %.13e", got, want)
	}
}

func TestConstantsTable(t *testing.T) {
	seen := map[string]bool{}
	for _, c := range Constants() {
		if c.Name == "" || c.Symbol == "" || c.Unit == "" || c.Source == "" || seen[c.Symbol] {
			t.Errorf("row %+v: want a name, a unit, a source and a symbol of its own", c)
		}
		seen[c.Symbol] = true
		if !(c.Value > 0) || c.Uncertainty < 0 || c.Uncertainty/c.Value > 1e-9 {
			t.Errorf("%s: value %g, uncertainty %g", c.Symbol, c.Value, c.Uncertainty)
		}
	}
	if len(seen) != 14 {
		t.Errorf("%d constants, want 14", len(seen))
	}
	// The caller owns the slice: writing to it changes nothing.
	Constants()[0].Value = 0
	if Constants()[0].Value != PlanckConstant {
		t.Error("the table can be changed from outside")
	}
}

func relativeUncertainties() map[string]float64 {
	out := map[string]float64{}
	for _, c := range Constants() {
		out[c.Symbol] = c.Uncertainty / c.Value
	}
	return out
}
