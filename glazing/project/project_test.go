package project

import (
	"crypto/sha256"
	"encoding/hex"
	"encoding/json"
	"errors"
	"fmt"
	"math"
	"slices"
	"strings"
	"testing"
	"unicode/utf8"

	"go.yaml.in/yaml/v4"

	"panewright/glazing"
	"panewright/spectra"
)

// hall is a project without fault: a double make-up of a switchable and a low-e pane.
const hall = `project: Test hall
basis: en
panes:
  - id: plain-6
    thickness_mm: 6
    heat_treatment: toughened
    spectrum: a.csv
    emissivity_front: 0.837
    emissivity_back: 0.04
  - id: dusk-7
    thickness_mm: 7
    emissivity_front: 0.837
    emissivity_back: 0.16
    tints:
      - {tint: clear, spectrum: a.csv}
      - {tint: full, spectrum: b.csv}
makeups:
  - id: A1
    outside_to_inside:
      - {pane: dusk-7}
      - {gap_mm: 16, gas: {argon: 0.9, air: 0.1}}
      - {pane: plain-6, turned: true}
`

func hallFiles() map[string]string {
	return map[string]string{
		"a.csv":   spectrumOf("0.7,0.2,0.1"),
		"b.csv":   spectrumOf("0.02,0.1,0.05"),
		"bad.csv": strings.Replace(spectrumOf("0.7,0.2,0.1"), "320,0.7", "320,70", 1),
		"sun.csv": "wavelength_nm,irradiance\n300,0\n500,2\n700,1\n900,1\n1100,0.5\n1300,0.5\n1500,0.2\n1700,0.2\n2100,0.1\n2500,0\n",
	}
}

// mark stands in a test's document where an error is expected to point, and is taken out.
const mark = "▲"

// marked takes the marks out and returns the text with the places they stood at.
func marked(text string) (string, []position) {
	var at []position
	for {
		before, after, found := strings.Cut(text, mark)
		if !found {
			return text, at
		}
		last := strings.LastIndex(before, "\n") + 1
		at = append(at, position{strings.Count(before, "\n") + 1, utf8.RuneCountInString(before[last:]) + 1})
		text = before + after
	}
}

// change replaces one passage of the hall.
func change(t *testing.T, from, to string) string {
	t.Helper()
	if strings.Count(hall, from) == 0 {
		t.Fatalf("the hall has no %q", from)
	}
	return strings.Replace(hall, from, to, 1)
}

func accept(t *testing.T, text string, files map[string]string) *Project {
	t.Helper()
	p, err := read("p.yaml", []byte(text), memory(files))
	if err != nil {
		t.Fatalf("%v\n%s", err, text)
	}
	return p
}

