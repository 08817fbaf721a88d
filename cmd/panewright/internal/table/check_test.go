package table

import (
	"bytes"
	"encoding/csv"
	"encoding/json"
	"math"
	"regexp"
	"slices"
	"strings"
	"testing"

	"github.com/jedib0t/go-pretty/v6/text"

	"panewright/glazing"
	"panewright/glazing/limits"
	"panewright/glazing/project"
)

// demoCheck holds the demo project, rated under some bases, against its own limits and others.
func demoCheck(t *testing.T, bases []glazing.Basis, others ...glazing.Limit) Check {
	t.Helper()
	r := demoReport(t, bases...)
	return checkOf(r, append(slices.Clone(r.Project.Limits), others...)...)
}

// checkOf holds what is rated of a project against limits.
func checkOf(r Report, list ...glazing.Limit) Check {
	c := Check{Report: r, Limits: list}
	c.Results = limits.Judge(c.Limits, c.Project.Makeups, c.Project.Bases, c.Ratings)
	return c
}

func limitOf(t *testing.T, figure string, atLeast, atMost float64) glazing.Limit {
	t.Helper()
	f, place, ok := glazing.FigureNamed(figure)
	if !ok {
		t.Fatalf("no figure %s", figure)
	}
	bound := func(v float64) glazing.Value { return glazing.Value{Number: v, Known: !math.IsNaN(v)} }
	return glazing.Limit{Figure: f, Place: place, AtLeast: bound(atLeast), AtMost: bound(atMost), From: "district.yaml:3"}
}

// outputsOf returns the check in every form.
func outputsOf(t *testing.T, c Check) map[string]string {
	t.Helper()
	sheet, err := CheckCSV(c, CSVForm{})
	if err != nil {
		t.Fatal(err)
	}
	return map[string]string{"text": string(CheckText(c)), "Markdown": string(CheckMarkdown(c)), "JSON": string(CheckJSON(c)), "CSV": string(sheet)}
}

// Every output has each result, who typed the limits and from which source, and the two sentences;
// none says more than that.
func TestCheckOutputs(t *testing.T) {
	none := math.NaN()
	iso := limitOf(t, "u", none, 1.5)
	iso.Basis = "iso"
	c := demoCheck(t, []glazing.Basis{glazing.EN, glazing.ISO}, limitOf(t, "light", 0.3, none), limitOf(t, "absorptance", none, 0.9),
		limitOf(t, "surfaces.5.emissivity", none, 0.05), iso)
	c.Remarks = []glazing.Caution{{Code: "limit_makeup_absent", Text: "A limit was left out."}}
	c.Files = []*project.LimitsFile{{File: "district.yaml", Name: "The district's", Digest: strings.Repeat("ab", 32)}}
	if n := limits.Count(c.Results, limits.TooClose); n == 0 {
		t.Fatal("nothing is too close to call")
	}
	said := regexp.MustCompile(`(?i)\b(complie|comply|compliant|conform|pass(es|ed)?\b|fail)`)
	for name, out := range outputsOf(t, c) {
		flat := words([]byte(out))
		if found := said.FindString(flat); found != "" {
			t.Errorf("%s says %q", name, found)
		}
		wants := append([]string{"invented brief, clause 4", "2026-01-31", "Panewright demo", "project.yaml:", "district.yaml", strings.Repeat("ab", 32), c.Project.Digest,
			"whole window", "EN 410:2011", "ISO 9050:2003", "invented"}, checkNotice...)
		if name == "CSV" {
			wants = append(wants, "limit_basis", "limit_scope", "not_certified")
		} else {
			wants = append(wants, "The limit τv at least 0.3 (district.yaml:3) names no basis; en was taken", "names no scope; the centre of the glass was taken",
				"A limit was left out.", "neither a certified rating", glazing.MixedBasis.Text)
		}
		for _, want := range wants {
			if !strings.Contains(flat, want) {
				t.Errorf("%s lacks %q", name, want)
			}
		}
		for _, v := range limits.Verdicts() {
			if n := strings.Count(flat, string(v)); n < limits.Count(c.Results, v) {
				t.Errorf("%s says %q %d times, want %d", name, v, n, limits.Count(c.Results, v))
			}
		}
	}
	out := string(CheckText(c))
	for i, line := range strings.Split(out, "\n") {
		if w := text.StringWidth(line); w > Width {
			t.Errorf("line %d: %d columns: %s", i+1, w, line)
		}
	}
	// The rows of Markdown are those of the text, with the words of the cells.
	lines := map[string]bool{}
	list := strings.Split(out, "\n")
	for i, line := range list {
		if i+1 < len(list) && strings.HasPrefix(strings.TrimSpace(list[i+1]), "@") { // the condition stands below, in as many lines as it needs
			cells := strings.Fields(line)
			for _, below := range list[i+1:] {
				part := strings.Fields(below)
				if len(part) != 1 {
					break
				}
				cells[1] += part[0]
			}
			line = strings.Join(cells, " ")
		}
		lines[words([]byte(line))] = true
	}
	count := 0
	for _, row := range cellsOf(string(CheckMarkdown(c))) {
		if row[0] != "---:" && row[0] != "---" && row[0] != "limit" {
			count++
			if s := words([]byte(strings.Join(row, " "))); !lines[s] {
				t.Errorf("the text lacks %q", s)
			}
		}
	}
	if count != len(c.Results) {
		t.Errorf("Markdown has %d rows, want %d", count, len(c.Results))
	}
	for _, want := range []string{"αe1 full 0.87 ≤ 0.9", "Limit 7, D1, E1 clear, E1 half, E1 full, L1, V1: it has no surface 5.", "meets the entered limit: "} {
		if !strings.Contains(words([]byte(out)), want) {
			t.Errorf("the text lacks %q\n%s", want, out)
		}
	}
}

