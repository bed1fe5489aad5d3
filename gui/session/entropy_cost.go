package session

import (
	"context"
	"errors"
	"fmt"
	"math"
	"strconv"
	"time"

	"hilltop/bosehubbard"
	"hilltop/bosehubbard/figure"
	"hilltop/bosehubbard/fock"
	"hilltop/bosehubbard/lattice"
	"hilltop/bosehubbard/thermo"
)

// Costs of S(E).
const (
	edgeProducts = 40   // with H, to find both ends of the spectrum
	wholeStates  = 1000 // up to here thermo diagonalises in full
	usualPace    = 2e-9 // s per hop before this machine is timed
	leastHops    = 2e7  // fewer say nothing of the pace
	wholeSeconds = 0.02 // a full diagonalisation
	lanes        = 4    // vectors beside the operator
	certainBytes = 5e8  // such a need is not compared with the memory
)

// sizes lists the sizes of a plan with their costs. The caller holds mu.
func (s *Session) sizes(k *smallPlan) []EntropySize {
	pace := s.small.pace
	if pace == 0 {
		pace = usualPace
	}
	var list []EntropySize
	for _, shape := range k.shapes() {
		z := EntropySize{Sites: product(shape), Shape: shape, Atoms: k.atoms(shape)}
		z.Bytes, z.Fits = room(z.Sites, z.Atoms)
		if d, err := fock.Dimension(z.Sites, z.Atoms); err == nil {
			z.Dimension = d.String()
		}
		z.Seconds = wholeSeconds + pace*z.hops()
		z.Text = z.words()
		list = append(list, z)
	}
	return list
}

// room returns the bytes that a size takes and whether the machine has them.
func room(sites, atoms int) (bytes float64, fits bool) {
	_, err := fock.Fit(sites, atoms, fock.Options{MemoryBytes: 1, Vectors: lanes})
	if large, ok := errors.AsType[*fock.TooLargeError](err); ok {
		bytes = large.BytesWanted
	}
	return bytes, bytes < certainBytes || bytes < float64(fock.AvailableMemory())
}

// states is the dimension as a number.
func (z *EntropySize) states() float64 {
	return math.Round(math.Exp(fock.LogDimension(z.Sites, z.Atoms)))
}

// options are those of thermo for a size: the larger the space, the fewer random
// vectors the same accuracy takes, and the wider a level may be.
func (z *EntropySize) options() thermo.Options {
	switch d := z.states(); {
	case d <= wholeStates:
		return thermo.Options{}
	case d <= 20_000:
		return thermo.Options{Moments: 128, Vectors: 32}
	case d <= 200_000:
		return thermo.Options{Moments: 96, Vectors: 4}
	}
	return thermo.Options{Moments: 96, Vectors: 2}
}

// hops counts the matrix elements that are applied; 0 for a full diagonalisation.
func (z *EntropySize) hops() float64 {
	o := z.options()
	if o.Moments == 0 {
		return 0
	}
	bonds := 0
	for _, n := range z.Shape {
		bonds += z.Sites / n * (n - 1)
	}
	return float64(edgeProducts+o.Moments/2*o.Vectors) * z.states() * float64(bonds)
}

// words are "10: 92,378 states, 7 MB, 0.5 s".
func (z *EntropySize) words() string {
	text := fmt.Sprintf("%s: %s states, %s", shapeText(z.Shape), figure.Number(z.states(), 7), bytesText(z.Bytes))
	if !z.Fits {
		return text + ", too large"
	}
	return text + ", " + secondsText(z.Seconds)
}

func bytesText(b float64) string {
	switch {
	case b < 1e6:
		return "1 MB"
	case b < 1e9:
		return strconv.Itoa(int(math.Ceil(b/1e6))) + " MB"
	}
	return figure.Number(b/1e9, 2) + " GB"
}

func secondsText(t float64) string {
	switch {
	case t < 0.1:
		return "0.1 s"
	case t < 90:
		return figure.Number(t, 1+int(math.Max(0, math.Log10(t)))) + " s"
	}
	return figure.Number(math.Ceil(t/60), 3) + " min"
}

// calibrate times a chain of 8 sites once per run, on a goroutine of its own. The
// caller holds mu.
func (s *Session) calibrate() {
	if s.small.calibrated {
		return
	}
	s.small.calibrated = true
	s.wait.Add(1)
	go func() {
		defer s.wait.Done()
		if pace, err := timePace(s.ctx); err == nil {
			s.learn(pace)
		}
	}()
}

// timePace measures the seconds per hop; some 50 ms.
func timePace(ctx context.Context) (float64, error) {
	l, err := lattice.Box([]int{8}, []bool{false})
	if err != nil {
		return 0, err
	}
	system := thermo.System{Lattice: l, Model: bosehubbard.Model{Axes: []bosehubbard.AxisTerms{{Tunnelling: 1}}, Interaction: -2}, Atoms: 8}
	best := math.Inf(1)
	for range 3 { // the shortest is the least disturbed
		begin := time.Now()
		c, err := thermo.Entropy(ctx, system, thermo.Options{Moments: 64, Vectors: 4})
		if err != nil {
			return 0, err
		}
		best = min(best, time.Since(begin).Seconds()/(float64(edgeProducts+64/2*4)*float64(c.Dimension)*7))
	}
	return best, nil
}

// learn takes a measured pace; 0 says nothing. The next State has it.
func (s *Session) learn(pace float64) {
	s.mu.Lock()
	defer s.mu.Unlock()
	if pace > 0 {
		if s.small.pace > 0 { // one disturbed run does not count for much
			pace = math.Sqrt(pace * s.small.pace)
		}
		s.small.pace = pace
	}
}
