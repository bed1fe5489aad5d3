package fock

// start is what a row begins with: its own energy and what the right part brings.
type start struct {
	x, z, energy []float64
	stride       int // of z
	own, a, c    float64
}

// join computes y = c y + a z + (own + a energy) x.
func (s *start) join(y []float64) {
	x, energy := s.x[:len(y)], s.energy[:len(y)]
	at := 0
	for i := range y {
		y[i] = s.c*y[i] + s.a*s.z[at] + (s.own+s.a*energy[i])*x[i]
		at += s.stride
	}
}

// joinFour is join with the first four hops of the left part, which saves reading
// and writing the row once more.
func (s *start) joinFour(y []float64, f *fourRows) {
	n := len(y)
	x, energy, x0, x1, x2, x3 := s.x[:n], s.energy[:n], f.x0[:n], f.x1[:n], f.x2[:n], f.x3[:n]
	a0, a1, a2, a3, own, c, a := f.a0, f.a1, f.a2, f.a3, s.own, s.c, s.a
	z, at, stride := s.z, 0, s.stride
	for i := range y {
		y[i] = c*y[i] + a*z[at] + (own+a*energy[i])*x[i] + a0*x0[i] + a1*x1[i] + a2*x2[i] + a3*x3[i]
		at += stride
	}
}

// scale computes y = c y + own x.
func (s *start) scale(y []float64) {
	x, own, c := s.x[:len(y)], s.own, s.c
	for i := range y {
		y[i] = c*y[i] + own*x[i]
	}
}

// scaleFour is scale with the first four hops of the left part.
func (s *start) scaleFour(y []float64, f *fourRows) {
	n := len(y)
	x, x0, x1, x2, x3 := s.x[:n], f.x0[:n], f.x1[:n], f.x2[:n], f.x3[:n]
	a0, a1, a2, a3, own, c := f.a0, f.a1, f.a2, f.a3, s.own, s.c
	for i := range y {
		y[i] = c*y[i] + own*x[i] + a0*x0[i] + a1*x1[i] + a2*x2[i] + a3*x3[i]
	}
}

// fourRows are four rows with their factors.
type fourRows struct {
	x0, x1, x2, x3 []float64
	a0, a1, a2, a3 float64
}

// add computes y += a0 x0 + a1 x1 + a2 x2 + a3 x3.
func (f *fourRows) add(y []float64) {
	x0, x1, x2, x3 := f.x0[:len(y)], f.x1[:len(y)], f.x2[:len(y)], f.x3[:len(y)]
	a0, a1, a2, a3 := f.a0, f.a1, f.a2, f.a3
	for i := range y {
		y[i] += a0*x0[i] + a1*x1[i] + a2*x2[i] + a3*x3[i]
	}
}

// addTwo computes y += a0 x0 + a1 x1.
func addTwo(y, x0, x1 []float64, a0, a1 float64) {
	x0, x1 = x0[:len(y)], x1[:len(y)]
	for i := range y {
		y[i] += a0*x0[i] + a1*x1[i]
	}
}

// addOne computes y += a x.
func addOne(y, x []float64, a float64) {
	x = x[:len(y)]
	for i := range y {
		y[i] += a * x[i]
	}
}

// strand is what one hop across the cut brings to a stretch of a row: a times
// weight[i] x[i].
type strand struct {
	x, weight []float64
	a         float64
}

// add computes y[i] += a weight[i] x[i]; y has the length of x.
func (s *strand) add(y []float64) {
	x, weight, a := s.x[:len(y)], s.weight[:len(y)], s.a
	for i := range y {
		y[i] += a * weight[i] * x[i]
	}
}

// addTwoStrands adds both to the first elements of y, as many as each has.
func addTwoStrands(y []float64, s, t strand) {
	if len(s.x) < len(t.x) {
		s, t = t, s
	}
	n := len(t.x)
	x0, weight0, x1, weight1, a0, a1 := s.x[:n], s.weight[:n], t.x, t.weight[:n], s.a, t.a
	for i := range y[:n] {
		y[i] += a0*weight0[i]*x0[i] + a1*weight1[i]*x1[i]
	}
	rest := strand{s.x[n:], s.weight[n:], s.a}
	rest.add(y[n:len(s.x)])
}