// The keys of the JSON are a contract: these, in every result, whatever is known.
func TestCheckJSON(t *testing.T) {
	none := math.NaN()
	c := demoCheck(t, []glazing.Basis{glazing.EN}, limitOf(t, "light", 0.3, 0.8), limitOf(t, "solar.absorptance.3", none, 0.9))
	var doc struct {
		Panewright string           `json:"panewright"`
		Project    string           `json:"project"`
		Input      string           `json:"input_sha256"`
		AllMet     *bool            `json:"all_met"`
		Limits     []map[string]any `json:"limits"`
		Files      []any            `json:"limits_files"`
		Notice     []string         `json:"notice"`
		Editions   map[string]string
		Cautions   []glazing.Caution
	}
	if err := json.Unmarshal(CheckJSON(c), &doc); err != nil {
		t.Fatal(err)
	}
	if doc.Panewright != "test" || doc.Project != c.Project.Title || doc.Input != c.Project.Digest || doc.AllMet == nil || *doc.AllMet ||
		len(doc.Limits) != len(c.Results) || doc.Files == nil || len(doc.Notice) != 2 || !strings.HasPrefix(doc.Editions["en"], "EN 410:2011") || len(doc.Cautions) < 5 {
		t.Errorf("%+v", doc)
	}
	keys := strings.Fields("makeup tint basis figure unit value rounded at_most at_least scope condition tint_rule result margin reason source date typed_by limit_from cautions")
	for i, got := range doc.Limits {
		x := c.Results[i]
		for _, key := range keys {
			if _, ok := got[key]; !ok {
				t.Errorf("result %d lacks %s", i, key)
			}
		}
		if len(got) != len(keys) {
			t.Errorf("result %d has %d keys, want %d", i, len(got), len(keys))
		}
		if got["makeup"] != x.Makeup.ID || got["tint"] != x.Tint || got["figure"] != x.Figure || got["result"] != string(x.Verdict) || got["reason"] != x.Why {
			t.Errorf("result %d is %v", i, got)
		}
		for key, v := range map[string]glazing.Value{"value": x.Value, "rounded": x.Rounded, "margin": x.Margin, "at_most": x.Limit.AtMost, "at_least": x.Limit.AtLeast} {
			if n, ok := got[key].(float64); ok != v.Known || ok && n != v.Number {
				t.Errorf("result %d: %s is %v, want %v", i, key, got[key], v)
			}
		}
		if want := map[bool]string{true: "window", false: "centre"}[x.Limit.Scope == glazing.WindowScope]; got["scope"] != want {
			t.Errorf("result %d: scope %v, want %s", i, got["scope"], want)
		}
	}
	// All met is said only where it is so.
	c.Results = slices.DeleteFunc(slices.Clone(c.Results), func(x limits.Result) bool { return x.Verdict != limits.Meets })
	if !strings.Contains(string(CheckJSON(c)), `"all_met": true`) {
		t.Error("all are met, and JSON does not say so")
	}
}

