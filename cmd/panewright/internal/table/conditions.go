package table

// What the pages say under conditions: a table of balances, the conditions themselves, and what follows
// for thermal stress and moisture.

import (
	"bytes"
	"fmt"
	"slices"
	"strings"

	"github.com/jedib0t/go-pretty/v6/text"

	"panewright/glazing"
)

// A Titled is a table under a title, as text, Markdown and paper show it.
type Titled struct {
	Title string
	About string // below the title; "" for nothing
	Note  string // below the table; "" for nothing
	Head  []string
	Names int // columns that name the rows
	Rows  [][]string
}

// namesWidth is how wide all names of a row may be, with the space after each.
const namesWidth = 3 * (nameWidth + gutter)

// print writes the table as text.
func (t Titled) print(b *bytes.Buffer) {
	if len(t.Rows) == 0 {
		return
	}
	widest := min(nameWidth, namesWidth/t.Names-gutter)
	b.WriteByte('\n')
	writeWrapped(b, t.Title, "")
	if t.About != "" {
		writeWrapped(b, t.About, "")
	}
	var columns []column
	for k, head := range t.Head {
		cells := make([]string, len(t.Rows))
		for i, row := range t.Rows {
			cells[i] = row[k]
			if k < t.Names {
				cells[i] = text.WrapHard(row[k], widest)
			}
		}
		if columns = append(columns, newColumn(head, cells)); k < t.Names && columns[k].blank() {
			columns[k].width = -1
		}
	}
	names := slices.DeleteFunc(columns[:t.Names:t.Names], func(c column) bool { return c.width < 0 })
	fold(b, names, columns[t.Names:])
	if t.Note != "" {
		writeWrapped(b, t.Note, "")
	}
}

// blank reports whether a column holds nothing.
func (c column) blank() bool {
	return !slices.ContainsFunc(c.cells, func(s string) bool { return s != "" })
}

// markdown writes the table as Markdown, under a title of a depth.
func (t Titled) markdown(b *bytes.Buffer, depth string) {
	if len(t.Rows) == 0 {
		return
	}
	fmt.Fprintf(b, "\n%s %s\n\n", depth, escaped(t.Title))
	if t.About != "" {
		fmt.Fprintf(b, "%s\n\n", escaped(t.About))
	}
	markdownTable{head: t.Head, names: t.Names, rows: t.Rows}.print(b)
	if t.Note != "" {
		fmt.Fprintf(b, "\n%s\n", escaped(t.Note))
	}
}

// BalanceColumns returns the columns of the schedule of conditions.
func BalanceColumns() []glazing.BalanceFigure {
	list := slices.DeleteFunc(glazing.BalanceFigures(), func(f glazing.BalanceFigure) bool { return f.Schedule == 0 })
	slices.SortStableFunc(list, func(a, b glazing.BalanceFigure) int { return a.Schedule - b.Schedule })
	return list
}

// under returns a figure of the balance under a condition, which stands beside it: its head does not
// name the condition again.
func (r Report) under(f glazing.BalanceFigure, condition string) Choice {
	x := f.At(condition)
	if r.InchPound {
		x = glazing.InchPound([]glazing.Figure{x})[0]
	}
	x.Condition = ""
	return Choice{Figure: x}
}

// balances returns the table of the ratings of a basis under its conditions and those of the user, in
// the order of conditions, so that make-ups stand beside each other.
func (r Report) balances(basis string) Titled {
	t := Titled{Title: "Basis " + basis + ", under conditions", Head: []string{"condition", "make-up", "tint"}, Names: 3}
	if r.Choices != nil {
		return t
	}
	columns := BalanceColumns()
	for _, f := range columns {
		t.Head = append(t.Head, f.Symbol)
	}
	of := r.ratings(basis)
	t.Note = r.NotKnown(r.UnderConditions(columns), func(x *glazing.Rating) bool { return x.Method.Basis.Name == basis })
	for _, id := range glazing.ConditionIDs(of) {
		for _, m := range r.makeups() {
			var rows [][]string
			for i := range of {
				b := of[i].Balance(id)
				if of[i].Makeup != m || b == nil {
					continue
				}
				row := []string{id, m.ID, of[i].Tint}
				for _, f := range columns {
					cell := r.under(f, id).Printed(&of[i])
					if OfSun(f) && b.Condition.SunWM2 == 0 {
						cell = "–"
					}
					row = append(row, cell)
				}
				rows = append(rows, row)
			}
			t.Rows = append(t.Rows, t.asOne(rows)...)
		}
	}
	return t
}

