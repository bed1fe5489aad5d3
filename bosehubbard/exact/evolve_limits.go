package exact

import "math"

// A number state with many atoms on one site lies far above or below the others,
// makes the spectrum wide and the exponentials dear, and has next to no weight. So
// in a step the diagonal D is limited to an interval, outside of which the state has
// so little that what H misses in the time h stays within a share of the tolerance.
// With the limited diagonal D' that is
//
//	|min(2 pi h |D - D'|, 2) psi|
//
// at most, the integral of the defect, or twice what there is (derived: both
// evolutions keep norms), for the psi at the begin and the one at the end of the
// step. A step at whose end it turns out to be too much is taken again.

// limiter chooses the interval.
type limiter struct {
	low, high float64              // of the diagonal, Hz
	trust     float64              // share of what may be missed to choose by; the state moves on
	weight    [limiterBins]float64 // |psi|^2 of the states whose energies lie in a bin
}

const (
	limiterBins = 128

	// limitedShare of the tolerance is for what the limits take, in every step its
	// part, and in some a few times that.
	limitedShare = 0.2
	fewTimes     = 5

	mostTrust = 0.5
)

// beyond returns what the limits miss of a state in a time.
func (h *moving) beyond(psi vector, time float64) float64 {
	if !h.limited {
		return 0
	}
	sum := 0.0
	for i, e := range h.energies {
		if d := e - h.diagonal[i]; d != 0 {
			d = min(2*math.Pi*time*math.Abs(d), 2)
			sum += d * d * (psi.Re[i]*psi.Re[i] + psi.Im[i]*psi.Im[i])
		}
	}
	return math.Sqrt(sum)
}

// limit limits the diagonal to an interval.
func (h *moving) limit(low, high float64) {
	h.limited = true
	for i, e := range h.energies {
		h.diagonal[i] = min(max(e, low), high)
	}
}

// judge learns from what was missed at the end of a step, and reports whether it
// was too much.
func (l *limiter) judge(missed, allowed float64) (again bool) {
	if missed > allowed {
		l.trust /= 4
	} else {
		l.trust = min(2*l.trust, mostTrust)
	}
	return missed > fewTimes*allowed
}

// choose finds the narrowest interval that misses at most most in a time, among the
// edges of the bins.
func (l *limiter) choose(energies []float64, psi vector, time, most float64) {
	lowest, highest := energies[0], energies[0]
	for _, e := range energies {
		lowest, highest = min(lowest, e), max(highest, e)
	}
	l.low, l.high = lowest, highest
	width := (highest - lowest) / limiterBins
	if !(width > 0) {
		return
	}
	clear(l.weight[:])
	for i, e := range energies {
		l.weight[min(int((e-lowest)/width), limiterBins-1)] += psi.Re[i]*psi.Re[i] + psi.Im[i]*psi.Im[i]
	}
	angle := 2 * math.Pi * time * width // of one bin
	first, last := l.narrowest(angle, most*most/2)
	l.low, l.high = lowest+width*float64(first), lowest+width*float64(last)
}

// narrowest returns the bins that stay, from first to last-1, such that the square
// of what is missed on either side is at most most.
func (l *limiter) narrowest(angle, most float64) (first, last int) {
	missed := func(from, to, edge int) (sum float64) {
		for k := from; k < to; k++ {
			d := min(angle*math.Abs(float64(k)+0.5-float64(edge)), 2)
			sum += d * d * l.weight[k]
		}
		return sum
	}
	for last = limiterBins; last > 1 && missed(last-1, limiterBins, last-1) <= most; last-- {
	}
	for ; first < last-1 && missed(0, first+1, first+1) <= most; first++ {
	}
	return first, last
}
