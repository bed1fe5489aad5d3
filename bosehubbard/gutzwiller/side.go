package gutzwiller

// side finds the neighbours of a block of sites in one direction. Most are a fixed
// offset away, so that their values are a piece of the list of all; the others are
// exceptions.
type side struct {
	offset int
	first  []int32 // by block: its first exception; one entry more
	site   []int32 // of the block
	to     []int32
}

// newSide sorts a list of neighbours, of whole blocks, with len(list) for none.
func newSide(list []int32, offset int) side {
	s := side{offset: offset}
	for block := 0; block < len(list); block += width {
		s.first = append(s.first, int32(len(s.site)))
		whole := block+offset >= 0 && block+offset+width <= len(list)+1
		for i, to := range list[block : block+width] {
			if !whole || int(to) != block+i+offset {
				s.site, s.to = append(s.site, int32(i)), append(s.to, to)
			}
		}
	}
	s.first = append(s.first, int32(len(s.site)))
	return s
}

// values returns the values at the neighbours of a block, in place where that can
// be and else in dst. all holds one value per site and a 0 for no neighbour.
func (s *side) values(dst *lane, all []float64, block int) []float64 {
	from, to := s.first[block], s.first[block+1]
	if to-from < width {
		piece := all[block*width+s.offset:][:width]
		if from == to {
			return piece
		}
		copy(dst[:], piece)
	}
	for i, site := range s.site[from:to] {
		dst[site] = all[s.to[int(from)+i]]
	}
	return dst[:]
}
