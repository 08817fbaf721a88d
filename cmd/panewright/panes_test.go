package main

import (
	"fmt"
	"math"
	"os"
	"path/filepath"
	"regexp"
	"strings"
	"testing"

	"panewright/cmd/panewright/internal/demo"
	"panewright/glazing"
	"panewright/glazing/library"
	"panewright/glazing/project"
)

// keyOfComment finds the keys that an exported spectrum asks to be added to its pane.
var keyOfComment = regexp.MustCompile(`(?m)^# add to the pane: (\w+: [\w.]+)`)

// A pane that is written as CSV and read back by a project rates the same to the last bit: every
// built-in pane, and every pane of the demo.
func TestPaneToCSVAndBack(t *testing.T) {
	dir := t.TempDir()
	file, err := demo.Write(filepath.Join(dir, "demo"))
	if err != nil {
		t.Fatal(err)
	}
	mill, err := project.Load(file, project.Access{})
	if err != nil {
		t.Fatal(err)
	}
	load := func(text string) *project.Project {
		t.Helper()
		path := filepath.Join(dir, "p.yaml")
		if err := os.WriteFile(path, []byte(text), 0o644); err != nil {
			t.Fatal(err)
		}
		p, err := project.Load(path, project.Access{})
		if err != nil {
			t.Fatalf("%v\n%s", err, text)
		}
		return p
	}
	panes := mill.Panes
	for _, id := range library.IDs() {
		panes = append(panes, library.Pane(id))
	}
	for _, pane := range panes {
		for tint := range pane.Tints {
			content, err := paneCSV(pane, tint, nil)
			if err != nil {
				t.Fatal(err)
			}
			if err := os.WriteFile(filepath.Join(dir, "pane.csv"), content, 0o644); err != nil {
				t.Fatal(err)
			}
			text := "project: x\npanes:\n  - id: back\n    spectrum: pane.csv\n"
			if len(pane.Plies) > 1 {
				text += "    plies:\n"
			}
			for _, y := range pane.Plies {
				if len(pane.Plies) == 1 {
					break // the comment says how thick it is
				}
				kind := "glass_mm"
				if y.Interlayer {
					kind = "interlayer_mm"
				}
				text += fmt.Sprintf("      - {%s: %v, conductivity_w_mk: %v, density_kg_m3: %v}\n", kind, y.ThicknessMM, y.ConductivityWMK, y.DensityKGM3)
			}
			for _, key := range keyOfComment.FindAllStringSubmatch(string(content), -1) {
				text += "    " + key[1] + "\n"
			}
			back := load(text).Panes[0]
			if back.Origin != pane.Origin {
				t.Errorf("%s: %s became %s", pane.ID, pane.Origin, back.Origin)
			}
			for _, b := range []glazing.Basis{glazing.EN, glazing.ISO, glazing.NA} {
				in := func(p *glazing.Pane, name string) *glazing.Rating {
					ratings, err := glazing.Rate(&glazing.Makeup{ID: "A", Panes: []glazing.Placed{{Pane: p, Tint: name}, {Pane: p, Tint: name, Turned: true}},
						Gaps: []glazing.Gap{{WidthMM: 14, Gas: mill.Makeups[0].Gaps[0].Gas}}}, b)
					if err != nil {
						t.Fatal(err)
					}
					return &ratings[0]
				}
				want, got := in(pane, pane.Tints[tint].Name), in(back, "")
				for _, f := range glazing.Figures() {
					if f.Text != nil || strings.Contains(f.Key, "emissivity_") { // of which a typed emissivity says less
						continue
					}
					for k := range f.Count(want) {
						x, y := f.Value(want, k), f.Value(got, k)
						if x.Known != y.Known || math.Float64bits(x.Number) != math.Float64bits(y.Number) {
							t.Errorf("%s %s, %s, %s: %v became %v", pane.ID, pane.Tints[tint].Name, b.Name, f.Key, x, y)
						}
					}
				}
			}
		}
	}
}
