package sheet

// What pages are made of: headings, wrapped text, tables.

import (
	"slices"

	"panewright/cmd/panewright/internal/draw"
)

// add appends what a list does not hold.
func add[T comparable](list []T, x T) []T {
	if slices.Contains(list, x) {
		return list
	}
	return append(list, x)
}

// heading sets the title of a block and returns the baseline of what follows.
func heading(c *draw.Canvas, x, y, w float64, s string) float64 {
	c.Line(x, y, x+w, y, rule)
	c.Text(x, y+4, s, headType)
	return y + 8
}

// paragraph sets wrapped text and returns the baseline that would follow.
func paragraph(c *draw.Canvas, x, y, w float64, s string, t draw.Type) float64 {
	return c.Lines(x, y, draw.Wrap(s, w, t), t)
}

// A col is a column of a table on paper.
type col struct {
	w     float64
	align draw.Align
	t     draw.Type
	head  string
	// symbol says that the head is markup, that of a figure's symbol.
	symbol bool
}

// A grid is a table on paper: rows of cells, wrapped in their columns.
type grid struct {
	cols []col
	rows [][]string
	// strong rows are set in semibold, and rows have at least the height.
	strong map[int]bool
	height float64
}

// gridGap is the space between columns.
const gridGap = 1.6

// at returns where a column's text stands, and how wide it may be.
func (g *grid) at(x float64, k int) (anchor, room float64) {
	for _, c := range g.cols[:k] {
		x += c.w
	}
	room = g.cols[k].w - gridGap
	switch g.cols[k].align {
	case draw.Right:
		return x + g.cols[k].w - gridGap, room
	case draw.Centre:
		return x + room/2, room
	}
	return x, room
}

// lines returns the wrapped cells of a row, and its height.
func (g *grid) lines(i int) (cells [][]string, h float64) {
	h = g.height
	for k, c := range g.cols {
		_, room := g.at(0, k)
		var lines []string
		if i < 0 {
			lines = draw.Wrap(c.head, room, g.cellType(-1, k))
		} else if g.rows[i][k] != "" {
			lines = draw.Wrap(g.rows[i][k], room, g.cellType(i, k))
		}
		t := g.cellType(i, k)
		if len(lines) > 0 {
			h = max(h, float64(len(lines)-1)*t.Leading()+g.height)
		}
		cells = append(cells, lines)
	}
	return cells, h
}

func (g *grid) cellType(i, k int) draw.Type {
	t := g.cols[k].t
	if i < 0 {
		t = softType
		t.Markup = g.cols[k].symbol
	} else if g.strong[i] {
		t.Face = draw.Semibold
	}
	return t.To(g.cols[k].align)
}

// set draws row i, -1 for the heads, with its top at y, and returns its bottom.
func (g *grid) set(c *draw.Canvas, x, y float64, i int) float64 {
	cells, h := g.lines(i)
	total := 0.0
	for k := range g.cols {
		total += g.cols[k].w
		anchor, _ := g.at(x, k)
		t := g.cellType(i, k)
		c.Lines(anchor, y+(g.height+t.CapHeight())/2, cells[k], t)
	}
	stroke := hair
	if i < 0 {
		stroke = draw.Stroke{Colour: draw.Faint, Width: 0.2}
	}
	c.Line(x, y+h, x+total-gridGap, y+h, stroke)
	return y + h
}

// tall returns the height of the whole table.
func (g *grid) tall() float64 {
	sum := 0.0
	for i := -1; i < len(g.rows); i++ {
		_, h := g.lines(i)
		sum += h
	}
	return sum
}

// all draws the whole table and returns its bottom.
func (g *grid) all(c *draw.Canvas, x, y float64) float64 {
	for i := -1; i < len(g.rows); i++ {
		y = g.set(c, x, y, i)
	}
	return y
}

// flow sets the table on as many pages as it needs.
func (p *paper) flow(g *grid) {
	_, h := g.lines(-1)
	_, first := g.lines(0)
	p.room(h + first)
	p.y = g.set(p.c, left, p.y, -1)
	for i := range g.rows {
		if _, h := g.lines(i); p.y+h > bottom {
			p.next()
			p.y = g.set(p.c, left, p.y, -1)
		}
		p.y = g.set(p.c, left, p.y, i)
	}
}
