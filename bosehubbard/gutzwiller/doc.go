// Package gutzwiller treats the Bose-Hubbard model in mean field: every site has a
// state of its own and feels its neighbours only through phi = <b>,
//
//	|Psi> = prod_i sum_n f_n^i |n>_i        phi_i = sum_n sqrt(n+1) conj(f_n^i) f_(n+1)^i
//	i hbar df_n^i/dt = [U n(n-1)/2 + V_i n] f_n^i
//	                   - J [Phi_i sqrt(n) f_(n-1)^i + conj(Phi_i) sqrt(n+1) f_(n+1)^i]
//
// with Phi_i the sum of phi over the neighbours of i. Engine follows these
// equations on grids of one to three dimensions. Site treats one site in the field
// of z equal neighbours, in equilibrium at either sign of the temperature.
//
// Conventions: energies are E/h in Hz, temperatures kT/h in Hz, times in seconds,
// so that a term E turns a phase by 2 pi E t. Positions count sites from the centre
// of the grid; axis 0 runs fastest in every list of sites.
//
// Where it is poor. There are no correlations between sites. It is exact for J = 0
// at any temperature, for U = 0 from coherent states, and for infinitely many
// neighbours (Snoek, EPL 95, 30006 (2011)). The Mott insulator has no
// particle-hole pairs and a perfect one is a fixed point in time: it needs a seed
// (State.AddNoise). The superfluid has no phonons: near U/J = 2 the entropy is far
// too small, so that a thermal site must not be the only source of a temperature
// there; the lobes are too small, in one dimension badly. The evolution never
// comes to thermal equilibrium by itself.
//
// References: Fisher, Weichman, Grinstein, Fisher, Phys. Rev. B 40, 546 (1989);
// van Oosten, van der Straten, Stoof, Phys. Rev. A 63, 053601 (2001); Jaksch,
// Venturi, Cirac, Williams, Zoller, Phys. Rev. Lett. 89, 040402 (2002). From memory.
package gutzwiller
