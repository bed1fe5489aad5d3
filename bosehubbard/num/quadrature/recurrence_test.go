package quadrature

import (
	"errors"
	"math"
	"math/rand/v2"
	"slices"
	"testing"

	"gonum.org/v1/gonum/floats"
	"gonum.org/v1/gonum/mat"
)

// dense is the Product of a full matrix.
func dense(a mat.Matrix) Product {
	n, _ := a.Dims()
	return func(s, b, c float64, dst, x [][]float64, xy, _ []float64) error {
		for i := range dst {
			var y mat.VecDense
			y.MulVec(a, mat.NewVecDense(n, x[i]))
			for j := range dst[i] {
				z := s*y.AtVec(j) + b*x[i][j]
				if c != 0 {
					z += c * dst[i][j]
				}
				dst[i][j] = z
			}
			xy[i] = floats.Dot(x[i], dst[i])
		}
		return nil
	}
}

func randomSymmetric(random *rand.Rand, n int) *mat.SymDense {
	a := mat.NewSymDense(n, nil)
	for i := range n {
		for j := range i + 1 {
			a.SetSym(i, j, random.NormFloat64())
		}
	}
	return a
}

// withLevels is a full matrix of size n whose eigenvalues repeat the levels.
func withLevels(random *rand.Rand, n int, levels []float64) *mat.SymDense {
	var qr mat.QR
	qr.Factorize(randomSymmetric(random, n))
	var q, scaled, product mat.Dense
	qr.QTo(&q)
	values := make([]float64, n)
	for i := range values {
		values[i] = levels[i%len(levels)]
	}
	scaled.Mul(&q, mat.NewDiagDense(n, values))
	product.Mul(&scaled, q.T())
	a := mat.NewSymDense(n, nil)
	for i := range n {
		for j := range i + 1 {
			a.SetSym(i, j, (product.At(i, j)+product.At(j, i))/2)
		}
	}
	return a
}

func randomGroup(random *rand.Rand, count, n int) [][]float64 {
	v := make([][]float64, count)
	for i := range v {
		v[i] = make([]float64, n)
		for j := range v[i] {
			v[i][j] = random.NormFloat64()
		}
	}
	return v
}

func clone(v [][]float64) [][]float64 {
	out := make([][]float64, len(v))
	for i := range v {
		out[i] = slices.Clone(v[i])
	}
	return out
}

func empty(count, n int) [][]float64 {
	v := make([][]float64, count)
	for i := range v {
		v[i] = make([]float64, n)
		for j := range v[i] {
			v[i][j] = math.NaN() // a read before a write shows
		}
	}
	return v
}

// matrixFunction computes f(A) v from the dense eigenvectors.
func matrixFunction(t *testing.T, a *mat.SymDense, v []float64, f func(float64) float64) []float64 {
	t.Helper()
	var eig mat.EigenSym
	if !eig.Factorize(a, true) {
		t.Fatal("dense diagonalisation failed")
	}
	var u mat.Dense
	eig.VectorsTo(&u)
	out := make([]float64, len(v))
	for k, e := range eig.Values(nil) {
		column := mat.Col(nil, k, &u)
		floats.AddScaled(out, f(e)*floats.Dot(column, v), column)
	}
	return out
}

// m steps are exact for polynomials up to degree 2m-1, and not for higher degrees.
func TestRuleIsExactForPolynomials(t *testing.T) {
	random := rand.New(rand.NewPCG(1, 0))
	const n, m = 40, 6
	a := randomSymmetric(random, n)
	v := randomGroup(random, 1, n)
	start := slices.Clone(v[0])
	norm := floats.Norm(start, 2)
	rules, norms := make([]Tridiagonal, 1), make([]float64, 1)
	r := Recurrence{Product: dense(a), Steps: m}
	if err := r.Run(rules, norms, v, empty(1, n)); err != nil {
		t.Fatal(err)
	}
	if math.Abs(norms[0]-norm) > 1e-14*norm {
		t.Errorf("norm %.17g, want %.17g", norms[0], norm)
	}
	rule, err := rules[0].Rule(m)
	if err != nil {
		t.Fatal(err)
	}
	scale := math.Max(math.Abs(rule.Node[0]), rule.Node[m-1])
	for degree := range 2*m + 1 {
		f := func(x float64) float64 { return math.Pow(x/scale, float64(degree)) }
		want := floats.Dot(start, matrixFunction(t, a, start, f)) / (norm * norm)
		got := 0.0
		for k, x := range rule.Node {
			got += rule.Weight[k] * f(x)
		}
		if exact := math.Abs(got-want) < 1e-12; exact != (degree < 2*m) {
			t.Errorf("degree %d: %.15g, want %.15g", degree, got, want)
		}
	}
}

