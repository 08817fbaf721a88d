package spectra

// The JCAMP-DX reader: lines, labels and blocks.

import (
	"bufio"
	"bytes"
	"errors"
	"fmt"
	"io"
	"slices"
	"strings"
	"unicode"
	"unicode/utf8"
)

// Quantity is what the ordinates of a spectrum file are.
type Quantity string

// The quantities that a spectrum of a pane is made from. An absorbance is read as the
// transmittance that it stands for.
const (
	Transmittance Quantity = "transmittance"
	Reflectance   Quantity = "reflectance"
)

// A Block is one spectrum of a JCAMP-DX file: a column of fractions of one over wavelengths in nm,
// ascending, whatever the file had.
type Block struct {
	Title    string
	Quantity Quantity
	Column
	Notes    []string // what the reader understood and converted, in words for the user
	Comments []string // title, origin and owner as the file has them, also those of what the block lies in
}

// The bounds of a file; what lies beyond is refused before it takes memory or time.
const (
	maxLineBytes   = 1 << 20
	maxBlocks      = 1000
	maxNesting     = 8
	maxBlockFaults = 24  // named of a block, and of a file
	maxLabelText   = 400 // bytes of a label's text that are kept
	maxTitle       = 120 // letters
	maxBlockPoints = 1_000_000
	maxFilePoints  = 2_000_000
)

// IsJCAMP reports whether a file is JCAMP-DX: whether it begins, after blank lines and comments,
// with ##TITLE or another labelled record, ##LABEL=.
func IsJCAMP(content []byte) bool {
	rest := bytes.TrimPrefix(content[:min(len(content), 64<<10)], []byte("\ufeff"))
	for {
		rest = bytes.TrimLeft(rest, " \t\r\n")
		if !bytes.HasPrefix(rest, []byte("$$")) {
			break
		}
		end := bytes.IndexAny(rest, "\r\n")
		if end < 0 {
			return false
		}
		rest = rest[end:]
	}
	if len(rest) >= 7 && bytes.EqualFold(rest[:7], []byte("##TITLE")) {
		return true
	}
	if end := bytes.IndexAny(rest, "\r\n"); end >= 0 {
		rest = rest[:end]
	}
	var space [labelBytes]byte
	name, _, ok := splitLabel(rest, &space)
	if !ok || len(name) == 0 || rest[2] == ' ' { // "## a = b" is a comment of a CSV file
		return false
	}
	return !bytes.ContainsFunc(name, func(c rune) bool {
		return c != '$' && c != '.' && (c < 'A' || c > 'Z') && (c < '0' || c > '9')
	})
}

// ReadJCAMP reads the optical spectra of a JCAMP-DX file (IUPAC; protocol 4.24, McDonald and
// Wilks, Appl. Spectrosc. 42 (1988) 151, and its successors 5.x; all from memory): ##XYDATA= in
// every ordinate form, ##XYPOINTS=, x in nm, µm, ångström or 1/cm, transmittance, reflectance or
// absorbance. What the file says twice (number of points, ends, x of each line, check ordinates)
// must agree. A block of a file of several that holds something else is passed over, with a note
// in the first spectrum. The file name serves errors only. An error is Errors, or that of r.
func ReadJCAMP(r io.Reader, file string) ([]Block, error) {
	in := &io.LimitedReader{R: r, N: MaxBytes + 1}
	lines := bufio.NewScanner(in)
	lines.Buffer(make([]byte, 0, 64<<10), maxLineBytes)
	lines.Split(splitLine)
	j := &jcamp{file: file}
	for !j.stopped && len(j.faults) < maxBlockFaults && lines.Scan() {
		j.line++
		j.read(lines.Bytes())
	}
	switch err := lines.Err(); {
	case in.N <= 0:
		j.faults = nil
		j.fail(0, "larger than %d MB; a spectrum has some hundred lines", MaxBytes>>20)
	case errors.Is(err, bufio.ErrTooLong):
		j.fail(j.line+1, "a line of more than %d bytes", maxLineBytes)
	case err != nil:
		return nil, fmt.Errorf("%s: %w", file, err)
	case !j.stopped && len(j.faults) < maxBlockFaults:
		j.end()
	}
	if len(j.faults) > 0 {
		return nil, j.faults[:min(len(j.faults), maxBlockFaults)]
	}
	return j.out, nil
}

