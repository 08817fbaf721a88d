package sheet

// The schedule of a project, and the cautions that stand on every document.

import (
	"strings"

	"panewright/cmd/panewright/internal/draw"
	"panewright/glazing"
)

// begin begins pages of a kind, with a title at their head.
func (p *paper) begin(kind, title string) {
	p.head = nil
	p.next()
	c, y := p.c, top
	c.Text(right, y, kind, softType.To(draw.Right))
	if about := p.about(); about != "" {
		c.Text(left, y, draw.Fit(about, width-30, softType), softType)
	}
	t := draw.Type{Face: draw.Semibold, Size: 15}
	lines := draw.Wrap(title, width, t)
	y += 9
	for i, line := range lines[:min(len(lines), titleLines)] {
		if i == titleLines-1 && len(lines) > titleLines {
			line = draw.Fit(line+" "+lines[i+1], width, t)
			p.long = title
		}
		c.Text(left, y, line, t)
		y += t.Leading()
	}
	c.Line(left, y-2.5, left+24, y-2.5, accentRule)
	p.y = y + 2
	p.head = func() float64 {
		p.c.Text(left, top, draw.Fit(title, width-40, strongType), strongType)
		p.c.Text(right, top, kind+", continued", softType.To(draw.Right))
		p.c.Line(left, top+2.2, right, top+2.2, hair)
		return top + 8
	}
}

// schedule sets the pages of the schedule.
func (p *paper) schedule() {
	p.begin("Schedule", p.r.Project.Title)
	for _, group := range p.bases() {
		m := group[0].Method
		p.room(25)
		y := heading(p.c, left, p.y, width, "Basis "+m.Basis.Name)
		p.y = paragraph(p.c, left, y-0.8, width, m.Editions()+".", softType) - 0.5
		p.flow(p.scheduleTable(group))
		p.y += 5
	}
	p.block("Make-ups, from outside to inside", p.sequences(), smallType)
	p.block("Symbols", []string{p.r.Legend() + "."}, smallType)
	p.block("Spectra", []string{p.r.SpectraBy()}, smallType)
	p.listed("Cautions", p.r.CautionsOnce())
	if p.long != "" {
		p.block("Title in full", []string{p.long}, smallType)
	}
	if p.r.Project.Notes != "" {
		p.block("Notes of the project", []string{p.r.Project.Notes}, smallType)
	}
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

// scheduleTable has a row a rating.
func (p *paper) scheduleTable(ratings []*glazing.Rating) *grid {
	columns := p.r.Columns()
	valueW := min(10.6, 112/float64(len(columns)))
	g := &grid{height: 4.3}
	tintW := 0.0
	for _, r := range ratings {
		if r.Tint != "" {
			tintW = 17
		}
	}
	g.cols = []col{{w: width - tintW - valueW*float64(len(columns)), t: textType, head: "make-up"}, {w: tintW, t: textType, head: "tint"}}
	for _, c := range columns {
		g.cols = append(g.cols, col{w: valueW, align: draw.Right, t: textType, head: draw.Symbol(c.Head()), symbol: true})
	}
	var last *glazing.Makeup
	for _, r := range ratings {
		name := ""
		if r.Makeup != last {
			name = strings.TrimSpace(r.Makeup.ID + "  " + short(r.Makeup.Title))
		}
		last = r.Makeup
		row := []string{name, r.Tint}
		for _, c := range columns {
			row = append(row, c.Printed(r))
		}
		g.rows = append(g.rows, row)
	}
	return g
}

// short keeps a title in a table within bounds; the sheet of the make-up has it in full.
func short(s string) string {
	if r := []rune(s); len(r) > 90 {
		return string(r[:90]) + "…"
	}
	return s
}

// sequences are the make-ups as the trade writes them, with what the user typed.
func (p *paper) sequences() (list []string) {
	var done []*glazing.Makeup
	for i := range p.r.Ratings {
		m := p.r.Ratings[i].Makeup
		if n := len(done); n == len(add(done, m)) {
			continue
		}
		done = append(done, m)
		s := m.ID + ": " + strings.ReplaceAll(m.BuildUp(), "\u00a0", " ")
		for _, t := range m.Typed {
			s += "; typed by the user: " + t.Name + ": " + t.Text
		}
		list = append(list, s)
	}
	return list
}

// cautions sets those of a make-up, in all its tints.
func (p *paper) cautions(ratings []*glazing.Rating) {
	part := p.r
	part.Ratings = nil
	for _, r := range ratings {
		part.Ratings = append(part.Ratings, *r)
	}
	p.listed("Cautions", part.CautionsOnce())
}

// listed sets short paragraphs in two columns.
func (p *paper) listed(title string, list []string) {
	const gap = 6.0
	w := (width - gap) / 2
	t := draw.Type{Size: 6.3}
	var paragraphs [][]string
	total := 0
	for _, s := range list {
		lines := draw.Wrap(s, w-2.5, t)
		paragraphs = append(paragraphs, lines)
		total += len(lines)
	}
	if total == 0 {
		return
	}
	p.room(16)
	y := heading(p.c, left, p.y, width, title) - 0.6
	for len(paragraphs) > 0 {
		perColumn := int((bottom - y) / t.Leading())
		each := min((total+1)/2+1, perColumn) // both columns alike, if they fit
		lowest := y
		for column := 0; column < 2 && len(paragraphs) > 0; column++ {
			x, line := left+float64(column)*(w+gap), 0
			for len(paragraphs) > 0 && (line == 0 || line+len(paragraphs[0]) <= each || column == 1 && line+len(paragraphs[0]) <= perColumn) {
				p.c.Text(x, y+float64(line)*t.Leading(), "·", t)
				p.c.Lines(x+2.5, y+float64(line)*t.Leading(), paragraphs[0], t)
				line += len(paragraphs[0])
				total -= len(paragraphs[0])
				paragraphs = paragraphs[1:]
			}
			lowest = max(lowest, y+float64(line)*t.Leading())
		}
		p.y = lowest + 1.5
		if len(paragraphs) > 0 {
			p.next()
			y = p.y
		}
	}
}
