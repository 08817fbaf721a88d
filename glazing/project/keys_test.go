package project

import (
	"bytes"
	"encoding/json"
	"errors"
	"fmt"
	"io/fs"
	"os"
	"reflect"
	"slices"
	"strings"
	"testing"

	"github.com/santhosh-tekuri/jsonschema/v6"
	"go.yaml.in/yaml/v4"
)

// spectrumOf returns a spectrum file of constant columns, 300 to 2500 nm.
func spectrumOf(cells string) string {
	text := "wavelength_nm,tau,rho_front,rho_back\n"
	for nm := 300; nm < 780; nm += 10 {
		text += fmt.Sprintf("%d,%s\n", nm, cells)
	}
	for nm := 780; nm < 2500; nm += 50 {
		text += fmt.Sprintf("%d,%s\n", nm, cells)
	}
	return text + "2500," + cells + "\n"
}

// memory is a source of files that are not on a disk.
func memory(files map[string]string) source {
	return func(name string) ([]byte, error) {
		content, ok := files[name]
		if !ok {
			return nil, fmt.Errorf("open %s: %w", name, fs.ErrNotExist)
		}
		return []byte(content), nil
	}
}

// A spot is a key of a document: its place, and the kind of object it belongs to.
type spot struct {
	line, column int
	key          string
	object       reflect.Type
}

// document writes a project file from the spec types and keeps the place of each key.
type document struct {
	lines []string
	spots []spot
	count map[reflect.Type]int // objects written so far
}

// apart lists, for objects of which some keys exclude each other, the keys that each of several
// objects leaves out. Other types have one object.
var apart = map[reflect.Type][][]string{
	reflect.TypeFor[materialSpec](): {
		{"n", "k", "nk", "terms"},
		{"model", "carriers_cm3", "mobility_cm2_v_s", "resistivity_ohm_cm", "effective_mass", "eps_infinity", "terms", "nk"},
		{"model", "carriers_cm3", "mobility_cm2_v_s", "resistivity_ohm_cm", "effective_mass", "eps_infinity", "terms", "n", "k"},
		{"n", "k", "nk", "carriers_cm3"},
	},
	reflect.TypeFor[termSpec](): {
		{"strength", "energy_ev", "broadening_ev", "amplitude_ev", "gap_ev", "urbach_ev", "resonance_nm"},
		{"plasma_ev", "damping_ev", "amplitude_ev", "gap_ev", "urbach_ev", "resonance_nm"},
		{"plasma_ev", "damping_ev", "strength", "resonance_nm"},
		{"plasma_ev", "damping_ev", "energy_ev", "broadening_ev", "amplitude_ev", "gap_ev", "urbach_ev"},
	},
	reflect.TypeFor[paneSpec](): {
		{"plies", "spectra", "tints", "emissivity_normal_front", "emissivity_normal_back", "glass", "coatings"},
		{"thickness_mm", "conductivity_w_mk", "density_kg_m3", "spectrum", "tints", "emissivity_front", "emissivity_back", "glass", "coatings"},
		{"plies", "spectrum", "spectra", "emissivity_normal_front", "emissivity_normal_back", "glass", "coatings"},
		{"plies", "spectrum", "spectra", "tints", "emissivity_front", "emissivity_back", "emissivity_normal_front", "emissivity_normal_back", "origin"},
	},
	reflect.TypeFor[plySpec]():       {{"interlayer_mm"}, {"glass_mm"}},
	reflect.TypeFor[tintSpec]():      {{"spectra", "emissivity_normal_front", "emissivity_normal_back"}, {"spectrum", "emissivity_front", "emissivity_back"}},
	reflect.TypeFor[conditionSpec](): {{"outside_convection_w_m2k"}, {"wind_m_s"}},
	reflect.TypeFor[makeupSpec]():    {{}, {}}, // for either edge
	reflect.TypeFor[edgeSpec]():      {{"psi_w_mk"}, {"temperature_factor"}},
	reflect.TypeFor[elementSpec](): {
		{"gap_mm", "gas", "vacuum"}, {"pane", "turned", "tint", "vacuum"}, {"gap_mm", "gas", "vacuum", "tint"},
		{"pane", "turned", "tint", "gas"}, {"gap_mm", "gas", "vacuum", "tint"},
	},
}

