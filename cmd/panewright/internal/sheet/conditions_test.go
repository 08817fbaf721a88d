package sheet

// What stands under conditions on paper is what the JSON has, rounded; the rest of the sheet does not
// change by it.

import (
	"encoding/json"
	"fmt"
	"math"
	"slices"
	"strings"
	"testing"

	"panewright/cmd/panewright/internal/table"
	"panewright/glazing"
)

// conditioned is a project with conditions, one of which has no humidity, and make-ups with and without
// tints, a vacuum, and a pane of unknown emissivity. Its panes and conditions are invented.
func conditioned(t testing.TB, bases ...string) table.Report {
	t.Helper()
	shades, spectra := tints("clear", "mid", "full")
	spectra["flat.csv"] = flat(0.3, 0.1)
	r, _ := made(t, t.TempDir(), keys{"project": "Invented conditions", "basis": bases,
		"conditions": []keys{
			{"id": "january-night", "outside_c": -12, "inside_c": 20, "inside_rh": 0.45, "wind_m_s": 4},
			{"id": "july-noon", "outside_c": 34, "inside_c": 25, "wind_m_s": 2, "sun_w_m2": 750},
			{"id": "april", "outside_c": 12, "inside_c": 21, "inside_rh": 0.4, "sun_w_m2": 400},
		},
		"panes": []keys{
			{"id": "shade", "thickness_mm": 8, "emissivity_front": 0.837, "emissivity_back": 0.16, "tints": shades},
			{"id": "dark", "thickness_mm": 6, "spectrum": "flat.csv", "emissivity_front": 0.837, "emissivity_back": 0.837, "heat_treatment": "annealed"},
			{"id": "blank", "thickness_mm": 6, "spectrum": "flat.csv"},
		},
		"makeups": []keys{
			{"id": "D", "edge": keys{"temperature_factor": 0.62}, "outside_to_inside": []keys{pane("dark"), gap(16), turned("invented-low-e-6")}},
			{"id": "E", "outside_to_inside": []keys{pane("shade"), gap(16), turned("invented-low-e-6")}},
			{"id": "V", "outside_to_inside": []keys{pane("invented-low-e-4"), vacuum(), pane("soda-lime-4")}},
			{"id": "U", "outside_to_inside": []keys{pane("blank"), gap(16), pane("soda-lime-4")}},
		},
	}, spectra)
	return r
}

// balancePlaces are the decimals of the figures of a balance, written down apart from their list, and the
// columns of the schedule of conditions in their order.
var (
	balancePlaces = map[string]int{"u_w_m2k": 2, "g": 2, "absorptance": 2, "secondary_heat_inward": 2, "inward_flux_w_m2": 1, "surface_temperatures_c.#": 1,
		"inside_surface_c": 1, "hottest_c": 1, "hottest_pane": 0}
	balanceKeys = []string{"u_w_m2k", "g", "absorptance", "secondary_heat_inward", "inward_flux_w_m2", "inside_surface_c", "hottest_c", "hottest_pane"}
)

// balanceOf returns the balance under a condition in the JSON of a rating.
func balanceOf(rating map[string]any, condition string) map[string]any {
	for _, b := range rating["balances"].([]any) {
		if b := b.(map[string]any); b["condition"] == condition {
			return b
		}
	}
	return nil
}

// wantUnder returns how a figure of a balance is to be printed.
func wantUnder(t testing.TB, balance map[string]any, key string, place int) string {
	t.Helper()
	v, ok := at(balance, key, place).(json.Number)
	if sun := balance["sun_w_m2"].(json.Number); !ok || key == "absorptance" && sun == "0" {
		return "–"
	}
	places := balancePlaces[key]
	if f, _ := v.Float64(); places == 2 && key != "u_w_m2k" && f > -0.05 && f < 0.05 {
		places = 3 // a fraction
	}
	return strings.Replace(rounded(t, v.String(), places), "-", "−", 1)
}

