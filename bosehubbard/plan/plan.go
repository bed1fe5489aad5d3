package plan

import "encoding/json"

// Format is the value of the key "format" of every plan.
const Format = "hilltop-plan"

// Version is the newest version of the document that this program reads.
const Version = 1

// Words of the document.
const (
	Negative = "negative" // aim_sign: a state at T < 0 is wanted
	Positive = "positive" // aim_sign: a state at T > 0 is wanted

	Hold        = "hold"        // shape: no knob moves
	Linear      = "linear"      // shape: u = t/duration
	Exponential = "exponential" // shape: (e^(4u) - 1)/(e^4 - 1)
	Smooth      = "smooth"      // shape: 10u^3 - 15u^4 + 6u^5

	Cubic     = "cubic" // lattice.geometry
	NoGravity = "none"  // gravity_axis of an apparatus in free fall
)

// Plan mirrors the document in its own scaled units. A plan is of one kind, see
// [Plan.Kind]: it has either the keys of an apparatus (Cloud, Lattice, Beams,
// Field, Scattering, GravityAxis, Start) or Model or Levels.
//
// Absent keys have their defaults after [Parse]: AimSign negative, GravityAxis
// z, Field along z without gradient and curvature, ReturnRatio 1.
type Plan struct {
	Format  string `json:"format"`
	Version int    `json:"version"`
	Title   string `json:"title,omitempty"`
	Note    string `json:"note,omitempty"`
	AimSign string `json:"aim_sign,omitempty"` // Negative or Positive

	Cloud       *Cloud      `json:"cloud,omitempty"`
	Lattice     *Lattice    `json:"lattice,omitempty"`
	Beams       []Beam      `json:"beams,omitempty"`
	Field       *Field      `json:"field,omitempty"`
	Scattering  *Scattering `json:"scattering,omitempty"`   // nil: the species file
	GravityAxis string      `json:"gravity_axis,omitempty"` // "x", "y", "z" or NoGravity
	Start       *Start      `json:"start,omitempty"`

	Model  *Model  `json:"model,omitempty"`
	Levels *Levels `json:"levels,omitempty"`

	Stages []Stage `json:"stages,omitempty"`

	// Keys of the next three are paths, see [Document].
	Measured    map[string]Measured `json:"measured,omitempty"`
	Limits      map[string]Limit    `json:"limits,omitempty"`
	Uncertainty map[string]float64  `json:"uncertainty,omitempty"` // sigma, in the unit of the path
	Outputs     []json.RawMessage   `json:"outputs,omitempty"`     // objects, as written
}

// Cloud is the gas before the first stage.
type Cloud struct {
	Species          string  `json:"species"` // "39K"
	State            string  `json:"state"`   // "F=1,mF=+1"
	Atoms            float64 `json:"atoms"`   // a whole number
	EntropyPerAtomKB float64 `json:"entropy_per_atom_kb"`
}

// Lattice is a set of standing waves, one per axis, in the user's order.
type Lattice struct {
	Geometry string        `json:"geometry"` // Cubic
	Axes     []LatticeAxis `json:"axes"`
}

// LatticeAxis is one retro-reflected lattice beam.
type LatticeAxis struct {
	Axis         string    `json:"axis"` // "x", "y" or "z", each once
	WavelengthNM float64   `json:"wavelength_nm"`
	WaistUM      OneOrMany `json:"waist_um"` // one, or two in the order x, y, z of the transverse axes
	ReturnRatio  float64   `json:"return_ratio,omitempty"`
}

// Beam is one single-pass dipole beam.
type Beam struct {
	Name         string    `json:"name"`
	WavelengthNM float64   `json:"wavelength_nm"`
	Axis         string    `json:"axis"`     // "x", "y" or "z"
	WaistUM      OneOrMany `json:"waist_um"` // one, or two in the order x, y, z of the transverse axes
}

// Field is the shape of the bias field.
type Field struct {
	Axis            string  `json:"axis"`                        // "x", "y" or "z"
	GradientGPerCM  float64 `json:"gradient_g_per_cm,omitempty"` // d|B|/d(up)
	CurvaturePerCM2 float64 `json:"curvature_per_cm2,omitempty"` // B''/B along the axis
}