func TestAccepts(t *testing.T) {
	eight := "makeups:\n  - id: A8\n    outside_to_inside:\n      - {pane: plain-6}\n" + strings.Repeat("      - {gap_mm: 8, gas: {air: 1}}\n      - {pane: plain-6}\n", 7)
	letters := strings.Repeat("ß", 64)
	for _, tt := range []struct {
		name, from, to string
		check          func(p *Project) bool
	}{
		{"nothing changed", "basis: en", "basis: en", func(p *Project) bool {
			return p.Title == "Test hall" && len(p.Panes) == 2 && p.Makeup("A1") == p.Makeups[0] && p.Makeup("A2") == nil && p.File == "p.yaml"
		}},
		{"basis absent", "basis: en\n", "", func(p *Project) bool { return len(p.Bases) == 1 && p.Bases[0].Name == "en" }},
		{"list of bases", "basis: en", "basis: [iso, en]", func(p *Project) bool { return p.Bases[0].Name == "iso" && p.Bases[1].Name == "en" }},
		{"make-ups absent", hall[strings.Index(hall, "makeups:"):], "", func(p *Project) bool { return len(p.Makeups) == 0 && len(p.Panes) == 2 }},
		{"exponents", "thickness_mm: 6", "thickness_mm: +6.0e+0", func(p *Project) bool { return p.Panes[0].ThicknessMM() == 6 }},
		{"negative exponent", "thickness_mm: 6", "thickness_mm: 600.E-2", func(p *Project) bool { return p.Panes[0].ThicknessMM() == 6 }},
		{"no digit before the point", "thickness_mm: 6", "thickness_mm: .5", func(p *Project) bool { return p.Panes[0].ThicknessMM() == 0.5 }},
		{"gas fractions a little above 1", "air: 0.1", "air: 0.1000005", func(p *Project) bool { return p.Makeups[0].Gaps[0].Gas[0].Fraction == 0.1000005 }},
		{"gas fractions a little below 1", "air: 0.1", "air: 0.0999995", func(p *Project) bool { return p.Makeups[0].Gaps[0].Gas[0].Fraction == 0.0999995 }},
		{"eight panes", hall[strings.Index(hall, "makeups:"):], eight, func(p *Project) bool { return len(p.Makeups[0].Panes) == 8 && len(p.Makeups[0].Gaps) == 7 }},
		{"id of another script", "id: A1", "id: 東立面.南_1", func(p *Project) bool { return p.Makeups[0].ID == "東立面.南_1" }},
		{"id with marks that combine", "id: A1", "id: हॉल-1", func(p *Project) bool { return p.Makeups[0].ID == "हॉल-1" }},
		{"id of digits", "id: A1", "id: 007", func(p *Project) bool { return p.Makeups[0].ID == "007" }},
		{"id that other programs read as false", "id: A1", "id: no", func(p *Project) bool { return p.Makeups[0].ID == "no" }},
		{"id of 64 letters", "id: A1", "id: " + letters, func(p *Project) bool { return p.Makeups[0].ID == letters }},
		{"a make-up may be called as a pane", "id: A1", "id: plain-6", func(p *Project) bool { return p.Makeups[0].ID == "plain-6" }},
		{"text of several lines", "project: Test hall", "project: |-\n  Test\n  hall", func(p *Project) bool { return p.Title == "Test\nhall" }},
		{"texts that are printed", "basis: en", "author: A\ndate: 2026-01-31\nclient: 12\nnotes: \"a\\tb\"", func(p *Project) bool {
			return p.Author == "A" && p.Date == "2026-01-31" && p.Client == "12" && p.Notes == "a\tb"
		}},
		{"attributes", "heat_treatment: toughened", "attributes: {cost: 42, rank: -1.5}", func(p *Project) bool {
			return p.Panes[0].Attributes["cost"] == 42 && p.Panes[0].Attributes["rank"] == -1.5 && p.Panes[0].HeatTreatment == glazing.UnknownTreatment
		}},
		{"plies", "thickness_mm: 6", "plies: [{glass_mm: 4}, {interlayer_mm: 0.76}, {glass_mm: 3, conductivity_w_mk: 1.1}]", func(p *Project) bool {
			y := p.Panes[0].Plies
			return len(y) == 3 && y[1].Interlayer && y[1].ConductivityWMK == 0.22 && y[1].DensityKGM3 == 1070 && y[0].ConductivityWMK == 1 && y[0].DensityKGM3 == 2500 && y[2].ConductivityWMK == 1.1
		}},
		{"charge", "tint: full,", "tint: full, charge_mc_cm2: 17,", func(p *Project) bool {
			return p.Panes[1].Tints[1].ChargeMCCM2.Number == 17 && !p.Panes[1].Tints[0].ChargeMCCM2.Known
		}},
		{"typed values in order", "    outside_to_inside", "    typed: {zulu: Z, alpha: A, mike: 3 dB,\n      bravo: B}\n    outside_to_inside", func(p *Project) bool {
			return slices.Equal(p.Makeups[0].Typed, []glazing.Typed{{Name: "zulu", Text: "Z"}, {Name: "alpha", Text: "A"}, {Name: "mike", Text: "3 dB"}, {Name: "bravo", Text: "B"}})
		}},
		{"tilt", "    outside_to_inside", "    tilt_deg: 30\n    heat_flow: down\n    title: Roof\n    outside_to_inside", func(p *Project) bool {
			return math.Abs(p.Makeups[0].Tilt.Degrees()-30) < 1e-12 && p.Makeups[0].Title == "Roof" && !p.Makeups[0].Tilt.Vertical()
		}},
		{"limits", "makeups:\n", "limits:\n  - {figure: u, at_most: 1.2, scope: centre, basis: en, tint: each, makeups: [A1], source: Brief, date: 2026-01-31}\n  - {figure: light, at_least: 0.6, makeups: A1}\nmakeups:\n", func(p *Project) bool {
			return len(p.Makeups) == 1
		}},
	} {
		t.Run(tt.name, func(t *testing.T) {
			if p := accept(t, change(t, tt.from, tt.to), hallFiles()); !tt.check(p) {
				t.Errorf("read as %+v", p)
			}
		})
	}
}

