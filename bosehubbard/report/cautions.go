package report

import (
	"fmt"
	"math"

	"hilltop/bosehubbard/apparatus"
	"hilltop/bosehubbard/ceiling"
	"hilltop/bosehubbard/num/digits"
	"hilltop/bosehubbard/si"
)

// cautions adds what the verdict does not say: poles crossed, gravity, an absent
// U, and what is left out.
func (b *bench) cautions(r *Report, end *apparatus.Point, a *ceiling.Assessment) error {
	for _, stage := range r.Stages {
		for _, c := range stage.Crosses {
			if c.Kind == poleName {
				r.caution("pole_crossed", "Stage '%s' crosses a pole of the scattering length at %s G: doubly occupied sites are lost there.",
					stage.Name, digits.Format(c.FieldG, 5))
			}
		}
	}
	if !end.HasInteraction {
		r.caution("no_interaction", "The final lattice is below %g Er along an axis: U is not defined there and the sign of a stands for it.",
			apparatus.MinimumInteractionDepth)
	}
	if err := b.gravityCautions(r); err != nil {
		return err
	}
	b.localTiltCaution(r, end, a)
	b.wanderCaution(r, end, a)
	b.fieldCaution(r, end)
	b.lightCautions(r)
	b.flipCaution(r)
	r.stillCaution(a)
	r.planCautions(b.plan)
	r.caution("d_lines_only", "Depths, traps and powers use the D1 and D2 lines alone: at 1064 nm that is 1 to 1.5 %% low. Use your own calibration where you have one.")
	r.caution("not_judged", "Not judged yet: the speed of the ramps, the number and the entropy of the atoms, three-body loss, photon scattering, noise.")
	return nil
}

func (r *Report) caution(code, format string, args ...any) {
	r.Cautions = append(r.Cautions, Caution{Code: code, Text: fmt.Sprintf(format, args...)})
}

// gravityCautions looks at the start and at every stage's end where atoms can
// fall: the lattice along gravity is too shallow to localise them and the beams
// have no minimum, or the minimum hangs far below the centre.
func (b *bench) gravityCautions(r *Report) error {
	if !b.apparatus.GravityOn {
		return nil
	}
	var point apparatus.Point
	axis := int(b.apparatus.Gravity)
	for i := -1; i < len(b.sequence.Stages); i++ {
		if err := b.apparatus.At(b.workspace, &point, b.sequence.Before(i+1)); err != nil {
			return err
		}
		terms := point.Model.Axes[axis]
		if terms.Tilt == 0 || math.Abs(terms.Tilt) >= 4*math.Abs(terms.Tunnelling) && point.Depth[axis] > 0 {
			continue
		}
		sag, held, err := b.apparatus.Sag(b.workspace, &point)
		if err != nil {
			return err
		}
		b.sag = sag
		name := "start"
		if i >= 0 {
			name = b.sequence.Stages[i].Name
		}
		if !held {
			r.caution("falls", "At '%s' the beams do not hold the atoms against gravity along %v.", name, b.apparatus.Gravity)
		} else if sag > b.narrowest()/4 {
			r.caution("sag", "At '%s' gravity pulls the cloud %s µm below the beam centre; traps are given at the centre.", name, digits.Format(sag*1e6, 2))
		}
	}
	return nil
}

// narrowest is the smallest waist of the dipole beams, m; infinite without any.
func (b *bench) narrowest() float64 {
	least := math.Inf(1)
	for _, beam := range b.apparatus.Beams {
		least = math.Min(least, math.Min(beam.Waists[0], beam.Waists[1]))
	}
	return least
}

// wanderCaution says how far a tilt moves the summit along a moving axis.
func (b *bench) wanderCaution(r *Report, end *apparatus.Point, a *ceiling.Assessment) {
	for i, m := range a.Motions {
		terms := end.Model.Axes[i]
		if m != ceiling.Moving || terms.Tilt == 0 || terms.Curvature == 0 {
			continue
		}
		shift := si.JouleFromHz(terms.Tilt) / end.Spacing[i] / (b.apparatus.Species.Mass * math.Abs(end.OmegaSquared[i]))
		r.caution("summit_shift", "The tilt of %s Hz per site moves the summit along %s by %s µm; the total counts from there.",
			digits.Format(terms.Tilt, 3), "xyz"[i:i+1], digits.Format(math.Abs(shift)*1e6, 3))
	}
}
