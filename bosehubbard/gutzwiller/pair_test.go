package gutzwiller

import (
	"math"
	"testing"
)

// pair is the exact evolution of two sites from a product state,
//
//	H = -J (b_1^+ b_2 + h.c.) + sum_i [U n_i (n_i - 1)/2 + V_i n_i]
//
// with n_1, n_2 < levels, as a full vector; nothing is averaged.
type pair struct {
	levels int
	j, u   float64
	v      [2]float64
}

// apply returns H c / h in Hz, c by n_1 levels + n_2.
func (p *pair) apply(c []complex128) []complex128 {
	out := make([]complex128, len(c))
	for n1 := range p.levels {
		for n2 := range p.levels {
			at := n1*p.levels + n2
			x, y := float64(n1), float64(n2)
			out[at] += complex(p.u*(x*(x-1)+y*(y-1))/2+p.v[0]*x+p.v[1]*y, 0) * c[at]
			if n1+1 < p.levels && n2 > 0 { // b_1^+ b_2 and back
				to := (n1+1)*p.levels + n2 - 1
				w := complex(-p.j*math.Sqrt((x+1)*y), 0)
				out[to] += w * c[at]
				out[at] += w * c[to]
			}
		}
	}
	return out
}

// evolve takes Taylor series of order 24 over steps of angle below 2.
func (p *pair) evolve(c []complex128, seconds float64) []complex128 {
	most := float64(p.levels)
	angle := 2 * math.Pi * seconds * (math.Abs(p.u)*most*most + 2*p.j*most + (math.Abs(p.v[0])+math.Abs(p.v[1]))*most)
	steps := int(angle/2) + 1
	for range steps {
		term, sum := c, append([]complex128(nil), c...)
		for order := 1; order <= 24; order++ {
			term = p.apply(term)
			for i := range term {
				term[i] *= complex(0, -2*math.Pi*seconds/float64(steps)/float64(order))
				sum[i] += term[i]
			}
		}
		c = sum
	}
	return c
}

// filling returns <n_1>.
func (p *pair) filling(c []complex128) float64 {
	sum := 0.0
	for at, a := range c {
		sum += float64(at/p.levels) * norm(a)
	}
	return sum
}

// From a coherent start mean field is right at short times up to 1/filling, at equal
// U nbar: two sites, exact, against the engine on the same grid. Doubling the filling
// halves the error up to the next order, 1/filling.
func TestCoherentStartAgainstExact(t *testing.T) {
	const j, un, seconds = 1.0, 1.5, 0.08
	var last float64
	for _, nbar := range []float64{1, 2, 4, 8} {
		levels := int(nbar*1.4+9*math.Sqrt(nbar*1.4)) + 6
		g := mustGrid(t, []int{2}, []bool{false})
		s := mustSystem(t, g, levels, []float64{0, 1})
		start, err := Coherent(s, []float64{1.3 * nbar, 0.7 * nbar}, [3]float64{0.6})
		if err != nil {
			t.Fatal(err)
		}
		f, h := make([]complex128, levels), make([]complex128, levels)
		start.Site(f, 0)
		start.Site(h, 1)
		p := &pair{levels: levels, j: j, u: un / nbar, v: [2]float64{0, 0.5}}
		var c []complex128
		for _, a := range f {
			for _, b := range h {
				c = append(c, a*b)
			}
		}
		out, _ := mustAdvance(t, start, Constant(Terms{Tunnelling: [3]float64{j}, Interaction: un / nbar, Weights: []float64{0.5}}),
			seconds, Options{Tolerance: 1e-10})
		mean := make([]float64, 2)
		out.Filling(mean)
		exact := p.filling(p.evolve(c, seconds))
		off, moved := math.Abs(mean[0]-exact)/nbar, math.Abs(exact-1.3*nbar)/nbar
		t.Logf("filling %g: exact %.6f, mean field %.6f, off by %.2g of %.2g", nbar, exact, mean[0], off, moved)
		if moved < 0.2 {
			t.Errorf("filling %g: only %.2g of the atoms moved", nbar, moved)
		}
		if nbar > 1 {
			near(t, "error at half the filling over error", last/off, 2, 1/nbar)
		}
		last = off
	}
}
