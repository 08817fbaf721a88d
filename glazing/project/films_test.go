package project

import (
	"fmt"
	"math"
	"slices"
	"strings"
	"testing"

	"panewright/glazing"
	"panewright/glazing/film"
	"panewright/glazing/library"
	"panewright/spectra"
)

// ofFilms is a project of a double glazing whose inner pane has the given films on its front, and of the given
// materials.
func ofFilms(materials, films string) string {
	return "project: Films\nmaterials:\n" + materials + `glasses:
  - {id: deep, nk: deep.csv}
panes:
  - id: p
    glass: soda-lime
    thickness_mm: 4
    coatings:
      - face: front
        films:
` + films + `makeups:
  - id: A
    outside_to_inside:
      - {pane: soda-lime-4}
      - {gap_mm: 16, gas: {argon: 0.9, air: 0.1}}
      - {pane: p}
`
}

const (
	labITO  = "  - {id: lab-ito, model: drude, carriers_cm3: 1e21, mobility_cm2_v_s: 40, effective_mass: 0.35, eps_infinity: 3.9}\n"
	ofLab   = "          - {material: lab-ito, thickness_nm: 150}\n"
	noFilms = "    coatings:\n      - face: front\n        films:\n" + ofLab
)

// filmFiles holds a clear glass that absorbs very little, whose far side 200 mm of it hide from long waves.
func filmFiles() map[string]string {
	return map[string]string{"deep.csv": "wavelength_um,n,k\n0.3,1.5,1e-4\n50,1.5,1e-4\n", "two.csv": "wavelength_um,n,k\n0.3,1.46,0\n50,1.46,0\n", "a.csv": spectrumOf("0.7,0.2,0.1")}
}

// filmOf returns a film of the project's pane, counted from the glass on its front.
func filmOf(p *Project, i int) film.Film { return p.Panes[0].Coated.Front[i] }

// The pane of a project is that of the same films put together by hand.
func TestCoatedPane(t *testing.T) {
	p := accept(t, ofFilms(labITO, ofLab), filmFiles())
	c, err := film.Given{DensityCM3: 1e21, MobilityCM2VS: 40, EffectiveMass: 0.35, EpsInf: 3.9}.Carriers()
	if err != nil {
		t.Fatal(err)
	}
	glass, _ := film.Glass("soda-lime")
	m := &film.Material{ID: "lab-ito", FromNM: 300, ToNM: 50000, Model: film.Oxide(c, nil, false), Carriers: &c}
	by := accept(t, ofFilms(labITO, ofLab), filmFiles())
	by.Makeups[0].Panes[1].Pane = library.Coated("p", film.Coated{Glass: glass, ThicknessMM: 4, Front: []film.Film{{Material: m, ThicknessNM: 150}}})
	for _, basis := range glazing.Bases() {
		if !sameFigures(t, p, by, basis) {
			t.Errorf("%s: the project's pane rates otherwise than the same films by hand", basis.Name)
		}
	}
	pane, r := p.Panes[0], ratings(t, p, glazing.EN)[0]
	if pane.Origin != glazing.ModelledOrigin || pane.ThicknessMM() != 4 || !strings.Contains(pane.Tints[0].Source, "lab-ito 150 nm") {
		t.Errorf("pane %+v", pane)
	}
	if r.Surfaces[2].Source != glazing.EmissivityComputed || r.Surfaces[3].Source != glazing.EmissivityConvention {
		t.Errorf("emissivities of surfaces 3 and 4 by %s and %s", r.Surfaces[2].Source, r.Surfaces[3].Source)
	}
	typed := accept(t, strings.Replace(ofFilms(labITO, ofLab), "    glass: ", "    emissivity_front: 0.5\n    conductivity_w_mk: 1.2\n    glass: ", 1), filmFiles()).Panes[0]
	if typed.Tints[0].Front.Corrected.Number != 0.5 || typed.Plies[0].ConductivityWMK != 1.2 {
		t.Errorf("what is typed does not win: %+v", typed)
	}
	onPane := accept(t, strings.Replace(ofFilms(labITO, ofLab), "glass: soda-lime\n    thickness_mm: 4", "glass: soda-lime-4", 1), filmFiles())
	if !sameFigures(t, p, onPane, glazing.EN) {
		t.Error("on a pane of the library the films rate otherwise than on its glass")
	}
}

