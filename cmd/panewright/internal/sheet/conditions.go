package sheet

// What stands under conditions: balances and temperatures of surfaces, from the list of figures of a
// balance.

import (
	"slices"
	"strconv"
	"strings"

	"panewright/cmd/panewright/internal/draw"
	"panewright/cmd/panewright/internal/table"
	"panewright/glazing"
)

// of returns the report of some of its ratings.
func (p *paper) of(ratings []*glazing.Rating) table.Report {
	r := p.r
	r.Ratings, r.Spectra = nil, nil
	for _, rating := range ratings {
		r.Ratings = append(r.Ratings, *rating)
	}
	return r
}

// conditionsOf returns the conditions that ratings have.
func (p *paper) conditionsOf(ratings []*glazing.Rating) []string {
	return glazing.ConditionIDs(p.of(ratings).Ratings)
}

// underConditions returns what a sheet says under conditions, as pieces that find their own place.
func (p *paper) underConditions(ratings []*glazing.Rating) (pieces []piece) {
	add := func(title string, made func(w float64) *grid) bool {
		if made(width) == nil {
			return false
		}
		pieces = append(pieces, p.tabled(title, made))
		return true
	}
	ids := p.conditionsOf(ratings)
	add("Under conditions", func(w float64) *grid { return p.balanceTable(ratings, ids, w) })
	temperatures := add("Temperatures of surfaces, °C", func(w float64) *grid { return p.temperatureTable(ratings, ids, w) })
	stress := func() { add("Thermal stress, a screening", func(w float64) *grid { return p.stressTable(ratings, w) }) }
	if temperatures {
		stress() // beside them
	}
	if said := p.conditionsSaid(ratings); len(ids) > 0 {
		pieces = append(pieces, p.listed(list{title: conditionsTitle, items: said}))
	}
	if !temperatures {
		stress()
	}
	title := "Moisture and comfort"
	parts := (len(ids) + consequenceConditions - 1) / consequenceConditions
	for k := range parts { // about as many conditions in each
		part := ids[k*len(ids)/parts : (k+1)*len(ids)/parts]
		if add(title, func(w float64) *grid { return p.consequenceTable(ratings, part, w) }) {
			title = "Moisture and comfort, further conditions"
		}
	}
	return pieces
}

const conditionsTitle = "Conditions"

// conditionsSaid returns the conditions of ratings in words, and those for which their thermal stress was
// screened.
func (p *paper) conditionsSaid(ratings []*glazing.Rating) []string {
	return withMinus(p.of(ratings).ConditionsListed())
}

// withMinus writes the numbers in sentences with a true minus.
func withMinus(lines []string) (list []string) {
	for _, s := range lines {
		list = append(list, strings.ReplaceAll(s, " -", " −"))
	}
	return list
}

// trueMinus writes a number with one; an unknown figure stays.
func trueMinus(s string) string {
	if len(s) > 1 && s[0] == '-' {
		return "−" + s[1:]
	}
	return s
}

// balanceCell prints a figure of the schedule of conditions.
func balanceCell(f glazing.BalanceFigure, r *glazing.Rating, condition string) string {
	if table.OfSun(f) && r.Balance(condition).Condition.SunWM2 == 0 {
		return unknown
	}
	return trueMinus(f.At(condition).Print(r, 0))
}

// A conditionRow is a row of figures under a condition, of one tint or of all.
type conditionRow struct {
	condition string
	rating    *glazing.Rating
	tint      string
	figures   []string
}

// rowsUnder returns the rows of a make-up under a condition, one where its tints do not differ.
func rowsUnder(ratings []*glazing.Rating, id string, figures func(*glazing.Rating) []string) (rows []conditionRow) {
	same := true
	for _, r := range ratings {
		if r.Balance(id) == nil {
			continue
		}
		rows = append(rows, conditionRow{id, r, r.Tint, figures(r)})
		same = same && slices.Equal(rows[0].figures, rows[len(rows)-1].figures)
	}
	if same && len(rows) > 1 {
		rows = rows[:1]
		rows[0].tint = table.EachTint
	}
	return rows
}

