package table

import (
	"bytes"
	"encoding/json"
	"encoding/xml"
	"fmt"
	"math"
	"slices"
	"strconv"
	"strings"
	"testing"

	"github.com/xuri/excelize/v2"

	"panewright/glazing"
)

// withSpectra adds the spectra of every rating, at its method's wavelengths.
func withSpectra(r Report) Report {
	for i := range r.Ratings {
		r.Spectra = append(r.Spectra, r.Ratings[i].Ready.Spectra(r.Ratings[i].State, r.Ratings[i].Method.WavelengthsNM()))
	}
	return r
}

// openXLSX writes a report and reads it back.
func openXLSX(t *testing.T, r Report) *excelize.File {
	t.Helper()
	out, err := XLSX(r)
	if err != nil {
		t.Fatal(err)
	}
	f, err := excelize.OpenReader(bytes.NewReader(out))
	if err != nil {
		t.Fatal(err)
	}
	t.Cleanup(func() { f.Close() })
	return f
}

// rowsOf returns the cells of a sheet as the file has them; the library rounds what it reads.
func rowsOf(t *testing.T, f *excelize.File, sheet string) [][]string {
	t.Helper()
	var strings, cells struct {
		Strings []struct {
			Text string `xml:"t"`
		} `xml:"si"`
		Cells []struct {
			At    string `xml:"r,attr"`
			Type  string `xml:"t,attr"`
			Value string `xml:"v"`
		} `xml:"sheetData>row>c"`
	}
	index, err := f.GetSheetIndex(sheet)
	if err != nil {
		t.Fatal(err)
	}
	for path, doc := range map[string]any{"xl/sharedStrings.xml": &strings, fmt.Sprintf("xl/worksheets/sheet%d.xml", index+2): &cells} {
		content, ok := f.Pkg.Load(path) // the first sheet of all was taken away
		if !ok {
			t.Fatalf("no %s", path)
		}
		if err := xml.Unmarshal(content.([]byte), doc); err != nil {
			t.Fatal(err)
		}
	}
	var rows [][]string
	for _, c := range cells.Cells {
		column, row, err := excelize.CellNameToCoordinates(c.At)
		if err != nil {
			t.Fatal(err)
		}
		for len(rows) < row {
			rows = append(rows, nil)
		}
		for len(rows[row-1]) < column {
			rows[row-1] = append(rows[row-1], "")
		}
		switch {
		case c.Type == "s":
			n, err := strconv.Atoi(c.Value)
			if err != nil {
				t.Fatal(err)
			}
			c.Value = strings.Strings[n].Text
		case c.Type != "" && c.Type != "n":
			t.Errorf("%s!%s is of type %s", sheet, c.At, c.Type)
		}
		rows[row-1][column-1] = c.Value
	}
	return rows
}

func TestXLSXEqualsJSON(t *testing.T) {
	r := withSpectra(demoReport(t, glazing.EN, glazing.ISO, glazing.NA))
	f := openXLSX(t, r)
	if got, want := f.GetSheetList(), []string{"en", "iso", "na", "about", "spectra"}; !slices.Equal(got, want) {
		t.Fatalf("the sheets are %v, want %v", got, want)
	}
	var keys []string
	var rows []map[string]string
	for _, basis := range r.bases() {
		all := rowsOf(t, f, basis)
		keys = all[0]
		for i, cells := range all[2:] {
			row := map[string]string{}
			for k, c := range cells {
				row[keys[k]] = c
			}
			rows = append(rows, row)
			at := fmt.Sprintf("G%d", i+3) // mass, which is shown with one decimal
			if shown, err := f.GetCellValue(basis, at); err != nil || shown != glazing.PrintRounded(r.Ratings[i].MassKGM2, 1) {
				t.Errorf("%s!%s is shown as %q (%v)", basis, at, shown, err)
			}
		}
		if all[1][0] != unitsOf || all[1][slices.Index(keys, "u_w_m2k")] != "W/(m²·K)" {
			t.Errorf("%s: the units are %v", basis, all[1])
		}
		if p, err := f.GetPanes(basis); err != nil || !p.Freeze || p.YSplit != 2 || p.XSplit != 3 {
			t.Errorf("%s: panes %+v, %v", basis, p, err)
		}
		titles := func(n excelize.DefinedName) bool {
			return n.Scope == basis && n.RefersTo == "'"+basis+"'!$A:$C,'"+basis+"'!$1:$2"
		}
		if !slices.ContainsFunc(f.GetDefinedName(), titles) {
			t.Errorf("%s: names %+v", basis, f.GetDefinedName())
		}
		if width, err := f.GetColWidth(basis, "H"); err != nil || width < float64(len("light.transmittance")) {
			t.Errorf("%s: the column of light transmittance is %g wide", basis, width)
		}
	}
	sheetEqualsJSON(t, r, keys, rows)

	// The digest, every caution in full, and what the columns mean stand on the sheet about.
	about := ""
	for _, row := range rowsOf(t, f, aboutSheet) {
		about += strings.Join(row, "\t") + "\n"
	}
	wants := []string{r.Project.Title, r.Project.Digest, r.Project.Author, r.Project.Notes, "Rw 36 dB", "T1, typed by the user: acoustic",
		"mill-soft-4 | 14 mm argon 90 / air 10", "invented: mill-clear-6", "solar.g\tg: total solar energy transmittance"}
	for i := range r.Ratings {
		wants = append(wants, r.Ratings[i].Method.Editions())
		for _, c := range r.cautions(i) {
			if c.Code != "edition" {
				wants = append(wants, c.Text)
			}
		}
	}
	for _, want := range wants {
		if !strings.Contains(about, want) {
			t.Errorf("the sheet about lacks %q", want)
		}
	}
	if p, err := f.GetDocProps(); err != nil || p.Created != "" || p.Modified != "" || p.Title != r.Project.Title || p.Creator != "Panewright test" {
		t.Errorf("document properties %+v, %v", p, err)
	}
	if p, err := f.GetAppProps(); err != nil || p.Application != "Panewright test" {
		t.Errorf("properties of the application %+v, %v", p, err)
	}
}

