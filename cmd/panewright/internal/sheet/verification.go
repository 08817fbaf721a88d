package sheet

// The published checks on paper.

import (
	"panewright/cmd/panewright/internal/draw"
	"panewright/cmd/panewright/internal/table"
	"panewright/glazing/project"
)

// Verification returns a PDF of the published checks as they came out on this machine.
func Verification(v table.Verification) (File, error) {
	p := &paper{r: table.Report{Version: v.Version, Project: &project.Project{}}}
	said := v.Said()
	p.begin("Verification", said[0])
	for _, s := range append(said[1:], v.Machine()) {
		p.y = paragraph(p.c, left, p.y, width, s, textType) + 1
	}
	p.y += 2
	counts := v.Summary()
	g := &grid{height: 4.3, cols: []col{{w: 60, t: textType, head: counts[0][0]}}}
	for _, head := range counts[0][1:] {
		g.cols = append(g.cols, col{w: 22, align: draw.Right, t: textType, head: head})
	}
	g.rows = counts[1:]
	p.flow(g)
	p.y += 5
	for _, group := range v.Groups {
		p.room(30)
		p.y = heading(p.c, left, p.y, width, group.Title) - 3
		g := &grid{height: 3.5, strong: map[int]bool{}}
		widths := []float64{30, 64, 17, 17, 17, 15, 16}
		for k, head := range table.VerifyHeads() {
			x := col{w: widths[k], t: smallType, head: head}
			if k > 1 && k < 6 {
				x.align = draw.Right
			}
			g.cols = append(g.cols, x)
		}
		for _, o := range group.Outcomes {
			if o.Result != "met" {
				g.strong[len(g.rows)] = true
			}
			g.rows = append(g.rows, table.VerifyCells(o))
		}
		p.flow(g)
		p.y += 3.5
		for _, s := range table.VerifyNotes(group) {
			for _, line := range draw.Wrap(s, width, softType) {
				if p.y > bottom {
					p.next()
				}
				p.c.Text(left, p.y, line, softType)
				p.y += softType.Leading()
			}
		}
		p.y += 4
	}
	p.foot("")
	return p.write("", said[0], table.VerifyJSON(v), "checks.json")
}