// A matrix of few eigenvalues: the run ends by itself, gives them all, and f(A) v.
func TestRunToTheEnd(t *testing.T) {
	random := rand.New(rand.NewPCG(2, 0))
	const n = 12
	levels := []float64{-3, -1, 0.5, 2, 2.5}
	a := withLevels(random, n, levels)
	v := randomGroup(random, 1, n)
	start := slices.Clone(v[0])
	rules, norms := make([]Tridiagonal, 1), make([]float64, 1)
	var krylov [][]float64
	r := Recurrence{Product: dense(a), Steps: 3 * n, Visit: func(_ int, v [][]float64) error {
		krylov = append(krylov, slices.Clone(v[0]))
		return nil
	}}
	if err := r.Run(rules, norms, v, empty(1, n)); err != nil {
		t.Fatal(err)
	}
	rule, err := rules[0].Rule(1000)
	if err != nil {
		t.Fatal(err)
	}
	if len(rule.Node) != len(levels) {
		t.Fatalf("%d nodes, want %d", len(rule.Node), len(levels))
	}
	for k, e := range levels {
		if math.Abs(rule.Node[k]-e) > 1e-13 {
			t.Errorf("node %d: %.15g, want %.15g", k, rule.Node[k], e)
		}
	}
	want := matrixFunction(t, a, start, math.Exp)
	got := make([]float64, n)
	coefficients, f := make([]float64, len(levels)), make([]float64, len(levels))
	for k, x := range rule.Node {
		f[k] = math.Exp(x)
	}
	rule.CoefficientsTo(coefficients, f)
	for j, c := range coefficients {
		floats.AddScaled(got, c*norms[0], krylov[j])
	}
	if distance := floats.Distance(got, want, 2) / floats.Norm(want, 2); distance > 1e-11 {
		t.Errorf("exp(A) v is off by %.2g of itself", distance)
	}
	for _, later := range krylov[len(levels):] {
		if floats.Norm(later, 1) != 0 {
			t.Error("a run that has ended still has a vector")
		}
	}
}

// The part of the start on an end node is the eigenvector once Next times its last
// component is small, and that product is the residual before.
func TestPartAndResidual(t *testing.T) {
	random := rand.New(rand.NewPCG(8, 0))
	const n = 60
	values := make([]float64, n)
	for i := range values {
		values[i] = float64(i * i)
	}
	for _, m := range []int{10, 25, 45} {
		var krylov [][]float64
		run, norms := make([]Tridiagonal, 1), make([]float64, 1)
		r := Recurrence{Product: dense(mat.NewDiagDense(n, values)), Steps: m, Visit: func(_ int, v [][]float64) error {
			krylov = append(krylov, slices.Clone(v[0]))
			return nil
		}}
		if err := r.Run(run, norms, randomGroup(random, 1, n), empty(1, n)); err != nil {
			t.Fatal(err)
		}
		rule, err := run[0].Rule(m)
		if err != nil {
			t.Fatal(err)
		}
		// late in the run rounding makes copies of the top
		top := rule.Node[m-1]
		from := m - 1
		for from > 0 && top-rule.Node[from-1] < 1e-6*top {
			from--
		}
		parts, x, residual := make([]float64, m), make([]float64, n), 0.0
		rule.PartTo(parts, from, m)
		for j, c := range parts {
			floats.AddScaled(x, c, krylov[j])
		}
		for i := range x {
			residual = math.Hypot(residual, (values[i]-top)*x[i])
		}
		if norm := floats.Norm(x, 2); math.Abs(norm-1) > 1e-6 {
			t.Errorf("%d steps: the part has length %g, want 1", m, norm)
		}
		if want := run[0].Next(m) * math.Abs(parts[m-1]); math.Abs(residual-want) > 1e-3*want+1e-9*top {
			t.Errorf("%d steps: residual %.4g, want %.4g", m, residual, want)
		}
	}
}

