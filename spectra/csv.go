package spectra

// The CSV reader: columns of one file, each checked by itself.

import (
	"bytes"
	"encoding/csv"
	"errors"
	"fmt"
	"io"
	"math"
	"slices"
	"strconv"
	"strings"
)

// A Column is one quantity of a spectrum file: the curve, and for each point the line that it
// was read from.
type Column struct {
	File string
	Line []int
	Curve
}

// Columns are the quantities of one spectrum file; a column that the file lacks is empty.
type Columns struct {
	Tau, RhoFront, RhoBack Column
	Comments               []string // the first lines of comment of the file, clipped
}

// The heads that a spectrum file may have.
const (
	headNM       = "wavelength_nm"
	headUM       = "wavelength_um"
	headTau      = "tau"
	headRhoFront = "rho_front"
	headRhoBack  = "rho_back"
)

// ReadCSV reads a spectrum of a pane: a header row, columns in any order (wavelength_nm or
// wavelength_um, tau, rho_front, rho_back; fractions of one), lines beginning with # as
// comments, blank cells where a column stops, ? for a value that is missing between others. The
// file name serves errors only. It checks what can be checked in each column; Join checks them
// together. An error is Errors, or that of r.
func ReadCSV(r io.Reader, file string) (Columns, error) {
	rows, err := readRows(r, file, minimumRows, true)
	if err != nil {
		return Columns{}, err
	}
	c := Columns{
		Tau:      rows.column(headTau, fraction),
		RhoFront: rows.column(headRhoFront, fraction),
		RhoBack:  rows.column(headRhoBack, fraction),
		Comments: rows.comments,
	}
	for _, head := range rows.heads {
		if head != "" && !slices.Contains([]string{headNM, headUM, headTau, headRhoFront, headRhoBack}, head) {
			rows.fail(rows.headLine, 0, "unknown column %q; a spectrum has wavelength_nm or wavelength_um, tau, rho_front, rho_back", clip(head))
		}
	}
	if c.Tau.Len()+c.RhoFront.Len()+c.RhoBack.Len() == 0 && !rows.faults.any() {
		rows.fail(rows.headLine, 0, "no column tau, rho_front or rho_back")
	}
	return c, rows.faults.err()
}

// ReadSunCSV reads a solar spectrum: columns wavelength_nm or wavelength_um and irradiance, or
// irradiance with its unit, such as irradiance_w_m2_nm (any unit per wavelength; only the shape
// counts). It returns the weighting by the trapezoid rule within 300–2500 nm.
func ReadSunCSV(r io.Reader, file string) (Weighting, error) {
	rows, err := readRows(r, file, minimumRows, false)
	if err != nil {
		return Weighting{}, err
	}
	var c Column
	for _, head := range rows.heads {
		switch {
		case head == headNM || head == headUM:
		case strings.HasPrefix(head, "irradiance") && c.Len() == 0:
			c = rows.column(head, notNegative)
		default:
			rows.fail(rows.headLine, 0, "unknown column %q; a sun has wavelength_nm or wavelength_um, and irradiance", clip(head))
		}
	}
	for _, g := range c.Gaps {
		rows.fail(0, g.FromNM, "values are missing (?) from here to %s nm; a sun needs them all", short(g.ToNM))
	}
	if err := rows.faults.err(); err != nil {
		return Weighting{}, err
	}
	w := Trapezoid(c.Curve, SolarFirstNM, SolarLastNM)
	if sum := total(w.Weight); sum <= 0 || math.IsInf(sum, 0) {
		rows.fail(rows.headLine, 0, "the column irradiance adds to nothing between %d and %d nm", SolarFirstNM, SolarLastNM)
		return Weighting{}, rows.faults.err()
	}
	w.Name, w.Source = "solar", "the user's "+file+", trapezoid rule"
	return w, nil
}

// rows is a file read as text: heads, and for each row its line and cells.
type rows struct {
	file     string
	least    int // rows that there must be
	heads    []string
	headLine int
	line     []int                                         // of each row
	nm       []float64                                     // of each row
	cells    []string                                      // row after row
	read     func(cell string) (v float64, problem string) // nil: number
	comments []string                                      // the first of the file
	faults   faultList
}

func (r *rows) fail(line int, nm float64, format string, args ...any) {
	r.faults.add(&RowError{r.file, line, nm, fmt.Sprintf(format, args...)})
}

// cell returns the text of a row under a head.
func (r *rows) cell(row, column int) string { return r.cells[row*len(r.heads)+column] }

