package glazing

import (
	"math"
	"slices"
	"strings"
	"testing"

	"panewright/glazing/film"
	"panewright/spectra"
)

// Panes of one lossless index keep their polarisations apart: two of n 1.526 pass 0.846519 at the normal
// and 0.472216 at 75° by (1 − ρ)/(1 + 3ρ) in each polarisation (closed form; ANG-23 and ANG-26 of the
// checks), where the mean taken first would give 0.443. One passes 0.84508 over the half space.
func TestPolarisationIsKept(t *testing.T) {
	flatIndex := film.Constants{N: spectra.Curve{NM: []float64{300, 50000}, Value: []float64{1.526, 1.526}},
		K: spectra.Curve{NM: []float64{300, 50000}, Value: []float64{0, 0}}}
	sheet := film.Sheet{Constants: flatIndex, ThicknessMM: 4}
	modelled := clearGlass(4, 0.9, 0.08)
	modelled.Sheet = &sheet
	normal := film.Slab(1.526, 0, 550, 4, 0).S
	measured := clearGlass(4, normal.T, normal.R) // the same, of which only the shares are known
	air := gap(t, 12, map[string]float64{"air": 1})
	for _, p := range []*Pane{modelled, measured} {
		m := &Makeup{ID: "A", Panes: []Placed{{Pane: p}, {Pane: p, Turned: true}}, Gaps: []Gap{air}}
		for _, tt := range []struct{ deg, want float64 }{{0, 0.846519}, {75, 0.472216}} {
			if tt.deg == 0 && p == modelled {
				continue // its spectrum at the normal is not that of the sheet
			}
			r := rateOne(t, m, EN, Options{AngleDeg: tt.deg})
			for _, got := range []float64{r.Light.Transmittance.Number, r.Solar.Transmittance.Number, r.UV.Number} {
				if math.Abs(got-tt.want) > 2e-6 {
					t.Errorf("at %g°: %.6f, want %.6f", tt.deg, got, tt.want)
				}
			}
			sum := r.Solar.Transmittance.Number + r.Solar.ReflectanceOutside.Number
			for _, a := range r.Absorptance {
				sum += a.Number
			}
			if math.Abs(sum-1) > 1e-12 || !r.U.Known {
				t.Errorf("at %g°: shares add to %.15g", tt.deg, sum)
			}
		}
	}
}

// A coated measured pane off the normal is an estimate, and says so; U is that of the normal.
func TestEstimateIsSaid(t *testing.T) {
	low := clearGlass(4, 0.6, 0.2)
	low.Tints[0].Back = GivenEmissivity(0.04)
	m := &Makeup{ID: "C", Panes: []Placed{{Pane: low}}}
	plain := rateOne(t, m, EN, Options{})
	r := rateOne(t, m, EN, Options{AngleDeg: 60})
	ratio, more := film.Estimated(1, 2, 60)
	if got, want := r.Light.Transmittance.Number, 0.6*ratio; math.Abs(got-want) > 1e-9 {
		t.Errorf("τv %.6f, want %.6f", got, want)
	}
	if got, want := r.Light.ReflectanceOutside.Number, 0.2+0.8*more; math.Abs(got-want) > 1e-9 {
		t.Errorf("ρv %.6f, want %.6f", got, want)
	}
	if r.U != plain.U || r.G == plain.G {
		t.Errorf("U %+v and %+v, g %+v and %+v", r.U, plain.U, r.G, plain.G)
	}
	says := func(r *Rating, code string) bool {
		return slices.ContainsFunc(r.Cautions, func(c Caution) bool { return c.Code == code })
	}
	if says(plain, "at_angle") || says(plain, "angle_estimate") || !says(r, "angle_estimate") || says(r, "at_angle") || !strings.Contains(r.Method.Editions(), "60°") {
		t.Errorf("cautions: %v; editions: %s", r.Cautions, r.Method.Editions())
	}
	for _, bad := range []float64{-1, 89.5, math.NaN()} {
		if _, err := NewMethod(EN, Options{AngleDeg: bad}).Ready(m); err == nil {
			t.Errorf("%g° is rated", bad)
		}
	}
}
