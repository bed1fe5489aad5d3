package session

import (
	"math/rand/v2"
	"testing"
)

func newRandom(seed uint64) *rand.Rand { return rand.New(rand.NewPCG(seed, 1)) }

func TestDigits(t *testing.T) {
	for _, tc := range []struct {
		x      float64
		digits int
		want   string
	}{
		{0, 3, "0"}, {1, 3, "1"}, {-983.7, 3, "−984"}, {0.2, 7, "0.2"}, {200, 2, "200"}, {80000, 3, "80000"},
		{1234.5678, 7, "1234.568"}, {-1e-7, 3, "−1e−7"}, {1.26e-9, 2, "1.3e−9"}, {3.5e12, 4, "3.5e12"}, {99.96, 3, "100"},
		{0.00012345, 3, "0.000123"}, {123456789, 12, "123456789"},
	} {
		if got := Digits(tc.x, tc.digits); got != tc.want {
			t.Errorf("%v to %d digits: got %q, want %q", tc.x, tc.digits, got, tc.want)
		}
	}
}

func TestFormat(t *testing.T) {
	for _, tc := range []struct {
		m     Measure
		value float64
		unit  string
		want  string
	}{
		{powerMeasure, 0.2, "mW", "200 mW"},
		{powerMeasure, 0.0003, "uW", "300 µW"},
		{energyMeasure, -983.7, "Hz", "−983.7 Hz"},
		{energyMeasure, 983.7, "kHz", "+0.9837 kHz"},
		{energyMeasure, 0, "Hz", "0 Hz"},
		{fieldMeasure, 398, "mT", "39.8 mT"},
		{depthMeasure, 1, "kHz", "9.43614 kHz"},
		{ratioMeasure, 0.95, "%", "95 %"},
		{ratioMeasure, 0.95, "", "0.95"},
		{countMeasure, 123456789, "", "123456789"},
		{wavelengthMeasure, 736.65, "um", "0.73665 µm"},
	} {
		if got := tc.m.Format(tc.value, tc.unit); got != tc.want {
			t.Errorf("%v in %q: got %q, want %q", tc.value, tc.unit, got, tc.want)
		}
	}
}

func TestFitLosesDigitsNotUnits(t *testing.T) {
	for _, tc := range []struct {
		width int
		want  string
	}{{20, "−1234.568 Hz"}, {10, "−1234.6 Hz"}, {9, "−1235 Hz"}, {4, "−1000 Hz"}} {
		if got := energyMeasure.Fit(-1234.5678, "Hz", tc.width); got != tc.want {
			t.Errorf("width %d: got %q, want %q", tc.width, got, tc.want)
		}
	}
}

func TestStepText(t *testing.T) {
	for _, tc := range []struct {
		text string
		n    int
		size StepSize
		want string
	}{
		{"6.1", 1, LastDigit, "6.2"},
		{"6.1", 1, TenthOfDigit, "6.11"},
		{"6.1", 1, TenDigits, "7.1"},
		{"6.1", -1, TenDigits, "5.1"},
		{"398", 1, LastDigit, "399"},
		{"398", -1, TenthOfDigit, "397.9"},
		{"398 G", 1, TenDigits, "408 G"},
		{"−984 Hz", -1, LastDigit, "−985 Hz"},
		{"+3 Hz", 1, LastDigit, "+4 Hz"},
		{"+1", -2, LastDigit, "−1"},
		{"+1", -1, LastDigit, "0"},
		{"-0.1", 1, LastDigit, "0.0"},
		{"0,25 W", 1, LastDigit, "0.26 W"},
		{"1.2e−7", 1, LastDigit, "1.3e−7"},
		{"0.9", 1, LastDigit, "1.0"},
		{"", 1, LastDigit, ""},
		{"deep", 1, LastDigit, "deep"},
		{"1,2,3", 1, LastDigit, "1,2,3"},
	} {
		if got := StepText(tc.text, tc.n, tc.size); got != tc.want {
			t.Errorf("%q by %d of size %d: got %q, want %q", tc.text, tc.n, tc.size, got, tc.want)
		}
	}
}
