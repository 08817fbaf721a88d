package checks

// The reader of the files of checks: headings, then rows of either layout.

import (
	"encoding/csv"
	"fmt"
	"io"
	"maps"
	"math"
	"slices"
	"strconv"
	"strings"
	"unicode"
)

// The columns with which a file of either layout begins, in this order. The first layout has no
// more; what follows those of the second are its figures.
const (
	heads     = "id,kind,inputs,want,unit,tolerance,what,source,standing"
	wideHeads = "id,kind,inputs,what,source,standing"
)

// headings are the lines that every head has, beside sources and definitions.
var headings = [...]string{"title", "inputs", "tolerance", "verified"}

// A head is what the comment lines of a file say.
type head struct {
	texts   map[string]string // the headings
	sources map[string]string
	columns map[string]column
	known   map[string]Known
	panes   []Definition
	used    map[string]bool // "source KEY", "column NAME" and so on, once a row has named it
}

// A column is one figure of the second layout.
type column struct {
	what, unit string
	tolerance  string
	inputs     string
}

// parse reads one file.
func parse(name, text string) (Group, error) {
	h, err := readHead(name, text)
	if err != nil {
		return Group{}, err
	}
	g := Group{Title: h.texts["title"], Inputs: h.texts["inputs"], Tolerance: h.texts["tolerance"], Verified: h.texts["verified"], Panes: h.panes}
	r := csv.NewReader(strings.NewReader(text))
	r.Comment = '#'
	titles, err := r.Read()
	if err != nil {
		return g, fmt.Errorf("%s: no rows: %w", name, err)
	}
	row := h.long
	figures, wide := strings.CutPrefix(strings.Join(titles, ","), wideHeads+",")
	switch {
	case wide:
		row = func(cells []string) ([]Check, error) { return h.wide(strings.Split(figures, ","), cells) }
	case strings.Join(titles, ",") != heads:
		return g, fmt.Errorf("%s: columns are %s; they must be %s, or begin with %s", name, strings.Join(titles, ","), heads, wideHeads)
	}
	for {
		cells, err := r.Read()
		if err == io.EOF {
			break
		}
		if err != nil {
			return g, fmt.Errorf("%s: %w", name, err)
		}
		line, _ := r.FieldPos(0)
		list, err := row(cells)
		if err == nil {
			for _, c := range list {
				if slices.ContainsFunc(g.Checks, func(x Check) bool { return x.ID == c.ID }) {
					err = fmt.Errorf("id %s stands twice", c.ID)
				}
			}
		}
		if err != nil {
			return g, fmt.Errorf("%s:%d: %w", name, line, err)
		}
		g.Checks = append(g.Checks, list...)
	}
	return g, h.unused(name)
}

// readHead reads the comment lines of a file.
func readHead(name, text string) (*head, error) {
	h := &head{texts: map[string]string{}, sources: map[string]string{}, columns: map[string]column{}, known: map[string]Known{}, used: map[string]bool{}}
	for line := range strings.Lines(text) {
		comment, ok := strings.CutPrefix(line, "# ")
		if !ok {
			continue
		}
		key, value, _ := strings.Cut(strings.TrimSpace(comment), ": ")
		kind, what, _ := strings.Cut(key, " ")
		var err error
		switch kind {
		case "source":
			h.sources[what] = value
		case "column":
			parts := strings.Split(value, " | ")
			if len(parts) != 4 {
				err = fmt.Errorf("column %s is not words | unit | tolerance | inputs", what)
				break
			}
			h.columns[what] = column{parts[0], parts[1], parts[2], parts[3]}
		case "pane":
			h.panes = append(h.panes, Definition{what, value})
		case "known":
			h.known[what], err = readKnown(what, value)
		default:
			h.texts[key] = value
		}
		if err != nil {
			return nil, fmt.Errorf("%s: %w", name, err)
		}
	}
	for _, x := range headings {
		if h.texts[x] == "" {
			return nil, fmt.Errorf("%s: has no heading %q", name, x)
		}
	}
	return h, nil
}

// readKnown reads "FROM to TO: why".
func readKnown(id, text string) (k Known, err error) {
	bounds, why, _ := strings.Cut(text, ": ")
	from, to, _ := strings.Cut(bounds, " to ")
	if k.From, err = number("known "+id, from); err != nil {
		return k, err
	}
	if k.To, err = number("known "+id, to); err != nil {
		return k, err
	}
	if k.Why = why; why == "" || k.From > k.To {
		return k, fmt.Errorf("known %s is not FROM to TO: why", id)
	}
	return k, nil
}