// Each sheet is printed on A4, landscape, fitted to few pages side by side: few figures to one.
func TestXLSXPages(t *testing.T) {
	r := withSpectra(plainReport(t, glazing.EN))
	pages := func(r Report, sheet string) int {
		t.Helper()
		f := openXLSX(t, r)
		p, err := f.GetPageLayout(sheet)
		props, also := f.GetSheetProps(sheet)
		if err != nil || also != nil || *p.Size != 9 || *p.Orientation != "landscape" || *p.FitToHeight != 0 || !*props.FitToPage { // 9 is A4 (ECMA-376, 18.3.1.63)
			t.Errorf("%s: page %+v, %v, %v", sheet, p, err, also)
		}
		return *p.FitToWidth
	}
	for _, sheet := range []string{aboutSheet, spectraSheet} {
		if n := pages(r, sheet); n != 1 {
			t.Errorf("%s is %d pages wide", sheet, n)
		}
	}
	if n := pages(r, "en"); n < 2 || n > 12 {
		t.Errorf("all figures are %d pages wide", n)
	}
	conditions := demoReport(t, glazing.EN) // each has as many figures again at most
	if n := pages(conditions, "en"); n > 12*(1+len(conditions.Project.Conditions)) {
		t.Errorf("all figures are %d pages wide under conditions", n)
	}
	if err := r.Choose([]string{"light", "g", "u"}); err != nil {
		t.Fatal(err)
	}
	if n := pages(r, "en"); n > 2 {
		t.Errorf("three figures are %d pages wide", n)
	}
}

func TestXLSXSpectra(t *testing.T) {
	r := withSpectra(demoReport(t, glazing.EN, glazing.NA))
	r.Spectra[1].T[3] = math.NaN() // beyond a pane's spectrum
	f := openXLSX(t, r)
	rows := rowsOf(t, f, spectraSheet)
	names := rows[spectraHeadRow-1]
	if want := strings.Fields("wavelength D1 D1 D1 T1 T1 T1"); !slices.Equal(names[:7], want) || names[7] != "E1 clear" || len(names) != 1+3*7 {
		t.Errorf("the columns are %q", names)
	}
	table := rows[spectraHeadRow+1:]
	if len(table) != len(r.Spectra[0].WavelengthNM) {
		t.Fatalf("%d wavelengths, want %d", len(table), len(r.Spectra[0].WavelengthNM))
	}
	for k, row := range table {
		want := []float64{r.Spectra[0].WavelengthNM[k]}
		for i := range 7 {
			s := r.Spectra[i]
			want = append(want, s.T[k], s.RhoOutside[k], s.RhoInside[k])
		}
		for c, w := range want {
			if math.IsNaN(w) {
				if row[c] != "" {
					t.Errorf("row %d, column %d is %q, want nothing", k, c, row[c])
				}
				continue
			}
			if got, err := strconv.ParseFloat(row[c], 64); err != nil || got != w {
				t.Errorf("row %d, column %d is %q, want %v", k, c, row[c], w)
			}
		}
	}
	chart := chartOf(t, f)
	for _, want := range []string{
		"<xVal><numRef><f>spectra!$A$29:$A$", "<f>spectra!$E$27</f>", `<a:prstDash val="dash">`, `<a:srgbClr val="0072B2">`,
		`<max val="2500"></max><min val="300"></min>`, `<max val="1"></max><min val="0"></min>`, "wavelength, nm", "transmittance τ, fraction of one",
		`<majorUnit val="200">`, `rot="-5400000"`,
	} {
		if !strings.Contains(chart, want) {
			t.Errorf("the chart lacks %s", want)
		}
	}
	if n := strings.Count(chart, "<ser>"); n != 7 {
		t.Errorf("%d curves, want 7", n)
	}
	for _, bad := range []string{"<a:noFill>", "<xVal><strRef>", "<lblAlgn"} { // an invisible line; what mend corrects
		if strings.Contains(chart, bad) {
			t.Errorf("the chart has %s", bad)
		}
	}

	// One rating is charted with three curves; of many eight are, and that is said.
	one := withSpectra(demoReport(t, glazing.EN))
	one.Ratings, one.Spectra = one.Ratings[:1], one.Spectra[:1]
	f = openXLSX(t, one)
	if chart := chartOf(t, f); strings.Count(chart, "<ser>") != 3 || !strings.Contains(chart, "<f>spectra!$D$28</f>") {
		t.Errorf("the chart of one rating: %s", chart)
	}
	many := withSpectra(demoReport(t, glazing.EN, glazing.EN))
	f = openXLSX(t, many)
	if chart := chartOf(t, f); strings.Count(chart, "<ser>") != 8 {
		t.Errorf("%d of fourteen curves are charted, want 8", strings.Count(chart, "<ser>"))
	}
	if said := rowsOf(t, f, spectraSheet)[0][0]; !strings.Contains(said, "of the first 8 of 14 ratings") {
		t.Errorf("the sheet says %q", said)
	}
	for len(many.Ratings) <= mostSpectra {
		many.Ratings, many.Spectra = append(many.Ratings, many.Ratings...), append(many.Spectra, many.Spectra...)
	}
	f = openXLSX(t, many)
	rows = rowsOf(t, f, spectraSheet)
	if want := fmt.Sprintf("The sheet has the spectra of the first %d of %d ratings.", mostSpectra, len(many.Ratings)); !strings.HasSuffix(rows[0][0], want) {
		t.Errorf("the sheet says %q, want %q", rows[0][0], want)
	}
	if n := len(rows[spectraHeadRow-1]); n != 1+3*mostSpectra {
		t.Errorf("%d columns of spectra", n)
	}
	if n := len(rowsOf(t, f, "en")); n != 2+len(many.Ratings) {
		t.Errorf("%d rows of %d ratings", n, len(many.Ratings))
	}
}

