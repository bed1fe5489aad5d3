package thermo

import (
	"math"

	"gonum.org/v1/gonum/stat"
)

// weighted is a list of energies [Hz] with the number of states that each stands
// for: levels, or the Gauss rule of a random vector.
type weighted struct{ energy, weight []float64 }

// sums are the partial sums of a partition function, with the energies counted from
// an end of the spectrum.
type sums struct{ z, u, q float64 } // of w, w d, w d^2, w the Boltzmann weight

// add adds the terms of a list at beta. Energies within close of the end are at
// the end.
func (s *sums) add(w weighted, beta, end, close float64) {
	for i, e := range w.energy {
		d := e - end
		if math.Abs(d) <= close {
			d = 0
		}
		f := w.weight[i] * math.Exp(-beta*d)
		s.z += f
		s.u += f * d
		s.q += f * d * d
	}
}

// plus adds other sums, scaled.
func (s sums) plus(t sums, scale float64) sums {
	return sums{s.z + scale*t.z, s.u + scale*t.u, s.q + scale*t.q}
}

// moments returns ln Z, the mean energy above the end and the variance.
func (s sums) moments() (logZ, shift, variance float64) {
	shift = s.u / s.z
	return math.Log(s.z), shift, max(0, s.q/s.z-shift*shift)
}

// average evaluates sums that are the same in every sample, base, and sums that
// are drawn, one for each sample, whose mean counts.
func average(beta, end float64, base sums, samples []sums) Average {
	total := base
	for _, s := range samples {
		total = total.plus(s, 1/float64(len(samples)))
	}
	logZ, shift, variance := total.moments()
	a := Average{Beta: beta, Energy: end + shift, Entropy: logZ + beta*shift, Variance: variance}
	if len(samples) < 2 {
		return a
	}
	// Linear response of each average to the sums of one sample.
	energy, entropy, spread := make([]float64, len(samples)), make([]float64, len(samples)), make([]float64, len(samples))
	for i, s := range samples {
		de := (s.u - shift*s.z) / total.z
		energy[i] = de
		entropy[i] = s.z/total.z + beta*de
		spread[i] = (s.q-total.q/total.z*s.z)/total.z - 2*shift*de
	}
	half := halfWidth(len(samples))
	a.EnergyError = half * stat.StdDev(energy, nil)
	a.EntropyError = half * stat.StdDev(entropy, nil)
	a.VarianceError = half * stat.StdDev(spread, nil)
	return a
}
