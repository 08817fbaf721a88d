package sheet

// The data sheet of one make-up under one basis, in all its tints.

import (
	"fmt"
	"slices"
	"strings"

	"panewright/cmd/panewright/internal/draw"
	"panewright/glazing"
)

// makeup sets the sheet of a make-up from its ratings, one a tint.
func (p *paper) makeup(ratings []*glazing.Rating) {
	m := ratings[0].Makeup
	p.head = nil
	p.next()
	p.y = p.title(m, ratings[0])
	p.head = func() float64 { return p.again(m, ratings[0]) }
	p.headline(ratings)
	p.drawing(ratings)
	p.figures(ratings)
	p.told(m)
	p.cautions(ratings)
	p.sign()
}

// fitted returns a type made smaller, but not below a size, so that text fits a width.
func fitted(s string, w float64, t draw.Type, least float64) draw.Type {
	for t.Size > least && draw.Width(s, t) > w {
		t.Size = max(least, t.Size-0.5)
	}
	return t
}

// titleLines is how many lines of a title stand at the head of a sheet; a longer one stands in full
// below.
const titleLines = 2

// title sets the head of a sheet and returns where the next block begins.
func (p *paper) title(m *glazing.Makeup, r *glazing.Rating) float64 {
	c, y := p.c, top
	c.Text(right, y, "Data sheet", softType.To(draw.Right))
	c.Text(left, y, draw.Fit(p.r.Project.Title, width-30, softType), softType)
	y += 9.5
	t := fitted(m.ID, width, titleType, 9)
	for i, line := range draw.Wrap(m.ID, width, t) {
		if i > 0 {
			y += t.Leading()
		}
		c.Text(left, y, line, t)
	}
	if lines := draw.Wrap(m.Title, width, nameType); len(lines) > 0 {
		y += 1
		for i, line := range lines[:min(len(lines), titleLines)] {
			y += nameType.Leading()
			if i == titleLines-1 && len(lines) > titleLines {
				line = draw.Fit(line+" "+lines[i+1], width, nameType)
			}
			c.Text(left, y, line, nameType)
		}
	}
	y += 4.6
	line := "Basis " + r.Method.Basis.Name + ": " + r.Method.Editions() + "."
	if about := p.about(); about != "" {
		line = draw.Fit(about, 220, softType) + " · " + line
	}
	y = paragraph(c, left, y, width, line, softType)
	c.Line(left, y-0.6, left+24, y-0.6, accentRule)
	return y + 3
}

// again sets the head of a page that goes on.
func (p *paper) again(m *glazing.Makeup, r *glazing.Rating) float64 {
	t := draw.Type{Face: draw.Semibold, Size: 9}
	p.c.Text(left, top, draw.Fit(strings.TrimSpace(m.ID+"  "+m.Title), width-40, t), t)
	p.c.Text(right, top, "basis "+r.Method.Basis.Name+", continued", softType.To(draw.Right))
	p.c.Line(left, top+2.2, right, top+2.2, hair)
	return top + 8
}

// headlines are the figures that stand large.
var headlines = []string{"u", "g", "light", "light_outside", "ra"}

// headline sets the large figures: of a make-up that switches, from its lightest to its darkest
// tint.
func (p *paper) headline(ratings []*glazing.Rating) {
	lightest, darkest := extremes(ratings)
	cell := width / float64(len(headlines))
	label := draw.Type{Size: 6.3, Colour: draw.Soft, Markup: true}
	lowest := p.y
	for i, alias := range headlines {
		f, ok := named(p.r.Figures, alias)
		if !ok {
			continue
		}
		x := left + float64(i)*cell
		value := f.Print(lightest, 0)
		if other := f.Print(darkest, 0); other != value {
			value += " – " + other
		}
		unit := 0.0
		if f.Unit != "" {
			unit = draw.Width(f.Unit, softType) + 1
		}
		t := fitted(value, cell-3-unit, numberType, 8)
		p.c.Text(x, p.y+6, value, t)
		p.c.Text(x+draw.Width(value, t)+1, p.y+6, f.Unit, softType)
		lines := draw.Wrap(draw.Symbol(f.Symbol)+"  "+draw.Escape(f.Meaning), cell-4, label)
		lowest = max(lowest, p.c.Lines(x, p.y+10, lines, label))
	}
	p.y = lowest - 0.5
	if lightest != darkest {
		p.y += 1
		p.c.Text(left, p.y, "From tint "+lightest.Tint+" to tint "+darkest.Tint+".", softType)
		p.y += 3
	}
	p.y += 1.5
}

// extremes returns the ratings of the highest and the lowest light transmittance.
func extremes(ratings []*glazing.Rating) (lightest, darkest *glazing.Rating) {
	lightest, darkest = ratings[0], ratings[0]
	for _, r := range ratings {
		switch v := r.Light.Transmittance; {
		case !v.Known:
			return ratings[0], ratings[len(ratings)-1]
		case v.Number > lightest.Light.Transmittance.Number:
			lightest = r
		case v.Number < darkest.Light.Transmittance.Number:
			darkest = r
		}
	}
	return lightest, darkest
}

func named(list []glazing.Figure, alias string) (glazing.Figure, bool) {
	i := slices.IndexFunc(list, func(f glazing.Figure) bool { return f.Alias == alias })
	if i < 0 {
		return glazing.Figure{}, false
	}
	return list[i], true
}

