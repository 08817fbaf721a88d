package main

import (
	"encoding/json"
	"math"
	"slices"
	"strings"
	"testing"

	"panewright/cmd/panewright/internal/table"
	"panewright/glazing"
	"panewright/glazing/film"
	"panewright/glazing/library"
	"panewright/glazing/project"
	"panewright/spectra"
)

// filmDoc is the JSON of film.
type filmDoc struct {
	NM     []float64 `json:"wavelength_nm"`
	Tau    []float64 `json:"tau"`
	Front  []float64 `json:"rho_front"`
	Back   []float64 `json:"rho_back"`
	Sheet  *float64  `json:"sheet_resistance_ohm"`
	Plasma *float64  `json:"screened_plasma_wavelength_nm"`
	Normal *float64  `json:"emissivity_normal"`
	Eps    *float64  `json:"emissivity"`
	Exact  *float64  `json:"emissivity_hemispherical"`
	Indium *float64  `json:"indium_g_m2"`
	Faces  map[string]struct {
		Normal    *float64 `json:"emissivity_normal"`
		Sheet     *float64 `json:"sheet_resistance_ohm"`
		ThinSheet *float64 `json:"emissivity_thin_sheet"`
		Haacke    *float64 `json:"haacke_per_ohm"`
		Gordon    *float64 `json:"gordon_per_ohm"`
	} `json:"faces"`
	Glass struct {
		Front []float64 `json:"absorptance_front"`
		Back  []float64 `json:"absorptance_back"`
	} `json:"glass"`
	Films []struct {
		Face        string    `json:"face"`
		Material    string    `json:"material"`
		ThicknessNM float64   `json:"thickness_nm"`
		Sheet       *float64  `json:"sheet_resistance_ohm"`
		Resistivity *float64  `json:"resistivity_ohm_cm"`
		Plasma      *float64  `json:"plasma_wavelength_nm"`
		Screened    *float64  `json:"screened_plasma_wavelength_nm"`
		Undamped    *float64  `json:"undamped_plasma_wavelength_nm"`
		Gap         *float64  `json:"optical_gap_ev"`
		Indium      *float64  `json:"indium_g_m2"`
		Silver      *float64  `json:"silver_g_m2"`
		HagenRubens *float64  `json:"emissivity_hagen_rubens"`
		Doubts      []string  `json:"doubts"`
		Front       []float64 `json:"absorptance_front"`
		Back        []float64 `json:"absorptance_back"`
	} `json:"films"`
	Angles []struct {
		Deg   float64 `json:"angle_deg"`
		Light struct {
			Transmittance *float64 `json:"transmittance"`
		} `json:"light"`
	} `json:"angles"`
}

// onGlass is 4 mm of soda-lime glass with films.
func onGlass(front, back []film.Film) film.Coated {
	glass, _ := film.Glass("soda-lime")
	return film.Coated{Glass: glass, ThicknessMM: 4, Front: front, Back: back}
}

// builtInFilm is a film of a built-in material.
func builtInFilm(t *testing.T, id string, nm float64) film.Film {
	t.Helper()
	m, ok := film.MaterialNamed(id)
	if !ok {
		t.Fatalf("there is no material %s", id)
	}
	return film.Film{Material: m, ThicknessNM: nm}
}

// publishedFilm is a conductor of the carriers for which checks are published: 1e21 of a mobility of 40.
func publishedFilm(nm float64) film.Film {
	c := film.Carriers{DensityCM3: 1e21, MobilityCM2VS: 40, EffectiveMass: 0.35, EpsInf: 3.9}
	return film.Film{ThicknessNM: nm, Material: &film.Material{ID: "lab-tco", FromNM: 300, ToNM: 50000,
		Model: film.Oxide(c, nil, false), Carriers: &c, Indium: math.NaN(), Silver: math.NaN()}}
}

