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
	if head == "" { // a fact
		head = strings.ReplaceAll(c.Key[strings.LastIndex(c.Key, ".")+1:], "_", " ")
		if c.Per != glazing.PerMakeup {
			head += " "
		}
	}
	if c.Per != glazing.PerMakeup {
		head += strconv.Itoa(c.Index + 1)
	}
	if c.Condition != "" {
		head += "@" + c.Condition
	}
	return head
}

// About returns the meaning, with the pane, gap or surface, and the condition.
func (c Choice) About() string {
	s := c.Meaning
	if name, ok := placeNames[c.Per]; ok {
		s += ", " + name + " " + strconv.Itoa(c.Index+1)
	}
	return s + c.underCondition()
}

// underCondition names the condition, after a comma.
func (c Choice) underCondition() string {
	if c.Condition == "" {
		return ""
	}
	return ", condition " + c.Condition
}

// in reports whether a rating has the pane, gap or surface, and the condition.
func (c Choice) in(r *glazing.Rating) bool {
	return c.Index < c.Count(r) && (c.Condition == "" || r.Balance(c.Condition) != nil)
}

// Printed returns the figure as text shows it: blank where the rating has no such place.
func (c Choice) Printed(r *glazing.Rating) string {
	if !c.in(r) {
		return ""
	}
	if s := c.Print(r, c.Index); s != "" {
		return s
	}
	return "–" // a fact that is not known
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

// all returns the list of figures: those of a rating, and those of the balances of the ratings.
func (r Report) all() []glazing.Figure {
	return slices.Concat(r.Figures, glazing.ConditionFigures(r.Ratings))
}

// figures returns the list of figures in the units of the page.
func (r Report) figures() []glazing.Figure {
	if r.InchPound {
		return glazing.InchPound(r.all())
	}
	return r.all()
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

// inSheets returns the columns of CSV and of a sheet: everything but the numbers of places, which
// the heads have, unless they were chosen.
func (r Report) inSheets() []Choice {
	if r.Choices != nil {
		return r.Choices
	}
	return slices.DeleteFunc(r.everything(), func(c Choice) bool { return c.Numbering && c.Per != glazing.PerMakeup })
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
// figure of panes, gaps or surfaces without a number stands for all of them. All names that no
// figure has are named in one error.
func (r *Report) Choose(names []string) error {
	list := r.figures()
	r.Choices = []Choice{}
	var unknown, absent []string
	for i := 0; i < len(names); i++ {
		name := strings.TrimSpace(names[i])
		if name == "" {
			return errors.New("a name is empty; write light,g,u")
		}
		at, place := r.named(name)
		if i+1 < len(names) { // a symbol may have a comma, as τdf,700
			if a, p := r.named(name + "," + strings.TrimSpace(names[i+1])); a >= 0 {
				at, place = a, p
				i++
			}
		}
		if at < 0 {
			unknown = add(unknown, fmt.Sprintf("%q", spectra.Clip(name, longestName))+r.offerFigure(name, list))
			continue
		}
		f := list[at]
		first, end := 0, r.most(f)
		if place > 0 {
			first, end = place-1, min(place, end)
		}
		if first >= end && len(r.Ratings) > 0 {
			absent = add(absent, fmt.Sprintf("%s: no make-up that was selected has %s %d", spectra.Clip(name, longestName), placeNames[f.Per], first+1))
			continue
		}
		for k := first; k < end; k++ {
			same := func(c Choice) bool { return c.Key == f.Key && c.Index == k }
			if !slices.ContainsFunc(r.Choices, same) {
				r.Choices = append(r.Choices, Choice{f, k})
			}
		}
	}
	if unknown != nil {
		what := "figure "
		if len(unknown) > 1 {
			what = "figures "
		}
		if more := len(unknown) - unknownNamed; more > 0 {
			unknown = append(unknown[:unknownNamed], fmt.Sprintf("and %d more", more))
		}
		absent = append(absent, "unknown "+what+strings.Join(unknown, ", ")+"; see panewright help figures")
	}
	if absent != nil {
		return errors.New(strings.Join(absent, "; "))
	}
	return nil
}

// What an error shows of names that are not known.
const (
	longestName  = 60
	unknownNamed = 8
	mostOffers   = 3
)

// named returns the figure of a name, in the units of the page or in SI, and the number of the
// place in it, 0 for all; -1 if there is none.
func (r Report) named(name string) (at, place int) {
	for _, list := range [][]glazing.Figure{r.figures(), r.all()} {
		for i, f := range list {
			if place, ok := f.Place(name); ok {
				return i, place
			}
		}
	}
	return -1, 0
}

// tradeWords are words that people use for figures, in lower case, and the short names of these.
var tradeWords = map[string]string{
	"lt": "light", "vlt": "light", "tv": "light", "tvis": "light",
	"lr": "light_outside", "vlr": "light_outside", "rv": "light_outside",
	"st": "solar", "te": "solar", "tsol": "solar", "sr": "solar_outside", "re": "solar_outside",
	"shgc": "g", "g-value": "g", "gvalue": "g", "sf": "g",
	"sc": "shading", "lsg": "light_to_solar", "selectivity": "light_to_solar",
	"u-value": "u", "uvalue": "u", "uval": "u", "u_value": "u", "u-factor": "u", "ug": "u",
	"cri": "ra", "tuv": "uv", "weight": "mass", "alpha": "absorptance", "epsilon": "emissivity",
}

// offerFigure offers what is meant by a name that is not known: the figure of a trade word, the
// conditions where one is missing or not known, else at most three of the nearest names.
func (r Report) offerFigure(name string, list []glazing.Figure) string {
	ids := glazing.ConditionIDs(r.Ratings)
	alone, id, at := strings.Cut(name, "@")
	there := spectra.Clip(strings.Join(ids, ", "), 4*longestName)
	screened := func(x glazing.Rating) bool {
		return slices.ContainsFunc(x.Method.Screened(), func(c glazing.Condition) bool { return c.ID == id })
	}
	switch under := slices.ContainsFunc(glazing.BalanceFigures(), func(f glazing.BalanceFigure) bool { return f.Named(alone) }); {
	case under && at && slices.Contains(ids, id): // it has a number that no make-up has, or is meant otherwise
	case under && slices.ContainsFunc(r.Ratings, screened):
		return " (" + id + " is screened for thermal stress alone; a condition of the project has every figure)"
	case under && len(ids) == 0:
		return " (the ratings have no condition)"
	case under && at && id == "":
		return " (after @ stands a condition: " + there + ")"
	case under && at:
		return fmt.Sprintf(" (no condition is called %s; there are %s)", spectra.Clip(id, longestName), there)
	case under:
		return " (it is one under a condition: write " + alone + "@" + ids[0] + ")"
	case at && slices.ContainsFunc(r.Figures, func(f glazing.Figure) bool { return f.Named(alone) }):
		return " (" + alone + " is not one of the figures under a condition: write " + alone + ")"
	}
	near := []string{tradeWords[strings.ToLower(name)]}
	switch {
	case near[0] != "":
	case len([]rune(name)) == 1: // each figure of one letter is as near
		near = nil
	default:
		place := 1
		for part := range strings.SplitSeq(name, ".") {
			if n, err := strconv.Atoi(part); err == nil {
				place = max(1, n)
			}
		}
		names := FigureNames(list)
		for _, f := range list {
			names = add(add(names, f.KeyAt(place)), Choice{Figure: f}.symbol())
		}
		near = project.Nearest(name, names)
	}
	if len(near) == 0 {
		return ""
	}
	return " (did you mean " + strings.Join(near[:min(mostOffers, len(near))], " or ") + "?)"
}

// symbol returns the symbol with its mark and the condition, without a number.
func (c Choice) symbol() string {
	c.Per = glazing.PerMakeup
	if c.Symbol == "" {
		return ""
	}
	return c.Head()
}

// FigureNames returns the short names of figures, with the conditions that they are under.
func FigureNames(list []glazing.Figure) []string {
	var names []string
	for _, f := range list {
		switch {
		case f.Alias == "":
		case f.Condition != "":
			names = append(names, f.Alias+"@"+f.Condition)
		default:
			names = append(names, f.Alias)
		}
	}
	return names
}
