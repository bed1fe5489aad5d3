package exact

import (
	"context"
	"fmt"
	"math"
	"math/rand/v2"
	"slices"
	"strings"
	"testing"

	"hilltop/bosehubbard"
	"hilltop/bosehubbard/lattice"
	"hilltop/testdata"
)

// hbarOverJ is the time hbar/J in seconds for J/h = 1 Hz.
const hbarOverJ = 1 / (2 * math.Pi)

func box(t testing.TB, sites []int, periodic ...bool) *lattice.Lattice {
	t.Helper()
	flags := make([]bool, len(sites))
	copy(flags, periodic)
	l, err := lattice.Box(sites, flags)
	if err != nil {
		t.Fatal(err)
	}
	return l
}

// uniform is a model with the same J and V along every axis.
func uniform(axes int, j, u, v float64) bosehubbard.Model {
	m := bosehubbard.Model{Interaction: u}
	for range axes {
		m.Axes = append(m.Axes, bosehubbard.AxisTerms{Tunnelling: j, Curvature: v})
	}
	return m
}

func evolution(t testing.TB, l *lattice.Lattice, m bosehubbard.Model, state []int, opt EvolutionOptions) *Evolution {
	t.Helper()
	e, err := NewEvolution(context.Background(), l, m, state, opt)
	if err != nil {
		t.Fatal(err)
	}
	return e
}

func (e *Evolution) must(t testing.TB, s Segment) []Sample {
	t.Helper()
	samples, err := e.Run(context.Background(), s)
	if err != nil {
		t.Fatal(err)
	}
	return samples
}

// path goes from one model to another along f(t/duration), f from 0 to 1.
func path(from, to bosehubbard.Model, duration float64, f func(u float64) float64) func(*bosehubbard.Model, float64) {
	return func(m *bosehubbard.Model, t float64) {
		w := f(t / duration)
		m.Interaction = from.Interaction + (to.Interaction-from.Interaction)*w
		for a := range m.Axes {
			x, y := from.Axes[a], to.Axes[a]
			m.Axes[a] = bosehubbard.AxisTerms{
				Tunnelling: x.Tunnelling + (y.Tunnelling-x.Tunnelling)*w,
				Curvature:  x.Curvature + (y.Curvature-x.Curvature)*w,
				Tilt:       x.Tilt + (y.Tilt-x.Tilt)*w,
			}
		}
	}
}

func linear(u float64) float64      { return u }
func smooth(u float64) float64      { return u * u * u * (10 - 15*u + 6*u*u) }
func exponential(u float64) float64 { return math.Expm1(4*u) / math.Expm1(4) }

// gap returns |psi - phi| of two evolutions.
func (e *Evolution) gap(other *Evolution) float64 {
	d := vector{Re: slices.Clone(e.psi.Re), Im: slices.Clone(e.psi.Im)}
	addMultiple(d, other.psi, -1)
	return norm(d)
}

// Two atoms on two sites, from one on each,
//
//	P11(t) = 1 - 16 J^2/(U^2 + 16 J^2) sin^2(sqrt(U^2 + 16 J^2) t/2 hbar).
//
// Source: derived, the two-level problem of |11> and (|20> + |02>)/sqrt 2; its
// values at the given times.
func TestTwoAtomsOnTwoSites(t *testing.T) {
	l := box(t, []int{2})
	for _, tc := range []struct{ u, time, want float64 }{
		{0, 0.3, 0.6811788772}, {4, 0.3, 0.7185188121}, {4, 1, 0.9525459008},
	} {
		for _, whole := range []bool{false, true} {
			e := evolution(t, l, uniform(1, 1, tc.u, 0), []int{1, 1}, EvolutionOptions{Whole: whole})
			e.must(t, Segment{Duration: tc.time * hbarOverJ, Tolerance: 1e-11})
			s, err := e.Observe(context.Background())
			if err != nil {
				t.Fatal(err)
			}
			if got := 2 - s.SquaredOccupation[0]; math.Abs(got-tc.want) > 1e-10 { // <n^2> = P11 + 2 (1 - P11)
				t.Errorf("U/J %g, t %g hbar/J, whole %v: P11 %.11g, want %.10g", tc.u, tc.time, whole, got, tc.want)
			}
		}
	}
}

