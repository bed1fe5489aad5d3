package report

import (
	"encoding/json"
	"math"
)

// Report is the assessment of one plan.
type Report struct {
	Title    string    `json:"title,omitempty"`
	AimSign  string    `json:"aim_sign"`
	Verdict  string    `json:"verdict"`
	Sentence string    `json:"sentence"`
	HoldMS   float64   `json:"hold_ms"`
	Ceiling  Ceiling   `json:"ceiling"`
	Start    *Stage    `json:"start,omitempty"` // the settings before the first stage
	Stages   []Stage   `json:"stages"`
	Levels   *Levels   `json:"levels,omitempty"`
	Cautions []Caution `json:"cautions,omitempty"`
}

// Ceiling holds the bounds of the energy and what they rest on.
type Ceiling struct {
	Terms    []Term      `json:"terms"`
	Total    Bounds      `json:"total"`
	Criteria []Criterion `json:"criteria"`
	Exact    []Grown     `json:"exact,omitempty"`
}

// Bounds are a floor and a ceiling per atom.
type Bounds struct {
	Floor   Bound `json:"floor_hz_per_atom,omitzero"`
	Ceiling Bound `json:"ceiling_hz_per_atom,omitzero"`
}

// Bound is one end of the energy: a number in Hz, unbounded (null in JSON), or,
// as the zero value, not computed (absent).
type Bound struct {
	Known bool
	Hz    float64 // infinite where unbounded
}

// Unbounded reports whether there is no bound at this end.
func (b Bound) Unbounded() bool { return b.Known && math.IsInf(b.Hz, 0) }

// IsZero reports whether the bound was not computed.
func (b Bound) IsZero() bool { return !b.Known }

// MarshalJSON writes the number, or null for unbounded.
func (b Bound) MarshalJSON() ([]byte, error) {
	if b.Unbounded() {
		return []byte("null"), nil
	}
	return json.Marshal(b.Hz)
}

// Term is one term of the energy. An axis that does not move has a reason and no
// bounds.
type Term struct {
	Term string `json:"term"`
	Bounds
	Motion string `json:"motion,omitempty"` // moving, layered or frozen; of a trap term
	Reason string `json:"reason,omitempty"`
}

// Criterion is one condition, its margin and, where broken, the advice.
type Criterion struct {
	Name   string  `json:"name"`
	Passed bool    `json:"passed"`
	Margin float64 `json:"margin"`
	Unit   string  `json:"unit"`
	Breaks string  `json:"breaks"`
	Detail string  `json:"detail"`
	Advice *Advice `json:"advice,omitempty"`
}

// Advice is a change of the plan that mends a criterion.
type Advice struct {
	Text string `json:"text"`
	Set  []Set  `json:"set"`
}

// Set is one value to put into the plan; Path is RFC 6901.
type Set struct {
	Path  string `json:"path"`
	Value any    `json:"value"`
}

// Grown is the exact energy range per atom of one size of a growing model.
type Grown struct {
	Sites   []int   `json:"sites"`
	Atoms   int     `json:"atoms"`
	Floor   float64 `json:"floor_hz_per_atom"`
	Ceiling float64 `json:"ceiling_hz_per_atom"`
}

// Stage holds the Hamiltonian at the end of a stage. DepthEr, GapHz, RecoilHz,
// TunnellingHz, NextTunnellingHz, SpacingNM and LatticePowerW follow the order of
// the plan's lattice axes; TrapHz, CurvatureHz and TiltHz are x, y, z.
type Stage struct {
	Name               string             `json:"name"`
	EndMS              float64            `json:"end_ms"`
	TunnellingHz       []float64          `json:"tunnelling_hz"`
	InteractionHz      *float64           `json:"interaction_hz,omitempty"`
	CurvatureHz        []float64          `json:"curvature_hz"`
	TrapHz             []float64          `json:"trap_hz,omitempty"`
	DepthEr            []float64          `json:"depth_er,omitempty"`
	GapHz              []float64          `json:"gap_hz,omitempty"`
	ScatteringLengthA0 *float64           `json:"scattering_length_a0,omitempty"`
	RecoilHz           []float64          `json:"recoil_hz,omitempty"`
	FieldG             *float64           `json:"field_g,omitempty"`
	PowerW             map[string]float64 `json:"power_w,omitempty"`
	LatticePowerW      []float64          `json:"lattice_power_w,omitempty"` // one incoming pass
	SpacingNM          []float64          `json:"spacing_nm,omitempty"`
	NextTunnellingHz   []float64          `json:"next_tunnelling_hz,omitempty"` // J2
	TunnellingTimeMS   *float64           `json:"tunnelling_time_ms,omitempty"` // hbar/J of the fastest axis
	InteractionPerJ    *float64           `json:"interaction_per_tunnelling,omitempty"`
	TiltHz             []float64          `json:"tilt_hz,omitempty"` // per site, x, y, z
	Budget             []Contribution     `json:"budget,omitempty"`
	Crosses            []Crossing         `json:"crosses,omitempty"`
}

// Contribution is what one beam or coil adds to the trap along x, y, z, as signed
// frequencies: sign(omega^2) sqrt|omega^2| / 2 pi. Their squares add.
type Contribution struct {
	Source string     `json:"source"`
	Kind   string     `json:"kind"`
	TrapHz [3]float64 `json:"trap_hz"`
}

// Crossing is a pole or a zero of the scattering length passed in a stage.
type Crossing struct {
	Kind   string  `json:"kind"` // pole or zero
	FieldG float64 `json:"field_g"`
}

// Caution is something the user should know; Code is stable, Text is not.
type Caution struct {
	Code string `json:"code"`
	Text string `json:"text"`
}

// Sealed reports whether the verdict is the one that can be handed over.
func (r *Report) Sealed() bool { return r.Verdict == "sealed" }
