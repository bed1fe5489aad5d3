package session

import (
	"math/big"
	"strconv"
	"strings"

	"hilltop/bosehubbard/num/digits"
	"hilltop/bosehubbard/si"
)

// minus is the sign of negative numbers on the screen.
const minus = digits.Minus

var rationalBohr = rational(si.BohrRadius)

// shortest returns the shortest decimal that reads back as x.
func shortest(x float64) string { return strconv.FormatFloat(x, 'g', -1, 64) }

// shownDigits is how many significant digits a field shows.
const shownDigits = 7

// Digits writes a number with at most the given significant digits, without
// trailing zeros, with U+2212 for minus. Very large and very small numbers are
// written like 1.2e−7.
func Digits(x float64, n int) string { return digits.Format(x, max(n, 1)) }

func proper(text string) string { return strings.ReplaceAll(text, "-", minus) }

// signed puts a sign before a number that has none.
func signed(text string) string {
	if text == "0" || strings.HasPrefix(text, minus) {
		return text
	}
	return "+" + text
}

// FormatNumber writes a value of the document in the unit, without the unit.
// Signed measures always show the sign.
func (m Measure) FormatNumber(value float64, unit string) string {
	return m.formatDigits(value, unit, shownDigits)
}

func (m Measure) formatDigits(value float64, unit string, digits int) string {
	shown, err := m.Convert(value, unit)
	if err != nil {
		shown = value
	}
	if m.Whole && unit == m.Unit && digits == shownDigits {
		digits = 17
	}
	text := Digits(shown, digits)
	if m.Signed {
		return signed(text)
	}
	return text
}

// Format writes a value of the document with its unit: "−984 Hz", "200 mW".
func (m Measure) Format(value float64, unit string) string {
	return withUnit(m.FormatNumber(value, unit), unit)
}

// Fit writes a value with its unit in at most width characters if it can: digits
// go first, the unit never.
func (m Measure) Fit(value float64, unit string, width int) string {
	text := m.Format(value, unit)
	for digits := shownDigits - 1; digits > 0 && len([]rune(text)) > width; digits-- {
		text = withUnit(m.formatDigits(value, unit, digits), unit)
	}
	return text
}

func withUnit(number, unit string) string {
	switch unit {
	case "":
		return number
	case "%":
		return number + " %"
	}
	return number + " " + Symbol(unit)
}

// Symbol returns a unit as it is printed: "µm" for um.
func Symbol(unit string) string {
	if len(unit) > 1 && unit[0] == 'u' {
		return "µ" + unit[1:]
	}
	return unit
}

// StepSize says how far one step of a key goes.
type StepSize int

// Steps of the keys: Up and Down, with Shift, and Page Up and Page Down.
const (
	LastDigit StepSize = iota
	TenthOfDigit
	TenDigits
)

// StepText moves the number at the beginning of a text by n units of its last
// digit, a tenth or ten of them, and keeps what follows it. A text without a
// number comes back as it is.
func StepText(text string, n int, size StepSize) string {
	begin, end := numberIn(text)
	if begin == end {
		return text
	}
	number := strings.ReplaceAll(strings.ReplaceAll(text[begin:end], minus, "-"), ",", ".")
	plus := strings.HasPrefix(number, "+")
	number = strings.TrimPrefix(number, "+")
	mantissa, exponent, hasExponent := cutExponent(number)
	_, fraction, _ := strings.Cut(mantissa, ".")
	places := len(fraction)
	step := big.NewRat(int64(n), 1)
	switch size {
	case TenthOfDigit:
		step.Quo(step, ten(int64(places+1)))
		places++
	case TenDigits:
		step.Quo(step.Mul(step, ten(1)), ten(int64(places)))
	default:
		step.Quo(step, ten(int64(places)))
	}
	value, ok := new(big.Rat).SetString(mantissa)
	if !ok {
		return text
	}
	out := proper(value.Add(value, step).FloatString(places))
	if plus && value.Sign() != 0 && !strings.HasPrefix(out, minus) {
		out = "+" + out
	}
	if hasExponent {
		out += "e" + proper(exponent)
	}
	return text[:begin] + out + text[end:]
}

func cutExponent(number string) (mantissa, exponent string, found bool) {
	if i := strings.IndexAny(number, "eE"); i >= 0 {
		return number[:i], number[i+1:], true
	}
	return number, "", false
}