// A ring of six atoms on six sites, from one on each.
//
// Source: exact diagonalisation of the 462 states, 8 decimals; <n^2> does not
// depend on the sign of U, the kinetic energy changes sign with it.
func TestQuenchOfSixAtoms(t *testing.T) {
	l := box(t, []int{6}, true)
	type value struct{ time, square, kinetic float64 }
	for _, tc := range []struct {
		u    float64
		list []value
	}{
		{4, []value{
			{0.25, 1.38704875, -4.64458503}, {0.5, 1.61669687, -7.40036238}, {1, 1.59135423, -7.09625072},
			{2, 1.45060551, -5.40726615}, {5, 1.33608708, -4.03304490},
		}},
		{10, []value{{1, 1.04404534, -1.32136026}}},
	} {
		for _, sign := range []float64{1, -1} {
			e := evolution(t, l, uniform(1, 1, sign*tc.u, 0), []int{1, 1, 1, 1, 1, 1}, EvolutionOptions{})
			var times []float64
			for _, v := range tc.list {
				times = append(times, v.time*hbarOverJ)
			}
			samples := e.must(t, Segment{Duration: times[len(times)-1], Times: times, Tolerance: 1e-9})
			for i, v := range tc.list {
				s := samples[i]
				if math.Abs(s.SquaredOccupation[3]-v.square) > 6e-9 || math.Abs(s.Kinetic-sign*v.kinetic) > 6e-9 {
					t.Errorf("U/J %g, t %g: <n^2> %.9f, kinetic %.9f, want %.8f, %.8f",
						sign*tc.u, v.time, s.SquaredOccupation[3], s.Kinetic, v.square, sign*v.kinetic)
				}
				if balance := 3*sign*tc.u*(s.SquaredOccupation[0]-1) + s.Kinetic; math.Abs(balance) > 1e-8 {
					t.Errorf("U/J %g, t %g: 3 U (<n^2> - 1) + kinetic = %.3g, want 0", sign*tc.u, v.time, balance)
				}
			}
		}
	}
}

// U, V -> -U, -V leaves the densities of a number state as they are, at every time
// of a sweep, and reverses the energies.
func TestSignsOfInteractionAndTrap(t *testing.T) {
	l := box(t, []int{5})
	state := []int{0, 2, 1, 2, 0}
	run := func(sign float64) []Sample {
		from, to := uniform(1, 1, sign*8, sign*0.4), uniform(1, 0.7, -sign*2, sign*0.1)
		e := evolution(t, l, from, state, EvolutionOptions{})
		return e.must(t, Segment{Duration: 0.5, Tolerance: 1e-8, Times: []float64{0.1, 0.3, 0.5}, Drive: path(from, to, 0.5, smooth)})
	}
	up, down := run(1), run(-1)
	for i := range up {
		for site := range state {
			if d := up[i].SquaredOccupation[site] - down[i].SquaredOccupation[site]; math.Abs(d) > 1e-7 {
				t.Errorf("time %g, site %d: <n^2> differs by %.3g", up[i].Time, site, d)
			}
		}
		if sum := up[i].Energy + down[i].Energy; math.Abs(sum) > 1e-7 {
			t.Errorf("time %g: energies %.9g and %.9g, want opposite ones", up[i].Time, up[i].Energy, down[i].Energy)
		}
	}
}

// Two systems against SciPy, through a ramp of all couplings and a hold.
func TestEvolutionAgainstSciPy(t *testing.T) {
	sheet := testdata.Table(t, "evolution")
	names, times := sheet.Strings(t, "system"), sheet.Floats(t, "time")
	sites := sheet.Floats(t, "site")
	occupation, square := sheet.Floats(t, "occupation"), sheet.Floats(t, "squared_occupation")
	energy, kinetic := sheet.Floats(t, "energy"), sheet.Floats(t, "kinetic")
	for _, system := range []struct {
		name     string
		l        *lattice.Lattice
		state    []int
		from, to bosehubbard.Model
		ramp     float64
		shape    func(float64) float64
		hold     float64
	}{
		{"chain in a trap that flips", box(t, []int{5}), []int{0, 1, 2, 1, 0},
			uniform(1, 0.2, 6, 0.3), uniform(1, 1, -2.5, -0.15), 0.4, smooth, 0.5},
		{"ring of unequal filling", box(t, []int{4}, true), []int{2, 0, 1, 1},
			uniform(1, 1, 3, 0), uniform(1, 0.6, 9, 0), 0.25, exponential, 0.8},
	} {
		e := evolution(t, system.l, system.from, system.state, EvolutionOptions{})
		samples := e.must(t, Segment{Duration: system.ramp, Tolerance: 1e-9, Drive: path(system.from, system.to, system.ramp, system.shape),
			Times: []float64{0.375 * system.ramp, 0.75 * system.ramp, system.ramp}})
		samples = append(samples, e.must(t, Segment{Duration: system.hold, Tolerance: 1e-9, Times: []float64{system.hold / 2, system.hold}})...)
		rows := 0
		for r, name := range names {
			if name != system.name {
				continue
			}
			s := samples[rows/system.l.Sites]
			site := int(sites[r])
			rows++
			for what, pair := range map[string][2]float64{
				"time": {s.Time, times[r]}, "<n>": {s.Occupation[site], occupation[r]}, "<n^2>": {s.SquaredOccupation[site], square[r]},
				"energy": {s.Energy, energy[r]}, "kinetic energy": {s.Kinetic, kinetic[r]},
			} {
				if d := math.Abs(pair[0] - pair[1]); !(d < 1e-8) {
					t.Errorf("%s, %g s, site %d: %s %.11g, want %.11g, off by %.3g", name, times[r], site, what, pair[0], pair[1], d)
				}
			}
		}
		if rows != 5*system.l.Sites {
			t.Errorf("%s: %d rows, want %d", system.name, rows, 5*system.l.Sites)
		}
	}
}

