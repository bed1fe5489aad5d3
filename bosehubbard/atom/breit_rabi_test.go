package atom

import (
	"math"
	"math/rand/v2"
	"slices"
	"testing"

	"gonum.org/v1/gonum/mat"

	"hilltop/bosehubbard/si"
	"hilltop/testdata"
)

// fixture returns a species by name: the file if there is one, otherwise the
// numbers of Arimondo, Inguscio and Violino, Rev. Mod. Phys. 49, 31 (1977), from
// memory, for the formulas alone.
func fixture(t testing.TB, name string) *Species {
	t.Helper()
	others := map[string]Species{
		"7Li":   {NuclearSpin: 1.5, Hyperfine: 401.7520433e6, GJ: 2.0023010, GI: -0.0011822130},
		"85Rb":  {NuclearSpin: 2.5, Hyperfine: 1011.910813e6, GJ: 2.00233113, GI: -0.00029364000},
		"133Cs": {NuclearSpin: 3.5, Hyperfine: 2298.1579425e6, GJ: 2.00254032, GI: -0.00039885395},
		"40K":   {NuclearSpin: 4, Hyperfine: -285.7308e6, GJ: 2.00229421, GI: 0.000176490},
		"1H":    {NuclearSpin: 0.5, Hyperfine: 1420.405751768e6, GJ: 2.00228415, GI: -0.0030420651},
	}
	if s, ok := others[name]; ok {
		s.Name, s.States = name, groundStates(s.NuclearSpin)
		return &s
	}
	s, err := Load(name)
	if err != nil {
		t.Fatal(err)
	}
	return s
}

var allFixtures = []string{"39K", "87Rb", "7Li", "85Rb", "133Cs", "40K", "1H"}

func mustState(t testing.TB, s *Species, name string) State {
	t.Helper()
	state, err := s.State(name)
	if err != nil {
		t.Fatal(err)
	}
	return state
}

func TestTransitionsAgainstTable(t *testing.T) {
	sheet := testdata.Table(t, "breit_rabi")
	names, first, second := sheet.Strings(t, "species"), sheet.Strings(t, "first"), sheet.Strings(t, "second")
	fields, want, slopes := sheet.Floats(t, "field"), sheet.Floats(t, "frequency"), sheet.Floats(t, "slope")
	for i, name := range names {
		s := fixture(t, name)
		hz, slope := s.Transition(mustState(t, s, first[i]), mustState(t, s, second[i]), fields[i]*si.Gauss)
		if diff := hz - want[i]*1e6; !(math.Abs(diff) <= 10) {
			t.Errorf("%s %s-%s at %g G: got %.7f MHz, want %.6f MHz, difference %.2g Hz, tolerance 10 Hz",
				name, first[i], second[i], fields[i], hz/1e6, want[i], diff)
		}
		// 1 kHz/G = 1e7 Hz/T; half of the last of three decimals.
		if diff := slope/1e7 - slopes[i]; !(math.Abs(diff) <= 0.00051) {
			t.Errorf("%s %s-%s at %g G: got %.5f kHz/G, want %.3f kHz/G, difference %.2g, tolerance 0.00051",
				name, first[i], second[i], fields[i], slope/1e7, slopes[i], diff)
		}
	}
}

func TestMomentsAgainstTable(t *testing.T) {
	sheet := testdata.Table(t, "magnetic_moment")
	names, states := sheet.Strings(t, "species"), sheet.Strings(t, "state")
	fields, want := sheet.Floats(t, "field"), sheet.Floats(t, "moment")
	for i, name := range names {
		s := fixture(t, name)
		got := s.Moment(mustState(t, s, states[i]), fields[i]*si.Gauss) / si.BohrMagneton
		if diff := got - want[i]; !(math.Abs(diff) <= 0.000051) {
			t.Errorf("%s %s at %g G: got %.6f muB, want %.4f muB, difference %.2g, tolerance 0.000051",
				name, states[i], fields[i], got, want[i], diff)
		}
	}
}

// TestLevitation: m g/mu in G/cm. Hand values from the masses and the moments
// of the table, good to the last digit.
func TestLevitation(t *testing.T) {
	for _, tc := range []struct {
		species, state string
		field, want    float64
	}{
		{"39K", "(1,1)", 402.5, 7.12},
		{"87Rb", "(1,1)", 1007.4, 20.97},
	} {
		s := fixture(t, tc.species)
		tPerM := s.Mass * si.StandardGravity / s.Moment(mustState(t, s, tc.state), tc.field*si.Gauss)
		if got := tPerM / si.Gauss / 100; !(math.Abs(got-tc.want) <= 0.005) {
			t.Errorf("%s %s at %g G: got %.4f G/cm, want %.2f", tc.species, tc.state, tc.field, got, tc.want)
		}
	}
}

