package lanczos

import (
	"math"

	"gonum.org/v1/gonum/floats"
)

// rebuild repeats the runs that found the ends, adds up their vectors, and
// measures the residuals.
func (s *search) rebuild() error {
	for stream := range uint64(2) {
		steps := 0
		for i := range s.ends {
			if s.ends[i].stream == stream {
				s.ends[i].vector = make([]float64, len(s.v))
				steps = max(steps, len(s.ends[i].weights))
			}
		}
		if steps == 0 {
			continue
		}
		if err := s.repeat(stream, steps); err != nil {
			return err
		}
	}
	for i := range s.ends {
		if err := s.measure(&s.ends[i]); err != nil {
			return err
		}
	}
	s.progress(200)
	return nil
}

// repeat goes through the Lanczos vectors of one run once more.
func (s *search) repeat(stream uint64, steps int) error {
	if err := s.begin(s.opt.Seed, stream); err != nil {
		return err
	}
	for j := range steps {
		if j > 0 {
			if err := s.step(); err != nil {
				return err
			}
		}
		for i := range s.ends {
			e := &s.ends[i]
			if e.stream != stream || j >= len(e.weights) {
				continue
			}
			err := s.blocks(func(lo, hi int) {
				floats.AddScaled(e.vector[lo:hi], e.weights[j], s.v[lo:hi])
			})
			if err != nil {
				return err
			}
		}
		s.progress(100 + 100*j/steps)
	}
	return nil
}

// measure normalises the vector x of an end and sets its residual |A x - value x|.
func (s *search) measure(e *end) error {
	norm := 0.0
	err := s.blocks(func(lo, hi int) { norm = math.Hypot(norm, floats.Norm(e.vector[lo:hi], 2)) })
	if err != nil {
		return err
	}
	if err := s.blocks(func(lo, hi int) { divide(e.vector[lo:hi], norm) }); err != nil {
		return err
	}
	if err := s.product(s.w, e.vector); err != nil {
		return err
	}
	e.residual = 0
	return s.blocks(func(lo, hi int) {
		floats.AddScaled(s.w[lo:hi], -e.value, e.vector[lo:hi])
		e.residual = math.Hypot(e.residual, floats.Norm(s.w[lo:hi], 2))
	})
}
