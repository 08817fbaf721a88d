package project

import (
	"fmt"
	"math"
	"strings"
	"testing"

	"panewright/glazing"
	"panewright/spectra"
)

// ofGlass is a project of one make-up, a pane of the given keys.
func ofGlass(keys string) string {
	return "project: Glass\nglasses:\n  - {id: lab, nk: lab.csv, conductivity_w_mk: 1.2, density_kg_m3: 2400}\npanes:\n  - {id: p, " + keys +
		"}\nmakeups:\n  - id: A\n    outside_to_inside:\n      - {pane: p}\n      - {gap_mm: 16, gas: {air: 1}}\n      - {pane: soda-lime-4}\n"
}

// labFiles holds the constants of a clear glass that ends in the far infrared.
func labFiles() map[string]string {
	return map[string]string{"lab.csv": "wavelength_um,n,k\n0.25,1.5,0\n4.9,1.5,0\n5,1.5,0.05\n60,1.5,0.05\n", "a.csv": spectrumOf("0.7,0.2,0.1")}
}

// A pane of glass and thickness rates as the built-in pane of that thickness does.
func TestPaneOfGlass(t *testing.T) {
	six := accept(t, strings.Replace(ofGlass("glass: soda-grey, thickness_mm: 6"), "pane: p}", "pane: soda-grey-6}", 1), labFiles())
	for _, keys := range []string{"glass: soda-grey, thickness_mm: 6", "glass: soda-grey-6", "glass: soda-grey-6, heat_treatment: toughened"} {
		p := accept(t, ofGlass(keys), labFiles())
		treatment := p.Panes[0].HeatTreatment
		p.Panes[0].HeatTreatment = glazing.UnknownTreatment // which guides thermal stress alone
		if !sameFigures(t, six, p, glazing.EN) || !sameFigures(t, six, p, glazing.NA) {
			t.Errorf("%s rates otherwise than soda-grey-6", keys)
		}
		p.Panes[0].HeatTreatment = treatment
		if strings.Contains(keys, "toughened") != (p.Panes[0].HeatTreatment == glazing.Toughened) {
			t.Errorf("%s: heat treatment %s", keys, p.Panes[0].HeatTreatment)
		}
	}
	thicker := accept(t, ofGlass("glass: soda-grey, thickness_mm: 7.5"), labFiles())
	if sameFigures(t, six, thicker, glazing.EN) {
		t.Error("7.5 mm rate as 6 mm do: the comparison sees nothing")
	}
	if mm, kg := thicker.Panes[0].ThicknessMM(), thicker.Panes[0].MassKGM2(); mm != 7.5 || kg != 18.75 {
		t.Errorf("%g mm, %g kg/m²", mm, kg)
	}
}

// A glass of the project's own constants: n 1.5 without absorption lets 2n/(n²+1) = 0.923077 through;
// its emissivity is 1 less R of n 1.5, k 0.05, (0.25+0.0025)/(6.25+0.0025) = 0.040384.
func TestGlassOfTheProject(t *testing.T) {
	p := accept(t, ofGlass("glass: lab, thickness_mm: 4"), labFiles())
	r := ratings(t, p, glazing.EN)[0]
	pane := p.Panes[0]
	tau := pane.Tints[0].Spectrum.Tau
	for _, nm := range []float64{300, 550, 2500} {
		if math.Abs(tau.At(nm)-3.0/3.25) > 1e-12 {
			t.Errorf("τ at %g nm %.12f", nm, tau.At(nm))
		}
	}
	e := pane.Tints[0].Back
	if e.Source != glazing.EmissivityComputed || math.Abs(e.Normal.Number-(1-0.2525/6.2525)) > 1e-12 || !e.Hemispherical.Known {
		t.Errorf("emissivity %+v", e)
	}
	if y := pane.Plies[0]; y.ConductivityWMK != 1.2 || y.DensityKGM3 != 2400 || pane.MassKGM2() != 9.6 {
		t.Errorf("ply %+v", y)
	}
	if pane.Origin != glazing.ModelledOrigin || !r.U.Known {
		t.Errorf("origin %s, U %+v", pane.Origin, r.U)
	}
	typed := accept(t, ofGlass("glass: lab, thickness_mm: 4, emissivity_back: 0.5, density_kg_m3: 2000, origin: invented"), labFiles())
	if x := typed.Panes[0]; x.Tints[0].Back.Corrected.Number != 0.5 || x.MassKGM2() != 8 || x.Origin != glazing.InventedOrigin {
		t.Errorf("what is typed does not win: %+v", x)
	}
	// Constants that end at 900 nm leave solar figures unknown, and the emissivity.
	files := labFiles()
	files["lab.csv"] = "wavelength_nm,n,k\n250,1.5,0\n900,1.5,0\n"
	r = ratings(t, accept(t, ofGlass("glass: lab, thickness_mm: 4"), files), glazing.EN)[0]
	if r.Solar.Transmittance.Known || r.U.Known || !r.Light.Transmittance.Known || !strings.Contains(r.Solar.Transmittance.Why, "ends at 900 nm") {
		t.Errorf("constants to 900 nm: τe %+v, U %+v, τv %+v", r.Solar.Transmittance, r.U, r.Light.Transmittance)
	}
}

