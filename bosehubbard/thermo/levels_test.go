package thermo

import (
	"errors"
	"fmt"
	"math"
	"math/big"
	"math/rand/v2"
	"strings"
	"testing"

	"hilltop/bosehubbard/si"
)

// near reports whether got is within a relative tolerance of want.
func near(got, want, tolerance float64) bool {
	return math.Abs(got-want) <= tolerance*math.Abs(want)
}

func mustAt(t testing.TB, l Levels, energy float64) LevelState {
	t.Helper()
	s, err := l.At(energy)
	if err != nil {
		t.Fatal(err)
	}
	return s
}

// Two levels +-e at the mean energy x e: beta = ln((1-x)/(1+x))/(2e), and the
// entropy is that of the shares (1+-x)/2. Derived. The energy x e is rounded to
// 1e-16 e, which moves beta by 1e-16/(1-|x|) of 1/e and no more: beside that the
// solution is good to 1e-13.
func TestTwoLevels(t *testing.T) {
	const e = 8000.0
	l := Levels{Energies: []float64{-e, e}}
	for _, x := range []float64{0, 1e-12, 1e-6, 0.01, 0.2, 0.249, 0.26, 0.5, 0.625, 0.9, 0.999, 1 - 1e-6, 1 - 1e-12} {
		for _, x := range []float64{x, -x} {
			s := mustAt(t, l, x*e)
			want := (math.Log1p(-x) - math.Log1p(x)) / (2 * e)
			tolerance := 1e-13*math.Abs(want) + 2e-16/(1-math.Abs(x))/e
			if math.Abs(s.Beta-want) > tolerance {
				t.Errorf("x = %g: beta %.17g, want %.17g, difference %.2g, tolerance %.2g", x, s.Beta, want, s.Beta-want, tolerance)
			}
			p, q := (1+x)/2, (1-x)/2
			entropy := -p*math.Log(p) - q*math.Log(q)
			// S moves by beta e dx for a rounding dx = 1e-16 of x.
			if math.Abs(s.Entropy-entropy) > 1e-13*entropy+1e-15*math.Abs(want)*e {
				t.Errorf("x = %g: entropy %.17g, want %.17g", x, s.Entropy, entropy)
			}
			if x != 0 && !near(s.Kelvin, si.PlanckConstant/(si.BoltzmannConstant*s.Beta), 1e-15) {
				t.Errorf("x = %g: %g K at beta %g per Hz", x, s.Kelvin, s.Beta)
			}
			if math.Abs(s.Shares[1]-p) > 1e-12*p+2e-16 {
				t.Errorf("x = %g: share of the upper level %.15g, want %.15g", x, s.Shares[1], p)
			}
		}
	}
}

// A spin I in a field has the energies m e, m = -I .. I, and the mean energy
// -e I B_I(beta e I) with the Brillouin function
//
//	B_I(y) = (a) coth(a y) - (b) coth(b y),  a = (2I+1)/2I, b = 1/2I
//
// Source: Brillouin, J. Phys. Radium 8, 74 (1927), from memory. The difference of
// the two terms loses 1/(b y)^2 of the digits at small y, which the tolerance
// allows for.
func TestSpinAgainstBrillouin(t *testing.T) {
	const e = 350.0
	for _, twice := range []int{1, 2, 3, 7, 9} {
		spin := float64(twice) / 2
		var l Levels
		for m := -twice; m <= twice; m += 2 {
			l.Energies = append(l.Energies, float64(m)/2*e)
		}
		for _, y := range []float64{-12, -3, -1, -0.1, 0.01, 0.3, 1, 2, 8} {
			a, b := (2*spin+1)/(2*spin), 1/(2*spin)
			mean := -e * spin * (a/math.Tanh(a*y) - b/math.Tanh(b*y))
			want := y / (e * spin)
			s, err := l.AtBeta(want)
			if err != nil {
				t.Fatal(err)
			}
			lost := 4e-16 / (b * y) * a / math.Abs(mean/(e*spin))
			if !near(s.Energy, mean, 1e-13+math.Abs(lost)) {
				t.Errorf("I = %d/2, y = %g: energy %.15g, want %.15g", twice, y, s.Energy, mean)
			}
			if back := mustAt(t, l, s.Energy).Beta; math.Abs(back-want) > 1e-12*math.Abs(want)+2e-16*spin*e/s.Variance {
				t.Errorf("I = %d/2, y = %g: beta of its energy %.15g, want %.15g", twice, y, back, want)
			}
		}
	}
}