// shown is the page of a pane of films.
func shown(t *testing.T, c film.Coated, o filmOptions) table.FilmPage {
	t.Helper()
	if o.polarisation == "" {
		o.polarisation = "mean"
	}
	s := shelf{project: &project.Project{Title: "bench", Digest: "0"}, method: glazing.NewMethod(glazing.EN, glazing.Options{})}
	p, err := s.filmPage(library.Coated("bench", c), o)
	if err != nil {
		t.Fatal(err)
	}
	return p
}

// read is the JSON of that page.
func read(t *testing.T, p table.FilmPage) (d filmDoc) {
	t.Helper()
	if err := json.Unmarshal(table.FilmJSON(p), &d); err != nil {
		t.Fatal(err)
	}
	return d
}

// near asserts a figure within a tolerance.
func near(t *testing.T, what string, got *float64, want, tolerance float64, source string) {
	t.Helper()
	if got == nil || !(math.Abs(*got-want) <= tolerance) {
		t.Errorf("%s is %v, want %.6g ± %.1g (%s)", what, value(got), want, tolerance, source)
	}
}

func value(v *float64) any {
	if v == nil {
		return "null"
	}
	return *v
}

// The electrical figures of a film are those of closed forms; what is not known has none.
func TestFilmConductor(t *testing.T) {
	d := read(t, shown(t, onGlass(nil, []film.Film{builtInFilm(t, "silica", 25), publishedFilm(150)}), filmOptions{}))
	const drude = "closed form of P. Drude with the constants of CODATA 2018, from memory"
	f := d.Films[1]
	near(t, "R□", f.Sheet, 10.4025, 5e-3, drude)
	near(t, "R□ of the face", d.Sheet, 10.4025, 5e-3, drude)
	near(t, "ρ", f.Resistivity, 1.56037e-4, 1e-8, "1/(N e µ) by hand")
	near(t, "λp", f.Plasma, 624.66, 0.2, "1239.842 eV·nm over a plasma energy of 1.98483 eV, by hand")
	near(t, "λs", f.Screened, 1237.80, 0.02, "zero of the real part of the permittivity, from memory")
	near(t, "λs of the face", d.Plasma, 1237.80, 0.02, "the same")
	near(t, "λs without damping", f.Undamped, 1233.6, 0.5, drude)
	near(t, "ε of a thin sheet", d.Faces["back"].ThinSheet, 0.10193, 5e-5, "1 − (1 + 2·10.4025/376.730)⁻², by hand")
	near(t, "ε by Hagen and Rubens", f.HagenRubens, 0.14430, 5e-5, "0.16336 of 2e-4 Ω·cm at 10 µm times √(1.56037/2), by hand")
	if f.Indium != nil || f.Silver != nil || d.Indium != nil || f.Gap != nil {
		t.Errorf("indium %v, silver %v, gap %v: a material of unknown composition without an edge has none", value(f.Indium), value(f.Silver), value(f.Gap))
	}
	if s := d.Films[0]; s.Material != "silica" || s.Face != "back" || s.ThicknessNM != 25 || s.Sheet != nil || s.Plasma != nil || len(s.Doubts) > 0 {
		t.Errorf("the film on the glass is %+v", s)
	}
	if len(f.Doubts) == 0 || d.Faces["front"].Sheet != nil {
		t.Errorf("doubts %q, R□ of the bare face %v; ωτ of a mobility of 40 is above 0.3", f.Doubts, value(d.Faces["front"].Sheet))
	}
}

// Indium and silver are density times thickness times fraction, added over the films.
func TestFilmScarceMetals(t *testing.T) {
	d := read(t, shown(t, onGlass([]film.Film{builtInFilm(t, "ito", 100)}, []film.Film{builtInFilm(t, "ito", 150), builtInFilm(t, "silver", 12)}), filmOptions{}))
	near(t, "indium", d.Indium, 250e-9*7150e3*0.744, 1e-3, "7150 kg/m³, oxides 90 to 10 by mass, by hand")
	near(t, "indium of a film", d.Films[1].Indium, 150e-9*7150e3*0.744, 1e-3, "the same")
	near(t, "silver", d.Films[2].Silver, 12e-9*10490e3, 1e-6, "10490 kg/m³, by hand")
	near(t, "indium in silver", d.Films[2].Indium, 0, 0, "there is none")
}

