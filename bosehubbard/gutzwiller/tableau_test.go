package gutzwiller

import (
	"math"
	"testing"
)

// Conditions that every method of its order fulfils: a stage lies at the sum of its
// row; sum b c^(q-1) = 1/q; and for the tall trees b A^(q-1) 1 = 1/q!.
// Source: Hairer, Norsett, Wanner (1993), section II.2.
func TestOrderConditions(t *testing.T) {
	for name, m := range map[string]*tableau{"classical": &classical, "dop853": &dop853} {
		stages := len(m.nodes)
		if stages%2 != 0 {
			t.Errorf("%s: %d stages, the engine wants an even number", name, stages)
		}
		apply := func(v []float64) []float64 {
			out := make([]float64, stages)
			for i, row := range m.rows {
				for j, a := range row {
					out[i] += a * v[j]
				}
			}
			return out
		}
		ones, powers := make([]float64, stages), make([]float64, stages)
		for i := range ones {
			ones[i], powers[i] = 1, 1
		}
		for i, c := range apply(ones) {
			near(t, name+" row", c, m.nodes[i], 1e-14)
		}
		tall, factorial := ones, 1.0
		for q := 1; q <= m.order; q++ {
			factorial *= float64(q)
			quadrature, tree := 0.0, 0.0
			for i, b := range m.sum {
				quadrature += b * powers[i]
				tree += b * tall[i]
				powers[i] *= m.nodes[i]
			}
			near(t, name+" quadrature", quadrature, 1/float64(q), 2e-14)
			near(t, name+" tall tree", tree, 1/factorial, 2e-14) // terms of up to 40 cancel
			tall = apply(tall)
		}
		// The estimates vanish for low powers; that of order 5 does so only to 2e-11
		// as it is printed, which is far below what it has to measure.
		for what, weights := range map[string][]float64{"fifth": m.fifth, "third": m.third} {
			for q := 0; weights != nil && q < 3; q++ {
				sum := 0.0
				for i, w := range weights {
					sum += w * math.Pow(m.nodes[i], float64(q))
				}
				near(t, name+" "+what, sum, 0, 3e-11)
			}
		}
	}
}

// A rate that shares its place with an earlier one must come after the last row that
// reads that one.
func TestSlots(t *testing.T) {
	for name, m := range map[string]*tableau{"classical": &classical, "dop853": &dop853} {
		rows := append(append([][]float64(nil), m.rows...), m.sum, m.fifth, m.third)
		for i, row := range rows {
			for j, a := range row {
				for k := j + 1; a != 0 && k < min(i, len(m.nodes)); k++ {
					if m.slots[k] == m.slots[j] {
						t.Errorf("%s: row %d reads stage %d, which stage %d has replaced", name, i, j, k)
					}
				}
			}
		}
	}
}
