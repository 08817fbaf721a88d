package table

import (
	"bytes"
	"encoding/csv"
	"encoding/json"
	"slices"
	"strconv"
	"strings"
	"testing"

	"panewright/glazing"
)

// readCSV reads CSV into rows by key; the first row has the keys.
func readCSV(t *testing.T, content []byte, separator rune) (keys []string, rows []map[string]string) {
	t.Helper()
	reader := csv.NewReader(bytes.NewReader(content))
	reader.Comma = separator
	all, err := reader.ReadAll()
	if err != nil {
		t.Fatal(err)
	}
	for _, cells := range all[1:] {
		row := map[string]string{}
		for i, c := range cells {
			row[all[0][i]] = c
		}
		rows = append(rows, row)
	}
	return all[0], rows
}

// sheetEqualsJSON asserts that rows of text under keys hold every figure of the JSON to the last
// bit, and nothing where that has null.
func sheetEqualsJSON(t *testing.T, r Report, keys []string, rows []map[string]string) {
	t.Helper()
	var doc struct{ Ratings []any }
	if err := json.Unmarshal(JSON(r), &doc); err != nil {
		t.Fatal(err)
	}
	if len(rows) != len(doc.Ratings) {
		t.Fatalf("%d rows, want %d", len(rows), len(doc.Ratings))
	}
	choices := r.inSheets()
	for _, c := range choices {
		if !slices.Contains(keys, c.Path()) {
			t.Errorf("no column %s", c.Path())
		}
	}
	for i, rating := range doc.Ratings {
		compared := 0
		for _, key := range append(paths(choices), "makeup", "title", "tint", "basis", "tilt_deg") {
			want, _ := jsonAt(rating, key)
			switch want := want.(type) {
			case nil:
				if rows[i][key] != "" {
					t.Errorf("row %d: %s is %q, want nothing", i+1, key, rows[i][key])
				}
			case float64:
				if got, err := strconv.ParseFloat(rows[i][key], 64); err != nil || got != want {
					t.Errorf("row %d: %s is %q, want %v", i+1, key, rows[i][key], want)
				}
				compared++
			case string:
				if rows[i][key] != want {
					t.Errorf("row %d: %s is %q, want %q", i+1, key, rows[i][key], want)
				}
			default:
				t.Errorf("%s in JSON is %T", key, want)
			}
		}
		if compared < 30 {
			t.Errorf("row %d: %d numbers only", i+1, compared)
		}
	}
}

func TestCSVEqualsJSON(t *testing.T) {
	r := balancedReport(t, glazing.EN, glazing.ISO, glazing.NA)
	out, err := CSV(r, CSVForm{})
	if err != nil {
		t.Fatal(err)
	}
	keys, rows := readCSV(t, out, ',')
	sheetEqualsJSON(t, r, keys, rows)
	wantFirst := []string{"makeup", "title", "tint", "basis", "tilt_deg"}
	wantLast := []string{"typed_by_user.acoustic", "origins", "conditions", "cautions", "editions", "project", "author", "date", "input_sha256", "panewright"}
	if !slices.Equal(keys[:5], wantFirst) || !slices.Equal(keys[len(keys)-10:], wantLast) {
		t.Errorf("the keys are %v", keys)
	}
	for i, row := range rows {
		rating := &r.Ratings[i]
		if row["input_sha256"] != r.Project.Digest || row["panewright"] != r.Version || row["project"] != r.Project.Title || row["editions"] != rating.Method.Editions() {
			t.Errorf("row %d is not traceable: %v", i+1, row)
		}
		if want := rating.Makeup.TypedText("acoustic"); row["typed_by_user.acoustic"] != want {
			t.Errorf("row %d: typed %q, want %q", i+1, row["typed_by_user.acoustic"], want)
		}
		codes := strings.Fields(row["cautions"])
		for _, c := range r.cautions(i) {
			if !slices.Contains(codes, c.Code) {
				t.Errorf("row %d lacks the caution %s", i+1, c.Code)
			}
		}
		if !strings.Contains(row["origins"], rating.Makeup.Panes[0].Pane.ID+": invented") {
			t.Errorf("row %d: origins %q", i+1, row["origins"])
		}
	}
	if slices.ContainsFunc(keys, func(k string) bool { return strings.HasSuffix(k, ".number") }) {
		t.Error("the numbers of surfaces have columns")
	}
	marked, err := CSV(r, CSVForm{ByteOrderMark: true})
	if err != nil || string(marked) != "\xEF\xBB\xBF"+string(out) { // U+FEFF in UTF-8 (Unicode 15, 23.8)
		t.Errorf("with a byte-order mark: %.20q (%v)", marked, err)
	}
	if bytes.ContainsRune(out, '\r') || bytes.HasPrefix(out, []byte("\ufeff")) {
		t.Error("CSV has a carriage return or a byte-order mark")
	}
}

