package project

// Faults of a project, and the names offered for misspelt ones.

import (
	"fmt"
	"slices"
	"strings"
)

// A Problem is one fault of a project file: where it is, at which key, and what would be right.
type Problem struct {
	File         string
	Line, Column int // from 1; 0 when the whole file is meant
	Key          string
	Text         string
}

func (p *Problem) Error() string {
	s := p.File
	if p.Line > 0 {
		s += fmt.Sprintf(":%d:%d", p.Line, p.Column)
	}
	if p.Key != "" {
		return s + ": " + clip(p.Key) + ": " + p.Text
	}
	return s + ": " + p.Text
}

// Errors are all the faults found in a project and the files it names, in the order in which
// they were found.
type Errors []error

func (e Errors) Error() string {
	var lines []string
	for _, x := range e {
		lines = append(lines, x.Error())
	}
	return strings.Join(lines, "\n")
}

// Unwrap lets errors.As find each fault.
func (e Errors) Unwrap() []error { return e }

// Nearest returns those of the known names that are nearest to a misspelt one: those at the
// least distance, counted in letters changed, added, dropped or swapped, if that is small.
func Nearest(word string, names []string) []string {
	word = strings.ToLower(word)
	letters := len([]rune(word))
	best := 2 // in a short word one letter may differ
	if letters > 3 {
		best = max(2, letters/3) + 1
	}
	var near []string
	for _, name := range names {
		d := distance(word, strings.ToLower(name), best)
		if letters >= 3 && strings.HasPrefix(strings.ToLower(name), word) {
			d = 1 // the beginning of a name
		}
		switch {
		case name == "":
		case d < best:
			best, near = d, []string{name}
		case d == best && len(near) > 0:
			near = append(near, name)
		}
	}
	return near
}

// Offer words the offer of the names nearest to a misspelt one, or lists all where none is near.
func Offer(word string, names []string) string { return didYouMean(Nearest(word, names), names) }

// OfferAll offers the nearest names and lists all in any case, for names that are few and short.
func OfferAll(word string, names []string) string {
	all := slices.Sorted(slices.Values(names))
	list := "write "
	for i, name := range all {
		switch {
		case i == 0:
		case i == len(all)-1:
			list += " or "
		default:
			list += ", "
		}
		list += name
	}
	if near := Nearest(word, names); len(near) > 0 {
		return didYouMean(near, names) + " " + list
	}
	return list
}

func didYouMean(near, all []string) string {
	if len(near) > 0 {
		return "did you mean " + strings.Join(near, " or ") + "?"
	}
	return known(all)
}

// known lists names for a message.
func known(all []string) string {
	all = slices.DeleteFunc(slices.Compact(slices.Sorted(slices.Values(all))), func(s string) bool { return s == "" })
	if len(all) > 30 {
		return "known are " + strings.Join(all[:30], ", ") + " and others"
	}
	return "known are " + strings.Join(all, ", ")
}

// distance is the number of single letters changed, added, dropped, or of neighbours swapped,
// that lead from a to b; anything beyond limit is returned as limit + 1.
func distance(a, b string, limit int) int {
	x, y := []rune(a), []rune(b)
	if d := len(x) - len(y); d > limit || -d > limit {
		return limit + 1
	}
	before, last, row := make([]int, len(y)+1), make([]int, len(y)+1), make([]int, len(y)+1)
	for j := range last {
		last[j] = j
	}
	for i := 1; i <= len(x); i++ {
		row[0] = i
		for j := 1; j <= len(y); j++ {
			change := last[j-1]
			if x[i-1] != y[j-1] {
				change++
			}
			row[j] = min(change, last[j]+1, row[j-1]+1)
			if i > 1 && j > 1 && x[i-1] == y[j-2] && x[i-2] == y[j-1] {
				row[j] = min(row[j], before[j-2]+1)
			}
		}
		before, last, row = last, row, before
	}
	return min(last[len(y)], limit+1)
}
