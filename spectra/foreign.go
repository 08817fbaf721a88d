package spectra

// The reader of text that instruments and spreadsheets write: what the user says of its layout is
// taken, what can be told from the rows is told, and all of it is said.

import (
	"bytes"
	"fmt"
	"io"
	"slices"
	"strconv"
	"strings"
)

// maxLines is how many lines of a foreign file are looked at.
const maxLines = 1 << 20

// ReadForeign reads a text of rows of numbers after some lines of anything, as instruments write
// it. Rows may run from long to short wavelengths; a cell may be blank where a column stops, and ?
// where a value is missing. Nothing is guessed in silence: understood lists in words all that was
// taken for granted or told from the rows, also where there is an error. The bounds are those of
// ReadCSV. An error is Errors, or that of r.
func ReadForeign(r io.Reader, file string, l Layout) (c Columns, understood []string, err error) {
	if problem := l.Check(); problem != "" {
		return Columns{}, nil, Errors{{File: file, Text: problem}}
	}
	text, err := readText(r, file)
	if err != nil {
		return Columns{}, nil, err
	}
	if n := bytes.Count(text, []byte("\n")); n > maxLines {
		return Columns{}, nil, Errors{{File: file, Text: fmt.Sprintf("%d lines; a spectrum has some thousand", n)}}
	}
	f := &foreign{Layout: l, rows: rows{file: file, comments: commentsOf(text)}, quoted: quotedComma.Match(text)}
	f.faults.most = maxFaults
	n := 0
	for line := range strings.Lines(string(text)) {
		if n++; strings.TrimSpace(line) != "" {
			f.lines = append(f.lines, numbered{n, strings.TrimRight(line, "\r\n")})
		}
	}
	c = f.columns()
	if f.faults.any() {
		return Columns{}, f.understood, f.faults.errors().byLine()
	}
	return c, f.understood, nil
}

// foreign is a file in the course of being read.
type foreign struct {
	Layout
	rows
	lines      []numbered     // those that are not blank
	places     map[string]int // of the quantities, counted from 1, once they are known
	understood []string
	percent    bool // whether it was said that values look like per cent
	quoted     bool // whether numbers with commas stand in quotes, so that a comma may separate as well
}

type numbered struct {
	number int // counted from 1
	text   string
}

func (f *foreign) say(format string, args ...any) {
	f.understood = append(f.understood, fmt.Sprintf(format, args...))
}

// columns reads the file in the order in which a person would: where the rows are, what separates
// their cells, what the columns are, the numbers. What is wrong stands in faults.
func (f *foreign) columns() (c Columns) {
	switch {
	case len(f.lines) == 0:
		f.fail(0, 0, "is empty")
		return c
	case f.Separator == ',' && f.DecimalComma && !f.quoted:
		f.fail(0, 0, "a comma cannot both separate cells and stand in numbers, unless such numbers are in quotes")
		return c
	case len(f.Columns) > 0:
		f.places = f.placed()
	}
	t := f.body()
	if hint := f.otherwise(t); hint != "" {
		f.fail(0, 0, "%s", hint)
		return c
	}
	first, last := f.lines[t.first], f.lines[t.last]
	if n := first.number - 1; n > 0 {
		before := ""
		if t.first > 0 {
			before = fmt.Sprintf("; the last that is not blank reads %q", clip(f.lines[t.first-1].text))
		}
		f.say("skipped %s before the first row of numbers%s", plural(n, "line"), before)
	}
	if t.commas && f.Separator == 0 {
		f.fail(first.number, 0, "%q: commas stand between digits, and no number has a point: if they are decimal, say --decimal-comma and the --separator; if they separate, say --separator ,", clip(first.text))
		return c
	}
	told := ""
	if f.Separator == 0 {
		told = ", told from the rows"
	}
	f.say("cells are separated by %s%s", separatorName(t.separator), told)
	if f.DecimalComma {
		f.say("numbers have decimal commas")
	}
	if problem := f.identify(t); problem != "" {
		f.fail(first.number, 0, "%s", problem)
		return c
	}
	f.gather(t)
	f.leftOut(t)
	if f.faults.any() {
		return c
	}
	if n := len(f.lines) - 1 - t.last; n > 0 {
		f.say("left out %s after the last row of numbers, which is line %d; the first of them reads %q", plural(n, "line"), last.number, clip(f.lines[t.last+1].text))
	}
	if f.wavelengths(); f.faults.any() {
		return c
	}
	f.read = f.quantity
	c = Columns{
		Tau:      f.column(headTau, f.fraction),
		RhoFront: f.column(headRhoFront, f.fraction),
		RhoBack:  f.column(headRhoBack, f.fraction),
		Comments: f.comments,
	}
	if f.faults.any() {
		return c
	}
	f.say("%s of numbers, %s to %s nm", plural(len(f.nm), "row"), shortNM(f.nm[0]), shortNM(f.nm[len(f.nm)-1]))
	largest := 0.0
	for _, x := range c.named() {
		largest = max(largest, slices.Max(x.Value))
	}
	if f.Percent && largest <= 0.01 {
		f.say("no value is above 1 per cent: if the file has fractions of one, leave --percent out")
	}
	return c
}

