package film_test

import (
	"math"
	"slices"
	"strings"
	"testing"

	"panewright/glazing/film"
	"panewright/spectra"
)

// flat is a material of a constant index.
func flat(id string, index complex128) *film.Material {
	return &film.Material{ID: id, FromNM: 300, ToNM: 50000, Model: film.Constant(index)}
}

// conductor is a material of plain free carriers.
func conductor(t testing.TB, density, mobility, mass, epsInf float64) *film.Material {
	t.Helper()
	c, err := film.Given{DensityCM3: density, MobilityCM2VS: mobility, EffectiveMass: mass, EpsInf: epsInf}.Carriers()
	if err != nil {
		t.Fatal(err)
	}
	return &film.Material{ID: "conductor", FromNM: 300, ToNM: 50000, Model: film.Oxide(c, nil, false), Carriers: &c}
}

func builtIn(t testing.TB, id string) *film.Material {
	t.Helper()
	m, ok := film.MaterialNamed(id)
	if !ok {
		t.Fatalf("no material %s", id)
	}
	return m
}

func sodaLime(t testing.TB) film.Constants {
	t.Helper()
	c, ok := film.Glass("soda-lime")
	if !ok {
		t.Fatal("no soda-lime glass")
	}
	return c
}

// furthest is the largest difference of two curves at the wavelengths of the first.
func furthest(a, b spectra.Curve) float64 {
	var far float64
	for i, nm := range a.NM {
		far = max(far, math.Abs(a.Value[i]-b.At(nm)))
	}
	return far
}

// A pane without films is a sheet, and so is one whose films are air: that is computed film by film.
func TestReadyWithoutFilmsIsASheet(t *testing.T) {
	glass := sodaLime(t)
	sheet := film.Sheet{Constants: glass, ThicknessMM: 4}
	air, tco := flat("air", 1), conductor(t, 1e21, 40, 0.35, 3.9)
	for name, c := range map[string]film.Coated{
		"none": {Glass: glass, ThicknessMM: 4},
		"zero": {Glass: glass, ThicknessMM: 4, Front: []film.Film{{Material: tco}}, Back: []film.Film{{Material: tco}, {Material: air}}},
		"air":  {Glass: glass, ThicknessMM: 4, Front: []film.Film{{Material: air, ThicknessNM: 80}}, Back: []film.Film{{Material: air, ThicknessNM: 200}, {Material: tco}}},
	} {
		r := c.Ready()
		for _, x := range []struct {
			what      string
			got, want spectra.Measured
		}{
			{"0°", r.Spectrum(0), sheet.Spectrum(0)}, {"60°", r.Spectrum(60), sheet.Spectrum(60)},
			{"half space", r.HemisphericalSpectrum(), sheet.HemisphericalSpectrum()},
		} {
			if !slices.Equal(x.got.Tau.NM, x.want.Tau.NM) {
				t.Fatalf("%s, %s: other wavelengths", name, x.what)
			}
			for k, pair := range [...][2]spectra.Curve{{x.want.Tau, x.got.Tau}, {x.want.RhoFront, x.got.RhoFront}, {x.want.RhoBack, x.got.RhoBack},
				{x.want.InfraredFront, x.got.InfraredFront}, {x.want.InfraredBack, x.got.InfraredBack}} {
				if far := furthest(pair[0], pair[1]); pair[1].Len() == 0 || far > 1e-13 {
					t.Errorf("%s, %s, curve %d: off by %.2g", name, x.what, k, far)
				}
			}
			if x.got.InfraredTau.Len() != 0 || len(x.got.Cautions) != len(x.want.Cautions) {
				t.Errorf("%s, %s: infrared transmittance %d, cautions %v", name, x.what, x.got.InfraredTau.Len(), x.got.Cautions)
			}
		}
		want, _ := sheet.HemisphericalEmissivity()
		tolerance := 0.0
		if name == "air" {
			tolerance = 1e-5 // of two quadratures
		}
		if front, back, ok := r.HemisphericalEmissivity(); !ok || math.Abs(front-want) > tolerance || math.Abs(back-want) > tolerance {
			t.Errorf("%s: emissivities %.7f and %.7f, of a sheet %.7f", name, front, back, want)
		}
		if films := name == "air"; r.Films(film.Front) != films || r.Films(film.Back) != films {
			t.Errorf("%s: films on the front %v, on the back %v", name, r.Films(film.Front), r.Films(film.Back))
		}
	}
}