// Scattering is a scattering length against field,
//
//	a(B) = a_bg prod_i (B - B0_i - Delta_i)/(B - B0_i).
type Scattering struct {
	Resonances   []Resonance `json:"resonances"`
	BackgroundA0 float64     `json:"background_a0"` // a_bg, Bohr radii
}

// Resonance is one pole with its zero at PositionG + WidthG.
type Resonance struct {
	PositionG float64 `json:"position_g"` // B0
	WidthG    float64 `json:"width_g"`    // Delta, signed
}

// Start holds the value of every knob of an apparatus before the first stage.
type Start struct {
	DepthEr []float64          `json:"depth_er"`          // in the order of lattice.axes
	PowerW  map[string]float64 `json:"power_w,omitempty"` // by beam name
	FieldG  float64            `json:"field_g"`
}

// Stage is one step of the sequence: the values of the knobs at its end. A nil
// field, or a beam that is missing from PowerW, keeps its value.
type Stage struct {
	Name       string  `json:"name"`
	DurationMS float64 `json:"duration_ms"`
	Shape      string  `json:"shape"` // Hold, Linear, Exponential or Smooth

	DepthEr []float64          `json:"depth_er,omitempty"` // in the order of lattice.axes
	PowerW  map[string]float64 `json:"power_w,omitempty"`  // by beam name
	FieldG  *float64           `json:"field_g,omitempty"`

	// Stages of a model plan only.
	TunnellingHz  *OneOrMany `json:"tunnelling_hz,omitempty"`
	InteractionHz *float64   `json:"interaction_hz,omitempty"`
	CurvatureHz   []float64  `json:"curvature_hz,omitempty"` // per site squared, per axis
}

// Model is a Bose-Hubbard model on a chain, a rectangle or a box, E/h in Hz. Its
// values are those before the first stage.
type Model struct {
	Sites         []int     `json:"sites"`              // one to three axes
	Periodic      []bool    `json:"periodic,omitempty"` // per axis; nil: all open
	Atoms         int       `json:"atoms"`
	TunnellingHz  OneOrMany `json:"tunnelling_hz"`
	InteractionHz float64   `json:"interaction_hz"`
	CurvatureHz   []float64 `json:"curvature_hz,omitempty"` // per site squared, per axis; nil: 0
	Fock          []int     `json:"fock,omitempty"`         // atoms per site to start from; nil: the end state of the wanted sign
}

// Levels is a finite spectrum of one body, of which there are many independent
// ones. The package reads it; nothing judges it yet.
type Levels struct {
	EnergiesHz      []float64 `json:"energies_hz"`
	Degeneracies    []float64 `json:"degeneracies,omitempty"` // nil: 1 each
	Bodies          float64   `json:"bodies"`
	InnerTimeS      float64   `json:"inner_time_s"`
	OuterTimeS      float64   `json:"outer_time_s"`
	EnergyHzPerBody float64   `json:"energy_hz_per_body"`
	Unbounded       bool      `json:"unbounded,omitempty"`
}

// Measured is a measured value that stands in for the one the beams would give,
// in the unit of its path.
type Measured struct {
	Value float64 `json:"value"`
	Sigma float64 `json:"sigma,omitempty"`
}

// Limit is what the lab can set, in the unit of its path; nil is no limit.
type Limit struct {
	Min       *float64 `json:"min,omitempty"`
	Max       *float64 `json:"max,omitempty"`
	SlewPerMS *float64 `json:"slew_per_ms,omitempty"` // largest |change| per millisecond
}

// Kind says what a plan describes.
type Kind string

// Kinds of plans.
const (
	ApparatusKind Kind = "apparatus"
	ModelKind     Kind = "model"
	LevelsKind    Kind = "levels"
)

// Kind returns what the plan describes.
func (p *Plan) Kind() Kind {
	switch {
	case p.Model != nil:
		return ModelKind
	case p.Levels != nil:
		return LevelsKind
	}
	return ApparatusKind
}

// Periodicity returns for each axis whether its ends are joined. It has the
// length of Sites.
func (m *Model) Periodicity() []bool {
	out := make([]bool, len(m.Sites))
	copy(out, m.Periodic)
	return out
}