// While nothing changes, the norm stays 1 and the energy what it was, within the
// bound of the error.
func TestHoldConservesNormAndEnergy(t *testing.T) {
	l := box(t, []int{3, 2})
	e := evolution(t, l, uniform(2, 1, -3, 0.2), []int{2, 0, 1, 0, 0, 2}, EvolutionOptions{})
	begin, err := e.Observe(context.Background())
	if err != nil {
		t.Fatal(err)
	}
	samples := e.must(t, Segment{Duration: 10, Tolerance: 1e-8, Times: []float64{0, 1, 5, 10}})
	for _, s := range samples {
		if bound := e.Errors().Krylov; s.NormDefect > 2*bound || math.Abs(s.Energy-begin.Energy) > 100*bound {
			t.Errorf("%g s: norm defect %.3g, energy %.12g of %.12g, bound %.3g", s.Time, s.NormDefect, s.Energy, begin.Energy, bound)
		}
	}
	if bound := e.Errors().Krylov; bound > 1e-9+1e-12 || e.Time() != 10 {
		t.Errorf("bound %.3g, want a tenth of the tolerance; time %g, want 10", bound, e.Time())
	}
}

// The complex conjugate runs back in time: through a sweep, and through the same
// sweep from its end, to the start again.
func TestEvolutionBackInTime(t *testing.T) {
	l := box(t, []int{5})
	from, to := uniform(1, 0.1, 7, 0.2), uniform(1, 1, -3, -0.1)
	e := evolution(t, l, from, []int{1, 1, 1, 1, 1}, EvolutionOptions{})
	forwards := path(from, to, 0.7, smooth)
	e.must(t, Segment{Duration: 0.7, Drive: forwards, Tolerance: 1e-6})
	for i := range e.psi.Im {
		e.psi.Im[i] = -e.psi.Im[i]
	}
	e.must(t, Segment{Duration: 0.7, Tolerance: 1e-6, Drive: func(m *bosehubbard.Model, t float64) { forwards(m, 0.7-t) }})
	start := evolution(t, l, from, []int{1, 1, 1, 1, 1}, EvolutionOptions{})
	if got, most := e.gap(start), e.Errors().Sum(); got > most {
		t.Errorf("forwards and back: distance %.3g, want at most %.3g", got, most)
	}
}

// The same observables with and without the mirror, and for any number of workers
// the same bits.
func TestMirrorAndWorkersChangeNothing(t *testing.T) {
	l := box(t, []int{9})
	duration := 0.03
	if testing.Short() {
		duration = 0.021
	}
	from, to := uniform(1, 1, 9, 0.1), uniform(1, 1, 5, -0.1)
	segment := Segment{Duration: duration, Tolerance: 1e-4, Times: []float64{0.02, duration}, Drive: path(from, to, duration, linear)}
	var first []Sample
	var state *Evolution
	for _, opt := range []EvolutionOptions{{Workers: 1}, {Workers: 2}, {Workers: 3}, {Workers: 1, Whole: true}} {
		e := evolution(t, l, from, []int{1, 1, 1, 1, 1, 1, 1, 1, 1}, opt)
		got := e.must(t, segment)
		got = append(got, e.must(t, Segment{Duration: 0.01, Times: []float64{0.01}})...)
		if first == nil {
			first, state = got, e
			continue
		}
		if !opt.Whole && (!slices.Equal(e.psi.Re, state.psi.Re) || !slices.Equal(e.psi.Im, state.psi.Im)) {
			t.Errorf("%d workers: other bits than with one", opt.Workers)
		}
		for i, s := range got {
			if d := math.Abs(s.Energy - first[i].Energy); d > 1e-4 || opt.Whole != (e.Parity() == 0) {
				t.Errorf("%+v: energy off by %.3g in sector %d", opt, d, e.Parity())
			}
		}
	}
}