func TestRefusesGlasses(t *testing.T) {
	for _, tt := range []struct {
		keys, key string
		words     []string
	}{
		{"glass: " + mark + "soda-limr, thickness_mm: 4", "glass", []string{`"soda-limr"`, "did you mean soda-lime?"}},
		{"glass: " + mark + "quartz, thickness_mm: 4", "glass", []string{`"quartz"`, "known are low-iron, soda-bronze"}},
		{mark + "glass: soda-lime", "thickness_mm", []string{"is missing", "a pane of soda-lime has a thickness"}},
		{"glass: soda-lime-6, thickness_mm: " + mark + "4", "thickness_mm", []string{"has its own thickness", "soda-lime"}},
		{"glass: " + mark + "soda-lime, thickness_mm: 4, spectrum: a.csv", "glass", []string{"beside a spectrum"}},
		{"glass: " + mark + "soda-lime, plies: [{glass_mm: 4}]", "glass", []string{"beside plies"}},
		{"glass: " + mark + "soda-lime, thickness_mm: 4, tints: [{tint: a, spectrum: a.csv}]", "glass", []string{"beside tints"}},
		{"glass: soda-lime, thickness_mm: 4, origin: " + mark + "measured", "origin", []string{"is computed, not measured"}},
		{"glass: soda-lime, thickness_mm: 4, emissivity_back: 0.5, emissivity_normal_back: " + mark + "0.5", "emissivity_normal_back", []string{"give one"}},
	} {
		text, at := marked(ofGlass(tt.keys))
		if strings.HasPrefix(tt.keys, mark) { // the whole pane is meant
			at = []position{{at[0].line, 5}}
		}
		checkOne(t, faultsOf(text, memory(labFiles())), at, tt.key, tt.words)
	}
	files := labFiles()
	checkOne(t, faultsOf(strings.Replace(ofGlass("glass: soda-lime, thickness_mm: 4"), "lab.csv", "none.csv", 1), memory(files)), nil, "nk", []string{"none.csv"})
	for content, words := range map[string]string{
		"wavelength_um,n,k\n0.3,1.5,0\n":            "1 rows; at least 2 are needed",
		"wavelength_um,n,k\n0.3,0,0\n5,1,0\n":       "n 0: not above 0",
		"wavelength_um,n,k\n0.3,1.5,-1e-3\n5,1,0\n": "k -1e-3: below 0",
		"wavelength_um,n\n0.3,1.5\n5,1\n":           "n and k are needed in every row",
		"wavelength_um,n,k,t\n0.3,1,0,1\n5,1,0,1\n": `unknown column "t"`,
		"wavelength_um,n,k\n0.3,1.5,0\n0.2,1,0\n":   "wavelengths must ascend",
		"wavelength_um,n,k\n0.3,1.5,0\n5,1,\n":      "n and k are needed in every row",
		"wavelength_um,n,k\n0.3,1.5,nan\n5,1,0\n":   "not a finite number",
	} {
		files["lab.csv"] = content
		faults := faultsOf(ofGlass("glass: lab, thickness_mm: 4"), memory(files))
		if len(faults) != 1 || !strings.Contains(faults[0].Error(), words) || !strings.HasPrefix(faults[0].Error(), "lab.csv") {
			t.Errorf("%q: %v, want one fault with %q", content, faults, words)
		}
	}
	for _, id := range []string{"soda-lime-6", "soda-grey", "invented-low-e-6"} {
		text, at := marked("project: x\npanes:\n  - {id: " + mark + id + ", thickness_mm: 6, spectrum: a.csv}\n")
		checkOne(t, faultsOf(text, memory(labFiles())), at, "id", []string{"is built in; choose another name"})
	}
}