// chartOf returns the one chart of a spreadsheet.
func chartOf(t *testing.T, f *excelize.File) string {
	t.Helper()
	content, ok := f.Pkg.Load("xl/charts/chart1.xml")
	if !ok {
		t.Fatal("no chart")
	}
	return string(content.([]byte))
}

// A text is never a formula, whatever it begins with, and is what the user typed.
func TestXLSXHasNoFormula(t *testing.T) {
	r := withSpectra(hostile(t))
	m := r.Ratings[0].Makeup
	m.Typed = append(m.Typed, glazing.Typed{Name: "f", Text: "_x0041_ and \x01\ufffe"}, glazing.Typed{Name: "g", Text: strings.Repeat("é𝒳", 20000)})
	f := openXLSX(t, r)
	for _, sheet := range f.GetSheetList() {
		rows := rowsOf(t, f, sheet)
		for i, row := range rows {
			for k := range row {
				at, err := excelize.CoordinatesToCellName(k+1, i+1)
				if err != nil {
					t.Fatal(err)
				}
				if formula, err := f.GetCellFormula(sheet, at); err != nil || formula != "" {
					t.Errorf("%s!%s has the formula %q (%v)", sheet, at, formula, err)
				}
			}
		}
	}
	rows := rowsOf(t, f, "en")
	got := map[string]string{}
	for k, c := range rows[2] {
		got[rows[0][k]] = c
	}
	for key, want := range map[string]string{"title": m.Title, "tint": "\t=1", "typed_by_user.a": "+1", "typed_by_user.c": m.Typed[2].Text,
		"typed_by_user.f": "_x005F_x0041_ and \ufffd\ufffd", "author": r.Project.Author} {
		if got[key] != want {
			t.Errorf("%s is %q, want %q", key, got[key], want)
		}
	}
	long := got["typed_by_user.g"]
	if !strings.HasPrefix(long, "é𝒳é𝒳") || !strings.HasSuffix(long, "𝒳… (cut; 60000 characters in all)") && !strings.HasSuffix(long, "é… (cut; 60000 characters in all)") {
		t.Errorf("a long text ends with %q", long[len(long)-60:])
	}
}

// The sheet of a basis bears its name, which a spreadsheet can bear.
func TestSheetNames(t *testing.T) {
	for _, name := range append(glazing.BasisNames(), aboutSheet, spectraSheet) {
		if len(name) > excelize.MaxSheetNameLength || strings.ContainsAny(name, `:\/?*[]'`) {
			t.Errorf("%q cannot be the name of a sheet", name)
		}
	}
}

// A project without make-ups is a spreadsheet too.
func TestEmptyXLSX(t *testing.T) {
	r := demoReport(t)
	f := openXLSX(t, r)
	if got := f.GetSheetList(); !slices.Equal(got, []string{aboutSheet}) {
		t.Errorf("the sheets are %v", got)
	}
	var doc map[string]any
	if err := json.Unmarshal(JSON(r), &doc); err != nil {
		t.Error(err)
	}
}
