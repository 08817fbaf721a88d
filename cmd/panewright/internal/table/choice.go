package table

// What a page shows of the list of figures: all, those of the schedule, or those that the user
// chose, each at one pane, gap or surface.

import (
	"errors"
	"fmt"
	"math"
	"slices"
	"strconv"
	"strings"

	"panewright/glazing"
	"panewright/glazing/project"
	"panewright/spectra"
)

// A Choice is a figure at one of its places in a rating: one column of a page.
type Choice struct {
	glazing.Figure
	Index int // of the pane, gap or surface, from 0
}

// placeNames are what a figure occurs per.
var placeNames = map[glazing.Per]string{glazing.PerPane: "pane", glazing.PerGap: "gap", glazing.PerSurface: "surface"}

// Path returns the key with the number of the pane, gap or surface, from 1.
func (c Choice) Path() string { return strings.ReplaceAll(c.Key, "#", strconv.Itoa(c.Index+1)) }

// Head returns the symbol, with the number of the pane, gap or surface.
func (c Choice) Head() string {
	head := c.Symbol + c.Mark
	if head == "" {
		head = c.Key[strings.LastIndex(c.Key, ".")+1:]
	}
	if c.Per != glazing.PerMakeup {
		head += strconv.Itoa(c.Index + 1)
	}
	return head
}

// About returns the meaning, with the pane, gap or surface.
func (c Choice) About() string {
	if name, ok := placeNames[c.Per]; ok {
		return c.Meaning + ", " + name + " " + strconv.Itoa(c.Index+1)
	}
	return c.Meaning
}

// in reports whether a rating has the pane, gap or surface.
func (c Choice) in(r *glazing.Rating) bool { return c.Index < c.Count(r) }

// Printed returns the figure as text shows it: blank where the rating has no such place.
func (c Choice) Printed(r *glazing.Rating) string {
	if !c.in(r) {
		return ""
	}
	return c.Print(r, c.Index)
}

// cell returns the figure with all its digits.
func (c Choice) cell(r *glazing.Rating) cell {
	switch {
	case !c.in(r):
		return cell{}
	case c.Text != nil:
		return word(c.Text(r, c.Index))
	}
	v := c.Value(r, c.Index)
	if !v.Known {
		return cell{}
	}
	return number(v.Number, c.Decimals(r, v.Number))
}

// A cell of a sheet is a word, a number, or empty.
type cell struct {
	text    string
	number  float64
	numeric bool
	places  int // decimals as printed; -1 for as many as there are
}

func word(s string) cell { return cell{text: s} }

// number is empty where it is none.
func number(v float64, places int) cell {
	if math.IsNaN(v) || math.IsInf(v, 0) {
		return cell{}
	}
	return cell{number: v, numeric: true, places: places}
}

// figures returns the list of figures in the units of the page.
func (r Report) figures() []glazing.Figure {
	if r.InchPound {
		return glazing.InchPound(r.Figures)
	}
	return r.Figures
}

// most returns how many panes, gaps or surfaces of a figure any rating has.
func (r Report) most(f glazing.Figure) int {
	n := 0
	for i := range r.Ratings {
		n = max(n, f.Count(&r.Ratings[i]))
	}
	return n
}

// everything returns each figure at each place that any rating has: the chosen ones, or all.
func (r Report) everything() []Choice {
	if r.Choices != nil {
		return r.Choices
	}
	var list []Choice
	for _, f := range r.figures() {
		for k := range r.most(f) {
			list = append(list, Choice{f, k})
		}
	}
	return list
}

// Columns returns what the schedule shows: the chosen figures, or those that have a column, in
// their places.
func (r Report) Columns() []Choice {
	if r.Choices != nil {
		return r.Choices
	}
	var list []Choice
	for _, f := range r.figures() {
		if f.Column != 0 && f.Per == glazing.PerMakeup {
			list = append(list, Choice{Figure: f})
		}
	}
	slices.SortStableFunc(list, func(a, b Choice) int { return a.Column - b.Column })
	return list
}

// Choose sets the figures that the report shows, in order, from names that somebody typed. A
// figure of panes, gaps or surfaces without a number stands for all of them.
func (r *Report) Choose(names []string) error {
	list := r.figures()
	r.Choices = []Choice{}
	for _, name := range names {
		if name = strings.TrimSpace(name); name == "" {
			return errors.New("a name is empty; write light,g,u")
		}
		at := slices.IndexFunc(list, func(f glazing.Figure) bool { return f.Named(name) })
		if at < 0 {
			at = slices.IndexFunc(r.Figures, func(f glazing.Figure) bool { return f.Named(name) }) // in SI
		}
		if at < 0 {
			return fmt.Errorf("unknown figure %q; %s", spectra.Clip(name, 60), offerFigure(name, list))
		}
		f := list[at]
		first, end := 0, r.most(f)
		if n := placeIn(name); n > 0 && f.Per != glazing.PerMakeup {
			first, end = n-1, min(n, end)
		}
		if first >= end && len(r.Ratings) > 0 {
			return fmt.Errorf("%s: no make-up that was selected has %s %d", name, placeNames[f.Per], first+1)
		}
		for k := first; k < end; k++ {
			same := func(c Choice) bool { return c.Key == f.Key && c.Index == k }
			if !slices.ContainsFunc(r.Choices, same) {
				r.Choices = append(r.Choices, Choice{f, k})
			}
		}
	}
	return nil
}

// placeIn returns the number that stands in a key, or 0.
func placeIn(name string) int {
	for part := range strings.SplitSeq(name, ".") {
		if n, err := strconv.Atoi(part); err == nil {
			return n
		}
	}
	return 0
}

// offerFigure offers the names nearest to one that is not known, else the short ones.
func offerFigure(name string, list []glazing.Figure) string {
	place := strconv.Itoa(max(1, placeIn(name)))
	var keys []string
	for _, f := range list {
		keys = append(keys, strings.ReplaceAll(f.Key, "#", place))
	}
	short := FigureNames(list)
	if all := append(keys, short...); len(project.Nearest(name, all)) > 0 {
		return project.Offer(name, all)
	}
	return project.Offer(name, short)
}

// FigureNames returns the short names of figures.
func FigureNames(list []glazing.Figure) []string {
	var names []string
	for _, f := range list {
		if f.Alias != "" {
			names = append(names, f.Alias)
		}
	}
	return names
}
