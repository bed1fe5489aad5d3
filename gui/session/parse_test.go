package session

import (
	"errors"
	"math"
	"strings"
	"testing"
	"unicode/utf8"
)

// Measures as the fields use them; the recoil is that of 39K at 736.65 nm, a
// plane-wave calculation.
var (
	powerMeasure      = Measure{Dimension: Power, Unit: "W"}
	fieldMeasure      = Measure{Dimension: FieldStrength, Unit: "G"}
	depthMeasure      = Measure{Dimension: Depth, Unit: "Er", RecoilHz: 9436.14}
	energyMeasure     = Measure{Dimension: Energy, Unit: "Hz", Signed: true}
	durationMeasure   = Measure{Dimension: Duration, Unit: "ms"}
	waistMeasure      = Measure{Dimension: Length, Unit: "um"}
	wavelengthMeasure = Measure{Dimension: Length, Unit: "nm"}
	lengthMeasure     = Measure{Dimension: ScatteringLength, Unit: "a0", Signed: true}
	countMeasure      = Measure{Dimension: Number, Whole: true}
	ratioMeasure      = Measure{Dimension: Ratio}
	entropyMeasure    = Measure{Dimension: Entropy, Unit: "kB"}
	gradientMeasure   = Measure{Dimension: FieldGradient, Unit: "G/cm", Signed: true}
	curvatureMeasure  = Measure{Dimension: FieldCurvature, Unit: "1/cm²", Signed: true}
)

func TestParseReads(t *testing.T) {
	for _, tc := range []struct {
		m           Measure
		text, shown string
		want        float64
		unit        string
	}{
		{powerMeasure, "0.2", "W", 0.2, "W"},
		{powerMeasure, "200", "mW", 0.2, "mW"},
		{powerMeasure, "2*1.3 mW", "W", 0.0026, "mW"},
		{powerMeasure, "2 × 1.3mW", "W", 0.0026, "mW"},
		{powerMeasure, "1e-3", "W", 1e-3, "W"},
		{powerMeasure, "1E−3", "W", 1e-3, "W"},
		{powerMeasure, "1e+2 uW", "W", 1e-4, "uW"},
		{powerMeasure, "31 µW", "W", 31e-6, "uW"},
		{powerMeasure, "31 μW", "W", 31e-6, "uW"},
		{powerMeasure, "1,5 W", "mW", 1.5, "W"},
		{powerMeasure, "0,200", "W", 0.2, "W"},
		{powerMeasure, "1,2345", "W", 1.2345, "W"},
		{powerMeasure, ",5", "W", 0.5, "W"},
		{powerMeasure, ".5", "W", 0.5, "W"},
		{powerMeasure, "5.", "W", 5, "W"},
		{powerMeasure, "1.200", "W", 1.2, "W"},
		{powerMeasure, "1/4", "W", 0.25, "W"},
		{powerMeasure, "1 / 4 mW", "W", 0.25e-3, "mW"},
		{powerMeasure, "  22 mW  ", "W", 0.022, "mW"},
		{powerMeasure, "22\u00a0mW", "W", 0.022, "mW"},
		{powerMeasure, "22\u202fmW", "W", 0.022, "mW"},
		{powerMeasure, "22 mw", "W", 0.022, "mW"},
		{fieldMeasure, "398", "G", 398, "G"},
		{fieldMeasure, "39.8 mT", "G", 398, "mT"},
		{fieldMeasure, "0.0398 T", "G", 398, "T"},
		{fieldMeasure, "398 gauss", "mT", 398, "G"},
		{depthMeasure, "6.1", "Er", 6.1, "Er"},
		{depthMeasure, "6.1 er", "Er", 6.1, "Er"},
		{depthMeasure, "9.43614 kHz", "Er", 1, "kHz"},
		{depthMeasure, "18872.28", "Hz", 2, "Hz"},
		{energyMeasure, "-2.1", "Hz", -2.1, "Hz"},
		{energyMeasure, "−2.1", "Hz", -2.1, "Hz"},
		{energyMeasure, "+2.1 kHz", "Hz", 2100, "kHz"},
		{energyMeasure, "2*-3", "Hz", -6, "Hz"},
		{energyMeasure, "0", "Hz", 0, "Hz"},
		{energyMeasure, "-0", "Hz", 0, "Hz"},
		{energyMeasure, "1e-300", "Hz", 1e-300, "Hz"},
		{durationMeasure, "0.3 s", "ms", 300, "s"},
		{durationMeasure, "250 us", "ms", 0.25, "us"},
		{waistMeasure, "0.15 mm", "um", 150, "mm"},
		{waistMeasure, "1.5e-4 m", "um", 150, "m"},
		{wavelengthMeasure, "1.064 um", "nm", 1064, "um"},
		{lengthMeasure, "-37", "a0", -37, "a0"},
		{countMeasure, "80000", "", 80000, ""},
		{countMeasure, "8e4", "", 80000, ""},
		{ratioMeasure, "0.95", "", 0.95, ""},
		{ratioMeasure, "95 %", "", 0.95, "%"},
		{entropyMeasure, "0,6 kB", "kB", 0.6, "kB"},
		{gradientMeasure, "0.1 T/m", "G/cm", 10, "T/m"},
		{curvatureMeasure, "-0.5 1/cm2", "1/cm²", -0.5, "1/cm²"},
		{curvatureMeasure, "2 cm^-2", "1/cm²", 2, "1/cm²"},
	} {
		got, err := tc.m.Parse(tc.text, tc.shown)
		if err != nil || got.Value != tc.want || got.Unit != tc.unit {
			t.Errorf("%q shown in %q: got %v %q, error %v; want %v %q", tc.text, tc.shown, got.Value, got.Unit, err, tc.want, tc.unit)
		}
		if got.Value == 0 && math.Signbit(got.Value) {
			t.Errorf("%q: got minus zero", tc.text)
		}
	}
}