// Every fault is returned; how many are shown is for the command to say.
func TestReturnsEveryFault(t *testing.T) {
	text := "project: many\npanes:\n"
	var want []position
	for range 25 {
		text += "  - {id: " + mark + ".p, thickness_mm: " + mark + "0, spectrum: a.csv}\n"
	}
	text, want = marked(text)
	faults := faultsOf(text, memory(hallFiles()))
	var got []position
	for _, f := range faults {
		if p, ok := errors.AsType[*Problem](f); ok {
			got = append(got, position{p.Line, p.Column})
		}
	}
	if !slices.Equal(got, want) {
		t.Errorf("faults at %v, want %v", got, want)
	}
	if n := strings.Count(faults.Error(), "\n") + 1; n != 50 {
		t.Errorf("the message has %d lines, want 50", n)
	}
}

func TestFaultOfSharedFileOnce(t *testing.T) {
	for name, text := range map[string]string{
		"unreadable rows": strings.ReplaceAll(hall, "a.csv", "bad.csv"),
		"a missing file":  strings.ReplaceAll(hall, "a.csv", "none.csv"),
		"sums above 1":    strings.ReplaceAll(hall, "a.csv", "sum.csv"),
	} {
		files := hallFiles()
		files["sum.csv"] = strings.Replace(files["a.csv"], "320,0.7", "320,0.9", 1)
		faults := faultsOf(text, memory(files))
		if len(faults) != 1 {
			t.Errorf("%s: %d faults, want 1:\n%v", name, len(faults), faults)
			continue
		}
		if name == "a missing file" {
			continue
		}
		if row, ok := errors.AsType[*spectra.RowError](faults); !ok || row.Line != 4 || row.NM != 320 || !strings.HasSuffix(row.File, ".csv") {
			t.Errorf("%s: %v", name, faults)
		}
	}
}

// Two panes may share a file and still each have a fault of its own.
func TestFaultsOfPanesThatShareAFile(t *testing.T) {
	files := hallFiles()
	files["x.csv"] = strings.Replace(files["a.csv"], "320,0.7,0.2", "320,0.7,0.5", 1)
	files["y.csv"] = strings.Replace(files["a.csv"], "330,0.7,0.2", "330,0.7,0.5", 1)
	text := "project: x\npanes:\n" +
		"  - {id: a, thickness_mm: 4, spectra: {tau: a.csv, rho_front: x.csv, rho_back: a.csv}}\n" +
		"  - {id: b, thickness_mm: 4, spectra: {tau: a.csv, rho_front: y.csv, rho_back: a.csv}}\n"
	faults := faultsOf(text, memory(files))
	for _, file := range []string{"x.csv:4: at 320 nm", "y.csv:5: at 330 nm"} {
		if !strings.Contains(faults.Error(), file) {
			t.Errorf("no fault %s among:\n%v", file, faults)
		}
	}
}

