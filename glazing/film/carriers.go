package film

// Free carriers of conducting oxides and metals: their electrical figures and their light.

import (
	"errors"
	"fmt"
	"math"
)

// Carriers are the free carriers of a conductor.
type Carriers struct {
	DensityCM3    float64 // N in 1/cm³
	MobilityCM2VS float64 // µ in cm²/(V·s); of metals whose films scatter more, that of bulk
	EffectiveMass float64 // m* in electron masses
	EpsInf        float64 // ε∞, the permittivity without free carriers

	// SurfaceScattering is A of γ = γ_bulk + A v_F/d, 0 where the thickness does not count.
	SurfaceScattering float64
	// Persistence is c of DrudeSmith, 0 where scattering forgets the direction.
	Persistence float64
}

// Units in SI.
const (
	perCM3  = 1e6  // of a density in 1/cm³
	cm2     = 1e-4 // of a mobility in cm²/(V·s)
	nmPerCM = 1e7
)

// hbarEV is ħ in eV·s.
const hbarEV = planckConstant / (2 * math.Pi * elementaryCharge)

// PlasmaEV returns the plasma energy in eV without screening, ħωp with ωp² = N e²/(ε₀ m*).
func (c Carriers) PlasmaEV() float64 {
	return hbarEV * elementaryCharge * math.Sqrt(c.DensityCM3*perCM3/(electricConstant*c.EffectiveMass*electronMass)) // Drude 1900
}

// DampingEV returns the damping energy in eV, ħγ with γ = e/(m* µ).
func (c Carriers) DampingEV() float64 {
	return hbarEV * elementaryCharge / (c.EffectiveMass * electronMass * c.MobilityCM2VS * cm2) // Drude 1900
}

// ResistivityOhmCM returns ρ = 1/(N e µ) in Ω·cm, with persistence that over 1 + c.
func (c Carriers) ResistivityOhmCM() float64 {
	return 1 / (c.DensityCM3 * elementaryCharge * c.MobilityCM2VS * (1 + c.Persistence))
}

// SheetResistance returns R□ = ρ/d in Ω of a film of a thickness in nm, with the resistivity that it has
// at that thickness.
func (c Carriers) SheetResistance(thicknessNM float64) float64 {
	return SheetResistance(c.InFilm(thicknessNM).ResistivityOhmCM(), thicknessNM)
}

// SheetResistance returns R□ = ρ/d in Ω of a film of a resistivity in Ω·cm and a thickness in nm.
func SheetResistance(resistivityOhmCM, thicknessNM float64) float64 {
	return resistivityOhmCM * nmPerCM / thicknessNM
}

// screenedEV2 is the square of the screened plasma energy in eV² without damping.
func (c Carriers) screenedEV2() float64 {
	p := c.PlasmaEV()
	return p * p / c.EpsInf
}

// ScreenedPlasmaNM returns the vacuum wavelength in nm at which the real part of the permittivity is 0,
// 2πc/√(ωp²/ε∞ − γ²): a conducting film begins to reflect there. ok is false, and there is none, if
// γ ≥ ωp/√ε∞.
func (c Carriers) ScreenedPlasmaNM() (nm float64, ok bool) {
	damping := c.DampingEV()
	square := c.screenedEV2() - float64(damping*damping)
	if !(square > 0) {
		return 0, false
	}
	return hcEVNM / math.Sqrt(square), true
}

// UndampedPlasmaNM returns the same without damping in nm, 2πc √ε∞/ωp.
func (c Carriers) UndampedPlasmaNM() float64 { return hcEVNM / math.Sqrt(c.screenedEV2()) }

// OmegaTau returns ωτ = E/ħγ at a vacuum wavelength in nm: far below 1 the carriers conduct as they do
// direct current.
func (c Carriers) OmegaTau(nm float64) float64 { return PhotonEV(nm) / c.DampingEV() }

// Drude returns the term of carriers whose scattering forgets the direction.
func (c Carriers) Drude() Drude { return Drude{PlasmaEV: c.PlasmaEV(), DampingEV: c.DampingEV()} }

