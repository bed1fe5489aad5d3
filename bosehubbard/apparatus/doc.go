// Package apparatus turns what a laboratory can set - lattice depths, beam
// powers, a bias field - into the Hamiltonian of the atoms at that moment.
//
// Everything is in SI units except the energies of the lattice model and the
// gaps, which are E/h in hertz. Axes are indexed x, y, z = 0, 1, 2.
//
// The trap is the second derivative of the total potential at the common beam
// centre: the mean energy of the lowest band for the lattice beams (no term
// along their own axis), the optical potential for the dipole beams, the moment
// at the present field for the coils. Gravity tilts the lattice along one axis;
// it does not shift the centre.
//
// References: Grimm, Weidemueller, Ovchinnikov, Adv. At. Mol. Opt. Phys. 42, 95
// (2000); Bloch, Dalibard, Zwerger, Rev. Mod. Phys. 80, 885 (2008).
package apparatus