// Free carriers on a half space of n 1.5 without loss, which 200 mm of a glass that absorbs very little are:
// 0.12962 over the half space, and 0.10965 normal to it where Planck's law weights (an evaluation that is not
// ours, from memory, ±0.0003 each); the thirty wavelengths of EN 12898 weight alike within 0.002.
func TestEmissivityOfFreeCarriers(t *testing.T) {
	text := strings.Replace(ofFilms(labITO, ofLab), "glass: soda-lime\n    thickness_mm: 4", "glass: deep\n    thickness_mm: 200", 1)
	e := accept(t, text, filmFiles()).Panes[0].Tints[0].Front
	if math.Abs(e.Hemispherical.Number-0.12962) > 0.0003 || math.Abs(e.Normal.Number-0.10965) > 0.002 {
		t.Errorf("hemispherical %.5f, normal %.5f", e.Hemispherical.Number, e.Normal.Number)
	}
}

// One figure of the carriers moves emissivity, U and light together: fewer carriers emit more, insulate worse.
func TestCarriersMoveEverything(t *testing.T) {
	many := ratings(t, accept(t, ofFilms(labITO, ofLab), filmFiles()), glazing.EN)[0]
	fewer := ratings(t, accept(t, ofFilms(strings.Replace(labITO, "1e21", "4e20", 1), ofLab), filmFiles()), glazing.EN)[0]
	onFilm := ratings(t, accept(t, ofFilms(labITO, "          - {material: lab-ito, thickness_nm: 150, carriers_cm3: 4e20}\n"), filmFiles()), glazing.EN)[0]
	if !(fewer.Surfaces[2].Corrected.Number > many.Surfaces[2].Corrected.Number+0.05) || !(fewer.U.Number > many.U.Number+0.05) ||
		!(math.Abs(fewer.Light.Transmittance.Number-many.Light.Transmittance.Number) > 0.003) || !(fewer.Solar.Transmittance.Number > many.Solar.Transmittance.Number) {
		t.Errorf("ε %.4f and %.4f, U %.3f and %.3f, τv %.4f and %.4f", fewer.Surfaces[2].Corrected.Number, many.Surfaces[2].Corrected.Number,
			fewer.U.Number, many.U.Number, fewer.Light.Transmittance.Number, many.Light.Transmittance.Number)
	}
	if onFilm.U != fewer.U || onFilm.Light != fewer.Light {
		t.Errorf("changed on the film: U %v and τv %v, in the material: %v and %v", onFilm.U, onFilm.Light.Transmittance, fewer.U, fewer.Light.Transmittance)
	}
}

// Films of no thickness leave the uncoated pane, bit for bit.
func TestFilmsOfNoThickness(t *testing.T) {
	bare := accept(t, strings.Replace(ofFilms(labITO, ofLab), noFilms, "", 1), filmFiles())
	zero := accept(t, ofFilms(labITO, "          - {material: lab-ito, thickness_nm: 0}\n          - {material: silver, thickness_nm: 0}\n"), filmFiles())
	for _, basis := range glazing.Bases() {
		if !sameFigures(t, bare, zero, basis) {
			t.Errorf("%s: films of no thickness move figures", basis.Name)
		}
	}
}

// A turned pane with films on its front is one with the films on its back.
func TestFilmsTurned(t *testing.T) {
	text := ofFilms(labITO, ofLab)
	front := ratings(t, accept(t, text, filmFiles()), glazing.EN)[0]
	text = strings.Replace(text, "face: front", "face: back", 1)
	back := ratings(t, accept(t, text, filmFiles()), glazing.EN)[0]
	turned := ratings(t, accept(t, strings.Replace(text, "{pane: p}", "{pane: p, turned: true}", 1), filmFiles()), glazing.EN)[0]
	if math.Abs(front.U.Number-turned.U.Number) > 1e-9 || math.Abs(front.G.Number-turned.G.Number) > 1e-9 ||
		math.Abs(front.Light.ReflectanceOutside.Number-turned.Light.ReflectanceOutside.Number) > 1e-12 {
		t.Errorf("front: U %.9f, g %.9f; back turned: %.9f, %.9f", front.U.Number, front.G.Number, turned.U.Number, turned.G.Number)
	}
	if math.Abs(front.G.Number-back.G.Number) < 0.01 {
		t.Error("films in the gap and on the room side have the same g: the comparison sees nothing")
	}
}