// drawing sets the section and the list of panes and gaps beside it.
func (p *paper) drawing(ratings []*glazing.Rating) {
	const gap, sectionW = 7.0, 84.0
	lightest, _ := extremes(ratings)
	list := p.buildUp(lightest, width-sectionW-gap)
	h := max(draw.SectionHeight(lightest, sectionW, 33), list.tall())
	p.room(h + 12)
	title := "Section, outside at the left"
	if lightest.Tint != "" {
		title += ", in tint " + lightest.Tint
	}
	y := heading(p.c, left, p.y, sectionW, draw.Fit(title, sectionW, headType)) - 2.5
	heading(p.c, left+sectionW+gap, p.y, width-sectionW-gap, "Panes and gaps, from outside")
	draw.Section(p.c, draw.Rect{X: left, Y: y, W: sectionW, H: h}, lightest)
	list.all(p.c, left+sectionW+gap, y-1)
	p.y = y + h + 4
}

// buildUp lists panes and gaps with what is known of them.
func (p *paper) buildUp(r *glazing.Rating, w float64) *grid {
	m := r.Makeup
	g := &grid{height: 4.2, cols: []col{
		{w: 9, align: draw.Left, t: strongType, head: "surface"},
		{w: w - 9 - 15 - 12, align: draw.Left, t: textType, head: "pane or gap"},
		{w: 15, align: draw.Right, t: textType, head: "mm"},
		{w: 12, align: draw.Right, t: textType, head: "ε, outer inner"},
	}}
	small := len(m.Panes) > 4
	if small {
		g.height = 3.3
		for k := range g.cols {
			g.cols[k].t.Size = 6.2
		}
	}
	for k, placed := range m.Panes {
		pane := placed.Pane
		what := pane.ID
		var more []string
		if placed.Turned {
			more = append(more, "turned")
		}
		if pane.Tintable() {
			tint := pane.Tints[r.Ready.States[r.State].Tints[k]].Name
			if placed.Tint == "" {
				more = append(more, fmt.Sprintf("switches, %d tints", len(pane.Tints)))
			} else {
				more = append(more, "tint "+tint)
			}
		}
		if len(pane.Plies) > 1 {
			var plies []string
			for _, y := range pane.Plies {
				plies = append(plies, fmt.Sprintf("%.6g", y.ThicknessMM))
			}
			more = append(more, "laminate "+strings.Join(plies, " + "))
		}
		if pane.HeatTreatment != glazing.UnknownTreatment {
			s := string(pane.HeatTreatment)
			if pane.HeatSoaked {
				s += ", heat soaked"
			}
			more = append(more, s)
		} else {
			more = append(more, "heat treatment not stated")
		}
		more = append(more, string(pane.Origin)+" spectrum")
		if small {
			more = slices.DeleteFunc(more, func(s string) bool { return s == "heat treatment not stated" })
		}
		e := func(i int) string {
			v := r.Surfaces[i].Corrected
			if !v.Known {
				return "–"
			}
			return glazing.PrintRounded(v.Number, 3)
		}
		g.rows = append(g.rows, []string{fmt.Sprintf("%d  %d", 2*k+1, 2*k+2), what + ": " + strings.Join(more, ", "),
			fmt.Sprintf("%.6g", pane.ThicknessMM()), e(2*k) + " " + e(2*k+1)})
		if k < len(m.Gaps) {
			gap := m.Gaps[k]
			g.rows = append(g.rows, []string{"", gap.Gas.String(), fmt.Sprintf("%.6g", gap.WidthMM), ""})
		}
	}
	g.rows = append(g.rows, []string{"", "together, " + glazing.PrintRounded(r.MassKGM2, 1) + " kg/m²", glazing.PrintRounded(r.ThicknessMM, 1), ""})
	g.strong = map[int]bool{len(g.rows) - 1: true}
	return g
}

// told sets what the user typed, and a title that was too long for the head.
func (p *paper) told(m *glazing.Makeup) {
	var lines []string
	for _, t := range m.Typed {
		lines = append(lines, t.Name+": "+t.Text)
	}
	if lines != nil {
		p.block("Typed by the user, not computed", lines, textType)
	}
	if len(draw.Wrap(m.Title, width, nameType)) > titleLines {
		p.block("Title in full", []string{m.Title}, smallType)
	}
	if p.r.Project.Notes != "" && p.single {
		p.block("Notes of the project", []string{p.r.Project.Notes}, smallType)
	}
}

// block sets paragraphs under a heading, over pages if need be.
func (p *paper) block(title string, list []string, t draw.Type) {
	p.room(12)
	y := heading(p.c, left, p.y, width, title)
	for _, s := range list {
		for _, line := range draw.Wrap(s, width, t) {
			if y > bottom {
				p.next()
				y = p.y
			}
			p.c.Text(left, y, line, t)
			y += t.Leading()
		}
	}
	p.y = y + 1.5
}

// sign leaves space for names below the last page of a sheet.
func (p *paper) sign() {
	const y = bottom + 8
	for i, s := range []string{"prepared by", "checked by", "date"} {
		x := left + float64(i)*(width/3)
		p.c.Line(x, y, x+width/3-8, y, draw.Stroke{Colour: draw.Faint, Width: 0.2})
		p.c.Text(x, y+2.8, s, softType)
	}
}
