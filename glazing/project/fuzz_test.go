package project

import (
	"math"
	"os"
	"strings"
	"testing"
	"unicode"
	"unicode/utf8"

	"panewright/glazing"
)

// Whatever a project file holds, reading it ends in a project that can be rated or in errors
// that say something.
func FuzzProject(f *testing.F) {
	demo, err := os.ReadFile(demoFolder + "/project.yaml")
	if err != nil {
		f.Fatal(err)
	}
	f.Add(demo)
	f.Add([]byte(complete().text()))
	for _, text := range []string{
		"",
		"project: x\n---\nproject: y\n",
		"project: &x [*x]\n",
		"{\"project\": \"x\",\n\t\"panes\": [{\"id\": \"a\", \"thickness_mm\": 4, \"spectrum\": \"a.csv\"}],\n\t\"makeups\": [{\"id\": \"A\", \"outside_to_inside\": [{\"pane\": \"a\"}]}]}",
		strings.Replace(hall, "basis: en", "basis: [en, iso, na, iso15099]\nsun: sun.csv", 1),
		strings.Replace(hall, "thickness_mm: 6", "thicknes_mm: 6,5", 1),
		strings.Replace(hall, "gas: {argon: 0.9, air: 0.1}", "gas: {<<: {air: 1}, argon: .nan}", 1),
		strings.Replace(hall, "{pane: dusk-7}", "{pane: dusk-7, tint: same}", 1),
		strings.Replace(hall, "    outside", "    tilt_deg: 1e-300\n    heat_flow: down\n    typed: {a: \"\\e\"}\n    outside", 1),
		strings.Replace(hall, "gap_mm: 16", "gap_mm: 1e-300", 1),
		strings.Replace(hall, "emissivity_back: 0.04", "emissivity_normal_back: 1e-300", 1),
		strings.Replace(hall, "basis: en", "coefficients: {en: {he_w_m2k: 1e-300, hi_w_m2k: 1000}}", 1),
		balanced,
		strings.Replace(balanced, "sun_w_m2: 300", "sun_w_m2: 3e-300", 1),
		strings.Replace(balanced, "outside_c: 5, inside_c: 19", "outside_c: 19, inside_c: 19", 1),
		strings.Replace(balanced, "pillar_pitch_mm: 20", "pillar_pitch_mm: 0.5000000000000001", 1),
		strings.Replace(balanced, "argon: 0.9, air: 0.1", "argon: 0.9, sf6: 0.1", 1),
		strings.Replace(balanced, "outside_c: -12", "outside_c: -273.15", 1),
		strings.Replace(balanced, "tau_ir: 0.02", "tau_ir: 0.24", 1),
		strings.Replace(balanced, "psi_w_mk: 0.05", "psi_w_mk: 0, temperature_factor: 0", 1),
		ofFilms(labITO, ofLab),
		ofFilms(labITO, "          - {material: lab-ito, thickness_nm: 10000, sheet_resistance_ohm: 1e-300, effective_mass: 100}\n"),
		ofFilms("  - {id: m, model: oscillators, eps_infinity: 0.1, terms: [{kind: drude, plasma_ev: 100, damping_ev: 1e-6}, {kind: tauc-lorentz, amplitude_ev: 1e5, energy_ev: 100, broadening_ev: 199.9, gap_ev: 0.0001, urbach_ev: 1}]}\n",
			"          - {material: m, thickness_nm: 1e-300}\n          - {material: m, thickness_nm: 10000}\n"),
		ofFilms("  - {id: m, n: 0.001, k: 1000}\n  - {id: l, nk: nk.csv}\n", "          - {material: m, thickness_nm: 10}\n          - {material: l, thickness_nm: 10}\n"),
	} {
		f.Add([]byte(text))
	}
	constants := []byte("wavelength_um,n,k\n0.3,1.5,0\n60,1.5,0.01\n")
	spectrum, sun := []byte(spectrumOf("0.3,0.2,0.1")), []byte(hallFiles()["sun.csv"])
	from := func(name string) ([]byte, error) {
		if strings.Contains(name, "sun") {
			return sun, nil
		}
		if strings.Contains(name, "nk") || strings.Contains(name, "deep") {
			return constants, nil
		}
		return spectrum, nil
	}
	f.Fuzz(func(t *testing.T, content []byte) {
		p, err := read("p.yaml", content, from)
		if err != nil {
			faults, ok := err.(Errors)
			if !ok || len(faults) == 0 {
				t.Fatalf("%T: %v", err, err)
			}
			for _, f := range faults {
				if text := f.Error(); strings.TrimSpace(strings.TrimPrefix(text, "p.yaml:")) == "" || len(text) >= 1500 ||
					!utf8.ValidString(text) || strings.ContainsFunc(text, unicode.IsControl) {
					t.Fatalf("a message of %d bytes: %.200q", len(text), text)
				}
			}
			return
		}
		if len(p.Bases) == 0 || p.Title == "" || len(p.Digest) != 64 {
			t.Fatalf("bases %v, title %q, digest %q", p.Bases, p.Title, p.Digest)
		}
		for _, b := range p.Bases {
			method := p.Method(b)
			for _, m := range p.Makeups {
				if states, err := m.States(); err != nil || len(states) > 16 {
					continue // only its own time would be tested
				}
				ratings, err := p.RateBy(method, m)
				if err != nil {
					t.Fatalf("make-up %s under %s: %v", m.ID, b.Name, err)
				}
				for i := range ratings {
					checkFinite(t, &ratings[i], m.ID)
				}
			}
		}
	})
}

// checkFinite wants every figure to be a number, or to say why it is none.
func checkFinite(t *testing.T, r *glazing.Rating, of string) {
	t.Helper()
	for _, f := range glazing.Figures() {
		if f.Value == nil {
			continue
		}
		for i := range f.Count(r) {
			v := f.Value(r, i)
			switch {
			case v.Known && (math.IsNaN(v.Number) || math.IsInf(v.Number, 0)):
				t.Errorf("%s: %s (%d) under %s is %v", of, f.Key, i, r.Method.Basis.Name, v.Number)
			case !v.Known && v.Why == "":
				t.Errorf("%s: %s (%d) is not known, and nothing says why", of, f.Key, i)
			}
		}
	}
}
