package project

import (
	"fmt"
	"strings"
	"testing"
	"time"
	"unicode"

	"panewright/glazing"
)

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

		{"alias of a merge", [2]string{"      - {pane: dusk-7}\n", "      - {pane: dusk-7, " + mark + "<<: {turned: true}}\n"}, "outside_to_inside", []string{"merge keys"}},
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

		{"duplicate pane", [2]string{"  - id: dusk-7\n", "  - {id: " + mark + "plain-6, thickness_mm: 4, spectrum: a.csv}\n  - id: dusk-7\n"}, "id", []string{`"plain-6" is the name of another glass or pane, in line 4`}},
		{"duplicate make-up", [2]string{"makeups:\n  - id: A1", "makeups:\n  - {id: A1, outside_to_inside: [{pane: plain-6}]}\n  - id: " + mark + "A1"}, "id", []string{`"A1" is the name of another make-up, in line 18`}},
		{"duplicate tint", [2]string{"tint: full", "tint: " + mark + "clear"}, "tint", []string{`"clear" is the name of another tint of this pane, in line 15`}},
		{"duplicate condition", [2]string{"makeups:\n", "conditions:\n  - {id: c, outside_c: 0, inside_c: 20}\n  - {id: " + mark + "c, outside_c: 0, inside_c: 20}\nmakeups:\n"}, "id", []string{`"c" is the name of another condition, in line 18`}},
		{"unknown pane", [2]string{"pane: dusk-7", "pane: " + mark + "dsuk-7"}, "pane", []string{`unknown pane "dsuk-7"`, "did you mean dusk-7?"}},
		{"unknown pane, none near", [2]string{"pane: dusk-7", "pane: " + mark + "somewhere-else-entirely"}, "pane", []string{"known are dusk-7, plain-6"}},
		{"unknown basis", [2]string{"basis: en", "basis: " + mark + "iso1509"}, "basis", []string{`"iso1509" is not known`, "did you mean iso15099?"}},
		{"unknown basis in a list", [2]string{"basis: en", "basis: [en, " + mark + "din]"}, "basis", []string{`"din" is not known`}},
		{"basis twice", [2]string{"basis: en", "basis: [en, " + mark + "en]"}, "basis", []string{`"en" stands twice`}},
		{"no basis", [2]string{"basis: en", "basis: " + mark + "[]"}, "basis", []string{"empty list", "leave the key out"}},
		{"basis of coefficients", [2]string{"basis: en", "coefficients: {" + mark + "ne: {he_w_m2k: 20}}"}, "ne", []string{"unknown in coefficients", "did you mean", "en"}},
		{"coefficient below zero", [2]string{"basis: en", "coefficients: {en: {he_w_m2k: " + mark + "-1}}"}, "he_w_m2k", []string{"-1 is not above 0"}},
		{"unknown gas", gap("{" + mark + "argn: 0.9, air: 0.1}"), "gas", []string{`unknown gas "argn"`, "did you mean argon?"}},
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

// checkOne wants one fault of the project file, as checkIn does.
func checkOne(t *testing.T, faults Errors, at []position, key string, words []string) {
	t.Helper()
	checkIn(t, faults, "p.yaml", at, key, words)
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
		{"two documents", hall + "---\n" + hall, []string{"a second document begins here"}},
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
