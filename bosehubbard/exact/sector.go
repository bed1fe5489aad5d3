package exact

import (
	"fmt"
	"strings"

	"hilltop/bosehubbard/fock"
)

// Sector is the part of the spectrum that is searched.
type Sector int

const (
	// SectorAuto is the whole spectrum. Where the system has a mirror, each end is
	// looked for in the sector that must hold it, or in both.
	SectorAuto Sector = iota

	// SectorWhole is the whole spectrum without use of a mirror.
	SectorWhole

	SectorEven // the states that the mirror of fock.Terms.Mirror leaves as they are
	SectorOdd  // the states that it reverses
)

// sectorText names the sectors that are searched.
func sectorText(searches []search) string {
	var names []string
	for _, one := range searches {
		names = append(names, map[int]string{0: "whole", 1: "even", -1: "odd"}[one.parity])
	}
	return strings.Join(names, " and ")
}

// search is a sector with the ends that are looked for in it.
type search struct {
	parity         int
	floor, ceiling bool
}

// smallBlocks is the mean number of states of a block below which a mirror costs
// more than it saves: few sites with very many atoms.
const smallBlocks = 16

// plan lists the searches.
func (s *solver) plan() ([]search, error) {
	whole := []search{{parity: 0, floor: true, ceiling: true}}
	switch s.opt.Sector {
	case SectorEven:
		return []search{{1, true, true}}, s.checkSector(1)
	case SectorOdd:
		return []search{{-1, true, true}}, s.checkSector(-1)
	case SectorWhole:
		return whole, nil
	case SectorAuto:
	default:
		return nil, fmt.Errorf("sector %d, want one of those named", s.opt.Sector)
	}
	mirror, ok := s.terms.Mirror()
	if !ok || !worthwhile(s.terms.Sites, s.atoms) {
		return whole, nil
	}
	floor, ceiling := endParity(s.terms, mirror, s.atoms, 1), endParity(s.terms, mirror, s.atoms, -1)
	var list []search
	for _, p := range []int{1, -1} {
		one := search{parity: p, floor: floor == p || floor == 0, ceiling: ceiling == p || ceiling == 0}
		if one.floor || one.ceiling {
			list = append(list, one)
		}
	}
	return list, nil
}

// checkSector refuses a sector without states.
func (s *solver) checkSector(parity int) error {
	if parity < 0 && (s.atoms == 0 || s.terms.Sites == 1) {
		return fmt.Errorf("%d atoms on %d sites have no odd states", s.atoms, s.terms.Sites)
	}
	return nil
}

// worthwhile says whether a mirror makes the search quicker.
func worthwhile(sites, atoms int) bool {
	states := fock.LogDimension(sites, atoms)
	blocks := fock.LogDimension(2+sites%2, atoms)
	return states > logDenseLimit && states-blocks > logSmallBlocks
}

// endParity returns the parity of the end at which sign H is lowest, sign +1 for
// the floor and -1 for the ceiling, or 0 if it is not known beforehand.
//
// If the sites can carry signs g_i such that H turns every state into others with
// the sign of the product of g_i^n_i, the end has a vector with those signs and no
// node (Perron and Frobenius). The mirror then multiplies it by the product of
// (g_i g_Ri)^n_i, which is one number if g_i g_Ri is the same on all sites.
func endParity(t *fock.Terms, mirror []int, atoms int, sign float64) int {
	gauge, ok := t.Gauge(sign)
	if !ok {
		return 0
	}
	kept := gauge[0] * gauge[mirror[0]]
	for i, other := range mirror {
		if gauge[i]*gauge[other] != kept {
			return 0
		}
	}
	if kept < 0 && atoms%2 == 1 {
		return -1
	}
	return 1
}
