package apparatus

import (
	"math"

	"hilltop/bosehubbard/band"
	"hilltop/bosehubbard/si"
)

// Potential returns the energy of an atom at position r (m, from the common
// beam centre) in the lowest band, E/h in Hz: dipole beams, the mean band energy
// under each lattice beam, and the curvature of the field; gravity is apart
// (see Gravity). mean(s) is the mean energy of the lowest band at depth s, Er.
func (a *Apparatus) Potential(p *Point, r [3]float64, mean func(float64) float64) float64 {
	sum := 0.0
	for i := range a.Beams {
		sum += a.Beams[i].Potential(p.Power[i], r)
	}
	for i := range a.Lattice {
		sum += a.Lattice[i].Potential(p.Depth[i], r, mean)
	}
	if a.Field.CurvaturePerField != 0 {
		sum += a.Field.Potential(p.Moment, p.Field, r)
	}
	return si.HzFromJoule(sum)
}

// GravityPotential returns m g z - mu B' z at height z along the gravity axis,
// E/h in Hz; zero where gravity is off.
func (a *Apparatus) GravityPotential(p *Point, r [3]float64) float64 {
	if !a.GravityOn {
		return 0
	}
	axis := int(a.Gravity)
	return a.tilt(axis, a.Lattice[axis].Spacing, p.Moment) * r[axis] / a.Lattice[axis].Spacing
}

// meanCurve returns the fast mean band energy, grown to the deepest lattice met.
func (w *Workspace) meanCurve(depth float64) (*band.MeanCurve, error) {
	const smallest = 40 // Er; deeper lattices are rare, so the curve is made once
	if w.mean == nil || depth > w.meanTo {
		to := math.Max(smallest, 1.5*depth)
		to = math.Min(to, band.MaxDepth)
		curve, err := band.NewMeanCurve(math.Max(to, depth))
		if err != nil {
			return nil, err
		}
		w.mean, w.meanTo = curve, math.Max(to, depth)
	}
	return w.mean, nil
}

// reach is the distance, m, at which every beam has faded.
func (a *Apparatus) reach() float64 {
	widest := 0.0
	for _, beam := range a.Lattice {
		widest = math.Max(widest, math.Max(beam.Waists[0], beam.Waists[1]))
	}
	for _, beam := range a.Beams {
		widest = math.Max(widest, math.Max(beam.Waists[0], beam.Waists[1]))
	}
	return 2 * widest
}

// Edge is the weakest way out of the trap or anti-trap.
type Edge struct {
	Drop      float64    // how far the potential falls (T < 0) or rises (T > 0) on the way, Hz
	Distance  float64    // where it stops doing so, m
	Direction [3]float64 // unit vector
}

// EdgeOf scans straight ways out of the centre along the moving axes and returns
// the one on which the potential stops falling (sign -1) or rising (sign +1)
// soonest in energy. Gravity counts where its axis moves. The way is followed to
// twice the widest waist; a potential still falling there ends there.
//
// Accuracy: 64 steps a way, so the drop is good to about 0.2 %. No allocation.
func (a *Apparatus) EdgeOf(w *Workspace, p *Point, moving [3]bool, sign int) (Edge, error) {
	deepest := math.Max(p.Depth[0], math.Max(p.Depth[1], p.Depth[2]))
	curve, err := w.meanCurve(deepest)
	if err != nil {
		return Edge{}, err
	}
	tilted := a.GravityOn && moving[a.Gravity] && a.tilt(int(a.Gravity), p.Spacing[a.Gravity], p.Moment) != 0
	weakest := Edge{Drop: math.Inf(1)}
	for _, direction := range ways[wayKey{moving, tilted}] {
		drop, distance := a.walkOut(p, curve, direction, tilted, sign)
		if drop < weakest.Drop {
			weakest = Edge{Drop: drop, Distance: distance, Direction: direction}
		}
	}
	return weakest, nil
}

// walkOut starts at the summit on this line, which a tilt may have moved.
func (a *Apparatus) walkOut(p *Point, curve *band.MeanCurve, direction [3]float64, tilted bool, sign int) (drop, distance float64) {
	const steps = 64
	reach := a.reach()
	best, height := math.Inf(-1), 0.0
	for i := range steps + 1 {
		r := reach * float64(i) / steps
		at := [3]float64{direction[0] * r, direction[1] * r, direction[2] * r}
		v := a.Potential(p, at, curve.At)
		if tilted {
			v += a.GravityPotential(p, at)
		}
		v *= -float64(sign) // look at a hill for either sign
		if i == 0 || v > best {
			best, height, distance = v, v, r
			continue
		}
		if v > height {
			return best - height, distance
		}
		height, distance = v, r
	}
	return best - height, distance
}

// wayKey says which axes move and whether a tilt acts on one of them.
type wayKey struct {
	moving [3]bool
	tilted bool
}

// ways lists the unit vectors to look along: one axis, a plane in steps of 22.5
// degrees, or the corners, edges and faces of a cube. All beams share a centre,
// so without a tilt the ways with no negative component stand for all.
var ways = allWays()

func allWays() map[wayKey][][3]float64 {
	table := map[wayKey][][3]float64{}
	for bits := 1; bits < 8; bits++ {
		moving := [3]bool{bits&1 != 0, bits&2 != 0, bits&4 != 0}
		for _, d := range spread(moving) {
			table[wayKey{moving, true}] = append(table[wayKey{moving, true}], d)
			if math.Min(d[0], math.Min(d[1], d[2])) > -1e-9 {
				table[wayKey{moving, false}] = append(table[wayKey{moving, false}], d)
			}
		}
	}
	return table
}

// spread returns unit vectors over the moving axes.
func spread(moving [3]bool) [][3]float64 {
	var axes []int
	for i, m := range moving {
		if m {
			axes = append(axes, i)
		}
	}
	var list [][3]float64
	if len(axes) == 2 {
		for k := range 16 {
			var d [3]float64
			d[axes[0]], d[axes[1]] = math.Cos(math.Pi*float64(k)/8), math.Sin(math.Pi*float64(k)/8)
			list = append(list, d)
		}
		return list
	}
	for k := range 27 {
		d := [3]float64{float64(k%3) - 1, float64(k/3%3) - 1, float64(k/9) - 1}
		still := false
		for i, x := range d {
			still = still || x != 0 && !moving[i]
		}
		if norm := math.Sqrt(d[0]*d[0] + d[1]*d[1] + d[2]*d[2]); norm > 0 && !still {
			list = append(list, [3]float64{d[0] / norm, d[1] / norm, d[2] / norm})
		}
	}
	return list
}

// Sag returns how far below the beam centre the potential along the gravity axis
// has its minimum, m, and whether it has one at all within the beams.
func (a *Apparatus) Sag(w *Workspace, p *Point) (sag float64, held bool, err error) {
	if !a.GravityOn {
		return 0, true, nil
	}
	deepest := math.Max(p.Depth[0], math.Max(p.Depth[1], p.Depth[2]))
	curve, err := w.meanCurve(deepest)
	if err != nil {
		return 0, false, err
	}
	const steps = 400
	reach := a.reach()
	var at [3]float64
	energy := func(z float64) float64 {
		at[a.Gravity] = z
		return a.Potential(p, at, curve.At) + a.GravityPotential(p, at)
	}
	before, here := energy(reach/steps), energy(0)
	for i := 1; i <= steps; i++ {
		next := energy(-reach * float64(i) / steps)
		if here <= before && here < next {
			return reach * float64(i-1) / steps, true, nil
		}
		before, here = here, next
	}
	return 0, false, nil
}
