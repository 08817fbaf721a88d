package table

// XLSX: a sheet a basis with the columns of CSV, one that makes them traceable, one of spectra with
// a chart.

import (
	"fmt"
	"math"
	"regexp"
	"slices"
	"strconv"
	"strings"
	"unicode/utf16"

	"github.com/xuri/excelize/v2"

	"panewright/glazing"
)

const (
	aboutSheet   = "about"
	spectraSheet = "spectra"
)

// XLSX returns the report as a spreadsheet: for each basis a sheet with the columns of CSV, keys in
// the first row and units in the second; a sheet "about" with editions, build-ups, cautions and
// what the columns mean; and, where the report has them, a sheet "spectra" of the first basis.
// Numbers are cells with all their digits, shown with the decimals of the figure; what is not known
// is an empty cell; a text is never a formula.
func XLSX(r Report) ([]byte, error) {
	b := &book{File: excelize.NewFile(), styles: map[int]int{}}
	defer b.Close()
	bold := &excelize.Font{Bold: true, Family: "Calibri", Size: fontSize}
	b.head = b.style(&excelize.Style{Font: bold, Fill: excelize.Fill{Type: "pattern", Pattern: 1, Color: []string{"E8ECEF"}},
		Border: []excelize.Border{{Type: "bottom", Color: "7F7F7F", Style: 1}}})
	b.wrap = b.style(&excelize.Style{Alignment: &excelize.Alignment{WrapText: true, Vertical: "top"}})
	b.label = b.style(&excelize.Style{Font: bold, Alignment: &excelize.Alignment{WrapText: true, Vertical: "top"}})
	for _, name := range r.bases() {
		b.basis(r, name)
	}
	b.about(r)
	if len(r.Spectra) == len(r.Ratings) && len(r.Ratings) > 0 {
		b.spectra(r)
	}
	b.note(b.DeleteSheet("Sheet1"))
	b.SetActiveSheet(0)
	b.properties(r)
	if b.err != nil {
		return nil, b.err
	}
	out, err := b.WriteToBuffer()
	if err != nil {
		return nil, err
	}
	return out.Bytes(), nil
}

// properties sets those of the file. It bears no date: what was rated carries the user's own.
func (b *book) properties(r Report) {
	by := "Panewright " + r.Version
	b.note(b.SetAppProps(&excelize.AppProperties{Application: by}))
	b.note(b.SetDocProps(&excelize.DocProperties{Creator: by, LastModifiedBy: by, Title: plain(r.Project.Title)}))
	const path = "docProps/core.xml"
	if content, ok := b.Pkg.Load(path); ok {
		b.Pkg.Store(path, dates.ReplaceAll(content.([]byte), nil))
	}
}

// dates are those that the library puts into every file.
var dates = regexp.MustCompile(`<dcterms:(created|modified)[^>]*>[^<]*</dcterms:(created|modified)>`)

// book is a spreadsheet being written; it keeps the first error.
type book struct {
	*excelize.File
	styles            map[int]int // of numbers, by decimals
	head, wrap, label int         // styles of headings, of long texts and of what stands before them
	err               error
}

func (b *book) note(err error) {
	if b.err == nil {
		b.err = err
	}
}

func (b *book) style(s *excelize.Style) int {
	id, err := b.NewStyle(s)
	b.note(err)
	return id
}

// decimals returns the style of a number that is shown with some decimals; 0 is the style of one
// that is shown as it is.
func (b *book) decimals(places int) int {
	if places < 0 {
		return 0
	}
	if _, ok := b.styles[places]; !ok {
		format := "0"
		if places > 0 {
			format += "." + strings.Repeat("0", places)
		}
		b.styles[places] = b.style(&excelize.Style{CustomNumFmt: &format})
	}
	return b.styles[places]
}

func (b *book) sheet(name string) {
	_, err := b.NewSheet(name)
	b.note(err)
}