// Term returns the term of the carriers: DrudeSmith with persistence, else FallingDrude if their loss
// falls above the plasma energy, else Drude.
func (c Carriers) Term(fallingLoss bool) Term {
	switch d := c.Drude(); {
	case c.Persistence != 0:
		return DrudeSmith{Drude: d, Persistence: c.Persistence}
	case fallingLoss:
		return FallingDrude{Drude: d, OnsetEV: math.Sqrt(c.screenedEV2())}
	default:
		return d
	}
}

// FermiVelocitySilver is v_F of silver in m/s (N. W. Ashcroft and N. D. Mermin, Solid State Physics,
// 1976, table 2.1, from memory).
const FermiVelocitySilver = 1.39e6

// ThinDampingEV returns the damping energy in eV of a metal film, ħ(γ_bulk + A v_F/d): the surfaces
// scatter too. A is about 1, and not known well.
func ThinDampingEV(bulkEV, a, fermiVelocityMS, thicknessNM float64) float64 {
	const nmPerM = 1e9
	return bulkEV + a*hbarEV*fermiVelocityMS*nmPerM/thicknessNM // U. Kreibig and C. von Fragstein, Z. Physik 224 (1969) 307, from memory
}

// InFilm returns the carriers in a film of a thickness in nm: those of a metal whose surfaces scatter,
// with the smaller mobility.
func (c Carriers) InFilm(thicknessNM float64) Carriers {
	if c.SurfaceScattering == 0 || thicknessNM <= 0 {
		return c
	}
	bulk := c.DampingEV()
	c.MobilityCM2VS *= bulk / ThinDampingEV(bulk, c.SurfaceScattering, FermiVelocitySilver, thicknessNM)
	c.SurfaceScattering = 0
	return c
}

// FuchsSondheimer returns by how much the resistivity of a film exceeds that of bulk, to the first order
// in the mean free path l over the thickness d, 1 + 3 l (1 − p)/(8 d), where surfaces mirror the part
// p of the carriers.
func FuchsSondheimer(meanFreePathNM, mirrored, thicknessNM float64) float64 {
	return 1 + 3*meanFreePathNM*(1-mirrored)/(8*thicknessNM) // E. H. Sondheimer, Advances in Physics 1 (1952) 1, from memory
}

// NonParabolicMass returns m* in electron masses of carriers that fill a band which is not parabolic,
// m₀*√(1 + 2C ħ²(3π²N)^(2/3)/m₀*), from m₀* at its bottom and C in 1/eV.
func NonParabolicMass(densityCM3, bottomMass, perEV float64) float64 {
	return bottomMass * math.Sqrt(1+4*perEV*BursteinMossEV(densityCM3, bottomMass)) // T. Pisarkiewicz and others, Thin Solid Films 174 (1989) 217, from memory
}

// OpticalCarriers returns the carriers of a Drude term that was fitted to light, from its energies in
// eV and the effective mass.
func OpticalCarriers(plasmaEV, dampingEV, effectiveMass, epsInf float64) Carriers {
	ratio := plasmaEV / (hbarEV * elementaryCharge)
	return Carriers{
		DensityCM3:    ratio * ratio * electricConstant * effectiveMass * electronMass / perCM3,
		MobilityCM2VS: hbarEV * elementaryCharge / (effectiveMass * electronMass * dampingEV * cm2),
		EffectiveMass: effectiveMass, EpsInf: epsInf,
	}
}

// Given are figures from which carriers follow; 0 stands for what is not given.
type Given struct {
	DensityCM3, MobilityCM2VS, ResistivityOhmCM float64
	SheetResistanceOhm, ThicknessNM             float64 // the first needs the second
	EffectiveMass, EpsInf                       float64
	SurfaceScattering, Persistence              float64
}