// Each value of a spectrum is that of the pane at its wavelength, by the slow way; a pane whose faces change
// places reflects the same with front and back exchanged.
func TestReadySpectrum(t *testing.T) {
	films := []film.Film{{Material: builtIn(t, "silica"), ThicknessNM: 25}, {Material: builtIn(t, "ito"), ThicknessNM: 150}, {Material: builtIn(t, "titania"), ThicknessNM: 12}}
	c := film.Coated{Glass: sodaLime(t), ThicknessMM: 6, Front: []film.Film{{Material: flat("x", 1.38), ThicknessNM: 100}}, Back: films}
	turned := film.Coated{Glass: c.Glass, ThicknessMM: 6, Front: c.Back, Back: c.Front}
	r, rt := c.Ready(), turned.Ready()
	for _, deg := range []float64{0, 57} {
		m, mt := r.Spectrum(deg), rt.Spectrum(deg)
		for i := 0; i < m.Tau.Len(); i += 37 {
			s, p := c.At(m.Tau.NM[i], deg)
			u := film.Unpolarised(s, p)
			if math.Abs(u.T-m.Tau.Value[i]) > 1e-13 || math.Abs(u.RFront-m.RhoFront.Value[i]) > 1e-13 || math.Abs(u.RBack-m.RhoBack.Value[i]) > 1e-13 {
				t.Errorf("%g° at %g nm: %+v, in the spectrum %.15f, %.15f, %.15f", deg, m.Tau.NM[i], u, m.Tau.Value[i], m.RhoFront.Value[i], m.RhoBack.Value[i])
			}
		}
		for _, um := range []float64{5.5, 9.2, 30.9} { // of EN 12898, near the band of silica
			s, p := c.At(um*1000, deg)
			if u := film.Unpolarised(s, p); math.Abs(u.RBack-m.InfraredBack.At(um*1000)) > 1e-3 || (um != 9.2 && math.Abs(u.RFront-m.InfraredFront.At(um*1000)) > 1e-12) {
				t.Errorf("%g° at %g µm: %+v, in the spectrum %.9f and %.9f", deg, um, u, m.InfraredFront.At(um*1000), m.InfraredBack.At(um*1000))
			}
		}
		for _, pair := range [...][2]spectra.Curve{{m.Tau, mt.Tau}, {m.RhoFront, mt.RhoBack}, {m.RhoBack, mt.RhoFront}, {m.InfraredFront, mt.InfraredBack}, {m.InfraredBack, mt.InfraredFront}} {
			if far := furthest(pair[0], pair[1]); far > 1e-13 {
				t.Errorf("%g°: turned off by %.2g", deg, far)
			}
		}
		if furthest(m.RhoFront, m.RhoBack) < 0.01 {
			t.Errorf("%g°: both faces reflect the same: the comparison sees nothing", deg)
		}
	}
}

// The emissivity over the half space agrees with plain sums over many more wavelengths and angles, with bands of
// the infrared and metals too, and on either face.
func TestReadyEmissivityConverges(t *testing.T) {
	narrow := &film.Material{ID: "band", FromNM: 300, ToNM: 50000, Model: film.NewOscillators(2.2, film.Lorentz{Strength: 0.4, EnergyEV: 0.11, BroadeningEV: 0.0004})}
	glass := sodaLime(t)
	for name, c := range map[string]film.Coated{
		"oxide":         {Glass: glass, ThicknessMM: 4, Back: []film.Film{{Material: conductor(t, 1e21, 40, 0.35, 3.9), ThicknessNM: 150}}},
		"silver":        {Glass: glass, ThicknessMM: 4, Back: []film.Film{{Material: builtIn(t, "zinc-oxide"), ThicknessNM: 30}, {Material: builtIn(t, "silver"), ThicknessNM: 12}, {Material: builtIn(t, "silica"), ThicknessNM: 60}}},
		"front":         {Glass: glass, ThicknessMM: 4, Front: []film.Film{{Material: builtIn(t, "gold"), ThicknessNM: 100}, {Material: builtIn(t, "aluminium-nitride"), ThicknessNM: 700}}},
		"narrow band":   {Glass: glass, ThicknessMM: 4, Back: []film.Film{{Material: builtIn(t, "gold"), ThicknessNM: 100}, {Material: narrow, ThicknessNM: 900}}},
		"thin, no loss": {Glass: film.Constants{N: level(1.5), K: level(0)}, ThicknessMM: 1, Back: []film.Film{{Material: conductor(t, 8e20, 30, 0.35, 3.9), ThicknessNM: 120}}},
	} {
		const wavelengths, angles = 6000, 60
		var sumFront, sumBack, weights float64
		nm, planck := make([]float64, wavelengths), make([]float64, wavelengths)
		for i := range nm {
			nm[i] = 5000 * math.Pow(10, (float64(i)+0.5)/wavelengths)
			x := 1.438776877e7 / (nm[i] * 283)
			planck[i] = math.Pow(x, 5) / math.Expm1(x) * nm[i]
		}
		filmed := c // metals as they are in their films
		for _, face := range [2][]film.Film{filmed.Front, filmed.Back} {
			for i := range face {
				face[i].Material = face[i].Material.InFilm(face[i].ThicknessNM)
			}
		}
		sampled := filmed.Sample(nm)
		var s, p film.Shares
		for k := range angles { // the middle of equal parts of the square root of cos θ
			v := (float64(k) + 0.5) / angles
			sampled.At(&s, &p, math.Acos(v*v)*180/math.Pi)
			s.Mean(&s, &p)
			for i, w := range planck {
				w *= v * v * v
				sumFront += w * (1 - s.T[i] - s.RFront[i])
				sumBack += w * (1 - s.T[i] - s.RBack[i])
				weights += w
			}
		}
		front, back, ok := c.Ready().HemisphericalEmissivity()
		if !ok || math.Abs(front-sumFront/weights) > 4e-5 || math.Abs(back-sumBack/weights) > 4e-5 {
			t.Errorf("%s: %.6f and %.6f, by plain sums %.6f and %.6f", name, front, back, sumFront/weights, sumBack/weights)
		}
	}
}

