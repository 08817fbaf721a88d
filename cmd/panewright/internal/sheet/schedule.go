package sheet

// The schedule of a project, with what is said of all its make-ups.

import (
	"slices"
	"strings"

	"panewright/cmd/panewright/internal/draw"
	"panewright/cmd/panewright/internal/table"
	"panewright/glazing"
)

// schedule sets the pages of the schedule.
func (p *paper) schedule() {
	p.begin("Schedule", p.r.Project.Title, fact{})
	p.facts(p.saidBy())
	p.y += 2
	under := false // whether there are conditions
	for _, group := range p.bases() {
		m := group[0].Method
		p.table("Basis "+m.Basis.Name, p.scheduleTable(group))
		if g := p.balanceSchedule(group); g != nil {
			p.table("Basis "+m.Basis.Name+", under conditions", g)
			under = true
		}
	}
	p.columns(list{title: differTitle, items: p.differ()})
	p.key("Symbols", "not known; a caution says why", p.r.Columns())
	if under {
		var columns []table.Choice
		for _, f := range table.BalanceColumns() {
			columns = append(columns, table.Choice{Figure: f.Figure})
		}
		p.key(table.UnderSymbolsTitle, "not known, or of no meaning without sun; else the table or a caution says why", columns)
	}
	p.table("Make-ups, from outside to inside", p.sequences())
	for _, t := range []table.Titled{p.r.StressTable(), p.r.MoistureTable()} {
		if len(t.Rows) > 0 {
			p.table(t.Title, p.titled(t))
		}
	}
	p.columns(list{title: conditionsTitle, items: withMinus(p.r.ConditionsListed())})
	if s := p.r.SpectraBy(); s != "" {
		p.columns(list{title: "Spectra", items: strings.Split(s, "; ")})
	}
	p.columns(list{title: "Cautions", items: p.r.CautionsOnce(), mark: "·"})
	if p.r.Project.Notes != "" {
		p.columns(list{title: "Notes of the project", items: []string{p.r.Project.Notes}})
	}
	p.inFull()
}

// bases returns the ratings of each basis.
func (p *paper) bases() (list [][]*glazing.Rating) {
	var names []string
	for i := range p.r.Ratings {
		r := &p.r.Ratings[i]
		names = add(names, r.Method.Basis.Name)
		for k, name := range names {
			if name == r.Method.Basis.Name {
				if k == len(list) {
					list = append(list, nil)
				}
				list[k] = append(list[k], r)
			}
		}
	}
	return list
}

// scheduleTable has a row a rating. Titles stand beside short ids, and below long ones.
func (p *paper) scheduleTable(ratings []*glazing.Rating) *grid {
	const idMost, tintMost = 18.0, 22.0
	g := &grid{height: 4.4, note: ratings[0].Method.Editions() + "."}
	idW, tintW := draw.Width("make-up", softType), 0.0
	for _, r := range ratings {
		idW = max(idW, draw.Width(r.Makeup.ID, strongType))
		tintW = max(tintW, draw.Width(r.Tint, textType))
	}
	if tintW > 0 {
		tintW = min(max(tintW, 7)+gridGap+1, tintMost)
	}
	names := width - tintW // of the columns of ids and titles
	var figures []col
	for _, c := range p.r.Columns() {
		x := col{w: max(9.4, draw.Width(c.Unit, remarkType)+gridGap+0.2), align: draw.Right, t: textType, head: draw.Symbol(c.Head()), symbol: true}
		if c.Unit != "" {
			x.head += "\n" + c.Unit
		}
		figures = append(figures, x)
		names -= x.w
	}
	below := idW > idMost
	if below {
		idW = names
	} else {
		idW += gridGap + 1
	}
	g.cols = []col{{w: idW, t: strongType, head: "make-up"}}
	if !below {
		g.cols = append(g.cols, col{w: names - idW, t: textType})
	}
	if tintW > 0 {
		g.cols = append(g.cols, col{w: tintW, t: textType, head: "tint"})
	}
	g.cols = append(g.cols, figures...)
	var last *glazing.Makeup
	for _, r := range ratings {
		row := []string{r.Makeup.ID, short(r.Makeup.Title)}
		g.leads = append(g.leads, []string{r.Makeup.ID})
		switch {
		case r.Makeup == last && below:
			row = []string{""}
		case r.Makeup == last:
			row = []string{"", ""}
		case below:
			row = []string{row[0] + "\n" + row[1]}
		}
		last = r.Makeup
		if tintW > 0 {
			row = append(row, r.Tint)
		}
		for _, c := range p.r.Columns() {
			row = append(row, c.Printed(r))
		}
		g.rows = append(g.rows, row)
	}
	return g
}

