package film

// Metals: published constants, and beyond them the free carriers that fit their last points.

import (
	"math"
	"slices"

	"panewright/reference"
)

// Densities in kg/m³ of handbooks, from memory.
const (
	densityGold           = 19300
	densityCopper         = 8960
	densityAluminium      = 2700
	densityChromium       = 7190
	densityNickel         = 8910
	densityNickelChromium = 8400
)

func metals() []*Material {
	// Free carriers fitted to the permittivity of published points, with the electron's own mass.
	goldCarriers := OpticalCarriers(8.5517, 0.02135, 1, 9)      // the seven points from 3.1 µm within 4 % in n, 0.1 % in k
	copperCarriers := OpticalCarriers(8.9178, 0.02686, 1, 9)    // the six points from 3.1 to 8.3 µm within 2 % in n, 0.3 % in k
	aluminiumCarriers := OpticalCarriers(10.849, 0.04498, 1, 1) // the 18 points from 20 to 200 µm within 7 % in n, 3 % in k
	return []*Material{
		silver(),
		{
			ID: "gold", Name: "Gold", Source: paper(reference.NKGold()) + ", read",
			Model: Extend(published(reference.NKGold()), carriersOnly(goldCarriers)), Carriers: &goldCarriers, DensityKGM3: densityGold,
			Remarks: []string{"Beyond 12.4 µm extended by the free carriers that fit the last points.", remarkBulk},
		}, {
			ID: "copper", Name: "Copper", Source: paper(reference.NKCopper()) + ", read",
			Model: Extend(published(reference.NKCopper()), carriersOnly(copperCarriers)), Carriers: &copperCarriers, DensityKGM3: densityCopper,
			Remarks: []string{"Beyond 12.4 µm extended by the free carriers that fit the points from 3 to 8 µm.", remarkBulk},
		}, {
			ID: "aluminium", Name: "Aluminium", Source: paper(reference.NKAluminium()) + ", read",
			Model: Tabulated{published(reference.NKAluminium())}, Carriers: &aluminiumCarriers, DensityKGM3: densityAluminium,
			Remarks: []string{remarkBulk},
		}, {
			ID: "chromium", Name: "Chromium", Source: paper(reference.NKChromium()) + ", read",
			Model: Tabulated{published(reference.NKChromium())}, DensityKGM3: densityChromium, Remarks: []string{remarkBulk},
		}, {
			ID: "nickel", Name: "Nickel", Source: paper(reference.NKNickel()) + ", read; beyond 6.2 µm its oscillators, from memory",
			Model: Extend(published(reference.NKNickel()), rakic(nickelPlasmaEV, 1, nickelTerms)), DensityKGM3: densityNickel,
			Remarks: []string{"Beyond 6.2 µm extended by the oscillators of Rakić and others 1998, from memory; their resistance is twice that of nickel in handbooks.", remarkBulk},
		},
		nickelChromium(),
	}
}

const remarkBulk = "Constants of bulk; films of few nanometres scatter more."

// carriersOnly are free carriers alone.
func carriersOnly(c Carriers) Oscillators { return Oscillators{Terms: []Term{c.Drude()}} }

// silver is what the published points have over free carriers, and free carriers whose damping follows the
// thickness of the film. The carriers were fitted to the ten points from 2 to 8.3 µm, within 9 % in n and
// 1 % in k; of direct current they have 1.52 µΩ·cm, handbooks 1.59. The last point, 12.4 µm, has an n of
// 5.1 where these carriers have 7.3, other papers 10 and more; it is left out. A of the damping is 0.3:
// 10 nm then have 4.0 µΩ·cm, between 3.4 and 4.4 of published low-emissivity films. 1 is the value of
// grains (Kreibig and von Fragstein 1969) and would give 10. ε∞ is put so that the permittivity
// passes 0 near 327 nm, as published.
func silver() *Material {
	c := OpticalCarriers(9.0767, 0.01686, 1, 5.7)
	c.SurfaceScattering = 0.3
	return &Material{
		ID: "silver", Name: "Silver", Source: paper(reference.NKSilver()) + ", read",
		Model: Extend(published(reference.NKSilver()).until(silverLastNM), carriersOnly(c)), Carriers: &c, DensityKGM3: DensitySilver, Silver: 1,
		Remarks: []string{
			"Beyond 8.3 µm extended by the free carriers that fit the points from 2 to 8.3 µm; the last published point, 12.4 µm, strays from them and is left out.",
			"In a film the surfaces scatter too, with A = 0.3 (typical of sputtered low-emissivity films).",
		},
	}
}

