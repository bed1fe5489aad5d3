// Package digits writes numbers for people: significant digits, a true minus
// sign (U+2212), no exponent where plain digits are as short.
package digits

import (
	"math"
	"strconv"
	"strings"
)

// Minus is the minus sign of every number shown to people.
const Minus = "−"

// Format writes v with at most n significant digits and no trailing zeros.
// Numbers from 1e-5 up to the larger of 1e9 and 10^(n+3) are written plainly,
// others like 1.2e−7. v is finite, n at least 1.
func Format(v float64, n int) string {
	if v == 0 {
		return "0"
	}
	text := strconv.FormatFloat(v, 'e', n-1, 64)
	mantissa, exponent, _ := strings.Cut(text, "e")
	power, _ := strconv.Atoi(exponent)
	if power < -5 || power >= max(n+3, 9) {
		if strings.Contains(mantissa, ".") {
			mantissa = strings.TrimRight(strings.TrimRight(mantissa, "0"), ".")
		}
		return proper(mantissa + "e" + strconv.Itoa(power))
	}
	rounded, _ := strconv.ParseFloat(text, 64)
	return proper(strconv.FormatFloat(rounded, 'f', -1, 64))
}

// Signed is Format with a plus sign where v is positive.
func Signed(v float64, n int) string {
	if v > 0 {
		return "+" + Format(v, n)
	}
	return Format(v, n)
}

// Size is Format of the absolute value.
func Size(v float64, n int) string { return Format(math.Abs(v), n) }

func proper(text string) string { return strings.ReplaceAll(text, "-", Minus) }