// short keeps a title in a table within bounds; the sheet of the make-up has it in full.
func short(s string) string {
	const most = 80
	s = oneLine(s)
	if r := []rune(s); len(r) > most {
		return strings.TrimRight(string(r[:most]), " ") + "…"
	}
	return s
}

// oneLine keeps a text of the user's from being taken for one with a remark.
func oneLine(s string) string { return strings.ReplaceAll(s, "\n", " ") }

// key says under a title what the symbols of figures mean, and what a dash does.
func (p *paper) key(title, dash string, choices []table.Choice) {
	const columns, symbolW = 3, 9.0
	choices = append(slices.Clip(choices), table.Choice{Figure: glazing.Figure{Symbol: unknown, Meaning: dash}})
	t := listType
	t.Markup = true
	w := (width+gutter)/columns - gutter
	var cells, symbols [][]string // a symbol that is wide, of a figure under a condition, stands above
	for _, c := range choices {
		s := p.worded(c.About())
		if c.Unit != "" {
			s += ", " + c.Unit
		}
		symbol, said := []string{symbolAt(c.Head())}, draw.Wrap(s, w-symbolW, t)
		if draw.Width(symbol[0], t) > symbolW-1 {
			symbol = draw.Wrap(symbol[0], w, t)
			said = append(make([]string, len(symbol)), said...)
		}
		cells, symbols = append(cells, said), append(symbols, symbol)
	}
	rows := (len(cells) + columns - 1) / columns
	h := headTall
	tallOf := func(row int) (h float64) {
		for i := row; i < len(cells); i += rows {
			h = max(h, float64(len(cells[i]))*t.Leading()+0.4)
		}
		return h
	}
	for row := range rows {
		h += tallOf(row)
	}
	p.room(h)
	y := heading(p.c, left, p.y, width, title)
	for row := range rows {
		base := y + t.CapHeight() + 0.6
		for i := row; i < len(cells); i += rows {
			x := left + float64(i/rows)*(w+gutter)
			p.c.Lines(x, base, symbols[i], t)
			p.c.Lines(x+symbolW, base, cells[i], t)
		}
		y += tallOf(row)
	}
	p.y = y + apart
}

// sequences are the make-ups as the trade writes them, with what the user typed.
func (p *paper) sequences() *grid {
	g := &grid{height: 4.4, bare: true, cols: []col{{w: 0, t: strongType}, {w: width, t: textType}}}
	var done []*glazing.Makeup
	for i := range p.r.Ratings {
		m := p.r.Ratings[i].Makeup
		if n := len(done); n == len(add(done, m)) {
			continue
		}
		done = append(done, m)
		s := strings.ReplaceAll(m.BuildUp(), "\u00a0", " ")
		if !m.Tilt.Vertical() {
			s += ", tilt " + millimetres(m.Tilt.Degrees()) + "°"
		}
		var typed []string
		for _, t := range m.Typed {
			typed = append(typed, oneLine(t.Name+": "+t.Text))
		}
		if typed != nil {
			s += "\ntyped by the user: " + strings.Join(typed, "; ")
		}
		g.rows = append(g.rows, []string{m.ID, s})
		g.cols[0].w = min(40, max(g.cols[0].w, draw.Width(m.ID, strongType)+gridGap+1))
	}
	g.cols[1].w = width - g.cols[0].w
	return g
}
