package eos

import (
	"fmt"
	"math"
	"strings"
)

// Named is the point of one model.
type Named struct {
	Model string
	Point Point
}

// Choice is what the models that hold at a point say.
type Choice struct {
	Named          // of the smallest Doubt
	Models []Named // all that hold, in the order of the chooser

	// Half the distance between the extremes of all Models: the uncertainty of Point. It
	// is 0 with one model, whose Doubt is then all there is.
	Filling, Entropy, Energy float64

	Refused []error // what the others said
}

// NoModelError says that no model holds at a point.
type NoModelError struct {
	Mu, Beta float64
	Refused  []error
}

func (e *NoModelError) Error() string {
	text := make([]string, len(e.Refused))
	for i, err := range e.Refused {
		text[i] = strings.TrimPrefix(err.Error(), "eos: ")
	}
	return fmt.Sprintf("eos: no model holds at mu = %g Hz, beta = %g /Hz: %s", e.Mu, e.Beta, strings.Join(text, "; "))
}

// Chooser asks several models of one lattice. It is a Model itself, whose points jump
// by about the spread where another model takes over.
type Chooser struct {
	models   []Model
	coupling float64 // |U|/zJ
}

// aloneAt is the |U|/zJ below which a single Gutzwiller site in the superfluid is no
// source of a temperature by itself. 2 J is one half on two axes.
const aloneAt = 2

// NewChooser returns a chooser over the models that suit a lattice: Ideal alone
// for U = 0, without tunnelling Atomic alone, else all that the package has but
// LinkedCluster.
//
// It returns the errors of the models.
func NewChooser(t Terms) (*Chooser, error) {
	if err := t.check(); err != nil {
		return nil, err
	}
	if t.Interaction == 0 {
		ideal, err := NewIdeal(t)
		return &Chooser{models: []Model{ideal}}, err
	}
	atomic, err := NewAtomic(t)
	if err != nil {
		return nil, err
	}
	c := &Chooser{models: []Model{atomic}}
	if atomic.zJ == 0 {
		return c, nil
	}
	c.coupling = math.Abs(t.Interaction) / atomic.zJ
	return c, c.addBands(t)
}

// addBands adds the models of a moving gas with interaction.
func (c *Chooser) addBands(t Terms) error {
	site, err := NewGutzwiller(t)
	if err != nil {
		return err
	}
	c.models = append(c.models, site)
	for _, hops := range t.Hops {
		if hops[0] == 0 {
			return nil // a gas of layers: no band along that axis
		}
	}
	ideal, err := NewIdeal(t)
	if err != nil {
		return err
	}
	fock, err := NewHartreeFock(t)
	if err != nil {
		return err
	}
	sound, err := NewBogoliubov(t)
	if err != nil {
		return err
	}
	c.models = append(c.models, ideal, fock, sound)
	return nil
}

// Add adds a model of the same lattice, LinkedCluster for one.
func (c *Chooser) Add(m Model) { c.models = append(c.models, m) }

// Models lists the models asked. The caller does not change the list.
func (c *Chooser) Models() []Model { return c.models }

// Choose returns the points of all models that hold at a chemical potential in Hz and
// a beta in 1/Hz, the one of the smallest Doubt first. Cost: all of them.
//
// It returns an *InputError, or a *NoModelError if none holds. A Gutzwiller site in the
// superfluid at |U|/zJ below 2 does not count if it is alone.
func (c *Chooser) Choose(mu, beta float64) (Choice, error) {
	var out Choice
	for _, m := range c.models {
		p, err := m.At(mu, beta)
		if bad, ok := err.(*InputError); ok {
			return Choice{}, bad
		}
		if err != nil {
			out.Refused = append(out.Refused, err)
			continue
		}
		out.Models = append(out.Models, Named{m.Name(), p})
	}
	if len(out.Models) == 1 && out.Models[0].Point.Order > 0 && c.coupling < aloneAt {
		out.Refused = append(out.Refused, &InvalidError{out.Models[0].Model, mu, beta,
			fmt.Sprintf("a superfluid at |U|/zJ = %g without a second model, want at least %d", c.coupling, aloneAt)})
		out.Models = nil
	}
	if len(out.Models) == 0 {
		return Choice{}, &NoModelError{mu, beta, out.Refused}
	}
	out.spread()
	return out, nil
}

// spread fills in the best point and the distances of the others.
func (c *Choice) spread() {
	c.Named = c.Models[0]
	low, high := c.Point, c.Point
	for _, m := range c.Models {
		if m.Point.Doubt < c.Point.Doubt {
			c.Named = m
		}
		low.Filling, high.Filling = min(low.Filling, m.Point.Filling), max(high.Filling, m.Point.Filling)
		low.Entropy, high.Entropy = min(low.Entropy, m.Point.Entropy), max(high.Entropy, m.Point.Entropy)
		low.Energy, high.Energy = min(low.Energy, m.Point.Energy), max(high.Energy, m.Point.Energy)
	}
	c.Filling, c.Entropy, c.Energy = (high.Filling-low.Filling)/2, (high.Entropy-low.Entropy)/2, (high.Energy-low.Energy)/2
}

// Name returns "chooser".
func (c *Chooser) Name() string { return "chooser" }

// Valid returns the error of Choose.
func (c *Chooser) Valid(mu, beta float64) error {
	_, err := c.Choose(mu, beta)
	return err
}

// At returns the point of the smallest Doubt.
func (c *Chooser) At(mu, beta float64) (Point, error) {
	choice, err := c.Choose(mu, beta)
	return choice.Point, err
}
