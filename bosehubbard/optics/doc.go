// Package optics knows what beams and coils do to an atom: light shifts, lattice
// depths, trapping and anti-trapping curvatures, and the potential at any point.
// It knows no bands; the mean energy of the lowest band is passed in.
//
// Everything is in SI units: metres, watts, teslas, joules. Waists are 1/e^2
// intensity radii. Power is one incoming pass in vacuum at the atoms. Depths are
// peak to peak at the centre, in recoil energies h^2/(8 m d^2), d the spacing.
//
// Light shifts sum the D1 and D2 lines with weights 1/3 and 2/3 and their
// counter-rotating terms, for linear polarisation far from resonance; the core
// and higher lines are left out, which makes 1064 nm 1 to 1.5 % too weak.
//
// References: Grimm, Weidemueller, Ovchinnikov, Adv. At. Mol. Opt. Phys. 42, 95
// (2000); Bloch, Dalibard, Zwerger, Rev. Mod. Phys. 80, 885 (2008).
package optics
