package film

// Short rules that screen conducting films, beside the exact result and never instead of it; figures of
// merit; scarce metals.

import (
	"fmt"
	"math"
)

// ThinSheetEmissivity returns the normal emissivity of a film far thinner than the skin depth, from
// its sheet resistance in Ω, 1 − (1 + 2R□/Z₀)⁻². In front of it is air, and what is behind it is opaque
// only by it.
func ThinSheetEmissivity(sheetOhm float64) float64 {
	x := 1 + 2*sheetOhm/freeSpaceOhm
	return 1 - 1/(x*x) // a sheet of a conductance; what passes it is absorbed behind
}

// LinearEmissivity returns the same for a small sheet resistance, 4R□/Z₀ ≈ 0.0106 R□ (common practice).
func LinearEmissivity(sheetOhm float64) float64 { return 4 * sheetOhm / freeSpaceOhm }

// HagenRubensEmissivity returns the normal emissivity of bulk metal at a vacuum wavelength in nm from its
// resistivity in Ω·cm, √(8 ε₀ω ρ), for ωτ far below 1 (E. Hagen and H. Rubens 1903). On films it may be a
// quarter low or three quarters high.
func HagenRubensEmissivity(resistivityOhmCM, nm float64) float64 {
	const mPerNM, mPerCM = 1e-9, 1e-2
	omega := 2 * math.Pi * speedOfLight / (nm * mPerNM)
	return math.Sqrt(8 * electricConstant * omega * resistivityOhmCM * mPerCM) // Hagen and Rubens 1903
}

// SkinDepthNM returns the depth in nm at which the field in a material of the extinction k has fallen to
// 1/e at a vacuum wavelength in nm, λ/(2πk).
func SkinDepthNM(k, nm float64) float64 { return nm / (2 * math.Pi * k) }

// RadioAttenuationDB returns the attenuation in dB of radio waves by a sheet without openings, from
// its sheet resistance in Ω, 20 log(1 + Z₀/2R□): a hint.
func RadioAttenuationDB(sheetOhm float64) float64 {
	return 20 * math.Log10(1+freeSpaceOhm/(2*sheetOhm)) // sheet in free space
}

// Haacke returns the figure of merit of a transparent conductor in 1/Ω, T¹⁰/R□ (G. Haacke, Journal of
// Applied Physics 47 (1976) 4086).
func Haacke(transmittance, sheetOhm float64) float64 { return math.Pow(transmittance, 10) / sheetOhm }

// Gordon returns conductivity over absorption of a transparent conductor in 1/Ω, −1/(R□ ln(T + R))
// (R. G. Gordon, MRS Bulletin 25 (2000) 52).
func Gordon(transmittance, reflectance, sheetOhm float64) float64 {
	return -1 / (sheetOhm * math.Log(transmittance+reflectance))
}

// MassGM2 returns the mass per area in g/m² of what makes the fraction of a film of a thickness in nm and
// a density in kg/m³.
func MassGM2(thicknessNM, densityKGM3, fraction float64) float64 {
	const gPerKG, mPerNM = 1e3, 1e-9
	return thicknessNM * mPerNM * densityKGM3 * gPerKG * fraction
}

// Scarce metals.
const (
	atomicIndium, atomicOxygen = 114.818, 15.999 // standard atomic weights of the IUPAC, from memory

	// IndiumInOxide is the mass fraction of indium in In2O3, 0.827.
	IndiumInOxide = 2 * atomicIndium / (2*atomicIndium + 3*atomicOxygen)
	// IndiumInITO is that in oxide of indium and tin, 90 to 10 by mass of the oxides, 0.744.
	IndiumInITO = 0.9 * IndiumInOxide
	// DensityITO is 7150 kg/m³; published figures are 7120 to 7160.
	DensityITO = 7150
	// DensitySilver is 10490 kg/m³ (common practice).
	DensitySilver = 10490
)

// A Screen is what the short rules say of a conducting film.
type Screen struct {
	SheetOhm            float64
	ThinSheetEmissivity float64 // normal
	LinearEmissivity    float64
	HagenRubens         float64 // normal emissivity at 10 µm of bulk of that resistivity
	SkinDepthNM         float64 // at 10 µm
	OmegaTau            float64 // at 10 µm
	RadioAttenuationDB  float64
	Doubts              []string // why the rules do not hold for this film
}

// screenNM is where the rules look: the middle of what rooms radiate.
const screenNM = 10000

// Screening applies the short rules to a film of a thickness in nm.
func (c Carriers) Screening(thicknessNM float64) Screen {
	film := c.InFilm(thicknessNM)
	rho := film.ResistivityOhmCM()
	sheet := SheetResistance(rho, thicknessNM)
	k := imag(Oxide(film, nil, false).Index(screenNM))
	s := Screen{
		SheetOhm: sheet, ThinSheetEmissivity: ThinSheetEmissivity(sheet), LinearEmissivity: LinearEmissivity(sheet),
		HagenRubens: HagenRubensEmissivity(rho, screenNM), SkinDepthNM: SkinDepthNM(k, screenNM),
		OmegaTau: film.OmegaTau(screenNM), RadioAttenuationDB: RadioAttenuationDB(sheet),
	}
	if thicknessNM > s.SkinDepthNM {
		s.Doubts = append(s.Doubts, fmt.Sprintf("The film of %.4g nm is thicker than the skin depth at 10 µm, %.0f nm: the emissivity of a thin sheet is too low.", thicknessNM, s.SkinDepthNM))
	}
	if s.OmegaTau > mostOmegaTau {
		s.Doubts = append(s.Doubts, fmt.Sprintf("The carriers scatter too seldom at 10 µm (ωτ %.2f, above %g): the rules, made for direct current, may be far off.", s.OmegaTau, mostOmegaTau))
	}
	return s
}

// mostOmegaTau is where ωτ is no longer small (common practice).
const mostOmegaTau = 0.3
