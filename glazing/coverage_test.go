package glazing

import (
	"math"
	"slices"
	"strings"
	"testing"

	"panewright/spectra"
)

// evenly returns a curve of values by a function, from first to last nm by a step.
func evenly(first, last, step float64, value func(nm float64) float64) (c spectra.Curve) {
	for nm := first; nm <= last; nm += step {
		c.NM, c.Value = append(c.NM, nm), append(c.Value, value(nm))
	}
	return c
}

// The means are those of a rating of the pane alone, and a figure is unknown for the same reason.
func TestCoversAgreesWithRatings(t *testing.T) {
	gap := func(c spectra.Curve, from, to float64) spectra.Curve {
		i, _ := slices.BinarySearch(c.NM, from)
		j, _ := slices.BinarySearch(c.NM, to)
		c.NM, c.Value = slices.Delete(slices.Clone(c.NM), i+1, j), slices.Delete(slices.Clone(c.Value), i+1, j)
		c.Gaps = []spectra.Span{{FromNM: from, ToNM: to}}
		return c
	}
	tau := func(nm float64) float64 { return 0.4 + 0.3*math.Sin(nm/250) }
	whole := evenly(300, 2500, 5, tau)
	for _, tt := range []struct {
		name string
		tau  spectra.Curve
	}{
		{"whole", whole},
		{"begins late", evenly(390, 2500, 5, tau)},
		{"stops early", evenly(300, 900, 5, tau)},
		{"an end is held", evenly(300, 2450, 5, tau)},
		{"a gap in the visible", gap(whole, 500, 600)},
		{"a gap of little weight", gap(whole, 2400, 2490)},
	} {
		for _, b := range Bases() {
			pane := &Pane{ID: "p", Plies: []Ply{{ThicknessMM: 6, ConductivityWMK: 1, DensityKGM3: 2500}},
				Tints: []Tint{{Spectrum: spectra.Measured{Tau: tt.tau, RhoFront: evenly(300, 2500, 5, func(float64) float64 { return 0.1 }),
					RhoBack: evenly(300, 2500, 5, func(float64) float64 { return 0.1 })}, Front: GivenEmissivity(0.837), Back: GivenEmissivity(0.837)}}}
			ratings, err := Rate(&Makeup{ID: "m", Panes: []Placed{{Pane: pane}}}, b)
			if err != nil {
				t.Fatal(err)
			}
			r := ratings[0]
			want := map[string]Value{"light": r.Light.Transmittance, "solar": r.Solar.Transmittance, "uv": r.UV, "damage": r.Damage, "damage to 700 nm": r.Damage700, "skin": r.Skin}
			list := NewMethod(b, Options{}).Covers("p", tt.tau)
			if len(list) != len(want)+1 {
				t.Fatalf("%d bands, want %d", len(list), len(want)+1)
			}
			for _, c := range list {
				value, ok := want[c.Band]
				if c.Band == "colour" {
					if ok = true; c.Why != r.Transmitted.Why || c.Mean.Known {
						t.Errorf("%s, %s, colour: %q, a rating says %q", tt.name, b.Name, c.Why, r.Transmitted.Why)
					}
				} else if c.Mean != value {
					t.Errorf("%s, %s, %s: %+v, a rating has %+v", tt.name, b.Name, c.Band, c.Mean, value)
				}
				if !ok {
					t.Errorf("%s: no such band is known to a rating", c.Band)
				}
				for _, x := range c.Cautions {
					if !slices.Contains(r.Cautions, x) {
						t.Errorf("%s, %s, %s: %q is not a rating's caution", tt.name, b.Name, c.Band, x.Text)
					}
				}
				if missing := c.Below + c.Above + c.Within; (missing > 0) != (len(c.Cautions) > 0) || (c.Why != "") != (max(c.Below, c.Above, c.Within) >= endTolerance) {
					t.Errorf("%s, %s, %s: missing %v, why %q, cautions %v", tt.name, b.Name, c.Band, missing, c.Why, c.Cautions)
				}
			}
		}
	}
}

// A spectrum that begins at 320 nm misses, of the ultraviolet weights of EN 410, those at 300, 305,
// 310 and 315 nm: 0, 0.001859, 0.007665 and 0.017961 of 1 (EN 410:2011 table 3 as reference holds it,
// from memory), together 0.027485.
func TestCoversShares(t *testing.T) {
	for _, c := range NewMethod(EN, Options{}).Covers("p", evenly(320, 2500, 10, func(float64) float64 { return 0.5 })) {
		if c.Band != "uv" {
			continue
		}
		if math.Abs(c.Below-0.027485) > 1e-5 || c.Above != 0 || c.Within != 0 || !strings.Contains(c.Why, "begins at 320 nm; uv needs 300 to 380 nm") {
			t.Errorf("%+v", c)
		}
		return
	}
	t.Error("no band uv")
}