// waysOfLadder counts the states of bodies with the levels 0 .. levels-1 by total
// energy: the coefficients of (1 + x + .. + x^(levels-1))^bodies.
func waysOfLadder(levels, bodies int) []*big.Int {
	ways := []*big.Int{big.NewInt(1)}
	for range bodies {
		next := make([]*big.Int, len(ways)+levels-1)
		window := new(big.Int)
		for i := range next {
			if i < len(ways) {
				window.Add(window, ways[i])
			}
			if i >= levels {
				window.Sub(window, ways[i-levels])
			}
			next[i] = new(big.Int).Set(window)
		}
		ways = next
	}
	return ways
}

func logBig(n *big.Int) float64 {
	mantissa := new(big.Float)
	exponent := new(big.Float).SetInt(n).MantExp(mantissa)
	m, _ := mantissa.Float64()
	return math.Log(m) + float64(exponent)*math.Ln2
}

// Counting the states of N bodies of a ladder of 20 levels gives the entropy and,
// from one energy to the next, beta. The first-order formula leaves a term of order
// 1/N^2 per body: at twice the bodies it must fall fourfold.
func TestLadderAgainstCounting(t *testing.T) {
	const levels, spacing = 20, 25.0
	var l Levels
	for i := range levels {
		l.Energies = append(l.Energies, float64(i)*spacing)
	}
	for _, filling := range []float64{1, 4, 9.5, 12, 18} { // quanta per body
		var entropyError, betaError [2]float64
		for i, bodies := range []int{100, 200} {
			ways := waysOfLadder(levels, bodies)
			quanta := int(filling * float64(bodies))
			n := float64(bodies)
			l.Bodies = n
			s := mustAt(t, l, float64(quanta)/n*spacing)
			entropy := logBig(ways[quanta]) / n
			beta := (logBig(ways[quanta+1]) - logBig(ways[quanta-1])) / (2 * spacing)
			entropyError[i], betaError[i] = s.MicroEntropy-entropy, (s.MicroBeta-beta)*spacing
			if math.Abs(entropyError[i]) > 0.3/(n*n) {
				t.Errorf("%g quanta for each of %d: entropy per body %.9g, counted %.9g", filling, bodies, s.MicroEntropy, entropy)
			}
			if math.Abs(betaError[i]) > 3/(n*n)+1e-13 {
				t.Errorf("%g quanta for each of %d: beta %.9g, counted %.9g", filling, bodies, s.MicroBeta*spacing, beta*spacing)
			}
			if !(s.MicroEntropy < s.Entropy) {
				t.Errorf("%g quanta for each of %d: fixed energy has entropy %g, mean energy %g", filling, bodies, s.MicroEntropy, s.Entropy)
			}
		}
		for what, e := range map[string][2]float64{"entropy": entropyError, "beta": betaError} {
			if ratio := e[0] / e[1]; math.Abs(e[0]) > 1e-10 && (ratio < 3 || ratio > 5) {
				t.Errorf("%g quanta: error of %s %.3g, %.3g at twice the bodies, want a quarter", filling, what, e[0], e[1])
			}
		}
	}
}

// At exactly an end the temperature is a zero of its sign and S = ln g.
func TestEndsOfLevels(t *testing.T) {
	l := Levels{Energies: []float64{50, -100, 75}, Degeneracies: []float64{2, 3, 5}, Bodies: 1e20}
	low, high := mustAt(t, l, -100), mustAt(t, l, 75)
	if !math.IsInf(low.Beta, 1) || low.Kelvin != 0 || math.Signbit(low.Kelvin) || !near(low.Entropy, math.Log(3), 1e-15) {
		t.Errorf("lowest level: %+v", low)
	}
	if !math.IsInf(high.Beta, -1) || high.Kelvin != 0 || !math.Signbit(high.Kelvin) || !near(high.Entropy, math.Log(5), 1e-15) {
		t.Errorf("highest level: %+v", high)
	}
	if low.Shares[1] != 1 || high.Shares[2] != 1 || low.MicroEntropy != low.Entropy || high.MicroBeta != high.Beta {
		t.Errorf("shares at the ends %v and %v", low.Shares, high.Shares)
	}
	mean := mustAt(t, l, (50*2-100*3+75*5)/10.)
	if mean.Beta != 0 || !math.IsInf(mean.Kelvin, 1) || !near(mean.Entropy, math.Log(10), 1e-15) {
		t.Errorf("mean: %+v", mean)
	}
	one := mustAt(t, Levels{Energies: []float64{7, 7}}, 7)
	if !near(one.Entropy, math.Ln2, 1e-15) {
		t.Errorf("levels of one energy: %+v", one)
	}
}

func TestEnergyOutOfRange(t *testing.T) {
	l := Levels{Energies: []float64{-8000, 8000}}
	for _, e := range []float64{9000, -8000.001, math.NaN(), math.Inf(1)} {
		_, err := l.At(e)
		if !errors.Is(err, ErrOutOfRange) || !strings.Contains(fmt.Sprint(err), "-8000 to 8000") {
			t.Errorf("%g Hz: %v, want ErrOutOfRange with the range", e, err)
		}
	}
}