// splitLine is a bufio.SplitFunc for lines that end with LF, CR or both.
func splitLine(data []byte, atEOF bool) (advance int, token []byte, err error) {
	for i, c := range data {
		switch {
		case c == '\n':
			return i + 1, data[:i], nil
		case c != '\r':
		case i+1 < len(data) && data[i+1] == '\n':
			return i + 2, data[:i], nil
		case i+1 < len(data) || atEOF:
			return i + 1, data[:i], nil
		default:
			return 0, nil, nil // the LF of this CR may be still to come
		}
	}
	if atEOF && len(data) > 0 {
		return len(data), data, nil
	}
	return 0, nil, nil
}

// jcamp is a file while it is read.
type jcamp struct {
	file    string
	line    int
	blocks  int           // blocks begun
	open    []*jcampBlock // those not ended, outermost first
	kept    *jcampLabel   // the label that a further line belongs to, if it is one that is used
	points  int
	out     []Block
	passed  []passedBlock
	notes   []string
	faults  Errors
	stopped bool // the rest of the file cannot be read
	space   [labelBytes]byte
}

// A passedBlock is one passed over, and why.
type passedBlock struct {
	line int // where it begins
	*RowError
}

// fail notes a fault that leaves the rest of the file unreadable.
func (j *jcamp) fail(line int, format string, args ...any) {
	j.faults = append(j.faults, &RowError{j.file, line, 0, fmt.Sprintf(format, args...)})
	j.stopped = true
}

// read takes the next line of the file.
func (j *jcamp) read(line []byte) {
	if j.line == 1 {
		if bytes.HasPrefix(line, []byte{0xff, 0xfe}) || bytes.HasPrefix(line, []byte{0xfe, 0xff}) {
			j.fail(0, "is UTF-16; save it as UTF-8")
			return
		}
		line = bytes.TrimPrefix(line, []byte("\ufeff"))
	}
	if bytes.IndexByte(line, 0) >= 0 {
		j.fail(j.line, "is binary, or UTF-16; JCAMP-DX is text")
		return
	}
	if i := bytes.Index(line, []byte("$$")); i >= 0 { // a comment
		line = line[:i]
	}
	line = bytes.Trim(line, " \t\x1a") // Ctrl-Z ends old files
	if len(line) == 0 {
		return
	}
	if name, value, ok := splitLabel(line, &j.space); ok {
		j.label(name, value)
		return
	}
	if len(j.open) == 0 {
		if j.blocks == 0 {
			j.fail(j.line, "not JCAMP-DX, which begins with ##TITLE=")
		} else {
			j.fail(j.line, "%q after the end of the last block; is the file cut?", clip(latin(line)))
		}
		return
	}
	switch b := j.open[len(j.open)-1]; {
	case b.reading:
		b.table.read(line, j.line)
	case j.kept != nil:
		j.kept.add(line)
	}
}

// labelBytes is the room for the name of a label; a longer one is none of ours.
const labelBytes = 32

// splitLabel splits a line ##NAME=TEXT. The name comes in capitals without blanks, "-", "/" and
// "_", which do not count.
func splitLabel(line []byte, space *[labelBytes]byte) (name, value []byte, ok bool) {
	if len(line) < 2 || line[0] != '#' || line[1] != '#' {
		return nil, nil, false
	}
	equals := bytes.IndexByte(line, '=')
	if equals < 0 {
		return nil, nil, false
	}
	name = space[:0]
	for _, c := range line[2:equals] {
		switch {
		case c == ' ' || c == '\t' || c == '-' || c == '/' || c == '_' || len(name) == labelBytes:
		case c >= 'a' && c <= 'z':
			name = append(name, c-'a'+'A')
		default:
			name = append(name, c)
		}
	}
	return name, bytes.TrimSpace(line[equals+1:]), true
}