// readRows reads header, wavelengths and cells, and checks the wavelengths. Faults that leave
// the rows unreadable are returned; others are kept in faults. least is how many rows there must
// be; converts says that panewright spectrum turns other layouts into such a file.
func readRows(in io.Reader, file string, least int, converts bool) (*rows, error) {
	r := &rows{file: file, least: least}
	text, err := readText(in, file)
	if err != nil {
		return nil, err
	}
	if bytes.HasPrefix(bytes.TrimSpace(text), []byte("##TITLE")) {
		r.fail(0, 0, "is JCAMP-DX, and CSV is needed here")
		return nil, r.faults.err()
	}
	r.comments = commentsOf(text)
	cr := csv.NewReader(bytes.NewReader(text))
	cr.Comment, cr.FieldsPerRecord, cr.TrimLeadingSpace, cr.ReuseRecord = '#', -1, true, true
	for {
		record, err := cr.Read()
		if err == io.EOF {
			break
		}
		if err != nil {
			line := 0
			if pe, ok := errors.AsType[*csv.ParseError](err); ok {
				line, err = pe.Line, pe.Err
			}
			r.fail(line, 0, "not readable as CSV: %v", err)
			return nil, r.faults.err()
		}
		line, _ := cr.FieldPos(0)
		for i := range record {
			record[i] = strings.TrimSpace(record[i])
		}
		if strings.HasPrefix(record[0], "#") {
			continue // a comment after a blank, or in quotes as spreadsheets write it
		}
		if r.heads == nil {
			r.heads, r.headLine = slices.Clone(record), line
			if problem := notHeads(record); problem != "" {
				if converts {
					problem += wayFrom(record, text)
				}
				r.fail(line, 0, "%s", problem)
				return nil, r.faults.err()
			}
			lines := bytes.Count(text, []byte("\n"))
			r.line, r.cells = make([]int, 0, lines), make([]string, 0, lines*len(record))
			continue
		}
		if !slices.ContainsFunc(record, func(cell string) bool { return cell != "" }) {
			continue
		}
		if len(record) != len(r.heads) {
			hint := ""
			if len(record) > len(r.heads) {
				hint = "; a decimal comma? write points"
			}
			r.fail(line, 0, "%d cells under %d column heads%s", len(record), len(r.heads), hint)
			continue
		}
		r.line, r.cells = append(r.line, line), append(r.cells, record...)
	}
	if r.heads == nil {
		r.fail(0, 0, "empty; a spectrum begins with a row of column heads such as wavelength_nm,tau,rho_front,rho_back")
		return nil, r.faults.err()
	}
	if err := r.readWavelengths(); err != nil {
		return nil, err
	}
	return r, nil
}

// maxColumns is how many columns are looked at at all.
const maxColumns = 64

// notHeads says why a first row cannot hold the heads of columns, or returns "".
func notHeads(record []string) string {
	switch _, problem := number(record[0]); {
	case len(record) > maxColumns:
		return fmt.Sprintf("%d columns; a spectrum has four", len(record))
	case separatorIn(record) != 0:
		return "columns are separated by " + separatorName(separatorIn(record)) + "; use commas, and points in numbers"
	case problem == "":
		return "the first row must hold the column heads, such as wavelength_nm,tau,rho_front,rho_back"
	}
	return ""
}

const (
	minimumRows = 10  // how many rows a spectrum has at least
	leastLastNM = 100 // where a spectrum in nm stops before, the unit is in doubt
)

// readWavelengths finds the wavelength column and checks that it ascends in the unit it names.
func (r *rows) readWavelengths() error {
	nmAt, umAt := slices.Index(r.heads, headNM), slices.Index(r.heads, headUM)
	for i, head := range r.heads {
		if head == "" {
			r.fail(r.headLine, 0, "column %d has no head", i+1)
		}
		if slices.Index(r.heads, head) != i {
			r.fail(r.headLine, 0, "column %q stands twice", clip(head))
		}
	}
	switch {
	case nmAt >= 0 && umAt >= 0:
		r.fail(r.headLine, 0, "both wavelength_nm and wavelength_um; give one")
	case nmAt < 0 && umAt < 0:
		r.fail(r.headLine, 0, "no column wavelength_nm or wavelength_um; the first row must hold the column heads")
	}
	if r.faults.any() && (nmAt < 0) == (umAt < 0) {
		return r.faults.err()
	}
	at, scale := nmAt, 1.0
	if nmAt < 0 {
		at, scale = umAt, 1000
	}
	r.nm = make([]float64, len(r.line))
	last := 0.0
	for i := range r.line {
		cell := r.cell(i, at)
		v, problem := number(cell)
		if problem == "" && v <= 0 {
			problem = "a wavelength is above 0"
		}
		if problem != "" {
			r.fail(r.line[i], 0, "wavelength %q: %s", clip(cell), problem)
			continue
		}
		r.nm[i] = toNM(v, scale)
		switch {
		case r.nm[i] == last:
			r.fail(r.line[i], r.nm[i], "this wavelength stands twice")
		case r.nm[i] < last:
			r.fail(r.line[i], r.nm[i], "wavelengths must ascend; the row before has %s nm", short(last))
		}
		last = r.nm[i]
	}
	switch {
	case len(r.line) < r.least && !r.faults.any():
		r.fail(0, 0, "%d rows; at least %d are needed", len(r.line), r.least)
	case scale == 1 && last > 0 && last < leastLastNM:
		r.fail(r.line[len(r.line)-1], 0, "the last wavelength is %s nm: µm in a column of nm? name it wavelength_um", short(last))
	case scale == 1000 && len(r.nm) > 0 && r.nm[0] > 1e5:
		r.fail(r.line[0], 0, "the first wavelength is %s µm: nm in a column of µm? name it wavelength_nm", short(r.nm[0]/1000))
	}
	return nil
}

