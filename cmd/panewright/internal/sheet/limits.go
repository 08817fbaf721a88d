package sheet

// The pages of limits: how the figures stand to what the user entered.

import (
	"slices"
	"strings"

	"panewright/cmd/panewright/internal/draw"
	"panewright/cmd/panewright/internal/table"
	"panewright/glazing"
	"panewright/glazing/limits"
)

// limits sets the pages of limits.
func (p *paper) limits(c table.Check) {
	p.begin("Limits", "Figures against entered limits", fact{"project", p.r.Project.Title})
	p.facts(p.saidBy())
	for _, s := range append(slices.Clone(c.Notice()), table.RoundedText, "Every tint of the make-ups is held, under the basis of each limit.") {
		p.y = paragraph(p.c, left, p.y, width, s, smallType)
	}
	p.y += 2
	p.table("Results: "+strings.Join(c.Counts(), ", "), limitsTable(c))
	entered := &grid{height: 4.2, bare: true, cols: []col{{w: 6, t: strongType}, {w: width - 6, t: textType}}}
	for _, s := range c.Entered() {
		number, s, _ := strings.Cut(oneLine(s), "  ")
		entered.rows = append(entered.rows, []string{number, s})
	}
	p.table("Limits, typed by the user", entered)
	p.columns(list{title: "Too close to call, or not judged", items: c.Reasons()})
	p.columns(list{title: "On the limits", items: c.Remarked()})
	var bases []string
	var figures []table.Choice // whatever their place and condition
	for i := range c.Ratings {
		m := c.Ratings[i].Method
		bases = add(bases, m.Basis.Name+": "+m.Editions()+".")
	}
	for i := range c.Results {
		x := table.Choice{Figure: c.Results[i].Judged}
		x.Per, x.Condition = glazing.PerMakeup, ""
		if !slices.ContainsFunc(figures, func(o table.Choice) bool { return o.Head() == x.Head() && o.Meaning == x.Meaning }) {
			figures = append(figures, x)
		}
	}
	p.columns(list{title: "Bases", items: bases})
	p.columns(list{title: conditionsTitle, items: withMinus(c.ConditionsUsed())})
	p.key("Symbols", "not known; the reasons stand above", figures)
	p.inFull()
}

// limitsTable has a row a result. What does not meet its limit is in semibold, and has the accent.
func limitsTable(c table.Check) *grid {
	const number, value, entered, margin, result = 11.0, 15.0, 19.0, 18.0, 40.0
	const figureLeast = 34.0 // of one under a condition of a long name
	g := &grid{height: 4.4, strong: map[int]bool{}, types: map[[2]int]draw.Type{}}
	figure, idW, tintW := 13.0, 14.0, 0.0
	for i := range c.Results {
		x := &c.Results[i]
		idW = max(idW, draw.Width(x.Makeup.ID, strongType)+gridGap+2)
		tintW = max(tintW, draw.Width(x.Tint, textType)+gridGap+2)
	}
	symbol := symbolType
	symbol.Face = draw.Semibold // as of rows that do not meet
	for _, cells := range c.Rows() {
		figure = max(figure, draw.Width(symbolAt(cells[1]), symbol)+gridGap+0.2)
	}
	figure = min(figure, max(figureLeast, width-number-value-entered-margin-result-idW-tintW))
	rest := width - number - figure - value - entered - margin - result
	tintW = min(tintW, rest/2)
	idW = min(idW, rest-tintW)
	slack := (rest - idW - tintW) / 2
	g.cols = []col{
		{w: idW + slack, t: strongType, head: "make-up"},
		{w: tintW + slack, t: textType, head: "tint"},
		{w: number, t: textType, head: "limit"},
		{w: figure, t: symbolType, head: "figure"},
		{w: entered, t: textType, head: "entered"},
		{w: value, align: draw.Right, t: textType, head: "value"},
		{w: margin, align: draw.Right, t: textType, head: "margin"},
		{w: result, t: textType, head: "result"},
	}
	if tintW == 0 {
		g.cols[1].head = ""
	}
	verdict := strongType.In(draw.Accent)
	var last *glazing.Makeup
	for i, cells := range c.Rows() { // limit, figure, tint, value, entered, margin, result
		x := &c.Results[i]
		for k := range cells {
			cells[k] = strings.Replace(oneLine(cells[k]), "-", minusIn(k+1), 1)
		}
		name := symbolAt(cells[1])
		if s, id, under := strings.Cut(cells[1], "@"); under && draw.Width(name, symbol) > figure-gridGap {
			name = draw.Symbol(s) + "\n@" + id
		}
		row := []string{x.Makeup.ID, cells[2], cells[0], name, cells[4], cells[3], cells[5], cells[6]}
		g.leads = append(g.leads, []string{row[0]})
		if x.Makeup == last {
			row[0] = ""
		}
		last = x.Makeup
		if x.Verdict != limits.Meets {
			g.strong[len(g.rows)] = true
		}
		if x.Verdict == limits.DoesNotMeet {
			g.types[[2]int{len(g.rows), len(row) - 1}] = verdict
		}
		g.rows = append(g.rows, row)
	}
	return g
}

// minusIn returns how a cell of a result writes a hyphen: numbers have a true minus.
func minusIn(cell int) string {
	if cell == 4 || cell == 6 {
		return "−"
	}
	return "-"
}
