package apparatus

import (
	"fmt"
	"math"

	"hilltop/bosehubbard"
	"hilltop/bosehubbard/atom"
	"hilltop/bosehubbard/band"
	"hilltop/bosehubbard/optics"
	"hilltop/bosehubbard/si"
)

// MinimumInteractionDepth is the depth, in recoil energies, under which the
// Wannier function of an axis is too wide for an on-site interaction to mean
// anything; U is then absent.
const MinimumInteractionDepth = 1.0

// Apparatus is everything about the laboratory that a sequence does not change.
type Apparatus struct {
	Species    *atom.Species
	State      atom.State
	Scattering atom.ScatteringCurve
	Lattice    [3]optics.LatticeBeam // by axis
	Beams      []optics.DipoleBeam
	Field      optics.MagneticField
	GravityOn  bool
	Gravity    optics.Axis // the axis that points up
}

// Settings are the knobs at one moment.
type Settings struct {
	Depth [3]float64 // lattice depth in recoil energies, by axis
	Power []float64  // W, one incoming pass, by beam
	Field float64    // bias field, T
}

// Clone returns a copy that shares nothing with s.
func (s Settings) Clone() Settings {
	s.Power = append([]float64(nil), s.Power...)
	return s
}

// Point is the Hamiltonian at one setting and what it was made of.
type Point struct {
	Settings
	ScatteringLength float64 // m
	Moment           float64 // -dE/dB of the state, J/T
	Spacing          [3]float64
	Recoil           [3]float64 // Hz
	Bands            [3]band.Bands
	Gap              [3]float64 // E1 - E0 at the zone edge, Hz
	Model            bosehubbard.Model
	HasInteraction   bool          // false where an axis is below MinimumInteractionDepth
	Budget           optics.Budget // one entry per beam, lattice axis and coil
	OmegaSquared     [3]float64    // rad^2/s^2, signed
	Trap             [3]float64    // signed trap frequency, Hz
}

// Workspace owns the scratch of one goroutine.
type Workspace struct {
	band   *band.Workspace
	mean   *band.MeanCurve
	meanTo float64 // the depth that mean reaches, Er
}

// NewWorkspace returns scratch for At and EdgeDrop.
func NewWorkspace() *Workspace { return &Workspace{band: band.NewWorkspace()} }

// Band gives access to the band solver of this workspace.
func (w *Workspace) Band() *band.Workspace { return w.band }

// At writes into dst the Hamiltonian at settings s.
//
//	V_a = m omega_a |omega_a| d_a^2 / 2h,  U = (4 pi hbar^2 a / m) prod_a k_a I4(s_a) / h
//
// dst is overwritten and its slices are reused; after the first call nothing is
// allocated. It returns an error wrapping atom.ErrPole if the field stands on a
// pole of the scattering length, and the error of the band solver if a depth is
// outside its range.
func (a *Apparatus) At(w *Workspace, dst *Point, s Settings) error {
	if len(s.Power) != len(a.Beams) {
		panic(fmt.Sprintf("apparatus: %d powers for %d beams", len(s.Power), len(a.Beams)))
	}
	length, err := a.Scattering.At(s.Field)
	if err != nil {
		return fmt.Errorf("apparatus: field %.6g G: %w", s.Field/si.Gauss, err)
	}
	dst.Depth, dst.Field = s.Depth, s.Field
	dst.Power = append(dst.Power[:0], s.Power...)
	dst.ScatteringLength = length
	dst.Moment = a.Species.Moment(a.State, s.Field)
	if err := a.bands(w, dst); err != nil {
		return err
	}
	a.trap(dst)
	a.model(dst)
	return nil
}

func (a *Apparatus) bands(w *Workspace, dst *Point) error {
	for i := range dst.Bands {
		b, err := w.band.Solve(dst.Depth[i])
		if err != nil {
			return fmt.Errorf("apparatus: axis %v: %w", optics.Axis(i), err)
		}
		dst.Bands[i] = b
		dst.Spacing[i] = a.Lattice[i].Spacing
		dst.Recoil[i] = si.HzFromJoule(a.Lattice[i].Recoil)
		dst.Gap[i] = b.Gap * dst.Recoil[i]
	}
	return nil
}

// trap fills the curvature budget, one entry per beam, lattice axis and coil.
func (a *Apparatus) trap(dst *Point) {
	dst.Budget = dst.Budget[:0]
	for i, beam := range a.Beams {
		dst.add(beam.Name, "dipole", beam.Curvature(dst.Power[i]), a.Species.Mass)
	}
	for i, beam := range a.Lattice {
		curvature := beam.Curvature(dst.Depth[i], dst.Bands[i].MeanSlope)
		dst.add(latticeNames[i], "lattice", curvature, a.Species.Mass)
	}
	if a.Field.CurvaturePerField != 0 {
		dst.add("field", "magnetic", a.Field.Curvature(dst.Moment, dst.Field), a.Species.Mass)
	}
	dst.OmegaSquared = dst.Budget.Sum()
	for i, w2 := range dst.OmegaSquared {
		dst.Trap[i] = optics.SignedFrequency(w2)
	}
}

var latticeNames = [3]string{"lattice x", "lattice y", "lattice z"}

func (p *Point) add(source, kind string, curvature [3]float64, mass float64) {
	for i := range curvature {
		curvature[i] /= mass
	}
	p.Budget = append(p.Budget, optics.Entry{Source: source, Kind: kind, OmegaSquared: curvature})
}

func (a *Apparatus) model(dst *Point) {
	if cap(dst.Model.Axes) < 3 {
		dst.Model.Axes = make([]bosehubbard.AxisTerms, 3)
	}
	dst.Model.Axes = dst.Model.Axes[:3]
	var wave, moment [3]float64
	dst.HasInteraction = true
	for i := range dst.Model.Axes {
		d := dst.Spacing[i]
		dst.Model.Axes[i] = bosehubbard.AxisTerms{
			Tunnelling: dst.Bands[i].Tunnelling[0] * dst.Recoil[i],
			Curvature:  a.CurvaturePerSite(dst.OmegaSquared[i], d),
			Tilt:       a.tilt(i, d, dst.Moment),
		}
		wave[i], moment[i] = math.Pi/d, dst.Bands[i].WannierFourthMoment
		dst.HasInteraction = dst.HasInteraction && dst.Depth[i] >= MinimumInteractionDepth
	}
	dst.Model.Interaction = 0
	if dst.HasInteraction {
		dst.Model.Interaction = band.Interaction(dst.ScatteringLength, a.Species.Mass, wave, moment)
	}
}

// CurvaturePerSite returns V/h in Hz for a signed omega^2 and a spacing in m.
func (a *Apparatus) CurvaturePerSite(omegaSquared, spacing float64) float64 {
	return si.HzFromJoule(a.Species.Mass * omegaSquared * spacing * spacing / 2)
}

func (a *Apparatus) tilt(axis int, spacing, moment float64) float64 {
	if !a.GravityOn || axis != int(a.Gravity) {
		return 0
	}
	return optics.TiltPerSite(a.Species.Mass, spacing, moment, a.Field.Gradient)
}
