package atom

import (
	"math"
	"slices"
)

// Fields returns every field [T] between low and high, both included, at which
// the scattering length is length [m], in ascending order.
//
// With one resonance it is B0 + D/(1 - a/abg). With several, the fields are
// bracketed between neighbouring poles and zeros, where a has one sign, and
// there between the maxima and minima, to the last digit of the field. Where
// length is a maximum or minimum of the curve to within its rounding, the two
// fields that meet there are given as one. A curve without resonances has no
// such field. It returns nil unless low <= high, all arguments are finite and
// Validate accepts the curve.
//
// Cost: about 100 evaluations per field found, and as many per branch that has
// a maximum or minimum.
func (c ScatteringCurve) Fields(length, low, high float64) []float64 {
	switch {
	case !finite(length) || !finite(low) || !finite(high) || low > high || len(c.Resonances) == 0 || c.Validate() != nil:
		return nil
	case length == 0:
		return slices.DeleteFunc(c.Zeros(), func(field float64) bool { return field < low || field > high })
	case len(c.Resonances) == 1:
		return c.onlyField(length, low, high)
	}
	search := inverse{curve: c, length: length, pairs: closestPairs(c.Poles(), c.Zeros())}
	knots := []float64{low}
	for _, mark := range c.marks() {
		if low < mark.Field && mark.Field < high {
			knots = append(knots, mark.Field)
		}
	}
	knots = append(knots, high)
	for i, field := range knots[1:] {
		search.between(interval{knots[i], field})
	}
	return search.found
}

// onlyField is Fields for one resonance.
func (c ScatteringCurve) onlyField(length, low, high float64) []float64 {
	r := c.Resonances[0]
	field := r.Position + (r.zero()-r.Position)/(1-length/c.Background)
	for _, end := range [2]float64{low, high} {
		if finite(field) && coincide(field, end) {
			field = end // not lost to the rounding of the formula
		}
	}
	if !(low <= field && field <= high) || field == r.Position {
		return nil
	}
	return []float64{field}
}

// inverse looks for the fields of one scattering length.
type inverse struct {
	curve  ScatteringCurve
	length float64
	pairs  []pair
	found  []float64
}

// pair is a pole and a zero, which need not be of one resonance.
type pair struct{ pole, zero float64 }

// closestPairs pairs each pole with a zero, the closest two first. Any pairing
// gives the same a'/a; this one gives the tightest bounds, because a close pair
// all but cancels. The slices, equally long, are used up.
func closestPairs(poles, zeros []float64) []pair {
	pairs := make([]pair, 0, len(poles))
	for len(poles) > 0 {
		i, j := 0, 0
		for k, pole := range poles {
			for l, zero := range zeros {
				if math.Abs(zero-pole) < math.Abs(zeros[j]-poles[i]) {
					i, j = k, l
				}
			}
		}
		pairs = append(pairs, pair{poles[i], zeros[j]})
		poles, zeros = slices.Delete(poles, i, i+1), slices.Delete(zeros, j, j+1)
	}
	return pairs
}

// interval is a range of fields.
type interval struct{ low, high float64 }

func (i interval) middle() float64 { return i.low + (i.high-i.low)/2 }

// narrow tells whether an interval is about fifty units in the last place wide;
// inside, a changes by less than its rounding about a maximum or minimum.
func (i interval) narrow() bool {
	return i.high-i.low <= 1e-14*math.Max(math.Abs(i.low), math.Abs(i.high))+1e-20
}

// mostParts bounds the parts of one interval that are undecided at a time.
// About a maximum or minimum there are a handful. Only where a' touches 0 and
// keeps its sign do they multiply; a is monotone there all the same.
const mostParts = 4096