func TestCSVForms(t *testing.T) {
	r := demoReport(t, glazing.EN)
	if err := r.Choose([]string{"u", "light", "nusselt"}); err != nil {
		t.Fatal(err)
	}
	plain, err := CSV(r, CSVForm{})
	if err != nil {
		t.Fatal(err)
	}
	keys, want := readCSV(t, plain, ',')
	if !slices.Equal(keys[5:9], []string{"u_w_m2k", "light.transmittance", "gaps.1.nusselt", "gaps.2.nusselt"}) {
		t.Errorf("the chosen columns are %v", keys[5:9])
	}
	for _, separator := range []rune{';', '\t'} {
		out, err := CSV(r, CSVForm{Separator: separator, DecimalComma: true, UnitsRow: true})
		if err != nil {
			t.Fatal(err)
		}
		_, rows := readCSV(t, out, separator)
		units, rows := rows[0], rows[1:]
		if units["makeup"] != "(unit)" || units["u_w_m2k"] != "W/(m²·K)" || units["tilt_deg"] != "°" || units["light.transmittance"] != "" {
			t.Errorf("units %v", units)
		}
		for i, row := range rows {
			for key, w := range want[i] {
				number := slices.Contains([]string{"u_w_m2k", "light.transmittance", "gaps.1.nusselt", "gaps.2.nusselt", "tilt_deg"}, key)
				if number {
					w = strings.Replace(w, ".", ",", 1)
				}
				if row[key] != w {
					t.Errorf("%s is %q, want %q", key, row[key], w)
				}
			}
		}
	}
	// Inch-pound units: 1 Btu/(h·ft²·°F) is 5.678263 W/(m²·K) (NIST SP 811, from memory).
	r.InchPound, r.Choices = true, nil
	ip, err := CSV(r, CSVForm{UnitsRow: true})
	if err != nil {
		t.Fatal(err)
	}
	_, rows := readCSV(t, ip, ',')
	if got := rows[0]["u_btu_h_ft2_f"]; got != "Btu/(h·ft²·°F)" {
		t.Errorf("the unit of U is %q", got)
	}
	for i := range r.Ratings {
		got, err := strconv.ParseFloat(rows[i+1]["u_btu_h_ft2_f"], 64)
		if want := r.Ratings[i].U.Number / 5.678263; err != nil || got < want*(1-1e-6) || got > want*(1+1e-6) {
			t.Errorf("U is %v Btu/(h·ft²·°F), want %.6f", got, want)
		}
	}
}

// hostile is a report whose texts a spreadsheet might take for formulas, or might not survive.
func hostile(t *testing.T) Report {
	r := demoReport(t, glazing.EN)
	m := *r.Ratings[0].Makeup
	m.Title = "=HYPERLINK(\"x\";\"y\")"
	m.Typed = []glazing.Typed{{Name: "a", Text: "+1"}, {Name: "b", Text: "  @sum"}, {Name: "c", Text: "-5 dB, \"quoted\";\nnext"}, {Name: "d", Text: "＝1"}, {Name: "=e", Text: "plain | = text <b>"}}
	r.Ratings[0].Makeup = &m
	r.Ratings[0].Tint = "\t=1"
	p := *r.Project
	p.Title, p.Author, p.Notes = "\u00a0=1+1", "=cmd|' /c calc'!A0", "-1"
	r.Project = &p
	return r
}

func TestCSVHasNoFormula(t *testing.T) {
	r := hostile(t)
	out, err := CSV(r, CSVForm{})
	if err != nil {
		t.Fatal(err)
	}
	_, rows := readCSV(t, out, ',')
	for key, want := range map[string]string{
		"title": "'=HYPERLINK(\"x\";\"y\")", "tint": "'\t=1", "project": "'\u00a0=1+1", "author": "'=cmd|' /c calc'!A0",
		"typed_by_user.a": "'+1", "typed_by_user.b": "'  @sum", "typed_by_user.c": "'-5 dB, \"quoted\";\nnext",
		"typed_by_user.d": "'＝1", "typed_by_user.=e": "plain | = text <b>", "makeup": "D1",
	} {
		if rows[0][key] != want {
			t.Errorf("%s is %q, want %q", key, rows[0][key], want)
		}
	}
	for _, row := range rows { // numbers are never touched
		if strings.HasPrefix(row["colour.transmitted.a"], "'") || !strings.HasPrefix(row["colour.transmitted.a"], "-") {
			t.Errorf("a* is %q", row["colour.transmitted.a"])
		}
	}
}
