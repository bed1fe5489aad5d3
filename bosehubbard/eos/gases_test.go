package eos

import (
	"math"
	"testing"
)

// maxwell checks n = -dO/dmu, s = -dO/dT, dn/dT = ds/dmu and, through them, that all
// parts of a point belong to one grand potential.
func maxwell(t *testing.T, m Model, mu, beta, tol float64) {
	t.Helper()
	here := at(t, m, mu, beta)
	unit := 1 / math.Abs(beta)
	step := 1e-3 * unit // a difference is off by step^2/6 of a third derivative
	warm := func(d float64) Point { return at(t, m, mu, 1/(1/beta+d)) }
	more := func(d float64) Point { return at(t, m, mu+d, beta) }
	slope := func(move func(float64) Point, of func(Point) float64) float64 {
		near := (of(move(step)) - of(move(-step))) / (2 * step)
		far := (of(move(2*step)) - of(move(-2*step))) / (4 * step)
		return (4*near - far) / 3
	}
	filling := func(p Point) float64 { return p.Filling }
	entropy := func(p Point) float64 { return p.Entropy }
	potential := func(p Point) float64 { return p.GrandPotential }
	near(t, m.Name()+" n = -dO/dmu", -slope(more, potential), here.Filling, tol)
	near(t, m.Name()+" s = -dO/dT", -slope(warm, potential), here.Entropy, tol)
	near(t, m.Name()+" dn/dT = ds/dmu", slope(warm, filling)*unit, slope(more, entropy)*unit, tol)
	near(t, m.Name()+" E = parts", here.Kinetic+here.Interaction, here.Energy, 1e-12)
	pairs := here.Variance + here.Filling*here.Filling - here.Filling
	if u := interactionOf(m); u != 0 {
		near(t, m.Name()+" U<n(n-1)>/2", u*pairs/2/unit, here.Interaction/unit, 1e-9)
	}
	if slope(more, filling)*beta < 0 {
		t.Errorf("%s: n falls with mu beta at mu = %g, beta = %g", m.Name(), mu, beta)
	}
}

func interactionOf(m Model) float64 {
	switch m := m.(type) {
	case *HartreeFock:
		return m.terms.Interaction
	case *Bogoliubov:
		return m.terms.Interaction
	}
	return 0
}

// mirrored checks E(-T; J,-U) = -E(T; J,U), and the same for all that is an energy.
func mirrored(t *testing.T, a, b Model, mu, beta float64) {
	t.Helper()
	p, q := at(t, a, mu, beta), at(t, b, -mu, -beta)
	q.Energy, q.Kinetic, q.Interaction, q.GrandPotential = -q.Energy, -q.Kinetic, -q.Interaction, -q.GrandPotential
	if p != q {
		t.Errorf("%s at mu = %g, beta = %g: %+v, mirrored %+v", a.Name(), mu, beta, p, q)
	}
}

func gasesOf(t *testing.T, terms Terms) (*Ideal, *HartreeFock, *Bogoliubov) {
	t.Helper()
	free := terms
	free.Interaction = 0
	return idealOf(t, free), must[*HartreeFock](t)(NewHartreeFock(terms)), must[*Bogoliubov](t)(NewBogoliubov(terms))
}

func TestGasesMaxwell(t *testing.T) {
	for _, hops := range [][]float64{{1}, {1, 1}, {1, 0.6}, {1, 1, 1}} {
		bottom := 0.0
		for _, j := range hops {
			bottom -= 2 * j
		}
		ideal, fock, sound := gasesOf(t, Cosine(hops, 0.3))
		mirrorIdeal, mirrorFock, mirrorSound := gasesOf(t, Cosine(hops, -0.3))
		for _, temperature := range []float64{0.5, 3} {
			beta := 1 / temperature
			maxwell(t, ideal, bottom-0.4, beta, 1e-6)
			mirrored(t, ideal, mirrorIdeal, bottom-0.4, beta)
			maxwell(t, fock, bottom-0.2, beta, 1e-6)
			mirrored(t, fock, mirrorFock, bottom-0.2, beta)
		}
		maxwell(t, sound, bottom+0.8, 3, 1e-5)
		mirrored(t, sound, mirrorSound, bottom+0.8, 3)
	}
}

// Hartree-Fock: the ideal gas for U = 0, the equation it solves, and both ends of T.
func TestHartreeFockLimits(t *testing.T) {
	ideal, fock, _ := gasesOf(t, Cosine([]float64{1, 1}, 0.5))
	p := at(t, fock, -4.1, 0.5)
	q := at(t, ideal, -4.1-2*0.5*p.Filling, 0.5)
	near(t, "filling", p.Filling, q.Filling, 1e-12)
	near(t, "entropy", p.Entropy, q.Entropy, 1e-12)
	near(t, "energy", p.Energy, q.Energy+0.5*p.Filling*p.Filling, 1e-12)
	free := must[*HartreeFock](t)(NewHartreeFock(Cosine([]float64{1, 1}, 0)))
	if a, b := at(t, free, -4.1, 0.5), at(t, ideal, -4.1, 0.5); a != b {
		t.Errorf("U = 0: %+v, ideal %+v", a, b)
	}
	if p := at(t, fock, -5, math.Inf(1)); p.Filling != 0 {
		t.Errorf("T = 0 outside the band: %+v, want nothing", p)
	}
	if err := fock.Valid(-3, math.Inf(1)); err == nil {
		t.Error("a gas at T = 0 inside the band was taken as normal")
	}
}

