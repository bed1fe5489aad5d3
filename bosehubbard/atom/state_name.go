package atom

import (
	"math"
	"strconv"
	"strings"
)

// stateName writes a state as "F=1,mF=+1"; half-integers as "9/2".
func stateName(f, mf float64) string {
	sign := ""
	if mf > 0 {
		sign = "+"
	}
	return "F=" + halves(f) + ",mF=" + sign + halves(mf)
}

func halves(x float64) string {
	if x == math.Trunc(x) {
		return strconv.FormatFloat(x, 'f', -1, 64)
	}
	return strconv.FormatFloat(2*x, 'f', -1, 64) + "/2"
}

// brackets removes what may stand around a state's name and brings its signs
// and separators to one form.
var brackets = strings.NewReplacer(
	" ", "", "\t", "", "_", "", "|", "", "<", "", ">", "", "⟨", "", "⟩", "", "(", "", ")", "",
	"\u2212", "-", "\u2013", "-", ";", ",", ":", "=",
)

// parseStateName reads F and mF from the name of a state. Both are multiples of
// one half; whether the species has them is for the caller to see.
func parseStateName(name string) (f, mf float64, ok bool) {
	text := brackets.Replace(strings.ToLower(name))
	if !strings.Contains(text, ",") {
		text = strings.Replace(text, "m", ",m", 1)
	}
	first, second, ok := strings.Cut(text, ",")
	if !ok {
		return 0, 0, false
	}
	f, okF := parseHalves(strings.TrimPrefix(first, "f="))
	second = strings.TrimPrefix(second, "mf=")
	mf, okM := parseHalves(strings.TrimPrefix(second, "m="))
	return f, mf, okF && okM
}

// parseHalves reads "1", "+1", "-3/2" or "4.5".
func parseHalves(text string) (float64, bool) {
	numerator, halved := strings.CutSuffix(text, "/2")
	x, err := strconv.ParseFloat(numerator, 64)
	if halved {
		x /= 2
	}
	if err != nil || 2*x != math.Trunc(2*x) || math.Abs(x) > 100 {
		return 0, false
	}
	return x, true
}