// Every kind of material has the index that its formula has elsewhere.
func TestMaterials(t *testing.T) {
	one := func(materials, id string) *film.Material {
		t.Helper()
		return filmOf(accept(t, ofFilms("  - {id: "+id+", "+materials+"}\n", "          - {material: "+id+", thickness_nm: 10}\n"), filmFiles()), 0).Material
	}
	near := func(what string, got complex128, n, k, tolerance float64) {
		t.Helper()
		if math.Abs(real(got)-n) > tolerance || math.Abs(imag(got)-k) > tolerance {
			t.Errorf("%s: %v, want %g + %gi", what, got, n, k)
		}
	}
	near("constant", one("n: 1.46, k: 0.01", "m").Index(700), 1.46, 0.01, 0)
	near("constant without k", one("n: 2", "m").Index(40000), 2, 0, 0)
	near("two rows", one("nk: two.csv", "m").Index(700), 1.46, 0, 0)
	// Fused silica: I. H. Malitson, Journal of the Optical Society of America 55 (1965) 1205, his n at 0.5876 and
	// 1.0140 µm; the resonance at 9.896 µm, 0.12529 eV, as an oscillator (from memory).
	silica := one("model: oscillators, terms: [{kind: sellmeier, strength: 0.6961663, resonance_nm: 68.4043}, {kind: sellmeier, strength: 0.4079426, resonance_nm: 116.2414}, "+
		"{kind: lorentz, strength: 0.8974794, energy_ev: 0.1252855, broadening_ev: 0.0001}]", "m")
	near("silica", silica.Index(587.6), 1.45846, 0, 1e-5)
	near("silica", silica.Index(1014), 1.45024, 0, 1e-5)
	// Free carriers by their energies are those by density and mobility; a resistivity fixes what is left out:
	// 1e21 carriers of 40 cm²/(V·s) have 1.5604e-4 Ω·cm.
	lab := one("model: drude, carriers_cm3: 1e21, mobility_cm2_v_s: 40, effective_mass: 0.35, eps_infinity: 3.9", "m")
	c := film.Carriers{DensityCM3: 1e21, MobilityCM2VS: 40, EffectiveMass: 0.35, EpsInf: 3.9}
	for _, keys := range []string{
		fmt.Sprintf("model: oscillators, eps_infinity: 3.9, terms: [{kind: drude, plasma_ev: %g, damping_ev: %g}]", c.PlasmaEV(), c.DampingEV()),
		"model: drude, carriers_cm3: 1e21, resistivity_ohm_cm: 1.560377e-4, effective_mass: 0.35, eps_infinity: 3.9",
		"model: drude, mobility_cm2_v_s: 40, resistivity_ohm_cm: 1.560377e-4, effective_mass: 0.35, eps_infinity: 3.9",
		"model: oscillators, carriers_cm3: 1e21, mobility_cm2_v_s: 40, effective_mass: 0.35, eps_infinity: 3.9, terms: [{kind: lorentz, strength: 1e-6, energy_ev: 9, broadening_ev: 1}]",
	} {
		other := one(keys, "m")
		for _, nm := range []float64{400, 1500, 10000} {
			want := lab.Index(nm)
			near(keys, other.Index(nm), real(want), imag(want), 2e-5)
		}
	}
	edge := film.TaucLorentz{AmplitudeEV: 80, EnergyEV: 5, BroadeningEV: 2, GapEV: 3.2, UrbachEV: 0.1}
	n := film.NewOscillators(2, edge).Index(350)
	near("edge", one("model: oscillators, eps_infinity: 2, terms: [{kind: tauc-lorentz, amplitude_ev: 80, energy_ev: 5, broadening_ev: 2, gap_ev: 3.2, urbach_ev: 0.1}]", "m").Index(350), real(n), imag(n), 0)
	if imag(n) < 0.01 {
		t.Errorf("no loss at the edge, %v: the comparison sees nothing", n)
	}
}

