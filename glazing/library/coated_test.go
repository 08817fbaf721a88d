package library_test

import (
	"math"
	"reflect"
	"strings"
	"testing"

	"panewright/glazing"
	"panewright/glazing/film"
	"panewright/glazing/library"
)

// tco is a conductor of free carriers, 150 nm of which have 10.4 Ω.
func tco(t *testing.T, density float64) *film.Material {
	t.Helper()
	c, err := film.Given{DensityCM3: density, MobilityCM2VS: 40, EffectiveMass: 0.35, EpsInf: 3.9}.Carriers()
	if err != nil {
		t.Fatal(err)
	}
	return &film.Material{ID: "tco", Source: "made up", FromNM: 300, ToNM: 50000, Model: film.Oxide(c, nil, false), Carriers: &c}
}

func glassOf(t *testing.T) film.Constants {
	t.Helper()
	c, ok := film.Glass("soda-lime")
	if !ok {
		t.Fatal("no soda-lime glass")
	}
	return c
}

// A face with films has the emissivity of its films, one without that of the convention; the integral over
// the half space is that of the films. On glass of n 1.5 without loss 150 nm of these carriers have 0.1296
// hemispherical (an evaluation that is not ours, from memory); soda-lime glass, which has bands, moves that by
// less than 0.02.
func TestCoated(t *testing.T) {
	c := film.Coated{Glass: glassOf(t), ThicknessMM: 4, Back: []film.Film{{Material: tco(t, 1e21), ThicknessNM: 150}}}
	p := library.Coated("p", c)
	bare := library.Pane("soda-lime-4")
	x := p.Tints[0]
	if e, want := x.Front, bare.Tints[0].Front; e.Source != glazing.EmissivityConvention || e.Normal != want.Normal || e.Corrected != want.Corrected ||
		math.Abs(e.ComputedNormal.Number-want.ComputedNormal.Number) > 1e-13 || math.Abs(e.Hemispherical.Number-want.Hemispherical.Number) > 1e-5 {
		t.Errorf("the bare face: %+v", x.Front)
	}
	if x.Back.Source != glazing.EmissivityComputed || math.Abs(x.Back.Hemispherical.Number-0.1296) > 0.02 {
		t.Errorf("the face with films: %+v", x.Back)
	}
	// The table of EN 12898 between 0.1: 1.14 and 0.2: 1.10 corrects by as much as the integral, within 5 %.
	if e := x.Back; math.Abs(e.Corrected.Number/e.Normal.Number-(1.14-0.4*(e.Normal.Number-0.1))) > 1e-9 || math.Abs(e.Hemispherical.Number/e.Corrected.Number-1) > 0.05 {
		t.Errorf("normal %.5f, corrected %.5f, hemispherical %.5f", e.Normal.Number, e.Corrected.Number, e.Hemispherical.Number)
	}
	if p.Origin != glazing.ModelledOrigin || p.Sheet != nil || p.Coated == nil || p.MassKGM2() != 10 {
		t.Errorf("pane %+v", p)
	}
	for _, words := range []string{"soda-lime glass: M. Rubin", "films of the back from the glass outward: tco 150 nm", "tco: made up"} {
		if !strings.Contains(x.Source, words) {
			t.Errorf("source %q lacks %q", x.Source, words)
		}
	}
}

// The films on the other face: front and back change places, all else stays.
func TestCoatedTurned(t *testing.T) {
	films := []film.Film{{Material: tco(t, 8e20), ThicknessNM: 120}}
	front := library.Coated("p", film.Coated{Glass: glassOf(t), ThicknessMM: 4, Front: films})
	back := library.Coated("p", film.Coated{Glass: glassOf(t), ThicknessMM: 4, Back: films})
	air, err := glazing.Filling(map[string]float64{"air": 1})
	if err != nil {
		t.Fatal(err)
	}
	rate := func(p *glazing.Pane, turned bool) *glazing.Rating {
		m := &glazing.Makeup{ID: "m", Panes: []glazing.Placed{{Pane: library.Pane("soda-lime-4")}, {Pane: p, Turned: turned}},
			Gaps: []glazing.Gap{{WidthMM: 16, Gas: air}}}
		r, err := glazing.Rate(m, glazing.EN)
		if err != nil {
			t.Fatal(err)
		}
		return &r[0]
	}
	a, b, c := rate(front, false), rate(back, true), rate(back, false)
	for _, f := range glazing.Figures() {
		if f.Value == nil {
			continue
		}
		for k := range f.Count(a) {
			x, y := f.Value(a, k), f.Value(b, k)
			if x.Known != y.Known || math.Abs(x.Number-y.Number) > 1e-9*math.Max(1, math.Abs(x.Number)) {
				t.Errorf("%s: %+v with films on the front, %+v turned", f.Key, x, y)
			}
		}
	}
	if math.Abs(a.U.Number-c.U.Number) < 0.05 || a.Surfaces[2].Corrected == c.Surfaces[2].Corrected {
		t.Errorf("U %.3f with films in the gap, %.3f on the room side: the comparison sees nothing", a.U.Number, c.U.Number)
	}
}

