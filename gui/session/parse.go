package session

import (
	"fmt"
	"math"
	"math/big"
	"regexp"
	"slices"
	"strconv"
	"strings"
	"unicode"
	"unicode/utf8"
)

const (
	longestInput = 200 // characters of one field
	longestShown = 40  // characters of a typed text in a message
	mostFactors  = 20
	mostDecades  = 400 // decimal exponents beyond which no number is kept
)

// plainNumber matches one number: digits with an optional point or comma and an
// optional exponent.
var plainNumber = regexp.MustCompile(`^[+\-−]?(?:[0-9]+(?:[.,][0-9]*)*|[.,][0-9]+)(?:[eE][+\-−]?[0-9]+)?`)

// numberIn returns where the first number of a text begins and ends; both are 0
// if it does not begin with one.
func numberIn(text string) (begin, end int) {
	trimmed := strings.TrimLeftFunc(text, unicode.IsSpace)
	begin = len(text) - len(trimmed)
	at := plainNumber.FindStringIndex(trimmed)
	if at == nil {
		return 0, 0
	}
	return begin, begin + at[1]
}

// Parse reads what was typed into a field whose number is shown in the given
// unit.
//
//	text = number { ("*" | "/") number } [ unit ]
//
// A number without a unit takes the shown one. "-" and "−" are minus; a comma is
// a decimal comma unless it could stand for thousands. The result is the float64
// nearest to the exact product.
//
// It returns a *QuantityError that says what to give instead.
func (m Measure) Parse(text, shown string) (Quantity, error) {
	typed := shorten(strings.TrimSpace(text))
	bad := func(reason string, args ...any) (Quantity, error) {
		return Quantity{}, &QuantityError{typed, fmt.Sprintf(reason, args...)}
	}
	if reason := m.unreadable(text); reason != "" {
		if strings.ContainsFunc(text, unicode.IsControl) || !utf8.ValidString(text) {
			typed = ""
		}
		return bad("%s", reason)
	}
	product, rest, reason := expression(strings.TrimSpace(text))
	if reason != "" {
		return bad("%s", reason)
	}
	unit, reason := m.unitFor(rest, shown)
	if reason != "" {
		return bad("%s", reason)
	}
	product.Mul(product, m.size(unit))
	product.Quo(product, m.size(m.Unit))
	value, _ := product.Float64()
	switch {
	case math.IsInf(value, 0):
		return bad("is too large for a number")
	case value == 0 && product.Sign() != 0:
		return bad("is too small for a number; 0 is allowed")
	case m.Whole && value != math.Trunc(value):
		return bad("is no whole number")
	}
	return Quantity{Value: value + 0, Unit: unit}, nil
}

// unreadable returns what is wrong with a text before any number is looked for.
func (m Measure) unreadable(text string) string {
	switch {
	case strings.TrimSpace(text) == "" && !strings.ContainsAny(text, "\r\n"):
		return "empty; give " + m.example()
	case strings.ContainsAny(text, "\r\n\v\f\u0085\u2028\u2029"):
		return "more than one line; give one number, like " + m.example()
	case !utf8.ValidString(text), strings.ContainsFunc(text, unicode.IsControl):
		return "has characters that cannot be shown; give " + m.example()
	case utf8.RuneCountInString(text) > longestInput:
		return fmt.Sprintf("is longer than %d characters; give one number", longestInput)
	}
	return ""
}

// example returns a text that the field would take.
func (m Measure) example() string {
	if m.Unit == "" {
		return "a number"
	}
	return "a number in " + m.offer()
}

// expression reads numbers joined by * and /, and returns their exact value and
// the text behind them, or the reason why it cannot.
func expression(text string) (value *big.Rat, rest, reason string) {
	value = big.NewRat(1, 1)
	divide := false
	for range mostFactors {
		text = strings.TrimLeftFunc(text, unicode.IsSpace)
		factor, after, reason := number(text)
		if reason != "" {
			return nil, "", reason
		}
		if divide && factor.Sign() == 0 {
			return nil, "", "divides by zero"
		}
		if divide {
			factor.Inv(factor)
		}
		value.Mul(value, factor)
		text = strings.TrimLeftFunc(after, unicode.IsSpace)
		operator, size := utf8.DecodeRuneInString(text)
		switch {
		case strings.ContainsRune("*×·", operator):
			divide = false
		case operator == '/' && startsNumber(text[size:]):
			divide = true
		default:
			return value, text, ""
		}
		text = text[size:]
	}
	return nil, "", fmt.Sprintf("has more than %d factors", mostFactors)
}

