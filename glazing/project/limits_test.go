package project

import (
	"crypto/sha256"
	"encoding/hex"
	"errors"
	"fmt"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"testing"
	"unicode"
	"unicode/utf8"

	"panewright/glazing"
)

// shared is a limits file without fault.
const shared = `name: Harbour district, invented
author: M. Example
limits:
  - figure: u
    at_most: 1.2
    scope: centre
    basis: en
    source: Brief, clause 4
    date: 2026-01-31
  - {figure: surfaces.3.emissivity, at_most: 0.05, makeups: [A1, Z9]}
  - {figure: light, at_least: 0.5, at_most: 0.7, tint: clear, makeups: Z8}
`

// withLimits is the hall with limits of its own and of a file.
func withLimits(t *testing.T) string {
	t.Helper()
	return change(t, "basis: en", "basis: en\nauthor: N. Sample\nlimits:\n  - {figure: g, at_most: 0.4, tint: worst, condition: winter}\nlimits_file: l.yaml")
}

func TestLimits(t *testing.T) {
	files := hallFiles()
	files["l.yaml"] = shared
	text := withLimits(t)
	p := accept(t, text, files)
	if len(p.Limits) != 1 || p.LimitsFile == nil || len(p.LimitsFile.Limits) != 3 {
		t.Fatalf("limits %v, file %v", p.Limits, p.LimitsFile)
	}
	own := p.Limits[0]
	if own.String() != "g at most 0.4" || own.Terms() != "all make-ups; the worst tint; condition winter" || own.Origin() != "typed by the user (N. Sample) in p.yaml:5; source: none given; date: none given" {
		t.Errorf("%s; %s; %s", &own, own.Terms(), own.Origin())
	}
	u := p.LimitsFile.Limits[0]
	if u.String() != "Ug at most 1.2 W/(m²·K)" || u.Terms() != "all make-ups; each tint; basis en; centre of the glass" ||
		u.Origin() != "typed by the user (M. Example) in l.yaml:4; source: Brief, clause 4; date: 2026-01-31" {
		t.Errorf("%s; %s; %s", &u, u.Terms(), u.Origin())
	}
	sum := sha256.Sum256([]byte(shared))
	if p.LimitsFile.Name != "Harbour district, invented" || p.LimitsFile.Digest != hex.EncodeToString(sum[:]) || p.LimitsFile.File != "l.yaml" {
		t.Errorf("file %+v", p.LimitsFile)
	}
	// The file is part of the input: of its digest, and of the files that are not written over.
	all := sha256.Sum256([]byte(text + shared + files["a.csv"] + files["b.csv"]))
	if p.Digest != hex.EncodeToString(all[:]) || !slices.Contains(p.Files, "l.yaml") {
		t.Errorf("digest %s, files %v", p.Digest, p.Files)
	}
	if !slices.ContainsFunc(p.Cautions, func(c glazing.Caution) bool {
		return c.Code == LimitsNotChecked && strings.Contains(c.Text, "panewright check")
	}) {
		t.Errorf("cautions %v", p.Cautions)
	}

	// Make-ups of the file that the project does not have are left out and said; a limit for none
	// of them does not become one for all.
	list, cautions := p.AllLimits(p.LimitsFile)
	var got []string
	for _, l := range list {
		got = append(got, l.String()+" of "+strings.Join(l.Makeups, "+"))
	}
	if want := []string{"g at most 0.4 of ", "Ug at most 1.2 W/(m²·K) of ", "ε3 at most 0.05 of A1"}; !slices.Equal(got, want) {
		t.Errorf("limits %q, want %q", got, want)
	}
	if len(cautions) != 2 || !strings.Contains(cautions[0].Text, "l.yaml:10") || !strings.Contains(cautions[0].Text, "Z9") || !strings.Contains(cautions[1].Text, "Z8") {
		t.Errorf("cautions %v", cautions)
	}
	if len(p.LimitsFile.Limits[1].Makeups) != 2 {
		t.Error("the file was changed")
	}
	// A project of other make-ups shares the file.
	other := accept(t, change(t, "id: A1", "id: Z9"), hallFiles())
	if list, cautions := other.AllLimits(p.LimitsFile); len(list) != 2 || len(cautions) != 2 || !slices.Equal(list[1].Makeups, []string{"Z9"}) {
		t.Errorf("%v, %v", list, cautions)
	}
	if list, _ := other.AllLimits(); len(list) != 0 || other.LimitsFile != nil {
		t.Errorf("a project without limits has %v", list)
	}
	if slices.ContainsFunc(other.Cautions, func(c glazing.Caution) bool { return c.Code == LimitsNotChecked }) {
		t.Error("a project without limits is told of them")
	}
}