// typedValues are the values of keys for which any number or text will not do.
var typedValues = map[string]string{
	"tau": "a.csv", "rho_front": "a.csv", "rho_back": "a.csv", "infrared_front": "ir.csv", "infrared_back": "ir.csv",
	"spectrum": "a.csv", "sun": "sun.csv", "nk": "nk.csv", "limits_file": "limits.yaml",
	"pane": "pane-3", "material": "material-1", "glass": "glass-1", "figure": "u", "makeups": "[makeup-1]", "condition": "condition-1",
	"thickness_mm": "4", "glass_mm": "4", "interlayer_mm": "0.76", "gap_mm": "16", "outside_c": "-10", "inside_c": "20",
	"pillar_pitch_mm": "20", "tau_ir": "0.02",
	// 1/(1e21 · 1.602e-19 · 40) = 1.560e-4 Ω·cm, and over 100 nm 15.60 Ω.
	"carriers_cm3": "1e21", "mobility_cm2_v_s": "40", "resistivity_ohm_cm": "1.560e-4", "sheet_resistance_ohm": "15.60", "thickness_nm": "100",
	"effective_mass": "0.35", "eps_infinity": "3.9", "energy_ev": "5", "gap_ev": "4",
}

// fieldsOf returns the fields of a spec type that are keys of the format.
func fieldsOf(t reflect.Type) []reflect.StructField {
	var out []reflect.StructField
	for f := range t.Fields() {
		if f.Tag.Get("key") != "" {
			out = append(out, f)
		}
	}
	return out
}

// namesOf returns the keys of a spec type.
func namesOf(t reflect.Type) []string {
	var out []string
	for _, f := range fieldsOf(t) {
		out = append(out, f.Tag.Get("key"))
	}
	return out
}

func (d *document) add(indent, key, value string, object reflect.Type) {
	if object != nil {
		d.spots = append(d.spots, spot{len(d.lines) + 1, len(indent) + 1, key, object})
	}
	d.lines = append(d.lines, strings.TrimRight(indent+key+": "+value, " "))
}

// object writes an object of a spec type; sibling counts those of its list from 0.
func (d *document) object(t reflect.Type, first, indent string, sibling int) {
	d.count[t]++
	id := d.count[t]
	var left []string
	if variants := apart[t]; variants != nil {
		left = variants[sibling]
	}
	name := strings.TrimSuffix(strings.ToLower(t.Name()), "spec")
	for _, f := range fieldsOf(t) {
		key := f.Tag.Get("key")
		if slices.Contains(left, key) {
			continue
		}
		start := indent
		if first != "" {
			start, first = first, ""
		}
		value := ""
		if f.Type.Kind() != reflect.Slice {
			value = typedValues[key]
		}
		switch {
		case key == "id":
			value = fmt.Sprintf("%s-%d", name, id)
		case key == "tint" && t == reflect.TypeFor[tintSpec]():
			value = fmt.Sprintf("state-%d", id)
		case key == "tint" && t == reflect.TypeFor[elementSpec]():
			value = "state-1"
		case value != "":
		case key == "kind": // of a term, each in turn
			value = strings.Fields(f.Tag.Get("one"))[sibling]
		case key == "model" && sibling > 0:
			value = "oscillators"
		case f.Tag.Get("one") != "" && f.Type.Kind() != reflect.Map:
			value = strings.Fields(f.Tag.Get("one"))[0]
		case f.Type == reflect.TypeFor[number]():
			value = within(f.Tag)
		case f.Type == reflect.TypeFor[flag]():
			value = "true"
		case f.Type == reflect.TypeFor[text]():
			value = "some words"
		}
		d.add(start, key, value, t)
		deeper := indent + "  "
		switch {
		case value != "":
		case f.Type.Kind() == reflect.Slice:
			for n := range max(1, len(apart[f.Type.Elem()])) {
				d.object(f.Type.Elem(), deeper+"- ", deeper+"  ", n)
			}
		case f.Type.Kind() == reflect.Pointer:
			of := f.Type.Elem()
			d.object(of, "", deeper, d.count[of]%max(1, len(apart[of])))
		case key == "gas":
			d.add(deeper, "air", "1", nil)
		case f.Type.Kind() == reflect.Map:
			switch f.Type.Elem() {
			case reflect.TypeFor[number](), reflect.TypeFor[text]():
				d.add(deeper, "words", "38", nil)
			default:
				d.add(deeper, strings.Fields(f.Tag.Get("one"))[0], "", nil)
				d.object(f.Type.Elem(), "", deeper+"  ", 0)
			}
		default:
			panic("no value for " + key)
		}
	}
}

