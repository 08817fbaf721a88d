package sheet

// Tables on paper.

import (
	"cmp"
	"slices"
	"strings"

	"panewright/cmd/panewright/internal/draw"
)

// A col is a column of a table.
type col struct {
	w     float64
	align draw.Align
	t     draw.Type
	head  string
	// symbol says that the head is markup, that of a figure's symbol.
	symbol bool
}

// A grid is a table: rows of cells, wrapped in their columns. What follows a line feed in a cell is
// a remark, set small.
type grid struct {
	cols   []col
	rows   [][]string
	height float64              // of a row of one line
	strong map[int]bool         // rows that are set in semibold
	types  map[[2]int]draw.Type // of cells that differ from their column
	titles map[int]bool         // rows that are above others as their title
	leads  [][]string           // what stands in the first cells of a row that begins a page, where they are blank
	bare   bool                 // without heads
	note   string               // what is said below
	marked bool                 // the note is markup

	set []gridRow // as they are set
}

// A gridRow is a row that was wrapped.
type gridRow struct {
	cells []gridCell
	tall  float64
}

type gridCell struct {
	lines, remarks []string
	t              draw.Type
}

// gridGap is the space between columns.
const gridGap = 2.2

// place returns where the text of a column stands, and how wide it may be.
func (g *grid) place(x float64, k int) (anchor, room float64) {
	for _, c := range g.cols[:k] {
		x += c.w
	}
	room = g.cols[k].w
	if k < len(g.cols)-1 {
		room -= gridGap
	}
	switch g.cols[k].align {
	case draw.Right:
		return x + room, room
	case draw.Centre:
		return x + room/2, room
	}
	return x, room
}

func (g *grid) width() (sum float64) {
	for _, c := range g.cols {
		sum += c.w
	}
	return sum
}

// remark is the type of remarks in a cell of a type.
func remark(t draw.Type) draw.Type {
	return draw.Type{Size: min(t.Size, remarkType.Size), Colour: remarkType.Colour, Align: t.Align}
}

// row returns row i, -1 for the heads.
func (g *grid) row(i int) gridRow {
	if g.set == nil {
		g.set = make([]gridRow, len(g.rows)+1)
	}
	if g.set[i+1].cells == nil {
		cells := make([]string, len(g.cols))
		if i >= 0 {
			copy(cells, g.rows[i])
		} else {
			for k, c := range g.cols {
				cells[k] = c.head
			}
		}
		g.set[i+1] = g.wrap(i, cells)
	}
	return g.set[i+1]
}

func (g *grid) wrap(i int, texts []string) (r gridRow) {
	r.tall = g.height
	for k, s := range texts {
		_, room := g.place(0, k)
		t := g.cellType(i, k)
		s, more, _ := strings.Cut(s, "\n")
		cell := gridCell{t: t}
		if s != "" {
			cell.lines = draw.Wrap(s, room, t)
		}
		if more != "" {
			cell.remarks = draw.Wrap(more, room, remark(t))
		}
		h := g.height + float64(max(len(cell.lines), 1)-1)*t.Leading()
		if n := len(cell.remarks); n > 0 {
			h += float64(n)*remark(t).Leading() + 0.3
		}
		r.tall = max(r.tall, h)
		r.cells = append(r.cells, cell)
	}
	return r
}

func (g *grid) cellType(i, k int) draw.Type {
	t := g.cols[k].t
	if own, ok := g.types[[2]int{i, k}]; ok {
		t = own
	} else if i < 0 {
		t = softType
		t.Markup = g.cols[k].symbol
	} else if g.strong[i] {
		t.Face = draw.Semibold
	}
	return t.To(g.cols[k].align)
}

// draw sets a row with its top at y, and returns its bottom. Heads stand at their bottom, those with
// units below them at their top.
func (g *grid) draw(c *draw.Canvas, x, y float64, r gridRow, head bool) float64 {
	low := head && !slices.ContainsFunc(r.cells, func(c gridCell) bool { return c.remarks != nil })
	for k, cell := range r.cells {
		anchor, _ := g.place(x, k)
		t := cell.t
		base := y + (g.height+t.CapHeight())/2
		if low {
			base = y + r.tall - (g.height-t.CapHeight())/2 - float64(len(cell.lines)-1)*t.Leading()
		}
		base = c.Lines(anchor, base, cell.lines, t)
		small := remark(t)
		if len(cell.lines) > 0 {
			base += small.Leading() - t.Leading() + 0.3
		}
		c.Lines(anchor, base, cell.remarks, small)
	}
	stroke := hair
	if head {
		stroke = faint
	}
	c.Line(x, y+r.tall, x+g.width(), y+r.tall, stroke)
	return y + r.tall
}

