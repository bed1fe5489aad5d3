package eos

import (
	"errors"
	"math"
	"testing"
)

// near reports a value that is further from want than tol, relative or, below 1,
// absolute.
func near(t testing.TB, what string, got, want, tol float64) {
	t.Helper()
	if !(math.Abs(got-want) <= tol*max(1, math.Abs(want))) {
		t.Errorf("%s: got %.12g, want %.12g, difference %.3g, tolerance %.1g", what, got, want, got-want, tol)
	}
}

func must[M any](t testing.TB) func(M, error) M {
	return func(m M, err error) M {
		t.Helper()
		if err != nil {
			t.Fatal(err)
		}
		return m
	}
}

func idealOf(t testing.TB, terms Terms) *Ideal {
	t.Helper()
	m, err := NewIdeal(terms)
	if err != nil {
		t.Fatal(err)
	}
	return m
}

func at(t testing.TB, m Model, mu, beta float64) Point {
	t.Helper()
	p, err := m.At(mu, beta)
	if err != nil {
		t.Fatalf("%s: %v", m.Name(), err)
	}
	return p
}

// The homogeneous ideal gas of two axes, at both signs. The values were summed over
// 400 x 400 midpoints of the zone, which is good to all digits given.
func TestIdealTable(t *testing.T) {
	for _, row := range []struct{ temperature, filling, above, energy float64 }{
		{2.7, 0.25, 1.450425, -1.778233}, {2.7, 0.5, 0.465323, -2.164858}, {2.7, 1.0, 0.049727, -2.788339},
		{2.2, 0.25, 0.882590, -2.122653}, {2.2, 0.5, 0.219177, -2.554760}, {2.2, 1.0, 0.013350, -3.132452},
	} {
		const j = 467.0
		m := idealOf(t, Cosine([]float64{j, j}, 0))
		for _, sign := range []float64{1, -1} {
			// mu is rounded to 5e-7: n changes by 5e-7 dn/dmu, up to 3e-5 at mu = -4.01335.
			p := at(t, m, -sign*(4+row.above)*j, sign/(row.temperature*j))
			near(t, "filling", p.Filling, row.filling, 4e-5)
			near(t, "energy per atom", p.Energy/p.Filling/j, sign*row.energy, 6e-5)
		}
		// The same sum over midpoints, at the very same mu.
		n, e := midpoints(400, -4-row.above, 1/row.temperature)
		p := at(t, m, -(4+row.above)*j, 1/(row.temperature*j))
		near(t, "filling of midpoints", p.Filling, n, 1e-9)
		near(t, "energy of midpoints", p.Energy/j, e, 1e-9)
	}
}

// midpoints sums the ideal gas of two axes with J = 1 over a grid.
func midpoints(count int, mu, beta float64) (filling, energy float64) {
	for i := range count {
		for k := range count {
			e := -2*math.Cos(2*math.Pi*(float64(i)+0.5)/float64(count)) - 2*math.Cos(2*math.Pi*(float64(k)+0.5)/float64(count))
			b := 1 / math.Expm1(beta*(e-mu))
			filling += b
			energy += b * e
		}
	}
	all := float64(count) * float64(count)
	return filling / all, energy / all
}

// With mu far below the band, the sum over Bessel functions has few terms:
// n = sum_k exp(k beta mu) I0(2 k beta J)^d, and so at any temperature.
func TestIdealAgainstBessel(t *testing.T) {
	for axes := 1; axes <= 3; axes++ {
		hops := []float64{1, 1, 1}[:axes]
		for _, uneven := range []bool{false, true} {
			if uneven {
				hops = []float64{1, 0.3, 2}[:axes]
			}
			m := idealOf(t, Cosine(hops, 0))
			for _, beta := range []float64{1e-2, 1, 10, 300} {
				for _, gap := range []float64{0.1, 1, 4} { // beta (bottom - mu)
					bottom := 0.0
					for _, j := range hops {
						bottom -= 2 * j
					}
					want := 0.0
					for k := 1.0; k*gap < 40; k++ {
						term := math.Exp(-k * gap)
						for _, j := range hops {
							term *= scaledBessel(2 * k * beta * j)
						}
						want += term
					}
					got := at(t, m, bottom-gap/beta, beta).Filling
					tol := 2e-9 * max(1, beta/30)
					if axes == 3 {
						tol = 5e-7 * max(1, math.Sqrt(beta)/5)
					}
					near(t, "filling over sum", got/want, 1, tol)
				}
			}
		}
	}
}