// Figures of a film stand in the place of the material's; a resistance is that of the film, the scattering at the
// surfaces of a metal included.
func TestFilmOverrides(t *testing.T) {
	for _, x := range []struct {
		film           string
		sheet, density float64
	}{
		{"{material: lab-ito, thickness_nm: 150, sheet_resistance_ohm: 20}", 20, 1e21},
		{"{material: lab-ito, thickness_nm: 150, sheet_resistance_ohm: 20, mobility_cm2_v_s: 30}", 20, 6.9350e20}, // 1/(20·150e-7·1.602177e-19·30)
		{"{material: lab-ito, thickness_nm: 150, resistivity_ohm_cm: 3e-4}", 20, 1e21},
		{"{material: lab-ito, thickness_nm: 150, effective_mass: 0.3, eps_infinity: 4}", 10.4025, 1e21},
		{"{material: silver, thickness_nm: 10, sheet_resistance_ohm: 5}", 5, 5.975e22},
		{"{material: silver, thickness_nm: 10, resistivity_ohm_cm: 5e-6}", 5, 5.975e22},
	} {
		f := filmOf(accept(t, ofFilms(labITO, "          - "+x.film+"\n"), filmFiles()), 0)
		c := f.Material.Carriers
		if got := c.SheetResistance(f.ThicknessNM); math.Abs(got/x.sheet-1) > 1e-4 || math.Abs(c.DensityCM3/x.density-1) > 1e-3 {
			t.Errorf("%s: %.5f Ω, %.5g carriers", x.film, got, c.DensityCM3)
		}
	}
	// What conducts worse absorbs more at 10 µm.
	emits := func(ohm string) float64 {
		return accept(t, ofFilms(labITO, "          - {material: silver, thickness_nm: 10"+ohm+"}\n"), filmFiles()).Panes[0].Tints[0].Front.Normal.Number
	}
	if a, b := emits(", sheet_resistance_ohm: 5"), emits(""); !(a > 1.1*b) {
		t.Errorf("silver of 5 Ω emits %.4f, of its own 4 Ω %.4f", a, b)
	}
}

// What a material does not cover is not known, with the reason.
func TestFilmRanges(t *testing.T) {
	files := filmFiles()
	files["short.csv"] = "wavelength_nm,n,k\n380,2,0\n780,2,0\n"
	p := accept(t, ofFilms("  - {id: short, nk: short.csv}\n", "          - {material: short, thickness_nm: 50}\n"), files)
	r := ratings(t, p, glazing.EN)[0]
	if !r.Light.Transmittance.Known || r.Solar.Transmittance.Known || !strings.Contains(r.Solar.Transmittance.Why, "ends at 780 nm") ||
		r.U.Known || !strings.Contains(r.Surfaces[2].Corrected.Why, "material short ends at 780 nm") || !r.Surfaces[3].Corrected.Known {
		t.Errorf("τv %+v, τe %+v, U %+v, ε %+v", r.Light.Transmittance, r.Solar.Transmittance, r.U, r.Surfaces)
	}
	if !slices.ContainsFunc(p.Panes[0].Tints[0].Spectrum.Cautions, func(c spectra.Caution) bool {
		return strings.Contains(c.Text, "short") && strings.Contains(c.Text, "steps of up to 400 nm")
	}) {
		t.Errorf("no caution on the steps: %v", p.Panes[0].Tints[0].Spectrum.Cautions)
	}
}

