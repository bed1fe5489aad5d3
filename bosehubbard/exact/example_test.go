package exact_test

import (
	"context"
	"fmt"

	"hilltop/bosehubbard"
	"hilltop/bosehubbard/exact"
	"hilltop/bosehubbard/lattice"
)

// A small hill: attraction and an anti-trap, and the state on top of it.
func ExampleSolve() {
	l, err := lattice.Box([]int{6}, []bool{false})
	if err != nil {
		fmt.Println(err)
		return
	}
	m := bosehubbard.Model{
		Axes:        []bosehubbard.AxisTerms{{Tunnelling: 1, Curvature: -0.1}}, // Hz
		Interaction: -4,
	}
	ends, err := exact.Solve(context.Background(), l, m, 6, exact.Options{EndStates: true})
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("%d states, floor %.6f Hz, ceiling %.6f Hz\n", ends.Dimension, ends.Floor, ends.Ceiling)
	fmt.Printf("atoms per site at the ceiling: %.3f\n", ends.CeilingState.Occupation)
	// Output:
	// 462 states, floor -64.044982 Hz, ceiling 2.784859 Hz
	// atoms per site at the ceiling: [0.881 1.040 1.079 1.079 1.040 0.881]
}
