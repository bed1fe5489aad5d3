package report

import (
	"fmt"
	"strings"
	"unicode/utf8"

	"hilltop/bosehubbard/num/digits"
)

// duration writes a time given in ms, in s where it is long.
func duration(ms float64) string {
	if ms >= 1e4 {
		return digits.Format(ms/1e3, 3) + " s"
	}
	return digits.Format(ms, 3) + " ms"
}

// sentenceLength is the most runes the verdict bar shows.
const sentenceLength = 96

// sentence is the verdict in words: word, term, number, cure.
func (r *Report) sentence() string {
	worst := r.worst()
	if worst == nil {
		return r.sealedSentence()
	}
	head := title(r.Verdict) + ": " + r.phrase(worst) + "."
	if worst.Advice != nil {
		if full := head + " " + worst.Advice.Text; utf8.RuneCountInString(full) <= sentenceLength {
			return full
		}
	}
	if utf8.RuneCountInString(head) > sentenceLength {
		return fmt.Sprintf("%s: %s is short by %s %s.", title(r.Verdict), criterionWords[worst.Name], digits.Size(worst.Margin, 3), unitWords[worst.Unit])
	}
	return head
}

func (r *Report) sealedSentence() string {
	end := r.last()
	lives := duration(r.HoldMS)
	if end != nil && end.TunnellingTimeMS != nil && *end.TunnellingTimeMS > 0 {
		lives += ", " + digits.Format(r.HoldMS / *end.TunnellingTimeMS, 3) + " ħ/J"
	}
	side := "above"
	if r.AimSign == "positive" {
		side = "below"
	}
	tight := r.tightest()
	if tight == nil {
		return fmt.Sprintf("Sealed: bounded %s through the hold (%s).", side, lives)
	}
	return fmt.Sprintf("Sealed: bounded %s through the hold (%s). Tightest: %s.", side, lives, criterionWords[tight.Name])
}

// tightest returns the criterion with the least room in Hz of energy, or nil.
func (r *Report) tightest() *Criterion {
	var least *Criterion
	for i := range r.Ceiling.Criteria {
		c := &r.Ceiling.Criteria[i]
		if c.Name == "one_band" || c.Name == "edge" || c.Name == "layers" {
			if least == nil || c.Margin < least.Margin {
				least = c
			}
		}
	}
	return least
}

var criterionWords = map[string]string{
	"interaction": "interaction", "trap_x": "trap along x", "trap_y": "trap along y", "trap_z": "trap along z",
	"tilt": "tilt", "one_band": "one band", "layers": "layers apart", "held": "something holds", "edge": "edge of the beams", "energy": "energy",
	"lifetime": "lifetime", "levels": "bound of the levels",
}

// worst returns the broken criterion to speak of: one that makes the verdict, and
// of several one whose advice seals the plan, else one with an advice, else the
// first. It is nil where nothing is broken.
func (r *Report) worst() *Criterion {
	var best *Criterion
	rank := -1
	for i := range r.Ceiling.Criteria {
		c := &r.Ceiling.Criteria[i]
		if c.Passed || c.Breaks != r.Verdict {
			continue
		}
		value := 0
		if c.Advice != nil {
			value = 1
			if strings.HasSuffix(c.Advice.Text, sealing) {
				value = 2
			}
		}
		if value > rank {
			best, rank = c, value
		}
	}
	return best
}

// sealing ends an advice that seals the plan.
const sealing = " to seal."

func (r *Report) last() *Stage {
	if n := len(r.Stages); n > 0 {
		return &r.Stages[n-1]
	}
	return r.Start
}

// phrase says what a broken criterion means, with its number.
func (r *Report) phrase(c *Criterion) string {
	positive := r.AimSign == "positive"
	amount := digits.Format(-c.Margin, 3) + " " + unitWords[c.Unit]
	switch c.Name {
	case "interaction":
		if positive {
			return "atoms attract (" + digits.Signed(c.Margin, 3) + " " + unitWords[c.Unit] + "), no floor"
		}
		return "atoms repel (" + digits.Signed(-c.Margin, 3) + " " + unitWords[c.Unit] + "), no ceiling"
	case "trap_x", "trap_y", "trap_z":
		axis := c.Name[len(c.Name)-1:]
		if positive {
			return "trap pushes outwards along " + axis + " (" + digits.Signed(c.Margin, 3) + " " + unitWords[c.Unit] + ")"
		}
		return "trap still confines along " + axis + " (" + digits.Signed(-c.Margin, 3) + " " + unitWords[c.Unit] + ")"
	case "tilt":
		return "a tilted axis moves with no curvature to stop it"
	case "one_band":
		return "two atoms can leave the band (gap short by " + amount + ")"
	case "layers":
		return "atoms hop between layers (short by " + amount + ")"
	case "held":
		return "nothing holds the cloud"
	case "edge":
		return "the beams end too soon (short by " + amount + ")"
	case "energy":
		each := " per site)"
		if r.Levels != nil {
			each = " per body)"
		}
		return "the state lies past infinite temperature (by " + amount + each
	case "lifetime":
		return "the state drains before it forms (short by " + amount + ")"
	case "levels":
		return "the levels go on upwards without end"
	}
	return c.Name
}

var unitWords = map[string]string{"Hz": "Hz", "a0": "a0", "Hz/site2": "Hz/site²", "ms": "ms"}

func title(word string) string { return strings.ToUpper(word[:1]) + word[1:] }
