package spectra

// The tables of points of JCAMP-DX: ##XYDATA= (X++(Y..Y)) in the forms AFFN, PAC, SQZ, DIF and DUP,
// pairs (XY..XY), and what such a table is checked against.

import (
	"math"
	"strconv"
	"strings"
)

// The forms of a table.
type tableForm int

const (
	formUnread  tableForm = iota // the words in brackets have not come yet
	formSteps                    // (X++(Y..Y)): x at the beginning of each line, evenly spaced
	formPairs                    // (XY..XY)
	formComplex                  // (X++(R..R)), (X++(I..I))
	formPeaks                    // (XYW..XYW) and the like
)

// The kinds of an ordinate, one bit each.
type ordinateKind uint8

const (
	kindFree       ordinateKind = 1 << iota // AFFN: a number after a blank or comma
	kindPacked                              // PAC: a number that its sign parts from the one before
	kindSqueezed                            // SQZ: the first digit carries the sign
	kindDifference                          // DIF: from the ordinate before
	kindRepeat                              // DUP: how often the one before stands in all
	kindMissing                             // ?
)

// maxOrdinate is up to where ordinates, and sums of differences, are exact.
const maxOrdinate = 1e15

// wider says what to do about a table of too many points.
const wider = "a spectrum of a pane needs some hundred: export it in wider steps, or each spectrum into a file of its own"

// ordinates are a table of points as it is printed, before the factors.
type ordinates struct {
	block   *jcampBlock
	line    int    // where it begins
	end     int    // the last line read
	name    string // XYDATA or XYPOINTS
	room    int    // for how many points
	skip    bool   // the block is none of ours
	stopped bool   // by a fault
	form    tableForm

	x, y  []float64 // x of pairs only; NaN is a missing ordinate
	lines []int     // of each point
	heads []lineHead
	kinds ordinateKind // all that have come

	item          ordinateKind // of the last one on the line; 0 at its beginning
	last, step    float64      // its value, and its difference
	repeated      bool         // by a DUP
	check         bool         // the ordinate that comes must be the last one
	firstX, lastX numeral      // of pairs
	firstY        numeral      // without a unit where it is missing
	wantY         bool         // of pairs: an x came last
}

// A numeral is a number as it is printed: unit is that of its last digit.
type numeral struct{ value, unit float64 }

// A lineHead is the x that a line begins with.
type lineHead struct {
	numeral
	at    int  // the point that it belongs to
	check bool // which is the last of the line before, repeated
	line  int
}

// fail notes a fault that leaves the rest of the table unreadable.
func (t *ordinates) fail(line int, format string, args ...any) {
	t.block.fail(line, 0, format, args...)
	t.stopped = true
}

// read takes a line of the table, without blanks at its ends.
func (t *ordinates) read(s []byte, line int) {
	t.end = line
	switch {
	case t.skip || t.stopped:
	case t.form == formUnread:
		t.readForm(latin(s), line)
	case t.form == formSteps:
		t.steps(s, line)
	case t.form == formPairs:
		t.pairs(s, line)
	}
}

// readForm takes what stands after ##XYDATA=.
func (t *ordinates) readForm(s string, line int) {
	form := strings.ToUpper(strings.Join(strings.Fields(s), ""))
	switch {
	case form == "(X++(Y..Y))":
		t.form = formSteps
	case form == "(XY..XY)":
		t.form = formPairs
	case strings.HasPrefix(form, "(X++(R..R))"), strings.HasPrefix(form, "(X++(I..I))"):
		t.form = formComplex
	case strings.HasPrefix(form, "(XYW"), strings.HasPrefix(form, "(XYA"), strings.HasPrefix(form, "(XYM"):
		t.form = formPeaks
	default:
		t.fail(line, "##%s= %q: a table is (X++(Y..Y)) or (XY..XY)", t.name, clip(s))
	}
}

// add takes an ordinate, NaN where it is missing.
func (t *ordinates) add(v float64, line int) {
	t.y, t.lines = append(t.y, v), append(t.lines, line)
}

// steps reads a line of (X++(Y..Y)): x, then ordinates in any mixture of forms.
func (t *ordinates) steps(s []byte, line int) {
	x, unit, i := affn(s, exponentSigned)
	switch {
	case i == 0:
		t.fail(line, "%q: a line of the table begins with x as a plain number", clip(latin(s)))
		return
	case i == len(s):
		t.fail(line, "x %s without an ordinate", clip(latin(s)))
		return
	case len(t.heads) > t.room:
		t.fail(line, "more than %d lines of points; %s", t.room, wider)
		return
	}
	// After a difference the next line begins with the ordinate that it led to, as a check.
	t.check = t.item == kindDifference
	head := lineHead{numeral{x, unit}, len(t.y), t.check, line}
	if t.check {
		head.at--
	}
	t.heads = append(t.heads, head)
	t.item = 0
	for {
		blank, commas := i, 0
		for i < len(s) && (s[i] == ' ' || s[i] == '\t' || s[i] == ',') {
			if s[i] == ',' {
				commas++
			}
			i++
		}
		if commas > 1 {
			t.fail(line, "nothing between two commas; a missing ordinate is written ?")
			return
		}
		if i == len(s) {
			return
		}
		kind, v, unit, n := ordinate(s[i:], i > blank)
		if n == 0 {
			t.fail(line, "%q: not an ordinate in AFFN, PAC, SQZ, DIF or DUP form", Clip(latin(s[i:]), 12))
			return
		}
		if t.take(kind, numeral{v, unit}, line); t.stopped {
			return
		}
		i += n
	}
}

