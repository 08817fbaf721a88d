package film

// Constants of nature, CODATA 2018 (E. Tiesinga and others, Reviews of Modern Physics 93 (2021)
// 025010), from memory. Those of the revised SI are exact.
const (
	elementaryCharge = 1.602176634e-19  // e in C, exact
	planckConstant   = 6.62607015e-34   // h in J·s, exact
	speedOfLight     = 299792458        // c in m/s, exact
	boltzmann        = 1.380649e-23     // k in J/K, exact
	electronMass     = 9.1093837015e-31 // m₀ in kg, relative uncertainty 3e-10
	electricConstant = 8.8541878128e-12 // ε₀ in F/m, relative uncertainty 1.5e-10
	freeSpaceOhm     = 376.730313668    // Z₀ = 1/(ε₀ c) in Ω, relative uncertainty 1.5e-10
)
