package thermo_test

import (
	"context"
	"fmt"

	"hilltop/bosehubbard"
	"hilltop/bosehubbard/lattice"
	"hilltop/bosehubbard/thermo"
)

// Six attractive atoms on six sites of an anti-trap: at beta = -1/J they sit near
// the top of the energy and at the edge of the zone.
func Example() {
	l, err := lattice.Box([]int{6}, []bool{false})
	if err != nil {
		fmt.Println(err)
		return
	}
	system := thermo.System{Lattice: l, Atoms: 6, Model: bosehubbard.Model{
		Axes: []bosehubbard.AxisTerms{{Tunnelling: 1, Curvature: -0.05}}, Interaction: -2.1,
	}}
	curve, err := thermo.Entropy(context.Background(), system, thermo.Options{})
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("%d states from %.2f to %.2f Hz, mean %.3f\n", curve.Dimension, curve.Floor, curve.Ceiling, curve.Mean)
	averages, err := thermo.Canonical(context.Background(), system, []float64{-1}, thermo.CanonicalOptions{Observables: true})
	if err != nil {
		fmt.Println(err)
		return
	}
	p := averages.Points[0]
	fmt.Printf("E = %.3f Hz, S = %.3f kB, %.2f of the atoms at the corner of the zone\n", p.Energy, p.Entropy, p.Observables.Corner)
	// Output:
	// 462 states from -33.94 to 5.79 Hz, mean -9.875
	// E = 4.547 Hz, S = 1.966 kB, 0.68 of the atoms at the corner of the zone
}