// ordinate reads the one that s begins with; parted says that a blank or comma stands before it. n
// is the number of its bytes, 0 where it is none.
func ordinate(s []byte, parted bool) (kind ordinateKind, v, unit float64, n int) {
	kind, lead := kindOf(s[0])
	switch kind {
	case 0:
		return 0, 0, 0, 0
	case kindMissing:
		return kind, math.NaN(), 0, 1
	case kindFree:
		if !parted {
			kind = kindPacked
			if s[0] != '+' && s[0] != '-' {
				return 0, 0, 0, 0
			}
		}
		v, unit, n = affn(s, exponentPoint)
		return kind, v, unit, n
	}
	v = math.Abs(float64(lead))
	for n = 1; n < len(s) && s[n] >= '0' && s[n] <= '9'; n++ {
		v = float64(v*10) + float64(s[n]-'0')
	}
	if lead < 0 {
		v = -v
	}
	return kind, v, 1, n
}

// take takes what ordinate has read.
func (t *ordinates) take(kind ordinateKind, v numeral, line int) {
	t.kinds |= kind
	room, repeated := t.room-len(t.y), t.repeated
	t.repeated = kind == kindRepeat
	switch {
	case kind == kindRepeat:
		switch {
		case t.item == 0 || repeated:
			t.fail(line, "a repetition (DUP) without an ordinate before it")
		case v.value-1 > float64(room):
			t.fail(line, "an ordinate %.0f times in all; a table has at most %d points; %s", v.value, t.room, wider)
		default:
			for range int(v.value) - 1 {
				t.last += t.step
				t.add(t.last, line)
			}
		}
	case t.check:
		t.check = false
		switch {
		case kind == kindDifference || kind == kindMissing:
			t.fail(line, "the line begins without the ordinate %s that the differences (DIF) of the line before led to", short(t.last))
		case v.value != t.last:
			t.block.fail(line, 0, "the line begins with the ordinate %s, the differences (DIF) of the line before led to %s; a line is lost or damaged", short(v.value), short(t.last))
		}
		t.item, t.last, t.step = kind, v.value, 0
	case room == 0:
		t.fail(line, "more than %d points; %s", t.room, wider)
	case kind == kindDifference && (t.item == 0 || t.item == kindMissing):
		t.fail(line, "a difference (DIF) without an ordinate before it")
	case kind == kindDifference:
		t.item, t.last, t.step = kind, t.last+v.value, v.value
		t.add(t.last, line)
	default:
		if len(t.y) == 0 {
			t.firstY = v
		}
		t.item, t.last, t.step = kind, v.value, 0
		t.add(t.last, line)
	}
	if math.Abs(t.last) > maxOrdinate {
		t.fail(line, "an ordinate of %.3g; they are read up to %.0e", t.last, maxOrdinate)
	}
}

// kindOf returns what an ordinate is by its first letter, and the digit that the letter stands
// for, with its sign. The standard's tables: SQZ @ A-I a-i, DIF % J-R j-r, DUP S-Z s.
func kindOf(c byte) (ordinateKind, int) {
	switch {
	case c >= '0' && c <= '9', c == '+', c == '-', c == '.':
		return kindFree, 0
	case c == '@':
		return kindSqueezed, 0
	case c >= 'A' && c <= 'I':
		return kindSqueezed, int(c-'A') + 1
	case c >= 'a' && c <= 'i':
		return kindSqueezed, -int(c-'a') - 1
	case c == '%':
		return kindDifference, 0
	case c >= 'J' && c <= 'R':
		return kindDifference, int(c-'J') + 1
	case c >= 'j' && c <= 'r':
		return kindDifference, -int(c-'j') - 1
	case c >= 'S' && c <= 'Z':
		return kindRepeat, int(c-'S') + 1
	case c == 's':
		return kindRepeat, 9
	case c == '?':
		return kindMissing, 0
	}
	return 0, 0
}

// Where the letter E is an exponent, and not the digit 5 of SQZ form.
type exponent int

const (
	exponentSigned exponent = iota // with a sign and digits after it
	exponentPoint                  // and in a number with a decimal point
	exponentAlways
)

