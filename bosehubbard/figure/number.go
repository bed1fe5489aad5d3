package figure

import (
	"math"
	"strconv"
	"strings"
)

// Number writes v with so many significant digits, commas between thousands, a
// true minus sign, and an exponent only below 1e-4 and from 1e7.
func Number(v float64, digits int) string {
	switch {
	case math.IsInf(v, 1):
		return "∞"
	case math.IsInf(v, -1):
		return "−∞"
	case v == 0:
		return "0"
	}
	size := math.Abs(v)
	if size < 1e-4 || size >= 1e7 {
		return exponent(v, digits)
	}
	decimals := digits - 1 - int(math.Floor(math.Log10(size)))
	text := strconv.FormatFloat(round(v, decimals), 'f', max(0, decimals), 64)
	if strings.ContainsRune(text, '.') {
		text = strings.TrimRight(strings.TrimRight(text, "0"), ".")
	}
	return minus(thousands(text))
}

// Signed is Number with a plus sign where v is positive.
func Signed(v float64, digits int) string {
	return plus(v) + Number(v, digits)
}

// decimal writes v with so many decimals, as the numbers along an axis need.
func decimal(v float64, decimals int) string {
	text := strconv.FormatFloat(v, 'f', max(0, decimals), 64)
	if strings.Trim(text, "-0.") == "" {
		text = strings.TrimPrefix(text, "-")
	}
	return minus(thousands(text))
}

func exponent(v float64, digits int) string {
	text := strconv.FormatFloat(v, 'e', digits-1, 64)
	mantissa, power, _ := strings.Cut(text, "e")
	if strings.ContainsRune(mantissa, '.') {
		mantissa = strings.TrimRight(strings.TrimRight(mantissa, "0"), ".")
	}
	n, _ := strconv.Atoi(power)
	return minus(mantissa + "e" + strconv.Itoa(n))
}

// round rounds to so many decimals, which may be negative.
func round(v float64, decimals int) float64 {
	scale := math.Pow(10, math.Abs(float64(decimals)))
	if decimals < 0 {
		return math.Round(v/scale) * scale
	}
	return v
}

func minus(text string) string { return strings.ReplaceAll(text, "-", "−") }

// thousands puts commas into the whole part of a number.
func thousands(text string) string {
	whole, rest, _ := strings.Cut(text, ".")
	sign := ""
	if strings.HasPrefix(whole, "-") {
		sign, whole = "-", whole[1:]
	}
	if len(whole) > 3 {
		var b strings.Builder
		for i, digit := range whole {
			if i > 0 && (len(whole)-i)%3 == 0 {
				b.WriteByte(',')
			}
			b.WriteRune(digit)
		}
		whole = b.String()
	}
	if rest != "" {
		rest = "." + rest
	}
	return sign + whole + rest
}

// niceAbove returns the smallest of 1, 2, 5 x 10^n that is at least v > 0.
func niceAbove(v float64) float64 {
	power := math.Pow(10, math.Floor(math.Log10(v)))
	for power*10 < v { // where the logarithm was rounded down
		power *= 10
	}
	for _, m := range [...]float64{1, 2, 5, 10} {
		if m*power >= v {
			return m * power
		}
	}
	return 10 * power
}