// TestEnergiesAgainstDiagonalisation diagonalises A I.J + muB (gJ Jz + gI Iz) B
// in the basis |mJ, mI>, which knows nothing of the Breit-Rabi formula. The
// eigenvalues agree to the rounding of the diagonalisation, 1e-13 of the norm.
func TestEnergiesAgainstDiagonalisation(t *testing.T) {
	random := rand.New(rand.NewPCG(3, 4))
	for _, name := range allFixtures {
		s := fixture(t, name)
		for range 40 {
			field := 10 * math.Pow(random.Float64(), 4) // T, dense at low field
			want := hyperfineEigenvalues(t, s, field)
			got := make([]float64, len(s.States))
			for i, state := range s.States {
				got[i] = s.Energy(state, field)
			}
			slices.Sort(got)
			norm := math.Max(math.Abs(want[0]), math.Abs(want[len(want)-1]))
			for i := range got {
				if diff := math.Abs(got[i] - want[i]); !(diff <= 1e-13*norm) {
					t.Errorf("%s at %.6g T, level %d: got %.9g Hz, want %.9g Hz, difference %.2g, tolerance %.2g",
						name, field, i, got[i], want[i], diff, 1e-13*norm)
				}
			}
		}
	}
}

func hyperfineEigenvalues(t testing.TB, s *Species, field float64) []float64 {
	t.Helper()
	spin := s.NuclearSpin
	n := int(2*spin) + 1
	h := mat.NewSymDense(2*n, nil)
	zeeman := si.BohrMagneton * field / si.PlanckConstant
	for i := range n {
		mi := spin - float64(i)
		for j, mj := range [2]float64{0.5, -0.5} {
			h.SetSym(j*n+i, j*n+i, s.Hyperfine*mi*mj+zeeman*(s.GJ*mj+s.GI*mi))
		}
		if i > 0 { // I+ J- /2 + I- J+ /2 joins |+1/2, mi> and |-1/2, mi+1>
			h.SetSym(i, n+i-1, s.Hyperfine/2*math.Sqrt(spin*(spin+1)-mi*(mi+1)))
		}
	}
	var eigen mat.EigenSym
	if !eigen.Factorize(h, false) {
		t.Fatal("the diagonalisation failed")
	}
	return eigen.Values(nil)
}

// TestSumRules holds what the trace of the Hamiltonian and of its square say of
// the energies, and of the moments, at any field.
func TestSumRules(t *testing.T) {
	random := rand.New(rand.NewPCG(5, 6))
	for _, name := range allFixtures {
		s := fixture(t, name)
		for range 40 {
			field := 10 * math.Pow(random.Float64(), 4)
			var sum, square, moment, norm float64
			for _, state := range s.States {
				e := s.Energy(state, field)
				sum, square, norm = sum+e, square+e*e, norm+math.Abs(e)
				moment += s.Moment(state, field)
			}
			if !(math.Abs(sum) <= 1e-15*norm) {
				t.Errorf("%s at %.6g T: the energies sum to %.3g Hz, want 0 to %.2g", name, field, sum, 1e-15*norm)
			}
			if !(math.Abs(moment) <= 1e-14*si.BohrMagneton) {
				t.Errorf("%s at %.6g T: the moments sum to %.3g muB, want 0", name, field, moment/si.BohrMagneton)
			}
			if want := squareTrace(s, field); !(math.Abs(square/want-1) <= 1e-14) {
				t.Errorf("%s at %.6g T: the squares sum to %.15g Hz^2, want %.15g", name, field, square, want)
			}
		}
	}
}

// squareTrace returns Tr H^2; with Tr Jz^2 = J(J+1)(2J+1)/3 for each spin the
// products of different terms have no trace.
func squareTrace(s *Species, field float64) float64 {
	i, n := s.NuclearSpin*(s.NuclearSpin+1), 2*s.NuclearSpin+1
	const j, m = 0.75, 2.0
	zeeman := si.BohrMagneton * field / si.PlanckConstant
	return s.Hyperfine*s.Hyperfine*i*j*n*m/3 + zeeman*zeeman*(s.GJ*s.GJ*j+s.GI*s.GI*i)*n*m/3
}