// sameFigures wants all figures of two projects' make-ups to agree bit for bit.
func sameFigures(t *testing.T, p, q *Project, b glazing.Basis) bool {
	t.Helper()
	return slices.EqualFunc(ratings(t, p, b), ratings(t, q, b), func(x, y glazing.Rating) bool {
		same := x.Tint == y.Tint
		for _, f := range glazing.Figures() {
			if f.Value == nil {
				continue
			}
			for i := range f.Count(&x) {
				u, v := f.Value(&x, i), f.Value(&y, i)
				if u.Known != v.Known || math.Float64bits(u.Number) != math.Float64bits(v.Number) {
					same = false
				}
			}
		}
		return same
	})
}

func ratings(t *testing.T, p *Project, b glazing.Basis) []glazing.Rating {
	t.Helper()
	r, err := p.Rate(p.Makeups[0], b)
	if err != nil {
		t.Fatal(err)
	}
	return r
}

func TestSpectraFromSeveralFiles(t *testing.T) {
	files := hallFiles()
	one := accept(t, hall, files)
	several := accept(t, strings.Replace(hall, "spectrum: a.csv", "spectra: {tau: t.csv, rho_front: f.csv, rho_back: a.csv}", 1), func() map[string]string {
		f := hallFiles()
		f["t.csv"] = strings.ReplaceAll(spectrumOf("0.7"), ",rho_front,rho_back", "")
		f["f.csv"] = strings.ReplaceAll(spectrumOf("0.2"), "tau,rho_front,rho_back", "rho_front")
		return f
	}())
	if !sameFigures(t, one, several, glazing.EN) {
		t.Error("spectra: of three files rates otherwise than spectrum: of one")
	}
	other := accept(t, strings.Replace(hall, "spectrum: a.csv", "spectrum: b.csv", 1), files)
	if sameFigures(t, one, other, glazing.EN) {
		t.Error("another spectrum rates the same: the comparison sees nothing")
	}
	checkOne(t, faultsOf(change(t, "spectrum: a.csv", "spectra: {tau: "+"sun.csv, rho_front: a.csv, rho_back: a.csv}"), memory(map[string]string{
		"a.csv": files["a.csv"], "b.csv": files["b.csv"], "sun.csv": strings.ReplaceAll(spectrumOf("0.2"), "tau,rho_front,rho_back", "rho_front"),
	})), nil, "tau", []string{"sun.csv has no column tau"})
}

func TestJSONIsYAML(t *testing.T) {
	var v any
	if err := yaml.Load([]byte(hall), &v); err != nil {
		t.Fatal(err)
	}
	compact, err := json.Marshal(v)
	if err != nil {
		t.Fatal(err)
	}
	tabs, err := json.MarshalIndent(v, "", "\t")
	if err != nil {
		t.Fatal(err)
	}
	plain := accept(t, hall, hallFiles())
	for name, text := range map[string]string{
		"compact": string(compact), "indented with tabs": string(tabs), "with CRLF": strings.ReplaceAll(string(tabs), "\n", "\r\n"),
		"after a byte order mark": "\ufeff" + string(compact),
	} {
		p, err := read("p.json", []byte(text), memory(hallFiles()))
		if err != nil {
			t.Errorf("%s: %v", name, err)
			continue
		}
		if !sameFigures(t, p, plain, glazing.EN) {
			t.Errorf("%s: rates otherwise than the YAML", name)
		}
	}
	// positions count in JSON as well
	text, at := marked(strings.Replace(string(tabs), `"thickness_mm": 6`, mark+`"thicknes_mm": 6`, 1))
	checkOne(t, faultsOf(text, memory(hallFiles())), at, "thicknes_mm", []string{"did you mean thickness_mm?"})
}

