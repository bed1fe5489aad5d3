// Package passage simulates the sequence of a model: how the state of a fixed
// number of atoms on a lattice travels through the stages, and what has become of
// it at the end.
//
// Conventions: energies are E/h in Hz, times in seconds, V in Hz per site squared
// about the centre. A Sequence names every coupling at the end of every stage; a
// hold stage whose values differ from those before begins with a jump. Energies of
// the results are per atom, counted like those of the Hamiltonian, without a shift.
//
// The passage is exact: no mean field, no truncation, with the error of the
// state estimated and bounded as package exact says. The system is closed; nothing
// is lost and nothing relaxes but by itself.
package passage