// OfSun reports whether a figure of a balance says nothing without sun.
func OfSun(f glazing.BalanceFigure) bool {
	return slices.Contains([]string{"g", "total_absorptance", "qi"}, f.Alias)
}

// EachTint stands in the place of the tint in a row that holds of all.
const EachTint = "each"

// asOne returns the rows of the tints of a make-up as one where they do not differ.
func (t Titled) asOne(rows [][]string) [][]string {
	for _, row := range rows {
		if len(rows) < 2 || !slices.Equal(row[t.Names:], rows[0][t.Names:]) {
			return rows
		}
	}
	if len(rows) > 0 {
		rows[0][t.Names-1] = EachTint
		return rows[:1]
	}
	return nil
}

// ratings returns those of a basis.
func (r Report) ratings(basis string) (list []glazing.Rating) {
	for i := range r.Ratings {
		if r.Ratings[i].Method.Basis.Name == basis {
			list = append(list, r.Ratings[i])
		}
	}
	return list
}

// BalanceLegend returns what the symbols of the schedule of conditions mean; nil where there is none.
func (r Report) BalanceLegend() []string {
	if r.Choices != nil || len(glazing.ConditionIDs(r.Ratings)) == 0 {
		return nil
	}
	var columns []Choice
	for _, f := range BalanceColumns() {
		columns = append(columns, r.under(f, ""))
	}
	list := legend(columns, nil)
	list[len(list)-1] += ", or of no meaning without sun"
	return list
}

// underSymbols prints what they mean.
func (r Report) underSymbols(b *bytes.Buffer) {
	if list := r.BalanceLegend(); list != nil {
		writeWrapped(b, underTitle+": "+strings.Join(list, "; ")+".", "")
	}
}

// A named condition is one with the bases that bring it.
type namedCondition struct {
	glazing.Condition
	bases    []string // nil of the user's
	screened bool     // for thermal stress alone
}

// conditions returns those of the ratings, each once, and all for which the thermal stress that is
// shown was screened.
func (r Report) conditions() (list []namedCondition) {
	note := func(c glazing.Condition, basis string, screened bool) {
		at := slices.IndexFunc(list, func(x namedCondition) bool { return x.Condition == c })
		if at < 0 {
			list = append(list, namedCondition{Condition: c, screened: screened})
			at = len(list) - 1
		}
		if c.Standard && !screened {
			list[at].bases = add(list[at].bases, basis)
		}
	}
	for _, standard := range []bool{true, false} {
		for i := range r.Ratings {
			for k := range r.Ratings[i].Balances {
				if c := r.Ratings[i].Balances[k].Condition; c.Standard == standard {
					note(*c, r.Ratings[i].Method.Basis.Name, false)
				}
			}
		}
	}
	if r.stressShown() {
		for i := range r.Ratings {
			for _, c := range r.Ratings[i].Method.Screened() {
				note(c, "", true)
			}
		}
	}
	return list
}

// ConditionsListed returns the conditions in words, each once, in the units of the page.
func (r Report) ConditionsListed() (lines []string) {
	for _, c := range r.conditions() {
		lines = append(lines, r.conditionLine(c))
	}
	return lines
}

// further returns what stands below the conditions: whose comfort was chosen, how stress that was chosen
// was screened, where more stands.
func (r Report) further() (lines []string) {
	chosen := func(is func(glazing.Figure) bool) bool {
		return slices.ContainsFunc(r.Choices, func(c Choice) bool { return is(c.Figure) })
	}
	if chosen(ofComfort) {
		lines = append(lines, r.PersonSaid())
	}
	if s := r.ScreeningSaid(); chosen(ofStress) && s != "" {
		lines = append(lines, s)
	}
	if r.BalanceLegend() != nil {
		lines = append(lines, r.conditionsMore())
	}
	return lines
}

