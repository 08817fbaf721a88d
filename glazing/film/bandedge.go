package film

// The edge of absorption in the ultraviolet: where it lies, how it follows the carriers, and its terms.

import (
	"math"
	"math/cmplx"
)

// BursteinMossEV returns by how much carriers of a density in 1/cm³ that fill the bottom of a band widen
// the gap that light sees, in eV, ħ²(3π²N)^(2/3)/(2 m_r), with the reduced mass m_r in electron masses.
func BursteinMossEV(densityCM3, reducedMass float64) float64 {
	fermi := math.Cbrt(3 * math.Pi * math.Pi * densityCM3 * perCM3) // k_F in 1/m
	const hbar = planckConstant / (2 * math.Pi)
	x := hbar * fermi
	return x * x / (2 * reducedMass * electronMass) / elementaryCharge // E. Burstein, Physical Review 93 (1954) 632; T. S. Moss 1954
}

// TaucLorentz is the onset of absorption of an amorphous or fine-grained oxide (G. E. Jellison and F. A.
// Modine, Applied Physics Letters 69 (1996) 371, with the erratum, from memory), with a tail below the gap
// if UrbachEV is above 0:
//
//	ε₂ = A E0 C (E − Eg)²/(((E² − E0²)² + C²E²) E) above the gap Eg, else 0
//
// The tail is ε₂ ∝ exp(E/Eu)/E, which is α ∝ exp(E/Eu) (F. Urbach 1953). It begins where it meets the
// curve above with its slope (M. Foldyna and others, Proceedings of SPIE 5445 (2004) 301, from memory).
// ε₁ follows by the relation of Kramers and Kronig, in closed form.
type TaucLorentz struct {
	AmplitudeEV  float64 // A
	EnergyEV     float64 // E0, the peak of the oscillator, above the gap
	BroadeningEV float64 // C, above 0 and below 2 E0
	GapEV        float64 // Eg
	UrbachEV     float64 // Eu, 0 for no tail

	tailFromEV float64 // where the tail begins, once it is known
}

// ready returns the term with the beginning of its tail found once for all energies.
func (t TaucLorentz) ready() TaucLorentz {
	t.tailFromEV = t.tailEV()
	return t
}

// Epsilon returns the term at a photon energy; it adds nothing to ε∞ but itself.
func (t TaucLorentz) Epsilon(eV float64) complex128 {
	from := t.tailFromEV
	if from == 0 {
		from = t.tailEV()
	}
	re := t.real(eV, from)
	im := 0.0
	switch {
	case eV > from:
		im = t.imaginary(eV)
	case t.UrbachEV > 0:
		im = from * t.imaginary(from) / eV * math.Exp((eV-from)/t.UrbachEV) // Urbach 1953
	}
	if t.UrbachEV > 0 {
		re += t.tail(eV, from)
	}
	return complex(re, im)
}

// imaginary is ε₂ above the gap.
func (t TaucLorentz) imaginary(eV float64) float64 {
	over := eV - t.GapEV
	if over <= 0 {
		return 0
	}
	return t.AmplitudeEV * t.EnergyEV * t.BroadeningEV * over * over / (t.quartic(eV) * eV) // Jellison and Modine 1996 (5)
}

// quartic is (E² − E0²)² + C²E².
func (t TaucLorentz) quartic(eV float64) float64 {
	x, y := eV*eV-float64(t.EnergyEV*t.EnergyEV), t.BroadeningEV*eV
	return float64(x*x) + float64(y*y)
}

// tailEV is the energy at which the tail meets the curve, the gap if there is no tail: the slope of
// ln(E ε₂) there is 1/Eu.
func (t TaucLorentz) tailEV() float64 {
	if t.UrbachEV <= 0 {
		return t.GapEV
	}
	slope := func(eV float64) float64 {
		x := eV*eV - float64(t.EnergyEV*t.EnergyEV)
		quartic := 2 * eV * (2*x + float64(t.BroadeningEV*t.BroadeningEV)) // its derivative
		return 2/(eV-t.GapEV) - quartic/t.quartic(eV)
	}
	// The slope falls from +∞ at the gap; the first place where it is 1/Eu lies within some Eu of it.
	step := t.UrbachEV / 4
	low, high := t.GapEV, t.GapEV+step
	for slope(high) > 1/t.UrbachEV {
		low, high = high, high+step
	}
	for range 40 {
		if mid := low + (high-low)/2; slope(mid) > 1/t.UrbachEV {
			low = mid
		} else {
			high = mid
		}
	}
	return high
}

// real is the part of ε₁ by absorption above an energy, (2/π) P∫ x ε₂(x)/(x² − E²) dx. The integrand is
// a fraction with simple poles at ±E and at the four zeros of the quartic, and falls as x⁻⁴; its integral
// is −Σ Res ln(from − pole), which for the gap is the closed form of Jellison and Modine.
func (t TaucLorentz) real(eV, from float64) float64 {
	broad := t.BroadeningEV * t.BroadeningEV
	square := float64(t.EnergyEV * t.EnergyEV)
	z := complex(square-broad/2, t.BroadeningEV*math.Sqrt(square-broad/4)) // p² of the poles p and −p; those of z* mirror them
	pole := cmplx.Sqrt(z)
	over := func(x complex128) complex128 { x -= complex(t.GapEV, 0); return x * x }
	start := complex(from, 0)
	share := (z - cmplx.Conj(z)) * (z - complex(eV*eV, 0)) * 2 * pole
	sum := 2 * real((over(pole)*cmplx.Log(start-pole)-over(-pole)*cmplx.Log(start+pole))/share)
	sum += (real(over(complex(eV, 0)))*math.Log(apart(eV, from)) - real(over(complex(-eV, 0)))*math.Log(eV+from)) / (2 * eV * t.quartic(eV))
	return -2 / math.Pi * t.AmplitudeEV * t.EnergyEV * t.BroadeningEV * sum
}