func TestDigest(t *testing.T) {
	files := hallFiles()
	for name, content := range map[string]string{"x.csv": "0.6,0.1,0.1", "y.csv": "0.5,0.1,0.1"} {
		files[name] = spectrumOf(content)
	}
	pane := func(id, spectra string) string {
		return "  - {id: " + id + ", thickness_mm: 4, " + spectra + "}\n"
	}
	for _, tt := range []struct {
		name, text string
		order      []string // of the files, as the document names them first
	}{
		{"each file once", hall, []string{"a.csv", "b.csv"}},
		{"sun before the panes", "project: x\nsun: sun.csv\npanes:\n" + pane("p", "spectrum: b.csv") + pane("q", "spectrum: a.csv"), []string{"sun.csv", "b.csv", "a.csv"}},
		{"sun after the panes", "project: x\npanes:\n" + pane("p", "spectrum: b.csv") + pane("q", "spectrum: a.csv") + "sun: sun.csv\n", []string{"b.csv", "a.csv", "sun.csv"}},
		{"several in a line", "project: x\npanes:\n" + pane("p", "spectra: {rho_back: y.csv, tau: x.csv, rho_front: a.csv}"), []string{"y.csv", "x.csv", "a.csv"}},
		{"named again earlier in the line", "project: x\npanes:\n" + pane("p", "spectra: {rho_back: y.csv, rho_front: x.csv, tau: y.csv}"), []string{"y.csv", "x.csv"}},
		{"tints in front of other panes", "project: x\npanes:\n" + pane("p", "tints: [{spectrum: b.csv, tint: full}, {tint: clear, spectrum: a.csv}]") + pane("q", "spectrum: b.csv"), []string{"b.csv", "a.csv"}},
	} {
		h := sha256.New()
		h.Write([]byte(tt.text))
		for _, name := range tt.order {
			h.Write([]byte(files[name]))
		}
		if got, want := accept(t, tt.text, files).Digest, hex.EncodeToString(h.Sum(nil)); got != want {
			t.Errorf("%s: digest is not that of the project and %v", tt.name, tt.order)
		}
	}
}

func TestTintEmissivity(t *testing.T) {
	p := accept(t, change(t, "{tint: full, spectrum", "{tint: full, emissivity_normal_back: 0.1, spectrum"), hallFiles())
	clear, full := p.Panes[1].Tints[0], p.Panes[1].Tints[1]
	if clear.Front.Corrected.Number != 0.837 || clear.Back.Corrected.Number != 0.16 || clear.Back.Source != glazing.EmissivityGiven {
		t.Errorf("the clear tint does not have the emissivities of its pane: %+v, %+v", clear.Front, clear.Back)
	}
	if full.Front.Corrected.Number != 0.837 || full.Back.Source != glazing.EmissivityGivenNormal || full.Back.Normal.Number != 0.1 {
		t.Errorf("the full tint has not its own emissivity at the back, or lost that of the front: %+v, %+v", full.Front, full.Back)
	}
	// EN 12898: a normal emissivity of 0.1 is corrected by 1.14
	if got := full.Back.Corrected.Number; math.Abs(got-0.114) > 1e-12 {
		t.Errorf("corrected emissivity %v, want 0.114", got)
	}
}