// The gap follows the carriers: that of indium oxide, 3.75 eV, by 4e19 of them.
func TestFilmGap(t *testing.T) {
	d := read(t, shown(t, onGlass([]film.Film{builtInFilm(t, "indium-oxide", 200)}, nil), filmOptions{}))
	widened := 0.74114 * math.Pow(4e19/6e20, 2.0/3)
	narrowed := 0.2 * math.Cbrt(0.4)
	near(t, "gap", d.Films[0].Gap, 3.75+widened-narrowed, 1e-4,
		"0.74114 eV of 6e20 (E. Burstein 1954, T. S. Moss 1954) times N^(2/3), less the assumed narrowing of 0.2 eV at 1e20 times N^(1/3), by hand")
}

// The short emissivities are those of the face with films, of the front if both have some or neither.
func TestFilmShortFace(t *testing.T) {
	ito := []film.Film{builtInFilm(t, "ito", 150)}
	for _, tt := range []struct {
		front, back []film.Film
		face        string
	}{{ito, nil, "front"}, {nil, ito, "back"}, {ito, []film.Film{builtInFilm(t, "ito", 400)}, "front"}, {nil, nil, "front"}} {
		d := read(t, shown(t, onGlass(tt.front, tt.back), filmOptions{}))
		if d.Normal == nil || *d.Normal != *d.Faces[tt.face].Normal {
			t.Errorf("%d films in front, %d behind: normal emissivity %v, want that of the %s", len(tt.front), len(tt.back), value(d.Normal), tt.face)
		}
		if (d.Sheet == nil) != (d.Faces[tt.face].Sheet == nil) || d.Sheet != nil && *d.Sheet != *d.Faces[tt.face].Sheet {
			t.Errorf("%d films in front, %d behind: R□ %v, want that of the %s", len(tt.front), len(tt.back), value(d.Sheet), tt.face)
		}
		if bare := len(tt.front)+len(tt.back) == 0; bare && (*d.Eps != 0.837 || *d.Normal != 0.89) || !bare && *d.Eps > 0.5 {
			t.Errorf("%d films in front, %d behind: emissivity %v (EN 673: 0.837 uncoated)", len(tt.front), len(tt.back), *d.Eps)
		}
	}
}

// Conductors of one face conduct beside each other; those of the other face do not count.
func TestFilmParallel(t *testing.T) {
	d := read(t, shown(t, onGlass([]film.Film{publishedFilm(150), builtInFilm(t, "silica", 30), publishedFilm(50)}, []film.Film{publishedFilm(100)}), filmOptions{}))
	near(t, "R□", d.Sheet, 10.4025*150/200, 5e-3, "200 nm of what has 10.4025 Ω at 150 nm")
	near(t, "R□ of the back", d.Faces["back"].Sheet, 10.4025*1.5, 5e-3, "100 nm of the same")
	// With τv of the page, Haacke and Gordon by hand.
	tau := *d.Angles[0].Light.Transmittance
	near(t, "Haacke", d.Faces["front"].Haacke, math.Exp(10*math.Log(tau))/7.801875, 1e-5, "T¹⁰/R□")
	if g := d.Faces["front"].Gordon; g == nil || !(*g > 1/7.801875) {
		t.Errorf("Gordon %v; above 1/R□ where less than 1 − 1/e is absorbed", value(g))
	}
}