// identify settles what the columns are and says it, or returns why it cannot.
func (f *foreign) identify(t body) (problem string) {
	used := make([]bool, t.cells) // whether anything stands in a column
	for i := range used {
		used[i] = slices.ContainsFunc(f.lines[t.first:t.last+1], func(line numbered) bool {
			row := split(line.text, t.separator)
			return i < len(row) && row[i] != ""
		})
	}
	var filled []int // the places of those columns, counted from 1
	for i := range used {
		if used[i] {
			filled = append(filled, i+1)
		}
	}
	unit := f.Unit
	switch {
	case f.places != nil:
	case t.first > 0 && f.headed(split(f.lines[t.first-1].text, t.separator), t.cells):
		f.say("the line before the first row has the heads of the columns")
	case len(filled) == 2 && f.Second != "":
		f.places = map[string]int{Wavelength: filled[0], f.Second: filled[1]}
	case len(filled) == 2:
		return fmt.Sprintf("column %d may be tau, rho_front or rho_back: say which, such as --columns wavelength=%d,tau=%d", filled[1], filled[0], filled[1])
	default:
		return fmt.Sprintf("%s, and nothing says which is which: name them, such as --columns wavelength=1,tau=2,rho_front=3", plural(len(filled), "column"))
	}
	scale := "fractions of one"
	if f.Percent {
		scale = "per cent, divided by 100"
	}
	var left []string
	for i := range used {
		head := ""
		for _, h := range LayoutColumns() {
			if f.places[h] == i+1 {
				head = h
			}
		}
		switch {
		case head == "" && used[i]:
			left = append(left, strconv.Itoa(i+1))
		case head == "":
		case head != Wavelength:
			f.say("column %d is %s, %s", i+1, head, scale)
		case f.Unit == UnitReciprocal:
			f.say("column %d is the wavenumber in 1/cm; 10 000 000 divided by it is the wavelength in nm", i+1)
		case f.Unit == "":
			f.say("column %d is the wavelength in nm, as no unit was given", i+1)
		default:
			told := ""
			if unit == "" {
				told = ", as its head says"
			}
			f.say("column %d is the wavelength in %s%s", i+1, strings.Replace(f.Unit, UnitUM, "µm", 1), told)
		}
	}
	switch {
	case len(left) == 1:
		f.say("column %s is left out", left[0])
	case len(left) > 1:
		f.say("columns %s are left out", strings.Join(left, ", "))
	}
	return ""
}

