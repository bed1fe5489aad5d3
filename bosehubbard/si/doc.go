// Package si holds the constants of nature and the conversions between the
// units in which ultracold-atom work states an energy.
//
// Everything is in SI units. An energy given as a frequency is E/h in hertz; a
// name that ends in RadPerS is E/hbar. A recoil energy Er = h^2/(8 m d^2) needs
// a mass and a site spacing, so the conversions to and from it take the recoil
// in Hz as an argument.
//
// References: CODATA 2022, P. J. Mohr, D. B. Newell, B. N. Taylor and
// E. Tiesinga, Reviews of Modern Physics 97, 025002 (2025); The International
// System of Units, 9th edition, BIPM (2019), for the exact constants.
package si
