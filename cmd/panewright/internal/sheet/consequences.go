package sheet

// What follows from temperatures: thermal stress, moisture, comfort, from the lists of figures.

import (
	"slices"
	"strconv"
	"strings"

	"panewright/cmd/panewright/internal/draw"
	"panewright/cmd/panewright/internal/table"
	"panewright/glazing"
	"panewright/thermal"
)

// stressTable lists the screening for thermal stress of each pane, a row a tint where tints differ; it
// is nil where none is known.
func (p *paper) stressTable(ratings []*glazing.Rating, w float64) *grid {
	if !slices.ContainsFunc(ratings, func(r *glazing.Rating) bool {
		return slices.ContainsFunc(r.Stress, func(s glazing.Stress) bool { return s.Why == "" })
	}) {
		return nil
	}
	var figures []glazing.Figure
	for _, alias := range []string{"stress_drop", "stress_guide", "stress_word", "stress_condition"} {
		f, ok := named(p.r.Figures, alias)
		if !ok {
			return nil
		}
		figures = append(figures, f)
	}
	const word = 2 // of the figures, that against the guide value
	number := func(f glazing.Figure) col {
		return col{align: draw.Right, t: textType, head: draw.Symbol(f.Symbol) + ", " + f.Unit, symbol: true}
	}
	cols := []col{{t: textType, head: "pane"}}
	if len(ratings) > 1 {
		cols = append(cols, col{t: textType, head: "tint"})
	}
	names := len(cols)
	drop, guide := figures[0], figures[1]
	cols = append(cols, number(drop), number(guide), col{t: textType, head: "against it"}, col{t: textType, head: "condition"})
	g := &grid{height: 4.2, types: map[[2]int]draw.Type{}}
	for k, placed := range ratings[0].Makeup.Panes {
		name := strconv.Itoa(k+1) + "\u00a0" + placed.Pane.ID
		var rows [][]string
		same := true
		for _, r := range ratings {
			row := []string{"", r.Tint}[:names]
			for _, f := range figures {
				row = append(row, trueMinus(f.Print(r, k)))
			}
			rows = append(rows, row)
			same = same && slices.Equal(row[names:], rows[0][names:])
		}
		if same && names > 1 {
			rows = rows[:1]
			rows[0][1] = table.EachTint
		}
		rows[0][0] = name
		for _, row := range rows {
			t := strongType
			switch row[names+word] {
			case string(thermal.AboveGuide):
				t.Colour = draw.Accent
				fallthrough
			case string(thermal.NearGuide):
				g.types[[2]int{len(g.rows), names + word}] = t
			}
			g.rows, g.leads = append(g.rows, row), append(g.leads, []string{name})
		}
	}
	if g.cols = fitColumns(cols, g.rows, w); g.cols == nil {
		return nil
	}
	said := []string{drop.Symbol + " is by how much the sunlit middle is warmer than the shaded edge in the worst condition, " +
		guide.Symbol + " the guide value for the heat treatment; discuss what is near or above it with a licensed engineer.", p.r.ScreeningSaid()}
	if len(ratings[0].Balances) == 0 { // else conditions have their own place
		for _, s := range p.conditionsSaid(ratings) {
			said = append(said, s+".")
		}
	}
	g.say(p, said...)
	return g
}

// fitColumns makes columns as wide as their cells, within bounds, and shares what remains of a width,
// the first taking twice as much as another. It returns nil where they do not find place.
func fitColumns(cols []col, rows [][]string, w float64) []col {
	const nameMost, cellMost = 36.0, 28.0
	more := w
	for k := range cols {
		c, most := &cols[k], cellMost
		if k == 0 {
			most = nameMost
		}
		for _, row := range rows {
			c.w = max(c.w, draw.Width(row[k], c.t))
		}
		head := softType
		head.Markup = c.symbol
		c.w = max(min(c.w, most), draw.Width(c.head, head)) + gridGap
		more -= c.w
	}
	if more < 0 {
		return nil
	}
	more /= float64(len(cols) + 1)
	cols[0].w += more
	for k := range cols {
		cols[k].w += more
	}
	return cols
}

// consequenceConditions is how many conditions stand beside each other in a table of moisture and
// comfort.
const consequenceConditions = 5

const comfortKeys = "comfort."