// tableRows returns the rows of a table on pages, by its title: the texts of each line up to the next
// heading, from left to right; where there are none, nil.
func tableRows(t testing.TB, pages [][]placed, title string) (rows [][]string) {
	t.Helper()
	for _, texts := range pages {
		for _, head := range texts {
			if head.text != title || !head.bold {
				continue
			}
			end := bottom
			for _, x := range texts {
				if x.bold && x.size == head.size && x.base > head.base && x.box.X < head.box.X+half/2 && x.box.X > head.box.X-1 {
					end = min(end, x.base-1)
				}
			}
			var lines []float64
			for _, x := range texts {
				if x.base > head.base && x.base < end && x.box.X >= head.box.X-0.1 && x.box.X < head.box.X+2 {
					lines = append(lines, x.base)
				}
			}
			// a row may have a blank first cell
			for _, x := range texts {
				if x.base > head.base && x.base < end && x.box.X >= head.box.X-0.1 && !slices.ContainsFunc(lines, func(y float64) bool { return y-x.base < 0.3 && x.base-y < 0.3 }) {
					lines = append(lines, x.base)
				}
			}
			slices.Sort(lines)
			for _, y := range lines {
				rows = append(rows, rowOf(texts, placed{base: y, box: head.box})) // first cells apart
				for _, x := range texts {
					if x.base == y && x.box.X >= head.box.X-0.1 && x.box.X <= head.box.X+0.1 {
						rows[len(rows)-1] = append([]string{x.text}, rows[len(rows)-1]...)
					}
				}
			}
		}
	}
	return rows
}

// sheetPages returns the texts of the sheet of one make-up under one basis.
func sheetPages(t testing.TB, r table.Report, group []*glazing.Rating) (pages [][]placed) {
	t.Helper()
	p := &paper{r: r, full: map[string]bool{}}
	p.makeup(group, false)
	for _, c := range p.pages {
		texts, _ := onPage(t, c)
		pages = append(pages, texts)
	}
	return pages
}

// held reports whether a row begins a row of a table.
func held(rows [][]string, want []string) bool {
	return slices.ContainsFunc(rows, func(row []string) bool {
		return len(row) >= len(want) && slices.Equal(row[:len(want)], want)
	})
}

// Every row under conditions, of temperatures and of thermal stress is that of the JSON; tints that do
// not differ share one.
func TestUnderConditions(t *testing.T) {
	for _, basis := range []string{"en", "iso", "na", "iso15099"} {
		r := conditioned(t, basis)
		all := jsonFigures(t, r)
		ids := glazing.ConditionIDs(r.Ratings)
		first := 0
		for _, group := range groups(r) {
			ratings := all[first : first+len(group)]
			first += len(group)
			name := group[0].Makeup.ID + " under " + basis
			pages := sheetPages(t, r, group)
			check := func(title string, of func(rating map[string]any, id string) []string) {
				rows := tableRows(t, pages, title)
				for _, id := range ids {
					var tints, cells [][]string
					for i, rating := range ratings {
						cells = append(cells, of(rating, id))
						tints = append(tints, nil)
						if len(group) > 1 {
							tints[i] = []string{group[i].Tint}
						}
					}
					if len(group) > 1 && !slices.ContainsFunc(cells, func(c []string) bool { return !slices.Equal(c, cells[0]) }) {
						tints, cells = [][]string{{"each"}}, cells[:1]
					}
					for i := range cells {
						want := append(slices.Clone(tints[i]), cells[i]...)
						if i == 0 {
							want = append([]string{id}, want...)
						}
						if !held(rows, want) {
							t.Errorf("%s: no row of %q is %q; there are\n%q", name, title, want, rows)
						}
					}
				}
			}
			check("Under conditions", func(rating map[string]any, id string) (list []string) {
				for _, key := range balanceKeys {
					list = append(list, wantUnder(t, balanceOf(rating, id), key, 0))
				}
				return list
			})
			if group[0].Makeup.ID == "U" {
				for _, title := range []string{"Temperatures of surfaces, °C", "Thermal stress, a screening"} {
					if rows := tableRows(t, pages, title); rows != nil {
						t.Errorf("%s: nothing is known, and %q has %q", name, title, rows)
					}
				}
				continue
			}
			check("Temperatures of surfaces, °C", func(rating map[string]any, id string) (list []string) {
				for k := range 2 * len(group[0].Makeup.Panes) {
					list = append(list, wantUnder(t, balanceOf(rating, id), "surface_temperatures_c.#", k))
				}
				return list
			})
			checkStress(t, name, pages, group, ratings)
		}
	}
}