// Temperatures become depths through kB/h and the recoil: 452.863 nK are 1 Er of
// 39K at 736.65 nm (plane-wave calculation, 6 digits).
func TestParseTemperature(t *testing.T) {
	got, err := depthMeasure.Parse("452.863 nK", "Er")
	if err != nil || math.Abs(got.Value-1) > 2e-6 {
		t.Errorf("452.863 nK: got %.8f Er, error %v; want 1 within 2e-6", got.Value, err)
	}
	got, err = energyMeasure.Parse("1 uK", "Hz")
	if want := 1e-6 * 1.380649e-23 / 6.62607015e-34; err != nil || math.Abs(got.Value/want-1) > 1e-15 {
		t.Errorf("1 uK: got %v Hz, error %v; want %v", got.Value, err, want)
	}
}

func TestParseRefuses(t *testing.T) {
	for _, tc := range []struct {
		m          Measure
		text, want string
	}{
		{depthMeasure, "22 mW", "22 mW is a power; give Er, kHz or nK"},
		{depthMeasure, "22 G", "22 G is a magnetic field; give Er, kHz or nK"},
		{depthMeasure, "22 J", "22 J leaves open whether J is joule or the tunnelling; give Er, kHz or nK"},
		{depthMeasure, "22 furlong", "22 furlong has an unknown unit; give Er, kHz or nK"},
		{depthMeasure, "", "empty; give a number in Er, kHz or nK"},
		{depthMeasure, " \t ", "empty; give a number in Er, kHz or nK"},
		{depthMeasure, "deep", "deep does not begin with a number"},
		{depthMeasure, "NaN", "NaN is not a number; give a finite one"},
		{depthMeasure, "Inf", "Inf is not finite; give a finite number"},
		{depthMeasure, "-inf", "-inf is not finite; give a finite number"},
		{depthMeasure, "∞", "∞ is not finite; give a finite number"},
		{depthMeasure, "1e400", "1e400 is too large for a number"},
		{depthMeasure, "1e99999999999999999999", "1e99999999999999999999 is too large for a number"},
		{depthMeasure, "1e-400", "1e-400 is too small for a number; 0 is allowed"},
		{depthMeasure, "1e300*1e300", "1e300*1e300 is too large for a number"},
		{depthMeasure, "1e-300*1e-300", "1e-300*1e-300 is too small for a number; 0 is allowed"},
		{depthMeasure, "1,200", "1,200 can be read in two ways: write 1.2 or 1200"},
		{depthMeasure, "-12,000", "-12,000 can be read in two ways: write 12.0 or 12000"},
		{depthMeasure, "1,200,300", "1,200,300 mixes marks between digits; write 1200300 if the comma groups thousands"},
		{depthMeasure, "1,200.5", "1,200.5 mixes marks between digits; write 1200.5 if the comma groups thousands"},
		{depthMeasure, "1.2.3", "1.2.3 has more than one decimal point; write one number"},
		{depthMeasure, "1 200", "1 200 holds two numbers; write one, without marks between its digits"},
		{depthMeasure, "22\n23", "more than one line; give one number, like a number in Er, kHz or nK"},
		{depthMeasure, "22\r\n", "more than one line; give one number, like a number in Er, kHz or nK"},
		{depthMeasure, "1/0", "1/0 divides by zero"},
		{depthMeasure, "2*", "2* ends where a number should stand"},
		{depthMeasure, "2*x", "2*x does not begin with a number"},
		{depthMeasure, "1" + strings.Repeat("*1", 19), ""},
		{depthMeasure, "1" + strings.Repeat("*1", 20), "1" + strings.Repeat("*1", 19) + "… has more than 20 factors"},
		{depthMeasure, "-", "- ends where a number should stand"},
		{depthMeasure, "1\x00", "has characters that cannot be shown; give a number in Er, kHz or nK"},
		{depthMeasure, "\xff", "has characters that cannot be shown; give a number in Er, kHz or nK"},
		{Measure{Dimension: Depth, Unit: "Er"}, "5 kHz", "5 kHz needs the recoil energy of an axis, which is not known here; give Er"},
		{energyMeasure, "5 Er", "5 Er needs the recoil energy of an axis, which is not known here; give Hz, kHz or nK"},
		{powerMeasure, "6.1 Er", "6.1 Er is an energy; give W or mW"},
		{powerMeasure, "3 mA", "3 mA is a current; give W or mW"},
		{fieldMeasure, "3 g", "3 g is a mass; give G or mT"},
		{durationMeasure, "3 m", "3 m is a length; give ms or s"},
		{countMeasure, "1.5", "1.5 is no whole number"},
		{countMeasure, "5 W", "5 W is a power; give a plain number"},
	} {
		_, err := tc.m.Parse(tc.text, tc.m.Unit)
		if tc.want == "" && err == nil {
			continue
		}
		if err == nil || err.Error() != tc.want {
			t.Errorf("%q: got %v, want %q", tc.text, err, tc.want)
		}
		if bad := new(QuantityError); err != nil && !errors.As(err, &bad) {
			t.Errorf("%q: error of type %T, want *QuantityError", tc.text, err)
		}
	}
}