// named adds the rows of a condition to a grid that begins with the condition and, of several tints,
// the tint.
func (g *grid) named(rows []conditionRow, tints bool) {
	for i, x := range rows {
		row := []string{x.condition}
		if i > 0 {
			row[0] = ""
		}
		if g.leads = append(g.leads, []string{x.condition}); tints {
			row = append(row, x.tint)
		}
		g.rows = append(g.rows, append(row, x.figures...))
	}
}

// nameColumns are those of the condition and the tint, in what a table leaves for them; nil where that
// is too little.
func nameColumns(ratings []*glazing.Rating, room float64, ids []string) []col {
	const least, tintLeast, tintMost = 20.0, 11.0, 24.0
	if len(ratings) == 1 {
		if room < least {
			return nil
		}
		return []col{{w: room, t: strongType, head: "condition"}}
	}
	tintW, idW := tintLeast, least
	for _, r := range ratings {
		tintW = min(tintMost, max(tintW, draw.Width(r.Tint, textType)+gridGap+1))
	}
	for _, id := range ids {
		idW = max(idW, draw.Width(id, strongType)+gridGap+3)
	}
	if room < least+tintLeast {
		return nil
	}
	idW = min(max(idW, room*0.4), room-tintW)
	if idW < least {
		idW = least
	}
	return []col{{w: idW, t: strongType, head: "condition"}, {w: room - idW, t: textType, head: "tint"}}
}

// balanceRows returns the rows of a make-up under a condition in the schedule of conditions.
func balanceRows(ratings []*glazing.Rating, id string) []conditionRow {
	return rowsUnder(ratings, id, func(r *glazing.Rating) (list []string) {
		for _, f := range table.BalanceColumns() {
			list = append(list, balanceCell(f, r, id))
		}
		return list
	})
}

// figureColumns returns the columns of the schedule of conditions, as wide as their cells are, and what
// they leave of a width for names; where that is much, they stand farther apart.
func figureColumns(rows []conditionRow, w, names float64) (columns []col, room float64) {
	room = w
	for k, f := range table.BalanceColumns() {
		x := col{w: max(5, draw.Width(f.Unit, remarkType), draw.Width(f.Symbol, softType)), align: draw.Right, t: textType, head: draw.Symbol(f.Symbol), symbol: true}
		if f.Unit != "" {
			x.head += "\n" + f.Unit
		}
		for _, row := range rows {
			x.w = max(x.w, draw.Width(row.figures[k], textType))
		}
		x.w += gridGap
		room -= x.w
		columns = append(columns, x)
	}
	if more := (room - names) / float64(len(columns)); more > 0 {
		for i := range columns {
			columns[i].w += more
		}
		room = names
	}
	return columns, room
}

// balanceTable lists the balances of a make-up under its conditions, a row a tint where tints differ.
func (p *paper) balanceTable(ratings []*glazing.Rating, ids []string, w float64) *grid {
	if len(ids) == 0 {
		return nil
	}
	const names = 50.0
	var all [][]conditionRow
	for _, id := range ids {
		all = append(all, balanceRows(ratings, id))
	}
	columns, room := figureColumns(slices.Concat(all...), w, names)
	g := &grid{height: 4.2, cols: nameColumns(ratings, room, ids)}
	if g.cols == nil {
		return nil
	}
	g.cols = append(g.cols, columns...)
	for _, rows := range all {
		g.named(rows, len(ratings) > 1)
	}
	var said []string
	for _, f := range table.BalanceColumns() {
		s := f.Symbol + " " + f.Meaning
		if f.Alias == "total_absorptance" {
			s += ", among the figures at normal incidence that of each"
		}
		said = append(said, s)
	}
	g.say(p, strings.Join(said, "; ")+".", p.blanks(ratings))
	return g
}

// blanks says why figures are not known in the schedule of conditions of ratings.
func (p *paper) blanks(ratings []*glazing.Rating) string {
	r := p.of(ratings)
	s := r.NotKnown(r.UnderConditions(table.BalanceColumns()), nil)
	if slices.ContainsFunc(ratings, func(x *glazing.Rating) bool {
		return slices.ContainsFunc(x.Balances, func(b glazing.Balance) bool { return b.Condition.SunWM2 == 0 })
	}) {
		s = strings.TrimSpace(noSun + " " + s)
	}
	return s
}