// At infinite temperature with mu beta fixed, sites are independent and geometric.
func TestGasesInfinite(t *testing.T) {
	for _, filling := range []float64{0.01, 0.7, 2} {
		want := must[Point](t)(Infinite(filling, 1))
		beta := 1e-7
		mu := math.Log(filling/(1+filling)) / beta
		_, fock, _ := gasesOf(t, Cosine([]float64{1, 1}, 1))
		got := at(t, fock, mu, beta)
		near(t, "filling", got.Filling, want.Filling, 5e-6)
		near(t, "entropy", got.Entropy, want.Entropy, 5e-6)
		near(t, "variance", got.Variance, want.Variance, 2e-5)
		near(t, "energy", got.Energy, want.Energy, 5e-5)
		near(t, "<n(n-1)>", want.Variance+filling*filling-filling, 2*filling*filling, 1e-14)
		sum := 0.0
		for k := range want.Shares {
			sum += want.Shares[k]
			near(t, "share", got.Shares[k], want.Shares[k], 2e-6)
		}
		near(t, "all shares", sum, 1, 1e-14)
	}
}

// Bogoliubov at T = 0 on three axes: the zero-point energy against a midpoint sum, and
// at low T the phonon entropy (2 pi^2/45) (T/c)^3 with c^2 = 2 J m in sites and Hz.
func TestBogoliubovSums(t *testing.T) {
	_, _, sound := gasesOf(t, Cosine([]float64{1, 1, 1}, 0.2))
	const above = 0.5
	p := at(t, sound, -6+above, math.Inf(1))
	loop, depletion := 0.0, 0.0
	const count = 80
	for i := range count {
		for j := range count {
			for k := range count {
				e := 0.0
				for _, x := range []int{i, j, k} {
					e += 2 - 2*math.Cos(2*math.Pi*(float64(x)+0.5)/count)
				}
				w := math.Sqrt(e * (e + 2*above))
				loop += (w - e - above) / 2
				depletion += (e/w - 1) / 2
			}
		}
	}
	cells := float64(count * count * count)
	near(t, "grand potential", p.GrandPotential, -above*above/0.4+loop/cells, 1e-5)
	near(t, "filling", p.Filling, above/0.2-depletion/cells, 1e-4)
	if p.Entropy != 0 {
		t.Errorf("entropy at T = 0 is %g", p.Entropy)
	}
	const temperature = 0.01 // the curvature of w takes 0.4 %
	phonons := 2 * math.Pi * math.Pi / 45 * math.Pow(temperature/math.Sqrt(2*above), 3)
	warm := at(t, sound, -6+above, 1/temperature)
	near(t, "phonon entropy over law", warm.Entropy/phonons, 1, 0.01)
}

func TestGasesDoNotAllocate(t *testing.T) {
	ideal, fock, sound := gasesOf(t, Cosine([]float64{1, 1}, 0.3))
	for _, m := range []Model{ideal, fock, sound} {
		mu := -4.2
		if m == Model(sound) {
			mu = -3
		}
		x := mu
		if n := testing.AllocsPerRun(20, func() { x -= 0.001; at(t, m, x, 1) }); n != 0 {
			t.Errorf("%s: %g allocations, want none", m.Name(), n)
		}
	}
}

func TestGasesBadInput(t *testing.T) {
	ideal, fock, sound := gasesOf(t, Cosine([]float64{1, 1}, 0.3))
	nan := math.NaN()
	for _, m := range []Model{ideal, fock, sound} {
		for _, x := range [][2]float64{{nan, 1}, {-5, nan}, {math.Inf(-1), 1}, {-5, 0}, {-5, 1e-300}} {
			if p, err := m.At(x[0], x[1]); err == nil {
				t.Errorf("%s at %g: %+v, want an error", m.Name(), x, p)
			}
		}
	}
	if err := fock.Valid(5, -1); err == nil {
		t.Error("U > 0 at T < 0 was taken")
	}
	for _, bad := range []Terms{{}, {Hops: [][]float64{{}}}, Cosine([]float64{nan}, 0), Cosine([]float64{1, 0}, 0),
		Cosine([]float64{1}, nan), Cosine([]float64{1, 1, 1, 1}, 0), {Hops: [][]float64{{1, math.Inf(1)}}}} {
		if _, err := NewIdeal(bad); err == nil {
			t.Errorf("terms %+v were taken", bad)
		}
	}
	for _, n := range []float64{-1, nan, math.Inf(1)} {
		if _, err := Infinite(n, 1); err == nil {
			t.Errorf("filling %g at infinite temperature was taken", n)
		}
	}
}