// apart is the distance of two energies, never 0: the logarithms of it that meet at the start of the tail
// cancel.
func apart(a, b float64) float64 { return math.Max(math.Abs(a-b), 1e-12*b) }

// tail is the part of ε₁ by the tail that begins at an energy, in closed form by exponential integrals.
func (t TaucLorentz) tail(eV, from float64) float64 {
	w := t.UrbachEV
	near := math.Copysign(apart(eV, from), from-eV) / w
	sum := scaledEi(near) - scaledEi((from+eV)/w) -
		math.Exp(-from/w)*(scaledEi(-eV/w)-scaledEi(eV/w))
	return from * t.imaginary(from) * sum / (math.Pi * eV)
}

// scaledEi is e^(−x) Ei(x), the exponential integral without its growth (M. Abramowitz and I. A. Stegun,
// Handbook of Mathematical Functions, 5.1, from memory).
func scaledEi(x float64) float64 {
	const gamma = 0.57721566490153286 // Euler's constant
	switch {
	case x > 40: // 5.1.51, an asymptotic series: its least term is below 1e-16
		term, sum := 1.0, 1.0
		for k := 1.0; k < x && term > 1e-17; k++ {
			term *= k / x
			sum += term
		}
		return sum / x
	case x >= -1.5: // 5.1.10
		sum, term := 0.0, 1.0
		for k := 1.0; k < 200; k++ {
			term *= x / k
			sum += term / k
			if math.Abs(term) < 1e-18*math.Abs(sum)*k {
				break
			}
		}
		return math.Exp(-x) * (gamma + math.Log(math.Abs(x)) + sum)
	default: // 5.1.22, a continued fraction from its end
		y := -x
		f := 0.0
		for k := math.Floor(10 + 90/y); k > 0; k-- { // the rest is exp(−4√(ky))
			f = k / (1 + k/(y+f))
		}
		return -1 / (y + f)
	}
}

// An Edge is the band edge of a conducting oxide and how it follows the carriers.
type Edge struct {
	GapEV        float64 // E_g0, without carriers
	ReducedMass  float64 // m_r of Burstein and Moss in electron masses; 0 takes the effective mass, as if the other band were flat
	NarrowingEV  float64 // narrowing of the gap at 1e20 carriers in 1/cm³; it grows as the cube root of the density
	AmplitudeEV  float64 // A of Tauc and Lorentz
	AboveGapEV   float64 // by how much the peak E0 lies above the optical gap
	BroadeningEV float64 // C
	UrbachEV     float64 // Eu
}

// Figures of indium oxide, and the assumption for what narrows the gap of any.
const (
	// IndiumOxideGapEV is E_g0 of In2O3 in eV (R. L. Weiher and R. P. Ley, Journal of Applied Physics 37
	// (1966) 299, from memory).
	IndiumOxideGapEV = 3.75
	// AssumedNarrowingEV is an assumption: exchange among carriers narrows a gap as the cube root of their
	// density; 0.2 eV at 1e20/cm³ and a flat lower band leave a widening of 0.5 eV at 8e20/cm³, about as
	// I. Hamberg and others, Physical Review B 30 (1984) 3240, saw in In2O3:Sn (from memory).
	AssumedNarrowingEV = 0.2
)

// OpticalGapEV returns the gap that light sees in eV, E_g = E_g0 + Burstein–Moss − narrowing.
func (e Edge) OpticalGapEV(c Carriers) float64 {
	mass := e.ReducedMass
	if mass == 0 {
		mass = c.EffectiveMass
	}
	return e.GapEV + BursteinMossEV(c.DensityCM3, mass) - e.narrowingEV(c.DensityCM3)
}

// narrowingEV is what carriers narrow the gap by.
func (e Edge) narrowingEV(densityCM3 float64) float64 {
	return e.NarrowingEV * math.Cbrt(densityCM3/1e20) // exchange energy; an assumption
}

// Term returns the absorption at the gap that carriers leave.
func (e Edge) Term(c Carriers) TaucLorentz {
	gap := e.OpticalGapEV(c)
	return TaucLorentz{AmplitudeEV: e.AmplitudeEV, EnergyEV: gap + e.AboveGapEV, BroadeningEV: e.BroadeningEV, GapEV: gap, UrbachEV: e.UrbachEV}
}

// visibleNM is where the permittivity without free carriers is ε∞ with an edge as without it.
const visibleNM = 550

// Oxide returns the permittivity of a conducting oxide: free carriers, with falling loss above the plasma
// energy if asked for, and a band edge if one is given. ε∞ is lowered by what the edge
// adds at 550 nm, so that the index there is that of the carriers alone.
func Oxide(c Carriers, e *Edge, fallingLoss bool) Oscillators {
	o := Oscillators{EpsInf: c.EpsInf, Terms: []Term{c.Term(fallingLoss)}}
	if e != nil {
		t := e.Term(c).ready()
		o.EpsInf -= real(t.Epsilon(PhotonEV(visibleNM)))
		o.Terms = append(o.Terms, t)
	}
	return o
}