// A jcampLabel is the text of a labelled record.
type jcampLabel struct {
	line int
	text []byte
}

func (l *jcampLabel) add(line []byte) {
	if len(l.text) > 0 {
		l.text = append(l.text, ' ')
	}
	l.text = append(l.text, line[:max(0, min(len(line), maxLabelText-len(l.text)))]...)
}

// A jcampBlock is what stands from ##TITLE= to ##END=.
type jcampBlock struct {
	file    string
	line    int
	title   jcampLabel
	labels  map[string]*jcampLabel // by name; those that the reader uses
	inner   int                    // blocks in it
	table   *ordinates             // nil: none yet
	reading bool                   // the lines that come belong to the table
	other   string                 // what it holds beside a table or instead of one, in words
	faults  faultList
}

func (b *jcampBlock) fail(line int, nm float64, format string, args ...any) {
	b.faults.add(&RowError{b.file, line, nm, fmt.Sprintf(format, args...)})
}

// value returns the text of a label, "" where there is none.
func (b *jcampBlock) value(name string) string {
	if l := b.labels[name]; l != nil {
		return strings.TrimSpace(latin(l.text))
	}
	return ""
}

// isLink reports whether the block is there to hold others.
func (b *jcampBlock) isLink() bool {
	return b.table == nil && (strings.EqualFold(b.value("DATATYPE"), "LINK") || b.other == "" && b.labels["BLOCKS"] != nil)
}

// What a block may hold that is no curve.
const (
	holdsStructure = "a chemical structure"
	holdsPages     = "NTUPLES, tables of several variables in pages"
)

// label takes a line that begins with ##NAME=.
func (j *jcamp) label(name, value []byte) {
	j.kept = nil
	if string(name) == "TITLE" || len(j.open) == 0 && string(name) != "END" {
		if !j.begin() {
			return
		}
	}
	if len(j.open) == 0 {
		if j.blocks == 0 {
			j.fail(j.line, "##END= of a block that did not begin; is the file cut?")
		}
		return
	}
	b := j.open[len(j.open)-1]
	b.reading = false
	switch string(name) {
	case "TITLE":
		b.title.add(value)
		j.kept = &b.title
	case "END":
		j.open = j.open[:len(j.open)-1]
		j.finish(b)
	case "XYDATA", "XYPOINTS":
		if b.table != nil {
			b.fail(j.line, 0, "a second table of points in one block; the first begins at line %d", b.table.line)
			return
		}
		b.table = &ordinates{block: b, line: j.line, name: string(name), room: min(maxBlockPoints, maxFilePoints-j.points)}
		b.table.skip = notOptical(b.value("DATATYPE"))
		if l := b.labels["NPOINTS"]; l != nil && !b.table.skip { // believed as far as it costs nothing
			n, _, _ := affn(l.text, exponentAlways)
			b.table.y = make([]float64, 0, int(min(max(n, 0), 1<<14)))
			b.table.lines = make([]int, 0, cap(b.table.y))
		}
		b.reading = true
		if len(value) > 0 {
			b.table.read(value, j.line)
		}
	case "PEAKTABLE":
		b.other = "a peak table"
	case "PEAKASSIGNMENTS":
		b.other = "peak assignments"
	case "RADATA":
		b.other = "an interferogram"
	case "NTUPLES", "PAGE", "DATATABLE":
		b.other = holdsPages
	case "JCAMPCS":
		b.other = holdsStructure
	case "DATATYPE", "DATACLASS", "BLOCKS", "XUNITS", "YUNITS", "XFACTOR", "YFACTOR", "FIRSTX", "LASTX",
		"NPOINTS", "DELTAX", "FIRSTY", "MAXX", "MINX", "MAXY", "MINY", labelOrigin, labelOwner:
		l := &jcampLabel{line: j.line}
		l.add(value)
		if old := b.labels[string(name)]; old == nil {
			b.labels[string(name)], j.kept = l, l
		} else if string(name) != labelOrigin && string(name) != labelOwner && !bytes.Equal(old.text, l.text) {
			b.fail(j.line, 0, "##%s= stands at line %d as well, with another value", name, old.line)
		}
	}
}

