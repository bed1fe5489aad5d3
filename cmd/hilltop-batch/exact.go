package main

import (
	"fmt"
	"io"
	"strings"

	"github.com/spf13/cobra"

	"hilltop/bosehubbard/exact"
)

// exactAnswer holds the keys of the verb exact; totals in the unit of the flags.
type exactAnswer struct {
	Dimension       int          `json:"dimension"`
	Sector          string       `json:"sector"` // what was searched
	Floor           float64      `json:"floor"`
	Ceiling         float64      `json:"ceiling"`
	FloorResidual   float64      `json:"floor_residual"`
	CeilingResidual float64      `json:"ceiling_residual"`
	FloorParity     int          `json:"floor_parity,omitempty"` // +1, -1: sector of the mirror it was found in
	CeilingParity   int          `json:"ceiling_parity,omitempty"`
	FloorCutoff     *float64     `json:"floor_cutoff,omitempty"` // with --max-occupation
	CeilingCutoff   *float64     `json:"ceiling_cutoff,omitempty"`
	FloorState      *stateKeys   `json:"floor_state,omitempty"` // with --states
	CeilingState    *stateKeys   `json:"ceiling_state,omitempty"`
	Iterations      int          `json:"iterations"`
	Entropy         *entropyKeys `json:"entropy,omitempty"`   // with --entropy
	Canonical       []canonical  `json:"canonical,omitempty"` // with --beta
	Seconds         seconds      `json:"seconds"`
	Cautions        []exactNote  `json:"cautions,omitempty"`
}

type seconds struct {
	Build float64 `json:"build"`
	Solve float64 `json:"solve"`
}

// exactNote is one entry of cautions.
type exactNote struct {
	Code string `json:"code"`
	Text string `json:"text"`
}

// stateKeys describe the state at one end; lists run over the sites.
type stateKeys struct {
	Occupation        []float64   `json:"occupation"`
	SquaredOccupation []float64   `json:"squared_occupation"`
	Correlations      [][]float64 `json:"correlations"` // <b_i^+ b_j>
	Kinetic           float64     `json:"kinetic"`
	Interaction       float64     `json:"interaction"`
	Potential         float64     `json:"potential"`
}

func (p *program) exact() *cobra.Command {
	var f exactFlags
	cmd := &cobra.Command{
		Use:   "exact --sites L --atoms N",
		Short: "Both ends of the spectrum of a small Bose-Hubbard model",
		Long: `Exact diagonalises H = -J sum(b+b + h.c.) + U/2 sum n(n-1) + V sum x^2 n on a
chain (--sites), a rectangle or cuboid (--grid 3x4), or another lattice with the
given cells (--lattice kagome --grid 2x2), open unless --ring is given; x counts
sites from the middle. Energies are totals, not per atom, in the unit of the
flags.`,
		Args: args(cobra.NoArgs),
		RunE: func(cmd *cobra.Command, _ []string) error { return p.runExact(cmd, f) },
	}
	f.register(cmd)
	return cmd
}

func (p *program) runExact(cmd *cobra.Command, f exactFlags) error {
	s, err := f.system()
	if err != nil {
		return usageError{err}
	}
	bar := newBar(p.stderr)
	ends, err := exact.SolveTerms(cmd.Context(), s.terms, f.atoms, exact.Options{
		MaxOccupation: f.most, EndStates: f.states, Sector: sectors[f.sector], Momentum: f.momentum,
		Workers: f.workers, Progress: bar.show,
	})
	bar.clear()
	if err != nil {
		return err
	}
	answer := answerOf(ends, f)
	if err := answer.addThermo(cmd.Context(), s, f, bar); err != nil {
		return err
	}
	if p.json {
		return p.print(answer)
	}
	return answer.write(p.stdout)
}

func answerOf(ends exact.Ends, f exactFlags) *exactAnswer {
	a := &exactAnswer{
		Dimension: ends.Dimension, Sector: ends.Sector, Floor: ends.Floor, Ceiling: ends.Ceiling,
		FloorResidual: ends.FloorResidual, CeilingResidual: ends.CeilingResidual,
		FloorParity: ends.FloorParity, CeilingParity: ends.CeilingParity,
		Iterations: ends.Iterations, Seconds: seconds{ends.BuildSeconds, ends.SolveSeconds},
	}
	if f.most > 0 {
		a.FloorCutoff, a.CeilingCutoff = &ends.FloorCutoff, &ends.CeilingCutoff
	}
	if f.states {
		a.FloorState, a.CeilingState = keysOf(ends.FloorState), keysOf(ends.CeilingState)
	}
	if !ends.Connected {
		a.Cautions = append(a.Cautions, exactNote{"disconnected", "some sites have no way to others: the number of atoms in each part is fixed, and the ends are those of the best share"})
	}
	return a
}

func keysOf(s *exact.EndState) *stateKeys {
	n := len(s.Occupation)
	k := &stateKeys{
		Occupation: s.Occupation, SquaredOccupation: s.SquaredOccupation,
		Kinetic: s.Kinetic, Interaction: s.Interaction, Potential: s.Potential,
	}
	for i := range n {
		k.Correlations = append(k.Correlations, s.Correlations[i*n:(i+1)*n])
	}
	return k
}

// write puts the answer into words.
func (a *exactAnswer) write(out io.Writer) error {
	var b strings.Builder
	fmt.Fprintf(&b, "dimension  %d\nfloor    %.12g%s\nceiling  %.12g%s\n", a.Dimension, a.Floor, sectorText(a.FloorParity), a.Ceiling, sectorText(a.CeilingParity))
	fmt.Fprintf(&b, "residual bounds  %.1e, %.1e after %d steps, %.3g s\n",
		a.FloorResidual, a.CeilingResidual, a.Iterations, a.Seconds.Build+a.Seconds.Solve)
	if a.FloorCutoff != nil {
		fmt.Fprintf(&b, "the limit of the occupation cuts off at most  %.1e, %.1e\n", *a.FloorCutoff, *a.CeilingCutoff)
	}
	for _, e := range []struct {
		name  string
		state *stateKeys
	}{{"floor", a.FloorState}, {"ceiling", a.CeilingState}} {
		if e.state != nil {
			fmt.Fprintf(&b, "atoms per site at the %s  %.4f\n", e.name, e.state.Occupation)
			fmt.Fprintf(&b, "kinetic, interaction, potential  %.6g, %.6g, %.6g\n", e.state.Kinetic, e.state.Interaction, e.state.Potential)
		}
	}
	a.writeThermo(&b)
	for _, c := range a.Cautions {
		fmt.Fprintf(&b, "caution: %s\n", c.Text)
	}
	_, err := io.WriteString(out, b.String())
	return err
}

// sectorText names the sector of the mirror in which an end was found.
func sectorText(parity int) string {
	switch {
	case parity > 0:
		return "  (even under the mirror)"
	case parity < 0:
		return "  (odd under the mirror)"
	}
	return ""
}
