package gutzwiller

import (
	"context"
	"fmt"
	"math"
	"testing"
)

// BenchmarkAdvance shows the cost per site and step on grids of 1000 to 110,592
// sites; equal numbers mean that the cost is linear in the sites.
func BenchmarkAdvance(b *testing.B) {
	for _, sites := range [][]int{{1000}, {10000}, {100000}, {32, 32}, {100, 100}, {256, 256}, {316, 316}, {10, 10, 10}, {22, 22, 22}, {48, 48, 48}} {
		g := mustGrid(b, sites, make([]bool, len(sites)))
		s := mustSystem(b, g, 6, g.Squares(0))
		state := scramble(b, s, 1)
		for _, workers := range []int{1, 2} {
			b.Run(fmt.Sprintf("grid=%v/workers=%d", sites, workers), func(b *testing.B) {
				e := mustEngine(b, s, Options{Workers: workers, TopLimit: 1})
				drive := Constant(Terms{Tunnelling: [3]float64{1, 1, 1}, Interaction: -2, Weights: []float64{-1e-6}})
				if _, err := e.Advance(context.Background(), state, drive, 0, 0.02); err != nil {
					b.Fatal(err)
				}
				steps := 0
				b.ReportAllocs()
				for b.Loop() {
					r, err := e.Advance(context.Background(), state, drive, 0, 0.05)
					if err != nil {
						b.Fatal(err)
					}
					steps += r.Steps + r.Rejected
				}
				b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(steps)/float64(g.Sites), "ns/site-step")
				b.ReportMetric(float64(steps)/float64(b.N), "steps")
			})
		}
	}
}

// BenchmarkAntiTrap follows the cloud of testdata/gutzwiller_rk4.py for 5 hbar/J with
// an error below that of the plain method with step 0.01, which it runs too. The error
// is the root mean square over sites of the distance from a run with tolerance 1e-11.
func BenchmarkAntiTrap(b *testing.B) {
	for _, side := range []int{64, 128} {
		state, terms := antiTrap(b, side)
		want, _ := mustAdvance(b, state, Constant(terms), 5, Options{Tolerance: 1e-11, TopLimit: 1})
		for _, tc := range []struct {
			name string
			opt  Options
		}{
			{"plain", Options{PlainStep: 0.01, TopLimit: 1}},
			{"tolerance=4e-6", Options{Tolerance: 4e-6, TopLimit: 1}},
			{"tolerance=4e-6/workers=1", Options{Tolerance: 4e-6, TopLimit: 1, Workers: 1}},
			{"tolerance=1e-8", Options{Tolerance: 1e-8, TopLimit: 1}},
		} {
			b.Run(fmt.Sprintf("side=%d/%s", side, tc.name), func(b *testing.B) {
				e := mustEngine(b, state.System, tc.opt)
				var out *State
				for b.Loop() {
					out, e.proposed = state.Clone(), 0
					if _, err := e.Advance(context.Background(), out, Constant(terms), 0, 5); err != nil {
						b.Fatal(err)
					}
				}
				mean, _ := distance(out, want)
				b.ReportMetric(mean, "error")
			})
		}
	}
}

// BenchmarkPassage takes a frozen thermal cloud of 128 x 128 sites through a deep
// lattice, U from 18 to -1 kHz with J = 16 Hz, then back to J = 500 Hz, 12.5 ms in all.
func BenchmarkPassage(b *testing.B) {
	g := mustGrid(b, []int{128, 128}, []bool{false, false})
	s := mustSystem(b, g, 6, g.Squares(0), g.Squares(1))
	state, err := Thermal(context.Background(), s, Terms{Interaction: 18e3, Weights: []float64{3, 3}},
		Heat{ChemicalPotential: 9e3, Temperature: 1800, Seed: 1})
	if err != nil {
		b.Fatal(err)
	}
	deep := func(seconds float64, at *Terms) {
		at.Tunnelling = [3]float64{16, 16}
		at.Interaction = 18e3 - 19e3*seconds/10e-3
		at.Weights[0] = 3 - 6*seconds/10e-3
		at.Weights[1] = at.Weights[0]
	}
	back := func(seconds float64, at *Terms) {
		j := 16 * math.Exp(math.Log(500./16)*(seconds-10e-3)/2.5e-3)
		at.Tunnelling = [3]float64{j, j}
		at.Interaction = -1e3
		at.Weights[0], at.Weights[1] = -3, -3
	}
	for _, tolerance := range []float64{1e-4, 1e-6} {
		b.Run(fmt.Sprintf("tolerance=%g", tolerance), func(b *testing.B) {
			var report Report
			for b.Loop() {
				out, e := state.Clone(), mustEngine(b, s, Options{Tolerance: tolerance, TopLimit: 1})
				report, err = e.Advance(context.Background(), out, deep, 0, 10e-3)
				if err != nil {
					b.Fatal(err)
				}
				b.ReportMetric(float64(report.Steps+report.Rejected), "deep-steps")
				report, err = e.Advance(context.Background(), out, back, 10e-3, 12.5e-3)
				if err != nil {
					b.Fatal(err)
				}
				b.ReportMetric(float64(report.Steps+report.Rejected), "steps-back")
			}
		})
	}
}

func BenchmarkGround(b *testing.B) {
	for _, side := range []int{32, 128} {
		b.Run(fmt.Sprintf("side=%d", side), func(b *testing.B) {
			g := mustGrid(b, []int{side, side}, []bool{false, false})
			s := mustSystem(b, g, 8, g.Squares(0), g.Squares(1))
			v := 56 / float64(side*side)
			terms := Terms{Tunnelling: [3]float64{1, 1}, Interaction: 10, Weights: []float64{v, v}}
			for b.Loop() {
				mustGround(b, s, terms, GroundOptions{Atoms: 0.3 * float64(side*side)})
			}
		})
	}
}
