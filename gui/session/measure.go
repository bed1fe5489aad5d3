package session

import (
	"fmt"
	"math/big"
	"slices"
	"strings"
)

// Measure says how the number of a field is read and written.
type Measure struct {
	Dimension Dimension
	Unit      string  // of the document, "" for a plain number
	RecoilHz  float64 // of the axis, for Depth; 0 where it is not known
	Signed    bool    // a sign is always shown
	Whole     bool    // only whole numbers
}

// Quantity is a number that was read: Value in the unit of the document, and the
// unit it was given in.
type Quantity struct {
	Value float64
	Unit  string
}

// QuantityError says why a text is no quantity, in words for the user.
type QuantityError struct {
	Typed  string // as typed, shortened
	Reason string // a clause that follows Typed: "is a power; give Er, kHz or nK"
}

// Error returns the typed text and the reason.
func (e *QuantityError) Error() string {
	if e.Typed == "" {
		return e.Reason
	}
	return e.Typed + " " + e.Reason
}

// Units returns the units that a field of this measure takes, the document's
// first.
func (m Measure) Units() []string {
	if m.Unit == "" {
		return nil
	}
	out := []string{m.Unit}
	for _, symbol := range dimensions[m.Dimension].units {
		if symbol != m.Unit && m.size(symbol) != nil {
			out = append(out, symbol)
		}
	}
	return out
}

// offer names the units a message suggests: "Er, kHz or nK".
func (m Measure) offer() string {
	var names []string
	for _, symbol := range dimensions[m.Dimension].offer {
		if m.size(symbol) != nil {
			names = append(names, symbol)
		}
	}
	if m.Unit != "" && !slices.Contains(names, m.Unit) {
		names = append([]string{m.Unit}, names...)
	}
	if len(names) == 0 || m.Unit == "" {
		return "a plain number"
	}
	if len(names) == 1 {
		return names[0]
	}
	return strings.Join(names[:len(names)-1], ", ") + " or " + names[len(names)-1]
}

// size returns how large a unit is in the reference unit, or nil if a field of
// this measure does not take it.
func (m Measure) size(symbol string) *big.Rat {
	if symbol == "" {
		if m.Unit == "" || m.Dimension == Ratio {
			return big.NewRat(1, 1)
		}
		return nil
	}
	if !slices.Contains(dimensions[m.Dimension].units, symbol) {
		return nil
	}
	if m.Dimension == Depth {
		return m.depthSize(symbol)
	}
	if m.Dimension == ScatteringLength && symbol == "nm" {
		return new(big.Rat).Quo(ten(-9), rationalBohr)
	}
	if m.Dimension == ScatteringLength {
		return big.NewRat(1, 1)
	}
	u, _ := unitOf(symbol)
	return u.size
}

// depthSize returns the size of a unit of lattice depth in recoil energies.
func (m Measure) depthSize(symbol string) *big.Rat {
	if symbol == "Er" {
		return big.NewRat(1, 1)
	}
	if !(m.RecoilHz > 0) {
		return nil
	}
	u, _ := unitOf(symbol)
	return new(big.Rat).Quo(u.size, new(big.Rat).SetFloat64(m.RecoilHz))
}

// Convert returns a value of the document in another unit.
//
// It returns an error if a field of this measure does not take the unit.
func (m Measure) Convert(value float64, unit string) (float64, error) {
	to, from := m.size(unit), m.size(m.Unit)
	if to == nil || from == nil {
		return 0, fmt.Errorf("session: unit %q, want %s", unit, m.offer())
	}
	if unit == m.Unit {
		return value, nil
	}
	exact := new(big.Rat).SetFloat64(value)
	if exact == nil {
		return 0, fmt.Errorf("session: value %g, want a finite number", value)
	}
	exact.Set(rational(value))
	out, _ := exact.Quo(exact.Mul(exact, from), to).Float64()
	return out, nil
}