// checkStress checks the table of thermal stress of a sheet.
func checkStress(t *testing.T, name string, pages [][]placed, group []*glazing.Rating, ratings []map[string]any) {
	t.Helper()
	rows := tableRows(t, pages, "Thermal stress, a screening")
	for k, placed := range group[0].Makeup.Panes {
		var cells [][]string
		for _, rating := range ratings {
			s := rating["thermal_stress"].([]any)[k].(map[string]any)
			drop := strings.Replace(rounded(t, s["drop_k"].(json.Number).String(), 0), "-", "−", 1)
			cells = append(cells, []string{drop, rounded(t, s["guide_k"].(json.Number).String(), 0), s["against_guide"].(string), s["condition"].(string)})
		}
		same := !slices.ContainsFunc(cells, func(c []string) bool { return !slices.Equal(c, cells[0]) })
		for i, want := range cells {
			switch {
			case len(group) > 1 && same:
				want = append([]string{"each"}, want...)
			case len(group) > 1:
				want = append([]string{group[i].Tint}, want...)
			}
			if i == 0 {
				want = append([]string{fmt.Sprintf("%d %s", k+1, placed.Pane.ID)}, want...)
			}
			if !held(rows, want) {
				t.Errorf("%s: no row of thermal stress is %q; there are\n%q", name, want, rows)
			}
			if same {
				break
			}
		}
	}
}

// Moisture and comfort have a row for what is known in any condition, and none for what is not.
func TestConsequences(t *testing.T) {
	r := conditioned(t, "en")
	all := jsonFigures(t, r)
	places := map[string]int{"moisture.temperature_factor": 3, "moisture.condensing_rh": 2, "moisture.edge_temperature_c": 1, "comfort.asymmetry_k": 1, "comfort.downdraught_m_s": 2,
		"comfort.sun_radiant_rise_k": 1}
	words := map[string]string{"moisture.temperature_factor": "temperature factor of the room-side surface, without sun", "moisture.condensing_rh": "room humidity at which the room-side surface begins to condense, without sun",
		"moisture.edge_temperature_c": "room-side temperature at the edge, by the factor or ψ that was typed, °C", "comfort.asymmetry_k": "radiant asymmetry in front of the glass; below 0 where it is warm, K",
		"comfort.downdraught_m_s": "air speed near the floor by the cold glass, m/s", "comfort.sun_radiant_rise_k": "rise of the mean radiant temperature by the sun, K"}
	first := 0
	for _, group := range groups(r) {
		ratings := all[first : first+len(group)]
		first += len(group)
		lightest, darkest := extremes(group)
		var printed []string
		for _, texts := range sheetPages(t, r, group) {
			for _, x := range texts {
				printed = append(printed, x.text+"|"+strings.Join(rowOf(texts, x), "|"))
			}
		}
		for key, places := range places {
			var row []string
			known := false
			for _, id := range glazing.ConditionIDs(r.Ratings) {
				cell := func(of *glazing.Rating) string {
					v, ok := at(balanceOf(ratings[slices.Index(group, of)], id), key, 0).(json.Number)
					if !ok {
						return "–"
					}
					known = true
					if f, _ := v.Float64(); f > 1 && strings.HasSuffix(key, "_rh") {
						return "never" // no air is so humid
					}
					return strings.Replace(rounded(t, v.String(), places), "-", "−", 1)
				}
				s := cell(lightest)
				if other := cell(darkest); other != s {
					s += " → " + other
				}
				row = append(row, s)
			}
			want := strings.Join(row, "|")
			found := slices.ContainsFunc(printed, func(s string) bool {
				begin, rest, _ := strings.Cut(s, "|")
				return strings.HasPrefix(words[key], begin) && len(begin) > 12 && strings.HasPrefix(rest, want)
			})
			if found != known {
				t.Errorf("%s: %s is printed as %q: %v, known: %v", group[0].Makeup.ID, key, want, found, known)
			}
		}
	}
}

// Figures under conditions in the list of a report change nothing on paper.
func TestListedConditions(t *testing.T) {
	r := conditioned(t, "en", "na")
	read := func(r table.Report) string {
		var b strings.Builder
		for _, c := range projectPages(r, nil).pages {
			texts, _ := onPage(t, c)
			for _, x := range texts {
				fmt.Fprintf(&b, "%.3f %.3f %s\n", x.box.X, x.base, x.text)
			}
		}
		return b.String()
	}
	plain := read(r)
	r.Figures = append(slices.Clone(r.Figures), glazing.ConditionFigures(r.Ratings)...)
	if read(r) != plain {
		t.Error("the pages differ")
	}
}