// put writes a cell; columns and rows count from 1.
func (b *book) put(sheet string, column, row int, c cell) {
	if !c.numeric && c.text == "" {
		return
	}
	at := b.at(column, row)
	if !c.numeric {
		b.note(b.SetCellStr(sheet, at, plain(c.text)))
		return
	}
	// With as many decimals as it has: left to itself the library cuts a number to 15 digits.
	_, decimals, _ := strings.Cut(strconv.FormatFloat(c.number, 'f', -1, 64), ".")
	b.note(b.SetCellFloat(sheet, at, c.number, len(decimals), 64))
	if id := b.decimals(c.places); id != 0 {
		b.note(b.SetCellStyle(sheet, at, at, id))
	}
}

func (b *book) at(column, row int) string {
	name, err := excelize.CoordinatesToCellName(column, row)
	b.note(err)
	return name
}

// widen sets the width of a column in signs.
func (b *book) widen(sheet string, column int, width float64) {
	name, err := excelize.ColumnNumberToName(column)
	b.note(err)
	b.note(b.SetColWidth(sheet, name, name, width))
}

const (
	leastWidth, mostWidth = 9, 48 // of columns, in signs
	nameColumns           = 3     // make-up, title and tint stay in sight
	headRows              = 2     // keys and units
)

// basis writes the ratings of one basis.
func (b *book) basis(r Report, name string) {
	b.sheet(name)
	fields := r.fields()
	var named, total float64 // widths in signs of the columns that every page repeats, and of all
	for k, f := range fields {
		if k == 0 {
			f.unit = unitsOf
		}
		b.put(name, k+1, 1, word(f.key))
		b.put(name, k+1, 2, word(f.unit))
		long, row := max(width(f.key), width(f.unit)), headRows
		for i := range r.Ratings {
			if r.Ratings[i].Method.Basis.Name == name {
				row++
				c := f.cell(i)
				b.put(name, k+1, row, c)
				long = max(long, width(c.text))
			}
		}
		signs := float64(min(max(leastWidth, long+2), mostWidth))
		b.widen(name, k+1, signs)
		if total += signs; k < nameColumns {
			named = total
		}
	}
	b.note(b.SetCellStyle(name, "A1", b.at(len(fields), headRows), b.head))
	b.note(b.SetPanes(name, &excelize.Panes{Freeze: true, XSplit: nameColumns, YSplit: headRows,
		TopLeftCell: b.at(nameColumns+1, headRows+1), ActivePane: "bottomRight"}))
	b.note(b.SetDefinedName(&excelize.DefinedName{Name: "_xlnm.Print_Titles", Scope: name,
		RefersTo: fmt.Sprintf("'%s'!$A:$C,'%s'!$1:$%d", name, name, headRows)})) // quoted, for ISO15099 is a cell too
	b.printed(name, int(math.Ceil((total-named)/(signsAPage-named))))
}

// signsAPage are as many signs as a page of A4 is wide, at the smallest size that can be read; the
// columns that every page repeats leave most of them.
const signsAPage = 330

// printed sets how a sheet is printed: on A4, landscape, on so many pages side by side.
func (b *book) printed(sheet string, pages int) {
	paper, orientation, high, fit := 9, "landscape", 0, true // 9 is A4
	b.note(b.SetSheetProps(sheet, &excelize.SheetPropsOptions{FitToPage: &fit}))
	b.note(b.SetPageLayout(sheet, &excelize.PageLayoutOptions{Size: &paper, Orientation: &orientation, FitToWidth: &pages, FitToHeight: &high}))
}

// Widths on the sheet "about" in signs, heights in points.
const (
	aboutLabelWidth, aboutTextWidth = 36, 100
	fontSize, lineHeight            = 11, 15.5
	mostHeight                      = 400 // a row may have 409
)

