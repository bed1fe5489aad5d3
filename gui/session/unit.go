package session

import (
	"math/big"
	"slices"
	"strings"

	"hilltop/bosehubbard/si"
)

// Dimension says what a number measures.
type Dimension int

// Dimensions of the fields of a plan.
const (
	Number Dimension = iota
	Ratio
	Power
	FieldStrength
	Depth  // an energy that is also counted in recoil energies
	Energy // E/h
	Duration
	Length
	ScatteringLength
	Entropy // per atom
	FieldGradient
	FieldCurvature // B''/B
)

// dimension holds the words of a message: "22 mW is <noun>; give <offer>".
type dimension struct {
	noun  string
	offer []string // the units a message names
	units []string // every unit a field of the dimension takes, first the reference
}

var dimensions = [...]dimension{
	Number:           {"a number", nil, nil},
	Ratio:            {"a ratio", []string{"%"}, []string{"%"}},
	Power:            {"a power", []string{"W", "mW"}, []string{"W", "mW", "uW", "kW"}},
	FieldStrength:    {"a magnetic field", []string{"G", "mT"}, []string{"G", "mG", "mT", "T", "uT"}},
	Depth:            {"an energy", []string{"Er", "kHz", "nK"}, []string{"Er", "Hz", "kHz", "MHz", "nK", "uK"}},
	Energy:           {"an energy", []string{"Hz", "kHz", "nK"}, []string{"Hz", "kHz", "MHz", "nK", "uK"}},
	Duration:         {"a duration", []string{"ms", "s"}, []string{"ms", "s", "us"}},
	Length:           {"a length", []string{"um", "nm"}, []string{"m", "mm", "um", "nm"}},
	ScatteringLength: {"a length", []string{"a0", "nm"}, []string{"a0", "nm"}},
	Entropy:          {"an entropy", []string{"kB"}, []string{"kB"}},
	FieldGradient:    {"a field gradient", []string{"G/cm", "T/m"}, []string{"G/cm", "T/m", "mT/m"}},
	FieldCurvature:   {"a curvature", []string{"1/cm²", "1/m²"}, []string{"1/cm²", "1/m²"}},
}

// unit is one spelling with its size in the reference unit of its kind. Er has
// none: it depends on the axis.
type unit struct {
	symbol string
	size   *big.Rat
	noun   string // what a number with this unit is called
}

// units lists every unit that is understood, with sizes that are exact: powers
// of ten, and the ratios of the defined constants kB and h.
var units = []unit{
	{"W", ten(0), "a power"}, {"mW", ten(-3), "a power"}, {"uW", ten(-6), "a power"}, {"kW", ten(3), "a power"},
	{"G", ten(0), "a magnetic field"}, {"mG", ten(-3), "a magnetic field"}, {"T", ten(4), "a magnetic field"},
	{"mT", ten(1), "a magnetic field"}, {"uT", ten(-2), "a magnetic field"},
	{"Hz", ten(0), "a frequency"}, {"kHz", ten(3), "a frequency"}, {"MHz", ten(6), "a frequency"},
	{"nK", kelvin(-9), "a temperature"}, {"uK", kelvin(-6), "a temperature"}, {"Er", nil, "an energy"},
	{"ms", ten(0), "a duration"}, {"s", ten(3), "a duration"}, {"us", ten(-3), "a duration"},
	{"m", ten(0), "a length"}, {"mm", ten(-3), "a length"}, {"um", ten(-6), "a length"}, {"nm", ten(-9), "a length"},
	{"a0", new(big.Rat).SetFloat64(si.BohrRadius), "a length"},
	{"kB", ten(0), "an entropy"}, {"%", ten(-2), "a ratio"},
	{"G/cm", ten(0), "a field gradient"}, {"T/m", ten(2), "a field gradient"}, {"mT/m", ten(-1), "a field gradient"},
	{"1/cm²", ten(0), "a curvature"}, {"1/m²", ten(-4), "a curvature"},
	{"mA", nil, "a current"}, {"A", nil, "a current"}, {"V", nil, "a voltage"}, {"mV", nil, "a voltage"},
	{"g", nil, "a mass"}, {"kg", nil, "a mass"}, {"rad/s", nil, "an angular frequency"}, {"cm", ten(-2), "a length"},
}

func ten(exponent int64) *big.Rat {
	power := new(big.Int).Exp(big.NewInt(10), big.NewInt(max(exponent, -exponent)), nil)
	if exponent < 0 {
		return new(big.Rat).SetFrac(big.NewInt(1), power)
	}
	return new(big.Rat).SetInt(power)
}

// kelvin returns 10^exponent kB K/h in Hz.
func kelvin(exponent int64) *big.Rat {
	perKelvin := new(big.Rat).Quo(rational(si.BoltzmannConstant), rational(si.PlanckConstant))
	return perKelvin.Mul(perKelvin, ten(exponent))
}

// rational returns the shortest decimal that stands for x, exactly.
func rational(x float64) *big.Rat {
	r, _ := new(big.Rat).SetString(shortest(x))
	return r
}

func unitOf(symbol string) (unit, bool) {
	i := slices.IndexFunc(units, func(u unit) bool { return u.symbol == symbol })
	if i < 0 {
		return unit{}, false
	}
	return units[i], true
}

// spellings turns what people write into the symbols of the table.
var spellings = strings.NewReplacer(
	"µ", "u", "μ", "u", "²", "2", "^", "", "₀", "0", "_", "", "−", "-",
)

// aliases holds the spellings that differ by more than letters.
var aliases = map[string]string{
	"1/cm2": "1/cm²", "cm-2": "1/cm²", "/cm2": "1/cm²", "1/m2": "1/m²", "m-2": "1/m²", "/m2": "1/m²",
	"ER": "Er", "er": "Er", "recoil": "Er", "gauss": "G", "Gauss": "G", "tesla": "T", "Tesla": "T", "watt": "W",
	"sec": "s", "kb": "kB", "KB": "kB", "percent": "%",
}

// symbolFor returns the table's symbol for a typed unit. Letters of the wrong
// case are forgiven where only one unit fits.
func symbolFor(typed string) (string, bool) {
	plain := spellings.Replace(strings.TrimSpace(typed))
	if alias, ok := aliases[plain]; ok {
		return alias, true
	}
	if _, ok := unitOf(plain); ok {
		return plain, true
	}
	var found []string
	for _, u := range units {
		if strings.EqualFold(u.symbol, plain) {
			found = append(found, u.symbol)
		}
	}
	if len(found) == 1 {
		return found[0], true
	}
	return "", false
}