// headed reads heads as our own CSV has them; it returns false where any is another, or stands over
// no cells.
func (f *foreign) headed(heads []string, cells int) bool {
	places, unit := map[string]int{}, f.Unit
	for i, head := range heads {
		switch head = strings.ToLower(head); head {
		case "":
			continue
		case headNM, headUM:
			if unit == "" {
				unit = strings.TrimPrefix(head, Wavelength+"_")
			}
			head = Wavelength
		case Wavelength, headTau, headRhoFront, headRhoBack:
		default:
			return false
		}
		if places[head] > 0 || i >= cells {
			return false
		}
		places[head] = i + 1
	}
	if places[Wavelength] == 0 || len(places) < 2 {
		return false
	}
	f.places, f.Unit = places, unit
	return true
}

// maxFaults is after how many faults of different kinds nothing more is looked at.
const maxFaults = 100

// gather takes the cells of the columns that are used from the lines of the body.
func (f *foreign) gather(t body) {
	for _, head := range LayoutColumns() {
		if f.places[head] > 0 {
			f.heads = append(f.heads, head)
		}
	}
	for _, line := range f.lines[t.first : t.last+1] {
		row := split(line.text, t.separator)
		switch ok := f.begins(row); {
		case f.faults.full():
			return
		case !ok:
			hint := ""
			if at := f.places[Wavelength] - 1; at < len(row) {
				hint = f.thousands(row[at])
			}
			f.fail(line.number, 0, "%q between rows of numbers, which begin in line %d%s", clip(line.text), f.lines[t.first].number, hint)
		case len(row) != t.cells:
			f.fail(line.number, 0, "%s where the other rows have %d", plural(len(row), "cell"), t.cells)
		default:
			f.line = append(f.line, line.number)
			for _, head := range f.heads {
				f.cells = append(f.cells, row[f.places[head]-1])
			}
		}
	}
	if len(f.line) < minimumRows && !f.faults.any() {
		f.fail(0, 0, "%s of numbers; a spectrum has at least %d", plural(len(f.line), "row"), minimumRows)
	}
}

// The range of wavelengths, in nm, beyond which the unit is in doubt.
const (
	foreignFirstNM = leastLastNM
	foreignLastNM  = 1e6
)

// wavelengths reads the wavelengths of the rows, turns rows that run from long to short, and checks
// that each goes further than the one before.
func (f *foreign) wavelengths() {
	for i, line := range f.line {
		cell := f.cell(i, 0)
		v, _ := f.plain(cell) // a number, as the row is one
		nm := f.nanometres(v)
		if f.nm = append(f.nm, nm); v > 0 && nm >= foreignFirstNM && nm <= foreignLastNM {
			continue
		}
		f.fail(line, 0, "wavelength %q: not from %d nm to 1 mm; is the unit right? --unit is one of %s%s", clip(cell), foreignFirstNM, strings.Join(LayoutUnits(), ", "), f.thousands(cell))
		return
	}
	if f.nm[0] > f.nm[len(f.nm)-1] {
		f.say("rows run from long to short wavelengths and were turned")
		slices.Reverse(f.nm)
		slices.Reverse(f.line)
		n := len(f.heads)
		turned := make([]string, 0, len(f.cells))
		for i := len(f.cells) - n; i >= 0; i -= n {
			turned = append(turned, f.cells[i:i+n]...)
		}
		f.cells = turned
	}
	for i := 1; i < len(f.nm); i++ {
		switch {
		case f.nm[i] == f.nm[i-1]:
			f.fail(f.line[i], f.nm[i], "this wavelength stands twice, also in line %d", f.line[i-1])
		case f.nm[i] < f.nm[i-1]:
			f.fail(f.line[i], f.nm[i], "wavelengths go to and fro; line %d has %s nm%s", f.line[i-1], shortNM(f.nm[i-1]), f.thousands(f.cell(i, 0)))
		}
	}
}

// fraction is the check of a value; that values look like per cent is said once.
func (f *foreign) fraction(v float64) string {
	problem := fraction(v)
	switch {
	case problem == "" || f.Percent && v < 0:
		return problem
	case f.Percent:
		return "above 100 per cent"
	case v > 1 && v <= 100+100*Slack && f.percent:
		return ""
	case v > 1 && v <= 100+100*Slack:
		f.percent = true
		return "not in 0..1; in per cent? add --percent"
	}
	return problem
}