// about writes what makes the sheets traceable.
func (b *book) about(r Report) {
	b.sheet(aboutSheet)
	row := 0
	line := func(label, text string) {
		if text == "" {
			return
		}
		row++
		b.put(aboutSheet, 1, row, word(label))
		b.put(aboutSheet, 2, row, word(text))
		lines := 1 + max(width(text)/aboutTextWidth, width(label)/aboutLabelWidth)
		b.note(b.SetRowHeight(aboutSheet, row, min(lineHeight*float64(lines), mostHeight)))
	}
	p := r.Project
	line("project", p.Title)
	line("author", p.Author)
	line("date", p.Date)
	line("client", p.Client)
	line("notes", p.Notes)
	line("panewright", r.Version)
	line("input_sha256", p.Digest)
	if r.InchPound {
		line("units", siRemains)
	}
	for _, x := range r.editions() {
		line("basis "+x.basis, x.editions)
	}
	line("why bases differ", r.BasesDiffer())
	for _, s := range r.ConditionsListed() {
		id, text, _ := strings.Cut(strings.ReplaceAll(s, "\u00a0", " "), ": ")
		line("condition "+id, text)
	}
	if shown := r.inSheets(); slices.ContainsFunc(shown, func(c Choice) bool { return ofComfort(c.Figure) }) {
		line("comfort", strings.ReplaceAll(r.PersonSaid(), "\u00a0", " "))
	}
	if r.stressShown() {
		line("thermal stress", strings.ReplaceAll(r.ScreeningSaid(), "\u00a0", " "))
	}
	for _, m := range r.makeups() {
		line("make-up "+m.ID, called(m)+": "+strings.ReplaceAll(r.buildUp(m), "\u00a0", " "))
		for _, t := range m.Typed {
			line(m.ID+", typed by the user: "+t.Name, t.Text)
		}
	}
	line("spectra", r.SpectraBy())
	for _, text := range r.CautionsOnce() {
		line("caution", text)
	}
	for _, c := range r.inSheets() {
		text := strings.TrimSpace(c.Head() + ": " + c.About())
		if c.Unit != "" {
			text += ", " + c.Unit
		}
		if s := r.clauses(c.Figure); s != "" {
			text += " (" + s + ")"
		}
		line(c.Path(), text)
	}
	b.note(b.SetCellStyle(aboutSheet, "A1", b.at(1, row), b.label))
	b.note(b.SetCellStyle(aboutSheet, "B1", b.at(2, row), b.wrap))
	b.widen(aboutSheet, 1, aboutLabelWidth)
	b.widen(aboutSheet, 2, aboutTextWidth)
	b.printed(aboutSheet, 1)
}

// clauses returns where a figure is defined under the bases of the ratings.
func (r Report) clauses(f glazing.Figure) string {
	var said []string // each once, with the bases that have it
	of := map[string][]string{}
	for i := range r.Ratings {
		b := r.Ratings[i].Method.Basis
		if clause := f.ClauseUnder(b); clause != "" {
			said, of[clause] = add(said, clause), add(of[clause], b.Name)
		}
	}
	if len(said) == 1 {
		return said[0]
	}
	for i, clause := range said {
		said[i] = "under " + strings.Join(of[clause], " and ") + " " + clause
	}
	return strings.Join(said, "; ")
}

// Where things stand on the sheet of spectra, and how much of it there is.
const (
	chartRow       = 3
	spectraHeadRow = 27
	spectraPlaces  = 4
	fromNM, toNM   = 300, 2500 // of the chart
	tickNM         = 200
	chartWidth     = 900 // pixels
	chartHeight    = 440
	// mostCurves are as many as can be told apart.
	mostCurves = 8
	// mostSpectra keeps the sheet small; a study has thousands of ratings.
	mostSpectra = 200
)

