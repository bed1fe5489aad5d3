// Package atom describes an alkali atom in its electronic ground state: mass, D
// lines, hyperfine energies in a magnetic field and scattering length.
//
// Units: kg, m, T, rad/s for linewidths, J/T for magnetic moments; energies are
// E/h in Hz. A magnetic moment is -dE/dB, so it is positive for a state that is
// drawn to high field. The g factors follow E = +muB (gJ mJ + gI mI) B, in which
// gI of most alkali atoms is negative and of the order of -0.001.
//
// A species is read from a file in which every number states its source; Decode
// refuses one that does not. Scattering lengths are products of one factor per
// Feshbach resonance, so a curve has poles, zeros and, between two poles, maxima
// and minima. Nothing here is a calibration of a laboratory's field.
//
// References: G. Breit and I. I. Rabi, Phys. Rev. 38, 2082 (1931); E. Arimondo,
// M. Inguscio and P. Violino, Rev. Mod. Phys. 49, 31 (1977); C. Chin, R. Grimm,
// P. Julienne and E. Tiesinga, Rev. Mod. Phys. 82, 1225 (2010).
package atom