// jcamp writes a spectrum of one value as JCAMP-DX from 300 to 2500 nm, steps of 10 nm.
func jcamp(title, unit string, value float64) string {
	var b strings.Builder
	fmt.Fprintf(&b, "##TITLE= %s\n##JCAMP-DX= 4.24\n##DATA TYPE= UV/VIS SPECTRUM\n##XUNITS= NANOMETERS\n##YUNITS= %s\n", title, unit)
	fmt.Fprintf(&b, "##FIRSTX= 300\n##LASTX= 2500\n##NPOINTS= 221\n##FIRSTY= %g\n##XYDATA= (X++(Y..Y))\n", value)
	for nm := 300; nm <= 2500; nm += 10 {
		fmt.Fprintf(&b, "%d %g\n", nm, value)
	}
	b.WriteString("##END=\n")
	return b.String()
}

// A project reads the files of a spectrometer by quantity, and rates as with the same in CSV.
func TestSpectraInJCAMP(t *testing.T) {
	files := hallFiles()
	one := accept(t, hall, files)
	files["t.jdx"], files["f.jdx"], files["r.jdx"] = jcamp("t", "TRANSMITTANCE", 0.7), jcamp("f", "REFLECTANCE", 0.2), jcamp("r", "REFLECTANCE", 0.1)
	files["both.jdx"] = files["t.jdx"] + files["f.jdx"]
	files["two.jdx"] = files["f.jdx"] + files["r.jdx"]
	for _, spec := range []string{"{tau: t.jdx, rho_front: f.jdx, rho_back: r.jdx}", "{tau: both.jdx, rho_front: both.jdx, rho_back: r.jdx}", "{tau: t.jdx, rho_front: a.csv, rho_back: a.csv}"} {
		if several := accept(t, change(t, "spectrum: a.csv", "spectra: "+spec), files); !sameFigures(t, one, several, glazing.EN) {
			t.Errorf("%s rates otherwise than CSV", spec)
		}
	}
	for spec, words := range map[string]string{
		"spectrum: t.jdx": "t.jdx: is JCAMP-DX, which has one quantity a spectrum; name its files by quantity: spectra: {tau: FILE, rho_front: FILE, rho_back: FILE}",
		"spectra: {tau: f.jdx, rho_front: f.jdx, rho_back: r.jdx}":   `: tau: f.jdx: holds no spectrum of transmittance, but: f.jdx#1 (reflectance, "f")`,
		"spectra: {tau: t.jdx, rho_front: two.jdx, rho_back: r.jdx}": `: rho_front: two.jdx: holds several spectra of reflectance; write which: two.jdx#1 (reflectance, "f"); two.jdx#2 (reflectance, "r")`,
	} {
		faults := faultsOf(change(t, "spectrum: a.csv", spec), memory(files))
		if len(faults) != 1 || !strings.Contains(faults[0].Error(), words) {
			t.Errorf("%s: %v, want one fault with %q", spec, faults, words)
		}
	}
	files["t.jdx"] = strings.Replace(files["t.jdx"], "FIRSTY= 0.7", "FIRSTY= 0.6", 1)
	if faults := faultsOf(change(t, "spectrum: a.csv", "spectra: {tau: t.jdx, rho_front: t.jdx, rho_back: r.jdx}"), memory(files)); len(faults) != 1 || !strings.HasPrefix(faults[0].Error(), "t.jdx") {
		t.Errorf("a wrong first ordinate: %v, want it once", faults)
	}
}

// A gap that a band needs leaves its figures unknown; one that it hardly needs is interpolated, and said.
func TestGapsOfASpectrum(t *testing.T) {
	for _, tt := range []struct {
		from, to     float64
		known        bool
		code, phrase string
	}{
		{300, 315, true, "interpolated", "no values between 300 and 315 nm"},
		{500, 560, false, "missing_band", "no values between 500 and 560 nm"},
		{2501, 2502, true, "", ""},
	} {
		p := accept(t, hall, hallFiles())
		m := &p.Panes[0].Tints[0].Spectrum
		m.Tau.Gaps = []spectra.Span{{FromNM: tt.from, ToNM: tt.to}}
		r := ratings(t, p, glazing.EN)[0]
		if r.Solar.Transmittance.Known != tt.known {
			t.Errorf("gap %g to %g nm: τe %+v", tt.from, tt.to, r.Solar.Transmittance)
		}
		found := tt.code == ""
		for _, c := range r.Cautions {
			found = found || c.Code == tt.code && strings.Contains(c.Text, tt.phrase)
		}
		if !found {
			t.Errorf("gap %g to %g nm: no caution %s with %q in %v", tt.from, tt.to, tt.code, tt.phrase, r.Cautions)
		}
		if s := r.Ready.Spectra(0, []float64{tt.from, (tt.from + tt.to) / 2}); math.IsNaN(s.T[0]) != (tt.from > 2500) || !math.IsNaN(s.T[1]) {
			t.Errorf("gap %g to %g nm: spectra %v", tt.from, tt.to, s.T)
		}
	}
}