// spectra writes the spectra of the ratings of the first basis, and a chart of them.
func (b *book) spectra(r Report) {
	b.sheet(spectraSheet)
	var shown []int
	all := 0
	for i := range r.Ratings {
		if r.Ratings[i].Method.Basis.Name == r.bases()[0] {
			if all++; all <= mostSpectra {
				shown = append(shown, i)
			}
		}
	}
	first := spectraHeadRow + 2
	nm := r.Spectra[shown[0]].WavelengthNM
	last := first + len(nm) - 1
	put := func(column int, head, quantity string, values []float64, places int) {
		b.put(spectraSheet, column, spectraHeadRow, word(head))
		b.put(spectraSheet, column, spectraHeadRow+1, word(quantity))
		for k, v := range values {
			b.put(spectraSheet, column, first+k, number(v, places))
		}
		b.widen(spectraSheet, column, float64(min(max(leastWidth+2, width(head)+2), mostWidth)))
	}
	put(1, "wavelength", "nm", nm, -1)
	for k, i := range shown {
		rating, s := &r.Ratings[i], r.Spectra[i]
		name := strings.TrimSpace(rating.Makeup.ID + " " + rating.Tint)
		put(3*k+2, name, "τ", s.T, spectraPlaces)
		put(3*k+3, name, "ρ outside", s.RhoOutside, spectraPlaces)
		put(3*k+4, name, "ρ inside", s.RhoInside, spectraPlaces)
	}
	b.note(b.SetCellStyle(spectraSheet, b.at(1, spectraHeadRow), b.at(3*len(shown)+1, spectraHeadRow+1), b.head))

	// One rating is charted with its three curves, several with their transmittances.
	columns, named, quantity := []int{2, 3, 4}, spectraHeadRow+1, "fraction of one"
	said := "The chart shows transmittance and both reflectances."
	if len(shown) > 1 {
		columns, named, quantity = nil, spectraHeadRow, "transmittance τ, fraction of one"
		for k := range min(len(shown), mostCurves) {
			columns = append(columns, 3*k+2)
		}
		said = "The chart shows transmittances"
		if all > mostCurves {
			said += fmt.Sprintf(" of the first %d of %d ratings", mostCurves, all)
		}
		said += "."
	}
	if all > len(shown) {
		said += fmt.Sprintf(" The sheet has the spectra of the first %d of %d ratings.", len(shown), all)
	}
	b.put(spectraSheet, 1, 1, word("Spectra as combined under basis "+r.bases()[0]+", fractions of one, at normal incidence; an empty cell is beyond a pane's spectrum. "+said))
	b.chart(columns, named, first, last, quantity)
	b.printed(spectraSheet, 1)
}

// strokes are curves that differ in colour, in dash and in width, so that they can be told apart
// without colour. The colours are those of Okabe and Ito, for people who see red and green alike.
var strokes = [mostCurves]struct {
	colour string
	dash   excelize.LineDashType
	width  float64
}{
	{"0072B2", excelize.LineDashSolid, 2.25}, {"D55E00", excelize.LineDashDash, 2.25},
	{"009E73", excelize.LineDashSysDot, 2.25}, {"CC79A7", excelize.LineDashLgDashDot, 2.25},
	{"000000", excelize.LineDashSolid, 1}, {"56B4E9", excelize.LineDashLgDash, 1.25},
	{"E69F00", excelize.LineDashSysDash, 1.25}, {"7F7F7F", excelize.LineDashLgDashDotDot, 1.25},
}

