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
			if s.wanted(i) && s.ends[i].stream == stream {
				s.ends[i].vector = make([]float64, len(s.u))
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
		if s.wanted(i) {
			if err := s.measure(&s.ends[i]); err != nil {
				return err
			}
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
			if e.vector == nil || e.stream != stream || j >= len(e.weights) {
				continue
			}
			_, err := s.sum(func(lo, hi int) float64 {
				floats.AddScaled(e.vector[lo:hi], e.weights[j]/s.norm, s.u[lo:hi])
				return 0
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
	square, err := s.sum(func(lo, hi int) float64 { return floats.Dot(e.vector[lo:hi], e.vector[lo:hi]) })
	if err != nil {
		return err
	}
	norm := math.Sqrt(square)
	if _, err := s.sum(func(lo, hi int) float64 { floats.Scale(1/norm, e.vector[lo:hi]); return 0 }); err != nil {
		return err
	}
	if _, err := s.matrix.Combine(s.ctx, s.u, e.vector, s.scale, 0); err != nil {
		return err
	}
	square, err = s.sum(func(lo, hi int) float64 {
		floats.AddScaled(s.u[lo:hi], -e.value*s.scale, e.vector[lo:hi])
		return floats.Dot(s.u[lo:hi], s.u[lo:hi])
	})
	e.residual = math.Sqrt(square) / s.scale
	return err
}
