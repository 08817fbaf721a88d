package sheet

// What is printed is what is computed: figures, cautions, results of limits and of checks.

import (
	"encoding/json"
	"fmt"
	"math"
	"math/big"
	"runtime"
	"slices"
	"strconv"
	"strings"
	"testing"

	"panewright/cmd/panewright/internal/draw"
	"panewright/cmd/panewright/internal/table"
	"panewright/glazing"
	"panewright/glazing/proof"
	"panewright/reference/checks"
)

// verified is what verify prints on this machine.
func verified(t testing.TB) table.Verification {
	t.Helper()
	return table.Verification{Version: testVersion, Go: runtime.Version(), System: runtime.GOOS, Architecture: runtime.GOARCH, Groups: proof.Run(checks.Groups())}
}

// rounded rounds the decimal text of a number half away from zero, in decimal arithmetic; a rounded
// zero has no sign.
func rounded(t testing.TB, text string, places int) string {
	t.Helper()
	v, ok := new(big.Rat).SetString(text)
	if !ok {
		t.Fatalf("%q is no number", text)
	}
	s := v.FloatString(places) // rounds half away from zero
	if strings.Trim(s, "-0.") == "" {
		s = strings.TrimPrefix(s, "-")
	}
	return s
}

// placesOf returns the decimals with which a figure is printed, written down apart from the list of
// figures: U to one decimal (EN 673, 10292), fractions to two, and to three below 0.05, coefficients to
// one, Ra to none.
func placesOf(t testing.TB, key, text string) int {
	t.Helper()
	v, _ := new(big.Rat).SetString(text)
	value, _ := v.Float64()
	switch {
	case key == "u_w_m2k", strings.Contains(key, "coefficient_w_m2k"), strings.HasPrefix(key, "colour.") && key != "colour.ra":
		return 1
	case key == "colour.ra":
		return 0
	case key == "solar.light_to_solar_gain":
		return 2
	case strings.HasPrefix(key, "surfaces."), math.Abs(value) < 0.05:
		return 3
	}
	return 2
}

// jsonFigures returns the figures of ratings in the JSON of a report, as they are written there.
func jsonFigures(t testing.TB, r table.Report) (ratings []map[string]any) {
	t.Helper()
	d := json.NewDecoder(strings.NewReader(string(table.JSON(r))))
	d.UseNumber()
	var doc struct{ Ratings []map[string]any }
	if err := d.Decode(&doc); err != nil {
		t.Fatal(err)
	}
	return doc.Ratings
}

// at returns what stands at a path, with the number of a place from 0 where the path has "#".
func at(tree any, path string, place int) any {
	for key := range strings.SplitSeq(path, ".") {
		switch x := tree.(type) {
		case map[string]any:
			tree = x[key]
		case []any:
			tree = x[place]
		}
	}
	return tree
}

// want returns how a figure of the JSON is to be printed.
func want(t testing.TB, rating map[string]any, key string, place int) string {
	t.Helper()
	switch v := at(rating, key, place).(type) {
	case json.Number:
		return rounded(t, v.String(), placesOf(t, key, v.String()))
	case nil:
		return "–"
	default:
		t.Fatalf("%s is %v", key, v)
		return ""
	}
}

// rowOf returns the texts that stand on the line of a text, from left to right, right of it.
func rowOf(texts []placed, first placed) (row []string) {
	var right []placed
	for _, x := range texts {
		if math.Abs(x.base-first.base) < 0.3 && x.box.X > first.box.X {
			right = append(right, x)
		}
	}
	slices.SortFunc(right, func(a, b placed) int { return int(math.Copysign(1, a.box.X-b.box.X)) })
	for _, x := range right {
		row = append(row, x.text)
	}
	return row
}

// sheetFigures are the keys of the figures in the table of a sheet, and the words that begin their
// rows.
var sheetFigures = []struct{ key, words string }{
	{"light.transmittance", "light transmittance"},
	{"light.reflectance_outside", "light reflectance, outside"},
	{"light.reflectance_inside", "light reflectance, inside"},
	{"solar.transmittance", "solar direct transmittance"},
	{"solar.reflectance_outside", "solar direct reflectance, outside"},
	{"solar.reflectance_inside", "solar direct reflectance, inside"},
	{"solar.absorptance.#", "solar absorptance, pane #"},
	{"solar.secondary_heat_inward", "secondary heat towards the inside"},
	{"solar.g", "total solar energy transmittance τe + qi"},
	{"solar.shading_coefficient", "shading coefficient g/0.87"},
	{"solar.light_to_solar_gain", "light to solar gain"},
	{"uv.transmittance", "ultraviolet transmittance, 300-380 nm"},
	{"uv.damage_weighted", "damage-weighted transmittance, 300-600 nm"},
	{"uv.damage_weighted_700", "damage-weighted transmittance, 300-700 nm"},
	{"uv.skin_weighted", "skin-weighted transmittance, 300-400 nm"},
	{"colour.ra", "general colour rendering index"},
	{"outside.coefficient_w_m2k", "outside surface coefficient, W/(m²·K)"},
	{"inside.coefficient_w_m2k", "inside surface coefficient, W/(m²·K)"},
	{"u_w_m2k", "U-value of the centre of the glass, W/(m²·K)"},
}