// headTall returns the height of the heads.
func (g *grid) headTall() float64 {
	if g.bare {
		return 0
	}
	return g.row(-1).tall
}

// tall returns the height of the whole table.
func (g *grid) tall() float64 {
	sum := g.headTall()
	for i := range g.rows {
		sum += g.row(i).tall
	}
	return sum
}

// noteType is the type of what is said below the table.
func (g *grid) noteType() draw.Type {
	t := noteType
	t.Markup = g.marked
	return t
}

// say adds what is said below the table, in which symbols of figures are set as such.
func (g *grid) say(p *paper, sentences ...string) {
	var said []string
	for _, s := range sentences {
		if s != "" {
			said = append(said, p.worded(s))
		}
	}
	g.note, g.marked = strings.Join(said, " "), true
}

// block returns the table under a title.
func (g *grid) block(p *paper, x float64, title string) block {
	w := g.width()
	t := g.noteType()
	lines := draw.Wrap(g.note, w, t)
	b := block{tall: headTall + g.tall() + float64(len(lines))*noteType.Leading()}
	if len(lines) > 0 {
		b.tall += 1
	}
	b.set = func(y float64) {
		y = heading(p.c, x, y, w, title)
		if !g.bare {
			y = g.draw(p.c, x, y, g.row(-1), true)
		}
		for i := range g.rows {
			y = g.draw(p.c, x, y, g.row(i), false)
		}
		p.c.Lines(x, y+1+noteType.CapHeight()+0.4, lines, t)
	}
	return b
}

// table sets a table under a title on as many pages as it needs.
func (p *paper) table(title string, g *grid) {
	if len(g.rows) == 0 {
		return
	}
	if b := g.block(p, left, title); p.y+b.tall <= bottom || b.tall < (bottom-top)*0.4 {
		p.room(b.tall)
		b.set(p.y)
		p.y += b.tall + apart
		return
	}
	p.room(headTall + g.headTall() + g.row(0).tall + g.row(min(1, len(g.rows)-1)).tall)
	p.y = heading(p.c, left, p.y, width, title)
	begin := func() {
		if !g.bare {
			p.y = g.draw(p.c, left, p.y, g.row(-1), true)
		}
	}
	begin()
	note := draw.Wrap(g.note, width, g.noteType())
	noteTall := 1 + float64(len(note))*noteType.Leading()
	for i := range g.rows {
		r := g.row(i)
		need := r.tall
		switch {
		case i == len(g.rows)-1:
			need += noteTall
		case i == len(g.rows)-2: // the last row does not stand alone
			need += g.row(i+1).tall + noteTall
		case g.titles[i]:
			need += g.row(i + 1).tall
		}
		if p.y+need > bottom && p.y > p.fresh+headTall+g.headTall() {
			p.next()
			begin()
			if i < len(g.leads) {
				cells := make([]string, len(g.cols))
				copy(cells, g.rows[i])
				for k, s := range g.leads[i] {
					cells[k] = cmp.Or(cells[k], s)
				}
				r = g.wrap(i, cells)
			}
		}
		for _, part := range g.parts(r) {
			if p.y+part.tall > bottom && p.y > p.fresh+g.headTall() {
				p.next()
				begin()
			}
			p.y = g.draw(p.c, left, p.y, part, false)
		}
	}
	if len(note) > 0 {
		p.room(noteTall)
		p.c.Lines(left, p.y+1+noteType.CapHeight()+0.4, note, g.noteType())
		p.y += noteTall
	}
	p.y += apart
}

// parts cuts a row that is higher than most pages into several.
func (g *grid) parts(r gridRow) (list []gridRow) {
	const most = 40 // lines
	for {
		part, rest := gridRow{tall: g.height}, gridRow{}
		more := false
		for _, c := range r.cells {
			n := min(len(c.lines), most)
			m := min(len(c.remarks), most-n)
			part.cells = append(part.cells, gridCell{c.lines[:n], c.remarks[:m], c.t})
			rest.cells = append(rest.cells, gridCell{c.lines[n:], c.remarks[m:], c.t})
			more = more || n < len(c.lines) || m < len(c.remarks)
			h := g.height + float64(max(n, 1)-1)*c.t.Leading()
			if m > 0 {
				h += float64(m)*remark(c.t).Leading() + 0.3
			}
			part.tall = max(part.tall, h)
		}
		if list = append(list, part); !more {
			return list
		}
		r = rest
	}
}
