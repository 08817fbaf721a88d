package spectra

// Where in a foreign text the rows of numbers are, and that none is lost beside them.

import (
	"fmt"
	"regexp"
	"strconv"
	"strings"
)

// A body is the rows of numbers of a file, under one separator.
type body struct {
	separator   rune
	cells       int  // in each row
	rows        int  // how many there are
	first, last int  // the lines of the first and the last, counted from 0
	commas      bool // whether commas separate that may as well be decimal
}

// separators are those that can be told from the rows.
var separators = [...]rune{';', '\t', ',', ' '}

// body finds the rows of numbers, under the separator that gives most of them.
func (f *foreign) body() (best body) {
	for _, s := range separators {
		if f.Separator == 0 && !(s == ',' && f.DecimalComma && !f.quoted) {
			if t := f.bodyUnder(s); t.rows > best.rows {
				best = t
			}
		}
	}
	if f.Separator != 0 {
		return f.bodyUnder(f.Separator)
	}
	return best
}

// bodyUnder finds the rows of as many cells as the longest run of rows has.
func (f *foreign) bodyUnder(separator rune) body {
	counts := make([]int, len(f.lines)) // cells of each row; 0 where a line is none
	longest, run, cells := 0, 0, 0
	for i, line := range f.lines {
		if row := split(line.text, separator); f.isRow(row) {
			counts[i] = len(row)
		}
		if i == 0 || counts[i] != counts[i-1] {
			run = 0
		}
		if run++; counts[i] > 0 && run > longest {
			longest, cells = run, counts[i]
		}
	}
	t := body{separator: separator, cells: cells, commas: separator == ',' && cells > 2 && !f.DecimalComma}
	if cells == 0 {
		return t
	}
	for i, n := range counts {
		if n != cells {
			continue
		}
		if t.rows == 0 {
			t.first = i
		}
		t.last = i
		t.rows++
		t.commas = t.commas && !strings.Contains(f.lines[i].text, ".")
	}
	// a line beside the rows that begins like one is meant to be one
	like := func(i int) bool {
		row := split(f.lines[i].text, separator)
		return len(row) == cells && f.begins(row)
	}
	for t.first > 0 && like(t.first-1) {
		t.first--
	}
	for t.last < len(f.lines)-1 && like(t.last+1) {
		t.last++
	}
	return t
}

// begins reports whether a row has a number in the place of the wavelength.
func (f *foreign) begins(row []string) bool {
	at := f.at()
	if at >= len(row) {
		return false
	}
	_, problem := f.plain(row[at])
	return problem == ""
}

// at returns the place of the wavelength, counted from 0.
func (f *foreign) at() int {
	if f.places == nil {
		return 0
	}
	return f.places[Wavelength] - 1
}

// isRow reports whether cells are a row of numbers: a wavelength and at least one value, and nothing
// else in the columns that are used, which are all while nothing is known of them.
func (f *foreign) isRow(cells []string) bool {
	return len(cells) <= maxColumns && f.begins(cells) && f.hasValues(cells)
}

// hasValues reports whether the cells beside the wavelength are values, and any of them is not blank.
func (f *foreign) hasValues(cells []string) bool {
	values := 0
	isValue := func(cell string) bool {
		if cell == "" || cell == missingCell {
			return true
		}
		_, problem := f.quantity(cell)
		values++
		return problem == ""
	}
	if f.places == nil {
		for _, cell := range cells[1:] {
			if !isValue(cell) {
				return false
			}
		}
		return values > 0
	}
	for _, head := range LayoutColumns()[1:] {
		if n := f.places[head]; n > len(cells) || n > 0 && !isValue(cells[n-1]) {
			return false
		}
	}
	return values > 0
}

// strayRows is how many lines may look like rows under another layout and be left at that.
const strayRows = 2