// TestMomentIsTheDerivative compares with a five-point difference. Its step h
// leaves h^4 of the scale D/(gJ muB) of the field, and rounding 1e-16 E/h.
func TestMomentIsTheDerivative(t *testing.T) {
	for _, name := range allFixtures {
		s := fixture(t, name)
		scale := math.Abs(s.Hyperfine) * (s.NuclearSpin + 0.5) * si.PlanckConstant / (2 * si.BohrMagneton)
		h := 1e-3 * scale
		for _, state := range s.States {
			for _, x := range []float64{0, 0.01, 0.3, 1, 2.5, 30} {
				field := x * scale
				e := func(step float64) float64 { return s.Energy(state, field+step*h) }
				want := -si.PlanckConstant * (8*(e(1)-e(-1)) - (e(2) - e(-2))) / (12 * h)
				got := s.Moment(state, field)
				if diff := math.Abs(got-want) / si.BohrMagneton; !(diff <= 1e-10) {
					t.Errorf("%s %s at %.4g T: got %.12g muB, want %.12g muB, difference %.2g, tolerance 1e-10",
						name, state.Name, field, got/si.BohrMagneton, want/si.BohrMagneton, diff)
				}
			}
		}
	}
}

// TestStretchedStatesAreLinear: a stretched state has no partner of its mF, so
// its energy is linear in the field, with moment -+(gJ/2 + gI I) muB, also
// beyond x = 1 where a square root taken as positive would turn it back.
func TestStretchedStatesAreLinear(t *testing.T) {
	for _, name := range allFixtures {
		s := fixture(t, name)
		for _, sign := range []float64{1, -1} {
			state := mustState(t, s, stateName(s.NuclearSpin+0.5, sign*(s.NuclearSpin+0.5)))
			want := -sign * (s.GJ/2 + s.GI*s.NuclearSpin)
			for _, field := range []float64{0, 0.03, 3} {
				if got := s.Moment(state, field) / si.BohrMagneton; !(math.Abs(got-want) <= 1e-14) {
					t.Errorf("%s %s at %g T: got %.15g muB, want %.15g", name, state.Name, field, got, want)
				}
				energy := s.Hyperfine*s.NuclearSpin/2 - want*si.BohrMagneton*field/si.PlanckConstant
				if got := s.Energy(state, field); !(math.Abs(got-energy) <= 1e-15*(math.Abs(s.Hyperfine)*10+math.Abs(energy))) {
					t.Errorf("%s %s at %g T: got %.12g Hz, want %.12g Hz", name, state.Name, field, got, energy)
				}
			}
		}
	}
}

// TestFieldOfUnitX: x = 1 where the non-stretched mF = -1 and mF = +1 energies
// of a manifold have roots that are known; here the field itself. Source: hand
// values of D/((gJ - gI) muB), to the last digit.
func TestFieldOfUnitX(t *testing.T) {
	for name, want := range map[string]float64{
		"39K": 164.7435, "87Rb": 2437.559, "133Cs": 3279.145, "7Li": 286.544, "85Rb": 1083.060,
	} {
		s := fixture(t, name)
		splitting := s.Hyperfine * (s.NuclearSpin + 0.5)
		got := splitting * si.PlanckConstant / ((s.GJ - s.GI) * si.BohrMagneton) / si.Gauss
		if !(math.Abs(got-want) <= 0.0006) {
			t.Errorf("%s: x = 1 at %.5f G, want %.4f G", name, got, want)
		}
		// The states of mF = -(I - 1/2) at x = 1 are D sqrt(2 - 2 ratio) apart.
		mf := -(s.NuclearSpin - 0.5)
		high := mustState(t, s, stateName(s.NuclearSpin+0.5, mf))
		low := mustState(t, s, stateName(s.NuclearSpin-0.5, mf))
		gap, _ := s.Transition(low, high, got*si.Gauss)
		if want := splitting * math.Sqrt(2+2*mf/(s.NuclearSpin+0.5)); !(math.Abs(gap/want-1) <= 1e-14) {
			t.Errorf("%s: %s to %s at x = 1: got %.12g Hz, want %.12g Hz", name, low.Name, high.Name, gap, want)
		}
	}
}

func TestForeignStatePanics(t *testing.T) {
	s := fixture(t, "39K")
	for _, state := range []State{{F: 3, MF: 0}, {F: 1, MF: 2}, {F: 1.5, MF: 0.5}} {
		func() {
			defer func() {
				if recover() == nil {
					t.Errorf("F=%g, mF=%g: no panic", state.F, state.MF)
				}
			}()
			s.Energy(state, 0.04)
		}()
	}
}

func TestEnergyAllocatesNothing(t *testing.T) {
	s := fixture(t, "39K")
	state := mustState(t, s, "F=1,mF=+1")
	var sink float64
	if n := testing.AllocsPerRun(100, func() { sink += s.Energy(state, 0.04) + s.Moment(state, 0.04) }); n != 0 {
		t.Errorf("%v allocations, want 0", n)
	}
	_ = sink
}

func BenchmarkEnergy(b *testing.B) {
	s := fixture(b, "39K")
	state := mustState(b, s, "F=1,mF=+1")
	b.ReportAllocs()
	for b.Loop() {
		s.Energy(state, 0.04)
	}
}
