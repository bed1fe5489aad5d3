package gutzwiller_test

import (
	"context"
	"fmt"
	"math"

	"hilltop/bosehubbard/gutzwiller"
)

// The entropy of a deep lattice at kT = 0.15 U, at either sign.
func ExampleSolver_Solve() {
	w := gutzwiller.NewSolver()
	for _, u := range []float64{1000, -1000} {
		e, err := w.Solve(gutzwiller.Site{ChemicalPotential: u / 2, Interaction: u, Temperature: 0.15 * u})
		if err != nil {
			fmt.Println(err)
			return
		}
		fmt.Printf("T = %+.0f Hz: filling %.4f, entropy %.4f kB, energy %+.2f Hz\n", 0.15*u, e.Filling, e.Entropy, e.Kinetic+e.Interaction)
	}
	// Output:
	// T = +150 Hz: filling 1.0000, entropy 0.2909 kB, energy +33.30 Hz
	// T = -150 Hz: filling 1.0000, entropy 0.2909 kB, energy -33.30 Hz
}

// A coherent state collapses after a jump into a deep lattice and is back after h/|U|.
func ExampleEngine_Advance() {
	grid, err := gutzwiller.NewGrid([]int{16, 16}, []bool{false, false})
	if err != nil {
		fmt.Println(err)
		return
	}
	system, _ := gutzwiller.NewSystem(grid, 10)
	filling := make([]float64, grid.Sites)
	for i := range filling {
		filling[i] = 0.8
	}
	state, _ := gutzwiller.Coherent(system, filling, [3]float64{math.Pi, math.Pi})
	engine, _ := gutzwiller.NewEngine(system, gutzwiller.Options{})
	deep := gutzwiller.Terms{Interaction: -2000}
	for i := range 3 {
		m, _ := state.Measure(deep)
		fmt.Printf("%.2f ms: corner %.1f\n", 0.25*float64(i), m.Corner)
		if _, err := engine.Advance(context.Background(), state, gutzwiller.Constant(deep), 0, 0.25e-3); err != nil {
			fmt.Println(err)
			return
		}
	}
	// Output:
	// 0.00 ms: corner 256.0
	// 0.25 ms: corner 10.4
	// 0.50 ms: corner 256.0
}
