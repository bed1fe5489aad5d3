package report

import (
	"context"
	"errors"
	"math"
	"strconv"

	"hilltop/bosehubbard/apparatus"
	"hilltop/bosehubbard/atom"
	"hilltop/bosehubbard/ceiling"
	"hilltop/bosehubbard/optics"
	"hilltop/bosehubbard/plan"
	"hilltop/bosehubbard/sequence"
	"hilltop/bosehubbard/si"
)

// bench is one apparatus plan on its way to a report.
type bench struct {
	plan      *plan.Plan
	apparatus *apparatus.Apparatus
	sequence  *sequence.Sequence
	workspace *apparatus.Workspace
	sign      ceiling.Sign
	hold      float64
	order     []int   // axis of each entry of lattice.axes
	sag       float64 // m below the centre where the atoms last hung free; 0 if never
}

func (j *Judge) judgeApparatus(ctx context.Context, p *plan.Plan) (*Report, error) {
	b, err := newBench(p, j.workspace)
	if err != nil {
		return nil, err
	}
	r := &Report{Title: p.Title, AimSign: aimWord(b.sign), Stages: []Stage{}}
	var point apparatus.Point
	if err := b.addStages(r, &point); err != nil {
		return nil, err
	}
	if !b.setHold(&point) {
		r.Cautions = append(r.Cautions, holdCaution(b.hold))
	}
	r.HoldMS = b.hold * 1e3
	assessment, err := ceiling.Assess(b.system(&point))
	if err != nil {
		return nil, err
	}
	r.fill(assessment)
	if err := b.advise(ctx, r, &point, assessment); err != nil {
		return nil, err
	}
	if err := b.cautions(r, &point, assessment); err != nil {
		return nil, err
	}
	r.Sentence = r.sentence()
	return r, nil
}

// setHold takes the trailing hold, or assumes one and reports false.
func (b *bench) setHold(end *apparatus.Point) (held bool) {
	if b.hold, held = b.sequence.HoldTime(); !held {
		b.hold = assumedHold(b.largestTunnelling(end))
	}
	return held
}

func aimWord(s ceiling.Sign) string {
	if s == ceiling.Positive {
		return plan.Positive
	}
	return plan.Negative
}

func newBench(p *plan.Plan, w *apparatus.Workspace) (*bench, error) {
	a, err := p.Apparatus()
	if err != nil {
		return nil, err
	}
	s, err := p.Sequence()
	if err != nil {
		return nil, err
	}
	b := &bench{plan: p, apparatus: a, sequence: s, workspace: w, sign: signOf(p)}
	for _, axis := range p.Lattice.Axes {
		b.order = append(b.order, axisIndex(axis.Axis))
	}
	return b, nil
}

func axisIndex(name string) int { return int(name[0] - 'x') }

// addStages fills the start and the stages; point is left at the end of the last.
func (b *bench) addStages(r *Report, point *apparatus.Point) error {
	end, crossings := 0.0, b.sequence.Crossings(b.apparatus.Scattering)
	for i := -1; i < len(b.sequence.Stages); i++ {
		settings, name := b.sequence.Start, "start"
		if i >= 0 {
			stage := b.sequence.Stages[i]
			settings, name = stage.End, stage.Name
			end += stage.Duration
		}
		if err := b.apparatus.At(b.workspace, point, settings); err != nil {
			return b.blame(i, err)
		}
		stage := b.stage(point, name, end)
		if i < 0 {
			r.Start = &stage
			continue
		}
		for _, c := range crossings[i] {
			stage.Crosses = append(stage.Crosses, Crossing{Kind: c.Kind.String(), FieldG: c.Field / si.Gauss})
		}
		r.Stages = append(r.Stages, stage)
	}
	return nil
}

// blame turns an error at the end of a stage into one that names the plan's path.
func (b *bench) blame(stage int, err error) error {
	if !errors.Is(err, atom.ErrPole) {
		return err
	}
	settings := b.sequence.Before(stage + 1)
	return plan.Errors{{
		Path: b.plan.Source(stage, "field_g"), Value: strconv.FormatFloat(settings.Field/si.Gauss, 'g', 10, 64),
		Reason: "the field stands on a pole of the scattering length, where a has no value; move it off the resonance",
	}}
}