func TestRefusesMaterials(t *testing.T) {
	for _, tt := range []struct {
		keys, key string
		words     []string
	}{
		{mark + "{id: m}", "model", []string{"is missing", "nk", "drude"}},
		{"{id: m, n: 1.5, nk: " + mark + "two.csv}", "nk", []string{"stands beside n"}},
		{"{id: m, model: drude, n: " + mark + "1.5}", "n", []string{"stands beside model"}},
		{"{id: m, k: " + mark + "0.1}", "k", []string{"stands without n"}},
		{"{id: m, n: " + mark + "0}", "n", []string{"0 is not above 0"}},
		{"{id: m, n: 1.5, k: " + mark + "-0.1}", "k", []string{"-0.1 is below 0"}},
		{"{id: m, n: 1.5, mobility_cm2_v_s: " + mark + "3}", "mobility_cm2_v_s", []string{"belongs to a model"}},
		{"{id: " + mark + "silver, n: 1.5}", "id", []string{"is built in"}},
		{"{id: m, model: " + mark + "drud}", "model", []string{"did you mean drude?"}},
		{"{id: m, model: drude, carriers_cm3: " + mark + "0, mobility_cm2_v_s: 40, effective_mass: 0.35, eps_infinity: 3.9}", "carriers_cm3", []string{"0 is not above 0"}},
		{"{id: m, model: drude, carriers_cm3: 1e21, mobility_cm2_v_s: " + mark + "-40, effective_mass: 0.35, eps_infinity: 3.9}", "mobility_cm2_v_s", []string{"-40 is not above 0"}},
		{"{id: m, model: drude, carriers_cm3: 1e21, mobility_cm2_v_s: 40, effective_mass: " + mark + "0, eps_infinity: 3.9}", "effective_mass", []string{"0 is not above 0"}},
		{"{id: m, model: drude, carriers_cm3: " + mark + "1e30, mobility_cm2_v_s: 40, effective_mass: 0.35, eps_infinity: 3.9}", "carriers_cm3", []string{"1e+30", "is not between"}},
		{"{id: m, model: drude, carriers_cm3: " + mark + "1e21, effective_mass: 0.35, eps_infinity: 3.9}", "carriers_cm3", []string{"too few figures"}},
		{"{id: m, model: drude, carriers_cm3: " + mark + "1e21, mobility_cm2_v_s: 40, resistivity_ohm_cm: 3e-4, effective_mass: 0.35, eps_infinity: 3.9}", "carriers_cm3", []string{"0.000156", "leave one of them out"}},
		{mark + "{id: m, model: drude, carriers_cm3: 1e21, mobility_cm2_v_s: 40, eps_infinity: 3.9}", "effective_mass", []string{"is missing"}},
		{mark + "{id: m, model: drude, carriers_cm3: 1e21, mobility_cm2_v_s: 40, effective_mass: 0.35}", "eps_infinity", []string{"is missing"}},
		{mark + "{id: m, model: oscillators}", "terms", []string{"is missing"}},
		{"{id: m, n: 1.5, terms: [" + mark + "{kind: sellmeier, strength: 1, resonance_nm: 90}]}", "terms", []string{"belong to model: oscillators"}},
		{"{id: m, model: oscillators, terms: [" + mark + "{kind: lorentz, strength: 1, energy_ev: 5}]}", "broadening_ev", []string{"is missing: lorentz has strength, energy_ev, broadening_ev"}},
		{"{id: m, model: oscillators, terms: [{kind: sellmeier, strength: 1, resonance_nm: 90, gap_ev: " + mark + "2}]}", "gap_ev", []string{"is no key of sellmeier"}},
		{"{id: m, model: oscillators, terms: [{kind: sellmeier, strength: 1, resonance_nm: " + mark + "9896}]}", "resonance_nm", []string{"9896 lies from 300 to 50000 nm", "use lorentz"}},
		{"{id: m, model: oscillators, terms: [{kind: " + mark + "lorenz, strength: 1, energy_ev: 5, broadening_ev: 1}]}", "kind", []string{"did you mean lorentz?"}},
		{"{id: m, model: oscillators, terms: [{kind: tauc-lorentz, amplitude_ev: 80, energy_ev: 3, broadening_ev: 1, gap_ev: " + mark + "3}]}", "gap_ev", []string{"3 is not below energy_ev, 3"}},
		{"{id: m, model: oscillators, terms: [{kind: tauc-lorentz, amplitude_ev: 80, energy_ev: 3, broadening_ev: " + mark + "6, gap_ev: 2}]}", "broadening_ev", []string{"6 is not below twice energy_ev, 6"}},
		{"{id: m, nk: " + mark + "none.csv}", "nk", []string{"none.csv"}},
	} {
		// The film is of the material, which is not said to be unknown as well.
		id := "m"
		if strings.Contains(tt.keys, "silver") {
			id = "silver"
		}
		text, at := marked(ofFilms("  - "+tt.keys+"\n", "          - {material: "+id+", thickness_nm: 10}\n"))
		checkOne(t, faultsOf(text, memory(filmFiles())), at, tt.key, tt.words)
	}
	text, at := marked(ofFilms("  - {id: m, n: 2}\n  - {id: "+mark+"m, n: 3}\n", "          - {material: m, thickness_nm: 10}\n"))
	checkOne(t, faultsOf(text, memory(filmFiles())), at, "id", []string{"another material"})
	for content, words := range map[string]string{
		"wavelength_um,n,k\n0.3,1.5,0\n0.2,1,0\n":    "wavelengths must ascend",
		"wavelength_um,n,k\n0.3,1.5,0\n0.3,1.6,0\n":  "twice",
		"wavelength_um,n,k\n0.3,1.5,nan\n5,1,0\n":    "not a finite number",
		"wavelength_um,n,k\n0.3,1.5,-1e-3\n5,1,0\n":  "below 0",
		"wavelength_um,n\n0.3,1.5\n5,1\n":            "n and k are needed",
		"wavelength_um,n,k\n0.3,1e999,0\n0.9,1,0\n":  "",
		"wavelength_um,n,k\n0.3,-1.5,0\n0.9,1.5,0\n": "not above 0",
	} {
		files := filmFiles()
		files["two.csv"] = content
		faults := faultsOf(ofFilms("  - {id: m, nk: two.csv}\n  - {id: m2, nk: two.csv}\n", "          - {material: m, thickness_nm: 10}\n"), memory(files))
		if len(faults) != 1 || !strings.Contains(faults[0].Error(), words) || !strings.HasPrefix(faults[0].Error(), "two.csv") {
			t.Errorf("%q: %v, want one fault with %q", content, faults, words)
		}
	}
}

