package table

import (
	"bytes"
	"encoding/csv"
	"encoding/json"
	"fmt"
	"math"
	"regexp"
	"slices"
	"strconv"
	"strings"
	"testing"

	"panewright/glazing"
	"panewright/glazing/film"
	"panewright/glazing/library"
	"panewright/glazing/project"
)

// filmPage is the page of a pane of soda-lime glass with films.
func filmPage(t *testing.T, front, back []film.Film) FilmPage {
	t.Helper()
	glass, _ := film.Glass("soda-lime")
	c := film.Coated{Glass: glass, ThicknessMM: 6, Front: front, Back: back}
	pane := library.Coated("bench", c)
	ready, err := glazing.NewMethod(glazing.EN, glazing.Options{}).Ready(&glazing.Makeup{ID: pane.ID, Panes: []glazing.Placed{{Pane: pane}}})
	if err != nil {
		t.Fatal(err)
	}
	ratings, err := ready.RateAll()
	if err != nil {
		t.Fatal(err)
	}
	p := FilmPage{Report: Report{Version: "test", Project: &project.Project{Title: "bench"}, Figures: glazing.Figures(), Ratings: ratings},
		Pane: pane, Stack: c, Polarisation: "mean", NM: []float64{380, 550, 10200},
		Emissivity: [2]glazing.Emissivity{pane.Tints[0].Front, pane.Tints[0].Back}, Angles: []Incidence{{0, &ratings[0]}}}
	for _, nm := range p.NM {
		s, m := c.At(nm, 0)
		p.Light = append(p.Light, film.Unpolarised(s, m))
	}
	return p
}

// filmNamed is a film of a built-in material under another id.
func filmNamed(t *testing.T, material, id string, nm float64) film.Film {
	t.Helper()
	m, ok := film.MaterialNamed(material)
	if !ok {
		t.Fatalf("there is no material %s", material)
	}
	named := *m
	named.ID = id
	return film.Film{Material: &named, ThicknessNM: nm}
}

// No line is wider than the page, whatever the films are called and however many there are; each has its row
// and its column.
func TestFilmIsNarrow(t *testing.T) {
	var many []film.Film
	for i := range 30 {
		many = append(many, filmNamed(t, []string{"silica", "titania"}[i%2], fmt.Sprintf("a-material-with-a-very-long-name-indeed-it-is-%d", i), 12.3456+float64(i)))
	}
	for _, p := range []FilmPage{
		filmPage(t, many, []film.Film{filmNamed(t, "ito", strings.Repeat("ß", 64), 150), filmNamed(t, "silver", "silver", 12)}),
		filmPage(t, nil, []film.Film{filmNamed(t, "ito", "ito", 150)}),
		filmPage(t, nil, nil),
	} {
		out := string(Film(p))
		for line := range strings.Lines(out) {
			if n := width(strings.TrimRight(line, "\n")); n > Width {
				t.Errorf("%d columns: %s", n, line)
			}
		}
		films := len(p.Stack.Front) + len(p.Stack.Back)
		for i := range films {
			if !regexp.MustCompile(fmt.Sprintf(`\n%d +(front|back) `, i+1)).MatchString(out) || !regexp.MustCompile(fmt.Sprintf(`α %d\b`, i+1)).MatchString(out) {
				t.Errorf("film %d of %d has no row or no column", i+1, films)
			}
		}
		if conducts := strings.Contains(out, "thin sheet"); conducts != (films > 0) {
			t.Errorf("with %d films the page names the rule of thin sheets: %v", films, conducts)
		}
		for _, want := range []string{"Emissivity at 283 K", "at normal incidence", "corrected", "licensed practitioners"} {
			if !strings.Contains(out, want) {
				t.Errorf("with %d films the page lacks %q", films, want)
			}
		}
	}
}

