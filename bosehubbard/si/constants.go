package si

import "math"

// The exact constants of the SI and the measured ones of CODATA 2022. The
// standard uncertainty stands in parentheses and applies to the last digits.
const (
	PlanckConstant        = 6.62607015e-34                 // h, J s, exact. Source: SI 2019
	ReducedPlanckConstant = PlanckConstant / (2 * math.Pi) // hbar, J s, exact. Source: SI 2019, h/2 pi
	BoltzmannConstant     = 1.380649e-23                   // kB, J/K, exact. Source: SI 2019
	SpeedOfLight          = 299792458.0                    // c, m/s, exact. Source: SI 2019
	ElementaryCharge      = 1.602176634e-19                // e, C, exact. Source: SI 2019
	AtomicMassConstant    = 1.66053906892e-27              // u, kg, (52). Source: CODATA 2022
	BohrRadius            = 5.29177210544e-11              // a0, m, (82). Source: CODATA 2022
	BohrMagneton          = 9.2740100657e-24               // muB, J/T, (29). Source: CODATA 2022
	ElectricConstant      = 8.8541878188e-12               // eps0, F/m, (14). Source: CODATA 2022
	MagneticConstant      = 1.25663706127e-6               // mu0, N/A^2, (20). Source: CODATA 2022
	ElectronMass          = 9.1093837139e-31               // me, kg, (28). Source: CODATA 2022
	FineStructureConstant = 7.2973525643e-3                // alpha, 1, (11). Source: CODATA 2022
	StandardGravity       = 9.80665                        // gn, m/s^2, exact by convention. Source: CGPM 1901
	Gauss                 = 1e-4                           // G, T, exact. Source: SI brochure, 9th edition
)

// Constant is one row of the table of constants, in the SI unit named by Unit;
// an Uncertainty of 0 means exact.
type Constant struct {
	Name, Symbol, Unit string
	Value, Uncertainty float64
	Source             string
}

const (
	exact  = "SI 2019, exact by definition"
	codata = "CODATA 2022, Rev. Mod. Phys. 97, 025002 (2025)"
)

// Constants returns every constant of the package with its one-sigma
// uncertainty and its source. The slice is the caller's own.
func Constants() []Constant {
	return []Constant{
		{"Planck constant", "h", "J s", PlanckConstant, 0, exact},
		{"reduced Planck constant", "hbar", "J s", ReducedPlanckConstant, 0, exact},
		{"Boltzmann constant", "kB", "J/K", BoltzmannConstant, 0, exact},
		{"speed of light in vacuum", "c", "m/s", SpeedOfLight, 0, exact},
		{"elementary charge", "e", "C", ElementaryCharge, 0, exact},
		{"atomic mass constant", "u", "kg", AtomicMassConstant, 5.2e-37, codata},
		{"Bohr radius", "a0", "m", BohrRadius, 8.2e-21, codata},
		{"Bohr magneton", "muB", "J/T", BohrMagneton, 2.9e-33, codata},
		{"vacuum electric permittivity", "eps0", "F/m", ElectricConstant, 1.4e-21, codata},
		{"vacuum magnetic permeability", "mu0", "N/A^2", MagneticConstant, 2.0e-16, codata},
		{"electron mass", "me", "kg", ElectronMass, 2.8e-40, codata},
		{"fine-structure constant", "alpha", "1", FineStructureConstant, 1.1e-12, codata},
		{"standard acceleration of gravity", "gn", "m/s^2", StandardGravity, 0, "3rd CGPM, 1901, exact by convention"},
		{"gauss", "G", "T", Gauss, 0, "SI brochure, 9th edition (2019), exact"},
	}
}