// CSV has the numbers of JSON, and empty cells where these are null.
func TestCheckCSV(t *testing.T) {
	c := demoCheck(t, []glazing.Basis{glazing.EN})
	c.Limits[0].Source = "=1+1"
	out, err := CheckCSV(c, CSVForm{})
	if err != nil {
		t.Fatal(err)
	}
	rows, err := csv.NewReader(bytes.NewReader(out)).ReadAll()
	if err != nil || len(rows) != 1+len(c.Results) {
		t.Fatalf("%v: %d rows, want %d", err, len(rows), 1+len(c.Results))
	}
	cell := func(i int, key string) string { return rows[i+1][slices.Index(rows[0], key)] }
	for i, x := range c.Results {
		for key, v := range map[string]glazing.Value{"value": x.Value, "rounded": x.Rounded, "margin": x.Margin, "at_most": x.Limit.AtMost, "at_least": x.Limit.AtLeast} {
			want := ""
			if v.Known {
				want = figure(v.Number)
			}
			if got := cell(i, key); got != want {
				t.Errorf("row %d: %s %q, want %q", i, key, got, want)
			}
		}
		if cell(i, "result") != string(x.Verdict) || cell(i, "figure") != x.Figure || cell(i, "unit") != x.Judged.Unit {
			t.Errorf("row %d is %q", i, rows[i+1])
		}
	}
	if got := cell(0, "source"); got != "'=1+1" {
		t.Errorf("a spreadsheet would compute %q", got)
	}
}

// Wide words fold and stay on the page.
func TestCheckIsNarrow(t *testing.T) {
	c := demoCheck(t, []glazing.Basis{glazing.EN}, limitOf(t, "colour.reflected_inside_10deg.b", -12.3456789012345678, 1.23456789012345678e-100), limitOf(t, "rayleigh", 123456.789, 1234567.891))
	long := strings.Repeat("very-long-tint/", 12)
	for i := range c.Ratings {
		if c.Ratings[i].Tint != "" {
			c.Ratings[i].Tint = long + c.Ratings[i].Tint
		}
	}
	c.Limits[0].Source, c.Limits[0].From = strings.Repeat("source", 40), strings.Repeat("folder/", 40)
	c.Limits[1].Tint = strings.Repeat("no tint of this name\n", 9)
	c.Results = limits.Judge(c.Limits, c.Project.Makeups, c.Project.Bases, c.Ratings)
	out := string(CheckText(c))
	for i, line := range strings.Split(out, "\n") {
		if w := text.StringWidth(line); w > Width {
			t.Errorf("line %d: %d columns: %s", i+1, w, line)
		}
	}
}

// By hand: 2.8499 is 2.8 of one decimal and above 2.8 of two; 0.50000004 shows its side with eight.
func TestUnroundedShowsItsSide(t *testing.T) {
	none := math.NaN()
	for _, tt := range []struct {
		value           float64
		places          int
		atLeast, atMost float64
		want, margin    string
	}{
		{2.8499, 1, none, 2.8, "2.850", "-0.05"},
		{2.8004, 1, none, 2.8, "2.8004", "-0.0004"},
		{0.50000004, 2, none, 0.5, "0.50000004", "-4e-08"},
		{0.4996, 2, 0.5, none, "0.4996", "-0.0004"},
		{0.55, 2, 0.5, none, "0.5500", "+0.050"},
		{0.5, 2, 0.5, none, "0.5000", "0.000"},
		{2.8000000004, 1, none, 2.8, "2.8000000004", "-4e-10"},
		{math.Nextafter(2.8, 3), 1, none, 2.8, "2.800", "0.00"}, // binary arithmetic alone
		{-10.04, 1, -10, none, "-10.040", "-0.04"},
	} {
		l := limitOf(t, "u", tt.atLeast, tt.atMost)
		x := limits.Result{Limit: &l, Value: glazing.Value{Number: tt.value, Known: true}, Places: tt.places,
			Margin: glazing.Value{Number: limits.MarginOf(&l, tt.value), Known: true}}
		if got := unrounded(&x); got != tt.want {
			t.Errorf("%.17g: %s, want %s", tt.value, got, tt.want)
		}
		if got := printedMargin(&x); got != tt.margin {
			t.Errorf("%.17g: margin %s, want %s", tt.value, got, tt.margin)
		}
	}
	if got := printedMargin(&limits.Result{}); got != "–" {
		t.Errorf("no margin is printed %q", got)
	}
}
