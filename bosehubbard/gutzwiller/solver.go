package gutzwiller

import (
	"math"

	"gonum.org/v1/gonum/lapack"
	"gonum.org/v1/gonum/lapack/gonum"
)

// susceptibility returns d<b>/d(zJ phi) at phi = 0 of the mirrored site in 1/Hz.
// Neighbouring levels are taken in pairs,
//
//	sum_n (n+1) (p_n - p_(n+1)) / (E_(n+1) - E_n)
//
// whose limit at equal energies is (n+1) p_n / T.
func (w *Solver) susceptibility() float64 {
	w.boltzmann(w.energies)
	sum := 0.0
	for n := range w.levels - 1 {
		gap := w.energies[n+1] - w.energies[n]
		p := w.weights[n]
		if gap < 0 {
			gap, p = -gap, w.weights[n+1]
		}
		if p == 0 {
			continue
		}
		quotient := 1 / gap
		if x := gap / w.temperature; w.temperature > 0 {
			quotient = 1 / w.temperature
			if x > 0 {
				quotient *= -math.Expm1(-x) / x
			}
		}
		sum += float64(n+1) * p * quotient
	}
	return sum
}

// boltzmann sets the weights of levels with the energies given and the grand
// potential of them.
func (w *Solver) boltzmann(energies []float64) {
	lowest, at := energies[0], 0
	for i, e := range energies {
		if e < lowest {
			lowest, at = e, i
		}
	}
	if w.temperature == 0 {
		clear(w.weights)
		w.weights[at], w.free = 1, lowest
		return
	}
	sum := 0.0
	for i, e := range energies {
		w.weights[i] = math.Exp((lowest - e) / w.temperature)
		sum += w.weights[i]
	}
	for i := range w.weights {
		w.weights[i] /= sum
	}
	w.free = lowest - w.temperature*math.Log(sum)
}

// average diagonalises the mirrored site in the field zJ phi and returns <b>.
func (w *Solver) average(phi float64) float64 {
	n := w.levels
	copy(w.values, w.energies)
	for i := range n - 1 {
		w.off[i] = -w.zj * phi * math.Sqrt(float64(i+1))
	}
	if ok := (gonum.Implementation{}).Dsteqr(lapack.EVTridiag, n, w.values, w.off[:n-1], w.vectors, n, w.work[:2*n-2]); !ok {
		return math.NaN()
	}
	w.boltzmann(w.values)
	clear(w.distribution)
	sum := 0.0
	for k, p := range w.weights {
		if p < 1e-20 {
			continue
		}
		for i := range n {
			v := w.vectors[i*n+k]
			w.distribution[i] += p * v * v
			if i > 0 {
				sum += p * math.Sqrt(float64(i)) * v * w.vectors[(i-1)*n+k]
			}
		}
	}
	return sum
}

// atomic fills in the state with phi = 0, whose levels are the occupations.
func (w *Solver) atomic() {
	w.boltzmann(w.energies)
	copy(w.distribution, w.weights)
	copy(w.values, w.energies)
	clear(w.vectors)
	for i := range w.levels {
		w.vectors[i*w.levels+i] = 1
	}
}

// findOrder solves <b> = phi for phi > 0. <b>/phi - 1 is nearly linear in phi^2 and
// falls, so the secant with a bracket (Illinois) takes about ten steps.
func (w *Solver) findOrder() {
	excess := func(square float64) float64 {
		phi := math.Sqrt(square)
		return w.average(phi)/phi - 1
	}
	low, atLow := 0.0, min(w.zj*w.susceptibility()-1, 1)
	high := max(1, (w.mu+w.zj)/w.u)
	atHigh := excess(high)
	for atHigh > 0 {
		low, atLow = high, atHigh
		high *= 2
		atHigh = excess(high)
	}
	square := high
	for range 100 {
		square = (low*atHigh - high*atLow) / (atHigh - atLow)
		at := excess(square)
		if math.Abs(at) < 1e-13 || high-low < 1e-14*high {
			break
		}
		if at > 0 {
			atHigh *= keep(atLow, at)
			low, atLow = square, at
		} else {
			atLow *= keep(atHigh, at)
			high, atHigh = square, at
		}
	}
	w.order = math.Sqrt(square)
}

// keep is the factor of Anderson and Bjorck (BIT 13, 253 (1973)) for the end of the
// bracket that stays, when the other end goes from old to now. From memory.
func keep(old, now float64) float64 {
	if m := 1 - now/old; m > 0 {
		return m
	}
	return 0.5
}

// collect turns the mirrored averages into those of the site.
func (w *Solver) collect() Equilibrium {
	out := Equilibrium{Order: w.order, Distribution: w.distribution, TopWeight: w.distribution[w.levels-1]}
	square := 0.0
	for n, p := range w.distribution {
		out.Filling += p * float64(n)
		square += p * float64(n) * float64(n-1)
	}
	for n, p := range w.distribution {
		d := float64(n) - out.Filling
		out.Variance += p * d * d
	}
	for _, p := range w.weights {
		if p > 0 {
			out.Entropy -= p * math.Log(p)
		}
	}
	if w.order > 0 {
		out.Kinetic = -w.mirror * w.zj * w.order * w.order
	}
	out.Interaction = w.mirror * w.u * square / 2
	out.GrandPotential = w.mirror * (w.free + w.zj*w.order*w.order)
	return out
}