// Carriers returns the carriers. Any two of density, mobility, and a resistivity or a sheet resistance with
// the thickness fix the rest. Figures that differ by more than 1 % from what the others make of them
// are an error, and so are too few.
func (g Given) Carriers() (Carriers, error) {
	if err := g.check(); err != nil {
		return Carriers{}, err
	}
	rho, err := g.resistivity()
	if err != nil {
		return Carriers{}, err
	}
	c := Carriers{DensityCM3: g.DensityCM3, MobilityCM2VS: g.MobilityCM2VS, EffectiveMass: g.EffectiveMass, EpsInf: g.EpsInf,
		SurfaceScattering: g.SurfaceScattering, Persistence: g.Persistence}
	switch {
	case c.DensityCM3 > 0 && c.MobilityCM2VS > 0:
		if made := c.InFilm(g.ThicknessNM).ResistivityOhmCM(); rho > 0 && differ(made, rho) {
			return c, fmt.Errorf("%g carriers in 1/cm³ of a mobility of %g cm²/(V·s) make a resistivity of %.4g Ω·cm, not %.4g Ω·cm; leave one of them out",
				c.DensityCM3, c.MobilityCM2VS, made, rho)
		}
	case rho > 0 && c.DensityCM3 > 0:
		c.MobilityCM2VS = 1 / (c.DensityCM3 * elementaryCharge * rho * (1 + c.Persistence))
	case rho > 0 && c.MobilityCM2VS > 0:
		c.DensityCM3 = 1 / (c.MobilityCM2VS * elementaryCharge * rho * (1 + c.Persistence))
	default:
		return c, errors.New("too few figures of the carriers; give two of the density, the mobility, and the resistivity or the sheet resistance with a thickness")
	}
	return c, c.Check()
}

// check refuses what no conductor has.
func (g Given) check() error {
	for _, x := range []struct {
		name  string
		value float64
	}{
		{"density", g.DensityCM3}, {"mobility", g.MobilityCM2VS}, {"resistivity", g.ResistivityOhmCM},
		{"sheet resistance", g.SheetResistanceOhm}, {"thickness", g.ThicknessNM},
	} {
		if !(x.value >= 0) || math.IsInf(x.value, 1) {
			return fmt.Errorf("a %s of %g is not above 0", x.name, x.value)
		}
	}
	if g.SheetResistanceOhm > 0 && g.ThicknessNM == 0 {
		return errors.New("a sheet resistance says something of the carriers only with the thickness of its film")
	}
	return nil
}

// resistivity is that given, in Ω·cm, 0 if none is.
func (g Given) resistivity() (float64, error) {
	if g.SheetResistanceOhm == 0 {
		return g.ResistivityOhmCM, nil
	}
	rho := g.SheetResistanceOhm * g.ThicknessNM / nmPerCM
	if g.ResistivityOhmCM > 0 && differ(rho, g.ResistivityOhmCM) {
		return 0, fmt.Errorf("a sheet resistance of %g Ω at %g nm is a resistivity of %.4g Ω·cm, not %.4g Ω·cm; leave one of them out",
			g.SheetResistanceOhm, g.ThicknessNM, rho, g.ResistivityOhmCM)
	}
	return rho, nil
}

// differ reports whether two figures are more than 1 % apart, which digits left out do not explain.
func differ(a, b float64) bool { return math.Abs(a-b) > 0.01*math.Max(a, b) }

// Check returns an error if carriers are outside what the model is for.
func (c Carriers) Check() error {
	for _, x := range []struct {
		name, unit         string
		value, least, most float64
	}{
		{"density", "1/cm³", c.DensityCM3, 1e15, 1e24},
		{"mobility", "cm²/(V·s)", c.MobilityCM2VS, 1e-3, 1e6},
		{"effective mass", "electron masses", c.EffectiveMass, 1e-3, 100},
		{"permittivity ε∞", "(no unit)", c.EpsInf, 1, 100},
		{"surface scattering A", "(no unit)", c.SurfaceScattering, 0, 10},
		{"persistence c", "(no unit)", c.Persistence, -0.99, 0},
	} {
		if !(x.value >= x.least && x.value <= x.most) {
			return fmt.Errorf("a %s of %.6g %s is not between %g and %g", x.name, x.value, x.unit, x.least, x.most)
		}
	}
	return nil
}
