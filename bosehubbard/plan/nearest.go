package plan

import (
	"slices"
	"strings"
)

// maxWord is the longest word in runes that nearest compares; longer ones are no
// slips of the pen.
const maxWord = 80

// nearest returns the known word that the fewest edits separate from word, the
// first of several, or "" if there is none to compare.
func nearest(word string, known []string) string {
	best, fewest := "", 0
	if len(word) > 4*maxWord {
		return ""
	}
	for _, candidate := range known {
		if len(candidate) > 4*maxWord {
			continue
		}
		n := edits(strings.ToLower(word), strings.ToLower(candidate))
		if best == "" || n < fewest {
			best, fewest = candidate, n
		}
	}
	return best
}

// alike returns the known word that word is a slip of: nearest, or the same
// letters in another order ("Rb87"), but "" where more than a third of the longer
// word differs.
func alike(word string, known []string) string {
	for _, candidate := range known {
		if sortedLetters(word) == sortedLetters(candidate) {
			return candidate
		}
	}
	best := nearest(word, known)
	if best == "" || 3*edits(strings.ToLower(word), strings.ToLower(best)) > max(len(word), len(best)) {
		return ""
	}
	return best
}

func sortedLetters(word string) string {
	letters := []rune(strings.ToLower(word))
	slices.Sort(letters)
	return string(letters)
}

// edits counts the insertions, deletions, replacements and swaps of neighbours
// that turn a into b (optimal string alignment). Cost O(len(a) len(b)).
func edits(a, b string) int {
	s, t := []rune(a), []rune(b)
	before, above, row := make([]int, len(t)+1), make([]int, len(t)+1), make([]int, len(t)+1)
	for j := range above {
		above[j] = j
	}
	for i := 1; i <= len(s); i++ {
		row[0] = i
		for j := 1; j <= len(t); j++ {
			same := 1
			if s[i-1] == t[j-1] {
				same = 0
			}
			row[j] = min(above[j]+1, row[j-1]+1, above[j-1]+same)
			if i > 1 && j > 1 && s[i-1] == t[j-2] && s[i-2] == t[j-1] {
				row[j] = min(row[j], before[j-2]+1)
			}
		}
		before, above, row = above, row, before
	}
	return above[len(t)]
}
