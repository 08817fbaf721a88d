package sheet

// The published checks on paper.

import (
	"strings"

	"panewright/cmd/panewright/internal/draw"
	"panewright/cmd/panewright/internal/table"
	"panewright/glazing/project"
	"panewright/glazing/proof"
)

// Verification returns a PDF of the published checks as they came out on this machine.
func Verification(v table.Verification) (File, error) {
	checks := draw.Attachment{Name: "checks.json", Description: "The checks of this document with their inputs and all their digits", Content: table.VerifyJSON(v)}
	return verificationPages(v).write("", v.Said()[0], checks)
}

func verificationPages(v table.Verification) *paper {
	p := &paper{r: table.Report{Version: v.Version, Project: &project.Project{}}, full: map[string]bool{}}
	said := v.Said()
	p.begin("Verification", said[0], fact{"machine", v.Machine()})
	for _, s := range said[1:] {
		p.y = paragraph(p.c, left, p.y, width, s, textType) + 1
	}
	p.y += 2.5
	counts := v.Summary()
	g := &grid{height: 4.4, strong: map[int]bool{len(counts) - 2: true}, cols: []col{{w: width - 4*20, t: textType, head: counts[0][0]}}}
	for _, head := range counts[0][1:] {
		g.cols = append(g.cols, col{w: 20, align: draw.Right, t: textType, head: head})
	}
	g.rows = counts[1:]
	p.table("Summary", g)
	for _, group := range v.Groups {
		p.table(group.Title, outcomesTable(group))
		p.columns(list{title: "On these checks", items: table.VerifyNotes(group)})
	}
	p.foot("")
	return p
}

// outcomesTable has a row a check; above those of a make-up stands what it is made of.
func outcomesTable(group proof.Group) *grid {
	g := &grid{height: 3.7, strong: map[int]bool{}, titles: map[int]bool{}, types: map[[2]int]draw.Type{}}
	// id, what, computed, published, deviation, tolerance, result
	widths := []float64{31, 75, 17, 16, 14, 13, 10}
	for k, head := range table.VerifyHeads() {
		x := col{w: widths[k], t: smallType, head: head}
		if k > 1 && k < 6 {
			x.align = draw.Right
		}
		g.cols = append(g.cols, x)
	}
	notes := table.VerifyNotes(group)
	unitSaid := len(notes) > 0 && strings.HasPrefix(notes[0], "Unit: ")
	markup := smallType
	markup.Markup = true
	last := ""
	for _, o := range group.Outcomes {
		lead := strings.TrimSpace(o.Subject + "  " + o.Inputs["makeup"])
		if o.Subject != "" && lead != last {
			last = lead
			g.strong[len(g.rows)], g.titles[len(g.rows)] = true, true
			g.rows = append(g.rows, []string{"", lead, "", "", "", "", ""})
		}
		if o.Subject != "" { // figures of a make-up are named by their symbols
			symbol, basis, of := strings.Cut(o.What, ", ")
			if o.What = draw.Symbol(symbol); of {
				o.What += ", " + draw.Escape(basis)
			}
			g.types[[2]int{len(g.rows), 1}] = markup
		}
		o.Subject = ""
		if unitSaid {
			o.Unit = "1"
		}
		if o.Result != proof.Met {
			g.strong[len(g.rows)] = true
		}
		cells := table.VerifyCells(o)
		for k := range cells {
			cells[k] = oneLine(cells[k])
		}
		g.rows = append(g.rows, cells)
	}
	return g
}
