package lanczos

import "math"

// closed is the size of beta, relative to T, at which the Krylov space counts as
// closed: rounding leaves about 1e-16, and no tolerance asks for less.
const closed = 1e-13

// end is one end of the spectrum as found so far.
type end struct {
	sign            float64 // +1 the lowest, -1 the highest
	value, residual float64
	converged       bool
	stream          uint64    // of the random start vector
	weights         []float64 // its vector in terms of the Lanczos vectors
	vector          []float64 // its vector, once rebuilt
}

// search runs the recurrence until both ends have converged.
type search struct {
	*recurrence
	opt        Options
	begin      func(seed, stream uint64) error // sets the start vector
	ends       [2]end
	iterations int
	size       float64 // largest |alpha| + beta, an estimate of |A|
	first      float64 // first residual, for the progress
	done       int
	a, b, d, p []float64 // scratch of check
}

func newSearch(r *recurrence, opt Options) *search {
	return &search{recurrence: r, opt: opt, begin: r.random}
}

// run searches from a random vector, which has a part in every eigenspace. Should
// the Krylov space close all the same, a second one makes sure that the first was
// not by chance short of an end.
func (s *search) run() error {
	for stream := range uint64(2) {
		if err := s.begin(s.opt.Seed, stream); err != nil {
			return err
		}
		found, isClosed, err := s.once(stream)
		if err != nil {
			return err
		}
		if stream == 0 {
			s.ends = found
		} else {
			s.ends[0].merge(found[0], s.opt.Tolerance*s.size)
			s.ends[1].merge(found[1], s.opt.Tolerance*s.size)
		}
		if !isClosed || len(s.u) == 1 {
			break
		}
	}
	return nil
}

// once runs the recurrence from its start vector until both ends have converged,
// the space is closed, or the iterations are used up.
func (s *search) once(stream uint64) (ends [2]end, isClosed bool, err error) {
	ends[0] = end{sign: 1, stream: stream}
	ends[1] = end{sign: -1, stream: stream}
	for {
		if err := s.step(); err != nil {
			return ends, false, err
		}
		s.iterations++
		m := len(s.alpha)
		s.size = max(s.size, math.Abs(s.alpha[m-1])+s.beta[m-1])
		isClosed = s.beta[m-1] <= closed*s.size
		isLast := isClosed || s.iterations >= s.opt.MaxIterations
		if m < 16 || m%4 == 0 || isLast {
			s.check(&ends)
		}
		if isLast || (ends[0].converged || !s.wanted(0)) && (ends[1].converged || !s.wanted(1)) {
			return ends, isClosed, nil
		}
	}
}

// wanted says whether end i, 0 the lowest and 1 the highest, is looked for.
func (s *search) wanted(i int) bool {
	return s.opt.Ends == Both || s.opt.Ends == [2]Ends{OnlyLowest, OnlyHighest}[i]
}

// check finds the ends of T and their residuals, beta |last component|.
func (s *search) check(ends *[2]end) {
	m := len(s.alpha)
	s.grow(m)
	scale := s.size
	if scale == 0 {
		scale = 1
	}
	for j := range m {
		s.b[j] = s.beta[j] / scale
	}
	for i := range ends {
		for j := range m {
			s.a[j] = ends[i].sign * s.alpha[j] / scale
		}
		value := ends[i].sign * scale * lowestPair(s.p[:m], s.d[:m], s.a[:m], s.b[:m])
		tolerance := max(s.opt.Tolerance*max(math.Abs(value), math.Abs(ends[1-i].value)), closed*s.size)
		ends[i].update(value, s.beta[m-1]*s.p[m-1], tolerance, s.p[:m])
	}
	s.report(ends)
}

// grow gives the scratch of check room for m steps.
func (s *search) grow(m int) {
	if len(s.a) < m {
		s.a, s.b, s.d, s.p = make([]float64, 2*m), make([]float64, 2*m), make([]float64, 2*m), make([]float64, 2*m)
	}
}

// update takes a new value of an end. One that has converged stays as it is,
// since later residuals are those of ghosts, unless a better value turns up.
func (e *end) update(value, residual, tolerance float64, p []float64) {
	if e.converged && e.sign*(e.value-value) <= tolerance {
		return
	}
	e.value, e.residual, e.converged = value, residual, residual <= tolerance
	e.weights = append(e.weights[:0], p...)
	if e.sign > 0 { // p belongs to off-diagonals -beta, T has +beta
		for j := 1; j < len(p); j += 2 {
			e.weights[j] = -e.weights[j]
		}
	}
}

// merge takes what another run found if it is better by more than slack.
func (e *end) merge(other end, slack float64) {
	residual, converged := max(e.residual, other.residual), other.converged
	if e.sign*(e.value-other.value) > slack {
		*e = other
	}
	if !converged {
		e.residual, e.converged = residual, false
	}
}

// report tells how much of the way from the first residual to the tolerance the
// worse end has come, in percent, by digits.
func (s *search) report(ends *[2]end) {
	residual := 0.0
	for i := range ends {
		if s.wanted(i) && !ends[i].converged {
			residual = max(residual, ends[i].residual)
		}
	}
	goal := s.opt.Tolerance * max(math.Abs(ends[0].value), math.Abs(ends[1].value))
	if s.first == 0 {
		s.first = residual
	}
	share := 1.0
	if residual > goal && s.first > goal {
		share = math.Log(s.first/residual) / math.Log(s.first/goal)
	}
	s.progress(int(100 * min(max(share, 0), 1)))
}

// progress passes on a share that has grown.
func (s *search) progress(done int) {
	total := 100
	if s.opt.Vectors {
		total = 200
	}
	s.done = max(s.done, done)
	if s.opt.Progress != nil {
		s.opt.Progress(s.done, total)
	}
}