func TestRefusesFilms(t *testing.T) {
	const film = "          - {material: lab-ito, thickness_nm: 150"
	for _, tt := range []struct {
		change [2]string
		key    string
		words  []string
	}{
		{[2]string{"material: lab-ito", "material: " + mark + "lab-itto"}, "material", []string{`unknown material "lab-itto"`, "did you mean lab-ito?"}},
		{[2]string{"material: lab-ito", "material: " + mark + "silvr"}, "material", []string{"did you mean silver?"}},
		{[2]string{"material: lab-ito", "material: " + mark + "unobtainium"}, "material", []string{"known are", "titania"}},
		{[2]string{"thickness_nm: 150", "thickness_nm: " + mark + "-1"}, "thickness_nm", []string{"-1 is below 0"}},
		{[2]string{"thickness_nm: 150", "thickness_nm: " + mark + "20000"}, "thickness_nm", []string{"20000 is above 10000"}},
		{[2]string{"thickness_nm: 150", "thickness_nm: " + mark + ".nan"}, "thickness_nm", []string{"not a number"}},
		{[2]string{film, film + ", carriers_cm3: " + mark + "-1e21"}, "carriers_cm3", []string{"-1e21 is not above 0"}},
		{[2]string{film, film + ", carriers_cm3: " + mark + "0"}, "carriers_cm3", []string{"0 is not above 0"}},
		{[2]string{film, film + ", mobility_cm2_v_s: " + mark + "0"}, "mobility_cm2_v_s", []string{"0 is not above 0"}},
		{[2]string{film, film + ", effective_mass: " + mark + "-0.3"}, "effective_mass", []string{"-0.3 is not above 0"}},
		{[2]string{film, film + ", mobility_cm2_v_s: 40, carriers_cm3: " + mark + "1e21, sheet_resistance_ohm: 50"}, "carriers_cm3", []string{"leave one of them out"}},
		{[2]string{film, film + ", resistivity_ohm_cm: " + mark + "3e-4, sheet_resistance_ohm: 50"}, "resistivity_ohm_cm", []string{"leave one of them out"}},
		{[2]string{film, "          - {material: lab-ito, thickness_nm: 0, sheet_resistance_ohm: " + mark + "50"}, "sheet_resistance_ohm", []string{"thickness of its film"}},
		{[2]string{film, "          - {material: silica, thickness_nm: 10, carriers_cm3: " + mark + "1e21"}, "carriers_cm3", []string{"silica", "not known"}},
		{[2]string{"      - face: front\n        films:\n" + ofLab, "      - face: front\n        films:\n" + ofLab + "      - face: " + mark + "front\n        films:\n" + ofLab}, "face", []string{"stands twice, first in line 11", "from the glass outward"}},
		{[2]string{"face: front", "face: " + mark + "frnt"}, "face", []string{"did you mean front?"}},
		{[2]string{"      - face: front\n        films:\n" + ofLab, "      - " + mark + "{face: front, films: []}\n"}, "films", []string{"holds no film"}},
		{[2]string{"      - face: front\n        films:\n" + ofLab, "      - " + mark + "face: front\n        films:\n" + strings.Repeat(ofLab, 201)}, "films", []string{"201 films; at most 200"}},
		{[2]string{"    glass: soda-lime\n    thickness_mm: 4\n    coatings:\n      - face", "    plies: [{glass_mm: 3}, {interlayer_mm: 0.76}, {glass_mm: 3}]\n    coatings:\n      - " + mark + "face"}, "coatings", []string{"stand beside plies", "one sheet of glass"}},
		{[2]string{"    glass: soda-lime\n    thickness_mm: 4\n    coatings:\n      - face", "    spectrum: a.csv\n    thickness_mm: 4\n    coatings:\n      - " + mark + "face"}, "coatings", []string{"stand beside a spectrum"}},
		{[2]string{"  - id: p\n    glass: soda-lime\n", "  - " + mark + "id: p\n"}, "glass", []string{"is missing: coatings stand on a glass"}},
		{[2]string{"    glass: soda-lime\n    thickness_mm: 4\n", "    glass: " + mark + "invented-low-e-4\n"}, "glass", []string{"invented-low-e-4 bears films that are not known"}},
	} {
		text := ofFilms(labITO, ofLab)
		if !strings.Contains(text, tt.change[0]) {
			t.Fatalf("no %q to change", tt.change[0])
		}
		text, at := marked(strings.Replace(text, tt.change[0], tt.change[1], 1))
		checkOne(t, faultsOf(text, memory(filmFiles())), at, tt.key, tt.words)
	}
	// A material or a glass without any wavelength of sunlight leaves no spectrum.
	files := filmFiles()
	files["deep.csv"] = "wavelength_um,n,k\n3,1.5,0\n50,1.5,0.1\n"
	text, at := marked(strings.Replace(ofFilms("  - {id: far, nk: deep.csv}\n", "          - {material: far, thickness_nm: 10}\n"), "- face", "- "+mark+"face", 1))
	checkOne(t, faultsOf(text, memory(files)), at, "coatings", []string{"from 300 to 2500 nm", "material far begins at 3000 nm"})
	text, at = marked(strings.Replace(strings.Replace(ofFilms(labITO, ofLab), noFilms, "", 1), "glass: soda-lime", "glass: "+mark+"deep", 1))
	checkOne(t, faultsOf(text, memory(files)), at, "glass", []string{"glass deep begins at 3000 nm"})
	// 200 films are rated.
	r := ratings(t, accept(t, ofFilms(labITO, strings.Repeat("          - {material: lab-ito, thickness_nm: 1}\n", 200)), filmFiles()), glazing.EN)[0]
	if !r.U.Known || !(r.Surfaces[2].Corrected.Number > 0.05 && r.Surfaces[2].Corrected.Number < 0.2) {
		t.Errorf("200 films: U %+v, ε %+v", r.U, r.Surfaces[2])
	}
	one := ratings(t, accept(t, ofFilms(labITO, "          - {material: lab-ito, thickness_nm: 200}\n"), filmFiles()), glazing.EN)[0]
	if math.Abs(one.Light.Transmittance.Number-r.Light.Transmittance.Number) > 1e-9 || math.Abs(one.U.Number-r.U.Number) > 1e-9 {
		t.Errorf("200 films of 1 nm: τv %.12f, U %.9f; one of 200 nm %.12f, %.9f", r.Light.Transmittance.Number, r.U.Number, one.Light.Transmittance.Number, one.U.Number)
	}
}
