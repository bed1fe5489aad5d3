// Package report judges a plan: from the document to J, U, V at the end of every
// stage, the bounds of the energy, the criteria with their margins, an advice for
// each broken one, and the verdict.
//
// A Report carries scaled units, as its JSON keys say; energies are E/h in Hz. A
// key that is absent was not computed; null means unbounded. All numbers are
// finite.
package report
