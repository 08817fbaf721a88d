package spectra_test

import (
	"fmt"
	"strings"

	"panewright/spectra"
)

func ExampleWeighting_Mean() {
	// A filter that passes 0.9 up to 550 nm and nothing from 560 nm on; by the table of EN 410
	// half of the light, Σ W = 49.684 %, lies up to 550 nm: 0.9 · 0.49684.
	edge := spectra.Curve{NM: []float64{300, 550, 560, 2500}, Value: []float64{0.9, 0.9, 0, 0}}
	fmt.Printf("%.3f\n", spectra.LightEN410().Mean(edge))
	// Output: 0.447
}

func ExampleReadCSV() {
	var csv strings.Builder
	csv.WriteString("# a pane, front and back alike\nwavelength_um,rho_back,rho_front,tau\n")
	for um := 0.30; um < 2.505; um += 0.01 {
		fmt.Fprintf(&csv, "%.2f,0.08,0.08,0.85\n", um)
	}
	columns, err := spectra.ReadCSV(strings.NewReader(csv.String()), "pane.csv")
	if err != nil {
		fmt.Println(err)
		return
	}
	pane, err := spectra.Join(columns, spectra.Column{}, spectra.Column{})
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("%g to %g nm, τe %.2f\n", pane.Tau.First(), pane.Tau.Last(), spectra.SolarEN410().Mean(pane.Tau))
	// Output: 300 to 2500 nm, τe 0.85
}

func ExampleDamageWeight() {
	fmt.Printf("%.4f at 350 nm, %.4f at 450 nm\n", spectra.DamageWeight(350), spectra.DamageWeight(450))
	// Output: 0.5488 at 350 nm, 0.1653 at 450 nm
}