// Every figure of a sheet is that of the JSON, rounded by its rule.
func TestSheetFigures(t *testing.T) {
	for _, read := range projects() {
		r, _ := read(t)
		all := jsonFigures(t, r)
		first := 0
		for _, group := range groups(r) {
			ratings := all[first : first+len(group)]
			first += len(group)
			if group[0].Method.Basis.Name == "na" {
				continue // has decimals of its own
			}
			part := r
			part.Ratings = nil
			for _, rating := range group {
				part.Ratings = append(part.Ratings, *rating)
			}
			var pages [][]placed
			for _, c := range makeupPages(part).pages {
				texts, _ := onPage(t, c)
				pages = append(pages, texts)
			}
			name := group[0].Makeup.ID + " under " + group[0].Method.Basis.Name
			for _, f := range sheetFigures {
				for place := range count(f.key, group[0]) {
					words := strings.ReplaceAll(f.words, "#", fmt.Sprint(place+1))
					var printed []string
					for _, texts := range pages {
						for _, x := range texts {
							if x.text == words && x.box.X > left+5 { // a row, and no label below a large figure
								for _, s := range rowOf(texts, x) {
									if s[0] >= '0' && s[0] <= '9' || s == "–" {
										printed = append(printed, s)
									}
								}
							}
						}
					}
					var expected []string
					for _, rating := range ratings {
						expected = append(expected, want(t, rating, f.key, place))
					}
					if !slices.Equal(printed, expected) {
						t.Errorf("%s: %s is printed as %q, want %q", name, words, printed, expected)
					}
				}
			}
			checkHeadline(t, name, pages[0], ratings, group)
			checkColours(t, name, slices.Concat(pages...), ratings)
		}
	}
}

func count(key string, r *glazing.Rating) int {
	if strings.Contains(key, "#") {
		return len(r.Makeup.Panes)
	}
	return 1
}

// checkHeadline checks the large figures.
func checkHeadline(t *testing.T, name string, texts []placed, ratings []map[string]any, group []*glazing.Rating) {
	t.Helper()
	lightest, darkest := extremes(group)
	var printed, expected []string
	for _, x := range texts {
		if x.bold && x.size > 8*25.4/72 && x.box.Y > top+8 && x.base < 90 && strings.Trim(x.text, "0123456789.–→ ") == "" && x.text != "1" {
			printed = append(printed, x.text)
		}
	}
	for _, key := range []string{"u_w_m2k", "solar.g", "light.transmittance", "light.reflectance_outside", "colour.ra"} {
		s := want(t, ratings[slices.Index(group, lightest)], key, 0)
		if other := want(t, ratings[slices.Index(group, darkest)], key, 0); other != s {
			s += " → " + other
		}
		expected = append(expected, s)
	}
	if !slices.Equal(printed, expected) {
		t.Errorf("%s: the large figures are %q, want %q", name, printed, expected)
	}
}

// checkColours checks L*, a* and b* of each tint.
func checkColours(t *testing.T, name string, texts []placed, ratings []map[string]any) {
	t.Helper()
	var printed []string
	for _, x := range texts {
		if strings.Contains(x.text, ".") && strings.Trim(x.text, "−0123456789.") == "" || x.text == "–" {
			printed = append(printed, strings.ReplaceAll(x.text, "−", "-"))
		}
	}
	for _, rating := range ratings {
		for _, of := range []string{"transmitted", "reflected_outside", "reflected_inside"} {
			var expected []string
			for _, axis := range []string{"l", "a", "b"} {
				expected = append(expected, want(t, rating, "colour."+of+"."+axis, 0))
			}
			found := false
			for i := 0; i+3 <= len(printed); i++ {
				found = found || slices.Equal(printed[i:i+3], expected)
			}
			if !found {
				t.Errorf("%s: no colour is printed as %q", name, expected)
			}
		}
	}
}