// The warning stands under the short rules where they do not hold, and only there: not for a film of few slow
// carriers that is far thinner than the skin depth.
func TestFilmDoubts(t *testing.T) {
	slow := film.Carriers{DensityCM3: 1e20, MobilityCM2VS: 5, EffectiveMass: 0.3, EpsInf: 4}
	thin := film.Film{ThicknessNM: 20, Material: &film.Material{ID: "slow", FromNM: 300, ToNM: 50000, Carriers: &slow,
		Model: film.Oxide(slow, nil, false), Indium: math.NaN(), Silver: math.NaN()}}
	if out := string(Film(filmPage(t, nil, []film.Film{thin}))); strings.Contains(out, "\n! ") {
		t.Errorf("ωτ = 1240/10000 eV over 0.77 eV of damping is 0.16, and yet the page warns:\n%s", out)
	}
	out := string(Film(filmPage(t, nil, []film.Film{filmNamed(t, "silver", "silver", 50)})))
	if n := strings.Count(out, "\n! 1 silver: "); n != 2 {
		t.Errorf("a film of silver thicker than the skin depth (22 nm, handbooks) gets %d warnings, want 2:\n%s", n, out)
	}
}

// CSV has a row a wavelength and the digits of JSON.
func TestFilmCSV(t *testing.T) {
	p := filmPage(t, []film.Film{filmNamed(t, "silica", "silica", 90)}, []film.Film{filmNamed(t, "ito", "ito", 150)})
	out, err := FilmCSV(p, CSVForm{Separator: ';'})
	if err != nil {
		t.Fatal(err)
	}
	r := csv.NewReader(bytes.NewReader(out))
	r.Comma = ';'
	rows, err := r.ReadAll()
	if err != nil {
		t.Fatal(err)
	}
	want := []string{"wavelength_nm", "tau", "rho_front", "rho_back",
		"glass.absorptance_front", "films.1.silica.absorptance_front", "films.2.ito.absorptance_front",
		"glass.absorptance_back", "films.1.silica.absorptance_back", "films.2.ito.absorptance_back"}
	if !slices.Equal(rows[0], want) || len(rows) != 1+len(p.NM) {
		t.Fatalf("%d rows under %q", len(rows), rows[0])
	}
	var doc struct {
		Tau   []float64 `json:"tau"`
		Films []struct {
			Back []float64 `json:"absorptance_back"`
		} `json:"films"`
	}
	if err := json.Unmarshal(FilmJSON(p), &doc); err != nil {
		t.Fatal(err)
	}
	for i, row := range rows[1:] {
		number := func(k int) float64 { v, _ := strconv.ParseFloat(row[k], 64); return v }
		if number(0) != p.NM[i] || number(1) != doc.Tau[i] || number(9) != doc.Films[1].Back[i] {
			t.Errorf("row %d is %q; JSON has τ %v, α %v", i+1, row, doc.Tau[i], doc.Films[1].Back[i])
		}
		sum, back := number(1)+number(2)+number(4)+number(5)+number(6), number(1)+number(3)+number(7)+number(8)+number(9)
		if math.Abs(sum-1) > 1e-12 || math.Abs(back-1) > 1e-12 {
			t.Errorf("row %d adds up to %v and %v", i+1, sum, back)
		}
	}
}

// The keys of the contract are there, in JSON that says null and [] where there is nothing.
func TestFilmKeys(t *testing.T) {
	var doc map[string]any
	if err := json.Unmarshal(FilmJSON(filmPage(t, nil, nil)), &doc); err != nil {
		t.Fatal(err)
	}
	for _, key := range []string{"wavelength_nm", "tau", "rho_front", "rho_back", "sheet_resistance_ohm", "screened_plasma_wavelength_nm",
		"emissivity_normal", "emissivity", "emissivity_hemispherical", "indium_g_m2", "faces", "films", "cautions"} {
		if _, ok := doc[key]; !ok {
			t.Errorf("there is no key %s", key)
		}
	}
	if v, ok := doc["films"].([]any); !ok || len(v) > 0 || doc["sheet_resistance_ohm"] != nil {
		t.Errorf("without films: films %v, sheet resistance %v", doc["films"], doc["sheet_resistance_ohm"])
	}
	if err := json.Unmarshal(FilmJSON(filmPage(t, nil, []film.Film{filmNamed(t, "ito", "ito", 150)})), &doc); err != nil {
		t.Fatal(err)
	}
	of := doc["films"].([]any)[0].(map[string]any)
	for _, key := range []string{"face", "material", "thickness_nm", "sheet_resistance_ohm", "screened_plasma_wavelength_nm"} {
		if of[key] == nil {
			t.Errorf("a conducting film has no %s", key)
		}
	}
	if of["face"] != "back" || of["material"] != "ito" || of["thickness_nm"] != 150.0 {
		t.Errorf("the film is %v", of)
	}
}
