// Package checks holds figures that Panewright must reproduce, as data: what is computed, from
// which inputs, the figure, its tolerance and its source. Some are printed in the source; where
// the source prints a method and not the case, the figure was worked through apart from this
// program, and the source says so. The package computes nothing; glazing/proof does.
//
// The figures stand in the files under tables/, embedded. A file begins with "# title:",
// "# inputs:", "# tolerance:" and "# verified:", names each of its sources once in a line
// "# source KEY: text", and then has one row a check. To add a check, add a row; a row without
// a known source is refused.
package checks

import (
	"embed"
	"encoding/csv"
	"fmt"
	"io"
	"io/fs"
	"math"
	"slices"
	"strconv"
	"strings"
	"sync"
)

//go:embed tables/*.csv
var files embed.FS

// A Check is one published figure.
type Check struct {
	ID        string
	Kind      string            // what computes it: one of the kinds of package glazing/proof
	Inputs    map[string]string // by name, with the unit in the name
	Want      float64
	Unit      string  // "1" for a plain number
	Tolerance float64 // the largest difference that passes; 0 asks for equality
	What      string  // the figure in words
	Source    string  // publication
	Standing  string  // one of Standings
}

// Standings returns what a figure's standing may be.
func Standings() []string { return []string{"read", "from memory", "common practice, no source"} }

// All returns every check, file by file in the order of their names. Inputs are shared and must
// not be written to.
func All() []Check { return slices.Clone(all()) }

var all = sync.OnceValue(func() []Check {
	names, err := fs.Glob(files, "tables/*.csv")
	if err != nil {
		panic("checks: " + err.Error())
	}
	var list []Check
	for _, name := range names {
		text, err := files.ReadFile(name)
		if err == nil {
			list, err = parse(list, name, string(text))
		}
		if err != nil {
			panic("checks: " + err.Error())
		}
	}
	return list
})

// heads are the columns of a file, in this order.
const heads = "id,kind,inputs,want,unit,tolerance,what,source,standing"

// headings are the comment lines with which a file begins, beside its sources.
var headings = [...]string{"title", "inputs", "tolerance", "verified"}

// parse appends the checks of one file to list, in which no id may stand twice.
func parse(list []Check, name, text string) ([]Check, error) {
	sources, err := readHeadings(name, text)
	if err != nil {
		return nil, err
	}
	r := csv.NewReader(strings.NewReader(text))
	r.Comment, r.FieldsPerRecord = '#', strings.Count(heads, ",")+1
	for first := true; ; first = false {
		cells, err := r.Read()
		if err == io.EOF {
			return list, nil
		}
		if err != nil {
			return nil, fmt.Errorf("%s: %w", name, err)
		}
		if first {
			if got := strings.Join(cells, ","); got != heads {
				return nil, fmt.Errorf("%s: columns are %s; they must be %s", name, got, heads)
			}
			continue
		}
		line, _ := r.FieldPos(0)
		c, err := check(cells, sources)
		if err == nil && slices.ContainsFunc(list, func(x Check) bool { return x.ID == c.ID }) {
			err = fmt.Errorf("id %s stands twice", c.ID)
		}
		if err != nil {
			return nil, fmt.Errorf("%s:%d: %w", name, line, err)
		}
		list = append(list, c)
	}
}

// readHeadings returns the sources that the comment lines of a file name, by key.
func readHeadings(name, text string) (map[string]string, error) {
	sources, seen := map[string]string{}, map[string]string{}
	for line := range strings.Lines(text) {
		comment, ok := strings.CutPrefix(line, "# ")
		if !ok {
			continue
		}
		key, value, _ := strings.Cut(strings.TrimSpace(comment), ": ")
		if source, ok := strings.CutPrefix(key, "source "); ok {
			sources[source] = value
			continue
		}
		seen[key] = value
	}
	for _, h := range headings {
		if seen[h] == "" {
			return nil, fmt.Errorf("%s: has no heading %q", name, h)
		}
	}
	return sources, nil
}

// check makes a check of the cells of one row.
func check(cells []string, sources map[string]string) (Check, error) {
	c := Check{ID: cells[0], Kind: cells[1], Unit: cells[4], What: cells[6], Source: sources[cells[7]], Standing: cells[8]}
	for i, cell := range cells {
		if cell == "" {
			return c, fmt.Errorf("the cell %s is blank", strings.Split(heads, ",")[i])
		}
	}
	if c.Source == "" {
		return c, fmt.Errorf("check %s: no line \"# source %s: …\" at the head; a published figure needs its source", c.ID, cells[7])
	}
	if !slices.Contains(Standings(), c.Standing) {
		return c, fmt.Errorf("check %s: standing %q is none of %q", c.ID, c.Standing, Standings())
	}
	var err error
	if c.Inputs, err = inputs(cells[2]); err != nil {
		return c, fmt.Errorf("check %s: %w", c.ID, err)
	}
	for _, x := range []struct {
		name string
		cell string
		to   *float64
	}{{"want", cells[3], &c.Want}, {"tolerance", cells[5], &c.Tolerance}} {
		v, err := strconv.ParseFloat(x.cell, 64)
		if err != nil || math.IsNaN(v) || math.IsInf(v, 0) {
			return c, fmt.Errorf("check %s: %s %q is not a finite number", c.ID, x.name, x.cell)
		}
		*x.to = v
	}
	if c.Tolerance < 0 {
		return c, fmt.Errorf("check %s: tolerance %g is below 0", c.ID, c.Tolerance)
	}
	return c, nil
}

// inputs reads "key=value; key=value".
func inputs(text string) (map[string]string, error) {
	out := map[string]string{}
	for part := range strings.SplitSeq(text, ";") {
		key, value, ok := strings.Cut(strings.TrimSpace(part), "=")
		if !ok || key == "" || value == "" {
			return nil, fmt.Errorf("input %q is not key=value", part)
		}
		if _, twice := out[key]; twice {
			return nil, fmt.Errorf("input %s stands twice", key)
		}
		out[key] = value
	}
	return out, nil
}
