package glazing_test

import (
	"fmt"
	"strings"

	"panewright/glazing"
	"panewright/spectra"
	"panewright/thermal"
)

// greyPane is a pane whose spectrum is the same at all wavelengths, so that its figures can be
// followed by hand.
func greyPane(id string, tau, rho, emissivity float64) *glazing.Pane {
	var csv strings.Builder
	csv.WriteString("wavelength_nm,tau,rho_front,rho_back\n")
	for nm := 300; nm <= 2500; nm += 10 {
		fmt.Fprintf(&csv, "%d,%g,%g,%g\n", nm, tau, rho, rho)
	}
	columns, err := spectra.ReadCSV(strings.NewReader(csv.String()), id+".csv")
	if err != nil {
		panic(err)
	}
	spectrum, err := spectra.Join(columns, spectra.Column{}, spectra.Column{})
	if err != nil {
		panic(err)
	}
	return &glazing.Pane{
		ID:    id,
		Plies: []glazing.Ply{{ThicknessMM: 4, ConductivityWMK: 1.0, DensityKGM3: 2500}},
		Tints: []glazing.Tint{{Spectrum: spectrum,
			Front: glazing.GivenEmissivity(0.837), Back: glazing.GivenEmissivity(emissivity)}},
	}
}

func ExampleRate() {
	argon, err := thermal.Mix(map[string]float64{"argon": 0.9, "air": 0.1})
	if err != nil {
		panic(err)
	}
	ratings, err := glazing.Rate(&glazing.Makeup{
		ID:    "D1",
		Panes: []glazing.Placed{{Pane: greyPane("clear", 0.80, 0.10, 0.837)}, {Pane: greyPane("low-e", 0.60, 0.30, 0.03), Turned: true}},
		Gaps:  []glazing.Gap{{WidthMM: 16, Gas: argon}},
	}, glazing.EN)
	if err != nil {
		panic(err)
	}
	r := ratings[0]
	// By hand: τ = 0.80·0.60/(1 − 0.10·0.30) = 0.495, α1 = 0.10 + 0.80·0.30·0.10/0.97 = 0.1247,
	// α2 = 0.10·0.80/0.97 = 0.0825; 4-16-4 with ε 0.837 and 0.03, argon 90 %: hs = 1.372,
	// Λ = 1/(0.008 + 1/1.372) = 1.357, qi = (0.2072/25 + 0.0825/1.357)/(1/25 + 1/7.7 + 1/1.357).
	fmt.Printf("τv %.3f, g %.3f, U %.4f W/(m²·K)\n", r.Light.Transmittance.Number, r.G.Number, r.U.Number)
	// Output: τv 0.495, g 0.571, U 1.1027 W/(m²·K)
}

func ExampleMakeup_States() {
	pane := greyPane("dusk", 0.5, 0.1, 0.837)
	pane.Tints = []glazing.Tint{{Name: "clear", Spectrum: pane.Tints[0].Spectrum}, {Name: "full", Spectrum: pane.Tints[0].Spectrum}}
	m := &glazing.Makeup{Panes: []glazing.Placed{{Pane: pane}, {Pane: pane, Tint: "full"}}}
	states, err := m.States()
	if err != nil {
		panic(err)
	}
	for _, s := range states {
		fmt.Println(s.Name)
	}
	// Output:
	// clear/full
	// full/full
}
