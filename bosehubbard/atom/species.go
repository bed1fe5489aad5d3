package atom

import (
	"errors"
	"fmt"
	"math"
	"strings"

	"hilltop/assets"
	"hilltop/bosehubbard/si"
)

// Species is one isotope in its electronic ground state.
type Species struct {
	Name        string
	Mass        float64 // kg
	NuclearSpin float64 // I
	D1, D2      Line
	Hyperfine   float64 // A, Hz: the energy is A I.J; the splitting is A (I + 1/2)
	GJ, GI      float64 // E = +muB (gJ mJ + gI mI) B
	States      []State // the whole ground manifold, by F, then from high to low mF
	Data        []Datum // every number of the file with its uncertainty and source
}

// Line is one optical transition.
type Line struct {
	Wavelength float64 // m, in vacuum
	Linewidth  float64 // natural linewidth Gamma, rad/s
}

// State is one hyperfine state of the ground manifold.
type State struct {
	Name       string // "F=1,mF=+1"
	F, MF      float64
	Scattering *ScatteringCurve // nil when the file has none
}

// Datum is one number of a species file, in the unit of the file.
type Datum struct {
	Path         string // RFC 6901 path in the file, such as "/d1/wavelength"
	Value, Sigma float64
	SigmaKnown   bool // false when the file gives no uncertainty
	Unit, Source string
}

// ErrNoScattering says that the species file has no scattering length for a
// state, so that the plan has to bring its own.
var ErrNoScattering = errors.New("the species file gives no scattering length, so the plan must give \"scattering\"")

// UnknownError reports a name that is not in a list.
type UnknownError struct {
	Kind, Name string // Kind is "species" or "state"
	Known      []string
}

// Error names what was asked for and what there is.
func (e *UnknownError) Error() string {
	return fmt.Sprintf("atom: unknown %s %q, known: %s", e.Kind, e.Name, strings.Join(e.Known, "; "))
}

// Names returns the species that Load knows, in alphabetical order.
func Names() []string { return assets.SpeciesNames() }

// Load returns the species with the name, in which case does not matter.
//
// It returns *UnknownError if there is none. The result is the caller's own.
func Load(name string) (*Species, error) {
	for _, known := range Names() {
		if strings.EqualFold(known, strings.TrimSpace(name)) {
			data, err := assets.SpeciesFile(known)
			if err != nil {
				return nil, fmt.Errorf("atom: species %s: %w", known, err)
			}
			return Decode(data)
		}
	}
	return nil, &UnknownError{Kind: "species", Name: name, Known: Names()}
}

// AngularFrequency returns the transition's angular frequency,
//
//	omega = 2 pi c/lambda
//
// in rad/s.
func (l Line) AngularFrequency() float64 {
	return 2 * math.Pi * si.SpeedOfLight / l.Wavelength
}

// State returns the state with the name. "F=1,mF=+1" may be written with other
// spacing, case and signs, as "|1,1>", "(1, +1)" or "f=1 m_F=1"; half-integers
// are "9/2" or "4.5".
//
// It returns *UnknownError, with every state of the species, if there is none.
func (s *Species) State(name string) (State, error) {
	if f, mf, ok := parseStateName(name); ok {
		for _, state := range s.States {
			if state.F == f && state.MF == mf {
				return state, nil
			}
		}
	}
	known := make([]string, len(s.States))
	for i, state := range s.States {
		known[i] = state.Name
	}
	return State{}, &UnknownError{Kind: "state", Name: name, Known: known}
}

// Curve returns the scattering length against field of the state.
//
// It returns ErrNoScattering if the species file has none.
func (st State) Curve() (ScatteringCurve, error) {
	if st.Scattering == nil {
		return ScatteringCurve{}, fmt.Errorf("atom: state %s: %w", st.Name, ErrNoScattering)
	}
	return *st.Scattering, nil
}

// groundStates lists the states F = |I - 1/2| and I + 1/2 of nuclear spin I.
func groundStates(spin float64) []State {
	states := make([]State, 0, int(2*(2*spin+1)))
	for _, f := range [2]float64{spin - 0.5, spin + 0.5} {
		for mf := f; mf >= -f; mf-- {
			states = append(states, State{Name: stateName(f, mf), F: f, MF: mf})
		}
	}
	return states
}