// An atom in a tilted chain is back after a Bloch period, h/(energy per site).
//
// Source: derived; the ladder of the tilted chain is equidistant up to its walls,
// which an orbit of 4 J/F = 0.4 sites from its middle does not reach.
func TestBlochOscillation(t *testing.T) {
	l := box(t, []int{15})
	m := uniform(1, 1, 0, 0)
	m.Axes[0].Tilt = 10
	state := make([]int, 15)
	state[7] = 1
	e := evolution(t, l, m, state, EvolutionOptions{})
	samples := e.must(t, Segment{Duration: 0.1, Tolerance: 1e-10, Times: []float64{0.05, 0.1}})
	if half, whole := samples[0].Occupation[7], samples[1].Occupation[7]; math.Abs(whole-1) > 1e-9 || half > 0.95 {
		t.Errorf("on the first site: %.12g after a period, %.3g after half of one, want 1 and less", whole, half)
	}
}

// Random sweeps stay within their budget of a much finer run.
func TestErrorBudgetHolds(t *testing.T) {
	seeds := uint64(40)
	if testing.Short() {
		seeds = 5
	}
	for seed := range seeds {
		random := rand.New(rand.NewPCG(seed, 5))
		model := func() bosehubbard.Model {
			return uniform(1, 0.2+random.Float64(), 20*random.Float64()-10, random.Float64()-0.5)
		}
		l := box(t, []int{5}, random.IntN(2) == 1)
		state := []int{random.IntN(2), random.IntN(3), 1, random.IntN(2), random.IntN(2)}
		from, to := model(), model()
		shape := []func(float64) float64{linear, smooth, exponential}[random.IntN(3)]
		duration, tolerance := 0.1+random.Float64(), math.Pow(10, -1.5-4*random.Float64())
		var runs [2]*Evolution
		for k, tol := range []float64{tolerance, tolerance * 1e-4} {
			runs[k] = evolution(t, l, from, state, EvolutionOptions{})
			runs[k].must(t, Segment{Duration: duration, Tolerance: tol, Drive: path(from, to, duration, shape)})
		}
		got, budget := runs[0].gap(runs[1]), runs[0].Errors()
		if got > budget.Sum() || budget.Ordering > tolerance || budget.Krylov > krylovShare*tolerance*(1+1e-6) {
			t.Errorf("seed %d: distance %.3g with a budget of %+v and a tolerance of %.3g", seed, got, budget, tolerance)
		}
	}
}

// Every asks for samples on the way without a fixed grid: the same states, in order,
// the last at the end, and none far from the one before.
func TestSamplesOnTheWay(t *testing.T) {
	l := box(t, []int{5})
	from, to := uniform(1, 0.5, 6, 0), uniform(1, 1, 2, 0.1)
	state := []int{1, 1, 1, 1, 1}
	for _, drive := range []func(*bosehubbard.Model, float64){nil, path(from, to, 0.5, smooth)} {
		for _, every := range []float64{0.004, 0.05, 0.7} {
			e := evolution(t, l, from, state, EvolutionOptions{})
			got := e.must(t, Segment{Duration: 0.5, Drive: drive, Every: every, Times: []float64{0.123, 0.5}, Tolerance: 1e-6})
			last, seen := 0.0, 0
			for i, s := range got {
				if s.Time == 0.123 || s.Time == 0.5 {
					seen++
				}
				if s.Time <= last && i > 0 || s.Time-last > 3*every {
					t.Errorf("every %g s: a sample at %g s after one at %g s", every, s.Time, last)
				}
				last = s.Time
			}
			if seen != 2 || last != 0.5 {
				t.Errorf("every %g s: %d of the two times asked for, the last at %g s", every, seen, last)
			}
			middle := got[len(got)/2]
			again := evolution(t, l, from, state, EvolutionOptions{})
			want := again.must(t, Segment{Duration: 0.5, Drive: drive, Times: []float64{middle.Time}, Tolerance: 1e-6})[0]
			if math.Abs(want.Energy-middle.Energy) > 1e-5 || math.Abs(want.Kinetic-middle.Kinetic) > 1e-5 {
				t.Errorf("every %g s: energies %.9g, %.9g at %g s, want %.9g, %.9g", every, middle.Energy, middle.Kinetic, middle.Time, want.Energy, want.Kinetic)
			}
		}
	}
}

