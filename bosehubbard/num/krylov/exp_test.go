package krylov

import (
	"context"
	"errors"
	"math"
	"math/rand/v2"
	"slices"
	"strconv"
	"testing"
)

var background = context.Background()

// The bound holds in a hundred runs with random matrices, vectors, times and
// tolerances against the dense exponential, keeps to the tolerance, and is no more
// than three times the error where neither rounding nor its cure matters.
func TestBoundHoldsInEverySeededRun(t *testing.T) {
	loosest := 1.0
	seeds := uint64(100)
	if testing.Short() {
		seeds = 20
	}
	for seed := range seeds {
		random := rand.New(rand.NewPCG(seed, 1))
		n := 20 + random.IntN(50)
		width := 4 + 30*random.Float64()
		d := newDense(t, randomSymmetric(n, width, random))
		psi := randomVector(n, random)
		size := norm(psi)
		tau := (random.Float64() - 0.5) * 6
		tolerance := math.Pow(10, -2-10*random.Float64())
		p := New(n, Options{Dimension: 4 + random.IntN(30)})
		want := d.exp(psi, tau)
		r, err := p.Exp(background, psi, tau, tolerance, d.product)
		if err != nil {
			t.Errorf("seed %d: %v", seed, err)
			continue
		}
		got := distance(psi, want) / size
		oracle := 1e-15 * (float64(r.Steps) + math.Abs(tau)*width) // rounding of the dense exponential
		if got > r.Bound+oracle || r.Bound > tolerance+float64(r.Steps)*stepRounding {
			t.Errorf("seed %d: error %.3g, bound %.3g, tolerance %.3g in %d steps", seed, got, r.Bound, tolerance, r.Steps)
		}
		if math.Abs(r.Norm/size-1) > r.Bound {
			t.Errorf("seed %d: norm %.15g of %.15g, want the same within %.3g", seed, r.Norm, size, r.Bound)
		}
		if got > 1000*oracle && p.Reorthogonalisations() == 0 {
			loosest = min(loosest, got/r.Bound)
		}
	}
	if t.Logf("error/bound at least %.3g", loosest); loosest < 1./3 {
		t.Errorf("error/bound %.3g in the loosest run, want at least 1/3", loosest)
	}
}

// For a spectrum of length 4 rho and m >= 2 rho tau the error is at most
// 12 exp(-(rho tau)^2/m) (e rho tau/m)^m.
//
// Source: Hochbruck and Lubich, SIAM J. Numer. Anal. 34, 1911 (1997), for
// skew-Hermitian matrices, from memory.
func TestErrorIsBelowTheAPrioriBound(t *testing.T) {
	const n = 120
	d := newDense(t, chain(n)) // rho = 1
	random := rand.New(rand.NewPCG(3, 0))
	for _, tau := range []float64{0.5, 2, 5, 9} {
		psi := randomVector(n, random)
		size, want := norm(psi), d.exp(psi, tau)
		for m := max(2, int(math.Ceil(2*tau))); m < 40; m += 3 {
			p := New(n, Options{Dimension: m})
			// A tolerance of 1e-12 fills the space or is kept; else the error at tau is
			// asked for beyond its reach.
			if _, _, err := p.Build(background, psi, tau, 1e-12, d.product); err != nil {
				t.Fatal(err)
			}
			dst := NewVector(n)
			if _, err := p.AdvanceTo(background, dst, tau); err != nil {
				t.Fatal(err)
			}
			x := float64(p.Dimension())
			bound := 12 * math.Exp(-tau*tau/x) * math.Pow(math.E*tau/x, x)
			if got := distance(dst, want) / size; got > bound+1e-12 {
				t.Errorf("tau %g, dimension %d: error %.3g, want at most %.3g", tau, p.Dimension(), got, bound)
			}
		}
	}
}

// Forwards and back gives the start within both bounds, and so does a step of 0.
func TestTimeReversal(t *testing.T) {
	random := rand.New(rand.NewPCG(5, 0))
	d := newDense(t, randomSymmetric(80, 20, random))
	start := randomVector(80, random)
	psi := NewVector(80)
	psi.CopyFrom(start)
	p := New(80, Options{Dimension: 12})
	bound := 0.0
	for _, tau := range []float64{1.7, 0, -1.7} {
		r, err := p.Exp(background, psi, tau, 1e-11, d.product)
		if err != nil {
			t.Fatal(err)
		}
		bound += r.Bound
	}
	if got := distance(psi, start) / norm(start); got > bound || got == 0 {
		t.Errorf("forwards and back: distance %.3g, want at most the bounds' %.3g", got, bound)
	}
}

