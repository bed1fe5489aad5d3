package main

import (
	"fmt"
	"math"
	"strconv"
	"strings"

	"github.com/spf13/cobra"

	"hilltop/bosehubbard"
	"hilltop/bosehubbard/exact"
	"hilltop/bosehubbard/fock"
	"hilltop/bosehubbard/lattice"
)

// exactFlags are the flags of the verb exact, energies in any one unit.
type exactFlags struct {
	sites, atoms                       int
	grid, kind                         string
	ring, states                       bool
	tunnelling, interaction, curvature float64
	second                             float64
	most, workers                      int
	momentum                           []int
	sector                             string
	entropy, volume                    bool
	beta                               []float64
}

func (f *exactFlags) register(cmd *cobra.Command) {
	flags := cmd.Flags()
	flags.IntVar(&f.sites, "sites", 0, "sites of a chain")
	flags.StringVar(&f.grid, "grid", "", "sites along x, y, z of a rectangle or cuboid, or cells of a --lattice: 3x4, 2x2x2")
	flags.StringVar(&f.kind, "lattice", "", "kind of lattice: "+kinds())
	flags.IntVar(&f.atoms, "atoms", 0, "number of atoms")
	flags.BoolVar(&f.ring, "ring", false, "periodic along every axis; a ladder along its length")
	flags.Float64Var(&f.tunnelling, "tunnelling", 1, "J, positive in the lowest band of a lattice at rest")
	flags.Float64Var(&f.second, "second-tunnelling", 0, "J2, between sites two bonds apart in a line")
	flags.Float64Var(&f.interaction, "interaction", 0, "U, negative attracts")
	flags.Float64Var(&f.curvature, "curvature", 0, "V per site squared, negative pushes outwards")
	flags.IntVar(&f.most, "max-occupation", 0, "most atoms on a site, 0 for no limit; its error is bounded")
	flags.BoolVar(&f.states, "states", false, "describe the states at both ends; twice the time")
	flags.StringVar(&f.sector, "sector", "auto", "part of the spectrum: auto, whole (all of it without use of a mirror), even, odd")
	flags.IntSliceVar(&f.momentum, "momentum", nil, "only the states of quasi-momentum 2 pi m/L, one m for each closed axis: 1 or 0,2")
	flags.IntVar(&f.workers, "workers", 0, "processors to use, 0 for all; the answer is the same")
	flags.BoolVar(&f.entropy, "entropy", false, "density of states: S(E) and beta(E) = dS/dE")
	flags.BoolVar(&f.volume, "volume-entropy", false, "with --entropy: also the logarithm of all states below E (Gibbs)")
	flags.Float64SliceVar(&f.beta, "beta", nil, "canonical averages at these beta of either sign, answered in order: -0.5,0,0.5")
	must(cmd.MarkFlagRequired("atoms"))
	cmd.MarkFlagsMutuallyExclusive("sites", "grid")
	cmd.MarkFlagsOneRequired("sites", "grid")
}

func kinds() string {
	var names []string
	for _, k := range lattice.Kinds() {
		names = append(names, string(k))
	}
	return strings.Join(names, ", ")
}

// exactSystem is what the flags describe.
type exactSystem struct {
	lattice *lattice.Lattice
	model   bosehubbard.Model // without the second neighbours
	terms   *fock.Terms
}

// sectors are the words of --sector.
var sectors = map[string]exact.Sector{"auto": exact.SectorAuto, "whole": exact.SectorWhole, "even": exact.SectorEven, "odd": exact.SectorOdd}

// system builds the graph and the model, or says which flag is wrong.
func (f exactFlags) system() (exactSystem, error) {
	var s exactSystem
	if err := f.check(); err != nil {
		return s, err
	}
	if err := f.checkThermo(); err != nil {
		return s, err
	}
	graph, err := f.graph()
	if err != nil {
		return s, err
	}
	if f.most > 0 && (f.atoms+graph.Sites-1)/graph.Sites > f.most {
		return s, fmt.Errorf("--max-occupation %d: on %d sites it leaves no room for %d atoms", f.most, graph.Sites, f.atoms)
	}
	s.lattice, s.model.Interaction = graph, f.interaction
	second := make([]float64, graph.Axes)
	for a := range second {
		s.model.Axes = append(s.model.Axes, bosehubbard.AxisTerms{Tunnelling: f.tunnelling, Curvature: f.curvature})
		second[a] = f.second
	}
	if s.terms, err = fock.TermsOf(graph, s.model); err != nil {
		return s, err
	}
	if f.second != 0 {
		err = s.terms.AddTunnelling(graph.SecondBonds(), second)
	}
	return s, err
}

// checkThermo refuses what the averages over the whole spectrum do not know.
func (f exactFlags) checkThermo() error {
	for _, beta := range f.beta {
		if math.IsNaN(beta) || math.IsInf(beta, 0) {
			return fmt.Errorf("--beta %g: want finite numbers", beta)
		}
	}
	if !f.entropy && f.volume {
		return fmt.Errorf("--volume-entropy: want it together with --entropy")
	}
	if (f.entropy || f.beta != nil) && (f.second != 0 || f.momentum != nil || f.sector == "even" || f.sector == "odd") {
		return fmt.Errorf("--entropy and --beta: want them without --second-tunnelling, --momentum and one --sector")
	}
	return nil
}

// check refuses numbers that make no sense for any graph.
func (f exactFlags) check() error {
	for _, flag := range []struct {
		name  string
		value float64
	}{{"tunnelling", f.tunnelling}, {"second-tunnelling", f.second}, {"interaction", f.interaction}, {"curvature", f.curvature}} {
		if math.IsNaN(flag.value) || math.IsInf(flag.value, 0) {
			return fmt.Errorf("--%s %g: want a finite number", flag.name, flag.value)
		}
	}
	if _, ok := sectors[f.sector]; !ok {
		return fmt.Errorf("--sector %q: want auto, whole, even or odd", f.sector)
	}
	for _, flag := range []struct {
		name  string
		value int
	}{{"atoms", f.atoms}, {"max-occupation", f.most}, {"workers", f.workers}} {
		if flag.value < 0 {
			return fmt.Errorf("--%s %d: want 0 or more", flag.name, flag.value)
		}
	}
	return nil
}

// graph builds the lattice of --sites, --grid and --lattice.
func (f exactFlags) graph() (*lattice.Lattice, error) {
	cells := []int{f.sites}
	if f.grid != "" {
		cells = nil
		for part := range strings.SplitSeq(f.grid, "x") {
			n, err := strconv.Atoi(part)
			if err != nil {
				return nil, fmt.Errorf("--grid %q: want numbers of sites joined by x, such as 3x4", f.grid)
			}
			cells = append(cells, n)
		}
	}
	if f.kind != "" {
		graph, err := lattice.Build(lattice.Kind(f.kind), cells, f.ring)
		if err != nil {
			return nil, fmt.Errorf("--lattice %s: %w", f.kind, err)
		}
		return graph, nil
	}
	periodic := make([]bool, len(cells))
	for i := range cells {
		periodic[i] = f.ring
	}
	return lattice.Box(cells, periodic)
}
