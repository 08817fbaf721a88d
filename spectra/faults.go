package spectra

// What is wrong with a spectrum file: faults with their places, and how numbers and texts stand in
// messages.

import (
	"cmp"
	"fmt"
	"math"
	"slices"
	"strconv"
	"strings"
	"unicode"
)

// A RowError says what is wrong with a spectrum file, where, and what would be right.
type RowError struct {
	File string
	Line int     // 0 when the whole file is meant
	NM   float64 // 0 when no wavelength is meant
	Text string
}

func (e *RowError) Error() string {
	s := e.File
	if e.Line > 0 {
		s += ":" + strconv.Itoa(e.Line)
	}
	if e.NM != 0 {
		s += ": at " + shortNM(e.NM) + " nm"
	}
	return strings.TrimPrefix(s+": "+e.Text, ": ")
}

// Errors are the faults found in one spectrum; it is never empty when returned. Of faults that differ
// in nothing but their numbers, and are more than a few, the first stands for all, with their number
// and the place of the last.
type Errors []*RowError

func (e Errors) Error() string {
	if len(e) == 1 {
		return e[0].Error()
	}
	return fmt.Sprintf("%v (and %d more)", e[0], len(e)-1)
}

// Unwrap lets errors.As find each fault.
func (e Errors) Unwrap() []error {
	out := make([]error, len(e))
	for i, x := range e {
		out[i] = x
	}
	return out
}

const (
	alikeListed  = 3    // up to so many faults that are alike stand by themselves
	faultsListed = 1000 // beyond, a fault of another kind is not kept
)

// faultList gathers faults in the order in which they are found; those that are alike it counts.
type faultList struct {
	most int // that are kept; 0: faultsListed
	list []listedFault
	like map[string]*alikeFaults
}

type listedFault struct {
	*RowError
	kind *alikeFaults
	nth  int // of its kind
}

type alikeFaults struct {
	count       int
	first, last *RowError // by line
}

func (l *faultList) any() bool { return len(l.list) > 0 }

// full reports whether no fault of another kind is taken.
func (l *faultList) full() bool { return len(l.list) >= cmp.Or(l.most, faultsListed) }

func (l *faultList) add(e *RowError) {
	key := e.File + "\n" + numberless(e.Text)
	kind := l.like[key]
	switch {
	case kind == nil && l.full():
		return
	case kind == nil:
		if l.like == nil {
			l.like = map[string]*alikeFaults{}
		}
		kind = &alikeFaults{first: e, last: e}
		l.like[key] = kind
	}
	if kind.count++; e.Line < kind.first.Line {
		kind.first = e
	}
	if e.Line >= kind.last.Line {
		kind.last = e
	}
	if kind.count <= alikeListed && !l.full() {
		l.list = append(l.list, listedFault{e, kind, kind.count})
	}
}

// errors returns what was gathered, nil where that is nothing.
func (l *faultList) errors() (out Errors) {
	for _, x := range l.list {
		switch {
		case x.kind.count <= alikeListed:
			out = append(out, x.RowError)
		case x.nth == 1:
			first, last := *x.kind.first, x.kind.last
			first.Text += fmt.Sprintf("; %d faults like this, the last", x.kind.count)
			if last.Line > 0 {
				first.Text += fmt.Sprintf(" in line %d", last.Line)
			}
			if last.NM != 0 {
				first.Text += " at " + shortNM(last.NM) + " nm"
			}
			out = append(out, &first)
		}
	}
	return out
}

// err returns errors as an error, nil where there is none.
func (l *faultList) err() error {
	if !l.any() {
		return nil
	}
	return l.errors()
}

// numberless returns a text with each number in it made 0.
func numberless(s string) string {
	digit := func(i int) bool { return i < len(s) && s[i] >= '0' && s[i] <= '9' }
	out := make([]byte, 0, len(s))
	for i := 0; i < len(s); i++ {
		if (s[i] == '-' || s[i] == '+') && digit(i+1) {
			continue
		}
		if !digit(i) {
			out = append(out, s[i])
			continue
		}
		for {
			switch {
			case digit(i + 1):
				i++
				continue
			case i+1 < len(s) && strings.IndexByte(".,eE", s[i+1]) >= 0 && digit(i+2):
				i += 2
				continue
			case i+2 < len(s) && (s[i+1] == 'e' || s[i+1] == 'E') && (s[i+2] == '-' || s[i+2] == '+') && digit(i+3):
				i += 3
				continue
			}
			break
		}
		out = append(out, '0')
	}
	return string(out)
}

// byLine sorts faults by their lines.
func (e Errors) byLine() Errors {
	slices.SortStableFunc(e, func(a, b *RowError) int { return cmp.Compare(a.Line, b.Line) })
	return e
}

// plainUpTo is up to where numbers are printed without an exponent.
const plainUpTo = 1e15

// short prints a number as briefly as it can be read back.
func short(v float64) string {
	if a := math.Abs(v); a >= 1 && a < plainUpTo {
		return strconv.FormatFloat(v, 'f', -1, 64)
	}
	return strconv.FormatFloat(v, 'g', -1, 64)
}

// Brief prints a number with six digits that count, as far as it is worth reading.
func Brief(v float64) string {
	if a := math.Abs(v); a >= 1e5 && a < plainUpTo {
		return strconv.FormatFloat(v, 'f', 0, 64)
	}
	return strconv.FormatFloat(v, 'g', 6, 64)
}

// shortNM prints a wavelength as its file has it, or where that is long, as one that comes of 1/cm,
// with six digits.
func shortNM(nm float64) string {
	const long = 9
	if s := short(nm); len(s) <= long {
		return s
	}
	return Brief(nm)
}

// clip shortens a cell for a message.
func clip(s string) string { return Clip(s, 40) }

// Clip shortens a text of a user's for a message to a number of letters, and takes out what would
// steer a terminal; a tab is a blank.
func Clip(s string, letters int) string {
	s = strings.Map(func(c rune) rune {
		switch {
		case c == '\t':
			return ' '
		case unicode.IsControl(c):
			return unicode.ReplacementChar
		}
		return c
	}, s)
	if r := []rune(s); len(r) > letters {
		return string(r[:letters]) + "…"
	}
	return s
}

// plural counts things whose name takes an s.
func plural(n int, name string) string {
	if n == 1 {
		return "1 " + name
	}
	return strconv.Itoa(n) + " " + name + "s"
}
