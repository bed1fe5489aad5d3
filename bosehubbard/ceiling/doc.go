// Package ceiling decides whether the energy of an atom is bounded on the side
// on which a state of the wanted sign of T sits: above (the ceiling) for T < 0,
// below (the floor) for T > 0.
//
// It knows the terms of the Hamiltonian, the hold and the potential drop at the
// edge; it knows no knobs. All energies are E/h in Hz per atom. Kinetic energy
// counts from the centre of the band, the trap from its own summit, the
// interaction from singly occupied sites.
//
// An axis moves, is layered or is frozen. Only moving axes need a bound:
//
//	layered  tilt per site F >= 4J of that axis: Wannier-Stark localised
//	frozen   else 2 pi J hold <= 0.1: no hop within the hold
//	moving   else
//
// The verdict is the worst broken criterion: open, astray, leaky, else sealed.
//
// References: Braun et al., Science 339, 52 (2013), for the three bounds; Mosk,
// Phys. Rev. Lett. 95, 040403 (2005), for one band. The rest is derived.
package ceiling