// The labels that are kept as comments, beside the title.
const (
	labelOrigin = "ORIGIN"
	labelOwner  = "OWNER"
)

// comments returns the lines of a block that say what it is and where it comes from.
func (b *jcampBlock) comments() (list []string) {
	for _, x := range [][2]string{{"TITLE", strings.TrimSpace(latin(b.title.text))}, {labelOrigin, b.value(labelOrigin)}, {labelOwner, b.value(labelOwner)}} {
		if x[1] != "" {
			list = append(list, Clip(x[0]+"= "+x[1], commentLetters))
		}
	}
	return list
}

// begin opens a block.
func (j *jcamp) begin() bool {
	if n := len(j.open); n > 0 {
		b := j.open[n-1]
		if !b.isLink() {
			j.fail(j.line, "##TITLE= of another block before ##END= of the one begun at line %d; is the file cut?", b.line)
			return false
		}
		b.inner++
	}
	if j.blocks++; j.blocks > maxBlocks || len(j.open) == maxNesting {
		j.fail(j.line, "more than %d blocks, or more than %d in one another", maxBlocks, maxNesting)
		return false
	}
	j.open = append(j.open, &jcampBlock{file: j.file, line: j.line, labels: map[string]*jcampLabel{}, faults: faultList{most: maxBlockFaults}})
	return true
}

// finish takes in a block that has ended.
func (j *jcamp) finish(b *jcampBlock) {
	if b.isLink() {
		l := b.labels["BLOCKS"]
		if l == nil {
			return
		}
		// Some programs count the outer block.
		if n, _, size := affn(l.text, exponentAlways); size == len(l.text) && n != float64(b.inner) && n != float64(b.inner+1) {
			j.notes = append(j.notes, fmt.Sprintf("##BLOCKS= at line %d says %s, there are %d", l.line, short(n), b.inner))
		}
		return
	}
	if why := b.unfit(); why != nil {
		j.passed = append(j.passed, passedBlock{b.line, why})
		return
	}
	j.points += len(b.table.y)
	spectrum, ok := b.spectrum()
	if !ok {
		j.faults = append(j.faults, b.faults.errors()...)
		return
	}
	for _, outer := range j.open { // which the block lies in
		spectrum.Comments = append(spectrum.Comments, outer.comments()...)
	}
	spectrum.Comments = append(spectrum.Comments, b.comments()...)
	j.out = append(j.out, spectrum)
}

// end takes the end of the file.
func (j *jcamp) end() {
	switch {
	case len(j.open) > 0:
		b := j.open[len(j.open)-1]
		j.fail(j.line, "the file ends without ##END= of the block begun at line %d; it seems cut", b.line)
		if b.unfit() == nil {
			j.faults = append(j.faults, b.faults.errors()...)
		}
	case len(j.faults) > 0:
	case j.blocks == 0:
		j.fail(0, "empty; JCAMP-DX begins with ##TITLE=")
	case len(j.out) == 0 && len(j.passed) == 0:
		j.fail(0, "no block with a spectrum in it; one has ##XYDATA= or ##XYPOINTS=")
	case len(j.out) == 0:
		for _, p := range j.passed {
			j.faults = append(j.faults, p.RowError)
		}
	default:
		const named = 5
		for _, p := range j.passed[:min(len(j.passed), named)] {
			j.notes = append(j.notes, fmt.Sprintf("the block at line %d was passed over: it %s", p.line, p.Text))
		}
		if n := len(j.passed) - named; n > 0 {
			j.notes = append(j.notes, fmt.Sprintf("%d more blocks were passed over", n))
		}
		j.out[0].Notes = append(j.out[0].Notes, j.notes...)
	}
}

