package film

// Conducting oxides: two fitted to published constants, the others of typical figures.

import "panewright/reference"

// Gaps without carriers, in eV.
const (
	// TinOxideGapEV is E_g0 of SnO2 (D. Fröhlich and others, Physical Review Letters 41 (1978) 1750, from
	// memory).
	TinOxideGapEV = 3.6
	// ZincOxideGapEV is E_g0 of ZnO (V. Srikant and D. R. Clarke, Journal of Applied Physics 83 (1998)
	// 5447, from memory).
	ZincOxideGapEV = 3.3
)

// Densities of the compact oxides in kg/m³, from handbooks, from memory.
const (
	densityIndiumOxide = 7180
	densityTinOxide    = 6950
	densityZincOxide   = 5610
)

// Remarks that several materials share.
const (
	remarkTypical  = "Typical figures, which films of one name may miss by half: put in those of your own."
	remarkEdge     = "The shape of the edge of absorption below 400 nm is an assumption."
	remarkNoPhonon = "Vibrations of the lattice, beyond about 15 µm, are left out."
)

func conductingOxides() []*Material {
	return []*Material{
		indiumTinOxide(),
		typicalOxide("fto", "Tin oxide with fluorine", Carriers{DensityCM3: 4e20, MobilityCM2VS: 30, EffectiveMass: 0.3, EpsInf: 3.8}, TinOxideGapEV, densityTinOxide, 0),
		aluminiumZincOxide(),
		typicalOxide("ato", "Tin oxide with antimony", Carriers{DensityCM3: 3e20, MobilityCM2VS: 10, EffectiveMass: 0.3, EpsInf: 3.9}, TinOxideGapEV, densityTinOxide, 0),
		typicalOxide("indium-oxide", "Indium oxide", Carriers{DensityCM3: 4e19, MobilityCM2VS: 40, EffectiveMass: 0.35, EpsInf: 4}, IndiumOxideGapEV, densityIndiumOxide, IndiumInOxide),
	}
}

// typicalOxide is a conducting oxide without published constants: carriers and ε∞ as reviews give them
// (I. Hamberg and C. G. Granqvist 1986 and others, from memory), an edge at a gap that has a source.
func typicalOxide(id, name string, c Carriers, gapEV, density, indium float64) *Material {
	edge := typicalEdge(gapEV)
	return &Material{
		ID: id, Name: name, Source: "free carriers of reviews and a gap of a paper, from memory, typical",
		Model: Oxide(c, edge, false), Carriers: &c, Edge: edge, DensityKGM3: density, Indium: indium,
		Remarks: []string{remarkTypical, remarkEdge, remarkNoPhonon},
	}
}

// typicalEdge is an edge at a gap, of a shape that has no source: k is then 0.01 to 0.1 at 300 nm and
// below 0.001 at 400 nm, but for free carriers.
func typicalEdge(gapEV float64) *Edge {
	return &Edge{GapEV: gapEV, NarrowingEV: AssumedNarrowingEV, AmplitudeEV: 80, AboveGapEV: 1, BroadeningEV: 1, UrbachEV: 0.1}
}

// fitted is an edge that with the carriers of the film it was fitted to has its gap at gapEV.
func fitted(e Edge, gapEV float64, c Carriers) *Edge {
	e.NarrowingEV = AssumedNarrowingEV
	e.GapEV = gapEV - e.OpticalGapEV(c)
	return &e
}

// fittedOxide is a conducting oxide by oscillators of which ε∞ is 1: carriers, edge, and a resonance far in
// the ultraviolet.
func fittedOxide(c Carriers, e *Edge, fallingLoss bool, far Sellmeier) (Oscillators, Carriers) {
	c.EpsInf = 1 + real(e.Term(c).Epsilon(PhotonEV(visibleNM))) + real(far.Epsilon(PhotonEV(visibleNM)))
	o := Oxide(c, e, fallingLoss)
	o.EpsInf = 1
	o.Terms = append(o.Terms, far)
	return o, c
}

// indiumTinOxide is fitted by least squares to the 638 published points from 0.3 to 1.69 µm: rms 0.0018
// in n and 0.0021 in k, at most 0.015 and 0.007, both at the edge of the ultraviolet. The gap was held
// at 2.8 eV; left free it falls to 2.2 eV for no more than 0.0007, and a film of fewer carriers would
// then absorb light. At 0.35 electron masses the carriers are 9.7e20 in 1/cm³ of 38 cm²/(V·s).
func indiumTinOxide() *Material {
	c := OpticalCarriers(1.953, 0.087065, 0.35, 1)
	edge := fitted(Edge{AmplitudeEV: 20.705, AboveGapEV: 5.1623 - 2.8, BroadeningEV: 0.9839}, 2.8, c)
	model, c := fittedOxide(c, edge, false, Sellmeier{Strength: 2.1185, ResonanceNM: 137.73})
	return &Material{
		ID: "ito", Name: "Indium tin oxide", Source: paper(reference.NKITO()) + ", read; oscillators fitted",
		Model: model, Carriers: &c, Edge: edge, DensityKGM3: DensityITO, Indium: IndiumInITO,
		Remarks: []string{
			"Fitted from 0.3 to 1.69 µm (rms 0.002 in n and k); beyond, the free carriers of the fit carry on.",
			"Other films have other carriers: n at 800 nm is 1.55 in this one, 1.6 to 1.8 in films that conduct less.",
			remarkNoPhonon,
		},
	}
}

// aluminiumZincOxide is fitted to the 101 published points from 0.3 to 0.9 µm with the resistivity of
// the film, 4.7e-4 Ω·cm, held: rms 0.0021 in n and 0.0025 in k, at most 0.010 and 0.009 at the edge, which
// is steeper than the model's; beyond 0.37 µm at most 0.004. The published loss falls faster towards
// short waves than that of plain carriers, and agrees with ionised impurities.
func aluminiumZincOxide() *Material {
	c := OpticalCarriers(1.3764, 0.11978, 0.33, 1)
	edge := fitted(Edge{AmplitudeEV: zincOxideEdge.AmplitudeEV, AboveGapEV: zincOxideEdge.EnergyEV - zincOxideEdge.GapEV, BroadeningEV: zincOxideEdge.BroadeningEV}, zincOxideEdge.GapEV, c)
	model, c := fittedOxide(c, edge, true, zincOxideFar)
	return &Material{
		ID: "azo", Name: "Zinc oxide with aluminium", Source: paper(reference.NKAZO()) + ", read; oscillators fitted",
		Model: model, Carriers: &c, Edge: edge, FallingLoss: true, DensityKGM3: densityZincOxide,
		Remarks: []string{
			"Fitted from 0.3 to 0.9 µm (rms 0.003 in n and k) with the published resistivity of 4.7e-4 Ω·cm; beyond, the free carriers of the fit carry on.",
			remarkNoPhonon,
		},
	}
}

// The bound part of the fit to zinc oxide with aluminium.
var (
	zincOxideEdge = TaucLorentz{AmplitudeEV: 630.56, EnergyEV: 3.264, BroadeningEV: 0.11846, GapEV: 3.418}
	zincOxideFar  = Sellmeier{Strength: 2.1763, ResonanceNM: 174.63}
)
