package atom

import (
	"errors"
	"math"
	"slices"
	"strings"
)

const (
	fileFormat  = "hilltop-species"
	fileVersion = 1
)

// Decode reads a species file, a JSON object with format, version, name, note,
// mass, nuclear_spin, hyperfine, gj, gi, d1, d2 and scattering. Every number is
// {"value", "sigma", "unit", "source"}; sigma may be absent, source may not.
// Units are u, MHz (of linewidths Gamma/2 pi), nm, G and a0, and "1".
//
// It returns every mistake at once, each a *DataError with its RFC 6901 path:
// a number without a source, an unknown or repeated key, another unit, a value
// that cannot be true, a state that the nuclear spin does not allow.
func Decode(data []byte) (*Species, error) {
	root, err := parseDocument(data)
	if err != nil {
		return nil, err
	}
	r := &reader{}
	species := r.species(root)
	if len(r.mistakes) > 0 {
		return nil, errors.Join(r.mistakes...)
	}
	species.Data = r.data
	return species, nil
}

func (r *reader) species(root node) *Species {
	members := r.object(root, "format", "version", "name", "note", "mass", "nuclear_spin",
		"hyperfine", "gj", "gi", "d1", "d2", "scattering")
	if members == nil {
		return nil
	}
	r.header(root, members)
	s := &Species{
		Mass:        r.quantity(root, members, "mass", massInU),
		NuclearSpin: r.quantity(root, members, "nuclear_spin", spinNumber),
		Hyperfine:   r.quantity(root, members, "hyperfine", hyperfineInMHz),
		GJ:          r.quantity(root, members, "gj", electronG),
		GI:          r.quantity(root, members, "gi", nuclearG),
		D1:          r.line(root, members, "d1"),
		D2:          r.line(root, members, "d2"),
	}
	if name, ok := r.member(root, members, "name"); ok {
		s.Name = r.text(name)
	}
	r.physics(s, root)
	s.States = groundStates(s.NuclearSpin)
	if scattering, ok := members["scattering"]; ok {
		r.scattering(s, scattering)
	}
	return s
}

func (r *reader) header(root node, members object) {
	if format, ok := r.member(root, members, "format"); ok && format.value != fileFormat {
		r.fail(format.path, "%s, want %q", describe(format.value), fileFormat)
	}
	if version, ok := r.member(root, members, "version"); ok {
		if v := r.number(version); v != fileVersion {
			r.fail(version.path, "version %g, want %d", v, fileVersion)
		}
	}
	if note, ok := members["note"]; ok {
		r.text(note)
	}
}

func (r *reader) line(root node, members object, key string) Line {
	n, ok := r.member(root, members, key)
	if !ok {
		return Line{}
	}
	parts := r.object(n, "wavelength", "linewidth")
	return Line{
		Wavelength: r.quantity(n, parts, "wavelength", wavelengthInNM),
		Linewidth:  r.quantity(n, parts, "linewidth", linewidthInMHz),
	}
}

// physics checks what no single number shows; a number with a mistake is 0.
func (r *reader) physics(s *Species, root node) {
	if doubled := 2 * s.NuclearSpin; doubled != math.Trunc(doubled) {
		r.fail(root.path+"/nuclear_spin", "nuclear spin %g, want a multiple of 1/2", s.NuclearSpin)
		s.NuclearSpin = 0
	}
	if d1, d2 := s.D1.Wavelength, s.D2.Wavelength; d1 > 0 && d2 > 0 && d1 <= d2 {
		r.fail(root.path+"/d1/wavelength", "D1 at %g nm and D2 at %g nm, want D1 at the longer wavelength", d1*1e9, d2*1e9)
	}
}

// scattering reads the list of curves, each for one state.
func (r *reader) scattering(s *Species, n node) {
	for _, item := range r.list(n) {
		members := r.object(item, "state", "note", "background", "resonances")
		if members == nil {
			continue
		}
		curve := r.curve(item, members)
		if name, ok := r.member(item, members, "state"); ok && s.NuclearSpin > 0 {
			r.assign(s, name, curve)
		}
	}
}

// assign gives the curve to the state that the node names.
func (r *reader) assign(s *Species, name node, curve *ScatteringCurve) {
	state, err := s.State(r.text(name))
	if unknown, ok := errors.AsType[*UnknownError](err); ok {
		r.fail(name.path, "unknown state %q of nuclear spin %g, want one of %s",
			unknown.Name, s.NuclearSpin, strings.Join(unknown.Known, "; "))
		return
	}
	if state.Scattering != nil {
		r.fail(name.path, "state %s stands twice", state.Name)
	}
	i := slices.IndexFunc(s.States, func(other State) bool { return other.Name == state.Name })
	s.States[i].Scattering = curve
}

func (r *reader) curve(item node, members object) *ScatteringCurve {
	if note, ok := members["note"]; ok {
		r.text(note)
	}
	before := len(r.mistakes)
	curve := &ScatteringCurve{Background: r.quantity(item, members, "background", lengthInA0)}
	if resonances, ok := r.member(item, members, "resonances"); ok {
		for _, n := range r.list(resonances) {
			parts := r.object(n, "position", "width")
			curve.Resonances = append(curve.Resonances, Resonance{
				Position: r.quantity(n, parts, "position", fieldInGauss),
				Width:    r.quantity(n, parts, "width", fieldInGauss),
			})
		}
	}
	if err := curve.Validate(); err != nil && len(r.mistakes) == before {
		r.fail(item.path, "%s", strings.TrimPrefix(err.Error(), "atom: "))
	}
	return curve
}
