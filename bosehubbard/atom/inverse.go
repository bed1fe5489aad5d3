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
// such field. It returns nil unless low <= high and all arguments are finite.
//
// Cost: about 100 evaluations per field found, more where two branches meet.
func (c ScatteringCurve) Fields(length, low, high float64) []float64 {
	switch {
	case !finite(length) || !finite(low) || !finite(high) || low > high || len(c.Resonances) == 0:
		return nil
	case length == 0:
		return slices.DeleteFunc(c.Zeros(), func(field float64) bool { return field < low || field > high })
	case len(c.Resonances) == 1:
		return c.onlyField(length, low, high)
	}
	search := inverse{curve: c, length: length, poles: c.Poles(), zeros: c.Zeros()}
	knots := []float64{low}
	for _, mark := range c.marks() {
		if low < mark.Field && mark.Field < high {
			knots = append(knots, mark.Field)
		}
	}
	knots = append(knots, high)
	for i, field := range knots[1:] {
		search.between(knots[i], field)
	}
	return search.found
}

// onlyField is Fields for one resonance.
func (c ScatteringCurve) onlyField(length, low, high float64) []float64 {
	r := c.Resonances[0]
	field := r.Position + (r.zero()-r.Position)/(1-length/c.Background)
	if !(low <= field && field <= high) || field == r.Position {
		return nil
	}
	return []float64{field}
}

// inverse looks for the fields of one scattering length.
type inverse struct {
	curve        ScatteringCurve
	length       float64
	poles, zeros []float64 // ascending, equally many
	found        []float64
}

// between looks at an interval between neighbouring knots: there a has no pole
// and no zero inside, so it has one sign.
func (v *inverse) between(low, high float64) {
	if middle := low + (high-low)/2; low < high && v.curve.at(middle)*v.length < 0 {
		return
	}
	start := len(v.found)
	v.divide(low, high)
	v.merge(start)
}

// divide halves the interval until a is monotone in each part and looks for the
// field there. A part that stays undecided down to the floor holds a maximum or
// a minimum.
func (v *inverse) divide(low, high float64) {
	if v.monotone(low, high) || narrow(low, high) {
		v.bracket(low, high)
		return
	}
	middle := low + (high-low)/2
	v.divide(low, middle)
	v.divide(middle, high)
}

// narrow tells whether an interval is at the floor, about fifty units in the
// last place: inside, a changes by less than its rounding about a maximum.
func narrow(low, high float64) bool {
	return high-low <= 1e-14*math.Max(math.Abs(low), math.Abs(high))+1e-20
}

// monotone tells whether the bounds of
//
//	a'/a = sum_k (z_k - p_k)/((B - z_k)(B - p_k))
//
// prove one sign of a' in an interval with no pole p_k and no zero z_k inside.
// They are paired in ascending order; any pairing gives the same sum.
func (v *inverse) monotone(low, high float64) bool {
	var least, most float64
	for k, pole := range v.poles {
		zero := v.zeros[k]
		one := approach((low-zero)*(low-pole), (high-zero)*(high-pole))
		two := approach((high-zero)*(high-pole), (low-zero)*(low-pole))
		three := one
		if middle := pole + (zero-pole)/2; low < middle && middle < high {
			three = -4 / ((zero - pole) * (zero - pole))
		}
		width := zero - pole
		least += min(width*one, width*two, width*three)
		most += max(width*one, width*two, width*three)
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

// bracket looks for the field in a part in which a is monotone or which is as
// narrow as the floor.
func (v *inverse) bracket(low, high float64) {
	first, last := v.excess(low), v.excess(high)
	middle := low + (high-low)/2
	switch {
	case first == 0:
		v.add(low)
	case last == 0:
		v.add(high)
	case (first < 0) != (last < 0):
		v.add(v.bisect(low, high, first < 0))
	case narrow(low, high) && v.rounding(middle):
		v.add(middle)
	}
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
func (v *inverse) bisect(low, high float64, rising bool) float64 {
	for {
		middle := low + (high-low)/2
		if middle <= low || middle >= high {
			break
		}
		if (v.excess(middle) < 0) == rising {
			low = middle
		} else {
			high = middle
		}
	}
	if math.Abs(v.excess(low)) < math.Abs(v.excess(high)) {
		return low
	}
	return high
}

// rounding tells whether a at the field is length to within four units in the
// last place, about the rounding of the product for a few resonances.
func (v *inverse) rounding(field float64) bool {
	return math.Abs(v.excess(field)) <= 4*0x1p-52*math.Abs(v.length)
}

func (v *inverse) add(field float64) {
	if n := len(v.found); n == 0 || v.found[n-1] < field {
		v.found = append(v.found, field)
	}
}

// merge makes one field of two that meet at a maximum or minimum; start is the
// first of this interval.
func (v *inverse) merge(start int) {
	kept := v.found[:start]
	for _, field := range v.found[start:] {
		if n := len(kept); n > start {
			if middle := kept[n-1] + (field-kept[n-1])/2; v.rounding(middle) {
				kept[n-1] = middle
				continue
			}
		}
		kept = append(kept, field)
	}
	v.found = kept
}