// noSun says why some figures have no number without sun.
const noSun = "Without sun g, αe and qi have no meaning."

// balanceSchedule lists the balances of all make-ups under a basis, condition by condition; nil where
// there are none.
func (p *paper) balanceSchedule(ratings []*glazing.Rating) *grid {
	var makeups []*glazing.Makeup
	of := map[*glazing.Makeup][]*glazing.Rating{}
	tinted := 0.0
	for _, r := range ratings {
		makeups = add(makeups, r.Makeup)
		of[r.Makeup] = append(of[r.Makeup], r)
		if r.Tint != "" {
			tinted = max(tinted, draw.Width(r.Tint, textType), draw.Width(table.EachTint, textType))
		}
	}
	const names, idMost, tintMost = 96.0, 0.4, 0.25
	var rows []conditionRow
	for _, id := range p.conditionsOf(ratings) {
		for _, m := range makeups {
			rows = append(rows, balanceRows(of[m], id)...)
		}
	}
	if rows == nil {
		return nil
	}
	columns, room := figureColumns(rows, width, names)
	tintW, idW := 0.0, draw.Width("condition", softType)
	if tinted > 0 {
		tintW = min(tinted+gridGap+1, tintMost*room)
	}
	for _, row := range rows {
		idW = max(idW, draw.Width(row.condition, strongType))
	}
	idW = min(idW+gridGap+1, idMost*room)
	g := &grid{height: 4.2, cols: []col{{w: idW, t: strongType, head: "condition"}, {w: room - idW - tintW, t: textType, head: "make-up"}}}
	if tintW > 0 {
		g.cols = append(g.cols, col{w: tintW, t: textType, head: "tint"})
	}
	g.cols = append(g.cols, columns...)
	for i, row := range rows {
		cells := []string{row.condition, row.rating.Makeup.ID}
		if i > 0 && row.condition == rows[i-1].condition {
			if cells[0] = ""; row.rating.Makeup == rows[i-1].rating.Makeup {
				cells[1] = ""
			}
		}
		if tintW > 0 {
			cells = append(cells, row.tint)
		}
		g.rows = append(g.rows, append(cells, row.figures...))
		g.leads = append(g.leads, []string{row.condition, row.rating.Makeup.ID})
	}
	g.say(p, p.blanks(ratings))
	return g
}

// temperatureTable lists the temperatures of surfaces, where the sections do not have them all.
func (p *paper) temperatureTable(ratings []*glazing.Rating, ids []string, w float64) *grid {
	const shownTints = 2 // in sections, the lightest and the darkest
	if len(ids) <= draw.MaxConditions && len(ratings) <= shownTints {
		return nil
	}
	surfaces := len(ratings[0].Surfaces)
	temperature := balanceFigure("temperature")
	const most, names = 16.0, 50.0
	each, known := 0.0, false
	var all [][]conditionRow
	for _, id := range ids {
		rows := rowsUnder(ratings, id, func(r *glazing.Rating) (list []string) {
			for k := range surfaces {
				list = append(list, trueMinus(temperature.At(id).Print(r, k)))
			}
			return list
		})
		for _, row := range rows {
			for _, s := range row.figures {
				each = max(each, draw.Width(s, textType)+gridGap)
				known = known || s != unknown
			}
		}
		all = append(all, rows)
	}
	if !known {
		return nil
	}
	each = max(each, min(most, (w-names)/float64(surfaces)))
	g := &grid{height: 4.2, cols: nameColumns(ratings, w-each*float64(surfaces), ids)}
	if g.cols == nil {
		return nil
	}
	for k := range surfaces {
		g.cols = append(g.cols, col{w: each, align: draw.Right, t: textType, head: strconv.Itoa(k + 1)})
	}
	for _, rows := range all {
		g.named(rows, len(ratings) > 1)
	}
	return g
}

// balanceFigure returns the figure of balances of a short name.
func balanceFigure(alias string) glazing.BalanceFigure {
	list := glazing.BalanceFigures()
	return list[slices.IndexFunc(list, func(f glazing.BalanceFigure) bool { return f.Alias == alias })]
}