// consequenceTable lists what is known of moisture and comfort, a column a condition: where tints
// differ, from the lightest to the darkest.
func (p *paper) consequenceTable(ratings []*glazing.Rating, ids []string, w float64) *grid {
	const symbolW, meaningW, valueW, clauseW = 9.6, 50.0, 17.0, 27.0
	lightest, darkest := extremes(ratings)
	n := float64(len(ids))
	if w < symbolW+meaningW+valueW*n {
		return nil
	}
	g := &grid{height: 3.8, cols: []col{{w: symbolW, t: symbolType}, {t: symbolType}}}
	for _, id := range ids {
		g.cols = append(g.cols, col{w: valueW, align: draw.Right, t: textType, head: id})
	}
	clause := draw.Type{Size: 6, Colour: draw.Soft}
	room := w - symbolW - valueW*n
	sourced := room >= meaningW+clauseW
	if sourced {
		room -= clauseW
		g.cols = append(g.cols, col{w: clauseW, t: clause, head: "defined in"})
	}
	g.cols[1].w = room
	var shown []glazing.BalanceFigure
	for _, f := range glazing.BalanceFigures() {
		if !strings.HasPrefix(f.Key, "moisture.") && !strings.HasPrefix(f.Key, comfortKeys) {
			continue
		}
		row := []string{draw.Symbol(f.Symbol), p.worded(f.Meaning)}
		if f.Unit != "" {
			row[1] += ", " + f.Unit
		}
		any := false
		for _, id := range ids {
			cell := unknown
			if lightest.Balance(id) != nil {
				cell = trueMinus(f.At(id).Print(lightest, 0))
				if other := trueMinus(f.At(id).Print(darkest, 0)); other != cell {
					cell += " → " + other
				}
			}
			any = any || cell != unknown
			row = append(row, cell)
		}
		if sourced {
			row = append(row, f.Clause)
		}
		if any {
			g.rows, shown = append(g.rows, row), append(shown, f)
		}
	}
	if len(g.rows) == 0 {
		return nil
	}
	all := p.conditionsOf(ratings)
	said := make([]string, 4)
	if lightest != darkest {
		said[0] = "From the lightest tint, " + lightest.Tint + ", to the darkest, " + darkest.Tint + ", where they differ."
	}
	for i, f := range shown {
		if f.Above1 != "" && slices.ContainsFunc(g.rows[i], func(cell string) bool { return strings.Contains(cell, f.Above1) }) {
			said[1] = table.Above1(f.Figure) + "."
		}
		if strings.HasPrefix(f.Key, comfortKeys) && ids[len(ids)-1] == all[len(all)-1] { // once
			said[3] = p.of(ratings).PersonSaid()
		}
	}
	r := p.of(ratings)
	here := slices.DeleteFunc(r.UnderConditions(shown), func(c table.Choice) bool { return !slices.Contains(ids, c.Condition) })
	said[2] = r.NotKnown(here, nil)
	g.say(p, said...)
	return g
}

// titled is a table that pages of text have too. Columns of names that hold nothing are left out, and a
// name in the first that is that of the row above.
func (p *paper) titled(t table.Titled) *grid {
	g := &grid{height: 4.2}
	var cols []col
	var kept []int
	for k, head := range t.Head {
		if k < t.Names && !slices.ContainsFunc(t.Rows, func(row []string) bool { return row[k] != "" }) {
			continue
		}
		c := col{t: textType, head: head}
		switch {
		case k >= t.Names:
			c.align, c.head, c.symbol = draw.Right, draw.Symbol(head), true
		case k == 0:
			c.t = strongType
		}
		kept, cols = append(kept, k), append(cols, c)
	}
	for i, from := range t.Rows {
		row := make([]string, len(kept))
		for j, k := range kept {
			if row[j] = from[k]; k >= t.Names {
				row[j] = trueMinus(from[k])
			}
		}
		if g.leads = append(g.leads, []string{row[0]}); i > 0 && t.Rows[i-1][0] == row[0] {
			row[0] = ""
		}
		g.rows = append(g.rows, row)
	}
	if g.cols = fitColumns(cols, g.rows, width); g.cols == nil {
		for k := range cols {
			cols[k].w = width / float64(len(cols))
		}
		g.cols = cols
	}
	g.say(p, t.About, t.Note)
	return g
}
