package project

import (
	"crypto/sha256"
	"encoding/hex"
	"encoding/json"
	"errors"
	"fmt"
	"math"
	"os"
	"path/filepath"
	"runtime"
	"slices"
	"strings"
	"testing"
	"time"
	"unicode"
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

func TestRefuses(t *testing.T) {
	const thickness = "thickness_mm: 6"
	gap := func(gas string) [2]string { return [2]string{"gas: {argon: 0.9, air: 0.1}", "gas: " + gas} }
	row := func(to string) [2]string { return [2]string{thickness, "thickness_mm: " + to} }
	panes := func(n int) [2]string {
		return [2]string{"    outside_to_inside:\n      - {pane: dusk-7}\n", "    outside_to_inside:\n" +
			strings.Repeat("      - {pane: plain-6}\n      - {gap_mm: 8, gas: {air: 1}}\n", n-2) + "      - {pane: plain-6}\n"}
	}
	for _, tt := range []struct {
		name   string
		change [2]string // from, to, with a mark where the one error points
		key    string
		words  []string // of the message; the right word or what to do
	}{
		{"octal", row(mark + "010"), "thickness_mm", []string{`"010"`, "begins with a zero"}},
		{"octal with a point", row(mark + "06.5"), "thickness_mm", []string{"begins with a zero"}},
		{"not a number", row(mark + ".nan"), "thickness_mm", []string{`".nan"`, "not a number"}},
		{"infinite", row(mark + ".inf"), "thickness_mm", []string{`".inf"`, "not a number"}},
		{"decimal comma", row(mark + "6,5"), "thickness_mm", []string{`"6,5"`, "decimal point"}},
		{"quoted", row(mark + `"6"`), "thickness_mm", []string{`"6"`, "without quotes"}},
		{"quoted once", row(mark + `'6'`), "thickness_mm", []string{"without quotes"}},
		{"folded", row(mark + ">-\n      6"), "thickness_mm", []string{"without quotes"}},
		{"underscore", row(mark + "1_000"), "thickness_mm", []string{`"1_000"`, "not a number"}},
		{"hexadecimal", row(mark + "0x10"), "thickness_mm", []string{`"0x10"`, "not a number"}},
		{"octal of newer YAML", row(mark + "0o10"), "thickness_mm", []string{`"0o10"`, "not a number"}},
		{"base 60", row(mark + "1:30"), "thickness_mm", []string{`"1:30"`, "not a number"}},
		{"with its unit", row(mark + "6 mm"), "thickness_mm", []string{`"6 mm"`, "in the unit that the key names"}},
		{"too large for a number", row(mark + "1e999"), "thickness_mm", []string{"1e999", "too large"}},
		{"null", row(mark + "null"), "thickness_mm", []string{"has no value", "leave the key out"}},
		{"tilde", row(mark + "~"), "thickness_mm", []string{"has no value"}},
		{"a list for a number", row(mark + "[6]"), "thickness_mm", []string{"is a number, not a list"}},
		{"a map for a number", row(mark + "{mm: 6}"), "thickness_mm", []string{"is a number, not a map"}},
		{"zero", row(mark + "0"), "thickness_mm", []string{"0 is not above 0"}},
		{"minus", row(mark + "-6"), "thickness_mm", []string{"-6 is not above 0"}},
		{"too thick", row(mark + "201"), "thickness_mm", []string{"201 is above 200"}},
		{"zero gap", [2]string{"gap_mm: 16", "gap_mm: " + mark + "0"}, "gap_mm", []string{"not above 0"}},
		{"gap below zero", [2]string{"gap_mm: 16", "gap_mm: " + mark + "-1.5"}, "gap_mm", []string{"not above 0"}},
		{"zero glass ply", [2]string{thickness, "plies: [{glass_mm: " + mark + "0.0}]"}, "glass_mm", []string{"not above 0"}},
		{"emissivity 0", [2]string{"emissivity_front: 0.837", "emissivity_front: " + mark + "0"}, "emissivity_front", []string{"0 is not above 0"}},
		{"emissivity 1.1", [2]string{"emissivity_front: 0.837", "emissivity_front: " + mark + "1.1"}, "emissivity_front", []string{"1.1 is above 1"}},
		{"emissivity of a tint", [2]string{"tint: full,", "tint: full, emissivity_back: " + mark + "1.1,"}, "emissivity_back", []string{"above 1"}},
		{"a word for true", [2]string{"turned: true", "turned: " + mark + "yes"}, "turned", []string{"true or false", `"yes"`}},
		{"a number for true", [2]string{"turned: true", "turned: " + mark + "1"}, "turned", []string{"true or false"}},
		{"quoted true", [2]string{"turned: true", "turned: " + mark + `"true"`}, "turned", []string{"true or false"}},

		{"alias of a merge", [2]string{"      - {pane: dusk-7}\n", "      - {pane: dusk-7, " + mark + "<<: {turned: true}}\n"}, "outside_to_inside", []string{"plain word"}},
		{"anchor on a value", row(mark + "&six 6"), "thickness_mm", []string{"anchors and aliases are not used", "write the value out"}},
		{"anchor on a key", [2]string{thickness, mark + "&t " + thickness}, "panes", []string{"anchors and aliases are not used"}},
		{"anchor on a list", [2]string{"panes:\n", "panes: " + mark + "&p\n"}, "panes", []string{"anchors and aliases are not used"}},
		{"tag", row(mark + "!!float 6"), "thickness_mm", []string{"tags such as !!float are not used"}},
		{"private tag", [2]string{"project: Test hall", "project: " + mark + "!sealed x"}, "project", []string{"tags such as !sealed are not used"}},
		{"tag on a key", [2]string{thickness, mark + "!!str " + thickness}, "panes", []string{"tags such as !!str"}},
		{"duplicate key", [2]string{thickness, thickness + "\n    " + mark + "thickness_mm: 4"}, "thickness_mm", []string{"stands twice in a pane"}},
		{"duplicate gas", gap("{argon: 0.9, air: 0.1, " + mark + "air: 0.1}"), "air", []string{"stands twice in gas"}},
		{"key of two words", [2]string{thickness, mark + "[thickness, mm]: 6"}, "panes", []string{"plain word"}},
		{"unknown key after letters beyond ASCII", [2]string{"{pane: dusk-7}", "{tint: größer, " + mark + "windows: 1, pane: plain-6}"}, "windows", []string{"unknown key in a pane or gap"}},
		{"a text for a list", [2]string{"outside_to_inside:\n      - {pane: dusk-7}\n      - {gap_mm: 16, gas: {argon: 0.9, air: 0.1}}\n      - {pane: plain-6, turned: true}\n", "outside_to_inside: " + mark + "plain-6\n"}, "outside_to_inside", []string{"is a list", `"plain-6"`}},
		{"a map for a list", [2]string{"makeups:\n", "limits: " + mark + "{figure: u, at_most: 1}\nmakeups:\n"}, "limits", []string{"is a list", "not a map"}},

		{"duplicate pane", [2]string{"  - id: dusk-7\n", "  - {id: " + mark + "plain-6, thickness_mm: 4, spectrum: a.csv}\n  - id: dusk-7\n"}, "id", []string{`"plain-6" is the id of another glass or pane, in line 4`}},
		{"duplicate make-up", [2]string{"makeups:\n  - id: A1", "makeups:\n  - {id: A1, outside_to_inside: [{pane: plain-6}]}\n  - id: " + mark + "A1"}, "id", []string{`"A1" is the id of another make-up, in line 18`}},
		{"duplicate tint", [2]string{"tint: full", "tint: " + mark + "clear"}, "id", []string{`"clear" is the id of another tint of this pane, in line 15`}},
		{"duplicate condition", [2]string{"makeups:\n", "conditions:\n  - {id: c, outside_c: 0, inside_c: 20}\n  - {id: " + mark + "c, outside_c: 0, inside_c: 20}\nmakeups:\n"}, "id", []string{`"c" is the id of another condition, in line 18`}},
		{"unknown pane", [2]string{"pane: dusk-7", "pane: " + mark + "dsuk-7"}, "pane", []string{`unknown pane "dsuk-7"`, "did you mean dusk-7?"}},
		{"unknown pane, none near", [2]string{"pane: dusk-7", "pane: " + mark + "somewhere-else-entirely"}, "pane", []string{"known are dusk-7, plain-6"}},
		{"unknown basis", [2]string{"basis: en", "basis: " + mark + "iso1509"}, "basis", []string{`"iso1509" is not known`, "did you mean iso15099?"}},
		{"unknown basis in a list", [2]string{"basis: en", "basis: [en, " + mark + "din]"}, "basis", []string{`"din" is not known`}},
		{"basis twice", [2]string{"basis: en", "basis: [en, " + mark + "en]"}, "basis", []string{`"en" stands twice`}},
		{"no basis", [2]string{"basis: en", "basis: " + mark + "[]"}, "basis", []string{"empty list", "leave the key out"}},
		{"basis of coefficients", [2]string{"basis: en", "coefficients: {" + mark + "ne: {he_w_m2k: 20}}"}, "ne", []string{"unknown in coefficients", "did you mean", "en"}},
		{"coefficient below zero", [2]string{"basis: en", "coefficients: {en: {he_w_m2k: " + mark + "-1}}"}, "he_w_m2k", []string{"-1 is not above 0"}},
		{"unknown gas", gap("{argn: " + mark + "0.9, air: 0.1}"), "gas", []string{`unknown gas "argn"`, "did you mean argon?"}},
		{"unknown tint", [2]string{"{pane: dusk-7}", "{pane: dusk-7, tint: " + mark + "fulll}"}, "tint", []string{`pane dusk-7 has no tint "fulll"`, "did you mean full?"}},
		{"tint of a pane that has none", [2]string{"turned: true", "tint: " + mark + "full"}, "tint", []string{"pane plain-6 does not switch"}},
		{"same without a leader", [2]string{"{pane: dusk-7}", "{pane: dusk-7, tint: same}"}, "outside_to_inside", []string{"tint: same", "no pane outside it can switch"}},
		{"unknown heat treatment", [2]string{"heat_treatment: toughened", "heat_treatment: " + mark + "toughend"}, "heat_treatment", []string{`"toughend" is not known`, "did you mean toughened?"}},
		{"unknown origin", [2]string{"heat_treatment: toughened", "origin: " + mark + "mesured"}, "origin", []string{"did you mean measured?"}},
		{"tint called same", [2]string{"tint: full", "tint: " + mark + "same"}, "tint", []string{"cannot be called same"}},
		{"condition called winter", [2]string{"makeups:\n", "conditions: [{id: " + mark + "winter, outside_c: 0, inside_c: 20}]\nmakeups:\n"}, "id", []string{"winter is a condition of the basis", "another name"}},
		{"condition called summer", [2]string{"makeups:\n", "conditions: [{id: " + mark + "summer, outside_c: 0, inside_c: 20}]\nmakeups:\n"}, "id", []string{"summer is a condition of the basis"}},
		{"wind beside convection", [2]string{"makeups:\n", "conditions: [{id: c, outside_c: 0, inside_c: 20, wind_m_s: 4, outside_convection_w_m2k: " + mark + "20}]\nmakeups:\n"}, "outside_convection_w_m2k", []string{"stands beside wind_m_s", "give one"}},
		{"colder than can be", [2]string{"makeups:\n", "conditions: [{id: c, outside_c: " + mark + "-273.15, inside_c: 20}]\nmakeups:\n"}, "outside_c", []string{"not above -273.15"}},
		{"limit without a bound", [2]string{"makeups:\n", "limits:\n  - " + mark + "{figure: u}\nmakeups:\n"}, "limits", []string{"at_most or at_least"}},
		{"limit that nothing meets", [2]string{"makeups:\n", "limits:\n  - " + mark + "{figure: u, at_most: 1, at_least: 2}\nmakeups:\n"}, "limits", []string{"no figure can meet both"}},
		{"missing figure", [2]string{"makeups:\n", "limits:\n  - " + mark + "{at_most: 1}\nmakeups:\n"}, "figure", []string{"is missing in a limit", "key or alias"}},

		{"gas fractions above 1", gap("{argon: 0.9, air: 0.2}"), "gas", []string{"add to 1.1", "must add to 1"}},
		{"gas fractions just off", gap("{argon: 0.9, air: 0.100002}"), "gas", []string{"add to 1.000002"}},
		{"gas fraction above 1", gap("{air: " + mark + "1.5}"), "air", []string{"1.5 is above 1"}},
		{"gas fraction below 0", gap("{argon: " + mark + "-0.1, air: 1}"), "argon", []string{"-0.1 is below 0"}},
		{"gap without gas", [2]string{"{gap_mm: 16, gas: {argon: 0.9, air: 0.1}}", "{gap_mm: " + mark + "16}"}, "gas", []string{"is missing", "{air: 1}"}},
		{"gas without a gap", [2]string{"{gap_mm: 16, gas: {argon: 0.9, air: 0.1}}", mark + "{gas: {air: 1}}"}, "gap_mm", []string{"is missing", "a width"}},
		{"gas beside vacuum", [2]string{"gas: {argon: 0.9, air: 0.1}", "gas: {air: 1}, vacuum: " + mark + "{pressure_pa: 0.1, pillar_radius_mm: 0.25, pillar_pitch_mm: 20}"}, "vacuum", []string{"stands beside gas", "give one"}},
		{"two gaps in a row", [2]string{"      - {pane: plain-6, turned", "      - " + mark + "{gap_mm: 12, gas: {air: 1}}\n      - {pane: plain-6, turned"}, "gap_mm", []string{"two gaps in a row"}},
		{"two panes in a row", [2]string{"      - {gap_mm: 16, gas: {argon: 0.9, air: 0.1}}\n      - {pane", "      - " + mark + "{pane"}, "pane", []string{"two panes in a row", "laminate"}},
		{"begins with a gap", [2]string{"      - {pane: dusk-7}\n      - {gap", "      - " + mark + "{gap"}, "gap_mm", []string{"begins with a pane"}},
		{"ends with a gap", [2]string{"      - {gap_mm: 16, gas: {argon: 0.9, air: 0.1}}\n      - {pane: plain-6, turned: true}\n", "      - " + mark + "{gap_mm: 16, gas: {air: 1}}\n"}, "gap_mm", []string{"ends with a pane"}},
		{"pane and gap in one", [2]string{"{pane: dusk-7}", mark + "{pane: dusk-7, gap_mm: 16}"}, "outside_to_inside", []string{"either a pane or a gap"}},
		{"turned alone", [2]string{"{pane: dusk-7}", mark + "{turned: true}"}, "pane", []string{"is missing", "belong to a pane"}},
		{"no pane", [2]string{"makeups:\n", "makeups:\n  - " + mark + "id: A0\n    outside_to_inside: []\n"}, "outside_to_inside", []string{"holds no pane"}},
		{"nine panes", panes(9), "outside_to_inside", []string{"9 panes; at most 8"}},

		{"spectrum and tints", [2]string{"    tints:\n", "    spectrum: a.csv\n    tints:\n"}, "tints", []string{"stand beside a spectrum", "each tint its own"}},
		{"neither spectrum nor tints", [2]string{"    spectrum: a.csv\n", ""}, "spectrum", []string{"is missing", "spectrum, or tints"}},
		{"no spectrum in a tint", [2]string{"{tint: full, spectrum: b.csv}", mark + "{tint: full}"}, "spectrum", []string{"is missing", "a tint has a spectrum"}},
		{"both forms of spectra", [2]string{"spectrum: a.csv\n", "spectrum: a.csv\n    spectra: " + mark + "{tau: a.csv, rho_front: a.csv, rho_back: a.csv}\n"}, "spectra", []string{"stands beside spectrum", "give one"}},
		{"no file in spectra", [2]string{"spectrum: a.csv\n", "spectra: " + mark + "{tau: a.csv, rho_front: a.csv}\n"}, "rho_back", []string{"is missing in spectra", "reflectance of the back"}},
		{"both emissivities", [2]string{"emissivity_front: 0.837\n", "emissivity_front: 0.837\n    emissivity_normal_front: " + mark + "0.89\n"}, "emissivity_normal_front", []string{"stands beside emissivity_front", "give one"}},
		{"thickness and plies", [2]string{thickness, "plies: [{glass_mm: 3}]\n    thickness_mm: " + mark + "6"}, "thickness_mm", []string{"stands beside plies"}},
		{"neither thickness nor plies", [2]string{"    thickness_mm: 6\n", ""}, "thickness_mm", []string{"is missing", "plies for a laminate"}},
		{"ply of both kinds", [2]string{thickness, "plies: [" + mark + "{glass_mm: 3, interlayer_mm: 1}]"}, "plies", []string{"either glass_mm or interlayer_mm"}},
		{"ply of no kind", [2]string{thickness, "plies: [" + mark + "{density_kg_m3: 1000}]"}, "plies", []string{"either glass_mm or interlayer_mm"}},

		{"no such file", [2]string{"spectrum: b.csv", "spectrum: " + mark + "c.csv"}, "spectrum", []string{"c.csv"}},
		{"no sun", [2]string{"basis: en", "sun: " + mark + "moon.csv"}, "sun", []string{"moon.csv"}},
		{"id begins with a hyphen", [2]string{"id: plain-6", "id: " + mark + "-plain"}, "id", []string{`"-plain" is no id`, "beginning with a letter or digit"}},
		{"id begins with a point", [2]string{"id: plain-6", "id: " + mark + ".plain"}, "id", []string{"is no id"}},
		{"id with a blank", [2]string{"id: plain-6", "id: " + mark + "plain 6"}, "id", []string{`"plain 6" is no id`}},
		{"id with a slash", [2]string{"id: plain-6", "id: " + mark + "plain/6"}, "id", []string{"is no id"}},
		{"id of 65 letters", [2]string{"id: plain-6", "id: " + mark + strings.Repeat("ß", 65)}, "id", []string{"is no id", "1 to 64 letters"}},
		{"blank text", [2]string{"project: Test hall", "project: " + mark + `"  "`}, "project", []string{"is blank"}},
		{"escaped control character", [2]string{"project: Test hall", "project: " + mark + `"a\e[31m"`}, "project", []string{"control character U+001B"}},
		{"escaped control character, deleted", [2]string{"project: Test hall", "project: " + mark + `"a\x7f"`}, "project", []string{"control character U+007F"}},
		{"escaped zero", [2]string{"project: Test hall", "project: " + mark + `"a\0"`}, "project", []string{"control character U+0000"}},
		{"control character", [2]string{"project: Test hall", "project: a" + mark + "\x1b[31m"}, "", []string{"control character U+001B"}},
		{"control character in a name", [2]string{"    outside", "    typed: {" + mark + `"a\e[31m": red}` + "\n    outside"}, "typed", []string{"control character U+001B"}},
		{"control character in a name of a number", [2]string{"    heat_treatment", "    attributes: {" + mark + `"a\e[31m": 1}` + "\n    heat_treatment"}, "attributes", []string{"control character U+001B"}},
		{"control character in a tag", [2]string{"project: Test hall", "project: " + mark + "!a%1bb x"}, "project", []string{"tags such as"}},
		{"bytes that are not UTF-8", [2]string{"project: Test hall", "project: M" + mark + "\xfchle"}, "", []string{"not UTF-8", "save it as UTF-8"}},
		{"tab as indent", [2]string{"    thickness_mm: 6", mark + "\tthickness_mm: 6"}, "", []string{"not readable as YAML", "tab", "spaces"}},
	} {
		t.Run(tt.name, func(t *testing.T) {
			text, at := marked(change(t, tt.change[0], tt.change[1]))
			checkOne(t, faultsOf(text, memory(hallFiles())), at, tt.key, tt.words)
		})
	}
}

// checkOne wants one fault: at the marked place if there is a mark, of a key, with words.
func checkOne(t *testing.T, faults Errors, at []position, key string, words []string) {
	t.Helper()
	if len(faults) != 1 {
		t.Errorf("%d faults, want 1:\n%v", len(faults), faults)
	}
	if len(faults) == 0 {
		return
	}
	p, ok := errors.AsType[*Problem](faults[0])
	if !ok {
		t.Fatalf("%T: %v", faults[0], faults[0])
	}
	if strings.ContainsFunc(p.Error(), unicode.IsControl) {
		t.Errorf("%q would send control characters to a terminal", p.Error())
	}
	if p.Key != key {
		t.Errorf("%v: of key %q, want %q", p, p.Key, key)
	}
	if len(at) > 0 && (p.Line != at[0].line || p.Column != at[0].column) {
		t.Errorf("%v: want line %d, column %d", p, at[0].line, at[0].column)
	}
	if len(at) > 0 && !strings.HasPrefix(p.Error(), fmt.Sprintf("p.yaml:%d:%d: ", p.Line, p.Column)) {
		t.Errorf("%q does not begin with its place", p.Error())
	}
	for _, w := range words {
		if !strings.Contains(p.Text, w) {
			t.Errorf("%v: lacks %q", p, w)
		}
	}
}

// A key that is made of control characters is reported without them.
func TestRefusesControlCharactersInKeys(t *testing.T) {
	faults := faultsOf(change(t, "basis: en", `"ba\e[31m\nsis": en`), memory(hallFiles()))
	if len(faults) != 1 || !strings.HasPrefix(faults[0].Error(), "p.yaml:2:1: ") || strings.ContainsFunc(faults[0].Error(), unicode.IsControl) {
		t.Errorf("got %q", faults)
	}
}

// What no glazing can be is refused, or it is rated; no figure is ever NaN or infinite.
func TestImpossibleSizes(t *testing.T) {
	for _, c := range [][2]string{
		{"thickness_mm: 6", "thickness_mm: 1e-320"},
		{"thickness_mm: 6", "thickness_mm: 6\n    conductivity_w_mk: 1e-320"},
		{"thickness_mm: 6", "thickness_mm: 6\n    conductivity_w_mk: 1e308"},
		{"thickness_mm: 6", "thickness_mm: 6\n    density_kg_m3: 1e308"},
		{"thickness_mm: 6", "plies: [{glass_mm: 1e-320}, {interlayer_mm: 200, conductivity_w_mk: 1e-320, density_kg_m3: 1e308}]"},
		{"gap_mm: 16", "gap_mm: 1e-320"},
		{"gap_mm: 16", "gap_mm: 1000"},
		{"basis: en", "coefficients: {en: {he_w_m2k: 1e-320}}"},
		{"basis: en", "coefficients: {en: {hi_w_m2k: 1e-320}}"},
		{"basis: en", "coefficients: {en: {he_w_m2k: 1e-320, hi_w_m2k: 1e-320}}"},
		{"emissivity_back: 0.04", "emissivity_back: 1e-320"},
		{"emissivity_back: 0.16", "emissivity_normal_back: 1e-320"},
		{"turned: true}", "turned: true}\n    tilt_deg: 1e-320"},
	} {
		p, err := read("p.yaml", []byte(change(t, c[0], c[1])), memory(hallFiles()))
		if err != nil {
			continue
		}
		for _, r := range ratings(t, p, glazing.EN) {
			checkFinite(t, &r, c[1])
		}
	}
}

// What is no document of one project is refused in one message.
func TestRefusesDocuments(t *testing.T) {
	utf16 := []byte{0xff, 0xfe}
	for _, c := range []byte(hall) {
		utf16 = append(utf16, c, 0)
	}
	for _, tt := range []struct {
		name, text string
		words      []string
	}{
		{"empty", "", []string{"is empty", "project: TITLE"}},
		{"blank", "\n  \n", []string{"is empty"}},
		{"byte order mark alone", "\ufeff", []string{"is empty"}},
		{"comments alone", "# nothing\n", []string{"is empty"}},
		{"UTF-16", string(utf16), []string{"UTF-16", "save it as UTF-8"}},
		{"UTF-16 without a mark", string(utf16[2:]), []string{"binary, or UTF-16"}},
		{"binary", "PK\x03\x04\x00", []string{"binary"}},
		{"two documents", hall + "---\n" + hall, []string{"more than one document"}},
		{"a list", "- project: x\n", []string{"a project is a map of keys and values, not a list"}},
		{"a word", "hello\n", []string{`a project is a map of keys and values, not "hello"`}},
		{"null", "null\n", []string{"a project is a map of keys and values"}},
		{"unclosed", "project: [a, b\n", []string{"not readable as YAML"}},
		{"unknown alias", "project: *x\n", []string{"not readable as YAML"}},
		{"too large", "#" + strings.Repeat("x", maxProjectBytes), []string{"larger than 16 MB"}},
	} {
		t.Run(tt.name, func(t *testing.T) {
			checkOne(t, faultsOf(tt.text, memory(nil)), nil, "", tt.words)
		})
	}
	t.Run("alias", func(t *testing.T) {
		text, at := marked(strings.Replace(change(t, "thickness_mm: 6", "thickness_mm: &six 6"), "thickness_mm: 7", "thickness_mm: "+mark+"*six", 1))
		faults := faultsOf(text, memory(hallFiles()))
		if len(faults) != 2 {
			t.Fatalf("%d faults, want 2:\n%v", len(faults), faults)
		}
		checkOne(t, faults[1:], at, "thickness_mm", []string{"anchors and aliases are not used", "write the value out"})
	})
}

// Hostile documents are refused quickly and in few words.
func TestHostileDocuments(t *testing.T) {
	const deep = 20000
	laughs := "a: &a [ha, ha, ha, ha, ha, ha, ha, ha, ha]\n"
	for c := 'b'; c <= 'i'; c++ {
		laughs += fmt.Sprintf("%c: &%c [%s*%c]\n", c, c, strings.Repeat(fmt.Sprintf("*%c, ", c-1), 8), c-1)
	}
	laughs += "panes: *i\n"
	for _, tt := range []struct{ name, text, words string }{
		{"lists in a line", "panes: " + strings.Repeat("[", deep) + strings.Repeat("]", deep), "nested too deeply"},
		{"lists in a line, not closed", "panes: " + strings.Repeat("[", deep), "nested too deeply"},
		{"maps in a line", "panes: " + strings.Repeat("{a: ", deep) + strings.Repeat("}", deep), "nested too deeply"},
		{"lists by hyphens", "panes:\n" + strings.Repeat("- ", deep) + "x\n", "nested too deeply"},
		{"keys by question marks", strings.Repeat("? ", deep) + "x\n", "nested too deeply"},
		{"maps by indent", func() string {
			var s strings.Builder
			for i := range 2000 { // 2 MB: with the indent the size limit would come first
				s.WriteString(strings.Repeat(" ", i) + "a:\n")
			}
			return s.String()
		}(), "unknown key"},
		{"aliases of aliases", laughs, "anchors and aliases are not used"},
		{"a long line of brackets in text", "project: \"" + strings.Repeat("[", deep) + "\"\nq: 1", "unknown key"},
		{"a long key", strings.Repeat("k", 100_000) + ": 1\n", ""},
		{"a long number", "panes: [{id: a, thickness_mm: " + strings.Repeat("9", 100_000) + "}]\n", "too large"},
		{"many keys", "project: x\n" + func() string {
			var s strings.Builder
			for i := range 20000 {
				fmt.Fprintf(&s, "k%d: 1\n", i)
			}
			return s.String()
		}(), "unknown key"},
	} {
		t.Run(tt.name, func(t *testing.T) {
			start := time.Now()
			faults := faultsOf(tt.text, memory(nil))
			if took := time.Since(start); took > 2*time.Second {
				t.Errorf("took %v", took)
			}
			if len(faults) == 0 || !strings.Contains(faults.Error(), tt.words) {
				t.Fatalf("got %.300v, want %q", faults, tt.words)
			}
			for _, f := range faults {
				if n := len(f.Error()); n > 1500 {
					t.Errorf("a message of %d bytes: %.200v", n, f)
				}
			}
		})
	}
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
		{"conditions", "makeups:\n", "conditions:\n  - {id: january-night, outside_c: -12, inside_c: 20, inside_rh: 0.45, wind_m_s: 4, sun_w_m2: 0, tilt_deg: 90, height_m: 1}\n  - {id: still, outside_c: 0, outside_radiant_c: -5, sky_c: -20, inside_c: 20, inside_radiant_c: 18, outside_convection_w_m2k: 20, inside_convection_w_m2k: 3}\nmakeups:\n", func(p *Project) bool {
			return slices.ContainsFunc(p.Cautions, func(c glazing.Caution) bool { return c.Code == "conditions_not_rated" })
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

// write makes a folder with a project and its files and returns the project's path.
func write(t *testing.T, dir, text string, files map[string]string) string {
	t.Helper()
	for name, content := range files {
		path := filepath.Join(dir, name)
		if err := os.MkdirAll(filepath.Dir(path), 0o755); err != nil {
			t.Fatal(err)
		}
		if err := os.WriteFile(path, []byte(content), 0o644); err != nil {
			t.Fatal(err)
		}
	}
	path := filepath.Join(dir, "p.yaml")
	if err := os.WriteFile(path, []byte(text), 0o644); err != nil {
		t.Fatal(err)
	}
	return path
}

func TestFilesOutsideTheFolder(t *testing.T) {
	root := t.TempDir()
	inside := filepath.Join(root, "hall")
	if err := os.WriteFile(filepath.Join(root, "x.csv"), []byte(hallFiles()["a.csv"]), 0o644); err != nil {
		t.Fatal(err)
	}
	files := hallFiles()
	files["sub/x.csv"] = files["a.csv"]
	write(t, inside, hall, files)
	link := func(target, name string) {
		if err := os.Symlink(target, filepath.Join(inside, name)); err != nil {
			t.Skipf("no symbolic links here: %v", err)
		}
	}
	link(filepath.Join("..", "x.csv"), "out.csv")
	link("..", "up")
	link(filepath.Join("sub", "x.csv"), "in.csv")
	for _, tt := range []struct {
		name, file string
		words      []string // of the refusal; empty where it is read
	}{
		{"in the folder", "sub/x.csv", nil},
		{"up and down again", "sub/../sub/x.csv", nil},
		{"link within", "in.csv", nil},
		{"above", "../x.csv", []string{"leads out of the project's folder", "--files-anywhere"}},
		{"above by a detour", "sub/../../x.csv", []string{"leads out of the project's folder", "--files-anywhere"}},
		{"absolute", filepath.ToSlash(filepath.Join(root, "x.csv")), []string{"leads out of the project's folder", "--files-anywhere"}},
		{"link leading out", "out.csv", []string{"leads out of the project's folder", "--files-anywhere"}},
		{"folder leading out", "up/x.csv", []string{"leads out of the project's folder", "--files-anywhere"}},
	} {
		t.Run(tt.name, func(t *testing.T) {
			text, at := marked(change(t, "spectrum: a.csv", "spectrum: "+mark+"'"+tt.file+"'"))
			path := write(t, inside, text, nil)
			_, err := Load(path, Access{})
			if tt.words == nil {
				if err != nil {
					t.Error(err)
				}
			} else if faults, ok := errors.AsType[Errors](err); !ok || len(faults) != 1 {
				t.Errorf("%v: want one fault", err)
			} else {
				p, ok := errors.AsType[*Problem](faults[0])
				if !ok || p.File != path || p.Line != at[0].line || p.Column != at[0].column || p.Key != "spectrum" {
					t.Errorf("%v: want line %d, column %d, key spectrum", faults, at[0].line, at[0].column)
				}
				for _, w := range tt.words {
					if !strings.Contains(faults.Error(), w) {
						t.Errorf("%v: lacks %q", faults, w)
					}
				}
			}
			if _, err := Load(path, Access{Anywhere: true}); err != nil {
				t.Errorf("anywhere: %v", err)
			}
		})
	}
}

func TestFilesThatCannotBeRead(t *testing.T) {
	dir := t.TempDir()
	files := hallFiles()
	files["sub/x.csv"] = files["a.csv"]
	write(t, dir, hall, files)
	if err := os.WriteFile(filepath.Join(dir, "locked.csv"), []byte(files["a.csv"]), 0o000); err != nil {
		t.Fatal(err)
	}
	large, err := os.Create(filepath.Join(dir, "large.csv"))
	if err != nil {
		t.Fatal(err)
	}
	if err := errors.Join(large.Truncate(spectra.MaxBytes+1), large.Close()); err != nil {
		t.Fatal(err)
	}
	for _, tt := range []struct {
		name, file, words string
		skip              bool
	}{
		{"folder", "sub", "is a folder, not a file", false},
		{"the folder itself", ".", "is a folder, not a file", false},
		{"missing", "none.csv", "no such file", false},
		{"missing in a folder that is missing", "none/x.csv", "no such file", false},
		{"a file as a folder", "a.csv/x.csv", "a.csv/x.csv", runtime.GOOS == "windows"},
		{"not permitted", "locked.csv", "permission denied", runtime.GOOS == "windows" || os.Getuid() == 0},
		{"too large", "large.csv", "larger than 64 MB", false},
	} {
		t.Run(tt.name, func(t *testing.T) {
			if tt.skip {
				t.Skip("this user or system may read it")
			}
			text, at := marked(change(t, "spectrum: a.csv", "spectrum: "+mark+tt.file))
			path := write(t, dir, text, nil)
			for _, a := range []Access{{}, {Anywhere: true}} {
				_, err := Load(path, a)
				p, ok := errors.AsType[*Problem](err)
				if !ok || p.Line != at[0].line || p.Column != at[0].column || p.Key != "spectrum" || !strings.Contains(p.Text, tt.words) {
					t.Errorf("%+v: got %v, want %q", a, err, tt.words)
				} else if strings.Contains(p.Text, dir) || strings.Contains(p.Text, "openat") {
					t.Errorf("%+v: %v tells of the machine's own affairs", a, err)
				}
			}
		})
	}
}

func TestProjectFileThatCannotBeRead(t *testing.T) {
	dir := t.TempDir()
	path := write(t, dir, hall, hallFiles())
	for name, words := range map[string]string{
		dir:                               "is a folder; name the project file in it, such as " + path,
		filepath.Join(dir, "none.yaml"):   "there is no such file",
		filepath.Join(dir, "p.yaml", "x"): filepath.Join(dir, "p.yaml", "x"),
	} {
		_, err := Load(name, Access{})
		if p, ok := errors.AsType[*Problem](err); !ok || p.File != name || !strings.Contains(p.Error(), words) {
			t.Errorf("%s: got %v, want %q", name, err, words)
		}
	}
	if p, err := Load(path, Access{}); err != nil || p.File != path {
		t.Errorf("%v, %v", p, err)
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
	if got := DidYouMean(nil, names); got != "known are gap_mm, gas, glass, tint, turned" {
		t.Error(got)
	}
	if got := DidYouMean([]string{"gas", "glass"}, names); got != "did you mean gas or glass?" {
		t.Error(got)
	}
}