// A vector in an invariant space of H needs no more dimensions than that has.
func TestClosedSpace(t *testing.T) {
	random := rand.New(rand.NewPCG(6, 0))
	d := newDense(t, randomSymmetric(50, 10, random))
	psi := NewVector(50)
	for i := range 50 { // three eigenstates
		psi.Re[i] = d.states.At(i, 0) + d.states.At(i, 20)
		psi.Im[i] = 2 * d.states.At(i, 49)
	}
	want := d.exp(psi, 25)
	p := New(50, Options{})
	r, err := p.Exp(background, psi, 25, 1e-10, d.product)
	if err != nil {
		t.Fatal(err)
	}
	if got := distance(psi, want); got > 1e-12 || r.Products > 6 || r.Steps != 1 {
		t.Errorf("three eigenstates: error %.3g, %+v, want one step of 3 products or a few more", got, r)
	}
	// One eigenstate, for a time of a million radians: only its phase turns.
	for i := range 50 {
		psi.Re[i], psi.Im[i] = d.states.At(i, 7), 0
	}
	want = d.exp(psi, 1e5)
	if r, err = p.Exp(background, psi, 1e5, 1e-6, d.product); err != nil || distance(psi, want) > 1e-8 {
		t.Errorf("one eigenstate: error %.3g, %+v, %v", distance(psi, want), r, err)
	}
}

func TestPowers(t *testing.T) {
	random := rand.New(rand.NewPCG(8, 0))
	d := newDense(t, randomSymmetric(60, 8, random))
	psi := randomVector(60, random)
	p := New(60, Options{})
	if _, _, err := p.Build(background, psi, 0.5, 1e-8, d.product); err != nil {
		t.Fatal(err)
	}
	want, next, got := NewVector(60), NewVector(60), NewVector(60)
	want.CopyFrom(psi)
	for power := range 4 {
		if err := p.PowerTo(background, got, power); err != nil {
			t.Fatal(err)
		}
		if diff := distance(got, want); diff > 1e-13*norm(want) {
			t.Errorf("power %d: off by %.3g of %.3g", power, diff, norm(want))
		}
		if _, err := d.product(background, next, want); err != nil {
			t.Fatal(err)
		}
		want, next = next, want
	}
}

// Times within the reach may be asked for in any order and of either sign.
func TestDenseOutput(t *testing.T) {
	random := rand.New(rand.NewPCG(9, 0))
	d := newDense(t, randomSymmetric(60, 8, random))
	psi := randomVector(60, random)
	p := New(60, Options{})
	reach, bound, err := p.Build(background, psi, 2, 1e-9, d.product)
	if err != nil || reach != 2 {
		t.Fatalf("reach %g, %v, want 2", reach, err)
	}
	dst := NewVector(60)
	for _, tau := range []float64{2, 0.3, -1.1, 0, -2} {
		n, err := p.AdvanceTo(background, dst, tau)
		if got := distance(dst, d.exp(psi, tau)) / norm(psi); err != nil || got > bound {
			t.Errorf("tau %g: error %.3g, want at most %.3g; %v", tau, got, bound, err)
		}
		if math.Abs(n-norm(dst)) > 1e-14*n {
			t.Errorf("tau %g: norm %.17g, want %.17g", tau, n, norm(dst))
		}
	}
}

// Same bits for any number of workers.
func TestWorkersGiveTheSameBits(t *testing.T) {
	const n = 20_000
	random := rand.New(rand.NewPCG(11, 0))
	start := randomVector(n, random)
	var first Vector
	for _, workers := range []int{0, 1, 2, 3, 8} {
		p := New(n, Options{Dimension: 10, Workers: workers})
		psi := NewVector(n)
		psi.CopyFrom(start)
		if _, err := p.Exp(background, psi, 3, 1e-8, hopping); err != nil {
			t.Fatal(err)
		}
		if first.Re == nil {
			first = psi
		}
		if !slices.Equal(psi.Re, first.Re) || !slices.Equal(psi.Im, first.Im) {
			t.Errorf("%d workers: other bits than with none", workers)
		}
	}
}

// hopping is the product with the chain of any length.
func hopping(_ context.Context, dst, x Vector) (float64, error) {
	sum := 0.0
	for _, part := range [][2][]float64{{dst.Re, x.Re}, {dst.Im, x.Im}} {
		y, x := part[0], part[1]
		for i := range y {
			y[i] = 0
			if i > 0 {
				y[i] -= x[i-1]
			}
			if i+1 < len(x) {
				y[i] -= x[i+1]
			}
			sum += y[i] * x[i]
		}
	}
	return sum, nil
}