// unfit says why a block is not an optical spectrum, and in which line, or returns nil. A label that is
// missing is a fault of the block, not a reason to pass it over.
func (b *jcampBlock) unfit() *RowError {
	const wanted = "; a spectrum of a pane is transmittance, reflectance or absorbance over wavelength"
	const asCurve = "; write the spectrum as ##XYDATA= (X++(Y..Y))"
	// at returns a reason in the line of a label, or where the block begins.
	at := func(label, format string, args ...any) *RowError {
		line := b.line
		if l := b.labels[label]; l != nil {
			line = l.line
		}
		return &RowError{b.file, line, 0, fmt.Sprintf(format, args...)}
	}
	kind, class := b.value("DATATYPE"), bare(b.value("DATACLASS"))
	switch {
	case b.other == holdsStructure:
		return at("", "holds %s%s", holdsStructure, wanted)
	case notOptical(kind):
		return at("DATATYPE", "holds %q%s", clip(kind), wanted)
	case b.other == holdsPages || class == "NTUPLES":
		return at("", "holds %s%s", holdsPages, asCurve)
	case b.table == nil && b.other != "":
		return at("", "holds %s and no curve%s", b.other, asCurve)
	case b.table == nil && (class == "PEAKTABLE" || class == "ASSIGNMENTS"), b.table != nil && b.table.form == formPeaks:
		return at("", "holds peaks and no curve%s", asCurve)
	case b.table == nil:
		return at("", "holds no table of points%s", asCurve)
	case b.table.form == formComplex:
		return at("", "holds complex data, as before or after a Fourier transform%s", wanted)
	}
	if x := b.value("XUNITS"); x != "" && unitOfX(x).name == "" {
		return at("XUNITS", "has x in %q; an optical spectrum has nm, µm or 1/cm (NANOMETERS, MICROMETERS, 1/CM)", clip(x))
	}
	if y := b.value("YUNITS"); y != "" && unitOfY(y).quantity == "" {
		return at("YUNITS", "has ordinates in %q; a spectrum of a pane has TRANSMITTANCE or REFLECTANCE, as a fraction or in %%, or ABSORBANCE", clip(y))
	}
	return nil
}

// notOptical reports whether a ##DATA TYPE= is plainly something else than transmittance or
// reflectance over wavelength. One that is not known is judged by its units.
func notOptical(dataType string) bool {
	words := strings.FieldsFunc(strings.ToUpper(dataType), func(c rune) bool { return !unicode.IsLetter(c) })
	return slices.ContainsFunc(words, func(word string) bool {
		switch word {
		case "NMR", "FID", "EPR", "ESR", "ENDOR", "MASS", "MS", "IMS", "MOBILITY", "RAMAN", "CHROMATOGRAM", "INTERFEROGRAM",
			"PEAK", "PEAKS", "ASSIGNMENT", "ASSIGNMENTS", "FLUORESCENCE", "PHOSPHORESCENCE", "LUMINESCENCE", "EMISSION",
			"DICHROISM", "CD", "DIFFRACTION", "XRD", "VOLTAMMOGRAM", "VOLTAMMETRY", "SORPTION", "TGA", "DSC", "STRUCTURE":
			return true
		}
		return false
	})
}

// latin reads bytes as UTF-8, or else as Latin-1.
func latin(b []byte) string {
	if utf8.Valid(b) {
		return string(b)
	}
	r := make([]rune, len(b))
	for i, c := range b {
		r[i] = rune(c)
	}
	return string(r)
}
