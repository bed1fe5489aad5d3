package gutzwiller

import "math"

// Measure is what can be seen of a state. Energies are per atom, E/h in Hz; they and
// everything else per atom are 0 if there are no atoms.
type Measure struct {
	Atoms float64

	Kinetic     float64 // -sum over bonds of J (conj(phi_i) phi_j + c.c.)
	Interaction float64 // U/2 sum <n(n-1)>
	Potential   float64 // sum V_i <n_i>

	Square float64 // <n^2> per site

	// Coherent is sum |phi_i|^2 / N. Centre and Corner are |sum phi_i|^2 / N, plain
	// and with the sign (-1)^(x+y+z): the number of sites whose phases agree at
	// quasi-momentum 0 and (pi, pi, pi). With 1 - Coherent added it is the occupation
	// of that quasi-momentum over its mean over the zone.
	Coherent, Centre, Corner float64

	Radius float64    // root mean square distance from the centre of mass, sites
	Middle [3]float64 // centre of mass, sites from the centre of the grid

	// SiteShares are the shares of sites with 0, 1, 2 and more atoms; AtomShares
	// those of the atoms that sit alone, in twos and in larger groups.
	SiteShares [4]float64
	AtomShares [3]float64
}

// Energy is the sum of the three parts, Hz per atom.
func (m Measure) Energy() float64 { return m.Kinetic + m.Interaction + m.Potential }

// Measure takes stock of a state under given terms. Cost O(Sites Levels).
//
// It returns an error if the terms do not fit the system or are not finite.
func (s *State) Measure(terms Terms) (Measure, error) {
	if err := s.System.check(terms); err != nil {
		return Measure{}, err
	}
	grid := s.System.Grid
	var m Measure
	filling := make([]float64, grid.Sites)
	s.Filling(filling)
	pairs := s.count(&m, filling)
	if m.Atoms == 0 {
		return m, nil
	}
	for site, v := range s.System.potential(terms) {
		m.Potential += v * filling[site] / m.Atoms
	}
	m.Interaction = terms.Interaction * pairs / 2 / m.Atoms
	m.place(grid, filling)
	s.interfere(&m, terms)
	return m, nil
}

// count fills in the numbers of atoms and returns sum <n(n-1)>.
func (s *State) count(m *Measure, filling []float64) float64 {
	sites := float64(len(filling))
	pairs := 0.0
	for site, mean := range filling {
		m.Atoms += mean
		for n := range s.System.Levels {
			w := s.weight(site, n)
			m.SiteShares[min(n, 3)] += w / sites
			m.AtomShares[min(max(n-1, 0), 2)] += w * float64(n)
			pairs += w * float64(n*(n-1))
		}
	}
	m.Square = (pairs + m.Atoms) / sites
	if m.Atoms > 0 {
		for i := range m.AtomShares {
			m.AtomShares[i] /= m.Atoms
		}
	}
	return pairs
}

// place fills in the centre of mass and the radius.
func (m *Measure) place(grid *Grid, filling []float64) {
	square := 0.0
	for a := range grid.Axes {
		x := grid.Coordinates(a)
		for site, n := range filling {
			m.Middle[a] += n * x[site] / m.Atoms
		}
		for site, n := range filling {
			d := x[site] - m.Middle[a]
			square += n * d * d / m.Atoms
		}
	}
	m.Radius = math.Sqrt(square)
}

// interfere fills in what needs phi.
func (s *State) interfere(m *Measure, terms Terms) {
	grid := s.System.Grid
	phi := make([]complex128, grid.padded+1) // 0 for no neighbour
	s.Field(phi[:grid.Sites])
	var plain, staggered complex128
	for site, sign := range grid.Stagger() {
		p := phi[site]
		plain += p
		staggered += complex(sign, 0) * p
		m.Coherent += norm(p) / m.Atoms
		for a := range grid.Axes {
			next := phi[grid.near[2*a][site]]
			m.Kinetic -= 2 * terms.Tunnelling[a] * (real(p)*real(next) + imag(p)*imag(next)) / m.Atoms
		}
	}
	m.Centre, m.Corner = norm(plain)/m.Atoms, norm(staggered)/m.Atoms
}

func norm(z complex128) float64 { return real(z)*real(z) + imag(z)*imag(z) }