func TestStepAllocatesNothing(t *testing.T) {
	psi := randomVector(10_000, rand.New(rand.NewPCG(12, 0)))
	p := New(10_000, Options{Dimension: 10, Workers: 1})
	product := Product(hopping)
	n := testing.AllocsPerRun(5, func() {
		if _, err := p.Exp(background, psi, 3, 1e-8, product); err != nil {
			t.Fatal(err)
		}
	})
	if n != 0 {
		t.Errorf("%g allocations in a run, want 0", n)
	}
}

func TestExpRefuses(t *testing.T) {
	d := newDense(t, chain(10))
	random := rand.New(rand.NewPCG(13, 0))
	p := New(10, Options{})
	for _, tc := range []struct{ tau, tolerance float64 }{
		{math.NaN(), 1e-6}, {math.Inf(1), 1e-6}, {1, 0}, {1, -1}, {1, math.NaN()}, {1, math.Inf(1)},
	} {
		if _, err := p.Exp(background, randomVector(10, random), tc.tau, tc.tolerance, d.product); err == nil {
			t.Errorf("tau %g, tolerance %g: no error", tc.tau, tc.tolerance)
		}
	}
	var below *ToleranceError
	if _, err := p.Exp(background, randomVector(10, random), 1e6, 1e-12, d.product); !errors.As(err, &below) || !(below.Rounding > 1e-12) {
		t.Errorf("a tolerance below rounding: %v, want a *ToleranceError with numbers", err)
	}
	broken := randomVector(10, random)
	broken.Im[3] = math.NaN()
	for name, psi := range map[string]Vector{"zero": NewVector(10), "NaN": broken} {
		if _, err := p.Exp(background, psi, 1, 1e-6, d.product); !errors.Is(err, ErrNotFinite) {
			t.Errorf("%s vector: %v, want ErrNotFinite", name, err)
		}
	}
	wild := func(_ context.Context, dst, x Vector) (float64, error) { return math.Inf(1), nil }
	if _, err := p.Exp(background, randomVector(10, random), 1, 1e-6, wild); !errors.Is(err, ErrNotFinite) {
		t.Errorf("an infinite product: %v, want ErrNotFinite", err)
	}
	fault := errors.New("fault")
	failing := func(context.Context, Vector, Vector) (float64, error) { return 0, fault }
	if _, err := p.Exp(background, randomVector(10, random), 1, 1e-6, failing); !errors.Is(err, fault) {
		t.Errorf("a product that fails: %v, want its error", err)
	}
}

func TestPanicsOnMisuse(t *testing.T) {
	p := New(10, Options{})
	for name, misuse := range map[string]func(){
		"no components":   func() { New(0, Options{}) },
		"dimension 1":     func() { New(5, Options{Dimension: 1}) },
		"another length":  func() { _, _, _ = p.Build(background, NewVector(9), 1, 1e-6, hopping) },
		"copy of another": func() { NewVector(3).CopyFrom(NewVector(4)) },
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

// counted stops after a number of looks.
type counted struct {
	context.Context
	left int
}

func (c *counted) Err() error {
	if c.left--; c.left < 0 {
		return context.Canceled
	}
	return nil
}

// A stop is noticed wherever it comes, and the vector stays finite.
func TestStops(t *testing.T) {
	random := rand.New(rand.NewPCG(14, 0))
	p := New(5000, Options{Dimension: 10})
	for looks := 0; ; looks++ {
		psi := randomVector(5000, random)
		_, err := p.Exp(&counted{background, looks}, psi, 1, 1e-8, hopping)
		if err == nil {
			if looks < 10 {
				t.Errorf("only %d looks at the context", looks)
			}
			return
		}
		if !errors.Is(err, context.Canceled) {
			t.Fatalf("stopped at look %d: %v", looks, err)
		}
	}
}

// The product with a chain costs about as much as one pass over a vector.
func BenchmarkExp(b *testing.B) {
	for _, n := range []int{12_000, 1_000_000} {
		b.Run("components="+strconv.Itoa(n), func(b *testing.B) {
			psi := randomVector(n, rand.New(rand.NewPCG(1, 0)))
			p := New(n, Options{Dimension: 16})
			product := Product(hopping)
			b.ReportAllocs()
			for b.Loop() {
				if _, err := p.Exp(background, psi, 2, 1e-6, product); err != nil {
					b.Fatal(err)
				}
			}
			b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(p.Products())/float64(n), "ns/component")
		})
	}
}