// Films of no thickness leave the uncoated pane.
func TestCoatedOfNoThickness(t *testing.T) {
	p := library.Coated("soda-lime-4", film.Coated{Glass: glassOf(t), ThicknessMM: 4, Front: []film.Film{{Material: tco(t, 1e21)}}, Back: []film.Film{{Material: tco(t, 1e21)}}})
	if !reflect.DeepEqual(p, library.Pane("soda-lime-4")) {
		t.Errorf("%+v", p)
	}
}

// More carriers conduct better and pass less sun: emissivity and τe fall.
func TestCoatedFollowsCarriers(t *testing.T) {
	var before *glazing.Rating
	for _, density := range []float64{4e20, 8e20, 1.6e21} {
		p := library.Coated("p", film.Coated{Glass: glassOf(t), ThicknessMM: 4, Back: []film.Film{{Material: tco(t, density), ThicknessNM: 150}}})
		r, err := glazing.Rate(&glazing.Makeup{ID: "m", Panes: []glazing.Placed{{Pane: p}}}, glazing.EN)
		if err != nil {
			t.Fatal(err)
		}
		if b := before; b != nil && !(r[0].Surfaces[1].Corrected.Number < b.Surfaces[1].Corrected.Number && r[0].U.Number < b.U.Number && r[0].Solar.Transmittance.Number < b.Solar.Transmittance.Number) {
			t.Errorf("%g carriers: ε %.4f, U %.4f, τe %.4f; fewer: %.4f, %.4f, %.4f", density, r[0].Surfaces[1].Corrected.Number, r[0].U.Number, r[0].Solar.Transmittance.Number,
				b.Surfaces[1].Corrected.Number, b.U.Number, b.Solar.Transmittance.Number)
		}
		before = &r[0]
	}
}

// A material that does not reach the infrared leaves the emissivity of its face unknown, with the reason, and
// that of a bare face of soda-lime glass by convention.
func TestCoatedOutOfRange(t *testing.T) {
	short := &film.Material{ID: "short", FromNM: 300, ToNM: 2500, Model: film.Constant(2)}
	c := film.Coated{Glass: glassOf(t), ThicknessMM: 4, Back: []film.Film{{Material: short, ThicknessNM: 50}}}
	p := library.Coated("p", c)
	x := p.Tints[0]
	if x.Back.Corrected.Known || !strings.Contains(x.Back.Corrected.Why, "material short ends at 2500 nm") || x.Front.Corrected.Number != 0.837 {
		t.Errorf("front %+v, back %+v", x.Front, x.Back)
	}
	c.Glass.SodaLime = false
	if x = library.Coated("p", c).Tints[0]; x.Front.Corrected.Known == false {
		t.Errorf("the bare face of another glass: %+v", x.Front)
	}
	r, err := glazing.Rate(&glazing.Makeup{ID: "m", Panes: []glazing.Placed{{Pane: p}}}, glazing.EN)
	if err != nil || r[0].U.Known || !r[0].Solar.Transmittance.Known {
		t.Errorf("%v, U %+v, τe %+v", err, r[0].U, r[0].Solar.Transmittance)
	}
}

// From the definition to the pane with all that is known of it.
func BenchmarkCoated(b *testing.B) {
	glass, _ := film.Glass("soda-lime")
	var films []film.Film
	for _, x := range []struct {
		id string
		nm float64
	}{{"titania", 25}, {"silver", 11}, {"nickel-chromium", 1}, {"silicon-nitride", 40}} {
		m, ok := film.MaterialNamed(x.id)
		if !ok {
			b.Fatal(x.id)
		}
		films = append(films, film.Film{Material: m, ThicknessNM: x.nm})
	}
	for b.Loop() {
		library.Coated("p", film.Coated{Glass: glass, ThicknessMM: 4, Back: films})
	}
}
