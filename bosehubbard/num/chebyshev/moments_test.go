package chebyshev

import (
	"errors"
	"math"
	"math/rand/v2"
	"testing"
)

// diagonal is the Product of a diagonal matrix.
func diagonal(values []float64) Product {
	return func(a, b, c float64, dst, x [][]float64, xy, xx []float64) error {
		for i := range dst {
			sum, square := 0.0, 0.0
			for j, e := range values {
				y := (a*e + b) * x[i][j]
				if c != 0 {
					y += c * dst[i][j]
				}
				dst[i][j] = y
				sum += x[i][j] * y
				square += x[i][j] * x[i][j]
			}
			xy[i], xx[i] = sum, square
		}
		return nil
	}
}

func group(count, length int) [][]float64 {
	v := make([][]float64, count)
	for i := range v {
		v[i] = make([]float64, length)
		for j := range v[i] {
			v[i][j] = math.NaN() // a read before a write shows
		}
	}
	return v
}

// The moments of random vectors are sums over the levels that can be written
// down. Rounding of the recurrence grows as N times 1e-16.
func TestMomentsAgainstSums(t *testing.T) {
	random := rand.New(rand.NewPCG(5, 0))
	within := Interval{Low: -3, High: 11}
	const levels, vectors, moments = 60, 3, 128
	values := make([]float64, levels)
	for i := range values {
		values[i] = within.Low + (within.High-within.Low)*random.Float64()
	}
	values[0], values[1] = within.Low, within.High // the ends themselves are inside
	v, want := group(vectors, levels), group(vectors, moments)
	for i := range v {
		norm := 0.0
		for j := range v[i] {
			v[i][j] = random.NormFloat64()
			norm += v[i][j] * v[i][j]
		}
		clear(want[i])
		for j, e := range values {
			MomentsOf(want[i], within.Place(e), v[i][j]*v[i][j]/norm)
		}
	}
	got := group(vectors, moments)
	calls, last := 0, 0
	r := Recurrence{Product: diagonal(values), Within: within, After: func(done, total int) {
		if calls++; done != last+1 || total != moments/2 {
			t.Errorf("progress %d of %d after %d", done, total, last)
		}
		last = done
	}}
	if err := r.MomentsTo(got, v, group(vectors, levels)); err != nil {
		t.Fatal(err)
	}
	if calls != moments/2 {
		t.Errorf("%d products for %d moments, want half as many", calls, moments)
	}
	for i := range got {
		for n := range got[i] {
			if diff := math.Abs(got[i][n] - want[i][n]); !(diff <= 1e-16*moments*5) {
				t.Errorf("vector %d, moment %d: %.15g, want %.15g, difference %.2g", i, n, got[i][n], want[i][n], diff)
			}
		}
	}
}

// The group does not matter: each vector alone gives the same bits.
func TestMomentsOfGroups(t *testing.T) {
	random := rand.New(rand.NewPCG(6, 0))
	values := []float64{-1, -0.4, 0, 0.1, 0.9, 1}
	v := group(4, len(values))
	alone := group(4, 32)
	for i := range v {
		for j := range v[i] {
			v[i][j] = random.NormFloat64()
		}
		one := [][]float64{append([]float64(nil), v[i]...)}
		r := Recurrence{Product: diagonal(values), Within: Interval{-1.01, 1.01}}
		if err := r.MomentsTo(alone[i:i+1], one, group(1, len(values))); err != nil {
			t.Fatal(err)
		}
	}
	together := group(4, 32)
	r := Recurrence{Product: diagonal(values), Within: Interval{-1.01, 1.01}}
	if err := r.MomentsTo(together, v, group(4, len(values))); err != nil {
		t.Fatal(err)
	}
	for i := range alone {
		for n := range alone[i] {
			if alone[i][n] != together[i][n] {
				t.Errorf("vector %d, moment %d: %g alone, %g in a group", i, n, alone[i][n], together[i][n])
			}
		}
	}
}

func TestMomentsErrors(t *testing.T) {
	v := group(1, 3)
	for j := range v[0] {
		v[0][j] = 1
	}
	r := Recurrence{Product: diagonal([]float64{-1, 0, 1.3}), Within: Interval{-1, 1}}
	var outside *OutsideError
	if err := r.MomentsTo(group(1, 64), v, group(1, 3)); !errors.As(err, &outside) || outside.Order < 1 || !(math.Abs(outside.Moment) > 1) {
		t.Errorf("level at 1.3: %v, want an *OutsideError", err)
	}
	broken := errors.New("stopped")
	for stop := range 3 {
		calls := 0
		r.Product = func(a, b, c float64, dst, x [][]float64, xy, xx []float64) error {
			if calls++; calls > stop {
				return broken
			}
			return diagonal([]float64{-1, 0, 1})(a, b, c, dst, x, xy, xx)
		}
		if err := r.MomentsTo(group(1, 64), group(1, 3), group(1, 3)); !errors.Is(err, broken) || calls != stop+1 {
			t.Errorf("error in product %d: got %v after %d", stop+1, err, calls)
		}
	}
	for name, misuse := range map[string]func(){
		"odd":          func() { _ = r.MomentsTo(group(1, 3), group(1, 3), group(1, 3)) },
		"none":         func() { _ = r.MomentsTo(nil, nil, nil) },
		"short":        func() { _ = r.MomentsTo(group(1, 4), group(1, 3), group(1, 2)) },
		"fewer":        func() { _ = r.MomentsTo(group(2, 4), group(2, 3), group(1, 3)) },
		"no interval":  func() { r.Within.High = -1; _ = r.MomentsTo(group(1, 4), group(1, 3), group(1, 3)) },
		"NaN interval": func() { r.Within.High = math.NaN(); _ = r.MomentsTo(group(1, 4), group(1, 3), group(1, 3)) },
	} {
		func() {
			defer func() {
				if recover() == nil {
					t.Errorf("%s: no panic", name)
				}
			}()
			misuse()
		}()
	}
}

func TestMomentsAllocateNothing(t *testing.T) {
	values := []float64{-1, -0.5, 0.5, 1}
	v, next, dst := group(2, 4), group(2, 4), group(2, 16)
	r := Recurrence{Product: diagonal(values), Within: Interval{-1.1, 1.1}}
	n := testing.AllocsPerRun(20, func() {
		for i := range v {
			for j := range v[i] {
				v[i][j] = 1
			}
		}
		if err := r.MomentsTo(dst, v, next); err != nil {
			t.Fatal(err)
		}
	})
	if n != 0 {
		t.Errorf("MomentsTo allocates %g times, want 0", n)
	}
}