// Each sheet carries the cautions of its ratings and no other; the schedule carries all.
func TestCautions(t *testing.T) {
	for _, read := range projects() {
		r, _ := read(t)
		everywhere := map[string]bool{}
		texts := func(ratings []*glazing.Rating) map[string]bool {
			list := map[string]bool{}
			for _, rating := range ratings {
				for _, x := range rating.Cautions {
					if x.Code != "edition" { // stands in the head
						list[tight(x.Text)] = true
						everywhere[tight(x.Text)] = true
					}
				}
			}
			return list
		}
		list := groups(r)
		of := make([]map[string]bool, len(list))
		for i, group := range list {
			of[i] = texts(group)
		}
		for i, group := range list {
			part := r
			part.Ratings = nil
			for _, rating := range group {
				part.Ratings = append(part.Ratings, *rating)
			}
			p := &paper{r: part, full: map[string]bool{}}
			p.makeup(group, false)
			printed := body(t, p.pages)
			for s := range everywhere {
				if strings.Contains(printed, s) != of[i][s] && !within(s, of[i]) {
					t.Errorf("%s under %s: caution %.80q is on the sheet: %v, of its ratings: %v",
						group[0].Makeup.ID, group[0].Method.Basis.Name, s, !of[i][s], of[i][s])
				}
			}
		}
		p := &paper{r: r, full: map[string]bool{}}
		p.schedule()
		printed := body(t, p.pages)
		for s := range everywhere {
			if !strings.Contains(printed, s) {
				t.Errorf("caution %.80q is not on the schedule", s)
			}
		}
		if mixed := tight(glazing.MixedBasis.Text); strings.Contains(printed, mixed) != (len(r.Project.Bases) > 1) {
			t.Errorf("%d bases, and the caution on several: %v", len(r.Project.Bases), strings.Contains(printed, mixed))
		}
	}
}

// within reports whether a text is part of another of a set.
func within(s string, set map[string]bool) bool {
	for x := range set {
		if strings.Contains(x, s) {
			return true
		}
	}
	return false
}

// The page of limits has the results of the JSON of check.
func TestLimitsPage(t *testing.T) {
	for _, read := range projects() {
		r, c := read(t)
		if c == nil {
			t.Fatal("no limits")
		}
		var doc struct {
			Limits []struct {
				Result  string
				Rounded *json.Number
			}
		}
		if err := json.Unmarshal(table.CheckJSON(*c), &doc); err != nil {
			t.Fatal(err)
		}
		p := &paper{r: r, full: map[string]bool{}}
		p.limits(*c)
		var verdicts, values []string
		for _, page := range p.pages {
			texts, _ := onPage(t, page)
			for _, x := range texts {
				switch x.text {
				case "meets the entered limit", "does not meet", "too close to call", "cannot be judged":
					row := rowOf(texts, placed{base: x.base})
					verdicts, values = append(verdicts, x.text), append(values, row[len(row)-3])
				}
			}
		}
		if len(verdicts) != len(doc.Limits) || len(verdicts) == 0 {
			t.Fatalf("%d results on paper, %d in JSON", len(verdicts), len(doc.Limits))
		}
		for i, x := range doc.Limits {
			if verdicts[i] != x.Result {
				t.Errorf("result %d is %q on paper, %q in JSON", i+1, verdicts[i], x.Result)
			}
			if x.Rounded == nil {
				continue
			}
			value, err := x.Rounded.Float64()
			if printed, _ := strconv.ParseFloat(values[i], 64); err != nil || printed != value {
				t.Errorf("result %d is %s on paper, %v in JSON", i+1, values[i], value)
			}
		}
	}
}

// The pages of verify have every check with its result, as the JSON has it, and say of what make-up.
func TestVerificationOnPaper(t *testing.T) {
	v := verified(t)
	v.Groups[0].Outcomes[1].Result = proof.Missed
	var doc struct {
		Groups []struct {
			Checks []struct {
				ID, Result, Subject string
				Computed            *float64
				Inputs              map[string]string
			}
		}
	}
	if err := json.Unmarshal(table.VerifyJSON(v), &doc); err != nil {
		t.Fatal(err)
	}
	pages := verificationPages(v).pages
	rows := map[string][]string{} // by the first cell of a row
	for _, c := range pages {
		texts, _ := onPage(t, c)
		for _, x := range texts {
			if math.Abs(x.box.X-left) < 0.01 {
				rows[x.text] = append(rows[x.text], rowOf(texts, x)...)
			}
		}
	}
	all := body(t, pages)
	n := 0
	for _, g := range doc.Groups {
		for _, x := range g.Checks {
			n++
			row := rows[x.ID]
			if len(row) == 0 || row[len(row)-1] != x.Result {
				t.Errorf("%s: its row is %q, want the result %s", x.ID, row, x.Result)
			}
			if s := x.Subject + x.Inputs["makeup"]; x.Subject != "" && !strings.Contains(all, tight(s)) {
				t.Errorf("%s: %q is not on paper", x.ID, s)
			}
		}
	}
	if n < 1000 {
		t.Errorf("%d checks", n)
	}
	if !strings.Contains(all, tight(v.Machine())) && !slices.ContainsFunc(pages, func(c *draw.Canvas) bool {
		texts, _ := onPage(t, c)
		return slices.ContainsFunc(texts, func(x placed) bool { return x.text == v.Machine() })
	}) {
		t.Error("no page says which program computed the figures")
	}
}