// conditionLine returns a condition in words, with what brings it.
func (r Report) conditionLine(c namedCondition) string {
	s := c.ID
	switch {
	case c.bases != nil:
		s += ", of basis " + strings.Join(c.bases, " and ")
	case c.screened:
		s += ", screened for thermal stress"
	}
	return s + ": " + r.ConditionText(&c.Condition)
}

// ConditionText returns a condition in words, in the units of the page.
func (r Report) ConditionText(c *glazing.Condition) string {
	quantity := func(v float64, unit string) string {
		if r.InchPound {
			v, unit = glazing.ToInchPound(v, unit)
		}
		return fmt.Sprintf("%.4g\u00a0%s", v, unit)
	}
	degrees := func(c float64) string { return quantity(c, "°C") }
	coefficient := func(v float64) string { return quantity(v, "W/(m²·K)") }
	wind := func(ms float64) string {
		if r.InchPound {
			return fmt.Sprintf("%.4g\u00a0mph", glazing.MilesPerHour(ms))
		}
		return quantity(ms, "m/s")
	}
	outside := "outdoors " + degrees(c.OutsideC)
	if c.OutsideRadiantC.Known {
		outside += ", radiant " + degrees(c.OutsideRadiantC.Number)
	}
	if c.SkyC.Known {
		outside += ", sky " + degrees(c.SkyC.Number)
	}
	inside := "indoors " + degrees(c.InsideC)
	if c.InsideRadiantC.Known {
		inside += ", radiant " + degrees(c.InsideRadiantC.Number)
	}
	if c.InsideHumidity.Known {
		inside += fmt.Sprintf(", humidity %.4g", c.InsideHumidity.Number)
	}
	parts := []string{outside, inside}
	coefficientOutside, assumed := c.OutsideConvection()
	switch {
	case assumed:
		parts = append(parts, "wind assumed, convection "+coefficient(coefficientOutside))
	case c.WindMS.Known:
		parts = append(parts, "wind "+wind(c.WindMS.Number)+", convection "+coefficient(coefficientOutside))
	default:
		parts = append(parts, "convection outdoors "+coefficient(coefficientOutside))
	}
	if c.InsideConvectionWM2K.Known {
		parts = append(parts, "convection indoors "+coefficient(c.InsideConvectionWM2K.Number))
	}
	if c.SunWM2 > 0 {
		parts = append(parts, "sun "+quantity(c.SunWM2, "W/m²"))
	} else {
		parts = append(parts, "no sun")
	}
	if c.TiltDeg.Known {
		parts = append(parts, fmt.Sprintf("tilt %.6g°", c.TiltDeg.Number))
	}
	if c.HeightM.Known {
		parts = append(parts, fmt.Sprintf("height %.4g m", c.HeightM.Number))
	}
	return strings.Join(parts, "; ")
}

// Titles.
const (
	underTitle        = "Under conditions"
	UnderSymbolsTitle = "Symbols, under conditions"
	conditionsTitle   = "Conditions"
)

// conditionList prints the conditions.
func (r Report) conditionList(b *bytes.Buffer) {
	for i, s := range r.ConditionsListed() {
		if i == 0 {
			b.WriteString("\n" + conditionsTitle + "\n")
		}
		writeWrapped(b, s, "  ")
	}
	for _, s := range r.further() {
		writeWrapped(b, s, "")
	}
}

// conditionsMore stands below the conditions.
func (r Report) conditionsMore() string {
	return "Every surface, gap, moisture and comfort under a condition: panewright explain, or --figures with names such as temperature@" +
		glazing.ConditionIDs(r.Ratings)[0] + "."
}

// basesDiffer prints why bases differ.
func (r Report) basesDiffer(b *bytes.Buffer) {
	if s := r.BasesDiffer(); s != "" {
		b.WriteByte('\n')
		writeWrapped(b, s, "")
	}
}

// BasesDiffer says why the figures under the bases that are shown differ; "" where there is one.
func (r Report) BasesDiffer() string {
	var methods []*glazing.Method
	for i := range r.Ratings {
		if m := r.Ratings[i].Method; !slices.Contains(methods, m) {
			methods = append(methods, m)
		}
	}
	return glazing.BasesDiffer(methods)
}