// Each wrong limit of a project, and of a limits file, has one error, where it stands.
func TestRefusesLimits(t *testing.T) {
	for _, tt := range []struct {
		name, limit string // the limit, with a mark where the error points
		key         string
		words       []string
		ownOnly     bool // of a project alone
	}{
		{"unknown figure", "{figure: " + mark + "ug, at_most: 1}", "figure", []string{`unknown figure "ug"`, "did you mean"}, false},
		{"figure of another command", "{figure: " + mark + "glare, at_most: 1}", "figure", []string{`unknown figure "glare"`, "known are"}, false},
		{"misspelt key", "{figure: " + mark + "surfaces.3.emisivity, at_most: 0.5}", "figure", []string{"did you mean surfaces.3.emissivity"}, false},
		{"surface 0", "{figure: " + mark + "surfaces.0.emissivity, at_most: 0.5}", "figure", []string{`unknown figure "surfaces.0.emissivity"`}, false},
		{"a text", "{figure: " + mark + "surfaces.3.source, at_most: 1}", "figure", []string{"no figure that a limit can be set for"}, false},
		{"the number of a surface", "{figure: " + mark + "surfaces.3.number, at_most: 1}", "figure", []string{"no figure that a limit can be set for"}, false},
		{"inch-pound", "{figure: " + mark + "u_btu_h_ft2_f, at_most: 0.2}", "figure", []string{"unknown figure"}, false},
		{"no figure", mark + "{at_most: 1}", "figure", []string{"is missing in a limit"}, false},
		{"blank figure", "{figure: " + mark + `"", at_most: 1}`, "figure", []string{"is blank"}, false},
		{"no bound", mark + "{figure: u}", "limits", []string{"at_most or at_least"}, false},
		{"bounds crossed", mark + "{figure: u, at_most: 1, at_least: 1.1}", "limits", []string{"at_most is below at_least", "no figure can meet both"}, false},
		{"percent at most", "{figure: g, at_most: " + mark + "40}", "at_most", []string{"40 is above 1", "g is a fraction of one, not percent"}, false},
		{"percent at least", "{figure: light, at_least: " + mark + "60}", "at_least", []string{"60 is above 1", "not percent"}, false},
		{"rendering index of one", "{figure: ra, at_least: " + mark + "0.8}", "at_least", []string{"0.8 is no rendering index", "100"}, false},
		{"ratio in percent", "{figure: shading, at_most: " + mark + "40}", "at_most", []string{"40 is no ratio", "not percent"}, false},
		{"below any U", "{figure: u, at_most: " + mark + "-3}", "at_most", []string{"-3 is below 0, and Ug never is"}, false},
		{"emissivity in percent", "{figure: emissivity, at_most: " + mark + "5}", "at_most", []string{"5 is above 1", "ε is a fraction"}, false},
		{"decimal comma", "{figure: u, at_most: 1," + mark + "2}", "2", []string{"a decimal comma? write a point"}, false},
		{"not a number", "{figure: u, at_most: " + mark + ".nan}", "at_most", []string{`".nan" is not a number`}, false},
		{"infinite", "{figure: u, at_most: " + mark + ".inf}", "at_most", []string{`".inf" is not a number`}, false},
		{"quoted", "{figure: u, at_most: " + mark + `"1.2"}`, "at_most", []string{"without quotes"}, false},
		{"with its unit", "{figure: u, at_most: " + mark + "1.2 W/(m2K)}", "at_most", []string{"in the unit that the key names"}, false},
		{"null", "{figure: u, at_most: " + mark + "null}", "at_most", []string{"has no value"}, false},
		{"unknown key", "{figure: u, at_most: 1, " + mark + "at_msot: 1}", "at_msot", []string{"unknown key in a limit", "did you mean at_most"}, false},
		{"key twice", "{figure: u, at_most: 1, " + mark + "at_most: 2}", "at_most", []string{"stands twice in a limit"}, false},
		{"unknown scope", "{figure: u, at_most: 1, scope: " + mark + "frame}", "scope", []string{`"frame" is not known`, "centre, window"}, false},
		{"unknown basis", "{figure: u, at_most: 1, basis: " + mark + "din}", "basis", []string{`"din" is not known`}, false},
		{"two bases", "{figure: u, at_most: 1, basis: " + mark + "[en, iso]}", "basis", []string{"is a text, not a list"}, false},
		{"no make-up", "{figure: u, at_most: 1, makeups: " + mark + "[]}", "makeups", []string{"empty list"}, false},
		{"make-up twice", "{figure: u, at_most: 1, makeups: [A1, " + mark + "A1]}", "makeups", []string{`"A1" stands twice`}, false},
		{"unknown make-up", "{figure: u, at_most: 1, makeups: [A1, " + mark + "A2]}", "makeups", []string{`unknown make-up "A2"`, "did you mean A1"}, true},
		{"unknown condition", "{figure: u, at_most: 1, condition: " + mark + "wintr}", "condition", []string{`unknown condition "wintr"`, "did you mean winter"}, true},
		{"anchor", "{figure: u, at_most: " + mark + "&x 1}", "at_most", []string{"anchors and aliases are not used"}, false},
		{"tag", "{figure: u, at_most: " + mark + "!!float 1}", "at_most", []string{"tags such as !!float are not used"}, false},
		{"a word", mark + "u", "limits", []string{"a limit is a map of keys and values"}, false},
		{"control character", "{figure: u, at_most: 1, source: " + mark + `"a\e[31m"}`, "source", []string{"control character U+001B"}, false},
	} {
		t.Run(tt.name, func(t *testing.T) {
			text, at := marked(change(t, "basis: en", "basis: en\nlimits:\n  - {figure: g, at_most: 0.9}\n  - "+tt.limit))
			checkIn(t, faultsOf(text, memory(hallFiles())), "p.yaml", at, tt.key, tt.words)
			file, at := marked("limits:\n  - {figure: g, at_most: 0.9}\n  - " + tt.limit + "\n")
			files := hallFiles()
			files["l.yaml"] = file
			faults := faultsOf(change(t, "basis: en", "basis: en\nlimits_file: l.yaml"), memory(files))
			if tt.ownOnly {
				if len(faults) > 0 {
					t.Errorf("in a limits file: %v", faults)
				}
				return
			}
			checkIn(t, faults, "l.yaml", at, tt.key, tt.words)
		})
	}
}