// TestRoundTrip writes seeded numbers in every unit and reads them back: what is
// shown in full comes back bit for bit in units that are powers of ten.
func TestRoundTrip(t *testing.T) {
	random := newRandom(7)
	measures := []Measure{powerMeasure, fieldMeasure, depthMeasure, energyMeasure, durationMeasure, waistMeasure,
		wavelengthMeasure, lengthMeasure, ratioMeasure, entropyMeasure, gradientMeasure, curvatureMeasure}
	for range 2000 {
		m := measures[random.IntN(len(measures))]
		units := append(m.Units(), m.Unit)
		unit := units[random.IntN(len(units))]
		value := (random.Float64() - 0.3) * math.Pow(10, float64(random.IntN(9)-4))
		text := withUnit(m.formatDigits(value, unit, 17), unit)
		got, err := m.Parse(text, m.Unit)
		// 17 digits of the shown number are within 0.5e-16, its rounding to a
		// float64 within 1.2e-16, of the value.
		if err != nil || math.Abs(got.Value-value) > 2.5e-16*math.Abs(value) {
			t.Errorf("%v %s as %q: got %v, difference %g, error %v", value, m.Unit, text, got.Value, got.Value-value, err)
		}
	}
}

func FuzzParse(f *testing.F) {
	for _, text := range []string{"2*1.3 mW", "1,200", "1e-3", "−5 kHz", "NaN", "1e400", "22\n", "J", "1/3", ",", "9e", "0x10", "1_000", "Er", "1e308*10"} {
		f.Add(text)
	}
	measures := []Measure{powerMeasure, depthMeasure, energyMeasure, countMeasure, ratioMeasure, curvatureMeasure}
	f.Fuzz(func(t *testing.T, text string) {
		for _, m := range measures {
			got, err := m.Parse(text, m.Unit)
			if err != nil {
				if !utf8.ValidString(err.Error()) || strings.ContainsAny(err.Error(), "\r\n") {
					t.Errorf("%q: message %q", text, err)
				}
				continue
			}
			if math.IsNaN(got.Value) || math.IsInf(got.Value, 0) || m.size(got.Unit) == nil {
				t.Errorf("%q: got %v %q", text, got.Value, got.Unit)
			}
			again, err := m.Parse(withUnit(m.formatDigits(got.Value, got.Unit, 17), got.Unit), m.Unit)
			if err != nil || math.Abs(again.Value-got.Value) > 2.5e-16*math.Abs(got.Value)+5e-324 {
				t.Errorf("%q: %v came back as %v, error %v", text, got.Value, again.Value, err)
			}
		}
		StepText(text, 1, LastDigit)
	})
}