// Light that meets a face is transmitted, reflected, or absorbed in the glass or a film, in any polarisation;
// the mean is that of both.
func TestFilmLight(t *testing.T) {
	c := onGlass([]film.Film{builtInFilm(t, "silica", 90)}, []film.Film{builtInFilm(t, "zinc-oxide", 35), builtInFilm(t, "silver", 11), builtInFilm(t, "zinc-oxide", 40)})
	docs := map[string]filmDoc{}
	for _, pol := range polarisations {
		d := read(t, shown(t, c, filmOptions{at: "550,400,1500,10200", angleDeg: 60, polarisation: pol}))
		if !slices.Equal(d.NM, []float64{550, 400, 1500, 10200}) {
			t.Errorf("wavelengths %v, in another order than asked for", d.NM)
		}
		for i, nm := range d.NM {
			front, back := d.Tau[i]+d.Front[i]+d.Glass.Front[i], d.Tau[i]+d.Back[i]+d.Glass.Back[i]
			for _, f := range d.Films {
				front, back = front+f.Front[i], back+f.Back[i]
			}
			if math.Abs(front-1) > 1e-12 || math.Abs(back-1) > 1e-12 {
				t.Errorf("%s at %g nm: shares add up to %.15g and %.15g", pol, nm, front, back)
			}
		}
		docs[pol] = d
	}
	for i, nm := range docs["mean"].NM {
		if mean := (docs["s"].Tau[i] + docs["p"].Tau[i]) / 2; math.Abs(docs["mean"].Tau[i]-mean) > 1e-15 || docs["s"].Tau[i] == docs["p"].Tau[i] && nm < 3000 {
			t.Errorf("at %g nm τ is %g of s, %g of p, %g of both", nm, docs["s"].Tau[i], docs["p"].Tau[i], docs["mean"].Tau[i])
		}
	}
	normal := read(t, shown(t, c, filmOptions{at: "550", polarisation: "s"}))
	if p := read(t, shown(t, c, filmOptions{at: "550", polarisation: "p"})); p.Tau[0] != normal.Tau[0] || p.Front[0] != normal.Front[0] {
		t.Error("at normal incidence the polarisations differ")
	}
}

// At Brewster's angle P passes glass without loss, and S is reflected by Fresnel's equations (closed form).
func TestFilmBrewster(t *testing.T) {
	flat := func(v float64) spectra.Curve { return spectra.Curve{NM: []float64{300, 50000}, Value: []float64{v, v}} }
	c := film.Coated{Glass: film.Constants{Name: "clear", N: flat(1.5), K: flat(0)}, ThicknessMM: 4}
	deg := math.Atan(1.5) * 180 / math.Pi
	p := read(t, shown(t, c, filmOptions{at: "550", angleDeg: deg, polarisation: "p"}))
	s := read(t, shown(t, c, filmOptions{at: "550", angleDeg: deg, polarisation: "s"}))
	near(t, "ρ of P", &p.Front[0], 0, 1e-15, "D. Brewster 1815")
	near(t, "τ of P", &p.Tau[0], 1, 1e-12, "the same")
	face := math.Pow((1.5*1.5-1)/(1.5*1.5+1), 2)
	near(t, "ρ of S", &s.Back[0], 2*face/(1+face), 1e-12, "Fresnel at two faces, by hand")
}

// What is shown at the wavelengths of the standards is the spectrum that a rating takes, and the emissivities are
// those of a rating.
func TestFilmIsTheRating(t *testing.T) {
	c := onGlass(nil, []film.Film{builtInFilm(t, "zinc-oxide", 35), builtInFilm(t, "silver", 11), builtInFilm(t, "zinc-oxide", 40)})
	p := shown(t, c, filmOptions{at: "all"})
	d := read(t, p)
	pane := library.Coated("bench", c)
	m := &pane.Tints[0].Spectrum
	if len(d.NM) != m.Tau.Len()+m.InfraredBack.Len() {
		t.Fatalf("%d wavelengths, want %d and %d", len(d.NM), m.Tau.Len(), m.InfraredBack.Len())
	}
	for i := range m.Tau.NM {
		if d.NM[i] != m.Tau.NM[i] || d.Tau[i] != m.Tau.Value[i] || d.Front[i] != m.RhoFront.Value[i] || d.Back[i] != m.RhoBack.Value[i] {
			t.Fatalf("at %g nm τ %v, ρ %v and %v differ from the spectrum of the pane", d.NM[i], d.Tau[i], d.Front[i], d.Back[i])
		}
	}
	for i := range m.InfraredBack.NM {
		if k := m.Tau.Len() + i; d.Back[k] != m.InfraredBack.Value[i] {
			t.Fatalf("at %g nm ρ %v differs from the spectrum of the pane", d.NM[k], d.Back[k])
		}
	}
	back := p.Ratings[0].Surfaces[1]
	if *d.Eps != back.Corrected.Number || *d.Exact != back.Hemispherical.Number || *d.Normal != back.Normal.Number {
		t.Errorf("ε %v, %v, %v; rated %+v", *d.Normal, *d.Eps, *d.Exact, back)
	}
}