// U and g, and their reasons, are those of a rating: known where the face that looks inside has an
// emissivity, with a basis of balances where both have; g only where the sun is covered.
func TestCoversHeatAgreesWithRatings(t *testing.T) {
	flat := func(v float64, last float64) spectra.Curve {
		return evenly(300, last, 5, func(float64) float64 { return v })
	}
	far := evenly(5000, 50000, 500, func(float64) float64 { return 0.9 })
	for _, tt := range []struct {
		name        string
		front, back Emissivity
		last        float64 // nm of the spectrum
		infrared    spectra.Curve
		known       []string // under en and iso; under the others U and g need both faces
	}{
		{"no infrared rows", NoEmissivity(), NoEmissivity(), 2500, spectra.Curve{}, nil},
		{"of the back", NoEmissivity(), InfraredEmissivity(far, spectra.Curve{}), 2500, spectra.Curve{}, []string{"emissivity back", "U", "g"}},
		{"of the front", InfraredEmissivity(far, spectra.Curve{}), NoEmissivity(), 2500, spectra.Curve{}, []string{"emissivity front", "U turned", "g turned"}},
		{"of both", GivenEmissivity(0.837), GivenNormalEmissivity(0.05), 2500, spectra.Curve{}, []string{"emissivity front", "emissivity back", "U", "U turned", "g", "g turned"}},
		{"of a spectrum that stops early", GivenEmissivity(0.837), GivenEmissivity(0.837), 900, spectra.Curve{}, []string{"emissivity front", "emissivity back", "U", "U turned"}},
		{"of a sheet that lets infrared through", GivenEmissivity(0.837), GivenEmissivity(0.837), 2500, evenly(5000, 50000, 500, func(float64) float64 { return 0.1 }), []string{"emissivity front", "emissivity back"}},
	} {
		pane := &Pane{ID: "p", Plies: []Ply{{ThicknessMM: 6, ConductivityWMK: 1, DensityKGM3: 2500}},
			Tints: []Tint{{Spectrum: spectra.Measured{Tau: flat(0.5, tt.last), RhoFront: flat(0.1, tt.last), RhoBack: flat(0.1, tt.last), InfraredTau: tt.infrared}, Front: tt.front, Back: tt.back}}}
		for _, b := range Bases() {
			list, err := NewMethod(b, Options{}).CoversHeat(pane)
			if err != nil {
				t.Fatal(err)
			}
			want := map[string]Value{}
			for _, turned := range []bool{false, true} {
				ratings, err := Rate(&Makeup{ID: "m", Panes: []Placed{{Pane: pane, Turned: turned}}}, b)
				if err != nil {
					t.Fatal(err)
				}
				r, also, faces := ratings[0], "", [2]string{"front", "back"}
				if turned {
					also, faces = " turned", [2]string{"back", "front"}
				}
				want["U"+also], want["g"+also] = r.U, r.G
				for i, e := range r.Surfaces {
					want["emissivity "+faces[i]] = e.Corrected
				}
			}
			if len(list) != len(want) {
				t.Errorf("%s, %s: %d rows, want %d", tt.name, b.Name, len(list), len(want))
			}
			for _, c := range list {
				value := want[c.Band]
				if c.Mean != value || c.Why != value.Why || c.Below+c.Above+c.Within != 0 {
					t.Errorf("%s, %s, %s: %+v, a rating has %+v", tt.name, b.Name, c.Band, c, value)
				}
				covered := slices.Contains(tt.known, c.Band)
				if _, isG := strings.CutPrefix(c.Band, "g"); b.Balances() && !strings.HasPrefix(c.Band, "emissivity") {
					covered = tt.front.Corrected.Known && tt.back.Corrected.Known && (!isG || tt.last == 2500)
				}
				if covered != (c.Why == "") {
					t.Errorf("%s, %s, %s: unknown for %q", tt.name, b.Name, c.Band, c.Why)
				}
			}
		}
	}
	if _, err := NewMethod(EN, Options{}).CoversHeat(&Pane{ID: "p", Tints: []Tint{{}}}); err == nil {
		t.Error("a pane of nothing has U")
	}
}