// Bounds that are wrong for a share of one are right for other figures.
func TestBoundsOfOneAndAbove(t *testing.T) {
	accept(t, change(t, "basis: en", "basis: en\nlimits:\n  - {figure: ra, at_least: 80}\n  - {figure: shading, at_most: 1}\n  - {figure: light_to_solar, at_least: 1.2}\n  - {figure: b_outside, at_least: -10, at_most: 5}\n  - {figure: g, at_most: 0.99, at_least: 0.99}\n  - {figure: mass, at_most: 50}"), hallFiles())
}

// Wrong limits files as documents: the error names the file.
func TestRefusesLimitsFiles(t *testing.T) {
	for _, tt := range []struct {
		name, text string
		key        string
		words      []string
	}{
		{"empty", "", "", []string{"is empty; a limits file begins with limits:"}},
		{"comments alone", "# nothing\n", "", []string{"is empty"}},
		{"no limits", mark + "name: x\n", "limits", []string{"is missing in a limits file"}},
		{"no limit", "limits: []\n", "limits", []string{"holds no limit"}},
		{"a map of limits", "limits: " + mark + "{figure: u, at_most: 1}\n", "limits", []string{"is a list", "not a map"}},
		{"a project", mark + "project: x\nlimits: [{figure: u, at_most: 1}]\n", "project", []string{"unknown key in a limits file"}},
		{"misspelt", mark + "limit:\n  - {figure: u, at_most: 1}\n", "limit", []string{"did you mean limits?"}},
		{"limits twice", "limits: [{figure: u, at_most: 1}]\n" + mark + "limits: [{figure: u, at_most: 1}]\n", "limits", []string{"stands twice in a limits file"}},
		{"a list", mark + "- {figure: u, at_most: 1}\n", "", []string{"a limits file is a map of keys and values, not a list"}},
		{"not YAML", "limits: [\n", "", []string{"not readable as YAML"}},
		{"binary", "PK\x03\x04\x00", "", []string{"a limits file is YAML text in UTF-8"}},
		{"two documents", "limits: [{figure: u, at_most: 1}]\n" + mark + "---\nlimits: []\n", "", []string{"a second document begins here; a limits file is one"}},
		{"alias", "name: " + mark + "*x\nlimits: [{figure: u, at_most: 1}]\n", "", []string{"anchors and aliases are not used in a limits file"}},
		{"merge", "limits: [{" + mark + "<<: {figure: u}, figure: u, at_most: 1}]\n", "limits", []string{"merge keys (<<) are not used in a limits file"}},
	} {
		t.Run(tt.name, func(t *testing.T) {
			text, at := marked(tt.text)
			files := hallFiles()
			files["l.yaml"] = text
			checkIn(t, faultsOf(change(t, "basis: en", "basis: en\nlimits_file: l.yaml"), memory(files)), "l.yaml", at, tt.key, tt.words)

			path := filepath.Join(t.TempDir(), "l.yaml")
			if err := os.WriteFile(path, []byte(text), 0o644); err != nil {
				t.Fatal(err)
			}
			_, err := LoadLimits(path)
			faults, _ := errors.AsType[Errors](err)
			checkIn(t, faults, path, at, tt.key, tt.words)
		})
	}
}

