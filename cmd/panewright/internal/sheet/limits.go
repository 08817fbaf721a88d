package sheet

// The page of limits: how the figures stand to what the user entered.

import (
	"strings"

	"panewright/cmd/panewright/internal/draw"
	"panewright/cmd/panewright/internal/table"
	"panewright/glazing"
	"panewright/glazing/limits"
)

// limits sets the pages of limits.
func (p *paper) limits(c table.Check) {
	p.begin("Limits", "Figures against entered limits")
	for _, s := range c.Notice() {
		p.y = paragraph(p.c, left, p.y, width, s, textType)
	}
	p.y = paragraph(p.c, left, p.y+1, width, strings.Join(c.Counts(), "   "), strongType) + 1
	g := &grid{height: 4.3}
	widths := []float64{24, 10, 16, 26, 17, 20, 19, 44}
	for k, head := range append([]string{"make-up"}, table.CheckHeads()...) {
		x := col{w: widths[k], t: textType, head: head}
		if head == "value" || head == "margin" || head == "limit" {
			x.align = draw.Right
		}
		if head == "figure" {
			x.t = symbolType
		}
		g.cols = append(g.cols, x)
	}
	g.strong = map[int]bool{}
	var last *glazing.Makeup
	for i := range c.Results {
		x := &c.Results[i]
		row := c.Cells(x)
		row[2] = draw.Symbol(row[2])
		if x.Makeup == last {
			row[0] = ""
		}
		last = x.Makeup
		for k := range row {
			row[k] = strings.ReplaceAll(row[k], "\n", " ")
		}
		if x.Verdict != limits.Meets {
			g.strong[len(g.rows)] = true
		}
		g.rows = append(g.rows, row)
	}
	p.flow(g)
	p.y += 4
	p.block("Limits, typed by the user", c.Entered(), smallType)
	if list := c.Reasons(); list != nil {
		p.block("Too close to call, or not judged", list, smallType)
	}
	if list := c.Remarked(); list != nil {
		p.block("On the limits", list, smallType)
	}
	p.sign()
}
