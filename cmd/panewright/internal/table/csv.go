package table

// CSV: one row a rating, one column a figure. The spreadsheet has the same columns.

import (
	"bytes"
	"encoding/csv"
	"strings"
	"unicode"

	"panewright/glazing"
)

// CSVForm is how CSV is written.
type CSVForm struct {
	Separator    rune // between cells; 0 means a comma
	DecimalComma bool
	UnitsRow     bool // a second row has the units
	// ByteOrderMark begins the file, for spreadsheets that take UTF-8 for something else without it.
	ByteOrderMark bool
}

// A field is one column of CSV and of a sheet.
type field struct {
	key, unit string
	cell      func(i int) cell // of rating i
}

// unitsOf stands in the first cell of the row of units; no id of a make-up looks like it.
const unitsOf = "(unit)"

// fields returns the columns: what is rated, figures, what the user typed, what makes a row
// traceable.
func (r Report) fields() []field {
	of := func(key string, text func(rating *glazing.Rating) string) field {
		return field{key: key, cell: func(i int) cell { return word(text(&r.Ratings[i])) }}
	}
	of1 := func(key, text string) field { return of(key, func(*glazing.Rating) string { return text }) }
	list := []field{
		of("makeup", func(rating *glazing.Rating) string { return rating.Makeup.ID }),
		of("title", func(rating *glazing.Rating) string { return rating.Makeup.Title }),
		of("tint", func(rating *glazing.Rating) string { return rating.Tint }),
		of("basis", func(rating *glazing.Rating) string { return rating.Method.Basis.Name }),
		{"tilt_deg", "°", func(i int) cell { return number(r.Ratings[i].Makeup.Tilt.Degrees(), -1) }},
	}
	for _, c := range r.inSheets() {
		list = append(list, field{c.Path(), c.Unit, func(i int) cell { return c.cell(&r.Ratings[i]) }})
	}
	for _, name := range r.typedNames() {
		list = append(list, of("typed_by_user."+name, func(rating *glazing.Rating) string { return rating.Makeup.TypedText(name) }))
	}
	return append(list,
		of("origins", func(rating *glazing.Rating) string { return originsOf(rating.Makeup) }),
		of("conditions", func(rating *glazing.Rating) string { return r.conditionsOf(rating) }),
		field{key: "cautions", cell: func(i int) cell { return word(r.codes(i)) }},
		of("editions", func(rating *glazing.Rating) string { return rating.Method.Editions() }),
		of1("project", r.Project.Title), of1("author", r.Project.Author), of1("date", r.Project.Date),
		of1("input_sha256", r.Project.Digest), of1("panewright", r.Version))
}

// typedNames returns the names of all values that the user typed.
func (r Report) typedNames() (names []string) {
	for _, m := range r.makeups() {
		for _, t := range m.Typed {
			names = add(names, t.Name)
		}
	}
	return names
}

// originsOf returns the origin of the spectrum of each pane of a make-up.
func originsOf(m *glazing.Makeup) string {
	var parts []string
	for _, p := range m.Panes {
		parts = add(parts, p.Pane.ID+": "+string(p.Pane.Origin))
	}
	return strings.Join(parts, "; ")
}

// conditionsOf returns the conditions of a rating in words, and those for which its thermal stress was
// screened.
func (r Report) conditionsOf(rating *glazing.Rating) string {
	var parts []string
	for i := range rating.Balances {
		c := rating.Balances[i].Condition
		parts = append(parts, c.ID+": "+r.ConditionText(c))
	}
	if r.stressShown() {
		for _, c := range rating.Method.Screened() {
			if rating.Balance(c.ID) == nil {
				parts = append(parts, c.ID+", screened for thermal stress: "+r.ConditionText(&c))
			}
		}
	}
	return strings.ReplaceAll(strings.Join(parts, " | "), "\u00a0", " ")
}

// codes returns the codes of the cautions of a rating.
func (r Report) codes(i int) string {
	var codes []string
	for _, c := range r.cautions(i) {
		codes = add(codes, c.Code)
	}
	return strings.Join(codes, " ")
}

// CSV returns the report as CSV in UTF-8, after a byte-order mark if asked for: a row of keys, a row of units if asked for, then one row
// a rating. Numbers have all their digits, as JSON has them; what is not known is an empty cell.
// Lines end with a line feed. A text that a spreadsheet would take for a formula has an apostrophe
// put before it.
func CSV(r Report, form CSVForm) ([]byte, error) {
	return form.write(r.fields(), len(r.Ratings))
}

// write writes a row for each of n ratings.
func (form CSVForm) write(fields []field, n int) ([]byte, error) {
	var b bytes.Buffer
	if form.ByteOrderMark {
		b.WriteRune('\uFEFF')
	}
	w := csv.NewWriter(&b)
	if form.Separator != 0 {
		w.Comma = form.Separator
	}
	var keys, units []string
	for i, f := range fields {
		keys = append(keys, guarded(f.key))
		if i == 0 {
			f.unit = unitsOf
		}
		units = append(units, f.unit)
	}
	rows := [][]string{keys}
	if form.UnitsRow {
		rows = append(rows, units)
	}
	for i := range n {
		row := make([]string, len(fields))
		for k, f := range fields {
			row[k] = form.print(f.cell(i))
		}
		rows = append(rows, row)
	}
	err := w.WriteAll(rows)
	return b.Bytes(), err
}

// print writes a cell as CSV has it.
func (form CSVForm) print(c cell) string {
	switch {
	case !c.numeric:
		return guarded(c.text)
	case form.DecimalComma:
		return strings.Replace(figure(c.number), ".", ",", 1)
	}
	return figure(c.number)
}

// guarded puts an apostrophe before a text that a spreadsheet would take for a formula: one whose
// first sign, after any blanks and signs that do not show, is = + - @, also in their wide forms, or
// that has a tab or a carriage return there.
func guarded(s string) string {
	for _, c := range s {
		switch {
		case strings.ContainsRune("=+-@＝＋－＠\t\r", c):
			return "'" + s
		case !unicode.IsSpace(c) && !unicode.Is(unicode.Cf, c) && !unicode.IsControl(c):
			return s
		}
	}
	return s
}