// Under several bases the schedule says why figures differ, and in a file without one the last sheet; no
// other does. Under one basis there is nothing to say.
func TestBasesDifferOnPaper(t *testing.T) {
	for _, bases := range [][]string{{"en"}, {"en", "na"}} {
		r := conditioned(t, bases...)
		said := tight(strings.TrimPrefix(r.BasesDiffer(), differTitle+". "))
		if (said != "") != (len(bases) > 1) {
			t.Fatalf("%q: %q", bases, said)
		}
		p := &paper{r: r, full: map[string]bool{}}
		p.schedule()
		if printed := body(t, p.pages); strings.Contains(printed, tight(differTitle)) != (said != "") || !strings.Contains(printed, said) {
			t.Errorf("%q: the schedule does not say %q", bases, said)
		}
		for _, group := range groups(r) {
			p := &paper{r: r, full: map[string]bool{}}
			p.makeup(group, false)
			if printed := body(t, p.pages); strings.Contains(printed, tight(differTitle)) {
				t.Errorf("%q: the sheet of %s says why bases differ", bases, group[0].Makeup.ID)
			}
		}
		for _, part := range byMakeup(r) {
			want := 0
			if said != "" {
				want = 1
			}
			if printed := body(t, makeupPages(part).pages); strings.Count(printed, tight(differTitle)) != want || !strings.Contains(printed, said) {
				t.Errorf("%q: the file of %s does not say once %q", bases, part.Ratings[0].Makeup.ID, said)
			}
		}
	}
}

// Every condition that a sheet names is described on it.
func TestConditionsDescribed(t *testing.T) {
	r := conditioned(t, "en")
	for _, group := range groups(r) {
		p := &paper{r: r, full: map[string]bool{}}
		p.makeup(group, false)
		printed := body(t, p.pages)
		named := glazing.ConditionIDs(r.Ratings)
		for _, rating := range group {
			for _, s := range rating.Stress {
				named = append(named, s.Condition)
			}
		}
		for _, id := range named {
			if id != "" && !strings.Contains(printed, id+":outdoors") && !strings.Contains(printed, id+",screenedforthermalstress:outdoors") {
				t.Errorf("%s names %s and does not describe it", group[0].Makeup.ID, id)
			}
		}
	}
}

// A vacuum stands among panes and gaps with its pillars.
func TestVacuumListed(t *testing.T) {
	r := conditioned(t, "en")
	for _, group := range groups(r) {
		p := &paper{r: r, full: map[string]bool{}}
		p.makeup(group, false)
		want := tight("vacuum 0.1 Pa, pillars of radius 0.25 mm every 20 mm")
		if printed := strings.Replace(body(t, p.pages), "vacuum0.2", "vacuum", 1); strings.Contains(printed, want) != (group[0].Makeup.ID == "V") {
			t.Errorf("%s: a vacuum is listed: %v", group[0].Makeup.ID, group[0].Makeup.ID != "V")
		}
	}
}

// A row that begins a page names its condition and make-up again, and a result of limits its make-up.
func TestRowsThatBeginPages(t *testing.T) {
	var names []string
	for i := range 70 {
		names = append(names, fmt.Sprintf("t%d", i+1))
	}
	shades, spectra := tints(names...)
	r, c := made(t, t.TempDir(), keys{"project": "Long", "conditions": []keys{{"id": "noon", "outside_c": 30, "inside_c": 25, "sun_w_m2": 500}},
		"makeups": []keys{{"id": "many", "outside_to_inside": []keys{pane("dim"), gap(16), pane("soda-lime-4")}}},
		"panes":   []keys{{"id": "dim", "thickness_mm": 8, "emissivity_front": 0.837, "emissivity_back": 0.16, "tints": shades}},
		"limits":  []keys{{"figure": "u", "at_most": 1.2, "source": "invented"}},
	}, spectra)
	p := &paper{r: r, full: map[string]bool{}}
	p.schedule()
	p.limits(*c)
	began := 0
	for _, page := range p.pages {
		texts, _ := onPage(t, page)
		for _, x := range texts {
			if x.text != "noon" && x.text != "many" || math.Abs(x.box.X-left) > 0.01 || x.base > top+22 {
				continue
			}
			row := rowOf(texts, x)
			began++
			if x.text == "noon" && (len(row) < 2 || row[0] != "many" || !strings.HasPrefix(row[1], "t")) {
				t.Errorf("a page begins with %q %q", x.text, row)
			}
		}
	}
	if began < 3 {
		t.Errorf("%d pages begin within a table", began)
	}
}