// level is a curve of one value.
func level(v float64) spectra.Curve {
	return spectra.Curve{NM: []float64{300, 50000}, Value: []float64{v, v}}
}

// The emissivity over the half space of free carriers on a half space of n 1.5 without loss, by Planck's
// law from 5 to 50 µm at 283 K: values of an evaluation on a fine grid that is not ours, from memory, with its
// tolerance. A kilometre of glass that absorbs very little is such a half space.
func TestReadyEmissivityOfFreeCarriers(t *testing.T) {
	for _, x := range []struct{ density, mobility, mass, epsInf, nm, want float64 }{
		{1e21, 40, 0.35, 3.9, 150, 0.12962},
		{8e20, 30, 0.35, 3.9, 120, 0.22921},
		{6e20, 25, 0.33, 3.7, 500, 0.15776},
	} {
		c := film.Coated{Glass: film.Constants{N: level(1.5), K: level(1e-6)}, ThicknessMM: 1e6,
			Front: []film.Film{{Material: conductor(t, x.density, x.mobility, x.mass, x.epsInf), ThicknessNM: x.nm}}}
		if got, _, ok := c.Ready().HemisphericalEmissivity(); !ok || math.Abs(got-x.want) > 0.0003 {
			t.Errorf("%+v: %.5f", x, got)
		}
	}
}

// A metal whose surfaces scatter is taken as it is in its film, whether or not the caller saw to that.
func TestReadyThinMetal(t *testing.T) {
	bulk := builtIn(t, "silver")
	of := func(m *film.Material) float64 {
		_, back, _ := film.Coated{Glass: sodaLime(t), ThicknessMM: 4, Back: []film.Film{{Material: m, ThicknessNM: 10}}}.Ready().HemisphericalEmissivity()
		return back
	}
	thin := of(bulk.InFilm(10))
	if got := of(bulk); got != thin {
		t.Errorf("of bulk %.6f, of the film %.6f", got, thin)
	}
	plain := *bulk
	plain.Carriers = nil // nothing is known that could scatter
	if got := of(&plain); got > 0.9*thin {
		t.Errorf("without scattering %.6f, with it %.6f: the comparison sees nothing", got, thin)
	}
}

// What a material does not cover is left out, and named.
func TestReadyRanges(t *testing.T) {
	short := flat("short", 2)
	short.FromNM, short.ToNM = 400, 900
	c := film.Coated{Glass: sodaLime(t), ThicknessMM: 4, Back: []film.Film{{Material: short, ThicknessNM: 50}}}
	r := c.Ready()
	m := r.Spectrum(0)
	if err := c.Check(); err != nil || m.Tau.First() != 400 || m.Tau.Last() != 900 || m.InfraredBack.Len() != 0 {
		t.Errorf("from %g to %g nm, infrared %d, %v", m.Tau.First(), m.Tau.Last(), m.InfraredBack.Len(), err)
	}
	if why := r.InfraredWhy(); !strings.Contains(why, "material short ends at 900 nm") {
		t.Errorf("why no emissivity: %q", why)
	}
	if _, _, ok := r.HemisphericalEmissivity(); ok {
		t.Error("an emissivity of a material that ends at 900 nm")
	}
	short.FromNM, short.ToNM = 300, 30000 // held, and said
	r = c.Ready()
	front, back, ok := r.HemisphericalEmissivity()
	long, _, _ := film.Coated{Glass: c.Glass, ThicknessMM: 4, Back: []film.Film{{Material: flat("long", 2), ThicknessNM: 50}}}.Ready().HemisphericalEmissivity()
	if m = r.Spectrum(0); !ok || math.Abs(front-long) > 1e-9 || !(back > 0.5) || m.InfraredBack.Last() != 30000 {
		t.Errorf("to 30 µm: %.6f and %.6f, infrared to %g nm", front, back, m.InfraredBack.Last())
	}
	if !slices.ContainsFunc(m.Cautions, func(c spectra.Caution) bool {
		return c.Code == "extended" && strings.Contains(c.Text, "material short ends at 30000 nm")
	}) {
		t.Errorf("no caution that the material ends at 30 µm: %v", m.Cautions)
	}
}

