package fock

import (
	"fmt"
	"math"
	"math/big"
	"strconv"
)

// maxDigits is the length up to which Dimension writes the number out.
const maxDigits = 10_000

// Dimension returns the number of states of atoms bosons on sites sites,
//
//	D = (N + L - 1)! / (N! (L - 1)!)
//
// exactly. Cost O(digits^2).
//
// It returns an error if sites < 1, atoms < 0, or D has more than 10,000
// digits; LogDimension has no such limit.
func Dimension(sites, atoms int) (*big.Int, error) {
	if err := check(sites, atoms); err != nil {
		return nil, err
	}
	if digits := LogDimension(sites, atoms) / math.Ln10; digits > maxDigits {
		return nil, fmt.Errorf("fock: %d atoms on %d sites make a number of states with about %.3g digits, want at most %d",
			atoms, sites, digits, maxDigits)
	}
	return binomial(sites, atoms), nil
}

// LogDimension returns ln D of Dimension, the entropy of infinite temperature.
// It is 0 for arguments that Dimension refuses.
//
// Relative accuracy 1e-13 of ln D or better. Cost O(1000) at most.
//
// Source: product of the factors; for more than a thousand of them Stirling's
// series, Abramowitz and Stegun 6.1.41, from memory.
func LogDimension(sites, atoms int) float64 {
	if check(sites, atoms) != nil {
		return 0
	}
	k := float64(min(sites-1, atoms))
	m := float64(max(sites-1, atoms)) // D = (m + k)! / (m! k!)
	if k <= 1000 {
		sum := 0.0
		for i := 1.0; i <= k; i++ {
			sum += math.Log1p(m / i)
		}
		return sum
	}
	// The leading terms are arranged so that nothing large cancels. The next
	// correction is below k^-3/360, 3e-12 absolute against ln D > 1386.
	n := m + k
	return k*math.Log1p(m/k) + m*math.Log1p(k/m) - math.Log(2*math.Pi*k*(m/n))/2 +
		(1/n-1/m-1/k)/12
}

// check refuses numbers that are no system.
func check(sites, atoms int) error {
	if sites < 1 {
		return fmt.Errorf("fock: %d sites, want at least 1", sites)
	}
	if atoms < 0 {
		return fmt.Errorf("fock: %d atoms, want at least 0", atoms)
	}
	return nil
}

// binomial returns D exactly.
func binomial(sites, atoms int) *big.Int {
	k, m := min(sites-1, atoms), max(sites-1, atoms)
	d := big.NewInt(1)
	var factor big.Int
	for i := 1; i <= k; i++ { // d = (m + i)! / (m! i!) after each step, an integer
		factor.SetInt64(int64(m))
		factor.Add(&factor, big.NewInt(int64(i)))
		d.Mul(d, &factor)
		d.Quo(d, factor.SetInt64(int64(i)))
	}
	return d
}

// dimensionText writes D in full up to 30 digits and as 1.353e+40 beyond.
func dimensionText(sites, atoms int) string {
	digits := LogDimension(sites, atoms) / math.Ln10
	if digits < 30 {
		return binomial(sites, atoms).String()
	}
	if digits > 1e9 {
		return "10^(" + strconv.FormatFloat(digits, 'g', 4, 64) + ")"
	}
	exponent, fraction := math.Modf(digits)
	mantissa := strconv.FormatFloat(math.Pow(10, fraction), 'f', 3, 64)
	if mantissa == "10.000" {
		mantissa, exponent = "1.000", exponent+1
	}
	return mantissa + "e+" + strconv.FormatFloat(exponent, 'f', 0, 64)
}