// scaledBessel is exp(-x) I0(x), by the mean of exp(x (cos q - 1)) over midpoints.
func scaledBessel(x float64) float64 {
	count := 40 + int(12*math.Sqrt(x))
	sum := 0.0
	for i := range count {
		s := math.Sin(math.Pi * (float64(i) + 0.5) / float64(count))
		sum += math.Exp(-2 * x * s * s)
	}
	return sum / float64(count)
}

// Watson's integral: at high temperature the threshold of three axes is T/(6J) times
// 1.516386059 less 1/2, up to a term of order J/T.
func TestThreshold(t *testing.T) {
	m := idealOf(t, Cosine([]float64{1, 1, 1}, 0))
	for _, beta := range []float64{1e-3, -1e-3} {
		n := must[float64](t)(m.Threshold(beta))
		near(t, "threshold over Watson's integral", (n+0.5)/(1.516386059/6/1e-3), 1, 3e-5)
	}
	flat := idealOf(t, Cosine([]float64{1, 1}, 0))
	if n := must[float64](t)(flat.Threshold(1)); !math.IsInf(n, 1) {
		t.Errorf("two axes condense at %g, want never", n)
	}
	if n := must[float64](t)(m.Threshold(math.Inf(-1))); n != 0 {
		t.Errorf("threshold at T = 0 is %g, want 0", n)
	}
	if _, err := m.At(-5.9, 1); !errors.As(err, new(*InvalidError)) {
		t.Errorf("mu inside the band: %v, want an InvalidError", err)
	}
}

// A real band: its amplitudes come back from its energies, it gives the midpoint sum
// over its own energies, and at T < 0 it is the band turned over.
func TestRealBand(t *testing.T) {
	want := []float64{466, -17, 0.99, -0.07} // close to 39K at 6.1 Er
	energies := make([]float64, 33)
	for i := range energies {
		q := math.Pi * float64(i) / 32
		energies[i] = 20000
		for r, j := range want {
			energies[i] -= 2 * j * math.Cos(float64(r+1)*q)
		}
	}
	got := must[[]float64](t)(FromBand(energies, 4))
	for r := range want {
		near(t, "amplitude", got[r], want[r], 1e-11) // of 20000
	}
	m := idealOf(t, Terms{Hops: [][]float64{got}})
	for _, sign := range []float64{1, -1} {
		mu, beta := -sign*1500.0, sign/1000
		n, e := 0.0, 0.0
		const count = 400
		for i := range count {
			q := 2 * math.Pi * (float64(i) + 0.5) / count
			level := 0.0
			for r, j := range want {
				level -= 2 * j * math.Cos(float64(r+1)*q)
			}
			b := 1 / math.Expm1(beta*(level-mu))
			n, e = n+b/count, e+b*level/count
		}
		p := at(t, m, mu, beta)
		near(t, "filling", p.Filling, n, 1e-10)
		near(t, "energy", p.Energy, e, 1e-10)
	}
	up, down := at(t, m, -1500, 1e-3), at(t, m, 1500, -1e-3)
	if math.Abs(up.Filling-down.Filling) < 1e-3 {
		t.Errorf("fillings %g and %g at both ends of a band that is no mirror image, want them apart", up.Filling, down.Filling)
	}
	if _, err := NewIdeal(Terms{Hops: [][]float64{{1, -0.4}}}); err == nil {
		t.Error("a band with its maximum inside the zone was taken")
	}
}

func TestIdealAtZero(t *testing.T) {
	m := idealOf(t, Cosine([]float64{1}, 0))
	for _, sign := range []float64{1, -1} {
		p := at(t, m, -sign*3, math.Inf(int(sign)))
		if p.Filling != 0 || p.Entropy != 0 || p.Energy != 0 || p.GrandPotential != 0 || p.Shares[0] != 1 {
			t.Errorf("T = 0: %+v, want an empty lattice", p)
		}
	}
}