// toNM converts without leaving a trace of binary rounding: 0.55 µm is 550 nm.
func toNM(v, scale float64) float64 {
	if scale == 1 {
		return v
	}
	nm := float64(v * scale)
	if r := math.Round(nm*1e6) / 1e6; math.Abs(r-nm) < 1e-9*nm {
		return r
	}
	return nm
}

// column reads the cells under a head; check returns what is wrong with a value, or "".
func (r *rows) column(head string, check func(float64) string) Column {
	at := slices.Index(r.heads, head)
	c := Column{File: r.file}
	if at < 0 {
		return c
	}
	n := len(r.line)
	c.NM, c.Value, c.Line = make([]float64, 0, n), make([]float64, 0, n), make([]int, 0, n)
	blank := 0   // line of the first blank cell since the column began
	gap := false // whether values are missing since the last
	for i := range r.line {
		cell := r.cell(i, at)
		if cell == "" {
			if c.Len() > 0 && blank == 0 {
				blank = r.line[i]
			}
			continue
		}
		if cell == missingCell {
			gap = c.Len() > 0
			continue
		}
		v, problem := r.value(cell)
		if problem == "" {
			problem = check(v)
		}
		if r.nm[i] > SolarLastNM { // the column may stop in the solar range and go on in the infrared
			blank = 0
		}
		if problem == "" && blank > 0 {
			problem = fmt.Sprintf("the column has a blank cell at line %d and then goes on; cells may be blank only where a column stops; write ? for a value that is missing", blank)
			blank = 0
		}
		if problem != "" {
			r.fail(r.line[i], r.nm[i], "%s %s: %s", clip(head), clip(cell), problem)
			continue
		}
		if gap {
			if c.Gaps, gap = append(c.Gaps, Span{c.Last(), r.nm[i]}), false; len(c.Gaps) > maxGaps {
				r.fail(r.line[i], r.nm[i], "%s lacks values (?) in more than %d places; that is no spectrum", clip(head), maxGaps)
				return c
			}
		}
		c.NM, c.Value, c.Line = append(c.NM, r.nm[i]), append(c.Value, v), append(c.Line, r.line[i])
	}
	return c
}

const (
	missingCell = "?"  // of a value that is missing between others of its column
	maxGaps     = 1000 // of a column
)

// value reads a cell, as a layout says or as a plain decimal number.
func (r *rows) value(cell string) (v float64, problem string) {
	if r.read != nil {
		return r.read(cell)
	}
	return number(cell)
}

// number reads a plain decimal number; problem says why a cell is none.
func number(cell string) (v float64, problem string) {
	plain := cell != ""
	for i := range len(cell) {
		switch c := cell[i]; {
		case c >= '0' && c <= '9', c == '.', c == '-', c == '+', c == 'e', c == 'E':
		default:
			plain = false
		}
	}
	if plain {
		v, err := strconv.ParseFloat(cell, 64)
		switch {
		case err == nil:
			return v, ""
		case math.IsInf(v, 0):
			return 0, "not a finite number"
		}
		return 0, "not a number"
	}
	v, err := strconv.ParseFloat(cell, 64)
	switch {
	case cell == "":
		return 0, "blank"
	case strings.HasSuffix(cell, "%"):
		return 0, "not a number; fractions of one, not percent"
	case strings.Contains(cell, ","):
		return 0, "not a number; a decimal comma? write a point"
	case err == nil && (math.IsNaN(v) || math.IsInf(v, 0)):
		return 0, "not a finite number"
	}
	return 0, "not a number"
}

// Slack is how far a fraction, or the sum of transmittance and reflectance, may lie outside
// 0…1 and be set to the bound.
const Slack = 0.002

func fraction(v float64) string {
	if v >= -Slack && v <= 1+Slack {
		return ""
	}
	if v > 1 && v <= 100+100*Slack {
		return "not in 0..1; fractions of one, not percent"
	}
	return "not in 0..1"
}

func notNegative(v float64) string {
	if v < 0 {
		return "below 0"
	}
	return ""
}