// between looks at an interval between neighbouring knots. There a has no pole
// and no zero inside, so it has one sign. The interval is halved until a is
// monotone in each part.
func (v *inverse) between(whole interval) {
	if whole.low < whole.high && v.curve.at(whole.middle())*v.length < 0 {
		return
	}
	start := len(v.found)
	parts, undecided := []interval{whole}, []interval{}
	for len(parts) > 0 {
		for _, part := range parts {
			switch {
			case v.monotone(part):
				v.bracket(part)
			case part.narrow() || len(parts) > mostParts:
				if !v.bracket(part) && v.rounding(part.middle()) {
					v.found = append(v.found, part.middle()) // the maximum or minimum itself
				}
			default:
				undecided = append(undecided, interval{part.low, part.middle()}, interval{part.middle(), part.high})
			}
		}
		parts, undecided = undecided, parts[:0]
	}
	v.merge(start)
}

// monotone tells whether the bounds of
//
//	a'/a = sum_k (z_k - p_k)/((B - z_k)(B - p_k))
//
// prove one sign of a' in an interval with no pole p_k and no zero z_k inside.
func (v *inverse) monotone(part interval) bool {
	low, high := part.low, part.high
	var least, most float64
	for _, p := range v.pairs {
		first, last := (low-p.zero)*(low-p.pole), (high-p.zero)*(high-p.pole)
		width := p.zero - p.pole
		one, two := width*approach(first, last), width*approach(last, first)
		three := one
		if middle := p.pole + width/2; low < middle && middle < high {
			three = -4 / width
		}
		least += min(one, two, three)
		most += max(one, two, three)
	}
	return least > 0 || most < 0
}

// approach returns 1/product at the end of an interval; where the product is 0
// it is infinite, with the sign that the product has at the other end.
func approach(product, other float64) float64 {
	switch {
	case product != 0:
		return 1 / product
	case other != 0:
		return math.Copysign(math.Inf(1), other)
	}
	return math.Inf(-1) // one end on the pole, the other on the zero
}

// bracket looks for the field in a part in which a is monotone or which is
// narrow, and tells whether it is there.
func (v *inverse) bracket(part interval) bool {
	first, last := v.excess(part.low), v.excess(part.high)
	switch {
	case first == 0:
		v.found = append(v.found, part.low)
	case last == 0:
		v.found = append(v.found, part.high)
	case (first < 0) != (last < 0):
		v.found = append(v.found, v.bisect(part, first < 0))
	default:
		return false
	}
	return true
}

// excess returns a - length, and on a pole the infinity that a takes towards
// the side on which it has the sign of length.
func (v *inverse) excess(field float64) float64 {
	a := v.curve.at(field)
	if !finite(a) {
		return math.Copysign(math.Inf(1), v.length)
	}
	return a - v.length
}

// bisect returns the better of the two neighbouring numbers between which a
// passes length.
func (v *inverse) bisect(part interval, rising bool) float64 {
	for {
		middle := part.middle()
		if middle <= part.low || middle >= part.high {
			break
		}
		if (v.excess(middle) < 0) == rising {
			part.low = middle
		} else {
			part.high = middle
		}
	}
	if math.Abs(v.excess(part.low)) < math.Abs(v.excess(part.high)) {
		return part.low
	}
	return part.high
}

// rounding tells whether a at the field is length to within four units in the
// last place, about the rounding of the product for a few resonances.
func (v *inverse) rounding(field float64) bool {
	return math.Abs(v.excess(field)) <= 4*0x1p-52*math.Abs(v.length)
}

// merge sorts the fields of one interval, of which start is the first, and
// makes one of two that meet at a maximum or minimum or at the end of a part.
func (v *inverse) merge(start int) {
	slices.Sort(v.found[start:])
	kept := v.found[:start]
	for _, field := range v.found[start:] {
		if n := len(kept); n > start {
			both := interval{kept[n-1], field}
			if both.low == both.high || v.rounding(both.middle()) {
				kept[n-1] = both.middle()
				continue
			}
		}
		kept = append(kept, field)
	}
	v.found = kept
}
