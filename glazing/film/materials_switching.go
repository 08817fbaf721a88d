package film

// Films that change: by charge, here as they are without it, and by temperature.

import "panewright/reference"

func switchingFilms() []*Material {
	const remarkHeld = "Published from 0.5 to 25 µm; carried on by the first value below, where 6 % of the light of D65 is."
	return []*Material{
		tungstenOxide(),
		nickelOxide(),
		tabulated("vanadia-cold", "Vanadium dioxide at 25 °C", reference.NKVanadiaCold(), remarkHeld,
			"Beyond 25 µm the last value is held; the bands of the lattice are not in the published constants."),
		{
			// The carriers fit the points from 18 to 25 µm within 0.34 in n and 0.25 in k.
			ID: "vanadia-hot", Name: "Vanadium dioxide at 100 °C", Source: paper(reference.NKVanadiaHot()) + ", read",
			Model:   Extend(published(reference.NKVanadiaHot()), Oscillators{EpsInf: 60.02, Terms: []Term{Drude{PlasmaEV: 3.1017, DampingEV: 0.7981}}}),
			Remarks: []string{remarkHeld, "Beyond 25 µm extended by free carriers that fit the last points within 3 %."},
		},
	}
}

// tungstenOxide is published to 1 µm. The model beyond was fitted from 0.42 µm (rms 0.0002 in n). The bands
// lie where J. Daniel and others, Journal of Solid State Chemistry 67 (1987) 235, have them (from memory);
// their strengths are an assumption.
func tungstenOxide() *Material {
	model := Oscillators{EpsInf: 3.0367, Terms: []Term{
		Sellmeier{Strength: 0.70832, ResonanceNM: 279.83},
		lattice(2.5, 660, 150), lattice(8, 300, 120), lattice(0.05, 950, 60),
	}}
	return &Material{
		ID: "tungsten-oxide", Name: "Tungsten trioxide, bleached",
		Source:  paper(reference.NKTungstenOxide()) + ", read; bands of J. Daniel and others, Journal of Solid State Chemistry 67 (1987) 235, from memory, typical",
		Model:   Extend(published(reference.NKTungstenOxide()), model),
		Remarks: []string{"Published from 0.3 to 1 µm; beyond, a model whose infrared bands are typical: their strengths are an assumption."},
	}
}

// nickelOxide has the lattice of the crystal (P. J. Gielisse and others, Journal of Applied Physics 36
// (1965) 2446: 401 1/cm, ε 11.9 and 5.7), and an edge that begins about where R. J. Powell and W. E. Spicer,
// Physical Review B 2 (1970) 2182, have it; both from memory. Its shape is an assumption; n at 550 nm is
// 2.33, a little below that of the mineral, 2.37.
func nickelOxide() *Material {
	const visible = 2.33
	edge := TaucLorentz{AmplitudeEV: 60, EnergyEV: 4.4, BroadeningEV: 1.5, GapEV: 3.2}
	return &Material{
		ID: "nickel-oxide", Name: "Nickel oxide, bleached",
		Source: "P. J. Gielisse and others, Journal of Applied Physics 36 (1965) 2446, and R. J. Powell and W. E. Spicer, Physical Review B 2 (1970) 2182, from memory, typical",
		Model:  withEdge(visible*visible, edge, lattice(11.9-5.7, 401, 30)), DensityKGM3: 6670,
		Remarks: []string{remarkTypical, remarkEdge, "Sputtered films that take charge are less dense, with n down to 2.1."},
	}
}