const silverLastNM = 9000

// An oscillator of Rakić and others 1998: strength, energy and broadening in eV.
type rakicTerm struct{ f, energyEV, broadeningEV float64 }

// Plasma energies in eV to which the strengths refer.
const nickelPlasmaEV, chromiumPlasmaEV = 15.92, 10.75

// The oscillators of the Lorentz and Drude model, first the free carriers (A. D. Rakić and others, Applied
// Optics 37 (1998) 5271, table 2, from memory). From 0.4 µm they meet the published points, which are of the
// paper's other model, within 8 % in n and 3 % in k (nickel), 15 % and 8 % (chromium).
var (
	nickelTerms   = []rakicTerm{{0.096, 0, 0.048}, {0.100, 0.174, 4.511}, {0.135, 0.582, 1.334}, {0.106, 1.597, 2.178}, {0.729, 6.089, 6.292}}
	chromiumTerms = []rakicTerm{{0.168, 0, 0.047}, {0.151, 0.121, 3.175}, {0.150, 0.543, 1.305}, {1.149, 1.970, 2.676}, {0.825, 8.775, 1.335}}
)

// rakic is the permittivity of a share of oscillators, less that of free space for the rest.
func rakic(plasmaEV, share float64, list []rakicTerm) Oscillators {
	o := Oscillators{EpsInf: 1}
	for _, t := range list {
		square := share * t.f * plasmaEV * plasmaEV
		if t.energyEV == 0 {
			o.Terms = append(o.Terms, Drude{PlasmaEV: math.Sqrt(square), DampingEV: t.broadeningEV})
			continue
		}
		o.Terms = append(o.Terms, Lorentz{Strength: square / (t.energyEV * t.energyEV), EnergyEV: t.energyEV, BroadeningEV: t.broadeningEV})
	}
	return o
}

// nickelChromium is 80 to 20 by volume of the two metals' bound parts, with free carriers of as
// many in the mean, which scatter so often that the alloy has its resistivity of handbooks, 1.1e-4 Ω·cm:
// in alloys it is disorder that scatters.
func nickelChromium() *Material {
	const nickelShare, resistivity = 0.8, 1.1e-4
	nickel, chromium := rakic(nickelPlasmaEV, nickelShare, nickelTerms), rakic(chromiumPlasmaEV, 1-nickelShare, chromiumTerms)
	plasma := math.Hypot(nickel.Terms[0].(Drude).PlasmaEV, chromium.Terms[0].(Drude).PlasmaEV)
	c := OpticalCarriers(plasma, 1, 1, 1)
	c.MobilityCM2VS = 1 / (c.DensityCM3 * elementaryCharge * resistivity)
	model := Oscillators{EpsInf: 1, Terms: slices.Concat([]Term{c.Drude()}, nickel.Terms[1:], chromium.Terms[1:])}
	return &Material{
		ID: "nickel-chromium", Name: "Nickel with chromium, 80 to 20",
		Source: "oscillators of A. D. Rakić and others, Applied Optics 37 (1998) 5271, from memory, and the resistivity of handbooks, from memory, typical",
		Model:  model, Carriers: &c, DensityKGM3: densityNickelChromium,
		Remarks: []string{"A mean of nickel and chromium that is made to have the resistivity of the alloy: good for a blocker of a few nanometres."},
	}
}