// Materials that are typical, extended or modelled say so once, however many films they make.
func TestReadyCautions(t *testing.T) {
	fto, silver, ito := builtIn(t, "fto"), builtIn(t, "silver"), builtIn(t, "ito")
	m := film.Coated{Glass: sodaLime(t), ThicknessMM: 4, Front: []film.Film{{Material: fto, ThicknessNM: 300}},
		Back: []film.Film{{Material: silver, ThicknessNM: 10}, {Material: ito, ThicknessNM: 50}, {Material: silver, ThicknessNM: 12}}}.Ready().Spectrum(0)
	var codes []string
	for _, c := range m.Cautions {
		if strings.HasPrefix(c.Text, "Film material ") {
			codes = append(codes, strings.Fields(c.Text)[2]+c.Code)
		}
	}
	if want := []string{"fto:typical", "silver:extended", "ito:modelled"}; !slices.Equal(codes, want) {
		t.Errorf("cautions %v, want %v", codes, want)
	}
}

func TestCheckCoated(t *testing.T) {
	m := flat("m", 2)
	far := flat("far", 2)
	far.FromNM = 3000
	good := film.Coated{Glass: sodaLime(t), ThicknessMM: 4, Back: []film.Film{{Material: m, ThicknessNM: 10}}}
	if err := good.Check(); err != nil {
		t.Error(err)
	}
	for words, change := range map[string]func(c *film.Coated){
		"thickness of 0 mm":                  func(c *film.Coated) { c.ThicknessMM = 0 },
		"thickness of NaN mm":                func(c *film.Coated) { c.ThicknessMM = math.NaN() },
		"film of m has a thickness of -1 nm": func(c *film.Coated) { c.Back = []film.Film{{Material: m, ThicknessNM: -1}} },
		"thickness of +Inf nm":               func(c *film.Coated) { c.Front = []film.Film{{Material: m, ThicknessNM: math.Inf(1)}} },
		"no material":                        func(c *film.Coated) { c.Front = []film.Film{{ThicknessNM: 1}} },
		"201 films":                          func(c *film.Coated) { c.Front = slices.Repeat(good.Back, 201) },
		"material far begins at 3000 nm":     func(c *film.Coated) { c.Front = []film.Film{{Material: far, ThicknessNM: 1}} },
		"n 0 and k 0.0001 at 400 nm": func(c *film.Coated) {
			none := flat("none", 2)
			none.Model = film.Tabulated{Constants: film.Constants{N: spectra.Curve{NM: []float64{300, 400, 50000}, Value: []float64{1, 0, 1}}, K: level(1e-4)}}
			c.Front = []film.Film{{Material: none, ThicknessNM: 1}}
		},
	} {
		c := good
		change(&c)
		if err := c.Check(); err == nil || !strings.Contains(err.Error(), words) {
			t.Errorf("%v, want %q", err, words)
		}
	}
	none := good
	none.Front = []film.Film{{Material: far}} // of no thickness, it says nothing
	if err := none.Check(); err != nil {
		t.Error(err)
	}
}

// From the definition to the spectrum at normal incidence and both emissivities; spectrum beside it is that of
// a sheet of the glass.
func BenchmarkReady(b *testing.B) {
	glass := sodaLime(b)
	for name, films := range map[string][]film.Film{
		"silver_four": {{Material: builtIn(b, "titania"), ThicknessNM: 25}, {Material: builtIn(b, "silver"), ThicknessNM: 11},
			{Material: builtIn(b, "nickel-chromium"), ThicknessNM: 1}, {Material: builtIn(b, "silicon-nitride"), ThicknessNM: 40}},
		"oxide_four": {{Material: builtIn(b, "silica"), ThicknessNM: 25}, {Material: builtIn(b, "ito"), ThicknessNM: 150},
			{Material: builtIn(b, "silica"), ThicknessNM: 60}, {Material: builtIn(b, "titania"), ThicknessNM: 10}},
		"tin_oxide_one": {{Material: builtIn(b, "fto"), ThicknessNM: 350}},
	} {
		b.Run(name, func(b *testing.B) {
			c := film.Coated{Glass: glass, ThicknessMM: 4, Back: films}
			b.ReportAllocs()
			for b.Loop() {
				r := c.Ready()
				r.Spectrum(0)
				r.HemisphericalEmissivity()
			}
		})
	}
}
