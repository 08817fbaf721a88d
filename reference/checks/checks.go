// Package checks holds figures that Panewright must reproduce, as data: what is computed, from
// which inputs, the figure, its tolerance and its source. Some are printed in the source; where
// the source prints a method and not the case, the figure was worked through apart from this
// program, and the source says so. The package computes nothing; glazing/proof does.
//
// The figures stand in the files under tables/, embedded, one file a standard. A file begins with
// "# title:", "# inputs:", "# tolerance:" and "# verified:", and names each of its sources once in a
// line "# source KEY: text". Its rows are of one of two layouts:
//
//   - id,kind,inputs,want,unit,tolerance,what,source,standing: a row is one check.
//   - id,kind,inputs,what,source,standing and then columns of figures, each with a heading
//     "# column NAME: words | unit | tolerance | inputs": a row is one make-up, and each cell that
//     is not blank is a check, whose id ends in the name of the column.
//
// A heading "# pane NAME: text" defines a pane: rows whose inputs name it have its text as the input
// "pane NAME". A heading "# known ID: FROM to TO: why" says that a check is known to differ from its
// source by FROM to TO, which is no miss but is shown.
//
// To add a check, add a row; a row without a known source is refused.
package checks

import (
	"embed"
	"fmt"
	"io/fs"
	"slices"
	"sync"
)

//go:embed tables/*.csv
var files embed.FS

// A Check is one published figure.
type Check struct {
	ID        string
	Subject   string            // what is looked at, where several figures of it follow each other; else ""
	Kind      string            // what computes it: one of the kinds of package glazing/proof
	Inputs    map[string]string // by name, with the unit in the name
	Want      float64
	Printed   string  // Want with the digits that the file has
	Unit      string  // "1" for a plain number
	Tolerance float64 // the largest difference that passes; 0 asks for equality
	What      string  // the figure in words; with a Subject, of which it is
	Source    string  // publication
	Standing  string  // one of Standings
	Known     Known
}

// Known says why, and within which bounds, a figure is known to differ from its source. The zero
// value is that of a figure that agrees.
type Known struct {
	From, To float64 // the difference, computed less published
	Why      string
}

// A Group is the checks of one file.
type Group struct {
	Title                       string // the standard
	Inputs, Tolerance, Verified string // what the head of the file says of them
	Panes                       []Definition
	Checks                      []Check
}

// A Definition is what a group calls a pane, and its text.
type Definition struct{ Name, Text string }

// Standings returns what a figure's standing may be.
func Standings() []string { return []string{"read", "from memory", "common practice, no source"} }

// Groups returns the checks by file, in the order of the files' names. What is inside the groups is
// shared and must not be written to.
func Groups() []Group { return slices.Clone(groups()) }

// All returns every check, in the same order. Inputs are shared and must not be written to.
func All() []Check {
	var list []Check
	for _, g := range groups() {
		list = append(list, g.Checks...)
	}
	return list
}

var groups = sync.OnceValue(func() []Group {
	names, err := fs.Glob(files, "tables/*.csv")
	if err != nil {
		panic("checks: " + err.Error())
	}
	list, err := readAll(names, files.ReadFile)
	if err != nil {
		panic("checks: " + err.Error())
	}
	return list
})

// readAll reads files, in which no id may stand twice.
func readAll(names []string, read func(string) ([]byte, error)) ([]Group, error) {
	var list []Group
	seen := map[string]bool{}
	for _, name := range names {
		text, err := read(name)
		if err != nil {
			return nil, err
		}
		g, err := parse(name, string(text))
		if err != nil {
			return nil, err
		}
		for _, c := range g.Checks {
			if seen[c.ID] {
				return nil, fmt.Errorf("%s: id %s stands twice", name, c.ID)
			}
			seen[c.ID] = true
		}
		list = append(list, g)
	}
	return list, nil
}
