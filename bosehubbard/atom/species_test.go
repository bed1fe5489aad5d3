package atom

import (
	"errors"
	"math"
	"slices"
	"strings"
	"testing"

	"hilltop/bosehubbard/si"
)

func TestEverySpeciesLoads(t *testing.T) {
	if names := Names(); !slices.Contains(names, "39K") || !slices.Contains(names, "87Rb") || !slices.IsSorted(names) {
		t.Fatalf("names %v, want 39K and 87Rb among them, in order", names)
	}
	for _, name := range Names() {
		s, err := Load(name)
		if err != nil {
			t.Errorf("%s: %v", name, err)
			continue
		}
		if s.Name != name {
			t.Errorf("file %s.json names itself %q", name, s.Name)
		}
		if want := int(2 * (2*s.NuclearSpin + 1)); len(s.States) != want {
			t.Errorf("%s: %d states, want %d", name, len(s.States), want)
		}
		for _, datum := range s.Data {
			if datum.Path == "" || datum.Unit == "" || len(datum.Source) < 10 || datum.SigmaKnown && datum.Sigma < 0 {
				t.Errorf("%s: %+v, want a path, a unit and a source", name, datum)
			}
		}
	}
}

// TestNumbersOf39K holds the conversion of every kind of number to SI.
func TestNumbersOf39K(t *testing.T) {
	s, err := Load(" 39k ")
	if err != nil {
		t.Fatal(err)
	}
	curve, err := mustState(t, s, "F=1,mF=+1").Curve()
	if err != nil {
		t.Fatal(err)
	}
	for _, tc := range []struct {
		name      string
		got, want float64
	}{
		{"mass", s.Mass, 38.963706485 * 1.66053906892e-27},
		{"nuclear spin", s.NuclearSpin, 1.5},
		{"hyperfine", s.Hyperfine, 230.8598601e6},
		{"gJ", s.GJ, 2.00229421},
		{"gI", s.GI, -0.00014193489},
		{"D1 wavelength", s.D1.Wavelength, 770.108385e-9},
		{"D1 linewidth", s.D1.Linewidth, 2 * math.Pi * 5.956e6},
		{"D2 wavelength", s.D2.Wavelength, 766.700922e-9},
		{"D2 linewidth", s.D2.Linewidth, 2 * math.Pi * 6.035e6},
		{"background", curve.Background, -29 * 5.29177210544e-11},
		{"first pole", curve.Poles()[0], 25.85e-4},
		{"second pole", curve.Poles()[1], 402.50e-4},
		{"second zero", curve.Zeros()[1], 350.50e-4},
		{"third zero", curve.Zeros()[2], 752.7e-4},
		// Falke et al., Phys. Rev. A 74, 032503 (2006): 391 016 170.03 MHz; the
		// wavelength is rounded to 1e-9 of itself.
		{"D2 frequency", s.D2.AngularFrequency() / (2 * math.Pi), 391016170.03e6},
	} {
		tol := 4e-16
		if tc.name == "D2 frequency" {
			tol = 1e-9
		}
		if !(math.Abs(tc.got/tc.want-1) <= tol) {
			t.Errorf("%s: got %.15g, want %.15g, relative tolerance %g", tc.name, tc.got, tc.want, tol)
		}
	}
}

func TestGroundStates(t *testing.T) {
	s := fixture(t, "39K")
	var names []string
	for _, state := range s.States {
		names = append(names, state.Name)
		want := s.Hyperfine / 2 * (state.F*(state.F+1) - s.NuclearSpin*(s.NuclearSpin+1) - 0.75) // A I.J
		if got := s.Energy(state, 0); !(math.Abs(got/want-1) <= 1e-15) {
			t.Errorf("%s: energy %.10g Hz at zero field, want %.10g Hz", state.Name, got, want)
		}
	}
	want := "F=1,mF=+1 F=1,mF=0 F=1,mF=-1 F=2,mF=+2 F=2,mF=+1 F=2,mF=0 F=2,mF=-1 F=2,mF=-2"
	if got := strings.Join(names, " "); got != want {
		t.Errorf("states of 39K: got %s, want %s", got, want)
	}
	if got := fixture(t, "40K").States[0].Name; got != "F=7/2,mF=+7/2" {
		t.Errorf("first state of 40K: got %s, want F=7/2,mF=+7/2", got)
	}
}

func TestUnknownNames(t *testing.T) {
	_, err := Load("../species/39K")
	unknown, ok := errors.AsType[*UnknownError](err)
	if !ok || unknown.Kind != "species" || !slices.Equal(unknown.Known, Names()) {
		t.Errorf("unknown species: got %v, want an error that lists %v", err, Names())
	}
	_, err = fixture(t, "39K").State("F=3,mF=0")
	unknown, ok = errors.AsType[*UnknownError](err)
	if !ok || unknown.Kind != "state" || unknown.Name != "F=3,mF=0" || len(unknown.Known) != 8 {
		t.Errorf("unknown state: got %v, want an error that lists the 8 states", err)
	}
	if text := err.Error(); !strings.Contains(text, "F=1,mF=+1; F=1,mF=0") {
		t.Errorf("error text %q, want the known states in it", text)
	}
}

func TestStateWithoutScattering(t *testing.T) {
	if _, err := mustState(t, fixture(t, "39K"), "F=2,mF=0").Curve(); !errors.Is(err, ErrNoScattering) {
		t.Errorf("got %v, want ErrNoScattering", err)
	}
	curve, err := mustState(t, fixture(t, "87Rb"), "F=1,mF=-1").Curve()
	if err != nil {
		t.Fatal(err)
	}
	// Egorov et al., Phys. Rev. A 87, 053614 (2013), from memory.
	if a, err := curve.At(3.23 * si.Gauss); err != nil || math.Abs(a/si.BohrRadius-100.4) > 1e-12 {
		t.Errorf("87Rb (1,-1): got %g a0, %v, want 100.4 a0", a/si.BohrRadius, err)
	}
}