// within returns a number that the bounds of a key allow.
func within(tag reflect.StructTag) string {
	for _, v := range []float64{0.5, 1, 5, 50} {
		above, from, below, upto := bound(tag, "above"), bound(tag, "from"), bound(tag, "below"), bound(tag, "upto")
		if (above == nil || v > *above) && (from == nil || v >= *from) && (below == nil || v < *below) && (upto == nil || v <= *upto) {
			return short(v)
		}
	}
	panic("no number is within the bounds of " + string(tag))
}

func (d *document) text() string { return strings.Join(d.lines, "\n") + "\n" }

// misspelt returns the document with one key replaced.
func (d *document) misspelt(s spot, wrong string) string {
	lines := slices.Clone(d.lines)
	line := lines[s.line-1]
	lines[s.line-1] = line[:s.column-1] + wrong + line[s.column-1+len(s.key):]
	return strings.Join(lines, "\n") + "\n"
}

// completeOf is a document in which every key of a spec type, and of those within it, occurs.
func completeOf(t reflect.Type) *document {
	d := &document{count: map[reflect.Type]int{}}
	d.object(t, "", "", 0)
	return d
}

// complete is a project in which every key of the key table occurs.
func complete() *document { return completeOf(reflect.TypeFor[fileSpec]()) }

// completeLimits is such a limits file.
func completeLimits() *document { return completeOf(reflect.TypeFor[limitsFileSpec]()) }

func completeFiles() source {
	infrared := "wavelength_um,rho_front,rho_back\n"
	for um := 5; um <= 50; um++ {
		infrared += fmt.Sprintf("%d,0.1,0.9\n", um)
	}
	sun := "wavelength_nm,irradiance\n"
	for nm := 300; nm <= 2500; nm += 200 {
		sun += fmt.Sprintf("%d,1\n", nm)
	}
	return memory(map[string]string{"a.csv": spectrumOf("0.7,0.2,0.1"), "ir.csv": infrared, "sun.csv": sun,
		"nk.csv": "wavelength_um,n,k\n0.3,1.5,0\n60,1.5,0.01\n", "limits.yaml": completeLimits().text()})
}

// misspellings returns a key with one letter dropped, doubled, swapped with the next, or replaced.
func misspellings(key string) []string {
	seen := map[string]bool{key: true, "": true}
	var out []string
	for i := range key {
		swapped := key
		if i+1 < len(key) {
			swapped = key[:i] + key[i+1:i+2] + key[i:i+1] + key[i+2:]
		}
		for _, wrong := range []string{key[:i] + key[i+1:], key[:i+1] + key[i:], swapped, key[:i] + "q" + key[i+1:]} {
			if !seen[wrong] {
				seen[wrong] = true
				out = append(out, wrong)
			}
		}
	}
	return out
}