// chart draws columns of the sheet of spectra over the wavelengths; a row has the names.
func (b *book) chart(columns []int, named, first, last int, quantity string) {
	cells := func(column, from, to int) string {
		name, err := excelize.ColumnNumberToName(column)
		b.note(err)
		if from == to {
			return fmt.Sprintf("%s!$%s$%d", spectraSheet, name, from)
		}
		return fmt.Sprintf("%s!$%s$%d:$%s$%d", spectraSheet, name, from, name, to)
	}
	var series []excelize.ChartSeries
	for k, column := range columns {
		s := strokes[k]
		series = append(series, excelize.ChartSeries{
			Name: cells(column, named, named), Categories: cells(1, first, last), Values: cells(column, first, last),
			Fill:   excelize.Fill{Type: "pattern", Pattern: 1, Color: []string{s.colour}}, // the colour of the line
			Line:   excelize.LineOptions{Type: excelize.LineSolid, Width: s.width, Dash: s.dash},
			Marker: excelize.ChartMarker{Symbol: "none"},
		})
	}
	title := func(s string) excelize.ChartTitle {
		return excelize.ChartTitle{Paragraph: []excelize.RichTextRun{{Text: s, Font: &excelize.Font{Size: 10}}}}
	}
	labels := excelize.Font{Color: "404040", Size: 9}
	bound := func(v float64) *float64 { return &v }
	b.note(b.AddChart(spectraSheet, b.at(1, chartRow), &excelize.Chart{
		Type: excelize.Scatter, Series: series,
		Dimension: excelize.ChartDimension{Width: chartWidth, Height: chartHeight},
		Legend:    excelize.ChartLegend{Position: "right"},
		XAxis: excelize.ChartAxis{Minimum: bound(fromNM), Maximum: bound(toNM), MajorGridLines: true, Font: labels,
			NumFmt: excelize.ChartNumFmt{CustomNumFmt: "0"}, Title: title("wavelength, nm")},
		YAxis: excelize.ChartAxis{Minimum: bound(0), Maximum: bound(1), MajorUnit: 0.1, MajorGridLines: true, Font: labels,
			NumFmt: excelize.ChartNumFmt{CustomNumFmt: "0.0"}, Title: title(quantity)},
		ShowBlanksAs: "gap",
	}))
	b.mend()
}

// mend corrects the chart as the library writes it: wavelengths are numbers and not names; their
// axis is one of numbers, with a step; and a text frame without text would lay the title of the
// upright axis flat.
func (b *book) mend() {
	wrong := strings.NewReplacer(
		"<xVal><strRef>", "<xVal><numRef>", "</strRef></xVal>", "</numRef></xVal>",
		`<auto val="1"></auto><lblAlgn val="ctr"></lblAlgn><lblOffset val="100"></lblOffset><noMultiLvlLbl val="0"></noMultiLvlLbl></valAx>`,
		fmt.Sprintf(`<crossBetween val="midCat"></crossBetween><majorUnit val="%d"></majorUnit></valAx>`, tickNM),
		`<txPr><a:bodyPr anchorCtr="false" rot="0" spcFirstLastPara="false"></a:bodyPr><a:p></a:p></txPr></title>`, "</title>")
	b.Pkg.Range(func(path, content any) bool {
		if xml, ok := content.([]byte); ok && strings.HasPrefix(path.(string), "xl/charts/chart") {
			b.Pkg.Store(path, []byte(wrong.Replace(string(xml))))
		}
		return true
	})
}

// plain returns a text as a cell can hold it: without the control characters that XML does not
// know, cut, with a note, where it is too long, and with an underscore escaped where spreadsheets
// would read _x0041_ as the letter of that number.
func plain(s string) string {
	s = strings.Map(func(c rune) rune {
		if c < ' ' && c != '\t' && c != '\n' && c != '\r' || c == 0xFFFE || c == 0xFFFF {
			return '\uFFFD'
		}
		return c
	}, strings.ToValidUTF8(s, "\uFFFD"))
	if units := utf16.Encode([]rune(s)); len(units) > excelize.TotalCellChars {
		note := fmt.Sprintf("… (cut; %d characters in all)", len(units))
		keep := excelize.TotalCellChars - len(utf16.Encode([]rune(note)))
		s = strings.TrimSuffix(string(utf16.Decode(units[:keep])), "\uFFFD") + note
	}
	const form = "_x0041_"
	for at := len(s) - len(form); at >= 0; at-- {
		if part := s[at : at+len(form)]; part[:2] == "_x" && part[6] == '_' {
			if _, err := strconv.ParseUint(part[2:6], 16, 16); err == nil {
				s = s[:at] + "_x005F" + s[at:]
			}
		}
	}
	return s
}