// checkIn wants one fault of a file: at the marked place if there is a mark, of a key, with words.
func checkIn(t *testing.T, faults Errors, file string, at []position, key string, words []string) {
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
	if p.File != file || p.Key != key || strings.ContainsFunc(p.Error(), unicode.IsControl) {
		t.Errorf("%v: in %s of key %q, want %s, %q", p, p.File, p.Key, file, key)
	}
	if len(at) > 0 && !strings.HasPrefix(p.Error(), fmt.Sprintf("%s:%d:%d: ", file, at[0].line, at[0].column)) {
		t.Errorf("%v: want line %d, column %d", p, at[0].line, at[0].column)
	}
	for _, w := range words {
		if !strings.Contains(p.Text, w) {
			t.Errorf("%v: lacks %q", p, w)
		}
	}
}

// A limits file stands in the folder of the project, or where --limits says.
func TestLimitsFilesOnDisk(t *testing.T) {
	root := t.TempDir()
	if err := os.WriteFile(filepath.Join(root, "l.yaml"), []byte(shared), 0o644); err != nil {
		t.Fatal(err)
	}
	text, at := marked(change(t, "basis: en", "basis: en\nlimits_file: "+mark+"../l.yaml"))
	path := write(t, filepath.Join(root, "hall"), text, hallFiles())
	_, err := Load(path, Access{})
	faults, _ := errors.AsType[Errors](err)
	checkIn(t, faults, path, at, "limits_file", []string{"../l.yaml: leads out of the project's folder", "--files-anywhere"})
	p, err := Load(path, Access{Anywhere: true})
	if err != nil || len(p.LimitsFile.Limits) != 3 || !slices.Contains(p.Files, filepath.Join(root, "l.yaml")) {
		t.Errorf("%v, files %v", err, p.Files)
	}
	f, err := LoadLimits(filepath.Join(root, "l.yaml"))
	if err != nil || len(f.Limits) != 3 || f.Limits[0].From != filepath.Join(root, "l.yaml")+":4" {
		t.Errorf("%+v, %v", f, err)
	}
	for name, word := range map[string]string{filepath.Join(root, "none.yaml"): "there is no such file", root: "is a folder"} {
		_, err := LoadLimits(name)
		faults, _ := errors.AsType[Errors](err)
		checkIn(t, faults, name, nil, "", []string{word})
	}
	text, at = marked(change(t, "basis: en", "basis: en\nlimits_file: "+mark+"none.yaml"))
	checkIn(t, faultsOf(text, memory(hallFiles())), "p.yaml", at, "limits_file", []string{"none.yaml"})
}

// Whatever a limits file holds, reading it ends in limits that can be printed or in errors that
// say something.
func FuzzLimitsFile(f *testing.F) {
	f.Add([]byte(shared))
	f.Add([]byte(completeLimits().text()))
	for _, text := range []string{"", "limits: [{figure: surfaces.9999999999.emissivity, at_most: 1e308}]", "limits: [{figure: g, at_least: -1e-300, tint: each, makeups: x}]"} {
		f.Add([]byte(text))
	}
	f.Fuzz(func(t *testing.T, content []byte) {
		file, faults := readLimits("l.yaml", content)
		for _, x := range faults {
			if text := x.Error(); len(text) >= 1500 || !utf8.ValidString(text) || strings.ContainsFunc(text, unicode.IsControl) {
				t.Fatalf("a message of %d bytes: %.200q", len(text), text)
			}
		}
		for _, l := range file.Limits {
			if !l.Figure.Limitable() || !l.AtMost.Known && !l.AtLeast.Known || l.String() == "" || l.Origin() == "" {
				t.Fatalf("%+v", l)
			}
		}
		if len(faults) == 0 && len(file.Limits) == 0 {
			t.Fatal("neither limits nor faults")
		}
	})
}