// Neither the group nor the workers change a bit.
func TestRunIsTheSameForAnyWorkers(t *testing.T) {
	random := rand.New(rand.NewPCG(3, 0))
	const n, count, steps = 30, 5, 10
	a := randomSymmetric(random, n)
	v := randomGroup(random, count, n)
	want, norms := make([]Tridiagonal, count), make([]float64, count)
	for i := range v {
		r := Recurrence{Product: dense(a), Steps: steps}
		if err := r.Run(want[i:i+1], norms[i:i+1], clone(v[i:i+1]), empty(1, n)); err != nil {
			t.Fatal(err)
		}
	}
	for _, workers := range []int{1, 2, 3, 8} {
		got, norms := make([]Tridiagonal, count), make([]float64, count)
		r := Recurrence{Product: dense(a), Steps: steps, Workers: workers}
		if err := r.Run(got, norms, clone(v), empty(count, n)); err != nil {
			t.Fatal(err)
		}
		for i := range got {
			if !slices.Equal(got[i].Diagonal, want[i].Diagonal) || !slices.Equal(got[i].Coupling, want[i].Coupling) {
				t.Errorf("%d workers, vector %d: other numbers", workers, i)
			}
		}
	}
}

// Project keeps a run out of an eigenvector that it would find first.
func TestProject(t *testing.T) {
	random := rand.New(rand.NewPCG(4, 0))
	const n = 50
	values := make([]float64, n)
	for i := range values {
		values[i] = float64(i)
	}
	values[n-1] = 1000
	a := mat.NewDiagDense(n, values)
	r := Recurrence{Product: dense(a), Steps: 45, Project: func(w []float64) { w[n-1] = 0 }}
	rules, norms := make([]Tridiagonal, 1), make([]float64, 1)
	if err := r.Run(rules, norms, randomGroup(random, 1, n), empty(1, n)); err != nil {
		t.Fatal(err)
	}
	rule, err := rules[0].Rule(45)
	if err != nil {
		t.Fatal(err)
	}
	if top := rule.Node[len(rule.Node)-1]; !(top <= n-2+1e-9) {
		t.Errorf("highest node %g, want at most %d", top, n-2)
	}
}

func TestRunErrors(t *testing.T) {
	random := rand.New(rand.NewPCG(5, 0))
	broken := errors.New("broken")
	rules, norms := make([]Tridiagonal, 1), make([]float64, 1)
	r := Recurrence{Steps: 3, Product: func(_, _, _ float64, _, _ [][]float64, _, _ []float64) error { return broken }}
	if err := r.Run(rules, norms, randomGroup(random, 1, 4), empty(1, 4)); !errors.Is(err, broken) {
		t.Errorf("got %v, want the error of the product", err)
	}
	r.Visit = func(int, [][]float64) error { return errors.New("visit") }
	if err := r.Run(rules, norms, randomGroup(random, 1, 4), empty(1, 4)); err == nil || errors.Is(err, broken) {
		t.Errorf("got %v, want the error of the visit", err)
	}
	bad := Tridiagonal{Diagonal: []float64{1, math.NaN(), 2}, Coupling: []float64{1, 1}}
	if _, err := bad.Rule(3); !errors.Is(err, ErrNotConverged) {
		t.Errorf("a matrix with NaN: %v, want ErrNotConverged", err)
	}
	rule := Rule{Node: []float64{1}}
	for name, misuse := range map[string]func(){
		"no steps":   func() { _ = (&Recurrence{}).Run(rules, norms, empty(1, 4), empty(1, 4)) },
		"no vectors": func() { _ = r.Run(nil, nil, nil, nil) },
		"no matrix":  func() { _, _ = (&Tridiagonal{}).Rule(3) },
		"lengths":    func() { rule.CoefficientsTo(make([]float64, 2), make([]float64, 1)) },
		"no node":    func() { rule.PartTo(make([]float64, 1), 1, 1) },
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

func TestStepAllocatesNothing(t *testing.T) {
	v, w := []float64{0.6, 0.8, 0}, []float64{1, 2, 3}
	r := Recurrence{}
	var tri Tridiagonal
	n := testing.AllocsPerRun(20, func() {
		tri.reset(4)
		v[0], v[1], v[2], w[0], w[1], w[2] = 0.6, 0.8, 0, 1, 2, 3
		r.advance(&tri, 0.5, v, w)
	})
	if n != 0 {
		t.Errorf("a step allocates %g times, want 0", n)
	}
}
