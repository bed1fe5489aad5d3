package main

import (
	"fmt"
	"math"
	"strconv"
	"strings"

	"github.com/spf13/cobra"

	"hilltop/bosehubbard"
	"hilltop/bosehubbard/exact"
	"hilltop/bosehubbard/lattice"
)

// exactFlags are the flags of the verb exact, energies in any one unit.
type exactFlags struct {
	sites, atoms                       int
	grid                               string
	ring                               bool
	tunnelling, interaction, curvature float64
}

// exactAnswer holds the keys of the verb exact; totals in the unit of the flags.
type exactAnswer struct {
	Dimension       int     `json:"dimension"`
	Floor           float64 `json:"floor"`
	Ceiling         float64 `json:"ceiling"`
	FloorResidual   float64 `json:"floor_residual"`
	CeilingResidual float64 `json:"ceiling_residual"`
	Iterations      int     `json:"iterations"`
	Seconds         seconds `json:"seconds"`
}

type seconds struct {
	Build float64 `json:"build"`
	Solve float64 `json:"solve"`
}

func (p *program) exact() *cobra.Command {
	var f exactFlags
	cmd := &cobra.Command{
		Use:   "exact --sites L --atoms N",
		Short: "Both ends of the spectrum of a small Bose-Hubbard model",
		Long: `Exact diagonalises H = -J sum(b+b + h.c.) + U/2 sum n(n-1) + V sum x^2 n on a
chain (--sites), or a rectangle or cuboid (--grid 3x4), open unless --ring is
given; x counts sites from the middle. Energies are totals, not per atom, in the
unit of the flags.`,
		Args: args(cobra.NoArgs),
		RunE: func(cmd *cobra.Command, _ []string) error { return p.runExact(cmd, f) },
	}
	flags := cmd.Flags()
	flags.IntVar(&f.sites, "sites", 0, "sites of a chain")
	flags.StringVar(&f.grid, "grid", "", "sites along x, y, z of a rectangle or cuboid: 3x4, 2x2x2")
	flags.IntVar(&f.atoms, "atoms", 0, "number of atoms")
	flags.BoolVar(&f.ring, "ring", false, "periodic along every axis")
	flags.Float64Var(&f.tunnelling, "tunnelling", 1, "J, positive in the lowest band of a lattice at rest")
	flags.Float64Var(&f.interaction, "interaction", 0, "U, negative attracts")
	flags.Float64Var(&f.curvature, "curvature", 0, "V per site squared, negative pushes outwards")
	must(cmd.MarkFlagRequired("atoms"))
	cmd.MarkFlagsMutuallyExclusive("sites", "grid")
	cmd.MarkFlagsOneRequired("sites", "grid")
	return cmd
}

func (p *program) runExact(cmd *cobra.Command, f exactFlags) error {
	box, model, err := f.system()
	if err != nil {
		return usageError{err}
	}
	ends, err := exact.Solve(cmd.Context(), box, model, f.atoms, exact.Options{})
	if err != nil {
		return err
	}
	answer := exactAnswer{
		Dimension: ends.Dimension, Floor: ends.Floor, Ceiling: ends.Ceiling,
		FloorResidual: ends.FloorResidual, CeilingResidual: ends.CeilingResidual,
		Iterations: ends.Iterations, Seconds: seconds{ends.BuildSeconds, ends.SolveSeconds},
	}
	if p.json {
		p.print(answer)
		return nil
	}
	_, err = fmt.Fprintf(p.stdout, "dimension  %d\nfloor    %.12g\nceiling  %.12g\nresidual bounds  %.1e, %.1e after %d steps, %.3g s\n",
		answer.Dimension, answer.Floor, answer.Ceiling, answer.FloorResidual, answer.CeilingResidual, answer.Iterations, answer.Seconds.Build+answer.Seconds.Solve)
	return err
}

// system builds the graph and the model, or says which flag is wrong.
func (f exactFlags) system() (*lattice.Lattice, bosehubbard.Model, error) {
	model := bosehubbard.Model{Interaction: f.interaction}
	for _, flag := range []struct {
		name  string
		value float64
	}{{"tunnelling", f.tunnelling}, {"interaction", f.interaction}, {"curvature", f.curvature}} {
		if math.IsNaN(flag.value) || math.IsInf(flag.value, 0) {
			return nil, model, fmt.Errorf("--%s %g: want a finite number", flag.name, flag.value)
		}
	}
	if f.atoms < 0 {
		return nil, model, fmt.Errorf("--atoms %d: want 0 or more", f.atoms)
	}
	sites, err := f.shape()
	if err != nil {
		return nil, model, err
	}
	periodic := make([]bool, len(sites))
	for i := range sites {
		periodic[i] = f.ring
		model.Axes = append(model.Axes, bosehubbard.AxisTerms{Tunnelling: f.tunnelling, Curvature: f.curvature})
	}
	box, err := lattice.Box(sites, periodic)
	return box, model, err
}

// shape reads --sites or --grid.
func (f exactFlags) shape() ([]int, error) {
	if f.grid == "" {
		return []int{f.sites}, nil
	}
	var sites []int
	for _, part := range strings.Split(f.grid, "x") {
		n, err := strconv.Atoi(part)
		if err != nil {
			return nil, fmt.Errorf("--grid %q: want numbers of sites joined by x, such as 3x4", f.grid)
		}
		sites = append(sites, n)
	}
	return sites, nil
}
