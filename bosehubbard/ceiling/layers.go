package ceiling

import (
	"math"
)

// Leak is the slow way down (T > 0) or up (T < 0) a stack of layers: a collision
// in the plane lets an atom hop by one layer, worth the tilt F.
type Leak struct {
	Slow, Fast float64 // hops per second; the prefactor is uncertain tenfold
	Drift      float64 // net energy per atom within the hold at the slow end, Hz
}

// LeakOf estimates the leak along a layered axis,
//
//	rate = (2J/F)^2 J_plane/hbar, net drift = rate F tanh(F / 2 k|T|),
//
// with J_plane the largest tunnelling of the moving axes, Hz, and k|T| in Hz.
// The middle of the range is that rate; its ends are sqrt(10) away.
//
// Source: derived; the prefactor is uncertain tenfold.
func LeakOf(a Axis, planeTunnelling, temperature, hold float64) Leak {
	f := math.Abs(a.Tilt)
	rate := math.Pow(2*a.Tunnelling/f, 2) * 2 * math.Pi * planeTunnelling
	slow := rate / math.Sqrt(10)
	return Leak{
		Slow: slow, Fast: rate * math.Sqrt(10),
		Drift: slow * hold * f * math.Tanh(f/(2*temperature)),
	}
}

// layers: layers stay apart where no multiple of the tilt is resonant with U,
//
//	||U| - kF| > 4J (2J/F)^(k-1),  k = 1, 2, 3,
//
// and where even the slow end of the leak does not drain the state in the hold.
// The energy to drain is (1 - 1/e) zJ, the height of the band over its centre,
// and k|T| is taken as zJ, until a cloud is known.
func (s *System) layers(motions []Motion) (Criterion, bool) {
	plane, zj := s.plane(motions)
	c, any := Criterion{}, false
	keep := func(next Criterion) {
		if !any || c.Passed && (!next.Passed || next.Margin < c.Margin) {
			c = next
		}
		any = true
	}
	for i, a := range s.Axes {
		if motions[i] != Layered {
			continue
		}
		room, k := resonance(a, s.Interaction)
		keep(criterion("layers", room, "Hz", Leaky, say(
			"|U| = %v Hz stands %v Hz clear of %v x %v Hz, the tilt along %v", math.Abs(s.Interaction), room, k, math.Abs(a.Tilt), a.Name)))
		if zj == 0 {
			continue
		}
		leak := LeakOf(a, plane, zj, s.Hold)
		keep(criterion("layers", (1-1/math.E)*zj-leak.Drift, "Hz", Leaky, say(
			"hops along %v at %v to %v per s drift by %v Hz in the hold, room is %v Hz", a.Name, leak.Slow, leak.Fast, leak.Drift, (1-1/math.E)*zj)))
	}
	return c, any
}

// plane returns the largest tunnelling of the moving axes and zJ, their sum of 2J.
func (s *System) plane(motions []Motion) (largest, zj float64) {
	for i, a := range s.Axes {
		if motions[i] == Moving {
			j := math.Abs(a.Tunnelling)
			largest, zj = math.Max(largest, j), zj+2*j
		}
	}
	return largest, zj
}

// resonance returns how far |U| stays from the nearest resonance with k layers,
// less that resonance's half-width.
func resonance(a Axis, interaction float64) (room float64, k int) {
	f, j := math.Abs(a.Tilt), math.Abs(a.Tunnelling)
	room = math.Inf(1)
	width := 4 * j
	for n := 1; n <= 3; n++ {
		if r := math.Abs(math.Abs(interaction)-float64(n)*f) - width; r < room {
			room, k = r, n
		}
		width *= 2 * j / f
	}
	return room, k
}