func TestLevelsRefused(t *testing.T) {
	for _, tc := range []struct {
		l    Levels
		want string
	}{
		{Levels{}, "no levels"},
		{Levels{Energies: []float64{1, math.NaN()}}, "NaN"},
		{Levels{Energies: []float64{1, math.Inf(-1)}}, "-Inf"},
		{Levels{Energies: []float64{1, 2}, Degeneracies: []float64{1}}, "1 degeneracies for 2"},
		{Levels{Energies: []float64{1, 2}, Degeneracies: []float64{1, 0}}, "degeneracy 0"},
		{Levels{Energies: []float64{1, 2}, Bodies: -1}, "-1 bodies"},
	} {
		_, atErr := tc.l.At(1)
		_, betaErr := tc.l.AtBeta(0)
		_, curveErr := tc.l.Curve(5)
		_, _, flipErr := tc.l.AfterReversal(LevelState{Shares: []float64{1, 0}}, 0)
		for _, err := range []error{atErr, betaErr, curveErr, flipErr} {
			if err == nil || !strings.Contains(err.Error(), tc.want) {
				t.Errorf("%+v: %v, want %q", tc.l, err, tc.want)
			}
		}
	}
	l := Levels{Energies: []float64{1, 2}}
	if _, err := l.AtBeta(math.NaN()); err == nil {
		t.Error("beta NaN: no error")
	}
	if _, err := l.Curve(1); err == nil {
		t.Error("one point: no error")
	}
}

// Random lists: beta is the slope of S(E), falls with E, and depends neither on the
// order of the levels, nor on the zero of energy, nor on whether a degenerate level
// is written twice.
func TestLevelsProperties(t *testing.T) {
	random := rand.New(rand.NewPCG(11, 0))
	for range 40 {
		n := 2 + random.IntN(12)
		l := Levels{}
		for range n {
			l.Energies = append(l.Energies, 1000*random.NormFloat64())
			l.Degeneracies = append(l.Degeneracies, float64(1+random.IntN(4)))
		}
		r, err := l.ladder()
		if err != nil {
			t.Fatal(err)
		}
		width := r.highest() - r.lowest()
		u := r.lowest() + width*(0.05+0.9*random.Float64())
		s := mustAt(t, l, u)
		h := 1e-4 * width
		slope := (mustAt(t, l, u+h).Entropy - mustAt(t, l, u-h).Entropy) / (2 * h)
		if math.Abs(slope-s.Beta)*width > 2e-4*(1+math.Abs(s.Beta)*width) { // O(h^2 S''')
			t.Errorf("%v at %g: dS/dE %.9g, beta %.9g", l.Energies, u, slope, s.Beta)
		}
		moved := Levels{}
		for i := range n { // reversed, shifted, doubled
			e := l.Energies[n-1-i] + 300
			moved.Energies = append(moved.Energies, e, e)
			moved.Degeneracies = append(moved.Degeneracies, l.Degeneracies[n-1-i], l.Degeneracies[n-1-i])
		}
		m := mustAt(t, moved, u+300)
		if math.Abs(m.Beta-s.Beta)*width > 1e-10*(1+math.Abs(s.Beta)*width) || math.Abs(m.Entropy-s.Entropy-math.Ln2) > 1e-10 {
			t.Errorf("%v: beta %.15g and S %.15g, moved %.15g and %.15g", l.Energies, s.Beta, s.Entropy, m.Beta, m.Entropy)
		}
		total := 0.0
		for i, p := range s.Shares {
			total += p
			u -= p * l.Energies[i]
		}
		if math.Abs(total-1) > 1e-14 || math.Abs(u) > 1e-12*width {
			t.Errorf("%v: shares %v miss the energy by %g", l.Energies, s.Shares, u)
		}
	}
}

func TestLevelCurve(t *testing.T) {
	l := Levels{Energies: []float64{-1, 0, 1}}
	c, err := l.Curve(201)
	if err != nil {
		t.Fatal(err)
	}
	if c.Energy[0] != -1 || c.Energy[200] != 1 || !math.IsInf(c.Beta[0], 1) || !math.IsInf(c.Beta[200], -1) {
		t.Errorf("ends: %g to %g, beta %g to %g", c.Energy[0], c.Energy[200], c.Beta[0], c.Beta[200])
	}
	for i := range c.Energy {
		if i > 0 && !(c.Beta[i] < c.Beta[i-1]) {
			t.Errorf("beta rises at %g", c.Energy[i])
		}
		if j := 200 - i; math.Abs(c.Entropy[i]-c.Entropy[j]) > 1e-12 {
			t.Errorf("S(%g) = %.15g, S(%g) = %.15g, want the same", c.Energy[i], c.Entropy[i], c.Energy[j], c.Entropy[j])
		}
	}
}