// The figures at an angle fall, and are those of a rating at that angle where the pane is uncoated.
func TestFilmAngles(t *testing.T) {
	d := read(t, shown(t, onGlass(nil, nil), filmOptions{}))
	if len(d.Angles) != 3 || d.Angles[0].Deg != 0 || d.Angles[1].Deg != 45 || d.Angles[2].Deg != 60 {
		t.Fatalf("angles %+v", d.Angles)
	}
	for _, a := range d.Angles[1:] {
		ready, err := glazing.NewMethod(glazing.EN, glazing.Options{AngleDeg: a.Deg}).Ready(
			&glazing.Makeup{ID: "x", Panes: []glazing.Placed{{Pane: library.Pane("soda-lime-4")}}})
		if err != nil {
			t.Fatal(err)
		}
		ratings, err := ready.RateAll()
		if err != nil {
			t.Fatal(err)
		}
		near(t, "τv", a.Light.Transmittance, ratings[0].Light.Transmittance.Number, 1e-9, "rated at that angle")
	}
}

// A material that ends at 2500 nm leaves its figures in the infrared unknown, and a wavelength beyond is refused.
func TestFilmRange(t *testing.T) {
	flat := func(v float64) spectra.Curve { return spectra.Curve{NM: []float64{320, 2500}, Value: []float64{v, v}} }
	short := film.Film{ThicknessNM: 100, Material: &film.Material{ID: "lab-nk", FromNM: 320, ToNM: 2500, Indium: math.NaN(), Silver: math.NaN(),
		Model: film.Tabulated{Constants: film.Constants{Name: "lab-nk", N: flat(2), K: flat(0.01)}}}}
	c := onGlass([]film.Film{short}, nil)
	d := read(t, shown(t, c, filmOptions{}))
	if d.Normal != nil || d.Eps != nil || d.Exact != nil || d.NM[0] != 320 || d.NM[len(d.NM)-1] != 2500 {
		t.Errorf("ε %v, %v, %v from %g to %g nm; the film is known from 320 to 2500 nm", value(d.Normal), value(d.Eps), value(d.Exact), d.NM[0], d.NM[len(d.NM)-1])
	}
	pane := library.Coated("bench", c)
	for at, want := range map[string]string{
		"550,10200": "--at: material lab-nk may be used from 320 to 2500 nm, not at 10200 nm",
		"299,550":   "--at: glass soda-lime may be used from 300 to",
		"310":       "--at: material lab-nk may be used from 320",
		"0.55":      "--at: glass soda-lime may be used from 300 to",
		"550,,600":  `--at: "" is no wavelength in nm; write 450,550,10200 or all`,
		"green":     `--at: "green" is no wavelength`,
		"-550":      `--at: "-550" is no wavelength`,
		"Inf":       `--at: "Inf" is no wavelength`,
		"NaN":       `--at: "NaN" is no wavelength`,
	} {
		if _, err := filmWavelengths(at, c, pane); err == nil || !strings.HasPrefix(err.Error(), want) {
			t.Errorf("--at %s: %v, want %s", at, err, want)
		}
	}
	if nm, err := filmWavelengths("2500, 320", c, pane); err != nil || !slices.Equal(nm, []float64{2500, 320}) {
		t.Errorf("the ends of the range: %v, %v", nm, err)
	}
}