// A typed emissivity wins over infrared rows; a difference above 0.02 is said. A reflectance of
// 0.5 makes a normal emissivity of 0.5, which EN 12898 corrects by 1.00.
func TestTypedEmissivityDiffers(t *testing.T) {
	var rows strings.Builder
	rows.WriteString("wavelength_nm,tau,rho_front,rho_back\n")
	for nm := 300; nm <= 2500; nm += 20 {
		fmt.Fprintf(&rows, "%d,0.5,0.1,0.1\n", nm)
	}
	for nm := 5000; nm <= 50000; nm += 1000 {
		fmt.Fprintf(&rows, "%d,,0.1,0.5\n", nm)
	}
	for _, tt := range []struct {
		typed string
		said  bool
	}{{"0.5199", false}, {"0.5201", true}, {"0.4801", false}, {"0.4799", true}} {
		p := accept(t, "project: p\npanes: [{id: a, thickness_mm: 4, spectrum: a.csv, emissivity_back: "+tt.typed+"}]\n", map[string]string{"a.csv": rows.String()})
		said := slices.ContainsFunc(p.Panes[0].Tints[0].Spectrum.Cautions, func(c glazing.Caution) bool { return c.Code == "emissivity_differs" })
		if said != tt.said {
			t.Errorf("typed %s, measured 0.5: caution %t, want %t", tt.typed, said, tt.said)
		}
		if got := fmt.Sprintf("%.4f", p.Panes[0].Tints[0].Back.Corrected.Number); got != tt.typed {
			t.Errorf("typed %s, used %s", tt.typed, got)
		}
	}
}

func TestStates(t *testing.T) {
	two := func(outer, inner string) string {
		return hall[:strings.Index(hall, "makeups:")] + "makeups:\n  - id: A1\n    outside_to_inside:\n      - {pane: dusk-7" + outer +
			"}\n      - {gap_mm: 16, gas: {air: 1}}\n      - {pane: plain-6}\n      - {gap_mm: 16, gas: {air: 1}}\n      - {pane: dusk-7" + inner + "}\n"
	}
	for _, tt := range []struct {
		outer, inner string
		want         []string
	}{
		{"", "", []string{"clear/clear", "clear/full", "full/clear", "full/full"}},
		{"", ", tint: same", []string{"clear", "full"}},
		{", tint: full", "", []string{"full/clear", "full/full"}},
		{", tint: full", ", tint: same", []string{"full"}},
		{", tint: clear", ", tint: full", []string{"clear/full"}},
	} {
		var got []string
		rated := ratings(t, accept(t, two(tt.outer, tt.inner), hallFiles()), glazing.EN)
		for _, r := range rated {
			got = append(got, r.Tint)
		}
		if !slices.Equal(got, tt.want) {
			t.Errorf("outside {%s}, inside {%s}: states %v, want %v", tt.outer, tt.inner, got, tt.want)
		}
	}
	// With both fixed at full, less light passes than with both clear.
	clear := ratings(t, accept(t, two(", tint: clear", ", tint: same"), hallFiles()), glazing.EN)[0]
	full := ratings(t, accept(t, two(", tint: full", ", tint: same"), hallFiles()), glazing.EN)[0]
	if !(full.Light.Transmittance.Number < clear.Light.Transmittance.Number/100) {
		t.Errorf("light transmittance %v in full, %v in clear", full.Light.Transmittance, clear.Light.Transmittance)
	}
}

func TestCoefficientsOfOneBasis(t *testing.T) {
	plain := accept(t, hall, hallFiles())
	changed := accept(t, change(t, "basis: en", "coefficients: {en: {he_w_m2k: 10, hi_w_m2k: 5}}"), hallFiles())
	if !sameFigures(t, plain, changed, glazing.ISO) {
		t.Error("coefficients of en move figures of iso")
	}
	before, after := ratings(t, plain, glazing.EN)[0], ratings(t, changed, glazing.EN)[0]
	if after.OutsideWM2K.Number != 10 || after.InsideWM2K.Number != 5 || after.OutsideGWM2K.Number != 10 || after.InsideGWM2K.Number != 5 {
		t.Errorf("coefficients %v, %v of U, %v, %v of g", after.OutsideWM2K, after.InsideWM2K, after.OutsideGWM2K, after.InsideGWM2K)
	}
	// 1/U = 1/he + 1/hi + what lies between the faces, which has not changed.
	between := func(r glazing.Rating) float64 {
		return 1/r.U.Number - 1/r.OutsideWM2K.Number - 1/r.InsideWM2K.Number
	}
	if math.Abs(between(before)-between(after)) > 1e-12 {
		t.Errorf("between the faces %v m²K/W before, %v after", between(before), between(after))
	}
	if before.G.Number == after.G.Number || before.Solar.Transmittance != after.Solar.Transmittance {
		t.Errorf("g %v before, %v after; transmittance %v, %v", before.G, after.G, before.Solar.Transmittance, after.Solar.Transmittance)
	}
	outside := accept(t, change(t, "basis: en", "coefficients: {en: {he_w_m2k: 10}}"), hallFiles())
	if r := ratings(t, outside, glazing.EN)[0]; r.InsideWM2K != before.InsideWM2K || r.OutsideWM2K.Number != 10 {
		t.Errorf("with he alone: he %v, hi %v, want 10 and %v", r.OutsideWM2K, r.InsideWM2K, before.InsideWM2K)
	}
}