func (b *bench) stage(p *apparatus.Point, name string, end float64) Stage {
	length, field := p.ScatteringLength/si.BohrRadius, p.Field/si.Gauss
	s := Stage{Name: name, EndMS: end * 1e3, ScatteringLengthA0: &length, FieldG: &field}
	for _, axis := range b.order {
		j1, j2 := p.Bands[axis].Tunnelling[0], p.Bands[axis].Tunnelling[1]
		s.TunnellingHz = append(s.TunnellingHz, j1*p.Recoil[axis])
		s.NextTunnellingHz = append(s.NextTunnellingHz, j2*p.Recoil[axis])
		s.DepthEr = append(s.DepthEr, p.Depth[axis])
		s.GapHz = append(s.GapHz, p.Gap[axis])
		s.RecoilHz = append(s.RecoilHz, p.Recoil[axis])
		s.SpacingNM = append(s.SpacingNM, p.Spacing[axis]*1e9)
		if power := b.apparatus.Lattice[axis].PowerFromDepth(p.Depth[axis]); !math.IsInf(power, 1) {
			s.LatticePowerW = append(s.LatticePowerW, power)
		}
	}
	for axis, terms := range p.Model.Axes {
		s.CurvatureHz = append(s.CurvatureHz, terms.Curvature)
		s.TiltHz = append(s.TiltHz, terms.Tilt)
		s.TrapHz = append(s.TrapHz, p.Trap[axis])
	}
	if len(b.apparatus.Beams) > 0 {
		s.PowerW = map[string]float64{}
	}
	for i, beam := range b.apparatus.Beams {
		s.PowerW[beam.Name] = p.Power[i]
	}
	largest := b.largestTunnelling(p)
	s.scale(largest, p.HasInteraction, p.Model.Interaction)
	for _, e := range p.Budget {
		c := Contribution{Source: e.Source, Kind: e.Kind}
		for i, w2 := range e.OmegaSquared {
			c.TrapHz[i] = optics.SignedFrequency(w2)
		}
		s.Budget = append(s.Budget, c)
	}
	return s
}

// scale adds what is measured in the largest tunnelling, Hz.
func (s *Stage) scale(largest float64, hasInteraction bool, interaction float64) {
	if hasInteraction {
		s.InteractionHz = &interaction
	}
	if largest == 0 {
		return
	}
	time := 1e3 / (2 * math.Pi * largest)
	s.TunnellingTimeMS = &time
	if hasInteraction {
		ratio := interaction / largest
		s.InteractionPerJ = &ratio
	}
}

// largestTunnelling is |J| of the fastest axis that is not layered, Hz.
func (b *bench) largestTunnelling(p *apparatus.Point) float64 {
	largest := 0.0
	for _, a := range p.Model.Axes {
		if j := math.Abs(a.Tunnelling); a.Tilt == 0 || math.Abs(a.Tilt) < 4*j {
			largest = math.Max(largest, j)
		}
	}
	return largest
}

// system is what the verdict needs at one point.
func (b *bench) system(p *apparatus.Point) *ceiling.System {
	s := &ceiling.System{
		Sign: b.sign, Interaction: p.Model.Interaction, HasInteraction: p.HasInteraction,
		ScatteringLength: p.ScatteringLength, Hold: b.hold,
	}
	for i, terms := range p.Model.Axes {
		bands := &p.Bands[i]
		s.Axes = append(s.Axes, ceiling.Axis{
			Name:       optics.Axis(i).String(),
			Tunnelling: terms.Tunnelling,
			Band: ceiling.Interval{
				Floor:   (bands.Edges[0][0] - bands.Mean) * p.Recoil[i],
				Ceiling: (bands.Edges[0][1] - bands.Mean) * p.Recoil[i],
			},
			Gap: p.Gap[i], Curvature: terms.Curvature, Trap: p.Trap[i], Tilt: terms.Tilt,
		})
	}
	s.EdgeDrop = func(moving [3]bool) (float64, error) {
		edge, err := b.apparatus.EdgeOf(b.workspace, p, moving, int(b.sign))
		return edge.Drop, err
	}
	return s
}