// unused is an error if a heading stands for nothing.
func (h *head) unused(name string) error {
	var all []string
	for _, key := range slices.Sorted(maps.Keys(h.sources)) {
		all = append(all, "source "+key)
	}
	for _, key := range slices.Sorted(maps.Keys(h.columns)) {
		all = append(all, "column "+key)
	}
	for _, key := range slices.Sorted(maps.Keys(h.known)) {
		all = append(all, "known "+key)
	}
	for _, d := range h.panes {
		all = append(all, "pane "+d.Name)
	}
	for _, key := range all {
		if !h.used[key] {
			return fmt.Errorf("%s: no row uses the heading %q", name, key)
		}
	}
	return nil
}

// long makes the check of one row of the first layout.
func (h *head) long(cells []string) ([]Check, error) {
	for i, cell := range cells {
		if cell == "" {
			return nil, fmt.Errorf("the cell %s is blank", strings.Split(heads, ",")[i])
		}
	}
	c, err := h.check(Check{ID: cells[0], Kind: cells[1], Unit: cells[4], What: cells[6], Standing: cells[8]}, cells[7], cells[2], cells[3], cells[5])
	return []Check{c}, err
}

// wide makes the checks of one row of the second layout.
func (h *head) wide(figures, cells []string) ([]Check, error) {
	fixed := strings.Split(wideHeads, ",")
	for i, title := range fixed {
		if cells[i] == "" {
			return nil, fmt.Errorf("the cell %s is blank", title)
		}
	}
	var list []Check
	for i, name := range figures {
		col, ok := h.columns[name]
		if !ok {
			return nil, fmt.Errorf("no line \"# column %s: …\" at the head", name)
		}
		h.used["column "+name] = true
		want := cells[len(fixed)+i]
		if want == "" {
			continue
		}
		c, err := h.check(Check{ID: cells[0] + "-" + name, Subject: cells[3], Kind: cells[1], Unit: col.unit, What: col.what, Standing: cells[5]},
			cells[4], cells[2]+"; "+col.inputs, want, col.tolerance)
		if err != nil {
			return nil, err
		}
		list = append(list, c)
	}
	if list == nil {
		return nil, fmt.Errorf("row %s has no figure", cells[0])
	}
	return list, nil
}

// check completes a check with what has to be looked up or read.
func (h *head) check(c Check, source, inputs, want, tolerance string) (Check, error) {
	c.Source, c.Printed = h.sources[source], want
	h.used["source "+source] = true
	if c.Source == "" {
		return c, fmt.Errorf("check %s: no line \"# source %s: …\" at the head; a published figure needs its source", c.ID, source)
	}
	if !slices.Contains(Standings(), c.Standing) {
		return c, fmt.Errorf("check %s: standing %q is none of %q", c.ID, c.Standing, Standings())
	}
	if k, ok := h.known[c.ID]; ok {
		c.Known, h.used["known "+c.ID] = k, true
	}
	var err error
	if c.Inputs, err = h.inputs(inputs); err == nil {
		c.Want, err = number("want", want)
	}
	if err == nil {
		c.Tolerance, err = number("tolerance", tolerance)
	}
	switch {
	case err != nil:
		return c, fmt.Errorf("check %s: %w", c.ID, err)
	case c.Tolerance < 0:
		return c, fmt.Errorf("check %s: tolerance %g is below 0", c.ID, c.Tolerance)
	}
	return c, nil
}

func number(name, text string) (float64, error) {
	v, err := strconv.ParseFloat(text, 64)
	if err != nil || math.IsNaN(v) || math.IsInf(v, 0) {
		return 0, fmt.Errorf("%s %q is not a finite number", name, text)
	}
	return v, nil
}

// inputs reads "key=value; key=value" and adds the panes that it names.
func (h *head) inputs(text string) (map[string]string, error) {
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
	words := strings.FieldsFunc(text, func(c rune) bool { return !unicode.IsLetter(c) && !unicode.IsDigit(c) && c != '-' })
	for _, d := range h.panes {
		if slices.Contains(words, d.Name) {
			out["pane "+d.Name], h.used["pane "+d.Name] = d.Text, true
		}
	}
	return out, nil
}
