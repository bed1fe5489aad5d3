package thermo

import "math"

// gibbs holds the canonical sums of a ladder at one beta. The energies count from
// the end that the state sits at: the lowest for beta >= 0, the highest for
// beta < 0, so that no weight exceeds its degeneracy and the end keeps it.
type gibbs struct {
	end      float64   // Hz
	logSum   float64   // ln sum g exp(-beta (e - end))
	shift    float64   // <e - end>, Hz
	variance float64   // Hz^2
	skew     float64   // third central moment, Hz^3
	share    []float64 // of each rung
}

// at computes the sums; beta in 1/Hz may be infinite.
func (r ladder) at(beta float64) gibbs {
	g := gibbs{end: r.lowest(), share: make([]float64, len(r.energy))}
	if beta < 0 {
		g.end = r.highest()
	}
	sum := 0.0
	for i, e := range r.energy {
		w := r.weight[i]
		if d := e - g.end; d != 0 { // 0 times an infinite beta is no number
			w *= math.Exp(-beta * d)
		}
		g.share[i] = w
		sum += w
		g.shift += w * (e - g.end)
	}
	g.shift /= sum
	g.logSum = math.Log(sum)
	for i, e := range r.energy {
		g.share[i] /= sum
		d := e - g.end - g.shift
		g.variance += g.share[i] * d * d
		g.skew += g.share[i] * d * d * d
	}
	return g
}

// entropy returns ln Z + beta <E>, in kB.
func (g gibbs) entropy(beta float64) float64 {
	if g.shift == 0 {
		return g.logSum
	}
	return g.logSum + beta*g.shift
}

// beta returns the inverse temperature in 1/Hz at which the mean energy per body
// is u, infinite at the ends. u lies between the lowest and the highest energy.
//
// Relative accuracy about 1e-13 from energies a rounding away from an end to
// those a rounding away from the mean: near an end the logarithm of the distance
// to it is matched, near the mean the distance to the mean.
func (r ladder) beta(u float64) float64 {
	if u == r.lowest() {
		return math.Inf(1)
	}
	if u == r.highest() {
		return math.Inf(-1)
	}
	mean := r.mean()
	if u > mean {
		return -r.mirrored().coldBeta(-u, -mean)
	}
	return r.coldBeta(u, mean)
}

// coldBeta is beta for lowest < u <= mean.
func (r ladder) coldBeta(u, mean float64) float64 {
	if u == mean {
		return 0
	}
	f := func(beta float64) (float64, float64) { return r.nearEnd(beta, u-r.lowest()) }
	if mean-u < 0.25*(mean-r.lowest()) {
		f = func(beta float64) (float64, float64) { return r.nearMean(beta, mean, u-mean) }
	}
	high := 1 / (r.highest() - r.lowest())
	for {
		if v, _ := f(high); v <= 0 {
			return decreasingRoot(f, high)
		}
		high *= 2
	}
}

// nearEnd returns ln(<e - lowest>/target) and its derivative by beta.
func (r ladder) nearEnd(beta, target float64) (value, slope float64) {
	g := r.at(beta)
	return math.Log(g.shift / target), -g.variance / g.shift
}

// nearMean returns <e - mean> - target and its derivative by beta. As the sum of
// g (e - mean) is 0, exp(x) - 1 may stand for exp(x), which loses no digits.
func (r ladder) nearMean(beta, mean, target float64) (value, slope float64) {
	sum, states := 0.0, 0.0
	for i, e := range r.energy {
		d := e - mean
		w := math.Expm1(-beta * d)
		sum += r.weight[i] * d * w
		states += r.weight[i] * (w + 1)
	}
	return sum/states - target, -r.at(beta).variance
}

// decreasingRoot finds the root of a falling function in (0, high] by Newton's
// method, kept inside its bracket by bisection.
func decreasingRoot(f func(x float64) (value, slope float64), high float64) float64 {
	low, x := 0.0, high/2
	for range 200 {
		value, slope := f(x)
		switch {
		case value > 0:
			low = x
		case value < 0:
			high = x
		default:
			return x
		}
		next := x - value/slope
		if !(next > low && next < high) {
			next = low + (high-low)/2
		}
		if math.Abs(next-x) <= 0x1p-53*x {
			return next
		}
		x = next
	}
	return x
}