func TestEvolutionRefuses(t *testing.T) {
	ctx := context.Background()
	l := box(t, []int{3})
	good := uniform(1, 1, 2, 0)
	nan := uniform(1, math.NaN(), 2, 0)
	for _, tc := range []struct {
		name  string
		m     bosehubbard.Model
		state []int
		opt   EvolutionOptions
		want  string
	}{
		{"no atoms", good, []int{0, 0, 0}, EvolutionOptions{}, "0 atoms"},
		{"negative", good, []int{2, -1, 0}, EvolutionOptions{}, "-1 atoms on site 1"},
		{"too few sites", good, []int{1, 1}, EvolutionOptions{}, "on 2 sites"},
		{"NaN", nan, []int{1, 1, 1}, EvolutionOptions{}, "NaN"},
		{"axes", uniform(2, 1, 1, 1), []int{1, 1, 1}, EvolutionOptions{}, "2 axes"},
		{"dimension", good, []int{1, 1, 1}, EvolutionOptions{Dimension: 3}, "dimension 3"},
	} {
		if _, err := NewEvolution(ctx, l, tc.m, tc.state, tc.opt); err == nil || !strings.Contains(err.Error(), tc.want) {
			t.Errorf("%s: %v, want an error with %q", tc.name, err, tc.want)
		}
	}
	if _, err := NewEvolutionFromEnd(ctx, l, good, 0, Floor, EvolutionOptions{}); err == nil {
		t.Error("from the end without atoms: no error")
	}
	if _, err := NewEvolutionFromEnd(ctx, l, nan, 3, Floor, EvolutionOptions{}); err == nil {
		t.Error("from the end of a model with NaN: no error")
	}
	e := evolution(t, l, good, []int{1, 1, 1}, EvolutionOptions{})
	for _, tc := range []struct {
		s    Segment
		want string
	}{
		{Segment{Duration: -1}, "duration -1"}, {Segment{Duration: math.NaN()}, "NaN"}, {Segment{Duration: math.Inf(1)}, "Inf"},
		{Segment{Duration: 1, Tolerance: -1}, "tolerance -1"}, {Segment{Duration: 1, Tolerance: 1}, "tolerance 1"},
		{Segment{Duration: 1, Times: []float64{0.5, 0.2}}, "[0.5 0.2] s"}, {Segment{Duration: 1, Times: []float64{2}}, "up to 1 s"},
		{Segment{Duration: 1, Drive: func(m *bosehubbard.Model, t float64) { m.Axes[0].Tunnelling = math.Sqrt(0.5 - t) }}, "NaN"},
		{Segment{Duration: 1, Tolerance: 1e-15}, "tolerance"}, {Segment{Duration: 1, Every: math.NaN()}, "every NaN"},
	} {
		if _, err := e.Run(ctx, tc.s); err == nil || !strings.Contains(err.Error(), tc.want) {
			t.Errorf("%+v: %v, want an error with %q", tc.s, err, tc.want)
		}
	}
}

func ExampleEvolution() {
	l, _ := lattice.Box([]int{4}, []bool{false})
	start := bosehubbard.Model{Interaction: 20, Axes: []bosehubbard.AxisTerms{{Tunnelling: 1}}}
	ctx := context.Background()
	e, err := NewEvolution(ctx, l, start, []int{1, 1, 1, 1}, EvolutionOptions{})
	if err != nil {
		fmt.Println(err)
		return
	}
	samples, err := e.Run(ctx, Segment{Duration: 2, Times: []float64{2}, Drive: func(m *bosehubbard.Model, t float64) {
		m.Axes[0].Tunnelling, m.Interaction = 1, 20-8*t
	}})
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("%.3f atoms on the first site, energy %.3f Hz\n", samples[0].Occupation[0], samples[0].Energy)
	// Output: 0.965 atoms on the first site, energy -2.405 Hz
}
