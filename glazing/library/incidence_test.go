package library_test

import (
	"math"
	"testing"

	"panewright/glazing"
	"panewright/glazing/film"
	"panewright/glazing/library"
	"panewright/spectra"
)

// A coated pane at an angle is rated by its films at that angle, wavelength by wavelength, turned or not.
func TestCoatedPaneAtAnAngle(t *testing.T) {
	ito, ok := film.MaterialNamed("ito")
	if !ok {
		t.Fatal("no ito")
	}
	glass, _ := film.Glass("soda-lime")
	c := film.Coated{Glass: glass, ThicknessMM: 4, Back: []film.Film{{Material: ito, ThicknessNM: 150}}}
	p := library.Coated("bench", c)
	for _, deg := range []float64{0, 30, 60, 85} {
		for _, turned := range []bool{false, true} {
			m := &glazing.Makeup{ID: "m", Panes: []glazing.Placed{{Pane: p, Turned: turned}}}
			ready, err := glazing.NewMethod(glazing.EN, glazing.Options{AngleDeg: deg}).Ready(m)
			if err != nil {
				t.Fatal(err)
			}
			var r glazing.Rating
			if err := ready.RateInto(&r, 0); err != nil {
				t.Fatal(err)
			}
			var tau, rho, sum float64
			w := spectra.SolarEN410()
			for i, nm := range w.NM {
				s, p := c.At(nm, deg)
				both := film.Unpolarised(s, p)
				outside := both.RFront
				if turned {
					outside = both.RBack
				}
				tau += w.Weight[i] * both.T
				rho += w.Weight[i] * outside
				sum += w.Weight[i]
			}
			if math.Abs(r.Solar.Transmittance.Number-tau/sum) > 1e-5 || math.Abs(r.Solar.ReflectanceOutside.Number-rho/sum) > 1e-5 {
				t.Errorf("%g°, turned %t: τe %.6f and ρe %.6f, by the films %.6f and %.6f", deg, turned,
					r.Solar.Transmittance.Number, r.Solar.ReflectanceOutside.Number, tau/sum, rho/sum)
			}
		}
	}
}