// otherwise says which other layout would make rows of the file, or more of them, or returns ""
// where the body that was found is the best.
func (f *foreign) otherwise(t body) string {
	other := *f
	if other.DecimalComma = !f.DecimalComma; other.Separator == ',' {
		other.Separator = 0
	}
	if more := other.body(); more.rows > t.rows+strayRows || t.rows == 0 && more.rows > 0 {
		with, hint := "decimal commas", "add --decimal-comma"
		if f.DecimalComma {
			with, hint = "decimal points", "leave --decimal-comma out"
		}
		return fmt.Sprintf("%s of numbers, and %d with %s, the first in line %d: %s", plural(t.rows, "row"), more.rows, with, f.lines[more.first].number, hint)
	}
	if t.rows > 0 {
		return ""
	}
	other = *f
	other.Separator = 0
	if more := other.body(); more.rows > 0 {
		return fmt.Sprintf("no row of numbers separated by %s; in line %d they are by %s", separatorName(f.Separator), f.lines[more.first].number, separatorName(more.separator))
	}
	other.places = nil
	if more := other.body(); more.rows > 0 {
		return fmt.Sprintf("no row has numbers in the columns that were named; line %d has %s", f.lines[more.first].number, plural(more.cells, "column"))
	}
	return "no row of numbers, such as a wavelength and a transmittance"
}

// quotedComma finds a number with a decimal comma in quotes.
var quotedComma = regexp.MustCompile(`"\s*[+-]?[0-9]*,[0-9]+[^",]*"`)

// leftOut refuses to leave out what seems to be data: a line above or below the rows that has as many
// cells and digits in the place of the wavelength, and rows of another number of cells.
func (f *foreign) leftOut(t body) {
	at := f.at()
	var others []int // lines that are rows of other numbers of cells
	for i, line := range f.lines {
		if i >= t.first && i <= t.last {
			continue
		}
		row := split(line.text, t.separator)
		switch {
		case f.isRow(row):
			others = append(others, i)
		case len(row) != t.cells || !strings.ContainsAny(row[at], "0123456789"):
		case i > t.last:
			f.fail(line.number, 0, "%q stands after the last row of numbers, which is line %d, and has digits where those have the wavelength%s; if it is no row, take it out",
				clip(line.text), f.lines[t.last].number, f.thousands(row[at]))
		case row[at][0] >= '0' && row[at][0] <= '9' && f.hasValues(row): // heads are freer than that
			f.fail(line.number, 0, "%q stands before the first row of numbers, which is line %d, and has digits where those have the wavelength%s; if it is no row, take it out",
				clip(line.text), f.lines[t.first].number, f.thousands(row[at]))
		}
	}
	for _, i := range others {
		if row := split(f.lines[i].text, t.separator); len(others) > strayRows || i == t.last+1 {
			f.fail(f.lines[i].number, 0, "%q has %s, where the rows of lines %d to %d have %d; which are the spectrum? take the others out",
				clip(f.lines[i].text), plural(len(row), "cell"), f.lines[t.first].number, f.lines[t.last].number, t.cells)
		}
	}
}

// The signs that some programs put between thousands, and their names.
var thousandsSigns = [...]struct{ sign, name string }{
	{".", "a thousands point"}, {",", "a thousands comma"}, {"'", "an apostrophe between thousands"}, {"\u2019", "an apostrophe between thousands"},
	{" ", "a blank between thousands"}, {"\u00a0", "a blank between thousands"}, {"\u202f", "a blank between thousands"},
}

// thousands says, for the end of a message, that a cell may be a wavelength with a sign between its
// thousands, or returns "".
func (f *foreign) thousands(cell string) string {
	for _, s := range thousandsSigns {
		parts := strings.Split(cell, s.sign)
		last := &parts[len(parts)-1]
		decimals := "."
		if f.DecimalComma {
			decimals = ","
		}
		if decimals != s.sign {
			*last, _, _ = strings.Cut(*last, decimals)
		}
		ok := len(parts) > 1 && len(parts[0]) <= 3 && isDigits(parts[0]) && parts[0][0] != '0'
		for _, p := range parts[1:] {
			ok = ok && len(p) == 3 && isDigits(p)
		}
		whole := strings.Join(parts, "")
		if v, _ := strconv.ParseFloat(whole, 64); ok && f.nanometres(v) >= foreignFirstNM && f.nanometres(v) <= thousandsLastNM {
			return fmt.Sprintf("; %s? write %s", s.name, whole)
		}
	}
	return ""
}

// thousandsLastNM is up to where a number with a sign between its thousands may be a wavelength.
const thousandsLastNM = 1e5

func isDigits(s string) bool { return s != "" && strings.Trim(s, "0123456789") == "" }