// faultsOf reads a project and returns its faults.
func faultsOf(text string, from source) Errors {
	_, err := read("p.yaml", []byte(text), from)
	var faults Errors
	if err != nil && !errors.As(err, &faults) {
		panic(err)
	}
	return faults
}

// Every key of the format, misspelt by a letter, is reported where it stands, with the right key
// on offer, and nothing is said to be missing for it. Neither does the schema let it pass.
func TestEveryKeyMisspelt(t *testing.T) {
	d := complete()
	from := completeFiles()
	for _, f := range faultsOf(d.text(), from) {
		t.Errorf("the complete document has a fault: %v", f)
	}
	compiled := compileSchema(t)
	if err := compiled.Validate(jsonValue(t, d.text())); err != nil {
		t.Errorf("the schema refuses the complete document: %v", err)
	}
	if t.Failed() {
		t.Fatal(d.text())
	}
	misspellEach(t, d, reflect.TypeFor[fileSpec](), func(text string) Errors { return faultsOf(text, from) }, func(text string) bool {
		return compiled.Validate(jsonValue(t, text)) == nil
	})
}

// The same of a limits file, which has no schema of its own.
func TestEveryKeyOfLimitsMisspelt(t *testing.T) {
	d := completeLimits()
	if faults := limitsFaults(d.text()); len(faults) > 0 {
		t.Fatalf("%v\n%s", faults, d.text())
	}
	misspellEach(t, d, reflect.TypeFor[limitsFileSpec](), limitsFaults, func(string) bool { return false })
}

// misspellEach misspells each key of a complete document of a type.
func misspellEach(t *testing.T, d *document, of reflect.Type, faultsOf func(string) Errors, valid func(string) bool) {
	t.Helper()
	used := map[string]bool{}
	for _, s := range d.spots {
		used[s.object.Name()+"."+s.key] = true
	}
	for _, of := range specTypes(of, nil) {
		for _, f := range fieldsOf(of) {
			if !used[of.Name()+"."+f.Tag.Get("key")] {
				t.Errorf("the complete document lacks %s of %s", f.Tag.Get("key"), called(of))
			}
		}
	}
	before := map[string]bool{}
	for _, f := range faultsOf(d.text()) {
		before[textOf(f)] = true
	}
	count := 0
	tried := map[string]bool{}
	for _, s := range d.spots {
		names := namesOf(s.object)
		wrongs := slices.DeleteFunc(misspellings(s.key), func(w string) bool { return slices.Contains(names, w) })
		if len(wrongs) == 0 {
			t.Errorf("no misspelling of %q was tried", s.key)
		}
		if name := s.object.Name() + "." + s.key; testing.Short() || tried[name] {
			wrongs = wrongs[:min(4, len(wrongs))]
		} else {
			tried[name] = true // in full once, elsewhere in part
		}
		for _, wrong := range wrongs {
			count++
			text := d.misspelt(s, wrong)
			found := false
			for _, f := range faultsOf(text) {
				p, ok := errors.AsType[*Problem](f)
				switch {
				case ok && p.Key == s.key && strings.Contains(p.Text, "is missing"):
					t.Errorf("%s misspelt as %s: %v", s.key, wrong, f)
				case ok && p.Line == s.line && p.Column == s.column && p.Key == wrong:
					_, offer, _ := strings.Cut(p.Text, "did you mean ")
					if !slices.Contains(strings.Split(strings.TrimSuffix(offer, "?"), " or "), s.key) {
						t.Errorf("%s misspelt as %s: the right key is not offered: %v", s.key, wrong, f)
					}
					found = true
				case !before[textOf(f)]:
					t.Errorf("%s misspelt as %s: a fault that only follows from it: %v", s.key, wrong, f)
				}
			}
			if !found {
				t.Errorf("%s misspelt as %s in line %d, column %d: not reported there, but: %v", s.key, wrong, s.line, s.column, faultsOf(text))
			}
			if valid(text) {
				t.Errorf("the schema accepts %s for %s in %s", wrong, s.key, called(s.object))
			}
		}
	}
	if count < 2*len(d.spots) {
		t.Errorf("%d misspellings of %d keys tried", count, len(d.spots))
	}
}