func TestSunReplacesWeighting(t *testing.T) {
	plain := accept(t, hall, hallFiles())
	files := hallFiles()
	// all the sun at wavelengths where b.csv lets through 0.5 instead of 0.02
	files["b.csv"] = strings.NewReplacer("830,0.02", "830,0.5", "880,0.02", "880,0.5").Replace(files["b.csv"])
	files["sun.csv"] = "wavelength_nm,irradiance\n300,0\n400,0\n500,0\n600,0\n700,0\n820,0\n830,0\n835,1\n875,1\n880,0\n2400,0\n2500,0\n"
	one := "  - {id: S, outside_to_inside: [{pane: dusk-7, tint: full}]}\n"
	p := accept(t, strings.Replace(hall, "basis: en", "sun: sun.csv", 1)+one, files)
	r, err := p.Rate(p.Makeup("S"), glazing.EN)
	if err != nil {
		t.Fatal(err)
	}
	if got := r[0].Solar.Transmittance.Number; math.Abs(got-0.5) > 1e-12 {
		t.Errorf("solar transmittance %v under a sun of 830 to 880 nm, want 0.5", got)
	}
	if !strings.Contains(p.Method(glazing.EN).Editions(), "sun.csv") || strings.Contains(plain.Method(glazing.EN).Editions(), "sun.csv") {
		t.Error("the editions do not tell of the user's sun")
	}
}

func TestNearest(t *testing.T) {
	names := []string{"gap_mm", "gas", "glass", "tint", "turned"}
	for word, want := range map[string][]string{
		"gab_mm": {"gap_mm"}, "gpa_mm": {"gap_mm"}, "ga": {"gas"}, "GAS": {"gas"}, "gass": {"gas", "glass"}, "tin": {"tint"}, "windows": nil, "": nil,
	} {
		if got := Nearest(word, names); !slices.Equal(got, want) {
			t.Errorf("nearest to %q: %v, want %v", word, got, want)
		}
	}
	if got := didYouMean(nil, names); got != "known are gap_mm, gas, glass, tint, turned" {
		t.Error(got)
	}
	if got := didYouMean([]string{"gas", "glass"}, names); got != "did you mean gas or glass?" {
		t.Error(got)
	}
}

// JSON writes letters beyond U+FFFF as pairs of escapes; a backslash before one keeps it text.
func TestSurrogatesOfJSON(t *testing.T) {
	for _, tt := range []struct{ title, want string }{
		{`a\ud83d\ude00b`, "a😀b"},
		{`\u00e9\uD834\uDD1E`, "é𝄞"},
		{`\\ud83d`, `\ud83d`},
	} {
		p, err := read("p.json", []byte(`{"project": "`+tt.title+`"}`), nil)
		if err != nil || p.Title != tt.want {
			t.Errorf("%s: %v, want %s", tt.title, err, tt.want)
		}
	}
	if _, err := read("p.json", []byte(`{"project": "\ud83d alone"}`), nil); err == nil {
		t.Error("half a pair is accepted")
	}
}
