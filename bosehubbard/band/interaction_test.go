package band

import (
	"math"
	"testing"

	"hilltop/bosehubbard/si"
)

const (
	massK39  = 38.963706485 * si.AtomicMassConstant // AME2020
	spacingK = 736.65e-9 / 2
)

// TestInteractionOverTunnelling: 39K at 736.65 nm, depths (6.1, 6.1, 22) Er. Braun
// et al., Science 339, 52 (2013) quote U/J = -2.1(1) and +1.9(1); a plane-wave
// calculation gives -2.1064 at -37 a0 and 1.8786 at 33 a0, U/h = -983.7 and 877.3 Hz.
func TestInteractionOverTunnelling(t *testing.T) {
	w := NewWorkspace()
	shallow, deep := solve(t, w, 6.1), solve(t, w, 22)
	k := math.Pi / spacingK
	wave := [3]float64{k, k, k}
	moment := [3]float64{shallow.WannierFourthMoment, shallow.WannierFourthMoment, deep.WannierFourthMoment}
	tunnelling := shallow.Tunnelling[0] * si.RecoilHz(massK39, spacingK)
	for _, tc := range []struct{ length, hz, ratio float64 }{{-37, -983.7, -2.1064}, {33, 877.3, 1.8786}} {
		u := Interaction(tc.length*si.BohrRadius, massK39, wave, moment)
		if math.Abs(u-tc.hz) > 0.1 {
			t.Errorf("%g a0: U/h = %.3f Hz, want %.1f", tc.length, u, tc.hz)
		}
		if got := u / tunnelling; math.Abs(got-tc.ratio) > 1e-4 {
			t.Errorf("%g a0: U/J = %.5f, want %.4f", tc.length, got, tc.ratio)
		}
	}
}

// TestTunnellingInHertz: J/h = 16.416 Hz and hbar/J = 9.695 ms at 22 Er (plane-wave
// calculation; Braun et al. quote 10(2) ms), 466.997 Hz at 6.1 Er.
func TestTunnellingInHertz(t *testing.T) {
	w := NewWorkspace()
	recoil := si.RecoilHz(massK39, spacingK)
	deep := solve(t, w, 22).Tunnelling[0] * recoil
	checkNear(t, "J/h", 22, deep, 16.416, 0.6e-3)
	checkNear(t, "hbar/J in ms", 22, 1e3/(2*math.Pi*deep), 9.695, 0.6e-3)
	checkNear(t, "J/h", 6.1, solve(t, w, 6.1).Tunnelling[0]*recoil, 466.997, 0.6e-3)
}

// TestInteractionScales: U = 8 pi (k a) I^3 Er for equal axes, odd in a, and a
// product over the axes in any order.
func TestInteractionScales(t *testing.T) {
	k := math.Pi / spacingK
	const a = 100 * si.BohrRadius
	i4 := solve(t, NewWorkspace(), 12).WannierFourthMoment
	got := Interaction(a, massK39, [3]float64{k, k, k}, [3]float64{i4, i4, i4})
	want := 8 * math.Pi * k * a * i4 * i4 * i4 * si.RecoilHz(massK39, spacingK)
	checkNear(t, "U/h", 12, got, want, 1e-13*want)
	mixed := Interaction(-a, massK39, [3]float64{k, 2 * k, 3 * k}, [3]float64{0.2, 0.3, 0.5})
	other := Interaction(a, massK39, [3]float64{3 * k, k, 2 * k}, [3]float64{0.5, 0.2, 0.3})
	checkNear(t, "U/h of other axes", 0, mixed, -other, 1e-13*other)
}