// limitsFaults reads a limits file and returns its faults.
func limitsFaults(text string) Errors {
	_, faults := readLimits("l.yaml", []byte(text))
	return faults
}

// textOf returns a fault without its place.
func textOf(err error) string {
	if p, ok := errors.AsType[*Problem](err); ok {
		return p.Key + ": " + p.Text
	}
	return err.Error()
}

// specTypes returns the struct types that have keys, from one downwards.
func specTypes(t reflect.Type, found []reflect.Type) []reflect.Type {
	for t.Kind() == reflect.Pointer || t.Kind() == reflect.Slice || t.Kind() == reflect.Map {
		t = t.Elem()
	}
	if t.Kind() != reflect.Struct || len(fieldsOf(t)) == 0 || slices.Contains(found, t) {
		return found
	}
	found = append(found, t)
	for _, f := range fieldsOf(t) {
		found = specTypes(f.Type, found)
	}
	return found
}

func compileSchema(t *testing.T) *jsonschema.Schema {
	t.Helper()
	value, err := jsonschema.UnmarshalJSON(bytes.NewReader(Schema()))
	if err != nil {
		t.Fatal(err)
	}
	c := jsonschema.NewCompiler()
	if err := c.AddResource("project.json", value); err != nil {
		t.Fatal(err)
	}
	compiled, err := c.Compile("project.json")
	if err != nil {
		t.Fatal(err)
	}
	return compiled
}

// jsonValue turns YAML into the values that JSON has.
func jsonValue(t *testing.T, text string) any {
	t.Helper()
	var v any
	if err := yaml.Load([]byte(text), &v); err != nil {
		t.Fatal(err)
	}
	encoded, err := json.Marshal(v)
	if err != nil {
		t.Fatal(err)
	}
	value, err := jsonschema.UnmarshalJSON(bytes.NewReader(encoded))
	if err != nil {
		t.Fatal(err)
	}
	return value
}

const demoFolder = "../../cmd/panewright/internal/demo/files"

func TestSchemaAcceptsDemo(t *testing.T) {
	content, err := os.ReadFile(demoFolder + "/project.yaml")
	if err != nil {
		t.Fatal(err)
	}
	compiled := compileSchema(t)
	if err := compiled.Validate(jsonValue(t, string(content))); err != nil {
		t.Error(err)
	}
	for _, change := range [][2]string{
		{"thickness_mm: 6", "thickness_mm: 0"},
		{"thickness_mm: 6", "thickness_mm: thick"},
		{"thickness_mm: 6", "thickness_mm: 201"},
		{"emissivity_front: 0.837", "emissivity_front: 1.1"},
		{"heat_soaked: true", "heat_soaked: 1"},
		{"heat_treatment: toughened", "heat_treatment: tempered"},
		{"basis: en", "basis: din"},
		{"basis: en", "basis: []"},
		{"argon: 0.90", "argon: 1.9"},
		{"tilt_deg: 30", "tilt_deg: -1"},
		{"id: mill-clear-6", "id: -mill"},
		{"id: mill-clear-6", "id: mill clear"},
		{"project: Heron", "title: Heron"},
		{"outside_to_inside:", "typed: {acoustic: [1]}\n    outside_to_inside:"},
	} {
		text := strings.Replace(string(content), change[0], change[1], 1)
		if text == string(content) {
			t.Fatalf("the demo has no %q", change[0])
		}
		if compiled.Validate(jsonValue(t, text)) == nil {
			t.Errorf("the schema accepts %q", change[1])
		}
		from, done := folder(demoFolder, false)
		if faults := faultsOf(text, from); len(faults) == 0 {
			t.Errorf("the reader accepts %q", change[1])
		}
		done()
	}
	if _, err := Load(demoFolder+"/project.yaml", Access{}); err != nil {
		t.Error(err)
	}
}
