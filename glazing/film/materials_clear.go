package film

// Clear films: oxides, nitrides and a fluoride, with their bands in the infrared.

import (
	"slices"

	"panewright/reference"
)

// tabulated is a material whose table covers the whole range.
func tabulated(id, name string, t *reference.Table, remarks ...string) *Material {
	return &Material{ID: id, Name: name, Source: paper(t) + ", read", Model: Tabulated{published(t)}, Remarks: remarks}
}

func clearFilms() []*Material {
	silica := tabulated("silica", "Silicon dioxide", reference.NKSilica())
	silica.DensityKGM3 = 2200 // fused, handbooks, from memory
	return []*Material{
		silica,
		siliconNitride(),
		tabulated("alumina", "Aluminium oxide", reference.NKAlumina()),
		aluminiumNitride(),
		tabulated("titania", "Titanium dioxide", reference.NKTitania(), "An evaporated film; denser ones reach n 2.44 at 550 nm."),
		zincOxide(),
		tinOxide(),
		tabulated("niobia", "Niobium pentoxide", reference.NKNiobia()),
		tabulated("tantala", "Tantalum pentoxide", reference.NKTantala()),
		tabulated("magnesium-fluoride", "Magnesium fluoride", reference.NKMagnesiumFluoride()),
	}
}

// The bands of silicon nitride: two of the bond of silicon and nitrogen, fitted to the published points
// from 2.5 to 14.3 µm of a sputtered film, rms 0.03 in n and 0.02 in k with that film's own ε∞ of 6.2; one
// beyond their end (G. Cataldo and others, Optics Letters 37 (2012) 4200, from memory).
var nitrideBands = []Term{
	Lorentz{Strength: 1.8413, EnergyEV: 0.10832, BroadeningEV: 0.027803},
	Lorentz{Strength: 1.1489, EnergyEV: 0.094953, BroadeningEV: 0.019949},
	Lorentz{Strength: 0.98, EnergyEV: 0.0582, BroadeningEV: 0.025},
}

// siliconNitride joins a film of the visible to the bands of another: the two do not have the same ε∞, and the
// first is the one that glass carries. Between 1.7 µm and the bands the model carries on.
func siliconNitride() *Material {
	model := Oscillators{EpsInf: 2.9505, Terms: slices.Concat([]Term{Sellmeier{Strength: 1.03085, ResonanceNM: 196.77}}, nitrideBands)} // rms 0.0025 in n from 0.3 to 1.69 µm
	return &Material{
		ID: "silicon-nitride", Name: "Silicon nitride",
		Source: paper(reference.NKSiliconNitride()) + ", read; bands of " + paper(reference.NKSiliconNitrideInfrared()) + ", read, and of Cataldo and others 2012, from memory",
		Model:  Extend(published(reference.NKSiliconNitride()), model),
		Remarks: []string{
			"Two films joined: published to 1.69 µm, and beyond by the infrared bands of a sputtered one; the band at 21 µm is from memory.",
			"Films rich in silicon reach n 2.4 in the infrared.",
		},
	}
}

// aluminiumNitride is carried on by the one band that its infrared has: fitted to the points from 15.5 to
// 20 µm within 0.0003.
func aluminiumNitride() *Material {
	model := Oscillators{EpsInf: 4.7604, Terms: []Term{Lorentz{Strength: 3.98013, EnergyEV: 0.0814301, BroadeningEV: 0.00267674}}}
	return &Material{
		ID: "aluminium-nitride", Name: "Aluminium nitride", Source: paper(reference.NKAluminiumNitride()) + ", read",
		Model: Extend(published(reference.NKAluminiumNitride()), model),
		Remarks: []string{
			"Beyond 20 µm extended by the band at 15.2 µm that the published points have.",
			"Between 1.69 and 2.00 µm, where the paper's two instruments meet, n rises by 0.15.",
		},
	}
}

// zincOxide is the bound part of the film with aluminium, its gap put where there are no carriers, and a
// band of the lattice for light that crosses films whose grains stand upright (N. Ashkenov and others, Journal
// of Applied Physics 93 (2003) 126, from memory: 410 and 590 1/cm, ε∞ 3.70).
func zincOxide() *Material {
	edge := zincOxideEdge
	shift := ZincOxideGapEV - edge.GapEV
	edge.GapEV += shift
	edge.EnergyEV += shift
	model := Oscillators{EpsInf: 1, Terms: []Term{edge, zincOxideFar, lattice(3.70*(590.0*590.0/(410.0*410.0)-1), 410, 15)}}
	return &Material{
		ID: "zinc-oxide", Name: "Zinc oxide",
		Source: "bound part of " + paper(reference.NKAZO()) + ", read; band of N. Ashkenov and others, Journal of Applied Physics 93 (2003) 126, from memory, typical",
		Model:  model, DensityKGM3: densityZincOxide,
		Remarks: []string{"A model: published films differ by 0.2 in n. Free carriers of undoped films are left out."},
	}
}

// tinOxide is an oxide of fine grains that lie at random: the mean of the bands along and across the axis
// (R. S. Katiyar and others, Journal of Physics C 4 (1971) 2421, positions; R. Summitt, Journal of
// Applied Physics 39 (1968) 3762, strengths; both from memory).
func tinOxide() *Material {
	const epsInf, across, along = 3.8, 2.0 / 3, 1.0 / 3
	edge := TaucLorentz{AmplitudeEV: 80, EnergyEV: TinOxideGapEV + 1, BroadeningEV: 1, GapEV: TinOxideGapEV, UrbachEV: 0.1}
	model := withEdge(epsInf, edge,
		lattice(across*6.0, 244, 20), lattice(across*1.5, 293, 20), lattice(across*2.2, 618, 35), lattice(along*5.4, 477, 30))
	return &Material{
		ID: "tin-oxide", Name: "Tin oxide", Source: "gap of Fröhlich and others 1978, bands of Katiyar and others 1971 and Summitt 1968, from memory, typical",
		Model: model, DensityKGM3: densityTinOxide,
		Remarks: []string{remarkTypical, remarkEdge, "Free carriers of undoped films are left out."},
	}
}