// affn reads the decimal number that s begins with; unit is that of its last digit, n the number of
// its bytes, 0 where there is none.
func affn(s []byte, rule exponent) (v, unit float64, n int) {
	var mantissa uint64
	digits, power, point := 0, 0, false // power is the exponent of ten
	if n < len(s) && (s[n] == '+' || s[n] == '-') {
		n++
	}
	for ; n < len(s); n++ {
		c := s[n]
		if c == '.' && !point {
			point = true
			continue
		}
		if c < '0' || c > '9' {
			break
		}
		if digits++; mantissa > 1<<59 {
			return longNumber(s, rule) // more digits than fit
		}
		mantissa = mantissa*10 + uint64(c-'0')
		if point {
			power--
		}
	}
	if digits == 0 {
		return 0, 0, 0
	}
	if e, size := exponentOf(s[n:], rule, point); size > 0 {
		n, power = n+size, power+e
	}
	v = float64(mantissa)
	switch { // with a mantissa and a power that are exact, one step rounds once
	case mantissa <= 1<<53 && power >= 0 && power <= 22:
		v *= math.Pow10(power)
	case mantissa <= 1<<53 && power < 0 && power >= -22:
		v /= math.Pow10(-power)
	default:
		v, _ = strconv.ParseFloat(strings.TrimLeft(string(s[:n]), "+-"), 64)
	}
	if s[0] == '-' {
		v = -v
	}
	return v, math.Pow10(power), n
}

// longNumber reads a number of more digits than the mantissa of affn holds.
func longNumber(s []byte, rule exponent) (v, unit float64, n int) {
	point := s[0] == '.'
	for n = 1; n < len(s) && (s[n] >= '0' && s[n] <= '9' || s[n] == '.' && !point); n++ {
		point = point || s[n] == '.'
	}
	_, size := exponentOf(s[n:], rule, point)
	n += size
	v, _ = strconv.ParseFloat(string(s[:n]), 64)
	return v, math.Abs(v) * 1e-15, n
}

// exponentOf reads the exponent that s begins with; size is 0 where there is none.
func exponentOf(s []byte, rule exponent, point bool) (power, size int) {
	if len(s) < 2 || s[0] != 'E' && s[0] != 'e' {
		return 0, 0
	}
	digits := s[1:]
	if signed := s[1] == '+' || s[1] == '-'; signed {
		digits = s[2:]
	} else if rule == exponentSigned || rule == exponentPoint && !point {
		return 0, 0
	}
	n := 0
	for ; n < len(digits) && digits[n] >= '0' && digits[n] <= '9'; n++ {
		power = min(power*10+int(digits[n]-'0'), 9999)
	}
	if n == 0 {
		return 0, 0
	}
	if s[1] == '-' {
		power = -power
	}
	return power, len(s) - len(digits) + n
}

// pairs reads a line of (XY..XY); a pair may go on in the next.
func (t *ordinates) pairs(s []byte, line int) {
	for i := 0; ; {
		start, marks := i, 0
		for i < len(s) && (s[i] == ' ' || s[i] == '\t' || s[i] == ',' || s[i] == ';') {
			if s[i] == ',' || s[i] == ';' {
				marks++
			}
			i++
		}
		if marks > 1 {
			t.fail(line, "nothing between two commas or semicolons; a missing ordinate is written ?")
			return
		}
		if i == len(s) {
			return
		}
		v, unit, n := affn(s[i:], exponentAlways)
		if t.wantY && s[i] == '?' {
			v, unit, n = math.NaN(), 0, 1
			t.kinds |= kindMissing
		}
		switch {
		case n == 0 || i == start && i > 0:
			t.fail(line, "%q: not a number, after a blank, comma or semicolon", Clip(latin(s[i:]), 12))
			return
		case math.Abs(v) > maxOrdinate:
			t.fail(line, "a number of %.3g; they are read up to %.0e", v, maxOrdinate)
			return
		case !t.wantY && len(t.y) >= t.room:
			t.fail(line, "more than %d points; %s", t.room, wider)
			return
		case !t.wantY:
			t.x, t.lastX = append(t.x, v), numeral{v, unit}
			if len(t.x) == 1 {
				t.firstX = t.lastX
			}
		default:
			if len(t.y) == 0 {
				t.firstY = numeral{v, unit}
			}
			t.add(v, line)
		}
		t.wantY = !t.wantY
		i += n
	}
}

// shape names the form of the table as the standard does.
func (t *ordinates) shape() string {
	if t.form == formPairs {
		return "(XY..XY)"
	}
	form := "AFFN"
	for _, f := range []struct {
		kind ordinateKind
		name string
	}{{kindPacked, "PAC"}, {kindSqueezed, "SQZ"}, {kindDifference, "DIF"}} {
		if t.kinds&f.kind != 0 {
			form = f.name
		}
	}
	if t.kinds&kindRepeat != 0 {
		form += " with DUP"
	}
	return "(X++(Y..Y)) in " + form + " form"
}