func startsNumber(text string) bool {
	begin, end := numberIn(text)
	return end > begin
}

// number reads one number at the beginning of the text.
func number(text string) (value *big.Rat, rest, reason string) {
	found := plainNumber.FindString(text)
	if found == "" {
		return nil, "", noNumber(text)
	}
	rest = text[len(found):]
	if secondNumber(rest) {
		return nil, "", "holds two numbers; write one, without marks between its digits"
	}
	plain := strings.ReplaceAll(found, minus, "-")
	mantissa, exponent, _ := cutExponent(plain)
	if reason := ambiguous(mantissa); reason != "" {
		return nil, "", reason
	}
	mantissa = strings.ReplaceAll(mantissa, ",", ".")
	power, err := strconv.Atoi(strings.TrimPrefix(exponent, "+"))
	if exponent != "" && (err != nil || power > mostDecades || power < -mostDecades) {
		if strings.HasPrefix(exponent, "-") {
			return nil, "", "is too small for a number; 0 is allowed"
		}
		return nil, "", "is too large for a number"
	}
	value, ok := new(big.Rat).SetString(strings.TrimSuffix(mantissa, "."))
	if !ok {
		return nil, "", "is no number"
	}
	value.Mul(value, ten(int64(power)))
	if f, _ := value.Float64(); math.IsInf(f, 0) {
		return nil, "", "is too large for a number"
	}
	return value, rest, ""
}

// secondNumber reports whether another number follows without an operator. The 1
// of "1/cm²" belongs to the unit.
func secondNumber(rest string) bool {
	next := strings.TrimLeftFunc(rest, unicode.IsSpace)
	if strings.HasPrefix(next, "1/cm") || strings.HasPrefix(next, "1/m") {
		return false
	}
	return startsNumber(next) || strings.HasPrefix(next, "'") || strings.HasPrefix(next, "’")
}

func noNumber(text string) string {
	word := strings.ToLower(strings.TrimLeft(text, "+-−"))
	switch {
	case strings.HasPrefix(word, "nan"):
		return "is not a number; give a finite one"
	case strings.HasPrefix(word, "inf"), strings.HasPrefix(word, "∞"):
		return "is not finite; give a finite number"
	case word == "":
		return "ends where a number should stand"
	}
	return "does not begin with a number"
}

// ambiguous asks about a comma that may be a decimal comma or may group
// thousands. Groups have three digits, and the first does not begin with 0.
func ambiguous(mantissa string) string {
	digits := strings.TrimLeft(mantissa, "+-")
	commas, points := strings.Count(digits, ","), strings.Count(digits, ".")
	plain := strings.ReplaceAll(digits, ",", "")
	switch {
	case points > 1:
		return "has more than one decimal point; write one number"
	case commas > 1 || commas == 1 && points == 1:
		return fmt.Sprintf("mixes marks between digits; write %s if the comma groups thousands", plain)
	case commas == 0:
		return ""
	}
	whole, fraction, _ := strings.Cut(digits, ",")
	if len(fraction) != 3 || len(whole) == 0 || len(whole) > 3 || whole[0] == '0' {
		return ""
	}
	return fmt.Sprintf("can be read in two ways: write %s.%s or %s%s", whole, strings.TrimRight(fraction, "0")+zeroIf(fraction), whole, fraction)
}

// zeroIf keeps one digit behind the point of a fraction of zeros.
func zeroIf(fraction string) string {
	if strings.Trim(fraction, "0") == "" {
		return "0"
	}
	return ""
}

// unitFor returns the unit that the text behind a number names, the shown one if
// there is none, or the reason why the field does not take it.
func (m Measure) unitFor(text, shown string) (symbol, reason string) {
	if text == "" {
		if m.size(shown) == nil {
			return m.Unit, ""
		}
		return shown, ""
	}
	if text == "J" {
		return "", "leaves open whether J is joule or the tunnelling; give " + m.offer()
	}
	known, ok := symbolFor(text)
	if !ok {
		return "", fmt.Sprintf("has an unknown unit; give %s", m.offer())
	}
	if m.size(known) != nil {
		return known, ""
	}
	u, _ := unitOf(known)
	if known == "Er" && m.Dimension == Energy || m.Dimension == Depth && u.size != nil && slices.Contains(dimensions[Depth].units, known) {
		return "", fmt.Sprintf("needs the recoil energy of an axis, which is not known here; give %s", m.offer())
	}
	return "", fmt.Sprintf("is %s; give %s", u.noun, m.offer())
}

func shorten(text string) string { return shortenTo(text, longestShown) }
